//! The feet as checked.

use super::fault::{FaultKind, FileFault};
use super::scalar::{Table, TextOr};
use super::source::{Source, require};
use super::written::{FeetWritten, Maybe};
use crate::frame::Feet;
use crate::units::Dimension;
use std::ops::Range;

/// How the feet are held, as typed, and where a spring in N m/rad stands.
#[derive(Debug)]
pub(super) struct CheckedFeet {
    pub feet: Feet,
    pub typed: String,
    pub fixity: Option<Range<usize>>,
}

impl CheckedFeet {
    fn new(feet: Feet, typed: impl Into<String>, fixity: Option<Range<usize>>) -> Self {
        Self { feet, typed: typed.into(), fixity }
    }

    /// Place of a spring that is stated in units.
    pub fn spring(&self) -> Option<Range<usize>> {
        self.fixity.clone().filter(|_| matches!(self.feet, Feet::Springs(_)))
    }
}

const SPRING: Option<&str> = Some("{ spring = \"150 MN m/rad\" }");

/// Checks `[feet]`; without it the feet are fixed.
pub(super) fn feet(
    source: Source,
    written: &Maybe<Table<FeetWritten>>,
    lines: usize,
) -> Result<CheckedFeet, FileFault> {
    let Some(table) = written else { return Ok(CheckedFeet::new(Feet::Fixed, "fixed (default)", None)) };
    let help = "write fixity = \"fixed\", fixity = \"pinned\" or fixity = { spring = \"150 MN m/rad\" }";
    let fixity = require(&table.get_ref().fixity, table.span(), "the fixity of the feet", help)?;
    let span = Some(fixity.span());
    match fixity.get_ref() {
        TextOr::Text(word) => {
            let feet = match source.choice(word, fixity.span(), &["fixed", "pinned"], SPRING)? {
                0 => Feet::Fixed,
                _ => Feet::Pinned,
            };
            Ok(CheckedFeet::new(feet, word, span))
        }
        TextOr::Table(table) => {
            let spring = require(&table.spring, fixity.span(), "the spring", help)?;
            let stiffness = source.quantity(spring, Dimension::RotationalStiffness)?;
            if stiffness <= 0.0 {
                let help = "a foot that turns freely takes fixity = \"pinned\"";
                return Err(source.out_of_range(spring.span(), "a foot spring must be more than 0", help));
            }
            let typed = format!("spring {} under each column", source.typed(spring.span()));
            Ok(CheckedFeet::new(Feet::Springs(vec![stiffness; lines]), typed, span))
        }
    }
}

/// Refuses feet stated both in `[feet]` and as `sizes.foot_spring`.
pub(super) fn one_statement(feet: &CheckedFeet, ratio: Range<usize>) -> Result<(), FileFault> {
    let Some(fixity) = feet.fixity.clone() else { return Ok(()) };
    let kind = FaultKind::Conflict {
        first: "feet.fixity",
        second: "sizes.foot_spring",
        help: "both say how the feet are held: keep one of them",
    };
    Err(FileFault::new(kind, ratio).beside(fixity, "given here"))
}
