//! The blocks of a page but for tables.

use super::{Page, grid, svg};
use crate::report::document::{Block, Figure, Verdict};
use crate::report::sentence::{Sentence, Span, clean, clean_lines};
use crate::report::table::State;
use maud::{Markup, PreEscaped, html};

impl Page<'_> {
    pub(super) fn block(&mut self, block: &Block) -> Markup {
        match block {
            Block::Heading { level, text } => self.heading(*level, &clean(text)),
            Block::Paragraph(sentence) => html! { p { (self.sentence(sentence)) } },
            Block::List { ordered, items } => self.list(*ordered, items),
            Block::Pairs(pairs) => html! {
                dl { @for (name, value) in pairs { div { dt { (clean(name)) } dd { (self.sentence(value)) } } } }
            },
            Block::Verdict(verdict) => self.verdict(verdict),
            Block::Formula(text) => html! { p.formula { (clean(text)) } },
            Block::Table(table) => grid::draw(table, self),
            Block::Figures(figures) => html! {
                div.figures.single[figures.len() == 1] { @for figure in figures { (self.figure(figure)) } }
            },
            Block::Preformatted { caption, text } => html! {
                figure.typed {
                    figcaption { (clean(caption)) }
                    pre tabindex="0" { (clean_lines(text).join("\n")) }
                }
            },
            Block::Caution { title, items } => html! {
                div.caution role="note" {
                    p.caution-title { (clean(title)) }
                    @if let [item] = items.as_slice() { p { (self.sentence(item)) } }
                    @else { (self.list(false, items)) }
                }
            },
            Block::Details { summary, open, blocks } => html! {
                details open[*open] { summary { (clean(summary)) } (self.blocks(blocks)) }
            },
            Block::PageBreak => html! { div.page-break {} },
        }
    }

    pub(super) fn sentence(&self, sentence: &Sentence) -> Markup {
        html! { @for span in sentence.spans() { (self.span(span)) } }
    }

    fn span(&self, span: &Span) -> Markup {
        let words = span.words(self.labels);
        match span {
            Span::Plain(_) => html! { (words) },
            Span::Strong(_) => html! { strong { (words) } },
            Span::Emphasis(_) => html! { em { (words) } },
            Span::Code(_) => html! { code { (words) } },
            Span::Reference(key) => html! { a href={ "#" (key) } { (words) } },
        }
    }

    fn heading(&mut self, level: u8, text: &str) -> Markup {
        let anchor = self.anchor(level, text);
        match level {
            ..=2 => html! { h2 id=(anchor) { (text) } },
            3 => html! { h3 id=(anchor) { (text) } },
            4.. => html! { h4 id=(anchor) { (text) } },
        }
    }

    fn list(&self, ordered: bool, items: &[Sentence]) -> Markup {
        let items = html! { @for item in items { li { (self.sentence(item)) } } };
        if ordered {
            html! { ol { (items) } }
        } else {
            html! { ul { (items) } }
        }
    }

    fn verdict(&self, verdict: &Verdict) -> Markup {
        html! {
            div class={ "verdict " (verdict.state.class()) } {
                p.state { (sign(verdict.state)) " " (clean(&verdict.word)) }
                p { (self.sentence(&verdict.sentence)) }
            }
        }
    }

    fn figure(&self, figure: &Figure) -> Markup {
        let says = if figure.description.is_empty() { &figure.title } else { &figure.description };
        let drawing = svg::inline(&figure.svg, &figure.key, &clean(says));
        html! {
            figure id=(figure.key) style={ "--natural:" (figure.natural_width.round()) "px" } {
                div.drawing tabindex="0" role="group" aria-label=(clean(&figure.title)) { (PreEscaped(drawing)) }
                figcaption {
                    strong { (self.labels.name(&figure.key)) ". " (clean(&figure.title)) "." }
                    " " (self.sentence(&figure.caption))
                }
            }
        }
    }
}

/// A sign beside its word: the word says it already.
pub(super) fn sign(state: State) -> Markup {
    html! { span.sign aria-hidden="true" { (state.sign()) } }
}
