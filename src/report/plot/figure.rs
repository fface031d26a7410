//! The whole figure: heading, numbers in a row, two panels over one axis, key.

use super::ink::{BLACK, BLUE, GREY, VERMILION, tenths};
use super::key::{self, Entry};
use super::marks::{Marked, Shape, marked};
use super::panel::{Curve, Dash, Panel, Sheet};
use super::parts::parted;
use super::scale::{Axis, apart};
use super::{PlotError, drawing_error, symbols};
use crate::report::Units;
use crate::report::names::phrase;
use crate::report::numbers::{Unit, column_decimals, fixed};
use crate::result::{Assessment, LimitKind, Path, Verdict};
use plotters::element::PathElement;
use plotters::style::{Color, ShapeStyle};

const WIDTH: f64 = 760.0;
const LEFT: f64 = 82.0;
const RIGHT: f64 = 738.0;
const NUMBERS: f64 = 72.0;
const FORCE_TOP: f64 = 96.0;
const FORCE_HEIGHT: f64 = 250.0;
const BOW_TOP: f64 = 362.0;
const BOW_HEIGHT: f64 = 150.0;
const KEY_TOP: f64 = 572.0;

/// A figure ready to be drawn: everything in the units shown.
pub struct Figure {
    /// Title of the case.
    pub title: String,
    answer: String,
    marks: Vec<Marked>,
    off: Vec<Marked>,
    deflection: Axis,
    force: Panel,
    bow: Panel,
    past_clash: bool,
    length_unit: Unit,
    force_unit: Unit,
}

impl Figure {
    /// The figure of a path.
    pub fn of(assessment: &Assessment, path: &Path, units: Units) -> Self {
        let length = units.length();
        let force = units.force();
        let all: Vec<Marked> = marked(assessment, path)
            .into_iter()
            .map(|mark| Marked {
                deflection: length.of(mark.deflection),
                force: force.of(mark.force),
                bow: length.of(mark.bow),
                ..mark
            })
            .collect();
        let points: Vec<[f64; 3]> = path
            .points
            .iter()
            .map(|p| {
                [
                    length.of(p.deflection_m),
                    force.of(p.force_n),
                    length.of(p.bow_m),
                ]
            })
            .filter(|point| point.iter().all(|value| value.is_finite()))
            .collect();
        // The last step of a path goes past solid.
        let of_path = |kind: LimitKind| {
            let mark = path.marks.iter().find(|mark| mark.name == kind.key())?;
            let point = mark.point;
            Some([
                length.of(point.deflection_m),
                force.of(point.force_n),
                length.of(point.bow_m),
            ])
        };
        let points = parted(&points, of_path(LimitKind::Solid)).0;
        let highest = highest_force(&points, &all);
        let deflection = deflection_axis(&points, &all, highest);
        let (marks, off): (Vec<_>, Vec<_>) = all
            .into_iter()
            .partition(|mark| deflection.contains(mark.deflection) && mark.force <= highest);

        let seen = points.iter().filter(|point| deflection.contains(point[0]));
        let forces = seen
            .clone()
            .map(|p| p[1])
            .chain(marks.iter().map(|m| m.force));
        let limit = length.of(assessment.duty.bow_limit_m);
        let bows = seen.map(|p| p[2]).chain([limit]);
        let (known, guide) = parted(&points, of_path(LimitKind::Clash));
        let past_clash = !guide.is_empty();
        let curves_of = |value: usize, color| {
            [(&known, Dash::Solid), (&guide, Dash::Broken)].map(|(part, dash)| Curve {
                line: part.iter().map(|p| (p[0], p[value])).collect(),
                color,
                dash,
                width: 2.0,
            })
        };
        // The perfect column's line lies below, to be seen where the two part.
        let mut curves: Vec<Curve> = perfect_path(&marks).into_iter().collect();
        curves.extend(curves_of(1, BLUE));
        let mut bow_curves = curves_of(2, VERMILION).to_vec();
        bow_curves.push(Curve {
            line: vec![(deflection.from, limit), (deflection.to, limit)],
            color: BLACK,
            dash: Dash::Dotted,
            width: 1.2,
        });
        let force_panel = Panel {
            name: format!("axial force, {}", force.symbol),
            axis: value_axis(forces, 6),
            curves,
        };
        let bow_panel = Panel {
            name: format!("bow, {}", length.symbol),
            axis: value_axis(bows, 4),
            curves: bow_curves,
        };
        Figure {
            title: assessment.title.clone(),
            answer: answer(assessment, units),
            marks,
            off,
            deflection,
            force: force_panel,
            bow: bow_panel,
            past_clash,
            length_unit: length,
            force_unit: force,
        }
    }

    /// Width and height, pixels.
    pub fn size(&self) -> (u32, u32) {
        let rows = self.marks.len() + self.off.len();
        (
            WIDTH as u32,
            (KEY_TOP + key::height(rows, self.past_clash)).ceil() as u32,
        )
    }

    /// The figure in words, for readers who cannot see it.
    pub fn description(&self) -> String {
        format!(
            "{} Axial force and bow against axial deflection, with {} numbered points explained in \
             the key below.",
            self.answer,
            self.marks.len()
        )
    }

