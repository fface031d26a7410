//! The question and the answer, with the state at work.

use super::section;
use crate::report::Units;
use crate::report::layout::{BAD, GOOD, OPEN, paragraph, styled};
use crate::report::names::phrase;
use crate::report::numbers::{percent, percent_input, percent_number};
use crate::result::{Assessment, DutyEcho, Limit, Verdict};

/// What was asked: installed, working, tolerance, overtravel, required margin.
pub fn question(assessment: &Assessment, units: Units) -> String {
    let duty = &assessment.duty;
    let show = |value| units.length().show_input(value);
    // Under a dead load, margins and overtravel are counted in force.
    let counted = |deflection| match dead_load_at(duty, deflection) {
        Some(force) => units.show_force(force),
        None => show(deflection),
    };
    let mut text = loading(duty, units);
    text += &format!("installed at {}", show(duty.installed_deflection_m));
    let largest = duty.working_deflection_m + duty.working_tolerance_m;
    if duty.working_tolerance_m > 0.0 {
        text += &format!(
            ", tolerance {} (margins are taken against {})",
            show(duty.working_tolerance_m),
            counted(largest)
        );
    }
    text += &if duty.overtravel_m > 0.0 {
        format!(
            ", overtravel {} (to {})",
            show(duty.overtravel_m),
            counted(largest + duty.overtravel_m)
        )
    } else {
        ", no overtravel".to_string()
    };
    text += &format!(
        ": does the spring stay within every limit with a {} of {}{}?",
        margin_word(duty),
        percent_input(duty.required_margin),
        own_margins(assessment)
    );
    section("Question", &paragraph("  ", &text))
}

/// What drives the spring, and how far.
fn loading(duty: &DutyEcho, units: Units) -> String {
    let deflection = units.length().show_input(duty.working_deflection_m);
    let force = duty
        .working_force_n
        .map(|force| units.force().show_input(force));
    match (duty.loading.as_str(), force) {
        ("force", Some(force)) => {
            format!(
                "Under a dead load of {force} (straight, that is a deflection of {deflection}), "
            )
        }
        ("force", None) => format!("Under a dead load at a deflection of {deflection}, "),
        (_, Some(force)) => format!(
            "In a machine that sets the deflection, at its working force of {force} (deflection \
             {deflection}), "
        ),
        _ => format!(
            "In a machine that sets the deflection, at a working deflection of {deflection}, "
        ),
    }
}

/// Under a dead load: the force that gives the straight spring this deflection, N.
fn dead_load_at(duty: &DutyEcho, deflection: f64) -> Option<f64> {
    let force = duty.working_force_n.filter(|_| duty.loading == "force")?;
    Some(force * deflection / duty.working_deflection_m)
}

/// What margins are ratios of, in a word.
fn margin_word(duty: &DutyEcho) -> &'static str {
    if duty.loading == "force" {
        "margin of force"
    } else {
        "margin"
    }
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
            if let Some(reason) = &assessment.undecided_reason {
                text += &format!("{}.", sentence_case(reason));
            }
            if let Some(limit) = limit {
                text += &format!(
                    " As far as computed, {}.",
                    governs(&assessment.duty, limit, units)
                );
            }
        }
        (_, Some(limit)) => {
            text += &sentence_case(&format!(
                "{}. {}",
                governs(&assessment.duty, limit, units),
                overtravel(assessment, limit, units)
            ));
        }
        (_, None) => text += &assessment.sentence,
    }
    let mut body = paragraph("  ", &text).replacen(word, &styled(word, style), 1);
    let at_work = at_work(assessment, units);
    if !at_work.is_empty() {
        body += &paragraph("  ", &at_work);
    }
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

/// "the governing limit is the bow limit, reached at 43.21 mm (…): margin …". A dead load reaches a
/// limit by its force.
fn governs(duty: &DutyEcho, limit: &Limit, units: Units) -> String {
    let mut text = format!("the governing limit is {}", phrase(limit.name));
    let at = limit.deflection_m.map(|at| units.show_length(at));
    let under = limit.force_n.map(|force| units.show_force(force));
    let share = limit
        .share_of_free_length
        .map(|share| format!("{} of the free length", percent(share)));
    let (first, others) = if duty.loading == "force" {
        let first = under.map(|force| format!("reached under {force}"));
        (first, [at.map(|at| format!("at {at}")), share])
    } else {
        (at.map(|at| format!("reached at {at}")), [share, under])
    };
    if let Some(first) = first {
        text += &format!(", {first}");
        let others: Vec<String> = others.into_iter().flatten().collect();
        if !others.is_empty() {
            text += &format!(" ({})", others.join(", "));
        }
    }
    if let Some(margin) = limit.margin {
        text += &format!(
            ": {} {} %, required {}",
            margin_word(duty),
            percent_number(margin, 2),
            percent_input(limit.required_margin)
        );
    }
    text
}

/// Whether the governing limit lies beyond the overtravel; under a dead load both in force.
fn overtravel(assessment: &Assessment, limit: &Limit, units: Units) -> String {
    let duty = &assessment.duty;
    if duty.overtravel_m <= 0.0 {
        return String::new();
    }
    let end = duty.working_deflection_m + duty.working_tolerance_m + duty.overtravel_m;
    let (what, end, at, unit) = match dead_load_at(duty, end) {
        Some(force) => (
            "The overtravel, counted as load,",
            force,
            limit.force_n,
            units.force(),
        ),
        None => ("The overtravel", end, limit.deflection_m, units.length()),
    };
    let Some(at) = at else {
        return String::new();
    };
    let word = if at >= end { "before" } else { "beyond" };
    format!(
        "{what} ends at {}, {} {word} it.",
        unit.show(end),
        unit.show((at - end).abs())
    )
}

/// Bow and wire stress at the largest working deflection or load.
fn at_work(assessment: &Assessment, units: Units) -> String {
    let Some(column) = &assessment.imperfect_column else {
        return String::new();
    };
    let duty = &assessment.duty;
    let working = if duty.loading == "force" {
        "working load"
    } else {
        "working deflection"
    };
    let tolerance = if duty.working_tolerance_m > 0.0 {
        ", tolerance included"
    } else {
        ""
    };
    let Some(bow) = column.bow_at_working_m else {
        return format!(
            "The path of the imperfect column does not get to the {working}{tolerance}."
        );
    };
    let estimate = column
        .bow_at_working_error_m
        .map(|e| format!(" (error estimate {})", units.length().show_error(e)))
        .unwrap_or_default();
    let stress = column
        .stress_at_working_pa
        .map(|stress| format!(", wire {}", units.show_stress(stress)))
        .unwrap_or_default();
    format!(
        "At the {working}{tolerance}: bow {} of {} allowed{estimate}{stress}.",
        units.show_length(bow),
        units.length().show_rounded(duty.bow_limit_m)
    )
}

/// The sentence with a capital first letter.
pub fn sentence_case(text: &str) -> String {
    let mut characters = text.chars();
    match characters.next() {
        Some(first) => first.to_uppercase().collect::<String>() + characters.as_str(),
        None => String::new(),
    }
}
