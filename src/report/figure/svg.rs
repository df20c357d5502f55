//! From recorded shapes to SVG text.
//!
//! The drawing library rounds to whole units, so everything is drawn [`UNITS`] times larger and the viewBox scales it
//! back. It writes one element per line; each is completed here with what the library cannot say (dashes, outlines,
//! exact font sizes), and the root gets its role, title and description.

use std::fmt::Write as _;

use plotters::prelude::{DrawingBackend, IntoFont, SVGBackend, ShapeStyle};
use plotters::style::text_anchor::{HPos, Pos, VPos};
use plotters::style::{FontStyle, FontTransform, RGBColor, TextStyle};

use super::canvas::{Anchor, Canvas, Fill, Point, Shape, Stroke, Words, baseline_drop};
use super::colour::{Colour, WHITE};
use super::font::{EMBEDDED_FAMILY, FAMILY};

/// Drawing units per CSS px.
const UNITS: f64 = 10.0;
/// The library hangs words from 0.76 of the font size above their baseline.
const HANG: f64 = 0.76;
/// Largest coordinate that is drawn, CSS px.
const FARTHEST: f64 = 1e6;

/// A finished figure.
#[derive(Debug, Clone, PartialEq)]
pub struct Svg {
    text: String,
    width: f64,
    height: f64,
    notes: Vec<String>,
}

impl Svg {
    /// The SVG element with its title and description; it uses no ids, styles or scripts, so it may stand in a page.
    pub fn as_str(&self) -> &str {
        &self.text
    }

    /// Natural width, CSS px: at this width the smallest words are 11 px high.
    pub fn width(&self) -> f64 {
        self.width
    }

    /// Natural height, CSS px.
    pub fn height(&self) -> f64 {
        self.height
    }

    /// What had to be left out, one sentence each.
    pub fn notes(&self) -> &[String] {
        &self.notes
    }
}

/// Draws `canvas` on a white page of `width` by `height` CSS px.
pub(super) fn finish(canvas: Canvas, title: &str, description: &str, width: f64, height: f64) -> Svg {
    let (width, height) = (width.ceil(), height.ceil());
    let mut raw = String::new();
    {
        let mut backend = SVGBackend::with_string(&mut raw, (units(width) as u32, units(height) as u32));
        for shape in &canvas.shapes {
            draw(shape, &mut backend);
        }
        let _ = backend.present();
    }
    let mut text = root(title, description, width, height);
    complete(&raw, &canvas.shapes, &mut text);
    text.push_str("</svg>\n");
    Svg { text, width, height, notes: canvas.notes }
}

fn units(pixels: f64) -> i32 {
    (pixels.clamp(-FARTHEST, FARTHEST) * UNITS).round() as i32
}

fn place(point: Point) -> (i32, i32) {
    (units(point.0), units(point.1))
}

fn rgb(colour: Colour) -> RGBColor {
    RGBColor(colour.0, colour.1, colour.2)
}

fn stroked(stroke: &Stroke) -> ShapeStyle {
    ShapeStyle { color: rgb(stroke.colour).into(), filled: false, stroke_width: stroke_units(stroke.width) }
}

fn filled(fill: &Fill) -> ShapeStyle {
    ShapeStyle { color: rgb(fill.colour).into(), filled: true, stroke_width: 0 }
}

/// A stroke is never thinner than 0.3 CSS px.
fn stroke_units(width: f64) -> u32 {
    units(width).max(3) as u32
}

/// Draws one shape as one element. Writing to a string cannot fail, so the library's outcome is dropped.
fn draw(shape: &Shape, backend: &mut SVGBackend) {
    let _ = match shape {
        Shape::Bar { corner, size, fill } => {
            let end = (corner.0 + size.0, corner.1 + size.1);
            backend.draw_rect(place(*corner), place(end), &filled(fill), true)
        }
        Shape::Area { points, fill } => backend.fill_polygon(points.iter().copied().map(place), &filled(fill)),
        Shape::Path { points, stroke } => backend.draw_path(points.iter().copied().map(place), &stroked(stroke)),
        Shape::Disc { centre, radius, fill } => {
            backend.draw_circle(place(*centre), units(*radius).max(1) as u32, &filled(fill), true)
        }
        Shape::Words(words) => {
            let hang = baseline_drop(words.size) - HANG * words.size;
            let (right, down) = if words.upright { (hang, 0.0) } else { (0.0, hang) };
            backend.draw_text(&words.text, &text_style(words), place((words.at.0 + right, words.at.1 + down)))
        }
    };
}

fn text_style(words: &Words) -> TextStyle<'static> {
    let side = match words.anchor {
        Anchor::Start => HPos::Left,
        Anchor::Middle => HPos::Center,
        Anchor::End => HPos::Right,
    };
    let turn = if words.upright { FontTransform::Rotate270 } else { FontTransform::None };
    let weight = if words.bold { FontStyle::Bold } else { FontStyle::Normal };
    (EMBEDDED_FAMILY, words.size * UNITS)
        .into_font()
        .style(weight)
        .transform(turn)
        .color(&rgb(words.colour))
        .pos(Pos::new(side, VPos::Top))
}

