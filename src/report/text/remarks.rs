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
    let mut text = match (load.lost_at_force_n, load.lost_at_deflection_m) {
        (Some(force), Some(at)) => format!(
            "The load is lost at {}, at a deflection of {}.",
            units.show_force(force),
            units.show_length(at)
        ),
        _ => match load.path_ends_at_m {
            Some(end) => format!(
                "The force rises up to {}, where the path ends: no dead load is lost before.",
                units.show_length(end)
            ),
            None => {
                "The force rises all the way to solid: a dead load is not lost before.".to_string()
            }
        },
    };
    if let (Some(jump), Some(rest)) = (load.jump_m, load.rests_at_deflection_m) {
        let state = if load.rests_solid {
            "until it is solid"
        } else {
            "to the next stable state"
        };
        text += &format!(
            " From there the spring jumps {}, {state} at {}",
            units.show_length(jump),
            units.show_length(rest)
        );
        if let Some(energy) = load.energy_freed_j {
            text += &format!(", and frees {}", units.show_energy(energy));
        }
        text += ".";
    } else if load.lost_at_force_n.is_some() {
        text += " Where it comes to rest is not on the path.";
    }
    text += clash(load.clash_on_the_way);
    section("Under a dead load", &paragraph("  ", &text))
}

/// Where a set deflection is lost, and what the snap frees.
pub fn snap(assessment: &Assessment, units: Units) -> String {
    let Some(snap) = &assessment.snap else {
        return String::new();
    };
    let mut text = format!(
        "At a travel of {} the spring snaps sideways, the travel held: the force falls from {}",
        units.show_length(snap.lost_at_deflection_m),
        units.show_force(snap.force_before_n)
    );
    match (snap.force_after_n, snap.bow_after_m, snap.energy_freed_j) {
        (Some(force), Some(bow), Some(energy)) => {
            let solid = if snap.rests_solid {
                ", where it is solid"
            } else {
                ""
            };
            text += &format!(
                " to {}, the bow grows from {} to {}{solid}, and {} is freed.",
                units.show_force(force),
                units.show_length(snap.bow_before_m),
                units.show_length(bow),
                units.show_energy(energy)
            );
        }
        _ => text += "; the next stable state is not on the path.",
    }
    text += clash(snap.clash_on_the_way);
    section("Set travel lost", &paragraph("  ", &text))
}

fn clash(on_the_way: bool) -> &'static str {
    if on_the_way {
        " Its coils clash on the way: from there on the column model is a guide only."
    } else {
        ""
    }
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
