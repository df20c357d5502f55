//! Unknown sizes: the table `[sizes]` becomes a size model.

use super::Echo;
use super::fault::{FaultKind, FileFault};
use super::scalar::{Scalar, Spread, Table};
use super::source::{Need, Source, WHOLE};
use super::warning::{FileWarning, WarningKind};
use super::written::{Maybe, SizesWritten, WithinWritten};
use crate::frame::MAX_STOREYS;
use crate::frame::sizes::{Range, SizeModel, Within};
use crate::units::Dimension;
use toml::Spanned;

/// The taper over all tiers must stay within this factor either way, so that inertias stay ordinary numbers.
const LARGEST_CHANGE: f64 = 1e60;

/// Checks `[sizes]` for a frame of so many storeys.
pub(super) fn model(source: Source, written: &SizesWritten, storeys: usize) -> Result<SizeModel, FileFault> {
    let default = SizeModel::default();
    let ratio = |value: &Maybe<Spread>, default| {
        read(source, value, Need::Positive, None).map(|range| range.unwrap_or(default))
    };
    let model = SizeModel {
        beam_to_column: ratio(&written.beam_to_column, default.beam_to_column)?,
        interior_to_end: ratio(&written.interior_to_end, default.interior_to_end)?,
        tier: tier(source, &written.tier)?.unwrap_or(default.tier),
        taper: ratio(&written.taper, default.taper)?,
        beam_taper: ratio(&written.beam_taper, default.beam_taper)?,
        roof_beam: ratio(&written.roof_beam, default.roof_beam)?,
        span_power: read(source, &written.span_power, Need::Power, None)?.unwrap_or(default.span_power),
        scatter: spread_factor(source, &written.scatter)?.unwrap_or(default.scatter),
        foot_spring: read(source, &written.foot_spring, Need::Positive, None)?,
        end_column_inertia: read(source, &written.end_column_inertia, Need::Positive, Some(Dimension::Inertia))?,
        area_per_inertia: ratio(&written.area_per_inertia, default.area_per_inertia)?,
    };
    for (value, range) in [(&written.taper, model.taper), (&written.beam_taper, model.beam_taper)] {
        ordinary(source, value, range, (storeys - 1) / model.tier)?;
    }
    Ok(model)
}

fn read(
    source: Source,
    value: &Maybe<Spread>,
    need: Need,
    unit: Option<Dimension>,
) -> Result<Option<Range>, FileFault> {
    value.as_ref().map(|value| source.spread(value, need, unit)).transpose()
}

fn tier(source: Source, value: &Maybe<Scalar>) -> Result<Option<usize>, FileFault> {
    let Some(value) = value else { return Ok(None) };
    match source.count(value)? {
        0 => Err(source.out_of_range(value.span(), WHOLE, "write tier = 1 for a change of size at every storey")),
        count => Ok(Some(count.min(MAX_STOREYS))),
    }
}

fn ordinary(source: Source, value: &Maybe<Spread>, range: Range, tiers: usize) -> Result<(), FileFault> {
    let (low, high) = range.ends();
    let change = |ratio: f64| libm::pow(ratio, tiers as f64);
    let (Some(value), false) = (value, change(low) > 1.0 / LARGEST_CHANGE && change(high) < LARGEST_CHANGE) else {
        return Ok(());
    };
    let needed = format!("over the {tiers} changes of size of this frame that leaves no ordinary inertia at the roof");
    Err(source.out_of_range(value.span(), &needed, "bring the ratio nearer to 1, or put more storeys into a tier"))
}

fn spread_factor(source: Source, value: &Maybe<Scalar>) -> Result<Option<f64>, FileFault> {
    value.as_ref().map(|value| source.number(value, Need::OneOrMore)).transpose()
}

/// Checks `within`.
pub(super) fn within(source: Source, written: &Maybe<Table<WithinWritten>>) -> Result<Option<Within>, FileFault> {
    let Some(table) = written else { return Ok(None) };
    let factor = |value| spread_factor(source, value).map(|factor| factor.unwrap_or(1.0));
    let table = table.get_ref();
    Ok(Some(Within { member: factor(&table.member)?, beams: factor(&table.beams)?, all: factor(&table.all)? }))
}

/// Refuses `within` beside `[sizes]`: both say how far sizes may vary.
pub(super) fn one_statement(
    within: &Maybe<Table<WithinWritten>>,
    sizes: &Spanned<Table<SizesWritten>>,
) -> Result<(), FileFault> {
    let Some(within) = within else { return Ok(()) };
    let kind = FaultKind::Conflict {
        first: "[sizes]",
        second: "within",
        help: "within is for frames with [[columns]] and [[beams]]; for unknown sizes state ranges in [sizes]",
    };
    Err(FileFault::new(kind, within.span()).beside(sizes.span(), "given here"))
}

/// Warnings about tapers above 1.
pub(super) fn growing(written: &SizesWritten, model: &SizeModel) -> Vec<FileWarning> {
    let tapers = [(&written.taper, model.taper), (&written.beam_taper, model.beam_taper)];
    let grown = tapers.into_iter().filter(|(_, range)| range.ends().1 > 1.0);
    grown
        .filter_map(|(value, _)| value.as_ref())
        .map(|value| FileWarning::new(WarningKind::Growing, value.span()))
        .collect()
}

/// What the user typed in `[sizes]`, the defaults told as such.
pub(super) fn echo(source: Source, written: &SizesWritten, model: &SizeModel) -> Vec<Echo> {
    let spread = |value: &Maybe<Spread>| value.as_ref().map(|value| source.typed_spread(value));
    let scalar = |value: &Maybe<Scalar>| value.as_ref().map(|value| source.typed(value.span()));
    let range = |range: Range| range.to_string();
    let none = || "none".to_string();
    let lines = [
        ("beam to column", spread(&written.beam_to_column), range(model.beam_to_column)),
        ("interior to end", spread(&written.interior_to_end), range(model.interior_to_end)),
        ("tier", scalar(&written.tier), format!("{} storeys", model.tier)),
        ("taper", spread(&written.taper), range(model.taper)),
        ("beam taper", spread(&written.beam_taper), range(model.beam_taper)),
        ("roof beam", spread(&written.roof_beam), range(model.roof_beam)),
        ("span power", spread(&written.span_power), range(model.span_power)),
        ("scatter", scalar(&written.scatter), model.scatter.to_string()),
        ("foot spring", spread(&written.foot_spring), none()),
        ("end column inertia", spread(&written.end_column_inertia), none()),
        ("area per inertia", spread(&written.area_per_inertia), range(model.area_per_inertia)),
    ];
    let line = |(what, typed, default): (&str, Option<String>, String)| Echo {
        what: format!("sizes, {what}"),
        typed: typed.unwrap_or_else(|| format!("{default} (default)")),
    };
    lines.into_iter().map(line).collect()
}

/// What the user typed in `within`.
pub(super) fn echo_within(source: Source, table: &WithinWritten) -> String {
    let named = [("member", &table.member), ("beams", &table.beams), ("all", &table.all)];
    let word = |(name, value): (&str, &Maybe<Scalar>)| {
        value.as_ref().map(|value| format!("{name} {}", source.typed(value.span())))
    };
    named.into_iter().filter_map(word).collect::<Vec<_>>().join(", ")
}
