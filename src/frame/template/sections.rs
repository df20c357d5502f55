//! The text of the template, section by section.

use super::{TemplateLoad, TemplateOptions, TemplateShape};
use crate::units::{self, Dimension, ReportUnits};

/// The whole file.
pub(super) fn text(options: &TemplateOptions) -> String {
    let schema = if options.schema_line { "#:schema ./frame.schema.json\n" } else { "" };
    let sizes = if options.sizes_known { known(options) } else { unknown(options) };
    [schema.into(), head(options), grid(options), feet(options), sizes, exact(options), lateral(options)].concat()
}

fn head(options: &TemplateOptions) -> String {
    let units = match options.units {
        ReportUnits::Metric => "metric",
        ReportUnits::Us => "us",
    };
    format!(
        r#"# A regular moment frame. Lines that begin with # are comments.
# Quantities are texts in quotes with a unit: "7.2 m", "24 ft", "12'-6\"", "40 kN", "10 kip", "30 GPa", "1200 in4".
# Storeys, floors and bays are counted from the ground up and from the left; floor 1 is on top of storey 1, the top
# floor is the roof. Column lines are A, B, C ... (I and O left out), the outermost are the end lines.

title = {}
report_units = "{units}"           # "metric": kN, m, mm; "us": kip, ft, in

"#,
        quoted(&options.title)
    )
}

fn grid(options: &TemplateOptions) -> String {
    let bays = match options.bay_width.as_slice() {
        [width] => format!("{{ count = {}, width = {} }}", options.bays, quoted(width)),
        widths => list(widths),
    };
    let storeys = match options.storey_height.as_slice() {
        [height] => {
            let first = options.first_storey_height.as_ref();
            let first = first.map_or(String::new(), |first| format!(", first = {}", quoted(first)));
            format!("{{ count = {}, height = {}{first} }}", options.storeys, quoted(height))
        }
        heights => list(heights),
    };
    let [a, b, first, height] = match options.units {
        ReportUnits::Metric => ["7.2 m", "8.4 m", "4.8 m", "3.9 m"],
        ReportUnits::Us => ["24 ft", "30 ft", "16 ft", "13 ft"],
    };
    format!(
        r#"[grid]
# Bay widths from the left: a list such as ["{a}", "{b}", "{a}"], or {{ count = 3, width = "{a}" }}.
bays    = {bays}
# Storey heights from the ground up: a list, or {{ count = 8, height = "{height}", first = "{first}" }}.
storeys = {storeys}

"#
    )
}

fn feet(options: &TemplateOptions) -> String {
    let spring = match options.units {
        ReportUnits::Metric => "150 MN m/rad",
        ReportUnits::Us => "110000 kip ft/rad",
    };
    format!(
        r#"[feet]
# "fixed", "pinned", or {{ spring = "{spring}" }} under each column. Real feet are neither fixed nor pinned.
fixity = "fixed"

"#
    )
}

fn modulus(units: ReportUnits) -> &'static str {
    match units {
        ReportUnits::Metric => "30 GPa",
        ReportUnits::Us => "29000 ksi",
    }
}

