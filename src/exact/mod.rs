//! Exact linear elastic analyses of plain frames: two independent assemblies, one solver.

pub mod slope_deflection;
pub mod stiffness;

use thiserror::Error;

/// The largest relative residual a result may carry: an imbalance of 1e-8 of the largest storey moment is far under any
/// figure that is printed, and far over what a sound frame leaves (1e-14 to 1e-11).
pub const LARGEST_RESIDUAL: f64 = 1e-8;

/// A frame that an exact analysis has no answer for. Storeys and floors count from 1.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum Unsolvable {
    /// Some column has no area, so column axial strain is unknown.
    #[error("not every column has an area, so column axial strain cannot be computed")]
    NoAreas,
    /// Member sizes are only relative, so column axial strain is unknown.
    #[error("member sizes are known only relative to each other, so column axial strain cannot be computed")]
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
    /// The equations were solved too inaccurately to be used.
    #[error(
        "the solution misses equilibrium by {residual:.1e} of the largest storey moment (at most {LARGEST_RESIDUAL:.0e} is accepted): member stiffnesses differ too widely"
    )]
    Inaccurate {
        /// The relative residual.
        residual: f64,
    },
}

/// `Ok` where a residual is small enough for its solution to be used.
fn accept(residual: f64) -> Result<f64, Unsolvable> {
    if residual <= LARGEST_RESIDUAL { Ok(residual) } else { Err(Unsolvable::Inaccurate { residual }) }
}

/// Names the place of a free movement, given the storeys' chord rotations in it and its joints' rotations.
fn name_mechanism(chord_rotations: &[f64], joints: &[(usize, usize, f64)]) -> Unsolvable {
    let largest_joint = joints.iter().fold((0, 0, 0.0_f64), |a, b| if b.2.abs() > a.2.abs() { *b } else { a });
    let largest_chord = chord_rotations.iter().fold(0.0_f64, |a, b| a.max(b.abs()));
    if largest_chord < 0.1 * largest_joint.2.abs() {
        let (floor, line, _) = largest_joint;
        return Unsolvable::FreeJoint { floor, line: crate::frame::line_name(line) };
    }
    let storey = chord_rotations.iter().position(|chord| chord.abs() >= 0.5 * largest_chord);
    Unsolvable::FreeStorey { storey: storey.unwrap_or_default() + 1 }
}
