//! Stiffness analysis: joint rotations, vertical joint movements and storey chord rotations; columns stretch and shorten.

use super::model::Model;
use super::{Unsolvable, accept};
use crate::frame::Frame;
use crate::frame::options::AnalysisOptions;
use crate::response::Response;

/// Name of the method in files.
pub const ID: &str = "stiffness";

/// Solves `frame` by the stiffness method with column axial strain, members plain between joint centres.
///
/// See [`analyse_with`].
///
/// # Errors
/// As [`analyse_with`].
pub fn analyse(frame: &Frame) -> Result<Response, Unsolvable> {
    analyse_with(frame, &AnalysisOptions::plain(frame))
}

/// Solves `frame` by the stiffness method with column axial strain and `options`; gravity does not enter.
///
/// # Formula
/// Each member adds its stiffness matrix: bending with end moment M_near = 2 k (2 theta_near + theta_far - 3 psi),
/// k = E I / length, psi = drift / h in a column and (v_left - v_right) / L in a beam, changed by shear deformation, end
/// springs and rigid zones where there are any; axial N = (E A / h) (v_head - v_foot) in a column. The storey chord
/// rotations stand in place of floor sways, which in a tall frame are large against their differences; vertical movements
/// enter divided by the mean storey height. So every equation is in N m.
///
/// # Units
/// N, m, rad; drifts in m.
///
/// # Assumptions
/// Linear elastic plane frame, first order, floors rigid in their own plane (beams do not stretch). `options` must have
/// been made for `frame`.
///
/// # Errors
/// [`Unsolvable`] where a column has no area, sizes are only relative, the frame is a mechanism or the residual is too large.
///
/// # References
/// Direct stiffness method: common practice.
pub fn analyse_with(frame: &Frame, options: &AnalysisOptions) -> Result<Response, Unsolvable> {
    let model = Model::new(frame, options)?;
    let solution = model.assemble().solve().map_err(|singular| model.mechanism(&singular))?;
    let response = model.recover(ID, &model.moved(&solution.levels));
    accept(frame, response.with_residual(solution.residual), None)
}
