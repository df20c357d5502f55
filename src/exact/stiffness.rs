//! Stiffness analysis: joint rotations, vertical joint movements and storey chord rotations; columns stretch and shorten.

use super::{Unsolvable, accept, name_mechanism};
use crate::frame::{Feet, Frame};
use crate::response::{Forces, Members, Response};
use crate::solve::{BlockTridiagonal, Singular};
use nalgebra::DVector;

/// Name of the method in files.
pub const ID: &str = "stiffness";

/// Solves `frame` by the stiffness method with column axial strain.
///
/// # Formula
/// Each member adds its stiffness matrix: bending with end moment M_near = 2 k (2 theta_near + theta_far - 3 psi),
/// k = E I / length, psi = drift / h in a column and (v_left - v_right) / L in a beam; axial N = (E A / h)
/// (v_head - v_foot) in a column. The storey chord rotations stand in place of floor sways, which in a tall frame are large
/// against their differences; vertical movements enter divided by the mean storey height. So every equation is in N m.
///
/// # Units
/// N, m, rad; drifts in m.
///
/// # Assumptions
/// Linear elastic plane frame, no shear deformation, floors rigid in their own plane (beams do not stretch).
///
/// # Errors
/// [`Unsolvable`] where a column has no area, sizes are only relative, the frame is a mechanism or the residual is too large.
///
/// # References
/// Direct stiffness method: common practice.
pub fn analyse(frame: &Frame) -> Result<Response, Unsolvable> {
    match (frame.has_areas(), frame.has_real_stiffness()) {
        (false, _) => return Err(Unsolvable::NoAreas),
        (_, false) => return Err(Unsolvable::RelativeSizes),
        _ => {}
    }
    let map = Map::of(frame);
    let solution = assemble(frame, &map).solve().map_err(|singular| mechanism(frame, &map, &singular))?;
    let moved = Moved { map: &map, levels: &solution.levels };
    let forces = recover(frame, &moved);
    let drift = |storey| moved.chord(storey) * frame.storey_height(storey);
    let drifts: Vec<_> = (0..frame.storeys()).map(drift).collect();
    let response = Response::from_forces(ID, frame, &forces).with_residual(solution.residual);
    Ok(accept(frame, response)?.with_drifts(&drifts))
}

/// Place of one unknown: level and index.
type Unknown = Option<(usize, usize)>;

/// Where each unknown stands: level by level upwards, in a level the storey's chord rotation, then for each joint of its
/// top floor vertical movement and rotation. Floor 0 is the ground, floor i stands on storey i - 1.
struct Map {
    lines: usize,
    feet_turn: bool,
    /// Length that movements are divided by, m.
    reference: f64,
}

impl Map {
    fn of(frame: &Frame) -> Self {
        let reference = frame.height() / frame.storeys() as f64;
        Self { lines: frame.lines(), feet_turn: *frame.feet() != Feet::Fixed, reference }
    }

    fn sizes(&self, storeys: usize) -> Vec<usize> {
        let feet = self.feet_turn.then_some(self.lines);
        feet.into_iter().chain(std::iter::repeat_n(1 + 2 * self.lines, storeys)).collect()
    }

    fn level(&self, floor: usize) -> usize {
        floor - 1 + usize::from(self.feet_turn)
    }

    fn chord(&self, storey: usize) -> Unknown {
        Some((self.level(storey + 1), 0))
    }

    fn rise(&self, floor: usize, line: usize) -> Unknown {
        (floor > 0).then(|| (self.level(floor), 1 + 2 * line))
    }

    fn turn(&self, floor: usize, line: usize) -> Unknown {
        match floor {
            0 => self.feet_turn.then_some((0, line)),
            _ => Some((self.level(floor), 2 + 2 * line)),
        }
    }
}

/// Movements of a solution or of a mechanism, in units of the reference length.
struct Moved<'a> {
    map: &'a Map,
    levels: &'a [DVector<f64>],
}

impl Moved<'_> {
    fn value(&self, unknown: Unknown) -> f64 {
        unknown.and_then(|(level, index)| self.levels.get(level).map(|values| values[index])).unwrap_or(0.0)
    }

    fn chord(&self, storey: usize) -> f64 {
        self.value(self.map.chord(storey))
    }
}

/// Bending stiffness matrix of a column for (foot rotation, head rotation, chord rotation).
fn column_bending(k: f64) -> [[f64; 3]; 3] {
    [[4.0 * k, 2.0 * k, -6.0 * k], [2.0 * k, 4.0 * k, -6.0 * k], [-6.0 * k, -6.0 * k, 12.0 * k]]
}

