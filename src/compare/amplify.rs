//! How much gravity on the sway enlarges drifts and column moments, exactly and by quick amplifiers.

use super::formulas::NEAR_ZERO;
use crate::exact::second_order::SecondOrder;
use crate::frame::Frame;
use crate::response::Response;

/// Amplification of one storey: second order over first order.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Amplification {
    /// Of the storey drift, exact.
    pub drift: f64,
    /// Of column design moments, exact: the largest ratio of any column of the storey that is not near zero.
    pub columns: f64,
    /// Of beam design moments, exact: the same of the beams of the storey's top floor.
    pub beams: f64,
    /// Quick: 1 / (1 - sum P drift / (V h)); `None` where the denominator is not positive.
    pub plain: Option<f64>,
    /// Quick, the safer form: 1 / (1 - 1.2 sum P drift / (V h)); `None` where the denominator is not positive.
    pub safer: Option<f64>,
}

/// Weight of the stability ratio in the safer amplifier: the plain one diverges at a load above the true sway buckling
/// load (by 14 to 22 % on fixed feet), so that its ratio is enlarged.
const SAFER: f64 = 1.2;

/// Second order beside first order, storey by storey from the ground; `gravity` per floor and line.
///
/// # Formula
/// Stability ratio sum P drift / (V h): P the gravity in the columns of the storey, drift of the first-order analysis.
///
/// # References
/// P-delta amplifier: common practice (from memory); the safer form was derived for this project from one-bay frames.
pub fn amplifications(frame: &Frame, first: &Response, second: &SecondOrder, gravity: &[f64]) -> Vec<Amplification> {
    let columns = |response: &Response, storey: usize| {
        response.storey_columns(storey).iter().map(|column| column.design_moment()).collect::<Vec<_>>()
    };
    let beams = |response: &Response, floor: usize| {
        response.floor_beams(floor).iter().map(|beam| beam.design_moment()).collect::<Vec<_>>()
    };
    let drift =
        |response: &Response, storey: usize| response.movement(storey).map_or(f64::NAN, |movement| movement.drift);
    let of_storey = |storey: usize| {
        let above: f64 = gravity[storey * frame.lines()..].iter().sum();
        let work = frame.storey_shear(storey) * frame.storey_height(storey);
        let ratio = above * drift(first, storey) / work;
        let amplifier = |weight: f64| Some(1.0 - weight * ratio).filter(|rest| *rest > 0.0).map(|rest| 1.0 / rest);
        Amplification {
            drift: drift(&second.response, storey) / drift(first, storey),
            columns: largest_ratio(&columns(&second.response, storey), &columns(first, storey)),
            beams: largest_ratio(&beams(&second.response, storey), &beams(first, storey)),
            plain: amplifier(1.0),
            safer: amplifier(SAFER),
        }
    };
    (0..frame.storeys()).map(of_storey).collect()
}

/// Largest second over first, leaving out what is near zero in the first.
fn largest_ratio(second: &[f64], first: &[f64]) -> f64 {
    let largest = first.iter().fold(0.0_f64, |a, b| a.max(*b));
    let counted = second.iter().zip(first).filter(|(_, first)| **first > NEAR_ZERO * largest);
    counted.map(|(second, first)| second / first).fold(1.0, f64::max)
}
