//! The figures: sound SVG, nothing cut off, no words over words, the same bytes each time, the right side of a member.
#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "figures/scenes.rs"]
mod scenes;
#[path = "figures/words.rs"]
mod words;

use resvg::tiny_skia::Pixmap;
use swaybound::report::figure::{
    EXACT_METHODS, Figure, INK, Marker, QUICK_METHODS, SERIES, Shade, Svg, colour_limit, contrast_on_white, look, png,
    signed_colour,
};

/// Frame shapes (storeys, bays) that every figure must survive.
const SHAPES: [(usize, usize); 14] = [
    (1, 1),
    (1, 4),
    (1, 12),
    (2, 3),
    (3, 2),
    (5, 1),
    (9, 4),
    (12, 6),
    (20, 3),
    (25, 9),
    (40, 8),
    (70, 24),
    (200, 20),
    (3, 100),
];

fn every(check: impl Fn(&str, &Svg)) {
    for (storeys, bays) in SHAPES {
        for (name, svg) in scenes::all(storeys, bays) {
            check(&format!("{name} {storeys}x{bays}"), &svg);
        }
    }
    for (name, svg) in scenes::hard() {
        check(name, &svg);
    }
}

#[test]
fn svg_is_well_formed_and_says_what_it_is() {
    every(|name, svg| {
        let document = roxmltree::Document::parse(svg.as_str()).unwrap_or_else(|fault| panic!("{name}: {fault}"));
        let root = document.root_element();
        assert_eq!(root.attribute("role"), Some("img"), "{name}");
        let text = |tag: &str| root.children().find(|node| node.has_tag_name(("http://www.w3.org/2000/svg", tag)));
        for tag in ["title", "desc"] {
            assert!(text(tag).and_then(|node| node.text()).is_some_and(|words| words.len() > 10), "{name}: {tag}");
        }
        let size = format!("0 0 {} {}", 10.0 * svg.width(), 10.0 * svg.height());
        assert_eq!(root.attribute("viewBox"), Some(&*size), "{name}");
        assert!(!document.descendants().any(|node| node.has_attribute("id") || node.has_attribute("style")), "{name}");
    });
}

#[test]
fn every_stroke_is_set_and_every_number_is_finite() {
    every(|name, svg| {
        let text = svg.as_str();
        assert!(!text.contains("stroke-width=\"1\""), "{name}: a stroke nobody set");
        assert!(!text.contains("NaN") && !text.contains("inf\"") && !text.contains("\"-0\""), "{name}");
        let document = roxmltree::Document::parse(text).unwrap();
        for node in document.descendants() {
            let stroked = node.attribute("stroke").is_some_and(|stroke| stroke != "none");
            let width = node.attribute("stroke-width").map(|width| width.parse::<f64>().unwrap());
            assert_eq!(stroked, width.is_some(), "{name}: {node:?}");
            assert!(width.is_none_or(|width| (3.0..=40.0).contains(&width)), "{name}: {node:?}");
            if node.has_tag_name(("http://www.w3.org/2000/svg", "text")) {
                let size: f64 = node.attribute("font-size").unwrap().parse().unwrap();
                assert!(size >= 110.0, "{name}: words under 11 px");
            }
        }
    });
}

#[test]
fn no_words_leave_the_figure() {
    every(|name, svg| {
        let words = words::boxes(svg.as_str());
        assert!(words.len() > 5, "{name}");
        for word in words {
            let inside =
                word.left >= 0.0 && word.top >= 0.0 && word.right <= svg.width() && word.bottom <= svg.height();
            assert!(inside, "{name}: {word:?} in {} x {}", svg.width(), svg.height());
        }
    });
}

#[test]
fn no_words_lie_on_words() {
    every(|name, svg| {
        let words = words::boxes(svg.as_str());
        for (index, one) in words.iter().enumerate() {
            for other in &words[index + 1..] {
                assert!(!one.meets(other), "{name}: {one:?} and {other:?}");
            }
        }
    });
}

#[test]
fn the_overlap_check_sees_overlaps() {
    let text = |x: i32, y: i32, words: &str| {
        format!("<text x=\"{x}\" y=\"{y}\" dy=\"0.76em\" fill=\"#000000\" font-size=\"110\">{words}</text>")
    };
    let page =
        |x, y| format!("<svg xmlns=\"http://www.w3.org/2000/svg\">{}{}</svg>", text(0, 0, "1234"), text(x, y, "5"));
    let meet = |x, y| {
        let boxes = words::boxes(&page(x, y));
        boxes[0].meets(&boxes[1])
    };
    assert!(meet(250, 30) && !meet(290, 30) && !meet(0, 120));
}

