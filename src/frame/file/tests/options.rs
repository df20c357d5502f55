//! The keys that the exact analyses take beyond plain members.

use super::*;
use crate::frame::options::{AnalysisOptions, EndSpring};

/// Every key of the options in one file: three bays, three storeys, members of different depth.
pub(super) const FULL: &str = "[grid]\nbays = [\"6 m\", \"9 m\", \"6 m\"]\nstoreys = [\"5 m\", \"4 m\", \"4 m\"]\n\
    [material]\nmodulus = \"30 GPa\"\npoisson = 0.2\n\
    [[columns]]\nrectangle = { width = \"400 mm\", depth = \"800 mm\" }\nstiffness_factor = 0.7\nshear_area = \"5/6\"\n\
    [[columns]]\nstoreys = \"2-roof\"\nlines = \"B-C\"\nrectangle = { width = \"400 mm\", depth = \"600 mm\" }\nstiffness_factor = 0.7\nshear_area = \"0.15 m2\"\n\
    [[beams]]\nrectangle = { width = \"300 mm\", depth = \"700 mm\" }\n\
    [[beams]]\nbays = \"interior\"\nrectangle = { width = \"300 mm\", depth = \"500 mm\" }\nshear_area = \" 5 / 6 \"\nend_spring = { left = \"80 MN m/rad\", right = \"hinge\" }\n\
    [joints]\nrigid = 0.5\n\
    [gravity]\nfloors = [\"900 kN\", \"900 kN\", \"0 kN\"]\nlines = [0.1, 0.4, 0.4, 0.1]\n\
    [lateral]\nfloors = [\"40 kN\", \"60 kN\", \"80 kN\"]\n";

fn options(text: &str) -> AnalysisOptions {
    read(text).options
}

fn plain(extra: &str) -> String {
    format!("{GRID}{MEMBERS}{extra}{LOAD}")
}

#[test]
fn a_file_without_these_keys_has_plain_options() {
    let file = read(&plain(""));
    assert_eq!(file.options, AnalysisOptions::plain(&file.frame));
    assert!(file.options.is_plain());
    let file = read(&format!("{GRID}[sizes]\n{LOAD}"));
    assert_eq!(file.options, AnalysisOptions::plain(&file.frame));
}

#[test]
fn shear_areas_and_springs_go_with_the_table_that_owns_the_member() {
    let options = options(FULL);
    near(options.shear_modulus.unwrap(), 30e9 / 2.4);
    // The stiffness factor leaves the shear area alone.
    near(options.column_shear_area[0].unwrap(), 5.0 / 6.0 * 0.32);
    near(options.column_shear_area[5].unwrap(), 0.15);
    near(options.column_shear_area[7].unwrap(), 5.0 / 6.0 * 0.32);
    assert_eq!(options.beam_shear_area[0], None);
    near(options.beam_shear_area[4].unwrap(), 5.0 / 6.0 * 0.15);
    assert_eq!(options.beam_springs[0], [EndSpring::Rigid; 2]);
    assert_eq!(options.beam_springs[7], [EndSpring::Spring(8e7), EndSpring::Hinge]);
}

#[test]
fn a_rigid_share_takes_the_mean_depth_of_what_meets_at_the_joint() {
    let options = options(FULL);
    let zones = |found: [f64; 2], expected: [f64; 2]| {
        near(found[1], expected[1]);
        if expected[0] == 0.0 { assert_eq!(found[0], 0.0) } else { near(found[0], expected[0]) }
    };
    // Half the share is a quarter of the depth. Line A: beams of 700 mm; line B: 700 and 500 mm meet.
    zones(options.column_zones[0], [0.0, 0.175]);
    zones(options.column_zones[1], [0.0, 0.15]);
    zones(options.column_zones[4], [0.175, 0.175]);
    zones(options.column_zones[9], [0.15, 0.15]);
    // Floor 1: columns of 800 mm on A, 800 below and 600 mm above on B; roof: 600 mm on B.
    zones(options.beam_zones[0], [0.2, 0.175]);
    zones(options.beam_zones[4], [0.15, 0.15]);
    zones(options.beam_zones[6], [0.2, 0.15]);
}

#[test]
fn rigid_lengths_stand_at_every_end_but_the_ground() {
    let both = options(&plain("[joints]\ncolumn = \"300 mm\"\nbeam = \"10 in\"\n"));
    assert!(both.column_zones[..3].iter().all(|zones| *zones == [0.0, 0.3]));
    assert!(both.column_zones[3..].iter().all(|zones| *zones == [0.3, 0.3]));
    assert_eq!((both.beam_zones.len(), both.beam_zones[5]), (6, [0.254, 0.254]));
    let beams = options(&plain("[joints]\nbeam = \"0.4 m\"\n"));
    assert!(beams.column_zones.iter().all(|zones| *zones == [0.0; 2]));
    let unknown = options(&format!("{GRID}[sizes]\n[joints]\ncolumn = \"0.3 m\"\n{LOAD}"));
    assert_eq!((&unknown.column_zones[2..4], unknown.beam_zones[0]), (&[[0.0, 0.3], [0.3, 0.3]][..], [0.0; 2]));
}