/// Bending stiffness matrix of a beam for (left rise, left rotation, right rise, right rotation).
fn beam_bending(k: f64, width: f64) -> [[f64; 4]; 4] {
    let (slope, shear) = (6.0 * k / width, 12.0 * k / (width * width));
    [
        [shear, -slope, -shear, -slope],
        [-slope, 4.0 * k, slope, 2.0 * k],
        [-shear, slope, shear, slope],
        [-slope, 2.0 * k, slope, 4.0 * k],
    ]
}

fn assemble(frame: &Frame, map: &Map) -> BlockTridiagonal {
    let mut system = BlockTridiagonal::new(&map.sizes(frame.storeys()));
    if let Feet::Springs(springs) = frame.feet() {
        springs.iter().enumerate().for_each(|(line, spring)| system.add([map.turn(0, line)], [[*spring]]));
    }
    for storey in 0..frame.storeys() {
        let (foot, head) = (storey, storey + 1);
        for line in 0..frame.lines() {
            let unknowns = [map.turn(foot, line), map.turn(head, line), map.chord(storey)];
            system.add(unknowns, column_bending(frame.column_stiffness(storey, line)));
            let axial = axial_stiffness(frame, storey, line) * map.reference * map.reference;
            system.add([map.rise(foot, line), map.rise(head, line)], [[axial, -axial], [-axial, axial]]);
        }
        for bay in 0..frame.bays() {
            let unknowns = [map.rise(head, bay), map.turn(head, bay), map.rise(head, bay + 1), map.turn(head, bay + 1)];
            let width = frame.bay_width(bay) / map.reference;
            system.add(unknowns, beam_bending(frame.beam_stiffness(storey, bay), width));
        }
        if let Some(chord) = map.chord(storey) {
            system.add_load(chord, frame.storey_shear(storey) * frame.storey_height(storey));
        }
    }
    system
}

/// E A / h, N/m.
fn axial_stiffness(frame: &Frame, storey: usize, line: usize) -> f64 {
    frame.modulus() * frame.column(storey, line).area.unwrap_or(0.0) / frame.storey_height(storey)
}

fn recover(frame: &Frame, moved: &Moved) -> Forces<1> {
    let members = Members::of(frame);
    let mut forces = Forces::for_members(&members);
    let (map, value) = (moved.map, |unknown| moved.value(unknown));
    let end_moment = |k: f64, near: f64, far: f64, chord: f64| 2.0 * k * (2.0 * near + far - 3.0 * chord);
    for storey in 0..frame.storeys() {
        let (below, above) = (storey, storey + 1);
        let chord = moved.chord(storey);
        for line in 0..frame.lines() {
            let (column, k) = (members.column(storey, line), frame.column_stiffness(storey, line));
            let (foot, head) = (value(map.turn(below, line)), value(map.turn(above, line)));
            let stretch = (value(map.rise(above, line)) - value(map.rise(below, line))) * map.reference;
            forces.column_foot[column] = [end_moment(k, foot, head, chord)];
            forces.column_head[column] = [end_moment(k, head, foot, chord)];
            forces.column_axial[column] = [axial_stiffness(frame, storey, line) * stretch];
        }
        for bay in 0..frame.bays() {
            let (beam, k) = (members.beam(storey, bay), frame.beam_stiffness(storey, bay));
            let (left, right) = (value(map.turn(above, bay)), value(map.turn(above, bay + 1)));
            let rise = value(map.rise(above, bay)) - value(map.rise(above, bay + 1));
            let chord = rise * map.reference / frame.bay_width(bay);
            forces.beam_left[beam] = [end_moment(k, left, right, chord)];
            forces.beam_right[beam] = [end_moment(k, right, left, chord)];
        }
    }
    forces
}

fn mechanism(frame: &Frame, map: &Map, singular: &Singular) -> Unsolvable {
    let moved = Moved { map, levels: &singular.mode };
    let covered = (0..frame.storeys()).take_while(|storey| map.level(storey + 1) < singular.mode.len());
    let chords: Vec<_> = covered.map(|storey| moved.chord(storey)).collect();
    let floors = (0..=chords.len()).flat_map(|floor| (0..frame.lines()).map(move |line| (floor, line)));
    let joints: Vec<_> = floors.map(|(floor, line)| (floor, line, moved.value(map.turn(floor, line)))).collect();
    name_mechanism(&chords, &joints)
}
