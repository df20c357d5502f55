//! The members and feet of the frame, from either way of stating sizes.

use super::fault::{FaultKind, FileFault};
use super::feet::CheckedFeet;
use super::gravity::Gravity;
use super::grid::Grid;
use super::joints::{Joints, Zones};
use super::material::{self, MODULUS, Material};
use super::members::Members;
use super::scalar::Table;
use super::source::Source;
use super::warning::FileWarning;
use super::written::{SizesWritten, Written};
use super::{Echo, SizeStatement, feet, members, model};
use crate::frame::options::{AnalysisOptions, EndSpring};
use crate::frame::{Feet, Section, SizeSource};
use std::ops::Range;
use toml::Spanned;

/// What is stated of the frame beside its grid and its sizes.
#[derive(Debug)]
pub(super) struct Stated {
    pub material: Option<Material>,
    pub feet: CheckedFeet,
    pub joints: Option<Joints>,
    pub gravity: Option<Gravity>,
}

impl Stated {
    pub fn modulus(&self) -> Option<f64> {
        self.material.as_ref().map(|material| material.modulus)
    }

    fn shear_modulus(&self) -> Option<f64> {
        self.material.as_ref().and_then(|material| material.shear)
    }
}

/// Members and feet, and what is to be told about them.
#[derive(Debug)]
pub(super) struct Sized {
    pub columns: Vec<Section>,
    pub beams: Vec<Section>,
    pub feet: Feet,
    /// Options of the members; vertical loads are not in them.
    pub options: AnalysisOptions,
    pub source: SizeSource,
    pub statement: SizeStatement,
    pub echo: Vec<Echo>,
    pub warnings: Vec<FileWarning>,
    /// Where a fault of the sizes as a whole is shown.
    pub span: Range<usize>,
}

/// Checks sizes; `end` is the end of the text.
pub(super) fn sized(
    source: Source,
    written: &Written,
    grid: &Grid,
    stated: &Stated,
    end: Range<usize>,
) -> Result<Sized, FileFault> {
    match &written.sizes {
        Some(sizes) => unknown_sizes(source, written, sizes, grid, stated),
        None => known_sizes(source, written, grid, stated, end),
    }
}

fn known_sizes(
    source: Source,
    written: &Written,
    grid: &Grid,
    stated: &Stated,
    end: Range<usize>,
) -> Result<Sized, FileFault> {
    let missing = |what, help| FileFault::new(FaultKind::Missing { what, help }, end.clone());
    let columns = written.columns.as_ref().filter(|tables| !tables.get_ref().0.is_empty());
    let beams = written.beams.as_ref().filter(|tables| !tables.get_ref().0.is_empty());
    let columns = columns.ok_or_else(|| {
        missing("the size of the columns", "add [[columns]] with an inertia or a rectangle; or, while sizes are unknown, [sizes] in place of [[columns]] and [[beams]]")
    })?;
    let beams = beams.ok_or_else(|| {
        missing("the size of the beams", "add [[beams]] with an inertia or a rectangle; or, while sizes are unknown, [sizes] in place of [[columns]] and [[beams]]")
    })?;
    let made = members::columns(source, &columns.get_ref().0, grid)?;
    let made_beams = members::beams(source, &beams.get_ref().0, grid)?;
    let material = stated.material.as_ref().ok_or_else(|| missing("the modulus of elasticity", MODULUS))?;
    material::needs_shear(material, first_shear_area(written))?;
    let zones = stated.joints.as_ref().map(|joints| joints.zones(&made, &made_beams, grid.bays.lengths.len()));
    let options = known_options(&made, &made_beams, stated, zones.transpose()?);
    let within = model::within(source, &written.within)?;
    let mut echo = made.echo;
    echo.extend(made_beams.echo);
    echo.extend(
        written
            .within
            .as_ref()
            .map(|table| Echo { what: "sizes within".into(), typed: model::echo_within(source, table.get_ref()) }),
    );
    Ok(Sized {
        columns: made.sections,
        beams: made_beams.sections,
        feet: stated.feet.feet.clone(),
        options,
        source: SizeSource::Stated,
        statement: SizeStatement::Stated { within },
        echo,
        warnings: made.warnings.into_iter().chain(made_beams.warnings).collect(),
        span: made.without_area.unwrap_or(columns.span()),
    })
}

/// Place of the first shear area in the file.
fn first_shear_area(written: &Written) -> Option<Range<usize>> {
    let columns = written.columns.iter().flat_map(|tables| &tables.get_ref().0);
    let beams = written.beams.iter().flat_map(|tables| &tables.get_ref().0);
    let areas = columns.map(|table| &table.get_ref().shear_area).chain(beams.map(|table| &table.get_ref().shear_area));
    areas.flatten().map(Spanned::span).next()
}