    /// Draws it.
    pub fn draw(&self, sheet: &Sheet) -> Result<(), PlotError> {
        let text = symbols::Text::new(sheet);
        text.bold(&shortened(&self.title, 78), (18.0, 14.0), 15.0)?;
        text.plain(&shortened(&self.answer, 112), (18.0, 38.0), 11.5)?;

        let across = (LEFT, RIGHT);
        let force = self.force.draw(
            sheet,
            across,
            (FORCE_TOP, FORCE_HEIGHT),
            &self.deflection,
            None,
        )?;
        let name = format!("axial deflection, {}", self.length_unit.symbol);
        let bow = self.bow.draw(
            sheet,
            across,
            (BOW_TOP, BOW_HEIGHT),
            &self.deflection,
            Some(&name),
        )?;

        let places: Vec<i32> = self
            .marks
            .iter()
            .map(|mark| force.place((mark.deflection, 0.0)).0)
            .collect();
        self.guides(sheet, &places)?;
        force.curves(sheet, &self.force.curves)?;
        bow.curves(sheet, &self.bow.curves)?;
        // The governing mark last, on top of its neighbours.
        let (governing, others): (Vec<_>, Vec<_>) = self.marks.iter().partition(|m| m.governs);
        for mark in others.into_iter().chain(governing) {
            for at in [
                force.place((mark.deflection, mark.force)),
                bow.place((mark.deflection, mark.bow)),
            ] {
                symbols::draw(sheet, mark.shape, at, mark.governs)?;
            }
        }
        self.numbers(sheet, &places)?;
        key::draw(
            sheet,
            (18.0, KEY_TOP),
            &self.entries(),
            [self.length_unit.symbol, self.force_unit.symbol],
            self.past_clash,
        )
    }

    /// Thin lines from the row of numbers down through both panels.
    fn guides(&self, sheet: &Sheet, places: &[i32]) -> Result<(), PlotError> {
        let style = ShapeStyle {
            color: GREY.to_rgba(),
            filled: false,
            stroke_width: 6,
        };
        for (x, badge) in places.iter().zip(badges(places)) {
            let line = vec![
                (badge, tenths(NUMBERS)),
                (*x, tenths(FORCE_TOP)),
                (*x, tenths(BOW_TOP + BOW_HEIGHT)),
            ];
            sheet
                .draw(&PathElement::new(line, style))
                .map_err(drawing_error)?;
        }
        Ok(())
    }

    /// The numbers of the marks in a row above the panels.
    fn numbers(&self, sheet: &Sheet, places: &[i32]) -> Result<(), PlotError> {
        let text = symbols::Text::new(sheet);
        for (number, (mark, x)) in self.marks.iter().zip(badges(places)).enumerate() {
            let centre = (x, tenths(NUMBERS));
            text.badge(number + 1, centre, mark.governs)?;
        }
        Ok(())
    }

    fn entries(&self) -> Vec<Entry> {
        let all = || self.marks.iter().chain(&self.off);
        let decimals = [
            column_decimals(all().map(|mark| mark.deflection), 5),
            column_decimals(all().map(|mark| mark.force), 4),
            column_decimals(all().map(|mark| mark.bow), 4),
        ];
        all()
            .enumerate()
            .map(|(row, mark)| Entry {
                number: (row < self.marks.len()).then_some(row + 1),
                shape: mark.shape,
                title: mark.title.clone(),
                governs: mark.governs,
                values: [
                    fixed(mark.deflection, decimals[0]),
                    fixed(mark.force, decimals[1]),
                    fixed(mark.bow, decimals[2]),
                ],
            })
            .collect()
    }
}

/// Places of the numbers, kept apart.
fn badges(places: &[i32]) -> Vec<i32> {
    let wanted: Vec<f64> = places.iter().map(|x| f64::from(*x)).collect();
    let range = f64::from(tenths(LEFT - 6.0))..=f64::from(tenths(RIGHT));
    apart(&wanted, f64::from(tenths(21.0)), range)
        .into_iter()
        .map(|x| x.round() as i32)
        .collect()
}

/// From nought past the path and its points; limits, formula and solid too where that does not
/// squeeze the path.
fn deflection_axis(points: &[[f64; 3]], marks: &[Marked], highest: f64) -> Axis {
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
fn highest_force(points: &[[f64; 3]], marks: &[Marked]) -> f64 {
    let reach = points
        .iter()
        .map(|point| point[1])
        .chain(marks.iter().filter(must_show).map(|mark| mark.force))
        .fold(0.0, f64::max);
    room_beyond(reach)
}

/// From nought (or below, where values are) to a little above the largest value.
fn value_axis(values: impl Iterator<Item = f64>, count: usize) -> Axis {
    let (low, high) = values.fold((0.0f64, 0.0f64), |(low, high), value| {
        (low.min(value), high.max(value))
    });
    let extent = high - low;
    let from = if low < 0.0 { low - 0.06 * extent } else { 0.0 };
    Axis::over(from, high + 0.08 * extent, count)
}

/// The straight path of the perfect column as built: a straight line from the origin to its
/// critical point or, where it has none before solid, to solid.
fn perfect_path(marks: &[Marked]) -> Option<Curve> {
    let of = |kind: LimitKind| marks.iter().find(|mark| mark.key == kind.key());
    let end = of(LimitKind::Critical).or_else(|| of(LimitKind::Solid))?;
    Some(Curve {
        line: vec![(0.0, 0.0), (end.deflection, end.force)],
        color: BLACK,
        dash: Dash::Dashed,
        width: 1.2,
    })
}

fn answer(assessment: &Assessment, units: Units) -> String {
    let verdict = match assessment.verdict {
        Verdict::Holds => "Holds",
        Verdict::DoesNotHold => "Does not hold",
        Verdict::Undecided => "Could not be decided",
    };
    let governing = assessment.limits.iter().find(|limit| limit.governs);
    match governing.and_then(|limit| Some((limit.name, limit.deflection_m?))) {
        Some((name, at)) => format!(
            "{verdict}: {} governs, at {}.",
            phrase(name),
            units.show_length(at)
        ),
        None => format!("{verdict}."),
    }
}

fn shortened(text: &str, room: usize) -> String {
    if text.chars().count() <= room {
        return text.to_string();
    }
    text.chars().take(room - 3).collect::<String>() + "..."
}
