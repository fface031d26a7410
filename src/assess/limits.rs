//! The limits of the usable deflection, each from the model it belongs to.

use super::events::EventKind;
use super::imperfect::Imperfect;
use super::straight::{Critical, is_beyond_solid, share_of_free_length};
use crate::result::{Limit, StressAtSolid};
use crate::setup::{LimitKind, Setup};
use crate::spring::{compressed_radius, torsion_stress};

/// Below this share of the solid deflection, a clash differs from solid by round-off only.
const SAME_AS_SOLID: f64 = 1e-6;

/// Every limit that applies, by deflection, those never reached last.
pub(super) fn collect(
    setup: &Setup,
    critical: Option<&Critical>,
    imperfect: &Imperfect,
) -> Vec<Limit> {
    let mut limits = vec![
        critical_limit(setup, critical),
        solid_limit(setup, imperfect),
    ];
    let from_path = [
        LimitKind::Bow,
        LimitKind::RateLost,
        LimitKind::Stress,
        LimitKind::Clash,
        LimitKind::DeadLoadLost,
        LimitKind::TravelLost,
        LimitKind::LiftOff,
        LimitKind::Slide,
        LimitKind::GuideTouch,
    ];
    limits.extend(
        from_path
            .into_iter()
            .filter(|kind| setup.has(*kind))
            .map(|kind| path_limit(setup, imperfect, kind)),
    );
    limits.extend(setup.has(LimitKind::BoreFilled).then(|| bore_limit(setup)));
    limits.sort_by(|a, b| {
        let key = |limit: &Limit| limit.deflection_m.unwrap_or(f64::INFINITY);
        key(a).total_cmp(&key(b)).then(a.name.cmp(&b.name))
    });
    limits
}

fn limit(
    setup: &Setup,
    name: LimitKind,
    reached: Option<(f64, f64, Option<f64>)>,
    note: String,
) -> Limit {
    let deflection_m = reached.map(|r| r.0);
    Limit {
        name,
        deflection_m,
        share_of_free_length: reached.map(|(d, force, _)| share_of_free_length(setup, d, force)),
        force_n: reached.map(|r| r.1),
        margin: reached.map(|(d, force, _)| setup.duty.margin(d, force)),
        required_margin: setup.duty.margins.of(name),
        error_m: reached.and_then(|r| r.2),
        for_information: !setup.has(name),
        governs: false,
        beyond_solid: reached.is_some_and(|(d, force, _)| is_beyond_solid(setup, d, force)),
        looked_up_to_m: None,
        note,
    }
}

fn critical_limit(setup: &Setup, critical: Option<&Critical>) -> Limit {
    let note = match critical {
        None => "never: the perfect column as built stays straight at any deflection",
        Some(c) if is_beyond_solid(setup, c.deflection, c.force) => {
            "none before solid; perfect column as built, dead coils and arms included"
        }
        Some(_) if setup.may_lean() => {
            "perfect column as built, its guides left away; for information, as the spring may lean \
             on them"
        }
        Some(_) => "perfect column as built, dead coils and arms included",
    };
    limit(
        setup,
        LimitKind::Critical,
        critical.map(|c| (c.deflection, c.force, Some(c.error))),
        note.to_owned(),
    )
}

/// Solid by the spring's geometry; the force is the path's where it gets there, else the rate's.
/// Nothing stops a spring between the loss of its load or travel and solid: in that jump, solid
/// counts as reached where the jump starts.
fn solid_limit(setup: &Setup, imperfect: &Imperfect) -> Limit {
    let shortening = setup.spring.solid_deflection();
    let reached_with = |force: f64| shortening + setup.seats_give(force).0;
    let by_rate = setup.spring.rate() * shortening;
    let (reached, whose) = match imperfect.event(setup, EventKind::Limit(LimitKind::Solid)) {
        Some((event, error)) if event.in_jump => (
            (event.reached.0, event.reached.1, Some(error)),
            "reached in the jump that starts here",
        ),
        Some((event, _)) => {
            let force = event.point.force_n;
            (
                (reached_with(force), force, None),
                "force of the imperfect column",
            )
        }
        None => (
            (reached_with(by_rate), by_rate, None),
            "force of the straight spring",
        ),
    };
    let note = format!("{}; {whose}", setup.spring.solid_rule);
    Limit {
        beyond_solid: false,
        ..limit(setup, LimitKind::Solid, Some(reached), note)
    }
}

