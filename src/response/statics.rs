//! Equilibrium of any response, exact or quick: whether the numbers can be true at all.
//!
//! Every check uses the response's own numbers and the applied forces, nothing of the method behind them.
//!
//! # References
//! Equilibrium of joints, storeys and free bodies: common practice.

mod lanes;

pub use lanes::imbalance;

use super::Response;
use crate::frame::{Frame, Member};

/// The most a response may miss equilibrium by, relative to the scale of the check.
///
/// The quick methods and the exact solutions close to about 1e-14 of the frame's largest force; the rest is room
/// for ill-conditioned frames. A slip in a formula or a number shows at 1e-3 and more.
pub const CLOSES: f64 = 1e-9;

/// Which law of equilibrium a check uses.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Law {
    /// The member end moments at a joint add up to zero.
    JointMoments,
    /// A member's shear times its length is the sum of its end moments.
    MemberShears,
    /// The column shears of a storey add up to its storey shear.
    StoreyShears,
    /// Beam shears and column axial forces at a joint add up to zero.
    JointVertical,
    /// The column axial forces of a storey add up to zero: no vertical load is applied.
    StoreyVertical,
    /// At the foot of every storey, axial forces and column moments balance the forces above.
    Overturning,
}

impl Law {
    /// Every law, in the order of reports.
    pub const ALL: [Self; 6] = [
        Self::JointMoments,
        Self::MemberShears,
        Self::StoreyShears,
        Self::JointVertical,
        Self::StoreyVertical,
        Self::Overturning,
    ];

    /// Whether the law adds up moments, not forces.
    pub fn is_of_moments(self) -> bool {
        matches!(self, Self::JointMoments | Self::MemberShears | Self::Overturning)
    }

    /// The law in words.
    pub fn name(self) -> &'static str {
        match self {
            Self::JointMoments => "moments at each joint",
            Self::MemberShears => "shear of each member",
            Self::StoreyShears => "shear of each storey",
            Self::JointVertical => "vertical forces at each joint",
            Self::StoreyVertical => "vertical forces of each storey",
            Self::Overturning => "overturning at the foot of each storey",
        }
    }
}

/// How far one law is missed at one place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Imbalance {
    /// The law.
    pub law: Law,
    /// The place; a joint is named by the column whose head it is.
    pub member: Member,
    /// Sum that should be zero, N or N m.
    pub sum: f64,
    /// `sum` over the scale of the law: the frame's largest moment, storey shear, axial force or overturning moment.
    pub relative: f64,
}

/// The sums of one storey that a checker can follow, N and N m.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StoreySums {
    /// Lateral forces at and above the storey's top floor.
    pub shear_applied: f64,
    /// Sum of the column shears.
    pub shear_found: f64,
    /// Moment of the forces above, about the foot of the storey.
    pub overturning_applied: f64,
    /// Part of it balanced by the column foot moments.
    pub by_moments: f64,
    /// Part of it balanced by the column axial forces.
    pub by_axial: f64,
    /// Sum of the column axial forces.
    pub axial_sum: f64,
    /// Largest |sum of member end moments| over the joints of the storey's top floor.
    pub joint_moment: f64,
}

/// Equilibrium of one response.
#[derive(Debug, Clone, PartialEq)]
pub struct Statics {
    /// One row per storey from the ground.
    pub storeys: Vec<StoreySums>,
    /// Every imbalance of every law.
    pub imbalances: Vec<Imbalance>,
}

impl Statics {
    /// The largest imbalance of `law`, relative; a number that is not finite counts as the largest.
    pub fn worst(&self, law: Law) -> Option<Imbalance> {
        let size =
            |imbalance: &Imbalance| if imbalance.relative.is_nan() { f64::INFINITY } else { imbalance.relative.abs() };
        let of_law = self.imbalances.iter().filter(|imbalance| imbalance.law == law);
        of_law.max_by(|a, b| size(a).total_cmp(&size(b))).copied()
    }

    /// Whether every law is kept within [`CLOSES`].
    pub fn closes(&self) -> bool {
        self.imbalances.iter().all(|imbalance| imbalance.relative.abs() <= CLOSES)
    }
}

/// Checks the equilibrium of `response` on `frame`.
///
/// # Formula
/// With clockwise end moments M, tension N, line position x, storey foot at height z: sum P (H - z) + sum M_foot +
/// sum N x = 0.
///
/// # Units
/// N, N m; relative imbalances have none.
pub fn check(frame: &Frame, response: &Response) -> Statics {
    check_deformed(frame, response, None)
}

