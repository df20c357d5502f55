//! What can be wrong with the parts of a frame, apart from the way they are written.

use super::{Feet, FrameParts, MAX_BAYS, MAX_STOREYS, Section, TALL_STOREY, bay_name, line_name};
use thiserror::Error;

/// Parts that make no frame. Storeys and floors count from 1.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum FrameFault {
    /// The frame has no bay.
    #[error("the frame has no bays")]
    NoBays,
    /// The frame has no storey.
    #[error("the frame has no storeys")]
    NoStoreys,
    /// More bays than [`MAX_BAYS`].
    #[error("the frame has {0} bays; at most {MAX_BAYS} are allowed")]
    TooManyBays(usize),
    /// More storeys than [`MAX_STOREYS`].
    #[error("the frame has {0} storeys; at most {MAX_STOREYS} are allowed")]
    TooManyStoreys(usize),
    /// A list has another length than the grid asks for.
    #[error("{what}: {found} given where the grid asks for {needed}")]
    Count {
        /// What the list holds.
        what: &'static str,
        /// Entries found.
        found: usize,
        /// Entries needed.
        needed: usize,
    },
    /// A number that must be positive and finite is not.
    #[error("{what} is {value}, but must be a positive finite number")]
    NotPositive {
        /// What the number is, with its place.
        what: String,
        /// The number, in N and m.
        value: f64,
    },
    /// A number that may be 0 or more is negative.
    #[error("{what} is {value}, but must not be negative")]
    Negative {
        /// What the number is, with its place.
        what: String,
        /// The number, in N and m.
        value: f64,
    },
    /// A number that must be finite is not.
    #[error("{what} is {value}, but must be a finite number")]
    NotFinite {
        /// What the number is, with its place.
        what: String,
        /// The number, in N and m.
        value: f64,
    },
    /// No floor carries a lateral force.
    #[error("the frame carries no lateral load")]
    NoLoad,
    /// The forces at and above a storey do not add up to a push to the right.
    #[error("the shear of storey {storey} is {:.4} kN; every storey shear must be positive", shear / 1e3)]
    StoreyShear {
        /// The storey, from 1.
        storey: usize,
        /// Its shear, N.
        shear: f64,
    },
}

/// Something that is allowed but looks like a slip. Storeys count from 1.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum FrameWarning {
    /// A storey of unusual height.
    #[error(
        "storey {storey} is {height:.2} m high; storeys over {TALL_STOREY} m are unusual: check the number and its unit"
    )]
    TallStorey {
        /// The storey, from 1.
        storey: usize,
        /// Its height, m.
        height: f64,
    },
    /// Some columns have an area and some have none, so areas are not used.
    #[error(
        "the column of storey {storey} on line {line} has no area although other columns have one: axial strain of columns is then left out, and the cantilever method takes all areas as equal; give every column an area, or none"
    )]
    SomeAreas {
        /// The first storey with such a column, from 1.
        storey: usize,
        /// Its line.
        line: String,
    },
}

impl super::Frame {
    /// Looks for values that are allowed but unusual.
    pub fn warnings(&self) -> Vec<FrameWarning> {
        let parts = self.parts();
        let tall = parts.storeys.iter().enumerate().filter(|(_, height)| **height > TALL_STOREY);
        let mut warnings: Vec<_> =
            tall.map(|(storey, height)| FrameWarning::TallStorey { storey: storey + 1, height: *height }).collect();
        let without = parts.columns.iter().position(|column| column.area.is_none());
        if let Some(index) = without.filter(|_| parts.columns.iter().any(|column| column.area.is_some())) {
            let (storey, line) = (index / self.lines() + 1, line_name(index % self.lines()));
            warnings.push(FrameWarning::SomeAreas { storey, line });
        }
        warnings
    }
}

/// Checks all that can be checked number by number and list by list.
pub(super) fn check(parts: &FrameParts) -> Result<(), FrameFault> {
    let (storeys, bays) = (parts.storeys.len(), parts.bays.len());
    match (storeys, bays) {
        (_, 0) => return Err(FrameFault::NoBays),
        (0, _) => return Err(FrameFault::NoStoreys),
        (_, n) if n > MAX_BAYS => return Err(FrameFault::TooManyBays(n)),
        (n, _) if n > MAX_STOREYS => return Err(FrameFault::TooManyStoreys(n)),
        _ => {}
    }
    count("columns", parts.columns.len(), storeys * (bays + 1))?;
    count("beams", parts.beams.len(), storeys * bays)?;
    count("lateral forces", parts.lateral.len(), storeys)?;
    positive(parts.modulus, || "the modulus of elasticity".into())?;
    for (bay, width) in parts.bays.iter().enumerate() {
        positive(*width, || format!("the width of bay {}", bay_name(bay)))?;
    }
    for (storey, height) in parts.storeys.iter().enumerate() {
        positive(*height, || format!("the height of storey {}", storey + 1))?;
    }
    check_members(parts)?;
    check_feet(&parts.feet, bays + 1)?;
    check_forces(&parts.lateral)
}

fn check_members(parts: &FrameParts) -> Result<(), FrameFault> {
    let lines = parts.bays.len() + 1;
    for (index, column) in parts.columns.iter().enumerate() {
        let place = || format!("the column of storey {} on line {}", index / lines + 1, line_name(index % lines));
        positive(column.inertia, || format!("the inertia of {}", place()))?;
        check_area(column, place)?;
    }
    for (index, beam) in parts.beams.iter().enumerate() {
        let bays = parts.bays.len();
        let what =
            || format!("the inertia of the beam of floor {} in bay {}", index / bays + 1, bay_name(index % bays));
        not_negative(beam.inertia, what)?;
    }
    Ok(())
}

fn check_area(column: &Section, place: impl Fn() -> String) -> Result<(), FrameFault> {
    column.area.map_or(Ok(()), |area| positive(area, || format!("the area of {}", place())))
}

fn check_feet(feet: &Feet, lines: usize) -> Result<(), FrameFault> {
    let Feet::Springs(springs) = feet else { return Ok(()) };
    count("foot springs", springs.len(), lines)?;
    let mut springs = springs.iter().enumerate();
    springs.try_for_each(|(line, spring)| positive(*spring, || format!("the foot spring of line {}", line_name(line))))
}

fn check_forces(lateral: &[f64]) -> Result<(), FrameFault> {
    for (floor, force) in lateral.iter().enumerate() {
        finite(*force, || format!("the lateral force at floor {}", floor + 1))?;
    }
    if lateral.iter().all(|force| *force == 0.0) { Err(FrameFault::NoLoad) } else { Ok(()) }
}

fn count(what: &'static str, found: usize, needed: usize) -> Result<(), FrameFault> {
    if found == needed { Ok(()) } else { Err(FrameFault::Count { what, found, needed }) }
}

fn finite(value: f64, what: impl FnOnce() -> String) -> Result<(), FrameFault> {
    if value.is_finite() { Ok(()) } else { Err(FrameFault::NotFinite { what: what(), value }) }
}

fn not_negative(value: f64, what: impl Fn() -> String) -> Result<(), FrameFault> {
    finite(value, &what)?;
    if value >= 0.0 { Ok(()) } else { Err(FrameFault::Negative { what: what(), value }) }
}

fn positive(value: f64, what: impl FnOnce() -> String) -> Result<(), FrameFault> {
    if value > 0.0 && value.is_finite() { Ok(()) } else { Err(FrameFault::NotPositive { what: what(), value }) }
}
