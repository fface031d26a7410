//! The limits in order of deflection, the governing one marked.

use super::measures::{beyond_solid, never};
use crate::report::Units;
use crate::report::layout::{Row, paragraph, table};
use crate::report::numbers::{column_decimals, error, fixed, percent_number, shortest};
use crate::result::{Assessment, Limit, LimitKind};

/// The table of limits and their notes.
pub fn limits(assessment: &Assessment, units: Units) -> String {
    let length = units.length();
    let force = units.force();
    let limits = &assessment.limits;
    let length_decimals = column_decimals(
        limits
            .iter()
            .filter_map(|l| l.deflection_m)
            .map(|x| length.of(x)),
        5,
    );
    let force_decimals = column_decimals(
        limits.iter().filter_map(|l| l.force_n).map(|x| force.of(x)),
        4,
    );
    let rows: Vec<Row> = limits
        .iter()
        .map(|limit| {
            let mark = if limit.governs { "> " } else { "  " };
            let label = format!("{mark}{}", limit.name.title());
            let Some(deflection) = limit.deflection_m else {
                return Row {
                    strong: limit.governs,
                    ..Row::words(label, absent(assessment, limit, units))
                };
            };
            if limit.beyond_solid {
                return Row::words(label, beyond_solid(deflection, units));
            }
            let or_dash = |text: Option<String>| text.unwrap_or_else(|| "-".into());
            Row {
                remark: if limit.governs { "governs" } else { "" }.into(),
                strong: limit.governs,
                ..Row::of(
                    label,
                    vec![
                        fixed(length.of(deflection), length_decimals),
                        or_dash(limit.share_of_free_length.map(|s| percent_number(s, 1))),
                        or_dash(limit.force_n.map(|f| fixed(force.of(f), force_decimals))),
                        or_dash(limit.margin.map(|m| percent_number(m, 2))),
                        shortest(100.0 * limit.required_margin),
                        or_dash(limit.error_m.map(|e| error(length.of(e)))),
                    ],
                )
            }
        })
        .collect();
    let mut out = table(
        "Limits, in order",
        &[
            "deflection",
            "of free l.",
            "force",
            "margin",
            "needed",
            "error",
        ],
        &[length.symbol, "%", force.symbol, "%", "%", length.symbol],
        &rows,
    );
    for limit in limits.iter().filter(|limit| !limit.note.is_empty()) {
        out += &paragraph(&format!("  {}: ", limit.name.title()), &limit.note);
    }
    out
}

/// Why a limit has no deflection.
fn absent(assessment: &Assessment, limit: &Limit, units: Units) -> String {
    match limit.name {
        LimitKind::Stress if assessment.duty.allowable_stress_pa.is_none() => {
            "not checked: no allowable stress given".into()
        }
        _ if assessment.imperfect_column.is_none() && limit.name != LimitKind::Critical => {
            "not computed".into()
        }
        LimitKind::Critical => never(assessment).into(),
        _ => match limit.looked_up_to_m {
            Some(deflection) => format!(
                "none up to {}, where the path ends",
                units.length().show(deflection)
            ),
            None => "none before solid".into(),
        },
    }
}