#[test]
fn the_same_bytes_each_time() {
    for (storeys, bays) in [(3, 2), (9, 4)] {
        let (first, second) = (scenes::all(storeys, bays), scenes::all(storeys, bays));
        assert_eq!(first, second);
        for (name, svg) in first {
            assert_eq!(png(svg.as_str(), 1.0).unwrap(), png(svg.as_str(), 1.0).unwrap(), "{name}");
        }
    }
}

#[test]
fn numbers_that_are_not_finite_are_left_out_and_noted() {
    let mut elevation = scenes::elevation(3, 2);
    elevation.columns[0] = Shade::Error(f64::NAN);
    elevation.beams.truncate(4);
    elevation.grid.lateral[1] = f64::INFINITY;
    elevation.grid.storeys[1] = f64::NAN;
    let mut diagram = scenes::diagram(3, 2);
    diagram.exact.columns[4] = [f64::NAN, 1.0];
    let mut profiles = scenes::profiles(3, 2);
    profiles.panels[1].series[0].values[1] = f64::NEG_INFINITY;
    let mut spread = scenes::spread();
    spread.rows[0].median = f64::NAN;
    for svg in [elevation.svg(), diagram.svg(), profiles.svg(), spread.svg()] {
        assert!(!svg.notes().is_empty());
        assert!(!svg.as_str().contains("NaN") && !svg.as_str().contains("inf\""));
        roxmltree::Document::parse(svg.as_str()).unwrap();
    }
    assert!(elevation.svg().as_str().contains("no value"));
    assert!(scenes::all(3, 2).iter().all(|(_, svg)| svg.notes().is_empty()));
}

#[test]
fn empty_figures_are_still_figures() {
    let mut diagram = scenes::diagram(2, 2);
    diagram.exact = Default::default();
    diagram.quick = None;
    let mut profiles = scenes::profiles(2, 2);
    profiles.panels.clear();
    let mut spread = scenes::spread();
    spread.rows.clear();
    for svg in [diagram.svg(), profiles.svg(), spread.svg()] {
        roxmltree::Document::parse(svg.as_str()).unwrap();
        png(svg.as_str(), 1.0).unwrap();
    }
}

/// Common practice: in a portal pushed to the right the windward column bends outwards (left) at its foot, and the beam
/// is in tension below at its left end and above at its right end.
#[test]
fn moments_are_drawn_on_the_side_in_tension() {
    let mut diagram = scenes::diagram(1, 1);
    diagram.quick = None;
    let svg = diagram.svg();
    let filled: Vec<Vec<(f64, f64)>> = words::polygons(svg.as_str(), "#D9D9D9");
    let [left, right, beam] = &filled[..] else { panic!("{} diagrams", filled.len()) };
    for column in [left, right] {
        let (axis, foot, head) = (column[0].0, column[1], column[2]);
        assert!(foot.0 < axis - 20.0 && head.0 > axis + 20.0, "{column:?}");
        assert!(foot.1 > head.1, "the foot is below the head");
    }
    let (axis, start, end) = (beam[0].1, beam[1], beam[2]);
    assert!(start.1 > axis + 20.0 && end.1 < axis - 20.0 && start.0 < end.0, "{beam:?}");
}

#[test]
fn members_take_the_colour_of_their_error() {
    let mut elevation = scenes::elevation(1, 1);
    elevation.limit = 40.0;
    elevation.columns = vec![Shade::Error(-40.0), Shade::Error(20.0)];
    elevation.beams = vec![Shade::Error(400.0)];
    let svg = elevation.svg();
    for share in [-1.0, 0.5, 1.0] {
        let bar = format!("fill=\"{}\" stroke=\"#8A8A8A\"", signed_colour(share).hex());
        assert_eq!(svg.as_str().matches(&bar).count(), 1, "{share}");
    }
    for label in ["−40", "+20", "+400", "≥ +40 %", "−40 %"] {
        assert!(svg.as_str().contains(&format!(">{label}</text>")), "{label}");
    }
    assert_eq!(colour_limit([3.0, -31.0, f64::NAN]), 40.0);
    assert_eq!(colour_limit([1e9]), 100.0);
}

