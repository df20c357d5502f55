use super::*;
use crate::frame::file::{self, SizeStatement};
use proptest::prelude::*;

fn strings(values: &[&str]) -> Vec<String> {
    values.iter().map(|value| (*value).into()).collect()
}

#[test]
fn the_template_of_each_kind_parses_without_warning() {
    for units in [ReportUnits::Metric, ReportUnits::Us] {
        for sizes_known in [true, false] {
            let text =
                write(&TemplateOptions { sizes_known, schema_line: true, ..TemplateOptions::new(units) }).unwrap();
            assert!(text.starts_with("#:schema ./frame.schema.json\n"));
            let read = file::parse(&text).unwrap();
            assert_eq!(read.warnings, []);
            assert_eq!((read.frame.storeys(), read.frame.bays(), read.frame.report_units()), (8, 3, units));
            assert_eq!(matches!(read.sizes, SizeStatement::Model(_)), !sizes_known);
        }
    }
}

#[test]
fn what_was_typed_is_written_as_typed() {
    let options = TemplateOptions {
        title: "Hall \"B\" \\ wing".into(),
        storeys: 2,
        bays: 2,
        bay_width: strings(&["12'-6\"", "24.0 ft"]),
        storey_height: strings(&["3.60m"]),
        first_storey_height: None,
        load: TemplateLoad::Floors(strings(&["10 kip", "12.50 kip"])),
        ..TemplateOptions::new(ReportUnits::Us)
    };
    let text = write(&options).unwrap();
    for typed in ["\"12'-6\\\"\", \"24.0 ft\"", "\"3.60m\"", "\"10 kip\", \"12.50 kip\""] {
        assert!(text.contains(typed), "{typed} is not in\n{text}");
    }
    let read = file::parse(&text).unwrap();
    assert_eq!(read.frame.title(), "Hall \"B\" \\ wing");
    assert_eq!(read.frame.bay_width(0), 3.81);
}

#[test]
fn the_commented_defaults_are_the_defaults() {
    let text = write(&TemplateOptions { sizes_known: false, ..TemplateOptions::new(ReportUnits::Metric) }).unwrap();
    let mut live = text.clone();
    for key in [
        "beam_to_column",
        "interior_to_end",
        "tier",
        "taper",
        "beam_taper",
        "roof_beam",
        "span_power",
        "scatter",
        "area_per_inertia",
    ] {
        assert!(live.contains(&format!("\n# {key} ")), "{key}");
        live = live.replace(&format!("\n# {key} "), &format!("\n{key} "));
    }
    assert_eq!(file::parse(&live).unwrap().sizes, file::parse(&text).unwrap().sizes);
}

#[test]
fn the_commented_examples_of_the_exact_analyses_are_live() {
    let cases: [(ReportUnits, bool, &[&str]); 6] = [
        (
            ReportUnits::Metric,
            true,
            &["poisson", "shear_area", "end_spring", "[joints]", "rigid", "[gravity]", "floors"],
        ),
        (ReportUnits::Metric, true, &["[joints]", "column", "beam"]),
        (
            ReportUnits::Us,
            true,
            &["poisson", "shear_area", "end_spring", "[joints]", "column", "beam", "[gravity]", "floors"],
        ),
        (ReportUnits::Us, false, &["[joints]", "column", "beam"]),
        (
            ReportUnits::Us,
            false,
            &["end_column_inertia", "[material]", "modulus", "[joints]", "[gravity]", "beam", "floors"],
        ),
        (ReportUnits::Metric, false, &["end_column_inertia", "[material]", "modulus", "[gravity]", "floors"]),
    ];
    for (units, sizes_known, keys) in cases {
        let text = write(&TemplateOptions { sizes_known, ..TemplateOptions::new(units) }).unwrap();
        let live = |line: &str| {
            let bare = line.strip_prefix("# ").filter(|bare| {
                let name = bare.split(['=', ' ']).next().unwrap_or_default();
                keys.contains(&name) && toml::from_str::<toml::Table>(bare).is_ok()
            });
            bare.unwrap_or(line).to_string() + "\n"
        };
        let lines: String = text.lines().map(live).collect();
        let read = file::parse(&lines).unwrap_or_else(|fault| panic!("{fault}; {}\n{lines}", fault.key));
        assert_eq!(read.warnings, [], "{lines}");
        assert!(!read.options.is_plain());
        assert_eq!(read.options.gravity.is_some(), keys.contains(&"floors"));
        assert_eq!(read.options.has_shear(), keys.contains(&"shear_area"));
        assert!(file::parse(&text).unwrap().options.is_plain());
    }
}

