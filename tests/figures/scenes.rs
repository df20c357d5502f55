//! Scenes for the figure tests: frames of many shapes with forces that satisfy statics.

use swaybound::report::figure::{
    Elevation, EndMoments, Figure, FootKind, Grid, MomentDiagram, OutlineMoments, Panel, Profiles, QUICK_METHODS,
    Series, Shade, Spread, SpreadRow, Svg, colour_limit,
};
use swaybound::units::ReportUnits;

pub const QUICK: [(&str, &str); 5] = [
    ("portal", "portal"),
    ("cantilever", "cantilever"),
    ("factor", "factor"),
    ("d-value", "D-value"),
    ("substitute-frame", "substitute frame"),
];

pub fn grid(storeys: usize, bays: usize) -> Grid {
    let widths = [7.2, 8.4, 7.2, 6.0];
    Grid {
        bays: (0..bays).map(|bay| widths[bay % widths.len()]).collect(),
        storeys: (0..storeys).map(|storey| if storey == 0 { 4.8 } else { 3.9 }).collect(),
        feet: [FootKind::Fixed, FootKind::Pinned, FootKind::Sprung][(storeys + bays) % 3],
        lateral: (0..storeys).map(|floor| 12_340.0 * (floor + 1) as f64).collect(),
        length: ReportUnits::Metric.length(),
        force: ReportUnits::Metric.force(),
    }
}

/// Column moments from assumed shares and inflection heights, beam moments from the balance of joints.
pub fn moments(grid: &Grid, interior: f64, inflection: impl Fn(usize) -> f64) -> EndMoments {
    let (storeys, bays) = (grid.storeys.len(), grid.bays.len());
    let lines = bays + 1;
    let weight = |line: usize| if line == 0 || line == bays { 1.0 } else { interior };
    let total: f64 = (0..lines).map(weight).sum();
    let mut columns = Vec::new();
    for storey in 0..storeys {
        let shear: f64 = grid.lateral[storey..].iter().sum();
        for line in 0..lines {
            let moment = -shear * weight(line) / total * grid.storeys[storey];
            let height = if storey == 0 && grid.feet == FootKind::Pinned { 0.0 } else { inflection(storey) };
            columns.push([moment * height, moment * (1.0 - height)]);
        }
    }
    let joint = |floor: usize, line: usize| {
        let above = columns.get((floor + 1) * lines + line).map_or(0.0, |column: &[f64; 2]| column[0]);
        -(columns[floor * lines + line][1] + above)
    };
    let mut beams = Vec::new();
    for floor in 0..storeys {
        let sum: f64 = (0..lines).map(|line| joint(floor, line)).sum();
        beams.extend((0..bays).map(|_| [sum / (2 * bays) as f64; 2]));
    }
    EndMoments { columns, beams }
}

pub fn exact(grid: &Grid) -> EndMoments {
    moments(
        grid,
        1.55,
        |storey| if storey == 0 { 0.63 } else { 0.46 - 0.1 * storey as f64 / grid.storeys.len() as f64 },
    )
}

pub fn portal(grid: &Grid) -> EndMoments {
    moments(grid, 2.0, |_| 0.5)
}

fn design(moments: &[f64; 2]) -> f64 {
    moments[0].abs().max(moments[1].abs())
}

fn cells(exact: &[[f64; 2]], quick: &[[f64; 2]]) -> Vec<Shade> {
    let error = |(exact, quick): (&[f64; 2], &[f64; 2])| 100.0 * (design(quick) - design(exact)) / design(exact);
    let mut cells: Vec<Shade> = exact.iter().zip(quick).map(error).map(Shade::Error).collect();
    let last = cells.len() - 1;
    cells[last] = Shade::NearZero;
    cells
}

pub fn elevation(storeys: usize, bays: usize) -> Elevation {
    let grid = grid(storeys, bays);
    let (exact, quick) = (exact(&grid), portal(&grid));
    let (columns, beams) = (cells(&exact.columns, &quick.columns), cells(&exact.beams, &quick.beams));
    let errors = columns.iter().chain(&beams).filter_map(|cell| match cell {
        Shade::Error(error) => Some(*error),
        _ => None,
    });
    Elevation {
        title: "Portal method: error of design moments".into(),
        description: "The ground storey's end columns come out short, interior columns generous.".into(),
        limit: colour_limit(errors),
        grid,
        columns,
        beams,
        measure: "error of the design moment, % of the largest in its storey".into(),
    }
}

pub fn diagram(storeys: usize, bays: usize) -> MomentDiagram {
    let grid = grid(storeys, bays);
    MomentDiagram {
        title: "Bending moments, exact and portal method".into(),
        description: "The portal method puts the ground storey's inflection points too low.".into(),
        exact_name: "exact (slope-deflection)".into(),
        exact: exact(&grid),
        quick: Some(OutlineMoments { method: "portal".into(), name: "portal".into(), moments: portal(&grid) }),
        grid,
        unit: ReportUnits::Metric.moment(),
    }
}

