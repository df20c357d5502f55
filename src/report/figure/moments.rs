//! Bending moments on the elevation, drawn on the side in tension.

use super::canvas::{Anchor, Canvas, Fill, Point, Stroke, Words};
use super::colour::{Colour, INK};
use super::grid::Grid;
use super::legend::legend;
use super::look::{Look, look};
use super::number::{rounded, three_figures};
use super::panel::{heading, paragraph};
use super::place::Taken;
use super::plan::{LINE, MARGIN, Plan, Room};
use super::plan_marks::surroundings;
use super::svg::finish;
use super::{Figure, Svg, axis};
use crate::units::Unit;

/// Light fill of the exact diagram.
const EXACT_FILL: Colour = Colour(0xD9, 0xD9, 0xD9);
/// Largest ordinate of a column over the narrowest bay.
const COLUMN_REACH: f64 = 0.42;
/// Largest ordinate of a beam over the lowest storey.
const BEAM_REACH: f64 = 0.48;
/// In frames with up to this many members both ends are labelled, in larger ones the end that governs.
const BOTH_LABELLED: usize = 30;
/// Frames with more members get the two largest labels only.
const MOST_LABELLED: usize = 400;
/// Moments below this share of the largest get no label.
const LEAST_LABELLED: f64 = 0.02;
/// Frames with more members get one outline for each line and floor, not for each member.
const MANY_MEMBERS: usize = 3000;

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

/// Members in one line, end to end.
type Chain = Vec<Span>;

impl Span {
    fn tips(&self, scale: f64) -> [Point; 2] {
        [0, 1].map(|end| {
            let reach = scale * self.moments[end];
            (self.ends[end].0 + reach * self.towards[end].0, self.ends[end].1 + reach * self.towards[end].1)
        })
    }

    fn is_beam(&self) -> bool {
        self.towards[0].0 == 0.0
    }

    /// Both moments without sign. Moments that differ only by rounding count as equal, so that the order of labels is
    /// that of the members.
    fn sizes(&self) -> [f64; 2] {
        self.moments.map(|moment| format!("{:.6e}", moment.abs()).parse().unwrap_or(0.0))
    }

    fn largest(&self) -> f64 {
        self.moments[0].abs().max(self.moments[1].abs())
    }
}

impl Figure for MomentDiagram {
    fn svg(&self) -> Svg {
        let mut canvas = Canvas::default();
        let draft = Plan::new(&self.grid, Room::default());
        let scale = self.scale(&draft);
        let plan = Plan::new(&self.grid, self.room(&draft, scale));
        let top = heading(&mut canvas, &self.title, plan.width);
        let plan = plan.lowered(top);
        let half = (0.3 * plan.bay).min(9.0);
        let below = surroundings(&mut canvas, &self.grid, &plan, if half < 4.0 { 0.0 } else { half });
        let exact = self.chains(&self.exact, &plan);
        let quick = self.quick.as_ref().map(|quick| self.chains(&quick.moments, &plan)).unwrap_or_default();
        self.draw(&mut canvas, &exact, &quick, scale);
        let (exact, quick) = (exact.concat(), quick.concat());
        Labels { canvas: &mut canvas, taken: Taken::default(), unit: self.unit, scale }.print(&exact, &quick, &plan);
        self.note_missing(&mut canvas, exact.len());
        let bottom = self.key(&mut canvas, &plan, below + 6.0, scale);
        finish(canvas, &self.title, &self.description, plan.width, bottom + MARGIN)
    }
}

impl MomentDiagram {
    fn all_chains(&self, plan: &Plan) -> Vec<Chain> {
        let mut chains = self.chains(&self.exact, plan);
        chains.extend(self.quick.iter().flat_map(|quick| self.chains(&quick.moments, plan)));
        chains
    }

    /// CSS px per N m, so that no ordinate outgrows its bay or storey.
    fn scale(&self, plan: &Plan) -> f64 {
        let spans = self.all_chains(plan).concat();
        let largest =
            |beams| spans.iter().filter(|span| span.is_beam() == beams).map(Span::largest).fold(0.0, f64::max);
        let fit = |room: f64, moment: f64| if moment > 0.0 { room / moment } else { f64::INFINITY };
        let scale = fit(COLUMN_REACH * plan.bay, largest(false)).min(fit(BEAM_REACH * plan.storey, largest(true)));
        if scale.is_finite() { scale } else { 0.0 }
    }

    /// Room for the diagrams that stand out beyond the end lines and above the roof, and for their labels.
    fn room(&self, plan: &Plan, scale: f64) -> Room {
        let (first, last) = (plan.x[0], plan.x[plan.x.len() - 1]);
        let roof = plan.y[plan.y.len() - 1];
        let mut room = Room::default();
        for span in self.all_chains(plan).concat() {
            for (x, y) in span.tips(scale) {
                room.sides = (room.sides.0.max(first - x), room.sides.1.max(x - last));
                room.above = room.above.max(roof - y);
            }
        }
        Room { sides: (room.sides.0 + 20.0, room.sides.1 + 20.0), above: room.above + LINE }
    }

