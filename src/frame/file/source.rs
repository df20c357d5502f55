//! Reads single values of the file: quantities, numbers, counts, words.

use super::fault::{FaultKind, FileFault};
use super::scalar::{Scalar, Spread};
use crate::frame::sizes::Range as SizeRange;
use crate::units::{self, Dimension, UnitError};
use std::ops::Range;
use toml::Spanned;
use toml::de::DeValue;

/// No quantity in N, m, rad is meant to be larger, nor smaller than one over it: products of powers stay finite.
const LARGEST: f64 = 1e15;
/// No plain number is meant to be larger, nor a positive one smaller than one over it.
const LARGEST_NUMBER: f64 = 1e6;

/// What a number must be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Need {
    /// More than 0.
    Positive,
    /// 0 or more.
    ZeroOrMore,
    /// 1 or more.
    OneOrMore,
    /// 0 to 10.
    Power,
    /// 0 to 1.
    Share,
    /// 0 to 0.5.
    Poisson,
}

impl Need {
    /// What is wrong with `number`, or `None`.
    fn miss(self, number: f64) -> Option<&'static str> {
        let (holds, words) = match self {
            Self::Positive => (number > 0.0, "it must be more than 0"),
            Self::ZeroOrMore => (number >= 0.0, "it must be 0 or more"),
            Self::OneOrMore => (number >= 1.0, "it must be 1 or more"),
            Self::Power => ((0.0..=10.0).contains(&number), "it must lie between 0 and 10"),
            Self::Share => ((0.0..=1.0).contains(&number), "it is a share and must lie between 0 and 1"),
            Self::Poisson => ((0.0..=0.5).contains(&number), "Poisson's ratio must lie between 0 and 0.5"),
        };
        if !number.is_finite() {
            return Some("it must be a finite number");
        }
        if !holds {
            return Some(words);
        }
        let sane = number == 0.0 || (1.0 / LARGEST_NUMBER..=LARGEST_NUMBER).contains(&number);
        (!sane).then_some("it must lie between 1e-6 and 1e6")
    }

    fn help(self) -> &'static str {
        match self {
            Self::Positive => "write a number without unit, such as 0.7",
            Self::ZeroOrMore => "write a number without unit, such as 0.35; 0 is a beam that carries no moment",
            Self::OneOrMore => "it is a factor either way: 1.15 means from 1/1.15 to 1.15 times, 1 means exact",
            Self::Power => "write a number without unit, such as 1.5",
            Self::Share => "write a number without unit, such as 0.5",
            Self::Poisson => "write a number without unit: about 0.2 for concrete, 0.3 for steel",
        }
    }
}

/// What a count must be.
pub(super) const WHOLE: &str = "it must be a whole number, 1 or more";

/// The text of the file.
#[derive(Debug, Clone, Copy)]
pub(super) struct Source<'a>(pub &'a str);