fn known_options(columns: &Members, beams: &Members, stated: &Stated, zones: Option<Zones>) -> AnalysisOptions {
    let none = |members: &Members| vec![[0.0; 2]; members.sections.len()];
    let [column_zones, beam_zones] = zones.unwrap_or_else(|| [none(columns), none(beams)]);
    AnalysisOptions {
        shear_modulus: stated.shear_modulus(),
        column_shear_area: columns.shear_areas.clone(),
        beam_shear_area: beams.shear_areas.clone(),
        beam_springs: beams.springs.clone(),
        column_zones,
        beam_zones,
        gravity: None,
    }
}

fn unknown_sizes(
    source: Source,
    written: &Written,
    sizes: &Spanned<Table<SizesWritten>>,
    grid: &Grid,
    stated: &Stated,
) -> Result<Sized, FileFault> {
    no_known_sizes(written, sizes)?;
    model::one_statement(&written.within, sizes)?;
    let table = sizes.get_ref();
    if let Some(ratio) = &table.foot_spring {
        feet::one_statement(&stated.feet, ratio.span())?;
    }
    if let Some(joints) = &stated.joints {
        joints.needs_depth("members under [sizes]", sizes.span(), "sizes are unknown here")?;
    }
    let modulus = stated.modulus();
    let model = model::model(source, table, grid.storeys.lengths.len())?;
    let real = model.end_column_inertia.is_some();
    if let (Some(inertia), false) = (&table.end_column_inertia, modulus.is_some()) {
        let kind = FaultKind::Missing {
            what: "the modulus of elasticity, which a real inertia needs beside it,",
            help: MODULUS,
        };
        return Err(FileFault::new(kind, inertia.span()));
    }
    if let (Some(spring), false) = (stated.feet.spring(), real) {
        return Err(FileFault::new(FaultKind::SpringNeedsInertia, spring));
    }
    if let (Some(gravity), false) = (&stated.gravity, real) {
        return Err(FileFault::new(FaultKind::GravityNeedsInertia, gravity.span.clone()));
    }
    let (bays, storeys) = (&grid.bays.lengths, &grid.storeys.lengths);
    let assumed = model.assumed();
    let made = assumed.sections(bays, storeys, |_| 1.0);
    let springs = assumed.foot_springs(&made.columns[..=bays.len()], modulus.unwrap_or(1.0), storeys[0]);
    Ok(Sized {
        options: unknown_options(stated, storeys.len(), bays.len()),
        columns: made.columns,
        beams: made.beams,
        feet: springs.map_or_else(|| stated.feet.feet.clone(), Feet::Springs),
        source: if real { SizeSource::Assumed } else { SizeSource::AssumedRelative },
        statement: SizeStatement::Model(model),
        echo: model::echo(source, table, &model),
        warnings: model::growing(table, &model),
        span: sizes.span(),
    })
}

fn unknown_options(stated: &Stated, storeys: usize, bays: usize) -> AnalysisOptions {
    let (columns, beams) = (storeys * (bays + 1), storeys * bays);
    let zones = stated.joints.as_ref().map(|joints| joints.by_length(storeys, bays));
    let [column_zones, beam_zones] = zones.unwrap_or_else(|| [vec![[0.0; 2]; columns], vec![[0.0; 2]; beams]]);
    AnalysisOptions {
        shear_modulus: stated.shear_modulus(),
        column_shear_area: vec![None; columns],
        beam_shear_area: vec![None; beams],
        beam_springs: vec![[EndSpring::Rigid; 2]; beams],
        column_zones,
        beam_zones,
        gravity: None,
    }
}

fn no_known_sizes(written: &Written, sizes: &Spanned<Table<SizesWritten>>) -> Result<(), FileFault> {
    let columns = written
        .columns
        .as_ref()
        .and_then(|tables| tables.get_ref().0.first().map(|table| (table.span(), "[[columns]]")));
    let beams =
        written.beams.as_ref().and_then(|tables| tables.get_ref().0.first().map(|table| (table.span(), "[[beams]]")));
    let Some((span, second)) = columns.or(beams) else { return Ok(()) };
    let kind = FaultKind::Conflict {
        first: "[sizes]",
        second,
        help: "keep [[columns]] and [[beams]] where sizes are known, [sizes] alone where they are not",
    };
    Err(FileFault::new(kind, span).beside(sizes.span(), "given here"))
}
