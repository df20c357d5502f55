//! How many operations a frame takes at least, whoever does them.

use crate::assembly::{Numbering, Symmetric};
use crate::frames::Shape;
use crate::{Failed, Joint, frames};
use std::collections::BTreeSet;

/// The rows below the diagonal that are not zero, column by column.
struct Pattern {
    columns: Vec<BTreeSet<usize>>,
    entries: usize,
}

impl Symmetric for Pattern {
    fn put(&mut self, row: usize, column: usize, _value: f64) {
        self.entries += 1;
        if row > column {
            self.columns[column].insert(row);
        }
    }
}

/// Additions and multiplications (a division counts as one) per frame of a shape, in the peers' order of unknowns.
///
/// # Formula
/// One per entry of the matrix to assemble it; with m rows below the diagonal of a factor's column, fill included, one
/// reciprocal, m products and m (m + 1)/2 products and differences to eliminate, 4 m + 1 for the load forwards and
/// backwards; 7 per member for its end moments, 2 more for a beam whose joints fall.
///
/// # Errors
/// Those of [`frames::members`].
pub fn operations(joint: Joint, shape: Shape) -> Result<usize, Failed> {
    let numbering = Numbering::new(joint, shape.storeys, shape.bays);
    let order = numbering.order();
    let mut pattern = Pattern { columns: vec![BTreeSet::new(); order], entries: 0 };
    let example = frames::members(shape, 1)?;
    numbering.assemble(&example[0], &mut pattern, &mut vec![0.0; order]);
    let assembly = pattern.entries;
    let (columns, beams) = (shape.storeys * (shape.bays + 1), shape.storeys * shape.bays);
    let per_beam = match joint {
        Joint::Rotation => 7,
        Joint::RiseAndRotation => 9,
    };
    let eliminated: usize = below(pattern.columns).iter().map(|m| 1 + m + m * (m + 1) + 4 * m + 1).sum();
    Ok(assembly + eliminated + 7 * columns + per_beam * beams)
}

/// Rows below the diagonal of each column of the factor: those of the matrix, and those that the columns bring whose
/// first row it is.
fn below(mut columns: Vec<BTreeSet<usize>>) -> Vec<usize> {
    let mut counts = Vec::with_capacity(columns.len());
    for column in 0..columns.len() {
        let mut rows = std::mem::take(&mut columns[column]);
        counts.push(rows.len());
        if let Some(parent) = rows.pop_first() {
            columns[parent].extend(rows);
        }
    }
    counts
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn fill_is_counted() {
        // An arrow whose head comes first fills wholly, one whose head comes last not at all.
        let first = vec![BTreeSet::from([1, 2, 3]), BTreeSet::new(), BTreeSet::new(), BTreeSet::new()];
        assert_eq!(below(first), [3, 2, 1, 0]);
        let last = vec![BTreeSet::from([3]), BTreeSet::from([3]), BTreeSet::from([3]), BTreeSet::new()];
        assert_eq!(below(last), [1, 1, 1, 0]);
    }

    #[test]
    fn one_storey_of_one_bay_by_hand() -> Result<(), Failed> {
        // Unknowns phi, theta A, theta B, all coupled: m = 2, 1, 0. Six entries; 1 + 2 + 6 + 8 + 1, 1 + 1 + 2 + 4 + 1 and
        // 2; two columns and a beam at 7.
        let found = operations(Joint::Rotation, Shape { bays: 1, storeys: 1 })?;
        assert_eq!(found, 6 + 18 + 9 + 2 + 21);
        Ok(())
    }
}
