//! What can be wrong with a frame file: one kind for each mistake, with its place and its remedy.

use super::position::position;
use super::select::SelectError;
use crate::frame::FrameFault;
use crate::frame::options::OptionsFault;
use crate::units::UnitError;
use std::ops::Range;
use thiserror::Error;

/// A mistake in a frame file and where it stands.
#[derive(Debug, Clone, PartialEq, Error)]
#[error("{kind}")]
pub struct FileFault {
    /// What is wrong.
    pub kind: Box<FaultKind>,
    /// Bytes of the text that are at fault.
    pub span: Range<usize>,
    /// The key in words, such as `grid.bays, entry 2`; empty where the fault belongs to no key.
    pub key: String,
    /// Another place that has to do with it, and what it is.
    pub related: Option<(Range<usize>, &'static str)>,
}

impl FileFault {
    /// A fault at `span`; the key is found when the whole text is at hand.
    pub(super) fn new(kind: impl Into<FaultKind>, span: Range<usize>) -> Self {
        Self { kind: Box::new(kind.into()), span, key: String::new(), related: None }
    }

    /// The same fault with another place that has to do with it.
    pub(super) fn beside(self, span: Range<usize>, what: &'static str) -> Self {
        Self { related: Some((span, what)), ..self }
    }

    /// How to mend it.
    pub fn help(&self) -> String {
        super::help::help(&self.kind)
    }

