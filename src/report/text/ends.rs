//! What the supports do to the answer: lateral planes, effective end constant, sensitivity.

use super::answer::sentence_case;
use super::section;
use crate::report::Units;
use crate::report::layout::{Row, paragraph, table};
use crate::report::names::phrase;
use crate::report::numbers::{error, percent_input, percent_number};
use crate::result::{Assessment, PlaneAnswer, SupportSensitivity, Verdict};

const EACH_PLANE: &str = "Each plane is looked at on its own, with the imperfections in it in their \
     full size, in either plane alike: more than can be true of both at once. All else here is of \
     the weaker plane.";

/// The two lateral planes, where the supports differ in them.
pub fn planes(assessment: &Assessment, units: Units) -> String {
    if assessment.planes.is_empty() {
        return String::new();
    }
    let mut body: String = assessment
        .planes
        .iter()
        .map(|plane| paragraph("  ", &plane_words(plane, units)))
        .collect();
    body += &paragraph("  ", EACH_PLANE);
    section("Two lateral planes", &body)
}

fn plane_words(plane: &PlaneAnswer, units: Units) -> String {
    let weaker = if plane.governs { ", the weaker" } else { "" };
    let verdict = match plane.verdict {
        Verdict::Holds => "holds",
        Verdict::DoesNotHold => "does not hold",
        Verdict::Undecided => "could not be decided",
    };
    let mut text = format!(
        "Bowing at {}{weaker}: {verdict}",
        units.show_angle(plane.direction_rad)
    );
    if let Some(reason) = &plane.undecided_reason {
        text += &format!(" ({reason})");
    }
    if let (Some(limit), Some(at), Some(force)) =
        (plane.governing, plane.deflection_m, plane.force_n)
    {
        text += &format!(
            "; {} governs, reached at {} under {}",
            phrase(limit),
            units.show_length(at),
            units.show_force(force)
        );
    }
    if let (Some(margin), Some(required)) = (plane.margin, plane.required_margin) {
        text += &format!(
            ": margin {} %, required {}",
            percent_number(margin, 2),
            percent_input(required)
        );
    }
    text += &match plane.critical_deflection_m {
        Some(at) => format!(
            ". Perfect column as built critical at {}.",
            units.show_length(at)
        ),
        None => ". Perfect column as built never critical.".to_string(),
    };
    text
}

/// The end constant that stands for these supports, in a sentence.
pub fn end_constant(assessment: &Assessment) -> String {
    let found = &assessment.effective_end_constant;
    section("Effective end constant", &paragraph("  ", &found.sentence))
}

/// How the critical deflection hangs on the supports.
pub fn sensitivity(assessment: &Assessment) -> String {
    let Some(sensitivities) = &assessment.support_sensitivity else {
        return String::new();
    };
    let rows: Vec<Row> = sensitivities.properties.iter().map(row).collect();
    let mut out = table(
        "Critical deflection and supports",
        &["with +10 %", "with -10 %", "error est."],
        &["%", "%", "%"],
        &rows,
    );
    out += &paragraph(
        "  ",
        "Change of the critical deflection of the perfect column as built, soft seats included, when \
         one of these is 10 % larger or smaller.",
    );
    out += &paragraph("  ", &sensitivities.sentence);
    out
}

fn row(property: &SupportSensitivity) -> Row {
    let never_now = property.relative_change_if_larger.is_none()
        && property.relative_change_if_smaller.is_none();
    let cell = |change: Option<f64>, critical: Option<f64>| match (change, critical) {
        (Some(change), _) => percent_number(change, 2),
        (None, None) => "never".to_string(),
        (None, Some(_)) if never_now => "critical".to_string(),
        (None, Some(_)) => "-".to_string(),
    };
    Row::of(
        format!(
            "  {} {}",
            sentence_case(&property.end),
            property.property.replace('_', " ")
        ),
        vec![
            cell(
                property.relative_change_if_larger,
                property.critical_if_larger_m,
            ),
            cell(
                property.relative_change_if_smaller,
                property.critical_if_smaller_m,
            ),
            property
                .relative_change_error
                .map_or("-".to_string(), |e| error(100.0 * e)),
        ],
    )
}
