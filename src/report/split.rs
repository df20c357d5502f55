//! Where a table too wide for its page is cut: into parts of whole columns, each beginning with the columns that
//! name the row.

/// A column as far as cutting is concerned.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Extent {
    /// Its width.
    pub width: usize,
    /// The head it shares with its neighbours, which stay together where they can; empty if there is none.
    pub under: String,
}

/// The columns of each part, in order, each part as even as the number of parts allows.
///
/// The first `keys` columns stand in every part. `gap` is the room between two columns. A part is wider than `limit`
/// only where the key columns and one other already are.
pub(super) fn parts(columns: &[Extent], keys: usize, gap: usize, limit: usize) -> Vec<Vec<usize>> {
    let head: usize = columns[..keys].iter().map(|column| column.width + gap).sum();
    let room = (limit + gap).saturating_sub(head);
    let bundles = bundles(columns, keys, gap, room);
    let mut best = fill(columns, &bundles, gap, room);
    for narrower in (1..room).rev() {
        let even = fill(columns, &bundles, gap, narrower);
        if even.len() > best.len() {
            break;
        }
        best = even;
    }
    if best.is_empty() {
        best.push(Vec::new());
    }
    best.into_iter().map(|part| (0..keys).chain(part).collect()).collect()
}

/// Fills part after part with whole bundles.
fn fill(columns: &[Extent], bundles: &[Vec<usize>], gap: usize, room: usize) -> Vec<Vec<usize>> {
    let mut parts: Vec<Vec<usize>> = Vec::new();
    let mut used = 0;
    for bundle in bundles {
        let width: usize = bundle.iter().map(|&index| columns[index].width + gap).sum();
        match parts.last_mut() {
            Some(part) if used + width <= room => part.extend(bundle),
            _ => {
                parts.push(bundle.clone());
                used = 0;
            }
        }
        used += width;
    }
    parts
}

/// Neighbours under one head, where they fit into one part; single columns else.
fn bundles(columns: &[Extent], keys: usize, gap: usize, room: usize) -> Vec<Vec<usize>> {
    let mut bundles: Vec<Vec<usize>> = Vec::new();
    for index in keys..columns.len() {
        let same = |bundle: &Vec<usize>| {
            bundle
                .last()
                .is_some_and(|&last| !columns[index].under.is_empty() && columns[last].under == columns[index].under)
        };
        match bundles.last_mut() {
            Some(bundle) if same(bundle) => bundle.push(index),
            _ => bundles.push(vec![index]),
        }
    }
    let fits = |bundle: &[usize]| bundle.iter().map(|&index| columns[index].width + gap).sum::<usize>() <= room;
    bundles
        .into_iter()
        .flat_map(|bundle| match fits(&bundle) {
            true => vec![bundle],
            false => bundle.into_iter().map(|index| vec![index]).collect(),
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn columns(widths: &[usize], under: &[&str]) -> Vec<Extent> {
        widths.iter().zip(under).map(|(&width, under)| Extent { width, under: (*under).into() }).collect()
    }

    #[test]
    fn a_table_that_fits_stays_whole() {
        let columns = columns(&[4, 6, 6], &["", "", ""]);
        assert_eq!(parts(&columns, 1, 2, 20), [[0, 1, 2]]);
        assert_eq!(parts(&columns, 1, 2, 19), [[0, 1], [0, 2]]);
    }

    #[test]
    fn parts_are_even_and_repeat_the_keys() {
        let columns = columns(&[4; 10], &[""; 10]);
        let cut = parts(&columns, 1, 2, 4 + 8 * 6);
        assert_eq!(cut, [vec![0, 1, 2, 3, 4, 5], vec![0, 6, 7, 8, 9]]);
    }

    #[test]
    fn neighbours_under_one_head_stay_together_where_they_can() {
        let columns = columns(&[4; 7], &["", "P", "P", "C", "C", "F", "F"]);
        assert_eq!(parts(&columns, 1, 2, 24), [vec![0, 1, 2], vec![0, 3, 4], vec![0, 5, 6]]);
        assert_eq!(parts(&columns, 1, 2, 10).len(), 6);
    }
}
