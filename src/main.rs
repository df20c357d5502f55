//! The `swaybound` program: reads the command line, runs the command, prints the fault, sets the exit code.

mod cli;

use std::process::ExitCode;

fn main() -> ExitCode {
    cli::run()
}
