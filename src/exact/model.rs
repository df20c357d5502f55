//! The stiffness model that first- and second-order analysis share: unknowns, assembly, recovery of forces.

use super::bar::Bar;
use super::{Unsolvable, name_mechanism};
use crate::frame::options::{AnalysisOptions, EndSpring};
use crate::frame::{Feet, Frame};
use crate::response::{BeamForces, ColumnForces, Faces, Response};
use crate::solve::{BlockTridiagonal, Singular};
use nalgebra::DVector;

/// A frame with its options and the axial compression that softens its columns.
pub(super) struct Model<'a> {
    frame: &'a Frame,
    options: &'a AnalysisOptions,
    /// Compression of each column, N, storey by storey from the ground.
    pub compression: Vec<f64>,
    map: Map,
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
    fn sizes(&self, storeys: usize) -> Vec<usize> {
        let feet = self.feet_turn.then_some(self.lines);
        feet.into_iter().chain(std::iter::repeat_n(1 + 2 * self.lines, storeys)).collect()
    }

    fn level(&self, floor: usize) -> usize {
        floor - 1 + usize::from(self.feet_turn)
    }

    fn chord(&self, storey: usize) -> (usize, usize) {
        (self.level(storey + 1), 0)
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
pub(super) struct Moved<'a> {
    map: &'a Map,
    levels: &'a [DVector<f64>],
}

impl Moved<'_> {
    fn value(&self, unknown: Unknown) -> f64 {
        unknown.and_then(|(level, index)| self.levels.get(level).map(|values| values[index])).unwrap_or(0.0)
    }

    /// Rotation of a storey's chord.
    pub(super) fn chord(&self, storey: usize) -> f64 {
        self.value(Some(self.map.chord(storey)))
    }
}

impl<'a> Model<'a> {
    /// A model without axial compression.
    ///
    /// # Errors
    /// [`Unsolvable::NoAreas`] and [`Unsolvable::RelativeSizes`].
    pub(super) fn new(frame: &'a Frame, options: &'a AnalysisOptions) -> Result<Self, Unsolvable> {
        match (frame.has_areas(), frame.has_real_stiffness()) {
            (false, _) => return Err(Unsolvable::NoAreas),
            (_, false) => return Err(Unsolvable::RelativeSizes),
            _ => {}
        }
        let reference = frame.height() / frame.storeys() as f64;
        let map = Map { lines: frame.lines(), feet_turn: *frame.feet() != Feet::Fixed, reference };
        Ok(Self { frame, options, compression: vec![0.0; frame.storeys() * frame.lines()], map })
    }

    fn column_bar(&self, storey: usize, line: usize) -> Bar {
        let column = storey * self.frame.lines() + line;
        Bar {
            length: self.frame.storey_height(storey),
            zones: self.options.column_zones[column],
            bending: self.frame.modulus() * self.frame.column(storey, line).inertia,
            shear: self.shear_stiffness(self.options.column_shear_area[column]),
            springs: [EndSpring::Rigid; 2],
            compression: self.compression[column],
        }
    }

    fn beam_bar(&self, floor: usize, bay: usize) -> Bar {
        let beam = floor * self.frame.bays() + bay;
        Bar {
            length: self.frame.bay_width(bay),
            zones: self.options.beam_zones[beam],
            bending: self.frame.modulus() * self.frame.beam(floor, bay).inertia,
            shear: self.shear_stiffness(self.options.beam_shear_area[beam]),
            springs: self.options.beam_springs[beam],
            compression: 0.0,
        }
    }

    fn shear_stiffness(&self, area: Option<f64>) -> Option<f64> {
        Some(self.options.shear_modulus? * area?)
    }

    /// The first column, by storey and line, that is compressed beyond what any end restraint could carry: (alpha l)^2 of
    /// 4 pi^2 and more.
    pub(super) fn overloaded_column(&self) -> Option<(usize, usize)> {
        let limit = 4.0 * std::f64::consts::PI.powi(2);
        let lines = self.frame.lines();
        let mut columns = (0..self.frame.storeys()).flat_map(|storey| (0..lines).map(move |line| (storey, line)));
        columns.find(|(storey, line)| {
            let parameter = self.column_bar(*storey, *line).axial_parameter();
            self.compression[storey * lines + line] > 0.0 && !(0.0..limit).contains(&parameter)
        })
    }

