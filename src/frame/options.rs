//! What an exact analysis may take into account beyond plain members: shear deformation, rigid joint zones, springs at
//! beam ends and vertical loads.

use super::{Frame, Member, bay_name, line_name};
use thiserror::Error;

/// At least this share of a member's length lies outside its rigid zones.
pub const LEAST_CLEAR_SHARE: f64 = 0.1;
/// Rounding that [`LEAST_CLEAR_SHARE`] forgives, a share of the length: lengths typed in decimals add up to about 1e-16.
const ROUNDING: f64 = 1e-9;

/// How a beam end is joined to its column.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum EndSpring {
    /// The end turns with the joint.
    Rigid,
    /// The end turns freely.
    Hinge,
    /// The end turns against a spring, N m/rad.
    Spring(f64),
}

/// What an exact analysis takes into account beyond plain members.
///
/// Members are in the order of [`super::FrameParts`]: columns storey by storey from the ground, within a storey from
/// line A; beams floor by floor, within a floor from the left. Begin with [`AnalysisOptions::plain`], change what
/// differs, and have it checked by [`AnalysisOptions::new`].
///
/// # Assumptions
/// - Shear deformation: a member with a shear area A_s has the shear stiffness G A_s; one without deforms in bending only.
///   Stiffness factors scale inertias, not shear areas.
/// - Rigid zones lie inside the member's length between joint centres and do not deform; a spring of a beam end stands
///   where the zone ends.
/// - Vertical loads stand on the column lines. They enter the second-order analysis only.
#[derive(Debug, Clone, PartialEq)]
pub struct AnalysisOptions {
    /// G, N/m2; needed where a shear area is given.
    pub shear_modulus: Option<f64>,
    /// Effective shear area of each column, m2; none: no shear deformation.
    pub column_shear_area: Vec<Option<f64>>,
    /// Effective shear area of each beam, m2; none: no shear deformation.
    pub beam_shear_area: Vec<Option<f64>>,
    /// Left and right end of each beam.
    pub beam_springs: Vec<[EndSpring; 2]>,
    /// Rigid zone at foot and head of each column, m; none at the ground.
    pub column_zones: Vec<[f64; 2]>,
    /// Rigid zone at the left and right end of each beam, m.
    pub beam_zones: Vec<[f64; 2]>,
    /// Vertical load added at each floor on each line, downwards, N: floor by floor, within a floor from line A. Given,
    /// a second-order analysis is due.
    pub gravity: Option<Vec<f64>>,
}

/// Options that do not fit their frame. Storeys and floors count from 1 in the messages.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum OptionsFault {
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
    /// A number that must be 0 or more and finite is not.
    #[error("{what} is {value}, but must be a finite number and not negative")]
    Negative {
        /// What the number is, with its place.
        what: String,
        /// The number, in N and m.
        value: f64,
    },
    /// A shear area without a shear modulus.
    #[error("{} has a shear area, but no shear modulus is given", named(*member))]
    NoShearModulus {
        /// The first such member.
        member: Member,
    },
    /// A column foot at the ground with a rigid zone.
    #[error("{} stands on the ground, where it has no rigid zone, but {zone} m is given", named(*member))]
    ZoneAtGround {
        /// The first such column.
        member: Member,
        /// The zone, m.
        zone: f64,
    },
    /// Rigid zones that leave too little of a member.
    #[error(
        "the rigid zones of {} take {zones:.3} m of its {length:.3} m; at least a tenth of the length must stay clear", named(*member)
    )]
    ZonesTooLong {
        /// The first such member.
        member: Member,
        /// Both zones together, m.
        zones: f64,
        /// The member's length between joint centres, m.
        length: f64,
    },
    /// An option in N and m on a frame whose inertias are only relative.
    #[error("{what} need real inertias, and those of this frame are relative")]
    RelativeSizes {
        /// `shear areas`, `springs at beam ends` or `vertical loads`.
        what: &'static str,
    },
}

/// The member in words.
pub(super) fn named(member: Member) -> String {
    match member {
        Member::Column { storey, line } => {
            format!("the column of storey {} on line {}", storey + 1, line_name(line))
        }
        Member::Beam { floor, bay } => format!("the beam of floor {} in bay {}", floor + 1, bay_name(bay)),
        Member::Storey { storey } => format!("storey {}", storey + 1),
    }
}

impl AnalysisOptions {
    /// Plain members: no shear deformation, no rigid zones, beams joined rigidly, first order.
    pub fn plain(frame: &Frame) -> Self {
        let (columns, beams) = (frame.storeys() * frame.lines(), frame.storeys() * frame.bays());
        Self {
            shear_modulus: None,
            column_shear_area: vec![None; columns],
            beam_shear_area: vec![None; beams],
            beam_springs: vec![[EndSpring::Rigid; 2]; beams],
            column_zones: vec![[0.0; 2]; columns],
            beam_zones: vec![[0.0; 2]; beams],
            gravity: None,
        }
    }

    /// Gives `options` back where they fit `frame`.
    ///
    /// # Errors
    /// The first [`OptionsFault`] found.
    pub fn new(frame: &Frame, options: Self) -> Result<Self, OptionsFault> {
        options.check(frame)?;
        Ok(options)
    }

    /// Whether nothing beyond plain members is to be taken into account. A shear modulus alone changes nothing.
    pub fn is_plain(&self) -> bool {
        let rigid = |ends: &[EndSpring; 2]| *ends == [EndSpring::Rigid; 2];
        let none = |zones: &[f64; 2]| *zones == [0.0; 2];
        !self.has_shear()
            && self.beam_springs.iter().all(rigid)
            && self.column_zones.iter().chain(&self.beam_zones).all(none)
            && self.gravity.is_none()
    }

