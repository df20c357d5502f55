//! Kinds of quantity, and the unit symbols that make them up.

use super::{METRES_PER_FOOT, METRES_PER_INCH, NEWTONS_PER_POUND};

/// The kind of a quantity that a frame file may ask for.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Dimension {
    /// Bay widths, storey heights, sides of a rectangle.
    Length,
    /// Cross-section areas.
    Area,
    /// Second moments of area.
    Inertia,
    /// Lateral forces.
    Force,
    /// Line loads.
    ForcePerLength,
    /// Wind pressure.
    Pressure,
    /// Modulus of elasticity; the same units as a pressure.
    Modulus,
    /// Shear modulus; the same units as a pressure.
    ShearModulus,
    /// Rotational springs at feet and beam ends.
    RotationalStiffness,
}

impl Dimension {
    /// The kind in words, with its article.
    pub fn noun(self) -> &'static str {
        match self {
            Self::Length => "a length",
            Self::Area => "an area",
            Self::Inertia => "an inertia (second moment of area)",
            Self::Force => "a force",
            Self::ForcePerLength => "a force per length",
            Self::Pressure => "a pressure",
            Self::Modulus => "a modulus of elasticity",
            Self::ShearModulus => "a shear modulus",
            Self::RotationalStiffness => "a rotational stiffness",
        }
    }

    /// A usual metric unit and a usual US unit.
    pub fn usual_units(self) -> [&'static str; 2] {
        match self {
            Self::Length => ["m", "ft"],
            Self::Area => ["m2", "in2"],
            Self::Inertia => ["m4", "in4"],
            Self::Force => ["kN", "kip"],
            Self::ForcePerLength => ["kN/m", "kip/ft"],
            Self::Pressure => ["kPa", "psf"],
            Self::Modulus | Self::ShearModulus => ["GPa", "ksi"],
            Self::RotationalStiffness => ["MN m/rad", "kip ft/rad"],
        }
    }

    /// A metric and a US unit in which a bare `number` may have been meant.
    pub(super) fn units_for(self, number: f64) -> [&'static str; 2] {
        match self {
            Self::Modulus | Self::ShearModulus if number >= 1e6 => ["Pa", "psi"],
            Self::Modulus | Self::ShearModulus if number >= 1e3 => ["MPa", "ksi"],
            _ => self.usual_units(),
        }
    }

    /// A metric and a US example, as they are typed.
    pub fn examples(self) -> [&'static str; 2] {
        match self {
            Self::Length => ["7.2 m", "24 ft"],
            Self::Area => ["0.24 m2", "35.1 in2"],
            Self::Inertia => ["9e-4 m4", "1200 in4"],
            Self::Force => ["40 kN", "10 kip"],
            Self::ForcePerLength => ["3 kN/m", "0.2 kip/ft"],
            Self::Pressure => ["1.2 kPa", "25 psf"],
            Self::Modulus => ["30 GPa", "29000 ksi"],
            Self::ShearModulus => ["12 GPa", "11200 ksi"],
            Self::RotationalStiffness => ["150 MN m/rad", "110000 kip ft/rad"],
        }
    }

    pub(super) fn powers(self) -> Powers {
        match self {
            Self::Length => Powers::new(0, 1, 0),
            Self::Area => Powers::new(0, 2, 0),
            Self::Inertia => Powers::new(0, 4, 0),
            Self::Force => Powers::new(1, 0, 0),
            Self::ForcePerLength => Powers::new(1, -1, 0),
            Self::Pressure | Self::Modulus | Self::ShearModulus => Powers::new(1, -2, 0),
            Self::RotationalStiffness => Powers::new(1, 1, -1),
        }
    }
}

/// Powers of force, length and angle in a unit; mass is told apart because it is often typed for a force.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Powers {
    force: i32,
    length: i32,
    angle: i32,
    mass: i32,
}

impl Powers {
    pub(super) const NONE: Self = Self::new(0, 0, 0);

    const fn new(force: i32, length: i32, angle: i32) -> Self {
        Self { force, length, angle, mass: 0 }
    }

