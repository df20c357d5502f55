//! The size model in lanes.

use super::spread::{assert_independent, assert_uniform};
use super::*;

/// Models that reach every branch: the default, everything drawn, ranges of the unusual kind, no scatter.
fn models() -> [SizeModel; 4] {
    let unusual = SizeModel {
        taper: Range::Uniform { low: 0.6, high: 1.0 },
        beam_to_column: Range::Uniform { low: 0.1, high: 2.5 },
        span_power: Range::LogUniform { low: 0.5, high: 1.5 },
        interior_to_end: Range::Fixed(2.0),
        roof_beam: Range::Fixed(0.8),
        tier: 1,
        scatter: 1.0,
        end_column_inertia: Some(Range::Uniform { low: 2e-3, high: 3e-3 }),
        ..SizeModel::default()
    };
    let powers = SizeModel { span_power: Range::Uniform { low: -1.0, high: 1.0 }, tier: 2, ..full_model() };
    [SizeModel::default(), full_model(), unusual, powers]
}

fn both(frame: &Frame, model: &SizeModel) -> (SizeDraws<1>, SizeDraws<4>) {
    let (source, mut model) = (Source::new(SEED), *model);
    if matches!(frame.feet(), Feet::Springs(_)) && model.foot_spring.is_none() {
        // Stated springs stand beside real sizes only.
        model.end_column_inertia.get_or_insert(Range::Fixed(5e-3));
    }
    (SizeDraws::of_model(frame, &model, source).unwrap(), SizeDraws::of_model(frame, &model, source).unwrap())
}

fn frames() -> Vec<Frame> {
    let shapes = [(1, 1), (1, 3), (2, 4), (3, 10), (6, 40)];
    let feet =
        |bays| [Feet::Fixed, Feet::Pinned, Feet::Springs((0..=bays).map(|line| 2e7 + 1e7 * line as f64).collect())];
    shapes.into_iter().flat_map(|(bays, storeys)| feet(bays).map(|feet| frame(bays, storeys, feet))).collect()
}

#[test]
fn lanes_agree_with_the_plain_model() {
    for (frame, model) in frames().iter().flat_map(|frame| models().map(|model| (frame, model))) {
        assert_near_plain(&both(frame, &model).1, 1e-13);
    }
}

#[test]
fn every_form_and_width_gives_the_same_bits() {
    for (frame, model) in frames().iter().flat_map(|frame| models().map(|model| (frame, model))) {
        let (one, four) = both(frame, &model);
        assert_same_in_every_form(&one, &four);
    }
}

#[test]
fn a_draw_does_not_know_its_neighbours() {
    let (_, draws) = both(&frame(3, 5, Feet::Fixed), &full_model());
    let alone = Form::best().four(Fill { draws: &draws, numbers: [77; 4] });
    for lane in 0..4 {
        let mut numbers = [3, 1 << 40, 5, u64::MAX];
        numbers[lane] = 77;
        let found = Form::best().four(Fill { draws: &draws, numbers });
        assert_same_bits((&found, lane), (&alone, 0));
        let other = (lane + 1) % 4;
        assert_ne!(found.column_stiffness[0][other].to_bits(), alone.column_stiffness[0][0].to_bits());
    }
}

#[test]
fn filling_twice_is_filling_once() {
    let (_, draws) = both(&frame(2, 4, Feet::Fixed), &full_model());
    let mut members = draws.members();
    draws.fill::<crate::lane::Plain>([9, 8, 7, 6], &mut members);
    draws.fill::<crate::lane::Plain>(DRAWS, &mut members);
    assert_eq!(members, Form::PORTABLE.four(Fill { draws: &draws, numbers: DRAWS }));
}

