//! `homocline symbols`.

use super::DONE;
use super::args::{CommonArgs, MessageFormat};
use super::messages::Printer;
use crate::symbol;

/// Prints the symbol catalogue; returns the exit status.
pub(super) fn symbols(options: &CommonArgs) -> u8 {
    let printer = Printer::new(options);
    if options.format == MessageFormat::Text {
        printer.line(&format!("{:<10} {:<34} chosen when", "code", "marks"));
    }
    for s in symbol::ALL {
        printer.line(&format!("{:<10} {:<34} {}", s.code, s.marks, s.chosen_when));
        printer.object(&serde_json::json!({
            "severity": "result", "code": s.code, "marks": s.marks, "chosen_when": s.chosen_when,
        }));
    }
    DONE
}
