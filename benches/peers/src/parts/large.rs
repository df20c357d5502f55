//! One large frame with column axial strain, alone in its lane.

use super::{Field, Measured, Setting};
use crate::agreement::{compare, exact};
use crate::assembly::Numbering;
use crate::batch::Batch;
use crate::frames::{Shape, random};
use crate::lapack::Banded;
use crate::peers::{Who, one};
use crate::table::{Table, figures, ratio};
use crate::{Failed, Joint};
use swaybound::lane::Form;
use swaybound::response::Members;

const BAYS: usize = 20;
/// Each twice as high as the one before.
const HEIGHTS: [usize; 4] = [50, 100, 200, 400];
const JOINT: Joint = Joint::RiseAndRotation;

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Key {
    /// The kernel, by storeys.
    Kernel(usize),
    /// LAPACK, by storeys.
    Lapack(usize),
}

/// One table.
pub(super) fn run(setting: &Setting) -> Result<Vec<Table>, Failed> {
    eprintln!("large");
    let mut field = Field::new();
    for storeys in HEIGHTS {
        let frame = random(Shape { bays: BAYS, storeys }, 0)?;
        let (members, expected) = (Members::of(&frame), exact(JOINT, &frame)?);
        let batch = Batch::new(vec![members.clone()]);
        let mut kernel = one(Form::best(), JOINT, &members);
        compare(Who::One(Form::best()), &mut *kernel, &frame, &expected)?;
        field.add(Key::Kernel(storeys), batch.clone().contestant(kernel));
        if let Some(lapack) = &setting.lapack {
            let mut lapack = Box::new(Banded::new(lapack, Numbering::new(JOINT, storeys, BAYS)));
            compare(Who::Lapack, &mut *lapack, &frame, &expected)?;
            field.add(Key::Lapack(storeys), batch.contestant(lapack));
        }
    }
    let measured = field.measure(setting.effort)?;
    let note = format!(
        "{BAYS} bays, one frame at a time, {}, one thread. Growth: time over that of half the height.",
        Form::best().name()
    );
    let heads = ["storeys", "kernel, ms", "LAPACK, ms", "x LAPACK", "growth, kernel", "growth, LAPACK"];
    let mut table = Table::new("One large frame with column axial strain", &note, &heads);
    HEIGHTS.iter().for_each(|storeys| table.row(cells(*storeys, &measured)));
    Ok(vec![table])
}

fn cells(storeys: usize, measured: &Measured<Key>) -> Vec<String> {
    let (kernel, lapack) = (Key::Kernel(storeys), Key::Lapack(storeys));
    let milliseconds = |key| measured.rate(key).map_or_else(|| "-".into(), |rate| figures(1e3 / rate.median));
    vec![
        storeys.to_string(),
        milliseconds(kernel),
        milliseconds(lapack),
        ratio(measured.ratio(kernel, lapack)),
        ratio(measured.ratio(Key::Kernel(storeys / 2), kernel)),
        ratio(measured.ratio(Key::Lapack(storeys / 2), lapack)),
    ]
}
