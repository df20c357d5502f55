//! The frame's elevation with every member shaded by its error.

use super::canvas::{Anchor, Canvas, Fill, Point, SMALL, Stroke, Words};
use super::colour::{Colour, PALE, RULE, WHITE, signed_colour};
use super::colour_bar::colour_bar;
use super::font::text_width;
use super::grid::Grid;
use super::number::percent;
use super::panel::{heading, paragraph};
use super::plan::{MARGIN, Plan, Room};
use super::plan_marks::surroundings;
use super::svg::finish;
use super::{Figure, Svg};

/// Frames with more members than this get colours in steps of a twentieth, so that equal neighbours join.
const MANY_MEMBERS: usize = 3000;

/// What is known of one member.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Shade {
    /// Signed error in percent of the storey's reference; negative is short.
    Error(f64),
    /// The exact value is near zero, so that its error says little.
    NearZero,
    /// No value.
    Missing,
}

/// An elevation whose columns and beams are thick bars shaded by signed error, for one method.
///
/// # Assumptions
/// Columns stand storey by storey from the ground, within a storey from line A; beams floor by floor, within a floor
/// from the left. Cells that are absent count as [`Shade::Missing`].
#[derive(Debug, Clone, PartialEq)]
pub struct Elevation {
    /// What the figure shows, in a few words.
    pub title: String,
    /// What it finds, in a sentence or two.
    pub description: String,
    /// The frame.
    pub grid: Grid,
    /// `storeys x (bays + 1)` cells.
    pub columns: Vec<Shade>,
    /// `storeys x bays` cells.
    pub beams: Vec<Shade>,
    /// Percentage at the ends of the colour bar, the same for figures that are compared; see [`colour_limit`].
    pub limit: f64,
    /// What the percentage is, such as `error of the design moment, % of the storey's largest`.
    pub measure: String,
}

/// A round percentage for the ends of the colour bar that encloses all `errors`: 10, 20, 30, 40, 50, 60, 80 or 100.
///
/// Errors beyond 100 % keep 100: the bar then says that values lie beyond.
pub fn colour_limit(errors: impl IntoIterator<Item = f64>) -> f64 {
    let largest =
        errors.into_iter().filter(|error| error.is_finite()).fold(0.0, |max, error| f64::max(max, error.abs()));
    [10.0, 20.0, 30.0, 40.0, 50.0, 60.0, 80.0].into_iter().find(|limit| largest <= *limit).unwrap_or(100.0)
}

impl Figure for Elevation {
    fn svg(&self) -> Svg {
        let bars = Bars::of(&Plan::new(&self.grid, Room::default()));
        let side = bars.column / 2.0 + 4.0;
        let plan = Plan::new(&self.grid, Room { sides: (side, side), above: bars.beam / 2.0 });
        let mut canvas = Canvas::default();
        let top = heading(&mut canvas, &self.title, plan.width);
        let plan = plan.lowered(top);
        let half = if plan.bay < 14.0 { 0.0 } else { bars.column / 2.0 + 2.5 };
        let below = surroundings(&mut canvas, &self.grid, &plan, half);
        self.draw_beams(&mut canvas, &plan, bars);
        self.draw_columns(&mut canvas, &plan, bars);
        draw_joints(&mut canvas, &plan, bars);
        let bottom = self.key(&mut canvas, &plan, below + 8.0);
        self.note_missing(&mut canvas);
        finish(canvas, &self.title, &self.description, plan.width, bottom + MARGIN)
    }
}

/// Thickness of the bars, CSS px.
#[derive(Debug, Clone, Copy)]
struct Bars {
    column: f64,
    beam: f64,
    outlined: bool,
}

impl Bars {
    fn of(plan: &Plan) -> Self {
        let column = (0.48 * plan.bay).min(0.9 * plan.storey).clamp(1.5, 30.0);
        let beam = (0.42 * plan.storey).clamp(1.0, 16.0);
        Self { column, beam, outlined: column >= 5.0 && beam >= 4.0 }
    }
}

/// How a bar is painted.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Paint {
    Shade(Colour),
    Hatch,
    Blank,
}

impl Elevation {
    fn column(&self, storey: usize, line: usize) -> Shade {
        cell(&self.columns, storey * self.grid.lines() + line)
    }

    fn beam(&self, floor: usize, bay: usize) -> Shade {
        cell(&self.beams, floor * self.grid.bays.len() + bay)
    }

    fn steps(&self) -> Option<f64> {
        (self.grid.members() > MANY_MEMBERS).then_some(20.0)
    }

    fn paint(&self, cell: Shade) -> Paint {
        match cell {
            Shade::Error(error) => {
                let share = error / self.limit.max(1e-9);
                let share = self.steps().map_or(share, |steps| (share * steps).round() / steps);
                Paint::Shade(signed_colour(share))
            }
            Shade::NearZero => Paint::Hatch,
            Shade::Missing => Paint::Blank,
        }
    }

    fn draw_columns(&self, canvas: &mut Canvas, plan: &Plan, bars: Bars) {
        let left = bars.column / 2.0;
        let joint = if bars.outlined { bars.beam / 2.0 } else { 0.0 };
        for (line, x) in plan.x.iter().enumerate() {
            let cells: Vec<Shade> = (0..self.grid.storeys.len()).map(|storey| self.column(storey, line)).collect();
            for (first, last, paint) in self.runs(&cells) {
                let foot = if first == 0 { plan.ground() } else { plan.y[first] - joint };
                let head = plan.y[last + 1] + joint;
                draw_bar(canvas, (x - left, head), (bars.column, foot - head), paint, bars);
                if first == last {
                    label(canvas, (x - left, head), (bars.column, foot - head), cells[first], paint);
                }
            }
        }
    }