/// Where the coil, grown by compression, fills its bore: by the spring's geometry, straight.
fn bore_limit(setup: &Setup) -> Limit {
    let spring = &setup.spring;
    let filled = setup
        .guides
        .iter()
        .filter_map(|guide| guide.filled_at_pitch(spring))
        .reduce(f64::max);
    let reached = filled.map(|pitch| {
        let shortening = spring.deformable_length() * (1.0 - pitch / spring.pitch());
        let force = spring.rate() * shortening;
        (shortening + setup.seats_give(force).0, force, None)
    });
    limit(
        setup,
        LimitKind::BoreFilled,
        reached,
        "outer diameter grown by compression, straight spring, for the worse of ends held and ends \
         free to turn about the axis"
            .to_owned(),
    )
}

fn path_limit(setup: &Setup, imperfect: &Imperfect, kind: LimitKind) -> Limit {
    let duty = &setup.duty;
    let meaning = match kind {
        LimitKind::Bow => format!(
            "imperfect column: bow of {:.3} D, from where the axis stood unloaded in its seats",
            duty.bow_limit / setup.spring.mean_diameter
        ),
        LimitKind::RateLost => format!(
            "imperfect column: slope down to {:.1} % of the straight spring's rate",
            100.0 * (1.0 - duty.rate_loss_share)
        ),
        LimitKind::DeadLoadLost => "imperfect column: largest force of its path".into(),
        LimitKind::TravelLost => "imperfect column: largest travel before it snaps".into(),
        LimitKind::Stress => "imperfect column: corrected shear stress at the worst section".into(),
        LimitKind::LiftOff => {
            "imperfect column: the force line leaves the rigid ring of a flat end, \
                               which then stands on its edge"
                .into()
        }
        LimitKind::Slide => "imperfect column: thrust at a flat end above friction".into(),
        LimitKind::GuideTouch => "imperfect column: first touch of a guide".into(),
        _ => "imperfect column: inside of the bow; the model ends there".into(),
    };
    if kind == LimitKind::Stress && duty.allowable_stress.is_none() {
        return limit(
            setup,
            kind,
            None,
            "not checked: no allowable stress given".into(),
        );
    }
    let solid = setup.spring.solid_deflection();
    let found = imperfect
        .event(setup, EventKind::Limit(kind))
        .filter(|(event, _)| {
            kind != LimitKind::Clash || event.point.shortening_m < (1.0 - SAME_AS_SOLID) * solid
        });
    match found {
        Some((event, error)) => limit(
            setup,
            kind,
            Some((event.reached.0, event.reached.1, Some(error))),
            if event.in_jump {
                format!("{meaning}; reached in the jump that starts here")
            } else {
                meaning
            },
        ),
        None => Limit {
            looked_up_to_m: imperfect.ends_before_solid(),
            ..limit(setup, kind, None, meaning)
        },
    }
}

/// Stress of the straight spring pressed solid.
pub(super) fn stress_at_solid(setup: &Setup) -> StressAtSolid {
    let spring = &setup.spring;
    let radius = compressed_radius(
        spring.mean_diameter,
        spring.pitch(),
        spring.wire.axial_size(),
    );
    let force = spring.rate() * spring.solid_deflection();
    let stress_pa = torsion_stress(&spring.wire, spring.index(), force * radius);
    StressAtSolid {
        stress_pa,
        allowable_pa: setup.duty.allowable_stress,
        within: setup
            .duty
            .allowable_stress
            .map(|allowable| stress_pa <= allowable),
    }
}
