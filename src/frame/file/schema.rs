//! The JSON schema of the frame file, for editors.

use super::written::{EndSpringsWritten, EqualBays, EqualStoreys, PowerWritten, SpringWritten, Written};
use crate::frame::{MAX_BAYS, MAX_STOREYS};
use schemars::generate::SchemaSettings;
use schemars::{JsonSchema, Schema, SchemaGenerator, json_schema};
use serde_json::{Value, json};

/// JSON schema (draft 7) of the frame file, to be stored beside frame files for editors that complete and check keys.
pub fn schema() -> Value {
    SchemaSettings::draft07().into_generator().into_root_schema_for::<Written>().to_value()
}

/// A number at the start of a quantity: feet and inches are covered apart.
const NUMBER: &str = r"^\s*[-+−]?([0-9]+(\.[0-9]*)?|\.[0-9]+)([eE][-+]?[0-9]+)?\s*";
const LENGTH: &str = r#"(mm|cm|m|ft|foot|feet|in\.?|inch|inches|['"′″’”]|\s*[0-9/ .'"′″’”-]+(in\.?|["”″])|(ft|['′’])[-. ]*[0-9][0-9/ .-]*(in\.?|["”″]))\s*$"#;

fn quantity(units: &str, examples: [&str; 2]) -> Schema {
    json_schema!({ "type": "string", "pattern": format!("{NUMBER}{units}"), "examples": examples })
}

/// Units of a quantity that is no length: letters, powers and products; the reader judges them exactly.
fn composed(unit: &str, examples: [&str; 2]) -> Schema {
    quantity(&format!(r"({unit})\s*$"), examples)
}

pub(super) fn table<T: JsonSchema>(generator: &mut SchemaGenerator) -> Schema {
    generator.subschema_for::<T>()
}

pub(super) fn tables<T: JsonSchema>(generator: &mut SchemaGenerator) -> Schema {
    let items = generator.subschema_for::<T>();
    json_schema!({ "type": "array", "items": items, "minItems": 1 })
}

pub(super) fn text(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "string" })
}

pub(super) fn report_units(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "string", "enum": ["metric", "us"], "default": "metric" })
}

pub(super) fn length(_: &mut SchemaGenerator) -> Schema {
    quantity(LENGTH, ["7.2 m", "24 ft"])
}

pub(super) fn area(_: &mut SchemaGenerator) -> Schema {
    composed(r"(m|cm|mm|ft|in)\.?\^?[2²]", ["0.24 m2", "35.1 in2"])
}

pub(super) fn inertia(_: &mut SchemaGenerator) -> Schema {
    composed(r"(m|cm|mm|ft|in)\.?\^?[4⁴]", ["9e-4 m4", "1200 in4"])
}

pub(super) fn force(_: &mut SchemaGenerator) -> Schema {
    composed("N|kN|MN|GN|lbf|lbs?|kips?|kgf|tf", ["40 kN", "10 kip"])
}

pub(super) fn forces(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "array", "items": force(generator), "minItems": 1, "maxItems": MAX_STOREYS })
}

pub(super) fn pressure(_: &mut SchemaGenerator) -> Schema {
    pressure_like(["1.2 kPa", "25 psf"])
}

pub(super) fn modulus(_: &mut SchemaGenerator) -> Schema {
    pressure_like(["30 GPa", "29000 ksi"])
}

fn pressure_like(examples: [&str; 2]) -> Schema {
    let quotient = r"[kMG]?N\s*/\s*[cm]?m\^?[2²]|(kips?|lbf?|lbs|kgf|tf)\s*/\s*(in|ft|c?m)\^?[2²]";
    composed(&format!("[kMG]?Pa|psi|ksi|psf|ksf|{quotient}"), examples)
}

pub(super) fn shear_modulus(_: &mut SchemaGenerator) -> Schema {
    pressure_like(["12 GPa", "11200 ksi"])
}

pub(super) fn poisson(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "number", "minimum": 0, "maximum": 0.5 })
}

pub(super) fn shear_area(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "anyOf": [{ "const": "5/6" }, area(generator)] })
}

pub(super) fn one_end_spring(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "anyOf": [{ "enum": ["rigid", "hinge"] }, rotational_stiffness(generator)] })
}

