//! The material as checked: modulus of elasticity and shear modulus.
//!
//! # Formula
//! G = E / (2 (1 + nu)) where Poisson's ratio nu is given.

use super::fault::{FaultKind, FileFault};
use super::size::conflict;
use super::source::{Need, Source, require};
use super::warning::{self, FileWarning};
use super::written::{MaterialWritten, Written};
use super::{Echo, scalar::Table};
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;

/// What to write where the modulus is missing.
pub(super) const MODULUS: &str =
    "add [material] with modulus = \"30 GPa\" (concrete) or modulus = \"29000 ksi\" (steel)";
const SHEAR: &str = "add poisson = 0.2 (concrete; 0.3 for steel) or shear_modulus = \"12 GPa\" to [material]";

/// Moduli, N/m2.
#[derive(Debug)]
pub(super) struct Material {
    pub modulus: f64,
    pub shear: Option<f64>,
    pub echo: Vec<Echo>,
    pub warnings: Vec<FileWarning>,
}

/// Checks `[material]`.
pub(super) fn material(source: Source, written: &Written) -> Result<Option<Material>, FileFault> {
    let Some(table) = &written.material else { return Ok(None) };
    let value = require(&table.get_ref().modulus, table.span(), "the modulus of elasticity", MODULUS)?;
    let modulus = source.positive(value, Dimension::Modulus)?;
    let mut warnings: Vec<_> = warning::modulus(source, modulus, value.span()).into_iter().collect();
    let mut echo = vec![Echo { what: "modulus".into(), typed: source.typed(value.span()) }];
    let shear = shear(source, table, modulus, &mut warnings)?;
    let shear = shear.map(|(shear, typed)| {
        echo.push(Echo { what: "shear modulus".into(), typed });
        shear
    });
    Ok(Some(Material { modulus, shear, echo, warnings }))
}

fn shear(
    source: Source,
    table: &Spanned<Table<MaterialWritten>>,
    modulus: f64,
    warnings: &mut Vec<FileWarning>,
) -> Result<Option<(f64, String)>, FileFault> {
    let table = table.get_ref();
    match (&table.shear_modulus, &table.poisson) {
        (None, None) => Ok(None),
        (Some(first), Some(second)) => {
            let help = "both give the shear modulus: keep one of them";
            Err(conflict("material.shear_modulus", "material.poisson", help, first.span(), second.span()))
        }
        (Some(value), None) => {
            let shear = source.positive(value, Dimension::ShearModulus)?;
            warnings.extend(warning::shear_modulus(source, shear, modulus, value.span()));
            Ok(Some((shear, source.typed(value.span()))))
        }
        (None, Some(value)) => {
            let ratio = source.number(value, Need::Poisson)?;
            Ok(Some((modulus / (2.0 * (1.0 + ratio)), format!("by Poisson's ratio {}", source.typed(value.span())))))
        }
    }
}

/// Refuses a shear area, which stands at `shear_area`, without a shear modulus.
pub(super) fn needs_shear(material: &Material, shear_area: Option<Range<usize>>) -> Result<(), FileFault> {
    let (Some(span), None) = (shear_area, material.shear) else { return Ok(()) };
    let kind = FaultKind::Missing { what: "the shear modulus, which a shear area needs beside it,", help: SHEAR };
    Err(FileFault::new(kind, span))
}