    /// Line and column in `text`, the text that was read, where the fault begins: both from 1, the column in characters.
    ///
    /// `\r\n` is one line break. A fault at the end of a text that ends in a line break stands on the line after it.
    pub fn position(&self, text: &str) -> (usize, usize) {
        position(text, self.span.start)
    }
}

/// The mistakes a frame file can hold. Storeys, floors and entries count from 1.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum FaultKind {
    /// The text is not TOML.
    #[error("{message}")]
    Syntax {
        /// What the reader of TOML found.
        message: String,
        /// How to mend it, where the usual slip can be recognised.
        hint: &'static str,
    },
    /// The file holds no key.
    #[error("the file is empty")]
    Empty,
    /// A key that the table does not have.
    #[error("the key `{key}` is not known here")]
    UnknownKey {
        /// The key as typed.
        key: String,
        /// A key of the same table that is close to it.
        suggestion: Option<String>,
        /// Where the key belongs, where it is one of another table.
        home: Option<&'static str>,
        /// The keys that the table has.
        known: Vec<String>,
    },
    /// A key stands twice in one table.
    #[error("the key `{key}` is given twice")]
    DuplicateKey {
        /// The key.
        key: String,
    },
    /// A value of another form than the key asks for.
    #[error("{found} is given where {expected} is due")]
    WrongForm {
        /// What was found.
        found: String,
        /// What was expected.
        expected: String,
    },
    /// A text that is no quantity of the wanted kind, or a bare number.
    #[error(transparent)]
    Unit(#[from] UnitError),
    /// A quantity or number that is not allowed to be so small, so large, negative or zero.
    #[error("`{typed}` is given, but {needed}")]
    OutOfRange {
        /// What was typed.
        typed: String,
        /// What the value must be, such as `a length must be more than 0`.
        needed: String,
        /// What to write.
        help: String,
    },
    /// A key or table that must be there is not.
    #[error("{what} is missing")]
    Missing {
        /// The key or table.
        what: &'static str,
        /// What to write.
        help: &'static str,
    },
    /// No bays.
    #[error("the frame has no bays")]
    NoBays,
    /// No storeys.
    #[error("the frame has no storeys")]
    NoStoreys,
    /// More than is allowed.
    #[error("the frame has {found} {what}; at most {most} are allowed")]
    TooMany {
        /// `bays` or `storeys`.
        what: &'static str,
        /// How many the file asks for, as typed or counted.
        found: String,
        /// How many are allowed.
        most: usize,
    },
    /// A list with another number of entries than the grid asks for.
    #[error("{found} {what} are given for {needed} {of}")]
    Count {
        /// What the list holds, such as `forces`.
        what: &'static str,
        /// Entries in the list.
        found: usize,
        /// What each entry is for, such as `storeys`.
        of: &'static str,
        /// How many the grid has of them.
        needed: usize,
        /// What to write.
        help: &'static str,
    },
    /// Shares of the column lines that do not make a whole.
    #[error("the shares of the column lines must add up to 1; these add up to {}", rounded(*sum))]
    ShareSum {
        /// Their sum.
        sum: f64,
        /// What to write.
        help: &'static str,
    },
    /// A range that is not two values.
    #[error("a range has two values, low and high; {found} given")]
    RangeLength {
        /// Values in the list.
        found: usize,
    },
    /// A range whose low end is above its high end.
    #[error("the range runs backwards: {low} is more than {high}")]
    RangeReversed {
        /// Low end as typed.
        low: String,
        /// High end as typed.
        high: String,
    },
    /// A selection of storeys, floors, lines or bays that means nothing.
    #[error(transparent)]
    Select(#[from] SelectError),
    /// Members that no table gives a size.
    #[error("{first} has no size{}", others(*more, members))]
    Unsized {
        /// The first such member.
        first: String,
        /// How many more there are.
        more: usize,
        /// `columns` or `beams`.
        members: &'static str,
    },
    /// Two ways of stating one thing.
    #[error("{second} is given although {first} is given already")]
    Conflict {
        /// What is given first.
        first: &'static str,
        /// What contradicts it.
        second: &'static str,
        /// Which one to keep.
        help: &'static str,
    },
    /// An area for beams.
    #[error("beams take no area")]
    BeamArea,
    /// Nothing pushes the frame.
    #[error("the frame carries no lateral load")]
    NoLoad,
    /// The forces at and above a storey do not push to the right.
    #[error("the shear of storey {storey} is {shear:.3} {unit}; every storey shear must be positive")]
    StoreyShear {
        /// The storey.
        storey: usize,
        /// Its shear in the unit of the reports.
        shear: f64,
        /// That unit.
        unit: &'static str,
    },
    /// A word that is none of those allowed.
    #[error("`{typed}` is given where {} is due", quoted(allowed))]
    Choice {
        /// What was typed.
        typed: String,
        /// What may be typed.
        allowed: &'static [&'static str],
        /// A table that may stand in its place.
        table: Option<&'static str>,
    },
    /// Rigid joints by a share of the joint, where a member's depth is not known.
    #[error("joints.rigid is a share of the depths of members, and that of {member} is not known")]
    NoDepth {
        /// The first such member.
        member: String,
    },
    /// Rigid zones that leave too little of a member.
    #[error(
        "the rigid zones of {member} take {zones:.3} {unit} of its {length:.3} {unit}; at least a tenth of the length must stay clear"
    )]
    ZonesTooLong {
        /// The first such member.
        member: String,
        /// Both zones together, in the unit of the reports.
        zones: f64,
        /// The member's length between joint centres.
        length: f64,
        /// That unit.
        unit: &'static str,
    },
    /// Vertical loads on a frame whose inertias are relative.
    #[error("vertical loads need real column inertias, and [sizes] gives relative ones")]
    GravityNeedsInertia,
    /// A foot spring in N m/rad on a frame whose inertias are relative.
    #[error("a foot spring in units needs real column inertias, and [sizes] gives relative ones")]
    SpringNeedsInertia,
    /// A fault of the frame itself that the checks above let through.
    #[error(transparent)]
    Frame(#[from] FrameFault),
    /// A fault of the analysis options that the checks above let through.
    #[error(transparent)]
    Options(#[from] OptionsFault),
}

/// A sum with as many digits as its difference from 1 needs to be seen.
fn rounded(sum: f64) -> String {
    let text = format!("{sum:.9}");
    text.trim_end_matches('0').trim_end_matches('.').into()
}

fn others(more: usize, members: &str) -> String {
    match more {
        0 => String::new(),
        1 => format!(", and 1 of the other {members} has none"),
        _ => format!(", and {more} of the other {members} have none"),
    }
}

/// `"a", "b" or "c"`.
pub(super) fn quoted(words: &[&str]) -> String {
    match words {
        [] => String::new(),
        [only] => format!("\"{only}\""),
        [head @ .., last] => {
            let head: Vec<_> = head.iter().map(|word| format!("\"{word}\"")).collect();
            format!("{} or \"{last}\"", head.join(", "))
        }
    }
}
