//! Numbers as text: rounded for people, exact for files.
//!
//! For people: U+2212 minus, U+202F between thousands from 10 000 up, never `-0`, no false digits. For files:
//! ASCII, the shortest text that reads back as the same number.

/// Minus sign, U+2212.
pub const MINUS: char = '\u{2212}';
/// No-break space, between a number and its unit.
pub const NO_BREAK: char = '\u{a0}';
/// Narrow no-break space, between thousands.
pub const THIN: char = '\u{202f}';
/// Stands where there is no number.
pub const NONE: &str = "–";

/// Decimal exponents written out in full; outside of them powers of ten are used.
const PLAIN_EXPONENTS: std::ops::RangeInclusive<i32> = -4..=8;

/// How a column of numbers is shown to people.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Form {
    /// So many significant figures.
    Significant(usize),
    /// So many decimals.
    Decimals(usize),
    /// So many decimals, with a plus before positive numbers.
    Signed(usize),
    /// Whole numbers.
    Whole,
}

impl Form {
    /// The number in this form; an en dash for a number that is not finite.
    pub fn show(self, value: f64) -> String {
        match self {
            Self::Significant(figures) => significant(value, figures),
            Self::Decimals(places) => decimals(value, places),
            Self::Signed(places) => signed(value, places),
            Self::Whole => decimals(value, 0),
        }
    }
}

/// For files: the shortest text that reads back as the same number; empty for a number that is not finite.
pub fn full(value: f64) -> String {
    let value = unsigned_zero(value);
    let plain = value == 0.0 || (1e-5..1e16).contains(&value.abs());
    match value.is_finite() {
        false => String::new(),
        true if plain => value.to_string(),
        true => format!("{value:e}"),
    }
}

/// The number, with `-0` made `0`.
pub fn unsigned_zero(value: f64) -> f64 {
    value + 0.0
}

/// Power of ten of the number's first digit, 0 for zero.
pub(super) fn exponent(value: f64) -> i32 {
    format!("{value:e}").split_once('e').and_then(|(_, power)| power.parse().ok()).unwrap_or(0)
}

/// So many significant figures: `12 300`, `4.56`, `0.0120`, `1.50 × 10⁻⁷`.
pub fn significant(value: f64, figures: usize) -> String {
    if !value.is_finite() {
        return NONE.into();
    }
    let places = figures.clamp(1, 15) - 1;
    let rounded = format!("{:.*e}", places, value.abs());
    let (digits, exponent) = rounded.split_once('e').unwrap_or((&rounded, "0"));
    let exponent: i32 = exponent.parse().unwrap_or(0);
    let sign = if value < 0.0 { String::from(MINUS) } else { String::new() };
    if value == 0.0 {
        "0".into()
    } else if PLAIN_EXPONENTS.contains(&exponent) {
        let decimals = usize::try_from(places as i32 - exponent).unwrap_or(0);
        sign + &grouped(&format!("{:.*}", decimals, rounded.parse().unwrap_or(value.abs())))
    } else {
        format!("{sign}{digits}{NO_BREAK}×{NO_BREAK}10{}", superscript(exponent))
    }
}

/// So many decimals: `1.35`, `−0.5`, `12 345`.
pub fn decimals(value: f64, places: usize) -> String {
    if !value.is_finite() {
        return NONE.into();
    }
    let digits = format!("{:.*}", places, value.abs());
    let zero = digits.chars().all(|digit| matches!(digit, '0' | '.'));
    let sign = if value < 0.0 && !zero { String::from(MINUS) } else { String::new() };
    sign + &grouped(&digits)
}

/// So many decimals, with a plus before numbers that are positive after rounding: `+12`, `−3`, `0`.
pub fn signed(value: f64, places: usize) -> String {
    let text = decimals(value, places);
    let positive = value > 0.0 && value.is_finite() && text.contains(|digit| matches!(digit, '1'..='9'));
    if positive { format!("+{text}") } else { text }
}

/// A percentage: `12 %`, `−3.4 %`.
pub fn percent(value: f64, places: usize) -> String {
    with_unit(&decimals(value, places), "%")
}

