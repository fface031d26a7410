//! Dead load, absolute stability, stress at solid, warnings.

use super::section;
use crate::report::Units;
use crate::report::layout::paragraph;
use crate::result::Assessment;

/// Where a dead load is lost, how far it jumps, what energy that frees.
pub fn dead_load(assessment: &Assessment, units: Units) -> String {
    let Some(load) = &assessment.dead_load else {
        return String::new();
    };
    let text = match (load.lost_at_force_n, load.lost_at_deflection_m) {
        (Some(force), Some(at)) => {
            let mut text = format!(
                "The load is lost at {}, at a deflection of {}.",
                units.show_force(force),
                units.show_length(at)
            );
            if let Some(jump) = load.jump_m {
                text += &format!(" From there the spring jumps {}", units.show_length(jump));
                if let Some(rest) = load.rests_at_deflection_m {
                    text += &format!(", to rest at {}", units.show_length(rest));
                }
                if let Some(energy) = load.energy_freed_j {
                    text += &format!(", and frees {}", units.show_energy(energy));
                }
                text += ".";
            }
            text
        }
        _ => "The force rises all the way to solid: a dead load is not lost before.".to_string(),
    };
    section("Under a dead load", &paragraph("  ", &text))
}

/// What formula and column say about buckling at no deflection at all.
pub fn absolute_stability(assessment: &Assessment, units: Units) -> String {
    let stability = &assessment.absolute_stability;
    let verdict = |stable: bool, below: Option<String>| match (stable, below) {
        (true, Some(length)) => format!("yes; it holds below a free length of {length}."),
        (true, None) => "yes, at any free length.".to_string(),
        (false, Some(length)) => format!("no; it would begin below a free length of {length}."),
        (false, None) => "no, at no free length.".to_string(),
    };
    let formula = match stability.formula {
        Some(stable) => verdict(
            stable,
            stability.formula_below_m.map(|l| units.show_length(l)),
        ),
        None => "no closed form covers this support.".to_string(),
    };
    let column = verdict(
        stability.column,
        stability.column_below_m.map(|length| {
            let estimate = stability
                .column_below_error_m
                .map(|e| format!(" (error estimate {})", units.length().show_error(e)))
                .unwrap_or_default();
            format!("{}{estimate}", units.show_length(length))
        }),
    );
    let body = paragraph("  ", &format!("By the formula: {formula}"))
        + &paragraph("  ", &format!("By the straight column: {column}"));
    section("Absolute stability (no buckling at any deflection)", &body)
}

/// The wire with the spring pressed solid.
pub fn stress_at_solid(assessment: &Assessment, units: Units) -> String {
    let solid = &assessment.stress_at_solid;
    let check = match (solid.allowable_pa, solid.within) {
        (Some(allowable), Some(true)) => {
            format!("within the allowable {}", units.show_stress(allowable))
        }
        (Some(allowable), _) => format!("ABOVE the allowable {}", units.show_stress(allowable)),
        (None, _) => "not checked, since no allowable is given".to_string(),
    };
    let text = format!(
        "Corrected shear stress of the straight spring, pressed solid: {}, {check}.",
        units.show_stress(solid.stress_pa)
    );
    section("Stress at solid", &paragraph("  ", &text))
}

/// Warnings and assumptions.
pub fn warnings(assessment: &Assessment) -> String {
    let body: String = assessment
        .warnings
        .iter()
        .map(|warning| paragraph("  - ", warning))
        .collect();
    section("Warnings", &body)
}
