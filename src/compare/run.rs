//! One whole comparison: every analysis of a frame, their statics, errors and verdicts.

use super::amplify::{Amplification, amplifications};
use super::errors::{ValueError, errors};
use super::verdict::{Standing, Subject, Verdict, by_shortfall, judge};
use crate::approx::METHODS;
use crate::exact::second_order::{self, SecondOrder};
use crate::exact::{Unsolvable, slope_deflection, stiffness};
use crate::frame::options::AnalysisOptions;
use crate::frame::{Feet, Frame, SLENDER};
use crate::response::statics::{self, Statics};
use crate::response::{Entry, Fit, Response};
use thiserror::Error;

/// Above this number of storeys, as above [`SLENDER`], a measure without column axial strain is warned about.
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
    /// `second-order` where gravity is given, else `stiffness` where columns have areas, else `slope-deflection`.
    #[default]
    Automatic,
    /// Inextensible members.
    SlopeDeflection,
    /// With column axial strain.
    Stiffness,
}

/// What a comparison is asked for.
#[derive(Debug, Clone, PartialEq)]
pub struct Options {
    /// How far a value may be off before the method does not suffice, percent of the storey's reference; positive.
    pub tolerance: f64,
    /// Which exact analysis is the measure.
    pub exact: ExactChoice,
    /// Names of the quick methods to run, as in files; empty for all.
    pub methods: Vec<&'static str>,
}

impl Default for Options {
    /// A tolerance of 20 %, the exact analysis chosen by the frame.
    fn default() -> Self {
        Self { tolerance: 20.0, exact: ExactChoice::Automatic, methods: Vec::new() }
    }
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
    /// The exact answer that errors are measured by.
    pub reference: Response,
    /// The other exact answers of first order.
    pub other_exact: Vec<Response>,
    /// Why the analysis with column axial strain has no answer.
    pub no_stiffness: Option<Unsolvable>,
    /// True where the frame is tall or slender but the measure leaves out column axial strain.
    pub axial_strain_missing: bool,
    /// True where the exact analysis has options beyond plain members.
    pub has_options: bool,
    /// The answer in the deformed position, where gravity is given, and its amplification by storey.
    pub second_order: Option<(SecondOrder, Vec<Amplification>)>,
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
    /// The exact answers, the measure of all errors first.
    pub fn exact(&self) -> impl Iterator<Item = &Response> {
        std::iter::once(&self.reference).chain(&self.other_exact)
    }

    /// The quick answers.
    pub fn quick_responses(&self) -> impl Iterator<Item = &Response> {
        self.quick.iter().filter_map(|quick| quick.response.as_ref())
    }

    /// Every answer: the exact ones first, then that in the deformed position.
    pub fn responses(&self) -> impl Iterator<Item = &Response> {
        self.exact().chain(self.deformed_beside()).chain(self.quick_responses())
    }

    /// The answer in the deformed position where it is not the measure itself.
    pub fn deformed_beside(&self) -> Option<&Response> {
        let answer = self.second_order.as_ref().map(|(answer, _)| &answer.response);
        answer.filter(|_| self.reference.method != second_order::ID)
    }

    /// The error sets of the quick methods.
    pub fn quick_errors(&self) -> impl Iterator<Item = (&'static str, &[ValueError])> {
        let is_quick = |method: &str| self.quick.iter().any(|quick| quick.entry.info.id == method);
        self.errors
            .iter()
            .filter(move |(method, _)| is_quick(method))
            .map(|(method, errors)| (*method, errors.as_slice()))
    }

    /// The verdicts on one subject, the smallest shortfall first.
    pub fn ranked(&self, subject: Subject) -> Vec<&Verdict> {
        let mut verdicts: Vec<_> = self.verdicts.iter().filter(|verdict| verdict.subject == subject).collect();
        verdicts.sort_by(|a, b| by_shortfall(a, b));
        verdicts
    }

    /// The earlier quick method whose values `method` repeats on this frame, if there is one.
    pub fn repeats(&self, method: &str) -> Option<&'static str> {
        let own = self.quick_responses().find(|response| response.method == method)?;
        let mut earlier = self.quick_responses().take_while(|response| response.method != method);
        earlier.find(|response| response.equals(own)).map(|response| response.method)
    }

    /// Results that are allowed but absurd for a building.
    pub fn warnings(&self, frame: &Frame) -> Vec<ResultWarning> {
        let drift = |storey: usize| self.reference.movement(storey).map(|movement| movement.drift.abs());
        let storeys =
            (0..frame.storeys()).filter_map(|storey| Some((storey, drift(storey)? / frame.storey_height(storey))));
        let worst = storeys.max_by(|a, b| a.1.total_cmp(&b.1)).filter(|(_, ratio)| *ratio > ABSURD_DRIFT);
        worst.map(|(storey, ratio)| ResultWarning::LargeDrift { storey: storey + 1, ratio }).into_iter().collect()
    }

    /// Whether some quick method is nowhere short on `subject` by more than the tolerance.
    pub fn some_method_meets(&self, subject: Subject) -> bool {
        self.verdicts.iter().any(|verdict| verdict.subject == subject && verdict.state != Standing::Short)
    }
}

