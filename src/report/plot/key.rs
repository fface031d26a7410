//! The key: lines, then the numbered marks with their values.

use super::ink::{BLACK, BLUE, GREEN, VERMILION, tenths};
use super::marks::Shape;
use super::panel::{Dash, Sheet, stroke};
use super::{PlotError, symbols};

const LINES: f64 = 24.0;
const PAST_CLASH: &str = "past the first clash of coils: the column model is a guide only";
const HEAD: f64 = 20.0;
const ROW: f64 = 20.0;
/// Width of the line of guide forces: another one lies on it, pixels.
pub const WIDE: f64 = 3.2;
/// Right edges of the columns of values, pixels from the left edge of the key.
const COLUMNS: [f64; 3] = [470.0, 590.0, 700.0];

/// A numbered mark in the key; without a number it lies off the picture.
pub struct Entry {
    /// Its number.
    pub number: Option<usize>,
    /// Its shape.
    pub shape: Shape,
    /// Its name.
    pub title: String,
    /// Whether it is the governing limit.
    pub governs: bool,
    /// Deflection, force and bow as text.
    pub values: [String; 3],
}

/// Which lines there are besides those that every picture has.
#[derive(Clone, Copy, Debug)]
pub struct Lines {
    /// Past the first clash.
    pub past_clash: bool,
    /// Forces on guides.
    pub guides: bool,
}

impl Lines {
    /// Height of their samples, pixels.
    fn height(self) -> f64 {
        LINES * (1.0 + f64::from(self.past_clash) + f64::from(self.guides))
    }
}

/// Height of a key with so many rows, pixels.
pub fn height(rows: usize, lines: Lines) -> f64 {
    lines.height() + HEAD + ROW * rows as f64 + 14.0
}

/// Draws the key with its top left corner at `corner` (pixels).
pub fn draw(
    sheet: &Sheet,
    (left, top): (f64, f64),
    entries: &[Entry],
    [length, force]: [&str; 2],
    lines: Lines,
) -> Result<(), PlotError> {
    let text = symbols::Text::new(sheet);
    samples(sheet, (left, top), lines)?;

    let heads_top = top + lines.height();
    let middle = heads_top + HEAD / 2.0;
    let heads = [
        format!("deflection, {length}"),
        format!("force, {force}"),
        format!("bow, {length}"),
    ];
    for (head, column) in heads.iter().zip(COLUMNS) {
        text.figure(head, (left + column, middle), false)?;
    }
    let rule = heads_top + HEAD;
    let line = vec![
        (tenths(left), tenths(rule)),
        (tenths(left + COLUMNS[2]), tenths(rule)),
    ];
    stroke(sheet, line, BLACK, Dash::Solid, 0.6)?;

    for (row, entry) in entries.iter().enumerate() {
        let middle = rule + ROW * (row as f64 + 0.5) + 3.0;
        let badge = (tenths(left + 9.0), tenths(middle));
        if let Some(number) = entry.number {
            text.badge(number, badge, entry.governs)?;
        }
        let at = (tenths(left + 34.0), tenths(middle));
        symbols::draw(sheet, entry.shape, at, entry.governs)?;
        let mut title = entry.title.clone();
        if entry.governs {
            title.push_str(", governs");
        }
        if entry.number.is_none() {
            title.push_str(" (off the picture)");
        }
        text.entry(&title, (left + 50.0, middle), entry.governs)?;
        for (value, column) in entry.values.iter().zip(COLUMNS) {
            text.figure(value, (left + column, middle), entry.governs)?;
        }
    }
    Ok(())
}

/// The lines and what they are.
fn samples(sheet: &Sheet, (left, top): (f64, f64), lines: Lines) -> Result<(), PlotError> {
    let text = symbols::Text::new(sheet);
    let of_every_picture = [
        (0.0, BLUE, Dash::Solid, 2.0, "force, imperfect"),
        (175.0, VERMILION, Dash::Solid, 2.0, "bow, imperfect"),
        (
            340.0,
            BLACK,
            Dash::Dashed,
            1.2,
            "force, perfect and straight",
        ),
        (590.0, BLACK, Dash::Dotted, 1.2, "bow limit"),
    ];
    let of_guides = [
        (
            0.0,
            GREEN,
            Dash::Solid,
            WIDE,
            "force on the guides, added up",
        ),
        (
            340.0,
            BLACK,
            Dash::Dotted,
            1.2,
            "of it on the coil that bears most",
        ),
    ];
    let mut middle = top + LINES / 2.0;
    let rows: [&[_]; 2] = [
        &of_every_picture,
        if lines.guides { &of_guides } else { &[] },
    ];
    for row in rows.into_iter().filter(|row| !row.is_empty()) {
        for (x, color, dash, width, name) in row {
            let line = vec![
                (tenths(left + x), tenths(middle)),
                (tenths(left + x + 28.0), tenths(middle)),
            ];
            stroke(sheet, line, *color, *dash, *width)?;
            text.entry(name, (left + x + 35.0, middle), false)?;
        }
        middle += LINES;
    }
    if lines.past_clash {
        let mut broken = vec![(-2.5, BLUE, 2.0), (2.5, VERMILION, 2.0)];
        if lines.guides {
            broken = vec![(-5.0, BLUE, 2.0), (0.0, VERMILION, 2.0), (5.0, GREEN, WIDE)];
        }
        for (up, color, width) in broken {
            let line = vec![
                (tenths(left), tenths(middle + up)),
                (tenths(left + 28.0), tenths(middle + up)),
            ];
            stroke(sheet, line, color, Dash::Broken, width)?;
        }
        text.entry(PAST_CLASH, (left + 35.0, middle), false)?;
    }
    Ok(())
}