    /// The equations under the frame's lateral forces.
    pub(super) fn assemble(&self) -> BlockTridiagonal {
        let (frame, map) = (self.frame, &self.map);
        let mut system = BlockTridiagonal::new(&map.sizes(frame.storeys()));
        if let Feet::Springs(springs) = frame.feet() {
            springs.iter().enumerate().for_each(|(line, spring)| system.add([map.turn(0, line)], [[*spring]]));
        }
        for storey in 0..frame.storeys() {
            let (foot, head) = (storey, storey + 1);
            for line in 0..frame.lines() {
                let unknowns = [map.turn(foot, line), map.turn(head, line), Some(map.chord(storey))];
                system.add(unknowns, self.column_bar(storey, line).matrix());
                let axial = self.axial_stiffness(storey, line) * map.reference * map.reference;
                system.add([map.rise(foot, line), map.rise(head, line)], [[axial, -axial], [-axial, axial]]);
            }
            for bay in 0..frame.bays() {
                let bar = self.beam_bar(storey, bay);
                let (left, right) = (map.rise(head, bay), map.rise(head, bay + 1));
                let unknowns = [map.turn(head, bay), map.turn(head, bay + 1), left, right];
                system.add(unknowns, with_rises(bar.matrix(), map.reference / bar.length));
            }
            system.add_load(map.chord(storey), frame.storey_shear(storey) * frame.storey_height(storey));
        }
        system
    }

    /// E A / h, N/m.
    fn axial_stiffness(&self, storey: usize, line: usize) -> f64 {
        let area = self.frame.column(storey, line).area.unwrap_or(0.0);
        self.frame.modulus() * area / self.frame.storey_height(storey)
    }

    /// The movements that `levels` are.
    pub(super) fn moved<'b>(&'b self, levels: &'b [DVector<f64>]) -> Moved<'b> {
        Moved { map: &self.map, levels }
    }

    /// The response to `moved`.
    pub(super) fn recover(&self, method: &'static str, moved: &Moved) -> Response {
        let (frame, map) = (self.frame, &self.map);
        let (mut columns, mut beams, mut faces) = (Vec::new(), Vec::new(), Faces::default());
        for storey in 0..frame.storeys() {
            let (below, above) = (storey, storey + 1);
            for line in 0..frame.lines() {
                let turns = [moved.value(map.turn(below, line)), moved.value(map.turn(above, line))];
                let forces = self.column_bar(storey, line).forces([turns[0], turns[1], moved.chord(storey)]);
                let stretch = (moved.value(map.rise(above, line)) - moved.value(map.rise(below, line))) * map.reference;
                let [foot, head] = forces.joint;
                let axial = self.axial_stiffness(storey, line) * stretch;
                columns.push(ColumnForces { foot, head, shear: forces.shear, axial });
                faces.columns.push(forces.face);
            }
            for bay in 0..frame.bays() {
                let rise = moved.value(map.rise(above, bay)) - moved.value(map.rise(above, bay + 1));
                let chord = rise * map.reference / frame.bay_width(bay);
                let turns = [moved.value(map.turn(above, bay)), moved.value(map.turn(above, bay + 1))];
                let forces = self.beam_bar(storey, bay).forces([turns[0], turns[1], chord]);
                let [left, right] = forces.joint;
                beams.push(BeamForces { left, right, shear: (left + right) / frame.bay_width(bay) });
                faces.beams.push(forces.face);
            }
        }
        let drifts: Vec<_> =
            (0..frame.storeys()).map(|storey| moved.chord(storey) * frame.storey_height(storey)).collect();
        let response = Response::from_members(method, frame, columns, beams).with_drifts(&drifts);
        if self.options.has_zones() { response.with_faces(faces) } else { response }
    }

    /// The storeys' chord rotations in a free movement, as far as it reaches.
    pub(super) fn chords(&self, singular: &Singular) -> Vec<f64> {
        let moved = self.moved(&singular.mode);
        let covered = (0..self.frame.storeys()).take_while(|storey| self.map.chord(*storey).0 < singular.mode.len());
        covered.map(|storey| moved.chord(storey)).collect()
    }

    /// Names the place of a free movement.
    pub(super) fn mechanism(&self, singular: &Singular) -> Unsolvable {
        let (moved, chords) = (self.moved(&singular.mode), self.chords(singular));
        let floors = (0..=chords.len()).flat_map(|floor| (0..self.frame.lines()).map(move |line| (floor, line)));
        let turn = |floor, line| moved.value(self.map.turn(floor, line));
        let joints: Vec<_> = floors.map(|(floor, line)| (floor, line, turn(floor, line))).collect();
        name_mechanism(&chords, &joints)
    }
}

/// A beam's matrix for (left rotation, right rotation, left rise, right rise): its chord turns clockwise as the left end
/// rises against the right one, by `per_rise` for a rise of one reference length.
fn with_rises(matrix: [[f64; 3]; 3], per_rise: f64) -> [[f64; 4]; 4] {
    // Each of the four movements as one of the bar's three, and how much of it.
    let part = [(0, 1.0), (1, 1.0), (2, per_rise), (2, -per_rise)];
    part.map(|(i, a)| part.map(|(j, b)| a * matrix[i][j] * b))
}
