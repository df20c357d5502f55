//! Quick methods, one file each in one shape. A new method is one file and one line in [`METHODS`].

pub mod cantilever;
mod chain;
mod chord;
pub mod d_value;
pub mod factor;
mod fit;
mod group;
mod march;
pub mod portal;
pub mod portal_tributary;
pub mod racking;
pub mod racking_chord;
mod sheet;
pub mod substitute_frame;
mod sums;
pub mod wilbur;
pub mod wilbur_chord;

use crate::frame::{Feet, Frame};
use crate::response::{Caution, Entry, Fit};

/// Every quick method, in the order of reports.
pub static METHODS: [Entry; 10] = [
    Entry::of::<portal::Portal>(),
    Entry::of::<portal_tributary::PortalTributary>(),
    Entry::of::<cantilever::Cantilever>(),
    Entry::of::<factor::Factor>(),
    Entry::of::<d_value::DValue>(),
    Entry::of::<substitute_frame::SubstituteFrame>(),
    Entry::of::<racking::Racking>(),
    Entry::of::<wilbur::Wilbur>(),
    Entry::of::<racking_chord::RackingChord>(),
    Entry::of::<wilbur_chord::WilburChord>(),
];

/// The method called `id`.
pub fn find(id: &str) -> Option<&'static Entry> {
    METHODS.iter().find(|entry| entry.info.id == id)
}

/// Cautions that hold for every method that knows only fixed and pinned feet and states a range of use.
fn range_fit(frame: &Frame, most_storeys: usize, most_slender: f64, more: impl IntoIterator<Item = Caution>) -> Fit {
    let mut cautions = Vec::new();
    if let Feet::Springs(_) = frame.feet() {
        let text = "foot springs are treated as fixed feet: the ground storey's inflection point is put at mid-height";
        cautions.push(Caution(text.into()));
    }
    if frame.storeys() > most_storeys {
        let text = format!(
            "the frame has {} storeys; the literature claims the method up to about {most_storeys}",
            frame.storeys()
        );
        cautions.push(Caution(text));
    }
    let slenderness = frame.height() / frame.width();
    if slenderness > most_slender {
        let text = format!(
            "height over width is {slenderness:.1}; the literature claims the method up to about {most_slender:.0}"
        );
        cautions.push(Caution(text));
    }
    cautions.extend(more);
    if cautions.is_empty() { Fit::Suits } else { Fit::Doubtful(cautions) }
}
