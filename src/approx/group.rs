//! Columns of a storey taken four, two or one at a time, where their sums run beside each other or share a division.

/// Work on the columns of a storey.
pub(super) trait Group {
    /// Does the work of the columns on `N` lines from `first`.
    fn take<const N: usize>(&mut self, first: usize);
}

/// Does the work of all `lines`, from the left.
#[inline(always)]
pub(super) fn all(lines: usize, group: &mut impl Group) {
    let mut first = 0;
    while first + 4 <= lines {
        group.take::<4>(first);
        first += 4;
    }
    if first + 2 <= lines {
        group.take::<2>(first);
        first += 2;
    }
    if first < lines {
        group.take::<1>(first);
    }
}