#[test]
fn fixed_parameters_give_their_values() {
    let fixed = SizeModel {
        beam_to_column: Range::Fixed(0.6),
        interior_to_end: Range::Fixed(1.7),
        taper: Range::Fixed(0.8),
        beam_taper: Range::Fixed(0.9),
        roof_beam: Range::Fixed(0.7),
        span_power: Range::Fixed(1.0),
        scatter: 1.0,
        tier: 2,
        foot_spring: Some(Range::Fixed(3.0)),
        end_column_inertia: Some(Range::Fixed(4e-3)),
        area_per_inertia: Range::Fixed(3.5),
    };
    let frame = frame(3, 5, Feet::Fixed);
    let found = Form::best().four(Fill { draws: &both(&frame, &fixed).1, numbers: DRAWS });
    // Nine units in the last place: an exponential of a sum of up to four rounded logarithms, and a few products.
    let near = |found: f64, expected: f64| assert!((found / expected - 1.0).abs() < 2e-15, "{found} for {expected}");
    // Bays 6, 7, 8 m; storeys 4.8, 3.4, 3.5, 3.6, 3.7 m, median 3.6 m.
    for lane in 0..4 {
        let column = |index: usize| found.column_stiffness[index][lane];
        near(column(0), 30e9 * 4e-3 / 4.8);
        near(column(1), 30e9 * 4e-3 * 1.7 / 4.8);
        near(column(2 * 4), 30e9 * 4e-3 * 0.8 / 3.5);
        near(column(4 * 4 + 3), 30e9 * 4e-3 * 0.64 / 3.7);
        near(found.area[0][lane], 3.5 * 4e-3f64.sqrt());
        near(found.axial_stiffness[0][lane], 30e9 * 3.5 * 4e-3f64.sqrt());
        // r (L_mean/h_median) I_0 (L/L_mean) / L = r I_0 / h_median for every bay when p = 1.
        for bay in 0..3 {
            near(found.beam_stiffness[bay][lane], 30e9 * 0.6 * 4e-3 / 3.6);
            near(found.beam_stiffness[4 * 3 + bay][lane], 30e9 * 0.6 * 4e-3 / 3.6 * 0.81 * 0.7);
        }
        (0..4).for_each(|line| near(found.foot_rho[line][lane], 3.0 / 4.0));
        near(found.foot_fixity[lane], 12.0 / 13.0);
        assert_eq!(found.ground_hinge[lane], 0.5);
    }
}

#[test]
fn areas_follow_the_drawn_inertias() {
    let frame = frame(3, 7, Feet::Fixed);
    let draws = both(&frame, &SizeModel { area_per_inertia: Range::Fixed(1.3), ..full_model() }).1;
    let found = Form::best().four(Fill { draws: &draws, numbers: DRAWS });
    for (index, area) in found.area.iter().enumerate() {
        for (lane, area) in area.iter().enumerate() {
            let inertia = found.column_stiffness[index][lane] * found.height[index / 4][lane] / 30e9;
            assert!((area / (1.3 * inertia.sqrt()) - 1.0).abs() < 1e-14, "column {index}");
            assert!((found.axial_stiffness[index][lane] / (30e9 * area) - 1.0).abs() < 1e-15, "column {index}");
        }
    }
}

#[test]
fn feet_are_held_as_the_frame_says_unless_the_model_states_springs() {
    let lines = 3;
    let feet = |feet: Feet, model: &SizeModel| {
        let found = Form::best().four(Fill { draws: &both(&frame(2, 3, feet), model).1, numbers: DRAWS });
        (found.foot_rho[0][0], found.foot_fixity[0], found.ground_hinge[0])
    };
    let plain = SizeModel { end_column_inertia: Some(Range::Fixed(4e-3)), scatter: 1.0, ..SizeModel::default() };
    assert_eq!(feet(Feet::Fixed, &plain), (1.0, 1.0, 0.5));
    assert_eq!(feet(Feet::Pinned, &plain), (0.0, 0.0, 0.0));
    let (rho, fixity, hinge) = feet(Feet::Springs(vec![5e7; lines]), &plain);
    let column = 30e9 * 4e-3 / 4.8;
    assert!((rho - 5e7 / (5e7 + 4.0 * column)).abs() < 1e-15, "{rho}");
    assert!(fixity > 0.0 && fixity < 5e7 * 3.0 / (5e7 * 3.0 + 2.0 * column) && hinge == 0.5);
    let sprung = SizeModel { foot_spring: Some(Range::Fixed(2.0)), ..plain };
    for held in [Feet::Fixed, Feet::Pinned, Feet::Springs(vec![5e7; lines])] {
        let (rho, fixity, hinge) = feet(held, &sprung);
        assert!((rho - 2.0 / 3.0).abs() < 1e-15 && (fixity - 8.0 / 9.0).abs() < 1e-15 && hinge == 0.5);
    }
}

