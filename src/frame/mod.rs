//! The frame: a regular grid of columns and beams, its feet, material, members and lateral forces.
//!
//! A [`Frame`] is always valid: it can only be made from [`FrameParts`] that pass every check. It knows no analysis.

mod fault;
pub mod file;
mod member;
mod names;
pub mod options;
pub mod sizes;
pub mod template;

pub use fault::{FrameFault, FrameWarning};
pub use member::{Member, MemberKind};
pub use names::{bay_name, line_index, line_name};

use crate::units::ReportUnits;

/// The most storeys a frame may have.
pub const MAX_STOREYS: usize = 500;
/// The most bays a frame may have.
pub const MAX_BAYS: usize = 100;
/// Above this height over width, column axial strain counts in drifts and moments (common practice: about 2).
pub const SLENDER: f64 = 2.0;
/// A storey higher than this is taken for a slip and warned about, in m (common practice: 3 to 6 m).
pub const TALL_STOREY: f64 = 15.0;

/// How the column feet are held against rotation.
#[derive(Debug, Clone, PartialEq)]
pub enum Feet {
    /// No rotation.
    Fixed,
    /// Free rotation.
    Pinned,
    /// One rotational spring per column line, N m/rad.
    Springs(Vec<f64>),
}

/// The cross-section of one member.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Section {
    /// Second moment of area that bends in the frame's plane, stiffness factor included, m4.
    pub inertia: f64,
    /// Cross-section area, m2; beams need none, since floors are rigid in their own plane.
    pub area: Option<f64>,
}

/// Where the member sizes of a frame come from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SizeSource {
    /// The file states them.
    Stated,
    /// The middle of a size model, with real inertias: forces and movements have meaning.
    Assumed,
    /// The middle of a size model, inertias relative to the lowest end column: only forces have meaning.
    AssumedRelative,
}

/// Everything a [`Frame`] is made of, unchecked.
///
/// Columns are stored storey by storey from the ground, within a storey from line A to the right; beams floor by
/// floor, within a floor from the left.
#[derive(Debug, Clone, PartialEq)]
pub struct FrameParts {
    /// What the engineer calls the frame.
    pub title: String,
    /// Units for reports.
    pub report_units: ReportUnits,
    /// Bay widths from the left, m.
    pub bays: Vec<f64>,
    /// Storey heights from the ground, m.
    pub storeys: Vec<f64>,
    /// How the columns are held at the ground.
    pub feet: Feet,
    /// Modulus of elasticity, N/m2.
    pub modulus: f64,
    /// `storeys x (bays + 1)` columns.
    pub columns: Vec<Section>,
    /// `storeys x bays` beams.
    pub beams: Vec<Section>,
    /// Lateral force at each floor from the lowest, to the right, N.
    pub lateral: Vec<f64>,
    /// Where the sizes come from.
    pub sizes: SizeSource,
}

/// A regular moment frame with valid geometry, members and loads.
///
/// Indices count from 0: storey 0 stands on the ground, floor 0 is on top of it, line 0 is A, bay 0 is A-B.
///
/// # Panics
/// Accessors panic where an index lies outside the frame.
#[derive(Debug, Clone, PartialEq)]
pub struct Frame {
    parts: FrameParts,
    line_positions: Vec<f64>,
    floor_heights: Vec<f64>,
    storey_shears: Vec<f64>,
}

impl Frame {
    /// Checks `parts` and makes a frame of them.
    ///
    /// # Errors
    /// The first [`FrameFault`] found.
    pub fn new(parts: FrameParts) -> Result<Self, FrameFault> {
        fault::check(&parts)?;
        let storey_shears = suffix_sums(&parts.lateral);
        if let Some(storey) = storey_shears.iter().position(|shear| shear.is_nan() || *shear <= 0.0) {
            return Err(FrameFault::StoreyShear { storey: storey + 1, shear: storey_shears[storey] });
        }
        let line_positions = std::iter::once(0.0).chain(prefix_sums(&parts.bays)).collect();
        let floor_heights = prefix_sums(&parts.storeys).collect();
        Ok(Self { parts, line_positions, floor_heights, storey_shears })
    }

    /// The parts the frame was made of.
    pub fn parts(&self) -> &FrameParts {
        &self.parts
    }

    /// What the engineer calls the frame.
    pub fn title(&self) -> &str {
        &self.parts.title
    }

    /// Units for reports.
    pub fn report_units(&self) -> ReportUnits {
        self.parts.report_units
    }

    /// Number of storeys.
    pub fn storeys(&self) -> usize {
        self.parts.storeys.len()
    }

    /// Number of bays.
    pub fn bays(&self) -> usize {
        self.parts.bays.len()
    }

    /// Number of column lines, one more than bays.
    pub fn lines(&self) -> usize {
        self.bays() + 1
    }

