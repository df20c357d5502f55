//! The batch runner: the same frames for any number of threads, forms of lanes and chunks; every frame as it is alone;
//! failures and refusals named.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use std::sync::atomic::{AtomicU64, Ordering};
use support::{Sizes, build, parts};
use swaybound::approx;
use swaybound::exact::plain::Analysis;
use swaybound::exact::{slope_deflection, stiffness};
use swaybound::family::batch::{
    Batch, FAILURES_KEPT, Failure, Group, Population, QuickSizes, Reducer, Shape, with_threads,
};
use swaybound::family::{SizeDraws, Source};
use swaybound::frame::sizes::{Range, SizeModel};
use swaybound::frame::{Feet, Frame};
use swaybound::lane::{Form, Lane};
use swaybound::progress::{Progress, Unwatched};
use swaybound::response::{Entry, Fit, Members, Response};

/// A building of our own, whose sizes the model draws.
fn frame() -> Frame {
    let storeys = [4.6, 3.8, 3.8, 3.8, 3.4];
    let mut parts = parts(&[7.0, 8.5, 6.0], &storeys, &[60e3, 70e3, 80e3, 90e3, 55e3]).areas(|_, _| 0.2);
    parts.modulus = 31e9;
    build(parts)
}

fn model() -> SizeModel {
    SizeModel {
        foot_spring: Some(Range::LogUniform { low: 1.0, high: 20.0 }),
        end_column_inertia: Some(Range::Fixed(4e-3)),
        ..SizeModel::default()
    }
}

/// The same on feet that are fixed as stated, which every method takes.
fn on_fixed_feet() -> SizeModel {
    SizeModel { foot_spring: None, ..model() }
}

fn draws() -> SizeDraws<4> {
    SizeDraws::of_model(&frame(), &model(), Source::new(11)).unwrap()
}

/// All quick methods that give forces.
fn methods() -> Vec<&'static Entry> {
    approx::METHODS.iter().filter(|entry| entry.info.gives.forces()).collect()
}

/// Every frame's numbers, by draw: ground-storey moments and a top beam's, exact and quick.
#[derive(Debug, Clone, PartialEq, Default)]
struct Kept(Vec<(u64, Vec<u64>)>);

impl Reducer for Kept {
    fn group(&mut self, _form: Form, group: Group) {
        for lane in group.lanes() {
            let last = group.exact.beam_left.len() - 1;
            let of = |forces: &swaybound::response::Forces<4>| {
                [forces.column_foot[1][lane], forces.column_head[0][lane], forces.beam_left[last][lane]]
                    .map(f64::to_bits)
            };
            let numbers = [group.exact].into_iter().chain(group.quick.iter().flatten()).flat_map(of).collect();
            self.0.push((group.draws[lane], numbers));
        }
    }

    fn merge(&mut self, later: Self) {
        self.0.extend(later.0);
    }
}

#[test]
fn neither_threads_nor_chunks_nor_forms_change_a_bit() {
    let (draws, methods) = (draws(), methods());
    for analysis in [Analysis::SlopeDeflection, Analysis::Stiffness] {
        let batch = Batch { chunk: 64, ..Batch::new(&draws, analysis, &methods) };
        let expected = with_threads(1, || batch.run(5..1004, Kept::default, &Unwatched)).unwrap();
        assert_eq!(expected.reduced.0.len(), 999);
        assert!(expected.reduced.0.iter().map(|(draw, _)| *draw).eq(5..1004), "draws come in order");
        assert!(expected.failures.is_empty() && expected.done == (5..1004));
        for threads in [2, 3, 7] {
            let found = with_threads(threads, || batch.run(5..1004, Kept::default, &Unwatched)).unwrap();
            assert_eq!(found, expected, "{threads} threads");
        }
        for chunk in [1, 3, 4, 50, 5000] {
            let found = Batch { chunk, ..batch.clone() }.run(5..1004, Kept::default, &Unwatched);
            assert_eq!(found.reduced, expected.reduced, "chunks of {chunk}");
        }
        let portable = Batch { form: Form::PORTABLE, ..batch.clone() }.run(5..1004, Kept::default, &Unwatched);
        assert_eq!(portable.reduced, expected.reduced);
    }
}

