//! `swaybound new`: a commented frame file to start from.

use super::failure::Failure;
use super::{Units, complain, output};
use clap::Args;
use std::path::{Path, PathBuf};
use std::process::ExitCode;
use swaybound::frame::file::schema;
use swaybound::frame::template::{TemplateLoad, TemplateOptions, TemplateShape, write};
use swaybound::store::{StoreFault, read_text, write_new};
use swaybound::units::ReportUnits;

/// Name of the schema beside a frame file, as its first line gives it.
const SCHEMA: &str = "frame.schema.json";

/// Write a commented frame file to start from
#[derive(Debug, Args)]
#[command(after_help = super::CAUTION)]
pub(super) struct NewArgs {
    /// The file to write, which must not exist yet; - for standard output
    #[arg(required_unless_present = "schema")]
    frame: Option<PathBuf>,
    /// What the frame is called
    #[arg(long)]
    title: Option<String>,
    /// Number of storeys
    #[arg(long, value_name = "N")]
    storeys: Option<usize>,
    /// Number of bays
    #[arg(long, value_name = "N")]
    bays: Option<usize>,
    /// Storey height, or one for each storey from the ground up: "4.8 m,3.9 m,3.9 m"
    #[arg(long, value_name = "LENGTH", value_delimiter = ',')]
    height: Vec<String>,
    /// Height of the ground storey where it differs
    #[arg(long, value_name = "LENGTH")]
    first: Option<String>,
    /// Bay width, or one for each bay from the left
    #[arg(long, value_name = "LENGTH", value_delimiter = ',')]
    width: Vec<String>,
    /// Lateral force of each floor from the lowest: "40 kN,60 kN,80 kN"
    #[arg(long, value_name = "FORCE", value_delimiter = ',', allow_hyphen_values = true, conflicts_with_all = ["base_shear", "shape"])]
    forces: Vec<String>,
    /// Base shear, shared out over the height by --shape
    #[arg(long, value_name = "FORCE", allow_hyphen_values = true)]
    base_shear: Option<String>,
    /// How the base shear is shared out: uniform, triangular, or a power of the height such as 1.5
    #[arg(long, value_parser = shape)]
    shape: Option<TemplateShape>,
    /// Units of the reports and of the proposed sizes
    #[arg(long, value_enum, default_value = "metric")]
    units: Units,
    /// Leave the sizes unknown: the file states ranges instead of members
    #[arg(long)]
    unknown_sizes: bool,
    /// Write no schema for editors beside the file
    #[arg(long)]
    no_schema: bool,
    /// Print the JSON Schema of frame files and stop
    #[arg(long)]
    schema: bool,
}

fn shape(text: &str) -> Result<TemplateShape, String> {
    match (text, text.parse::<f64>()) {
        ("uniform", _) => Ok(TemplateShape::Uniform),
        ("triangular", _) => Ok(TemplateShape::Triangular),
        (_, Ok(power)) if (0.0..=10.0).contains(&power) => Ok(TemplateShape::Power(power)),
        _ => Err("give uniform, triangular, or a power of the height from 0 to 10".into()),
    }
}

impl NewArgs {
    fn options(&self, schema_line: bool) -> TemplateOptions {
        let usual = TemplateOptions::new(ReportUnits::from(self.units));
        let listed = |list: &Vec<String>| (list.len() > 1).then_some(list.len());
        let storeys = self.storeys.or(listed(&self.height)).or((!self.forces.is_empty()).then_some(self.forces.len()));
        let load = match (&self.base_shear, &usual.load) {
            _ if !self.forces.is_empty() => TemplateLoad::Floors(self.forces.clone()),
            (given, TemplateLoad::BaseShear { shear, shape }) => TemplateLoad::BaseShear {
                shear: given.clone().unwrap_or_else(|| shear.clone()),
                shape: self.shape.unwrap_or(*shape),
            },
            (_, other) => other.clone(),
        };
        let own = |list: &Vec<String>, usual: Vec<String>| if list.is_empty() { usual } else { list.clone() };
        let first = self.first.clone().or(usual.first_storey_height.filter(|_| self.height.is_empty()));
        TemplateOptions {
            title: self.title.clone().unwrap_or(usual.title),
            storeys: storeys.unwrap_or(usual.storeys),
            bays: self.bays.or(listed(&self.width)).unwrap_or(usual.bays),
            storey_height: own(&self.height, usual.storey_height),
            first_storey_height: first,
            bay_width: own(&self.width, usual.bay_width),
            load,
            sizes_known: !self.unknown_sizes,
            schema_line,
            ..usual
        }
    }
}

/// Runs the command.
pub(super) fn run(args: &NewArgs) -> Result<ExitCode, Failure> {
    let schema = format!("{:#}\n", schema());
    let Some(path) = args.frame.as_ref().filter(|_| !args.schema) else {
        output::results(&schema)?;
        return Ok(ExitCode::SUCCESS);
    };
    let to_stdout = path == Path::new("-");
    let with_schema = !args.no_schema && !to_stdout;
    let text = write(&args.options(with_schema))?;
    if to_stdout {
        output::results(&text)?;
        return Ok(ExitCode::SUCCESS);
    }
    write_new(path, &text)?;
    output::note(&format!("frame file: {}", path.display()));
    if with_schema {
        let beside = path.with_file_name(SCHEMA);
        match write_new(&beside, &schema) {
            Ok(()) => output::note(&format!("schema for editors: {}", beside.display())),
            Err(StoreFault::Exists { .. }) if read_text(&beside).is_ok_and(|text| text == schema) => {}
            Err(StoreFault::Exists { .. }) => output::note(&complain::plain_warning(&format!(
                "{}: exists with other content and is kept; `swaybound new --schema` prints the schema of this version",
                beside.display()
            ))),
            Err(other) => return Err(other.into()),
        }
    }
    Ok(ExitCode::SUCCESS)
}
