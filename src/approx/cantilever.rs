//! The cantilever method.

use super::{march, range_fit, sheet};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{
    Caution, Fit, Forces, Gives, Info, Members, Method, Response, Work, Worksheet, axial_from_beam_shears,
};

/// The cantilever method: column axial stress grows with the distance from the centroid of the column areas.
///
/// # Formula
/// At the inflection points of a storey N = -M A d / sum(A d^2), with M = moment of the forces above about them, d =
/// distance from the centroid of the areas, to the right positive. Beam shear = the difference of the axial forces
/// below and above the floor, summed from the left; beam end moments = shear x L / 2; column moments joint by joint from
/// the roof down; column shear = M_head / ((1 - y) h), M_foot = shear x y h, inflection point at y h.
///
/// # Assumptions
/// Foot springs are treated as fixed feet and cautioned about. Columns without areas are taken as equal. Where areas
/// change from storey to storey a beam shear can come out against the usual sense; it is kept.
///
/// # References
/// A. C. Wilson, Engineering Record, 1908 (from memory).
#[derive(Debug, Clone, Copy)]
pub struct Cantilever;

impl Method for Cantilever {
    const INFO: Info = Info {
        id: "cantilever",
        name: "cantilever method",
        source: "A. C. Wilson, 1908",
        assumptions: &[
            "At mid-height of a storey the axial stress in a column is proportional to its distance from the centroid of the column areas.",
            "Columns bend to an inflection point at mid-height; in the ground storey on pinned feet, at the foot.",
            "Beams bend to an inflection point at mid-span.",
        ],
        needs_sizes: false,
        gives: Gives::Forces,
    };

    fn fit(frame: &Frame) -> Fit {
        let text = "not every column has an area: all areas are taken as equal";
        range_fit(frame, 35, 5.0, (!frame.has_areas()).then(|| Caution(text.into())))
    }

    fn respond<L: Lane<W>, const W: usize>(members: &Members<W>, _work: &mut Work<W>, forces: &mut Forces<W>) {
        let mut above = L::splat(0.0);
        for storey in (0..members.storeys).rev() {
            let whole = L::load(&members.shear[storey]) * L::load(&members.height[storey]);
            let moment = above + whole * (L::splat(1.0) - march::hinge(members, storey));
            axial_by_distance(members, forces, storey, moment);
            beams_from_axial::<L, W>(members, forces, storey);
            columns_from_beams::<L, W>(members, forces, storey);
            above = above + whole;
        }
        axial_from_beam_shears::<L, W>(members, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        sheet::axial_sheet(frame, response)
    }
}

/// N = -M A d / sum(A d^2) for the columns of a storey.
fn axial_by_distance<L: Lane<W>, const W: usize>(
    members: &Members<W>,
    forces: &mut Forces<W>,
    storey: usize,
    moment: L,
) {
    let area = |line: usize| L::load(&members.area[members.column(storey, line)]);
    let position = |line: usize| L::load(&members.position[line]);
    let mut sums = [L::splat(0.0); 2];
    for line in 0..members.lines() {
        sums = [sums[0] + area(line), sums[1] + area(line) * position(line)];
    }
    let centroid = sums[1] / sums[0];
    let mut second = L::splat(0.0);
    for line in 0..members.lines() {
        let distance = position(line) - centroid;
        second = second + area(line) * distance * distance;
    }
    for line in 0..members.lines() {
        let axial = -(moment * area(line) * (position(line) - centroid) / second);
        axial.store(&mut forces.column_axial[members.column(storey, line)]);
    }
}

/// Beam end moments of a floor from the axial forces below and above it, from the left.
fn beams_from_axial<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &mut Forces<W>, floor: usize) {
    let mut shear = L::splat(0.0);
    for bay in 0..members.bays {
        shear = shear + L::load(&forces.column_axial[members.column(floor, bay)]);
        if floor + 1 < members.storeys {
            shear = shear - L::load(&forces.column_axial[members.column(floor + 1, bay)]);
        }
        let moment = shear * L::load(&members.width[bay]) * L::splat(0.5);
        moment.store(&mut forces.beam_left[members.beam(floor, bay)]);
        moment.store(&mut forces.beam_right[members.beam(floor, bay)]);
    }
}

/// Column end moments of a storey from the beams of its top floor and the column above.
fn columns_from_beams<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &mut Forces<W>, storey: usize) {
    let below: L = march::hinge(members, storey);
    let above = L::splat(1.0) - below;
    for line in 0..members.lines() {
        let mut joint = L::splat(0.0);
        if line > 0 {
            joint = joint + L::load(&forces.beam_right[members.beam(storey, line - 1)]);
        }
        if line < members.bays {
            joint = joint + L::load(&forces.beam_left[members.beam(storey, line)]);
        }
        if storey + 1 < members.storeys {
            joint = joint + L::load(&forces.column_foot[members.column(storey + 1, line)]);
        }
        let column = members.column(storey, line);
        let head = -joint;
        head.store(&mut forces.column_head[column]);
        (head * below / above).store(&mut forces.column_foot[column]);
    }
}
