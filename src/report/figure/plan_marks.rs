//! What stands around an elevation: forces, storeys, feet, line names, dimensions.

use super::canvas::{Anchor, Canvas, Fill, Point, SMALL, Stroke, Words};
use super::colour::{INK, QUIET, RULE, WHITE};
use super::font::text_width;
use super::grid::{FootKind, Grid};
use super::number::{rounded, three_figures};
use super::plan::{ARROW, LINE, MARGIN, Plan, force_head, height_head, numbers_width, thinned};
use crate::frame::line_name;

/// Radius of the circle around a line's name of one letter, and of more, CSS px.
const NAME_RADII: (f64, f64) = (9.5, 12.5);

/// Draws everything around the frame; `half` is half the width of a foot's symbol. Returns the y below it all.
pub(super) fn surroundings(canvas: &mut Canvas, grid: &Grid, plan: &Plan, half: f64) -> f64 {
    if grid.bays.iter().chain(&grid.storeys).any(|length| !length.is_finite() || *length <= 0.0) {
        canvas.note("A bay width or storey height that is not a positive number is drawn as 1 m.".to_owned());
    }
    forces(canvas, grid, plan);
    storeys(canvas, grid, plan);
    feet(canvas, grid, plan, half);
    let last = line_name(plan.x.len() - 1);
    let radius = if last.len() > 1 { NAME_RADII.1 } else { NAME_RADII.0 };
    let names = plan.ground() + foot_depth(half) + 6.0 + radius;
    line_names(canvas, plan, names, radius);
    let bottom = dimensions(canvas, grid, plan, names + radius + 18.0);
    remarks(canvas, grid, plan, bottom + 8.0)
}

fn forces(canvas: &mut Canvas, grid: &Grid, plan: &Plan) {
    if grid.lateral.is_empty() {
        return;
    }
    canvas.words(Words::new(force_head(grid), (plan.left, plan.heads), Anchor::End).colour(QUIET));
    let largest =
        grid.lateral.iter().filter(|force| force.is_finite()).fold(0.0, |max, force| f64::max(max, force.abs()));
    let levels = &plan.y[1..];
    let printed = thinned(levels, LINE - 1.0, 1);
    let head = (0.35 * plan.storey).clamp(1.5, 4.0);
    for (floor, (force, y)) in grid.lateral.iter().zip(levels).enumerate() {
        if !force.is_finite() {
            canvas.note(format!("The force at floor {} is not a finite number and is not drawn.", floor + 1));
            continue;
        }
        if printed.contains(&floor) {
            let at = (plan.left - ARROW - 6.0, *y);
            canvas.words(Words::new(three_figures(grid.force.from_si(*force)), at, Anchor::End));
        }
        if *force != 0.0 && largest > 0.0 {
            let length = (ARROW - 12.0) * force.abs() / largest + 12.0;
            let (tail, tip) = (plan.left - length, plan.left - 2.0);
            arrow(canvas, *y, if *force > 0.0 { (tail, tip) } else { (tip, tail) }, head);
        }
    }
}

fn arrow(canvas: &mut Canvas, y: f64, (tail, tip): (f64, f64), head: f64) {
    let back = if tip > tail { -1.8 * head } else { 1.8 * head };
    canvas.line((tail, y), (tip + back, y), Stroke::solid(INK, 1.2));
    canvas.area(vec![(tip, y), (tip + back, y - head), (tip + back, y + head)], Fill::plain(INK));
}

fn storeys(canvas: &mut Canvas, grid: &Grid, plan: &Plan) {
    let numbers = plan.right + 8.0 + text_width("storey", SMALL, false) / 2.0;
    let heights = plan.right + numbers_width();
    canvas.words(Words::new("storey", (numbers, plan.heads), Anchor::Middle).colour(QUIET));
    canvas.words(Words::new(height_head(grid), (heights, plan.heads), Anchor::Start).colour(QUIET));
    let middles: Vec<f64> = (0..grid.storeys.len()).map(|storey| plan.storey_middle(storey)).collect();
    for storey in thinned(&middles, LINE - 1.0, 1) {
        let y = middles[storey];
        canvas.words(Words::new((storey + 1).to_string(), (numbers, y), Anchor::Middle).bold());
        let height = rounded(grid.length.from_si(grid.storeys[storey]), 4);
        canvas.words(Words::new(height, (heights, y), Anchor::Start));
    }
}

fn foot_depth(half: f64) -> f64 {
    if half < 4.0 { 3.0 } else { 1.3 * half.min(9.0) + 5.0 }
}

