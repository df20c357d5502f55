//! A report as large and awkward as real ones get: 40 storeys, 9 lines, long words, signs, every kind of block.

use swaybound::report::{
    Cell, ColumnInfo, Dataset, Document, Figure, Input, Record, Run, State, Table, TableBlock, TableCell, number, say,
};

/// A title that would break out of the page if it were not escaped.
pub const NASTY: &str = r#"Wing <script>alert("1")</script> & 'annex' </title></style>"#;

const COLUMNS: [ColumnInfo; 6] = [
    ColumnInfo { name: "method", description: "Quick method" },
    ColumnInfo { name: "storey", description: "Storey, 1 = lowest" },
    ColumnInfo { name: "at", description: "Column line or bay" },
    ColumnInfo { name: "value", description: "Value in the unit of its row" },
    ColumnInfo { name: "unit", description: "Unit of the value" },
    ColumnInfo { name: "error_percent", description: "100 (|q| - |e|)/|e|; blank near zero" },
];

/// The same "random" number for the same place.
fn noise(seed: usize) -> f64 {
    ((seed * 2_654_435_761 % 4_294_967_296) as f64) / 4_294_967_296.0
}

pub fn dataset() -> Dataset {
    let rows = (0..60).map(|i| {
        let value = match i {
            0 => -0.0,
            1 => f64::NAN,
            2 => 1.0 / 3.0,
            3 => 6.02e23,
            4 => -1.6e-19,
            _ => 400.0 * noise(i) - 150.0,
        };
        let error = if i % 7 == 0 { None } else { Some(60.0 * noise(i + 90) - 30.0) };
        let at = if i == 5 { "A, \"odd\"\nline".to_string() } else { format!("line {i}") };
        [Cell::from("portal"), Cell::from(i / 4 + 1), at.into(), value.into(), "kN m".into(), error.into()]
    });
    let text = "title = \"Wing\"\n\n[grid]\nbays = [\"7.2 m\", \"8.4 m\"]\t# left to right\n".to_string();
    let record = Record::new("compare", "swaybound compare 'my frame.toml'".into())
        .with_input(Input::new("my frame.toml", text))
        .with_draws(7, "Philox4x32-10")
        .with_option("units", "metric")
        .with_option("tolerance", "10 %")
        .with_count("columns", 360);
    let run = Run::new(std::time::UNIX_EPOCH, std::time::Duration::from_millis(1250), 2, "a machine");
    Dataset::new(record, run, vec![Table::new("errors", &COLUMNS, rows), Table::new("none", &COLUMNS, [])]).unwrap()
}

fn drawing(width: usize, height: usize) -> String {
    let lines: String = (0..=8)
        .map(|i| {
            let x = 40 + i * (width - 80) / 8;
            format!("<path d=\"M{x} 20V{}\" stroke=\"url(#shade)\" stroke-width=\"3\"/>", height - 30)
        })
        .collect();
    let floors: String = (0..6)
        .map(|i| format!("<path d=\"M40 {y}H{}\" stroke=\"#0072B2\"/>", width - 40, y = 20 + i * (height - 50) / 6))
        .collect();
    format!(
        "<?xml version=\"1.0\"?><svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}\" height=\"{height}\" \
         role=\"img\" aria-labelledby=\"title desc\"><title id=\"title\">Elevation</title><desc id=\"desc\">Largest \
         errors in the end columns</desc><linearGradient id=\"shade\" gradientUnits=\"userSpaceOnUse\" x1=\"0\" \
         y1=\"0\" x2=\"{width}\" y2=\"0\"><stop offset=\"0\" stop-color=\"#D55E00\"/><stop offset=\"1\" \
         stop-color=\"#0072B2\"/></linearGradient>{lines}{floors}<text x=\"40\" y=\"{}\" font-size=\"13\" \
         font-family=\"sans-serif\">A to J, error of the portal method, %</text></svg>",
        height - 8
    )
}

fn state(error: f64) -> Option<State> {
    match error {
        e if e < -10.0 => Some(State::FallsShort),
        e if e > 10.0 => Some(State::SafeSide),
        e if e.abs() < 1.0 => Some(State::NearZero),
        _ => None,
    }
}

/// Errors by storey for 9 lines.
fn by_line() -> TableBlock {
    let lines = ["A", "B", "C", "D", "E", "F", "G", "H", "J"];
    let mut table =
        TableBlock::new("by-line", "Portal method: error of the column moments by storey and line").name("Storey");
    for line in lines {
        table = table.percent(line, 0);
    }
    for storey in (1..=40).rev() {
        if storey % 10 == 0 {
            table.group(format!("Storeys {} to {storey}", storey - 9));
        }
        let errors = (0..9).map(|line| {
            let error = 70.0 * noise(storey * 31 + line) - 35.0;
            TableCell::from(error).marked(state(error))
        });
        table.row([TableCell::from(storey)].into_iter().chain(errors));
    }
    table.meaning(State::FallsShort, "falls short by more than 10 %");
    table.note("Errors are those of the design moment, 100 (|q| − |e|)/|e|.");
    table
}

