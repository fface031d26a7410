//! Markers, numbers and text on the sheet.

use super::ink::{BLACK, VERMILION, font, styled, tenths};
use super::marks::Shape;
use super::panel::Sheet;
use super::{PlotError, drawing_error};
use plotters::element::{Circle, PathElement, Polygon, Text as PlainText};
use plotters::style::text_anchor::{HPos, Pos, VPos};
use plotters::style::{Color, FontStyle, RGBColor, ShapeStyle, TextStyle, WHITE};
use std::f64::consts::PI;

/// Writes text on a sheet.
pub struct Text<'a, 'p> {
    sheet: &'a Sheet<'p>,
}

impl<'a, 'p> Text<'a, 'p> {
    /// On this sheet.
    pub fn new(sheet: &'a Sheet<'p>) -> Self {
        Text { sheet }
    }

    fn write(
        &self,
        text: &str,
        at: (i32, i32),
        style: TextStyle<'static>,
        anchor: (HPos, VPos),
    ) -> Result<(), PlotError> {
        let style = style.pos(Pos::new(anchor.0, anchor.1));
        self.sheet
            .draw(&PlainText::new(text, at, style))
            .map_err(drawing_error)
    }

    /// Bold, its top left corner at `at` (pixels).
    pub fn bold(&self, text: &str, at: (f64, f64), size: f64) -> Result<(), PlotError> {
        let style = styled(size, FontStyle::Bold, BLACK);
        self.write(text, paper(at), style, (HPos::Left, VPos::Top))
    }

    /// Plain, its top left corner at `at` (pixels).
    pub fn plain(&self, text: &str, at: (f64, f64), size: f64) -> Result<(), PlotError> {
        self.write(text, paper(at), font(size), (HPos::Left, VPos::Top))
    }

    /// In a line of the key: left-aligned, centred on the height `at.1` (pixels).
    pub fn entry(&self, text: &str, at: (f64, f64), bold: bool) -> Result<(), PlotError> {
        let weight = if bold {
            FontStyle::Bold
        } else {
            FontStyle::Normal
        };
        let style = styled(11.0, weight, BLACK);
        self.write(text, paper(at), style, (HPos::Left, VPos::Center))
    }

    /// Plain and small, its middle at `at` (tenths of a pixel).
    pub fn label(&self, text: &str, at: (i32, i32)) -> Result<(), PlotError> {
        self.write(text, at, font(10.5), (HPos::Center, VPos::Center))
    }

    /// The same as an entry, right-aligned.
    pub fn figure(&self, text: &str, at: (f64, f64), bold: bool) -> Result<(), PlotError> {
        let weight = if bold {
            FontStyle::Bold
        } else {
            FontStyle::Normal
        };
        let style = styled(11.0, weight, BLACK);
        self.write(text, paper(at), style, (HPos::Right, VPos::Center))
    }

    /// A number in a circle; white on black where it governs.
    pub fn badge(&self, number: usize, centre: (i32, i32), governs: bool) -> Result<(), PlotError> {
        let (ground, ink) = if governs {
            (BLACK, WHITE)
        } else {
            (WHITE, BLACK)
        };
        let radius = tenths(8.0);
        self.sheet
            .draw(&Circle::new(centre, radius, ground.filled()))
            .map_err(drawing_error)?;
        self.sheet
            .draw(&Circle::new(centre, radius, outline(0.9)))
            .map_err(drawing_error)?;
        let style = styled(10.0, FontStyle::Normal, ink);
        self.write(
            &number.to_string(),
            centre,
            style,
            (HPos::Center, VPos::Center),
        )
    }
}

fn paper(at: (f64, f64)) -> (i32, i32) {
    (tenths(at.0), tenths(at.1))
}

fn outline(width: f64) -> ShapeStyle {
    ShapeStyle {
        color: BLACK.to_rgba(),
        filled: false,
        stroke_width: tenths(width) as u32,
    }
}

