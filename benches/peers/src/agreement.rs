//! Every peer against the exact analyses of the crate, before anything is timed.

use crate::frames::{Shape, random};
use crate::lapack::Lapack;
use crate::peers::{JOINTS, Who, four_by_four, one_by_one};
use crate::{Failed, Joint, Peer};
use swaybound::exact::{slope_deflection, stiffness};
use swaybound::frame::Frame;
use swaybound::response::{Forces, Members, Response};

/// The most that any end moment may differ, over the frame's largest. Two good solvers leave 1e-14 to 1e-11; a wrong
/// term leaves far more.
pub const TOLERANCE: f64 = 1e-10;

/// The exact answer of the crate's own analysis of one frame.
///
/// # Errors
/// [`Failed::Exact`] where there is none.
pub fn exact(joint: Joint, frame: &Frame) -> Result<Response, Failed> {
    Ok(match joint {
        Joint::Rotation => slope_deflection::analyse(frame)?,
        Joint::RiseAndRotation => stiffness::analyse(frame)?,
    })
}

/// The largest difference of an end moment in `lane` from `exact`, over the frame's largest.
pub fn difference<const W: usize>(exact: &Response, members: &Members<W>, forces: &Forces<W>, lane: usize) -> f64 {
    let mut worst = Worst(0.0);
    for storey in 0..members.storeys {
        for line in 0..members.lines() {
            let (expected, column) = (exact.column(storey, line), members.column(storey, line));
            worst.take(expected.foot - forces.column_foot[column][lane]);
            worst.take(expected.head - forces.column_head[column][lane]);
        }
        for bay in 0..members.bays {
            let (expected, beam) = (exact.beam(storey, bay), members.beam(storey, bay));
            worst.take(expected.left - forces.beam_left[beam][lane]);
            worst.take(expected.right - forces.beam_right[beam][lane]);
        }
    }
    worst.0 / exact.largest_moment()
}

/// The largest magnitude taken; no number is larger than every number, and stays.
struct Worst(f64);

impl Worst {
    fn take(&mut self, value: f64) {
        if value.is_nan() || value.abs() > self.0 {
            self.0 = value.abs();
        }
    }
}

/// What was compared, and the worst of it.
#[derive(Debug, Clone, PartialEq)]
pub struct Agreement {
    /// Number of frames.
    pub frames: usize,
    /// Largest difference of each peer, over the frame's largest moment.
    pub worst: Vec<(Who, f64)>,
}

impl Agreement {
    fn take(&mut self, who: Who, difference: f64) {
        match self.worst.iter_mut().find(|(other, _)| *other == who) {
            Some((_, worst)) => *worst = worst.max(difference),
            None => self.worst.push((who, difference)),
        }
    }
}

/// `difference` where it is small enough.
fn small(who: Who, frame: &Frame, difference: f64) -> Result<f64, Failed> {
    if difference.is_nan() || difference > TOLERANCE {
        return Err(Failed::Differs { peer: who.name(), frame: frame.title().into(), difference });
    }
    Ok(difference)
}

/// How far `peer` is from the exact analysis of `frame`.
///
/// # Errors
/// [`Failed::Differs`] where that is more than [`TOLERANCE`].
pub fn compare(who: Who, peer: &mut dyn Peer<1>, frame: &Frame, expected: &Response) -> Result<f64, Failed> {
    let members = Members::of(frame);
    let mut forces = Forces::for_members(&members);
    peer.solve(&members, &mut forces)?;
    small(who, frame, difference(expected, &members, &forces, 0))
}

/// Compares every peer with the exact analysis on the first `count` frames of each shape, in groups of four.
///
/// # Errors
/// [`Failed::Differs`] where one is further away than [`TOLERANCE`].
pub fn check(lapack: Option<&Lapack>, shapes: &[Shape], count: usize) -> Result<Agreement, Failed> {
    let mut agreement = Agreement { frames: 0, worst: Vec::new() };
    for joint in JOINTS {
        for shape in shapes {
            let frames = (0..count as u64).map(|seed| random(*shape, seed)).collect::<Result<Vec<_>, _>>()?;
            for four in frames.as_chunks().0 {
                compare_four(&mut agreement, lapack, joint, four)?;
            }
        }
    }
    Ok(agreement)
}

fn compare_four(
    agreement: &mut Agreement,
    lapack: Option<&Lapack>,
    joint: Joint,
    frames: &[Frame; 4],
) -> Result<(), Failed> {
    let members = frames.each_ref().map(Members::of);
    let expected = frames.iter().map(|frame| exact(joint, frame)).collect::<Result<Vec<_>, _>>()?;
    for (who, mut peer) in one_by_one(lapack, joint, &members[0])? {
        for (frame, expected) in frames.iter().zip(&expected) {
            agreement.take(who, compare(who, &mut *peer, frame, expected)?);
        }
    }
    let side_by_side = Members::side_by_side(members.each_ref());
    for (who, mut peer) in four_by_four(joint, &members[0]) {
        let mut forces = Forces::for_members(&side_by_side);
        peer.solve(&side_by_side, &mut forces)?;
        for (lane, (frame, expected)) in frames.iter().zip(&expected).enumerate() {
            agreement.take(who, small(who, frame, difference(expected, &side_by_side, &forces, lane))?);
        }
    }
    agreement.frames += frames.len();
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::kernel::Kernel;
    use swaybound::lane::Form;

    #[test]
    fn all_agree() -> Result<(), Failed> {
        let shapes = [(1, 1), (1, 4), (4, 1), (2, 2), (3, 5)].map(|(bays, storeys)| Shape { bays, storeys });
        let lapack = Lapack::open();
        let agreement = check(lapack.as_ref(), &shapes, 12)?;
        assert_eq!(agreement.frames, 2 * shapes.len() * 12);
        assert!(agreement.worst.len() >= 4, "{agreement:?}");
        Ok(())
    }

    /// The kernel with one moment spoilt.
    struct Spoilt(Kernel<1>, f64);

    impl Peer<1> for Spoilt {
        fn solve(&mut self, members: &Members<1>, forces: &mut Forces<1>) -> Result<(), Failed> {
            self.0.solve(members, forces)?;
            forces.beam_right[0][0] += self.1;
            Ok(())
        }
    }

    #[test]
    fn one_wrong_moment_is_seen() -> Result<(), Failed> {
        let frame = random(Shape { bays: 2, storeys: 3 }, 1)?;
        let expected = exact(Joint::Rotation, &frame)?;
        let kernel = || Kernel::<1>::new(Form::PORTABLE, Joint::Rotation, &Members::of(&frame));
        let found = |error| compare(Who::One(Form::PORTABLE), &mut Spoilt(kernel(), error), &frame, &expected);
        assert!(found(0.0).is_ok());
        assert!(matches!(found(1e-8 * expected.largest_moment()), Err(Failed::Differs { .. })));
        assert!(matches!(found(f64::NAN), Err(Failed::Differs { .. })));
        Ok(())
    }
}
