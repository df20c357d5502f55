//! Where everything of an elevation stands: the frame to scale, and room for forces, storeys, names and dimensions.

use super::canvas::SMALL;
use super::font::text_width;
use super::grid::Grid;
use super::number::three_figures;

/// Space around a figure, CSS px.
pub(super) const MARGIN: f64 = 10.0;
/// Least width of a figure with a colour bar or a legend, CSS px.
pub(super) const LEAST_WIDTH: f64 = 350.0;
/// Longest force arrow, CSS px.
pub(super) const ARROW: f64 = 30.0;
/// Height of one line of small words, CSS px.
pub(super) const LINE: f64 = 15.0;

/// What a figure needs around the frame, CSS px.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Room {
    /// Left of line A and right of the last line, CSS px.
    pub sides: (f64, f64),
    /// Above the roof beam's axis, CSS px.
    pub above: f64,
}

/// Positions of an elevation in CSS px.
#[derive(Debug, Clone)]
pub(super) struct Plan {
    /// Column lines.
    pub x: Vec<f64>,
    /// Levels: the ground, then each floor.
    pub y: Vec<f64>,
    /// Left edge of what stands beside the frame on the left: tips of the force arrows end here.
    pub left: f64,
    /// Right edge of the frame's room; storey numbers start here.
    pub right: f64,
    /// Middle of the heads above forces and storeys.
    pub heads: f64,
    /// Width of the figure.
    pub width: f64,
    /// Narrowest bay.
    pub bay: f64,
    /// Lowest storey.
    pub storey: f64,
    /// Whether heights and widths have the same scale.
    pub to_scale: bool,
}

impl Plan {
    /// Lays out `grid` from the figure's top edge.
    pub fn new(grid: &Grid, room: Room) -> Self {
        let bays = usable(&grid.bays);
        let storeys = usable(&grid.storeys);
        let (across, up) = scales(&bays, &storeys);
        let bays: Vec<f64> = bays.iter().map(|width| width * across).collect();
        let storeys: Vec<f64> = storeys.iter().map(|height| height * up).collect();
        let forces = if grid.lateral.is_empty() { 0.0 } else { ARROW + 6.0 + forces_width(grid) };
        let right_side = storeys_width(grid);
        let frame: f64 = bays.iter().sum();
        let natural = 2.0 * MARGIN + forces + room.sides.0 + frame + room.sides.1 + right_side;
        let spare = (LEAST_WIDTH - natural).max(0.0) / 2.0;
        let left = MARGIN + forces + spare;
        let heads = 7.0;
        let roof = heads + LINE + room.above;
        let ground = roof + storeys.iter().sum::<f64>();
        Self {
            x: running(left + room.sides.0, &bays, 1.0),
            y: running(ground, &storeys, -1.0),
            left,
            right: left + room.sides.0 + frame + room.sides.1,
            heads,
            width: natural.max(LEAST_WIDTH),
            bay: least(&bays),
            storey: least(&storeys),
            to_scale: (across / up - 1.0).abs() < 0.01,
        }
    }

    /// The same below a heading of height `by`.
    pub fn lowered(mut self, by: f64) -> Self {
        self.y.iter_mut().for_each(|y| *y += by);
        self.heads += by;
        self
    }

    /// The ground's y.
    pub fn ground(&self) -> f64 {
        self.y[0]
    }

    /// Middle of storey `storey`.
    pub fn storey_middle(&self, storey: usize) -> f64 {
        f64::midpoint(self.y[storey], self.y[storey + 1])
    }
}

/// Widest printed force.
fn forces_width(grid: &Grid) -> f64 {
    let width = |force: &f64| text_width(&three_figures(grid.force.from_si(*force)), SMALL, false);
    let head = text_width(&force_head(grid), SMALL, false) - ARROW - 6.0;
    grid.lateral.iter().map(width).fold(head, f64::max)
}

/// Head above the forces.
pub(super) fn force_head(grid: &Grid) -> String {
    format!("force, {}", grid.force.symbol)
}

/// Width of the storey numbers, from the frame's room to where the heights start.
pub(super) fn numbers_width() -> f64 {
    text_width("storey", SMALL, false) + 14.0
}

/// Head above the storey heights.
pub(super) fn height_head(grid: &Grid) -> String {
    format!("height, {}", grid.length.symbol)
}

fn storeys_width(grid: &Grid) -> f64 {
    numbers_width() + text_width(&height_head(grid), SMALL, false)
}

/// Lengths that can be drawn: one that is not a positive number is drawn as 1 m.
fn usable(lengths: &[f64]) -> Vec<f64> {
    lengths.iter().map(|length| if length.is_finite() && *length > 0.0 { *length } else { 1.0 }).collect()
}

/// CSS px per metre across and up: the same where that leaves both directions readable.
fn scales(bays: &[f64], storeys: &[f64]) -> (f64, f64) {
    let least_bay = (620.0 / bays.len() as f64).clamp(12.0, 58.0);
    let least_storey = if storeys.len() > 20 { (1400.0 / storeys.len() as f64).clamp(4.0, 32.0) } else { 46.0 };
    let across = (760.0 / bays.len() as f64).clamp(12.0, 110.0) / mean(bays);
    let up = (640.0 / storeys.len() as f64).clamp(least_storey, 76.0) / mean(storeys);
    if across > up {
        (up.max(least_bay / least(bays)).min(across), up)
    } else {
        (across, across.max(least_storey / least(storeys)).min(up))
    }
}

fn mean(lengths: &[f64]) -> f64 {
    if lengths.is_empty() { 1.0 } else { lengths.iter().sum::<f64>() / lengths.len() as f64 }
}

fn least(lengths: &[f64]) -> f64 {
    lengths.iter().copied().reduce(f64::min).unwrap_or(1.0)
}

fn running(start: f64, lengths: &[f64], direction: f64) -> Vec<f64> {
    let mut at = start;
    let steps = lengths.iter().map(|length| {
        at += direction * length;
        at
    });
    std::iter::once(start).chain(steps.collect::<Vec<_>>()).collect()
}

/// The numbers `offset`, `offset + step` ... of `positions` that stay `gap` apart, at the smallest round step; the first
/// position always stays.
pub(super) fn thinned(positions: &[f64], gap: f64, offset: usize) -> Vec<usize> {
    for step in [1, 2, 5, 10, 20, 25, 50, 100, 200, 500] {
        let kept: Vec<usize> =
            (0..positions.len()).filter(|at| *at == 0 || (at + offset).is_multiple_of(step)).collect();
        let apart = |pair: &[usize]| (positions[pair[0]] - positions[pair[1]]).abs() >= gap;
        if kept.windows(2).all(apart) {
            return kept;
        }
    }
    if positions.is_empty() { Vec::new() } else { vec![0] }
}
