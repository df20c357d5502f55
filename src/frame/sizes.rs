//! The size model: what member sizes may be while they are unknown, and the members that one set of values makes.
//!
//! # Formula
//! With t = storey div `tier`, storey and floor counted from 0, and I_0 the inertia of the end columns of the lowest tier:
//! - end columns I_c = I_0 taper^t, interior columns x times that (x = `interior_to_end`);
//! - beams I_b = r (L_mean / h_median) I_0 beam_taper^t (L / L_mean)^p (r = `beam_to_column`, p = `span_power`), at the
//!   roof further multiplied by `roof_beam`;
//! - each inertia further multiplied by a factor of its own;
//! - column areas A = a sqrt(I) (a = `area_per_inertia`; for gross inertias: with cracked ones divide a by the root of the
//!   stiffness factor);
//! - foot springs `foot_spring` times 4 E I_c / h of the column above.

use super::{Member, Section};
use std::fmt;

/// What one parameter of the size model may be.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Range {
    /// One value.
    Fixed(f64),
    /// Any value between low and high, its logarithm uniform.
    LogUniform {
        /// Low end, positive.
        low: f64,
        /// High end.
        high: f64,
    },
    /// Any value between low and high, uniform.
    Uniform {
        /// Low end.
        low: f64,
        /// High end.
        high: f64,
    },
}

impl Range {
    /// The assumed value: the geometric mean of a log-uniform range, the middle of a uniform one.
    pub fn assumed(self) -> f64 {
        match self {
            Self::Fixed(value) => value,
            Self::LogUniform { low, high } => low.sqrt() * high.sqrt(),
            Self::Uniform { low, high } => 0.5 * (low + high),
        }
    }

    /// The value below which a share `share` (0 to 1) of the draws lies.
    pub fn at(self, share: f64) -> f64 {
        match self {
            Self::Fixed(value) => value,
            Self::LogUniform { low, high } => low * libm::pow(high / low, share),
            Self::Uniform { low, high } => low + share * (high - low),
        }
    }

    /// Low and high end; the same number twice for a fixed value.
    pub fn ends(self) -> (f64, f64) {
        match self {
            Self::Fixed(value) => (value, value),
            Self::LogUniform { low, high } | Self::Uniform { low, high } => (low, high),
        }
    }
}

impl fmt::Display for Range {
    fn fmt(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        match self {
            Self::Fixed(value) => write!(formatter, "{value}"),
            Self::LogUniform { low, high } => write!(formatter, "{low} to {high}, log-uniform"),
            Self::Uniform { low, high } => write!(formatter, "{low} to {high}, uniform"),
        }
    }
}

/// Number of ranges in a [`SizeModel`], in the order of [`SizeModel::at`].
pub const SIZE_PARAMETERS: usize = 9;

/// Names of the ranges as the files write them, in the order of [`SizeModel::at`].
pub const SIZE_NAMES: [&str; SIZE_PARAMETERS] = [
    "beam_to_column",
    "interior_to_end",
    "taper",
    "beam_taper",
    "roof_beam",
    "span_power",
    "foot_spring",
    "end_column_inertia",
    "area_per_inertia",
];

/// Ranges of all parameters of the size model.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SizeModel {
    /// r = (I_b/L)/(I_c/h) of a beam of mean bay width to an end column of median storey height in the lowest tier.
    pub beam_to_column: Range,
    /// Inertia of interior columns over end columns of the same storey.
    pub interior_to_end: Range,
    /// Storeys between changes of size, 1 or more.
    pub tier: usize,
    /// Column inertia of a tier over the tier below.
    pub taper: Range,
    /// Beam inertia of a tier over the tier below.
    pub beam_taper: Range,
    /// Further factor on the inertia of roof beams.
    pub roof_beam: Range,
    /// Power of bay width over mean bay width in the beam inertia.
    pub span_power: Range,
    /// Each member's inertia is further multiplied by scatter^u, u uniform in [-1, 1].
    pub scatter: f64,
    /// Rotational foot stiffness over 4 E I_c/h of its column, where stated.
    pub foot_spring: Option<Range>,
    /// Inertia of the end columns of the lowest tier, m4, where stated.
    pub end_column_inertia: Option<Range>,
    /// a in A = a sqrt(I).
    pub area_per_inertia: Range,
}

