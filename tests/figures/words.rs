//! Reads back where words and areas stand in a figure, in CSS px.

use swaybound::report::figure::text_width;

/// The room a line of words takes: from the top of its capitals to its baseline, with a little air.
#[derive(Debug, Clone, PartialEq)]
pub struct Room {
    pub words: String,
    pub left: f64,
    pub top: f64,
    pub right: f64,
    pub bottom: f64,
}

impl Room {
    pub fn meets(&self, other: &Self) -> bool {
        self.left < other.right && other.left < self.right && self.top < other.bottom && other.top < self.bottom
    }
}

pub fn boxes(svg: &str) -> Vec<Room> {
    let document = roxmltree::Document::parse(svg).unwrap();
    let texts = document.descendants().filter(|node| node.has_tag_name(("http://www.w3.org/2000/svg", "text")));
    texts.map(room).collect()
}

fn room(node: roxmltree::Node) -> Room {
    let number = |name: &str| node.attribute(name).unwrap().parse::<f64>().unwrap() / 10.0;
    let (x, y, size) = (number("x"), number("y"), number("font-size"));
    let words = node.text().unwrap_or_default().trim().to_owned();
    let width = text_width(&words, size, node.attribute("font-weight") == Some("bold"));
    assert_eq!(node.attribute("dy"), Some("0.76em"));
    let before = match node.attribute("text-anchor") {
        None => 0.0,
        Some("middle") => width / 2.0,
        Some("end") => width,
        Some(other) => panic!("{other}"),
    };
    // Capitals are 0.73 of the size high; descenders reach about 0.24 below the baseline.
    let (above, below) = (0.0, 0.76 * size + 0.15 * size);
    let (left, top, right, bottom) = match node.attribute("transform") {
        None => (x - before, y + above, x - before + width, y + below),
        Some(turn) => {
            assert!(turn.starts_with("rotate(270,"), "{turn}");
            (x + above, y + before - width, x + below, y + before)
        }
    };
    Room { words, left, top, right, bottom }
}

/// Corners of the polygons filled with `colour`.
pub fn polygons(svg: &str, colour: &str) -> Vec<Vec<(f64, f64)>> {
    let document = roxmltree::Document::parse(svg).unwrap();
    let filled = document
        .descendants()
        .filter(|node| node.tag_name().name() == "polygon" && node.attribute("fill") == Some(colour));
    let corner = |pair: &str| {
        let (x, y) = pair.split_once(',').unwrap();
        (x.parse::<f64>().unwrap() / 10.0, y.parse::<f64>().unwrap() / 10.0)
    };
    filled.map(|node| node.attribute("points").unwrap().split_whitespace().map(corner).collect()).collect()
}
