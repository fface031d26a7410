//! Colours, fonts and the unit in which both are drawn.

use super::paper::{FONTS, PER_PIXEL};
use plotters::style::text_anchor::Pos;
use plotters::style::{Color, FontDesc, FontFamily, FontStyle, RGBColor, TextStyle};

/// Blue and vermilion: told apart by the colour-blind and, by lightness, in grey.
pub const BLUE: RGBColor = RGBColor(0, 84, 147);
/// See [`BLUE`].
pub const VERMILION: RGBColor = RGBColor(213, 94, 0);
/// See [`BLUE`]; the lightest of the three.
pub const GREEN: RGBColor = RGBColor(64, 176, 138);
/// Text, axes, outlines.
pub const BLACK: RGBColor = RGBColor(20, 20, 20);
/// Lines from the numbers down.
pub const GREY: RGBColor = RGBColor(150, 150, 150);

/// Pixels in the units of the paper.
pub fn tenths(pixels: f64) -> i32 {
    (pixels * PER_PIXEL).round() as i32
}

/// Upright font of `size` pixels.
pub fn font(size: f64) -> TextStyle<'static> {
    styled(size, FontStyle::Normal, BLACK)
}

/// Font of `size` pixels in a style and colour.
pub fn styled(size: f64, style: FontStyle, color: RGBColor) -> TextStyle<'static> {
    TextStyle {
        font: FontDesc::new(FontFamily::Name(FONTS), f64::from(tenths(size)), style),
        color: color.to_backend_color(),
        pos: Pos::default(),
    }
}