/// A percentage with a plus before positive numbers: `+12 %`.
pub fn signed_percent(value: f64, places: usize) -> String {
    with_unit(&signed(value, places), "%")
}

/// A number that must not be understated, with so many decimals, rounded up: `1.15` of 1.1448.
///
/// What lies within 1e-9 above the last decimal is what rounding leaves and does not count.
pub fn rounded_up(value: f64, places: usize) -> String {
    let scale = 10_f64.powi(places as i32);
    decimals((value * scale - 1e-9).ceil() / scale, places)
}

/// A force, moment or movement for a sentence: three significant figures and the unit, kept on one line.
pub fn quantity(value: f64, unit: &str) -> String {
    with_unit(&significant(value, 3), unit)
}

/// A whole number with its thousands set apart.
pub fn count(value: impl Into<u64>) -> String {
    grouped(&value.into().to_string())
}

fn with_unit(number: &str, unit: &str) -> String {
    if number == NONE {
        return number.into();
    }
    format!("{number}{NO_BREAK}{}", unit.replace(' ', &NO_BREAK.to_string()))
}

/// Sets thousands apart where there are five or more whole digits.
fn grouped(digits: &str) -> String {
    let (whole, rest) = digits.split_at(digits.find('.').unwrap_or(digits.len()));
    if whole.len() < 5 {
        return digits.into();
    }
    let mut text = String::new();
    for (index, digit) in whole.chars().enumerate() {
        if index > 0 && (whole.len() - index).is_multiple_of(3) {
            text.push(THIN);
        }
        text.push(digit);
    }
    text + rest
}

fn superscript(exponent: i32) -> String {
    const RAISED: [char; 10] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'];
    let digit = |letter: char| letter.to_digit(10).map_or('⁻', |digit| RAISED[digit as usize]);
    exponent.to_string().chars().map(digit).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn significant_figures_round_once_and_keep_their_zeros() {
        let shown = [
            (12_345.6, "12\u{202f}300"),
            (1234.5, "1230"),
            (999.6, "1000"),
            (99.96, "100"),
            (4.0, "4.00"),
            (0.01204, "0.0120"),
            (-45.678, "−45.7"),
            (-0.0, "0"),
            (1.5e-7, "1.50\u{a0}×\u{a0}10⁻⁷"),
            (-2.5e12, "−2.50\u{a0}×\u{a0}10¹²"),
            (f64::NAN, "–"),
            (f64::INFINITY, "–"),
        ];
        for (value, text) in shown {
            assert_eq!(significant(value, 3), text);
        }
    }

    #[test]
    fn no_minus_before_zero_and_no_plus_either() {
        assert_eq!(decimals(-0.4, 0), "0");
        assert_eq!(signed(-0.04, 1), "0.0");
        assert_eq!(signed(0.04, 1), "0.0");
        assert_eq!(signed(12.4, 0), "+12");
        assert_eq!(signed_percent(-12.34, 1), "−12.3\u{a0}%");
        assert_eq!(percent(f64::NAN, 1), "–");
        assert_eq!(signed(f64::INFINITY, 1), "–");
    }

    #[test]
    fn units_stay_on_the_line_of_their_number() {
        assert_eq!(quantity(1234.5, "kN m"), "1230\u{a0}kN\u{a0}m");
        assert_eq!(count(1_234_567_u64), "1\u{202f}234\u{202f}567");
        assert_eq!(decimals(-12_345.678, 2), "−12\u{202f}345.68");
    }

    #[test]
    fn files_read_back_the_same_number() {
        for value in [0.1, 1.0 / 3.0, 1e300, -1.5e-9, 123_456_789.0, f64::MIN_POSITIVE, 5e-324, 1e16, 9.999e-6] {
            assert_eq!(full(value).parse::<f64>().unwrap().to_bits(), value.to_bits());
            assert!(full(value).len() < 26, "{}", full(value));
        }
        assert_eq!(full(-0.0), "0");
        assert_eq!(full(f64::NAN), "");
    }
}