#[test]
fn lanes_may_differ_in_geometry() {
    let bays = [[6.0, 8.0], [7.0, 7.0], [9.0, 5.0], [4.0, 12.0]];
    let storeys = [[4.0, 3.0, 3.0], [5.0, 3.5, 3.0], [3.0, 3.0, 6.0], [4.2, 4.1, 4.0]];
    let own = [0, 1, 2, 3].map(|lane| Geometry::of(&bays[lane], &storeys[lane], 1e9 * (lane + 1) as f64));
    let model = ModelDraws::new(&full_model(), &Feet::Fixed, Source::new(SEED)).unwrap();
    let members = Members::of(&frame(2, 3, Feet::Fixed));
    let mut found = members.in_every_lane::<4>();
    model.fill::<crate::lane::Plain, 4>(&Geometry::side_by_side(own.each_ref()), DRAWS, &mut found);
    for lane in 0..4 {
        let mut alone = members.clone();
        model.fill::<f64, 1>(&own[lane], [DRAWS[lane]], &mut alone);
        assert_same_bits((&found, lane), (&alone, 0));
    }
}

/// Parameters read back from the members of many draws without scatter, as shares of their ranges.
fn shares_read_back(model: &SizeModel) -> Vec<[f64; 9]> {
    let frame = Frame::new(FrameParts {
        bays: vec![6.0, 9.0],
        storeys: vec![4.0, 4.0, 4.0, 4.0],
        columns: vec![Section { inertia: 1e-3, area: None }; 12],
        ..frame(2, 4, Feet::Fixed).parts().clone()
    })
    .unwrap();
    let draws = both(&frame, model).1;
    let ranges = model.ranges().map(Option::unwrap);
    let share = |index: usize, value: f64| match ranges[index] {
        Range::LogUniform { low, high } => (value / low).ln() / (high / low).ln(),
        Range::Uniform { low, high } => (value - low) / (high - low),
        Range::Fixed(_) => f64::NAN,
    };
    let read = |members: &Members<4>, lane: usize| {
        let column = |index: usize| members.column_stiffness[index][lane];
        let beam = |index: usize| members.beam_stiffness[index][lane] * [6.0, 9.0][index % 2];
        let inertia = column(0) * 4.0 / 30e9;
        let power = (beam(1) / beam(0)).ln() / 1.5f64.ln();
        let mean_beam = beam(0) / 0.8f64.powf(power);
        let rho = members.foot_rho[0][lane];
        let values = [
            mean_beam / 7.5 / column(0),
            column(1) / column(0),
            column(3) / column(0),
            beam(2) / beam(0),
            beam(6) / beam(4) / (beam(2) / beam(0)),
            power,
            rho / (1.0 - rho),
            inertia,
            members.area[0][lane] / inertia.sqrt(),
        ];
        std::array::from_fn(|index| share(index, values[index]))
    };
    let groups = (0..25_000u64).map(|group| [0, 1, 2, 3].map(|lane| 4 * group + lane));
    let filled = groups.map(|numbers| Form::best().four(Fill { draws: &draws, numbers }));
    filled.flat_map(|members| [0, 1, 2, 3].map(|lane| read(&members, lane))).collect()
}

