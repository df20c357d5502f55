//! Drift from column axial strain: the frame bends as a cantilever whose chords are its columns.

use super::{sheet, sums};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{Amount, MemberRows, Members, Step};

/// Adds the chord drift of every storey to the drifts in `drift`.
///
/// # Formula
/// Storey drift = h x (area of the M / (E sum(A c^2)) diagram from the base to the storey's mid-height); M = overturning
/// moment of the forces above, straight between floors, c = distance of a column from the centroid of the areas.
///
/// # Assumptions
/// The columns take the whole overturning moment by axial forces in proportion to A c.
///
/// # References
/// B. Stafford Smith and A. Coull, Tall Building Structures, 1991 (from memory).
#[inline(always)]
pub(super) fn add<L: Lane<W>, const W: usize>(members: &MemberRows<W>, drift: &mut [[f64; W]]) {
    let mut walk = Walk::from_the_base(members);
    for (storey, drift) in drift.iter_mut().enumerate() {
        let rotation: L = walk.up(members, storey).mid_height;
        (L::load(drift) + L::load(&members.height[storey]) * rotation).store(drift);
    }
}

/// The bending line, storey by storey from the ground.
struct Walk<L> {
    /// Overturning moment at the level reached.
    moment: L,
    /// Rotation there.
    rotation: L,
}

/// One storey of the bending line.
struct Stage<L> {
    foot_moment: L,
    head_moment: L,
    mid_height: L,
}

impl<L> Walk<L> {
    #[inline(always)]
    fn from_the_base<const W: usize>(members: &MemberRows<W>) -> Self
    where
        L: Lane<W>,
    {
        let mut moment = L::splat(0.0);
        for storey in 0..members.storeys {
            moment = moment + sums::turning(members, storey);
        }
        Self { moment, rotation: L::splat(0.0) }
    }

    /// Goes up one storey. Between straight ends the mean moment is (foot + head) / 2 over the storey, (3 foot + head) / 4
    /// over its lower half.
    #[inline(always)]
    fn up<const W: usize>(&mut self, members: &MemberRows<W>, storey: usize) -> Stage<L>
    where
        L: Lane<W>,
    {
        let height = L::load(&members.height[storey]);
        let per_stiffness = height / bending_stiffness::<L, W>(members, storey);
        let foot_moment = self.moment;
        let head_moment = foot_moment - L::load(&members.shear[storey]) * height;
        let half = (L::splat(3.0) * foot_moment + head_moment) * L::splat(0.125);
        let mid_height = self.rotation + half * per_stiffness;
        self.rotation = self.rotation + (foot_moment + head_moment) * L::splat(0.5) * per_stiffness;
        self.moment = head_moment;
        Stage { foot_moment, head_moment, mid_height }
    }
}

/// E sum(A c^2) of a storey, N m2.
#[inline(always)]
fn bending_stiffness<L: Lane<W>, const W: usize>(members: &MemberRows<W>, storey: usize) -> L {
    let axial = members.columns_of(members.axial_stiffness, storey);
    let [_, second] = sums::about_centroid(axial, members.position);
    second
}

/// The chord part of a hand calculation.
pub(super) fn steps(frame: &Frame) -> [Step; 2] {
    let frame_members = Members::of(frame);
    let members = &frame_members.rows();
    let mut walk = Walk::<f64>::from_the_base(members);
    let stages: Vec<_> = (0..frame.storeys()).map(|storey| walk.up::<1>(members, storey)).collect();
    let area = |storey, line| frame.column(storey, line).area.unwrap_or(0.0);
    let areas = sheet::by_line(frame, "Column areas A", "As used by the analyses.", Amount::Area, &area);
    let chord = sheet::by_storey(
        frame,
        "Chord drift",
        "c = distance of a column from the centroid of the areas; M = moment of the forces above at foot and head. Rotation \
         from the base up: each storey adds h (M foot + M head) / (2 E ΣA c²), up to its mid-height h (3 M foot + M head) \
         / (8 E ΣA c²). Chord drift = h × rotation at mid-height.",
        &[
            ("E ΣA c²", Amount::BendingStiffness, &|storey| bending_stiffness::<f64, 1>(members, storey)),
            ("M foot", Amount::Moment, &|storey| stages[storey].foot_moment),
            ("M head", Amount::Moment, &|storey| stages[storey].head_moment),
            ("rotation at mid-height", Amount::Rotation, &|storey| stages[storey].mid_height),
            ("chord drift", Amount::Movement, &|storey| frame.storey_height(storey) * stages[storey].mid_height),
        ],
    );
    [areas, chord]
}
