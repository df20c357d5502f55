//! Member properties in lane form.

use crate::frame::{Feet, Frame};
use crate::lane::Rows;

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
    pub height: Rows<W>,
    /// Bay widths, m.
    pub width: Rows<W>,
    /// Column line positions from line A, m.
    pub position: Rows<W>,
    /// Storey shears, N.
    pub shear: Rows<W>,
    /// Column areas, in any one unit: the quick methods use their ratios only. All equal where the frame has none.
    pub area: Rows<W>,
    /// Flexural stiffness E I/h of each column, N m; relative where the frame's sizes are.
    pub column_stiffness: Rows<W>,
    /// Flexural stiffness E I/L of each beam, N m; relative where the frame's sizes are.
    pub beam_stiffness: Rows<W>,
    /// Axial stiffness E A of each column, N. Has meaning beside E I only where areas are known and sizes are real: else it is
    /// equal for all columns, or that of a frame whose lowest end column has 1 m4.
    pub axial_stiffness: Rows<W>,
    /// Fixity rho = c / (c + 4 E I/h) of each lowest column's foot, c its spring: 1 fixed, 0 pinned.
    pub foot_rho: Rows<W>,
    /// How far the feet turn with the floor above, S / (S + C): S the sum of the foot springs, C that of the lowest columns'
    /// E I/h. 1 fixed, 0 pinned. Not rho: the same springs c = 4 E I/h have rho 0.5 and this 0.8. Of quick methods only.
    pub foot_fixity: [f64; W],
    /// Height of the ground storey's assumed inflection point over the storey height: 0 on pinned feet, else 1/2.
    pub ground_hinge: [f64; W],
}

impl<const W: usize> Members<W> {
    /// Index of the column in `storey` on `line`.
    #[inline(always)]
    pub fn column(&self, storey: usize, line: usize) -> usize {
        storey * (self.bays + 1) + line
    }

    /// Index of the beam at `floor` in `bay`.
    #[inline(always)]
    pub fn beam(&self, floor: usize, bay: usize) -> usize {
        floor * self.bays + bay
    }

    /// Number of column lines.
    #[inline(always)]
    pub fn lines(&self) -> usize {
        self.bays + 1
    }
}

impl Members<1> {
    /// The members of one frame.
    pub fn of(frame: &Frame) -> Self {
        let each =
            |count: usize, value: &dyn Fn(usize) -> f64| (0..count).map(|index| [value(index)]).collect::<Rows<1>>();
        let lines = frame.lines();
        let bays = frame.bays();
        let has_areas = frame.has_areas();
        let stated = |index: usize| frame.column(index / lines, index % lines).area.unwrap_or(1.0);
        let area = |index: usize| if has_areas { stated(index) } else { 1.0 };
        let columns = frame.storeys() * lines;
        Self {
            storeys: frame.storeys(),
            bays: frame.bays(),
            height: each(frame.storeys(), &|storey| frame.storey_height(storey)),
            width: each(frame.bays(), &|bay| frame.bay_width(bay)),
            position: each(lines, &|line| frame.line_position(line)),
            shear: each(frame.storeys(), &|storey| frame.storey_shear(storey)),
            area: each(columns, &area),
            column_stiffness: each(columns, &|index| frame.column_stiffness(index / lines, index % lines)),
            beam_stiffness: each(frame.storeys() * bays, &|index| frame.beam_stiffness(index / bays, index % bays)),
            axial_stiffness: each(columns, &|index| frame.modulus() * area(index)),
            foot_rho: each(lines, &|line| foot_rho(frame, line)),
            foot_fixity: [foot_fixity(frame)],
            ground_hinge: [if *frame.feet() == Feet::Pinned { 0.0 } else { 0.5 }],
        }
    }
}

impl Members<1> {
    /// The same frame in each of `V` lanes.
    pub fn in_every_lane<const V: usize>(&self) -> Members<V> {
        let spread = |rows: &Rows<1>| rows.iter().map(|[value]| [*value; V]).collect::<Rows<V>>();
        Members {
            storeys: self.storeys,
            bays: self.bays,
            height: spread(&self.height),
            width: spread(&self.width),
            position: spread(&self.position),
            shear: spread(&self.shear),
            area: spread(&self.area),
            column_stiffness: spread(&self.column_stiffness),
            beam_stiffness: spread(&self.beam_stiffness),
            axial_stiffness: spread(&self.axial_stiffness),
            foot_rho: spread(&self.foot_rho),
            foot_fixity: [self.foot_fixity[0]; V],
            ground_hinge: [self.ground_hinge[0]; V],
        }
    }
}

impl Members<4> {
    /// Four frames of one shape side by side.
    pub fn side_by_side(frames: [&Members<1>; 4]) -> Self {
        let gather = |values: fn(&Members<1>) -> &Rows<1>| -> Rows<4> {
            let count = values(frames[0]).len();
            (0..count).map(|index| frames.map(|frame| values(frame)[index][0])).collect()
        };
        Self {
            storeys: frames[0].storeys,
            bays: frames[0].bays,
            height: gather(|frame| &frame.height),
            width: gather(|frame| &frame.width),
            position: gather(|frame| &frame.position),
            shear: gather(|frame| &frame.shear),
            area: gather(|frame| &frame.area),
            column_stiffness: gather(|frame| &frame.column_stiffness),
            beam_stiffness: gather(|frame| &frame.beam_stiffness),
            axial_stiffness: gather(|frame| &frame.axial_stiffness),
            foot_rho: gather(|frame| &frame.foot_rho),
            foot_fixity: frames.map(|frame| frame.foot_fixity[0]),
            ground_hinge: frames.map(|frame| frame.ground_hinge[0]),
        }
    }
}

fn foot_fixity(frame: &Frame) -> f64 {
    match frame.feet() {
        Feet::Fixed => 1.0,
        Feet::Pinned => 0.0,
        Feet::Springs(springs) => {
            let springs: f64 = springs.iter().sum();
            let columns: f64 = (0..frame.lines()).map(|line| frame.column_stiffness(0, line)).sum();
            springs / (springs + columns)
        }
    }
}

fn foot_rho(frame: &Frame, line: usize) -> f64 {
    match frame.feet() {
        Feet::Fixed => 1.0,
        Feet::Pinned => 0.0,
        Feet::Springs(springs) => springs[line] / (springs[line] + 4.0 * frame.column_stiffness(0, line)),
    }
}
