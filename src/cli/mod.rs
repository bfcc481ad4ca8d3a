//! The program: parse, check, run, report. The only floor that prints.

mod args;
mod check;
mod explain;
mod messages;
mod progress;
mod run;
mod symbols;

pub use args::Cli;

use args::{Command, CommonArgs};
use clap::Parser;
use messages::Printer;
use std::process::ExitCode;

/// Done.
const DONE: u8 = 0;
/// Done, with findings (`run --strict`, `check`).
const FINDINGS: u8 = 1;
/// Could not run; nothing was written.
const STOPPED: u8 = 2;

/// Runs the program with the process's own arguments.
pub fn main() -> ExitCode {
    let cli = Cli::parse(); // exits with status 2 on a wrong command line, 0 for --help
    let options = match &cli.command {
        Command::Run(a) | Command::Check(a) => &a.common,
        Command::Symbols(common) => common,
        Command::Explain(a) => &a.common,
    };
    let printer = Printer::new(options);
    if let Err(message) = set_threads(options) {
        printer.error(&message);
        return ExitCode::from(STOPPED);
    }
    ExitCode::from(match &cli.command {
        Command::Run(args) => run::run(args, &printer),
        Command::Check(args) => check::check(args, &printer),
        Command::Symbols(common) => symbols::symbols(common),
        Command::Explain(args) => explain::explain(args),
    })
}

fn set_threads(options: &CommonArgs) -> Result<(), String> {
    let Some(threads) = options.threads else { return Ok(()) };
    rayon::ThreadPoolBuilder::new()
        .num_threads(threads.into())
        .build_global()
        .map_err(|cause| format!("--threads {threads}: {cause}"))
}
