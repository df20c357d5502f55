//! Places: members that are judged together, by band up the height and class across the width.

use crate::frame::{Frame, Member, MemberKind};

/// A band of storeys (for beams: of floors). In low frames ground wins, then roof, then second.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Band {
    /// The lowest storey, or first floor.
    Ground,
    /// The second storey or floor.
    Second,
    /// All storeys between.
    Middle,
    /// The storey under the top one.
    BelowRoof,
    /// The top storey, or roof.
    Roof,
}

/// Where a member stands across the width.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Class {
    /// Columns on the outermost lines; beams of the outermost bays, a single bay included.
    End,
    /// The others.
    Interior,
    /// A whole storey.
    Whole,
}

/// Members that are judged together.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Place {
    /// Columns, beams or storeys.
    pub kind: MemberKind,
    /// Band up the height.
    pub band: Band,
    /// Class across the width.
    pub class: Class,
}

impl Band {
    /// The band of a storey or floor, counted from 0, in a frame of `storeys` storeys.
    pub fn of(storey: usize, storeys: usize) -> Self {
        match storey {
            0 => Self::Ground,
            last if last + 1 == storeys => Self::Roof,
            1 => Self::Second,
            last if last + 2 == storeys => Self::BelowRoof,
            _ => Self::Middle,
        }
    }

    /// Name in files; beams are called by floor.
    pub fn id(self, kind: MemberKind) -> &'static str {
        match (self, kind) {
            (Self::Ground, MemberKind::Beam) => "first",
            (Self::Ground, _) => "ground",
            (Self::Second, _) => "second",
            (Self::Middle, _) => "middle",
            (Self::BelowRoof, _) => "below-roof",
            (Self::Roof, _) => "roof",
        }
    }

    /// Name in sentences.
    pub fn words(self, kind: MemberKind) -> &'static str {
        match (self, kind) {
            (Self::Ground, MemberKind::Beam) => "first floor",
            (Self::Second, MemberKind::Beam) => "second floor",
            (Self::Middle, MemberKind::Beam) => "middle floors",
            (Self::BelowRoof, MemberKind::Beam) => "floor below the roof",
            (Self::Roof, MemberKind::Beam) => "roof",
            (Self::Ground, _) => "ground storey",
            (Self::Second, _) => "second storey",
            (Self::Middle, _) => "middle storeys",
            (Self::BelowRoof, _) => "storey below the top one",
            (Self::Roof, _) => "top storey",
        }
    }
}

impl Class {
    /// The class of a column line or bay, counted from 0, among `count` of them.
    #[inline(always)]
    pub fn of(index: usize, count: usize) -> Self {
        if index == 0 || index + 1 == count { Self::End } else { Self::Interior }
    }

    /// Name in files, `-` for whole storeys.
    pub fn id(self) -> &'static str {
        match self {
            Self::End => "end",
            Self::Interior => "interior",
            Self::Whole => "-",
        }
    }
}

impl Place {
    /// The place a member belongs to.
    pub fn of(frame: &Frame, member: Member) -> Self {
        Self::within(frame.storeys(), frame.bays(), member)
    }

    /// The place a member belongs to in any frame of `storeys` storeys and `bays` bays.
    pub fn within(storeys: usize, bays: usize, member: Member) -> Self {
        let (kind, class) = match member {
            Member::Column { line, .. } => (MemberKind::Column, Class::of(line, bays + 1)),
            Member::Beam { bay, .. } => (MemberKind::Beam, Class::of(bay, bays)),
            Member::Storey { .. } => (MemberKind::Storey, Class::Whole),
        };
        Self { kind, band: Band::of(member.storey(), storeys), class }
    }

    /// The place in words, such as `ground storey, end columns`.
    pub fn words(self) -> String {
        let band = self.band.words(self.kind);
        match (self.kind, self.class) {
            (MemberKind::Column, class) => format!("{band}, {} columns", class.id()),
            (MemberKind::Beam, class) => format!("{band}, beams of {} bays", class.id()),
            (MemberKind::Storey, _) => band.into(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::Band::{self, BelowRoof, Ground, Middle, Roof, Second};

    #[test]
    fn in_low_frames_ground_wins_then_roof_then_second() {
        let bands = |storeys| (0..storeys).map(|storey| Band::of(storey, storeys)).collect::<Vec<_>>();
        assert_eq!(bands(1), [Ground]);
        assert_eq!(bands(2), [Ground, Roof]);
        assert_eq!(bands(3), [Ground, Second, Roof]);
        assert_eq!(bands(4), [Ground, Second, BelowRoof, Roof]);
        assert_eq!(bands(6), [Ground, Second, Middle, Middle, BelowRoof, Roof]);
    }
}
