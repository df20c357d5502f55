//! Reasons for which the methods with known sizes refuse or doubt a frame.

use crate::frame::{Feet, Frame, SLENDER, line_name};
use crate::response::{Caution, Fit};
use std::ops::RangeInclusive;

/// Beam over column stiffness at a joint outside of which a method gives no answer: under it a rounding error of 1e-16
/// shows in the digits that matter, over it products overflow.
const SOUND_RATIOS: RangeInclusive<f64> = 1e-9..=1e30;

/// The first reason to refuse, or the reasons to doubt.
pub(super) fn judge(
    refusals: impl IntoIterator<Item = Option<Caution>>,
    doubts: impl IntoIterator<Item = Option<Caution>>,
) -> Fit {
    if let Some(reason) = refusals.into_iter().flatten().next() {
        return Fit::Refused(reason);
    }
    let cautions: Vec<_> = doubts.into_iter().flatten().collect();
    if cautions.is_empty() { Fit::Suits } else { Fit::Doubtful(cautions) }
}

/// Foot springs, for a method published for fixed feet, or extended to pinned ones.
pub(super) fn springs(frame: &Frame) -> Option<Caution> {
    let text = "foot springs have no place in the method: its rules are for fixed and for pinned feet";
    matches!(frame.feet(), Feet::Springs(_)).then(|| Caution(text.into()))
}

/// Feet other than fixed ones.
pub(super) fn not_fixed(frame: &Frame) -> Option<Caution> {
    let text = "the method's formulas are for fixed feet only";
    (*frame.feet() != Feet::Fixed).then(|| Caution(text.into()))
}

/// A joint whose beams cannot balance its columns.
pub(super) fn loose_joint(frame: &Frame) -> Option<Caution> {
    let mut joints = (0..frame.storeys()).flat_map(|floor| (0..frame.lines()).map(move |line| (floor, line)));
    joints.find_map(|(floor, line)| {
        let above = if floor + 1 < frame.storeys() { frame.column_stiffness(floor + 1, line) } else { 0.0 };
        let columns = frame.column_stiffness(floor, line) + above;
        let bays = line.saturating_sub(1)..(line + 1).min(frame.bays());
        let beams: f64 = bays.map(|bay| frame.beam_stiffness(floor, bay)).sum();
        let place = format!("of the joint of floor {} on line {}", floor + 1, line_name(line));
        unsound(beams / columns, &place)
    })
}

/// A floor whose beams do not restrain its columns.
pub(super) fn loose_floor(frame: &Frame) -> Option<Caution> {
    (0..frame.storeys()).find_map(|floor| {
        let columns: f64 = (0..frame.lines()).map(|line| frame.column_stiffness(floor, line)).sum();
        let beams: f64 = (0..frame.bays()).map(|bay| frame.beam_stiffness(floor, bay)).sum();
        unsound(beams / columns, &format!("of floor {}", floor + 1))
    })
}

fn unsound(ratio: f64, place: &str) -> Option<Caution> {
    let text = match ratio {
        0.0 => format!("the beams {place} have no stiffness, and the method needs them to hold the columns there"),
        _ => format!(
            "the beams {place} are {ratio:.0e} times as stiff as the columns there, beyond what the method's arithmetic \
             can bear"
        ),
    };
    (!SOUND_RATIOS.contains(&ratio)).then_some(Caution(text))
}

/// Sizes from which no drift follows.
pub(super) fn relative_sizes(frame: &Frame) -> Option<Caution> {
    let text = "member sizes are known only relative to each other, so drifts cannot be computed";
    (!frame.has_real_stiffness()).then(|| Caution(text.into()))
}

/// Columns without areas.
pub(super) fn no_areas(frame: &Frame) -> Option<Caution> {
    let text = "not every column has an area, so the drift from column axial strain cannot be computed";
    (!frame.has_areas()).then(|| Caution(text.into()))
}

/// Drift without column axial strain on a slender frame.
pub(super) fn slender_drift(frame: &Frame) -> Option<Caution> {
    let slenderness = frame.height() / frame.width();
    let text = format!(
        "height over width is {slenderness:.1}: drifts of this method leave out column axial strain, which counts there"
    );
    (slenderness > SLENDER && frame.has_real_stiffness()).then_some(Caution(text))
}
