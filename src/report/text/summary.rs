//! Several cases at a glance.

use crate::report::Units;
use crate::report::layout::{GAP, PAGE, Row, table};
use crate::report::numbers::{fixed, percent_number};
use crate::result::{Outcome, Verdict};
use crate::units::significant;
use unicode_width::UnicodeWidthStr;

const COLUMNS: [&str; 3] = ["verdict", "governing at", "margin"];
const INDENT: &str = "  ";
const CUT: &str = "...";
/// Names are not cut shorter than this, columns.
const LEAST_ROOM: usize = 24;

/// One line a case, after the verdicts of several.
pub fn summary(outcomes: &[Outcome], units: Units) -> String {
    let length = units.length();
    let mut rows: Vec<Row> = outcomes
        .iter()
        .map(|outcome| {
            let verdict = match outcome.verdict() {
                Verdict::Holds => "holds",
                Verdict::DoesNotHold => "does not hold",
                Verdict::Undecided => "not decided",
            };
            let governing = match outcome {
                Outcome::Assessed(assessment) => assessment.limits.iter().find(|l| l.governs),
                Outcome::Refused(_) => None,
            };
            let mut cells = vec![verdict.to_string()];
            let mut remark = String::new();
            if let Some(limit) = governing {
                cells.push(
                    limit
                        .deflection_m
                        .map_or("-".into(), |x| significant(length.of(x), 4)),
                );
                cells.push(limit.margin.map_or("-".into(), |m| percent_number(m, 2)));
                remark = limit.name.title().to_string();
            }
            Row {
                remark,
                ..Row::of("", cells)
            }
        })
        .collect();
    let room = room_for_names(&rows);
    for (row, outcome) in rows.iter_mut().zip(outcomes) {
        row.label = format!("{INDENT}{}", shortened(outcome.file(), room));
    }
    let count = fixed(outcomes.len() as f64, 0);
    table(
        &format!("All {count} cases"),
        &COLUMNS,
        &["", length.symbol, "%"],
        &rows,
    )
}

/// Columns that the page leaves for the names of the files.
fn room_for_names(rows: &[Row]) -> usize {
    let cells: usize = COLUMNS
        .iter()
        .enumerate()
        .map(|(column, heading)| {
            let cells = rows.iter().filter_map(|row| row.cells.get(column));
            let widest = cells.map(|cell| cell.width()).max().unwrap_or(0);
            GAP.len() + widest.max(heading.width())
        })
        .sum();
    let remarks = rows.iter().map(|row| row.remark.width()).max().unwrap_or(0);
    PAGE.saturating_sub(INDENT.len() + cells + GAP.len() + remarks)
        .max(LEAST_ROOM)
}

/// A file name too long for its `room`, cut in the middle: its folder and its end tell it from
/// others.
fn shortened(file: &str, room: usize) -> String {
    let clean: String = file.chars().filter(|c| !c.is_control()).collect();
    if clean.width() <= room {
        return clean;
    }
    let left = room.saturating_sub(CUT.len());
    let head = fitting(clean.chars(), left / 3);
    let tail = fitting(clean.chars().rev(), left - left / 3);
    let tail: String = tail.chars().rev().collect();
    format!("{head}{CUT}{tail}")
}

/// The first characters that fit into `room` columns.
fn fitting(characters: impl Iterator<Item = char>, room: usize) -> String {
    let mut out = String::new();
    for character in characters {
        out.push(character);
        if out.width() > room {
            out.pop();
            break;
        }
    }
    out
}
