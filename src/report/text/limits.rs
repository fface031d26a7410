//! The limits in order of deflection, the governing one marked.

use super::measures::{beyond_solid, never};
use crate::report::Units;
use crate::report::layout::{Row, paragraph, table};
use crate::report::numbers::{
    column_decimals, error, fixed, percent_input, percent_number, shortest,
};
use crate::result::{Assessment, Limit, LimitKind, SupportEcho};

const MODELS: &str = "Critical: of the perfect column as built, dead coils and arms included. Solid: \
     of the spring's geometry. All others: of the imperfect column.";
const MODELS_WITH_BORE: &str = "Critical: of the perfect column as built, dead coils and arms \
     included. Solid, and coil fills the bore: of the spring's geometry. All others: of the imperfect \
     column.";

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
            let label = format!("{mark}{}", label(limit.name));
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
                remark: remark(limits, limit),
                strong: limit.governs,
                ..Row::of(
                    label,
                    vec![
                        fixed(length.of(deflection), length_decimals),
                        or_dash(limit.share_of_free_length.map(|s| percent_number(s, 1))),
                        or_dash(limit.force_n.map(|f| fixed(force.of(f), force_decimals))),
                        or_dash(limit.margin.map(|m| percent_number(m, 2))),
                        if limit.for_information {
                            "-".into()
                        } else {
                            shortest(100.0 * limit.required_margin)
                        },
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
    out += &legend(assessment, units);
    out
}

/// Name of a limit in the table; what model the critical one is of, the legend says.
fn label(limit: LimitKind) -> &'static str {
    match limit {
        LimitKind::Critical => "critical, perfect column",
        other => other.title(),
    }
}

/// Words behind the row of a limit.
fn remark(limits: &[Limit], limit: &Limit) -> String {
    let mut words = Vec::new();
    if limit.governs {
        words.push("governs");
    }
    if is_in_jump(limits, limit) {
        words.push("in the jump");
    }
    if is_past_clash(limits, limit) {
        words.push("past clash");
    }
    words.join(", ")
}

/// Whether the path of the column gets there.
fn is_of_path(limit: &Limit) -> bool {
    !matches!(
        limit.name,
        LimitKind::Critical | LimitKind::Solid | LimitKind::BoreFilled
    )
}

fn is_reached(limit: &Limit) -> bool {
    limit.deflection_m.is_some() && !limit.beyond_solid
}

/// Whether it is reached only in the jump that begins where load or travel is lost: it is given
/// the deflection of that.
fn is_in_jump(limits: &[Limit], limit: &Limit) -> bool {
    let is_loss = |limit: &Limit| limit.name.is_loss();
    limit.name != LimitKind::Critical
        && !is_loss(limit)
        && is_reached(limit)
        && limits
            .iter()
            .any(|lost| is_loss(lost) && lost.deflection_m == limit.deflection_m)
}

/// Whether coils touch before: the column model is a guide only there.
fn is_past_clash(limits: &[Limit], limit: &Limit) -> bool {
    is_of_path(limit)
        && limits
            .iter()
            .filter(|clash| clash.name == LimitKind::Clash && is_reached(clash))
            .any(|clash| limit.deflection_m > clash.deflection_m)
}

