//! The quantities a response states, each with its place: one list that files, errors and reports share.

use crate::frame::{Frame, Member};
use crate::units::{ReportUnits, Unit};

/// A quantity of a column, beam or storey.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Quantity {
    /// Moment at the foot of a column.
    MomentFoot,
    /// Moment at the head of a column.
    MomentHead,
    /// Moment at the left end of a beam.
    MomentLeft,
    /// Moment at the right end of a beam.
    MomentRight,
    /// Shear of a column, a beam or a storey.
    Shear,
    /// Axial force of a column.
    Axial,
    /// The larger of a member's two end moments, without sign.
    DesignMoment,
    /// Moment at the foot of a column, at the face of the rigid zone.
    MomentFootFace,
    /// Moment at the head of a column, at the face of the rigid zone.
    MomentHeadFace,
    /// Moment at the left end of a beam, at the face of the rigid zone.
    MomentLeftFace,
    /// Moment at the right end of a beam, at the face of the rigid zone.
    MomentRightFace,
    /// The larger of a member's two face moments, without sign.
    DesignMomentFace,
    /// Movement of a floor relative to the floor below.
    Drift,
    /// Movement of a floor relative to the ground.
    Sway,
}

impl Quantity {
    /// Name in the files.
    pub fn id(self) -> &'static str {
        match self {
            Self::MomentFoot => "moment_foot",
            Self::MomentHead => "moment_head",
            Self::MomentLeft => "moment_left",
            Self::MomentRight => "moment_right",
            Self::Shear => "shear",
            Self::Axial => "axial",
            Self::DesignMoment => "design_moment",
            Self::MomentFootFace => "moment_foot_face",
            Self::MomentHeadFace => "moment_head_face",
            Self::MomentLeftFace => "moment_left_face",
            Self::MomentRightFace => "moment_right_face",
            Self::DesignMomentFace => "design_moment_face",
            Self::Drift => "drift",
            Self::Sway => "sway",
        }
    }

    /// Unit in files and reports.
    pub fn unit(self, units: ReportUnits) -> Unit {
        match self {
            Self::Shear | Self::Axial => units.force(),
            Self::Drift | Self::Sway => units.movement(),
            _ => units.moment(),
        }
    }
}

/// One number of a response and where it belongs, in N, m.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Value {
    /// The member or storey.
    pub member: Member,
    /// The quantity.
    pub quantity: Quantity,
    /// The number, N, m; signs of the crate's table.
    pub value: f64,
}

impl super::Response {
    /// Every number of this response: columns storey by storey, then beams floor by floor, then storeys.
    pub fn values(&self, frame: &Frame) -> Vec<Value> {
        let mut values = Vec::new();
        let with_forces = if self.has_forces() { frame.storeys() } else { 0 };
        for storey in 0..with_forces {
            (0..frame.lines()).for_each(|line| self.push_column(&mut values, storey, line));
        }
        for floor in 0..with_forces {
            (0..frame.bays()).for_each(|bay| self.push_beam(&mut values, floor, bay));
        }
        for storey in 0..frame.storeys() {
            let member = Member::Storey { storey };
            if self.has_forces() {
                values.push(Value { member, quantity: Quantity::Shear, value: self.storey_shear(storey) });
            }
            if let Some(movement) = self.movement(storey) {
                values.push(Value { member, quantity: Quantity::Drift, value: movement.drift });
                values.push(Value { member, quantity: Quantity::Sway, value: movement.sway });
            }
        }
        values
    }

    fn push_column(&self, values: &mut Vec<Value>, storey: usize, line: usize) {
        let (member, column) = (Member::Column { storey, line }, self.column(storey, line));
        let numbers = [
            (Quantity::MomentFoot, column.foot),
            (Quantity::MomentHead, column.head),
            (Quantity::Shear, column.shear),
            (Quantity::Axial, column.axial),
            (Quantity::DesignMoment, column.design_moment()),
        ];
        values.extend(numbers.map(|(quantity, value)| Value { member, quantity, value }));
        if let Some(face) = self.column_face(storey, line) {
            values.extend(face_values(member, [Quantity::MomentFootFace, Quantity::MomentHeadFace], face));
        }
    }

    fn push_beam(&self, values: &mut Vec<Value>, floor: usize, bay: usize) {
        let (member, beam) = (Member::Beam { floor, bay }, self.beam(floor, bay));
        let numbers = [
            (Quantity::MomentLeft, beam.left),
            (Quantity::MomentRight, beam.right),
            (Quantity::Shear, beam.shear),
            (Quantity::DesignMoment, beam.design_moment()),
        ];
        values.extend(numbers.map(|(quantity, value)| Value { member, quantity, value }));
        if let Some(face) = self.beam_face(floor, bay) {
            values.extend(face_values(member, [Quantity::MomentLeftFace, Quantity::MomentRightFace], face));
        }
    }
}

fn face_values(member: Member, quantities: [Quantity; 2], face: [f64; 2]) -> [Value; 3] {
    let design = face[0].abs().max(face[1].abs());
    let numbers = [(quantities[0], face[0]), (quantities[1], face[1]), (Quantity::DesignMomentFace, design)];
    numbers.map(|(quantity, value)| Value { member, quantity, value })
}
