//! The frame file as it is written: every key as text or number with its place, nothing judged yet.
//!
//! The comments on the keys are the descriptions in the JSON schema.

use super::scalar::{Expecting, ListOr, Repeated, Scalar, Share, Spread, Table, TextOr};
use super::schema;
use schemars::JsonSchema;
use serde::Deserialize;
use toml::Spanned;

/// A value that may be left out, with its place in the text.
pub(super) type Maybe<T> = Option<Spanned<T>>;

/// A regular moment frame: its grid, feet, material, member sizes and lateral forces. Quantities are texts with a
/// unit, such as "7.2 m", "24 ft", "12'-6\"", "40 kN", "200 GPa" or "1200 in4".
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(title = "Frame", extend("required" = ["grid", "lateral"]))]
pub(super) struct Written {
    /// What the frame is called in reports.
    #[schemars(schema_with = "schema::text")]
    pub title: Maybe<String>,
    /// Units of the reports: "metric" (kN, m, mm) or "us" (kip, ft, in). Default "metric".
    #[schemars(schema_with = "schema::report_units")]
    pub report_units: Maybe<String>,
    /// How far the given sizes may be off, for the bounds of a frame with known sizes.
    #[schemars(schema_with = "schema::table::<WithinWritten>")]
    pub within: Maybe<Table<WithinWritten>>,
    /// Bays and storeys.
    #[schemars(schema_with = "schema::table::<GridWritten>")]
    pub grid: Maybe<Table<GridWritten>>,
    /// How the column feet are held against rotation. Left out, they are fixed.
    #[schemars(schema_with = "schema::table::<FeetWritten>")]
    pub feet: Maybe<Table<FeetWritten>>,
    /// The material of all members.
    #[schemars(schema_with = "schema::table::<MaterialWritten>")]
    pub material: Maybe<Table<MaterialWritten>>,
    /// Column sizes. Each table states the whole size of the columns it selects; a later table replaces an earlier one.
    #[schemars(schema_with = "schema::tables::<ColumnsWritten>")]
    pub columns: Maybe<Repeated<Table<ColumnsWritten>>>,
    /// Beam sizes. Each table states the whole size of the beams it selects; a later table replaces an earlier one.
    #[schemars(schema_with = "schema::tables::<BeamsWritten>")]
    pub beams: Maybe<Repeated<Table<BeamsWritten>>>,
    /// What the sizes may be while they are unknown, in place of [[columns]] and [[beams]]. Every key has a default.
    #[schemars(schema_with = "schema::table::<SizesWritten>")]
    pub sizes: Maybe<Table<SizesWritten>>,
    /// Joints of a size: the parts of the members inside them do not bend. For the exact analyses. Left out, joints are
    /// points.
    #[schemars(schema_with = "schema::table::<JointsWritten>")]
    pub joints: Maybe<Table<JointsWritten>>,
    /// Vertical loads. Given, a second-order analysis is run beside the first-order one.
    #[schemars(schema_with = "schema::table::<GravityWritten>")]
    pub gravity: Maybe<Table<GravityWritten>>,
    /// Lateral forces, to the right: `floors`, or `base_shear` with `shape`, or `pressure` with `tributary`.
    #[schemars(schema_with = "schema::table::<LateralWritten>")]
    pub lateral: Maybe<Table<LateralWritten>>,
}

/// The grid of the frame.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Grid", extend("required" = ["bays", "storeys"]))]
pub(super) struct GridWritten {
    /// Bay widths from the left, or { count = 3, width = "7.2 m" }.
    #[schemars(schema_with = "schema::bays")]
    pub bays: Maybe<ListOr<EqualBays>>,
    /// Storey heights from the ground up, or { count = 8, height = "3.9 m", first = "4.8 m" }.
    #[schemars(schema_with = "schema::storeys")]
    pub storeys: Maybe<ListOr<EqualStoreys>>,
}

/// Bays of one width.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "EqualBays", extend("required" = ["count", "width"]))]
pub(super) struct EqualBays {
    /// Number of bays, 1 to 100.
    #[schemars(schema_with = "schema::bay_count")]
    pub count: Maybe<Scalar>,
    /// Width of every bay.
    #[schemars(schema_with = "schema::length")]
    pub width: Maybe<Scalar>,
}

impl Expecting for EqualBays {
    const EXPECTING: &str = "a list such as [\"7.2 m\", \"8.4 m\"] or a table such as { count = 3, width = \"7.2 m\" }";
}

