//! The only access to the disk: reading with a size limit, and report folders that appear whole or not at all.

mod fault;
mod folder;
mod lock;
mod place;
mod read;
mod siblings;

pub use fault::StoreFault;
pub use folder::ReportFolder;
pub use place::ReportPlace;
pub use read::{INPUT_LIMIT, read_text, write_new};
