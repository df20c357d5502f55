//! nalgebra's dense Cholesky factorisation.

use crate::assembly::{Numbering, Symmetric};
use crate::{Failed, Peer};
use nalgebra::{Cholesky, DMatrix, DVector};
use swaybound::response::{Forces, Members};

/// Solves frames of one shape as dense systems, in room that is used again.
pub struct Dense {
    numbering: Numbering,
    matrix: DMatrix<f64>,
    moved: DVector<f64>,
}

impl Symmetric for DMatrix<f64> {
    #[inline(always)]
    fn put(&mut self, row: usize, column: usize, value: f64) {
        self[(row, column)] = value;
    }
}

impl Dense {
    /// Room for frames numbered so.
    pub fn new(numbering: Numbering) -> Self {
        let order = numbering.order();
        Self { numbering, matrix: DMatrix::zeros(order, order), moved: DVector::zeros(order) }
    }
}

impl Peer<1> for Dense {
    fn solve(&mut self, members: &Members<1>, forces: &mut Forces<1>) -> Result<(), Failed> {
        // The factorisation takes the matrix and gives it back: nothing is allocated.
        let mut matrix = std::mem::replace(&mut self.matrix, DMatrix::zeros(0, 0));
        matrix.fill(0.0);
        self.numbering.assemble(members, &mut matrix, self.moved.as_mut_slice());
        let factors = Cholesky::new(matrix).ok_or(Failed::NotDefinite { peer: "nalgebra" })?;
        factors.solve_mut(&mut self.moved);
        self.matrix = factors.unpack_dirty();
        self.numbering.recover(members, self.moved.as_slice(), forces);
        Ok(())
    }
}
