//! The machine and the tools, for the head of the tables.

use crate::lapack::{HINT, Lapack};
use std::fs::read_to_string;
use std::process::Command;
use std::thread::available_parallelism;

/// Processor, cores, caches and compiler, in one line.
pub fn describe() -> String {
    let cores = available_parallelism().map_or(1, usize::from);
    let caches: Vec<_> = (0..8).filter_map(cache).collect();
    format!("{}, {cores} cores; caches {}; {}", processor(), caches.join(", "), compiler())
}

/// What the LAPACK in use says of itself, and what steers it.
pub fn lapack(lapack: Option<&Lapack>) -> String {
    let Some(lapack) = lapack else { return HINT.into() };
    let steered = ["OPENBLAS_CORETYPE", "OPENBLAS_L2_SIZE"].map(|name| match std::env::var(name) {
        Ok(value) => format!("{name}={value}"),
        Err(_) => format!("{name} unset"),
    });
    format!("LAPACK: {}; kernels for {}; {}; one thread", lapack.build, lapack.core, steered.join(", "))
}

fn processor() -> String {
    let text = read_to_string("/proc/cpuinfo").unwrap_or_default();
    let value = |name| text.lines().find(|line| line.starts_with(name)).and_then(|line| line.split(": ").nth(1));
    match (value("model name"), value("cpu family"), value("model\t")) {
        (Some(name), Some(family), Some(model)) => format!("{name} (family {family}, model {model})"),
        (Some(name), ..) => name.into(),
        _ => std::env::consts::ARCH.into(),
    }
}

/// Level, kind and size of a cache of the first core.
fn cache(index: usize) -> Option<String> {
    let entry = |name| {
        let text = read_to_string(format!("/sys/devices/system/cpu/cpu0/cache/index{index}/{name}")).ok()?;
        Some(text.trim().to_owned())
    };
    let kind = entry("type")?;
    (kind != "Instruction").then_some(())?;
    Some(format!("L{} {}", entry("level")?, entry("size")?))
}

fn compiler() -> String {
    let said = Command::new("rustc").arg("--version").output().ok();
    let said = said.and_then(|output| String::from_utf8(output.stdout).ok());
    said.map_or_else(|| "rustc unknown".into(), |text| text.trim().to_owned())
}