fn known(options: &TemplateOptions) -> String {
    let (column_end, column_interior, beam) = match options.units {
        ReportUnits::Metric => concrete(options),
        ReportUnits::Us => steel(options),
    };
    let [shear, shear_area, spring] = match options.units {
        ReportUnits::Metric => ["poisson = 0.2", "shear_area = \"5/6\"", "end_spring = \"80 MN m/rad\""],
        ReportUnits::Us => ["poisson = 0.3", "shear_area = \"20 in2\"", "end_spring = \"60000 kip ft/rad\""],
    };
    let interior = if options.bays > 1 {
        format!("[[columns]]\nstoreys = \"all\"\nlines   = \"interior\"\n{column_interior}\n# {shear_area}\n\n")
    } else {
        String::new()
    };
    format!(
        r#"[material]
modulus = "{}"                  # concrete about 30 GPa, steel 200 GPa or 29000 ksi
# {shear}                     # or shear_modulus; needed beside a shear_area

# THE SIZES BELOW ARE PROPOSALS TO BE REPLACED BY YOURS.
# Each table states the whole size of the members it selects; a later table replaces an earlier one.
# storeys: "all", "2", "1-3", "4-roof"; lines: "all", "end", "interior", "A", "A,D", "B-C".
# Size: inertia = "9e-4 m4" with area = "0.24 m2", or rectangle = {{ width = "400 mm", depth = "600 mm" }}, the depth in
# the frame's plane. stiffness_factor scales the inertia for cracked concrete. Members deform in shear where shear_area is
# given: an area such as "0.2 m2" or "29 in2", or "5/6" of a rectangle.
[[columns]]
storeys = "all"
lines   = "end"
{column_end}
# {shear_area}

{interior}# floors: "all", "1-3", "roof"; bays: "all", "end", "interior", "A-B" for one bay, "A-D" for the bays between.
# Beams take no area: floors are rigid in their own plane.
[[beams]]
floors = "all"
bays   = "all"
{beam}
# {shear_area}
# {spring}   # of both ends; or "hinge"; or {{ left = "hinge", right = "rigid" }}

"#,
        modulus(options.units)
    )
}

/// Square concrete columns that grow with the number of storeys, beams of a twelfth of the mean bay (common practice).
fn concrete(options: &TemplateOptions) -> (String, String, String) {
    let side = 50 * ((400 + 25 * options.storeys.min(40)) / 50);
    let depth = (mean_width(options) * 1e3 / 12.0 / 50.0).ceil().clamp(8.0, 40.0) * 50.0;
    let column =
        |side: usize| format!("rectangle = {{ width = \"{side} mm\", depth = \"{side} mm\" }}\nstiffness_factor = 0.7");
    let beam = format!("rectangle = {{ width = \"350 mm\", depth = \"{depth} mm\" }}\nstiffness_factor = 0.35");
    (column(side), column(side + 100), beam)
}

/// Steel columns that grow with the number of storeys, areas near those of wide flanges, beams that grow with the bay.
fn steel(options: &TemplateOptions) -> (String, String, String) {
    let end = 600 + 100 * options.storeys.min(60);
    let column = |inertia: usize| {
        let area = 0.95 * (inertia as f64).sqrt();
        format!("inertia = \"{inertia} in4\"\narea    = \"{area:.1} in2\"")
    };
    let feet = (mean_width(options) / units::METRES_PER_FOOT).clamp(10.0, 100.0);
    (column(end), column(end * 3 / 2), format!("inertia = \"{:.0} in4\"", (1.9 * feet * feet / 10.0).round() * 10.0))
}

/// Mean bay width, m.
fn mean_width(options: &TemplateOptions) -> f64 {
    let read = |width: &String| units::parse(width, Dimension::Length).unwrap_or(7.2);
    options.bay_width.iter().map(read).sum::<f64>() / options.bay_width.len().max(1) as f64
}

fn unknown(options: &TemplateOptions) -> String {
    let inertia = match options.units {
        ReportUnits::Metric => "9e-3 m4",
        ReportUnits::Us => "1500 in4",
    };
    format!(
        r#"# Sizes are not known yet: [sizes] says what they may be, in place of [[columns]] and [[beams]].
# A key is a number (fixed) or a range [low, high]; a key left out keeps the default shown. To change one, take the #
# away. Narrow ranges give smaller allowances, and they are your judgement of the building.
[sizes]
# beam_to_column   = [0.1, 2.5]    # (I_b/L)/(I_c/h) of a beam to an end column in the lowest storeys
# interior_to_end  = [0.7, 3.5]    # inertia of interior columns over end columns of the same storey
# tier             = 3             # storeys between changes of size
# taper            = [0.6, 1.0]    # column inertia of a tier over the tier below
# beam_taper       = [0.75, 1.0]   # beam inertia of a tier over the tier below
# roof_beam        = [0.5, 1.0]    # roof beams' inertia is further multiplied by it
# span_power       = [0.0, 1.5]    # beam inertia grows with (bay width) to this power
# scatter          = 1.15          # each member alone may be off by this factor either way
# area_per_inertia = 3.5           # a in A = a sqrt(I): 3.5 solid square concrete, 1.0 to 1.6 wide-flange steel
# foot_spring      = [1.0, 20.0]   # foot stiffness over 4 E I_c/h of its column; then take [feet] out
# Forces follow from ratios alone. Drifts need the next key and [material] as well:
# end_column_inertia = "{inertia}"   # of the end columns of the lowest storeys; may be a range
# [material]
# modulus = "{}"

"#,
        modulus(options.units)
    )
}

