//! Prints tables of the kernel beside general-purpose linear algebra; see the package's front page.

use clap::Parser;
use clap::builder::PossibleValuesParser;
use peers::Failed;
use peers::agreement::{Agreement, check};
use peers::frames::Shape;
use peers::lapack::Lapack;
use peers::machine;
use peers::parts::{PARTS, SHAPES, Setting};
use peers::timing::Effort;
use std::process::ExitCode;

/// Swaybound's batch kernel beside general-purpose linear algebra
#[derive(Parser)]
struct Options {
    /// Measure these parts only
    #[arg(long, value_name = "PART", value_delimiter = ',', value_parser = parts())]
    only: Vec<String>,
    /// Measure roughly: few and short rounds
    #[arg(long)]
    quick: bool,
    /// Number of rounds
    #[arg(long, value_parser = clap::value_parser!(u16).range(1..))]
    rounds: Option<u16>,
    /// Given by `cargo bench`
    #[arg(long, hide = true)]
    bench: bool,
}

fn parts() -> PossibleValuesParser {
    PARTS.iter().map(|part| part.name).collect::<Vec<_>>().into()
}

fn main() -> ExitCode {
    match run(&Options::parse()) {
        Ok(()) => ExitCode::SUCCESS,
        Err(failed) => {
            eprintln!("error: {failed}");
            ExitCode::FAILURE
        }
    }
}

fn run(options: &Options) -> Result<(), Failed> {
    let (rounds, turn) = if options.quick { (7, 1e-3) } else { (31, 5e-3) };
    let effort = Effort { rounds: options.rounds.map_or(rounds, usize::from), turn };
    let setting = Setting { lapack: Lapack::open(), effort };
    head(options, &setting);
    agree(&setting)?;
    let wanted = |name: &str| options.only.is_empty() || options.only.iter().any(|only| only == name);
    for part in PARTS.iter().filter(|part| wanted(part.name)) {
        for table in (part.run)(&setting)? {
            println!("{table}");
        }
    }
    Ok(())
}

fn head(options: &Options, setting: &Setting) {
    let arguments: Vec<_> = std::env::args().skip(1).filter(|argument| argument != "--bench").collect();
    let effort = setting.effort;
    let separator = if arguments.is_empty() { "" } else { " -- " };
    println!("Command: `cargo bench -p peers{separator}{}`", arguments.join(" "));
    println!("Machine: {}", machine::describe());
    println!("{}", machine::lapack(setting.lapack.as_ref()));
    let turn = 1e3 * effort.turn;
    println!("{} rounds, in each a turn of at least {turn} ms for every contestant; thread CPU time.", effort.rounds);
    if options.quick {
        println!("Quick: for a rough look, not for quoting.");
    }
}

/// Nothing is timed before all agree.
fn agree(setting: &Setting) -> Result<(), Failed> {
    eprintln!("agreement with the exact analyses");
    let odd = [(1, 1), (2, 1), (1, 2), (2, 2), (7, 3), (12, 4), (20, 2)].map(|(bays, storeys)| Shape { bays, storeys });
    let shapes: Vec<_> = odd.into_iter().chain(SHAPES).collect();
    let Agreement { frames, worst } = check(setting.lapack.as_ref(), &shapes, 12)?;
    let worst: Vec<_> = worst.iter().map(|(who, worst)| format!("{} {worst:.0e}", who.name())).collect();
    println!(
        "Largest difference from the exact analyses over the frame's largest moment, {frames} frames: {}.\n",
        worst.join(", ")
    );
    Ok(())
}
