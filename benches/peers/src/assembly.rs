//! The equations of a frame, as every peer takes them: which unknown stands where, and each entry of the matrix once.
//!
//! # Formula
//! With phi = -3 psi (psi the chord rotation), k = E I/length and the system halved, a member adds 2 k to the diagonal of
//! both end rotations, k between them and between each and phi, 2 k/3 to the diagonal of phi. The storey equation's load is -V h/6.
//! With column axial strain a joint also falls, by u = 3 x its downward movement: a beam's phi is (u_left - u_right)/L,
//! a column adds E A/(18 h). Foot rotations are eliminated beforehand: with rho = c/(c + 4 k), c the foot's spring, a
//! lowest column adds k (3 + rho)/2 to its head's diagonal, k (1 + rho)/2 between head and phi, k (1 + 3 rho)/6 to phi.

use crate::Joint;
use swaybound::response::Members;

/// Takes the entries of a symmetric matrix, lower triangle, each at most once.
pub trait Symmetric {
    /// Entry (`row`, `column`), `row` at least `column`.
    fn put(&mut self, row: usize, column: usize, value: f64);
}

/// Where each unknown stands: storey by storey, its chord's phi, then joint by joint (fall,) rotation. No other ordering
/// by levels has a narrower band.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Numbering {
    joint: Joint,
    storeys: usize,
    bays: usize,
}

/// What a column adds to the equations of its head and storey.
struct Column {
    head: f64,
    head_chord: f64,
    chord: f64,
}

impl Numbering {
    /// The unknowns of a shape.
    pub fn new(joint: Joint, storeys: usize, bays: usize) -> Self {
        Self { joint, storeys, bays }
    }

    /// Number of unknowns.
    pub fn order(self) -> usize {
        self.storeys * self.level()
    }

    /// Half-bandwidth of the matrix.
    pub fn half_bandwidth(self) -> usize {
        self.level()
    }

    /// Unknowns of one level.
    fn level(self) -> usize {
        1 + self.per_joint() * (self.bays + 1)
    }

    pub(crate) fn joint(self) -> Joint {
        self.joint
    }

    fn per_joint(self) -> usize {
        match self.joint {
            Joint::Rotation => 1,
            Joint::RiseAndRotation => 2,
        }
    }

    /// The storey's chord rotation.
    pub(crate) fn chord(self, storey: usize) -> usize {
        storey * self.level()
    }

    /// The fall of the joint on top of the storey, where joints fall.
    pub(crate) fn fall(self, storey: usize, line: usize) -> usize {
        self.chord(storey) + 1 + 2 * line
    }

    /// The rotation of the joint on top of the storey.
    pub(crate) fn turn(self, storey: usize, line: usize) -> usize {
        self.chord(storey) + self.per_joint() * (line + 1)
    }

    /// Writes the equations of `members`; entries never put are zero.
    pub fn assemble(self, members: &Members<1>, matrix: &mut impl Symmetric, load: &mut [f64]) {
        load.fill(0.0);
        for storey in 0..self.storeys {
            let mut chord = 0.0;
            for line in 0..=self.bays {
                let column = column(members, storey, line);
                chord += column.chord;
                self.put_turn(members, (storey, line), column, matrix);
                if self.joint == Joint::RiseAndRotation {
                    self.put_fall(members, (storey, line), matrix);
                }
            }
            matrix.put(self.chord(storey), self.chord(storey), chord);
            load[self.chord(storey)] = -members.shear[storey][0] * members.height[storey][0] / 6.0;
        }
    }

    /// The entries that a joint's rotation shares with itself, chords and other rotations.
    #[inline(always)]
    fn put_turn(self, members: &Members<1>, at: (usize, usize), below: Column, matrix: &mut impl Symmetric) {
        let ((storey, line), turn) = (at, self.turn(at.0, at.1));
        let mut around = 0.0;
        matrix.put(turn, self.chord(storey), below.head_chord);
        if storey + 1 < self.storeys {
            let above = members.column_stiffness[members.column(storey + 1, line)][0];
            matrix.put(self.chord(storey + 1), turn, above);
            matrix.put(self.turn(storey + 1, line), turn, above);
            around += above;
        }
        if line > 0 {
            around += members.beam_stiffness[members.beam(storey, line - 1)][0];
        }
        if line < self.bays {
            let right = members.beam_stiffness[members.beam(storey, line)][0];
            matrix.put(self.turn(storey, line + 1), turn, right);
            around += right;
        }
        matrix.put(turn, turn, below.head + 2.0 * around);
    }

    /// The entries that a joint's fall shares with itself and others.
    #[inline(always)]
    fn put_fall(self, members: &Members<1>, (storey, line): (usize, usize), matrix: &mut impl Symmetric) {
        let (fall, turn) = (self.fall(storey, line), self.turn(storey, line));
        let mut own = axial(members, storey, line);
        let mut with_turn = 0.0;
        if storey + 1 < self.storeys {
            let above = axial(members, storey + 1, line);
            matrix.put(self.fall(storey + 1, line), fall, -above);
            own += above;
        }
        if line > 0 {
            let (bend, lift) = beam(members, storey, line - 1);
            own += lift;
            with_turn -= bend;
        }
        if line < self.bays {
            let (bend, lift) = beam(members, storey, line);
            own += lift;
            with_turn += bend;
            matrix.put(self.fall(storey, line + 1), fall, -lift);
            matrix.put(self.fall(storey, line + 1), turn, -bend);
            matrix.put(self.turn(storey, line + 1), fall, bend);
        }
        matrix.put(fall, fall, own);
        matrix.put(turn, fall, with_turn);
    }
}

#[inline(always)]
fn column(members: &Members<1>, storey: usize, line: usize) -> Column {
    let k = members.column_stiffness[members.column(storey, line)][0];
    if storey > 0 {
        return Column { head: 2.0 * k, head_chord: k, chord: 2.0 / 3.0 * k };
    }
    let rho = members.foot_rho[line][0];
    Column { head: k * (3.0 + rho) / 2.0, head_chord: k * (1.0 + rho) / 2.0, chord: k * (1.0 + 3.0 * rho) / 6.0 }
}

#[inline(always)]
fn axial(members: &Members<1>, storey: usize, line: usize) -> f64 {
    members.axial_stiffness[members.column(storey, line)][0] / (18.0 * members.height[storey][0])
}

/// What a beam adds between rotations and falls, and between falls.
#[inline(always)]
fn beam(members: &Members<1>, storey: usize, bay: usize) -> (f64, f64) {
    let per_width = 1.0 / members.width[bay][0];
    let bend = members.beam_stiffness[members.beam(storey, bay)][0] * per_width;
    (bend, 2.0 / 3.0 * bend * per_width)
}
