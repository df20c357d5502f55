//! Equilibrium written again from free bodies, with nothing taken from the crate's own statics check.
//!
//! # References
//! Equilibrium of joints and free bodies: common practice.

use super::{Within, close};
use swaybound::frame::Frame;
use swaybound::response::Response;

/// Checks joints, members, storeys and free bodies cut through the columns; `share` of the frame's largest value.
#[track_caller]
pub fn balanced(frame: &Frame, response: &Response, share: f64) {
    let top = frame.overturning_above(0.0).abs().max(response.largest_moment());
    for storey in 0..frame.storeys() {
        for line in 0..frame.lines() {
            joint(frame, response, storey, line, share);
        }
        let shear: f64 = response.storey_columns(storey).iter().map(|column| column.shear).sum();
        let within = Within::Of { share, scale: base_shear(frame) };
        close(&format!("{}: shear of storey {}", response.method, storey + 1), shear, above(frame, storey), within);
        for cut in [0.0, 0.3, 1.0] {
            let sum = turning(frame, response, storey, cut);
            let what = format!("{}: turning above {cut} of storey {}", response.method, storey + 1);
            close(&what, sum, 0.0, Within::Of { share, scale: top });
        }
    }
}

/// The largest storey shear.
fn base_shear(frame: &Frame) -> f64 {
    (0..frame.storeys()).map(|storey| above(frame, storey)).fold(0.0, f64::max)
}

/// Lateral force at and above the top floor of a storey.
fn above(frame: &Frame, storey: usize) -> f64 {
    frame.parts().lateral[storey..].iter().sum()
}

/// Moments and vertical forces on the joint on top of `storey`, each force from the member ends that meet there.
#[track_caller]
fn joint(frame: &Frame, response: &Response, storey: usize, line: usize, share: f64) {
    let mut moment = response.column(storey, line).head;
    let mut upward = -response.column(storey, line).axial;
    if storey + 1 < frame.storeys() {
        moment += response.column(storey + 1, line).foot;
        upward += response.column(storey + 1, line).axial;
    }
    if line < frame.bays() {
        let beam = response.beam(storey, line);
        moment += beam.left;
        upward += (beam.left + beam.right) / frame.bay_width(line);
    }
    if line > 0 {
        let beam = response.beam(storey, line - 1);
        moment += beam.right;
        upward -= (beam.left + beam.right) / frame.bay_width(line - 1);
    }
    let place = format!("{}: joint of floor {} on line {}", response.method, storey + 1, line + 1);
    close(&format!("{place}, moments"), moment, 0.0, Within::Of { share, scale: response.largest_moment() });
    let narrowest = frame.parts().bays.iter().copied().fold(f64::INFINITY, f64::min);
    close(&place, upward, 0.0, Within::Of { share, scale: response.largest_moment() / narrowest });
}

/// Sum of moments, clockwise, on the part of the frame above a cut at `cut` times the height of `storey`, about a
/// point on the cut two metres right of line A.
fn turning(frame: &Frame, response: &Response, storey: usize, cut: f64) -> f64 {
    let height = frame.storey_height(storey);
    let level = frame.storey_base(storey) + cut * height;
    let mut sum = 0.0;
    for floor in storey..frame.storeys() {
        sum += frame.parts().lateral[floor] * (frame.floor_height(floor) - level);
    }
    let mut position = -2.0;
    for (line, column) in response.storey_columns(storey).iter().enumerate() {
        // Clockwise on the cut end of the piece between the cut and the head.
        sum += -column.shear * (1.0 - cut) * height - column.head;
        sum += column.axial * position;
        position += frame.parts().bays.get(line).copied().unwrap_or(0.0);
    }
    sum
}
