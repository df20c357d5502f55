//! The crate's own kernel.

use crate::{Failed, Joint, Peer};
use swaybound::lane::Form;
use swaybound::response::{Forces, Members};
use swaybound::solve::{Routes, Slots};

/// The kernel for one shape, in one form.
pub struct Kernel<const W: usize> {
    form: Form,
    slots: Slots<W>,
}

impl<const W: usize> Kernel<W>
where
    Form: Routes<W>,
{
    /// Room for frames of the shape of `example`.
    pub fn new(form: Form, joint: Joint, example: &Members<1>) -> Self {
        Self { form, slots: Slots::new(joint, example.storeys, example.bays) }
    }

    /// The same with one step of iterative refinement.
    pub fn refined(self) -> Self {
        Self { slots: self.slots.refined(), ..self }
    }
}

impl<const W: usize> Peer<W> for Kernel<W>
where
    Form: Routes<W>,
{
    fn solve(&mut self, members: &Members<W>, forces: &mut Forces<W>) -> Result<(), Failed> {
        let stand = self.slots.solve(self.form, members, forces);
        if stand == [true; W] { Ok(()) } else { Err(Failed::NotDefinite { peer: "the kernel" }) }
    }
}
