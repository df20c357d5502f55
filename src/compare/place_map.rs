//! The places of all frames of one shape, and which statistics are kept of them.

use super::places::{Class, Place};
use crate::frame::Member;
use crate::response::Quantity;
use std::ops::Range;

/// Which quantities are judged.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Scope {
    /// Design moments of columns and beams.
    DesignMoments,
    /// Design moments, end moments and shears of columns and beams, axial forces of columns, drifts of storeys.
    Everything,
}

/// One quantity at one place.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Slot {
    /// The place.
    pub place: Place,
    /// The quantity.
    pub quantity: Quantity,
    /// How many members of a frame are judged together there.
    pub members: usize,
}

/// The places of frames of one shape. Made once; then it costs a batch nothing to ask where a member belongs.
#[derive(Debug, Clone, PartialEq)]
pub struct PlaceMap {
    pub(super) columns: Kind,
    pub(super) beams: Kind,
    pub(super) drifts: Kind,
    slots: Vec<Slot>,
}

/// Members of one kind: as many levels up the height, and as many on each.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Kind {
    pub(super) levels: usize,
    pub(super) across: usize,
    pub(super) quantities: Vec<Quantity>,
    pub(super) bands: Vec<Levels>,
    /// Number of places.
    places: usize,
    /// Number of the first slot.
    first: usize,
}

/// The levels of one band.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Levels {
    pub(super) levels: Range<usize>,
    /// Its places: that of the first member, then, where there are any, that of the interior ones.
    places: Vec<Place>,
    /// Which places of the kind they are.
    first: usize,
}

impl Kind {
    /// Numbers of the slots of a quantity, by its place among the kind's quantities, in a band: of the outer members and of
    /// the interior ones, which there may not be.
    #[inline(always)]
    pub(super) fn slots_of(&self, quantity: usize, band: &Levels) -> [usize; 2] {
        let outer = self.first + quantity * self.places + band.first;
        [outer, outer + 1]
    }

    /// The members of a frame by band and class; `member` by level and by place across.
    fn of(
        [storeys, bays]: [usize; 2],
        across: usize,
        quantities: &[Quantity],
        member: fn(usize, usize) -> Member,
    ) -> Self {
        let place = |level, index| Place::within(storeys, bays, member(level, index));
        let interior = (0..across).find(|index| place(0, *index).class == Class::Interior);
        let mut bands: Vec<Levels> = Vec::new();
        for level in 0..storeys {
            match bands.last_mut() {
                Some(band) if band.places[0] == place(level, 0) => band.levels.end = level + 1,
                _ => {
                    let inner = interior.map(|index| place(level, index));
                    let places = [place(level, 0)].into_iter().chain(inner).collect();
                    let first = bands.iter().map(|band| band.places.len()).sum();
                    bands.push(Levels { levels: level..level + 1, places, first });
                }
            }
        }
        let places = bands.iter().map(|band| band.places.len()).sum();
        Self { levels: storeys, across, quantities: quantities.to_vec(), bands, places, first: 0 }
    }

    fn slots(&self) -> impl Iterator<Item = Slot> {
        let places = || self.bands.iter().flat_map(|band| band.places.iter().map(|place| (band.levels.len(), *place)));
        self.quantities.iter().flat_map(move |quantity| {
            places().map(|(levels, place)| {
                let interior =
                    (0..self.across).filter(|index| Class::of(*index, self.across) == Class::Interior).count();
                let across = if place.class == Class::Interior { interior } else { self.across - interior };
                Slot { place, quantity: *quantity, members: levels * across }
            })
        })
    }
}

impl PlaceMap {
    /// The places of frames of `storeys` storeys and `bays` bays.
    pub fn new(storeys: usize, bays: usize, scope: Scope) -> Self {
        use Quantity::{Axial, DesignMoment, Drift, MomentFoot, MomentHead, MomentLeft, MomentRight, Shear};
        let (columns, beams, drifts): (&[_], &[_], &[_]) = match scope {
            Scope::DesignMoments => (&[DesignMoment], &[DesignMoment], &[]),
            Scope::Everything => (
                &[DesignMoment, MomentFoot, MomentHead, Shear, Axial],
                &[DesignMoment, MomentLeft, MomentRight, Shear],
                &[Drift],
            ),
        };
        let shape = [storeys, bays];
        let mut map = Self {
            columns: Kind::of(shape, bays + 1, columns, |storey, line| Member::Column { storey, line }),
            beams: Kind::of(shape, bays, beams, |floor, bay| Member::Beam { floor, bay }),
            drifts: Kind::of(shape, 1, drifts, |storey, _| Member::Storey { storey }),
            slots: Vec::new(),
        };
        for kind in [&mut map.columns, &mut map.beams, &mut map.drifts] {
            kind.first = map.slots.len();
            map.slots.extend(kind.slots());
        }
        map
    }

    /// What each number of [`super::factors::Factors`] belongs to: columns, beams, storeys; quantity by quantity; places from
    /// the ground up, end before interior.
    pub fn slots(&self) -> &[Slot] {
        &self.slots
    }
}
