//! The figures: sound SVG, nothing cut off, no words over words, the same bytes each time, the right side of a member.

#[path = "figures/scenes.rs"]
mod scenes;

use swaybound::report::figure::png;

/// Writes pictures to look at into the build's temporary folder: `cargo test --release --test figures -- --ignored`.
#[test]
#[ignore = "for looking at"]
fn gallery() {
    let folder = std::path::Path::new(env!("CARGO_TARGET_TMPDIR"));
    for (storeys, bays) in [(1, 1), (3, 2), (9, 4), (40, 8), (200, 20), (2, 12), (500, 100)] {
        for (name, svg) in scenes::all(storeys, bays) {
            let stem = format!("{name}-{storeys}x{bays}");
            std::fs::write(folder.join(format!("{stem}.svg")), svg.as_str()).unwrap();
            println!("{stem}: {} x {} px, {} kB", svg.width(), svg.height(), svg.as_str().len() / 1024);
            std::fs::write(folder.join(format!("{stem}.png")), png(svg.as_str(), 2.0).unwrap()).unwrap();
        }
    }
}
