//! Numbers as figures print them: no false digits, a real minus sign.

/// The minus sign, U+2212.
const MINUS: char = '\u{2212}';
/// A space that does not break, between groups of three digits.
const GROUP: char = '\u{a0}';

/// `value` to three significant figures, such as `0.0214`, `7.20`, `25.0`, `1230`, `12 300`.
///
/// Zero gives `0`, a number that is not finite an empty text.
pub fn three_figures(value: f64) -> String {
    grouped(&signed(figures(value, 3)))
}

/// `value` as a whole percent with its sign, such as `+12`, `−7`, `0`.
///
/// A number that is not finite gives an empty text.
pub fn percent(value: f64) -> String {
    if !value.is_finite() {
        return String::new();
    }
    let whole = signed(format!("{value:.0}"));
    if value > 0.0 && whole != "0" { format!("+{whole}") } else { whole }
}

/// `value` to `count` significant figures, without trailing zeros after the point.
pub(super) fn rounded(value: f64, count: usize) -> String {
    let text = figures(value, count);
    let text = if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text };
    grouped(&signed(text))
}

/// As [`rounded`], with a plus sign before positive numbers.
pub(super) fn rounded_signed(value: f64, count: usize) -> String {
    let text = rounded(value, count);
    if value > 0.0 && text != "0" { format!("+{text}") } else { text }
}

fn figures(value: f64, count: usize) -> String {
    if !value.is_finite() {
        return String::new();
    }
    if value == 0.0 {
        return "0".to_owned();
    }
    let scientific = format!("{:.*e}", count - 1, value);
    let exponent = scientific.split_once('e').and_then(|(_, power)| power.parse::<i32>().ok()).unwrap_or(0);
    let decimals = (count as i32 - 1 - exponent).clamp(0, 12) as usize;
    let value = scientific.parse::<f64>().unwrap_or(value);
    format!("{value:.decimals$}")
}

fn signed(text: String) -> String {
    match text.strip_prefix('-') {
        Some(size) if size.bytes().all(|byte| byte == b'0' || byte == b'.') => size.to_owned(),
        Some(size) => format!("{MINUS}{size}"),
        None => text,
    }
}

/// Groups whole digits by three where there are five or more of them.
fn grouped(text: &str) -> String {
    let (whole, rest) = text.split_at(text.find('.').unwrap_or(text.len()));
    let digits = whole.chars().filter(char::is_ascii_digit).count();
    if digits < 5 {
        return text.to_owned();
    }
    let mut left = digits;
    let mut out = String::new();
    for character in whole.chars() {
        if character.is_ascii_digit() {
            if left < digits && left.is_multiple_of(3) {
                out.push(GROUP);
            }
            left -= 1;
        }
        out.push(character);
    }
    out + rest
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn three_figures_and_no_more() {
        let cases = [
            (0.0, "0"),
            (-0.0, "0"),
            (7.2, "7.20"),
            (25.04, "25.0"),
            (-12.34, "−12.3"),
            (999.6, "1000"),
            (1234.0, "1230"),
            (-12_345.0, "−12\u{a0}300"),
            (1.234e6, "1\u{a0}230\u{a0}000"),
            (0.021_37, "0.0214"),
            (0.099_96, "0.100"),
        ];
        for (value, text) in cases {
            assert_eq!(three_figures(value), text);
        }
        assert_eq!(three_figures(f64::NAN), "");
        assert_eq!([7.2, 25.0, -0.5, 0.0, 100.0].map(|value| rounded(value, 3)), ["7.2", "25", "−0.5", "0", "100"]);
        assert_eq!([2.5, -2.5, 0.0].map(|value| rounded_signed(value, 3)), ["+2.5", "−2.5", "0"]);
    }

    #[test]
    fn percents_are_whole_and_signed() {
        let cases =
            [(12.4, "+12"), (-7.5, "−8"), (0.3, "0"), (-0.3, "0"), (0.5, "0"), (1.5, "+2"), (f64::INFINITY, "")];
        for (value, text) in cases {
            assert_eq!(percent(value), text);
        }
    }
}
