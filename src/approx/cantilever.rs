//! The cantilever method.

use super::{march, range_fit, sheet, sums};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{Caution, Fit, ForceRows, Gives, Info, MemberRows, Method, Response, WorkRows, Worksheet};

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

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(
        members: &MemberRows<W>,
        _work: &mut WorkRows<W>,
        forces: &mut ForceRows<W>,
    ) {
        axial_by_distance::<L, W>(members, forces);
        beams_from_axial::<L, W>(members, forces);
        columns_from_beams::<L, W>(members, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        sheet::axial_sheet(frame, response)
    }
}

/// N = -M A d / sum(A d^2) for every column, from the roof down.
#[inline(always)]
fn axial_by_distance<L: Lane<W>, const W: usize>(members: &MemberRows<W>, forces: &mut ForceRows<W>) {
    let position = &members.position[..members.lines()];
    let mut above = L::splat(0.0);
    for storey in (0..members.storeys).rev() {
        let whole: L = sums::turning(members, storey);
        let moment = above + whole * (L::splat(1.0) - march::hinge(members, storey));
        above = above + whole;
        let area = members.columns_of(members.area, storey);
        let axial = members.columns_of_mut(forces.column_axial, storey);
        let [centroid, second]: [L; 2] = sums::about_centroid(area, position);
        let stress_per_distance = -moment / second;
        for line in 0..members.lines() {
            let distance = L::load(&position[line]) - centroid;
            (stress_per_distance * distance * L::load(&area[line])).store(&mut axial[line]);
        }
    }
}

/// Beam end moments of every floor from the axial forces below and above it, from the left.
#[inline(always)]
fn beams_from_axial<L: Lane<W>, const W: usize>(members: &MemberRows<W>, forces: &mut ForceRows<W>) {
    let width = &members.width[..members.bays];
    let beams = members.by_floor_mut(forces.beam_left).zip(members.by_floor_mut(forces.beam_right));
    let mut axial = members.by_storey(forces.column_axial);
    let mut below = axial.next();
    for (left, right) in beams {
        let above = axial.next();
        let mut shear = L::splat(0.0);
        for bay in 0..members.bays {
            if let Some(below) = below {
                shear = shear + L::load(&below[bay]);
            }
            if let Some(above) = above {
                shear = shear - L::load(&above[bay]);
            }
            let moment = shear * L::load(&width[bay]) * L::splat(0.5);
            moment.store(&mut left[bay]);
            moment.store(&mut right[bay]);
        }
        below = above;
    }
}

/// Column end moments from the beams at the head and the column above, from the roof down.
#[inline(always)]
fn columns_from_beams<L: Lane<W>, const W: usize>(members: &MemberRows<W>, forces: &mut ForceRows<W>) {
    let beams = members.by_floor(forces.beam_left).zip(members.by_floor(forces.beam_right));
    let columns = members.by_storey_mut(forces.column_foot).zip(members.by_storey_mut(forces.column_head));
    let mut above: Option<&[[f64; W]]> = None;
    for (storey, ((left, right), (foot, head))) in beams.zip(columns).enumerate().rev() {
        let below: L = march::hinge(members, storey);
        let foot_to_head = below / (L::splat(1.0) - below);
        for line in 0..members.lines() {
            let mut joint = L::splat(0.0);
            if line > 0 {
                joint = joint + L::load(&right[line - 1]);
            }
            if line < members.bays {
                joint = joint + L::load(&left[line]);
            }
            if let Some(above) = above {
                joint = joint + L::load(&above[line]);
            }
            (-joint).store(&mut head[line]);
            (-joint * foot_to_head).store(&mut foot[line]);
        }
        above = Some(foot);
    }
}