/// F. Crameri's vik has dark blue and dark red ends and a near-white middle (end colours as published: 001261, 590008).
#[test]
fn signed_colours_are_centred_on_zero_with_the_unsafe_side_red() {
    assert_eq!(
        [-2.0, -1.0, 1.0, 2.0].map(|share| signed_colour(share).hex()),
        ["#590008", "#590008", "#001261", "#001261"]
    );
    let middle = signed_colour(0.0);
    assert!(middle.0 > 225 && middle.1 > 220 && middle.2 > 215, "{middle:?}");
}

#[test]
fn lines_stand_out_on_white_and_no_two_methods_look_alike() {
    let methods: Vec<&str> = EXACT_METHODS.into_iter().chain(QUICK_METHODS).collect();
    for method in &methods {
        let look = look(method);
        // WCAG 2.1, success criterion 1.4.11: graphics need 3:1 (recalled from memory).
        assert!(contrast_on_white(look.colour) >= 3.0, "{method}: {}", contrast_on_white(look.colour));
        assert!(look.marker != Marker::Bare && SERIES.contains(&look.colour), "{method}");
        let twins = methods.iter().filter(|other| self::look(other) == look).count();
        assert_eq!(twins, 1, "{method}");
    }
    for method in EXACT_METHODS {
        assert!(look(method).colour == INK && look(method).width > look("portal").width, "{method}");
    }
    assert!(look("slope-deflection").dash.is_empty() && look("stiffness").dash.is_empty());
    assert_eq!(look("never heard of").marker, Marker::Bare);
}

#[test]
fn png_has_the_size_of_the_figure_and_ink_on_white() {
    for (name, svg) in scenes::all(3, 2) {
        for scale in [1.0, 2.0] {
            let picture = Pixmap::decode_png(&png(svg.as_str(), scale).unwrap()).unwrap();
            let size = [svg.width(), svg.height()].map(|side| (side * f64::from(scale)) as u32);
            assert_eq!([picture.width(), picture.height()], size, "{name}");
            let inked = picture.pixels().iter().filter(|pixel| pixel.red() < 200).count() as f64;
            let share = inked / f64::from(size[0] * size[1]);
            assert!((0.01..0.5).contains(&share), "{name}: {share}");
            assert_eq!(picture.pixel(0, 0).map(|pixel| (pixel.red(), pixel.alpha())), Some((255, 255)), "{name}");
        }
    }
}

#[test]
fn png_draws_words_without_system_fonts() {
    let page = |words: &str| {
        format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"80\" height=\"20\" font-family=\"DejaVu Sans, Verdana\">\
             <text x=\"5\" y=\"15\" font-size=\"11\">{words}</text></svg>"
        )
    };
    let ink = |words: &str| {
        let picture = Pixmap::decode_png(&png(&page(words), 1.0).unwrap()).unwrap();
        picture.pixels().iter().filter(|pixel| pixel.red() < 128).count()
    };
    assert!(ink("−12 kN m") > ink("−1") && ink("−1") > ink(""));
}

#[test]
fn png_refuses_what_it_cannot_draw() {
    let svg = scenes::spread().svg();
    for (text, scale) in [("<svg", 1.0), (svg.as_str(), 0.0), (svg.as_str(), f32::NAN), (svg.as_str(), 1e6)] {
        assert!(png(text, scale).is_err(), "{scale}");
    }
}

/// Writes pictures to look at into the build's temporary folder: `cargo test --release --test figures -- --ignored`.
#[test]
#[ignore = "for looking at"]
fn gallery() {
    let folder = std::path::Path::new(env!("CARGO_TARGET_TMPDIR"));
    for (storeys, bays) in [(1, 1), (3, 2), (9, 4), (40, 8), (200, 20), (2, 12), (500, 100)] {
        for (name, svg) in scenes::hard() {
            std::fs::write(folder.join(format!("{name}.png")), png(svg.as_str(), 2.0).unwrap()).unwrap();
        }
        let start = std::time::Instant::now();
        let figures = scenes::all(storeys, bays);
        println!("{storeys}x{bays}: {:?}", start.elapsed());
        for (name, svg) in figures {
            let stem = format!("{name}-{storeys}x{bays}");
            std::fs::write(folder.join(format!("{stem}.svg")), svg.as_str()).unwrap();
            println!("{stem}: {} x {} px, {} kB", svg.width(), svg.height(), svg.as_str().len() / 1024);
            std::fs::write(folder.join(format!("{stem}.png")), png(svg.as_str(), 2.0).unwrap()).unwrap();
        }
    }
}