#[test]
fn every_range_is_filled_evenly_from_end_to_end() {
    let shares = shares_read_back(&SizeModel { scatter: 1.0, tier: 1, ..full_model() });
    let columns: Vec<Vec<f64>> = (0..9).map(|index| shares.iter().map(|draw| draw[index]).collect()).collect();
    columns.iter().zip(crate::frame::sizes::SIZE_NAMES).for_each(|(column, name)| assert_uniform(name, column));
    assert_independent(&columns);
}

/// Stiffness of all columns, then of all beams.
fn stiffness(members: &Members<4>) -> impl Iterator<Item = &[f64; 4]> {
    members.column_stiffness.iter().chain(&members.beam_stiffness)
}

#[test]
fn every_member_scatters_alone() {
    let fixed = |value: f64| Range::Fixed(value);
    let model = SizeModel {
        beam_to_column: fixed(1.0),
        interior_to_end: fixed(1.0),
        taper: fixed(1.0),
        beam_taper: fixed(1.0),
        roof_beam: fixed(1.0),
        span_power: fixed(0.0),
        scatter: 1.3,
        ..SizeModel::default()
    };
    let frame = frame(2, 2, Feet::Fixed);
    let draws = both(&frame, &model).1;
    let none = both(&frame, &SizeModel { scatter: 1.0, ..model }).1;
    let still = Form::best().four(Fill { draws: &none, numbers: DRAWS });
    let mut members: Vec<Vec<f64>> = vec![Vec::new(); 10];
    for group in 0..25_000u64 {
        let numbers = [0, 1, 2, 3].map(|lane| 4 * group + lane);
        let found = Form::best().four(Fill { draws: &draws, numbers });
        for ((member, found), still) in members.iter_mut().zip(stiffness(&found)).zip(stiffness(&still)) {
            member.extend((0..4).map(|lane| 0.5 + 0.5 * (found[lane] / still[lane]).ln() / 1.3f64.ln()));
        }
    }
    members.iter().enumerate().for_each(|(index, shares)| assert_uniform(&format!("member {index}"), shares));
    assert_independent(&members);
}

#[test]
fn ranges_that_make_no_sizes_are_refused() {
    let refused =
        |model: SizeModel| SizeDraws::<4>::of_model(&frame(2, 30, Feet::Fixed), &model, Source::new(1)).unwrap_err();
    let default = SizeModel::default;
    let name = |fault: DrawFault| match fault {
        DrawFault::Range { name, .. } | DrawFault::Factor { name, .. } => name,
        DrawFault::Reach { .. } => "reach",
        DrawFault::SpringsBesideRelativeSizes => "springs",
    };
    let sprung = SizeDraws::<4>::of_model(&frame(1, 2, Feet::Springs(vec![1e7; 2])), &default(), Source::new(1));
    assert_eq!(name(sprung.unwrap_err()), "springs");
    let backwards = Range::LogUniform { low: 2.0, high: 1.0 };
    assert_eq!(name(refused(SizeModel { taper: backwards, ..default() })), "taper");
    assert_eq!(name(refused(SizeModel { roof_beam: Range::Fixed(0.0), ..default() })), "roof_beam");
    assert_eq!(
        name(refused(SizeModel { span_power: Range::LogUniform { low: 0.0, high: 1.0 }, ..default() })),
        "span_power"
    );
    assert_eq!(name(refused(SizeModel { foot_spring: Some(Range::Fixed(f64::NAN)), ..default() })), "foot_spring");
    assert_eq!(name(refused(SizeModel { scatter: 0.9, ..default() })), "scatter");
    assert_eq!(name(refused(SizeModel { tier: 1, taper: Range::Fixed(1e-11), ..default() })), "reach");
    let message = refused(SizeModel { taper: backwards, ..default() }).to_string();
    assert_eq!(message, "taper runs from 2 to 1, but its ends must be positive, finite and in order");
    assert!(
        SizeDraws::<4>::of_model(
            &frame(2, 3, Feet::Fixed),
            &SizeModel { span_power: Range::Fixed(-1.0), ..default() },
            Source::new(1)
        )
        .is_ok()
    );
}
