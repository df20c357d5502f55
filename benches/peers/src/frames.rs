//! Random frames, the same on every machine.

use crate::Failed;
use swaybound::frame::{Feet, Frame, FrameParts, Section, SizeSource};
use swaybound::response::Members;

/// Numbers of bays and storeys.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Shape {
    /// Number of bays.
    pub bays: usize,
    /// Number of storeys.
    pub storeys: usize,
}

impl Shape {
    /// For headings: `(bays, storeys)`.
    pub fn name(self) -> String {
        format!("({}, {})", self.bays, self.storeys)
    }
}

/// SplitMix64 (Steele, Lea and Flood, 2014; from memory).
struct Random(u64);

impl Random {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mixed = (self.0 ^ (self.0 >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        let mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        mixed ^ (mixed >> 31)
    }

    fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * (self.next() >> 11) as f64 / (1_u64 << 53) as f64
    }

    fn many(&mut self, count: usize, low: f64, high: f64) -> Vec<f64> {
        (0..count).map(|_| self.between(low, high)).collect()
    }

    fn sections(&mut self, count: usize) -> Vec<Section> {
        let mut each =
            || Section { inertia: 1e-3 * 20_f64.powf(self.between(0.0, 1.0)), area: Some(self.between(0.1, 0.4)) };
        (0..count).map(|_| each()).collect()
    }
}

/// The frame number `seed` of a shape; feet are fixed, pinned and on springs in turn.
///
/// # Errors
/// [`Failed::Frame`] never, for shapes that a frame may have.
pub fn random(shape: Shape, seed: u64) -> Result<Frame, Failed> {
    let Shape { bays, storeys } = shape;
    let mut random = Random(seed ^ (bays as u64) << 48 ^ (storeys as u64) << 32);
    let feet = match seed % 3 {
        0 => Feet::Fixed,
        1 => Feet::Pinned,
        _ => Feet::Springs(random.many(bays + 1, 1e7, 1e9)),
    };
    Ok(Frame::new(FrameParts {
        title: format!("{} number {seed}", shape.name()),
        report_units: Default::default(),
        bays: random.many(bays, 4.0, 9.0),
        storeys: random.many(storeys, 3.0, 5.0),
        feet,
        modulus: 30e9,
        columns: random.sections(storeys * (bays + 1)),
        beams: random.sections(storeys * bays),
        lateral: random.many(storeys, 10e3, 100e3),
        sizes: SizeSource::Stated,
    })?)
}

/// The members of the first `count` frames of a shape.
///
/// # Errors
/// As [`random`].
pub fn members(shape: Shape, count: usize) -> Result<Vec<Members<1>>, Failed> {
    (0..count as u64).map(|seed| Ok(Members::of(&random(shape, seed)?))).collect()
}
