//! A table for people: columns with unit and form, cells with a state shown by sign and tint.

use super::labels::Labels;
use super::number::{Form, NONE};
use super::sentence::Sentence;

/// A judgement of a method, a value or a cell. Never shown by colour alone.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum State {
    /// Within the tolerance.
    Suffices,
    /// Larger than the exact value, by more than the tolerance.
    SafeSide,
    /// Smaller than the exact value, by more than the tolerance.
    FallsShort,
    /// Too small for a percentage to say anything.
    NearZero,
    /// Not judged.
    NotJudged,
}

impl State {
    /// The sign before or behind what is judged.
    pub fn sign(self) -> char {
        match self {
            Self::Suffices => '✓',
            Self::SafeSide => '▲',
            Self::FallsShort => '▼',
            Self::NearZero => '○',
            Self::NotJudged => '◇',
        }
    }

    /// The word.
    pub fn word(self) -> &'static str {
        match self {
            Self::Suffices => "suffices",
            Self::SafeSide => "safe side",
            Self::FallsShort => "falls short",
            Self::NearZero => "near zero",
            Self::NotJudged => "not judged",
        }
    }

    /// The word as a name of small letters and hyphens.
    pub(super) fn class(self) -> String {
        self.word().replace(' ', "-")
    }
}

/// On which side a column's entries stand.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Align {
    /// Text.
    Left,
    /// Numbers.
    Right,
    /// Signs.
    Centre,
}

/// A column of a [`TableBlock`].
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Column {
    /// Its head, without unit.
    pub head: String,
    /// The unit, shown below the head; empty if there is none.
    pub unit: String,
    /// A head it shares with its neighbours; empty if there is none.
    pub under: String,
    /// Side of its entries.
    pub align: Align,
    /// Form of its numbers.
    pub form: Form,
    /// Whether it names the row: such columns stand first and are repeated where a wide table is split.
    pub key: bool,
}

/// A table for people. Columns are set by calls that can be chained, rows then added one by one.
#[derive(Debug, Clone, PartialEq)]
pub struct TableBlock {
    /// Key for references, in small letters, digits and hyphens.
    pub key: String,
    /// What it shows; the number is put before it.
    pub caption: Sentence,
    /// The columns.
    pub columns: Vec<Column>,
    /// The rows.
    pub rows: Vec<Row>,
    /// Sentences below the table.
    pub notes: Vec<Sentence>,
    /// What the signs mean in this table, where it differs from the state's word.
    pub meanings: Vec<(State, String)>,
    under: String,
}

/// A row of a [`TableBlock`].
#[derive(Debug, Clone, PartialEq)]
pub enum Row {
    /// Entries, one per column.
    Cells(Vec<TableCell>),
    /// A line that names the rows below it.
    Group(String),
    /// A thin line.
    Rule,
}

/// An entry of a [`TableBlock`].
#[derive(Debug, Clone, PartialEq)]
pub struct TableCell {
    /// What it says.
    pub content: Content,
    /// Its state, shown by sign and tint.
    pub state: Option<State>,
    /// Whether it has weight.
    pub strong: bool,
}

/// What an entry says.
#[derive(Debug, Clone, PartialEq)]
pub enum Content {
    /// Text.
    Text(Sentence),
    /// A number in the form of its column; one that is not finite shows as no value.
    Number(f64),
    /// A number in a form of its own.
    Formed(f64, Form),
    /// No value.
    Blank,
}

impl TableBlock {
    /// A table without columns and rows.
    pub fn new(key: impl Into<String>, caption: impl Into<Sentence>) -> Self {
        Self {
            key: key.into(),
            caption: caption.into(),
            columns: Vec::new(),
            rows: Vec::new(),
            notes: Vec::new(),
            meanings: Vec::new(),
            under: String::new(),
        }
    }

    /// Adds a column that names the row. Such columns come first.
    pub fn name(self, head: impl Into<String>) -> Self {
        self.add(head.into(), "", Align::Left, Form::Whole, true)
    }

    /// Adds a column of text.
    pub fn text(self, head: impl Into<String>) -> Self {
        self.add(head.into(), "", Align::Left, Form::Whole, false)
    }

    /// Adds a column of states or other signs.
    pub fn sign(self, head: impl Into<String>) -> Self {
        self.add(head.into(), "", Align::Centre, Form::Whole, false)
    }

    /// Adds a column of numbers with so many significant figures.
    pub fn number(self, head: impl Into<String>, unit: &str, figures: usize) -> Self {
        self.add(head.into(), unit, Align::Right, Form::Significant(figures), false)
    }

    /// Adds a column of numbers with so many decimals.
    pub fn decimals(self, head: impl Into<String>, unit: &str, places: usize) -> Self {
        self.add(head.into(), unit, Align::Right, Form::Decimals(places), false)
    }

    /// Adds a column of signed percentages with so many decimals.
    pub fn percent(self, head: impl Into<String>, places: usize) -> Self {
        self.add(head.into(), "%", Align::Right, Form::Signed(places), false)
    }

    /// Adds a column of whole numbers.
    pub fn count(self, head: impl Into<String>) -> Self {
        self.add(head.into(), "", Align::Right, Form::Whole, false)
    }

    /// Puts the columns added from here on under a shared head; an empty head ends it.
    pub fn under(mut self, head: impl Into<String>) -> Self {
        self.under = head.into();
        self
    }

