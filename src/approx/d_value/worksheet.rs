//! The hand calculation of the D-value method.

use super::inflection::Storey;
use super::{Columns, prepare};
use crate::approx::sheet;
use crate::frame::{Feet, Frame};
use crate::response::{Amount, Members, Response, Step, Work, Worksheet};

pub(super) fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
    let steps = [sheet::storey_shears(frame), sheet::column_stiffnesses(frame), sheet::beam_stiffnesses(frame)];
    let steps = steps.into_iter().chain(shares(frame)).chain(inflection_heights(frame));
    let moments = [
        sheet::column_shears(frame, response, "Column shear = V × D / sum of D of the storey."),
        sheet::column_end_moments(frame, response, "Foot = column shear × y h; head = column shear × (1 − y) h."),
        sheet::beam_end_moments(
            frame,
            response,
            "Beam end moment = sum of the column end moments at the joint × k / (sum of beam k at the joint).",
        ),
    ];
    let [_, rest @ ..] = sheet::shears_and_axial_forces(frame, response);
    let drifts = sheet::drifts(frame, response, "Drift = V / sum of D.");
    Worksheet { steps: steps.chain(moments).chain(rest).chain(drifts).collect() }
}

/// K, a and D.
fn shares(frame: &Frame) -> [Step; 3] {
    let frame_members = Members::of(frame);
    let (members, mut scratch) = (&frame_members.rows(), Work::for_members(&frame_members));
    let work = &mut scratch.rows();
    prepare::<f64, 1>(members, work);
    let columns = |storey| Columns::of(members, &work.joint, storey);
    let (_, unit) = sheet::stiffness(frame);
    let amount = if frame.has_real_stiffness() { Amount::StoreyStiffness } else { Amount::Ratio };
    // Relative sizes: D over the lowest column's 12 k / h².
    let reference = if frame.has_real_stiffness() { 1.0 } else { 12.0 * unit / frame.storey_height(0).powi(2) };
    let note = if frame.has_real_stiffness() { "" } else { " Over 12 k / h² of the lowest column on line A." };
    let stiffness =
        |storey, line| columns(storey).sway_stiffnesses::<f64, 1>(line, frame.storey_height(storey))[0] / reference;
    let ground = match frame.feet() {
        Feet::Pinned => "0.5 K / (1 + 2 K)",
        _ => "(0.5 + K) / (2 + K)",
    };
    let d =
        sheet::by_line(frame, "Stiffness D against drift", &format!("D = a × 12 k / h².{note}"), amount, &stiffness);
    [
        sheet::by_line(
            frame,
            "Beam to column ratios K",
            "K = sum of beam k at head and foot / (2 × column k); in the ground storey sum of beam k at the head / column k.",
            Amount::Ratio,
            &|storey, line| columns(storey).ratio(line),
        ),
        sheet::by_line(
            frame,
            "Factors a",
            &format!("a = K / (2 + K); in the ground storey {ground}."),
            Amount::Ratio,
            &|storey, line| columns(storey).reductions::<f64, 1>(line)[0],
        ),
        sheet::with_column(d, frame, "sum", amount, &|storey| {
            (0..frame.lines()).map(|line| stiffness(storey, line)).sum()
        }),
    ]
}

/// y0, the corrections together, and y.
fn inflection_heights(frame: &Frame) -> [Step; 5] {
    let frame_members = Members::of(frame);
    let (members, mut scratch) = (&frame_members.rows(), Work::for_members(&frame_members));
    let work = &mut scratch.rows();
    prepare::<f64, 1>(members, work);
    let columns = |storey| Columns::of(members, &work.joint, storey);
    let of = |storey, line| Storey::of(members, work.storey[0], storey).parts(&columns(storey).ends::<f64, 1>(line))[0];
    let by_line = |title: &str, rule: &str, value: &dyn Fn(usize, usize) -> f64| {
        sheet::by_line(frame, title, rule, Amount::Ratio, value)
    };
    let [y0, y1, y2, y3, y]: [&dyn Fn(usize, usize) -> f64; 5] = [
        &|storey, line| of(storey, line).standard,
        &|storey, line| of(storey, line).beams,
        &|storey, line| of(storey, line).above,
        &|storey, line| of(storey, line).below,
        &|storey, line| of(storey, line).sum(),
    ];
    let lam = "λ = 1 + 3 K − root((1 + 3 K)² − 1)";
    [
        by_line(
            "Standard inflection heights y0",
            "Of a frame of equal storeys with this column's K under this frame's storey shears: 6 K θ + (θ − θ below) + \
             (θ − θ above) = (V below + V above) / 2 at every floor, y0 = 1/2 + (θ head − θ foot) / V. Published tables \
             give it rounded to 0.05 for usual load shapes.",
            y0,
        ),
        by_line(
            "Corrections y1 for unequal beams",
            &format!(
                "With B above, B below = sum of beam k at head, at foot / column k, {lam} at K = B, μ = λ / (1 − λ): y1 = \
                 (1/B above − 1/B below) / 6 / (1 + μ above + μ below); 0 in the ground storey."
            ),
            y1,
        ),
        by_line(
            "Corrections y2 for the height of the storey above",
            &format!("y2 = (h above / h − 1) λ / 2, {lam}; 0 in the top storey and above pinned feet."),
            y2,
        ),
        by_line(
            "Corrections y3 for the height of the storey below",
            "y3 = −(h below / h − 1) λ / 2; 0 in the ground storey.",
            y3,
        ),
        by_line("Inflection heights y, over the storey height from the foot", "y = y0 + y1 + y2 + y3.", y),
    ]
}