/// A draw in the batch is the frame that the plain route makes of it, analysed alone; a method that refuses it alone
/// answers nothing here, and says why.
#[test]
fn a_draw_is_the_frame_it_stands_for() {
    let methods = methods();
    for (model, refused) in [(on_fixed_feet(), false), (model(), true)] {
        let draws = SizeDraws::of_model(&frame(), &model, Source::new(11)).unwrap();
        for analysis in [Analysis::SlopeDeflection, Analysis::Stiffness] {
            let outcome = Batch::new(&draws, analysis, &methods).run(0..200, Kept::default, &Unwatched);
            for (draw, numbers) in outcome.reduced.0 {
                same_as_alone(&draws.frame(draw).unwrap(), analysis, &methods, &numbers);
            }
            let refusing: Vec<_> = outcome.refusals.iter().map(|refusal| refusal.method).collect();
            let example = draws.frame(0).unwrap();
            let mut expected: Vec<_> =
                methods.iter().filter(|entry| refuses(entry, &example)).map(|entry| entry.info.id).collect();
            expected.sort_unstable();
            assert_eq!(refusing, expected);
            assert_eq!(!refusing.is_empty(), refused, "spring feet are refused by some, fixed feet by none");
        }
    }
}

fn refuses(entry: &Entry, frame: &Frame) -> bool {
    matches!((entry.fit)(frame), Fit::Refused(_))
}