impl Default for SizeModel {
    fn default() -> Self {
        Self {
            beam_to_column: Range::LogUniform { low: 0.1, high: 2.5 },
            interior_to_end: Range::LogUniform { low: 0.7, high: 3.5 },
            tier: 3,
            taper: Range::LogUniform { low: 0.6, high: 1.0 },
            beam_taper: Range::LogUniform { low: 0.75, high: 1.0 },
            roof_beam: Range::LogUniform { low: 0.5, high: 1.0 },
            span_power: Range::Uniform { low: 0.0, high: 1.5 },
            scatter: 1.15,
            foot_spring: None,
            end_column_inertia: None,
            area_per_inertia: Range::Fixed(3.5),
        }
    }
}

impl SizeModel {
    /// The assumed sizes: every range at its assumed value.
    pub fn assumed(&self) -> SizeSet {
        self.map(|_, range| range.assumed())
    }

    /// The sizes at given shares (0 to 1) of every range, in the order `beam_to_column`, `interior_to_end`, `taper`,
    /// `beam_taper`, `roof_beam`, `span_power`, `foot_spring`, `end_column_inertia`, `area_per_inertia`. Scatter is
    /// not in it: it is a factor for each member, see [`SizeSet::sections`].
    pub fn at(&self, shares: &[f64; SIZE_PARAMETERS]) -> SizeSet {
        self.map(|index, range| range.at(shares[index]))
    }

    /// The ranges in the order of [`Self::at`]; none where the model leaves a parameter out.
    pub fn ranges(&self) -> [Option<Range>; SIZE_PARAMETERS] {
        [
            Some(self.beam_to_column),
            Some(self.interior_to_end),
            Some(self.taper),
            Some(self.beam_taper),
            Some(self.roof_beam),
            Some(self.span_power),
            self.foot_spring,
            self.end_column_inertia,
            Some(self.area_per_inertia),
        ]
    }

    fn map(&self, value: impl Fn(usize, Range) -> f64) -> SizeSet {
        SizeSet {
            beam_to_column: value(0, self.beam_to_column),
            interior_to_end: value(1, self.interior_to_end),
            tier: self.tier,
            taper: value(2, self.taper),
            beam_taper: value(3, self.beam_taper),
            roof_beam: value(4, self.roof_beam),
            span_power: value(5, self.span_power),
            foot_spring: self.foot_spring.map(|range| value(6, range)),
            end_column_inertia: self.end_column_inertia.map_or(1.0, |range| value(7, range)),
            area_per_inertia: value(8, self.area_per_inertia),
        }
    }
}

/// One value for each parameter of the size model.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SizeSet {
    /// r, see [`SizeModel::beam_to_column`].
    pub beam_to_column: f64,
    /// x, see [`SizeModel::interior_to_end`].
    pub interior_to_end: f64,
    /// Storeys between changes of size.
    pub tier: usize,
    /// Column inertia of a tier over the tier below.
    pub taper: f64,
    /// Beam inertia of a tier over the tier below.
    pub beam_taper: f64,
    /// Further factor on roof beams.
    pub roof_beam: f64,
    /// p, see [`SizeModel::span_power`].
    pub span_power: f64,
    /// Foot spring over 4 E I_c/h of its column, where stated.
    pub foot_spring: Option<f64>,
    /// I_0, m4; 1 where only ratios are known.
    pub end_column_inertia: f64,
    /// a in A = a sqrt(I).
    pub area_per_inertia: f64,
}

/// Columns and beams in the order of [`super::FrameParts`].
#[derive(Debug, Clone, PartialEq)]
pub struct Sections {
    /// `storeys x (bays + 1)` columns.
    pub columns: Vec<Section>,
    /// `storeys x bays` beams, without areas.
    pub beams: Vec<Section>,
}