    /// These powers and `times` the `other` ones together.
    pub(super) fn plus(self, other: Self, times: i32) -> Self {
        Self {
            force: self.force + times * other.force,
            length: self.length + times * other.length,
            angle: self.angle + times * other.angle,
            mass: self.mass + times * other.mass,
        }
    }

    /// What a quantity of these powers is, in words.
    pub(super) fn noun(self) -> &'static str {
        match (self.force, self.length, self.angle, self.mass) {
            (0, 0, 1, 0) => "an angle",
            (0, 1, 0, 0) => "a length",
            (0, 2, 0, 0) => "an area",
            (0, 3, 0, 0) => "a section modulus or a volume",
            (0, 4, 0, 0) => "an inertia (second moment of area)",
            (1, 0, 0, 0) => "a force",
            (1, -1, 0, 0) => "a force per length",
            (1, -2, 0, 0) => "a pressure or a modulus",
            (1, -3, 0, 0) => "a force per volume",
            (1, 1, 0, 0) => "a moment",
            (1, 1, -1, 0) => "a rotational stiffness",
            (0, _, 0, 1) => "a mass",
            _ => "another kind of quantity",
        }
    }
}

/// One unit symbol: how it is spelt, what it measures, how many N, m, rad it is.
pub(super) struct Symbol {
    pub(super) spelling: &'static str,
    pub(super) powers: Powers,
    pub(super) si: f64,
}

const fn force(spelling: &'static str, si: f64) -> Symbol {
    Symbol { spelling, powers: Powers::new(1, 0, 0), si }
}

const fn length(spelling: &'static str, si: f64) -> Symbol {
    Symbol { spelling, powers: Powers::new(0, 1, 0), si }
}

const fn line_load(spelling: &'static str, si: f64) -> Symbol {
    Symbol { spelling, powers: Powers::new(1, -1, 0), si }
}

const fn pressure(spelling: &'static str, si: f64) -> Symbol {
    Symbol { spelling, powers: Powers::new(1, -2, 0), si }
}

const fn mass(spelling: &'static str) -> Symbol {
    Symbol { spelling, powers: Powers { force: 0, length: 0, angle: 0, mass: 1 }, si: 1.0 }
}

const KIP: f64 = 1e3 * NEWTONS_PER_POUND;
/// Newtons in one kilogram-force, exact: standard gravity is 9.80665 m/s2.
const KGF: f64 = 9.806_65;

/// Every unit symbol known; powers and products are composed from them.
pub(super) const SYMBOLS: &[Symbol] = &[
    length("m", 1.0),
    length("cm", 1e-2),
    length("mm", 1e-3),
    length("ft", METRES_PER_FOOT),
    length("foot", METRES_PER_FOOT),
    length("feet", METRES_PER_FOOT),
    length("in", METRES_PER_INCH),
    length("inch", METRES_PER_INCH),
    length("inches", METRES_PER_INCH),
    force("N", 1.0),
    force("kN", 1e3),
    force("MN", 1e6),
    force("GN", 1e9),
    force("lbf", NEWTONS_PER_POUND),
    force("lb", NEWTONS_PER_POUND),
    force("lbs", NEWTONS_PER_POUND),
    force("kip", KIP),
    force("kips", KIP),
    force("kgf", KGF),
    force("tf", 1e3 * KGF),
    pressure("Pa", 1.0),
    pressure("kPa", 1e3),
    pressure("MPa", 1e6),
    pressure("GPa", 1e9),
    pressure("psi", NEWTONS_PER_POUND / (METRES_PER_INCH * METRES_PER_INCH)),
    pressure("ksi", KIP / (METRES_PER_INCH * METRES_PER_INCH)),
    pressure("psf", NEWTONS_PER_POUND / (METRES_PER_FOOT * METRES_PER_FOOT)),
    pressure("ksf", KIP / (METRES_PER_FOOT * METRES_PER_FOOT)),
    line_load("plf", NEWTONS_PER_POUND / METRES_PER_FOOT),
    line_load("klf", KIP / METRES_PER_FOOT),
    mass("kg"),
    mass("t"),
    Symbol { spelling: "rad", powers: Powers::new(0, 0, 1), si: 1.0 },
];
