//! Bending moments on the elevation, drawn on the side in tension.

use super::canvas::{Anchor, Canvas, Fill, Point, Stroke, Words};
use super::colour::{Colour, INK};
use super::grid::Grid;
use super::legend::legend;
use super::look::{Look, look};
use super::number::three_figures;
use super::panel::{heading, heading_height, paragraph};
use super::place::Taken;
use super::plan::{LINE, MARGIN, Plan, Room};
use super::plan_marks::surroundings;
use super::svg::finish;
use super::{Figure, Svg, axis};
use crate::units::Unit;

/// Light fill of the exact diagram.
const EXACT_FILL: Colour = Colour(0xD9, 0xD9, 0xD9);
/// Largest ordinate over the mean bay width (columns) and over the lowest storey height (beams).
const REACH: f64 = 0.40;
/// Labels besides the largest ones are tried for this many members at most.
const LABELLED: usize = 120;

/// The moments at the two ends of each member of a frame.
///
/// # Units
/// N m, positive clockwise on the member end. Columns: `[foot, head]`, storey by storey from the ground, within a storey
/// from line A; beams: `[left, right]`, floor by floor, within a floor from the left.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct EndMoments {
    /// `storeys x (bays + 1)` columns.
    pub columns: Vec<[f64; 2]>,
    /// `storeys x bays` beams.
    pub beams: Vec<[f64; 2]>,
}

/// Moments drawn as an outline, in the look of their method.
#[derive(Debug, Clone, PartialEq)]
pub struct OutlineMoments {
    /// Method by its name in the files.
    pub method: String,
    /// Name for the key.
    pub name: String,
    /// The moments.
    pub moments: EndMoments,
}

/// The moment diagram of a frame: one method filled and, where given, another as an outline.
///
/// # Assumptions
/// Lateral forces act at joints, so moments are linear between the ends of a member. They are drawn on the side in
/// tension: with the load to the right the foot of a column bends to the left, the left end of a beam downwards.
#[derive(Debug, Clone, PartialEq)]
pub struct MomentDiagram {
    /// What the figure shows, in a few words.
    pub title: String,
    /// What it finds, in a sentence or two.
    pub description: String,
    /// The frame.
    pub grid: Grid,
    /// Name of the filled method for the key.
    pub exact_name: String,
    /// The filled moments.
    pub exact: EndMoments,
    /// Moments drawn as an outline.
    pub quick: Option<OutlineMoments>,
    /// Unit of printed moments.
    pub unit: Unit,
}

/// One member's diagram: ends of the axis, ordinate per unit of moment at either end.
#[derive(Debug, Clone, Copy)]
struct Span {
    ends: [Point; 2],
    moments: [f64; 2],
    /// Direction of a positive moment's ordinate at either end.
    towards: [Point; 2],
}

impl Span {
    fn tips(&self, scale: f64) -> [Point; 2] {
        [0, 1].map(|end| {
            let reach = scale * self.moments[end];
            (self.ends[end].0 + reach * self.towards[end].0, self.ends[end].1 + reach * self.towards[end].1)
        })
    }

    fn largest(&self) -> f64 {
        self.moments[0].abs().max(self.moments[1].abs())
    }
}

impl Figure for MomentDiagram {
    fn svg(&self) -> Svg {
        let mut canvas = Canvas::default();
        let draft = Plan::new(&self.grid, Room { top: 0.0, side: (0.0, 0.0), above: 0.0 });
        let top = heading_height(&self.title, draft.width);
        let above = REACH * draft.storey + LINE;
        let plan = Plan::new(&self.grid, Room { top, side: (0.0, REACH * draft.bay + 34.0), above });
        heading(&mut canvas, &self.title, draft.width);
        let half = (0.3 * plan.bay).min(9.0);
        let below = surroundings(&mut canvas, &self.grid, &plan, if half < 4.0 { 0.0 } else { half });
        let exact = self.spans(&self.exact, &plan);
        let quick = self.quick.as_ref().map(|quick| self.spans(&quick.moments, &plan)).unwrap_or_default();
        let largest = exact.iter().chain(&quick).map(Span::largest).fold(0.0, f64::max);
        let scale = if largest > 0.0 { REACH * plan.bay.min(plan.storey * 1.6) / largest } else { 0.0 };
        self.draw(&mut canvas, &exact, &quick, scale);
        let labels = Labels { canvas: &mut canvas, taken: Taken::default(), unit: self.unit, scale };
        labels.print(&exact, &quick, &plan);
        self.note_missing(&mut canvas, exact.len());
        let bottom = self.key(&mut canvas, &plan, below + 6.0, scale);
        finish(canvas, &self.title, &self.description, plan.width, bottom + MARGIN)
    }
}

