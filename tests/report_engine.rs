//! The report engine as a whole: files read back equal, pages are safe and repeatable, text keeps its width.

#![allow(clippy::unwrap_used, reason = "helpers of tests too")]

#[path = "report_engine/sample.rs"]
mod sample;

use calamine::{Data, DataType, Reader, Xlsx};
use proptest::prelude::*;
use sample::{NASTY, dataset, document};
use swaybound::report::{
    Cell, ColumnInfo, Dataset, Document, Fault, Record, Run, State, Table, TableBlock, TableCell, csv, html, json, say,
    text, workbook,
};
use unicode_width::UnicodeWidthStr;

fn about() -> workbook::About {
    workbook::About {
        title: "Wing".into(),
        cautions: vec!["It is not a design.".into()],
        notes: vec!["Load acts to the right.".into()],
    }
}

#[test]
fn numbers_that_files_cannot_carry_become_blank_and_minus_zero_goes() {
    let data = dataset();
    let rows = data.table("errors").unwrap().rows();
    assert_eq!(rows[1][3], Cell::Blank);
    assert!(matches!(rows[0][3], Cell::Number(zero) if zero.to_bits() == 0));
}

#[test]
fn csv_reads_back_equal() {
    let data = dataset();
    let table = data.table("errors").unwrap();
    let text = csv::write(table).unwrap();
    assert!(!text.contains('\r') && text.ends_with('\n'));
    let mut reader = ::csv::Reader::from_reader(text.as_bytes());
    let heads: Vec<&str> = table.columns().iter().map(|column| column.name).collect();
    assert_eq!(reader.headers().unwrap(), heads);
    let records: Vec<_> = reader.records().map(Result::unwrap).collect();
    assert_eq!(records.len(), table.rows().len());
    for (record, row) in records.iter().zip(table.rows()) {
        for (field, cell) in record.iter().zip(row) {
            match cell {
                Cell::Text(text) => assert_eq!(field, text),
                Cell::Number(value) => assert_eq!(field.parse::<f64>().unwrap().to_bits(), value.to_bits()),
                Cell::Integer(value) => assert_eq!(field.parse::<i64>().unwrap(), *value),
                Cell::Blank => assert_eq!(field, ""),
            }
        }
    }
}

#[test]
fn json_reads_back_equal_and_holds_one_row_per_line() {
    let data = dataset();
    let text = json::write(&data).unwrap();
    let read: serde_json::Value = serde_json::from_str(&text).unwrap();
    let table = data.table("errors").unwrap();
    for (object, row) in read["errors"].as_array().unwrap().iter().zip(table.rows()) {
        for (column, cell) in table.columns().iter().zip(row) {
            let value = &object[column.name];
            match cell {
                Cell::Text(text) => assert_eq!(value, text.as_ref()),
                Cell::Number(number) => assert_eq!(value.as_f64().unwrap().to_bits(), number.to_bits()),
                Cell::Integer(number) => assert_eq!(value.as_i64(), Some(*number)),
                Cell::Blank => assert!(value.is_null()),
            }
        }
    }
    assert_eq!(read["errors"].as_array().unwrap().len(), table.rows().len());
    assert_eq!(read["none"], serde_json::json!([]));
    assert_eq!(text.lines().filter(|line| line.starts_with("    {\"method\"")).count(), table.rows().len());
    assert_eq!(read["record"]["inputs"][0]["text"], data.record().inputs[0].text);
    assert_eq!(read["record"]["options"]["tolerance"], "10 %");
    assert_eq!(read["record"]["seed"], 7);
    assert_eq!(read["run"]["start"], "1970-01-01T00:00:00Z");
    assert_eq!(read["run"]["seconds"], 1.25);
}

#[test]
fn a_record_file_is_known_as_ours() {
    let text = json::record(&dataset()).unwrap();
    assert!(json::is_ours(&text));
    assert!(!json::is_ours(&text.replace("swaybound", "other")));
    assert!(!json::is_ours("not json") && !json::is_ours("[]"));
    let read: serde_json::Value = serde_json::from_str(&text).unwrap();
    assert_eq!(read.as_object().unwrap().keys().collect::<Vec<_>>(), ["record", "run"]);
}

