//! Whether a quick method is good enough: verdicts by method, subject and place.

use super::errors::{Flag, ValueError};
use super::places::Place;
use crate::frame::{Member, MemberKind};
use crate::response::Quantity;
use std::cmp::Ordering;
use std::collections::BTreeMap;

/// Numbers that differ by less than this are equal: the first member is quoted, whatever rounding leaves.
pub const TIE: f64 = 1e-7;

/// What a verdict is about.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Subject {
    /// The larger end moment of each column.
    ColumnMoments,
    /// The larger end moment of each beam.
    BeamMoments,
    /// The shear of each column.
    ColumnShears,
    /// The drift of each storey.
    StoreyDrifts,
}

impl Subject {
    /// Every subject, in the order of reports.
    pub const ALL: [Self; 4] = [Self::ColumnMoments, Self::BeamMoments, Self::ColumnShears, Self::StoreyDrifts];

    /// The subjects that are member forces.
    pub const FORCES: [Self; 3] = [Self::ColumnMoments, Self::BeamMoments, Self::ColumnShears];

    /// The subject in words.
    pub fn name(self) -> &'static str {
        match self {
            Self::ColumnMoments => "column design moments",
            Self::BeamMoments => "beam design moments",
            Self::ColumnShears => "column shears",
            Self::StoreyDrifts => "storey drifts",
        }
    }

    /// The kind of member that is judged.
    pub fn kind(self) -> MemberKind {
        match self {
            Self::ColumnMoments | Self::ColumnShears => MemberKind::Column,
            Self::BeamMoments => MemberKind::Beam,
            Self::StoreyDrifts => MemberKind::Storey,
        }
    }

    /// The quantity that is judged.
    pub fn quantity(self) -> Quantity {
        match self {
            Self::ColumnMoments | Self::BeamMoments => Quantity::DesignMoment,
            Self::ColumnShears => Quantity::Shear,
            Self::StoreyDrifts => Quantity::Drift,
        }
    }

    fn covers(self, error: &ValueError) -> bool {
        error.place.kind == self.kind() && error.quantity == self.quantity()
    }
}

/// How a method stands against the tolerance.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Standing {
    /// Nowhere short and nowhere over by more than the tolerance.
    Suffices,
    /// Nowhere short by more than the tolerance, somewhere over by more.
    Generous,
    /// Somewhere short by more than the tolerance.
    Short,
}

impl Standing {
    /// Name in files.
    pub fn id(self) -> &'static str {
        match self {
            Self::Suffices => "suffices",
            Self::Generous => "generous",
            Self::Short => "short",
        }
    }

    fn of(short: f64, over: f64, tolerance: f64) -> Self {
        match (short < -tolerance - TIE || tolerance.is_nan(), over > tolerance + TIE) {
            (true, _) => Self::Short,
            (false, true) => Self::Generous,
            (false, false) => Self::Suffices,
        }
    }
}

/// The error of one member, as a verdict quotes it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Extreme {
    /// The member.
    pub member: Member,
    /// Its place.
    pub place: Place,
    /// Storey error, percent.
    pub percent: f64,
    /// Exact value, N or N m.
    pub exact: f64,
    /// Quick value, N or N m.
    pub quick: f64,
    /// |e| / |q|; `None` where q is zero or weak, since a factor would mislead.
    pub factor: Option<f64>,
}

impl Extreme {
    /// How far the quick value is short of the member's own exact value, percent; negative where it is over.
    pub fn own_shortfall(&self) -> f64 {
        100.0 * (1.0 - self.quick.abs() / self.exact.abs())
    }
}

/// The verdict on one place.
#[derive(Debug, Clone, PartialEq)]
pub struct PlaceVerdict {
    /// The place.
    pub place: Place,
    /// Number of members there.
    pub members: usize,
    /// The member that is shortest, or least over.
    pub lowest: Extreme,
    /// The member that is most over, or least short.
    pub highest: Extreme,
    /// The member with the largest factor, zero and weak values aside.
    pub governing: Option<Extreme>,
    /// Members whose quick value is zero or weak: the largest exact one, and their number.
    pub unloaded: Option<(Extreme, usize)>,
    /// Against the tolerance.
    pub state: Standing,
}

