//! What a run over a family costs beside the bare solution: draw, exact analysis, check, quick methods, factors, reduction.

use super::{Field, SHAPES, Setting};
use crate::Failed;
use crate::frames::Shape;
use crate::table::{Table, ratio};
use crate::timing::Contestant;
use std::hint::black_box;
use swaybound::approx;
use swaybound::compare::factors::{Factors, Measure, factors, measure};
use swaybound::compare::place_map::{PlaceMap, Scope};
use swaybound::exact::plain::{Analysis, Plain};
use swaybound::family::batch::{Batch, Group, Reducer};
use swaybound::family::{SizeDraws, Source};
use swaybound::frame::sizes::SizeModel;
use swaybound::lane::{Form, Lane, Task};
use swaybound::progress::Unwatched;
use swaybound::response::{Entry, Forces, Members, Work, statics};
use swaybound::solve::{Joint, Slots};

/// The quick methods of the chain: all that give member forces.
const METHODS: [&str; 6] = ["portal", "portal-tributary", "cantilever", "factor", "d-value", "substitute-frame"];
/// Frames that every stage goes through in a pass, four at a time.
const FRAMES: u64 = 256;

/// What is timed, each stage on its own, and two runs of all of it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Stage {
    Bare,
    Draw,
    Exact,
    Check,
    Quick,
    Factors,
    Reduce,
    Undrawn,
    Run,
}

const STAGES: [(Stage, &str); 8] = [
    (Stage::Draw, "draw"),
    (Stage::Exact, "exact, axial forces included"),
    (Stage::Check, "equilibrium check"),
    (Stage::Quick, "six quick methods"),
    (Stage::Factors, "factors of design moments"),
    (Stage::Reduce, "reduce"),
    (Stage::Undrawn, "all but draw"),
    (Stage::Run, "whole run"),
];

/// Tables for all shapes, slope-deflection.
pub(super) fn run(setting: &Setting) -> Result<Vec<Table>, Failed> {
    let names: Vec<&str> = STAGES.iter().map(|(_, name)| *name).collect();
    let heads = [&["(bays, storeys)", "bare solution, ns"], names.as_slice()].concat();
    let note = "Slope-deflection, four frames side by side, one thread. The bare solution, end moments from member \
                properties, in nanoseconds a frame; the stages as multiples of it. The whole run is the batch runner with \
                drawing.";
    let mut table = Table::new("A run over a family", note, &heads);
    for shape in SHAPES {
        eprintln!("chain {}", shape.name());
        table.row(row(shape, setting)?);
    }
    Ok(vec![table])
}

fn row(shape: Shape, setting: &Setting) -> Result<Vec<String>, Failed> {
    let frame = crate::frames::random(shape, 0)?;
    let draws = SizeDraws::<4>::of_model(&frame, &SizeModel::default(), Source::new(7))?;
    let methods: Vec<&'static Entry> = METHODS.iter().filter_map(|id| approx::find(id)).collect();
    let mut field = Field::new();
    for stage in [Stage::Bare].into_iter().chain(STAGES.map(|(stage, _)| stage)) {
        field.add(stage, contestant(stage, &draws, &methods, shape));
    }
    let measured = field.measure(setting.effort)?;
    let bare = measured.rate(Stage::Bare).map_or_else(|| "-".into(), |rate| format!("{:.0}", 1e9 / rate.median));
    let cells = STAGES.iter().map(|(stage, _)| ratio(measured.ratio(Stage::Bare, *stage)));
    Ok([shape.name(), bare].into_iter().chain(cells).collect())
}

fn contestant<'a>(
    stage: Stage,
    draws: &'a SizeDraws<4>,
    methods: &'a [&'static Entry],
    shape: Shape,
) -> Contestant<'a> {
    if stage == Stage::Run {
        let batch = Batch::new(draws, Analysis::SlopeDeflection, methods);
        let map = PlaceMap::new(shape.storeys, shape.bays, Scope::DesignMoments);
        return Contestant::new(FRAMES as f64, move || -> Result<(), Failed> {
            let rooms = || Counts::new(map.clone(), methods);
            black_box(batch.run(0..FRAMES, rooms, &Unwatched));
            Ok(())
        });
    }
    let mut chain = Chain::new(draws, methods, shape);
    Contestant::new(FRAMES as f64, move || -> Result<(), Failed> {
        for group in 0..FRAMES / 4 {
            chain.stage(stage, group);
        }
        Ok(())
    })
}

/// One group of four frames at every stage.
struct Chain<'a> {
    form: Form,
    draws: &'a SizeDraws<4>,
    methods: &'a [&'static Entry],
    slots: Slots<4>,
    plain: Plain<4>,
    members: Members<4>,
    work: Work<4>,
    exact: Forces<4>,
    quick: Vec<Forces<4>>,
    counts: Counts,
}