    /// Adds any column.
    pub fn column(mut self, column: Column) -> Self {
        self.columns.push(column);
        self
    }

    /// Adds a row, one entry per column; missing entries show as blank.
    pub fn row(&mut self, cells: impl IntoIterator<Item = TableCell>) -> &mut Self {
        self.rows.push(Row::Cells(cells.into_iter().collect()));
        self
    }

    /// Adds a line that names the rows below it.
    pub fn group(&mut self, name: impl Into<String>) -> &mut Self {
        self.rows.push(Row::Group(name.into()));
        self
    }

    /// Adds a thin line.
    pub fn rule(&mut self) -> &mut Self {
        self.rows.push(Row::Rule);
        self
    }

    /// Adds a sentence below the table.
    pub fn note(&mut self, sentence: impl Into<Sentence>) -> &mut Self {
        self.notes.push(sentence.into());
        self
    }

    /// Says what a sign means in this table.
    pub fn meaning(&mut self, state: State, meaning: impl Into<String>) -> &mut Self {
        self.meanings.retain(|(known, _)| *known != state);
        self.meanings.push((state, meaning.into()));
        self
    }

    fn add(mut self, head: String, unit: &str, align: Align, form: Form, key: bool) -> Self {
        let under = if key { String::new() } else { self.under.clone() };
        self.columns.push(Column { head, unit: unit.into(), under, align, form, key });
        self
    }

    /// Number of columns at the front that name the row.
    pub(super) fn keys(&self) -> usize {
        self.columns.iter().take_while(|column| column.key).count()
    }

    /// The words of an entry, without its sign.
    pub(super) fn words(&self, cell: &TableCell, column: usize, labels: &Labels) -> String {
        match &cell.content {
            Content::Text(sentence) => sentence.words(labels),
            Content::Number(value) => self.columns[column].form.show(*value),
            Content::Formed(value, form) => form.show(*value),
            Content::Blank => NONE.into(),
        }
    }

    /// Whether any entry of the column has a sign, so that all its entries leave room for one.
    pub(super) fn has_signs(&self, column: usize) -> bool {
        self.cells().any(|cells| cells.get(column).is_some_and(|cell| cell.state.is_some()))
    }

    /// The signs used and what they mean, in the order of the states.
    pub(super) fn legend(&self) -> Vec<(State, String)> {
        let mut states: Vec<State> = self.cells().flatten().filter_map(|cell| cell.state).collect();
        states.sort_unstable();
        states.dedup();
        let own = |state| self.meanings.iter().find(|(known, _)| *known == state).map(|(_, meaning)| meaning.clone());
        states.into_iter().map(|state| (state, own(state).unwrap_or_else(|| state.word().into()))).collect()
    }

    pub(super) fn sentences(&self) -> impl Iterator<Item = &Sentence> {
        let texts = self.cells().flatten().filter_map(|cell| match &cell.content {
            Content::Text(sentence) => Some(sentence),
            _ => None,
        });
        std::iter::once(&self.caption).chain(&self.notes).chain(texts)
    }

    pub(super) fn faults(&self) -> Vec<String> {
        let expected = self.columns.len();
        let ragged = self.cells().enumerate().filter(|(_, cells)| cells.len() != expected);
        let mut faults: Vec<String> = ragged
            .map(|(index, cells)| format!("row {} has {} entries for {expected} columns", index + 1, cells.len()))
            .collect();
        if self.columns.iter().filter(|column| column.key).count() != self.keys() {
            faults.push("columns that name the row must come first".into());
        }
        faults
    }

    fn cells(&self) -> impl Iterator<Item = &[TableCell]> {
        self.rows.iter().filter_map(|row| match row {
            Row::Cells(cells) => Some(cells.as_slice()),
            _ => None,
        })
    }
}

impl TableCell {
    /// No value.
    pub fn blank() -> Self {
        Self::of(Content::Blank)
    }

    /// A state alone, by sign and word.
    pub fn state(state: State) -> Self {
        Self::from(state.word()).marked(state)
    }

    /// A number in a form of its own.
    pub fn formed(value: f64, form: Form) -> Self {
        Self::of(Content::Formed(value, form))
    }

    /// The entry with a state.
    pub fn marked(mut self, state: impl Into<Option<State>>) -> Self {
        self.state = state.into();
        self
    }

    /// The entry with weight.
    pub fn strong(mut self) -> Self {
        self.strong = true;
        self
    }

    fn of(content: Content) -> Self {
        Self { content, state: None, strong: false }
    }
}

impl From<f64> for TableCell {
    fn from(value: f64) -> Self {
        Self::of(Content::Number(value))
    }
}

impl From<usize> for TableCell {
    fn from(value: usize) -> Self {
        Self::of(Content::Formed(value as f64, Form::Whole))
    }
}

impl From<&str> for TableCell {
    fn from(text: &str) -> Self {
        Self::of(Content::Text(text.into()))
    }
}

impl From<String> for TableCell {
    fn from(text: String) -> Self {
        Self::of(Content::Text(text.into()))
    }
}

impl From<Sentence> for TableCell {
    fn from(sentence: Sentence) -> Self {
        Self::of(Content::Text(sentence))
    }
}

impl<T: Into<Self>> From<Option<T>> for TableCell {
    fn from(value: Option<T>) -> Self {
        value.map_or_else(Self::blank, Into::into)
    }
}
