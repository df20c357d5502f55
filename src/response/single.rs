//! One frame's answer.

use super::Forces;
use crate::frame::Frame;

/// Forces of one column, N and N m.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct ColumnForces {
    /// Moment at the foot, clockwise on the member end positive.
    pub foot: f64,
    /// Moment at the head, clockwise on the member end positive.
    pub head: f64,
    /// Shear, positive where it resists load to the right.
    pub shear: f64,
    /// Axial force, tension positive.
    pub axial: f64,
}

impl ColumnForces {
    /// The larger of the two end moments, without sign.
    pub fn design_moment(&self) -> f64 {
        self.foot.abs().max(self.head.abs())
    }
}

/// Forces of one beam, N and N m.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct BeamForces {
    /// Moment at the left end, clockwise on the member end positive.
    pub left: f64,
    /// Moment at the right end, clockwise on the member end positive.
    pub right: f64,
    /// Shear, positive where it lifts the left joint.
    pub shear: f64,
}

impl BeamForces {
    /// The larger of the two end moments, without sign.
    pub fn design_moment(&self) -> f64 {
        self.left.abs().max(self.right.abs())
    }
}

/// Horizontal movement at the top of one storey, m, to the right positive.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Movement {
    /// Relative to the floor below.
    pub drift: f64,
    /// Relative to the ground.
    pub sway: f64,
}

/// Moments at the faces of rigid zones, N m, clockwise on the flexible part's end positive; stored like the members.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Faces {
    /// Foot and head of each column.
    pub columns: Vec<[f64; 2]>,
    /// Left and right end of each beam.
    pub beams: Vec<[f64; 2]>,
}

/// The answer of one method for one frame, exact or quick.
///
/// # Panics
/// Accessors panic where an index lies outside the frame.
#[derive(Debug, Clone, PartialEq)]
pub struct Response {
    /// Name of the method in files, such as `slope-deflection`.
    pub method: &'static str,
    lines: usize,
    columns: Vec<ColumnForces>,
    beams: Vec<BeamForces>,
    movements: Option<Vec<Movement>>,
    residual: Option<f64>,
    faces: Option<Faces>,
}

impl Response {
    /// Makes the answer of a method from lane forces of one frame; shears follow from the end moments.
    ///
    /// # Formula
    /// Column shear = -(M_foot + M_head) / h; beam shear = (M_left + M_right) / L (common practice).
    pub fn from_forces(method: &'static str, frame: &Frame, forces: &Forces<1>) -> Self {
        let column = |index: usize| {
            let (foot, head) = (forces.column_foot[index][0], forces.column_head[index][0]);
            let shear = -(foot + head) / frame.storey_height(index / frame.lines());
            ColumnForces { foot, head, shear, axial: forces.column_axial[index][0] }
        };
        let beam = |index: usize| {
            let (left, right) = (forces.beam_left[index][0], forces.beam_right[index][0]);
            BeamForces { left, right, shear: (left + right) / frame.bay_width(index % frame.bays()) }
        };
        let columns = (0..forces.column_foot.len()).map(column).collect();
        Self::from_members(method, frame, columns, (0..forces.beam_left.len()).map(beam).collect())
    }

    /// Makes the answer of a method from member forces, stored like [`crate::frame::FrameParts`].
    pub fn from_members(
        method: &'static str,
        frame: &Frame,
        columns: Vec<ColumnForces>,
        beams: Vec<BeamForces>,
    ) -> Self {
        Self { method, lines: frame.lines(), columns, beams, movements: None, residual: None, faces: None }
    }

    /// The answer of a method that states no member forces.
    pub fn without_forces(method: &'static str, frame: &Frame) -> Self {
        Self::from_members(method, frame, Vec::new(), Vec::new())
    }

    /// Whether the answer states member forces; where not, the accessors of columns and beams panic.
    pub fn has_forces(&self) -> bool {
        !self.columns.is_empty()
    }

    /// Adds the drift of every storey from the ground, m; sways are their sums.
    pub fn with_drifts(mut self, drifts: &[f64]) -> Self {
        let movement = |sway: &mut f64, drift: &f64| {
            *sway += drift;
            Some(Movement { drift: *drift, sway: *sway })
        };
        self.movements = Some(drifts.iter().scan(0.0, movement).collect());
        self
    }

    /// Adds the moments at the faces of rigid zones.
    pub fn with_faces(mut self, faces: Faces) -> Self {
        self.faces = Some(faces);
        self
    }