/// Storeys of one height, the lowest apart.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "EqualStoreys", extend("required" = ["count", "height"]))]
pub(super) struct EqualStoreys {
    /// Number of storeys, 1 to 500.
    #[schemars(schema_with = "schema::storey_count")]
    pub count: Maybe<Scalar>,
    /// Height of every storey.
    #[schemars(schema_with = "schema::length")]
    pub height: Maybe<Scalar>,
    /// Height of the lowest storey, where it differs.
    #[schemars(schema_with = "schema::length")]
    pub first: Maybe<Scalar>,
}

impl Expecting for EqualStoreys {
    const EXPECTING: &str =
        "a list such as [\"4.8 m\", \"3.9 m\"] or a table such as { count = 8, height = \"3.9 m\", first = \"4.8 m\" }";
}

/// The column feet.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Feet")]
pub(super) struct FeetWritten {
    /// "fixed", "pinned", or { spring = "150 MN m/rad" } for each column line.
    #[schemars(schema_with = "schema::fixity")]
    pub fixity: Maybe<TextOr<SpringWritten>>,
}

/// A rotational spring under each column.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Spring", extend("required" = ["spring"]))]
pub(super) struct SpringWritten {
    /// Rotational stiffness of the spring under each column.
    #[schemars(schema_with = "schema::rotational_stiffness")]
    pub spring: Maybe<Scalar>,
}

impl Expecting for SpringWritten {
    const EXPECTING: &str = "\"fixed\", \"pinned\" or a table such as { spring = \"150 MN m/rad\" }";
}

/// The material of all members.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Material")]
pub(super) struct MaterialWritten {
    /// Modulus of elasticity.
    #[schemars(schema_with = "schema::modulus")]
    pub modulus: Maybe<Scalar>,
    /// Shear modulus, or `poisson` in its place. Needed only where a shear area is given.
    #[schemars(schema_with = "schema::shear_modulus")]
    pub shear_modulus: Maybe<Scalar>,
    /// Poisson's ratio, 0 to 0.5, in place of `shear_modulus`: G = E/(2(1 + ratio)).
    #[schemars(schema_with = "schema::poisson")]
    pub poisson: Maybe<Scalar>,
}

/// Columns of one size.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Columns")]
pub(super) struct ColumnsWritten {
    /// Storeys, 1 = lowest: "all", "2", "1-3", "4-roof", "1,3-5". Default "all".
    #[schemars(schema_with = "schema::levels")]
    pub storeys: Maybe<Scalar>,
    /// Column lines: "all", "end", "interior", "A", "A,D", "B-C". Default "all".
    #[schemars(schema_with = "schema::lines")]
    pub lines: Maybe<Scalar>,
    /// Second moment of area for bending in the frame's plane.
    #[schemars(schema_with = "schema::inertia")]
    pub inertia: Maybe<Scalar>,
    /// Cross-section area, beside `inertia`. Needed for column axial strain and for the cantilever method.
    #[schemars(schema_with = "schema::area")]
    pub area: Maybe<Scalar>,
    /// A solid rectangle in place of `inertia` and `area`.
    #[schemars(schema_with = "schema::table::<RectangleWritten>")]
    pub rectangle: Maybe<Table<RectangleWritten>>,
    /// Multiplies the inertia, not the area, for cracked concrete. More than 0, default 1.
    #[schemars(schema_with = "schema::positive_number")]
    pub stiffness_factor: Maybe<Scalar>,
    /// Area effective in shear; with `rectangle` also "5/6" of it. The stiffness factor leaves it alone. Left out, the
    /// columns do not deform in shear.
    #[schemars(schema_with = "schema::shear_area")]
    pub shear_area: Maybe<Scalar>,
}

impl Expecting for ColumnsWritten {
    const EXPECTING: &str = "[[columns]] in double brackets";
}

