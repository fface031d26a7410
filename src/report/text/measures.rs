//! Handbook formula, straight column, column as built: side by side, and where they disagree.

use super::section;
use crate::report::Units;
use crate::report::layout::{Row, paragraph, table};
use crate::report::numbers::{column_decimals, error, fixed, percent, percent_number, shortest};
use crate::result::{
    Assessment, ClosedFormCurve, Comparison, Computed, ImperfectColumn, LimitKind, Measure, Side,
};

const NOTHING: &str = "-";

const MODEL_ERROR: &str = "Error estimates are those of solving the model; the column model itself \
     differs from a real coil by some per cent (see README, Validity).";
const FORCE_MARGINS: &str =
    "Margins of a dead load are ratios of forces: limit force / working load - 1.";
const SOFT_SEATS: &str = "Deflections are travel of the machine, soft seats included; shares are of \
     the spring alone.";

/// One line of the table before its columns have their decimals.
struct Line {
    label: String,
    found: Found,
}

enum Found {
    Words(String),
    Value {
        measure: Measure,
        error: Option<f64>,
        beyond_solid: bool,
    },
}

/// The table, with the notes that belong to it.
pub fn measures(assessment: &Assessment, units: Units) -> String {
    let lines = lines(assessment);
    let values: Vec<&Measure> = lines
        .iter()
        .filter_map(|line| match &line.found {
            Found::Value { measure, .. } => Some(measure),
            Found::Words(_) => None,
        })
        .collect();
    let length = units.length();
    let force = units.force();
    let length_decimals = column_decimals(values.iter().map(|m| length.of(m.deflection_m)), 5);
    let force_decimals = column_decimals(values.iter().map(|m| force.of(m.force_n)), 4);
    let rows: Vec<Row> = lines
        .iter()
        .map(|line| match &line.found {
            Found::Words(words) => Row::words(&line.label, words.as_str()),
            Found::Value {
                measure,
                beyond_solid: true,
                ..
            } => Row::words(&line.label, beyond_solid(measure.deflection_m, units)),
            Found::Value {
                measure,
                error: estimate,
                ..
            } => Row::of(
                &line.label,
                vec![
                    fixed(length.of(measure.deflection_m), length_decimals),
                    percent_number(measure.share_of_free_length, 1),
                    fixed(force.of(measure.force_n), force_decimals),
                    percent_number(measure.margin, 2),
                    estimate.map_or(NOTHING.into(), |e| error(length.of(e))),
                ],
            ),
        })
        .collect();
    let mut out = table(
        "Formula and column",
        &["deflection", "of free l.", "force", "margin", "error est."],
        &[length.symbol, "%", force.symbol, "%", length.symbol],
        &rows,
    );
    out += &notes(assessment, units);
    out
}

/// A critical deflection that the spring never reaches, with its value.
pub fn beyond_solid(deflection: f64, units: Units) -> String {
    format!(
        "none before solid (would be at {})",
        units.show_length(deflection)
    )
}

fn lines(assessment: &Assessment) -> Vec<Line> {
    let closed = &assessment.closed_form;
    let mut lines: Vec<Line> = closed.curves.iter().map(formula_line).collect();
    if closed.curves.is_empty() {
        lines.push(Line {
            label: "  handbook formula".into(),
            found: Found::Words("no closed form covers this support".into()),
        });
    }
    let straight = &assessment.straight_column;
    lines.push(Line {
        label: "  straight column".into(),
        found: match &straight.critical {
            Some(critical) => computed(critical, straight.beyond_solid),
            None => Found::Words(never(assessment).into()),
        },
    });
    lines.extend(as_built(assessment));
    lines.push(match &assessment.imperfect_column {
        Some(column) => imperfect_line(column),
        None => Line {
            label: "  as built and imperfect".into(),
            found: Found::Words("not computed".into()),
        },
    });
    lines
}

/// The word for no critical deflection: nothing was found, for certain or because something failed.
pub fn never(assessment: &Assessment) -> &'static str {
    if assessment.failures.is_empty() {
        "never"
    } else {
        "none found, see what failed"
    }
}

fn computed(found: &Computed, beyond_solid: bool) -> Found {
    Found::Value {
        measure: found.measure,
        error: Some(found.error_m),
        beyond_solid,
    }
}

fn formula_line(curve: &ClosedFormCurve) -> Line {
    Line {
        label: format!("  formula, end constant {}", shortest(curve.end_constant)),
        found: match curve.critical {
            Some(measure) => Found::Value {
                measure,
                error: None,
                beyond_solid: curve.beyond_solid,
            },
            None => Found::Words("never".into()),
        },
    }
}

