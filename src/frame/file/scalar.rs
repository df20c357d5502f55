//! The forms a value may take in the file: text or number, list or table, text or table, one number or a range.

use serde::de::value::MapAccessDeserializer;
use serde::de::{Deserialize, Deserializer, Error, MapAccess, SeqAccess, Visitor};
use std::fmt;
use std::marker::PhantomData;
use std::ops::Deref;
use toml::Spanned;

/// A text or a number; which one is due is judged later, so that the message can name the unit.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Scalar {
    /// A text in quotes.
    Text(String),
    /// A bare number.
    Number(f64),
}

struct ScalarVisitor;

impl Visitor<'_> for ScalarVisitor {
    type Value = Scalar;

    fn expecting(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.write_str("one number or one text in quotes")
    }

    fn visit_str<E: Error>(self, text: &str) -> Result<Scalar, E> {
        Ok(Scalar::Text(text.into()))
    }

    fn visit_i64<E: Error>(self, number: i64) -> Result<Scalar, E> {
        Ok(Scalar::Number(number as f64))
    }

    fn visit_u64<E: Error>(self, number: u64) -> Result<Scalar, E> {
        Ok(Scalar::Number(number as f64))
    }

    fn visit_i128<E: Error>(self, number: i128) -> Result<Scalar, E> {
        Ok(Scalar::Number(number as f64))
    }

    fn visit_u128<E: Error>(self, number: u128) -> Result<Scalar, E> {
        Ok(Scalar::Number(number as f64))
    }

    fn visit_f64<E: Error>(self, number: f64) -> Result<Scalar, E> {
        Ok(Scalar::Number(number))
    }
}

impl<'de> Deserialize<'de> for Scalar {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(ScalarVisitor)
    }
}

/// What to write where the value has another form than the key asks for.
pub(super) trait Expecting {
    /// Completes "expected ...".
    const EXPECTING: &str;
}

impl Expecting for Scalar {
    const EXPECTING: &str = "a list such as [\"40 kN\", \"60 kN\"] with a force for each floor";
}

/// One of a list of shares: a number without unit.
#[derive(Debug)]
pub(super) struct Share(pub Scalar);

impl<'de> Deserialize<'de> for Share {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        Scalar::deserialize(deserializer).map(Self)
    }
}

impl Expecting for Share {
    const EXPECTING: &str = "a list such as [0.2, 0.3, 0.3, 0.2] with a share for each column line";
}

/// A list of values, or a table that stands for one.
#[derive(Debug)]
pub(super) enum ListOr<T> {
    /// `[...]`
    List(Vec<Spanned<Scalar>>),
    /// `{ ... }`
    Table(T),
}

struct ListOrVisitor<T>(PhantomData<T>);

impl<'de, T: Deserialize<'de> + Expecting> Visitor<'de> for ListOrVisitor<T> {
    type Value = ListOr<T>;

    fn expecting(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.write_str(T::EXPECTING)
    }

    fn visit_seq<A: SeqAccess<'de>>(self, list: A) -> Result<Self::Value, A::Error> {
        collect(list).map(ListOr::List)
    }

    fn visit_map<A: MapAccess<'de>>(self, table: A) -> Result<Self::Value, A::Error> {
        T::deserialize(MapAccessDeserializer::new(table)).map(ListOr::Table)
    }
}

impl<'de, T: Deserialize<'de> + Expecting> Deserialize<'de> for ListOr<T> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(ListOrVisitor(PhantomData))
    }
}

/// A word, or a table that carries a number with it.
#[derive(Debug)]
pub(super) enum TextOr<T> {
    /// A word in quotes.
    Text(String),
    /// `{ ... }`
    Table(T),
}

struct TextOrVisitor<T>(PhantomData<T>);

impl<'de, T: Deserialize<'de> + Expecting> Visitor<'de> for TextOrVisitor<T> {
    type Value = TextOr<T>;

    fn expecting(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.write_str(T::EXPECTING)
    }

    fn visit_str<E: Error>(self, text: &str) -> Result<Self::Value, E> {
        Ok(TextOr::Text(text.into()))
    }

    fn visit_map<A: MapAccess<'de>>(self, table: A) -> Result<Self::Value, A::Error> {
        T::deserialize(MapAccessDeserializer::new(table)).map(TextOr::Table)
    }
}

impl<'de, T: Deserialize<'de> + Expecting> Deserialize<'de> for TextOr<T> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(TextOrVisitor(PhantomData))
    }
}

/// One value, or a list that should hold a low and a high one.
#[derive(Debug)]
pub(super) enum Spread {
    /// A fixed value.
    One(Scalar),
    /// `[low, high]`
    Range(Vec<Spanned<Scalar>>),
}

struct SpreadVisitor;

impl<'de> Visitor<'de> for SpreadVisitor {
    type Value = Spread;

    fn expecting(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.write_str("one value or a range such as [0.5, 2.0]")
    }

    fn visit_str<E: Error>(self, text: &str) -> Result<Spread, E> {
        ScalarVisitor.visit_str(text).map(Spread::One)
    }

    fn visit_i64<E: Error>(self, number: i64) -> Result<Spread, E> {
        ScalarVisitor.visit_i64(number).map(Spread::One)
    }

    fn visit_f64<E: Error>(self, number: f64) -> Result<Spread, E> {
        ScalarVisitor.visit_f64(number).map(Spread::One)
    }

    fn visit_seq<A: SeqAccess<'de>>(self, list: A) -> Result<Spread, A::Error> {
        collect(list).map(Spread::Range)
    }
}

impl<'de> Deserialize<'de> for Spread {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(SpreadVisitor)
    }
}

/// A table, never a list: serde would read a list as the keys in their order.
#[derive(Debug)]
pub(super) struct Table<T>(pub T);

impl<T> Deref for Table<T> {
    type Target = T;

    fn deref(&self) -> &T {
        &self.0
    }
}

struct TableVisitor<T>(PhantomData<T>);

impl<'de, T: Deserialize<'de> + Expecting> Visitor<'de> for TableVisitor<T> {
    type Value = Table<T>;

    fn expecting(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.write_str(T::EXPECTING)
    }

    fn visit_map<A: MapAccess<'de>>(self, table: A) -> Result<Self::Value, A::Error> {
        T::deserialize(MapAccessDeserializer::new(table)).map(Table)
    }
}

impl<'de, T: Deserialize<'de> + Expecting> Deserialize<'de> for Table<T> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(TableVisitor(PhantomData))
    }
}

impl<T: Expecting> Expecting for Table<T> {
    const EXPECTING: &str = T::EXPECTING;
}

/// A list of tables or of values.
#[derive(Debug)]
pub(super) struct Repeated<T>(pub Vec<Spanned<T>>);

struct RepeatedVisitor<T>(PhantomData<T>);

impl<'de, T: Deserialize<'de> + Expecting> Visitor<'de> for RepeatedVisitor<T> {
    type Value = Repeated<T>;

    fn expecting(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        formatter.write_str(T::EXPECTING)
    }

    fn visit_seq<A: SeqAccess<'de>>(self, list: A) -> Result<Self::Value, A::Error> {
        collect(list).map(Repeated)
    }
}

impl<'de, T: Deserialize<'de> + Expecting> Deserialize<'de> for Repeated<T> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(RepeatedVisitor(PhantomData))
    }
}

fn collect<'de, A: SeqAccess<'de>, T: Deserialize<'de>>(mut list: A) -> Result<Vec<Spanned<T>>, A::Error> {
    let mut entries = Vec::new();
    while let Some(entry) = list.next_element()? {
        entries.push(entry);
    }
    Ok(entries)
}
