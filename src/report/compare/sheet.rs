//! Hand calculations as blocks of the page.

use crate::report::{Align, Column, Document, Form, TableBlock, TableCell};
use crate::response::{Amount, SheetCell, Step, Worksheet};
use crate::units::{METRES_PER_FOOT, METRES_PER_INCH, NEWTONS_PER_POUND, ReportUnits, Unit};

/// A number under this share of the largest of its kind is what rounding leaves of a zero.
const ROUNDING: f64 = 1e-12;

/// Adds the steps of a hand calculation; `key` begins the keys of its tables.
pub(super) fn add(report: &mut Document, key: &str, worksheet: &Worksheet, units: ReportUnits) {
    for (index, step) in worksheet.steps.iter().enumerate() {
        report.subsection(format!("{}. {}", index + 1, step.title));
        report.paragraph(step.rule.as_str());
        report.table(table(&format!("{key}-{}", index + 1), step, units));
    }
}

fn table(key: &str, step: &Step, units: ReportUnits) -> TableBlock {
    let shared = shared_unit(step, units);
    let caption = if shared.is_empty() { step.title.clone() } else { format!("{}, {shared}", step.title) };
    let mut table = TableBlock::new(key, caption.as_str());
    for (index, column) in step.columns.iter().enumerate() {
        let unit = unit(column.amount, units);
        let symbol = if unit.symbol == shared { "" } else { unit.symbol };
        let (align, form) = form(column.amount);
        table = table.column(Column {
            head: column.head.clone(),
            unit: symbol.into(),
            under: String::new(),
            align,
            form,
            key: index == 0,
        });
    }
    let largest: Vec<_> = step.columns.iter().map(|column| largest(step, column.amount)).collect();
    for row in &step.rows {
        let cells = row.iter().zip(step.columns.iter().zip(&largest));
        table.row(cells.map(|(cell, (column, largest))| match cell {
            SheetCell::Name(name) => TableCell::from(name.as_str()),
            SheetCell::Number(value) => unit(column.amount, units).from_si(tidy(*value, *largest)).into(),
            SheetCell::Blank => TableCell::blank(),
        }));
    }
    table
}

/// The largest number of a kind in a step, without sign.
fn largest(step: &Step, amount: Amount) -> f64 {
    let numbers = step.rows.iter().flat_map(|row| row.iter().zip(&step.columns));
    let of_kind = numbers.filter(|(_, column)| column.amount == amount).map(|(cell, _)| match cell {
        SheetCell::Number(value) => value.abs(),
        _ => 0.0,
    });
    of_kind.fold(0.0, f64::max)
}

/// The number, or zero where it is only what rounding leaves.
fn tidy(value: f64, largest: f64) -> f64 {
    if value.abs() < ROUNDING * largest { 0.0 } else { value }
}

/// The unit of all numbers of a step, where they have one in common.
fn shared_unit(step: &Step, units: ReportUnits) -> &'static str {
    let mut symbols =
        step.columns.iter().filter(|column| column.amount != Amount::Name).map(|c| unit(c.amount, units).symbol);
    let first = symbols.next().unwrap_or_default();
    if symbols.all(|symbol| symbol == first) { first } else { "" }
}

fn unit(amount: Amount, units: ReportUnits) -> Unit {
    let length = units.length();
    match (amount, units) {
        (Amount::Name | Amount::Ratio, _) => Unit { symbol: "", si: 1.0 },
        (Amount::Length, _) => length,
        (Amount::Force, _) => units.force(),
        (Amount::Moment, _) => units.moment(),
        (Amount::Area, ReportUnits::Metric) => Unit { symbol: "m²", si: 1.0 },
        (Amount::Area, ReportUnits::Us) => Unit { symbol: "in²", si: METRES_PER_INCH * METRES_PER_INCH },
        (Amount::PerLength, ReportUnits::Metric) => Unit { symbol: "1/m", si: 1.0 },
        (Amount::PerLength, ReportUnits::Us) => Unit { symbol: "1/ft", si: 1.0 / length.si },
        (Amount::Rotation, _) => Unit { symbol: "mrad", si: 1e-3 },
        (Amount::Movement, _) => units.movement(),
        (Amount::Stiffness | Amount::StoreyStiffness | Amount::BendingStiffness, _) => stiffness_unit(amount, units),
    }
}

/// Units in which stiffness times mrad gives a moment in its usual unit, and storey stiffness times
/// movement a force in its usual unit.
fn stiffness_unit(amount: Amount, units: ReportUnits) -> Unit {
    const KIP: f64 = 1e3 * NEWTONS_PER_POUND;
    match (amount, units) {
        (Amount::StoreyStiffness, ReportUnits::Metric) => Unit { symbol: "kN/mm", si: 1e6 },
        (Amount::StoreyStiffness, ReportUnits::Us) => Unit { symbol: "kip/in", si: KIP / METRES_PER_INCH },
        (Amount::BendingStiffness, ReportUnits::Metric) => Unit { symbol: "GN m²", si: 1e9 },
        (Amount::BendingStiffness, ReportUnits::Us) => {
            Unit { symbol: "10⁶ kip ft²", si: 1e6 * KIP * METRES_PER_FOOT * METRES_PER_FOOT }
        }
        (_, ReportUnits::Metric) => Unit { symbol: "MN m", si: 1e6 },
        (_, ReportUnits::Us) => Unit { symbol: "10³ kip ft", si: 1e3 * KIP * METRES_PER_FOOT },
    }
}

/// A hand calculation is followed digit by digit, so it shows one figure more than results do.
fn form(amount: Amount) -> (Align, Form) {
    match amount {
        Amount::Name => (Align::Left, Form::Whole),
        Amount::Ratio | Amount::PerLength | Amount::Area => (Align::Right, Form::Significant(4)),
        Amount::Length => (Align::Right, Form::Decimals(3)),
        Amount::Force | Amount::Moment | Amount::Rotation | Amount::Movement => (Align::Right, Form::Significant(4)),
        Amount::Stiffness | Amount::StoreyStiffness | Amount::BendingStiffness => (Align::Right, Form::Significant(4)),
    }
}
