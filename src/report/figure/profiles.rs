//! A quantity over the storeys, one panel per column line, one line per method.

use super::axis::round_ticks;
use super::canvas::{Anchor, Canvas, Point, SMALL, Stroke, Words};
use super::colour::{GRID, INK, QUIET, RULE};
use super::font::{text_width, wrap};
use super::legend::legend;
use super::look::{EXACT_METHODS, look};
use super::number::rounded;
use super::panel::heading;
use super::plan::{LEAST_WIDTH, LINE, MARGIN, thinned};
use super::svg::finish;
use super::{Figure, Svg};
use crate::units::Unit;

/// Panels beside each other.
const ACROSS: usize = 4;
/// Width of a panel's plot, CSS px.
const PLOT: f64 = 188.0;
/// Room for storey numbers left of each row, CSS px.
const NUMBERS: f64 = 46.0;
/// Room above a plot for its name, CSS px.
const NAME: f64 = 22.0;
/// Room below a plot for its ticks, and below a row of panels, CSS px.
const TICKS: f64 = 20.0;
const ROW_GAP: f64 = 6.0;

/// One method's values in a panel.
#[derive(Debug, Clone, PartialEq)]
pub struct Series {
    /// Method by its name in the files: sets the look.
    pub method: String,
    /// Name for the key.
    pub name: String,
    /// One value per storey from the ground, in units of [`Unit::si`] base units (N, m, or a share); NaN where none.
    pub values: Vec<f64>,
}

/// One column line's panel.
#[derive(Debug, Clone, PartialEq)]
pub struct Panel {
    /// Name above the panel, such as `line B`.
    pub name: String,
    /// The methods; exact ones are painted first, beneath the others.
    pub series: Vec<Series>,
}

/// Small multiples of a storey quantity: steps up the height, ground at the bottom, one common axis.
#[derive(Debug, Clone, PartialEq)]
pub struct Profiles {
    /// What the figure shows, in a few words.
    pub title: String,
    /// What it finds, in a sentence or two.
    pub description: String,
    /// Name of the quantity, such as `column design moment`.
    pub quantity: String,
    /// Unit of the axis; a share of one is printed as percent with `Unit { symbol: "%", si: 0.01 }`.
    pub unit: Unit,
    /// Storey heights from the ground, m.
    pub storeys: Vec<f64>,
    /// The panels, at most about twelve.
    pub panels: Vec<Panel>,
}

impl Figure for Profiles {
    fn svg(&self) -> Svg {
        let mut canvas = Canvas::default();
        let frame = self.arrange();
        let top = heading(&mut canvas, &self.title, frame.width) + 4.0;
        let entries = self.entries();
        let marked: Vec<_> = entries.iter().map(|(id, name)| (look(id), true, name.clone())).collect();
        let mut y = legend(&mut canvas, &marked, (MARGIN, top), frame.width - 2.0 * MARGIN) + 6.0;
        for row in self.panels.chunks(frame.across) {
            self.storey_numbers(&mut canvas, &frame, y + NAME);
            for (index, panel) in row.iter().enumerate() {
                let left = frame.left + index as f64 * (PLOT + frame.gap);
                self.panel(&mut canvas, &frame, panel, (left, y + NAME));
            }
            y += NAME + frame.height + TICKS + LINE * self.axis_name().len() as f64 + ROW_GAP;
        }
        finish(canvas, &self.title, &self.description, frame.width, y + MARGIN - 4.0)
    }
}

/// The arrangement shared by all panels.
struct Arrangement {
    across: usize,
    left: f64,
    gap: f64,
    width: f64,
    height: f64,
    ticks: Vec<f64>,
    /// Heights of the ground and the floors above the ground, CSS px.
    levels: Vec<f64>,
}

impl Arrangement {
    fn x(&self, left: f64, value: f64) -> f64 {
        let (first, last) = (self.ticks[0], self.ticks[self.ticks.len() - 1]);
        left + PLOT * (value - first) / (last - first)
    }
}

impl Profiles {
    fn arrange(&self) -> Arrangement {
        let rows = self.panels.len().div_ceil(ACROSS).max(1);
        let across = self.panels.len().div_ceil(rows).max(1);
        let printed = self.panels.iter().flat_map(|panel| &panel.series).flat_map(|series| &series.values);
        let finite = printed.filter(|value| value.is_finite()).map(|value| self.unit.from_si(*value));
        let (low, high) = finite.fold((0.0, 0.0), |(low, high), value| (f64::min(low, value), f64::max(high, value)));
        let ticks = round_ticks(low, high, 4);
        let last = ticks.iter().map(|tick| text_width(&rounded(*tick, 4), SMALL, false)).fold(0.0, f64::max);
        let gap = (last + 8.0).max(26.0);
        let left = MARGIN + NUMBERS;
        let natural = left + across as f64 * (PLOT + gap) - gap + last / 2.0 + MARGIN;
        let heights: Vec<f64> =
            self.storeys.iter().map(|height| if *height > 0.0 && height.is_finite() { *height } else { 1.0 }).collect();
        let total: f64 = heights.iter().sum();
        let height = (26.0 * heights.len() as f64).clamp(150.0, 460.0);
        let mut levels = vec![0.0];
        levels.extend(heights.iter().scan(0.0, |sum, each| {
            *sum += each / total * height;
            Some(*sum)
        }));
        Arrangement { across, left, gap, width: natural.max(LEAST_WIDTH), height, ticks, levels }
    }