#[test]
fn options_that_make_no_frame_are_refused() {
    let base = || TemplateOptions::new(ReportUnits::Metric);
    let cases = [
        (TemplateOptions { storeys: 0, ..base() }, "0 storeys"),
        (TemplateOptions { bays: 101, ..base() }, "1 to 100"),
        (TemplateOptions { bay_width: strings(&["7.2"]), ..base() }, "needs a unit"),
        (TemplateOptions { bay_width: strings(&["-7.2 m"]), ..base() }, "more than 0"),
        (TemplateOptions { bay_width: strings(&["7.2 m", "7.2 m"]), ..base() }, "2 values"),
        (TemplateOptions { bay_width: vec![], ..base() }, "0 values"),
        (TemplateOptions { storeys: 2, storey_height: strings(&["4 m", "4 m"]), ..base() }, "keep one"),
        (TemplateOptions { load: TemplateLoad::Floors(strings(&["40 kN"])), ..base() }, "1 values"),
        (TemplateOptions { storeys: 1, load: TemplateLoad::Floors(strings(&["-40 kN"])), ..base() }, "storey shear"),
        (TemplateOptions { storeys: 1, load: TemplateLoad::Floors(strings(&["40 m"])), ..base() }, "measures a length"),
    ];
    for (options, expected) in cases {
        let message = write(&options).unwrap_err().to_string();
        assert!(message.contains(expected), "{message}");
    }
}

fn lengths(us: bool, count: usize) -> impl Strategy<Value = Vec<String>> {
    let one = (10u32..80).prop_map(move |tenth| match us {
        true => format!("{} ft {} in", tenth, tenth % 12),
        false => format!("{}.{} m", 2 + tenth / 10, tenth % 10),
    });
    prop_oneof![proptest::collection::vec(one.clone(), 1), proptest::collection::vec(one, count)]
}

fn options() -> impl Strategy<Value = TemplateOptions> {
    (any::<bool>(), 1usize..40, 1usize..12).prop_flat_map(|(us, storeys, bays)| {
        let forces = proptest::collection::vec((1u32..500).prop_map(|force| format!("{force} kN")), storeys);
        let shape = prop_oneof![
            Just(TemplateShape::Uniform),
            Just(TemplateShape::Triangular),
            (0.0..=10.0).prop_map(TemplateShape::Power)
        ];
        let shear = shape.prop_map(|shape| TemplateLoad::BaseShear { shear: "1.5MN".into(), shape });
        let load = prop_oneof![forces.prop_map(TemplateLoad::Floors), shear];
        let first = proptest::option::of(Just("4.8 m".to_string()));
        (lengths(us, storeys), lengths(us, bays), first, load, any::<bool>(), any::<bool>(), "\\PC{0,20}").prop_map(
            move |(storey_height, bay_width, first, load, sizes_known, schema_line, title)| TemplateOptions {
                title,
                units: if us { ReportUnits::Us } else { ReportUnits::Metric },
                storeys,
                bays,
                first_storey_height: first.filter(|_| storey_height.len() == 1),
                storey_height,
                bay_width,
                load,
                sizes_known,
                schema_line,
            },
        )
    })
}

proptest! {
    #[test]
    fn any_options_make_a_valid_file(options in options()) {
        let text = write(&options).unwrap();
        let read = file::parse(&text).unwrap();
        prop_assert_eq!((read.frame.storeys(), read.frame.bays()), (options.storeys, options.bays));
    }
}
