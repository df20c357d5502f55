//! Quantities as people type them: `7.2 m`, `3.6m`, `12'-6 1/2"`, `1200 in^4`, `150 MN m/rad`.

use super::METRES_PER_INCH;
use super::dimension::{Dimension, Powers, SYMBOLS, Symbol};
use thiserror::Error;

/// A text that is not a quantity of the wanted kind.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum UnitError {
    /// Nothing was typed.
    #[error("nothing is given where {} is due", wanted.noun())]
    Empty {
        /// What was wanted.
        wanted: Dimension,
    },
    /// The text does not begin with a number.
    #[error("`{text}` does not begin with a number")]
    NoNumber {
        /// What was typed.
        text: String,
        /// What was wanted.
        wanted: Dimension,
    },
    /// Infinity or not-a-number was spelt out.
    #[error("`{text}` is not a finite number")]
    NotFinite {
        /// What was typed.
        text: String,
        /// What was wanted.
        wanted: Dimension,
    },
    /// The number does not fit into 64-bit floating point.
    #[error("`{text}` is too large a number")]
    Overflow {
        /// What was typed.
        text: String,
    },
    /// A comma stands in the number.
    #[error("`{text}` has a comma in its number")]
    Comma {
        /// What was typed.
        text: String,
        /// The number with a point, where the comma can be read as a decimal sign.
        decimal: String,
        /// The number without the comma, where it can be read as digit grouping.
        grouped: Option<String>,
    },
    /// Two numbers follow each other.
    #[error("`{text}` holds two numbers")]
    TwoNumbers {
        /// What was typed.
        text: String,
        /// What was wanted.
        wanted: Dimension,
    },
    /// A number without a unit.
    #[error("{} needs a unit, and `{number}` has none", wanted.noun())]
    NoUnit {
        /// What was typed.
        number: String,
        /// What was wanted.
        wanted: Dimension,
    },
    /// A unit that is not known.
    #[error("the unit `{unit}` is not known")]
    UnknownUnit {
        /// The unit as typed.
        unit: String,
        /// The known unit closest to it.
        suggestion: Option<String>,
        /// What was wanted.
        wanted: Dimension,
    },
    /// A unit of another kind.
    #[error("`{unit}` measures {kind}, but {} is due here", wanted.noun())]
    WrongKind {
        /// The unit as typed.
        unit: String,
        /// What it measures.
        kind: &'static str,
        /// What was wanted.
        wanted: Dimension,
    },
    /// Feet and inches that cannot be read.
    #[error("`{text}` cannot be read as feet and inches")]
    FeetAndInches {
        /// What was typed.
        text: String,
    },
}

impl UnitError {
    /// How to mend it.
    pub fn help(&self) -> String {
        match self {
            Self::Empty { wanted } | Self::NoNumber { wanted, .. } | Self::NotFinite { wanted, .. } => {
                write_example(*wanted)
            }
            Self::Overflow { .. } => "check the exponent of the number".into(),
            Self::Comma { decimal, grouped: Some(grouped), .. } => {
                format!("the decimal sign is a point and digits are not grouped: write \"{decimal}\" or \"{grouped}\"")
            }
            Self::Comma { decimal, grouped: None, .. } => {
                format!("the decimal sign is a point and digits are not grouped: write \"{decimal}\"")
            }
            Self::TwoNumbers { wanted, .. } => {
                format!("digits are not grouped and a list has one text for each entry; {}", write_example(*wanted))
            }
            Self::NoUnit { number, wanted } => {
                let [metric, us] = wanted.units_for(number.parse().unwrap_or(0.0));
                format!("write it in quotes with its unit, for example \"{number} {metric}\" or \"{number} {us}\"")
            }
            Self::UnknownUnit { suggestion: Some(unit), .. } => format!("did you mean `{unit}`?"),
            Self::UnknownUnit { wanted, .. } | Self::WrongKind { wanted, .. } => write_example(*wanted),
            Self::FeetAndInches { .. } => "write it like \"12'-6\\\"\", \"12' 6 1/2\\\"\", \"12.5 ft\" or \"6 in\", with the inches below 12 where feet are given".into(),
        }
    }
}

fn write_example(wanted: Dimension) -> String {
    let [metric, us] = wanted.examples();
    format!("write {} like \"{metric}\" or \"{us}\"", wanted.noun())
}