/// Checks the equilibrium of `response` on `frame` in the deformed position under `gravity`, given per floor and line
/// from the lowest floor and line A; without gravity, the same as [`check`].
///
/// # Formula
/// As [`check`], with column shear V h + M_foot + M_head - (N - G) drift = 0 for the gravity G of a column, and the gravity
/// W of each floor above a cut times its sway relative to the cut in the overturning moment. Axial forces of the response
/// are those of the lateral load alone.
///
/// # Units
/// N, N m; relative imbalances have none.
pub fn check_deformed(frame: &Frame, response: &Response, gravity: Option<&[f64]>) -> Statics {
    let sway = |floor: usize| response.movement(floor).map_or(0.0, |movement| movement.sway);
    let floor_gravity =
        |floor: usize| gravity.map_or(0.0, |loads| loads[floor * frame.lines()..][..frame.lines()].iter().sum::<f64>());
    let column_gravity = |storey: usize, line: usize| {
        gravity.map_or(0.0, |loads| (storey..frame.storeys()).map(|floor| loads[floor * frame.lines() + line]).sum())
    };
    let scale = Scale::of(frame, response);
    let mut imbalances = Vec::new();
    let mut add = |law, member, sum: f64, scale: f64| {
        let relative = if scale > 0.0 { sum / scale } else { sum };
        imbalances.push(Imbalance { law, member, sum, relative });
    };
    let mut storeys = Vec::new();
    for storey in 0..frame.storeys() {
        let mut sums = storey_sums(frame, response, storey);
        let base_sway = if storey == 0 { 0.0 } else { sway(storey - 1) };
        let leaning = (storey..frame.storeys()).map(|floor| floor_gravity(floor) * (sway(floor) - base_sway));
        sums.overturning_applied += leaning.sum::<f64>();
        let whole = Member::Storey { storey };
        add(Law::StoreyShears, whole, sums.shear_found - sums.shear_applied, scale.shear);
        add(Law::StoreyVertical, whole, sums.axial_sum, scale.vertical);
        let overturning = sums.overturning_applied - sums.by_moments - sums.by_axial;
        add(Law::Overturning, whole, overturning, scale.overturning);
        for line in 0..frame.lines() {
            let joint = Member::Column { storey, line };
            let column = response.column(storey, line);
            let drift = response.movement(storey).map_or(0.0, |movement| movement.drift);
            let leaning = match gravity {
                Some(_) => (column.axial - column_gravity(storey, line)) * drift,
                None => 0.0,
            };
            let member = column.shear * frame.storey_height(storey) + column.foot + column.head - leaning;
            add(Law::JointMoments, joint, joint_moment(frame, response, storey, line), scale.moment);
            add(Law::JointVertical, joint, joint_vertical(frame, response, storey, line), scale.vertical);
            add(Law::MemberShears, joint, member, scale.moment);
        }
        for (bay, beam) in response.floor_beams(storey).iter().enumerate() {
            let member = beam.shear * frame.bay_width(bay) - beam.left - beam.right;
            add(Law::MemberShears, Member::Beam { floor: storey, bay }, member, scale.moment);
        }
        storeys.push(sums);
    }
    Statics { storeys, imbalances }
}

struct Scale {
    moment: f64,
    shear: f64,
    vertical: f64,
    overturning: f64,
}

impl Scale {
    fn of(frame: &Frame, response: &Response) -> Self {
        let storeys = 0..frame.storeys();
        let largest = |values: &mut dyn Iterator<Item = f64>| values.map(f64::abs).fold(0.0, f64::max);
        let shear = largest(&mut storeys.clone().map(|storey| frame.storey_shear(storey)));
        let overturning =
            largest(&mut storeys.clone().map(|storey| frame.overturning_above(frame.storey_base(storey))));
        let columns = storeys.flat_map(|storey| response.storey_columns(storey));
        let vertical = largest(&mut columns.map(|column| column.axial));
        Self { moment: response.largest_moment(), shear, vertical, overturning }
    }
}

fn storey_sums(frame: &Frame, response: &Response, storey: usize) -> StoreySums {
    let columns = response.storey_columns(storey);
    let about_line_a = columns.iter().enumerate().map(|(line, column)| column.axial * frame.line_position(line));
    let joints = (0..frame.lines()).map(|line| joint_moment(frame, response, storey, line).abs());
    StoreySums {
        shear_applied: frame.storey_shear(storey),
        shear_found: response.storey_shear(storey),
        overturning_applied: frame.overturning_above(frame.storey_base(storey)),
        by_moments: -columns.iter().map(|column| column.foot).sum::<f64>(),
        by_axial: -about_line_a.sum::<f64>(),
        axial_sum: columns.iter().map(|column| column.axial).sum(),
        joint_moment: joints.fold(0.0, f64::max),
    }
}

/// Sum of the end moments at the joint on top of `storey` on `line`.
fn joint_moment(frame: &Frame, response: &Response, storey: usize, line: usize) -> f64 {
    let above = if storey + 1 < frame.storeys() { response.column(storey + 1, line).foot } else { 0.0 };
    let right = if line < frame.bays() { response.beam(storey, line).left } else { 0.0 };
    let left = if line > 0 { response.beam(storey, line - 1).right } else { 0.0 };
    response.column(storey, line).head + above + right + left
}

/// Sum of the vertical forces on the joint on top of `storey` on `line`, up positive.
fn joint_vertical(frame: &Frame, response: &Response, storey: usize, line: usize) -> f64 {
    let above = if storey + 1 < frame.storeys() { response.column(storey + 1, line).axial } else { 0.0 };
    let right = if line < frame.bays() { response.beam(storey, line).shear } else { 0.0 };
    let left = if line > 0 { response.beam(storey, line - 1).shear } else { 0.0 };
    above + right - left - response.column(storey, line).axial
}
