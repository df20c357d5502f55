//! Slot elimination: many frames of one shape at once, exact, without ever building a matrix.
//!
//! # The equations
//! Unknown are each storey's chord rotation psi = drift/h, as phi = -3 psi, and for each joint its rotation theta; with
//! column axial strain before it its rise v, up positive, as u = 3 v/l (l = mean bay width). A beam's chord has phi = g
//! (u_right - u_left). With k = E I/length, q = E A l^2/(18 h), g = l/L and rho the fixity c/(c + 4 k) of a foot with spring
//! c, each row is half the derivative of the strain energy:
//!
//! | row | own term | bound to | right-hand side |
//! |---|---|---|---|
//! | theta | 2 sum k over the members at the joint | theta at the far ends: k; phi of the storeys below and above: k of the column there | 0 |
//! | phi | (2/3) sum k over the storey's columns | theta at both ends of each column: k | -V h/6 |
//! | u | sum q over the columns below and above + (2/3) sum k g^2 over the beams at the joint | u above and below: -q; u across a beam: -(2/3) k g^2; theta at both ends of a beam: k g from its right end, -k g from its left | 0 |
//!
//! Supports do not settle: below the ground storey u = 0. The feet are eliminated beforehand: there theta has (3 + rho)/2 of
//! its column's k in place of 2 k, phi (1 + 3 rho)/6 in place of 2/3, and they are bound by (1 + rho)/2 k. So fixed, pinned
//! and spring feet share lanes.
//!
//! # The slots
//! Taken storey by storey upwards, each phi before the joints on top of its storey, every unknown is bound only to those of
//! its own level and of the next. So the window of unknowns under way has one slot for the storey and one (or two) for each
//! column line, and who leaves is at once replaced by the one above it. For three column lines, `t2B` = theta on floor 2,
//! line B:
//!
//! ```text
//!        front  ...                back
//!       [ p1 | t1A | t1B | t1C ]          p1 is eliminated; p2 comes in: it knows t1A, t1B, t1C
//!       [ t1A | t1B | t1C | p2 ]          t1A, t1B are eliminated together; t2A, t2B come in: each knows the one
//!                                         below it, p2 and its neighbours
//!       [ t1C | p2 | t2A | t2B ]          t1C, p2 are eliminated together; t2C comes in, then p3
//!       [ t2A | t2B | t2C | p3 ]          and so on; above the roof is nobody, and the window runs empty
//! ```
//!
//! At most three unknowns leave together, as equal groups as a level allows; the storey above leaves with the last joints of
//! a level. With two unknowns a joint, joints leave one by one.
//!
//! # The algorithm
//! 1. Put the lowest level into the window.
//! 2. Invert the block D of the front unknowns by cofactors: one division, no square root.
//! 3. M = D^-1 C, C = the block's rows in the window's other columns; y = D^-1 b.
//! 4. Record M and y; subtract C' M from the window and C' y from its right-hand side, moving all to the front.
//! 5. The unknowns above the eliminated ones come in at the back, bound by few terms K to those: their rows are -K' M, no
//!    zero is loaded, multiplied or added; then their own terms are added.
//! 6. Go on from 2 until the roof has left the window.
//! 7. Back from the roof: x = y - M x_rest, x_rest = the unknowns right behind, as many as the window has.
//! 8. End moments from the unknowns of two levels; drifts from phi.
//! 9. Where asked, refine once: the moments' misfit in every equation is a new right-hand side for 3, 4 and 7.
//!
//! Every number is a [`Lane`]: W frames side by side, which never mix. What is noted of the pivots says at the end which
//! frame cannot stand. The window's order is a constant of the compiled code for four frames of up to 8 bays, a variable
//! beyond and for one frame alone.
//!
//! # Where to read on
//! `window` (and `wide`, for any order) has steps 2 to 4, with `inverse`; `sweep` 1, 5 and 6; `back` 7, `moments` 8,
//! `refine` 9. `routes` puts them together and chooses the window; `frames` and `joint` hold the terms of the
//! equations; `group` which joints leave together; `record` what is kept for the way back.

#![allow(clippy::needless_range_loop, reason = "rows and columns are what is meant; iterators would hide them")]

mod back;
mod frames;
mod group;
mod inverse;
mod joint;
mod moments;
mod record;
mod refine;
mod routes;
mod sweep;
mod wide;
mod window;

use crate::lane::{Form, Lane, Rows};
use crate::response::{Forces, Members};
use frames::Frames;
use record::Record;
use routes::Route;
pub use routes::Routes;

/// What moves at a joint.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Joint {
    /// It turns: columns keep their length.
    Rotation,
    /// It rises and turns: columns stretch and shorten.
    RiseAndRotation,
}