#[test]
fn vertical_loads_are_shared_by_width_or_as_stated() {
    let loads = |extra: &str| options(&plain(extra)).gravity.unwrap();
    let by_width = loads("[gravity]\nfloors = [\"300 kN\", \"600 kN\", \"0 kN\"]\n");
    let expected = [60e3, 150e3, 90e3, 120e3, 300e3, 180e3];
    expected.iter().zip(&by_width).for_each(|(expected, found)| near(*found, *expected));
    assert_eq!(by_width[6..], [0.0; 3]);
    let thirds =
        loads("[gravity]\nfloors = [\"300 kN\", \"0 kN\", \"0 kN\"]\nlines = [0.333333, 0.333333, 0.333334]\n");
    near(thirds[..3].iter().sum(), 300e3);
    near(thirds[0], 300e3 * 0.333333);
    let sized = format!(
        "{GRID}[sizes]\nend_column_inertia = \"9e-3 m4\"\n[gravity]\nfloors = [\"1 MN\", \"1 MN\", \"1 MN\"]\n{LOAD}"
    );
    assert_eq!(options(&sized).gravity.map(|loads| loads.len()), Some(9));
}

#[test]
fn shares_that_miss_1_by_more_than_a_millionth_are_refused() {
    let text = |last: f64| {
        plain(&format!("[gravity]\nfloors = [\"1 kN\", \"1 kN\", \"1 kN\"]\nlines = [0.5, 0.25, {last}]\n"))
    };
    assert!(parse(&text(0.2500009)).is_ok() && parse(&text(0.2499991)).is_ok());
    let fault = parse(&text(0.250002)).unwrap_err();
    assert_eq!(fault.to_string(), "the shares of the column lines must add up to 1; these add up to 1.000002");
}

#[test]
fn what_is_typed_is_told() {
    let file = read(FULL);
    let cases = [
        ("shear modulus", "by Poisson's ratio 0.2"),
        ("columns, storeys all, lines all", "rectangle 400 mm x 800 mm, stiffness factor 0.7, shear area 5/6"),
        (
            "beams, floors all, bays interior",
            "rectangle 300 mm x 500 mm, shear area 5 / 6, end spring left 80 MN m/rad, right hinge",
        ),
        ("joints", "rigid over 0.5 of the joint"),
        ("vertical loads", "900 kN, 900 kN, 0 kN; shared to the lines by 0.1, 0.4, 0.4, 0.1"),
    ];
    for (what, typed) in cases {
        assert_eq!(echoed(&file, what), typed);
    }
    assert_eq!(file.warnings, []);
    let lengths = read(&plain("[joints]\ncolumn = \"0.3 m\"\nbeam = \"1 ft\"\n"));
    assert_eq!(echoed(&lengths, "joints"), "0.3 m at each end of columns, 1 ft at each end of beams");
    assert_eq!(echoed(&lengths, "vertical loads"), "");
}

#[test]
fn both_ends_may_be_stated_in_one_text() {
    let ends = |text: &str| {
        let beams = format!("inertia = \"5e-3 m4\"\nend_spring = {text}\n[lateral]");
        options(&plain("").replace("inertia = \"5e-3 m4\"\n[lateral]", &beams)).beam_springs[2]
    };
    assert_eq!(ends("\"60000 kip ft/rad\""), [EndSpring::Spring(6e7 * 4.4482216152605 * 0.3048); 2]);
    assert_eq!((ends("\"hinge\""), ends("\"rigid\"")), ([EndSpring::Hinge; 2], [EndSpring::Rigid; 2]));
    assert_eq!(ends("{ right = \"1 MN m/rad\" }"), [EndSpring::Rigid, EndSpring::Spring(1e6)]);
}

#[test]
fn slips_are_warned_about() {
    let material = GRID.replace("\"30 GPa\"\n", "\"30 GPa\"\nshear_modulus = \"12 MPa\"\n");
    let columns = "[[columns]]\ninertia = \"3e-3 m4\"\narea = \"0.2 m2\"\nshear_area = \"0.3 m2\"\n\
                   [[columns]]\nlines = \"A\"\ninertia = \"3e-3 m4\"\narea = \"0.2 m2\"\n\
                   [[beams]]\ninertia = \"5e-3 m4\"\nend_spring = \"hinge\"\n\
                   [[beams]]\nfloors = 2\ninertia = \"6e-3 m4\"\n[[beams]]\nfloors = 3\ninertia = \"6e-3 m4\"\nend_spring = \"rigid\"\n";
    let file = read(&format!("{material}{columns}{LOAD}"));
    let found: Vec<_> = file.warnings.iter().map(|warning| format!("{warning} [{}]", warning.key)).collect();
    let expected = [
        "the shear modulus is `12 MPa`; a third to a half of the modulus of elasticity, for timber about a sixteenth, is usual [material.shear_modulus]",
        "the shear area is `0.3 m2`; no more than the whole area of the section is usual [columns, table 1, shear_area]",
        "this table states no shear_area, so its members do not deform in shear, but the table it replaces has shear_area 0.3 m2 [columns, table 2]",
        "this table states no end_spring, so its members are joined rigidly, but the table it replaces has end_spring hinge [beams, table 2]",
    ];
    assert_eq!(found, expected);
    assert!(file.warnings.iter().all(|warning| !warning.help().is_empty()));
}