fn feet(canvas: &mut Canvas, grid: &Grid, plan: &Plan, half: f64) {
    let ground = plan.ground();
    if half < 4.0 {
        let (first, last) = (plan.x[0] - 6.0, plan.x[plan.x.len() - 1] + 6.0);
        canvas.line((first, ground), (last, ground), Stroke::solid(INK, 1.5));
        return;
    }
    for x in &plan.x {
        match grid.feet {
            FootKind::Fixed => earth(canvas, (*x, ground), half),
            FootKind::Pinned => {
                let (reach, depth) = (half.min(9.0) * 0.8, half.min(9.0) * 1.3);
                let corners = vec![(*x, ground), (x - reach, ground + depth), (x + reach, ground + depth)];
                canvas.area(corners, Fill::outlined(WHITE, INK, 1.2));
                earth(canvas, (*x, ground + depth), half.min(11.0));
            }
            FootKind::Sprung => {
                let depth = half.min(9.0) * 1.1;
                spiral(canvas, (*x, ground + depth / 2.0), depth / 2.0);
                earth(canvas, (*x, ground + depth), half.min(11.0));
            }
        }
    }
}

/// A ground line with hatching below it.
fn earth(canvas: &mut Canvas, (x, y): Point, half: f64) {
    canvas.line((x - half, y), (x + half, y), Stroke::solid(INK, 1.5));
    let strokes = (half / 2.5).floor().max(2.0);
    for index in 0..strokes as usize {
        let start = x - half + (index as f64 + 0.8) * 2.0 * half / strokes;
        canvas.line((start, y + 0.5), (start - 3.5, y + 4.5), Stroke::solid(INK, 0.8));
    }
}

/// A rotational spring seen along its axis.
fn spiral(canvas: &mut Canvas, centre: Point, radius: f64) {
    const DIAGONAL: f64 = std::f64::consts::FRAC_1_SQRT_2;
    let around = [
        (0.0, -1.0),
        (DIAGONAL, -DIAGONAL),
        (1.0, 0.0),
        (DIAGONAL, DIAGONAL),
        (0.0, 1.0),
        (-DIAGONAL, DIAGONAL),
        (-1.0, 0.0),
        (-DIAGONAL, -DIAGONAL),
    ];
    let turns = 16;
    let points = (0..=turns).map(|step| {
        let (right, down) = around[step % around.len()];
        let reach = radius * (1.0 - 0.85 * step as f64 / turns as f64);
        (centre.0 + reach * right, centre.1 + reach * down)
    });
    canvas.path(points.collect(), Stroke::solid(INK, 1.2));
}

fn line_names(canvas: &mut Canvas, plan: &Plan, y: f64, radius: f64) {
    for line in thinned(&plan.x, 2.0 * radius + 3.0, 0) {
        canvas.disc((plan.x[line], y), radius, Fill::outlined(WHITE, RULE, 1.0));
        canvas.words(Words::new(line_name(line), (plan.x[line], y), Anchor::Middle).bold());
    }
}

/// Bay widths where they fit (none where most do not), and the whole width. Returns the y below.
fn dimensions(canvas: &mut Canvas, grid: &Grid, plan: &Plan, mut y: f64) -> f64 {
    let number = |length: f64| rounded(grid.length.from_si(length), 4);
    let symbol = grid.length.symbol;
    let fits = |(bay, ends): (&f64, &[f64])| ends[1] - ends[0] >= text_width(&number(*bay), SMALL, false) + 8.0;
    let (first, last) = (plan.x[0], plan.x[plan.x.len() - 1]);
    let total = number(grid.bays.iter().sum());
    if grid.bays.len() == 1 {
        dimension(canvas, (first, last), y, format!("{total} {symbol}"));
        return y + 6.0;
    }
    let pairs: Vec<(&f64, &[f64])> = grid.bays.iter().zip(plan.x.windows(2)).collect();
    if 2 * pairs.iter().filter(|pair| fits(**pair)).count() >= pairs.len() {
        for (bay, ends) in pairs {
            let words = if fits((bay, ends)) { number(*bay) } else { String::new() };
            dimension(canvas, (ends[0], ends[1]), y, words);
        }
        y += 20.0;
    }
    dimension(canvas, (first, last), y, format!("{} bays, {total} {symbol}", grid.bays.len()));
    y + 6.0
}

fn dimension(canvas: &mut Canvas, (from, to): (f64, f64), y: f64, words: String) {
    let rule = Stroke::solid(RULE, 0.8);
    canvas.line((from, y), (to, y), rule);
    for end in [from, to] {
        canvas.line((end - 3.0, y + 3.0), (end + 3.0, y - 3.0), Stroke::solid(QUIET, 1.2));
    }
    canvas.words(Words::new(words, (f64::midpoint(from, to), y - 8.0), Anchor::Middle));
}

fn remarks(canvas: &mut Canvas, grid: &Grid, plan: &Plan, y: f64) -> f64 {
    let feet = match grid.feet {
        FootKind::Fixed => "Fixed feet.",
        FootKind::Pinned => "Pinned feet.",
        FootKind::Sprung => "Feet on rotational springs.",
    };
    let scale = if plan.to_scale { "" } else { " Heights and widths are drawn to different scales." };
    let words = format!("{feet}{scale}");
    let lines = super::font::wrap(&words, SMALL, false, plan.width - 2.0 * MARGIN);
    let below = y + LINE * lines.len() as f64;
    for (index, line) in lines.into_iter().enumerate() {
        let at = (plan.width / 2.0, y + LINE * (index as f64 + 0.5));
        canvas.words(Words::new(line, at, Anchor::Middle).colour(QUIET));
    }
    below
}
