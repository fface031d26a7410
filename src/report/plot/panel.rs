//! One panel: axes with round numbers, grid, curves.

use super::ink::{BLACK, font, tenths};
use super::paper::Paper;
use super::scale::{Axis, clipped};
use super::{PlotError, drawing_error};
use crate::report::numbers::fixed;
use plotters::chart::{ChartBuilder, ChartContext, LabelAreaPosition};
use plotters::coord::ranged1d::{KeyPointHint, NoDefaultFormatting, Ranged, ValueFormatter};
use plotters::coord::{Shift, cartesian::Cartesian2d};
use plotters::drawing::DrawingArea;
use plotters::element::{DashedPathElement, PathElement};
use plotters::style::{Color, RGBColor, ShapeStyle};
use std::ops::Range;

/// The sheet everything is drawn on.
pub type Sheet<'a> = DrawingArea<Paper<'a>, Shift>;

const GRID: RGBColor = RGBColor(228, 228, 228);

/// How a line is broken.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Dash {
    /// Not at all.
    Solid,
    /// Long strokes.
    Dashed,
    /// Strokes and gaps of one length, for what is a guide only.
    Broken,
    /// Short strokes.
    Dotted,
}

/// A line in a panel.
#[derive(Clone, Debug)]
pub struct Curve {
    /// Its points in the units shown.
    pub line: Vec<(f64, f64)>,
    /// Colour.
    pub color: RGBColor,
    /// Dash.
    pub dash: Dash,
    /// Width, pixels.
    pub width: f64,
}

/// A panel's value axis and its curves.
pub struct Panel {
    /// Name and unit of the axis.
    pub name: String,
    /// The axis.
    pub axis: Axis,
    /// The curves.
    pub curves: Vec<Curve>,
}

impl Ranged for Axis {
    type FormatOption = NoDefaultFormatting;
    type ValueType = f64;

    fn map(&self, value: &f64, limit: (i32, i32)) -> i32 {
        let share = (value - self.from) / (self.to - self.from);
        limit.0 + (share * f64::from(limit.1 - limit.0)).round() as i32
    }

    fn key_points<Hint: KeyPointHint>(&self, hint: Hint) -> Vec<f64> {
        if hint.weight().allow_light_points() {
            Vec::new()
        } else {
            self.ticks.clone()
        }
    }

    fn range(&self) -> Range<f64> {
        self.from..self.to
    }
}

impl ValueFormatter<f64> for Axis {
    fn format_ext(&self, value: &f64) -> String {
        fixed(*value, self.decimals)
    }
}

/// A panel that has been drawn and knows where its points are.
pub struct Placed<'a, 'p> {
    chart: ChartContext<'a, Paper<'p>, Cartesian2d<Axis, Axis>>,
    across: Axis,
    up: Axis,
}

impl Panel {
    /// Draws axes and grid between `left` and `right`, from `top` down by `height` pixels. The
    /// horizontal axis is labelled where it is given a name.
    pub fn draw<'p>(
        &self,
        sheet: &Sheet<'p>,
        (left, right): (f64, f64),
        (top, height): (f64, f64),
        across: &Axis,
        across_name: Option<&str>,
    ) -> Result<Placed<'p, 'p>, PlotError> {
        let below = if across_name.is_some() { 44.0 } else { 0.0 };
        let margin = left - 14.0;
        let area = sheet.clone().shrink(
            (tenths(left - margin), tenths(top)),
            (tenths(right - left + margin), tenths(height + below)),
        );
        let mut chart = ChartBuilder::on(&area)
            .set_label_area_size(LabelAreaPosition::Left, tenths(margin))
            .set_label_area_size(LabelAreaPosition::Bottom, tenths(below))
            .build_cartesian_2d(across.clone(), self.axis.clone())
            .map_err(drawing_error)?;
        let line = |color: RGBColor, width| ShapeStyle {
            color: color.to_rgba(),
            filled: false,
            stroke_width: width,
        };
        chart
            .configure_mesh()
            .max_light_lines(0)
            .bold_line_style(line(GRID, 7))
            .axis_style(line(BLACK, 9))
            .set_all_tick_mark_size(40)
            .label_style(font(11.0))
            .axis_desc_style(font(12.0))
            .x_desc(across_name.unwrap_or(""))
            .y_desc(self.name.as_str())
            .draw()
            .map_err(drawing_error)?;
        Ok(Placed {
            chart,
            across: across.clone(),
            up: self.axis.clone(),
        })
    }
}

impl Placed<'_, '_> {
    /// Where a point is on the sheet.
    pub fn place(&self, point: (f64, f64)) -> (i32, i32) {
        self.chart.backend_coord(&point)
    }

    /// Draws curves, cut off at the edges.
    pub fn curves(&self, sheet: &Sheet, curves: &[Curve]) -> Result<(), PlotError> {
        for curve in curves {
            let across = self.across.from..=self.across.to;
            let up = self.up.from..=self.up.to;
            for piece in clipped(&curve.line, across, up) {
                let line = piece.into_iter().map(|point| self.place(point)).collect();
                stroke(sheet, line, curve.color, curve.dash, curve.width)?;
            }
        }
        Ok(())
    }
}

/// Draws a line on the sheet.
pub fn stroke(
    sheet: &Sheet,
    line: Vec<(i32, i32)>,
    color: RGBColor,
    dash: Dash,
    width: f64,
) -> Result<(), PlotError> {
    let style = ShapeStyle {
        color: color.to_rgba(),
        filled: false,
        stroke_width: tenths(width) as u32,
    };
    let dashed =
        |on: f64, off: f64| DashedPathElement::new(line.clone(), tenths(on), tenths(off), style);
    match dash {
        Dash::Solid => sheet.draw(&PathElement::new(line, style)),
        Dash::Dashed => sheet.draw(&dashed(7.0, 4.0)),
        Dash::Broken => sheet.draw(&dashed(4.5, 4.5)),
        Dash::Dotted => sheet.draw(&dashed(1.6, 3.0)),
    }
    .map_err(drawing_error)
}
