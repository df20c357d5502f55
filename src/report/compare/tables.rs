//! The tables of a comparison: everything it found, as data.

use crate::compare::Comparison;
use crate::compare::errors::ValueError;
use crate::compare::verdict::{Extreme, Verdict};
use crate::frame::Frame;
use crate::report::{Cell, ColumnInfo, Table};
use crate::response::statics::{Law, StoreySums};
use crate::response::{Fit, Response};
use crate::units::ReportUnits;

const fn info(name: &'static str, description: &'static str) -> ColumnInfo {
    ColumnInfo { name, description }
}

const METHOD: ColumnInfo = info("method", "name of the method");
const MEMBER: ColumnInfo = info("member", "column, beam or storey");
const STOREY: ColumnInfo = info("storey", "storey from the ground; of a beam, its own floor");
const AT: ColumnInfo = info("at", "column line or bay; - for a whole storey");
const QUANTITY: ColumnInfo = info("quantity", "which of the member's quantities");
const UNIT: ColumnInfo = info("unit", "unit of the values in this row");

/// Every table of a comparison, in the order of the files.
pub fn tables(frame: &Frame, comparison: &Comparison) -> Vec<Table> {
    let units = frame.report_units();
    vec![
        values(frame, comparison, units),
        errors(comparison, units),
        verdicts(comparison),
        feet(comparison),
        methods(comparison),
        second_order(comparison, units),
        statics(comparison, units),
        equilibrium(comparison, units),
    ]
}

fn values(frame: &Frame, comparison: &Comparison, units: ReportUnits) -> Table {
    static COLUMNS: [ColumnInfo; 7] =
        [METHOD, MEMBER, STOREY, AT, QUANTITY, info("value", "the number, in the row's unit, with its sign"), UNIT];
    let of_response = |response: &Response| {
        let method = response.method;
        let row = move |value: crate::response::Value| {
            let unit = value.quantity.unit(units);
            [
                Cell::from(method),
                value.member.kind().id().into(),
                (value.member.storey() + 1).into(),
                value.member.at().into(),
                value.quantity.id().into(),
                unit.from_si(value.value).into(),
                unit.symbol.into(),
            ]
        };
        response.values(frame).into_iter().map(row)
    };
    Table::new("values", &COLUMNS, comparison.responses().flat_map(of_response))
}

fn errors(comparison: &Comparison, units: ReportUnits) -> Table {
    static COLUMNS: [ColumnInfo; 13] = [
        METHOD,
        info("reference", "the exact analysis that errors are measured by"),
        MEMBER,
        STOREY,
        AT,
        QUANTITY,
        info("exact", "exact value, in the row's unit"),
        info("quick", "the method's value, in the row's unit"),
        UNIT,
        info("error_percent", "100 (|quick| - |exact|) / |exact|; blank where the exact value is near zero"),
        info("storey_error_percent", "100 (|quick| - |exact|) / the storey's reference; negative is short"),
        info("factor", "|exact| / |quick|: what the method's value must be multiplied by"),
        info("flag", "near-zero, zero, weak, sign: reasons to read the row with care"),
    ];
    let reference = comparison.reference.method;
    let row = |method: &'static str, error: &ValueError| {
        let unit = error.quantity.unit(units);
        let flags: Vec<_> = error.flags.iter().map(|flag| flag.id()).collect();
        [
            Cell::from(method),
            reference.into(),
            error.member.kind().id().into(),
            (error.member.storey() + 1).into(),
            error.member.at().into(),
            error.quantity.id().into(),
            unit.from_si(error.exact).into(),
            unit.from_si(error.quick).into(),
            unit.symbol.into(),
            error.error_percent.into(),
            error.storey_error_percent.into(),
            error.factor.into(),
            flags.join(" ").into(),
        ]
    };
    let rows = comparison.errors.iter().flat_map(|(method, errors)| errors.iter().map(|error| row(method, error)));
    Table::new("errors", &COLUMNS, rows)
}

/// The member that sets the factor, and the members that no factor helps.
type Covered = (Option<Extreme>, Option<(Extreme, usize)>);

