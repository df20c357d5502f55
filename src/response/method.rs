//! The shape every quick method has, and the table row it is listed by.

use super::{ForceRows, Forces, MemberRows, Members, Response, Work, WorkRows, Worksheet};
use crate::frame::Frame;
use crate::lane::{Form, Lane, Task};
use std::marker::PhantomData;

/// What a method is, for reports and for choosing it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Info {
    /// Name in files and on the command line, such as `portal-tributary`.
    pub id: &'static str,
    /// Name in sentences, such as `portal method, tributary widths`.
    pub name: &'static str,
    /// Who published it, and where.
    pub source: &'static str,
    /// What it assumes, one sentence each.
    pub assumptions: &'static [&'static str],
    /// True where member sizes must be known (areas for the cantilever method count only as ratios).
    pub needs_sizes: bool,
    /// What the method states.
    pub gives: Gives,
}

/// What a method states.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Gives {
    /// Member forces.
    Forces,
    /// Storey drifts.
    Drifts,
    /// Member forces and storey drifts.
    Both,
}

impl Gives {
    /// Whether member forces are among it.
    pub fn forces(self) -> bool {
        self != Self::Drifts
    }

    /// Whether storey drifts are among it.
    pub fn drifts(self) -> bool {
        self != Self::Forces
    }
}

/// A reason to read a method's numbers with care, as one sentence.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct Caution(pub String);

/// Whether a method may be used on a frame.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Fit {
    /// The frame is what the method was published for.
    Suits,
    /// The method answers, with these reasons to doubt it.
    Doubtful(Vec<Caution>),
    /// The method has no answer for this frame.
    Refused(Caution),
}

/// A quick method, written once over lanes.
pub trait Method {
    /// What the method is.
    const INFO: Info;

    /// Whether the method may be used on `frame`.
    fn fit(frame: &Frame) -> Fit;

    /// Computes what [`Info::gives`] says for `W` frames; the rest of `forces` means nothing.
    ///
    /// `work` and `forces` must have been made for `members`.
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>);

    /// The hand calculation with the frame's own numbers; `response` is the method's answer for `frame`.
    fn worksheet(frame: &Frame, response: &Response) -> Worksheet;
}

/// One method as a row of plain function pointers, so that methods can stand in one list.
#[derive(Debug, Clone, Copy)]
pub struct Entry {
    /// What the method is.
    pub info: &'static Info,
    /// See [`Method::fit`].
    pub fit: fn(&Frame) -> Fit,
    /// [`Method::respond`] for one frame.
    pub one: fn(Form, &Members<1>, &mut Work<1>, &mut Forces<1>),
    /// [`Method::respond`] for four frames.
    pub four: fn(Form, &Members<4>, &mut Work<4>, &mut Forces<4>),
    /// See [`Method::worksheet`].
    pub worksheet: fn(&Frame, &Response) -> Worksheet,
}

impl Entry {
    /// The row of method `M`.
    pub const fn of<M: Method>() -> Self {
        Self {
            info: &M::INFO,
            fit: M::fit,
            one: |form, members, work, forces| form.one(Respond::<M, 1>::new(members, work, forces)),
            four: |form, members, work, forces| form.four(Respond::<M, 4>::new(members, work, forces)),
            worksheet: M::worksheet,
        }
    }

    /// The method's answer for one frame.
    pub fn analyse(&self, frame: &Frame) -> Response {
        let members = Members::of(frame);
        let mut forces = Forces::for_members(&members);
        (self.one)(Form::PORTABLE, &members, &mut Work::for_members(&members), &mut forces);
        let response = match self.info.gives.forces() {
            true => Response::from_forces(self.info.id, frame, &forces),
            false => Response::without_forces(self.info.id, frame),
        };
        match self.info.gives.drifts() && frame.has_real_stiffness() {
            true => response.with_drifts(&forces.drift.iter().map(|[drift]| *drift).collect::<Vec<_>>()),
            false => response,
        }
    }
}

/// [`Method::respond`] as a task for lanes.
struct Respond<'a, M, const W: usize> {
    members: &'a Members<W>,
    work: &'a mut Work<W>,
    forces: &'a mut Forces<W>,
    method: PhantomData<M>,
}

impl<'a, M, const W: usize> Respond<'a, M, W> {
    fn new(members: &'a Members<W>, work: &'a mut Work<W>, forces: &'a mut Forces<W>) -> Self {
        Self { members, work, forces, method: PhantomData }
    }
}

impl<M: Method, const W: usize> Respond<'_, M, W> {
    #[inline(always)]
    fn respond<L: Lane<W>>(self, members: &MemberRows<W>) {
        M::respond::<L, W>(members, &mut self.work.rows(), &mut self.forces.rows());
    }
}

impl<M: Method, const W: usize> Task<W> for Respond<'_, M, W> {
    type Output = ();
    #[inline(always)]
    fn run<L: Lane<W>>(self) {
        let members = self.members.rows();
        // One frame alone is no hurry; four at a time, usual widths are compiled with their loops laid out.
        match members.bays {
            1 if W > 1 => self.respond::<L>(&members.of_bays::<1>()),
            2 if W > 1 => self.respond::<L>(&members.of_bays::<2>()),
            3 if W > 1 => self.respond::<L>(&members.of_bays::<3>()),
            4 if W > 1 => self.respond::<L>(&members.of_bays::<4>()),
            5 if W > 1 => self.respond::<L>(&members.of_bays::<5>()),
            _ => self.respond::<L>(&members),
        }
    }
}