    /// The columns of each line from the ground, and the beams of each floor from the left; a member whose moments are
    /// not finite breaks its chain.
    fn chains(&self, moments: &EndMoments, plan: &Plan) -> Vec<Chain> {
        let (storeys, lines, bays) = (self.grid.storeys.len(), self.grid.lines(), self.grid.bays.len());
        let column = |storey: usize, line: usize| {
            let x = plan.x[line];
            let ends = [(x, plan.y[storey]), (x, plan.y[storey + 1])];
            let moments = *moments.columns.get(storey * lines + line)?;
            Some(Span { ends, moments, towards: [(1.0, 0.0), (-1.0, 0.0)] })
        };
        let beam = |floor: usize, bay: usize| {
            let y = plan.y[floor + 1];
            let ends = [(plan.x[bay], y), (plan.x[bay + 1], y)];
            let moments = *moments.beams.get(floor * bays + bay)?;
            Some(Span { ends, moments, towards: [(0.0, 1.0), (0.0, -1.0)] })
        };
        let columns = (0..lines).map(|line| (0..storeys).map(|storey| column(storey, line)).collect());
        let beams = (0..storeys).map(|floor| (0..bays).map(|bay| beam(floor, bay)).collect());
        columns.chain(beams).flat_map(|members: Vec<Option<Span>>| unbroken(&members)).collect()
    }

    fn look(&self) -> Option<Look> {
        self.quick.as_ref().map(|quick| look(&quick.method))
    }

    fn draw(&self, canvas: &mut Canvas, exact: &[Chain], quick: &[Chain], scale: f64) {
        let ends = |chain: &Chain| chain.first().zip(chain.last()).map(|(first, last)| (first.ends[0], last.ends[1]));
        let tips = |chain: &Chain| chain.iter().flat_map(|span| span.tips(scale)).collect::<Vec<_>>();
        for chain in exact {
            if let Some((start, end)) = ends(chain) {
                let corners = [vec![start], tips(chain), vec![end]].concat();
                canvas.area(corners, Fill::outlined(EXACT_FILL, INK, 0.9));
            }
        }
        for (start, end) in exact.iter().filter_map(ends) {
            canvas.line(start, end, Stroke::solid(INK, 1.8));
        }
        let Some(look) = self.look() else { return };
        let stroke = Stroke { width: 1.4, ..Stroke::of(look) };
        let many = self.grid.members() > MANY_MEMBERS;
        for chain in quick {
            if many {
                canvas.path(tips(chain), stroke);
            } else {
                chain.iter().for_each(|span| canvas.path(span.tips(scale).to_vec(), stroke));
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
            let words = format!("{} {}", rounded(moment, 3), self.unit.symbol);
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
        let sizes: Vec<[f64; 2]> = exact.iter().map(Span::sizes).collect();
        let size = |(span, end): (usize, usize)| sizes[span][end];
        let mut ends: Vec<(usize, usize)> = (0..exact.len()).flat_map(|span| [(span, 0), (span, 1)]).collect();
        ends.sort_by(|a, b| size(*b).total_cmp(&size(*a)));
        let of_beam = |end: &&(usize, usize)| exact[end.0].is_beam();
        let first = [ends.iter().find(|end| !of_beam(end)), ends.iter().find(of_beam)];
        let first: Vec<_> = first.into_iter().flatten().copied().collect();
        let roomy = plan.storey >= 30.0 && plan.bay >= 44.0 && exact.len() <= MOST_LABELLED;
        if roomy {
            for span in exact.iter().chain(quick) {
                self.taken.band(span.ends, span.tips(self.scale));
            }
        }
        for end in &first {
            let _ = self.label(exact, *end, false) || self.label(exact, *end, true);
        }
        let least = LEAST_LABELLED * first.iter().map(|end| size(*end)).fold(0.0, f64::max);
        let both = exact.len() <= BOTH_LABELLED;
        let others = ends.into_iter().filter(|end| !first.contains(end));
        let wanted = |end: &(usize, usize)| size(*end) > least && (both || governs(sizes[end.0], end.1));
        for end in others.filter(|end| roomy && wanted(end)) {
            self.label(exact, end, false);
        }
    }

    /// Tries the places around one end's tip, then across the axis; `over_lines` allows lines beneath.
    ///
    /// Columns' labels read upwards and stay in the column's storey, beams' labels lie and stay in the bay.
    fn label(&mut self, spans: &[Span], (span, end): (usize, usize), over_lines: bool) -> bool {
        let span = &spans[span];
        let (tip, axis) = (span.tips(self.scale)[end], span.ends[end]);
        let inwards = if end == 0 { 1.0 } else { -1.0 };
        let sign = if span.moments[end] < 0.0 { -1.0 } else { 1.0 };
        let (right, down) = (sign * span.towards[end].0, sign * span.towards[end].1);
        let text = three_figures(self.unit.from_si(span.moments[end].abs()));
        let anchor = if end == 0 { Anchor::Start } else { Anchor::End };
        let beside = [(tip, 8.0), (axis, -8.0)];
        for (from, away) in beside {
            for step in [3.0, 7.0, 12.0, 18.0, 25.0] {
                let words = if span.is_beam() {
                    Words::new(text.clone(), (from.0 + inwards * step, from.1 + away * down), anchor)
                } else {
                    Words::new(text.clone(), (from.0 + away * right, from.1 - inwards * step), anchor).upright()
                };
                let words = words.halo();
                if self.taken.claim(&words, over_lines) {
                    self.canvas.words(words);
                    return true;
                }
            }
        }
        false
    }
}

/// Whether this end has the larger moment of its member.
fn governs(sizes: [f64; 2], end: usize) -> bool {
    sizes[end] > sizes[1 - end] || (sizes[0] == sizes[1] && end == 0)
}

/// The runs of members that have moments.
fn unbroken(members: &[Option<Span>]) -> Vec<Chain> {
    let fine = |span: &Span| span.moments.iter().all(|moment| moment.is_finite());
    let known: Vec<Option<Span>> = members.iter().map(|span| span.filter(fine)).collect();
    known
        .split(Option::is_none)
        .map(|run| run.iter().flatten().copied().collect())
        .filter(|run: &Chain| !run.is_empty())
        .collect()
}
