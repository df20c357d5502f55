//! Exact linear elastic analyses: two independent assemblies with one solver for single frames, and [`plain`] for many at once.

mod bar;
mod model;
pub mod plain;
pub mod second_order;
pub mod slope_deflection;
pub mod stiffness;

use crate::frame::Frame;
use crate::response::Response;
use crate::response::statics::{self, Law};
use thiserror::Error;

/// The largest relative residual a result may carry. A sound frame leaves 1e-16 to 1e-12; one that leaves more than this
/// also fails its statics, see [`statics::CLOSES`].
pub const LARGEST_RESIDUAL: f64 = 1e-9;

/// A frame that an exact analysis has no answer for. Storeys and floors count from 1.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum Unsolvable {
    /// Some column has no area, so column axial strain is unknown.
    #[error(
        "not every column has an area, so column axial strain cannot be computed; give every column an area, or leave the options out with slope-deflection as the measure"
    )]
    NoAreas,
    /// Member sizes are only relative, so column axial strain is unknown.
    #[error(
        "member sizes are known only relative to each other, so column axial strain cannot be computed; give end_column_inertia in [sizes]"
    )]
    RelativeSizes,
    /// A storey can sway without resistance.
    #[error("the frame cannot stand: storey {storey} sways without resistance")]
    FreeStorey {
        /// The lowest such storey.
        storey: usize,
    },
    /// A joint can move without resistance.
    #[error("the frame cannot stand: the joint of floor {floor} on line {line} moves without resistance")]
    FreeJoint {
        /// Floor of the joint, 0 = ground.
        floor: usize,
        /// Column line of the joint.
        line: String,
    },
    /// Gravity makes the frame buckle sideways.
    #[error(
        "the frame buckles under its gravity loads: at {factor:.3} times these loads {place}; stiffen the frame or correct the loads"
    )]
    Buckles {
        /// Critical load factor of the gravity loads, at most 1.
        factor: f64,
        /// What gives way, in words.
        place: String,
    },
    /// The sway does not settle: lateral load and gravity together are too much.
    #[error(
        "second order finds no equilibrium (round {iterations}): the lateral load's own compression takes the frame over its buckling load; stiffen the frame or correct the loads"
    )]
    Unsettled {
        /// Rounds of solution taken.
        iterations: usize,
    },
    /// The equations were solved too inaccurately to be used.
    #[error(
        "the solution misses equilibrium by {residual:.1e} of the frame's largest values (at most {LARGEST_RESIDUAL:.0e} is accepted): member stiffnesses differ too widely"
    )]
    Inaccurate {
        /// The larger of the relative residual and the largest relative imbalance.
        residual: f64,
    },
}

/// `Ok` where a response closes, in the deformed position where `gravity` is given per floor and line: by the residual of its equations, and by statics, which see the same from outside.
fn accept(frame: &Frame, response: Response, gravity: Option<&[f64]>) -> Result<Response, Unsolvable> {
    let residual = response.residual().unwrap_or(f64::INFINITY);
    let statics = statics::check_deformed(frame, &response, gravity);
    if residual <= LARGEST_RESIDUAL && statics.closes() {
        return Ok(response);
    }
    let worst = Law::ALL.into_iter().filter_map(|law| Some(statics.worst(law)?.relative.abs()));
    Err(Unsolvable::Inaccurate { residual: worst.fold(residual, f64::max) })
}

/// Names the place of a free movement, given the storeys' chord rotations in it and its joints' rotations.
fn name_mechanism(chord_rotations: &[f64], joints: &[(usize, usize, f64)]) -> Unsolvable {
    let largest_joint = joints.iter().fold((0, 0, 0.0_f64), |a, b| if b.2.abs() > a.2.abs() { *b } else { a });
    let largest_chord = chord_rotations.iter().fold(0.0_f64, |a, b| a.max(b.abs()));
    // In a sway, joints turn less than about 1.6 times the chords (a cantilever's tip); in a local failure far more.
    if largest_chord < 0.5 * largest_joint.2.abs() {
        let (floor, line, _) = largest_joint;
        return Unsolvable::FreeJoint { floor, line: crate::frame::line_name(line) };
    }
    let storey = chord_rotations.iter().position(|chord| chord.abs() >= 0.5 * largest_chord);
    Unsolvable::FreeStorey { storey: storey.unwrap_or_default() + 1 }
}
