//! Column feet of drawn frames.

use crate::frame::Feet;
use crate::lane::Lane;
use crate::response::Members;

/// How the feet of drawn frames are held.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum DrawnFeet {
    /// All alike, whatever the sizes: 1 fixed, 0 pinned.
    Held { fixity: f64 },
    /// Springs of stated stiffness, N m/rad, one per line.
    Stated(Vec<f64>),
    /// Springs that follow the columns above them.
    Relative,
}

impl From<&Feet> for DrawnFeet {
    fn from(feet: &Feet) -> Self {
        match feet {
            Feet::Fixed => Self::Held { fixity: 1.0 },
            Feet::Pinned => Self::Held { fixity: 0.0 },
            Feet::Springs(springs) => Self::Stated(springs.clone()),
        }
    }
}

impl DrawnFeet {
    /// Fills the feet of `members`, whose lowest columns must be known. `factor` multiplies stated springs, or is the
    /// ratio of relative ones to 4 E I/h of their column.
    #[inline(always)]
    pub(super) fn fill<L: Lane<W>, const W: usize>(&self, factor: L, members: &mut Members<W>) {
        let lines = members.lines();
        if let Self::Held { fixity } = *self {
            for line in 0..lines {
                members.foot_rho[line] = [fixity; W];
            }
            members.foot_fixity = [fixity; W];
            members.ground_hinge = [0.5 * fixity; W];
            return;
        }
        let (mut springs, mut columns) = (L::splat(0.0), L::splat(0.0));
        for line in 0..lines {
            let column = L::load(&members.column_stiffness[line]);
            let stiff = L::splat(4.0) * column;
            let spring = match self {
                Self::Stated(springs) => L::splat(springs[line]) * factor,
                _ => factor * stiff,
            };
            (spring / (spring + stiff)).store(&mut members.foot_rho[line]);
            springs = springs + spring;
            columns = columns + column;
        }
        (springs / (springs + columns)).store(&mut members.foot_fixity);
        members.ground_hinge = [0.5; W];
    }
}
