//! The whole figure: heading, numbers in a row, panels over one axis, key, further panels.

use super::along::Along;
use super::hysteresis::Hysteresis;
use super::ink::{BLACK, BLUE, GREEN, GREY, VERMILION, tenths};
use super::key::{self, Entry, Lines, WIDE};
use super::marks::{Marked, marked};
use super::panel::{Curve, Dash, Panel, Sheet};
use super::parts::parted;
use super::reach::{Point, deflection_axis, highest_force, value_axis};
use super::scale::{Axis, apart};
use super::{PlotError, drawing_error, symbols};
use crate::report::Units;
use crate::report::names::phrase;
use crate::report::numbers::{Unit, column_decimals, fixed};
use crate::result::{Assessment, LimitKind, Path, PathPoint, Verdict};
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
const GUIDES_HEIGHT: f64 = 110.0;
const BETWEEN: f64 = 16.0;
/// From the last panel to the key.
const TO_KEY: f64 = 60.0;

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
    guides: Option<Panel>,
    along: Option<Along>,
    hysteresis: Option<Hysteresis>,
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
                leaning: force.of(mark.leaning),
                ..mark
            })
            .collect();
        let numbers = |p: &PathPoint| {
            [
                length.of(p.deflection_m),
                force.of(p.force_n),
                length.of(p.bow_m),
                force.of(p.guide_force_n),
                force.of(p.guide_coil_force_n),
            ]
        };
        let points: Vec<Point> = path
            .points
            .iter()
            .map(numbers)
            .filter(|point| point.iter().all(|value| value.is_finite()))
            .collect();
        // The last step of a path goes past solid.
        let of_path = |kind: LimitKind| {
            let mark = path.marks.iter().find(|mark| mark.name == kind.key())?;
            Some(numbers(&mark.point))
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
        let bows = seen.clone().map(|p| p[2]).chain([limit]);
        let leaning = seen.map(|p| p[3]);
        let (known, guide) = parted(&points, of_path(LimitKind::Clash));
        let past_clash = !guide.is_empty();
        let curves_of = |value: usize, color, width| {
            [(&known, Dash::Solid), (&guide, Dash::Broken)].map(|(part, dash)| Curve {
                line: part.iter().map(|p| (p[0], p[value])).collect(),
                color,
                dash,
                width,
            })
        };
        // The perfect column's line lies below, to be seen where the two part.
        let mut curves: Vec<Curve> = perfect_path(&marks).into_iter().collect();
        curves.extend(curves_of(1, BLUE, 2.0));
        let mut bow_curves = curves_of(2, VERMILION, 2.0).to_vec();
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
        let guides_panel = assessment.guide_answer.as_ref().map(|_| {
            let mut curves = curves_of(3, GREEN, WIDE).to_vec();
            curves.extend(curves_of(4, BLACK, 1.2).map(|curve| Curve {
                dash: Dash::Dotted,
                ..curve
            }));
            Panel {
                name: format!("guide force, {}", force.symbol),
                axis: value_axis(leaning, 3),
                curves,
            }
        });
        Figure {
            title: assessment.title.clone(),
            answer: answer(assessment, units),
            marks,
            off,
            deflection,
            force: force_panel,
            bow: bow_panel,
            guides: guides_panel,
            along: Along::of(assessment, units),
            hysteresis: Hysteresis::of(assessment, units),
            past_clash,
            length_unit: length,
            force_unit: force,
        }
    }

    /// Width and height, pixels.
    pub fn size(&self) -> (u32, u32) {
        (WIDTH as u32, self.tops()[3].ceil() as u32)
    }

    /// Bottom of the panels over the deflection, pixels.
    fn bottom(&self) -> f64 {
        match self.guides {
            Some(_) => BOW_TOP + BOW_HEIGHT + BETWEEN + GUIDES_HEIGHT,
            None => BOW_TOP + BOW_HEIGHT,
        }
    }

    /// Lines that the key has to explain.
    fn lines(&self) -> Lines {
        Lines {
            past_clash: self.past_clash,
            guides: self.guides.is_some(),
        }
    }

    /// Tops of the key and of the further panels, and the bottom of the sheet, pixels.
    fn tops(&self) -> [f64; 4] {
        let rows = self.marks.len() + self.off.len();
        let key = self.bottom() + TO_KEY;
        let along = key + key::height(rows, self.lines());
        let hysteresis = along + self.along.as_ref().map_or(0.0, Along::height);
        let end = hysteresis + self.hysteresis.as_ref().map_or(0.0, Hysteresis::height);
        [key, along, hysteresis, end]
    }

    /// The figure in words, for readers who cannot see it.
    pub fn description(&self) -> String {
        let guides = match self.guides {
            Some(_) => ", and the force on the guides,",
            None => "",
        };
        let mut text = format!(
            "{} Axial force and bow{guides} against axial deflection, with {} numbered points \
             explained in the key below.",
            self.answer,
            self.marks.len()
        );
        for words in [
            self.along.as_ref().map(Along::description),
            self.hysteresis.as_ref().map(Hysteresis::description),
        ]
        .into_iter()
        .flatten()
        {
            text += &format!(" {words}");
        }
        text
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
        let last = |panel: bool| panel.then_some(name.as_str());
        let bow = self.bow.draw(
            sheet,
            across,
            (BOW_TOP, BOW_HEIGHT),
            &self.deflection,
            last(self.guides.is_none()),
        )?;
        let guides = match &self.guides {
            Some(panel) => {
                let down = (BOW_TOP + BOW_HEIGHT + BETWEEN, GUIDES_HEIGHT);
                let placed = panel.draw(sheet, across, down, &self.deflection, last(true))?;
                Some((panel, placed))
            }
            None => None,
        };

        let places: Vec<i32> = self
            .marks
            .iter()
            .map(|mark| force.place((mark.deflection, 0.0)).0)
            .collect();
        self.lines_down(sheet, &places)?;
        force.curves(sheet, &self.force.curves)?;
        bow.curves(sheet, &self.bow.curves)?;
        if let Some((panel, placed)) = &guides {
            placed.curves(sheet, &panel.curves)?;
        }
        // The governing mark last, on top of its neighbours.
        let (governing, others): (Vec<_>, Vec<_>) = self.marks.iter().partition(|m| m.governs);
        for mark in others.into_iter().chain(governing) {
            let on_guides = guides
                .as_ref()
                .filter(|_| mark.leaning.is_finite())
                .map(|(_, placed)| placed.place((mark.deflection, mark.leaning)));
            let places = [
                force.place((mark.deflection, mark.force)),
                bow.place((mark.deflection, mark.bow)),
            ];
            for at in places.into_iter().chain(on_guides) {
                symbols::draw(sheet, mark.shape, at, mark.governs)?;
            }
        }
        self.numbers(sheet, &places)?;
        let [key_top, along_top, hysteresis_top, _] = self.tops();
        key::draw(
            sheet,
            (18.0, key_top),
            &self.entries(),
            [self.length_unit.symbol, self.force_unit.symbol],
            self.lines(),
        )?;
        if let Some(along) = &self.along {
            along.draw(sheet, across, along_top)?;
        }
        if let Some(hysteresis) = &self.hysteresis {
            hysteresis.draw(sheet, across, hysteresis_top)?;
        }
        Ok(())
    }

    /// Thin lines from the row of numbers down through the panels.
    fn lines_down(&self, sheet: &Sheet, places: &[i32]) -> Result<(), PlotError> {
        let style = ShapeStyle {
            color: GREY.to_rgba(),
            filled: false,
            stroke_width: 6,
        };
        for (x, badge) in places.iter().zip(badges(places)) {
            let line = vec![
                (badge, tenths(NUMBERS)),
                (*x, tenths(FORCE_TOP)),
                (*x, tenths(self.bottom())),
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
