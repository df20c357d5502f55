//! Frames whose members and moments stay in the cache, one thread.

use super::{Field, Measured, SHAPES, Setting, heading};
use crate::batch::{Batch, bytes};
use crate::flops::operations;
use crate::frames::{Shape, members};
use crate::peak;
use crate::peers::{JOINTS, Who, forms, four_by_four, one_by_one};
use crate::table::{Table, percent, rate, ratio};
use crate::{Failed, Joint};
use swaybound::lane::Form;
use swaybound::response::Members;

/// Members and moments of a batch take at most this many bytes, a share of a second-level cache.
const HOT_BYTES: usize = 256 << 10;
/// No batch holds more frames.
const MOST_FRAMES: usize = 64;

/// Who takes part; `None` is the peak of the arithmetic.
type Key = Option<Who>;

/// The members of as many frames as stay in the cache, a multiple of four.
pub(super) fn frames(shape: Shape) -> Result<Vec<Members<1>>, Failed> {
    let frames = (HOT_BYTES / bytes(shape)).clamp(4, MOST_FRAMES);
    members(shape, frames - frames % 4)
}

/// Two tables for each kind of joint: the kernel beside the others, and its forms.
pub(super) fn run(setting: &Setting) -> Result<Vec<Table>, Failed> {
    let mut tables = Vec::new();
    for joint in JOINTS {
        let mut others = beside_others(joint);
        let mut forms = in_forms(joint);
        let mut noise = 0.0_f64;
        for shape in SHAPES {
            eprintln!("hot: {}, {}", heading(joint), shape.name());
            let measured = measure(setting, joint, shape)?;
            noise = noise.max(measured.noise());
            others.row(other_cells(operations(joint, shape)?, shape, &measured));
            forms.row(form_cells(shape, &measured));
        }
        others
            .add_note(&format!("Rates scatter by up to {:.0} % (half the distance of the quartiles).", 100.0 * noise));
        tables.extend([others, forms]);
    }
    Ok(tables)
}

fn measure(setting: &Setting, joint: Joint, shape: Shape) -> Result<Measured<Key>, Failed> {
    let frames = frames(shape)?;
    let (ones, fours) = (Batch::new(frames.clone()), Batch::four(&frames));
    // A pass of the dense factorisation over all frames would last longer than everything else.
    let few = Batch::new(frames[..4].to_vec());
    let mut field = Field::new();
    field.add(None, peak::contestant(Form::best()));
    for (who, peer) in one_by_one(setting.lapack.as_ref(), joint, &frames[0])? {
        let batch = if who == Who::Nalgebra { &few } else { &ones };
        field.add(Some(who), batch.clone().contestant(peer));
    }
    for (who, peer) in four_by_four(joint, &frames[0]) {
        field.add(Some(who), fours.clone().contestant(peer));
    }
    field.measure(setting.effort)
}

fn beside_others(joint: Joint) -> Table {
    let note = format!(
        "Frames per second, kernel with four frames side by side ({}), and its ratio to the others, median (quartiles). Members and moments in the cache, one thread.",
        Form::best().name()
    );
    let heads = [
        "(bays, storeys)",
        "kernel",
        "LAPACK",
        "x LAPACK",
        "x nalgebra dense",
        "x faer sparse",
        "operations per frame",
        "share of peak",
    ];
    Table::new(&format!("Kernel and general-purpose linear algebra, {}", heading(joint)), &note, &heads)
}

fn other_cells(operations: usize, shape: Shape, measured: &Measured<Key>) -> Vec<String> {
    let kernel = Some(Who::Four(Form::best()));
    let operations = operations as f64;
    let share = measured.ratio(kernel, None).map(|share| share.times(operations));
    let mut cells = vec![shape.name(), rate(measured.rate(kernel)), rate(measured.rate(Some(Who::Lapack)))];
    cells.extend([Who::Lapack, Who::Nalgebra, Who::Faer].map(|who| ratio(measured.ratio(kernel, Some(who)))));
    cells.extend([format!("{operations}"), percent(share)]);
    cells
}

/// The kernel's forms, four frames at a time first.
fn kernels() -> Vec<Who> {
    let (four, one) = (forms().into_iter().map(Who::Four), forms().into_iter().map(Who::One));
    four.chain([Who::Refined(Form::best())]).chain(one).collect()
}

fn in_forms(joint: Joint) -> Table {
    let names: Vec<_> = kernels().into_iter().map(Who::name).collect();
    let mut heads = vec!["(bays, storeys)"];
    heads.extend(names.iter().map(String::as_str));
    let title = format!("Forms of the kernel, {}", heading(joint));
    Table::new(&title, "Ratio to LAPACK, measured in the same rounds as above.", &heads)
}

fn form_cells(shape: Shape, measured: &Measured<Key>) -> Vec<String> {
    let cell = |who| ratio(measured.ratio(Some(who), Some(Who::Lapack)));
    std::iter::once(shape.name()).chain(kernels().into_iter().map(cell)).collect()
}
