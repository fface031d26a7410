//! The question and the answer.

use super::section;
use crate::report::Units;
use crate::report::layout::{BAD, GOOD, OPEN, paragraph, styled};
use crate::report::names::phrase;
use crate::report::numbers::{percent, percent_input, percent_number};
use crate::result::{Assessment, Limit, Verdict};

/// What was asked: installed, working, tolerance, overtravel, required margin.
pub fn question(assessment: &Assessment, units: Units) -> String {
    let duty = &assessment.duty;
    let length = units.length();
    let show = |value| length.show_input(value);
    let mut text = match (duty.loading.as_str(), duty.working_force_n) {
        ("force", Some(force)) => format!(
            "Under a dead load of {} (deflection {}), ",
            units.force().show_input(force),
            show(duty.working_deflection_m)
        ),
        ("force", None) => format!(
            "Under a dead load at a deflection of {}, ",
            show(duty.working_deflection_m)
        ),
        (_, Some(force)) => format!(
            "In a machine that sets the deflection, at its working force of {} (deflection {}), ",
            units.force().show_input(force),
            show(duty.working_deflection_m)
        ),
        _ => format!(
            "In a machine that sets the deflection, at a working deflection of {}, ",
            show(duty.working_deflection_m)
        ),
    };
    text += &format!("installed at {}", show(duty.installed_deflection_m));
    let largest = duty.working_deflection_m + duty.working_tolerance_m;
    if duty.working_tolerance_m > 0.0 {
        text += &format!(
            ", tolerance {} (margins are taken against {})",
            show(duty.working_tolerance_m),
            show(largest)
        );
    }
    text += &if duty.overtravel_m > 0.0 {
        format!(
            ", overtravel {} (to {})",
            show(duty.overtravel_m),
            show(largest + duty.overtravel_m)
        )
    } else {
        ", no overtravel".to_string()
    };
    text += &format!(
        ": does the spring stay within every limit with a margin of {}{}?",
        percent_input(duty.required_margin),
        own_margins(assessment)
    );
    section("Question", &paragraph("  ", &text))
}

/// Limits with a required margin of their own.
fn own_margins(assessment: &Assessment) -> String {
    let own: Vec<String> = assessment
        .limits
        .iter()
        .filter(|limit| limit.required_margin != assessment.duty.required_margin)
        .map(|limit| {
            let margin = percent_input(limit.required_margin);
            format!("{margin} for {}", phrase(limit.name))
        })
        .collect();
    if own.is_empty() {
        String::new()
    } else {
        format!(" ({})", own.join(", "))
    }
}

/// The answer in a sentence, with the governing limit; what failed, where something did.
pub fn answer(assessment: &Assessment, units: Units) -> String {
    let (word, style) = match assessment.verdict {
        Verdict::Holds => ("HOLDS.", GOOD),
        Verdict::DoesNotHold => ("DOES NOT HOLD.", BAD),
        Verdict::Undecided => ("COULD NOT BE DECIDED.", OPEN),
    };
    let governing = assessment.limits.iter().find(|limit| limit.governs);
    let mut text = format!("{word} ");
    match (assessment.verdict, governing) {
        (Verdict::Undecided, limit) => {
            text += &assessment.sentence;
            if let Some(limit) = limit {
                text += &format!(" As far as computed, {}.", governs(limit, units));
            }
        }
        (_, Some(limit)) => {
            text += &sentence_case(&format!(
                "{}. {}",
                governs(limit, units),
                overtravel(assessment, limit, units)
            ));
        }
        (_, None) => text += &assessment.sentence,
    }
    let mut body = paragraph("  ", &text).replacen(word, &styled(word, style), 1);
    for failure in &assessment.failures {
        let last = failure
            .last_good_deflection_m
            .map(|last| format!(" Last good point at {}.", units.show_length(last)))
            .unwrap_or_default();
        body += &paragraph(
            "  Failed: ",
            &format!("{}: {}{last}", failure.what, failure.cause),
        );
    }
    section("Answer", &body)
}

/// "the governing limit is the bow limit: it is reached at 43.21 mm (…), a margin of …".
fn governs(limit: &Limit, units: Units) -> String {
    let mut text = format!("the governing limit is {}", phrase(limit.name));
    if let Some(deflection) = limit.deflection_m {
        text += &format!(", reached at {}", units.show_length(deflection));
        let place: Vec<String> = limit
            .share_of_free_length
            .map(|share| format!("{} of the free length", percent(share)))
            .into_iter()
            .chain(limit.force_n.map(|force| units.show_force(force)))
            .collect();
        if !place.is_empty() {
            text += &format!(" ({})", place.join(", "));
        }
    }
    if let Some(margin) = limit.margin {
        text += &format!(
            ": margin {} %, required {}",
            percent_number(margin, 2),
            percent_input(limit.required_margin)
        );
    }
    text
}

/// Whether the governing limit lies beyond the overtravel.
fn overtravel(assessment: &Assessment, limit: &Limit, units: Units) -> String {
    let duty = &assessment.duty;
    let end = duty.working_deflection_m + duty.working_tolerance_m + duty.overtravel_m;
    match limit.deflection_m {
        Some(at) if duty.overtravel_m > 0.0 => {
            let (word, gap) = if at >= end {
                ("before", at - end)
            } else {
                ("beyond", end - at)
            };
            format!(
                "The overtravel ends at {}, {} {word} it.",
                units.show_length(end),
                units.show_length(gap)
            )
        }
        _ => String::new(),
    }
}

/// The sentence with a capital first letter.
pub fn sentence_case(text: &str) -> String {
    let mut characters = text.chars();
    match characters.next() {
        Some(first) => first.to_uppercase().collect::<String>() + characters.as_str(),
        None => String::new(),
    }
}
