//! Who takes part.

use crate::assembly::Numbering;
use crate::dense::Dense;
use crate::kernel::Kernel;
use crate::lapack::{Banded, Lapack};
use crate::sparse::Sparse;
use crate::{Failed, Joint, Peer};
use swaybound::lane::Form;
use swaybound::response::Members;

/// Without and with column axial strain.
pub const JOINTS: [Joint; 2] = [Joint::Rotation, Joint::RiseAndRotation];

/// A peer.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Who {
    /// [`Banded`].
    Lapack,
    /// [`Dense`].
    Nalgebra,
    /// [`Sparse`].
    Faer,
    /// The crate's kernel, one frame at a time.
    One(Form),
    /// The crate's kernel, four frames at a time.
    Four(Form),
    /// The same, its answers refined once.
    Refined(Form),
}

/// A peer, ready to run.
pub type Runner<'a, const W: usize> = Box<dyn Peer<W> + 'a>;

impl Who {
    /// Name for people.
    pub fn name(self) -> String {
        match self {
            Self::Lapack => "LAPACK".into(),
            Self::Nalgebra => "nalgebra".into(),
            Self::Faer => "faer".into(),
            Self::One(form) => format!("kernel, one frame, {}", form.name()),
            Self::Four(form) => format!("kernel, four frames, {}", form.name()),
            Self::Refined(form) => format!("kernel, four frames, {}, refined", form.name()),
        }
    }
}

/// The forms that this processor has, the best first.
pub fn forms() -> Vec<Form> {
    let mut forms = vec![Form::best()];
    if Form::best() != Form::PORTABLE {
        forms.push(Form::PORTABLE);
    }
    forms
}

/// All that take one frame at a time, for frames of the shape of `example`.
///
/// # Errors
/// Those of [`Sparse::new`].
pub fn one_by_one<'a>(
    lapack: Option<&'a Lapack>,
    joint: Joint,
    example: &Members<1>,
) -> Result<Vec<(Who, Runner<'a, 1>)>, Failed> {
    let numbering = Numbering::new(joint, example.storeys, example.bays);
    let mut peers: Vec<(Who, Runner<1>)> = Vec::new();
    if let Some(lapack) = lapack {
        peers.push((Who::Lapack, Box::new(Banded::new(lapack, numbering))));
    }
    peers.push((Who::Nalgebra, Box::new(Dense::new(numbering))));
    peers.push((Who::Faer, Box::new(Sparse::new(numbering, example)?)));
    peers.extend(forms().into_iter().map(|form| (Who::One(form), one(form, joint, example))));
    Ok(peers)
}

/// All that take four frames at a time, for frames of the shape of `example`.
pub fn four_by_four(joint: Joint, example: &Members<1>) -> Vec<(Who, Runner<'static, 4>)> {
    let mut peers: Vec<_> = forms().into_iter().map(|form| (Who::Four(form), four(form, joint, example))).collect();
    let best = Kernel::<4>::new(Form::best(), joint, example);
    peers.push((Who::Refined(Form::best()), Box::new(best.refined())));
    peers
}

/// The kernel, one frame at a time.
pub fn one(form: Form, joint: Joint, example: &Members<1>) -> Runner<'static, 1> {
    Box::new(Kernel::<1>::new(form, joint, example))
}

/// The kernel, four frames at a time.
pub fn four(form: Form, joint: Joint, example: &Members<1>) -> Runner<'static, 4> {
    Box::new(Kernel::<4>::new(form, joint, example))
}
