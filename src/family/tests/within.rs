//! Known sizes that may be off, in lanes.

use super::spread::{assert_independent, assert_uniform};
use super::*;

const WITHIN: Within = Within { member: 1.15, beams: 1.5, all: 1.3 };

fn both(frame: &Frame, within: Within) -> (SizeDraws<1>, SizeDraws<4>) {
    let source = Source::new(SEED);
    (SizeDraws::within(frame, within, source).unwrap(), SizeDraws::within(frame, within, source).unwrap())
}

fn frames() -> Vec<Frame> {
    let springs = |bays: usize| Feet::Springs((0..=bays).map(|line| 2e7 + 1e7 * line as f64).collect());
    let mut frames: Vec<Frame> =
        [(1, 1), (2, 4), (3, 10)].map(|(bays, storeys)| frame(bays, storeys, springs(bays))).into();
    frames.push(frame(2, 3, Feet::Fixed));
    frames.push(frame(2, 3, Feet::Pinned));
    let mut parts = frame(2, 3, Feet::Fixed).parts().clone();
    parts.columns.iter_mut().for_each(|column| column.area = None);
    frames.push(Frame::new(parts).unwrap());
    frames
}

#[test]
fn lanes_agree_with_plain_arithmetic() {
    frames().iter().for_each(|frame| assert_near_plain(&both(frame, WITHIN).1, 1e-13));
}

#[test]
fn every_form_and_width_gives_the_same_bits() {
    for frame in frames() {
        let (one, four) = both(&frame, WITHIN);
        assert_same_in_every_form(&one, &four);
    }
}

#[test]
fn factors_of_one_leave_the_sizes_as_given() {
    for frame in frames() {
        let still = Within { member: 1.0, beams: 1.0, all: 1.0 };
        let found = Form::best().four(Fill { draws: &both(&frame, still).1, numbers: DRAWS });
        assert_eq!(found, Members::of(&frame).in_every_lane());
    }
}

#[test]
fn a_factor_on_all_moves_drifts_only() {
    for frame in frames() {
        let only = Within { member: 1.0, beams: 1.0, all: 1.3 };
        let found = Form::best().four(Fill { draws: &both(&frame, only).1, numbers: DRAWS });
        let given = Members::of(&frame);
        for lane in 0..4 {
            let all = found.column_stiffness[0][lane] / given.column_stiffness[0][0];
            assert!((1.0 / 1.3..1.3).contains(&all) && all != 1.0, "{all}");
            for ((name, found), (_, given)) in rows(&found).iter().zip(rows(&given)) {
                let expected = if name.ends_with("stiffness") { all } else { 1.0 };
                for (found, [given]) in found.iter().zip(given) {
                    assert!((found[lane] - expected * given).abs() <= 1e-15 * found[lane], "{name}");
                }
            }
        }
    }
}

#[test]
fn factors_are_spread_evenly_and_alone() {
    let frame = frame(1, 1, Feet::Fixed);
    let within = Within { member: 1.15, ..WITHIN };
    let (draws, only) = (both(&frame, within).1, both(&frame, Within { member: 1.0, ..within }).1);
    let given = Members::of(&frame);
    let mut shares: Vec<Vec<f64>> = vec![Vec::new(); 5];
    let share = |factor: f64, reach: f64| 0.5 + 0.5 * factor.ln() / reach.ln();
    for group in 0..25_000u64 {
        let numbers = [0, 1, 2, 3].map(|lane| 4 * group + lane);
        let [all, found] = [&only, &draws].map(|draws| Form::best().four(Fill { draws, numbers }));
        for lane in 0..4 {
            let total = all.column_stiffness[0][lane] / given.column_stiffness[0][0];
            let beams = all.beam_stiffness[0][lane] / given.beam_stiffness[0][0] / total;
            shares[0].push(share(total, 1.3));
            shares[1].push(share(beams, 1.5));
            for column in 0..2 {
                let member = found.column_stiffness[column][lane] / all.column_stiffness[column][lane];
                shares[2 + column].push(share(member, 1.15));
            }
            shares[4].push(share(found.beam_stiffness[0][lane] / all.beam_stiffness[0][lane], 1.15));
        }
    }
    shares.iter().enumerate().for_each(|(index, shares)| assert_uniform(&format!("factor {index}"), shares));
    assert_independent(&shares);
}

#[test]
fn factors_below_one_are_refused() {
    let frame = frame(1, 1, Feet::Fixed);
    for (name, within) in [
        ("member", Within { member: 0.9, ..WITHIN }),
        ("beams", Within { beams: f64::NAN, ..WITHIN }),
        ("all", Within { all: f64::INFINITY, ..WITHIN }),
    ] {
        let fault = SizeDraws::<4>::within(&frame, within, Source::new(1)).unwrap_err();
        assert!(matches!(fault, DrawFault::Factor { name: found, .. } if found == name), "{fault}");
    }
}
