//! The command line: one file per command.

mod compare;
mod complain;
mod failure;
mod interrupt;
mod new;
mod output;
mod report;

use clap::{Args, Parser, Subcommand, ValueEnum};
use std::io::Write;
use std::path::PathBuf;
use std::process::ExitCode;
use swaybound::units::ReportUnits;

/// Printed under every help text.
const CAUTION: &str = "\
Exit codes: 0 done, 1 done with a finding (compare --require), 2 input at fault, 3 the frame cannot be solved, \
4 file trouble, 130 interrupted.

Linear elastic lateral analysis of plane moment frames, for preliminary sizing and for checking. It is not a design: \
gravity, torsion, connections, foundations, detailing, load combinations and drift limits remain with the licensed \
engineer and the code in force. Not for frames with walls, braces, infill, flat slabs, transfer columns or setbacks.";

/// How far a quick lateral analysis of a moment frame can be trusted.
#[derive(Debug, Parser)]
#[command(name = "swaybound", version, about, after_help = CAUTION, max_term_width = 100)]
struct Cli {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    New(new::NewArgs),
    Compare(compare::CompareArgs),
}

/// Flags that every command with a report has.
#[derive(Debug, Args)]
struct Common {
    /// Folder for the report [default: output/<file stem>/<command>, which frame files of one name share]. A report that
    /// stands there is replaced as a whole, with whatever was added to its folder
    #[arg(long, value_name = "DIR")]
    out: Option<PathBuf>,
    /// What goes to standard output
    #[arg(long, value_enum, default_value_t = Format::Text)]
    format: Format,
    /// Units of the report, instead of those the file names
    #[arg(long, value_enum)]
    units: Option<Units>,
    /// No warnings and no notes on standard error
    #[arg(long, short)]
    quiet: bool,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Format {
    /// The report for people
    Text,
    /// The main table
    Csv,
    /// Everything
    Json,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Units {
    /// kN, m, mm
    Metric,
    /// kip, ft, in
    Us,
}

impl From<Units> for ReportUnits {
    fn from(units: Units) -> Self {
        match units {
            Units::Metric => Self::Metric,
            Units::Us => Self::Us,
        }
    }
}

/// Runs the program; faults are printed to standard error here and nowhere else.
pub fn run() -> ExitCode {
    let cli = Cli::parse();
    let result = match cli.command {
        Command::New(args) => new::run(&args),
        Command::Compare(args) => compare::run(&args),
    };
    result.unwrap_or_else(|failure| {
        let mut stderr = anstream::stderr().lock();
        // Nothing can be done where even standard error cannot be written.
        drop(writeln!(stderr, "{}", failure.render().trim_end()));
        failure.exit_code()
    })
}
