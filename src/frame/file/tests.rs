use super::*;
use crate::frame::sizes::Range;
use crate::frame::{Feet, SizeSource};

mod mutations;
mod options;

const GRID: &str =
    "[grid]\nbays = [\"6 m\", \"9 m\"]\nstoreys = [\"5 m\", \"4 m\", \"4 m\"]\n[material]\nmodulus = \"30 GPa\"\n";
const MEMBERS: &str = "[[columns]]\ninertia = \"3e-3 m4\"\narea = \"0.2 m2\"\n[[beams]]\ninertia = \"5e-3 m4\"\n";
const LOAD: &str = "[lateral]\nfloors = [\"40 kN\", \"60 kN\", \"80 kN\"]\n";

fn read(text: &str) -> FrameFile {
    parse(text).unwrap_or_else(|fault| panic!("{fault} ({}; {})\n{text}", fault.key, fault.help()))
}

fn near(found: f64, expected: f64) {
    assert!((found - expected).abs() <= 1e-12 * expected.abs(), "{found} is not {expected}");
}

fn echoed(file: &FrameFile, what: &str) -> String {
    file.echo.iter().find(|echo| echo.what == what).map(|echo| echo.typed.clone()).unwrap_or_default()
}

#[test]
fn a_later_table_replaces_the_whole_size_of_its_members() {
    let columns = "[[columns]]\nrectangle = { width = \"400 mm\", depth = \"600 mm\" }\nstiffness_factor = 0.7\n\
                   [[columns]]\nstoreys = \"2-roof\"\nlines = \"B\"\ninertia = \"1e-3 m4\"\n\
                   [[beams]]\ninertia = \"5e-3 m4\"\n[[beams]]\nfloors = \"roof\"\nbays = \"B-C\"\nrectangle = { width = \"300 mm\", depth = \"1 m\" }\nstiffness_factor = 0\n";
    let file = read(&format!("{GRID}{columns}{LOAD}"));
    let frame = &file.frame;
    near(frame.column(0, 1).inertia, 0.7 * 0.4 * 0.6f64.powi(3) / 12.0);
    near(frame.column(0, 1).area.unwrap(), 0.24);
    assert_eq!((frame.column(1, 1).inertia, frame.column(1, 1).area), (1e-3, None));
    assert_eq!((frame.beam(2, 0).inertia, frame.beam(2, 1).inertia, frame.beam(2, 1).area), (5e-3, 0.0, None));
    assert_eq!(echoed(&file, "columns, storeys all, lines all"), "rectangle 400 mm x 600 mm, stiffness factor 0.7");
    assert_eq!(echoed(&file, "beams, floors roof, bays B-C"), "rectangle 300 mm x 1 m, stiffness factor 0");
    let kinds: Vec<_> = file.warnings.iter().map(|warning| warning.kind.clone()).collect();
    let instead = "take the factor 1";
    let dropped = WarningKind::Dropped { key: "stiffness_factor", instead, earlier: "0.7".into() };
    assert!(kinds.contains(&dropped), "{kinds:?}");
    assert!(kinds.iter().any(|kind| matches!(kind, WarningKind::Frame(_))), "{kinds:?}");
    assert_eq!(file.sizes, SizeStatement::Stated { within: None });
}

#[test]
fn tables_without_effect_and_unusual_numbers_are_warned_about() {
    let text = format!(
        "{}{}[[beams]]\ninertia = \"6e-3 m4\"\n[[beams]]\nbays = \"interior\"\ninertia = \"7e-3 m4\"\n{LOAD}",
        GRID.replace("\"5 m\"", "\"50 ft\"").replace("30 GPa", "30 MPa"),
        MEMBERS
    );
    let file = read(&text);
    let messages: Vec<_> = file.warnings.iter().map(|warning| format!("{} [{}]", warning, warning.key)).collect();
    let expected = [
        "the height of storey 1 is `50 ft`; 2 to 15 m (7 to 49 ft) is usual [grid.storeys, entry 1]",
        "the modulus of elasticity is `30 MPa`; 5 to 250 GPa (730 to 36000 ksi) is usual [material.modulus]",
        "this table has no effect: later tables replace the size of all beams it selects [beams, table 1]",
        "this table selects no beams: the frame has none of those it names [beams, table 3]",
    ];
    assert_eq!(messages, expected);
}