/// Beams of one size.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Beams")]
pub(super) struct BeamsWritten {
    /// Floors, 1 = on top of the lowest storey: "all", "2", "1-3", "4-roof", "roof". Default "all".
    #[schemars(schema_with = "schema::levels")]
    pub floors: Maybe<Scalar>,
    /// Bays: "all", "end", "interior", "A-B" for one bay, "A-D" for the bays between. Default "all".
    #[schemars(schema_with = "schema::bay_names")]
    pub bays: Maybe<Scalar>,
    /// Second moment of area for bending in the frame's plane.
    #[schemars(schema_with = "schema::inertia")]
    pub inertia: Maybe<Scalar>,
    /// A solid rectangle in place of `inertia`.
    #[schemars(schema_with = "schema::table::<RectangleWritten>")]
    pub rectangle: Maybe<Table<RectangleWritten>>,
    /// Multiplies the inertia, for cracked concrete. Default 1; 0 for a beam that carries no moment.
    #[schemars(schema_with = "schema::factor")]
    pub stiffness_factor: Maybe<Scalar>,
    /// Area effective in shear; with `rectangle` also "5/6" of it. The stiffness factor leaves it alone. Left out, the
    /// beams do not deform in shear.
    #[schemars(schema_with = "schema::shear_area")]
    pub shear_area: Maybe<Scalar>,
    /// Rotational spring at both ends: a stiffness, "rigid" or "hinge"; or { left = "80 MN m/rad", right = "hinge" }.
    /// Default "rigid".
    #[schemars(schema_with = "schema::end_spring")]
    pub end_spring: Maybe<TextOr<EndSpringsWritten>>,
    /// Refused with a reason; here so that the reason can be given.
    #[schemars(skip)]
    pub area: Maybe<Scalar>,
}

impl Expecting for BeamsWritten {
    const EXPECTING: &str = "[[beams]] in double brackets";
}

/// Springs at the two ends of a beam.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "EndSprings")]
pub(super) struct EndSpringsWritten {
    /// Left end: a stiffness, "rigid" or "hinge". Default "rigid".
    #[schemars(schema_with = "schema::one_end_spring")]
    pub left: Maybe<Scalar>,
    /// Right end: a stiffness, "rigid" or "hinge". Default "rigid".
    #[schemars(schema_with = "schema::one_end_spring")]
    pub right: Maybe<Scalar>,
}

impl Expecting for EndSpringsWritten {
    const EXPECTING: &str =
        "\"80 MN m/rad\", \"rigid\", \"hinge\" or a table such as { left = \"80 MN m/rad\", right = \"hinge\" }";
}

/// Rigid zones where members meet: `rigid`, or `column` and `beam`.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Joints")]
pub(super) struct JointsWritten {
    /// Share of the joint that is rigid, 0 to 1: half the column depth into beams and half the beam depth into columns,
    /// times the share. Needs a rectangle for every member.
    #[schemars(schema_with = "schema::share")]
    pub rigid: Maybe<Scalar>,
    /// Length of the rigid zone at each end of the columns; the feet at the ground have none.
    #[schemars(schema_with = "schema::length")]
    pub column: Maybe<Scalar>,
    /// Length of the rigid zone at each end of the beams.
    #[schemars(schema_with = "schema::length")]
    pub beam: Maybe<Scalar>,
}

impl Expecting for JointsWritten {
    const EXPECTING: &str = "the table [joints]";
}

/// Vertical loads for the second-order analysis.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Gravity", extend("required" = ["floors"]))]
pub(super) struct GravityWritten {
    /// Total vertical load added at each floor, from the lowest up to the roof, 0 or more.
    #[schemars(schema_with = "schema::forces")]
    pub floors: Maybe<Repeated<Scalar>>,
    /// Share of each column line from the left; they add up to 1. Left out, lines carry their tributary width.
    #[schemars(schema_with = "schema::shares")]
    pub lines: Maybe<Repeated<Share>>,
}

impl Expecting for GravityWritten {
    const EXPECTING: &str = "the table [gravity]";
}

/// A solid rectangle.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Rectangle", extend("required" = ["width", "depth"]))]
pub(super) struct RectangleWritten {
    /// Side across the frame's plane.
    #[schemars(schema_with = "schema::length")]
    pub width: Maybe<Scalar>,
    /// Side in the frame's plane.
    #[schemars(schema_with = "schema::length")]
    pub depth: Maybe<Scalar>,
}

/// The lateral forces.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Lateral")]
pub(super) struct LateralWritten {
    /// Force at each floor, from the lowest up to the roof. May be zero or negative, but every storey shear must be positive.
    #[schemars(schema_with = "schema::forces")]
    pub floors: Maybe<Repeated<Scalar>>,
    /// Sum of the forces of all floors.
    #[schemars(schema_with = "schema::force")]
    pub base_shear: Maybe<Scalar>,
    /// How the base shear is shared: "uniform" (the same at every floor), "triangular" (proportional to the floor's
    /// height above ground) or { power = 1.5 } (to that height to the power).
    #[schemars(schema_with = "schema::load_shape")]
    pub shape: Maybe<TextOr<PowerWritten>>,
    /// Wind pressure, the same over the whole height; the lowest half storey goes into the ground.
    #[schemars(schema_with = "schema::pressure")]
    pub pressure: Maybe<Scalar>,
    /// Width of facade that this frame carries, for `pressure`.
    #[schemars(schema_with = "schema::length")]
    pub tributary: Maybe<Scalar>,
}

