//! Which storeys, floors, column lines or bays a table speaks of: `"all"`, `"1-3"`, `"4-roof"`, `"A,D"`, `"B-C"`.

use crate::frame::{line_index, line_name};
use thiserror::Error;

/// A selection that means nothing in this frame.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum SelectError {
    /// Nothing is typed, or nothing between two commas.
    #[error("the selection of {what} is empty")]
    Empty {
        /// `storeys`, `floors`, `lines` or `bays`.
        what: &'static str,
        /// What may be written.
        examples: &'static str,
    },
    /// A part that is neither a number nor a known word.
    #[error("`{part}` selects no {what}")]
    Unreadable {
        /// The part as typed.
        part: String,
        /// `storeys`, `floors`, `lines` or `bays`.
        what: &'static str,
        /// What may be written.
        examples: &'static str,
    },
    /// A storey or floor that does not exist.
    #[error("there is no {what} {part}: the frame has {what}s 1 to {most}")]
    NoLevel {
        /// The number as typed.
        part: String,
        /// `storey` or `floor`.
        what: &'static str,
        /// How many there are.
        most: usize,
    },
    /// A column line that does not exist.
    #[error("there is no column line {line}: the frame has lines A to {last}")]
    NoLine {
        /// The line as typed.
        line: String,
        /// The last line.
        last: String,
    },
    /// A range that runs backwards.
    #[error("the range `{part}` runs backwards")]
    Backwards {
        /// The range as typed.
        part: String,
        /// The same range forwards.
        forwards: String,
    },
    /// A bay named by one line, or by the same line twice.
    #[error("`{part}` is no bay: a bay lies between two column lines")]
    NotABay {
        /// The part as typed.
        part: String,
    },
}

impl SelectError {
    /// How to mend it.
    pub fn help(&self) -> String {
        match self {
            Self::Empty { examples, .. } | Self::Unreadable { examples, .. } => format!("write {examples}"),
            Self::NoLevel { what, .. } => {
                format!("{what}s count from 1, the lowest; \"roof\" is the top one and \"all\" takes every one")
            }
            Self::NoLine { line, .. } if line.chars().any(|letter| letter.is_ascii_lowercase()) => {
                format!("column lines are capital letters: write \"{}\"", line.to_uppercase())
            }
            Self::NoLine { line, .. } if line.contains(['I', 'O']) => {
                "column lines leave out I and O, which read as 1 and 0: H is followed by J, N by P".into()
            }
            Self::NoLine { .. } => "column lines are lettered from the left, one more than bays".into(),
            Self::Backwards { forwards, .. } => format!("write \"{forwards}\""),
            Self::NotABay { .. } => {
                "write \"A-B\" for one bay, \"A-D\" for the bays between, \"end\", \"interior\" or \"all\"".into()
            }
        }
    }
}

const LINES: &str =
    "\"all\", \"end\", \"interior\", a line such as \"A\", a list such as \"A,D\" or a range such as \"B-C\"";
const BAYS: &str = "\"all\", \"end\", \"interior\", a bay such as \"A-B\", or \"A-D\" for the bays between";
const LEVELS: &str =
    "\"all\", a number such as \"2\", \"roof\", a range such as \"1-3\" or \"4-roof\", or a list such as \"1,3-5\"";

/// Levels chosen by `text`, one flag each; `what` is `storey` or `floor`.
pub(super) fn levels(text: &str, count: usize, what: &'static str) -> Result<Vec<bool>, SelectError> {
    let plural = if what == "storey" { "storeys" } else { "floors" };
    let mut chosen = vec![false; count];
    for part in parts(text, plural, LEVELS)? {
        let unreadable = || SelectError::Unreadable { part: part.into(), what: plural, examples: LEVELS };
        let one = |word: &str| match word {
            "roof" => Ok(count),
            digits => match digits.parse::<usize>() {
                Ok(level) if (1..=count).contains(&level) => Ok(level),
                Ok(_) => Err(SelectError::NoLevel { part: word.into(), what, most: count }),
                Err(_) if !digits.is_empty() && digits.bytes().all(|byte| byte.is_ascii_digit()) => {
                    Err(SelectError::NoLevel { part: word.into(), what, most: count })
                }
                Err(_) => Err(unreadable()),
            },
        };
        let (first, last) = match part.split_once('-') {
            _ if part == "all" => (1, count),
            Some((first, last)) => (one(first.trim())?, one(last.trim())?),
            None => (one(part)?, one(part)?),
        };
        in_order(part, first, last)?;
        chosen[first - 1..last].fill(true);
    }
    Ok(chosen)
}

/// Column lines chosen by `text`, one flag each.
pub(super) fn lines(text: &str, count: usize) -> Result<Vec<bool>, SelectError> {
    let mut chosen = vec![false; count];
    for part in parts(text, "lines", LINES)? {
        if let Some(class) = class(part, count) {
            mark(&mut chosen, class);
            continue;
        }
        let (first, last) = part.split_once('-').unwrap_or((part, part));
        let (first, last) = (line(first.trim(), part, count)?, line(last.trim(), part, count)?);
        in_order(part, first, last)?;
        chosen[first..=last].fill(true);
    }
    Ok(chosen)
}

