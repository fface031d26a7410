//! Paper for plotters: an SVG with real text. The library counts in whole pixels, so the paper
//! takes tenths of a pixel and writes them with one decimal.

use plotters_backend::text_anchor::{HPos, VPos};
use plotters_backend::{
    BackendColor, BackendCoord, BackendStyle, BackendTextStyle, DrawingBackend, DrawingErrorKind,
    FontStyle, FontTransform,
};
use std::convert::Infallible;
use std::fmt::Write;

/// Units of the paper in one pixel of the picture.
pub const PER_PIXEL: f64 = 10.0;
/// Fonts of every text.
pub const FONTS: &str = "DejaVu Sans, Arial, sans-serif";

/// An SVG being drawn.
pub struct Paper<'a> {
    svg: &'a mut String,
    size: (u32, u32),
    closed: bool,
}

type Drawn = Result<(), DrawingErrorKind<Infallible>>;

impl<'a> Paper<'a> {
    /// White paper of `width` by `height` pixels. `title` and `description` are for readers who
    /// cannot see the picture.
    pub fn new(
        svg: &'a mut String,
        (width, height): (u32, u32),
        title: &str,
        description: &str,
    ) -> Self {
        svg.push_str(&format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}\" height=\"{height}\" \
             viewBox=\"0 0 {width} {height}\" role=\"img\" font-family=\"{FONTS}\" fill=\"none\" \
             stroke-linejoin=\"round\" stroke-linecap=\"butt\">\n<title>{}</title>\n<desc>{}</desc>\n\
             <rect width=\"{width}\" height=\"{height}\" fill=\"#ffffff\"/>\n",
            escaped(title),
            escaped(description)
        ));
        let tenths = |pixels: u32| (f64::from(pixels) * PER_PIXEL) as u32;
        Paper {
            svg,
            size: (tenths(width), tenths(height)),
            closed: false,
        }
    }

    fn element(&mut self, element: &str, color: BackendColor) -> Drawn {
        if color.alpha > 0.0 {
            self.svg.push_str(element);
            self.svg.push('\n');
        }
        Ok(())
    }
}

/// Stroke of a style as attributes.
fn stroke<S: BackendStyle>(style: &S) -> String {
    format!(
        "stroke=\"{}\" stroke-width=\"{}\"",
        paint(style.color()),
        pixels(style.stroke_width() as i32)
    )
}

/// Fill or stroke of a style as attributes.
fn fill_or_stroke<S: BackendStyle>(style: &S, fill: bool) -> String {
    if fill {
        format!("fill=\"{}\"", paint(style.color()))
    } else {
        stroke(style)
    }
}

fn paint(color: BackendColor) -> String {
    let (red, green, blue) = color.rgb;
    format!("#{red:02x}{green:02x}{blue:02x}")
}

fn pixels(tenths: i32) -> String {
    let text = format!("{:.1}", f64::from(tenths) / PER_PIXEL);
    text.strip_suffix(".0").map_or(text.clone(), str::to_string)
}

fn points(path: impl IntoIterator<Item = BackendCoord>) -> String {
    let mut out = String::new();
    let mut last = None;
    for point in path {
        if last == Some(point) {
            continue;
        }
        last = Some(point);
        // Writing to a string cannot fail.
        let _ = write!(out, "{},{} ", pixels(point.0), pixels(point.1));
    }
    out.truncate(out.trim_end().len());
    out
}

/// Text fit for XML: special characters escaped, those that XML forbids left out.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for character in text.chars() {
        match character {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\u{fffe}' | '\u{ffff}' => {}
            c if c.is_control() => out.push(' '),
            c => out.push(c),
        }
    }
    out
}

