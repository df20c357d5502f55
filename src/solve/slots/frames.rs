//! The frames as the kernel reads them, level by level.

use crate::lane::Lane;

/// `W` frames of one shape.
#[derive(Clone, Copy)]
pub(super) struct Frames<'a, const W: usize> {
    pub storeys: usize,
    /// E I/h of the columns, N m.
    pub columns: &'a [[f64; W]],
    /// E A of the columns, N; this and all that follows on rises is empty where joints only turn.
    pub axial: &'a [[f64; W]],
    /// E I/L of the beams, N m.
    pub beams: &'a [[f64; W]],
    /// Fixity of the feet.
    pub rho: &'a [[f64; W]],
    /// Storey shears, N.
    pub shear: &'a [[f64; W]],
    /// Storey heights, m.
    pub height: &'a [[f64; W]],
    /// l/L of each bay.
    pub slope: &'a [[f64; W]],
    /// l^2/(18 h) of each storey, m.
    pub strain: &'a [[f64; W]],
}

impl<'a, const W: usize> Frames<'a, W> {
    /// The level of a storey, whose joints have `B` unknowns; `lines` is given where the compiler knows it.
    #[inline(always)]
    pub(super) fn level<const B: usize>(&self, storey: usize, lines: usize) -> Level<'a, W> {
        let (roof, bays, rises) = (storey + 1 == self.storeys, lines - 1, B > 1);
        let columns = storey * lines..(storey + 1) * lines;
        let above = if roof { 0..0 } else { columns.end..columns.end + lines };
        Level {
            columns: &self.columns[columns.clone()],
            columns_above: &self.columns[above.clone()],
            axial: if rises { &self.axial[columns] } else { &[] },
            axial_above: if rises { &self.axial[above] } else { &[] },
            beams: &self.beams[storey * bays..(storey + 1) * bays],
            rho: if storey == 0 { &self.rho[..lines] } else { &[] },
            shear: &self.shear[storey..],
            height: &self.height[storey..],
            slope: if rises { &self.slope[..bays] } else { &[] },
            strain: if rises { &self.strain[storey..] } else { &[] },
        }
    }
}

/// A storey and the floor on top of it.
pub(super) struct Level<'a, const W: usize> {
    columns: &'a [[f64; W]],
    /// The columns above the floor; none at the roof.
    columns_above: &'a [[f64; W]],
    axial: &'a [[f64; W]],
    axial_above: &'a [[f64; W]],
    beams: &'a [[f64; W]],
    /// None above the ground storey.
    rho: &'a [[f64; W]],
    shear: &'a [[f64; W]],
    height: &'a [[f64; W]],
    slope: &'a [[f64; W]],
    strain: &'a [[f64; W]],
}

impl<const W: usize> Level<'_, W> {
    #[inline(always)]
    pub(super) fn is_ground(&self) -> bool {
        !self.rho.is_empty()
    }

    #[inline(always)]
    pub(super) fn is_roof(&self) -> bool {
        self.columns_above.is_empty()
    }

    #[inline(always)]
    pub(super) fn bays(&self) -> usize {
        self.beams.len()
    }

    /// E I/h of a column, N m.
    #[inline(always)]
    pub(super) fn column<L: Lane<W>>(&self, line: usize) -> L {
        L::load(&self.columns[line])
    }

    /// E I/h of the column above the floor, N m.
    #[inline(always)]
    pub(super) fn column_above<L: Lane<W>>(&self, line: usize) -> L {
        L::load(&self.columns_above[line])
    }

    /// E A l^2/(18 h) of a column, N m.
    #[inline(always)]
    pub(super) fn axial<L: Lane<W>>(&self, line: usize) -> L {
        L::load(&self.axial[line]) * L::load(&self.strain[0])
    }

    /// E A l^2/(18 h) of the column above the floor, N m.
    #[inline(always)]
    pub(super) fn axial_above<L: Lane<W>>(&self, line: usize) -> L {
        L::load(&self.axial_above[line]) * L::load(&self.strain[1])
    }

    /// E I/L of a beam, N m.
    #[inline(always)]
    pub(super) fn beam<L: Lane<W>>(&self, bay: usize) -> L {
        L::load(&self.beams[bay])
    }

    /// l/L of a bay.
    #[inline(always)]
    pub(super) fn slope<L: Lane<W>>(&self, bay: usize) -> L {
        L::load(&self.slope[bay])
    }

    /// Fixity of a foot.
    #[inline(always)]
    pub(super) fn rho<L: Lane<W>>(&self, line: usize) -> L {
        L::load(&self.rho[line])
    }

    /// Storey height, m.
    #[inline(always)]
    pub(super) fn height<L: Lane<W>>(&self) -> L {
        L::load(&self.height[0])
    }

    /// -V h/6 of the storey, N m.
    #[inline(always)]
    pub(super) fn push<L: Lane<W>>(&self) -> L {
        L::load(&self.shear[0]) * L::load(&self.height[0]) * L::splat(-1.0 / 6.0)
    }

    /// -V h/6 of the storey above, N m.
    #[inline(always)]
    pub(super) fn push_above<L: Lane<W>>(&self) -> L {
        L::load(&self.shear[1]) * L::load(&self.height[1]) * L::splat(-1.0 / 6.0)
    }
}
