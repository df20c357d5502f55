//! Interrupts. While a report is written, the first one asks the run to stop and clear up, and the second one ends it at
//! once; at any other time there is nothing to clear up, and the first one ends it.

use super::failure::Failure;
use super::output;
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::{Mutex, MutexGuard, PoisonError};

/// Exit code after an interrupt.
pub(super) const EXIT_CODE: u8 = 130;

static ASKED: AtomicBool = AtomicBool::new(false);
static HELD_OFF: Mutex<bool> = Mutex::new(false);

/// Listens for interrupts from here on; says what it does unless `quiet`.
pub(super) fn listen(quiet: bool) {
    let heard = move || {
        // Held to the end, so that nothing can be begun that would have to be cleared up.
        let held_off = held_off();
        if ASKED.swap(true, Ordering::Relaxed) || !*held_off {
            output::note(&Failure::Interrupted.render());
            std::process::exit(EXIT_CODE.into());
        }
        if !quiet {
            output::note("stopping after this file; interrupt again to stop at once");
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

/// While it lives, an interrupt does not end the run but is left to [`check`].
pub(super) struct HoldOff(());

impl HoldOff {
    pub(super) fn begin() -> Self {
        *held_off() = true;
        Self(())
    }
}

impl Drop for HoldOff {
    fn drop(&mut self) {
        *held_off() = false;
    }
}

fn held_off() -> MutexGuard<'static, bool> {
    HELD_OFF.lock().unwrap_or_else(PoisonError::into_inner)
}
