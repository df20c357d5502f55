//! From SVG to PNG, with the embedded fonts only.

use std::sync::{Arc, LazyLock};

use resvg::tiny_skia::{Color, Pixmap, Transform};
use resvg::usvg::{Options, Tree, fontdb::Database};
use thiserror::Error;

use super::font::{BOLD, EMBEDDED_FAMILY, REGULAR};

/// The most pixels a picture may have on one side.
pub(super) const LARGEST_SIDE: f32 = 16_384.0;
/// The most pixels a picture may have in all; each takes four bytes of memory.
const MOST_PIXELS: f32 = 1e8;

static FONTS: LazyLock<Arc<Database>> = LazyLock::new(|| {
    let mut fonts = Database::new();
    fonts.load_font_data(REGULAR.to_vec());
    fonts.load_font_data(BOLD.to_vec());
    fonts.set_sans_serif_family(EMBEDDED_FAMILY);
    Arc::new(fonts)
});

/// Why a figure could not be turned into a PNG.
#[derive(Debug, Error)]
pub enum PngError {
    /// The text is not an SVG that can be drawn.
    #[error("the figure is not a drawable SVG: {reason}")]
    Svg {
        /// What the reader said.
        reason: String,
    },
    /// The picture would be empty or too large.
    #[error("a picture of {width:.0} by {height:.0} pixels cannot be made; choose another scale than {scale}")]
    Size {
        /// Width, pixels.
        width: f32,
        /// Height, pixels.
        height: f32,
        /// The scale that was asked for.
        scale: f32,
    },
    /// The pixels could not be written as PNG.
    #[error("the PNG could not be written: {reason}")]
    Encode {
        /// What the encoder said.
        reason: String,
    },
}

/// Draws `svg` at `scale` pixels per CSS px on white and returns the PNG file's bytes.
///
/// # Assumptions
/// Words are drawn with the embedded subset of DejaVu Sans whatever the SVG asks for; the system's fonts are not read.
///
/// # Errors
/// [`PngError`] where the SVG cannot be read or the picture would be empty or too large.
pub fn png(svg: &str, scale: f32) -> Result<Vec<u8>, PngError> {
    let options = Options { fontdb: FONTS.clone(), font_family: EMBEDDED_FAMILY.to_owned(), ..Options::default() };
    let tree = Tree::from_str(svg, &options).map_err(|fault| PngError::Svg { reason: fault.to_string() })?;
    let (width, height) = ((tree.size().width() * scale).ceil(), (tree.size().height() * scale).ceil());
    let size_fault = || PngError::Size { width, height, scale };
    let fits = width >= 1.0 && height >= 1.0 && width.max(height) <= LARGEST_SIDE && width * height <= MOST_PIXELS;
    if !fits {
        return Err(size_fault());
    }
    let mut pixels = Pixmap::new(width as u32, height as u32).ok_or_else(size_fault)?;
    pixels.fill(Color::WHITE);
    resvg::render(&tree, Transform::from_scale(scale, scale), &mut pixels.as_mut());
    pixels.encode_png().map_err(|fault| PngError::Encode { reason: fault.to_string() })
}
