//! The one printer: it alone decides what quiet means, and how a message looks.

use super::args::{CommonArgs, MessageFormat};
use crate::job::{JobError, Message, message_of};
use crate::notice::{Notice, Refusal, Severity};
use std::io::{self, Write};

/// Prints messages as the user asked.
pub struct Printer {
    format: MessageFormat,
    quiet: bool,
}

/// How many refused rows `run` prints one by one; the rest are in the `refusals` layer.
const REFUSALS_SHOWN: usize = 10;

impl Printer {
    /// As the options say.
    pub fn new(options: &CommonArgs) -> Self {
        Self { format: options.format, quiet: options.quiet }
    }

    /// A line of the result, on standard output; nothing in JSON, where results are objects.
    pub fn line(&self, text: &str) {
        if !self.quiet && self.format == MessageFormat::Text {
            print(io::stdout(), text);
        }
    }

    /// A result object, on standard output; nothing in text, where results are lines.
    pub fn object(&self, object: &serde_json::Value) {
        if !self.quiet && self.format == MessageFormat::Json {
            print(io::stdout(), &object.to_string());
        }
    }

    /// A message that did not stop the job.
    pub fn notice(&self, notice: &Notice) {
        if !self.quiet {
            self.message(&message_of(notice));
        }
    }

    /// Refused rows: all of them, or the first few with the number of the rest.
    pub fn refusals(&self, refusals: &[Refusal], all: bool) {
        if self.quiet {
            return;
        }
        let shown =
            if all || self.format == MessageFormat::Json { refusals.len() } else { refusals.len().min(REFUSALS_SHOWN) };
        for refusal in &refusals[..shown] {
            self.message(&Message {
                severity: "refused",
                code: refusal.code.to_owned(),
                file: Some(refusal.source.clone()),
                row: Some(refusal.row),
                column: refusal.column.clone(),
                message: refusal.reason.clone(),
                hint: None,
            });
        }
        if shown < refusals.len() {
            print(
                io::stderr(),
                &format!(
                    "refused: {} further rows; `homocline check` and the refusals layer list them all",
                    refusals.len() - shown
                ),
            );
        }
    }

    /// What stopped a job, after everything that led to it.
    pub fn stopped(&self, error: &JobError) {
        if let JobError::NothingLeft(checked) = error {
            checked.notices.iter().for_each(|notice| self.notice(notice));
            self.refusals(&checked.refusals, true);
        }
        self.error(&error.to_string());
    }

    /// What stopped the job; printed even when quiet.
    pub fn error(&self, message: &str) {
        self.message(&Message {
            severity: "error",
            code: "stopped".into(),
            file: None,
            row: None,
            column: None,
            message: message.to_owned(),
            hint: None,
        });
    }

    fn message(&self, message: &Message) {
        match self.format {
            MessageFormat::Json => {
                if let Ok(json) = serde_json::to_string(message) {
                    print(io::stdout(), &json);
                }
            }
            MessageFormat::Text => print(io::stderr(), &text_of(message)),
        }
    }
}

fn text_of(message: &Message) -> String {
    let mut place = Vec::new();
    if let Some(file) = &message.file {
        place.push(file.clone());
    }
    if let Some(row) = message.row {
        place.push(format!("row {row}"));
    }
    if let Some(column) = &message.column {
        place.push(format!("column \"{column}\""));
    }
    let label = if message.severity == "info" { "note" } else { message.severity };
    let place = if place.is_empty() { String::new() } else { format!("{}: ", place.join(", ")) };
    let hint = message.hint.as_ref().map(|h| format!(" ({h})")).unwrap_or_default();
    format!("{label}: {place}{}{hint}", message.message)
}

/// A reader that closed its end (`| head`) is no fault of the job.
fn print(mut to: impl Write, text: &str) {
    let _ = writeln!(to, "{text}");
}

/// True where a notice counts as a finding under `--strict`.
pub fn is_finding(notice: &Notice) -> bool {
    notice.severity == Severity::Warning
}