/// Bays chosen by `text`, one flag each.
pub(super) fn bays(text: &str, count: usize) -> Result<Vec<bool>, SelectError> {
    let mut chosen = vec![false; count];
    for part in parts(text, "bays", BAYS)? {
        if let Some(class) = class(part, count) {
            mark(&mut chosen, class);
            continue;
        }
        let not_a_bay = || SelectError::NotABay { part: part.into() };
        let (first, last) = part.split_once('-').ok_or_else(not_a_bay)?;
        let (first, last) = (line(first.trim(), part, count + 1)?, line(last.trim(), part, count + 1)?);
        in_order(part, first, last)?;
        if first == last {
            return Err(not_a_bay());
        }
        chosen[first..last].fill(true);
    }
    Ok(chosen)
}

fn parts<'a>(text: &'a str, what: &'static str, examples: &'static str) -> Result<Vec<&'a str>, SelectError> {
    let parts: Vec<_> = text.split(',').map(str::trim).collect();
    if parts.iter().any(|part| part.is_empty()) {
        return Err(SelectError::Empty { what, examples });
    }
    Ok(parts)
}

/// Flags of `"all"`, `"end"` and `"interior"` among `count` things in a row.
fn class(word: &str, count: usize) -> Option<impl Fn(usize) -> bool> {
    let wanted = match word {
        "all" => [true, true],
        "end" => [true, false],
        "interior" => [false, true],
        _ => return None,
    };
    Some(move |index| if index == 0 || index + 1 == count { wanted[0] } else { wanted[1] })
}

fn mark(chosen: &mut [bool], class: impl Fn(usize) -> bool) {
    for (index, flag) in chosen.iter_mut().enumerate() {
        *flag |= class(index);
    }
}

fn line(name: &str, part: &str, count: usize) -> Result<usize, SelectError> {
    let letters = !name.is_empty() && name.len() <= 3 && name.bytes().all(|byte| byte.is_ascii_alphabetic());
    if !letters {
        return Err(SelectError::Unreadable { part: part.into(), what: "lines", examples: LINES });
    }
    let no_line = || SelectError::NoLine { line: name.into(), last: line_name(count - 1) };
    line_index(name).filter(|line| *line < count).ok_or_else(no_line)
}

fn in_order(part: &str, first: usize, last: usize) -> Result<(), SelectError> {
    if first <= last {
        return Ok(());
    }
    let (low, high) = part.split_once('-').unwrap_or((part, part));
    Err(SelectError::Backwards { part: part.into(), forwards: format!("{}-{}", high.trim(), low.trim()) })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn picked(flags: Vec<bool>) -> Vec<usize> {
        flags.iter().enumerate().filter(|(_, flag)| **flag).map(|(index, _)| index).collect()
    }

    #[test]
    fn levels_are_numbers_ranges_lists_and_the_roof() {
        let cases: [(&str, &[usize]); 8] = [
            ("all", &[0, 1, 2, 3, 4, 5]),
            ("2", &[1]),
            ("1-3", &[0, 1, 2]),
            ("4-roof", &[3, 4, 5]),
            ("roof", &[5]),
            ("1,3-5", &[0, 2, 3, 4]),
            (" 1 , 3 - 4 ", &[0, 2, 3]),
            ("3-3", &[2]),
        ];
        for (text, expected) in cases {
            assert_eq!(picked(levels(text, 6, "storey").unwrap()), expected, "{text}");
        }
    }

    #[test]
    fn lines_and_bays_are_letters_and_classes() {
        let line_cases: [(&str, &[usize]); 6] = [
            ("all", &[0, 1, 2, 3, 4]),
            ("end", &[0, 4]),
            ("interior", &[1, 2, 3]),
            ("A", &[0]),
            ("A,D", &[0, 3]),
            ("B-C", &[1, 2]),
        ];
        for (text, expected) in line_cases {
            assert_eq!(picked(lines(text, 5).unwrap()), expected, "{text}");
        }
        let bay_cases: [(&str, &[usize]); 6] = [
            ("all", &[0, 1, 2, 3]),
            ("end", &[0, 3]),
            ("interior", &[1, 2]),
            ("A-B", &[0]),
            ("A-D", &[0, 1, 2]),
            ("A-B,D-E", &[0, 3]),
        ];
        for (text, expected) in bay_cases {
            assert_eq!(picked(bays(text, 4).unwrap()), expected, "{text}");
        }
        assert_eq!(picked(bays("end", 1).unwrap()), [0]);
        assert_eq!(picked(bays("interior", 1).unwrap()), [0usize; 0]);
        assert_eq!(picked(lines("H-K", 12).unwrap()), [7, 8, 9]);
    }

    #[test]
    fn what_does_not_exist_is_refused() {
        for text in ["0", "7", "1-9", "3-1", "roof-2", "", "1,,2", "ground", "-2", "2-", "99999999999999999999999"] {
            assert!(levels(text, 6, "floor").is_err(), "{text}");
        }
        for text in ["F", "I", "a", "D-B", "1", "", "A-", "AAAA"] {
            assert!(lines(text, 5).is_err(), "{text}");
        }
        for text in ["A", "A-A", "C-A", "A-G", "1"] {
            assert!(bays(text, 4).is_err(), "{text}");
        }
    }
}