    /// Height of a storey, m.
    pub fn storey_height(&self, storey: usize) -> f64 {
        self.parts.storeys[storey]
    }

    /// Width of a bay, m.
    pub fn bay_width(&self, bay: usize) -> f64 {
        self.parts.bays[bay]
    }

    /// Distance of a column line from line A, m.
    pub fn line_position(&self, line: usize) -> f64 {
        self.line_positions[line]
    }

    /// Height of a floor above the ground, m.
    pub fn floor_height(&self, floor: usize) -> f64 {
        self.floor_heights[floor]
    }

    /// Height of the foot of a storey above the ground, m.
    pub fn storey_base(&self, storey: usize) -> f64 {
        if storey == 0 { 0.0 } else { self.floor_heights[storey - 1] }
    }

    /// Total height, m.
    pub fn height(&self) -> f64 {
        self.floor_heights[self.storeys() - 1]
    }

    /// Total width, m.
    pub fn width(&self) -> f64 {
        self.line_positions[self.bays()]
    }

    /// How the feet are held.
    pub fn feet(&self) -> &Feet {
        &self.parts.feet
    }

    /// Modulus of elasticity, N/m2.
    pub fn modulus(&self) -> f64 {
        self.parts.modulus
    }

    /// Section of the column in `storey` on `line`.
    pub fn column(&self, storey: usize, line: usize) -> Section {
        self.parts.columns[storey * self.lines() + line]
    }

    /// Section of the beam at `floor` in `bay`.
    pub fn beam(&self, floor: usize, bay: usize) -> Section {
        self.parts.beams[floor * self.bays() + bay]
    }

    /// Flexural stiffness E I / h of a column, N m.
    pub fn column_stiffness(&self, storey: usize, line: usize) -> f64 {
        self.modulus() * self.column(storey, line).inertia / self.storey_height(storey)
    }

    /// Flexural stiffness E I / L of a beam, N m.
    pub fn beam_stiffness(&self, floor: usize, bay: usize) -> f64 {
        self.modulus() * self.beam(floor, bay).inertia / self.bay_width(bay)
    }

    /// Lateral force at a floor, N.
    pub fn lateral(&self, floor: usize) -> f64 {
        self.parts.lateral[floor]
    }

    /// Storey shear: the sum of the lateral forces at and above the storey's top floor, N.
    pub fn storey_shear(&self, storey: usize) -> f64 {
        self.storey_shears[storey]
    }

    /// Moment about height `level` (m) of the lateral forces above it, N m, positive where they turn the frame to the right.
    pub fn overturning_above(&self, level: f64) -> f64 {
        self.floor_heights
            .iter()
            .zip(&self.parts.lateral)
            .filter(|(height, _)| **height > level)
            .map(|(height, force)| (height - level) * force)
            .sum()
    }

    /// True where every column has an area, so that column axial strain can be computed.
    pub fn has_areas(&self) -> bool {
        self.parts.columns.iter().all(|column| column.area.is_some())
    }

    /// True where drift and sway have meaning: inertias and modulus are real, not relative.
    pub fn has_real_stiffness(&self) -> bool {
        self.parts.sizes != SizeSource::AssumedRelative
    }

    /// Where the member sizes come from.
    pub fn size_source(&self) -> SizeSource {
        self.parts.sizes
    }

    /// Whether `line` is one of the two outermost column lines.
    pub fn is_end_line(&self, line: usize) -> bool {
        line == 0 || line == self.bays()
    }

    /// Whether `bay` is one of the outermost bays; a single bay is an end bay.
    pub fn is_end_bay(&self, bay: usize) -> bool {
        bay == 0 || bay + 1 == self.bays()
    }

    /// The same frame with its feet held in another way.
    ///
    /// # Errors
    /// [`FrameFault`] where the springs are not one per line or not positive.
    pub fn with_feet(&self, feet: Feet) -> Result<Self, FrameFault> {
        Self::new(FrameParts { feet, ..self.parts.clone() })
    }

    /// The same frame with its reports in other units.
    pub fn with_report_units(mut self, units: ReportUnits) -> Self {
        self.parts.report_units = units;
        self
    }

    /// Foot springs of `ratio` times 4 E I_c / h of the column each stands under, N m/rad.
    pub fn foot_springs(&self, ratio: f64) -> Vec<f64> {
        (0..self.lines()).map(|line| ratio * 4.0 * self.column_stiffness(0, line)).collect()
    }
}

fn prefix_sums(values: &[f64]) -> impl Iterator<Item = f64> + '_ {
    values.iter().scan(0.0, |sum, value| {
        *sum += value;
        Some(*sum)
    })
}

fn suffix_sums(values: &[f64]) -> Vec<f64> {
    let mut sums = values.to_vec();
    for index in (0..sums.len().saturating_sub(1)).rev() {
        sums[index] += sums[index + 1];
    }
    sums
}