pub fn profiles(storeys: usize, bays: usize) -> Profiles {
    let grid = grid(storeys, bays);
    let lines = bays + 1;
    let truth = exact(&grid);
    let of = |moments: &EndMoments, line: usize, factor: f64| -> Vec<f64> {
        (0..storeys).map(|storey| factor * design(&moments.columns[storey * lines + line])).collect()
    };
    let panel = |line: usize| {
        let truth = Series {
            method: "slope-deflection".into(),
            name: "exact (slope-deflection)".into(),
            values: of(&truth, line, 1.0),
        };
        let quick = QUICK.iter().enumerate().map(|(index, (method, name))| {
            let values = of(&moments(&grid, 1.4 + 0.2 * index as f64, |_| 0.5), line, 1.0);
            Series { method: (*method).into(), name: (*name).into(), values }
        });
        Panel {
            name: format!("line {}", swaybound::frame::line_name(line)),
            series: std::iter::once(truth).chain(quick).collect(),
        }
    };
    Profiles {
        title: "Column design moments by storey".into(),
        description: "All quick methods fall short at the foot of the ground storey.".into(),
        quantity: "column design moment".into(),
        unit: ReportUnits::Metric.moment(),
        storeys: grid.storeys.clone(),
        panels: (0..lines.min(12)).map(panel).collect(),
    }
}

pub fn spread() -> Spread {
    let row = |(index, (method, name)): (usize, &(&str, &str))| SpreadRow {
        method: (*method).into(),
        name: (*name).into(),
        low: -41.0 + 9.0 * index as f64,
        median: -6.0 + 3.0 * index as f64,
        high: 33.0 - 4.0 * index as f64,
    };
    Spread {
        title: "Column design moments: how far each method goes wrong".into(),
        description: "The portal method is 41 % short at worst.".into(),
        measure: "Storey error of column design moments.".into(),
        rows: QUICK.iter().enumerate().map(row).collect(),
    }
}

/// Uneven bays and storeys, forces of both signs, feet and kip, long names, large and small numbers.
pub fn hard() -> Vec<(&'static str, Svg)> {
    let grid = Grid {
        bays: vec![2.0, 12.3456, 3.048, 9.0],
        storeys: vec![8.0, 2.2, 3.6576, 3.0, 6.0],
        feet: FootKind::Sprung,
        lateral: vec![0.0, -1.0e6, 2.0e9, 3.0, 45.6e3],
        length: ReportUnits::Us.length(),
        force: ReportUnits::Us.force(),
    };
    let title =
        "A frame with a very long title that no engineer would write but somebody surely will, line 14 and line 15";
    let mut bars = elevation(5, 4);
    bars.grid = grid.clone();
    bars.title = title.into();
    bars.limit = 10.0;
    let mut bending = diagram(5, 4);
    bending.title = title.into();
    bending.exact = exact(&grid);
    bending.quick = None;
    bending.grid = grid.clone();
    bending.unit = ReportUnits::Us.moment();
    let mut shares = profiles(5, 4);
    shares.quantity = "share of storey shear, resisted by the columns of this line".into();
    shares.unit = swaybound::units::Unit { symbol: "%", si: 0.01 };
    shares.storeys = grid.storeys;
    for (index, panel) in shares.panels.iter_mut().enumerate() {
        for (series, method) in panel.series.iter_mut().zip(QUICK_METHODS) {
            series.method = method.into();
            series.name = format!("{method}, by a long and winding name");
            series.values = (0..5).map(|storey| 0.31 - 0.1 * index as f64 + 0.01 * storey as f64).collect();
        }
    }
    let mut all_methods = spread();
    all_methods.title = title.into();
    all_methods.rows = QUICK_METHODS
        .iter()
        .map(|method| SpreadRow {
            method: (*method).into(),
            name: format!("{method} method with tributary widths"),
            low: -1234.5,
            median: 0.0,
            high: -1.0,
        })
        .collect();
    vec![
        ("hard elevation", bars.svg()),
        ("hard moments", bending.svg()),
        ("hard profiles", shares.svg()),
        ("hard spread", all_methods.svg()),
    ]
}

/// Every figure for a frame of this shape, by name.
pub fn all(storeys: usize, bays: usize) -> Vec<(&'static str, Svg)> {
    vec![
        ("elevation", elevation(storeys, bays).svg()),
        ("moments", diagram(storeys, bays).svg()),
        ("profiles", profiles(storeys, bays).svg()),
        ("spread", spread().svg()),
    ]
}