/// Reads a quantity and converts it to N, m and rad.
///
/// # Units
/// Any product and quotient of the known symbols with whole powers. `kip-ft/rad`, `kip ft/rad` and `kip·ft/rad` are
/// the same, and so are `in4`, `in^4` and `in⁴`. Lengths may be feet and inches: `12'-6"`, `12' 6 1/2"`, `12 ft 6 in`.
///
/// # Errors
/// [`UnitError`] where the text holds no finite number, no unit, an unknown unit or a unit of another kind. The sign
/// is not judged.
///
/// # References
/// Factors: NIST Special Publication 811 (2008), appendix B; those used are exact by definition.
pub fn parse(text: &str, wanted: Dimension) -> Result<f64, UnitError> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Err(UnitError::Empty { wanted });
    }
    let normal = trimmed.replace('\u{2212}', "-");
    let (number, rest) = split_number(&normal);
    if let Some(length) = feet_and_inches(trimmed, &normal, rest)? {
        return fits(length, wanted, "feet and inches", Dimension::Length.powers());
    }
    let value = read_number(trimmed, number, rest, wanted)?;
    let unit = rest.trim();
    if unit.is_empty() {
        return Err(UnitError::NoUnit { number: number.into(), wanted });
    }
    if unit.starts_with(|first: char| first.is_ascii_digit()) {
        return Err(UnitError::TwoNumbers { text: trimmed.into(), wanted });
    }
    let (factor, powers) = compose(unit, wanted)?;
    let quantity = fits(value * factor, wanted, unit, powers)?;
    if quantity.is_finite() { Ok(quantity) } else { Err(UnitError::Overflow { text: trimmed.into() }) }
}

fn fits(value: f64, wanted: Dimension, unit: &str, powers: Powers) -> Result<f64, UnitError> {
    if powers == wanted.powers() {
        return Ok(value);
    }
    Err(UnitError::WrongKind { unit: unit.into(), kind: powers.noun(), wanted })
}

fn read_number(text: &str, number: &str, rest: &str, wanted: Dimension) -> Result<f64, UnitError> {
    if let Some(after) = rest.strip_prefix(',') {
        return Err(comma(text, number, after));
    }
    match number.parse::<f64>() {
        Ok(value) if value.is_finite() => Ok(value),
        Ok(_) => Err(UnitError::Overflow { text: text.into() }),
        Err(_) => {
            let word = rest.trim_start_matches(['+', '-']).to_ascii_lowercase();
            let spelt_out = ["nan", "inf"].iter().any(|name| word.starts_with(name));
            let text = text.into();
            Err(if spelt_out { UnitError::NotFinite { text, wanted } } else { UnitError::NoNumber { text, wanted } })
        }
    }
}

fn comma(text: &str, whole: &str, after: &str) -> UnitError {
    let digits = after.len() - after.trim_start_matches(|next: char| next.is_ascii_digit()).len();
    let grouped = (digits == 3).then(|| format!("{whole}{after}"));
    UnitError::Comma { text: text.into(), decimal: format!("{whole}.{after}"), grouped }
}

/// Splits off the longest number at the start: sign, digits, point, exponent.
fn split_number(text: &str) -> (&str, &str) {
    let bytes = text.as_bytes();
    let digits = |from: usize| bytes[from..].iter().take_while(|byte| byte.is_ascii_digit()).count();
    let mut end = usize::from(bytes.first().is_some_and(|byte| matches!(byte, b'+' | b'-')));
    let whole = digits(end);
    end += whole;
    let fraction = if bytes.get(end) == Some(&b'.') { digits(end + 1) } else { 0 };
    if whole + fraction == 0 {
        return ("", text);
    }
    if bytes.get(end) == Some(&b'.') {
        end += 1 + fraction;
    }
    if bytes.get(end).is_some_and(|byte| matches!(byte, b'e' | b'E')) {
        let sign = usize::from(bytes.get(end + 1).is_some_and(|byte| matches!(byte, b'+' | b'-')));
        let exponent = if end + 1 + sign <= bytes.len() { digits(end + 1 + sign) } else { 0 };
        if exponent > 0 {
            end += 1 + sign + exponent;
        }
    }
    text.split_at(end)
}

/// Factor to N, m, rad and powers of a unit such as `kip-ft/rad`.
fn compose(unit: &str, wanted: Dimension) -> Result<(f64, Powers), UnitError> {
    let plain: String = unit.chars().filter(|letter| *letter != '^').map(plain_letter).collect();
    let (mut factor, mut powers) = (1.0, Powers::NONE);
    for (index, part) in plain.split('/').enumerate() {
        let sign = if index == 0 { 1 } else { -1 };
        let mut words = part.split_whitespace().peekable();
        if words.peek().is_none() {
            return Err(unknown(unit, unit, wanted));
        }
        for word in words {
            let (symbol, power) = find(word).ok_or_else(|| unknown(unit, word, wanted))?;
            for _ in 0..power {
                factor = if sign > 0 { factor * symbol.si } else { factor / symbol.si };
            }
            powers = powers.plus(symbol.powers, sign * power);
        }
    }
    Ok((factor, powers))
}

