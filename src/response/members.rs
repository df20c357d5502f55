//! Member properties in lane form.

use crate::frame::{Feet, Frame};

/// Properties of `W` frames of equal shape, one frame per lane.
///
/// Columns are stored storey by storey from the ground, beams floor by floor; see [`Members::column`] and [`Members::beam`].
#[derive(Debug, Clone, PartialEq)]
pub struct Members<const W: usize> {
    /// Number of storeys.
    pub storeys: usize,
    /// Number of bays.
    pub bays: usize,
    /// Storey heights, m.
    pub height: Vec<[f64; W]>,
    /// Bay widths, m.
    pub width: Vec<[f64; W]>,
    /// Column line positions from line A, m.
    pub position: Vec<[f64; W]>,
    /// Storey shears, N.
    pub shear: Vec<[f64; W]>,
    /// Column areas, in any one unit: the quick methods use their ratios only. All equal where the frame has none.
    pub area: Vec<[f64; W]>,
    /// Height of the ground storey's assumed inflection point over the storey height: 0 on pinned feet, else 1/2.
    pub ground_hinge: [f64; W],
}

impl<const W: usize> Members<W> {
    /// Index of the column in `storey` on `line`.
    pub fn column(&self, storey: usize, line: usize) -> usize {
        storey * (self.bays + 1) + line
    }

    /// Index of the beam at `floor` in `bay`.
    pub fn beam(&self, floor: usize, bay: usize) -> usize {
        floor * self.bays + bay
    }

    /// Number of column lines.
    pub fn lines(&self) -> usize {
        self.bays + 1
    }
}

impl Members<1> {
    /// The members of one frame.
    pub fn of(frame: &Frame) -> Self {
        let each =
            |count: usize, value: &dyn Fn(usize) -> f64| (0..count).map(|index| [value(index)]).collect::<Vec<_>>();
        let lines = frame.lines();
        let area = |index: usize| frame.column(index / lines, index % lines).area.unwrap_or(1.0);
        Self {
            storeys: frame.storeys(),
            bays: frame.bays(),
            height: each(frame.storeys(), &|storey| frame.storey_height(storey)),
            width: each(frame.bays(), &|bay| frame.bay_width(bay)),
            position: each(lines, &|line| frame.line_position(line)),
            shear: each(frame.storeys(), &|storey| frame.storey_shear(storey)),
            area: each(frame.storeys() * lines, &|index| if frame.has_areas() { area(index) } else { 1.0 }),
            ground_hinge: [if *frame.feet() == Feet::Pinned { 0.0 } else { 0.5 }],
        }
    }

    /// The same frame in four lanes.
    pub fn repeated(&self) -> Members<4> {
        let spread = |values: &[[f64; 1]]| values.iter().map(|[value]| [*value; 4]).collect::<Vec<_>>();
        Members {
            storeys: self.storeys,
            bays: self.bays,
            height: spread(&self.height),
            width: spread(&self.width),
            position: spread(&self.position),
            shear: spread(&self.shear),
            area: spread(&self.area),
            ground_hinge: [self.ground_hinge[0]; 4],
        }
    }
}
