//! Names of column lines and bays as engineers write them: A, B, C ... with I and O left out, then AA.

const LETTERS: &[u8; 24] = b"ABCDEFGHJKLMNPQRSTUVWXYZ";

/// Name of column line `line`, counted from 0: A, B ... H, J ... N, P ... Z, AA, AB ...
pub fn line_name(line: usize) -> String {
    let letter = char::from(LETTERS[line % LETTERS.len()]);
    match line / LETTERS.len() {
        0 => letter.to_string(),
        rounds => format!("{}{letter}", line_name(rounds - 1)),
    }
}

/// Number of the column line called `name`, or `None` where no line can be called so.
pub fn line_index(name: &str) -> Option<usize> {
    if name.is_empty() || name.len() > 3 {
        return None;
    }
    let mut digits = name.bytes().map(|byte| LETTERS.iter().position(|letter| *letter == byte));
    digits.try_fold(0, |index, digit| Some(index * LETTERS.len() + digit? + 1)).map(|index| index - 1)
}

/// Name of bay `bay`, counted from 0: `A-B`.
pub fn bay_name(bay: usize) -> String {
    format!("{}-{}", line_name(bay), line_name(bay + 1))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn i_and_o_are_left_out_and_names_continue_with_two_letters() {
        let names: Vec<_> = [7, 8, 12, 13, 23, 24, 25, 47, 48].map(line_name).into();
        assert_eq!(names, ["H", "J", "N", "P", "Z", "AA", "AB", "AZ", "BA"]);
    }

    #[test]
    fn names_and_numbers_are_inverse() {
        for line in 0..=2000 {
            assert_eq!(line_index(&line_name(line)), Some(line));
        }
        assert_eq!(line_index("I"), None);
        assert_eq!(line_index("a"), None);
        assert_eq!(line_index(""), None);
    }
}