#[test]
fn names_that_files_cannot_carry_are_refused() {
    const GOOD: [ColumnInfo; 1] = [ColumnInfo { name: "a", description: "" }];
    const TWICE: [ColumnInfo; 2] = [GOOD[0], GOOD[0]];
    let build = |tables| {
        let record = Record::new("compare", String::new());
        Dataset::new(record, Run::new(std::time::UNIX_EPOCH, std::time::Duration::ZERO, 1, ""), tables)
    };
    for name in ["record", "run", "", "Values", "a b", "a_name_of_thirty_two_letters_abc"] {
        assert!(matches!(build(vec![Table::new(name, &GOOD, [])]), Err(Fault::TableName(bad)) if bad == name));
    }
    assert!(matches!(build(vec![Table::new("t", &TWICE, [])]), Err(Fault::ColumnName { column, .. }) if column == "a"));
    assert!(build(vec![Table::new("t", &GOOD, []), Table::new("t", &GOOD, [])]).is_err());
    assert!(build(vec![Table::new("t", &GOOD, [])]).is_ok());
}

#[test]
fn the_workbook_reads_back_equal() {
    let data = dataset();
    let bytes = workbook::write(&data, &about()).unwrap();
    let mut book: Xlsx<_> = calamine::open_workbook_from_rs(std::io::Cursor::new(bytes)).unwrap();
    assert_eq!(book.sheet_names(), ["About", "errors", "none"]);
    let table = data.table("errors").unwrap();
    let sheet = book.worksheet_range("errors").unwrap();
    assert_eq!(sheet.height(), table.rows().len() + 1);
    for (at, column) in table.columns().iter().enumerate() {
        assert_eq!(sheet.get((0, at)), Some(&Data::String(column.name.into())));
    }
    for (index, row) in table.rows().iter().enumerate() {
        for (at, cell) in row.iter().enumerate() {
            match (cell, sheet.get((index + 1, at)).unwrap()) {
                (Cell::Text(text), Data::String(read)) => assert_eq!(read, text),
                (Cell::Number(value), Data::Float(read)) => assert_eq!(read.to_bits(), value.to_bits()),
                (Cell::Integer(value), Data::Float(read)) => assert_eq!(*read, *value as f64),
                (Cell::Blank, Data::Empty) => {}
                (cell, read) => panic!("wrote {cell:?}, read {read:?}"),
            }
        }
    }
    let front = book.worksheet_range("About").unwrap();
    let said = |words: &str| front.used_cells().any(|(_, _, cell)| cell.as_string().is_some_and(|text| text == words));
    for words in ["It is not a design.", "Load acts to the right.", "Column line or bay", "my frame.toml", "[grid]"] {
        assert!(said(words), "{words}");
    }
    assert!(said(&data.record().inputs[0].sha256));
}

#[test]
fn equal_input_gives_equal_bytes() {
    let books = [0, 1].map(|_| workbook::write(&dataset(), &about()).unwrap());
    assert_eq!(books[0], books[1]);
    assert_eq!(json::write(&dataset()).unwrap(), json::write(&dataset()).unwrap());
    assert_eq!(html::write(&document()), html::write(&document()));
}

#[test]
fn the_sample_has_no_faults() {
    assert_eq!(document().faults(), Vec::<String>::new());
}

#[test]
fn faults_of_a_document_are_named() {
    let mut table = TableBlock::new("Bad Key", "").text("a").name("b");
    table.row(["1".into()]);
    let mut report = Document::new("t");
    report.subsection("too deep").paragraph(say("see ").refer("nowhere")).table(table);
    let faults = report.faults().join("\n");
    for part in ["skips a level", "nowhere", "Bad Key", "1 entries for 2 columns", "must come first"] {
        assert!(faults.contains(part), "{part} in {faults}");
    }
}

#[test]
fn the_page_is_well_formed_and_holds_no_foreign_markup() {
    let page = html::write(&document());
    assert!(!page.contains("<script") && !page.contains("alert(\"1\")"));
    assert_eq!(page.matches("</style>").count(), 1);
    assert_eq!(page.matches("</title>").count(), 3 + 1, "the page's title and one in each drawing");
    assert!(page.contains("default-src 'none'") && page.contains("lang=\"en-GB\""));
    assert!(
        !page.contains("http://")
            || page.matches("http://").count() == page.matches("http://www.w3.org/2000/svg").count()
    );
    assert!(!page.contains("https://"));
    let strict = strict_xml(&page);
    let tree = roxmltree::Document::parse(&strict).unwrap();
    let title = tree.descendants().find(|node| node.has_tag_name("title")).unwrap();
    assert_eq!(title.text(), Some(NASTY));
}

