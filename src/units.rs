//! Units at the edges: quantities as text in, quantities for people out.
//!
//! Inside the crate every number is in N, m and rad. This module holds the only conversion factors.
//! Exact by definition: 1 lbf = 4.448 221 615 260 5 N, 1 ft = 0.3048 m, 1 in = 0.0254 m.

mod dimension;
mod parse;

pub use dimension::Dimension;
pub use parse::{UnitError, parse};

use serde::{Deserialize, Serialize};

/// Newtons in one pound-force, exact by the definition of the pound and of standard gravity.
pub const NEWTONS_PER_POUND: f64 = 4.448_221_615_260_5;
/// Metres in one foot, exact by definition.
pub const METRES_PER_FOOT: f64 = 0.3048;
/// Metres in one inch, exact by definition.
pub const METRES_PER_INCH: f64 = 0.0254;

/// A unit for output: its symbol and how many SI base units (N, m) one of it is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Unit {
    /// Symbol as printed, such as `kN m`.
    pub symbol: &'static str,
    /// Size of one unit in N, m.
    pub si: f64,
}

impl Unit {
    /// Converts a number in N, m to a number of this unit.
    pub fn from_si(&self, value: f64) -> f64 {
        value / self.si
    }
}

/// The family of units a report is written in: kN, m, mm or kip, ft, in.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Serialize, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum ReportUnits {
    /// kN, m, mm.
    #[default]
    Metric,
    /// kip, ft, in.
    Us,
}

impl ReportUnits {
    /// Unit of forces: kN or kip.
    pub fn force(self) -> Unit {
        match self {
            Self::Metric => Unit { symbol: "kN", si: 1e3 },
            Self::Us => Unit { symbol: "kip", si: 1e3 * NEWTONS_PER_POUND },
        }
    }

    /// Unit of moments: kN m or kip ft.
    pub fn moment(self) -> Unit {
        match self {
            Self::Metric => Unit { symbol: "kN m", si: 1e3 },
            Self::Us => Unit { symbol: "kip ft", si: 1e3 * NEWTONS_PER_POUND * METRES_PER_FOOT },
        }
    }

    /// Unit of storey heights and bay widths: m or ft.
    pub fn length(self) -> Unit {
        match self {
            Self::Metric => Unit { symbol: "m", si: 1.0 },
            Self::Us => Unit { symbol: "ft", si: METRES_PER_FOOT },
        }
    }

    /// Unit of movements (drift, sway): mm or in.
    pub fn movement(self) -> Unit {
        match self {
            Self::Metric => Unit { symbol: "mm", si: 1e-3 },
            Self::Us => Unit { symbol: "in", si: METRES_PER_INCH },
        }
    }
}
