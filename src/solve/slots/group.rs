//! Unknowns that are eliminated at once.

use super::record::WIDEST;

/// Up to so many groups a level are written out, not looped over: then the compiler knows the size of each, and lays out the
/// loops within. More would make the code long and gain little.
pub(super) const WRITTEN_OUT: usize = 3;

/// `count` joints of a level, from `line` on, and behind a level's last joints the storey above, where there is one.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Group {
    pub line: usize,
    pub count: usize,
    pub storey: bool,
}

impl Group {
    /// Number of groups that a level of `lines` joints of `size` unknowns falls into, the storey above counted if there is one.
    #[inline(always)]
    pub(super) fn groups(lines: usize, size: usize, storey: bool) -> usize {
        match size {
            1 => (lines + usize::from(storey)).div_ceil(WIDEST),
            _ => lines,
        }
    }

    /// Group `index` of these, as equal as can be.
    #[inline(always)]
    pub(super) fn of(index: usize, lines: usize, size: usize, storey: bool) -> Self {
        let groups = Self::groups(lines, size, storey);
        let last = storey && index + 1 == groups;
        let (line, end) = match size {
            1 => {
                let unknowns = lines + usize::from(storey);
                (index * unknowns / groups, (index + 1) * unknowns / groups - usize::from(last))
            }
            _ => (index, index + 1),
        };
        Self { line, count: end - line, storey: last }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn groups_cover_a_level_and_are_never_too_wide() {
        for size in [1, 2] {
            for lines in 2..=101 {
                for storey in [false, true] {
                    let groups = Group::groups(lines, size, storey);
                    let mut next = 0;
                    for index in 0..groups {
                        let group = Group::of(index, lines, size, storey);
                        let width = group.count * size + usize::from(group.storey);
                        assert!(group.line == next && group.count > 0 && width <= WIDEST, "{lines} lines: {group:?}");
                        assert_eq!(group.storey, storey && index + 1 == groups);
                        next += group.count;
                    }
                    assert_eq!(next, lines);
                }
            }
        }
    }
}