    /// Adds the moments at the faces of rigid zones of these lengths (m), by statics: moments are straight lines.
    ///
    /// # Formula
    /// M_face = M_end - (sum of both end moments) x zone / length.
    pub fn with_zones(self, frame: &Frame, columns: &[[f64; 2]], beams: &[[f64; 2]]) -> Self {
        let face = |ends: [f64; 2], zones: [f64; 2], length: f64| {
            let slope = (ends[0] + ends[1]) / length;
            [ends[0] - slope * zones[0], ends[1] - slope * zones[1]]
        };
        let column = |(index, column): (usize, &ColumnForces)| {
            face([column.foot, column.head], columns[index], frame.storey_height(index / frame.lines()))
        };
        let beam = |(index, beam): (usize, &BeamForces)| {
            face([beam.left, beam.right], beams[index], frame.bay_width(index % frame.bays()))
        };
        let faces = Faces {
            columns: self.columns.iter().enumerate().map(column).collect(),
            beams: self.beams.iter().enumerate().map(beam).collect(),
        };
        self.with_faces(faces)
    }

    /// Moments at foot and head of a column at the faces of its rigid zones, where zones are given.
    pub fn column_face(&self, storey: usize, line: usize) -> Option<[f64; 2]> {
        self.faces.as_ref().map(|faces| faces.columns[storey * self.lines + line])
    }

    /// Moments at the ends of a beam at the faces of its rigid zones, where zones are given.
    pub fn beam_face(&self, floor: usize, bay: usize) -> Option<[f64; 2]> {
        self.faces.as_ref().map(|faces| faces.beams[floor * (self.lines - 1) + bay])
    }

    /// Adds the relative residual of the equations the answer solves.
    pub fn with_residual(mut self, residual: f64) -> Self {
        self.residual = Some(residual);
        self
    }

    /// Forces of the column in `storey` on `line`.
    pub fn column(&self, storey: usize, line: usize) -> &ColumnForces {
        &self.columns[storey * self.lines + line]
    }

    /// Forces of the beam at `floor` in `bay`.
    pub fn beam(&self, floor: usize, bay: usize) -> &BeamForces {
        &self.beams[floor * (self.lines - 1) + bay]
    }

    /// Forces of the columns of a storey from line A.
    pub fn storey_columns(&self, storey: usize) -> &[ColumnForces] {
        &self.columns[storey * self.lines..][..self.lines]
    }

    /// Forces of the beams of a floor from the left.
    pub fn floor_beams(&self, floor: usize) -> &[BeamForces] {
        &self.beams[floor * (self.lines - 1)..][..self.lines - 1]
    }

    /// Sum of the column shears of a storey, N.
    pub fn storey_shear(&self, storey: usize) -> f64 {
        self.storey_columns(storey).iter().map(|column| column.shear).sum()
    }

    /// Movement at the top of a storey, `None` where the method gives none or sizes are only relative.
    pub fn movement(&self, storey: usize) -> Option<Movement> {
        self.movements.as_ref().map(|movements| movements[storey])
    }

    /// Relative residual of the solved equations; `None` for quick methods, which solve none.
    pub fn residual(&self) -> Option<f64> {
        self.residual
    }

    /// Whether both responses state the same member forces, but for what rounding leaves.
    pub fn equals(&self, other: &Self) -> bool {
        let close = |a: f64, b: f64, scale: f64| (a - b).abs() <= 1e-9 * scale;
        let moment = self.largest_moment().max(other.largest_moment());
        let axial = self.columns.iter().map(|column| column.axial.abs()).fold(0.0, f64::max);
        if !self.has_forces() || !other.has_forces() {
            return false;
        }
        let columns = self.columns.iter().zip(&other.columns).all(|(a, b)| {
            close(a.foot, b.foot, moment) && close(a.head, b.head, moment) && close(a.axial, b.axial, axial)
        });
        let beams = self.beams.iter().zip(&other.beams);
        columns && beams.into_iter().all(|(a, b)| close(a.left, b.left, moment) && close(a.right, b.right, moment))
    }

    /// The largest member end moment of the frame, without sign, N m.
    pub fn largest_moment(&self) -> f64 {
        let columns = self.columns.iter().map(ColumnForces::design_moment);
        columns.chain(self.beams.iter().map(BeamForces::design_moment)).fold(0.0, f64::max)
    }
}