#[test]
fn shapes_share_out_the_base_shear() {
    let shaped = |shape: &str| {
        let load = format!("[lateral]\nbase_shear = \"600 kN\"\nshape = {shape}\n");
        read(&format!("{GRID}{MEMBERS}{load}")).frame.parts().lateral.clone()
    };
    shaped("\"uniform\"").iter().for_each(|force| near(*force, 2e5));
    // Floors at 5, 9 and 13 m.
    for (force, height) in shaped("\"triangular\"").iter().zip([5.0, 9.0, 13.0]) {
        near(*force, 6e5 * height / 27.0);
    }
    for (force, height) in shaped("{ power = 2 }").iter().zip([25.0, 81.0, 169.0]) {
        near(*force, 6e5 * height / 275.0);
    }
    assert_eq!(shaped("{ power = 0 }"), shaped("\"uniform\""));
    assert_eq!(shaped("{ power = 1.0 }"), shaped("\"triangular\""));
}

#[test]
fn pressure_goes_half_a_storey_up_and_down() {
    let file = read(&format!("{GRID}{MEMBERS}[lateral]\npressure = \"1.2 kPa\"\ntributary = \"6 m\"\n"));
    for (floor, height) in [4.5, 4.0, 2.0].into_iter().enumerate() {
        near(file.frame.lateral(floor), 7200.0 * height);
    }
    assert_eq!(echoed(&file, "lateral forces"), "pressure 1.2 kPa on 6 m");
}

#[test]
fn counted_grids_equal_listed_ones() {
    let counted =
        "[grid]\nbays = { count = 2, width = \"6 m\" }\nstoreys = { count = 3, height = \"4 m\", first = \"5 m\" }\n";
    let listed = "[grid]\nbays = [\"6 m\", \"6 m\"]\nstoreys = [\"5 m\", \"4 m\", \"4 m\"]\n";
    let rest = format!("[sizes]\n{LOAD}");
    let (counted, listed) = (read(&format!("{counted}{rest}")), read(&format!("{listed}{rest}")));
    assert_eq!(counted.frame, listed.frame);
    assert_eq!(echoed(&counted, "storeys"), "3 of 4 m, the first 5 m");
    assert_eq!(echoed(&listed, "bays"), "6 m, 6 m");
}

#[test]
fn feet_are_fixed_pinned_or_sprung() {
    let feet = |text: &str| read(&format!("{GRID}[feet]\nfixity = {text}\n{MEMBERS}{LOAD}")).frame.feet().clone();
    assert_eq!(feet("\"fixed\""), Feet::Fixed);
    assert_eq!(feet("\"pinned\""), Feet::Pinned);
    assert_eq!(feet("{ spring = \"150 MN m/rad\" }"), Feet::Springs(vec![1.5e8; 3]));
    assert_eq!(echoed(&read(&format!("{GRID}{MEMBERS}{LOAD}")), "feet"), "fixed (default)");
}

#[test]
fn unknown_sizes_alone_are_enough() {
    let grid = GRID.replace("[material]\nmodulus = \"30 GPa\"\n", "");
    let file = read(&format!("{grid}[sizes]\n{LOAD}"));
    assert_eq!(file.sizes, SizeStatement::Model(SizeModel::default()));
    assert_eq!(file.frame.size_source(), SizeSource::AssumedRelative);
    assert!(file.frame.has_areas() && !file.frame.has_real_stiffness());
    assert_eq!((file.frame.modulus(), file.frame.column(0, 0).inertia), (1.0, 1.0));
    near(file.frame.column(2, 1).inertia, 2.45f64.sqrt());
    near(file.frame.column(2, 1).area.unwrap(), 3.5 * 2.45f64.powf(0.25));
    // The roof of three storeys lies in the lowest tier: r (7.5/4) (6/7.5)^0.75 times sqrt(0.5).
    near(file.frame.beam(2, 0).inertia, 0.5 * 1.875 * 0.8f64.powf(0.75) * 0.5f64.sqrt());
    assert_eq!(echoed(&file, "sizes, taper"), "0.6 to 1, log-uniform (default)");
}

#[test]
fn unknown_sizes_take_ranges_values_and_real_inertias() {
    let sizes = "[sizes]\ntaper = 0.8\ntier = 1\nspan_power = [0.5, 1.0]\nfoot_spring = [1.0, 4.0]\nscatter = 1\n\
                 end_column_inertia = [\"1e-3 m4\", \"4e-3 m4\"]\n";
    let file = read(&format!("{GRID}{sizes}{LOAD}"));
    let SizeStatement::Model(model) = &file.sizes else { panic!("no model") };
    assert_eq!((model.taper, model.tier, model.scatter), (Range::Fixed(0.8), 1, 1.0));
    assert_eq!(model.span_power, Range::Uniform { low: 0.5, high: 1.0 });
    assert_eq!(model.end_column_inertia, Some(Range::LogUniform { low: 1e-3, high: 4e-3 }));
    assert_eq!(file.frame.size_source(), SizeSource::Assumed);
    near(file.frame.column(0, 0).inertia, 2e-3);
    near(file.frame.column(2, 0).inertia, 2e-3 * 0.64);
    let Feet::Springs(springs) = file.frame.feet() else { panic!("no springs") };
    near(springs[0], 2.0 * 4.0 * 3e10 * 2e-3 / 5.0);
    near(springs[1], springs[0] * 2.45f64.sqrt());
    assert_eq!(echoed(&file, "sizes, span power"), "0.5 to 1.0");
}