fn verdicts(comparison: &Comparison) -> Table {
    static COLUMNS: [ColumnInfo; 16] = [
        METHOD,
        MEMBER,
        QUANTITY,
        info("band", "band up the height; all = the whole frame"),
        info("class", "end or interior; all = the whole frame"),
        info("members", "number of members"),
        info("state", "suffices, generous (over by more than the tolerance) or short (under by more)"),
        info("lowest_percent", "lowest storey error, percent; negative is short"),
        info("lowest_storey", "where it is: storey, of a beam its floor"),
        info("lowest_at", "where it is: column line or bay"),
        info("highest_percent", "highest storey error, percent"),
        info("highest_storey", "where it is: storey, of a beam its floor"),
        info("highest_at", "where it is: column line or bay"),
        info("factor", "largest |exact| / |quick| over the members, zero and weak values aside"),
        info("unloaded", "members whose quick value is zero or weak, so that no factor helps"),
        info("tolerance_percent", "tolerance, percent of the storey's reference"),
    ];
    let tolerance = comparison.options.tolerance;
    let row = |verdict: &Verdict, place: [Cell; 4], [lowest, highest]: [Extreme; 2], covered: Covered| {
        let [band, class, members, state] = place;
        [
            Cell::from(verdict.method),
            verdict.subject.kind().id().into(),
            verdict.subject.quantity().id().into(),
            band,
            class,
            members,
            state,
            lowest.percent.into(),
            (lowest.member.storey() + 1).into(),
            lowest.member.at().into(),
            highest.percent.into(),
            (highest.member.storey() + 1).into(),
            highest.member.at().into(),
            covered.0.and_then(|member| member.factor).into(),
            covered.1.map_or(0, |(_, count)| count).into(),
            tolerance.into(),
        ]
    };
    let of_verdict = |verdict: &Verdict| {
        let members: usize = verdict.places.iter().map(|place| place.members).sum();
        let whole = ["all".into(), "all".into(), members.into(), verdict.state.id().into()];
        let mut rows =
            vec![row(verdict, whole, [verdict.lowest, verdict.highest], (verdict.governing(), verdict.unloaded()))];
        for place in &verdict.places {
            let band = place.place.band.id(place.place.kind);
            let cells = [band.into(), place.place.class.id().into(), place.members.into(), place.state.id().into()];
            rows.push(row(verdict, cells, [place.lowest, place.highest], (place.governing, place.unloaded)));
        }
        rows
    };
    Table::new("verdicts", &COLUMNS, comparison.verdicts.iter().flat_map(of_verdict))
}

fn feet(comparison: &Comparison) -> Table {
    static COLUMNS: [ColumnInfo; 6] = [
        METHOD,
        MEMBER,
        QUANTITY,
        info("fixed_percent", "lowest storey error with fixed feet, percent"),
        info("spring_20_percent", "the same against foot springs of 20 x 4 E I_c / h"),
        info("spring_1_percent", "the same against foot springs of 1 x 4 E I_c / h"),
    ];
    let rows = comparison.feet.iter().map(|line| {
        [
            Cell::from(line.method),
            line.subject.kind().id().into(),
            line.subject.quantity().id().into(),
            line.fixed.into(),
            line.sprung[0].into(),
            line.sprung[1].into(),
        ]
    });
    Table::new("feet", &COLUMNS, rows)
}

fn second_order(comparison: &Comparison, units: ReportUnits) -> Table {
    static COLUMNS: [ColumnInfo; 11] = [
        STOREY,
        info("drift", "second-order storey drift, in the row's unit"),
        UNIT,
        info("drift_amplification", "second-order over first-order drift"),
        info("column_amplification", "largest second-order over first-order design moment of any column not near zero"),
        info("beam_amplification", "the same of the beams on top of the storey"),
        info("plain_amplifier", "1 / (1 - sum P drift / (V h)); blank where its denominator is not positive"),
        info("amplifier_with_1_2", "1 / (1 - 1.2 sum P drift / (V h)); blank likewise"),
        info("critical_load_factor", "what gravity may be multiplied by; blank where gravity is negligible"),
        info("rounds", "rounds of solution"),
        info("stop", "why they stopped: settled, axial forces changed by less than 1e-10 of the largest"),
    ];
    let unit = units.movement();
    let rows = comparison.second_order.iter().flat_map(|(answer, storeys)| {
        storeys.iter().enumerate().map(|(storey, found)| {
            [
                Cell::from(storey + 1),
                answer.response.movement(storey).map(|movement| unit.from_si(movement.drift)).into(),
                unit.symbol.into(),
                found.drift.into(),
                found.columns.into(),
                found.beams.into(),
                found.plain.into(),
                found.safer.into(),
                answer.critical_load_factor.into(),
                answer.rounds.into(),
                answer.stop.id().into(),
            ]
        })
    });
    Table::new("second_order", &COLUMNS, rows)
}

