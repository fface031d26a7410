//! The key: lines, then the numbered marks with their values.

use super::marks::Shape;
use super::panel::{BLACK, BLUE, Dash, Sheet, VERMILION, stroke, tenths};
use super::{PlotError, symbols};

const LINES: f64 = 24.0;
const HEAD: f64 = 20.0;
const ROW: f64 = 20.0;
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

/// Height of a key with so many rows, pixels.
pub fn height(rows: usize) -> f64 {
    LINES + HEAD + ROW * rows as f64 + 14.0
}

/// Draws the key with its top left corner at `corner` (pixels).
pub fn draw(
    sheet: &Sheet,
    (left, top): (f64, f64),
    entries: &[Entry],
    [length, force]: [&str; 2],
) -> Result<(), PlotError> {
    let text = symbols::Text::new(sheet);
    let samples = [
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
    let middle = top + LINES / 2.0;
    for (x, color, dash, width, name) in samples {
        let line = vec![
            (tenths(left + x), tenths(middle)),
            (tenths(left + x + 28.0), tenths(middle)),
        ];
        stroke(sheet, line, color, dash, width)?;
        text.entry(name, (left + x + 35.0, middle), false)?;
    }

    let middle = top + LINES + HEAD / 2.0;
    let heads = [
        format!("deflection, {length}"),
        format!("force, {force}"),
        format!("bow, {length}"),
    ];
    for (head, column) in heads.iter().zip(COLUMNS) {
        text.figure(head, (left + column, middle), false)?;
    }
    let rule = top + LINES + HEAD;
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
