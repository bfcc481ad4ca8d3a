//! The program `homocline`.

use std::process::ExitCode;

fn main() -> ExitCode {
    homocline::cli::main()
}
