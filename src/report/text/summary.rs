//! Several cases at a glance.

use crate::report::Units;
use crate::report::layout::{Row, table};
use crate::report::numbers::{fixed, percent_number};
use crate::result::{Outcome, Verdict};
use crate::units::significant;

/// One line a case, after the verdicts of several.
pub fn summary(outcomes: &[Outcome], units: Units) -> String {
    let length = units.length();
    let rows: Vec<Row> = outcomes
        .iter()
        .map(|outcome| {
            let verdict = match outcome.verdict() {
                Verdict::Holds => "holds",
                Verdict::DoesNotHold => "does not hold",
                Verdict::Undecided => "not decided",
            };
            let label = format!("  {}", shortened(outcome.file()));
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
                ..Row::of(label, cells)
            }
        })
        .collect();
    let count = fixed(outcomes.len() as f64, 0);
    table(
        &format!("All {count} cases"),
        &["verdict", "governing at", "margin"],
        &["", length.symbol, "%"],
        &rows,
    )
}

/// The end of a file name too long for the page.
fn shortened(file: &str) -> String {
    const ROOM: usize = 24;
    let clean: String = file.chars().filter(|c| !c.is_control()).collect();
    let count = clean.chars().count();
    if count <= ROOM {
        return clean;
    }
    let tail: String = clean.chars().skip(count - ROOM + 3).collect();
    format!("...{tail}")
}
