//! Symmetric positive definite block-tridiagonal systems: cost grows linearly with the number of levels.

use nalgebra::{Cholesky, DMatrix, DVector, Dyn, SymmetricEigen};

/// A pivot smaller than this, relative to the unknown's own diagonal term, counts as no stiffness at all.
///
/// Rounding leaves about 1e-16 times the length of a row where a pivot should be zero; frames whose members differ in
/// stiffness by 1e12 still have pivots of 1e-12.
const PIVOT_FLOOR: f64 = 1e-13;

/// The system A x = b with A symmetric, blocks on the diagonal and next to it.
///
/// # Units
/// Choose the unknowns so that all equations have one unit; the residual is formed over all of them.
#[derive(Debug, Clone)]
pub struct BlockTridiagonal {
    diagonal: Vec<DMatrix<f64>>,
    /// `below[k]`: rows of level k + 1, columns of level k.
    below: Vec<DMatrix<f64>>,
    load: Vec<DVector<f64>>,
}

/// The solution, level by level, and how well it fits.
#[derive(Debug, Clone)]
pub struct Solution {
    /// Unknowns of each level.
    pub levels: Vec<DVector<f64>>,
    /// Largest |b - A x| over largest |b| (0 without load), after one step of iterative refinement.
    pub residual: f64,
}

/// The matrix resists some movement not at all.
#[derive(Debug, Clone)]
pub struct Singular {
    /// That movement, level by level, up to the level where it was found.
    pub mode: Vec<DVector<f64>>,
}

struct Factors {
    /// Lower Cholesky factor L of each reduced diagonal block.
    lower: Vec<DMatrix<f64>>,
    /// L^-1 times the transposed block below.
    across: Vec<DMatrix<f64>>,
}

impl BlockTridiagonal {
    /// A system of zeros with `sizes[k]` unknowns in level k.
    pub fn new(sizes: &[usize]) -> Self {
        Self {
            diagonal: sizes.iter().map(|size| DMatrix::zeros(*size, *size)).collect(),
            below: sizes.windows(2).map(|pair| DMatrix::zeros(pair[1], pair[0])).collect(),
            load: sizes.iter().map(|size| DVector::zeros(*size)).collect(),
        }
    }

    /// Adds a symmetric member matrix: `unknowns[i]` is the (level, index) of its row i, `None` for a held movement.
    ///
    /// # Assumptions
    /// The unknowns lie in one level or in two neighbouring levels.
    pub fn add<const N: usize>(&mut self, unknowns: [Option<(usize, usize)>; N], matrix: [[f64; N]; N]) {
        for (row, values) in unknowns.iter().zip(&matrix) {
            for (column, value) in unknowns.iter().zip(values) {
                let (Some((level, i)), Some((other, j))) = (*row, *column) else { continue };
                if level == other {
                    self.diagonal[level][(i, j)] += value;
                } else if level == other + 1 {
                    self.below[other][(i, j)] += value;
                } else {
                    debug_assert!(other == level + 1, "unknowns of levels {level} and {other} are no neighbours");
                }
            }
        }
    }

    /// Adds to the right-hand side.
    pub fn add_load(&mut self, (level, index): (usize, usize), value: f64) {
        self.load[level][index] += value;
    }

    /// Solves the system by block Cholesky elimination from level 0 up, with one step of iterative refinement.
    ///
    /// # Errors
    /// [`Singular`] where a pivot is not safely positive.
    pub fn solve(&self) -> Result<Solution, Singular> {
        let factors = self.factorise()?;
        let mut levels = factors.solve(&self.load);
        let correction = factors.solve(&self.misfit(&levels));
        levels.iter_mut().zip(&correction).for_each(|(level, change)| *level += change);
        let largest = |vectors: &[DVector<f64>]| vectors.iter().map(|vector| vector.amax()).fold(0.0, f64::max);
        let (misfit, load) = (self.misfit(&levels), largest(&self.load));
        let finite = misfit.iter().all(|level| level.iter().all(|value| value.is_finite()));
        let residual = match (finite, load > 0.0) {
            (false, _) => f64::INFINITY,
            (true, true) => largest(&misfit) / load,
            (true, false) => 0.0,
        };
        Ok(Solution { levels, residual })
    }

