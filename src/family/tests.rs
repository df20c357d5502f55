//! Draws in lanes against plain arithmetic, and their bits in every form.

use super::{DrawFault, Geometry, ModelDraws, SizeDraws, Source, philox};
use crate::frame::sizes::{Range, SizeModel, Within};
use crate::frame::{Feet, Frame, FrameParts, Section, SizeSource};
use crate::lane::{Form, Lane, Rows, Task, Words};
use crate::response::Members;

mod model;
mod numbers;
mod spread;
mod timing;
mod within;

/// A frame of uneven bays and storeys; sizes of every member differ.
fn frame(bays: usize, storeys: usize, feet: Feet) -> Frame {
    let columns = (0..storeys * (bays + 1)).map(|index| 2e-3 + 1e-4 * index as f64);
    let beams = (0..storeys * bays).map(|index| 3e-3 + 1e-4 * index as f64);
    Frame::new(FrameParts {
        title: "Draws".into(),
        report_units: Default::default(),
        bays: (0..bays).map(|bay| 6.0 + bay as f64).collect(),
        storeys: (0..storeys).map(|storey| if storey == 0 { 4.8 } else { 3.3 + 0.1 * storey as f64 }).collect(),
        feet,
        modulus: 30e9,
        columns: columns.map(|inertia| Section { inertia, area: Some(3.0 * inertia.sqrt()) }).collect(),
        beams: beams.map(|inertia| Section { inertia, area: None }).collect(),
        lateral: vec![10e3; storeys],
        sizes: SizeSource::Stated,
    })
    .unwrap()
}

/// The default model with everything drawn.
fn full_model() -> SizeModel {
    SizeModel {
        foot_spring: Some(Range::LogUniform { low: 0.5, high: 20.0 }),
        end_column_inertia: Some(Range::LogUniform { low: 1e-3, high: 2e-2 }),
        area_per_inertia: Range::Uniform { low: 1.0, high: 4.0 },
        ..SizeModel::default()
    }
}

/// A seed whose halves differ, and a draw number above 32 bits.
const SEED: u64 = 0x0123_4567_89ab_cdef;
const DRAWS: [u64; 4] = [0, 1, 0x5_0000_0003, u64::MAX];

struct Fill<'a, const W: usize> {
    draws: &'a SizeDraws<W>,
    numbers: [u64; W],
}

impl<const W: usize> Task<W> for Fill<'_, W> {
    type Output = Members<W>;
    fn run<L: Lane<W>>(self) -> Members<W> {
        let mut members = self.draws.members();
        self.draws.fill::<L>(self.numbers, &mut members);
        members
    }
}

/// Portable and, where there is one, the form in wide registers.
fn forms() -> impl Iterator<Item = Form> {
    [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten()
}

/// Every row that sizes decide, by name.
fn rows<const W: usize>(members: &Members<W>) -> [(&'static str, Vec<[f64; W]>); 7] {
    let copy = |rows: &Rows<W>| rows.to_vec();
    [
        ("column stiffness", copy(&members.column_stiffness)),
        ("beam stiffness", copy(&members.beam_stiffness)),
        ("area", copy(&members.area)),
        ("axial stiffness", copy(&members.axial_stiffness)),
        ("foot rho", copy(&members.foot_rho)),
        ("foot fixity", vec![members.foot_fixity]),
        ("ground hinge", vec![members.ground_hinge]),
    ]
}

fn assert_same_bits<const V: usize, const W: usize>(found: (&Members<V>, usize), expected: (&Members<W>, usize)) {
    for ((name, found_rows), (_, expected_rows)) in rows(found.0).iter().zip(rows(expected.0)) {
        assert_eq!(found_rows.len(), expected_rows.len(), "{name}");
        for (index, (left, right)) in found_rows.iter().zip(expected_rows).enumerate() {
            assert_eq!(left[found.1].to_bits(), right[expected.1].to_bits(), "{name} {index}");
        }
    }
}

/// Lanes against the plain frame of each draw.
fn assert_near_plain(draws: &SizeDraws<4>, limit: f64) {
    let found = Form::best().four(Fill { draws, numbers: DRAWS });
    for (lane, draw) in DRAWS.iter().enumerate() {
        let plain = Members::of(&draws.frame(*draw).unwrap());
        for ((name, found), (_, expected)) in rows(&found).iter().zip(rows(&plain)) {
            assert_eq!(found.len(), expected.len(), "{name}");
            for (index, (found, [expected])) in found.iter().zip(expected).enumerate() {
                let off = (found[lane] - expected).abs();
                assert!(off <= limit * expected.abs(), "{name} {index} of {draw}: {} for {expected}", found[lane]);
            }
        }
    }
}

/// Four lanes and one lane, in every form, against one lane in portable form.
fn assert_same_in_every_form(one: &SizeDraws<1>, four: &SizeDraws<4>) {
    for form in forms() {
        let found = form.four(Fill { draws: four, numbers: DRAWS });
        for (lane, draw) in DRAWS.iter().enumerate() {
            let alone = Form::PORTABLE.one(Fill { draws: one, numbers: [*draw] });
            assert_same_bits((&found, lane), (&alone, 0));
            assert_same_bits((&form.one(Fill { draws: one, numbers: [*draw] }), 0), (&alone, 0));
        }
    }
}