impl DrawingBackend for Paper<'_> {
    type ErrorType = Infallible;

    fn get_size(&self) -> (u32, u32) {
        self.size
    }

    fn ensure_prepared(&mut self) -> Drawn {
        Ok(())
    }

    fn present(&mut self) -> Drawn {
        if !self.closed {
            self.svg.push_str("</svg>\n");
            self.closed = true;
        }
        Ok(())
    }

    fn draw_pixel(&mut self, point: BackendCoord, color: BackendColor) -> Drawn {
        self.draw_rect(point, (point.0 + 1, point.1 + 1), &color, true)
    }

    fn draw_line<S: BackendStyle>(
        &mut self,
        from: BackendCoord,
        to: BackendCoord,
        style: &S,
    ) -> Drawn {
        self.draw_path([from, to], style)
    }

    fn draw_rect<S: BackendStyle>(
        &mut self,
        upper_left: BackendCoord,
        bottom_right: BackendCoord,
        style: &S,
        fill: bool,
    ) -> Drawn {
        let element = format!(
            "<rect x=\"{}\" y=\"{}\" width=\"{}\" height=\"{}\" {}/>",
            pixels(upper_left.0),
            pixels(upper_left.1),
            pixels(bottom_right.0 - upper_left.0),
            pixels(bottom_right.1 - upper_left.1),
            fill_or_stroke(style, fill)
        );
        self.element(&element, style.color())
    }

    fn draw_path<S: BackendStyle, I: IntoIterator<Item = BackendCoord>>(
        &mut self,
        path: I,
        style: &S,
    ) -> Drawn {
        let element = format!("<polyline points=\"{}\" {}/>", points(path), stroke(style));
        self.element(&element, style.color())
    }

    fn draw_circle<S: BackendStyle>(
        &mut self,
        center: BackendCoord,
        radius: u32,
        style: &S,
        fill: bool,
    ) -> Drawn {
        let element = format!(
            "<circle cx=\"{}\" cy=\"{}\" r=\"{}\" {}/>",
            pixels(center.0),
            pixels(center.1),
            pixels(radius as i32),
            fill_or_stroke(style, fill)
        );
        self.element(&element, style.color())
    }

    fn fill_polygon<S: BackendStyle, I: IntoIterator<Item = BackendCoord>>(
        &mut self,
        path: I,
        style: &S,
    ) -> Drawn {
        let element = format!(
            "<polygon points=\"{}\" fill=\"{}\"/>",
            points(path),
            paint(style.color())
        );
        self.element(&element, style.color())
    }

    fn draw_text<S: BackendTextStyle>(
        &mut self,
        text: &str,
        style: &S,
        (x, y): BackendCoord,
    ) -> Drawn {
        let anchor = match style.anchor().h_pos {
            HPos::Left => "start",
            HPos::Center => "middle",
            HPos::Right => "end",
        };
        let size = style.size();
        // Heights of digits and capitals of the fonts named: 0.73 of the size.
        let down = match style.anchor().v_pos {
            VPos::Top => 0.73 * size,
            VPos::Center => 0.365 * size,
            VPos::Bottom => -0.24 * size,
        };
        let turn = match style.transform() {
            FontTransform::None => None,
            FontTransform::Rotate90 => Some(90),
            FontTransform::Rotate180 => Some(180),
            FontTransform::Rotate270 => Some(270),
        };
        let turn = turn
            .map(|degrees| {
                format!(
                    " transform=\"rotate({degrees},{},{})\"",
                    pixels(x),
                    pixels(y)
                )
            })
            .unwrap_or_default();
        let weight = match style.style() {
            FontStyle::Bold => " font-weight=\"bold\"",
            _ => "",
        };
        if text.is_empty() {
            return Ok(());
        }
        let element = format!(
            "<text x=\"{}\" y=\"{}\" font-size=\"{}\" text-anchor=\"{anchor}\" fill=\"{}\"{weight}{turn}>{}</text>",
            pixels(x),
            pixels(y + down.round() as i32),
            pixels(size.round() as i32),
            paint(style.color()),
            escaped(text)
        );
        self.element(&element, style.color())
    }

    fn estimate_text_size<S: BackendTextStyle>(
        &self,
        text: &str,
        style: &S,
    ) -> Result<(u32, u32), DrawingErrorKind<Infallible>> {
        let width = 0.6 * style.size() * text.chars().count() as f64;
        Ok((width.ceil() as u32, style.size().ceil() as u32))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_is_safe_in_xml() {
        assert_eq!(
            escaped("a<b>&\"c\"\u{1b}["),
            "a&lt;b&gt;&amp;&quot;c&quot; ["
        );
    }

    #[test]
    fn tenths_become_decimals() {
        assert_eq!(pixels(1234), "123.4");
        assert_eq!(pixels(-10), "-1");
    }
}