/// The verdict on one method for one subject.
#[derive(Debug, Clone, PartialEq)]
pub struct Verdict {
    /// Name of the method in files.
    pub method: &'static str,
    /// What is judged.
    pub subject: Subject,
    /// Against the tolerance, over all places.
    pub state: Standing,
    /// The shortest member of the frame.
    pub lowest: Extreme,
    /// The member most over.
    pub highest: Extreme,
    /// Every place, columns from the ground up, ends before interior.
    pub places: Vec<PlaceVerdict>,
}

impl Verdict {
    /// The member with the largest factor, zero and weak values aside.
    pub fn governing(&self) -> Option<Extreme> {
        largest_factor(self.places.iter().filter_map(|place| place.governing))
    }

    /// Members whose quick value is zero or weak: the largest exact one, and their number.
    pub fn unloaded(&self) -> Option<(Extreme, usize)> {
        let found = || self.places.iter().filter_map(|place| place.unloaded);
        let largest = largest_exact(found().map(|(member, _)| member))?;
        Some((largest, found().map(|(_, count)| count).sum()))
    }
}

/// Judges one method's errors; `None` where it states nothing on `subject`.
///
/// # Formula
/// By storey error: short where the lowest is under -tolerance, generous where the highest is over +tolerance.
///
/// # Units
/// `tolerance` in percent.
pub fn judge(method: &'static str, subject: Subject, errors: &[ValueError], tolerance: f64) -> Option<Verdict> {
    let mut by_place: BTreeMap<Place, Vec<Extreme>> = BTreeMap::new();
    for error in errors.iter().filter(|error| subject.covers(error)) {
        by_place.entry(error.place).or_default().extend(extreme(error));
    }
    let judged = by_place.into_iter().map(|(place, members)| judge_place(place, &members, tolerance));
    let places: Vec<_> = judged.collect::<Option<_>>()?;
    let lowest = least(places.iter().map(|place| place.lowest))?;
    let highest = most(places.iter().map(|place| place.highest))?;
    let state = Standing::of(lowest.percent, highest.percent, tolerance);
    Some(Verdict { method, subject, state, lowest, highest, places })
}

fn extreme(error: &ValueError) -> Option<Extreme> {
    let percent = error.storey_error_percent.filter(|percent| percent.is_finite())?;
    let ValueError { member, place, exact, quick, .. } = *error;
    let factor = error.factor.filter(|_| !error.flags.contains(&Flag::Weak));
    Some(Extreme { member, place, percent, exact, quick, factor })
}

fn judge_place(place: Place, members: &[Extreme], tolerance: f64) -> Option<PlaceVerdict> {
    let (lowest, highest) = (least(members.iter().copied())?, most(members.iter().copied())?);
    let (loaded, unloaded): (Vec<_>, Vec<_>) = members.iter().partition(|member| member.factor.is_some());
    let governing = largest_factor(loaded.into_iter());
    let unloaded = largest_exact(unloaded.iter().copied()).map(|member| (member, unloaded.len()));
    let state = Standing::of(lowest.percent, highest.percent, tolerance);
    Some(PlaceVerdict { place, members: members.len(), lowest, highest, governing, unloaded, state })
}

fn extremal(members: impl Iterator<Item = Extreme>, size: impl Fn(&Extreme) -> f64) -> Option<Extreme> {
    members.reduce(|best, next| if size(&next) > size(&best) + TIE { next } else { best })
}

fn least(members: impl Iterator<Item = Extreme>) -> Option<Extreme> {
    extremal(members, |member| -member.percent)
}

fn most(members: impl Iterator<Item = Extreme>) -> Option<Extreme> {
    extremal(members, |member| member.percent)
}

fn largest_factor(members: impl Iterator<Item = Extreme>) -> Option<Extreme> {
    extremal(members, |member| member.factor.unwrap_or(0.0))
}

fn largest_exact(members: impl Iterator<Item = Extreme>) -> Option<Extreme> {
    members.reduce(|best, next| if next.exact.abs() > best.exact.abs() { next } else { best })
}

/// Orders verdicts by their shortfall, the smallest first; equal ones keep their order.
pub fn by_shortfall(a: &Verdict, b: &Verdict) -> Ordering {
    let steps = |verdict: &Verdict| (verdict.lowest.percent / TIE).round();
    steps(b).total_cmp(&steps(a))
}
