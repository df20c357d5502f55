//! faer's sparse Cholesky factorisation, its analysis of the pattern done once per shape.

use crate::assembly::{Numbering, Symmetric};
use crate::{Failed, Peer};
use faer::dyn_stack::{MemBuffer, MemStack};
use faer::linalg::cholesky::llt::factor::LltRegularization;
use faer::sparse::linalg::SupernodalThreshold;
use faer::sparse::linalg::cholesky::{
    CholeskySymbolicParams, SymbolicCholesky, SymmetricOrdering, factorize_symbolic_cholesky,
};
use faer::sparse::{SparseColMatRef, SymbolicSparseColMat};
use faer::{Conj, MatMut, Par, Side};
use swaybound::response::{Forces, Members};

/// From which work per entry of the factor, in units of 40 operations, faer goes by blocks of columns: here faster for
/// bands wider than about 15.
const SUPERNODES: SupernodalThreshold = SupernodalThreshold(0.2);

/// Solves frames of one shape as sparse systems, in room that is used again.
pub struct Sparse {
    numbering: Numbering,
    pattern: SymbolicSparseColMat<usize>,
    analysis: SymbolicCholesky<usize>,
    entries: Entries,
    factors: Vec<f64>,
    moved: Vec<f64>,
    scratch: MemBuffer,
}

/// The upper triangle, stored column by column and written in the order of assembly.
struct Entries {
    /// Where the entries of the assembly's order stand.
    places: Vec<usize>,
    values: Vec<f64>,
    written: usize,
}

impl Symmetric for Entries {
    #[inline(always)]
    fn put(&mut self, _row: usize, _column: usize, value: f64) {
        self.values[self.places[self.written]] = value;
        self.written += 1;
    }
}

/// The places of entries in the upper triangle, (column, row), in the order of assembly.
struct Places(Vec<(usize, usize)>);

impl Symmetric for Places {
    fn put(&mut self, row: usize, column: usize, _value: f64) {
        self.0.push((row, column));
    }
}

impl Sparse {
    /// Room for frames of the shape of `example`, numbered so.
    ///
    /// # Errors
    /// [`Failed::Refused`] where the pattern cannot be analysed.
    pub fn new(numbering: Numbering, example: &Members<1>) -> Result<Self, Failed> {
        let order = numbering.order();
        let mut places = Places(Vec::new());
        numbering.assemble(example, &mut places, &mut vec![0.0; order]);
        let mut sorted = places.0.clone();
        sorted.sort_unstable();
        let starts = (0..=order).map(|column| sorted.partition_point(|place| place.0 < column)).collect();
        let rows = sorted.iter().map(|place| place.1).collect();
        let pattern = SymbolicSparseColMat::new_checked(order, order, starts, None, rows);
        let analysis = factorize_symbolic_cholesky(
            pattern.as_ref(),
            Side::Upper,
            SymmetricOrdering::Identity,
            CholeskySymbolicParams { supernodal_flop_ratio_threshold: SUPERNODES, ..Default::default() },
        )
        .map_err(|_| Failed::Refused { peer: "faer" })?;
        let places = places.0.iter().map(|place| sorted.partition_point(|other| other < place)).collect();
        let scratch = analysis
            .factorize_numeric_llt_scratch::<f64>(Par::Seq, Default::default())
            .or(analysis.solve_in_place_scratch::<f64>(1, Par::Seq));
        Ok(Self {
            numbering,
            entries: Entries { places, values: vec![0.0; sorted.len()], written: 0 },
            factors: vec![0.0; analysis.len_val()],
            moved: vec![0.0; order],
            scratch: MemBuffer::new(scratch),
            pattern,
            analysis,
        })
    }
}

impl Peer<1> for Sparse {
    fn solve(&mut self, members: &Members<1>, forces: &mut Forces<1>) -> Result<(), Failed> {
        self.entries.written = 0;
        self.numbering.assemble(members, &mut self.entries, &mut self.moved);
        let matrix = SparseColMatRef::new(self.pattern.as_ref(), &self.entries.values);
        let scratch = MemStack::new(&mut self.scratch);
        let factors = self
            .analysis
            .factorize_numeric_llt(
                &mut self.factors,
                matrix,
                Side::Upper,
                LltRegularization::default(),
                Par::Seq,
                scratch,
                Default::default(),
            )
            .map_err(|_| Failed::NotDefinite { peer: "faer" })?;
        let order = self.moved.len();
        let moved = MatMut::from_column_major_slice_mut(&mut self.moved, order, 1);
        factors.solve_in_place_with_conj(Conj::No, moved, Par::Seq, scratch);
        self.numbering.recover(members, &self.moved, forces);
        Ok(())
    }
}
