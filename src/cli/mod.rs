//! The command line.

mod complain;

use std::io::Write;
use std::process::ExitCode;
use swaybound::frame::file;

/// Reads the frame file named on the command line and tells what is wrong with it.
pub fn run() -> ExitCode {
    let mut arguments = std::env::args().skip(1);
    let (Some("compare"), Some(path)) = (arguments.next().as_deref(), arguments.next()) else {
        return ExitCode::from(2);
    };
    let Ok(text) = std::fs::read_to_string(&path) else { return ExitCode::from(4) };
    let mut stderr = std::io::stderr();
    match file::parse(&text) {
        Ok(read) => {
            for warning in &read.warnings {
                let _ = writeln!(stderr, "{}", complain::render_warning(warning, &path, &text, false));
            }
            ExitCode::SUCCESS
        }
        Err(fault) => {
            let _ = writeln!(stderr, "{}", complain::render(&fault, &path, &text, false));
            ExitCode::from(2)
        }
    }
}
