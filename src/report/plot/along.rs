//! The panel of a guide along the spring: how hard each stretch leans on it, one side up, the other
//! down.

use super::ink::{BLACK, GREEN, tenths};
use super::panel::{Curve, Dash, Panel, Placed, Sheet, stroke};
use super::reach::value_axis;
use super::scale::{Axis, apart};
use super::{PlotError, drawing_error, symbols};
use crate::report::Units;
use crate::report::leaning::{Place, places};
use crate::report::numbers::Unit;
use crate::result::{Assessment, Leaning};
use plotters::element::{Polygon, Rectangle};
use plotters::style::{Color, ShapeStyle, WHITE};

const TITLE_HEIGHT: f64 = 40.0;
const PANEL: f64 = 150.0;
const BELOW: f64 = 62.0;
/// Labels of places stand at least so far apart, pixels.
const LABELS_APART: f64 = 92.0;
/// Least width of a bar, pixels.
const NARROWEST: f64 = 1.5;

/// The panel, in the units shown.
pub struct Along {
    title: String,
    panel: Panel,
    across: Axis,
    across_name: String,
    stretches: Vec<Stretch>,
    places: Vec<Place>,
    length: Unit,
    force: Unit,
}

struct Stretch {
    from: f64,
    to: f64,
    /// Force per length, negative on the - side.
    value: f64,
}

impl Along {
    /// The panel; none where the spring leans on no guide at its largest working deflection.
    pub fn of(assessment: &Assessment, units: Units) -> Option<Self> {
        let answer = assessment.guide_answer.as_ref()?;
        let (length, force, per_length) = (units.length(), units.force(), units.rate());
        let leaning: Vec<Leaning> = answer
            .leaning
            .iter()
            .filter(|s| {
                [s.from_m, s.to_m, s.force_n_per_m]
                    .iter()
                    .all(|x| x.is_finite())
            })
            .copied()
            .collect();
        if leaning.is_empty() {
            return None;
        }
        // A corner bears at a point: it has a force, but no force per length.
        let stretches: Vec<Stretch> = leaning
            .iter()
            .filter(|stretch| !stretch.at_corner)
            .map(|stretch| Stretch {
                from: length.of(stretch.from_m),
                to: length.of(stretch.to_m),
                value: stretch.side.signum() * per_length.of(stretch.force_n_per_m),
            })
            .collect();
        let largest = stretches.iter().fold(0.0f64, |l, s| l.max(s.value.abs()));
        // Room for the forces of the places beyond the bars.
        let mut axis = value_axis([-1.35 * largest, 1.35 * largest].into_iter(), 4);
        if largest == 0.0 {
            axis = Axis {
                from: -1.0,
                ticks: vec![0.0],
                decimals: 0,
                ..axis
            };
        }
        let across = Axis::over(0.0, length.of(assessment.spring.deformable_length_m), 8);
        let zero = Curve {
            line: vec![(across.from, 0.0), (across.to, 0.0)],
            color: BLACK,
            dash: Dash::Solid,
            width: 0.9,
        };
        Some(Along {
            title: format!(
                "Leaning on the guides at {} of deflection: + side up, - side down, with the force of \
                 each place",
                length.show(answer.at_working.deflection_m)
            ),
            panel: Panel {
                name: format!("force on guides, {}", per_length.symbol),
                axis,
                curves: vec![zero],
            },
            across,
            across_name: format!(
                "along the part that deforms, from its bottom, unloaded, {}",
                length.symbol
            ),
            stretches,
            places: places(&leaning, assessment.spring.pitch_m),
            length,
            force,
        })
    }

    /// Height with title and names, pixels.
    pub fn height(&self) -> f64 {
        TITLE_HEIGHT + PANEL + BELOW
    }

    /// In words.
    pub fn description(&self) -> String {
        let forces: Vec<String> = self.places.iter().map(|place| self.words(place)).collect();
        format!("{}: {}.", self.title, forces.join("; "))
    }