impl MomentDiagram {
    /// Every member whose moments are finite.
    fn spans(&self, moments: &EndMoments, plan: &Plan) -> Vec<Span> {
        let (lines, bays) = (self.grid.lines(), self.grid.bays.len());
        let column = |(at, moments): (usize, &[f64; 2])| {
            let (storey, line) = (at / lines, at % lines);
            let x = plan.x[line];
            let ends = [(x, plan.y[storey]), (x, plan.y[storey + 1])];
            Span { ends, moments: *moments, towards: [(1.0, 0.0), (-1.0, 0.0)] }
        };
        let beam = |(at, moments): (usize, &[f64; 2])| {
            let (floor, bay) = (at / bays, at % bays);
            let y = plan.y[floor + 1];
            let ends = [(plan.x[bay], y), (plan.x[bay + 1], y)];
            Span { ends, moments: *moments, towards: [(0.0, 1.0), (0.0, -1.0)] }
        };
        let storeys = self.grid.storeys.len();
        let columns = moments.columns.iter().take(storeys * lines).enumerate().map(column);
        let beams = moments.beams.iter().take(storeys * bays).enumerate().map(beam);
        columns.chain(beams).filter(|span| span.moments.iter().all(|moment| moment.is_finite())).collect()
    }

    fn look(&self) -> Option<Look> {
        self.quick.as_ref().map(|quick| look(&quick.method))
    }

    fn draw(&self, canvas: &mut Canvas, exact: &[Span], quick: &[Span], scale: f64) {
        for span in exact {
            let [first, second] = span.tips(scale);
            let corners = vec![span.ends[0], first, second, span.ends[1]];
            canvas.area(corners, Fill::outlined(EXACT_FILL, INK, 0.9));
        }
        for span in exact {
            canvas.line(span.ends[0], span.ends[1], Stroke::solid(INK, 1.8));
        }
        if let Some(look) = self.look() {
            for span in quick {
                let [first, second] = span.tips(scale);
                let outline = vec![span.ends[0], first, second, span.ends[1]];
                canvas.path(outline, Stroke { width: 1.4, ..Stroke::of(look) });
            }
        }
    }

    fn note_missing(&self, canvas: &mut Canvas, drawn: usize) {
        let missing = self.grid.members().saturating_sub(drawn);
        if missing > 0 {
            let members = if missing == 1 { "member has" } else { "members have" };
            canvas.note(format!("{missing} {members} no finite moments and no diagram."));
        }
    }

