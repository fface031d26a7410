//! What the handbook's formula says of the case.

use super::straight::{is_beyond_solid, measure};
use crate::criteria::{EndConstant, HandbookEnd, critical_share, end_constants, stable_below};
use crate::result::{ClosedForm, ClosedFormCurve};
use crate::setup::{Contact, Restraint, Setup, Support};

const FORMULA: &str = "critical deflection C1(1 - sqrt(1 - C2/(alpha L0/D)^2)), EN 13906-1 \
    buckling clause (from memory) and Shigley, Mechanical Engineering Design (seen)";
const RECTANGULAR: &str = "; for rectangular wire with the stiffnesses from the energy of a turn \
    (Haringx), which the handbooks do not print";

pub(super) fn closed_form(setup: &Setup) -> ClosedForm {
    let spring = &setup.spring;
    let length = spring.free_length;
    let section = spring.section(length);
    let curves: Vec<ClosedFormCurve> = constants(setup)
        .iter()
        .map(|constant| {
            let critical = critical_share(&section, constant.value * length).map(|share| {
                let force = spring.rate() * share * length;
                measure(setup, share * length + setup.seats_give(force).0, force)
            });
            ClosedFormCurve {
                end_constant: constant.value,
                source: constant.source.to_owned(),
                critical_deflection_m: critical.map(|m| m.deflection_m),
                critical,
                beyond_solid: critical
                    .is_some_and(|m| is_beyond_solid(setup, m.deflection_m, m.force_n)),
                absolute_stability_below_m: stable_below(&spring.turn_compliance(), constant.value),
            }
        })
        .collect();
    let round = matches!(spring.wire, crate::spring::Wire::Round { .. });
    let note = if curves.is_empty() {
        "no closed form covers this support".to_owned()
    } else if round {
        FORMULA.to_owned()
    } else {
        format!("{FORMULA}{RECTANGULAR}")
    };
    ClosedForm {
        end_constant: curves.first().map(|c| c.end_constant),
        critical_deflection_m: curves.first().and_then(|c| c.critical_deflection_m),
        curves,
        note,
        unseen: unseen(setup),
    }
}

/// What of the case neither the closed form nor the straight column sees, or why no handbook end
/// fits, each in a sentence.
fn unseen(setup: &Setup) -> Vec<String> {
    let mut notes = Vec::new();
    for (name, support) in [("bottom", &setup.bottom), ("top", &setup.top)] {
        match support.contact {
            Contact::Joined => {}
            Contact::Flat(_) => notes.push(format!(
                "The flat {name} seat counts as holding the end as long as it bears: the straight \
                 column does not rock. Lift-off is a limit of the imperfect column."
            )),
            Contact::Swivel(_) => notes.push(format!(
                "The friction of the {name} ball does not count: the straight column puts no moment \
                 on it. The imperfect column feels it."
            )),
        }
        if support.link.is_some() {
            notes.push(format!(
                "The load comes through a link at the {name}: no handbook end is like it."
            ));
        }
        if support.motion.is_some() {
            notes.push(format!(
                "The {name} seat moves aside as it travels: the straight column does not, its end \
                 counts as the kind it is. The imperfect column goes with the seat."
            ));
        }
    }
    if !setup.guides.is_empty() {
        notes.push(
            "Guides do not count: formula, straight column and column as built, perfect, do not \
             touch them. The imperfect column leans on them."
                .to_owned(),
        );
    }
    notes
}

/// The end constants that cover the case; none for elastic ends.
fn constants(setup: &Setup) -> &'static [EndConstant] {
    match (handbook_end(&setup.bottom), handbook_end(&setup.top)) {
        (Some(bottom), Some(top)) => end_constants(bottom, top),
        _ => &[],
    }
}

/// The support as the handbooks know it, before it bows: a flat seat clamps, a ball with friction
/// is a hinge, a seat that moves aside is of the kind it is. An arm matters where the end can turn
/// about its pivot. No handbook end is like a link.
pub(super) fn handbook_end(support: &Support) -> Option<HandbookEnd> {
    if support.link.is_some() {
        return None;
    }
    match (support.rotation, support.sideways) {
        (Restraint::Held, Restraint::Held) => Some(HandbookEnd::Clamped),
        (Restraint::Held, Restraint::Free) => Some(HandbookEnd::Sliding),
        (Restraint::Free, Restraint::Held) if support.arm == 0.0 => Some(HandbookEnd::Hinged),
        (Restraint::Free, Restraint::Free) if support.arm == 0.0 => Some(HandbookEnd::Free),
        _ => None,
    }
}
