use super::*;
use crate::frame::file;

type Change = fn(&mut AnalysisOptions);

/// Two storeys of 5 and 4 m, bays of 6 and 9 m.
fn frame() -> Frame {
    let text = "[grid]\nbays = [\"6 m\", \"9 m\"]\nstoreys = [\"5 m\", \"4 m\"]\n[material]\nmodulus = \"30 GPa\"\n\
                [[columns]]\ninertia = \"3e-3 m4\"\n[[beams]]\ninertia = \"5e-3 m4\"\n[lateral]\nfloors = [\"1 kN\", \"1 kN\"]\n";
    file::parse(text).unwrap().frame
}

fn message(change: impl FnOnce(&mut AnalysisOptions)) -> String {
    let frame = frame();
    let mut options = AnalysisOptions::plain(&frame);
    change(&mut options);
    assert!(!options.is_plain() || options.check(&frame).is_err());
    AnalysisOptions::new(&frame, options).map_or_else(|fault| fault.to_string(), |_| String::new())
}

#[test]
fn plain_options_are_plain_and_fit() {
    let frame = frame();
    let mut options = AnalysisOptions::plain(&frame);
    assert!(options.is_plain() && !options.has_shear() && options.check(&frame).is_ok());
    options.shear_modulus = Some(12e9);
    assert!(options.is_plain() && options.check(&frame).is_ok());
}

#[test]
fn what_fits_is_given_back() {
    let every = |options: &mut AnalysisOptions| {
        options.shear_modulus = Some(12e9);
        options.column_shear_area[0] = Some(0.2);
        options.beam_springs[3] = [EndSpring::Spring(8e7), EndSpring::Hinge];
        options.column_zones[3] = [0.3, 0.3];
        options.beam_zones[1] = [0.0, 8.1];
        options.gravity = Some(vec![0.0; 6]);
    };
    assert_eq!(message(every), "");
}

#[test]
fn each_option_alone_is_not_plain() {
    let changes: [Change; 5] = [
        |options| options.beam_shear_area[0] = Some(0.1),
        |options| options.beam_springs[0][1] = EndSpring::Hinge,
        |options| options.column_zones[4][1] = 0.1,
        |options| options.beam_zones[3][0] = 0.1,
        |options| options.gravity = Some(vec![0.0; 6]),
    ];
    for change in changes {
        let mut options = AnalysisOptions::plain(&frame());
        change(&mut options);
        assert!(!options.is_plain());
    }
}

#[test]
fn what_does_not_fit_is_refused_with_its_place() {
    let cases: [(&str, Change); 12] = [
        ("rigid zones of beams: 3 given where the grid asks for 4", |options| options.beam_zones.truncate(3)),
        ("vertical loads: 2 given", |options| options.gravity = Some(vec![1.0; 2])),
        ("storey 2 on line B has a shear area, but no", |options| options.column_shear_area[4] = Some(0.2)),
        ("the shear modulus is NaN", |options| options.shear_modulus = Some(f64::NAN)),
        ("the shear area of the beam of floor 2 in bay A-B is 0", |options| {
            options.shear_modulus = Some(1e10);
            options.beam_shear_area[2] = Some(0.0);
        }),
        ("the spring at the right end of the beam of floor 1 in bay B-C is inf", |options| {
            options.beam_springs[1][1] = EndSpring::Spring(f64::INFINITY);
        }),
        ("a rigid zone of the column of storey 2 on line A is -0.1", |options| options.column_zones[3][0] = -0.1),
        ("a rigid zone of the beam of floor 1 in bay A-B is NaN", |options| options.beam_zones[0][0] = f64::NAN),
        ("the column of storey 1 on line C stands on the ground", |options| options.column_zones[2][0] = 0.1),
        ("of the beam of floor 2 in bay A-B take 5.500 m of its 6.000 m", |options| {
            options.beam_zones[2] = [2.5, 3.0];
        }),
        ("of the column of storey 1 on line B take 5.000 m of its 5.000 m", |options| options.column_zones[1][1] = 5.0),
        ("the vertical load of floor 2 on line A is -1", |options| {
            options.gravity = Some(vec![0.0, 0.0, 0.0, -1.0, 0.0, 0.0]);
        }),
    ];
    for (expected, change) in cases {
        let message = message(change);
        assert!(message.contains(expected), "{message}");
    }
}

#[test]
fn a_tenth_of_the_length_is_enough() {
    assert_eq!(message(|options| options.beam_zones[0] = [2.7, 2.7]), "");
    assert!(!message(|options| options.beam_zones[0] = [2.7, 2.701]).is_empty());
}

#[test]
fn relative_sizes_take_zones_and_hinges_only() {
    let text = "[grid]\nbays = [\"6 m\"]\nstoreys = [\"5 m\"]\n[sizes]\n[lateral]\nfloors = [\"1 kN\"]\n";
    let frame = file::parse(text).unwrap().frame;
    let plain = AnalysisOptions::plain(&frame);
    let with = |gravity, springs, zones| AnalysisOptions {
        gravity,
        beam_springs: vec![springs],
        beam_zones: vec![zones],
        ..plain.clone()
    };
    let hinge = [EndSpring::Hinge, EndSpring::Rigid];
    assert!(with(None, hinge, [0.2; 2]).check(&frame).is_ok());
    let loads = with(Some(vec![1e3; 2]), hinge, [0.0; 2]).check(&frame);
    assert_eq!(loads, Err(OptionsFault::RelativeSizes { what: "vertical loads" }));
    let springs = with(None, [EndSpring::Spring(1e6); 2], [0.0; 2]).check(&frame);
    assert_eq!(springs, Err(OptionsFault::RelativeSizes { what: "springs at beam ends" }));
}