/// The perfect column as built: the limit "critical", dead coils and arms included.
fn as_built(assessment: &Assessment) -> Option<Line> {
    let limit = assessment
        .limits
        .iter()
        .find(|limit| limit.name == LimitKind::Critical)?;
    let measure = (|| {
        Some(Measure {
            deflection_m: limit.deflection_m?,
            share_of_free_length: limit.share_of_free_length?,
            force_n: limit.force_n?,
            margin: limit.margin?,
        })
    })();
    Some(Line {
        label: "  column as built, perfect".into(),
        found: match measure {
            Some(measure) => Found::Value {
                measure,
                error: limit.error_m,
                beyond_solid: limit.beyond_solid,
            },
            None => Found::Words(never(assessment).into()),
        },
    })
}

fn imperfect_line(column: &ImperfectColumn) -> Line {
    let label = match column.first_limit_name {
        Some(name) => format!("  as built, imperfect: {}", name.title()),
        None => "  as built and imperfect".into(),
    };
    Line {
        label,
        found: match &column.first_limit {
            Some(first) => computed(first, false),
            None => Found::Words("none of its limits before solid".into()),
        },
    }
}

/// What the columns of the table mean.
fn meaning(assessment: &Assessment) -> String {
    let mut out = paragraph("  ", MODEL_ERROR);
    if assessment.duty.loading == "force" {
        out += &paragraph("  ", FORCE_MARGINS);
    }
    let supports = &assessment.supports;
    if [&supports.bottom, &supports.top]
        .iter()
        .any(|support| support.axial_stiffness_n_per_m.is_some())
    {
        out += &paragraph("  ", SOFT_SEATS);
    }
    out
}

/// Sources and side results under the table.
fn notes(assessment: &Assessment, units: Units) -> String {
    let closed = &assessment.closed_form;
    let mut out = meaning(assessment);
    if !closed.curves.is_empty() {
        out += &paragraph("  Formula: ", &closed.note);
    }
    for curve in &closed.curves {
        let start = format!("  End constant {}: ", shortest(curve.end_constant));
        out += &paragraph(&start, &format!("{}.", curve.source.trim_end_matches('.')));
    }
    for unseen in &closed.unseen {
        out += &paragraph("  ", unseen);
    }
    if let Some(again) = assessment.straight_column.straightens_again_at_m {
        let text = format!(
            "The straight column straightens again at {}.",
            units.show_length(again)
        );
        out += &paragraph("  ", &text);
    }
    if let Some(column) = &assessment.imperfect_column {
        out += &imperfect_notes(column, units);
    }
    out
}

fn imperfect_notes(column: &ImperfectColumn, units: Units) -> String {
    let length = units.length();
    let mut out = String::new();
    if let Some(southwell) = column.southwell {
        out += &paragraph(
            "  ",
            &format!(
                "Southwell estimate of the critical deflection from the path before: {} \
                 (R² {} from {} points).",
                length.show(southwell.deflection_m),
                fixed(southwell.r_squared, 6),
                southwell.points
            ),
        );
    }
    let lying = column
        .worst_orientation
        .as_ref()
        .map(|worst| {
            format!(
                " The deviations can lie to one another in {} ways; the worst is shown: {worst}.",
                column.orientations_tried
            )
        })
        .unwrap_or_default();
    let branch = column.branch.trim_end_matches('.');
    out += &paragraph(
        "  ",
        &format!(
            "Path: {branch}; {} elements in the finer mesh.{lying}",
            column.elements
        ),
    );
    out
}

/// Where formula and straight column disagree, by how much, and on which side.
pub fn comparisons(assessment: &Assessment, units: Units) -> String {
    let body: String = assessment
        .comparisons
        .iter()
        .map(|comparison| paragraph("  ", &sentence(assessment, comparison, units)))
        .collect();
    section("Formula against straight column", &body)
}

fn sentence(assessment: &Assessment, comparison: &Comparison, units: Units) -> String {
    let start = format!(
        "With end constant {} the formula ",
        shortest(comparison.end_constant)
    );
    let side = match comparison.side {
        Side::Safe => "on the safe side",
        Side::Unsafe => "on the UNSAFE side",
        Side::Equal => "the same",
    };
    let column = assessment.straight_column.critical_deflection_m;
    let formula = assessment
        .closed_form
        .curves
        .iter()
        .find(|curve| curve.end_constant == comparison.end_constant)
        .and_then(|curve| curve.critical_deflection_m);
    match (comparison.relative_difference, comparison.side) {
        (Some(difference), Side::Equal) => format!(
            "{start}and the straight column agree, to {} of the deflection.",
            error(difference)
        ),
        (Some(difference), _) => {
            let way = if difference < 0.0 { "below" } else { "above" };
            format!(
                "{start}lies {} {way} the straight column: {side}.",
                percent(difference.abs())
            )
        }
        (None, _) => match (formula, column) {
            (None, Some(at)) => format!(
                "{start}promises that the spring never buckles; the straight column does at {}: {side}.",
                units.show_length(at)
            ),
            (Some(at), None) => format!(
                "{start}lets the spring buckle at {}; the straight column never does: {side}.",
                units.show_length(at)
            ),
            _ => format!("{start}and the straight column both say: never."),
        },
    }
}