    fn draw_beams(&self, canvas: &mut Canvas, plan: &Plan, bars: Bars) {
        for floor in 0..self.grid.storeys.len() {
            let top = plan.y[floor + 1] - bars.beam / 2.0;
            let cells: Vec<Shade> = (0..self.grid.bays.len()).map(|bay| self.beam(floor, bay)).collect();
            for (first, last, paint) in self.runs(&cells) {
                let start = plan.x[first] + bars.column / 2.0;
                let size = (plan.x[last + 1] - bars.column / 2.0 - start, bars.beam);
                draw_bar(canvas, (start, top), size, paint, bars);
                if first == last {
                    label(canvas, (start, top), size, cells[first], paint);
                }
            }
        }
    }

    /// First and last of each run of bars painted alike; single bars unless the frame is very large.
    fn runs(&self, cells: &[Shade]) -> Vec<(usize, usize, Paint)> {
        let mut runs: Vec<(usize, usize, Paint)> = Vec::new();
        for (at, cell) in cells.iter().enumerate() {
            let paint = self.paint(*cell);
            match runs.last_mut() {
                Some(run) if run.2 == paint && self.steps().is_some() => run.1 = at,
                _ => runs.push((at, at, paint)),
            }
        }
        runs
    }

    fn cells(&self) -> impl Iterator<Item = Shade> + '_ {
        let (storeys, bays) = (self.grid.storeys.len(), self.grid.bays.len());
        let columns = (0..storeys * (bays + 1)).map(|at| cell(&self.columns, at));
        columns.chain((0..storeys * bays).map(|at| cell(&self.beams, at)))
    }

    fn key(&self, canvas: &mut Canvas, plan: &Plan, y: f64) -> f64 {
        let errors = || self.cells().filter_map(|cell| if let Shade::Error(error) = cell { Some(error) } else { None });
        let beyond = (errors().any(|error| error < -self.limit), errors().any(|error| error > self.limit));
        let middle = plan.width / 2.0;
        let room = plan.width - 2.0 * MARGIN;
        let mut y = colour_bar(canvas, &self.measure, (middle, y), room, (self.limit, beyond));
        let left = middle - room.min(320.0) / 2.0;
        let swatches = [
            (Shade::NearZero, Paint::Hatch, "near zero: under a tenth of the storey's reference"),
            (Shade::Missing, Paint::Blank, "no value"),
        ];
        let bars = Bars { column: 14.0, beam: 14.0, outlined: true };
        for (kind, paint, words) in swatches {
            if self.cells().any(|cell| cell == kind) {
                draw_bar(canvas, (left, y + 5.0), (22.0, 11.0), paint, bars);
                y = paragraph(canvas, words, (left + 28.0, y + 3.0), room.min(320.0) - 28.0);
            }
        }
        y
    }

    fn note_missing(&self, canvas: &mut Canvas) {
        let missing = self.cells().filter(|cell| *cell == Shade::Missing).count();
        if missing > 0 {
            let members = if missing == 1 { "member has" } else { "members have" };
            canvas.note(format!("{missing} {members} no finite error and stay white."));
        }
    }
}

/// The cell at `at`; an error that is not finite is missing.
fn cell(cells: &[Shade], at: usize) -> Shade {
    match cells.get(at) {
        Some(Shade::Error(error)) if !error.is_finite() => Shade::Missing,
        Some(cell) => *cell,
        None => Shade::Missing,
    }
}

fn draw_bar(canvas: &mut Canvas, corner: Point, size: Point, paint: Paint, bars: Bars) {
    let colour = match paint {
        Paint::Shade(colour) => colour,
        Paint::Hatch => PALE,
        Paint::Blank => WHITE,
    };
    let outline = bars.outlined.then(|| Stroke::solid(RULE, 0.7));
    canvas.bar(corner, size, Fill { colour, outline });
    if paint == Paint::Hatch && bars.outlined {
        canvas.path(zigzag(corner, size), Stroke::solid(RULE, 0.8));
    }
}

/// A zigzag along the longer side of a rectangle.
fn zigzag((x, y): Point, (width, height): Point) -> Vec<Point> {
    let (along, across) = if width > height { (width, height) } else { (height, width) };
    let teeth = (along / 5.0).floor().clamp(2.0, 60.0) as usize;
    let inset = (0.15 * across).min(2.0);
    let point = |index: usize| {
        let forward = along * index as f64 / teeth as f64;
        let aside = if index.is_multiple_of(2) { inset } else { across - inset };
        if width > height { (x + forward, y + aside) } else { (x + aside, y + forward) }
    };
    (0..=teeth).map(point).collect()
}

/// Prints the percentage on its bar where it fits, turned where only that fits.
fn label(canvas: &mut Canvas, corner: Point, size: Point, cell: Shade, paint: Paint) {
    let (Shade::Error(error), Paint::Shade(colour)) = (cell, paint) else { return };
    let words = percent(error);
    let long = text_width(&words, SMALL, false) + 4.0;
    let high = SMALL + 1.0;
    let middle = (corner.0 + size.0 / 2.0, corner.1 + size.1 / 2.0);
    let words = Words::new(words, middle, Anchor::Middle).colour(colour.label());
    if size.0 >= long && size.1 >= high {
        canvas.words(words);
    } else if size.0 >= high && size.1 >= long {
        canvas.words(words.upright());
    }
}

fn draw_joints(canvas: &mut Canvas, plan: &Plan, bars: Bars) {
    if !bars.outlined {
        return;
    }
    let corner = (bars.column / 2.0, bars.beam / 2.0);
    for y in &plan.y[1..] {
        for x in &plan.x {
            let fill = Fill::outlined(PALE, RULE, 0.7);
            canvas.bar((x - corner.0, y - corner.1), (bars.column, bars.beam), fill);
        }
    }
}
