//! How much gravity on the sway enlarges drifts and column moments, exactly and by quick amplifiers.

use crate::exact::second_order::SecondOrder;
use crate::frame::Frame;
use crate::response::Response;

/// Amplification of one storey: second order over first order.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Amplification {
    /// Of the storey drift, exact.
    pub drift: f64,
    /// Of the largest column design moment, exact.
    pub moment: f64,
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
    let largest = |response: &Response, storey: usize| {
        response.storey_columns(storey).iter().map(|column| column.design_moment()).fold(0.0, f64::max)
    };
    let drift =
        |response: &Response, storey: usize| response.movement(storey).map_or(f64::NAN, |movement| movement.drift);
    let of_storey = |storey: usize| {
        let above: f64 = gravity[storey * frame.lines()..].iter().sum();
        let work = frame.storey_shear(storey) * frame.storey_height(storey);
        let ratio = above * drift(first, storey) / work;
        let amplifier = |weight: f64| Some(1.0 / (1.0 - weight * ratio)).filter(|value| *value >= 1.0);
        Amplification {
            drift: drift(&second.response, storey) / drift(first, storey),
            moment: largest(&second.response, storey) / largest(first, storey),
            plain: amplifier(1.0),
            safer: amplifier(SAFER),
        }
    };
    (0..frame.storeys()).map(of_storey).collect()
}
