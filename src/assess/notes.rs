//! What a reader must know of the models used on this case.

use super::imperfect::Imperfect;
use crate::setup::{Loading, Restraint, Setup, Support};
use crate::spring::Wire;

/// Active coils below which the column is a poor likeness.
const FEW_COILS: f64 = 5.0;

pub(super) fn notes(setup: &Setup, imperfect: &Imperfect) -> Vec<String> {
    let mut notes = Vec::new();
    let duty = &setup.duty;
    let solid_force = setup.spring.rate() * setup.spring.solid_deflection();
    let solid = duty.reached(
        setup.spring.solid_deflection() + setup.seats_give(solid_force).0,
        solid_force,
    );
    if duty.largest_working_deflection() > solid {
        notes.push(
            "The working deflection, tolerance included, lies beyond solid: the spring cannot get \
             there."
                .to_owned(),
        );
    }
    notes.extend(no_imperfection_acts(setup, imperfect));
    if let Some(share) = imperfect.knocked_over_from(setup) {
        let what = match duty.loading {
            Loading::Force => "load",
            Loading::Deflection => "travel",
        };
        notes.push(format!(
            "From {:.1} % of the lost {what} on, a bowed state stands beside the one the spring is \
             in: a knock can throw it over before the {what} is lost.",
            100.0 * share
        ));
    }
    notes.extend(without_effect(setup));
    if setup.spring.active_coils < FEW_COILS {
        notes.push(
            "Fewer than 5 active coils: the equivalent column is an idealisation of many turns; \
             expect several per cent, on either side."
                .to_owned(),
        );
    }
    if matches!(setup.spring.wire, Wire::Rectangular { .. }) {
        notes.push(
            "Rectangular wire: the stress correction for curvature is that of round wire (common \
             practice, no source)."
                .to_owned(),
        );
    }
    notes
}

/// The path of a spring whose deviations leave its buckling mode alone is too good to be true.
fn no_imperfection_acts(setup: &Setup, imperfect: &Imperfect) -> Option<String> {
    let diameter = setup.spring.mean_diameter;
    if imperfect.fine.seen.len() < 2 {
        return Some(
            "The path ends where it starts: a section is turned further, unloaded, than any path \
             is followed."
                .to_owned(),
        );
    }
    let straight = imperfect.fine.farthest(|seen| seen.point.bow_m) < 1e-9 * diameter;
    if imperfect.meets_a_branch() {
        Some(
            "None of the imperfections given acts on the mode in which this spring buckles: its \
             path runs into a branch point. A real spring bows earlier: state a bow or an \
             eccentricity."
                .to_owned(),
        )
    } else if straight {
        Some(
            "None of the imperfections given acts on this column: it stays straight all the way. \
             State a bow or an eccentricity to see what a real spring does."
                .to_owned(),
        )
    } else {
        None
    }
}

/// Inputs that cannot act, with the reason.
fn without_effect(setup: &Setup) -> Vec<String> {
    let turns_freely = |s: &Support| s.rotation == Restraint::Free && s.arm == 0.0;
    let sizes = &setup.imperfections;
    let mut notes = Vec::new();
    if turns_freely(&setup.bottom) && turns_freely(&setup.top) {
        for (name, size) in [
            ("squareness", sizes.squareness),
            ("parallelism", sizes.parallelism),
        ] {
            if size != 0.0 {
                notes.push(format!(
                    "The {name} has no effect: both ends turn freely about points in their end \
                     planes."
                ));
            }
        }
    }
    let cannot_turn = |s: &Support| s.rotation == Restraint::Held;
    if sizes.eccentricity != 0.0 && cannot_turn(&setup.bottom) && cannot_turn(&setup.top) {
        notes.push("The eccentricity has no effect: neither end can turn.".to_owned());
    }
    for (name, support) in [("bottom", &setup.bottom), ("top", &setup.top)] {
        if support.tilt != 0.0 && support.rotation == Restraint::Free {
            notes.push(format!(
                "The tilt of the {name} seat has no effect: the end turns freely."
            ));
        }
        if support.offset != 0.0 && support.sideways == Restraint::Free {
            notes.push(format!(
                "The offset of the {name} seat has no effect: the end moves sideways freely."
            ));
        }
    }
    notes
}
