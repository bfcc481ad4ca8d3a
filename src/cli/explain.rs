//! `homocline explain`.

use super::args::{ExplainArgs, MessageFormat};
use super::messages::Printer;
use super::{DONE, STOPPED};
use crate::fabric::{self, Statistic};

/// Prints what a statistic is, or the list of all; returns the exit status.
pub(super) fn explain(args: &ExplainArgs) -> u8 {
    let printer = Printer::new(&args.common);
    let Some(name) = &args.name else {
        fabric::ALL.iter().for_each(|s| list(s, &printer, args.common.format));
        return DONE;
    };
    match fabric::ALL.iter().find(|s| s.name == name.to_lowercase()) {
        Some(statistic) => {
            tell(statistic, &printer);
            DONE
        }
        None => {
            let likeness =
                |known: &str| if known.contains(name.as_str()) { 1.0 } else { strsim::jaro_winkler(known, name) };
            let nearest = fabric::ALL.iter().map(|s| (likeness(s.name), s.name));
            let nearest = nearest.filter(|(likeness, _)| *likeness > 0.7).max_by(|a, b| a.0.total_cmp(&b.0));
            let meant = nearest.map(|(_, n)| format!("; did you mean \"{n}\"?")).unwrap_or_default();
            printer
                .error(&format!("there is no statistic named \"{name}\"{meant} (`homocline explain` lists them all)"));
            STOPPED
        }
    }
}

fn list(s: &Statistic, printer: &Printer, format: MessageFormat) {
    match format {
        MessageFormat::Text => printer.line(&format!("{:<20} {}", s.name, s.title)),
        MessageFormat::Json => object(s, printer),
    }
}

fn tell(s: &Statistic, printer: &Printer) {
    printer.line(&format!("{} ({})", s.name, s.title));
    printer.line(s.description);
    printer.line(&format!("unit:           {}", if s.unit.is_empty() { "none" } else { s.unit }));
    printer.line(&format!("least readings: {}", s.least_n));
    printer.line(&format!("source:         {}", s.source));
    object(s, printer);
}

fn object(s: &Statistic, printer: &Printer) {
    printer.object(&serde_json::json!({
        "severity": "result", "name": s.name, "title": s.title, "unit": s.unit, "least_n": s.least_n,
        "source": s.source, "description": s.description,
    }));
}
