//! The command line.

use clap::{Args, Parser, Subcommand, ValueEnum};
use std::path::PathBuf;

/// From structural readings to domains, fabric statistics and map layers whose dip symbols draw right.
///
/// Homocline reads stations (strike and dip, dip direction, trend and plunge, in the notations people write),
/// corrects their azimuths for magnetic north and grid convergence, assigns each reading to a structural
/// domain, and writes a GeoPackage with rotation fields and styles, and a summary.
#[derive(Debug, Parser)]
#[command(name = "homocline", version, max_term_width = 100)]
pub struct Cli {
    /// What to do.
    #[command(subcommand)]
    pub command: Command,
}

/// The commands.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Do the whole job: read, orient, group, summarise, write
    ///
    /// Exit status: 0 done; 1 done, but with warnings or refused rows under --strict; 2 could not run, nothing
    /// written.
    Run(RunArgs),
    /// Read and validate everything that `run` would; write nothing, list every refused row
    ///
    /// Exit status: 0 clean; 1 warnings or refused rows; 2 could not read.
    Check(RunArgs),
    /// Print the symbol catalogue: code, what it marks, when it is chosen
    Symbols(CommonArgs),
    /// Say what a statistic is: its unit, fewest readings and published source; without a name, list them all
    Explain(ExplainArgs),
}

/// What to explain.
#[derive(Debug, Args)]
pub struct ExplainArgs {
    /// Field name, for example fisher_alpha95
    pub name: Option<String>,
    /// Options of every command.
    #[command(flatten)]
    pub common: CommonArgs,
}

/// What to work on.
#[derive(Debug, Args, Default)]
pub struct RunArgs {
    /// The area file; paths in it are relative to it
    pub area: Option<PathBuf>,
    /// Station file (instead of the area file's); may be given several times
    #[arg(long, value_name = "FILE")]
    pub stations: Vec<String>,
    /// Domain polygons: FILE, or FILE:LAYER
    #[arg(long, value_name = "FILE")]
    pub polygons: Option<String>,
    /// Fault lines (kept for fault blocks and clusters, which this version cannot make yet)
    #[arg(long, value_name = "FILE")]
    pub faults: Option<String>,
    /// Grow the domains from the readings (domains.method = "clusters"; this version cannot do that yet)
    #[arg(long)]
    pub clusters: bool,
    /// Output folder [default: output.folder of the area file, beside it; else "out"]
    #[arg(long, value_name = "DIR")]
    pub out: Option<PathBuf>,
    /// Seed of every random step (same as area.seed)
    #[arg(long, value_name = "N")]
    pub seed: Option<u64>,
    /// Options of every command.
    #[command(flatten)]
    pub common: CommonArgs,
}

/// Options of every command.
#[derive(Debug, Args, Default, Clone)]
pub struct CommonArgs {
    /// Threads to use [default: one per core]; the result does not depend on it
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1024))]
    pub threads: Option<u16>,
    /// Exit with status 1 where there are warnings or refused rows
    #[arg(long)]
    pub strict: bool,
    /// Print nothing but errors
    #[arg(long, short)]
    pub quiet: bool,
    /// How to print messages
    #[arg(long, value_enum, default_value_t, value_name = "FORMAT")]
    pub format: MessageFormat,
}

/// How messages are printed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, ValueEnum)]
pub enum MessageFormat {
    /// For people
    #[default]
    Text,
    /// One JSON object per line on standard output
    Json,
}
