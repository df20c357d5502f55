//! End moments from the unknowns, as every peer recovers them.
//!
//! # Formula
//! M_near = 2 k (2 theta_near + theta_far + phi); in a lowest column M_foot = 2 k rho (theta + phi) and
//! M_head = k ((3 + rho) theta + (1 + rho) phi). Symbols as in [`crate::assembly`].

use crate::Joint;
use crate::assembly::Numbering;
use swaybound::response::{Forces, Members};

impl Numbering {
    /// Fills the end moments of `members`, whose unknowns are `moved`.
    pub fn recover(self, members: &Members<1>, moved: &[f64], forces: &mut Forces<1>) {
        for storey in 0..members.storeys {
            for line in 0..members.lines() {
                let column = members.column(storey, line);
                let [foot, head] = self.column_moments(members, (storey, line), moved);
                forces.column_foot[column] = [foot];
                forces.column_head[column] = [head];
            }
            for bay in 0..members.bays {
                let beam = members.beam(storey, bay);
                let [left, right] = self.beam_moments(members, (storey, bay), moved);
                forces.beam_left[beam] = [left];
                forces.beam_right[beam] = [right];
            }
        }
    }

    #[inline(always)]
    fn column_moments(self, members: &Members<1>, (storey, line): (usize, usize), moved: &[f64]) -> [f64; 2] {
        let k = members.column_stiffness[members.column(storey, line)][0];
        let (chord, head) = (moved[self.chord(storey)], moved[self.turn(storey, line)]);
        if storey == 0 {
            let rho = members.foot_rho[line][0];
            return [2.0 * k * rho * (head + chord), k * ((3.0 + rho) * head + (1.0 + rho) * chord)];
        }
        end_moments(k, moved[self.turn(storey - 1, line)], head, chord)
    }

    #[inline(always)]
    fn beam_moments(self, members: &Members<1>, (storey, bay): (usize, usize), moved: &[f64]) -> [f64; 2] {
        let k = members.beam_stiffness[members.beam(storey, bay)][0];
        let chord = match self.joint() {
            Joint::Rotation => 0.0,
            Joint::RiseAndRotation => {
                (moved[self.fall(storey, bay)] - moved[self.fall(storey, bay + 1)]) / members.width[bay][0]
            }
        };
        end_moments(k, moved[self.turn(storey, bay)], moved[self.turn(storey, bay + 1)], chord)
    }
}

#[inline(always)]
fn end_moments(k: f64, near: f64, far: f64, chord: f64) -> [f64; 2] {
    let both = near + far + chord;
    [2.0 * k * (both + near), 2.0 * k * (both + far)]
}
