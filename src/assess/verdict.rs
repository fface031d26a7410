//! Which limit governs, and whether the spring holds.

use super::imperfect::Imperfect;
use crate::result::{Limit, Verdict};
use crate::setup::{LimitKind, Loading, Setup};

pub(super) struct Decided {
    pub verdict: Verdict,
    pub governing: Option<LimitKind>,
    pub sentence: String,
    /// Why it could not be decided.
    pub undecided_reason: Option<&'static str>,
    pub limits: Vec<Limit>,
}

/// Relative difference that is round-off of the inputs, not a missing margin.
const ROUND_OFF: f64 = 1e-9;

const PATH_TOO_SHORT: &str =
    "the load path of the imperfect column could not be followed as far as required";
const TOO_NEAR: &str = "a limit lies as near to what is required of it as its error estimate";

/// Decides from the limits; marks the governing one: that with the least deflection over the
/// deflection needed of it.
pub(super) fn decide(setup: &Setup, limits: &[Limit], imperfect: &Imperfect) -> Decided {
    let mut limits = limits.to_vec();
    let duty = &setup.duty;
    // What a limit reaches over what is needed of it; a limit beyond solid is never met.
    let reached = |limit: &Limit| match (limit.deflection_m, limit.force_n) {
        (Some(deflection), Some(force)) if !limit.beyond_solid && !limit.for_information => {
            Some(duty.reached(deflection, force))
        }
        _ => None,
    };
    let governing = (0..limits.len())
        .filter_map(|i| Some((i, reached(&limits[i])? / duty.needed(limits[i].name))))
        .min_by(|a, b| a.1.total_cmp(&b.1));
    let Some((index, reserve)) = governing else {
        return Decided {
            verdict: Verdict::Undecided,
            governing: None,
            sentence: "Could not be decided: no limit was found.".into(),
            undecided_reason: Some("no limit was found"),
            limits,
        };
    };
    limits[index].governs = true;
    // Against what is needed: by how much it is missed, and the error of that.
    let missed = |limit: &Limit| {
        let needed = duty.needed(limit.name);
        Some((
            needed - reached(limit)?,
            limit.error_m.unwrap_or(0.0).max(ROUND_OFF * needed),
        ))
    };
    let clearly_fails = limits
        .iter()
        .filter_map(missed)
        .any(|(by, error)| by > error);
    let unsure = limits
        .iter()
        .filter(|limit| limit.error_m.is_some())
        .filter_map(|limit| Some((missed(limit)?, limit.error_m?)))
        .any(|((by, _), error)| by.abs() <= error);
    let unknown = !imperfect.is_known_far_enough(setup);
    let (verdict, undecided_reason) = if clearly_fails {
        (Verdict::DoesNotHold, None)
    } else if unknown {
        (Verdict::Undecided, Some(PATH_TOO_SHORT))
    } else if unsure {
        (Verdict::Undecided, Some(TOO_NEAR))
    } else {
        (Verdict::Holds, None)
    };
    let limit = &limits[index];
    let sentence = sentence(setup, verdict, limit, reserve, undecided_reason);
    Decided {
        verdict,
        governing: Some(limit.name),
        sentence,
        undecided_reason,
        limits,
    }
}

fn sentence(
    setup: &Setup,
    verdict: Verdict,
    limit: &Limit,
    reserve: f64,
    reason: Option<&str>,
) -> String {
    let duty = &setup.duty;
    let title = limit.name.title();
    let needed = duty.needed(limit.name) / duty.largest_working_deflection();
    let working = match duty.loading {
        Loading::Deflection => "the largest working deflection",
        Loading::Force => "the largest working load",
    };
    let against = format!(
        "it is reached at {:.3} times {working}, {needed:.3} times is required",
        reserve * needed
    );
    let limit = format!("The governing limit is \"{title}\": {against}.");
    match (verdict, reason) {
        (Verdict::Holds, _) => format!("Holds. {limit}"),
        (Verdict::DoesNotHold, _) => format!("Does not hold. {limit}"),
        (Verdict::Undecided, reason) => format!(
            "Could not be decided: {}. As far as computed: {limit}",
            reason.unwrap_or("no reason known")
        ),
    }
}
