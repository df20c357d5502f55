//! A document as one HTML page that stands alone: no script, no network, no other file.
//!
//! Wide tables and figures scroll inside their own box on narrow screens; print has repeated heads, unbroken rows
//! and unfolded details on A4 and Letter alike. A table too wide for a printed page is cut into parts of whole
//! columns, each beginning with the columns that name the row.

mod blocks;
mod grid;
mod svg;

use super::document::{Block, Document};
use super::labels::{Labels, slug};
use super::sentence::clean;
use maud::{DOCTYPE, Markup, PreEscaped, html};

/// Forbids all but the page's own styles and drawings.
const POLICY: &str =
    "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'";
/// Fewer sections than this need no contents list.
const LEAST_CONTENTS: usize = 3;

/// The document as a page.
pub fn write(document: &Document) -> String {
    let title = clean(&document.title);
    let mut page = Page { labels: &Labels::of(document), anchors: Vec::new() };
    let body = page.blocks(&document.blocks);
    let footer = document.footer.as_ref().map(|footer| html! { footer { p { (page.sentence(footer)) } } });
    let contents = page.contents();
    let markup = html! {
        (DOCTYPE)
        html lang="en-GB" {
            head {
                meta charset="utf-8";
                meta http-equiv="Content-Security-Policy" content=(POLICY);
                meta name="viewport" content="width=device-width, initial-scale=1";
                meta name="color-scheme" content="light";
                title { (title) }
                style { (PreEscaped(include_str!("style.css"))) (PreEscaped(page_foot(&title))) }
            }
            body {
                a.skip href="#content" { "Skip to the content" }
                header {
                    h1 { (title) }
                    @if let Some(subtitle) = &document.subtitle { p.subtitle { (clean(subtitle)) } }
                }
                (contents)
                main #content tabindex="-1" { (body) }
                @if let Some(footer) = footer { (footer) }
            }
        }
    };
    markup.into_string() + "\n"
}

/// Title and page number at the foot of printed pages. Every letter but plain ones is written by its number, so that
/// the title cannot end the string or the style.
fn page_foot(title: &str) -> String {
    let escaped: String = title
        .chars()
        .map(|letter| match letter.is_ascii_alphanumeric() {
            true => letter.to_string(),
            false => format!("\\{:x} ", u32::from(letter)),
        })
        .collect();
    format!("@page{{@bottom-left{{content:\"{escaped}\"}}}}\n")
}

struct Page<'a> {
    labels: &'a Labels,
    /// Level, anchor and words of each heading so far.
    anchors: Vec<(u8, String, String)>,
}

impl Page<'_> {
    fn blocks(&mut self, blocks: &[Block]) -> Markup {
        html! { @for block in blocks { (self.block(block)) } }
    }

    /// An anchor for a heading, unlike any before.
    fn anchor(&mut self, level: u8, text: &str) -> String {
        let plain = format!("section-{}", slug(text));
        let same = |anchor: &str| self.anchors.iter().any(|(_, known, _)| known == anchor);
        let anchor = match same(&plain) {
            false => plain,
            true => (2..).map(|n| format!("{plain}--{n}")).find(|anchor| !same(anchor)).unwrap_or(plain),
        };
        self.anchors.push((level, anchor.clone(), text.into()));
        anchor
    }

    fn contents(&self) -> Markup {
        let sections: Vec<_> = self.anchors.iter().filter(|(level, ..)| *level == 2).collect();
        if sections.len() < LEAST_CONTENTS {
            return Markup::default();
        }
        html! {
            nav.contents aria-label="Contents" {
                ul { @for (_, anchor, text) in sections { li { a href={ "#" (anchor) } { (text) } } } }
            }
        }
    }
}
