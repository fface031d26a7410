//! The picture of a load path: axial force above, bow below, then what guides bear, all against the
//! axial deflection; numbered marks with a key. Below it, where there are any, the places at which a
//! guide bears and the loop of a stroke with friction. Readable in grey: lines of one panel differ in dash, kinds of mark in
//! shape.

mod along;
mod figure;
mod hysteresis;
mod ink;
mod key;
mod marks;
mod panel;
mod paper;
mod parts;
mod reach;
mod scale;
mod symbols;

use super::Units;
use crate::result::{Assessment, Path};
use figure::Figure;
use paper::Paper;
use plotters::drawing::IntoDrawingArea;
use std::fmt;

/// Why a picture could not be drawn.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct PlotError(String);

impl fmt::Display for PlotError {
    fn fmt(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        write!(formatter, "the picture could not be drawn: {}", self.0)
    }
}

impl std::error::Error for PlotError {}

/// The load path of the column as built and imperfect as SVG.
///
/// # Errors
/// Only what the drawing library reports about its own layout.
pub fn plot(assessment: &Assessment, path: &Path, units: Units) -> Result<String, PlotError> {
    let figure = Figure::of(assessment, path, units);
    let mut svg = String::new();
    let paper = Paper::new(
        &mut svg,
        figure.size(),
        &figure.title,
        &figure.description(),
    );
    let sheet = paper.into_drawing_area();
    figure
        .draw(&sheet)
        .and_then(|()| sheet.present().map_err(drawing_error))?;
    drop(sheet);
    Ok(svg)
}

fn drawing_error(error: impl fmt::Display) -> PlotError {
    PlotError(error.to_string())
}