/// Tables for the exact analyses that may be left out, as comments.
fn exact(options: &TemplateOptions) -> String {
    let [column, beam, load] = match options.units {
        ReportUnits::Metric => ["\"0.3 m\"", "\"0.3 m\"", "900 kN"],
        ReportUnits::Us => ["\"9 in\"", "\"7 in\"", "200 kip"],
    };
    let rigid = if options.sizes_known && options.units == ReportUnits::Metric {
        "# rigid  = 0.5      # a share of the joint, where every member is a rectangle; or lengths:\n"
    } else {
        ""
    };
    let loads = match options.storeys {
        1..=12 => list(&vec![load.to_string(); options.storeys]),
        _ => format!("[\"{load}\", \"{load}\", ...]"),
    };
    let needs = if options.sizes_known { "" } else { "; needs end_column_inertia" };
    format!(
        r#"# The exact analyses can take more into account; take the # away where it applies.
# [joints]           # the parts of members inside the joints do not bend
{rigid}# column = {column:<8} # rigid length at each end of the columns, up to half the beam depth
# beam   = {beam:<8} # rigid length at each end of the beams, up to half the column depth
# [gravity]          # adds a second-order analysis{needs}
# floors = {loads}
# ... the total vertical load of each floor, from the lowest up to the roof, shared to the column lines by tributary width
# or by shares of your own beside it, such as lines = [0.2, 0.3, 0.3, 0.2], which add up to 1.

"#
    )
}

fn lateral(options: &TemplateOptions) -> String {
    let [force, other, shear, pressure, width] = match options.units {
        ReportUnits::Metric => ["40 kN", "60 kN", "900 kN", "1.2 kPa", "6 m"],
        ReportUnits::Us => ["10 kip", "15 kip", "200 kip", "25 psf", "20 ft"],
    };
    let load = match &options.load {
        TemplateLoad::Floors(forces) => format!("floors = {}", list(forces)),
        TemplateLoad::BaseShear { shear, shape } => {
            let shape = match shape {
                TemplateShape::Uniform => "\"uniform\"".into(),
                TemplateShape::Triangular => "\"triangular\"".into(),
                TemplateShape::Power(power) => format!("{{ power = {power:?} }}"),
            };
            format!("base_shear = {}\nshape = {shape}", quoted(shear))
        }
    };
    format!(
        r#"[lateral]
# One of three ways, all forces to the right:
# floors = ["{force}", "{other}", ...] from the lowest floor up to the roof
# base_shear = "{shear}" with shape = "uniform" (the same at every floor), "triangular" (proportional to the floor's
#   height above ground) or {{ power = 1.5 }} (to that height to the power)
# pressure = "{pressure}" with tributary = "{width}", the width of facade that this frame carries
{load}
"#
    )
}

fn list(values: &[String]) -> String {
    let entries: Vec<_> = values.iter().map(|value| quoted(value)).collect();
    format!("[{}]", entries.join(", "))
}

/// A TOML text on one line.
fn quoted(text: &str) -> String {
    let plain: String = text.chars().map(|letter| if letter.is_control() { ' ' } else { letter }).collect();
    format!("\"{}\"", plain.trim().replace('\\', "\\\\").replace('"', "\\\""))
}
