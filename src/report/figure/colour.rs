//! Colours: the Okabe-Ito series palette, quiet inks, and the diverging map vik for signed errors.

/// A colour in sRGB, 0 to 255.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Colour(pub u8, pub u8, pub u8);

/// White, the background of every figure.
pub(super) const WHITE: Colour = Colour(255, 255, 255);
/// Ink of words and of exact results.
pub const INK: Colour = Colour(0, 0, 0);
/// Ink of secondary words: 7:1 on white.
pub(super) const QUIET: Colour = Colour(0x55, 0x55, 0x55);
/// Outlines and dimension lines.
pub(super) const RULE: Colour = Colour(0x8A, 0x8A, 0x8A);
/// Grid lines.
pub(super) const GRID: Colour = Colour(0xDD, 0xDD, 0xDD);
/// Fill that means no value.
pub(super) const PALE: Colour = Colour(0xF2, 0xF2, 0xF2);

/// Colours of series: blue, vermillion, bluish green, reddish purple, black.
///
/// # References
/// Okabe and Ito, Color Universal Design, 2008: those of their eight colours that reach a contrast of 3:1 on white.
pub const SERIES: [Colour; 5] = [
    Colour(0x00, 0x72, 0xB2),
    Colour(0xD5, 0x5E, 0x00),
    Colour(0x00, 0x9E, 0x73),
    Colour(0xCC, 0x79, 0xA7),
    Colour(0x00, 0x00, 0x00),
];

/// The diverging map vik at 33 equal steps, dark blue through near-white to dark red.
///
/// # References
/// F. Crameri, Scientific colour maps, doi 10.5281/zenodo.1243862, MIT licence (its text in `vik-LICENSE.txt`). Sampled
/// from its 256 colours; linear interpolation between these differs from them by less than 2.5 of 255.
const VIK: [[u8; 3]; 33] = [
    [0, 18, 97],
    [2, 31, 105],
    [2, 43, 113],
    [2, 55, 121],
    [3, 68, 129],
    [4, 80, 137],
    [12, 94, 146],
    [27, 109, 155],
    [47, 124, 166],
    [71, 141, 177],
    [96, 157, 188],
    [121, 173, 199],
    [146, 189, 210],
    [172, 204, 220],
    [197, 219, 229],
    [220, 229, 233],
    [236, 229, 225],
    [238, 218, 207],
    [233, 203, 185],
    [226, 187, 164],
    [220, 171, 143],
    [213, 156, 123],
    [207, 142, 104],
    [201, 127, 85],
    [195, 114, 67],
    [188, 99, 49],
    [179, 83, 31],
    [165, 64, 14],
    [147, 46, 6],
    [131, 33, 6],
    [116, 21, 6],
    [102, 10, 7],
    [89, 0, 8],
];

/// Colour of a signed error: `share` -1 is the worst shortfall (dark red), 0 none, 1 the largest excess (dark blue).
///
/// The map runs backwards, so that the unsafe side is the red one. Shares beyond 1 either way take the end colours.
pub fn signed_colour(share: f64) -> Colour {
    let last = VIK.len() - 1;
    let at = (0.5 - 0.5 * share.clamp(-1.0, 1.0)) * last as f64;
    let below = (at.floor() as usize).min(last - 1);
    let part = at - below as f64;
    let mix = |channel: usize| {
        let (from, to) = (f64::from(VIK[below][channel]), f64::from(VIK[below + 1][channel]));
        (from + part * (to - from)).round() as u8
    };
    Colour(mix(0), mix(1), mix(2))
}

impl Colour {
    /// As SVG and CSS write it, such as `#0072B2`.
    pub fn hex(self) -> String {
        format!("#{:02X}{:02X}{:02X}", self.0, self.1, self.2)
    }

    /// Relative luminance, 0 black to 1 white.
    ///
    /// # References
    /// W3C, Web Content Accessibility Guidelines 2.1, relative luminance (recalled from memory).
    fn luminance(self) -> f64 {
        let linear = |channel: u8| {
            let share = f64::from(channel) / 255.0;
            if share <= 0.03928 { share / 12.92 } else { ((share + 0.055) / 1.055).powf(2.4) }
        };
        0.2126 * linear(self.0) + 0.7152 * linear(self.1) + 0.0722 * linear(self.2)
    }

    /// Black or white, whichever reads better on this colour (by its luma in whole numbers, the same everywhere).
    pub(super) fn label(self) -> Colour {
        let luma = 299 * u32::from(self.0) + 587 * u32::from(self.1) + 114 * u32::from(self.2);
        if luma < 125_000 { WHITE } else { INK }
    }
}

/// Contrast of `colour` on white, 1 to 21.
///
/// # References
/// W3C, Web Content Accessibility Guidelines 2.1, contrast ratio (recalled from memory).
pub fn contrast_on_white(colour: Colour) -> f64 {
    1.05 / (colour.luminance() + 0.05)
}
