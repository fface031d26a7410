//! What happens when a dead load is lost.

use super::events::EventKind;
use super::imperfect::Imperfect;
use super::straight::seat_compliance;
use crate::result::DeadLoad;
use crate::setup::{LimitKind, Loading, Setup};

pub(super) fn describe(setup: &Setup, imperfect: &Imperfect) -> Option<DeadLoad> {
    if setup.duty.loading != Loading::Force {
        return None;
    }
    let share = |deflection: f64| 100.0 * deflection / setup.spring.free_length;
    let Some(lost) = imperfect
        .fine
        .event(EventKind::Limit(LimitKind::DeadLoadLost))
    else {
        return Some(DeadLoad {
            lost_at_force_n: None,
            lost_at_deflection_m: None,
            rests_at_deflection_m: None,
            jump_m: None,
            energy_freed_j: None,
            sentence: "The force rises all along the path as far as it is known: no dead load \
                       within it is lost."
                .into(),
        });
    };
    let force = lost.point.force_n;
    let regained = imperfect
        .fine
        .event(EventKind::ForceRegained)
        .filter(|event| event.point.unstable_dead_load == 0);
    let rest = regained.or_else(|| imperfect.fine.event(EventKind::Limit(LimitKind::Solid)));
    let lost_at = lost.point.deflection_m;
    let rests_at = rest.map(|event| event.point.shortening_m + force * seat_compliance(setup));
    let energy = rest.map(|event| {
        force * (event.point.shortening_m - lost.point.shortening_m)
            - (event.strain_energy - lost.strain_energy)
    });
    let clash = imperfect
        .fine
        .event(EventKind::Limit(LimitKind::Clash))
        .filter(|clash| rests_at.is_some_and(|at| clash.point.deflection_m < at));
    let sentence = match (rests_at, regained) {
        (None, _) => format!(
            "The load is lost at {:.2} % of the free length; where the spring comes to rest is \
             not known.",
            share(lost_at)
        ),
        (Some(at), found) => format!(
            "The load is lost at {:.2} % of the free length; the spring jumps by {:.2} % of its \
             free length {}{}.",
            share(lost_at),
            share(at - lost_at),
            if found.is_some() {
                "to the next stable state"
            } else {
                "until it is solid"
            },
            if clash.is_some() {
                ", past the first clash of its coils, beyond which the model is a guide only"
            } else {
                ""
            }
        ),
    };
    Some(DeadLoad {
        lost_at_force_n: Some(force),
        lost_at_deflection_m: Some(lost_at),
        rests_at_deflection_m: rests_at,
        jump_m: rests_at.map(|at| at - lost_at),
        energy_freed_j: energy,
        sentence,
    })
}