impl<'a> Chain<'a> {
    /// Every stage is done once, so that each finds what it needs.
    fn new(draws: &'a SizeDraws<4>, methods: &'a [&'static Entry], shape: Shape) -> Self {
        let members = draws.members();
        let exact = Forces::for_members(&members);
        let map = PlaceMap::new(shape.storeys, shape.bays, Scope::DesignMoments);
        let mut chain = Self {
            form: Form::best(),
            draws,
            methods,
            slots: Slots::new(Joint::Rotation, shape.storeys, shape.bays),
            plain: Plain::new(Analysis::SlopeDeflection, shape.storeys, shape.bays),
            work: Work::for_members(&members),
            quick: vec![exact.clone(); methods.len()],
            counts: Counts::new(map, methods),
            members,
            exact,
        };
        chain.stage(Stage::Draw, 0);
        chain.stage(Stage::Undrawn, 0);
        chain
    }

    fn stage(&mut self, stage: Stage, group: u64) {
        let Self { form, draws, members, work, exact, quick, counts, .. } = self;
        let form = *form;
        match stage {
            Stage::Bare => _ = black_box(self.slots.solve(form, members, exact)),
            Stage::Draw => {
                let numbers = std::array::from_fn(|lane| 4 * group + lane as u64);
                form.four(Fill { draws, numbers, members });
            }
            Stage::Exact => _ = black_box(self.plain.respond(form, members, work, exact)),
            Stage::Check => _ = black_box(form.four(Check { members, exact })),
            Stage::Quick => {
                for (entry, quick) in self.methods.iter().zip(quick) {
                    (entry.four)(form, members, work, quick);
                }
            }
            Stage::Factors => counts.factors(form, members, exact, &quick.iter().collect::<Vec<_>>()),
            Stage::Reduce => counts.count(4),
            Stage::Undrawn => {
                for stage in [Stage::Exact, Stage::Check, Stage::Quick, Stage::Factors, Stage::Reduce] {
                    self.stage(stage, group);
                }
            }
            Stage::Run => {}
        }
    }
}

/// Factors by method and slot, counted in logarithmic bins.
struct Counts {
    map: PlaceMap,
    methods: Vec<&'static Entry>,
    measure: Measure<4>,
    factors: Vec<Factors<4>>,
    /// By method, slot and bin.
    counts: Vec<u32>,
}

/// Bins: 64 for each doubling, from 1/16 to 16 and all beyond.
const BINS: usize = 64 * 8;
const FIRST_BIN: u64 = (1023 - 4) << 6;

impl Counts {
    fn new(map: PlaceMap, methods: &[&'static Entry]) -> Self {
        let (measure, factors) = (Measure::for_map(&map), vec![Factors::for_map(&map); methods.len()]);
        let counts = vec![0; methods.len() * map.slots().len() * BINS];
        Self { map, methods: methods.into(), measure, factors, counts }
    }

    fn factors(&mut self, form: Form, members: &Members<4>, exact: &Forces<4>, quick: &[&Forces<4>]) {
        form.four(Factor { counts: self, members, exact, quick });
    }

    fn count(&mut self, lanes: usize) {
        let slots = self.map.slots().len();
        for (method, factors) in self.factors.iter().enumerate() {
            for (slot, row) in factors.factor.iter().enumerate() {
                for factor in &row[..lanes] {
                    let bin = (factor.to_bits() >> 46).saturating_sub(FIRST_BIN).min(BINS as u64 - 1) as usize;
                    self.counts[(method * slots + slot) * BINS + bin] += 1;
                }
            }
        }
    }
}

impl Reducer for Counts {
    fn group(&mut self, form: Form, group: Group) {
        let quick: Vec<&Forces<4>> = group.quick.iter().flatten().collect();
        self.factors(form, group.members, group.exact, &quick);
        self.count(group.count);
    }

    fn merge(&mut self, later: Self) {
        self.counts.iter_mut().zip(later.counts).for_each(|(own, later)| *own += later);
    }
}

struct Fill<'a> {
    draws: &'a SizeDraws<4>,
    numbers: [u64; 4],
    members: &'a mut Members<4>,
}

impl Task<4> for Fill<'_> {
    type Output = ();
    #[inline(always)]
    fn run<L: Lane<4>>(self) {
        self.draws.fill::<L>(self.numbers, self.members);
    }
}

struct Check<'a> {
    members: &'a Members<4>,
    exact: &'a Forces<4>,
}

impl Task<4> for Check<'_> {
    type Output = [f64; 4];
    #[inline(always)]
    fn run<L: Lane<4>>(self) -> [f64; 4] {
        let mut worst = [0.0; 4];
        statics::imbalance::<L, 4>(self.members, self.exact).store(&mut worst);
        worst
    }
}

struct Factor<'a> {
    counts: &'a mut Counts,
    members: &'a Members<4>,
    exact: &'a Forces<4>,
    quick: &'a [&'a Forces<4>],
}

impl Task<4> for Factor<'_> {
    type Output = ();
    #[inline(always)]
    fn run<L: Lane<4>>(self) {
        let Counts { map, methods, measure: exact, factors: found, .. } = self.counts;
        measure::<L, 4>(map, self.members, self.exact, exact);
        for ((entry, quick), found) in methods.iter().zip(self.quick).zip(found) {
            factors::<L, 4>(map, exact, entry.info.gives, quick, found);
        }
    }
}
