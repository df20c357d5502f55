//! The frame file: from text to a checked [`Frame`].
//!
//! [`parse`] reads the text in two steps: as it is written (serde, every value with its place in the text) and as it is
//! checked (numbers in N, m, rad and a valid frame). A [`FileFault`] names the place, the key and the remedy.

mod assemble;
mod fault;
mod feet;
mod gravity;
mod grid;
mod help;
mod joints;
mod lateral;
mod locate;
mod material;
mod members;
mod model;
mod owners;
mod position;
mod scalar;
mod schema;
mod select;
mod size;
mod sized;
mod source;
mod translate;
mod warning;
mod written;

pub use fault::{FaultKind, FileFault};
pub use schema::schema;
pub use select::SelectError;
pub use warning::{FileWarning, WarningKind};

use super::Frame;
use super::options::AnalysisOptions;
use super::sizes::{SizeModel, Within};
use locate::Keys;

/// A frame read from a file, with what reports tell about the file.
#[derive(Debug, Clone, PartialEq)]
pub struct FrameFile {
    /// The frame; with unknown sizes, of the assumed ones.
    pub frame: Frame,
    /// What the user typed, in reading order.
    pub echo: Vec<Echo>,
    /// Whether sizes are known, and how far they may vary.
    pub sizes: SizeStatement,
    /// What the exact analyses are to take into account beyond plain members.
    pub options: AnalysisOptions,
    /// What is allowed but looks like a slip.
    pub warnings: Vec<FileWarning>,
}

/// One statement of the file as the user typed it, such as bays: `7.2 m, 8.4 m, 7.2 m`.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Echo {
    /// What it states.
    pub what: String,
    /// How it was typed, defaults marked.
    pub typed: String,
}

/// What a file says about sizes.
#[derive(Debug, Clone, PartialEq)]
pub enum SizeStatement {
    /// Sizes are known.
    Stated {
        /// How far they may be off, where stated.
        within: Option<Within>,
    },
    /// Sizes are unknown and follow a model.
    Model(SizeModel),
}

/// Reads the text of a frame file.
///
/// # Errors
/// The first [`FileFault`] found: text that is no TOML before keys, keys before values, values before the frame as a
/// whole.
pub fn parse(text: &str) -> Result<FrameFile, FileFault> {
    let read = || {
        let written = written(text)?;
        assemble::assemble(source::Source(text), &written)
    };
    match read() {
        Ok(file) if file.warnings.is_empty() => Ok(file),
        Ok(mut file) => {
            let keys = Keys::read(text);
            file.warnings.sort_by_key(|warning| warning.span.start);
            file.warnings.iter_mut().for_each(|warning| warning.key = keys.name(&warning.span));
            Ok(file)
        }
        Err(fault) if matches!(*fault.kind, FaultKind::Syntax { .. }) => Err(fault),
        Err(fault) => Err(FileFault { key: Keys::read(text).name(&fault.span), ..fault }),
    }
}

fn written(text: &str) -> Result<written::Written, FileFault> {
    let fault = |error| translate::translate(&error, text);
    let document = toml::de::DeTable::parse(text).map_err(fault)?;
    if document.get_ref().is_empty() {
        return Err(FileFault::new(FaultKind::Empty, 0..0));
    }
    serde::Deserialize::deserialize(toml::Deserializer::from(document)).map_err(fault)
}

#[cfg(test)]
mod tests;