/// Forces proportional to a power of the height.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Power", extend("required" = ["power"]))]
pub(super) struct PowerWritten {
    /// The power, 0 to 10.
    #[schemars(schema_with = "schema::power")]
    pub power: Maybe<Scalar>,
}

impl Expecting for PowerWritten {
    const EXPECTING: &str = "\"uniform\", \"triangular\" or a table such as { power = 1.5 }";
}

/// How far given sizes may be off: factors up to that much either way, 1 or more, log-uniform.
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Within")]
pub(super) struct WithinWritten {
    /// Factor drawn for each member alone. Default 1.
    #[schemars(schema_with = "schema::spread_factor")]
    pub member: Maybe<Scalar>,
    /// Factor drawn once for all beams. Default 1.
    #[schemars(schema_with = "schema::spread_factor")]
    pub beams: Maybe<Scalar>,
    /// Factor drawn once for everything; it moves drifts only. Default 1.
    #[schemars(schema_with = "schema::spread_factor")]
    pub all: Maybe<Scalar>,
}

/// The size model: each key a number (fixed) or a range [low, high].
#[derive(Debug, Default, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, default)]
#[schemars(rename = "Sizes")]
pub(super) struct SizesWritten {
    /// (I_b/L)/(I_c/h) of a beam of mean bay width to an end column of median storey height, both of the lowest tier.
    /// Log-uniform, default [0.1, 2.5].
    #[schemars(schema_with = "schema::spread")]
    pub beam_to_column: Maybe<Spread>,
    /// Inertia of interior columns over end columns of the same storey. Log-uniform, default [0.7, 3.5].
    #[schemars(schema_with = "schema::spread")]
    pub interior_to_end: Maybe<Spread>,
    /// Storeys between changes of size, a whole number. Default 3.
    #[schemars(schema_with = "schema::tier")]
    pub tier: Maybe<Scalar>,
    /// Column inertia of a tier over the tier below. Log-uniform, default [0.6, 1.0].
    #[schemars(schema_with = "schema::spread")]
    pub taper: Maybe<Spread>,
    /// Beam inertia of a tier over the tier below. Log-uniform, default [0.75, 1.0].
    #[schemars(schema_with = "schema::spread")]
    pub beam_taper: Maybe<Spread>,
    /// Roof beams' inertia is further multiplied by it. Log-uniform, default [0.5, 1.0].
    #[schemars(schema_with = "schema::spread")]
    pub roof_beam: Maybe<Spread>,
    /// Power of (bay width/mean bay width) in the beam inertia. Uniform, 0 or more, default [0.0, 1.5].
    #[schemars(schema_with = "schema::power_spread")]
    pub span_power: Maybe<Spread>,
    /// Each member's inertia is further multiplied by scatter^u, u uniform in [-1, 1]. 1 or more, default 1.15.
    #[schemars(schema_with = "schema::spread_factor")]
    pub scatter: Maybe<Scalar>,
    /// Rotational foot stiffness over 4 E I_c/h of its column, in place of [feet]. Log-uniform, default none.
    #[schemars(schema_with = "schema::spread")]
    pub foot_spring: Maybe<Spread>,
    /// Inertia of the end columns of the lowest tier. Forces of inextensible frames need none; drifts do. Log-uniform.
    #[schemars(schema_with = "schema::inertia_spread")]
    pub end_column_inertia: Maybe<Spread>,
    /// a in A = a sqrt(I): 3.5 for solid square concrete, 1.0 to 1.6 for wide-flange steel. Log-uniform, default 3.5.
    #[schemars(schema_with = "schema::spread")]
    pub area_per_inertia: Maybe<Spread>,
}

impl Expecting for GridWritten {
    const EXPECTING: &str = "the table [grid]";
}

impl Expecting for FeetWritten {
    const EXPECTING: &str = "the table [feet]";
}

impl Expecting for MaterialWritten {
    const EXPECTING: &str = "the table [material]";
}

impl Expecting for RectangleWritten {
    const EXPECTING: &str = "a table such as { width = \"400 mm\", depth = \"600 mm\" }";
}

impl Expecting for LateralWritten {
    const EXPECTING: &str = "the table [lateral]";
}

impl Expecting for WithinWritten {
    const EXPECTING: &str = "a table such as { member = 1.15, beams = 1.5, all = 1.3 }";
}

impl Expecting for SizesWritten {
    const EXPECTING: &str = "the table [sizes]";
}
