//! Equilibrium of many frames at a time: one number per frame, for a batch to refuse what cannot be true.

use crate::lane::Lane;
use crate::response::{Forces, MemberRows, Members};

/// The largest relative imbalance of each frame's forces: of the moments at any joint, over the frame's largest end moment;
/// of the vertical forces at any joint, over its largest axial force; of the end moments of any storey's columns and V h, over
/// its largest V h; of the moment on any pinned foot. The overturning moments follow from these. Infinity where any of these numbers is none or infinite.
///
/// # Formula
/// At a joint sum M = 0 and N_above + S_right - S_left - N = 0, beam shear S = (M_left + M_right) / L; in a storey
/// sum (M_foot + M_head) + V h = 0.
///
/// # Assumptions
/// Undeformed position, as [`super::check`]. Equilibrium is all that is seen: not drifts, nor wrong stiffness, foot springs
/// or rises, nor moment moved from one foot to another. Where axial forces were made from beam shears their law is an
/// identity.
///
/// # References
/// Equilibrium of joints and storeys: common practice.
#[inline(always)]
pub fn imbalance<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &Forces<W>) -> L {
    let (rhos, members) = (&members.foot_rho[..], &members.rows());
    let (mut moments, mut vertical, mut storeys) = (Law::kept(), Law::kept(), Law::kept());
    let columns = Columns { foot: &forces.column_foot, head: &forces.column_head, axial: &forces.column_axial };
    let beams = [&*forces.beam_left, &*forces.beam_right];
    let mut on_left = Bay::none();
    for line in 0..members.lines() {
        let on_right = if line < members.bays { Bay::of(members, line) } else { Bay::none() };
        joints_of_line::<L, W>(members, line, &columns, beams, [&on_left, &on_right], [&mut moments, &mut vertical]);
        on_left = on_right;
    }
    for storey in 0..members.storeys {
        let turning = L::load(&members.shear[storey]) * L::load(&members.height[storey]);
        let mut sum = turning;
        for column in members.column(storey, 0)..members.column(storey + 1, 0) {
            sum = sum + (L::load(&columns.foot[column]) + L::load(&columns.head[column]));
        }
        storeys.see(sum, turning);
    }
    // The foot moments of the ground storey meet no joint; where a foot is pinned there is none.
    for (foot, rho) in columns.foot.iter().zip(rhos) {
        let (foot, rho) = (L::load(foot), L::load(rho));
        moments.see(rho.if_less(L::splat(f64::MIN_POSITIVE), foot, foot * L::splat(0.0)), foot);
    }
    moments.relative().max(vertical.relative()).max(storeys.relative())
}

struct Columns<'a, const W: usize> {
    foot: &'a [[f64; W]],
    head: &'a [[f64; W]],
    axial: &'a [[f64; W]],
}

/// A bay beside a column line.
struct Bay<L> {
    index: usize,
    per_width: L,
    exists: bool,
}

impl<L> Bay<L> {
    #[inline(always)]
    fn none<const W: usize>() -> Self
    where
        L: Lane<W>,
    {
        Self { index: 0, per_width: L::splat(0.0), exists: false }
    }

    #[inline(always)]
    fn of<const W: usize>(members: &MemberRows<W>, index: usize) -> Self
    where
        L: Lane<W>,
    {
        Self { index, per_width: L::splat(1.0) / L::load(&members.width[index]), exists: true }
    }

    /// Moment at the beam's end on its left or right, and its shear; zeros where there is no bay.
    #[inline(always)]
    fn end<const W: usize>(&self, beams: [&[[f64; W]]; 2], floor: usize, bays: usize, right: bool) -> [L; 2]
    where
        L: Lane<W>,
    {
        if !self.exists {
            return [L::splat(0.0); 2];
        }
        let beam = floor * bays + self.index;
        let ends = [L::load(&beams[0][beam]), L::load(&beams[1][beam])];
        [if right { ends[1] } else { ends[0] }, (ends[0] + ends[1]) * self.per_width]
    }
}

/// The joints of one line, from the roof down.
#[inline(always)]
fn joints_of_line<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    line: usize,
    columns: &Columns<W>,
    beams: [&[[f64; W]]; 2],
    [on_left, on_right]: [&Bay<L>; 2],
    [moments, vertical]: [&mut Law<L>; 2],
) {
    let (mut foot_above, mut axial_above) = (L::splat(0.0), L::splat(0.0));
    for floor in (0..members.storeys).rev() {
        let column = members.column(floor, line);
        let (head, axial) = (L::load(&columns.head[column]), L::load(&columns.axial[column]));
        let [left_moment, left_shear] = on_left.end(beams, floor, members.bays, true);
        let [right_moment, right_shear] = on_right.end(beams, floor, members.bays, false);
        let of_columns = head + foot_above;
        let largest = head.abs().max(foot_above.abs()).max(left_moment.abs().max(right_moment.abs()));
        moments.see(of_columns + left_moment + right_moment, largest);
        vertical.see(axial_above + right_shear - left_shear - axial, axial);
        (foot_above, axial_above) = (L::load(&columns.foot[column]), axial);
    }
}

/// How well a law is kept.
struct Law<L> {
    /// The largest |sum that should be zero|.
    worst: L,
    /// The largest |number| it is measured by.
    scale: L,
    /// 0 as long as every sum is finite, else no number.
    unsound: L,
}

impl<L> Law<L> {
    #[inline(always)]
    fn kept<const W: usize>() -> Self
    where
        L: Lane<W>,
    {
        Self { worst: L::splat(0.0), scale: L::splat(0.0), unsound: L::splat(0.0) }
    }

    #[inline(always)]
    fn see<const W: usize>(&mut self, sum: L, by: L)
    where
        L: Lane<W>,
    {
        self.worst = self.worst.max(sum.abs());
        self.scale = self.scale.max(by.abs());
        self.unsound = self.unsound + sum * L::splat(0.0);
    }

    /// The worst over the scale; where all is zero, zero.
    #[inline(always)]
    fn relative<const W: usize>(&self) -> L
    where
        L: Lane<W>,
    {
        let smallest = L::splat(f64::MIN_POSITIVE);
        let relative = self.worst / self.scale.max(smallest);
        self.unsound.abs().if_less(smallest, relative, L::splat(f64::INFINITY))
    }
}