    /// Whether every movement is resisted.
    pub fn is_positive_definite(&self) -> bool {
        self.factorise().is_ok()
    }

    fn factorise(&self) -> Result<Factors, Singular> {
        let mut factors = Factors { lower: Vec::new(), across: Vec::new() };
        for (level, diagonal) in self.diagonal.iter().enumerate() {
            let mut reduced = diagonal.clone();
            if let Some(across) = factors.across.last() {
                reduced.gemm_tr(-1.0, across, across, 1.0);
            }
            let Some(lower) = cholesky(&reduced, diagonal) else {
                return Err(Singular { mode: factors.complete_mode(weakest(&reduced, diagonal)) });
            };
            if let Some(below) = self.below.get(level) {
                let mut across = below.transpose();
                lower.solve_lower_triangular_unchecked_mut(&mut across);
                factors.across.push(across);
            }
            factors.lower.push(lower);
        }
        Ok(factors)
    }

    /// b - A x.
    fn misfit(&self, levels: &[DVector<f64>]) -> Vec<DVector<f64>> {
        let mut misfit = self.load.clone();
        for (level, rest) in misfit.iter_mut().enumerate() {
            rest.gemv(-1.0, &self.diagonal[level], &levels[level], 1.0);
            if level > 0 {
                rest.gemv(-1.0, &self.below[level - 1], &levels[level - 1], 1.0);
            }
            if let Some(below) = self.below.get(level) {
                rest.gemv_tr(-1.0, below, &levels[level + 1], 1.0);
            }
        }
        misfit
    }
}

impl Factors {
    fn solve(&self, load: &[DVector<f64>]) -> Vec<DVector<f64>> {
        let mut levels = load.to_vec();
        for level in 0..levels.len() {
            if level > 0 {
                let (done, rest) = levels.split_at_mut(level);
                rest[0].gemv_tr(-1.0, &self.across[level - 1], &done[level - 1], 1.0);
            }
            self.lower[level].solve_lower_triangular_unchecked_mut(&mut levels[level]);
        }
        for level in (0..levels.len()).rev() {
            self.back_substitute(&mut levels, level);
        }
        levels
    }

    fn back_substitute(&self, levels: &mut [DVector<f64>], level: usize) {
        let (rest, done) = levels.split_at_mut(level + 1);
        if let Some(above) = done.first() {
            rest[level].gemv(-1.0, &self.across[level], above, 1.0);
        }
        self.lower[level].tr_solve_lower_triangular_unchecked_mut(&mut rest[level]);
    }

    /// Extends a free movement of the level above the factorised ones down to level 0.
    fn complete_mode(&self, top: DVector<f64>) -> Vec<DVector<f64>> {
        let mut mode: Vec<_> = self.lower.iter().map(|lower| DVector::zeros(lower.nrows())).collect();
        mode.push(top);
        for level in (0..self.lower.len()).rev() {
            self.back_substitute(&mut mode, level);
        }
        mode
    }
}

/// Lower Cholesky factor of `reduced`, or `None` where a pivot falls under [`PIVOT_FLOOR`] times `diagonal`'s.
fn cholesky(reduced: &DMatrix<f64>, diagonal: &DMatrix<f64>) -> Option<DMatrix<f64>> {
    let lower = Cholesky::<f64, Dyn>::new(reduced.clone())?.unpack();
    let safe = |index: usize| lower[(index, index)].powi(2) > PIVOT_FLOOR * diagonal[(index, index)];
    (0..lower.nrows()).all(safe).then_some(lower)
}

/// The movement that `reduced` resists least, measured against `diagonal`.
fn weakest(reduced: &DMatrix<f64>, diagonal: &DMatrix<f64>) -> DVector<f64> {
    let scale = DVector::from_fn(reduced.nrows(), |index, _| {
        let own = diagonal[(index, index)];
        if own > 0.0 { own.sqrt().recip() } else { 1.0 }
    });
    let scaled = DMatrix::from_fn(reduced.nrows(), reduced.ncols(), |i, j| scale[i] * reduced[(i, j)] * scale[j]);
    let eigen = SymmetricEigen::new(scaled);
    let least = eigen.eigenvalues.imin();
    eigen.eigenvectors.column(least).component_mul(&scale)
}