#[test]
fn within_states_how_far_known_sizes_may_be_off() {
    let file = read(&format!("within = {{ member = 1.15, beams = 1.5 }}\n{GRID}{MEMBERS}{LOAD}"));
    let within = Within { member: 1.15, beams: 1.5, all: 1.0 };
    assert_eq!(echoed(&file, "sizes within"), "member 1.15, beams 1.5");
    assert_eq!(file.sizes, SizeStatement::Stated { within: Some(within) });
}

#[test]
fn titles_come_on_one_line_without_control_characters() {
    let file = read(&format!("title = \"Wing\\t4\\n\\u001bB\"\n{GRID}{MEMBERS}{LOAD}"));
    assert_eq!(file.frame.title(), "Wing 4 B");
}

#[test]
fn places_are_named_and_lie_in_the_text() {
    let text = format!("{GRID}{}{LOAD}", MEMBERS.replace("0.2 m2", "0.2 m"));
    let fault = parse(&text).unwrap_err();
    assert_eq!((&text[fault.span.clone()], fault.key.as_str()), ("\"0.2 m\"", "columns, table 1, area"));
    let windows = text.replace('\n', "\r\n");
    let fault = parse(&windows).unwrap_err();
    assert_eq!(&windows[fault.span.clone()], "\"0.2 m\"");
}

#[test]
fn faults_and_warnings_have_a_line_and_a_column() {
    let text = format!("title = \"Wïng\"\n{GRID}{}[[beams]]\ninertia = \"6e-3 m4\"\n{LOAD}", MEMBERS);
    let find = |text: &str, part: &str| 1 + text[..text.find(part).unwrap()].matches('\n').count();
    for text in [text.clone(), text.replace('\n', "\r\n")] {
        let warning = &read(&text).warnings[0];
        assert_eq!((warning.key.as_str(), warning.position(&text)), ("beams, table 1", (find(&text, "[[beams]]"), 1)));
        let broken = text.replace("area = ", "stiffness_factor = 1 # Fläche\narea = ").replace("0.2 m2", "0,2 m2");
        assert_eq!(parse(&broken).unwrap_err().position(&broken), (find(&broken, "0,2 m2"), 8));
        let letters = broken.replace("area = ", "rectangle = { width = \"ä\", depth = ").replace("m2\"", "m2\" }");
        let fault = parse(&letters).unwrap_err();
        assert_eq!((fault.key.as_str(), fault.position(&letters).1), ("columns, table 1, inertia", 11));
    }
    let end = format!("{GRID}{MEMBERS}# Ende ß");
    let line = end.lines().count();
    assert_eq!(parse(&end).unwrap_err().position(&end), (line, 9));
}

#[test]
fn a_negative_inertia_of_a_beam_is_called_negative() {
    let mut parts = read(&format!("{GRID}{MEMBERS}{LOAD}")).frame.parts().clone();
    parts.beams[3].inertia = -1e-3;
    let fault = crate::frame::Frame::new(parts.clone()).unwrap_err();
    assert_eq!(fault.to_string(), "the inertia of the beam of floor 2 in bay B-C is -0.001, but must not be negative");
    assert!(help::help(&fault.into()).contains("stiffness_factor = 0"));
    parts.beams[3].inertia = f64::NAN;
    let fault = crate::frame::Frame::new(parts.clone()).unwrap_err();
    assert_eq!(fault.to_string(), "the inertia of the beam of floor 2 in bay B-C is NaN, but must be a finite number");
    parts.beams[3].inertia = 0.0;
    assert!(crate::frame::Frame::new(parts).is_ok());
}

