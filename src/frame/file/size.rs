//! The size of the members of one table: inertia and area or a rectangle, shear area, springs at beam ends.

use super::fault::{FaultKind, FileFault};
use super::scalar::{Scalar, Table, TextOr};
use super::source::{Source, require};
use super::warning::{FileWarning, SIDE, WarningKind};
use super::written::{BeamsWritten, ColumnsWritten, EndSpringsWritten, Maybe, RectangleWritten};
use crate::frame::Section;
use crate::frame::options::EndSpring;
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;

/// A section and how it was typed.
#[derive(Debug)]
pub(super) struct Size {
    pub section: Section,
    /// Width and depth of a rectangle, m.
    pub sides: Option<[f64; 2]>,
    pub typed: String,
}

impl Size {
    fn rectangle([width, depth]: [f64; 2], typed: String, with_area: bool) -> Self {
        let area = with_area.then_some(width * depth);
        let section = Section { inertia: width * depth * depth * depth / 12.0, area };
        Self { section, sides: Some([width, depth]), typed }
    }

    /// Cross-section area where it is known, m2.
    fn whole_area(&self) -> Option<f64> {
        self.section.area.or(self.sides.map(|[width, depth]| width * depth))
    }
}

const SIZE_HELP: &str = "each table states the whole size of the members it selects: add inertia = \"9e-4 m4\" or rectangle = { width = \"400 mm\", depth = \"600 mm\" }";

/// Size of the columns of a table at `span`.
pub(super) fn of_columns(
    source: Source,
    table: &ColumnsWritten,
    span: Range<usize>,
    warnings: &mut Vec<FileWarning>,
) -> Result<Size, FileFault> {
    let keep_one = |second: &Spanned<Scalar>, name| {
        let first = table.rectangle.as_ref().map_or(0..0, Spanned::span);
        conflict(
            "rectangle",
            name,
            "a rectangle gives both inertia and area: keep it, or inertia with area",
            first,
            second.span(),
        )
    };
    match (&table.rectangle, &table.inertia, &table.area) {
        (Some(_), Some(inertia), _) => Err(keep_one(inertia, "inertia")),
        (Some(_), None, Some(area)) => Err(keep_one(area, "area")),
        (Some(rectangle), None, None) => {
            let (sides, typed) = sides(source, rectangle, warnings)?;
            Ok(Size::rectangle(sides, typed, true))
        }
        (None, inertia, area) => {
            let inertia = require(inertia, span, "the size of these columns", SIZE_HELP)?;
            let mut typed = format!("inertia {}", source.typed(inertia.span()));
            let mut section = Section { inertia: source.positive(inertia, Dimension::Inertia)?, area: None };
            if let Some(area) = area {
                section.area = Some(source.positive(area, Dimension::Area)?);
                typed += &format!(", area {}", source.typed(area.span()));
            }
            Ok(Size { section, sides: None, typed })
        }
    }
}

/// Size of the beams of a table at `span`.
pub(super) fn of_beams(
    source: Source,
    table: &BeamsWritten,
    span: Range<usize>,
    warnings: &mut Vec<FileWarning>,
) -> Result<Size, FileFault> {
    match (&table.rectangle, &table.inertia) {
        (Some(first), Some(second)) => Err(conflict(
            "rectangle",
            "inertia",
            "a rectangle gives the inertia: keep one of the two",
            first.span(),
            second.span(),
        )),
        (Some(rectangle), None) => {
            let (sides, typed) = sides(source, rectangle, warnings)?;
            Ok(Size::rectangle(sides, typed, false))
        }
        (None, inertia) => {
            let inertia = require(inertia, span, "the size of these beams", SIZE_HELP)?;
            if let Ok(0.0) = source.quantity(inertia, Dimension::Inertia) {
                let help = "a beam that carries no moment takes its inertia and stiffness_factor = 0";
                return Err(source.out_of_range(inertia.span(), "an inertia must be more than 0", help));
            }
            let typed = format!("inertia {}", source.typed(inertia.span()));
            let section = Section { inertia: source.positive(inertia, Dimension::Inertia)?, area: None };
            Ok(Size { section, sides: None, typed })
        }
    }
}

pub(super) fn conflict(
    first: &'static str,
    second: &'static str,
    help: &'static str,
    at: Range<usize>,
    span: Range<usize>,
) -> FileFault {
    FileFault::new(FaultKind::Conflict { first, second, help }, span).beside(at, "given here")
}

