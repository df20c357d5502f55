//! Faults and warnings of a file, shown at their place in the text.

use annotate_snippets::{AnnotationKind, Group, Level, Renderer, Snippet};
use std::ops::Range;
use swaybound::frame::file::{FileFault, FileWarning};

/// Widest line of the text that is shown whole.
const WIDTH: usize = 140;

/// The message for `fault` in `text`, which was read from `path`; with colours where `styled`.
pub fn render(fault: &FileFault, path: &str, text: &str, styled: bool) -> String {
    let title = Level::ERROR.primary_title(fault.to_string());
    let mut snippet = at(text, path, &fault.span, &fault.key);
    if let Some((span, what)) = &fault.related {
        snippet = snippet.annotation(AnnotationKind::Context.span(span.clone()).label(*what));
    }
    finish(title.element(snippet).element(Level::HELP.message(fault.help())), styled)
}

/// The message for `warning` in `text`, which was read from `path`; with colours where `styled`.
pub fn render_warning(warning: &FileWarning, path: &str, text: &str, styled: bool) -> String {
    let title = Level::WARNING.primary_title(warning.to_string());
    let snippet = at(text, path, &warning.span, &warning.key);
    finish(title.element(snippet).element(Level::HELP.message(warning.help())), styled)
}

fn at<'a>(
    text: &'a str,
    path: &'a str,
    span: &Range<usize>,
    key: &'a str,
) -> Snippet<'a, annotate_snippets::Annotation<'a>> {
    let primary = AnnotationKind::Primary.span(first_line(text, span));
    let primary = if key.is_empty() { primary } else { primary.label(key) };
    Snippet::source(text).path(path).annotation(primary)
}

/// The part of `span` on its first line: a table over many lines is shown by its head.
fn first_line(text: &str, span: &Range<usize>) -> Range<usize> {
    let within = text.get(span.clone()).unwrap_or_default();
    let line = within.find(['\n', '\r']).unwrap_or(within.len());
    span.start..span.start + line
}

fn finish(group: Group<'_>, styled: bool) -> String {
    let renderer = if styled { Renderer::styled() } else { Renderer::plain() };
    renderer.term_width(WIDTH).render(&[group])
}

/// A message that belongs to no place in a text.
pub fn plain_error(message: &str, help: Option<&str>) -> String {
    let group = Group::with_title(Level::ERROR.primary_title(message));
    let help = help.map(|help| Level::HELP.message(help));
    finish(group.elements(help), true)
}

/// A warning that belongs to no place in a text.
pub fn plain_warning(message: &str) -> String {
    finish(Group::with_title(Level::WARNING.primary_title(message)), true)
}
