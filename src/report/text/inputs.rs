//! The inputs as resolved, those taken by default marked.

use super::section;
use super::supports::{guides, support};
use crate::report::Units;
use crate::report::layout::{pad_right, paragraph};
use crate::report::numbers::{percent_input, rounded, shortest};
use crate::result::Assessment;
use unicode_width::UnicodeWidthStr;

/// One input: the names it may have in a case file, what it is, its value.
pub(super) struct Input {
    pub keys: Vec<String>,
    pub label: String,
    pub value: String,
}

fn input(keys: &[&str], label: &str, value: String) -> Input {
    Input {
        keys: keys.iter().map(ToString::to_string).collect(),
        label: label.to_string(),
        value,
    }
}

/// Every input, and what follows from them at once.
pub fn inputs(assessment: &Assessment, units: Units) -> String {
    let mut inputs = spring(assessment, units);
    inputs.extend(support("bottom", &assessment.supports.bottom, units));
    inputs.extend(support("top", &assessment.supports.top, units));
    inputs.extend(guides(&assessment.guides, units));
    inputs.extend(imperfections(assessment, units));
    inputs.extend(duty(assessment, units));

    let defaulted = &assessment.defaulted;
    let width = inputs
        .iter()
        .map(|input| input.label.width())
        .max()
        .unwrap_or(0);
    let mut body = String::new();
    for input in &inputs {
        let mark = default_mark(&input.keys, defaulted);
        body += &paragraph(
            &format!("  {}  ", pad_right(&input.label, width)),
            &format!("{}{mark}", input.value),
        );
    }
    let shown = |key: &&String| inputs.iter().any(|input| input.keys.contains(key));
    let others: Vec<&str> = defaulted
        .iter()
        .filter(|key| !shown(key))
        .map(String::as_str)
        .collect();
    if !others.is_empty() {
        body += &paragraph("  Also taken by default: ", &others.join(", "));
    }
    let temperature = assessment.spring.service_temperature_degc;
    let heading = if temperature == 20.0 {
        "Inputs as resolved".to_string()
    } else {
        format!(
            "Inputs as resolved, at the service temperature of {} degC",
            shortest(temperature)
        )
    };
    section(&heading, &body)
}

/// What of an input was taken by default, in brackets.
fn default_mark(keys: &[String], defaulted: &[String]) -> String {
    let taken: Vec<&str> = keys
        .iter()
        .filter(|key| defaulted.contains(key))
        .filter_map(|key| key.rsplit('.').next())
        .collect();
    if taken.is_empty() {
        String::new()
    } else if taken.len() == keys.len() {
        " (default)".to_string()
    } else {
        let names: Vec<String> = taken.iter().map(|key| key.replace('_', " ")).collect();
        format!(" (default: {})", names.join(", "))
    }
}