    /// Methods in the order of first appearance, each once.
    fn entries(&self) -> Vec<(String, String)> {
        let mut entries: Vec<(String, String)> = Vec::new();
        for series in self.panels.iter().flat_map(|panel| &panel.series) {
            if !entries.iter().any(|(method, _)| *method == series.method) {
                entries.push((series.method.clone(), series.name.clone()));
            }
        }
        entries
    }

    fn storey_numbers(&self, canvas: &mut Canvas, frame: &Arrangement, top: f64) {
        let bottom = top + frame.height;
        let middles: Vec<f64> = frame.levels.windows(2).map(|ends| bottom - f64::midpoint(ends[0], ends[1])).collect();
        canvas.words(Words::new("storey", (MARGIN, top - NAME + 8.0), Anchor::Start).colour(QUIET));
        for storey in thinned(&middles, LINE - 1.0, 1) {
            let at = (frame.left - 8.0, middles[storey]);
            canvas.words(Words::new((storey + 1).to_string(), at, Anchor::End));
        }
    }

    fn panel(&self, canvas: &mut Canvas, frame: &Arrangement, panel: &Panel, (left, top): Point) {
        let bottom = top + frame.height;
        let middle = left + PLOT / 2.0;
        canvas.words(Words::new(&*panel.name, (middle, top - NAME + 8.0), Anchor::Middle).bold());
        self.grid(canvas, frame, (left, top));
        for tick in &frame.ticks {
            let x = frame.x(left, *tick);
            canvas.words(Words::new(rounded(*tick, 4), (x, bottom + 11.0), Anchor::Middle));
        }
        for (index, line) in self.axis_name().into_iter().enumerate() {
            let at = (middle, bottom + TICKS + LINE * (index as f64 + 0.5));
            canvas.words(Words::new(line, at, Anchor::Middle).colour(QUIET));
        }
        let exact = |series: &&Series| EXACT_METHODS.contains(&&*series.method);
        let (beneath, above): (Vec<_>, Vec<_>) = panel.series.iter().partition(exact);
        let count = panel.series.len();
        for (index, series) in beneath.into_iter().chain(above).enumerate() {
            let share = (index as f64 + 1.0) / (count as f64 + 1.0);
            self.series(canvas, frame, series, (left, bottom), share);
            self.note_missing(canvas, panel, series);
        }
    }

    fn axis_name(&self) -> Vec<String> {
        wrap(&format!("{}, {}", self.quantity, self.unit.symbol), SMALL, false, PLOT)
    }

    fn grid(&self, canvas: &mut Canvas, frame: &Arrangement, (left, top): Point) {
        let bottom = top + frame.height;
        let heights: Vec<f64> = frame.levels.iter().map(|level| bottom - level).collect();
        for level in thinned(&heights, 5.0, 0) {
            canvas.line((left, heights[level]), (left + PLOT, heights[level]), Stroke::solid(GRID, 0.6));
        }
        for tick in &frame.ticks {
            let x = frame.x(left, *tick);
            let stroke = if *tick == 0.0 { Stroke::solid(RULE, 1.0) } else { Stroke::solid(GRID, 0.8) };
            canvas.line((x, top), (x, bottom + 3.0), stroke);
        }
        canvas.line((left, bottom), (left + PLOT, bottom), Stroke::solid(INK, 1.4));
    }

    /// Steps up the height, with a marker in each storey (or in some of many) at `share` of its height, so that the
    /// markers of methods that agree stay apart.
    fn series(&self, canvas: &mut Canvas, frame: &Arrangement, series: &Series, (left, bottom): Point, share: f64) {
        let look = look(&series.method);
        let mut run: Vec<Point> = Vec::new();
        let mut markers: Vec<Point> = Vec::new();
        for (ends, value) in frame.levels.windows(2).zip(&series.values) {
            if !value.is_finite() {
                canvas.path(std::mem::take(&mut run), Stroke::of(look));
                continue;
            }
            let x = frame.x(left, self.unit.from_si(*value));
            run.extend([(x, bottom - ends[0]), (x, bottom - ends[1])]);
            markers.push((x, bottom - ends[0] - share * (ends[1] - ends[0])));
        }
        canvas.path(run, Stroke::of(look));
        let step = (24.0 * self.storeys.len() as f64 / frame.height).ceil().max(1.0);
        for marker in markers.iter().skip((share * step) as usize).step_by(step as usize) {
            canvas.marker(*marker, look);
        }
    }

    fn note_missing(&self, canvas: &mut Canvas, panel: &Panel, series: &Series) {
        let missing = series.values.iter().filter(|value| !value.is_finite()).count();
        if missing > 0 {
            canvas.note(format!("{}, {}: {missing} values are not finite and leave gaps.", panel.name, series.name));
        }
    }
}
