//! Lanes in memory.

use std::fmt;
use std::ops::{Deref, DerefMut};

/// Rows of `W` numbers, one number per frame; the first row starts on a cache line, so that no row of 1, 2, 4 or 8 lies
/// across two.
pub struct Rows<const W: usize> {
    /// The rows, after up to seven numbers of padding.
    store: Vec<f64>,
    /// Where the first row starts.
    start: usize,
    /// Number of rows.
    count: usize,
}

/// Bytes of a cache line.
const LINE: usize = 64;

impl<const W: usize> Rows<W> {
    /// `count` rows of zeros.
    pub fn zeros(count: usize) -> Self {
        let padding = LINE / size_of::<f64>() - 1;
        let store = vec![0.0; count * W + padding];
        let start = store.as_ptr().align_offset(LINE).min(padding);
        Self { store, start, count }
    }
}

impl<const W: usize> Deref for Rows<W> {
    type Target = [[f64; W]];
    #[inline(always)]
    fn deref(&self) -> &Self::Target {
        // The range always exists. Rows that a method does not use cost it nothing, since taking them cannot fail.
        self.store.get(self.start..self.start + self.count * W).unwrap_or_default().as_chunks().0
    }
}

impl<const W: usize> DerefMut for Rows<W> {
    #[inline(always)]
    fn deref_mut(&mut self) -> &mut Self::Target {
        self.store.get_mut(self.start..self.start + self.count * W).unwrap_or_default().as_chunks_mut().0
    }
}

impl<const W: usize> Clone for Rows<W> {
    fn clone(&self) -> Self {
        self.iter().copied().collect()
    }
}

impl<const W: usize> Default for Rows<W> {
    fn default() -> Self {
        Self::zeros(0)
    }
}

impl<const W: usize> FromIterator<[f64; W]> for Rows<W> {
    fn from_iter<I: IntoIterator<Item = [f64; W]>>(rows: I) -> Self {
        let rows: Vec<_> = rows.into_iter().collect();
        let mut own = Self::zeros(rows.len());
        own.copy_from_slice(&rows);
        own
    }
}

impl<const W: usize> PartialEq for Rows<W> {
    fn eq(&self, other: &Self) -> bool {
        **self == **other
    }
}

impl<const W: usize> fmt::Debug for Rows<W> {
    fn fmt(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.debug_list().entries(self.iter()).finish()
    }
}

impl<'a, const W: usize> IntoIterator for &'a Rows<W> {
    type Item = &'a [f64; W];
    type IntoIter = std::slice::Iter<'a, [f64; W]>;
    fn into_iter(self) -> Self::IntoIter {
        self.iter()
    }
}