fn spring(assessment: &Assessment, units: Units) -> Vec<Input> {
    let spring = &assessment.spring;
    let length = |value| units.length().show_input(value);
    let wire = if spring.wire_section == "round" {
        format!("round, diameter {}", length(spring.wire_diameter_m))
    } else {
        format!(
            "{}, {} along the radius by {} along the axis",
            spring.wire_section,
            length(spring.wire_diameter_m),
            length(spring.wire_axial_size_m)
        )
    };
    let rate = |value| units.rate().show(value);
    let rate = if spring.rate_is_measured {
        format!(
            "{} as measured (the formula gives {})",
            rate(spring.rate_n_per_m),
            rate(spring.formula_rate_n_per_m)
        )
    } else {
        format!("{} by the formula", rate(spring.rate_n_per_m))
    };
    vec![
        input(&["spring.wire"], "wire", wire),
        input(
            &["spring.mean_diameter"],
            "coil diameters",
            format!(
                "mean {}, outer {}, inner {}; index {}",
                length(spring.mean_diameter_m),
                length(spring.outer_diameter_m),
                length(spring.inner_diameter_m),
                rounded(spring.spring_index)
            ),
        ),
        input(
            &["spring.free_length"],
            "free length",
            format!(
                "{}; {} times the mean diameter",
                length(spring.free_length_m),
                rounded(spring.slenderness)
            ),
        ),
        input(
            &["spring.active_coils"],
            "active coils",
            format!(
                "{}, pitch {}",
                shortest(spring.active_coils),
                length(spring.pitch_m)
            ),
        ),
        input(
            &["spring.total_coils"],
            "total coils",
            shortest(spring.total_coils),
        ),
        input(&["spring.ends"], "ends", spring.ends.clone()),
        input(&["spring.hand"], "hand", spring.hand.clone()),
        input(
            &["spring.solid_length"],
            "solid length",
            format!("{}: {}", length(spring.solid_length_m), spring.solid_rule),
        ),
        input(
            &[],
            "dead end coils",
            format!(
                "{} high together; {} of the free length deform",
                length(spring.dead_height_m),
                length(spring.deformable_length_m)
            ),
        ),
        input(
            &["material.name"],
            "material",
            format!(
                "{}; E {}, G {} at the service temperature",
                spring.material,
                units.modulus().show(spring.youngs_modulus_pa),
                units.modulus().show(spring.shear_modulus_pa)
            ),
        ),
        input(
            &["material.service_temperature"],
            "service temperature",
            format!("{} degC", shortest(spring.service_temperature_degc)),
        ),
        input(&["spring.measured_rate"], "rate", rate),
    ]
}

fn imperfections(assessment: &Assessment, units: Units) -> Vec<Input> {
    let imperfections = &assessment.imperfections;
    let length = |value| units.length().show_input(value);
    vec![
        input(
            &["imperfections.squareness"],
            "squareness",
            length(imperfections.squareness_m),
        ),
        input(
            &["imperfections.parallelism"],
            "parallelism",
            length(imperfections.parallelism_m),
        ),
        input(
            &["imperfections.bow", "imperfections.bow_shape"],
            "bow, stress-free",
            format!(
                "{}, {}",
                length(imperfections.bow_m),
                imperfections.bow_shape
            ),
        ),
        input(
            &["imperfections.eccentricity"],
            "eccentricity",
            length(imperfections.eccentricity_m),
        ),
        input(
            &["imperfections.top_position"],
            "top position",
            imperfections.top_position.clone(),
        ),
    ]
}

fn duty(assessment: &Assessment, units: Units) -> Vec<Input> {
    let duty = &assessment.duty;
    let length = |value| units.length().show_input(value);
    let force = duty
        .working_force_n
        .map(|force| format!(", given as {}", units.force().show_input(force)))
        .unwrap_or_default();
    let allowable = match duty.allowable_stress_pa {
        Some(stress) => units.stress().show_input(stress),
        None => "none given, stress not checked".to_string(),
    };
    vec![
        input(&["duty.loading"], "what is set", duty.loading.clone()),
        input(
            &["duty.installed_deflection"],
            "installed deflection",
            length(duty.installed_deflection_m),
        ),
        input(
            &["duty.working_deflection"],
            "working deflection",
            format!("{}{force}", length(duty.working_deflection_m)),
        ),
        input(
            &["duty.working_tolerance"],
            "tolerance on it",
            length(duty.working_tolerance_m),
        ),
        input(
            &["duty.overtravel"],
            "overtravel",
            length(duty.overtravel_m),
        ),
        input(
            &["duty.required_margin"],
            "required margin",
            percent_input(duty.required_margin),
        ),
        input(&["duty.bow_limit"], "bow limit", length(duty.bow_limit_m)),
        input(
            &["duty.rate_loss_share"],
            "share of rate lost",
            percent_input(duty.rate_loss_share),
        ),
        input(&["duty.allowable_stress"], "allowable stress", allowable),
    ]
}
