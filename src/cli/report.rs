//! The report folder of a comparison: its files one after the other.

use super::failure::Failure;
use super::{Common, complain, interrupt, output};
use swaybound::report::compare::{Findings, about, charts, page};
use swaybound::report::figure::png;
use swaybound::report::{Dataset, Figure, csv, html, json, workbook};
use swaybound::store::{ReportFolder, ReportPlace};

/// Pixels of a PNG per CSS pixel of the chart.
const PNG_SCALE: f32 = 2.0;

/// Writes the report folder; between two files the run may be interrupted.
pub(super) fn write(
    place: &ReportPlace,
    findings: &Findings,
    dataset: &Dataset,
    common: &Common,
    with_png: bool,
) -> Result<(), Failure> {
    let _held_off = interrupt::HoldOff::begin();
    let folder = place.start()?;
    if let Some(other) = folder.other_input().filter(|_| !common.quiet) {
        let own = dataset.record().inputs.iter().map(|input| input.name.as_str()).collect::<Vec<_>>().join(", ");
        let place = place.path().display();
        let what = format!("{place}: the report there was made from {other}; this one, from {own}, replaces it");
        output::note(&complain::plain_warning(&what));
    }
    write_data(&folder, dataset)?;
    write_page(&folder, findings, dataset, with_png)?;
    interrupt::check()?;
    folder.write("results.xlsx", &workbook::write(dataset, &about(findings))?)?;
    interrupt::check()?;
    folder.finish()?;
    Ok(())
}

fn write_data(folder: &ReportFolder, dataset: &Dataset) -> Result<(), Failure> {
    for table in dataset.tables() {
        interrupt::check()?;
        folder.write_with(&format!("{}.csv", table.name()), |out| csv::write_to(table, out))?;
    }
    interrupt::check()?;
    folder.write_with("result.json", |out| json::write_to(dataset, out))?;
    folder.write("record.json", json::record(dataset)?.as_bytes())?;
    interrupt::check()
}

fn write_page(folder: &ReportFolder, findings: &Findings, dataset: &Dataset, with_png: bool) -> Result<(), Failure> {
    let charts = charts(findings);
    for chart in &charts {
        interrupt::check()?;
        folder.write(&format!("{}.svg", chart.name), chart.svg.as_bytes())?;
        if with_png {
            folder.write(&format!("{}.png", chart.name), &png(&chart.svg, PNG_SCALE)?)?;
        }
    }
    interrupt::check()?;
    let figures: Vec<Figure> = charts.iter().map(|chart| chart.figure()).collect();
    let page = page(findings, dataset.record(), figures);
    Ok(folder.write("report.html", html::write(&page).as_bytes())?)
}
