//! Line and column of a place in a text, as editors count them.

/// Line and column of byte `at` of `text`, both from 1, the column in characters.
///
/// `\r\n` is one line break. A byte order mark at the start is no column; a place inside a letter is that of the letter,
/// a place behind the text that of its end.
pub(super) fn position(text: &str, at: usize) -> (usize, usize) {
    let before = &text[..text.floor_char_boundary(at)];
    let start = before.rfind('\n').map_or(0, |line_break| line_break + 1);
    let line = 1 + before.bytes().filter(|byte| *byte == b'\n').count();
    let in_line = if start == 0 { before.trim_start_matches('\u{feff}') } else { &before[start..] };
    let split = text[before.len()..].starts_with('\n');
    let in_line = in_line.strip_suffix('\r').filter(|_| split).unwrap_or(in_line);
    (line, 1 + in_line.chars().count())
}

#[cfg(test)]
mod tests {
    use super::position;

    #[test]
    fn lines_and_columns_count_from_1_in_characters() {
        let text = "ab\nçé d\n\nx";
        let cases = [(0, (1, 1)), (2, (1, 3)), (3, (2, 1)), (5, (2, 2)), (7, (2, 3)), (8, (2, 4)), (10, (3, 1))];
        for (at, expected) in cases {
            assert_eq!(position(text, at), expected, "byte {at}");
        }
        // Inside the two bytes of the letter, at the end and behind it.
        assert_eq!([4, 11, 12, 99].map(|at| position(text, at)), [(2, 1), (4, 1), (4, 2), (4, 2)]);
    }

    #[test]
    fn windows_line_breaks_marks_and_empty_texts() {
        let text = "\u{feff}a\r\nb\r\n";
        let starts = [0, 3, 4, 5, 6, 7, 9];
        let expected = [(1, 1), (1, 1), (1, 2), (1, 2), (2, 1), (2, 2), (3, 1)];
        assert_eq!(starts.map(|at| position(text, at)), expected);
        assert_eq!(position("", 0), (1, 1));
    }
}
