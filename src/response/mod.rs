//! What an analysis is given and what it answers, in one shape for every method.
//!
//! [`Members`] and [`Forces`] are the lane form, `W` frames side by side; [`Response`] is one frame's answer with
//! everything a reader needs; [`statics`] judges any response by equilibrium alone.

mod forces;
mod members;
mod method;
mod quantity;
mod rows;
mod single;
pub mod statics;
mod worksheet;

pub use forces::{Forces, Work, axial_from_beam_shears};
pub use members::Members;
pub use method::{Caution, Entry, Fit, Gives, Info, Method};
pub use quantity::{Quantity, Value};
pub use rows::{ForceRows, MemberRows, WorkRows};
pub use single::{BeamForces, ColumnForces, Faces, Movement, Response};
pub use worksheet::{Amount, SheetCell, SheetColumn, Step, Worksheet};
