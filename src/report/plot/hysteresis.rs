//! The loop of a stroke with friction: force on the way out and on the way back, and below it how far
//! the two lie apart, whose area is the energy lost.

use super::ink::{BLACK, BLUE, VERMILION, tenths};
use super::panel::{Curve, Dash, Panel, Sheet, stroke};
use super::reach::value_axis;
use super::scale::Axis;
use super::{PlotError, symbols};
use crate::report::Units;
use crate::report::losses::is_lossless;
use crate::report::numbers::Unit;
use crate::result::{Assessment, PathPoint};

const TITLE_HEIGHT: f64 = 60.0;
const LOOP: f64 = 150.0;
const APART: f64 = 100.0;
const BETWEEN: f64 = 16.0;
const BELOW: f64 = 62.0;

/// The two panels, in the units shown.
pub struct Hysteresis {
    title: String,
    across: Axis,
    across_name: String,
    whole: Panel,
    apart: Panel,
}

impl Hysteresis {
    /// The panels; none where there is no stroke, or no loop in it.
    pub fn of(assessment: &Assessment, units: Units) -> Option<Self> {
        let stroke = assessment
            .stroke
            .as_ref()
            .filter(|stroke| !is_lossless(stroke))?;
        let (length, force) = (units.length(), units.force());
        let out = line(&stroke.out, length, force);
        let back = line(&stroke.back, length, force);
        if out.len() < 2 || back.len() < 2 {
            return None;
        }
        let span = length.of(stroke.to_deflection_m) - length.of(stroke.from_deflection_m);
        let across = Axis::over(
            length.of(stroke.from_deflection_m) - 0.03 * span,
            length.of(stroke.to_deflection_m) + 0.03 * span,
            8,
        );
        let opening: Vec<(f64, f64)> = out
            .iter()
            .filter_map(|(at, force)| Some((*at, force - value_at(&back, *at)?)))
            .collect();
        let (low, high) = out
            .iter()
            .chain(&back)
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), point| {
                (low.min(point.1), high.max(point.1))
            });
        let room = 0.06 * (high - low);
        let curve = |line: Vec<(f64, f64)>, color, dash| Curve {
            line,
            color,
            dash,
            width: 1.6,
        };
        let zero = Curve {
            line: vec![(across.from, 0.0), (across.to, 0.0)],
            color: BLACK,
            dash: Dash::Solid,
            width: 0.7,
        };
        Some(Hysteresis {
            title: format!(
                "Stroke with friction: {} lost in each",
                units.energy().show(stroke.energy_lost_j)
            ),
            whole: Panel {
                name: format!("axial force, {}", force.symbol),
                axis: Axis::over(low - room, high + room, 4),
                curves: vec![
                    curve(out, BLUE, Dash::Solid),
                    curve(back, VERMILION, Dash::Dashed),
                ],
            },
            apart: Panel {
                name: format!("out - back, {}", force.symbol),
                axis: value_axis(opening.iter().map(|point| point.1), 3),
                curves: vec![zero, curve(opening, BLACK, Dash::Solid)],
            },
            across,
            across_name: format!("axial deflection, {}", length.symbol),
        })
    }

    /// Height with title and names, pixels.
    pub fn height(&self) -> f64 {
        TITLE_HEIGHT + LOOP + BETWEEN + APART + BELOW
    }

    /// In words.
    pub fn description(&self) -> String {
        format!(
            "{}: force on the way out and back, and how far they lie apart.",
            self.title
        )
    }

    /// Draws it from `top` (pixels) down.
    pub fn draw(&self, sheet: &Sheet, across: (f64, f64), top: f64) -> Result<(), PlotError> {
        let text = symbols::Text::new(sheet);
        text.bold(&self.title, (18.0, top + 14.0), 11.5)?;
        let middle = top + 43.0;
        for (x, color, dash, name) in [
            (18.0, BLUE, Dash::Solid, "force on the way out"),
            (193.0, VERMILION, Dash::Dashed, "on the way back"),
            (
                358.0,
                BLACK,
                Dash::Solid,
                "how far they lie apart: its area is the energy lost",
            ),
        ] {
            let sample = vec![
                (tenths(x), tenths(middle)),
                (tenths(x + 28.0), tenths(middle)),
            ];
            stroke(sheet, sample, color, dash, 1.6)?;
            text.entry(name, (x + 35.0, middle), false)?;
        }
        let down = top + TITLE_HEIGHT;
        let panels = [
            (&self.whole, (down, LOOP), None),
            (
                &self.apart,
                (down + LOOP + BETWEEN, APART),
                Some(self.across_name.as_str()),
            ),
        ];
        for (panel, place, name) in panels {
            let placed = panel.draw(sheet, across, place, &self.across, name)?;
            placed.curves(sheet, &panel.curves)?;
        }
        Ok(())
    }
}

/// Force over deflection in the units shown.
fn line(points: &[PathPoint], length: Unit, force: Unit) -> Vec<(f64, f64)> {
    points
        .iter()
        .map(|p| (length.of(p.deflection_m), force.of(p.force_n)))
        .filter(|(x, y)| x.is_finite() && y.is_finite())
        .collect()
}

/// The value of a line at `x`, straight between its points; `None` beside it.
fn value_at(line: &[(f64, f64)], x: f64) -> Option<f64> {
    line.windows(2).find_map(|pair| {
        let [(a, low), (b, high)] = [pair[0], pair[1]];
        if a == x {
            return Some(low);
        }
        if b == x {
            return Some(high);
        }
        ((a < x) != (b < x)).then(|| low + (high - low) * (x - a) / (b - a))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_line_is_read_forwards_and_backwards() {
        let mut line = vec![(1.0, 10.0), (2.0, 20.0), (4.0, 0.0)];
        for _ in 0..2 {
            assert_eq!(value_at(&line, 1.0), Some(10.0));
            assert_eq!(value_at(&line, 3.0), Some(10.0));
            assert_eq!(value_at(&line, 4.0), Some(0.0));
            assert_eq!(value_at(&line, 4.5), None);
            line.reverse();
        }
    }
}
