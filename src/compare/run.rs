//! One whole comparison: every analysis of a frame, their statics, errors and verdicts.

use super::errors::{ValueError, errors};
use super::verdict::{State, Subject, Verdict, by_shortfall, judge};
use crate::approx::METHODS;
use crate::exact::{Unsolvable, slope_deflection, stiffness};
use crate::frame::{Feet, Frame};
use crate::response::statics::{self, Statics};
use crate::response::{Entry, Fit, Response};
use thiserror::Error;

/// Above this height over width, column axial strain is part of the exact answer where areas allow it.
const SLENDER: f64 = 2.0;
/// Above this number of storeys likewise.
const TALL: usize = 8;
/// Foot springs of the second line that fixed feet get, times 4 E I_c / h: real feet lie between (common practice).
pub const FOOT_RATIOS: [f64; 2] = [20.0, 1.0];

/// A drift over this share of the storey height is taken for a slip in loads, sizes or units (common practice: codes allow
/// a small part of it).
const ABSURD_DRIFT: f64 = 1.0 / 20.0;

/// A result that is allowed but absurd. Storeys count from 1.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum ResultWarning {
    /// A storey drifts out of all proportion.
    #[error(
        "storey {storey} drifts by 1/{:.1} of its height, beyond 1/20: check loads, sizes and units; the analysis is linear \
         and means little there",
        1.0 / ratio
    )]
    LargeDrift {
        /// The storey with the largest drift over height.
        storey: usize,
        /// Its drift over its height.
        ratio: f64,
    },
}

/// Which exact analysis the quick methods are measured by.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum ExactChoice {
    /// `stiffness` for tall or slender frames whose columns have areas, else `slope-deflection`.
    #[default]
    Automatic,
    /// Inextensible members.
    SlopeDeflection,
    /// With column axial strain.
    Stiffness,
}

/// What a comparison is asked for.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Options {
    /// How far a value may be off before the method does not suffice, percent of the storey's reference.
    pub tolerance: f64,
    /// Which exact analysis is the measure.
    pub exact: ExactChoice,
}

/// One quick method and what came of it.
#[derive(Debug, Clone)]
pub struct Quick {
    /// The method.
    pub entry: &'static Entry,
    /// Whether it may be used on this frame.
    pub fit: Fit,
    /// Its answer; `None` where it refuses.
    pub response: Option<Response>,
}

/// How the worst shortfall of a method in the two lowest storeys moves when fixed feet turn a little.
#[derive(Debug, Clone, PartialEq)]
pub struct FootLine {
    /// Name of the method in files.
    pub method: &'static str,
    /// What is judged.
    pub subject: Subject,
    /// Lowest storey error with fixed feet, percent.
    pub fixed: f64,
    /// The same with the foot springs of [`FOOT_RATIOS`].
    pub sprung: [f64; 2],
}