    /// Whether some member has a rigid zone.
    pub fn has_zones(&self) -> bool {
        self.column_zones.iter().chain(&self.beam_zones).any(|zones| *zones != [0.0; 2])
    }

    /// Whether any member deforms in shear.
    pub fn has_shear(&self) -> bool {
        self.column_shear_area.iter().chain(&self.beam_shear_area).any(Option::is_some)
    }

    /// Checks lists, numbers and lengths against `frame`.
    ///
    /// # Errors
    /// The first [`OptionsFault`] found.
    pub fn check(&self, frame: &Frame) -> Result<(), OptionsFault> {
        self.check_counts(frame)?;
        self.check_real(frame)?;
        self.check_shear(frame)?;
        for (index, ends) in self.beam_springs.iter().enumerate() {
            for (end, side) in ends.iter().zip(["left", "right"]) {
                let EndSpring::Spring(stiffness) = *end else { continue };
                positive(stiffness, || format!("the spring at the {side} end of {}", named(beam(frame, index))))?;
            }
        }
        self.check_zones(frame)?;
        for (index, load) in self.gravity.iter().flatten().enumerate() {
            let (floor, line) = (index / frame.lines() + 1, line_name(index % frame.lines()));
            not_negative(*load, || format!("the vertical load of floor {floor} on line {line}"))?;
        }
        Ok(())
    }

    fn check_counts(&self, frame: &Frame) -> Result<(), OptionsFault> {
        let (columns, beams) = (frame.storeys() * frame.lines(), frame.storeys() * frame.bays());
        count("shear areas of columns", self.column_shear_area.len(), columns)?;
        count("shear areas of beams", self.beam_shear_area.len(), beams)?;
        count("springs of beams", self.beam_springs.len(), beams)?;
        count("rigid zones of columns", self.column_zones.len(), columns)?;
        count("rigid zones of beams", self.beam_zones.len(), beams)?;
        self.gravity.as_ref().map_or(Ok(()), |loads| count("vertical loads", loads.len(), columns))
    }

    fn check_real(&self, frame: &Frame) -> Result<(), OptionsFault> {
        let spring = |end: &EndSpring| matches!(end, EndSpring::Spring(_));
        let cases = [
            (self.has_shear(), "shear areas"),
            (self.beam_springs.iter().flatten().any(spring), "springs at beam ends"),
            (self.gravity.is_some(), "vertical loads"),
        ];
        let found = cases.into_iter().find(|(given, _)| *given && !frame.has_real_stiffness());
        found.map_or(Ok(()), |(_, what)| Err(OptionsFault::RelativeSizes { what }))
    }

    fn check_shear(&self, frame: &Frame) -> Result<(), OptionsFault> {
        if let Some(modulus) = self.shear_modulus {
            positive(modulus, || "the shear modulus".into())?;
        }
        let columns = self.column_shear_area.iter().enumerate().map(|(index, area)| (column(frame, index), area));
        let beams = self.beam_shear_area.iter().enumerate().map(|(index, area)| (beam(frame, index), area));
        for (member, area) in columns.chain(beams) {
            let Some(area) = *area else { continue };
            positive(area, || format!("the shear area of {}", named(member)))?;
            if self.shear_modulus.is_none() {
                return Err(OptionsFault::NoShearModulus { member });
            }
        }
        Ok(())
    }

    fn check_zones(&self, frame: &Frame) -> Result<(), OptionsFault> {
        for (index, zones) in self.column_zones.iter().enumerate() {
            let member = column(frame, index);
            let storey = index / frame.lines();
            clear(member, *zones, frame.storey_height(storey))?;
            if storey == 0 && zones[0] != 0.0 {
                return Err(OptionsFault::ZoneAtGround { member, zone: zones[0] });
            }
        }
        let mut beams = self.beam_zones.iter().enumerate();
        beams.try_for_each(|(index, zones)| clear(beam(frame, index), *zones, frame.bay_width(index % frame.bays())))
    }
}

fn column(frame: &Frame, index: usize) -> Member {
    Member::Column { storey: index / frame.lines(), line: index % frame.lines() }
}

fn beam(frame: &Frame, index: usize) -> Member {
    Member::Beam { floor: index / frame.bays(), bay: index % frame.bays() }
}

fn clear(member: Member, zones: [f64; 2], length: f64) -> Result<(), OptionsFault> {
    zones.into_iter().try_for_each(|zone| not_negative(zone, || format!("a rigid zone of {}", named(member))))?;
    let both = zones[0] + zones[1];
    if length - both >= (LEAST_CLEAR_SHARE - ROUNDING) * length {
        return Ok(());
    }
    Err(OptionsFault::ZonesTooLong { member, zones: both, length })
}

fn count(what: &'static str, found: usize, needed: usize) -> Result<(), OptionsFault> {
    if found == needed { Ok(()) } else { Err(OptionsFault::Count { what, found, needed }) }
}

fn positive(value: f64, what: impl FnOnce() -> String) -> Result<(), OptionsFault> {
    if value > 0.0 && value.is_finite() { Ok(()) } else { Err(OptionsFault::NotPositive { what: what(), value }) }
}

fn not_negative(value: f64, what: impl FnOnce() -> String) -> Result<(), OptionsFault> {
    if value >= 0.0 && value.is_finite() { Ok(()) } else { Err(OptionsFault::Negative { what: what(), value }) }
}

#[cfg(test)]
mod tests;
