//! How far the axes reach: the path is shown large, marks far from it are named only.

use super::marks::{Marked, Shape};
use super::scale::Axis;

/// A point of the path as shown: deflection, force, bow, force on the guides and on one coil.
pub type Point = [f64; 5];

/// From nought past the path and its points; limits, formula and solid too where that does not
/// squeeze the path.
pub fn deflection_axis(points: &[Point], marks: &[Marked], highest: f64) -> Axis {
    let reach = points
        .iter()
        .map(|point| point[0])
        .chain(marks.iter().filter(must_show).map(|mark| mark.deflection))
        .fold(0.0, f64::max);
    let room = room_beyond(reach);
    let to = marks
        .iter()
        .filter(|mark| mark.force <= highest)
        .map(|mark| mark.deflection)
        .filter(|deflection| *deflection <= room)
        .fold(reach, f64::max);
    Axis::over(0.0, 1.03 * to, 8)
}

/// Whether the picture reaches as far as this mark in any case.
fn must_show(mark: &&Marked) -> bool {
    matches!(mark.shape, Shape::OpenCircle | Shape::FilledCircle) || mark.governs
}

/// How far marks beyond the path may stretch an axis.
fn room_beyond(reach: f64) -> f64 {
    if reach > 0.0 {
        1.6 * reach
    } else {
        f64::INFINITY
    }
}

/// Marks above this force would squeeze the path: they are named only.
pub fn highest_force(points: &[Point], marks: &[Marked]) -> f64 {
    let reach = points
        .iter()
        .map(|point| point[1])
        .chain(marks.iter().filter(must_show).map(|mark| mark.force))
        .fold(0.0, f64::max);
    room_beyond(reach)
}

/// From nought (or below, where values are) to a little above the largest value.
pub fn value_axis(values: impl Iterator<Item = f64>, count: usize) -> Axis {
    let (low, high) = values.fold((0.0f64, 0.0f64), |(low, high), value| {
        (low.min(value), high.max(value))
    });
    let extent = high - low;
    let from = if low < 0.0 { low - 0.06 * extent } else { 0.0 };
    Axis::over(from, high + 0.08 * extent, count)
}