fn plain_letter(letter: char) -> char {
    match letter {
        '²' => '2',
        '³' => '3',
        '⁴' => '4',
        '·' | '⋅' | '∙' | '×' | '*' | '-' | '‑' | '.' => ' ',
        other => other,
    }
}

fn find(word: &str) -> Option<(&'static Symbol, i32)> {
    let letters = word.trim_end_matches(|end: char| end.is_ascii_digit());
    let power = match &word[letters.len()..] {
        "" => 1,
        digits => digits.parse().ok().filter(|power| (1..=9).contains(power))?,
    };
    SYMBOLS.iter().find(|symbol| symbol.spelling == letters).map(|symbol| (symbol, power))
}

fn unknown(unit: &str, word: &str, wanted: Dimension) -> UnitError {
    let suggestion = closest(word).map(|better| unit.replacen(word, &better, 1));
    UnitError::UnknownUnit { unit: unit.into(), suggestion, wanted }
}

/// The known symbol closest to `word`: the same letters in another case, else one slip of the finger away.
fn closest(word: &str) -> Option<String> {
    let letters = word.trim_end_matches(|end: char| end.is_ascii_digit());
    let digits = &word[letters.len()..];
    let spellings = || SYMBOLS.iter().map(|symbol| symbol.spelling);
    let same = spellings().find(|spelling| spelling.eq_ignore_ascii_case(letters));
    let near = || {
        let far = |spelling: &&str| strsim::damerau_levenshtein(spelling, letters);
        spellings().filter(|spelling| spelling.len() > 1).min_by_key(far).filter(|best| far(best) <= 1)
    };
    let near = if letters.len() > 1 { same.or_else(near) } else { same };
    near.map(|spelling| format!("{spelling}{digits}"))
}

/// Reads feet and inches; `None` where the text is not written so. `rest` is what follows the first number.
fn feet_and_inches(typed: &str, text: &str, rest: &str) -> Result<Option<f64>, UnitError> {
    let marked = text.replace(['′', '’'], "'").replace(['″', '”'], "\"").replace("''", "\"");
    let rest = rest.trim_start();
    let after_feet = rest.strip_prefix("ft").map(|more| more.trim_start_matches([' ', '.', '-']));
    let mixed = starts_with_digit(rest) || rest.strip_prefix('/').is_some_and(starts_with_digit);
    let in_inches = text.ends_with("in") || text.ends_with("in.") || text.ends_with('"');
    let spelt = in_inches && (mixed || after_feet.is_some_and(starts_with_digit));
    if !spelt && !marked.contains(['\'', '"']) {
        return Ok(None);
    }
    let marked = if spelt { marked.trim_end_matches('.').replace("ft", "'").replace("in", "\"") } else { marked };
    let fault = || UnitError::FeetAndInches { text: typed.into() };
    read_feet(&marked).map(Some).ok_or_else(fault)
}

fn starts_with_digit(text: &str) -> bool {
    text.starts_with(|first: char| first.is_ascii_digit())
}

fn read_feet(marked: &str) -> Option<f64> {
    let (sign, body) = marked.strip_prefix('-').map_or((1.0, marked), |body| (-1.0, body));
    let (feet, inches) = match body.split_once('\'') {
        Some((feet, inches)) => (plain_number(feet.trim())?, inches.trim_start_matches([' ', '-', '.'])),
        None => (0.0, body),
    };
    let inches = match inches.trim() {
        "" => 0.0,
        text => mixed_number(text.strip_suffix('"')?.trim())?,
    };
    let whole = !body.contains('\'') || inches < 12.0;
    whole.then_some(sign * (12.0 * feet + inches) * METRES_PER_INCH)
}

/// A number such as `6`, `6.5`, `6 1/2`, `6-1/2` or `1/2`.
fn mixed_number(text: &str) -> Option<f64> {
    let (whole, fraction) = match text.rsplit_once([' ', '-']) {
        Some((whole, fraction)) => (plain_number(whole.trim())?, fraction),
        None if text.contains('/') => (0.0, text),
        None => return plain_number(text),
    };
    let (top, bottom) = fraction.split_once('/')?;
    let (top, bottom) = (plain_number(top)?, plain_number(bottom)?);
    (bottom > 0.0 && top < bottom).then(|| whole + top / bottom)
}

fn plain_number(text: &str) -> Option<f64> {
    let digits = starts_with_digit(text) && text.chars().all(|letter| letter.is_ascii_digit() || letter == '.');
    text.parse().ok().filter(|number: &f64| digits && number.is_finite())
}

#[cfg(test)]
mod tests;
