//! Joints that are eliminated at once.

use super::record::WIDEST;

/// `count` joints of a level, from `line` on.
#[derive(Clone, Copy)]
pub(super) struct Group {
    pub line: usize,
    pub count: usize,
}

impl Group {
    /// Number of groups that `lines` joints of `size` unknowns fall into.
    #[inline(always)]
    pub(super) fn groups(lines: usize, size: usize) -> usize {
        lines.div_ceil(WIDEST / size)
    }

    /// Group `index` of those that `lines` joints of `size` unknowns fall into, as equal as can be.
    #[inline(always)]
    pub(super) fn of(index: usize, lines: usize, size: usize) -> Self {
        let groups = Self::groups(lines, size);
        let line = index * lines / groups;
        Self { line, count: (index + 1) * lines / groups - line }
    }
}
