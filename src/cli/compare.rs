//! `swaybound compare`: the quick methods beside the exact answer of one frame.

use super::failure::Failure;
use super::{Common, Format, complain, interrupt, output, report};
use clap::{Args, ValueEnum};
use std::iter::once;
use std::path::{Path, PathBuf};
use std::process::ExitCode;
use std::time::{Instant, SystemTime};
use swaybound::approx::METHODS;
use swaybound::compare::verdict::Subject;
use swaybound::compare::{Comparison, ExactChoice, Options, compare};
use swaybound::frame::file::{FrameFile, parse};
use swaybound::report::compare::{Findings, brief, tables};
use swaybound::report::{Dataset, Input, Record, Run, command_line, csv, json, text};
use swaybound::store::{ReportPlace, read_text};

/// Run the quick methods beside the exact analysis of one frame and state every error
#[derive(Debug, Args)]
#[command(after_help = super::CAUTION)]
pub(super) struct CompareArgs {
    /// The frame file (TOML)
    frame: PathBuf,
    /// How far a value may be off before a method does not suffice, percent of the storey's largest exact value
    #[arg(long, value_name = "PERCENT", default_value = "20", value_parser = tolerance)]
    tolerance: f64,
    /// The exact analysis that errors are measured by
    #[arg(long, value_enum, default_value_t = Exact::Auto)]
    exact: Exact,
    /// The quick methods to run, by name as in the files, such as portal,factor [default: all that apply]
    #[arg(long, value_name = "METHODS", value_delimiter = ',', value_parser = method)]
    methods: Vec<&'static str>,
    /// Exit with 1 where no quick method meets the tolerance for column design moments
    #[arg(long)]
    require: bool,
    /// Write the charts as PNG too
    #[arg(long)]
    png: bool,
    #[command(flatten)]
    common: Common,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
enum Exact {
    /// Second order where gravity is given, else with column axial strain where columns have areas
    Auto,
    /// Inextensible members
    SlopeDeflection,
    /// With column axial strain
    Stiffness,
}

impl Exact {
    fn choice(self) -> ExactChoice {
        match self {
            Self::Auto => ExactChoice::Automatic,
            Self::SlopeDeflection => ExactChoice::SlopeDeflection,
            Self::Stiffness => ExactChoice::Stiffness,
        }
    }

    fn name(self) -> &'static str {
        match self {
            Self::Auto => "auto",
            Self::SlopeDeflection => "slope-deflection",
            Self::Stiffness => "stiffness",
        }
    }
}

fn tolerance(text: &str) -> Result<f64, String> {
    let number = text.trim().trim_end_matches('%').trim_end();
    match number.parse::<f64>() {
        Ok(value) if value > 0.0 && value < 100.0 => Ok(value),
        _ => Err("give a percentage over 0 and under 100, such as 20 or 20%".into()),
    }
}

fn method(text: &str) -> Result<&'static str, String> {
    let names = || METHODS.iter().map(|entry| entry.info.id);
    names()
        .find(|name| *name == text.trim())
        .ok_or_else(|| format!("the quick methods are {}", names().collect::<Vec<_>>().join(", ")))
}

/// Runs the command.
pub(super) fn run(args: &CompareArgs) -> Result<ExitCode, Failure> {
    interrupt::listen(args.common.quiet);
    let (start, clock) = (SystemTime::now(), Instant::now());
    let text = read_text(&args.frame)?;
    let file = read_frame(args, &text)?;
    let place = args.common.out.clone().unwrap_or_else(|| output::usual_place(&args.frame, "compare"));
    let judged = judge(args, &place)?;
    let options = Options { tolerance: args.tolerance, exact: args.exact.choice(), methods: args.methods.clone() };
    let unsolvable = |fault| Failure::Unsolvable { fault, path: args.frame.clone() };
    let comparison = compare(&file.frame, &file.options, options).map_err(unsolvable)?;
    let warnings: Vec<_> = comparison.warnings(&file.frame).iter().map(ToString::to_string).collect();
    if !args.common.quiet {
        warn(args, &file, &text, &warnings);
    }
    let findings = Findings { file: &file, comparison: &comparison, warnings: &warnings };
    let record = record(args, &text, &findings);
    let tables = tables(&file.frame, &comparison);
    let host = format!("{} {}", std::env::consts::OS, std::env::consts::ARCH);
    let dataset = Dataset::new(record, Run::new(start, clock.elapsed(), 1, host), tables)?;
    report::write(&judged, &findings, &dataset, &args.common, args.png)?;
    if !args.common.quiet {
        output::note(&format!("report: {}", place.join("report.html").display()));
    }
    output::results(&standard_output(args.common.format, &findings, &dataset)?)?;
    let met = comparison.some_method_meets(Subject::ColumnMoments);
    Ok(if args.require && !met { ExitCode::from(1) } else { ExitCode::SUCCESS })
}

/// Judges the place of the report before anything is computed.
fn judge(args: &CompareArgs, place: &Path) -> Result<ReportPlace, Failure> {
    let _held_off = interrupt::HoldOff::begin();
    let judged = ReportPlace::judge(place, &args.frame)?;
    interrupt::check()?;
    Ok(judged)
}

fn read_frame(args: &CompareArgs, text: &str) -> Result<FrameFile, Failure> {
    let fault = |fault| Failure::File { fault: Box::new(fault), path: args.frame.clone(), text: text.into() };
    let file = parse(text).map_err(fault)?;
    Ok(match args.common.units {
        Some(units) => FrameFile { frame: file.frame.with_report_units(units.into()), ..file },
        None => file,
    })
}

fn warn(args: &CompareArgs, file: &FrameFile, text: &str, warnings: &[String]) {
    let path = args.frame.display().to_string();
    for warning in &file.warnings {
        output::note(&complain::render_warning(warning, &path, text, true));
    }
    for warning in warnings {
        output::note(&complain::plain_warning(&format!("{path}: {warning}")));
    }
}

fn record(args: &CompareArgs, text: &str, findings: &Findings) -> Record {
    let words = once("swaybound".to_string())
        .chain(std::env::args_os().skip(1).map(|word| word.to_string_lossy().into_owned()));
    let frame = findings.frame();
    let comparison: &Comparison = findings.comparison;
    Record::new("compare", command_line(words))
        .with_input(Input::new(args.frame.display().to_string(), text))
        .with_option("tolerance_percent", args.tolerance)
        .with_option("exact", args.exact.name())
        .with_option("methods", if args.methods.is_empty() { "all".into() } else { args.methods.join(",") })
        .with_option("units", frame.report_units().name())
        .with_option("require", args.require)
        .with_count("storeys", frame.storeys())
        .with_count("bays", frame.bays())
        .with_count("methods", comparison.responses().count())
}

fn standard_output(format: Format, findings: &Findings, dataset: &Dataset) -> Result<String, Failure> {
    Ok(match format {
        Format::Text => text::write(&brief(findings), text::Options { colour: true, ..text::Options::default() }),
        Format::Csv => dataset.table("values").map(csv::write).transpose()?.unwrap_or_default(),
        Format::Json => json::write(dataset)?,
    })
}
