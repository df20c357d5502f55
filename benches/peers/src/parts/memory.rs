//! Frames from memory, every moment written to memory; one thread and two.

use super::{Field, Measured, SHAPES, Setting, heading, hot};
use crate::assembly::Numbering;
use crate::batch::{Batch, at_once, bytes};
use crate::frames::Shape;
use crate::lapack::Banded;
use crate::peers::{JOINTS, Runner, four};
use crate::table::{Table, figures, percent, rate, ratio};
use crate::{Failed, Joint};
use swaybound::lane::Form;
use swaybound::response::Members;

/// Bytes that one thread's batch reads and writes: twice a third-level cache of 32 MiB.
const MEMORY_BYTES: usize = 64 << 20;

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Key {
    /// The kernel, with this many threads.
    Hot(usize),
    /// The kernel, with this many threads.
    Memory(usize),
    /// LAPACK from memory, one thread.
    Lapack,
}

/// One table for each kind of joint.
pub(super) fn run(setting: &Setting) -> Result<Vec<Table>, Failed> {
    let mut tables = Vec::new();
    for joint in JOINTS {
        let mut table = table(joint);
        for shape in SHAPES {
            eprintln!("memory: {}, {}", heading(joint), shape.name());
            table.row(cells(shape, &measure(setting, joint, shape)?));
        }
        tables.push(table);
    }
    Ok(tables)
}

fn measure(setting: &Setting, joint: Joint, shape: Shape) -> Result<Measured<Key>, Failed> {
    let frames = hot::frames(shape)?;
    let hot = Batch::four(&frames);
    let memory = hot.repeated(MEMORY_BYTES / bytes(shape));
    let mut field = Field::new();
    for threads in [1, 2] {
        field.add(Key::Hot(threads), at_once(workers(&hot, threads, joint, &frames[0])));
        field.add(Key::Memory(threads), at_once(workers(&memory, threads, joint, &frames[0])));
    }
    if let Some(lapack) = &setting.lapack {
        let batch = Batch::new(frames).repeated(memory.frames());
        let peer = Box::new(Banded::new(lapack, Numbering::new(joint, shape.storeys, shape.bays)));
        field.add(Key::Lapack, at_once(vec![(batch, peer)]));
    }
    field.measure(setting.effort)
}

/// `threads` kernels, each with frames of its own.
fn workers(
    batch: &Batch<4>,
    threads: usize,
    joint: Joint,
    example: &Members<1>,
) -> Vec<(Batch<4>, Runner<'static, 4>)> {
    (0..threads).map(|_| (batch.clone(), four(Form::best(), joint, example))).collect()
}

fn table(joint: Joint) -> Table {
    let title = format!("From memory to memory, and two threads, {}", heading(joint));
    let note = format!(
        "Kernel with four frames side by side ({}); {} MiB of members and moments per thread. Two threads: sum of their rates by their own CPU time, both running.",
        Form::best().name(),
        MEMORY_BYTES >> 20
    );
    let heads = [
        "(bays, storeys)",
        "bytes per frame",
        "kernel from memory, frames/s",
        "x LAPACK from memory",
        "of its rate in the cache",
        "two threads in the cache",
        "two threads from memory",
    ];
    Table::new(&title, &note, &heads)
}

fn cells(shape: Shape, measured: &Measured<Key>) -> Vec<String> {
    let memory = Key::Memory(1);
    vec![
        shape.name(),
        figures(bytes(shape) as f64),
        rate(measured.rate(memory)),
        ratio(measured.ratio(memory, Key::Lapack)),
        percent(measured.ratio(memory, Key::Hot(1))),
        ratio(measured.ratio(Key::Hot(2), Key::Hot(1))),
        ratio(measured.ratio(Key::Memory(2), memory)),
    ]
}
