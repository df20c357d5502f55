//! A commented frame file to start from.

mod sections;

use super::{MAX_BAYS, MAX_STOREYS};
use crate::units::{self, Dimension, ReportUnits, UnitError};
use thiserror::Error;

/// What the template is to hold. Quantities are texts as the user typed them and are written as typed.
#[derive(Debug, Clone, PartialEq)]
pub struct TemplateOptions {
    /// What the frame is called.
    pub title: String,
    /// Units of the reports and of the sizes that the template proposes.
    pub units: ReportUnits,
    /// Number of storeys.
    pub storeys: usize,
    /// Number of bays.
    pub bays: usize,
    /// One storey height for all, or one for each storey from the ground up.
    pub storey_height: Vec<String>,
    /// Height of the lowest storey where it differs; only beside a single `storey_height`.
    pub first_storey_height: Option<String>,
    /// One bay width for all, or one for each bay from the left.
    pub bay_width: Vec<String>,
    /// The lateral forces.
    pub load: TemplateLoad,
    /// Whether sizes are known: then the file proposes members, else ranges.
    pub sizes_known: bool,
    /// Whether the first line points editors to `frame.schema.json` beside the file.
    pub schema_line: bool,
}

/// Lateral forces of a template.
#[derive(Debug, Clone, PartialEq)]
pub enum TemplateLoad {
    /// A force for each floor from the lowest.
    Floors(Vec<String>),
    /// A base shear and how it is shared out.
    BaseShear {
        /// The base shear.
        shear: String,
        /// How it is shared out.
        shape: TemplateShape,
    },
}

/// How a base shear is shared out over the height.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum TemplateShape {
    /// The same force at every floor.
    Uniform,
    /// Proportional to the floor's height above ground.
    Triangular,
    /// Proportional to that height to a power, 0 to 10.
    Power(f64),
}

/// Options that make no frame.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum TemplateFault {
    /// A text that is no quantity of the wanted kind.
    #[error("{what}: {error}")]
    Quantity {
        /// Which option.
        what: &'static str,
        /// What is wrong.
        error: UnitError,
    },
    /// A quantity that must be more than 0.
    #[error("{what}: `{typed}` is given, but it must be more than 0")]
    NotPositive {
        /// Which option.
        what: &'static str,
        /// What was typed.
        typed: String,
    },
    /// A number of storeys or bays that is not allowed.
    #[error("{found} {what} are asked for; 1 to {most} are allowed")]
    Number {
        /// `storeys` or `bays`.
        what: &'static str,
        /// How many are asked for.
        found: usize,
        /// How many are allowed.
        most: usize,
    },
    /// A list that is neither one value nor one for each storey or bay.
    #[error("{what}: {found} values are given; give one for all, or {needed}")]
    Count {
        /// Which option.
        what: &'static str,
        /// Values given.
        found: usize,
        /// Values needed.
        needed: usize,
    },
    /// A first storey height beside a list of all heights.
    #[error("a first storey height is given beside a list of all storey heights: keep one of them")]
    FirstTwice,
    /// The file would be at fault for another reason, such as forces that do not push to the right.
    #[error("{message}; {help}")]
    File {
        /// What is wrong.
        message: String,
        /// How to mend it.
        help: String,
    },
}

impl TemplateFault {
    /// How to mend it, where the message does not say so.
    pub fn help(&self) -> Option<String> {
        match self {
            Self::Quantity { error, .. } => Some(error.help()),
            _ => None,
        }
    }
}

impl TemplateOptions {
    /// Eight storeys, three bays and a triangular base shear, sizes known, in usual numbers of `units`.
    pub fn new(units: ReportUnits) -> Self {
        let [height, first, width, shear] = match units {
            ReportUnits::Metric => ["3.9 m", "4.8 m", "7.2 m", "500 kN"],
            ReportUnits::Us => ["13 ft", "16 ft", "24 ft", "110 kip"],
        };
        Self {
            title: "New frame".into(),
            units,
            storeys: 8,
            bays: 3,
            storey_height: vec![height.into()],
            first_storey_height: Some(first.into()),
            bay_width: vec![width.into()],
            load: TemplateLoad::BaseShear { shear: shear.into(), shape: TemplateShape::Triangular },
            sizes_known: true,
            schema_line: false,
        }
    }
}

/// Writes the frame file. What is returned is always a valid file.
///
/// # Errors
/// [`TemplateFault`] for options that make no frame.
pub fn write(options: &TemplateOptions) -> Result<String, TemplateFault> {
    check(options)?;
    let text = sections::text(options);
    match super::file::parse(&text) {
        Ok(_) => Ok(text),
        Err(fault) => Err(TemplateFault::File { message: fault.to_string(), help: fault.help() }),
    }
}

fn check(options: &TemplateOptions) -> Result<(), TemplateFault> {
    for (what, found, most) in [("storeys", options.storeys, MAX_STOREYS), ("bays", options.bays, MAX_BAYS)] {
        if !(1..=most).contains(&found) {
            return Err(TemplateFault::Number { what, found, most });
        }
    }
    one_or_each("storey height", &options.storey_height, options.storeys)?;
    one_or_each("bay width", &options.bay_width, options.bays)?;
    if options.first_storey_height.is_some() && options.storey_height.len() > 1 {
        return Err(TemplateFault::FirstTwice);
    }
    for height in options.storey_height.iter().chain(&options.first_storey_height) {
        positive("storey height", height, Dimension::Length)?;
    }
    options.bay_width.iter().try_for_each(|width| positive("bay width", width, Dimension::Length))?;
    match &options.load {
        TemplateLoad::BaseShear { shear, .. } => positive("base shear", shear, Dimension::Force),
        TemplateLoad::Floors(forces) => {
            if forces.len() != options.storeys {
                let (found, needed) = (forces.len(), options.storeys);
                return Err(TemplateFault::Count { what: "floor forces", found, needed });
            }
            forces.iter().try_for_each(|force| quantity("floor force", force, Dimension::Force).map(|_| ()))
        }
    }
}

fn one_or_each(what: &'static str, values: &[String], needed: usize) -> Result<(), TemplateFault> {
    let found = values.len();
    if found == 1 || found == needed { Ok(()) } else { Err(TemplateFault::Count { what, found, needed }) }
}

fn quantity(what: &'static str, typed: &str, wanted: Dimension) -> Result<f64, TemplateFault> {
    units::parse(typed, wanted).map_err(|error| TemplateFault::Quantity { what, error })
}

fn positive(what: &'static str, typed: &str, wanted: Dimension) -> Result<(), TemplateFault> {
    if quantity(what, typed, wanted)? > 0.0 {
        return Ok(());
    }
    Err(TemplateFault::NotPositive { what, typed: typed.into() })
}

#[cfg(test)]
mod tests;