/// A marker with its centre at `at`. The governing one is filled with colour.
pub fn draw(sheet: &Sheet, shape: Shape, at: (i32, i32), governs: bool) -> Result<(), PlotError> {
    let ground = if governs { VERMILION } else { WHITE };
    let closed = |corners: Vec<(f64, f64)>| -> Result<(), PlotError> {
        let corners: Vec<(i32, i32)> = corners.iter().map(|c| beside(at, *c)).collect();
        sheet
            .draw(&Polygon::new(corners.clone(), ground.filled()))
            .map_err(drawing_error)?;
        let around: Vec<_> = corners.iter().chain(corners.first()).copied().collect();
        sheet
            .draw(&PathElement::new(around, outline(1.1)))
            .map_err(drawing_error)
    };
    let lines = |strokes: &[[(f64, f64); 2]], width: f64| -> Result<(), PlotError> {
        for ends in strokes {
            let line: Vec<_> = ends.iter().map(|end| beside(at, *end)).collect();
            sheet
                .draw(&PathElement::new(line, outline(width)))
                .map_err(drawing_error)?;
        }
        Ok(())
    };
    let round_at = |centre: (f64, f64), radius: f64, ground: RGBColor| -> Result<(), PlotError> {
        let centre = beside(at, centre);
        sheet
            .draw(&Circle::new(centre, tenths(radius), ground.filled()))
            .map_err(drawing_error)?;
        sheet
            .draw(&Circle::new(centre, tenths(radius), outline(1.1)))
            .map_err(drawing_error)
    };
    let round = |radius: f64, ground: RGBColor| round_at((0.0, 0.0), radius, ground);
    match shape {
        Shape::FilledCircle => round(4.2, BLACK),
        Shape::OpenCircle => round(4.2, WHITE),
        Shape::Ring => round(5.0, ground).and_then(|()| round(1.4, BLACK)),
        Shape::TriangleUp => closed(regular(3, 6.2, -PI / 2.0)),
        Shape::TriangleDown => closed(regular(3, 6.2, PI / 2.0)),
        Shape::TriangleLeft => closed(regular(3, 6.2, PI)),
        Shape::TriangleRight => closed(regular(3, 6.2, 0.0)),
        Shape::Diamond => closed(regular(4, 5.8, 0.0)),
        Shape::Square => closed(regular(4, 6.0, PI / 4.0)),
        Shape::Pentagon => closed(regular(5, 5.4, -PI / 2.0)),
        Shape::Star => closed(star(6.6, 2.9)),
        Shape::Bar => closed(vec![(-1.8, -7.0), (1.8, -7.0), (1.8, 7.0), (-1.8, 7.0)]),
        Shape::Cross => lines(
            &[[(-4.2, -4.2), (4.2, 4.2)], [(-4.2, 4.2), (4.2, -4.2)]],
            1.4,
        ),
        Shape::Plus => lines(&[[(-5.8, 0.0), (5.8, 0.0)], [(0.0, -5.8), (0.0, 5.8)]], 1.4),
        Shape::Wedge => closed(vec![(-6.5, 4.0), (6.5, 4.0), (6.5, -4.5)]),
        Shape::Parallelogram => closed(vec![(-7.0, 3.6), (2.6, 3.6), (7.0, -3.6), (-2.6, -3.6)]),
        Shape::HalfDisc => closed(half_disc(6.0)),
        Shape::DottedSquare => closed(regular(4, 7.0, PI / 4.0)).and_then(|()| round(1.4, BLACK)),
        Shape::Tee => lines(&[[(-6.0, 4.5), (6.0, 4.5)], [(0.0, 4.5), (0.0, -5.5)]], 1.6),
        Shape::Touch => round_at((-1.6, 0.0), 3.8, WHITE)
            .and_then(|()| lines(&[[(3.2, -7.0), (3.2, 7.0)]], 1.6)),
        Shape::TwoLines => lines(
            &[[(-2.4, -6.5), (-2.4, 6.5)], [(2.4, -6.5), (2.4, 6.5)]],
            1.6,
        ),
        Shape::TwoCircles => {
            round_at((-3.2, 0.0), 3.2, WHITE).and_then(|()| round_at((3.2, 0.0), 3.2, WHITE))
        }
        Shape::Wave => lines(
            &[
                [(-7.0, 3.5), (-3.5, -3.5)],
                [(-3.5, -3.5), (0.0, 3.5)],
                [(0.0, 3.5), (3.5, -3.5)],
                [(3.5, -3.5), (7.0, 3.5)],
            ],
            1.5,
        ),
    }
}

fn beside(at: (i32, i32), offset: (f64, f64)) -> (i32, i32) {
    (at.0 + tenths(offset.0), at.1 + tenths(offset.1))
}

fn regular(corners: u32, radius: f64, turn: f64) -> Vec<(f64, f64)> {
    (0..corners)
        .map(|corner| {
            let angle = turn + 2.0 * PI * f64::from(corner) / f64::from(corners);
            (radius * angle.cos(), radius * angle.sin())
        })
        .collect()
}

/// Flat on the right.
fn half_disc(radius: f64) -> Vec<(f64, f64)> {
    (0..=12)
        .map(|step| {
            let angle = PI * (0.5 + f64::from(step) / 12.0);
            (0.4 * radius + radius * angle.cos(), radius * angle.sin())
        })
        .collect()
}

fn star(outer: f64, inner: f64) -> Vec<(f64, f64)> {
    let tips = regular(5, outer, -PI / 2.0);
    let dents = regular(5, inner, -PI / 2.0 + PI / 5.0);
    tips.into_iter()
        .zip(dents)
        .flat_map(|(tip, dent)| [tip, dent])
        .collect()
}
