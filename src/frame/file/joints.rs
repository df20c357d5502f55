//! Rigid joint zones: the table `[joints]`.
//!
//! # Formula
//! - lengths: each end of a column has a zone `column`, each end of a beam a zone `beam`; a foot at the ground none;
//! - a share s: a beam end has s/2 times the column depth at its joint, a column end s/2 times the beam depth. Where two
//!   columns or two beams of different depth meet at the joint, the mean of both counts.

use super::fault::{FaultKind, FileFault};
use super::members::Members;
use super::scalar::Table;
use super::size::conflict;
use super::source::{Need, Source};
use super::written::{JointsWritten, Maybe};
use crate::frame::Member;
use crate::frame::options::OptionsFault;
use crate::units::{Dimension, Unit};
use std::ops::Range;

/// Rigid zones as stated.
#[derive(Debug)]
pub(super) struct Joints {
    rule: Rule,
    /// As the user typed it.
    pub typed: String,
    /// Where the zones of columns and those of beams are stated.
    spans: [Range<usize>; 2],
}

#[derive(Debug, Clone, Copy)]
enum Rule {
    Share(f64),
    /// At the ends of columns and of beams, m.
    Lengths([f64; 2]),
}

/// Zones of columns (foot, head) and of beams (left, right), m, in the order of [`crate::frame::FrameParts`].
pub(super) type Zones = [Vec<[f64; 2]>; 2];

/// Checks `[joints]`.
pub(super) fn joints(source: Source, written: &Maybe<Table<JointsWritten>>) -> Result<Option<Joints>, FileFault> {
    let Some(table) = written else { return Ok(None) };
    let keys = table.get_ref();
    let lengths = [(&keys.column, "joints.column"), (&keys.beam, "joints.beam")];
    let first_length = lengths.iter().find_map(|(value, name)| value.as_ref().map(|value| (value.span(), *name)));
    match (&keys.rigid, first_length) {
        (Some(share), Some((length, name))) => {
            let help =
                "state the rigid zones in one way only: rigid, a share of the joint, or the lengths column and beam";
            Err(conflict("joints.rigid", name, help, share.span(), length))
        }
        (Some(share), None) => Ok(Some(Joints {
            rule: Rule::Share(source.number(share, Need::Share)?),
            typed: format!("rigid over {} of the joint", source.typed(share.span())),
            spans: [share.span(), share.span()],
        })),
        (None, Some(_)) => lengths_of(source, keys, table.span()).map(Some),
        (None, None) => {
            let help = "add rigid = 0.5, a share of the joint, or the lengths column = \"0.3 m\" and beam = \"0.25 m\"";
            Err(FileFault::new(FaultKind::Missing { what: "the size of the rigid zones", help }, table.span()))
        }
    }
}

fn lengths_of(source: Source, keys: &JointsWritten, table: Range<usize>) -> Result<Joints, FileFault> {
    let mut lengths = [0.0; 2];
    let mut spans = [table.clone(), table];
    let mut words = Vec::new();
    for (index, (value, name)) in [(&keys.column, "columns"), (&keys.beam, "beams")].into_iter().enumerate() {
        let Some(value) = value else { continue };
        lengths[index] = source.positive(value, Dimension::Length)?;
        spans[index] = value.span();
        words.push(format!("{} at each end of {name}", source.typed(value.span())));
    }
    Ok(Joints { rule: Rule::Lengths(lengths), typed: words.join(", "), spans })
}

impl Joints {
    /// Refuses a share where the depth of `member`, stated at `stated`, is not known.
    pub fn needs_depth(&self, member: &str, stated: Range<usize>, what: &'static str) -> Result<(), FileFault> {
        let Rule::Share(_) = self.rule else { return Ok(()) };
        let kind = FaultKind::NoDepth { member: member.into() };
        Err(FileFault::new(kind, self.spans[0].clone()).beside(stated, what))
    }

    /// Zones where only lengths may be stated, in a frame of so many storeys and bays.
    pub fn by_length(&self, storeys: usize, bays: usize) -> Zones {
        let [column, beam] = match self.rule {
            Rule::Lengths(lengths) => lengths,
            Rule::Share(_) => [0.0; 2],
        };
        let foot = |index: usize| if index <= bays { 0.0 } else { column };
        let columns = (0..storeys * (bays + 1)).map(|index| [foot(index), column]).collect();
        [columns, vec![[beam; 2]; storeys * bays]]
    }

    /// Zones in a frame of `bays` bays with these members.
    pub fn zones(&self, columns: &Members, beams: &Members, bays: usize) -> Result<Zones, FileFault> {
        let storeys = beams.sections.len() / bays;
        let Rule::Share(share) = self.rule else { return Ok(self.by_length(storeys, bays)) };
        if let Some((member, table)) = columns.without_depth.as_ref().or(beams.without_depth.as_ref()) {
            self.needs_depth(member, table.clone(), "no rectangle here")?;
        }
        let depth = |members: &Members, index: usize| members.depths[index].unwrap_or_default();
        let lines = bays + 1;
        let column_depth = |floor: usize, line: usize| {
            let met = [Some(floor), Some(floor + 1).filter(|above| *above < storeys)];
            mean(met.into_iter().flatten().map(|storey| depth(columns, storey * lines + line)))
        };
        let beam_depth = |floor: usize, line: usize| {
            let met = [line.checked_sub(1), Some(line).filter(|bay| *bay < bays)];
            mean(met.into_iter().flatten().map(|bay| depth(beams, floor * bays + bay)))
        };
        let half = 0.5 * share;
        let foot =
            |storey: usize, line: usize| storey.checked_sub(1).map_or(0.0, |floor| half * beam_depth(floor, line));
        let column_zones = (0..storeys * lines).map(|index| {
            let (storey, line) = (index / lines, index % lines);
            [foot(storey, line), half * beam_depth(storey, line)]
        });
        let beam_zones = (0..storeys * bays).map(|index| {
            let (floor, bay) = (index / bays, index % bays);
            [half * column_depth(floor, bay), half * column_depth(floor, bay + 1)]
        });
        Ok([column_zones.collect(), beam_zones.collect()])
    }

    /// The place in the file of zones that are too long for a member; `unit` is that of lengths in reports.
    pub fn place(&self, fault: OptionsFault, unit: Unit) -> FileFault {
        let OptionsFault::ZonesTooLong { member, zones, length } = fault else {
            return FileFault::new(fault, self.spans[0].clone());
        };
        let span = match member {
            Member::Column { .. } => &self.spans[0],
            Member::Beam { .. } | Member::Storey { .. } => &self.spans[1],
        };
        let [zones, length] = [zones, length].map(|value| unit.from_si(value));
        let member = crate::frame::options::named(member);
        FileFault::new(FaultKind::ZonesTooLong { member, zones, length, unit: unit.symbol }, span.clone())
    }
}

fn mean(values: impl Iterator<Item = f64>) -> f64 {
    let (sum, count) = values.fold((0.0, 0), |(sum, count), value| (sum + value, count + 1));
    if count == 0 { 0.0 } else { sum / f64::from(count) }
}
