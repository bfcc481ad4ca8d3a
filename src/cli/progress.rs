//! A bar per stage on a terminal, nothing in a pipe.

use crate::notice::{Progress, Silent};
use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};
use std::io::IsTerminal;
use std::sync::Mutex;

/// The right progress for where standard error goes.
pub fn progress(quiet: bool) -> Box<dyn Progress> {
    if quiet || !std::io::stderr().is_terminal() { Box::new(Silent) } else { Box::new(Bar(Mutex::new(None))) }
}

struct Bar(Mutex<Option<ProgressBar>>);

impl Bar {
    fn with(&self, act: impl FnOnce(&mut Option<ProgressBar>)) {
        // A poisoned lock means that another thread panicked; a bar is not worth a second panic.
        if let Ok(mut bar) = self.0.lock() {
            act(&mut bar);
        }
    }
}

impl Progress for Bar {
    fn begin(&self, stage: &str, total: Option<u64>) {
        self.with(|slot| {
            let (bar, template) = match total {
                Some(total) => (ProgressBar::new(total), "{msg:<24} {bar:30} {human_pos}/{human_len} {eta}"),
                None => (ProgressBar::new_spinner(), "{msg:<24} {spinner} {human_pos} {elapsed}"),
            };
            bar.set_draw_target(ProgressDrawTarget::stderr());
            bar.set_style(ProgressStyle::with_template(template).unwrap_or_else(|_| ProgressStyle::default_bar()));
            bar.set_message(stage.to_owned());
            *slot = Some(bar);
        });
    }
    fn advance(&self, units: u64) {
        self.with(|slot| {
            if let Some(bar) = slot {
                bar.inc(units);
            }
        });
    }
    fn end(&self) {
        self.with(|slot| {
            if let Some(bar) = slot.take() {
                bar.finish_and_clear();
            }
        });
    }
}