/// The elimination of `W` frames of one shape at a time, with the memory it needs.
pub struct Slots<const W: usize> {
    storeys: usize,
    bays: usize,
    route: Route<W>,
    memory: Memory<W>,
}

/// What one elimination needs room for, but for the windows of frames with many bays.
struct Memory<const W: usize> {
    /// l/L of each bay.
    slope: Rows<W>,
    /// l^2/(18 h) of each storey, m.
    strain: Rows<W>,
    record: Record<W>,
    /// The unknowns, level by level.
    found: Rows<W>,
    /// Changes to them where they are refined.
    change: Rows<W>,
    refines: bool,
}

impl<const W: usize> Slots<W>
where
    Form: Routes<W>,
{
    /// Room for frames of `storeys` storeys and `bays` bays, each 1 or more.
    pub fn new(joint: Joint, storeys: usize, bays: usize) -> Self {
        let order = match joint {
            Joint::Rotation => bays + 2,
            Joint::RiseAndRotation => 2 * bays + 3,
        };
        let stride = <Form as Routes<W>>::stride(bays, order);
        let memory = Memory {
            slope: Rows::zeros(bays),
            strain: Rows::zeros(storeys),
            record: Record::new(order, stride, storeys),
            found: Rows::zeros(order * storeys),
            change: Rows::zeros(0),
            refines: false,
        };
        Self { storeys, bays, route: <Form as Routes<W>>::route(joint, bays), memory }
    }

    /// The same with one step of iterative refinement, which brings what the equations miss down to a third and less. Digits
    /// that rises lose against each other in very tall frames are lost all the same.
    pub fn refined(mut self) -> Self {
        self.memory.refines = true;
        self.memory.record.keep_inverses();
        self.memory.change = Rows::zeros(self.memory.found.len());
        self
    }

    /// Solves `W` frames: fills the end moments and drifts of `forces`; returns which frames can stand. The numbers of one
    /// that cannot mean nothing; the others' are not touched by it.
    ///
    /// # Units
    /// N m, m; relative where the frames' sizes are.
    ///
    /// # Assumptions
    /// Linear elastic, plain members between joint centres, floors rigid in their own plane. `members` and `forces` are of
    /// the shape that [`Slots::new`] was given; where any row is of another length, no frame is solved.
    pub fn solve(&mut self, form: Form, members: &Members<W>, forces: &mut Forces<W>) -> [bool; W] {
        if !self.fits(members, forces) {
            return [false; W];
        }
        (self.route.0)(form, &mut self.memory, members, forces)
    }

    /// Whether all that is read and written has the length of the shape.
    fn fits(&self, members: &Members<W>, forces: &Forces<W>) -> bool {
        let (storeys, bays) = (self.storeys, self.bays);
        let (columns, beams) = (storeys * (bays + 1), storeys * bays);
        let lengths = [
            (members.column_stiffness.len(), columns),
            (members.axial_stiffness.len(), columns),
            (members.beam_stiffness.len(), beams),
            (members.foot_rho.len(), bays + 1),
            (members.position.len(), bays + 1),
            (members.width.len(), bays),
            (members.shear.len(), storeys),
            (members.height.len(), storeys),
            (forces.column_foot.len(), columns),
            (forces.column_head.len(), columns),
            (forces.beam_left.len(), beams),
            (forces.beam_right.len(), beams),
            (forces.drift.len(), storeys),
        ];
        let shape = (members.storeys, members.bays) == (storeys, bays);
        storeys > 0 && bays > 0 && shape && lengths.iter().all(|(found, needed)| found == needed)
    }
}

impl<const W: usize> Memory<W> {
    /// The frames as the kernel reads them; with column axial strain, `rises`, its coefficients are formed first.
    #[inline(always)]
    fn frames<'a, L: Lane<W>>(
        slope: &'a mut Rows<W>,
        strain: &'a mut Rows<W>,
        members: &'a Members<W>,
        rises: bool,
    ) -> Frames<'a, W> {
        if rises {
            let length = L::load(&members.position[members.bays]) * L::splat(1.0 / members.bays as f64);
            for (slope, width) in slope.iter_mut().zip(&members.width) {
                (length / L::load(width)).store(slope);
            }
            let square = length * length * L::splat(1.0 / 18.0);
            for (strain, height) in strain.iter_mut().zip(&members.height) {
                (square / L::load(height)).store(strain);
            }
        }
        Frames {
            storeys: members.storeys,
            columns: &members.column_stiffness,
            axial: if rises { &members.axial_stiffness } else { &[] },
            beams: &members.beam_stiffness,
            rho: &members.foot_rho,
            shear: &members.shear,
            height: &members.height,
            slope: if rises { slope } else { &[] },
            strain: if rises { strain } else { &[] },
        }
    }
}