fn methods(comparison: &Comparison) -> Table {
    static COLUMNS: [ColumnInfo; 7] = [
        METHOD,
        info("role", "exact (the measure first; second-order last) or quick"),
        info("needs_sizes", "yes where member sizes must be known"),
        info("fit", "suits, doubtful or refused"),
        info("cautions", "why"),
        info("residual", "relative residual of the solved equations; blank for quick methods"),
        info("source", "where the method was published"),
    ];
    let exact = super::ranking::exact_answers(comparison).into_iter().map(|response| {
        let source = "equations of equilibrium, solved";
        [
            Cell::from(response.method),
            "exact".into(),
            "yes".into(),
            "suits".into(),
            "".into(),
            response.residual().into(),
            source.into(),
        ]
    });
    let quick = comparison.quick.iter().map(|quick| {
        let (fit, cautions) = match &quick.fit {
            Fit::Suits => ("suits", String::new()),
            Fit::Doubtful(cautions) => {
                ("doubtful", cautions.iter().map(|caution| caution.0.as_str()).collect::<Vec<_>>().join("; "))
            }
            Fit::Refused(reason) => ("refused", reason.0.clone()),
        };
        let info = quick.entry.info;
        [
            Cell::from(info.id),
            "quick".into(),
            if info.needs_sizes { "yes" } else { "no" }.into(),
            fit.into(),
            cautions.into(),
            Cell::Blank,
            info.source.into(),
        ]
    });
    Table::new("methods", &COLUMNS, exact.chain(quick))
}

fn statics(comparison: &Comparison, units: ReportUnits) -> Table {
    static COLUMNS: [ColumnInfo; 11] = [
        METHOD,
        STOREY,
        info("shear_applied", "lateral forces above, in force_unit"),
        info("shear_found", "sum of the column shears, in force_unit"),
        info("axial_sum", "sum of the column axial forces, in force_unit"),
        info("force_unit", "unit of forces in this row"),
        info("overturning_applied", "moment of the forces above about the storey's foot, in moment_unit"),
        info("by_moments", "part balanced by column foot moments, in moment_unit"),
        info("by_axial", "part balanced by column axial forces, in moment_unit"),
        info("joint_moment", "largest sum of end moments over the joints of the top floor, in moment_unit"),
        info("moment_unit", "unit of moments in this row"),
    ];
    let (force, moment) = (units.force(), units.moment());
    let row = |method: &'static str, (storey, sums): (usize, &StoreySums)| {
        [
            Cell::from(method),
            (storey + 1).into(),
            force.from_si(sums.shear_applied).into(),
            force.from_si(sums.shear_found).into(),
            force.from_si(sums.axial_sum).into(),
            force.symbol.into(),
            moment.from_si(sums.overturning_applied).into(),
            moment.from_si(sums.by_moments).into(),
            moment.from_si(sums.by_axial).into(),
            moment.from_si(sums.joint_moment).into(),
            moment.symbol.into(),
        ]
    };
    let of_method = |(method, statics): &(&'static str, crate::response::statics::Statics)| {
        let method = *method;
        statics.storeys.iter().enumerate().map(|storey| row(method, storey)).collect::<Vec<_>>()
    };
    Table::new("statics", &COLUMNS, comparison.statics.iter().flat_map(of_method))
}

fn equilibrium(comparison: &Comparison, units: ReportUnits) -> Table {
    static COLUMNS: [ColumnInfo; 8] = [
        METHOD,
        info("law", "which law of equilibrium"),
        MEMBER,
        STOREY,
        AT,
        info("largest_sum", "largest sum that should be zero, in the row's unit"),
        UNIT,
        info("relative", "the same over the frame's largest moment, shear, axial force or overturning moment"),
    ];
    let row = |method: &'static str, statics: &crate::response::statics::Statics, law: Law| {
        let worst = statics.worst(law)?;
        let unit = if law.is_of_moments() { units.moment() } else { units.force() };
        Some([
            Cell::from(method),
            law.name().into(),
            worst.member.kind().id().into(),
            (worst.member.storey() + 1).into(),
            worst.member.at().into(),
            unit.from_si(worst.sum).into(),
            unit.symbol.into(),
            worst.relative.into(),
        ])
    };
    let rows = comparison
        .statics
        .iter()
        .flat_map(|(method, statics)| Law::ALL.into_iter().filter_map(move |law| row(method, statics, law)));
    Table::new("equilibrium", &COLUMNS, rows)
}
