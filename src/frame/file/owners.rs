//! Which table each member gets its size from: the last one that selects it.

use std::ops::Range;

/// The members that a table selects: all pairs of its levels and its places, each as ranges in order.
#[derive(Debug)]
pub(super) struct Selection {
    pub levels: Vec<Range<usize>>,
    pub places: Vec<Range<usize>>,
}

impl Selection {
    /// The members at the set flags.
    pub fn new(levels: &[bool], places: &[bool]) -> Self {
        Self { levels: runs(levels), places: runs(places) }
    }

    /// Whether no member is selected.
    pub fn is_empty(&self) -> bool {
        self.levels.is_empty() || self.places.is_empty()
    }
}

fn runs(flags: &[bool]) -> Vec<Range<usize>> {
    let mut start = 0;
    let mut found = Vec::new();
    for group in flags.chunk_by(|a, b| a == b) {
        if group[0] {
            found.push(start..start + group.len());
        }
        start += group.len();
    }
    found
}

/// The last table that selects a member, and the one before it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Owner {
    pub last: usize,
    pub replaced: Option<usize>,
}

/// The owner of every member, level by level.
///
/// Tables are read from the last to the first, and members that have both their tables are skipped, so that the work
/// grows with the number of tables and of members, not with their product.
pub(super) fn owners(selections: &[&Selection], levels: usize, places: usize) -> Vec<Option<Owner>> {
    let mut owners: Vec<Option<Owner>> = vec![None; levels * places];
    let mut open_levels = Skip::new(levels);
    let mut open_places = vec![Skip::new(places); levels];
    for (number, selection) in selections.iter().enumerate().rev() {
        open_levels.visit(&selection.levels, |level| {
            let row = &mut owners[level * places..][..places];
            let open = &mut open_places[level];
            open.visit(&selection.places, |place| match &mut row[place] {
                Some(owner) => {
                    owner.replaced = Some(number);
                    true
                }
                empty => {
                    *empty = Some(Owner { last: number, replaced: None });
                    false
                }
            });
            open.is_closed()
        });
    }
    owners
}

/// A row of things that are closed one after the other; closed ones are stepped over.
#[derive(Debug, Clone)]
struct Skip {
    /// For each thing itself or one to its right, up to the next open one.
    next: Vec<usize>,
}

impl Skip {
    fn new(count: usize) -> Self {
        Self { next: (0..=count).collect() }
    }

    /// The first open thing from `at` on; the count where none is left.
    fn open_from(&mut self, at: usize) -> usize {
        let mut at = at;
        while self.next[at] != at {
            self.next[at] = self.next[self.next[at]];
            at = self.next[at];
        }
        at
    }

    fn is_closed(&mut self) -> bool {
        self.open_from(0) + 1 == self.next.len()
    }

    /// Calls `close` for every open thing in `ranges` and closes those for which it gives true.
    fn visit(&mut self, ranges: &[Range<usize>], mut close: impl FnMut(usize) -> bool) {
        for range in ranges {
            let mut at = self.open_from(range.start);
            while at < range.end {
                if close(at) {
                    self.next[at] = at + 1;
                }
                at = self.open_from(at + 1);
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::collection::vec;
    use proptest::prelude::*;

    /// The same by walking over every member of every table in order.
    fn plainly(tables: &[(Vec<bool>, Vec<bool>)]) -> Vec<Option<Owner>> {
        let (levels, places) = (5, 4);
        let mut owners: Vec<Option<Owner>> = vec![None; levels * places];
        for (number, table) in tables.iter().enumerate() {
            for (index, owner) in owners.iter_mut().enumerate() {
                if table.0[index / places] && table.1[index % places] {
                    *owner = Some(Owner { last: number, replaced: owner.map(|owner| owner.last) });
                }
            }
        }
        owners
    }

    proptest! {
        #[test]
        fn owners_are_those_of_the_plain_walk(tables in vec((vec(any::<bool>(), 5), vec(any::<bool>(), 4)), 0..12)) {
            let selections: Vec<_> = tables.iter().map(|(levels, places)| Selection::new(levels, places)).collect();
            let found = owners(&selections.iter().collect::<Vec<_>>(), 5, 4);
            prop_assert_eq!(found, plainly(&tables));
            for (selection, (levels, places)) in selections.iter().zip(&tables) {
                prop_assert_eq!(selection.is_empty(), !(levels.contains(&true) && places.contains(&true)));
            }
        }
    }
}
