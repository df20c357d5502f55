//! A report for people, free of layout: sentences, tables and figures in order.

use super::labels;
use super::record::Record;
use super::sentence::Sentence;
use super::table::{State, TableBlock};

/// A report: a title and blocks in order, built by calls that can be chained.
///
/// ```
/// use swaybound::report::{Document, State, TableBlock, say};
/// let mut errors = TableBlock::new("errors", "Column moments").name("Storey").number("Portal", "kN m", 3);
/// errors.row(["3".into(), 84.2.into()]);
/// let mut report = Document::new("Laboratory wing");
/// report
///     .verdict(State::FallsShort, say("The portal method is short in storey 3, see ").refer("errors").then("."))
///     .section("Columns")
///     .table(errors);
/// assert!(report.faults().is_empty());
/// ```
#[derive(Debug, Clone, PartialEq)]
pub struct Document {
    /// Title, the only heading of level 1.
    pub title: String,
    /// A line below the title.
    pub subtitle: Option<String>,
    /// The last line.
    pub footer: Option<Sentence>,
    /// Everything between.
    pub blocks: Vec<Block>,
}

/// One block of a [`Document`].
#[derive(Debug, Clone, PartialEq)]
pub enum Block {
    /// A heading of level 2, 3 or 4.
    Heading {
        /// 2 to 4.
        level: u8,
        /// Its words.
        text: String,
    },
    /// Running text.
    Paragraph(Sentence),
    /// A list.
    List {
        /// Whether the items are numbered.
        ordered: bool,
        /// The items.
        items: Vec<Sentence>,
    },
    /// Names and what they stand for.
    Pairs(Vec<(String, Sentence)>),
    /// A judgement.
    Verdict(Verdict),
    /// A formula or rule on its own line.
    Formula(String),
    /// A table.
    Table(TableBlock),
    /// Figures, side by side where there is room.
    Figures(Vec<Figure>),
    /// Text as typed, such as a file.
    Preformatted {
        /// What it is.
        caption: String,
        /// The text, line by line.
        text: String,
    },
    /// What a reader must know before using the numbers.
    Caution {
        /// Its heading, which is no part of the contents list.
        title: String,
        /// One or more sentences.
        items: Vec<Sentence>,
    },
    /// Blocks a reader may fold away on the page; always open in print and in text.
    Details {
        /// The line that stays.
        summary: String,
        /// Whether the page opens with it unfolded.
        open: bool,
        /// The blocks.
        blocks: Vec<Block>,
    },
    /// A new sheet in print.
    PageBreak,
}

/// A judgement: a state, what it judges, and why.
#[derive(Debug, Clone, PartialEq)]
pub struct Verdict {
    /// The state, shown by sign, word and tint.
    pub state: State,
    /// The word; by default that of the state.
    pub word: String,
    /// The sentence that gives the reason.
    pub sentence: Sentence,
}

/// A finished drawing with its words.
#[derive(Debug, Clone, PartialEq)]
pub struct Figure {
    /// Key for references, in small letters, digits and hyphens.
    pub key: String,
    /// What it shows, in a few words.
    pub title: String,
    /// What is to be seen in it; may be empty.
    pub caption: Sentence,
    /// For those who cannot see it: the finding. Used where the drawing carries no description of its own.
    pub description: String,
    /// The drawing, styled by attributes alone.
    pub svg: String,
    /// Width at which its letters have their true size, CSS pixels.
    pub natural_width: f64,
    /// Name of its file in the report folder, which the terminal text points to.
    pub file: Option<String>,
}

impl Document {
    /// A report without blocks.
    pub fn new(title: impl Into<String>) -> Self {
        Self { title: title.into(), subtitle: None, footer: None, blocks: Vec::new() }
    }

    /// Sets the line below the title.
    pub fn subtitle(&mut self, text: impl Into<String>) -> &mut Self {
        self.subtitle = Some(text.into());
        self
    }

    /// Sets the last line.
    pub fn footer(&mut self, sentence: impl Into<Sentence>) -> &mut Self {
        self.footer = Some(sentence.into());
        self
    }

    /// A heading of level 2, which the contents list shows.
    pub fn section(&mut self, text: impl Into<String>) -> &mut Self {
        self.push(Block::Heading { level: 2, text: text.into() })
    }

    /// A heading of level 3.
    pub fn subsection(&mut self, text: impl Into<String>) -> &mut Self {
        self.push(Block::Heading { level: 3, text: text.into() })
    }

    /// A heading of level 4.
    pub fn minor(&mut self, text: impl Into<String>) -> &mut Self {
        self.push(Block::Heading { level: 4, text: text.into() })
    }

    /// Running text.
    pub fn paragraph(&mut self, sentence: impl Into<Sentence>) -> &mut Self {
        self.push(Block::Paragraph(sentence.into()))
    }