#[test]
fn anchors_are_unique_headings_in_order_and_links_lead_somewhere() {
    let page = strict_xml(&html::write(&document()));
    let tree = roxmltree::Document::parse(&page).unwrap();
    let mut ids = std::collections::HashSet::new();
    for node in tree.descendants() {
        if let Some(id) = node.attribute("id") {
            assert!(ids.insert(id.to_string()), "{id} twice");
        }
    }
    let mut level = 0;
    for node in tree.descendants().filter(|node| node.is_element()) {
        for (key, list) in [("href", false), ("aria-labelledby", true)] {
            for name in node.attribute(key).unwrap_or("").split_whitespace() {
                assert!(ids.contains(if list { name } else { &name[1..] }), "{name}");
            }
        }
        if let Some(next) = ["h1", "h2", "h3", "h4"].iter().position(|tag| node.has_tag_name(*tag)) {
            let details = node.ancestors().any(|node| node.has_tag_name("details"));
            assert!(next <= level + 1 || details, "heading {:?}", node.text());
            level = next;
        }
        if node.has_tag_name("table") {
            assert!(node.children().any(|child| child.has_tag_name("caption")));
        }
        if node.has_tag_name("th") {
            assert!(node.attribute("scope").is_some());
        }
    }
}

/// Every row of every part of a table is as wide as its head.
#[test]
fn rows_of_the_page_are_as_wide_as_their_heads() {
    let page = strict_xml(&html::write(&document()));
    let tree = roxmltree::Document::parse(&page).unwrap();
    let span = |cell: roxmltree::Node| cell.attribute("colspan").map_or(1, |span| span.parse::<usize>().unwrap());
    for table in tree.descendants().filter(|node| node.has_tag_name("table")) {
        let rows = table.descendants().filter(|node| node.has_tag_name("tr"));
        let widths: Vec<usize> =
            rows.map(|row| row.children().filter(roxmltree::Node::is_element).map(span).sum()).collect();
        assert!(widths.len() > 1 && widths.iter().all(|width| *width == widths[0]), "{widths:?}");
    }
}

#[test]
fn tables_are_fitted_to_the_sheet() {
    let page = html::write(&document());
    let classes: Vec<&str> =
        page.split("<div class=\"table ").skip(1).map(|rest| rest.split_once('"').unwrap().0.trim()).collect();
    let expected = ["short", "", "tight short", "landscape", "landscape tight short", "landscape tight short"];
    assert_eq!(classes, expected);
}

/// The page as XML: void elements closed, bare attributes given a value, the style's letters kept apart.
fn strict_xml(page: &str) -> String {
    let body = page.strip_prefix("<!DOCTYPE html>").unwrap();
    let (head, rest) = body.split_once("<style>").unwrap();
    let (style, rest) = rest.split_once("</style>").unwrap();
    assert!(!style.contains('<'));
    let mut head = head.replace("content=\"light\">", "content=\"light\"/>");
    for meta in ["charset=\"utf-8\">", "initial-scale=1\">", "form-action 'none'\">"] {
        head = head.replace(meta, &meta.replace('>', "/>"));
    }
    format!("{head}<style></style>{}", rest.replace("<details open>", "<details open=\"\">"))
}

#[test]
fn text_names_figures_tables_and_verdicts() {
    let shown = text::write(&document(), text::Options::default());
    for words in [
        "▼ falls short: Portal: short by",
        "Figure\u{a0}1. Elevation one.",
        "elevation-one.svg",
        "Table\u{a0}5 (part 1 of",
    ] {
        assert!(shown.contains(words), "{words}");
    }
    assert!(!shown.contains("<svg") && !shown.contains('\u{1b}'));
}

#[test]
fn style_adds_nothing_but_escapes() {
    let plain = text::write(&document(), text::Options::default());
    let styled = text::write(&document(), text::Options { colour: true, ..text::Options::default() });
    assert_ne!(plain, styled);
    let mut bare = String::new();
    let mut rest = styled.as_str();
    while let Some((before, after)) = rest.split_once('\u{1b}') {
        bare.push_str(before);
        rest = after.split_once('m').unwrap().1;
    }
    assert_eq!(bare + rest, plain);
}

#[test]
fn user_text_cannot_steer_the_terminal() {
    let mut report = Document::new("a\u{1b}[31mb\u{202e}c\nd");
    report.preformatted("x\u{7}", "one\u{1b}]0;t\u{7}\r\ntwo\tthree").paragraph("p\u{9b}q");
    let shown = text::write(&report, text::Options::default());
    assert!(shown.chars().all(|letter| letter == '\n' || !letter.is_control()), "{shown:?}");
    assert!(!shown.contains('\u{202e}') && shown.contains("two    three"));
}

fn widest(shown: &str) -> usize {
    shown.lines().map(UnicodeWidthStr::width).max().unwrap_or(0)
}

#[test]
fn the_sample_fits_its_width() {
    for width in [40, 60, 80, 100, 160] {
        let shown = text::write(&document(), text::Options { width, colour: false });
        assert!(widest(&shown) <= width, "{} over {width}", widest(&shown));
    }
}

