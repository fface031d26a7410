//! What happens when a dead load, or a set deflection, is lost: the jump to the next stable state of
//! the path, and the energy it frees.

use super::events::{Event, EventKind};
use super::imperfect::Imperfect;
use crate::result::{DeadLoad, Snap};
use crate::setup::{LimitKind, Loading, Setup};

/// Under a dead load P the travel jumps: freed is P·Δs less the strain energy gained, the soft
/// seats' energy being that of P before and after.
pub(super) fn dead_load(setup: &Setup, imperfect: &Imperfect) -> Option<DeadLoad> {
    if setup.duty.loading != Loading::Force {
        return None;
    }
    let run = &imperfect.fine;
    let lost = run.event(EventKind::Limit(LimitKind::DeadLoadLost));
    let solid = run.event(EventKind::Limit(LimitKind::Solid));
    let regained = run
        .event(EventKind::ForceRegained)
        .filter(|event| event.is_stable(Loading::Force))
        .filter(|event| solid.is_none_or(|solid| event.place < solid.place));
    let rest = regained.or(solid);
    let jump = lost.zip(rest);
    let force = lost.map_or(0.0, |lost| lost.point.force_n);
    let rests_at = jump.map(|(_, rest)| rest.point.shortening_m + setup.seats_give(force).0);
    Some(DeadLoad {
        path_ends_at_m: imperfect.ends_before_solid(),
        lost_at_force_n: lost.map(|lost| lost.point.force_n),
        lost_at_deflection_m: lost.map(|lost| lost.point.deflection_m),
        rests_at_deflection_m: rests_at,
        rests_solid: jump.is_some() && regained.is_none(),
        jump_m: jump
            .zip(rests_at)
            .map(|((lost, _), at)| at - lost.point.deflection_m),
        energy_freed_j: jump.map(|(lost, rest)| {
            force * (rest.point.shortening_m - lost.point.shortening_m)
                - (rest.strain_energy - lost.strain_energy)
        }),
        clash_on_the_way: jump.is_some_and(|(_, rest)| clashes_before(imperfect, rest)),
    })
}

/// Under a set deflection the force drops: freed is the strain energy lost, that of the soft seats
/// included.
pub(super) fn snap(setup: &Setup, imperfect: &Imperfect) -> Option<Snap> {
    if setup.duty.loading != Loading::Deflection {
        return None;
    }
    let run = &imperfect.fine;
    let lost = run.event(EventKind::Limit(LimitKind::TravelLost))?;
    let solid = run.event(EventKind::Limit(LimitKind::Solid));
    let regained = run
        .event(EventKind::TravelRegained)
        .filter(|event| event.is_stable(Loading::Deflection))
        .filter(|event| solid.is_none_or(|solid| event.place < solid.place));
    // Solid, the spring shortens no more: the soft seats take up what is left of the travel.
    let left = |solid: &Event| lost.point.deflection_m - solid.point.shortening_m;
    let rest = regained.or(solid.filter(|solid| left(solid) > 0.0));
    let force_after = |rest: &Event| {
        if regained.is_some() {
            rest.point.force_n
        } else {
            force_of_seats(setup, left(rest))
        }
    };
    let stored = |event: &Event, force: f64| event.strain_energy + setup.seats_store(force);
    Some(Snap {
        lost_at_deflection_m: lost.point.deflection_m,
        force_before_n: lost.point.force_n,
        force_after_n: rest.map(force_after),
        rests_solid: rest.is_some() && regained.is_none(),
        bow_before_m: lost.point.bow_m,
        bow_after_m: rest.map(|rest| rest.point.bow_m),
        energy_freed_j: rest
            .map(|rest| stored(lost, lost.point.force_n) - stored(rest, force_after(rest))),
        clash_on_the_way: rest.is_some_and(|rest| clashes_before(imperfect, rest)),
    })
}

/// Force under which the soft seats together give that much, m. Halved to round-off: what they give
/// rises with the force.
fn force_of_seats(setup: &Setup, give: f64) -> f64 {
    let (mut low, mut high) = (0.0, setup.spring.rate() * give);
    while setup.seats_give(high).0 < give && high.is_finite() {
        low = high;
        high *= 2.0;
    }
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if middle <= low || middle >= high {
            break;
        }
        if setup.seats_give(middle).0 < give {
            low = middle;
        } else {
            high = middle;
        }
    }
    high
}

/// Whether the path reaches the first clash of coils before that event, by the bow it has there.
fn clashes_before(imperfect: &Imperfect, event: &Event) -> bool {
    imperfect
        .fine
        .event(EventKind::Limit(LimitKind::Clash))
        .is_some_and(|clash| clash.point.bow_m < event.point.bow_m)
}