    /// The scale bar, the key of the methods and the rule of drawing.
    fn key(&self, canvas: &mut Canvas, plan: &Plan, y: f64, scale: f64) -> f64 {
        let width = plan.width - 2.0 * MARGIN;
        let mut y = y;
        if scale > 0.0 {
            let moment = axis::round_down(60.0 / scale / self.unit.si);
            let long = moment * self.unit.si * scale;
            let middle = y + LINE / 2.0;
            canvas.line((MARGIN, middle), (MARGIN + long, middle), Stroke::solid(INK, 1.2));
            for x in [MARGIN, MARGIN + long] {
                canvas.line((x, middle - 4.0), (x, middle + 4.0), Stroke::solid(INK, 1.2));
            }
            let words = format!("{} {}", three_figures(moment), self.unit.symbol);
            canvas.words(Words::new(words, (MARGIN + long + 8.0, middle), Anchor::Start));
            y += LINE + 4.0;
        }
        let exact = Look { colour: INK, width: 0.9, dash: &[], marker: super::Marker::Bare };
        canvas.bar((MARGIN, y + 4.0), (34.0, 10.0), Fill::plain(EXACT_FILL));
        let mut entries = vec![(exact, false, self.exact_name.clone())];
        if let (Some(look), Some(quick)) = (self.look(), &self.quick) {
            entries.push((look, false, quick.name.clone()));
        }
        y = legend(canvas, &entries, (MARGIN, y), width) + 2.0;
        let rule = format!("Moments in {}, drawn on the side in tension.", self.unit.symbol);
        paragraph(canvas, &rule, (MARGIN, y), width)
    }
}

/// Prints moments beside the tips of the filled diagram, the largest first, where there is room.
struct Labels<'a> {
    canvas: &'a mut Canvas,
    taken: Taken,
    unit: Unit,
    scale: f64,
}

impl Labels<'_> {
    fn print(mut self, exact: &[Span], quick: &[Span], plan: &Plan) {
        for span in exact.iter().chain(quick) {
            let [first, second] = span.tips(self.scale);
            self.taken.line(span.ends[0], span.ends[1]);
            self.taken.line(first, second);
            self.taken.line(span.ends[0], first);
            self.taken.line(span.ends[1], second);
        }
        let mut ends: Vec<(usize, usize)> = (0..exact.len()).flat_map(|span| [(span, 0), (span, 1)]).collect();
        ends.sort_by(|a, b| size(exact, *b).total_cmp(&size(exact, *a)));
        let is_beam = |end: &&(usize, usize)| exact[end.0].towards[0].0 == 0.0;
        let largest_beam = ends.iter().find(is_beam).copied();
        let largest_column = ends.iter().find(|end| !is_beam(end)).copied();
        let most = if plan.storey < 24.0 || plan.bay < 40.0 { 0 } else { 2 * LABELLED };
        for end in [largest_column, largest_beam].into_iter().flatten() {
            let _ = self.label(exact, end, false) || self.label(exact, end, true);
        }
        for end in ends.into_iter().take(most) {
            if Some(end) != largest_beam && Some(end) != largest_column {
                self.label(exact, end, false);
            }
        }
    }

    /// Tries the places around one end's tip; `over_lines` allows lines beneath.
    fn label(&mut self, spans: &[Span], (span, end): (usize, usize), over_lines: bool) -> bool {
        let span = &spans[span];
        let tip = span.tips(self.scale)[end];
        let along = if end == 0 { 1.0 } else { -1.0 };
        let sign = if span.moments[end] < 0.0 { -1.0 } else { 1.0 };
        let (right, down) = (sign * span.towards[end].0, sign * span.towards[end].1);
        let text = three_figures(self.unit.from_si(span.moments[end].abs()));
        let column = down == 0.0;
        for step in [4.0, 9.0, 14.0, 20.0, 0.0, -8.0] {
            let (at, anchor) = if column {
                let anchor = if right > 0.0 { Anchor::Start } else { Anchor::End };
                ((tip.0 + 4.0 * right, tip.1 - along * step), anchor)
            } else {
                let anchor = if along > 0.0 { Anchor::Start } else { Anchor::End };
                ((tip.0 + along * step, tip.1 + 8.0 * down), anchor)
            };
            let words = Words::new(text.clone(), at, anchor).halo();
            if self.taken.claim(&words, over_lines) {
                self.canvas.words(words);
                return true;
            }
        }
        false
    }
}

fn size(spans: &[Span], (span, end): (usize, usize)) -> f64 {
    // Ends that differ only by rounding count as equal, so that the order is that of the members.
    let moment = spans[span].moments[end].abs();
    format!("{moment:.6e}").parse().unwrap_or(moment)
}
