//! Work and strain energy, which tie movements to forces without any stiffness equation.
//!
//! # References
//! Clapeyron's theorem, Castigliano's theorem of least work, Betti's theorem: common practice.

use swaybound::frame::{Feet, Frame};
use swaybound::response::Response;

/// Strain energy of bending for end moments that vary along the member in a straight line.
///
/// # Formula
/// The bending moment runs from M_a to -M_b (both clockwise on their ends), so the integral of M^2/(2 E I) is
/// (M_a^2 - M_a M_b + M_b^2) l / (6 E I).
fn bending(near: f64, far: f64, stiffness: f64) -> f64 {
    let sum = near * near - near * far + far * far;
    // A member without stiffness stores nothing where it carries nothing, and cannot carry anything.
    if sum == 0.0 { 0.0 } else { sum / (6.0 * stiffness) }
}

/// Energy stored in columns and beams by bending and in the foot springs.
pub fn of_bending(frame: &Frame, response: &Response) -> f64 {
    let mut sum = 0.0;
    for storey in 0..frame.storeys() {
        for (line, column) in response.storey_columns(storey).iter().enumerate() {
            sum += bending(column.foot, column.head, frame.column_stiffness(storey, line));
        }
        for (bay, beam) in response.floor_beams(storey).iter().enumerate() {
            sum += bending(beam.left, beam.right, frame.beam_stiffness(storey, bay));
        }
    }
    if let Feet::Springs(springs) = frame.feet() {
        let feet = response.storey_columns(0).iter().zip(springs);
        sum += feet.map(|(column, spring)| column.foot * column.foot / (2.0 * spring)).sum::<f64>();
    }
    sum
}

/// Energy stored in columns that stretch and shorten; every column must have an area.
pub fn of_axial(frame: &Frame, response: &Response) -> f64 {
    let mut sum = 0.0;
    for storey in 0..frame.storeys() {
        for (line, column) in response.storey_columns(storey).iter().enumerate() {
            let area = frame.column(storey, line).area.unwrap_or(f64::NAN);
            let height = frame.storey_height(storey);
            sum += column.axial * column.axial * height / (2.0 * frame.modulus() * area);
        }
    }
    sum
}

/// Sum of the forces of one load case times the sways of another, N m.
pub fn work(forces: &Frame, moved: &Response) -> f64 {
    let sway = |floor| moved.movement(floor).map_or(f64::NAN, |movement| movement.sway);
    forces.parts().lateral.iter().enumerate().map(|(floor, force)| force * sway(floor)).sum()
}
