//! Members of a frame, by kind and place.

use super::{bay_name, line_name};

/// What a member is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum MemberKind {
    /// A column.
    Column,
    /// A beam.
    Beam,
    /// A whole storey.
    Storey,
}

impl MemberKind {
    /// `column`, `beam` or `storey`, as the files say.
    pub fn id(self) -> &'static str {
        match self {
            Self::Column => "column",
            Self::Beam => "beam",
            Self::Storey => "storey",
        }
    }
}

/// A column, a beam or a whole storey of a frame. Indices count from 0.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Member {
    /// A column, by storey and line.
    Column {
        /// Storey, 0 = ground.
        storey: usize,
        /// Column line, 0 = A.
        line: usize,
    },
    /// A beam, by its own floor and bay.
    Beam {
        /// Floor, 0 = lowest.
        floor: usize,
        /// Bay, 0 = A-B.
        bay: usize,
    },
    /// A whole storey.
    Storey {
        /// Storey, 0 = ground.
        storey: usize,
    },
}

impl Member {
    /// Column, beam or storey.
    pub fn kind(self) -> MemberKind {
        match self {
            Self::Column { .. } => MemberKind::Column,
            Self::Beam { .. } => MemberKind::Beam,
            Self::Storey { .. } => MemberKind::Storey,
        }
    }

    /// Storey (a beam: its floor), counted from 0.
    pub fn storey(self) -> usize {
        match self {
            Self::Column { storey, .. } | Self::Storey { storey } | Self::Beam { floor: storey, .. } => storey,
        }
    }

    /// Line or bay by name, `-` for a whole storey.
    pub fn at(self) -> String {
        match self {
            Self::Column { line, .. } => line_name(line),
            Self::Beam { bay, .. } => bay_name(bay),
            Self::Storey { .. } => "-".into(),
        }
    }
}