#[test]
fn the_largest_frame_is_read_and_a_larger_one_is_not() {
    let sized = |bays: usize, storeys: usize| {
        parse(&format!(
            "[grid]\nbays = {{ count = {bays}, width = \"6 m\" }}\nstoreys = {{ count = {storeys}, height = \"4 m\" }}\n[sizes]\n[lateral]\nbase_shear = \"1 MN\"\nshape = \"uniform\"\n"
        ))
    };
    assert_eq!(sized(100, 500).unwrap().frame.storeys(), 500);
    assert!(matches!(sized(101, 500).unwrap_err().kind.as_ref(), FaultKind::TooMany { what: "bays", .. }));
    assert!(matches!(sized(1, 501).unwrap_err().kind.as_ref(), FaultKind::TooMany { what: "storeys", .. }));
}

/// One physical frame: every length, force and modulus first in metric, then in US units.
const PAIRS: &[(&str, &str)] = &[
    ("7.3152 m", "24 ft"),
    ("9.144 m", "30'"),
    ("3810 mm", "12'-6\""),
    ("3.6576 m", "144 in"),
    ("199.9479615018825 GPa", "29000 ksi"),
    ("49947.7710720000000000 cm4", "1200 in4"),
    ("0.02258060 m2", "35 in2"),
    ("44.482216152605 kN", "10 kip"),
    ("135.58179483314004000 MN m/rad", "100000 kip ft/rad"),
];

fn two_units(us: bool) -> FrameFile {
    let unit = |index: usize| if us { PAIRS[index].1.replace('"', "\\\"") } else { PAIRS[index].0.into() };
    let [a, b, c, d, modulus, inertia, area, force, spring] = std::array::from_fn(unit);
    read(&format!(
        "[grid]\nbays = [\"{a}\", \"{b}\"]\nstoreys = [\"{c}\", \"{d}\"]\n[feet]\nfixity = {{ spring = \"{spring}\" }}\n\
         [material]\nmodulus = \"{modulus}\"\n[[columns]]\ninertia = \"{inertia}\"\narea = \"{area}\"\n\
         [[beams]]\nrectangle = {{ width = \"{d}\", depth = \"{d}\" }}\n[lateral]\nfloors = [\"{force}\", \"{force}\"]\n"
    ))
}

#[test]
fn metric_and_us_files_of_one_frame_agree() {
    let (metric, us) = (two_units(false), two_units(true));
    let numbers = |file: &FrameFile| {
        let parts = file.frame.parts().clone();
        let Feet::Springs(springs) = parts.feet else { panic!("no springs") };
        let areas = parts.columns.iter().filter_map(|column| column.area);
        let inertias = parts.columns.iter().chain(&parts.beams).map(|section| section.inertia);
        let members: Vec<_> = areas.chain(inertias).collect();
        [parts.bays, parts.storeys, springs, vec![parts.modulus], members, parts.lateral].concat()
    };
    let (metric, us) = (numbers(&metric), numbers(&us));
    assert_eq!(metric.len(), us.len());
    metric.iter().zip(&us).for_each(|(metric, us)| near(*us, *metric));
}

proptest::proptest! {
    #[test]
    fn lengths_agree_in_any_unit(feet in 5u32..60, eighths in 0u32..96) {
        let metres = 0.3048 * (f64::from(feet) + f64::from(eighths) / 96.0);
        let typed = [
            format!("{metres} m"), format!("{}mm", metres * 1e3), format!("{} ft", metres / 0.3048), format!("{} in", metres / 0.0254),
            format!("{feet}'-{} {}/8\"", eighths / 8, eighths % 8).replace(" 0/8", ""),
        ];
        for text in typed {
            let found = crate::units::parse(&text, crate::units::Dimension::Length).unwrap();
            proptest::prop_assert!((found / metres - 1.0).abs() < 1e-12, "{text}");
        }
    }

    #[test]
    fn no_text_makes_the_reader_panic(at in 0usize..600, cut in 0usize..40, put in "[\\[\\]{}\"'=,.#a-z0-9 \n-]{0,6}") {
        let text = format!("title = \"x\"\nwithin = {{ all = 1.3 }}\n{GRID}{MEMBERS}{LOAD}");
        let at = at.min(text.len());
        let end = (at + cut).min(text.len());
        let broken = format!("{}{put}{}", &text[..at], &text[end..]);
        if let Err(fault) = parse(&broken) {
            proptest::prop_assert!(broken.get(fault.span.clone()).is_some());
            proptest::prop_assert!(!fault.help().is_empty() && !fault.to_string().contains("$__"));
        }
    }

    #[test]
    fn arbitrary_text_is_no_panic(text in "\\PC{0,60}") {
        if let Err(fault) = parse(&text) {
            proptest::prop_assert!(text.get(fault.span.clone()).is_some());
        }
    }
}