pub(super) fn end_spring(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "anyOf": [one_end_spring(generator), generator.subschema_for::<EndSpringsWritten>()] })
}

pub(super) fn share(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "number", "minimum": 0, "maximum": 1 })
}

pub(super) fn shares(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "array", "items": share(generator), "minItems": 2, "maxItems": MAX_BAYS + 1 })
}

pub(super) fn rotational_stiffness(_: &mut SchemaGenerator) -> Schema {
    let product = r"([kMG]?N|kips?|lbf?|lbs|kgf|tf)[ ·⋅∙×*.-]*([cm]?m|ft|in)\s*/\s*rad";
    composed(product, ["150 MN m/rad", "110000 kip ft/rad"])
}

fn count(most: usize) -> Schema {
    json_schema!({ "type": "integer", "minimum": 1, "maximum": most })
}

pub(super) fn bay_count(_: &mut SchemaGenerator) -> Schema {
    count(MAX_BAYS)
}

pub(super) fn storey_count(_: &mut SchemaGenerator) -> Schema {
    count(MAX_STOREYS)
}

pub(super) fn tier(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "integer", "minimum": 1, "default": 3 })
}

fn lengths_or<T: JsonSchema>(generator: &mut SchemaGenerator, most: usize) -> Schema {
    let list = json!({ "type": "array", "items": length(generator), "minItems": 1, "maxItems": most });
    json_schema!({ "anyOf": [list, generator.subschema_for::<T>()] })
}

pub(super) fn bays(generator: &mut SchemaGenerator) -> Schema {
    lengths_or::<EqualBays>(generator, MAX_BAYS)
}

pub(super) fn storeys(generator: &mut SchemaGenerator) -> Schema {
    lengths_or::<EqualStoreys>(generator, MAX_STOREYS)
}

pub(super) fn fixity(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "anyOf": [{ "enum": ["fixed", "pinned"] }, generator.subschema_for::<SpringWritten>()] })
}

pub(super) fn load_shape(generator: &mut SchemaGenerator) -> Schema {
    json_schema!({ "anyOf": [{ "enum": ["uniform", "triangular"] }, generator.subschema_for::<PowerWritten>()] })
}

pub(super) fn levels(_: &mut SchemaGenerator) -> Schema {
    let level = "([0-9]+|roof)";
    let pattern = format!(r"^\s*(all|{level}(\s*-\s*{level})?(\s*,\s*{level}(\s*-\s*{level})?)*)\s*$");
    json_schema!({ "anyOf": [{ "type": "string", "pattern": pattern }, { "type": "integer", "minimum": 1 }] })
}

pub(super) fn lines(_: &mut SchemaGenerator) -> Schema {
    let line = "[A-HJ-NP-Z]{1,2}";
    let choice = format!(r"{line}(\s*-\s*{line})?|end|interior");
    json_schema!({ "type": "string", "pattern": format!(r"^\s*(all|({choice})(\s*,\s*({choice}))*)\s*$") })
}

pub(super) fn bay_names(_: &mut SchemaGenerator) -> Schema {
    let choice = r"[A-HJ-NP-Z]{1,2}\s*-\s*[A-HJ-NP-Z]{1,2}|end|interior";
    json_schema!({ "type": "string", "pattern": format!(r"^\s*(all|({choice})(\s*,\s*({choice}))*)\s*$") })
}

pub(super) fn positive_number(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "number", "exclusiveMinimum": 0 })
}

pub(super) fn factor(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "number", "minimum": 0 })
}

pub(super) fn power(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "number", "minimum": 0, "maximum": 10 })
}

pub(super) fn spread_factor(_: &mut SchemaGenerator) -> Schema {
    json_schema!({ "type": "number", "minimum": 1 })
}

fn one_or_two(one: &Schema) -> Schema {
    json_schema!({ "anyOf": [one, { "type": "array", "items": one, "minItems": 2, "maxItems": 2 }] })
}

pub(super) fn spread(generator: &mut SchemaGenerator) -> Schema {
    one_or_two(&positive_number(generator))
}

pub(super) fn power_spread(generator: &mut SchemaGenerator) -> Schema {
    one_or_two(&power(generator))
}

pub(super) fn inertia_spread(generator: &mut SchemaGenerator) -> Schema {
    one_or_two(&inertia(generator))
}