/// Which model each limit belongs to, and what those mean that are reached.
fn legend(assessment: &Assessment, units: Units) -> String {
    let has_bore = assessment
        .limits
        .iter()
        .any(|limit| limit.name == LimitKind::BoreFilled);
    let models = if has_bore { MODELS_WITH_BORE } else { MODELS };
    let mut out = paragraph("  ", models);
    for limit in assessment.limits.iter().filter(|limit| is_reached(limit)) {
        let meaning = match limit.name {
            LimitKind::Bow => format!(
                "{} from where the axis stood unloaded in its seats",
                units.length().show_rounded(assessment.duty.bow_limit_m)
            ),
            LimitKind::RateLost => format!(
                "slope of the path down to {} of the straight spring's rate",
                percent_input(1.0 - assessment.duty.rate_loss_share)
            ),
            LimitKind::Stress => "corrected shear stress at the worst section".to_string(),
            LimitKind::Clash => {
                "on the inside of the bow; past it the column model is a guide only".to_string()
            }
            LimitKind::DeadLoadLost => "largest force of the path".to_string(),
            LimitKind::TravelLost => "largest travel of the path".to_string(),
            LimitKind::LiftOff => lift_off(assessment, limit, units),
            LimitKind::Slide => slide(assessment),
            LimitKind::GuideTouch => guide_touch(assessment, units),
            LimitKind::BoreFilled => bore_filled(assessment, units),
            LimitKind::Solid => limit.note.clone(),
            LimitKind::Critical => String::new(),
        };
        if !meaning.is_empty() {
            out += &paragraph(&format!("  {}: ", limit.name.title()), &meaning);
        }
    }
    if assessment
        .limits
        .iter()
        .any(|limit| is_in_jump(&assessment.limits, limit))
    {
        out += &paragraph(
            "  in the jump: ",
            "reached on the way to the next stable state, so counted where the jump starts",
        );
    }
    out
}

/// The flat ends of the case.
fn flat_ends(assessment: &Assessment) -> impl Iterator<Item = (&'static str, &SupportEcho)> {
    let supports = &assessment.supports;
    [("bottom", &supports.bottom), ("top", &supports.top)]
        .into_iter()
        .filter(|(_, support)| support.contact == "flat")
}

/// " (bottom 14 mm, top 12 mm)", from a number of each flat end; nothing where there is none.
pub(super) fn of_flat_ends(
    assessment: &Assessment,
    number: impl Fn(&SupportEcho) -> Option<String>,
) -> String {
    let numbers: Vec<String> = flat_ends(assessment)
        .filter_map(|(end, support)| Some(format!("{end} {}", number(support)?)))
        .collect();
    if numbers.is_empty() {
        String::new()
    } else {
        format!(" ({})", numbers.join(", "))
    }
}

fn lift_off(assessment: &Assessment, limit: &Limit, units: Units) -> String {
    let radii = of_flat_ends(assessment, |support| {
        let radius = support.seat_edge_m?;
        Some(units.length().show_input(radius))
    });
    let start = if limit.deflection_m == Some(0.0) {
        " (It has not sat down flush by the largest working deflection: it counts as lifted from \
         the start.)"
    } else {
        ""
    };
    format!(
        "the force line comes to the edge of the rigid ring on which a flat end bears{radii}, which then stands \
         on it; an elastic ring begins to open at half of that{start}"
    )
}

fn slide(assessment: &Assessment) -> String {
    let friction = of_flat_ends(assessment, |support| support.friction.map(shortest));
    format!(
        "the thrust of a flat end along its seat exceeds friction{friction} times the force on the \
         seat"
    )
}

fn guide_touch(assessment: &Assessment, units: Units) -> String {
    let guides: Vec<String> = assessment
        .guides
        .iter()
        .filter(|guide| !guide.touching_allowed)
        .map(|guide| {
            format!(
                "{} of {}, {} of room around the free spring",
                guide.kind,
                units.length().show_input(guide.diameter_m),
                units.length().show_rounded(guide.clearance_free_m)
            )
        })
        .collect();
    format!(
        "no room left between the coil and a guide that it may not touch ({})",
        guides.join("; ")
    )
}

fn bore_filled(assessment: &Assessment, units: Units) -> String {
    let bores: Vec<String> = assessment
        .guides
        .iter()
        .filter(|guide| guide.kind == "bore")
        .map(|guide| units.length().show_input(guide.diameter_m))
        .collect();
    format!(
        "the straight coil, grown by compression, is as wide as its bore ({}); ends held or free to \
         turn about the axis, the worse of the two",
        bores.join(", ")
    )
}

/// Why a limit has no deflection.
fn absent(assessment: &Assessment, limit: &Limit, units: Units) -> String {
    match limit.name {
        LimitKind::Stress if assessment.duty.allowable_stress_pa.is_none() => {
            "not checked: no allowable stress given".into()
        }
        LimitKind::BoreFilled => "none before solid".into(),
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
