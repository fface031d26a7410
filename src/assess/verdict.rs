//! Which limit governs, and whether the spring holds.

use super::imperfect::Imperfect;
use crate::result::{Limit, Verdict};
use crate::setup::{LimitKind, Setup};

pub(super) struct Decided {
    pub verdict: Verdict,
    pub governing: Option<LimitKind>,
    pub sentence: String,
    pub limits: Vec<Limit>,
}

/// Relative difference that is round-off of the inputs, not a missing margin.
const ROUND_OFF: f64 = 1e-9;

/// Decides from the limits; marks the governing one: that with the least deflection over the
/// deflection needed of it.
pub(super) fn decide(setup: &Setup, limits: &[Limit], imperfect: &Imperfect) -> Decided {
    let mut limits = limits.to_vec();
    let duty = &setup.duty;
    let reserve = |limit: &Limit| {
        limit
            .deflection_m
            .map(|deflection| deflection / duty.needed(limit.name))
    };
    let governing = (0..limits.len())
        .filter(|i| limits[*i].deflection_m.is_some())
        .min_by(|a, b| {
            let key = |i: usize| reserve(&limits[i]).unwrap_or(f64::INFINITY);
            key(*a).total_cmp(&key(*b))
        });
    let Some(index) = governing else {
        return Decided {
            verdict: Verdict::Undecided,
            governing: None,
            sentence: "Could not be decided: no limit was found.".into(),
            limits,
        };
    };
    limits[index].governs = true;
    let fails = |limit: &Limit| reserve(limit).is_some_and(|r| r < 1.0 - ROUND_OFF);
    let unsure = limits.iter().any(|limit| {
        let (Some(deflection), Some(error)) = (limit.deflection_m, limit.error_m) else {
            return false;
        };
        (deflection - duty.needed(limit.name)).abs() <= error
    });
    let clearly_fails = limits.iter().any(|limit| {
        fails(limit)
            && limit.deflection_m.unwrap_or(0.0) + limit.error_m.unwrap_or(0.0)
                < duty.needed(limit.name)
    });
    let farthest = LimitKind::ALL
        .iter()
        .map(|kind| duty.needed(*kind))
        .fold(0.0, f64::max);
    let unknown = !imperfect.failures.is_empty() && imperfect.known_up_to() < farthest;
    let verdict = if clearly_fails {
        Verdict::DoesNotHold
    } else if unknown || unsure {
        Verdict::Undecided
    } else {
        Verdict::Holds
    };
    let limit = &limits[index];
    let sentence = sentence(setup, verdict, limit, unknown);
    Decided {
        verdict,
        governing: Some(limit.name),
        sentence,
        limits,
    }
}

fn sentence(setup: &Setup, verdict: Verdict, limit: &Limit, unknown: bool) -> String {
    let duty = &setup.duty;
    let title = limit.name.title();
    let working = duty.largest_working_deflection();
    let reached = limit.deflection_m.unwrap_or(f64::NAN) / working;
    let needed = duty.needed(limit.name) / working;
    let against = format!(
        "it is reached at {reached:.3} times the largest working deflection, {needed:.3} times is \
         required"
    );
    match verdict {
        Verdict::Holds => format!("Holds. The governing limit is \"{title}\": {against}."),
        Verdict::DoesNotHold => {
            format!("Does not hold. The governing limit is \"{title}\": {against}.")
        }
        Verdict::Undecided if unknown => format!(
            "Could not be decided: the load path of the imperfect column could not be followed as \
             far as required. The nearest limit found is \"{title}\": {against}."
        ),
        Verdict::Undecided => format!(
            "Could not be decided: a limit lies as near to what is required of it as its error \
             estimate. The governing limit is \"{title}\": {against}."
        ),
    }
}