fn root(title: &str, description: &str, width: f64, height: f64) -> String {
    format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}\" height=\"{height}\" viewBox=\"0 0 {} {}\" \
         role=\"img\" font-family=\"{FAMILY}\" stroke-linejoin=\"round\">\n<title>{}</title>\n<desc>{}</desc>\n\
         <rect width=\"100%\" height=\"100%\" fill=\"{}\"/>\n",
        units(width),
        units(height),
        escape(title),
        escape(description),
        WHITE.hex(),
    )
}

fn escape(words: &str) -> String {
    words
        .chars()
        .filter(|character| !character.is_control() || *character == '\n')
        .map(|character| match character {
            '&' => "&amp;".to_owned(),
            '<' => "&lt;".to_owned(),
            '>' => "&gt;".to_owned(),
            other => other.to_string(),
        })
        .collect()
}

/// Copies the library's elements to `out`, each completed with what its shape asks for.
fn complete(raw: &str, shapes: &[Shape], out: &mut String) {
    let mut lines = raw.lines().skip(1);
    for shape in shapes {
        let Some(line) = lines.next() else { return };
        match shape {
            Shape::Words(words) => {
                open_tag(line, &["font-family", "font-size", "opacity"], &words_extra(words), out);
                out.push('>');
                out.push_str(lines.next().unwrap_or_default());
                lines.next();
                out.push_str("</text>\n");
                continue;
            }
            Shape::Path { stroke, .. } => open_tag(line, &["opacity"], &dash_extra(stroke), out),
            Shape::Bar { fill, .. } | Shape::Area { fill, .. } | Shape::Disc { fill, .. } => {
                open_tag(line, &["opacity", "stroke", "stroke-width"], &outline_extra(fill), out);
            }
        }
        out.push_str("/>\n");
    }
}

/// Copies a start tag without its closing bracket, without the attributes `dropped`, with `extra` added.
fn open_tag(line: &str, dropped: &[&str], extra: &str, out: &mut String) {
    let inner = line.trim_start_matches('<').trim_end_matches('>').trim_end_matches('/');
    let (name, attributes) = inner.split_once(' ').unwrap_or((inner, ""));
    let _ = write!(out, "<{name}");
    let mut parts = attributes.split('"');
    while let (Some(key), Some(value)) = (parts.next(), parts.next()) {
        let key = key.trim().trim_end_matches('=');
        let default = key == "text-anchor" && value == "start";
        if !default && !dropped.contains(&key) {
            let _ = write!(out, " {key}=\"{}\"", value.trim_end());
        }
    }
    out.push_str(extra);
}

fn words_extra(words: &Words) -> String {
    let halo = if words.halo {
        format!(" stroke=\"{}\" stroke-width=\"{}\" paint-order=\"stroke\"", WHITE.hex(), stroke_units(3.0))
    } else {
        String::new()
    };
    format!(" font-size=\"{}\"{halo}", units(words.size))
}

fn dash_extra(stroke: &Stroke) -> String {
    if stroke.dash.is_empty() {
        return String::new();
    }
    let lengths: Vec<_> = stroke.dash.iter().map(|length| units(*length).to_string()).collect();
    format!(" stroke-dasharray=\"{}\"", lengths.join(" "))
}

fn outline_extra(fill: &Fill) -> String {
    fill.outline.map_or_else(String::new, |stroke| {
        format!(" stroke=\"{}\" stroke-width=\"{}\"", stroke.colour.hex(), stroke_units(stroke.width))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn drawn(canvas: Canvas) -> String {
        finish(canvas, "A < B", "said & done", 100.0, 50.0).as_str().to_owned()
    }

    #[test]
    fn the_root_says_what_the_figure_is() {
        let text = drawn(Canvas::default());
        assert!(text.contains("width=\"100\" height=\"50\" viewBox=\"0 0 1000 500\" role=\"img\""), "{text}");
        assert!(text.contains("<title>A &lt; B</title>\n<desc>said &amp; done</desc>"), "{text}");
    }

    #[test]
    fn each_shape_gets_its_own_attributes() {
        let mut canvas = Canvas::default();
        canvas.bar((1.0, 2.0), (3.0, 4.0), Fill::outlined(Colour(1, 2, 3), Colour(4, 5, 6), 0.7));
        canvas
            .path(vec![(0.0, 0.0), (-0.001, 9.96)], Stroke { colour: Colour(9, 9, 9), width: 1.5, dash: &[4.0, 2.5] });
        canvas.words(Words::new("a < b", (10.0, 20.0), Anchor::Middle));
        let text = drawn(canvas);
        let lines: Vec<_> = text.lines().skip(4).collect();
        assert_eq!(
            lines[0],
            r##"<rect x="10" y="20" width="30" height="40" fill="#010203" stroke="#040506" stroke-width="7"/>"##
        );
        let path = r##"<polyline fill="none" stroke="#090909" stroke-width="15" points="0,0 0,100" stroke-dasharray="40 25"/>"##;
        assert_eq!(lines[1], path);
        let words = r##"<text x="100" y="156" dy="0.76em" text-anchor="middle" fill="#000000" font-size="110">a &lt; b</text>"##;
        assert_eq!(lines[2], words);
    }

    #[test]
    fn a_shape_without_a_place_is_left_out_and_noted() {
        let mut canvas = Canvas::default();
        canvas.line((0.0, f64::NAN), (1.0, 1.0), Stroke::solid(Colour(0, 0, 0), 1.0));
        let svg = finish(canvas, "t", "d", 10.0, 10.0);
        assert!(!svg.as_str().contains("NaN") && svg.notes().len() == 1);
    }
}
