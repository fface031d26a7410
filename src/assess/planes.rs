//! Two lateral planes: supports that hold the end differently in them are looked at in each, and
//! the weaker plane governs.
//!
//! The spring itself is alike all round, and the plane column in one principal plane knows nothing
//! of the other. The imperfections are taken to lie wholly in the plane looked at, in each in turn:
//! that is conservative, as they cannot lie wholly in both.

use crate::result::{Assessment, LimitKind, PlaneAnswer, Verdict};
use crate::setup::{Setup, Support};
use std::cmp::Ordering;
use std::f64::consts::FRAC_PI_2;

/// The case in its two lateral planes; `None` where both ends are held alike all round.
pub(super) fn of(setup: &Setup) -> Option<[Setup; 2]> {
    let in_plane = |of: fn(&Support) -> Support| Setup {
        bottom: of(&setup.bottom),
        top: of(&setup.top),
        ..setup.clone()
    };
    differing(setup).map(|_| {
        [
            in_plane(Support::in_first_plane),
            in_plane(Support::in_other_plane),
        ]
    })
}

/// A support that differs between its planes.
fn differing(setup: &Setup) -> Option<&Support> {
    [&setup.bottom, &setup.top]
        .into_iter()
        .find(|support| support.other_plane.is_some())
}

/// The answer of the weaker plane, with what both planes say.
pub(super) fn weaker(setup: &Setup, answers: [Assessment; 2]) -> Assessment {
    let [first, other] = answers;
    let other_governs = is_weaker(setup, &other, &first);
    let direction = differing(setup).map_or(0.0, |support| support.plane);
    let planes = vec![
        summary(&first, direction, !other_governs),
        summary(&other, direction + FRAC_PI_2, other_governs),
    ];
    let weaker = if other_governs { other } else { first };
    let sentence = format!(
        "In the weaker of its two lateral planes: {}",
        weaker.sentence
    );
    Assessment {
        sentence,
        supports: super::echo::supports(setup),
        planes,
        ..weaker
    }
}

fn is_weaker(setup: &Setup, one: &Assessment, than: &Assessment) -> bool {
    let strength = |answer: &Assessment| {
        let limit = answer.limits.iter().find(|limit| limit.governs);
        let reserve = limit.and_then(|limit| {
            let reached = setup.duty.reached(limit.deflection_m?, limit.force_n?);
            Some(reached / setup.duty.needed(limit.name))
        });
        (answer.verdict, reserve.unwrap_or(f64::INFINITY))
    };
    compare(strength(one), strength(than)).is_lt()
}

/// A plane that fails decides; one that is undecided comes before one that holds; then the one
/// whose governing limit reaches less of what is needed of it. Of two alike, the first.
fn compare(one: (Verdict, f64), other: (Verdict, f64)) -> Ordering {
    let rank = |verdict: Verdict| match verdict {
        Verdict::DoesNotHold => 0,
        Verdict::Undecided => 1,
        Verdict::Holds => 2,
    };
    rank(one.0)
        .cmp(&rank(other.0))
        .then(one.1.total_cmp(&other.1))
}

fn summary(answer: &Assessment, direction_rad: f64, governs: bool) -> PlaneAnswer {
    let limit = answer.limits.iter().find(|limit| limit.governs);
    let critical = answer
        .limits
        .iter()
        .find(|limit| limit.name == LimitKind::Critical);
    PlaneAnswer {
        direction_rad,
        governs,
        verdict: answer.verdict,
        undecided_reason: answer.undecided_reason.clone(),
        governing: answer.governing,
        deflection_m: limit.and_then(|limit| limit.deflection_m),
        force_n: limit.and_then(|limit| limit.force_n),
        margin: limit.and_then(|limit| limit.margin),
        required_margin: limit.map(|limit| limit.required_margin),
        critical_deflection_m: critical.and_then(|limit| limit.deflection_m),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use Verdict::{DoesNotHold, Holds, Undecided};

    #[test]
    fn what_fails_decides_then_what_is_undecided_then_what_has_less_to_spare() {
        let rising = [
            (DoesNotHold, 0.7),
            (DoesNotHold, 0.9),
            (Undecided, 0.8),
            (Undecided, f64::INFINITY),
            (Holds, 1.01),
            (Holds, 1.4),
        ];
        for pair in rising.windows(2) {
            assert_eq!(compare(pair[0], pair[1]), Ordering::Less);
            assert_eq!(compare(pair[1], pair[0]), Ordering::Greater);
        }
        assert_eq!(compare(rising[0], rising[0]), Ordering::Equal);
    }
}