#[track_caller]
fn same_as_alone(frame: &Frame, analysis: Analysis, methods: &[&'static Entry], numbers: &[u64]) {
    let exact = match analysis {
        Analysis::SlopeDeflection => slope_deflection::analyse(frame),
        Analysis::Stiffness => stiffness::analyse(frame),
    };
    let answering = methods.iter().filter(|entry| !refuses(entry, frame));
    let responses = [exact.unwrap()].into_iter().chain(answering.map(|entry| entry.analyse(frame)));
    let top = frame.storeys() - 1;
    let of = |response: Response| {
        let beam = response.beam(top, frame.bays() - 1).left;
        [response.column(0, 1).foot, response.column(0, 0).head, beam]
    };
    let expected: Vec<f64> = responses.flat_map(of).collect();
    assert_eq!(numbers.len(), expected.len());
    let scale = frame.storey_shear(0) * frame.storey_height(0);
    for (found, expected) in numbers.iter().map(|bits| f64::from_bits(*bits)).zip(expected) {
        assert!((found - expected).abs() <= 1e-11 * scale, "{found} for {expected}");
    }
}

/// What an engineer calculates before sizes are known does not know the draw; the exact answer does.
#[test]
fn methods_can_be_kept_to_the_assumed_sizes() {
    let (methods, model) = (methods(), on_fixed_feet());
    let draws = SizeDraws::of_model(&frame(), &model, Source::new(11)).unwrap();
    let batch = Batch { quick_sizes: QuickSizes::Assumed, ..Batch::new(&draws, Analysis::SlopeDeflection, &methods) };
    let kept = batch.run(0..50, Kept::default, &Unwatched).reduced.0;
    let alone: Vec<u64> = methods
        .iter()
        .flat_map(|entry| {
            let response = entry.analyse(&frame());
            let beam = response.beam(frame().storeys() - 1, frame().bays() - 1).left;
            [response.column(0, 1).foot, response.column(0, 0).head, beam].map(f64::to_bits)
        })
        .collect();
    for (draw, numbers) in &kept {
        assert_eq!(numbers[3..], alone, "draw {draw}");
    }
    assert_ne!(kept[0].1[..3], kept[1].1[..3]);
}

/// Column axial strain needs areas and real sizes, as it does for one frame.
#[test]
fn strain_is_not_computed_from_sizes_that_are_only_relative() {
    let relative = SizeModel { foot_spring: None, end_column_inertia: None, ..model() };
    let draws = SizeDraws::of_model(&frame(), &relative, Source::new(1)).unwrap();
    let outcome = Batch::new(&draws, Analysis::Stiffness, &[]).run(0..2000, Kept::default, &Unwatched);
    assert!(outcome.reduced.0.is_empty() && outcome.failed == 2000 && outcome.failures.len() == FAILURES_KEPT);
    assert!(outcome.failures.iter().all(|(_, failure)| *failure == Failure::NoRealSizes));
    let inextensible = Batch::new(&draws, Analysis::SlopeDeflection, &[]).run(0..20, Kept::default, &Unwatched);
    assert_eq!((inextensible.failed, inextensible.reduced.0.len()), (0, 20));
}

/// Frames of several shapes, some of which cannot stand.
struct Mixed;

impl Mixed {
    fn frame(shape: Shape) -> Frame {
        let (bays, storeys) = (vec![6.0; shape.bays], vec![3.5; shape.storeys]);
        build(parts(&bays, &storeys, &vec![1e4; shape.storeys]).feet(Feet::Pinned))
    }

    fn is_broken(draw: u64) -> bool {
        draw % 7 == 3
    }
}

impl Population for Mixed {
    fn shape(&self, draw: u64) -> Shape {
        Shape { storeys: 1 + (draw % 3) as usize, bays: 1 + (draw % 5) as usize }
    }

    fn example(&self, shape: Shape) -> Option<Frame> {
        Some(Self::frame(shape))
    }

    fn members(&self, shape: Shape) -> Members<4> {
        Members::of(&Self::frame(shape)).in_every_lane()
    }

    fn fill<L: Lane<4>>(&self, draws: [u64; 4], members: &mut Members<4>) {
        for (lane, draw) in draws.into_iter().enumerate() {
            let stiffness = if Self::is_broken(draw) { 0.0 } else { 1.0 + draw as f64 };
            members.beam_stiffness.iter_mut().for_each(|row| row[lane] = stiffness);
        }
    }
}

#[test]
fn draws_that_cannot_stand_are_named_and_left_out() {
    for chunk in [4, 10, 4096] {
        let batch = Batch { chunk, ..Batch::new(&Mixed, Analysis::SlopeDeflection, &[]) };
        let outcome = batch.run(0..100, Kept::default, &Unwatched);
        let expected: Vec<u64> = (0..100).filter(|draw| Mixed::is_broken(*draw)).collect();
        assert!(outcome.failures.iter().map(|(draw, _)| *draw).eq(expected.iter().copied()));
        assert!(outcome.failures.iter().all(|(_, failure)| *failure == Failure::CannotStand));
        let mut kept: Vec<u64> = outcome.reduced.0.iter().map(|(draw, _)| *draw).collect();
        kept.sort_unstable();
        assert!(kept.into_iter().eq((0..100).filter(|draw| !Mixed::is_broken(*draw))));
    }
}

/// Frames that can stand, but in which beams are missing at some joint, so that a method divides by nothing.
struct Gaps;

impl Population for Gaps {
    fn shape(&self, _draw: u64) -> Shape {
        Shape { storeys: 2, bays: 2 }
    }

    fn example(&self, shape: Shape) -> Option<Frame> {
        Some(build(parts(&vec![6.0; shape.bays], &vec![3.5; shape.storeys], &vec![1e4; shape.storeys])))
    }

    fn members(&self, shape: Shape) -> Members<4> {
        Members::of(&self.example(shape).unwrap()).in_every_lane()
    }

    fn fill<L: Lane<4>>(&self, draws: [u64; 4], members: &mut Members<4>) {
        for (lane, draw) in draws.into_iter().enumerate() {
            let gap = draw % 5 == 2;
            members.beam_stiffness.iter_mut().for_each(|row| row[lane] = if gap { 0.0 } else { 1.0 });
        }
    }
}

#[test]
fn draws_in_which_a_method_comes_to_no_number_are_named_and_left_out() {
    let methods = [approx::find("substitute-frame").unwrap(), approx::find("factor").unwrap()];
    let outcome = Batch::new(&Gaps, Analysis::SlopeDeflection, &methods).run(0..50, Kept::default, &Unwatched);
    let gaps: Vec<u64> = (0..50).filter(|draw| draw % 5 == 2).collect();
    assert!(outcome.failures.iter().map(|(draw, _)| *draw).eq(gaps), "{:?}", outcome.failures);
    assert!(outcome.failures.iter().all(|(_, failure)| matches!(failure, Failure::NoNumber(_))));
    assert_eq!(outcome.reduced.0.len(), 40);
}

/// Assumed sizes without beams: nothing a method that needs them could answer by.
struct NoBeamsAssumed;

impl Population for NoBeamsAssumed {
    fn shape(&self, draw: u64) -> Shape {
        Gaps.shape(draw)
    }

    fn example(&self, shape: Shape) -> Option<Frame> {
        Gaps.example(shape)
    }

    fn members(&self, shape: Shape) -> Members<4> {
        let mut members = Gaps.members(shape);
        members.beam_stiffness.iter_mut().for_each(|row| *row = [0.0; 4]);
        members
    }

    fn fill<L: Lane<4>>(&self, _draws: [u64; 4], members: &mut Members<4>) {
        members.beam_stiffness.iter_mut().for_each(|row| *row = [1.0; 4]);
    }
}

#[test]
fn a_method_that_comes_to_no_number_on_assumed_sizes_is_refused() {
    let methods = [approx::find("portal").unwrap(), approx::find("substitute-frame").unwrap()];
    let batch = Batch::new(&NoBeamsAssumed, Analysis::SlopeDeflection, &methods);
    let outcome = Batch { quick_sizes: QuickSizes::Assumed, ..batch }.run(0..20, Kept::default, &Unwatched);
    assert!(outcome.refusals.iter().map(|refusal| refusal.method).eq(["substitute-frame"]), "{:?}", outcome.refusals);
    assert_eq!((outcome.failed, outcome.reduced.0.len()), (0, 20));
    assert!(outcome.reduced.0.iter().all(|(_, numbers)| numbers.len() == 6), "exact and portal, three numbers each");
}

#[test]
fn a_shape_among_others_gives_what_it_gives_alone() {
    let outcome = Batch::new(&Mixed, Analysis::SlopeDeflection, &[]).run(0..100, Kept::default, &Unwatched);
    for (draw, numbers) in outcome.reduced.0 {
        let shape = Mixed.shape(draw);
        let beam = 1.0 + draw as f64;
        let frame = Mixed::frame(shape);
        let mut parts = frame.parts().clone();
        parts.beams.iter_mut().for_each(|section| section.inertia = beam * 6.0);
        let exact = slope_deflection::analyse(&build(parts)).unwrap();
        let head = f64::from_bits(numbers[1]);
        let expected = exact.column(0, 0).head;
        assert!((head - expected).abs() <= 1e-11 * expected.abs(), "draw {draw}: {head} for {expected}");
    }
}

/// Stops after so many draws.
struct After {
    limit: u64,
    seen: AtomicU64,
}

impl Progress for After {
    fn advance(&self, draws: u64) {
        self.seen.fetch_add(draws, Ordering::Relaxed);
    }

    fn stopped(&self) -> bool {
        self.seen.load(Ordering::Relaxed) >= self.limit
    }
}

#[test]
fn a_stopped_run_says_how_far_it_came_and_goes_on_from_there() {
    let draws = draws();
    let batch = Batch { chunk: 32, ..Batch::new(&draws, Analysis::SlopeDeflection, &[]) };
    let whole = batch.run(0..3000, Kept::default, &Unwatched).reduced;
    let progress = After { limit: 500, seen: AtomicU64::new(0) };
    let first = with_threads(1, || batch.run(0..3000, Kept::default, &progress)).unwrap();
    assert!(first.done.end >= 32 && first.done.end < 3000, "{:?}", first.done);
    assert_eq!(first.reduced.0.len() as u64, first.done.end);
    let rest = batch.run(first.done.end..3000, Kept::default, &Unwatched);
    let mut together = first.reduced;
    together.merge(rest.reduced);
    assert_eq!(together, whole);
    let never = batch.run(0..3000, Kept::default, &After { limit: 0, seen: AtomicU64::new(0) });
    assert_eq!((never.done, never.reduced), (0..0, Kept::default()));
}
