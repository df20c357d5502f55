//! Frames in a line or two.

use swaybound::frame::{Feet, Frame, FrameParts, Section, SizeSource};
use swaybound::units::ReportUnits;

/// Parts of a frame with fixed feet, modulus 1 and every inertia 1, no areas: ratios are all that matters to forces.
pub fn parts(bays: &[f64], storeys: &[f64], lateral: &[f64]) -> FrameParts {
    let unit = Section { inertia: 1.0, area: None };
    FrameParts {
        title: "test frame".into(),
        report_units: ReportUnits::Metric,
        bays: bays.into(),
        storeys: storeys.into(),
        feet: Feet::Fixed,
        modulus: 1.0,
        columns: vec![unit; storeys.len() * (bays.len() + 1)],
        beams: vec![unit; storeys.len() * bays.len()],
        lateral: lateral.into(),
        sizes: SizeSource::Stated,
    }
}

/// The frame of `parts`.
#[track_caller]
pub fn build(parts: FrameParts) -> Frame {
    match Frame::new(parts) {
        Ok(frame) => frame,
        Err(fault) => panic!("the test's own frame is at fault: {fault}"),
    }
}

/// Sizes given by a rule over (storey or floor, line or bay).
pub trait Sizes: Sized {
    /// Column inertias.
    fn columns(self, inertia: impl Fn(usize, usize) -> f64) -> Self;
    /// Column areas.
    fn areas(self, area: impl Fn(usize, usize) -> f64) -> Self;
    /// Beam inertias.
    fn beams(self, inertia: impl Fn(usize, usize) -> f64) -> Self;
    /// Feet.
    fn feet(self, feet: Feet) -> Self;
}

impl Sizes for FrameParts {
    fn columns(mut self, inertia: impl Fn(usize, usize) -> f64) -> Self {
        let lines = self.bays.len() + 1;
        for (index, column) in self.columns.iter_mut().enumerate() {
            column.inertia = inertia(index / lines, index % lines);
        }
        self
    }

    fn areas(mut self, area: impl Fn(usize, usize) -> f64) -> Self {
        let lines = self.bays.len() + 1;
        for (index, column) in self.columns.iter_mut().enumerate() {
            column.area = Some(area(index / lines, index % lines));
        }
        self
    }

    fn beams(mut self, inertia: impl Fn(usize, usize) -> f64) -> Self {
        let bays = self.bays.len();
        for (index, beam) in self.beams.iter_mut().enumerate() {
            beam.inertia = inertia(index / bays, index % bays);
        }
        self
    }

    fn feet(mut self, feet: Feet) -> Self {
        self.feet = feet;
        self
    }
}