impl SizeSet {
    /// The members of a grid with these sizes. `factor` multiplies the inertia of each member; it is called once for
    /// each column in the order they are stored, then once for each beam. Column areas follow the multiplied inertia.
    pub fn sections(&self, bays: &[f64], storeys: &[f64], factor: impl FnMut(Member) -> f64) -> Sections {
        let mut factor = factor;
        let lines = bays.len() + 1;
        let mut columns = Vec::with_capacity(storeys.len() * lines);
        for storey in 0..storeys.len() {
            for line in 0..lines {
                let end = line == 0 || line + 1 == lines;
                let inertia = self.column_inertia(storey, end) * factor(Member::Column { storey, line });
                columns.push(Section { inertia, area: Some(self.area_per_inertia * inertia.sqrt()) });
            }
        }
        let mut beams = Vec::with_capacity(storeys.len() * bays.len());
        let (mean, median) = (mean(bays), median(storeys));
        for floor in 0..storeys.len() {
            let roof = if floor + 1 == storeys.len() { self.roof_beam } else { 1.0 };
            for (bay, width) in bays.iter().enumerate() {
                let inertia = self.beam_inertia(floor, width / mean, mean / median) * roof;
                beams.push(Section { inertia: inertia * factor(Member::Beam { floor, bay }), area: None });
            }
        }
        Sections { columns, beams }
    }

    /// Inertia of a column, I_0 taper^t, times x on interior lines, m4.
    pub fn column_inertia(&self, storey: usize, end_line: bool) -> f64 {
        let class = if end_line { 1.0 } else { self.interior_to_end };
        self.end_column_inertia * self.tiers(self.taper, storey) * class
    }

    /// Foot springs, N m/rad, where the set states their ratio: `foot_spring` times 4 E I_c/h of each of the lowest
    /// `columns`; `height` is that of the lowest storey.
    pub fn foot_springs(&self, columns: &[Section], modulus: f64, height: f64) -> Option<Vec<f64>> {
        let spring = |ratio: f64, column: &Section| ratio * 4.0 * modulus * column.inertia / height;
        self.foot_spring.map(|ratio| columns.iter().map(|column| spring(ratio, column)).collect())
    }

    /// Inertia of a beam below the roof, m4; `relative_width` = L / L_mean, `slenderness` = L_mean / h_median.
    fn beam_inertia(&self, floor: usize, relative_width: f64, slenderness: f64) -> f64 {
        let lowest = self.beam_to_column * slenderness * self.end_column_inertia;
        lowest * self.tiers(self.beam_taper, floor) * libm::pow(relative_width, self.span_power)
    }

    fn tiers(&self, ratio: f64, level: usize) -> f64 {
        libm::pow(ratio, (level / self.tier.max(1)) as f64)
    }
}

/// How far known sizes may be off: log-uniform factors up to these either way, each 1 or more.
///
/// `member` and `beams` are factors on inertia: they stand for cracking and effective stiffness, while bare areas are known.
/// (In a size model scatter does reach the area, which is unknown there.) `all` is a factor on every stiffness, foot springs
/// and axial stiffness included.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Within {
    /// Drawn for each member alone.
    pub member: f64,
    /// Drawn once for all beams.
    pub beams: f64,
    /// Drawn once for everything; it moves drifts only.
    pub all: f64,
}

/// The mean.
pub(crate) fn mean(values: &[f64]) -> f64 {
    values.iter().sum::<f64>() / values.len() as f64
}

