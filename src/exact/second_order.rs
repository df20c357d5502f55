//! Second-order elastic analysis: equilibrium in the deformed position under gravity and lateral forces.

use super::model::Model;
use super::{Unsolvable, accept};
use crate::frame::options::AnalysisOptions;
use crate::frame::{Frame, line_name};
use crate::response::Response;

/// Name of the method in files.
pub const ID: &str = "second-order";

/// Axial forces have settled when they change by less than this share of the largest axial force in a column.
const SETTLED: f64 = 1e-10;
/// The most rounds of solution. Axial forces settle within a few unless the frame is next to buckling.
const MOST_ROUNDS: usize = 60;
/// The critical load factor is found to this share of itself.
const FACTOR_TOLERANCE: f64 = 1e-9;
/// A critical load factor over this counts as none: gravity is negligible.
const LARGEST_FACTOR: f64 = 1e9;

/// Why the rounds of solution stopped.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Stop {
    /// Axial forces changed by less than 1e-10 of the largest axial force in a column.
    Settled,
}

impl Stop {
    /// Name in files.
    pub fn id(self) -> &'static str {
        match self {
            Self::Settled => "settled",
        }
    }
}

/// The second-order answer.
#[derive(Debug, Clone, PartialEq)]
pub struct SecondOrder {
    /// Forces and movements in the deformed position. Axial forces are those of the lateral load alone.
    pub response: Response,
    /// What gravity may be multiplied by before the frame buckles sideways; `None` where gravity is negligible.
    pub critical_load_factor: Option<f64>,
    /// Rounds of solution until axial forces settled.
    pub rounds: usize,
    /// Why the rounds stopped.
    pub stop: Stop,
}

/// Solves `frame` in the deformed position under its lateral forces and `options.gravity`; `None` without gravity.
///
/// # Formula
/// Columns carry stability functions for their compression P = gravity from above on their line - axial force of the
/// lateral load, and P psi across their chord; solved again until P settles. The critical load factor is the least factor
/// on gravity alone for which the stiffness matrix is not positive definite, found by bisection.
///
/// # Units
/// N, m, rad.
///
/// # Assumptions
/// Linear elastic material, plumb frame. Axial strain acts over the whole length between joint centres, rigid zones
/// included. Gravity acts through column compression alone: it shortens no column and bends no
/// beam, so the answer is the lateral part, amplified. Floors move sideways as one.
///
/// # Errors
/// [`Unsolvable`] as [`super::stiffness::analyse_with`], and where the frame buckles or its sway does not settle.
///
/// # References
/// Stability functions: see the member; second-order sway analysis: common practice.
pub fn analyse(frame: &Frame, options: &AnalysisOptions) -> Result<Option<SecondOrder>, Unsolvable> {
    let Some(floors) = &options.gravity else { return Ok(None) };
    let gravity = accumulated(frame, floors);
    let mut model = Model::new(frame, options)?;
    model.assemble().solve().map_err(|singular| model.mechanism(&singular))?;
    let critical_load_factor = critical_factor(&mut model, &gravity)?;
    let largest = gravity.iter().fold(f64::MIN_POSITIVE, |a, b| a.max(*b));
    model.compression.clone_from(&gravity);
    for rounds in 1..=MOST_ROUNDS {
        if model.overloaded_column().is_some() {
            return Err(Unsolvable::Unsettled { iterations: rounds });
        }
        let solution = model.assemble().solve().map_err(|_| Unsolvable::Unsettled { iterations: rounds })?;
        let response = model.recover(ID, &model.moved(&solution.levels)).with_residual(solution.residual);
        let columns = (0..frame.storeys()).flat_map(|storey| response.storey_columns(storey));
        let next: Vec<_> = columns.zip(&gravity).map(|(column, gravity)| gravity - column.axial).collect();
        let change = next.iter().zip(&model.compression).map(|(a, b)| (a - b).abs()).fold(0.0, f64::max);
        // The lateral load's own axial forces count too: where gravity is slight, rounding in them never gets under it.
        let felt = columns_axial(&response, frame).fold(largest, f64::max);
        if change <= SETTLED * felt {
            let response = accept(frame, response, Some(floors))?;
            return Ok(Some(SecondOrder { response, critical_load_factor, rounds, stop: Stop::Settled }));
        }
        model.compression = next;
    }
    Err(Unsolvable::Unsettled { iterations: MOST_ROUNDS })
}

/// Sizes of the column axial forces, N.
fn columns_axial(response: &Response, frame: &Frame) -> impl Iterator<Item = f64> {
    (0..frame.storeys()).flat_map(|storey| response.storey_columns(storey)).map(|column| column.axial.abs())
}

/// Gravity in each column: the loads of all floors above it on its line, N.
fn accumulated(frame: &Frame, floors: &[f64]) -> Vec<f64> {
    let mut gravity = floors.to_vec();
    for index in (0..gravity.len().saturating_sub(frame.lines())).rev() {
        gravity[index] += gravity[index + frame.lines()];
    }
    gravity
}

/// The least factor on gravity at which the frame sways without resistance.
fn critical_factor(model: &mut Model, gravity: &[f64]) -> Result<Option<f64>, Unsolvable> {
    let mut stands = |factor: f64| {
        model.compression = gravity.iter().map(|force| factor * force).collect();
        model.overloaded_column().is_none() && model.assemble().is_positive_definite()
    };
    let (mut low, mut high) = (0.0, 1.0);
    while stands(high) {
        (low, high) = (high, 2.0 * high);
        if high > LARGEST_FACTOR {
            return Ok(None);
        }
    }
    while high - low > FACTOR_TOLERANCE * high {
        let middle = 0.5 * (low + high);
        if stands(middle) { low = middle } else { high = middle }
    }
    if low > 1.0 {
        return Ok(Some(low));
    }
    model.compression = gravity.iter().map(|force| high * (1.0 + 1e-6) * force).collect();
    let place = match (model.overloaded_column(), model.assemble().solve().map_err(|mode| model.mechanism(&mode))) {
        (Some((storey, line)), _) => {
            format!("the column of storey {} on line {} gives way", storey + 1, line_name(line))
        }
        (None, Err(Unsolvable::FreeStorey { storey })) => format!("storey {storey} sways without limit"),
        (None, Err(Unsolvable::FreeJoint { floor, line })) => {
            format!("the columns at the joint of floor {floor} on line {line} give way")
        }
        _ => "it gives way".into(),
    };
    Err(Unsolvable::Buckles { factor: low, place })
}
