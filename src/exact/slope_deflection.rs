//! Slope-deflection: unknown joint rotations and storey chord rotations, inextensible members.

use super::{Unsolvable, accept, name_mechanism};
use crate::frame::{Feet, Frame};
use crate::response::{Forces, Members, Response, Work, axial_from_beam_shears};
use crate::solve::{BlockTridiagonal, Singular, Solution};

/// Name of the method in files.
pub const ID: &str = "slope-deflection";

/// Solves `frame` by slope-deflection.
///
/// # Formula
/// Member end moment M_near = 2 k (2 theta_near + theta_far - 3 psi), k = E I / length, theta = joint rotation,
/// psi = chord rotation (drift / h in columns, zero in beams). At every joint the end moments add up to zero; in every
/// storey the column end moments add up to -V h. Axial forces follow from beam shears.
///
/// # Units
/// N, m, rad; drifts in m, given only where sizes are real.
///
/// # Assumptions
/// Linear elastic plane frame, inextensible members, no shear deformation, floors rigid in their own plane.
///
/// # Errors
/// [`Unsolvable`] where the frame is a mechanism or the residual is too large.
///
/// # References
/// G. A. Maney, Studies in Engineering No. 1, University of Minnesota, 1915 (from memory).
pub fn analyse(frame: &Frame) -> Result<Response, Unsolvable> {
    let levels = Levels { lines: frame.lines(), feet_turn: *frame.feet() != Feet::Fixed };
    let solution = assemble(frame, levels).solve().map_err(|singular| mechanism(frame, levels, &singular))?;
    let forces = recover(frame, levels, &solution);
    let response = Response::from_forces(ID, frame, &forces).with_residual(solution.residual);
    let response = accept(frame, response, None)?;
    if !frame.has_real_stiffness() {
        return Ok(response);
    }
    let drift = |storey| levels.value(&solution.levels, levels.chord(storey)) * frame.storey_height(storey);
    Ok(response.with_drifts(&(0..frame.storeys()).map(drift).collect::<Vec<_>>()))
}

/// Where each unknown stands: level by level upwards, in a level the storey's chord rotation, then its joints' rotations.
#[derive(Debug, Clone, Copy)]
struct Levels {
    lines: usize,
    feet_turn: bool,
}

impl Levels {
    fn sizes(self, storeys: usize) -> Vec<usize> {
        let feet = self.feet_turn.then_some(self.lines);
        feet.into_iter().chain(std::iter::repeat_n(self.lines + 1, storeys)).collect()
    }

    fn chord(self, storey: usize) -> Option<(usize, usize)> {
        Some((storey + usize::from(self.feet_turn), 0))
    }

    /// Rotation of the joint at the foot (`up` = 0) or head (`up` = 1) of a column; a fixed foot has none.
    fn joint(self, storey: usize, up: usize, line: usize) -> Option<(usize, usize)> {
        match (storey + up, self.feet_turn) {
            (0, false) => None,
            (0, true) => Some((0, line)),
            (floor, feet_turn) => Some((floor - 1 + usize::from(feet_turn), 1 + line)),
        }
    }

    fn value(self, levels: &[nalgebra::DVector<f64>], unknown: Option<(usize, usize)>) -> f64 {
        unknown.and_then(|(level, index)| levels.get(level).map(|values| values[index])).unwrap_or(0.0)
    }
}

fn assemble(frame: &Frame, levels: Levels) -> BlockTridiagonal {
    let mut system = BlockTridiagonal::new(&levels.sizes(frame.storeys()));
    if let Feet::Springs(springs) = frame.feet() {
        for (line, spring) in springs.iter().enumerate() {
            system.add([levels.joint(0, 0, line)], [[*spring]]);
        }
    }
    for storey in 0..frame.storeys() {
        for line in 0..frame.lines() {
            let k = frame.column_stiffness(storey, line);
            let unknowns = [levels.joint(storey, 0, line), levels.joint(storey, 1, line), levels.chord(storey)];
            system.add(
                unknowns,
                [[4.0 * k, 2.0 * k, -6.0 * k], [2.0 * k, 4.0 * k, -6.0 * k], [-6.0 * k, -6.0 * k, 12.0 * k]],
            );
        }
        for bay in 0..frame.bays() {
            let k = frame.beam_stiffness(storey, bay);
            let unknowns = [levels.joint(storey, 1, bay), levels.joint(storey, 1, bay + 1)];
            system.add(unknowns, [[4.0 * k, 2.0 * k], [2.0 * k, 4.0 * k]]);
        }
        if let Some(chord) = levels.chord(storey) {
            system.add_load(chord, frame.storey_shear(storey) * frame.storey_height(storey));
        }
    }
    system
}

fn recover(frame: &Frame, levels: Levels, solution: &Solution) -> Forces<1> {
    let members = Members::of(frame);
    let mut forces = Forces::for_members(&members);
    let value = |unknown| levels.value(&solution.levels, unknown);
    let end_moment = |k: f64, near: f64, far: f64, chord: f64| 2.0 * k * (2.0 * near + far - 3.0 * chord);
    for storey in 0..frame.storeys() {
        let chord = value(levels.chord(storey));
        for line in 0..frame.lines() {
            let (column, k) = (members.column(storey, line), frame.column_stiffness(storey, line));
            let (foot, head) = (value(levels.joint(storey, 0, line)), value(levels.joint(storey, 1, line)));
            forces.column_foot[column] = [end_moment(k, foot, head, chord)];
            forces.column_head[column] = [end_moment(k, head, foot, chord)];
        }
        for bay in 0..frame.bays() {
            let (beam, k) = (members.beam(storey, bay), frame.beam_stiffness(storey, bay));
            let (left, right) = (value(levels.joint(storey, 1, bay)), value(levels.joint(storey, 1, bay + 1)));
            forces.beam_left[beam] = [end_moment(k, left, right, 0.0)];
            forces.beam_right[beam] = [end_moment(k, right, left, 0.0)];
        }
    }
    axial_from_beam_shears::<f64, 1>(&members.rows(), &mut Work::for_members(&members).rows(), &mut forces.rows());
    forces
}

fn mechanism(frame: &Frame, levels: Levels, singular: &Singular) -> Unsolvable {
    let value = |unknown| levels.value(&singular.mode, unknown);
    let chords: Vec<_> = (0..frame.storeys()).map(|storey| value(levels.chord(storey))).collect();
    let floors = (0..=frame.storeys()).flat_map(|floor| (0..frame.lines()).map(move |line| (floor, line)));
    let joints: Vec<_> = floors.map(|(floor, line)| (floor, line, value(levels.joint(floor, 0, line)))).collect();
    name_mechanism(&chords, &joints)
}