/// Width and depth, m, and how they were typed.
fn sides(
    source: Source,
    rectangle: &Spanned<Table<RectangleWritten>>,
    warnings: &mut Vec<FileWarning>,
) -> Result<([f64; 2], String), FileFault> {
    let help = "write rectangle = { width = \"400 mm\", depth = \"600 mm\" }, the depth in the frame's plane";
    let width = require(&rectangle.get_ref().width, rectangle.span(), "the width of the rectangle", help)?;
    let depth = require(&rectangle.get_ref().depth, rectangle.span(), "the depth of the rectangle", help)?;
    let mut lengths = [0.0; 2];
    for (length, (side, name)) in lengths.iter_mut().zip([(width, "the width"), (depth, "the depth")]) {
        *length = source.positive(side, Dimension::Length)?;
        warnings.extend(SIDE.check(*length, &format!("{name} of the rectangle"), source, side.span()));
    }
    Ok((lengths, format!("rectangle {} x {}", source.typed(width.span()), source.typed(depth.span()))))
}

/// The share of a solid rectangle that is effective in shear.
const RECTANGLE_SHARE: f64 = 5.0 / 6.0;
const RECTANGLE_WORD: &str = "5/6";

/// The effective shear area, m2.
pub(super) fn shear_area(
    source: Source,
    value: &Spanned<Scalar>,
    size: &Size,
    warnings: &mut Vec<FileWarning>,
) -> Result<f64, FileFault> {
    let typed = source.typed(value.span());
    let plain: String = typed.split_whitespace().collect();
    let fraction = |(top, bottom): (&str, &str)| top.parse::<u32>().is_ok() && bottom.parse::<u32>().is_ok();
    if plain == RECTANGLE_WORD && matches!(value.get_ref(), Scalar::Text(_)) {
        let Some([width, depth]) = size.sides else {
            let help = "give rectangle in place of inertia, or write the shear area like \"0.2 m2\" or \"29 in2\"";
            return Err(source.out_of_range(value.span(), "that share is one of a rectangle, and none is given", help));
        };
        return Ok(RECTANGLE_SHARE * width * depth);
    }
    if plain.split_once('/').is_some_and(fraction) {
        let help = "write \"5/6\", or the shear area itself like \"0.2 m2\" or \"29 in2\"";
        return Err(source.out_of_range(value.span(), "5/6, that of a solid rectangle, is the only share known", help));
    }
    let area = source.positive(value, Dimension::Area)?;
    if size.whole_area().is_some_and(|whole| area > whole) {
        let usual = "no more than the whole area of the section";
        let kind = WarningKind::Unusual { what: "the shear area".into(), typed, usual };
        warnings.push(FileWarning::new(kind, value.span()));
    }
    Ok(area)
}

/// Springs at the left and right end of a beam, and how they were typed.
pub(super) fn end_springs(
    source: Source,
    value: &Spanned<TextOr<EndSpringsWritten>>,
) -> Result<([EndSpring; 2], String), FileFault> {
    match value.get_ref() {
        TextOr::Text(text) => {
            let both = Spanned::new(value.span(), Scalar::Text(text.clone()));
            Ok(([end_spring(source, &both)?; 2], source.typed(value.span())))
        }
        TextOr::Table(table) => {
            let one = |end: &Maybe<Scalar>| match end {
                Some(end) => Ok((end_spring(source, end)?, source.typed(end.span()))),
                None => Ok((EndSpring::Rigid, "rigid".into())),
            };
            let (left, right) = (one(&table.left)?, one(&table.right)?);
            Ok(([left.0, right.0], format!("left {}, right {}", left.1, right.1)))
        }
    }
}

fn end_spring(source: Source, value: &Spanned<Scalar>) -> Result<EndSpring, FileFault> {
    let Scalar::Text(text) = value.get_ref() else {
        return source.quantity(value, Dimension::RotationalStiffness).map(EndSpring::Spring);
    };
    let first = text.trim_start().chars().next();
    match text.as_str() {
        "rigid" => Ok(EndSpring::Rigid),
        "hinge" => Ok(EndSpring::Hinge),
        _ if first.is_some_and(char::is_alphabetic) && !text.starts_with("inf") && !text.starts_with("nan") => source
            .choice(text, value.span(), &["rigid", "hinge"], Some("a stiffness such as \"80 MN m/rad\""))
            .map(|_| EndSpring::Rigid),
        _ => {
            if let Ok(0.0) = source.quantity(value, Dimension::RotationalStiffness) {
                let help = "an end that turns freely takes \"hinge\"";
                return Err(source.out_of_range(value.span(), "the spring of a beam end must be more than 0", help));
            }
            source.positive(value, Dimension::RotationalStiffness).map(EndSpring::Spring)
        }
    }
}