/// Runs every analysis that applies to `frame` and compares them; `analysis` must have been made for `frame`.
///
/// # Errors
/// [`Unsolvable`] where the frame cannot stand or buckles, or where the exact analysis that is the measure has no answer.
pub fn compare(frame: &Frame, analysis: &AnalysisOptions, options: Options) -> Result<Comparison, Unsolvable> {
    let tall = frame.height() > SLENDER * frame.width() || frame.storeys() > TALL;
    let has_options = !analysis.is_plain();
    let (plain, with_strain) = (slope_deflection::analyse(frame), stiffness::analyse_with(frame, analysis));
    let strain_wanted = match options.exact {
        ExactChoice::Automatic => has_options || with_strain.is_ok(),
        ExactChoice::SlopeDeflection => false,
        ExactChoice::Stiffness => true,
    };
    let deformed = match options.exact {
        ExactChoice::SlopeDeflection => None,
        _ => second_order::analyse(frame, analysis)?,
    };
    let no_stiffness = with_strain.as_ref().err().cloned();
    let first_order = with_strain.clone().ok();
    let (first, other) = if strain_wanted { (with_strain?, plain.ok()) } else { (plain?, with_strain.ok()) };
    let (reference, other_exact): (_, Vec<_>) = match &deformed {
        Some(answer) if options.exact == ExactChoice::Automatic => {
            (answer.response.clone(), std::iter::once(first).chain(other).collect())
        }
        _ => (first, other.into_iter().collect()),
    };
    let second_order = deformed.zip(first_order).map(|(answer, first)| {
        let gravity = analysis.gravity.as_deref().unwrap_or_default();
        let storeys = amplifications(frame, &first, &answer, gravity);
        (answer, storeys)
    });
    let chosen = METHODS.iter().filter(|entry| options.methods.is_empty() || options.methods.contains(&entry.info.id));
    let mut comparison = Comparison {
        axial_strain_missing: tall && !strain_wanted,
        quick: chosen.map(|entry| run_quick(frame, entry)).collect(),
        options,
        has_options,
        no_stiffness,
        second_order,
        errors: Vec::new(),
        verdicts: Vec::new(),
        feet: Vec::new(),
        statics: Vec::new(),
        reference,
        other_exact,
    };
    comparison.evaluate(frame, analysis);
    Ok(comparison)
}

fn run_quick(frame: &Frame, entry: &'static Entry) -> Quick {
    let fit = (entry.fit)(frame);
    let response = (!matches!(fit, Fit::Refused(_))).then(|| entry.analyse(frame));
    Quick { entry, fit, response }
}

impl Comparison {
    /// Fills in what follows from the answers.
    fn evaluate(&mut self, frame: &Frame, analysis: &AnalysisOptions) {
        if analysis.has_zones() {
            self.state_faces(frame, analysis);
        }
        let measured = self.quick_responses().chain(&self.other_exact).chain(self.deformed_beside());
        self.errors = measured.map(|response| (response.method, errors(frame, &self.reference, response))).collect();
        let tolerance = self.options.tolerance;
        let judged = self.quick_errors().flat_map(|(method, errors)| {
            Subject::ALL.into_iter().filter_map(move |subject| judge(method, subject, errors, tolerance))
        });
        self.verdicts = judged.collect();
        let with_forces = self.responses().filter(|response| response.has_forces());
        let check = |response: &Response| match response.method {
            second_order::ID => statics::check_deformed(frame, response, analysis.gravity.as_deref()),
            _ => statics::check(frame, response),
        };
        self.statics = with_forces.map(|response| (response.method, check(response))).collect();
        self.feet = foot_lines(frame, analysis, self);
    }

    /// Adds the moments at the faces of rigid zones to the answers that know joint centres only.
    fn state_faces(&mut self, frame: &Frame, analysis: &AnalysisOptions) {
        let quick = self.quick.iter_mut().filter_map(|quick| quick.response.as_mut());
        for answer in quick.chain(&mut self.other_exact).chain([&mut self.reference]) {
            if answer.has_forces() && ![stiffness::ID, second_order::ID].contains(&answer.method) {
                *answer = answer.clone().with_zones(frame, &analysis.column_zones, &analysis.beam_zones);
            }
        }
    }
}

/// The second line of a fixed-foot report: the lowest storeys against feet that turn a little.
fn foot_lines(frame: &Frame, analysis: &AnalysisOptions, comparison: &Comparison) -> Vec<FootLine> {
    let exact = &comparison.reference;
    if *frame.feet() != Feet::Fixed {
        return Vec::new();
    }
    let sprung = FOOT_RATIOS.map(|ratio| {
        let frame = frame.with_feet(Feet::Springs(frame.foot_springs(ratio))).ok()?;
        match exact.method {
            second_order::ID => second_order::analyse(&frame, analysis).ok()?.map(|answer| answer.response),
            stiffness::ID => stiffness::analyse_with(&frame, analysis).ok(),
            _ => slope_deflection::analyse(&frame).ok(),
        }
    });
    let [Some(stiff), Some(soft)] = &sprung else { return Vec::new() };
    let lines = |response: &Response| {
        let sets = [exact, stiff, soft].map(|exact| lowest_storeys(errors(frame, exact, response)));
        let line = |subject: Subject| {
            let lowest = |set: &[ValueError]| {
                Some(judge(response.method, subject, set, comparison.options.tolerance)?.lowest.percent)
            };
            let [fixed, stiff, soft] = &sets;
            Some(FootLine {
                method: response.method,
                subject,
                fixed: lowest(fixed)?,
                sprung: [lowest(stiff)?, lowest(soft)?],
            })
        };
        Subject::FORCES.into_iter().filter_map(line).collect::<Vec<_>>()
    };
    comparison.quick_responses().flat_map(lines).collect()
}

/// The errors of the two lowest storeys, where feet matter most.
fn lowest_storeys(mut errors: Vec<ValueError>) -> Vec<ValueError> {
    errors.retain(|error| error.member.storey() < 2);
    errors
}