/// Everything a comparison found.
#[derive(Debug, Clone)]
pub struct Comparison {
    /// What was asked for.
    pub options: Options,
    /// The exact answers; the first is the measure of all errors.
    pub exact: Vec<Response>,
    /// Why the analysis with column axial strain was not run.
    pub no_stiffness: Option<Unsolvable>,
    /// True where the frame is tall or slender but the measure leaves out column axial strain.
    pub axial_strain_missing: bool,
    /// The quick methods.
    pub quick: Vec<Quick>,
    /// Errors against the measure: of each quick method, then of the other exact answer.
    pub errors: Vec<(&'static str, Vec<ValueError>)>,
    /// Verdicts on quick methods, subject by subject.
    pub verdicts: Vec<Verdict>,
    /// The second line of fixed feet; empty for other feet.
    pub feet: Vec<FootLine>,
    /// Equilibrium of every answer: the exact ones first.
    pub statics: Vec<(&'static str, Statics)>,
}

impl Comparison {
    /// The exact answer that errors are measured by.
    pub fn reference(&self) -> &Response {
        &self.exact[0]
    }

    /// Every answer: the exact ones first.
    pub fn responses(&self) -> impl Iterator<Item = &Response> {
        self.exact.iter().chain(self.quick.iter().filter_map(|quick| quick.response.as_ref()))
    }

    /// The verdicts on one subject, the smallest shortfall first.
    pub fn ranked(&self, subject: Subject) -> Vec<&Verdict> {
        let mut verdicts: Vec<_> = self.verdicts.iter().filter(|verdict| verdict.subject == subject).collect();
        verdicts.sort_by(|a, b| by_shortfall(a, b));
        verdicts
    }

    /// The earlier quick method whose values `method` repeats on this frame, if there is one.
    pub fn repeats(&self, method: &str) -> Option<&'static str> {
        let answers = || self.quick.iter().filter_map(|quick| quick.response.as_ref());
        let own = answers().find(|response| response.method == method)?;
        let earlier = answers().take_while(|response| response.method != method);
        earlier.into_iter().find(|response| response.equals(own)).map(|response| response.method)
    }

    /// Results that are allowed but absurd for a building.
    pub fn warnings(&self, frame: &Frame) -> Vec<ResultWarning> {
        let drift = |storey: usize| self.reference().movement(storey).map(|movement| movement.drift.abs());
        let storeys =
            (0..frame.storeys()).filter_map(|storey| Some((storey, drift(storey)? / frame.storey_height(storey))));
        let worst = storeys.max_by(|a, b| a.1.total_cmp(&b.1)).filter(|(_, ratio)| *ratio > ABSURD_DRIFT);
        worst.map(|(storey, ratio)| ResultWarning::LargeDrift { storey: storey + 1, ratio }).into_iter().collect()
    }

    /// Whether some quick method is nowhere short on `subject` by more than the tolerance.
    pub fn some_method_meets(&self, subject: Subject) -> bool {
        self.verdicts.iter().any(|verdict| verdict.subject == subject && verdict.state != State::Short)
    }
}

/// Runs every analysis that applies to `frame` and compares them.
///
/// # Errors
/// [`Unsolvable`] where the frame cannot stand, the solution is too inaccurate, or the exact analysis asked for cannot be
/// run for want of areas.
pub fn compare(frame: &Frame, options: Options) -> Result<Comparison, Unsolvable> {
    let plain = slope_deflection::analyse(frame)?;
    let (with_strain, no_stiffness) = match stiffness::analyse(frame) {
        Ok(response) => (Some(response), None),
        Err(reason @ (Unsolvable::NoAreas | Unsolvable::RelativeSizes)) => (None, Some(reason)),
        Err(other) => return Err(other),
    };
    let tall = frame.height() > SLENDER * frame.width() || frame.storeys() > TALL;
    let strain_wanted = match options.exact {
        ExactChoice::Automatic => tall && with_strain.is_some(),
        ExactChoice::SlopeDeflection => false,
        ExactChoice::Stiffness => true,
    };
    let exact = match (strain_wanted, with_strain, &no_stiffness) {
        (true, None, Some(reason)) => return Err(reason.clone()),
        (true, Some(response), _) => vec![response, plain],
        (_, response, _) => std::iter::once(plain).chain(response).collect(),
    };
    let quick: Vec<_> = METHODS.iter().map(|entry| run_quick(frame, entry)).collect();
    let axial_strain_missing = tall && !strain_wanted;
    Ok(evaluate(frame, options, exact, no_stiffness, axial_strain_missing, quick))
}

fn run_quick(frame: &Frame, entry: &'static Entry) -> Quick {
    let fit = (entry.fit)(frame);
    let response = (!matches!(fit, Fit::Refused(_))).then(|| entry.analyse(frame));
    Quick { entry, fit, response }
}

fn evaluate(
    frame: &Frame,
    options: Options,
    exact: Vec<Response>,
    no_stiffness: Option<Unsolvable>,
    axial_strain_missing: bool,
    quick: Vec<Quick>,
) -> Comparison {
    let measured = quick.iter().filter_map(|quick| quick.response.as_ref()).chain(&exact[1..]);
    let error_sets: Vec<_> = measured.map(|response| (response.method, errors(frame, &exact[0], response))).collect();
    let is_quick = |method: &str| quick.iter().any(|quick| quick.entry.info.id == method);
    let sets = error_sets.iter().filter(|(method, _)| is_quick(method));
    let judged = sets.flat_map(|(method, errors)| {
        Subject::ALL.into_iter().filter_map(move |subject| judge(method, subject, errors, options.tolerance))
    });
    let verdicts: Vec<_> = judged.collect();
    let responses = exact.iter().chain(quick.iter().filter_map(|quick| quick.response.as_ref()));
    let statics = responses.map(|response| (response.method, statics::check(frame, response))).collect();
    let feet = foot_lines(frame, options, &exact[0], &quick);
    Comparison {
        options,
        no_stiffness,
        axial_strain_missing,
        statics,
        feet,
        errors: error_sets,
        verdicts,
        exact,
        quick,
    }
}

/// The second line of a fixed-foot report: the lowest storeys against feet that turn a little.
fn foot_lines(frame: &Frame, options: Options, exact: &Response, quick: &[Quick]) -> Vec<FootLine> {
    if *frame.feet() != Feet::Fixed {
        return Vec::new();
    }
    let analyse = if exact.method == stiffness::ID { stiffness::analyse } else { slope_deflection::analyse };
    let sprung = FOOT_RATIOS.map(|ratio| {
        let frame = frame.with_feet(Feet::Springs(frame.foot_springs(ratio))).ok()?;
        analyse(&frame).ok()
    });
    let [Some(stiff), Some(soft)] = &sprung else { return Vec::new() };
    let lines = |response: &Response| {
        let sets = [exact, stiff, soft].map(|exact| lowest_storeys(errors(frame, exact, response)));
        let line = |subject: Subject| {
            let lowest =
                |set: &[ValueError]| Some(judge(response.method, subject, set, options.tolerance)?.lowest.percent);
            let [fixed, stiff, soft] = &sets;
            Some(FootLine {
                method: response.method,
                subject,
                fixed: lowest(fixed)?,
                sprung: [lowest(stiff)?, lowest(soft)?],
            })
        };
        Subject::ALL.into_iter().filter_map(line).collect::<Vec<_>>()
    };
    quick.iter().filter_map(|quick| quick.response.as_ref()).flat_map(lines).collect()
}

/// The errors of the two lowest storeys, where feet matter most.
fn lowest_storeys(mut errors: Vec<ValueError>) -> Vec<ValueError> {
    errors.retain(|error| error.member.storey() < 2);
    errors
}