impl Source<'_> {
    /// What the user typed at `span`, without the quotes around a text.
    pub fn typed(&self, span: Range<usize>) -> String {
        let raw = self.0.get(span).unwrap_or_default().trim();
        let value = DeValue::parse(raw).ok();
        let text = value.as_ref().and_then(|value| match value.get_ref() {
            DeValue::String(text) => Some(text.as_ref()),
            _ => None,
        });
        text.unwrap_or(raw).split_whitespace().collect::<Vec<_>>().join(" ")
    }

    /// A quantity of any sign.
    pub fn quantity(&self, value: &Spanned<Scalar>, wanted: Dimension) -> Result<f64, FileFault> {
        self.quantity_at(value.get_ref(), value.span(), wanted)
    }

    fn quantity_at(&self, value: &Scalar, span: Range<usize>, wanted: Dimension) -> Result<f64, FileFault> {
        let number = match value {
            Scalar::Text(text) => units::parse(text, wanted),
            Scalar::Number(number) if !number.is_finite() => {
                Err(UnitError::NotFinite { text: self.typed(span.clone()), wanted })
            }
            Scalar::Number(_) => Err(UnitError::NoUnit { number: self.typed(span.clone()), wanted }),
        };
        let number = number.map_err(|error| FileFault::new(error, span.clone()))?;
        let size = number.abs();
        if size > LARGEST || (size > 0.0 && size < 1.0 / LARGEST) {
            let needed = format!("{} of that size cannot be meant", wanted.noun());
            return Err(self.out_of_range(span, &needed, "check the exponent of the number and the unit"));
        }
        Ok(number)
    }

    /// A quantity that must be more than 0.
    pub fn positive(&self, value: &Spanned<Scalar>, wanted: Dimension) -> Result<f64, FileFault> {
        self.positive_at(value.get_ref(), value.span(), wanted)
    }

    fn positive_at(&self, value: &Scalar, span: Range<usize>, wanted: Dimension) -> Result<f64, FileFault> {
        let number = self.quantity_at(value, span.clone(), wanted)?;
        if number > 0.0 {
            return Ok(number);
        }
        let [metric, us] = wanted.examples();
        let help = match self.typed(span.clone()).strip_prefix('-') {
            Some(positive) if number < 0.0 => format!("write \"{}\"", positive.trim()),
            _ => format!("write {} like \"{metric}\" or \"{us}\"", wanted.noun()),
        };
        Err(self.out_of_range(span, &format!("{} must be more than 0", wanted.noun()), &help))
    }

    /// A number without unit.
    pub fn number(&self, value: &Spanned<Scalar>, need: Need) -> Result<f64, FileFault> {
        self.number_at(value.get_ref(), value.span(), need)
    }

    /// The same for a number at a place.
    pub fn number_at(&self, value: &Scalar, span: Range<usize>, need: Need) -> Result<f64, FileFault> {
        let Scalar::Number(number) = value else {
            let found = format!("the text \"{}\"", self.typed(span.clone()));
            return Err(FileFault::new(
                FaultKind::WrongForm { found, expected: "a number without quotes".into() },
                span,
            ));
        };
        need.miss(*number).map_or(Ok(*number), |needed| Err(self.out_of_range(span, needed, need.help())))
    }

    /// A whole number, 1 or more; 0 is let through where the caller has its own message for it.
    pub fn count(&self, value: &Spanned<Scalar>) -> Result<usize, FileFault> {
        match value.get_ref() {
            Scalar::Number(number) if number.fract() == 0.0 && (0.0..=1e15).contains(number) => Ok(*number as usize),
            Scalar::Number(_) => Err(self.out_of_range(value.span(), WHOLE, "write a whole number such as 3")),
            Scalar::Text(_) => {
                let found = format!("the text \"{}\"", self.typed(value.span()));
                let expected = "a whole number".into();
                Err(FileFault::new(FaultKind::WrongForm { found, expected }, value.span()))
            }
        }
    }

    /// Position of a word in `allowed`; `table` is what may stand in place of a word.
    pub fn choice(
        &self,
        typed: &str,
        span: Range<usize>,
        allowed: &'static [&'static str],
        table: Option<&'static str>,
    ) -> Result<usize, FileFault> {
        let position = allowed.iter().position(|word| *word == typed);
        position.ok_or_else(|| FileFault::new(FaultKind::Choice { typed: typed.into(), allowed, table }, span))
    }

    /// A log-uniform range of numbers, or of quantities where a dimension is given; uniform for powers.
    pub fn spread(&self, value: &Spanned<Spread>, need: Need, unit: Option<Dimension>) -> Result<SizeRange, FileFault> {
        let read = |scalar: &Scalar, span| match unit {
            Some(wanted) => self.positive_at(scalar, span, wanted),
            None => self.number_at(scalar, span, need),
        };
        let entries = match value.get_ref() {
            Spread::One(scalar) => return read(scalar, value.span()).map(SizeRange::Fixed),
            Spread::Range(entries) => entries,
        };
        let [low, high] = entries.as_slice() else {
            return Err(FileFault::new(FaultKind::RangeLength { found: entries.len() }, value.span()));
        };
        let ends = (read(low.get_ref(), low.span())?, read(high.get_ref(), high.span())?);
        if ends.0 > ends.1 {
            let raw = |entry: &Spanned<Scalar>| self.0.get(entry.span()).unwrap_or_default().to_string();
            return Err(FileFault::new(FaultKind::RangeReversed { low: raw(low), high: raw(high) }, value.span()));
        }
        let (low, high) = ends;
        Ok(if need == Need::Power { SizeRange::Uniform { low, high } } else { SizeRange::LogUniform { low, high } })
    }

    /// A value or range as the user typed it: `0.6 to 1.0`.
    pub fn typed_spread(&self, value: &Spanned<Spread>) -> String {
        match value.get_ref() {
            Spread::One(_) => self.typed(value.span()),
            Spread::Range(ends) => ends.iter().map(|end| self.typed(end.span())).collect::<Vec<_>>().join(" to "),
        }
    }

    pub(super) fn out_of_range(&self, span: Range<usize>, needed: &str, help: &str) -> FileFault {
        let (needed, help) = (needed.into(), help.into());
        FileFault::new(FaultKind::OutOfRange { typed: self.typed(span.clone()), needed, help }, span)
    }
}

/// The value of a key that must be there; `table` is where it is missed.
pub(super) fn require<'a, T>(
    value: &'a Option<Spanned<T>>,
    table: Range<usize>,
    what: &'static str,
    help: &'static str,
) -> Result<&'a Spanned<T>, FileFault> {
    value.as_ref().ok_or_else(|| FileFault::new(FaultKind::Missing { what, help }, table))
}
