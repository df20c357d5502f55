//! What is allowed in a frame file but looks like a slip.

use super::grid::Grid;
use super::position::position;
use super::source::Source;
use crate::frame::{Frame, FrameWarning, TALL_STOREY, bay_name};
use std::ops::Range;
use thiserror::Error;

/// Something allowed but unusual, and where it stands.
#[derive(Debug, Clone, PartialEq, Error)]
#[error("{kind}")]
pub struct FileWarning {
    /// What is unusual.
    pub kind: WarningKind,
    /// Bytes of the text it speaks of.
    pub span: Range<usize>,
    /// The key in words; empty where it belongs to no key.
    pub key: String,
}

impl FileWarning {
    pub(super) fn new(kind: WarningKind, span: Range<usize>) -> Self {
        Self { kind, span, key: String::new() }
    }

    /// Line and column in `text`, the text that was read, where the warning belongs: both from 1, the column in
    /// characters, `\r\n` being one line break.
    pub fn position(&self, text: &str) -> (usize, usize) {
        position(text, self.span.start)
    }

    /// What to look at.
    pub fn help(&self) -> &'static str {
        match self.kind {
            WarningKind::Unusual { .. } => "check the number and its unit",
            WarningKind::Overridden { .. } => "take the table out, or put it after the tables that replace it",
            WarningKind::SelectsNothing { .. } => {
                "two lines have no interior line, and one or two bays no interior bay: take the table out"
            }
            WarningKind::Dropped { key, .. } => match key {
                "stiffness_factor" => {
                    "a later table replaces the whole size: repeat stiffness_factor in it, or write stiffness_factor = 1 if that is meant"
                }
                "end_spring" => {
                    "a later table replaces the whole size: repeat end_spring in it, or write end_spring = \"rigid\" if that is meant"
                }
                _ => "a later table replaces the whole size: repeat the key in it, or take it out of the earlier table",
            },
            WarningKind::Growing => {
                "members usually get smaller up the height: write a ratio of 1 or less unless this is meant"
            }
            WarningKind::Frame(FrameWarning::SomeAreas { .. }) => "add area to the tables of columns that have none",
            WarningKind::Frame(_) => "check the numbers of the frame",
        }
    }
}

/// What looks like a slip.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum WarningKind {
    /// A quantity outside the usual range.
    #[error("{what} is `{typed}`; {usual} is usual")]
    Unusual {
        /// The quantity.
        what: String,
        /// What was typed.
        typed: String,
        /// The usual range.
        usual: &'static str,
    },
    /// A table all of whose members get their size from later tables.
    #[error("this table has no effect: later tables replace the size of all {members} it selects")]
    Overridden {
        /// `columns` or `beams`.
        members: &'static str,
    },
    /// A table that selects no member.
    #[error("this table selects no {members}: the frame has none of those it names")]
    SelectsNothing {
        /// `columns` or `beams`.
        members: &'static str,
    },
    /// A stiffness factor, shear area or end spring that a later table drops by not repeating it.
    #[error("this table states no {key}, so its members {instead}, but the table it replaces has {key} {earlier}")]
    Dropped {
        /// The key.
        key: &'static str,
        /// What the members do without it.
        instead: &'static str,
        /// The value in the replaced table, as typed.
        earlier: String,
    },
    /// Sizes that grow upward.
    #[error("a taper above 1 makes members larger from each tier to the one above")]
    Growing,
    /// A warning of the frame itself.
    #[error(transparent)]
    Frame(#[from] FrameWarning),
}

/// Usual range of a length, m, and its words. Common practice.
struct Usual {
    low: f64,
    high: f64,
    words: &'static str,
}

const HEIGHT: Usual = Usual { low: 2.0, high: TALL_STOREY, words: "2 to 15 m (7 to 49 ft)" };
const WIDTH: Usual = Usual { low: 1.5, high: 40.0, words: "1.5 to 40 m (5 to 131 ft)" };
pub(super) const SIDE: UsualSide = UsualSide;

/// Usual sides of a solid rectangle. Common practice.
#[derive(Debug, Clone, Copy)]
pub(super) struct UsualSide;

impl UsualSide {
    /// A warning where `length` (m) is no usual side.
    pub fn check(self, length: f64, what: &str, source: Source, span: Range<usize>) -> Option<FileWarning> {
        let usual = Usual { low: 0.05, high: 5.0, words: "50 mm to 5 m (2 in to 16 ft)" };
        unusual(length, &usual, || what.into(), source, span)
    }
}

/// Heights and widths outside the usual, once for each place in the text.
pub(super) fn lengths(source: Source, grid: &Grid) -> Vec<FileWarning> {
    let storeys = (&grid.storeys, HEIGHT, "height");
    let bays = (&grid.bays, WIDTH, "width");
    let mut found: Vec<FileWarning> = Vec::new();
    for (row, usual, name) in [bays, storeys] {
        for (index, (length, span)) in row.lengths.iter().zip(&row.spans).enumerate() {
            if found.iter().any(|warning| warning.span == *span) {
                continue;
            }
            let what = || match name {
                "height" => format!("the height of storey {}", index + 1),
                _ => format!("the width of bay {}", bay_name(index)),
            };
            found.extend(unusual(*length, &usual, what, source, span.clone()));
        }
    }
    found
}

/// A modulus outside that of timber, concrete and steel, the usual slip being MPa for GPa.
pub(super) fn modulus(source: Source, value: f64, span: Range<usize>) -> Option<FileWarning> {
    let usual = Usual { low: 5e9, high: 2.5e11, words: "5 to 250 GPa (730 to 36000 ksi)" };
    unusual(value, &usual, || "the modulus of elasticity".into(), source, span)
}

/// A shear modulus that does not go with the modulus of elasticity, the usual slip being MPa for GPa. Isotropic materials
/// have E/3 to E/2, timber about E/16 (common practice).
pub(super) fn shear_modulus(source: Source, value: f64, modulus: f64, span: Range<usize>) -> Option<FileWarning> {
    let words = "a third to a half of the modulus of elasticity, for timber about a sixteenth,";
    let usual = Usual { low: modulus / 25.0, high: modulus / 1.99, words };
    unusual(value, &usual, || "the shear modulus".into(), source, span)
}

fn unusual(
    value: f64,
    usual: &Usual,
    what: impl FnOnce() -> String,
    source: Source,
    span: Range<usize>,
) -> Option<FileWarning> {
    if (usual.low..=usual.high).contains(&value) {
        return None;
    }
    let kind = WarningKind::Unusual { what: what(), typed: source.typed(span.clone()), usual: usual.words };
    Some(FileWarning::new(kind, span))
}

/// Warnings of the frame itself that are not told by a place above.
pub(super) fn of_frame(frame: &Frame, columns: Range<usize>) -> Vec<FileWarning> {
    let told = |warning: &FrameWarning| matches!(warning, FrameWarning::TallStorey { .. });
    let rest = frame.warnings().into_iter().filter(|warning| !told(warning));
    rest.map(|warning| FileWarning::new(WarningKind::Frame(warning), columns.clone())).collect()
}