/// Exact beside quick for several methods, under shared heads.
fn by_method() -> TableBlock {
    let mut table = TableBlock::new("by-method", say("Ground storey, every method beside ").code("slope-deflection"))
        .name("Line")
        .number("Exact", "kN m", 3);
    for method in ["Portal", "Portal, tributary widths", "Cantilever", "Factor", "D-value", "Substitute frame"] {
        table = table.under(method).number("Quick", "kN m", 3).percent("Error", 1);
    }
    for (index, line) in ["A", "B", "C", "D", "E"].into_iter().enumerate() {
        let mut row = vec![TableCell::from(line), TableCell::from(12_345.0 * noise(index))];
        for method in 0..6 {
            let error = 60.0 * noise(index * 7 + method) - 30.0;
            row.push(TableCell::from(900.0 * noise(index + method)));
            row.push(if error.abs() < 3.0 { TableCell::blank() } else { TableCell::from(error).marked(state(error)) });
        }
        table.row(row);
    }
    table
}

/// So many lines that no sheet holds the table.
fn very_wide() -> TableBlock {
    let mut table = TableBlock::new("very-wide", "Column shears of a very long frame").name("Storey").name("Method");
    for line in 0..30 {
        table = table.number(format!("Line {}", line + 1), "kN", 3);
    }
    for storey in 1..=6 {
        if storey == 4 {
            table.rule();
        }
        let values = (0..30).map(|line| TableCell::from(100.0 * noise(storey + 50 * line)));
        table.row([TableCell::from(storey), TableCell::from("portal")].into_iter().chain(values));
    }
    table
}

fn words() -> TableBlock {
    let mut table = TableBlock::new("fit", "Where each method is at home")
        .name("Method")
        .sign("Verdict")
        .text("Why")
        .text("What a checker looks at first")
        .decimals("Factor", "", 2);
    let long = "The points of inflection lie far from mid-height in the ground storey, whose columns are much stiffer \
                than the beams, so the feet take more than half of the storey's moment.";
    table.row(["Portal".into(), TableCell::state(State::FallsShort), long.into(), "Ground storey".into(), 1.42.into()]);
    table.row([
        "Cantilever".into(),
        TableCell::state(State::Suffices),
        say("Fits ").strong("tall narrow").then(" frames").into(),
        "Donaudampfschifffahrtselektrizitätenhauptbetriebswerkbauunterbeamtengesellschaft".into(),
        TableCell::from(1.05).strong(),
    ]);
    table.row([
        "Racking".into(),
        TableCell::state(State::NotJudged),
        "No beams known".into(),
        "-".into(),
        f64::NAN.into(),
    ]);
    table
}

pub fn document() -> Document {
    let data = dataset();
    let mut report = Document::new(NASTY);
    report
        .subtitle("40 storeys, 8 bays, fixed feet; lateral load 900 kN; assumed sizes")
        .verdict(State::FallsShort, say("Portal: short by up to ").strong(number::percent(34.2, 0)).then(" in storey 17, line C, see ").refer("by-line").then("."))
        .verdict(State::Suffices, say("Factor: within 10 % at every column of the ground storey, see ").refer("by-method").then("."))
        .verdict(State::SafeSide, "Cantilever: never short, but up to 80 % too large at the end columns.")
        .verdict_in_words(State::NotJudged, "no answer", "Wilbur: not applicable below three storeys.")
        .caution("Before you use these numbers", [
            "Linear elastic plane-frame lateral analysis for preliminary sizing and checking. It is not a design.",
            "Not for frames with walls, braces, infill, flat slabs, transfer columns or setbacks.",
        ])
        .section("What was compared")
        .paragraph(say("The quick methods are judged by the moments of ").emphasis("slope-deflection").then(", which takes columns as inextensible and floors as rigid in their own plane. The largest storey shear is ").then(number::quantity(12_345.0, "kN")).then("."))
        .list([say("Load acts to the right."), say("Feet are ").code("fixed").then(".")])
        .steps(["Find the storey shears.", "Share them among the columns.", "Place the points of inflection at mid-height."])
        .formula("M = V h / 2 = 84.2 kN × 3.9 m / 2 = 164 kN m")
        .table(words())
        .figures(["one", "two"].map(|key| {
            Figure::new(key, format!("Elevation {key}"), drawing(520, 300), 520.0).caption("Orange columns are short.").file(format!("elevation-{key}.svg"))
        }))
        .section("Errors by storey and line")
        .table(by_line())
        .subsection("Every method")
        .table(by_method())
        .figure(Figure::new("wide", "Moment profiles", drawing(1100, 420), 1100.0).caption(say("Profiles of ").refer("by-method").then(".")))
        .section("A very long frame")
        .table(very_wide())
        .details("Hand calculation, portal method", |inner| {
            inner.subsection("Step 1").paragraph("Interior columns take twice the shear of end columns.").formula("V = 2 × 45 kN");
        })
        .page_break()
        .section("Record")
        .record(data.record())
        .footer(say("Written by ").code("swaybound").then("."));
    report
}