    /// A list with bullets.
    pub fn list<S: Into<Sentence>>(&mut self, items: impl IntoIterator<Item = S>) -> &mut Self {
        self.push(Block::List { ordered: false, items: items.into_iter().map(Into::into).collect() })
    }

    /// A numbered list.
    pub fn steps<S: Into<Sentence>>(&mut self, items: impl IntoIterator<Item = S>) -> &mut Self {
        self.push(Block::List { ordered: true, items: items.into_iter().map(Into::into).collect() })
    }

    /// Names and what they stand for.
    pub fn pairs<S: Into<Sentence>>(&mut self, pairs: impl IntoIterator<Item = (String, S)>) -> &mut Self {
        self.push(Block::Pairs(pairs.into_iter().map(|(name, value)| (name, value.into())).collect()))
    }

    /// A judgement in the state's own word.
    pub fn verdict(&mut self, state: State, sentence: impl Into<Sentence>) -> &mut Self {
        self.verdict_in_words(state, state.word(), sentence)
    }

    /// A judgement in another word.
    pub fn verdict_in_words(&mut self, state: State, word: &str, sentence: impl Into<Sentence>) -> &mut Self {
        self.push(Block::Verdict(Verdict { state, word: word.into(), sentence: sentence.into() }))
    }

    /// A formula or rule on its own line.
    pub fn formula(&mut self, text: impl Into<String>) -> &mut Self {
        self.push(Block::Formula(text.into()))
    }

    /// A table.
    pub fn table(&mut self, table: TableBlock) -> &mut Self {
        self.push(Block::Table(table))
    }

    /// A figure.
    pub fn figure(&mut self, figure: Figure) -> &mut Self {
        self.figures([figure])
    }

    /// Figures side by side where there is room.
    pub fn figures(&mut self, figures: impl IntoIterator<Item = Figure>) -> &mut Self {
        self.push(Block::Figures(figures.into_iter().collect()))
    }

    /// Text as typed.
    pub fn preformatted(&mut self, caption: impl Into<String>, text: impl Into<String>) -> &mut Self {
        self.push(Block::Preformatted { caption: caption.into(), text: text.into() })
    }

    /// What a reader must know before using the numbers.
    pub fn caution<S: Into<Sentence>>(
        &mut self,
        title: impl Into<String>,
        items: impl IntoIterator<Item = S>,
    ) -> &mut Self {
        self.push(Block::Caution { title: title.into(), items: items.into_iter().map(Into::into).collect() })
    }

    /// Blocks that a reader may unfold; `fill` builds them.
    pub fn details(&mut self, summary: impl Into<String>, fill: impl FnOnce(&mut Document)) -> &mut Self {
        self.foldable(summary.into(), false, fill)
    }

    /// Blocks that a reader may fold away; `fill` builds them.
    pub fn open_details(&mut self, summary: impl Into<String>, fill: impl FnOnce(&mut Document)) -> &mut Self {
        self.foldable(summary.into(), true, fill)
    }

    /// A new sheet in print.
    pub fn page_break(&mut self) -> &mut Self {
        self.push(Block::PageBreak)
    }

    /// The record: its entries, then each input file as typed.
    pub fn record(&mut self, record: &Record) -> &mut Self {
        self.pairs(record.entries());
        for input in &record.inputs {
            self.preformatted(format!("Input file {}, as typed", input.name), input.text.as_str());
        }
        self
    }

    /// Any block.
    pub fn push(&mut self, block: Block) -> &mut Self {
        self.blocks.push(block);
        self
    }

    /// What is wrong with this document, for tests of the code that builds one: references to nothing, doubled keys,
    /// skipped heading levels, rows that do not fit their columns, drawings that would restyle the page.
    pub fn faults(&self) -> Vec<String> {
        labels::faults(self)
    }

    fn foldable(&mut self, summary: String, open: bool, fill: impl FnOnce(&mut Document)) -> &mut Self {
        let mut inner = Document::new("");
        fill(&mut inner);
        self.push(Block::Details { summary, open, blocks: inner.blocks })
    }
}

impl Figure {
    /// A figure without caption, description and file.
    pub fn new(key: impl Into<String>, title: impl Into<String>, svg: impl Into<String>, natural_width: f64) -> Self {
        Self {
            key: key.into(),
            title: title.into(),
            caption: Sentence::default(),
            description: String::new(),
            svg: svg.into(),
            natural_width,
            file: None,
        }
    }

    /// Sets what is to be seen in it.
    pub fn caption(mut self, caption: impl Into<Sentence>) -> Self {
        self.caption = caption.into();
        self
    }

    /// Sets the finding, for those who cannot see it.
    pub fn description(mut self, description: impl Into<String>) -> Self {
        self.description = description.into();
        self
    }

    /// Sets the name of its file in the report folder.
    pub fn file(mut self, name: impl Into<String>) -> Self {
        self.file = Some(name.into());
        self
    }
}