#[test]
fn a_cut_table_loses_no_column() {
    let mut table = TableBlock::new("t", "c").name("Storey");
    for column in 0..40 {
        table = table.number(format!("head{column}"), "kN", 3);
    }
    table.row((0..=40).map(|cell| TableCell::from(cell as f64 + 500.0)));
    let mut report = Document::new("t");
    report.table(table);
    let shown = text::write(&report, text::Options::default());
    for column in 0..40 {
        assert_eq!(
            shown.matches(&format!("head{column} ")).count() + shown.matches(&format!("head{column}\n")).count(),
            1
        );
        assert!(shown.contains(&(column + 501).to_string()));
    }
}

fn any_cell() -> impl Strategy<Value = TableCell> {
    let state =
        proptest::option::of(proptest::sample::select(vec![State::FallsShort, State::Suffices, State::NearZero]));
    let content = prop_oneof![
        any::<f64>().prop_map(TableCell::from),
        (-1e6..1e6).prop_map(TableCell::from),
        "[a-z ]{0,60}".prop_map(TableCell::from),
        "\\PC{0,40}".prop_map(TableCell::from),
        ".{0,12}".prop_map(TableCell::from),
        Just(TableCell::blank()),
    ];
    (content, state).prop_map(|(cell, state)| cell.marked(state))
}

fn any_table() -> impl Strategy<Value = TableBlock> {
    let column = ("\\PC{0,30}", 0..5_usize, "[A-Z]?");
    (0..3_usize, proptest::collection::vec(column, 0..14)).prop_flat_map(|(keys, columns)| {
        let rows = proptest::collection::vec(proptest::collection::vec(any_cell(), 0..16), 0..8);
        rows.prop_map(move |rows| {
            let mut table = TableBlock::new("t", "a caption of some words");
            for key in 0..keys {
                table = table.name(format!("key{key}"));
            }
            for (head, kind, under) in &columns {
                table = table.under(under);
                table = match kind {
                    0 => table.text(head),
                    1 => table.sign(head),
                    2 => table.percent(head, 1),
                    3 => table.number(head, "a long unit of force", 3),
                    _ => table.count(head),
                };
            }
            for row in rows {
                table.row(row).group("a group").rule();
            }
            table
        })
    })
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 300, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn text_is_never_wider_than_asked_for(
        table in any_table(),
        title in "\\PC{0,200}",
        words in proptest::collection::vec("\\PC{0,120}", 5),
        wide in any::<bool>(),
    ) {
        let width = if wide { 100 } else { 40 };
        let mut report = Document::new(title.as_str());
        report
            .section(words[0].as_str())
            .verdict(State::FallsShort, say(words[1].as_str()).strong(words[2].as_str()))
            .steps(words.iter().map(|item| say(item.as_str())))
            .pairs([(words[3].clone(), say(words[4].as_str()))])
            .caution(words[1].as_str(), [say(words[2].as_str())])
            .preformatted(words[0].as_str(), words.join("\n"))
            .table(table);
        let shown = text::write(&report, text::Options { width, colour: false });
        for line in shown.lines() {
            prop_assert!(line.width() <= width, "{} over {}: {:?}", line.width(), width, line);
        }
    }

    #[test]
    fn any_table_makes_a_well_formed_page(table in any_table(), title in "\\PC{0,60}") {
        let mut report = Document::new(title.as_str());
        report.table(table);
        let page = strict_xml(&html::write(&report));
        prop_assert!(roxmltree::Document::parse(&page).is_ok());
    }

    #[test]
    fn any_number_survives_the_files(bits in any::<u64>()) {
        const COLUMNS: [ColumnInfo; 1] = [ColumnInfo { name: "value", description: "" }];
        let value = f64::from_bits(bits);
        let table = Table::new("t", &COLUMNS, [[Cell::Number(value)]]);
        let text = csv::write(&table).unwrap();
        let field = text.lines().nth(1).unwrap();
        match value.is_finite() {
            true => prop_assert_eq!(field.parse::<f64>().unwrap(), value),
            false => prop_assert_eq!(field, "\"\""),
        }
    }
}

/// Writes the sample for looking at: `cargo test --release --test report_engine -- --ignored`.
#[test]
#[ignore = "writes files for looking at"]
fn sample_for_the_eye() {
    let folder = std::path::Path::new(env!("CARGO_TARGET_TMPDIR")).join("report");
    std::fs::create_dir_all(&folder).unwrap();
    std::fs::write(folder.join("report.html"), html::write(&document())).unwrap();
    std::fs::write(folder.join("report.txt"), text::write(&document(), text::Options::default())).unwrap();
    std::fs::write(folder.join("results.xlsx"), workbook::write(&dataset(), &about()).unwrap()).unwrap();
    std::fs::write(folder.join("result.json"), json::write(&dataset()).unwrap()).unwrap();
}