/// The middle value; of an even number of values the mean of the middle two.
pub(crate) fn median(values: &[f64]) -> f64 {
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    let middle = sorted.len() / 2;
    if sorted.len() % 2 == 1 { sorted[middle] } else { 0.5 * (sorted[middle - 1] + sorted[middle]) }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn set() -> SizeSet {
        SizeSet {
            beam_to_column: 0.5,
            interior_to_end: 2.0,
            tier: 2,
            taper: 0.8,
            beam_taper: 0.9,
            roof_beam: 0.7,
            span_power: 1.5,
            foot_spring: None,
            end_column_inertia: 3e-3,
            area_per_inertia: 3.5,
        }
    }

    fn near(found: f64, expected: f64) {
        assert!((found / expected - 1.0).abs() < 1e-14, "{found} is not {expected}");
    }

    #[test]
    fn assumed_values_are_the_middles_of_the_defaults() {
        let assumed = SizeModel::default().assumed();
        near(assumed.beam_to_column, 0.5);
        near(assumed.interior_to_end, 2.45f64.sqrt());
        near(assumed.taper, 0.6f64.sqrt());
        near(assumed.beam_taper, 0.75f64.sqrt());
        near(assumed.roof_beam, 0.5f64.sqrt());
        near(assumed.span_power, 0.75);
        assert_eq!((assumed.tier, assumed.foot_spring, assumed.end_column_inertia), (3, None, 1.0));
        near(SizeModel::default().at(&[0.5; SIZE_PARAMETERS]).taper, 0.6f64.sqrt());
    }

    #[test]
    fn shares_run_from_the_low_end_to_the_high_end() {
        let model = SizeModel { foot_spring: Some(Range::LogUniform { low: 1.0, high: 20.0 }), ..Default::default() };
        let (low, high) = (model.at(&[0.0; SIZE_PARAMETERS]), model.at(&[1.0; SIZE_PARAMETERS]));
        assert_eq!((low.beam_to_column, low.span_power, low.foot_spring), (0.1, 0.0, Some(1.0)));
        near(high.beam_to_column, 2.5);
        near(high.roof_beam, 1.0);
        assert_eq!(high.foot_spring, Some(20.0));
    }

    #[test]
    fn members_follow_the_table_of_the_model() {
        let (bays, storeys) = ([6.0, 9.0], [5.0, 4.0, 4.0, 3.0, 3.0]);
        let made = set().sections(&bays, &storeys, |_| 1.0);
        near(made.columns[0].inertia, 3e-3);
        near(made.columns[1].inertia, 6e-3);
        near(made.columns[3].inertia, 3e-3);
        near(made.columns[2 * 3].inertia, 3e-3 * 0.8);
        near(made.columns[4 * 3 + 1].inertia, 6e-3 * 0.64);
        near(made.columns[1].area.unwrap(), 3.5 * 6e-3f64.sqrt());
        // r (L_mean/h_median) I_0 (L/L_mean)^p with L_mean = 7.5 m, h_median = 4 m.
        let lowest = 0.5 * 7.5 / 4.0 * 3e-3;
        near(made.beams[0].inertia, lowest * 0.8f64.powf(1.5));
        near(made.beams[1].inertia, lowest * 1.2f64.powf(1.5));
        near(made.beams[2 * 2 + 1].inertia, lowest * 0.9 * 1.2f64.powf(1.5));
        near(made.beams[4 * 2].inertia, lowest * 0.81 * 0.8f64.powf(1.5) * 0.7);
        assert_eq!((made.columns.len(), made.beams.len(), made.beams[0].area), (15, 10, None));
    }

    #[test]
    fn a_beam_of_mean_width_has_the_stated_ratio_to_an_end_column_of_median_height() {
        let (bays, storeys) = ([7.0, 7.0, 7.0], [3.0, 4.0]);
        let made = SizeSet { tier: 9, ..set() }.sections(&bays, &storeys, |_| 1.0);
        near((made.beams[0].inertia / 7.0) / (made.columns[0].inertia / 3.5), 0.5);
    }

    #[test]
    fn factors_are_asked_for_in_storage_order_and_reach_the_area() {
        let mut asked = Vec::new();
        let mut next = 0.0;
        let made = set().sections(&[6.0], &[4.0, 4.0], |place| {
            asked.push(place);
            next += 1.0;
            next
        });
        assert_eq!(asked[1], Member::Column { storey: 0, line: 1 });
        assert_eq!(asked[2], Member::Column { storey: 1, line: 0 });
        assert_eq!(asked[5], Member::Beam { floor: 1, bay: 0 });
        near(made.columns[1].inertia, 2.0 * 3e-3);
        near(made.columns[1].area.unwrap(), 3.5 * 6e-3f64.sqrt());
    }
}
