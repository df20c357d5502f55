//! Interrupts: the first one asks the run to stop and clear up, the second one ends it at once.

use super::failure::Failure;
use std::sync::atomic::{AtomicBool, Ordering};

/// Exit code after an interrupt.
pub(super) const EXIT_CODE: u8 = 130;

static ASKED: AtomicBool = AtomicBool::new(false);

/// Listens for interrupts from here on.
pub(super) fn listen() {
    let heard = || {
        if ASKED.swap(true, Ordering::Relaxed) {
            std::process::exit(EXIT_CODE.into());
        }
    };
    // Where it cannot be listened for them, an interrupt ends the program as it ends any other.
    drop(ctrlc::set_handler(heard));
}

/// A place where the run may stop.
///
/// # Errors
/// [`Failure::Interrupted`] where the run has been asked to stop.
pub(super) fn check() -> Result<(), Failure> {
    if ASKED.load(Ordering::Relaxed) { Err(Failure::Interrupted) } else { Ok(()) }
}
