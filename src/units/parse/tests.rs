use super::*;
use crate::units::NEWTONS_PER_POUND;
use Dimension::*;

fn close(text: &str, wanted: Dimension, expected: f64) {
    let found = parse(text, wanted).unwrap_or_else(|error| panic!("{text}: {error}"));
    assert!((found - expected).abs() <= 4e-16 * expected.abs(), "{text}: {found:e} is not {expected:e}");
}

fn fault(text: &str, wanted: Dimension) -> String {
    let error = parse(text, wanted).expect_err(text);
    format!("{error}; {}", error.help())
}

// Exact definitions, NIST SP 811 (2008): 1 ft = 0.3048 m, 1 lbf = 4.448 221 615 260 5 N, 1 kgf = 9.806 65 N.
#[test]
fn exact_definitions() {
    close("1 ft", Length, 0.3048);
    close("1 in", Length, 0.0254);
    close("1 lbf", Force, 4.4482216152605);
    close("1 kip", Force, 4448.2216152605);
    close("1 kgf", Force, 9.80665);
    close("1 in2", Area, 6.4516e-4);
    close("1 ft2", Area, 9.290304e-2);
}

// NIST SP 811 (2008), appendix B.8 and B.9, prints seven digits.
#[test]
fn published_seven_digit_factors() {
    let published = [
        ("1 psi", Pressure, 6.894_757e3),
        ("1 ksi", Modulus, 6.894_757e6),
        ("1 psf", Pressure, 4.788_026e1),
        ("1 lbf/ft", ForcePerLength, 1.459_390e1),
        ("1 lbf/in", ForcePerLength, 1.751_268e2),
        ("1 in4", Inertia, 4.162_314e-7),
        ("1 ft4", Inertia, 8.630_975e-3),
        ("1 lbf ft/rad", RotationalStiffness, 1.355_818),
        ("1 lbf in/rad", RotationalStiffness, 1.129_848e-1),
        ("1 kip/in2", Pressure, 6.894_757e6),
        ("1 kgf/cm2", Pressure, 9.806_65e4),
    ];
    for (text, wanted, expected) in published {
        let found = parse(text, wanted).unwrap();
        assert!((found / expected - 1.0).abs() < 6e-7, "{text}: {found:e} is not {expected:e}");
    }
}

#[test]
fn spellings_of_one_quantity_agree() {
    for text in ["3.6 m", "3.6m", " 3.6  m ", "+3.6 m", "360 cm", "3600mm", "36e-1 m", "0.36E1 m"] {
        close(text, Length, 3.6);
    }
    for text in
        ["12'-6\"", "12' 6\"", "12'6\"", "12.5'", "12.5 ft", "150 in", "150\"", "12 ft 6 in", "12ft 6in", "12′ 6″"]
    {
        close(text, Length, 3.81);
    }
    for text in ["12' 6 1/2\"", "12'-6 1/2\"", "12'-6-1/2\"", "12'-6.5\"", "150 1/2 in", "12 ft 6 1/2 in"] {
        close(text, Length, 3.8227);
    }
    close("1/2 in", Length, 0.0127);
    close("6 in.", Length, 0.1524);
    for text in ["1200 in4", "1200 in^4", "1200 in⁴", "1200in4"] {
        close(text, Inertia, 1200.0 * 0.0254f64.powi(4));
    }
    for text in ["9e8 mm4", "9e8 mm⁴", "9e4 cm4", "9e-4 m4"] {
        close(text, Inertia, 9e-4);
    }
    for text in ["150 MN m/rad", "150 MN·m/rad", "150e3 kN m / rad", "150 MN.m/rad", "150 MN*m/rad"] {
        close(text, RotationalStiffness, 1.5e8);
    }
    let kip_foot = 1e3 * NEWTONS_PER_POUND * 0.3048;
    for text in ["1 kip ft/rad", "1 kip-ft/rad", "12 kip in/rad", "12 kip-in/rad"] {
        close(text, RotationalStiffness, kip_foot);
    }
    for text in ["30 GPa", "30000 MPa", "30e3 N/mm2", "30e6 kN/m2", "30e6 kPa", "30e9 N/m²", "30e9 Pa", "30 GN/m^2"] {
        close(text, Modulus, 3e10);
    }
    close("-40 kN", Force, -4e4);
    close("\u{2212}40 kN", Force, -4e4);
    close("1 klf", ForcePerLength, 1e3 * NEWTONS_PER_POUND / 0.3048);
}

#[test]
fn faults_say_what_is_wrong_and_what_to_write() {
    let cases = [
        ("", Length, "nothing is given"),
        ("wide", Length, "does not begin with a number"),
        ("nan m", Length, "not a finite number"),
        ("-inf m", Length, "not a finite number"),
        ("1e400 m", Length, "too large"),
        ("1e308 GPa", Modulus, "too large"),
        ("1,200 mm", Length, "write \"1.200 mm\" or \"1200 mm\""),
        ("7,2 m", Length, "write \"7.2 m\""),
        ("1 200 mm", Length, "two numbers"),
        ("7.2", Length, "\"7.2 m\" or \"7.2 ft\""),
        ("40 KN", Force, "did you mean `kN`?"),
        ("30 Gpa", Modulus, "did you mean `GPa`?"),
        ("30 gpa", Modulus, "did you mean `GPa`?"),
        ("5 kipp", Force, "did you mean `kip`?"),
        ("5 kip fr/rad", RotationalStiffness, "did you mean `kip ft/rad`?"),
        ("5 parsec", Length, "not known"),
        ("7.2 kN", Length, "measures a force, but a length is due"),
        ("7.2 m", Inertia, "write an inertia (second moment of area) like \"9e-4 m4\""),
        ("5 kN m", RotationalStiffness, "measures a moment"),
        ("5 in3", Inertia, "section modulus"),
        ("500 kg", Force, "measures a mass"),
        ("12'-6\"", Force, "measures a length"),
        ("12'-14\"", Length, "cannot be read as feet and inches"),
        ("12'-6", Length, "cannot be read as feet and inches"),
        ("5 m/", Length, "not known"),
        ("5 /m", Length, "not known"),
        ("5 m0", Length, "not known"),
    ];
    for (text, wanted, expected) in cases {
        let message = fault(text, wanted);
        assert!(message.contains(expected), "{text}: {message}");
    }
}

#[test]
fn every_usual_unit_and_example_is_of_its_kind() {
    for wanted in [Length, Area, Inertia, Force, ForcePerLength, Pressure, Modulus, RotationalStiffness] {
        for example in wanted.examples() {
            assert!(parse(example, wanted).unwrap() > 0.0, "{example}");
        }
        for unit in wanted.usual_units() {
            assert!(parse(&format!("2 {unit}"), wanted).unwrap() > 0.0, "{unit}");
        }
    }
}

proptest::proptest! {
    #[test]
    fn no_text_makes_the_reader_panic(text in "\\PC*") {
        for wanted in [Length, Inertia, RotationalStiffness] {
            if let Ok(value) = parse(&text, wanted) {
                assert!(value.is_finite());
            }
        }
    }

    #[test]
    fn near_quantities_never_panic(text in "[-+]?[0-9.,eE]{0,6} ?['\"a-zA-Z0-9/^ .-]{0,8}") {
        if let Ok(value) = parse(&text, Length) {
            assert!(value.is_finite());
        }
    }
}