    /// Draws it from `top` (pixels) down.
    pub fn draw(&self, sheet: &Sheet, across: (f64, f64), top: f64) -> Result<(), PlotError> {
        symbols::Text::new(sheet).bold(&self.title, (18.0, top + 14.0), 11.5)?;
        let down = (top + TITLE_HEIGHT, PANEL);
        let placed = self.panel.draw(
            sheet,
            across,
            down,
            &self.across,
            Some(self.across_name.as_str()),
        )?;
        for stretch in &self.stretches {
            bar(sheet, &placed, stretch)?;
        }
        placed.curves(sheet, &self.panel.curves)?;
        for positive in [true, false] {
            self.labels(sheet, &placed, across, down, positive)?;
        }
        Ok(())
    }

    /// The forces of the places on one side, along that edge of the panel, and corners.
    fn labels(
        &self,
        sheet: &Sheet,
        placed: &Placed<'_, '_>,
        across: (f64, f64),
        (top, height): (f64, f64),
        positive: bool,
    ) -> Result<(), PlotError> {
        let own: Vec<&Place> = self
            .places
            .iter()
            .filter(|place| place.positive == positive)
            .collect();
        let middles: Vec<f64> = own
            .iter()
            .map(|place| {
                let middle = self.length.of(0.5 * (place.from_m + place.to_m));
                f64::from(placed.place((middle, 0.0)).0)
            })
            .collect();
        let half = 0.5 * LABELS_APART;
        let range = f64::from(tenths(across.0 + half))..=f64::from(tenths(across.1 - half));
        let spread = apart(&middles, f64::from(tenths(LABELS_APART)), range);
        let y = if positive {
            tenths(top + 9.0)
        } else {
            tenths(top + height - 9.0)
        };
        for ((place, middle), x) in own.into_iter().zip(middles).zip(spread) {
            let zero = placed.place((0.0, 0.0)).1;
            let middle = middle.round() as i32;
            if place.corner_force_n > 0.0 {
                corner(sheet, (middle, zero), positive)?;
            }
            symbols::Text::new(sheet).label(&self.words(place), (x.round() as i32, y))?;
        }
        Ok(())
    }

    /// "12.3 N", with what of it is on a corner.
    fn words(&self, place: &Place) -> String {
        let force = self.force.show(place.force_n);
        if place.corner_only {
            format!("corner {force}")
        } else if place.corner_force_n > 0.0 {
            format!("{force}, corner {}", self.force.show(place.corner_force_n))
        } else {
            force
        }
    }
}

/// A stretch: full on the + side, hollow on the other.
fn bar(sheet: &Sheet, placed: &Placed<'_, '_>, stretch: &Stretch) -> Result<(), PlotError> {
    let (a, b) = (
        placed.place((stretch.from, 0.0)),
        placed.place((stretch.to, stretch.value)),
    );
    let right = b.0.max(a.0 + tenths(NARROWEST));
    let corners = [(a.0, a.1.min(b.1)), (right, a.1.max(b.1))];
    let ground = if stretch.value > 0.0 { GREEN } else { WHITE };
    let outline = ShapeStyle {
        color: BLACK.to_rgba(),
        filled: false,
        stroke_width: tenths(0.8) as u32,
    };
    for style in [ground.filled(), outline] {
        sheet
            .draw(&Rectangle::new(corners, style))
            .map_err(drawing_error)?;
    }
    Ok(())
}

/// An arrow onto the axis: the force of a corner has no length.
fn corner(sheet: &Sheet, (x, y): (i32, i32), positive: bool) -> Result<(), PlotError> {
    let out = if positive { -1 } else { 1 };
    let (head, tail) = (y + out * tenths(9.0), y + out * tenths(42.0));
    stroke(sheet, vec![(x, head), (x, tail)], BLACK, Dash::Solid, 1.6)?;
    let tip = vec![(x, y), (x - tenths(4.0), head), (x + tenths(4.0), head)];
    sheet
        .draw(&Polygon::new(tip, BLACK.filled()))
        .map_err(drawing_error)
}
