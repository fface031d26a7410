//! The limits of the usable deflection, each from the model it belongs to.

use super::events::EventKind;
use super::imperfect::Imperfect;
use super::straight::{Critical, is_beyond_solid, seat_compliance};
use crate::result::{ImperfectColumn, Limit, StressAtSolid};
use crate::setup::{LimitKind, Loading, Setup};
use crate::spring::{Wire, compressed_radius, torsion_stress};

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
    let mut kinds = vec![
        LimitKind::Bow,
        LimitKind::RateLost,
        LimitKind::Stress,
        LimitKind::Clash,
    ];
    kinds.push(match setup.duty.loading {
        Loading::Force => LimitKind::DeadLoadLost,
        Loading::Deflection => LimitKind::TravelLost,
    });
    limits.extend(
        kinds
            .into_iter()
            .map(|kind| path_limit(setup, imperfect, kind)),
    );
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
        share_of_free_length: deflection_m.map(|d| d / setup.spring.free_length),
        force_n: reached.map(|r| r.1),
        margin: deflection_m.map(|d| d / setup.duty.largest_working_deflection() - 1.0),
        required_margin: setup.duty.margins.of(name),
        error_m: reached.and_then(|r| r.2),
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
fn solid_limit(setup: &Setup, imperfect: &Imperfect) -> Limit {
    let shortening = setup.spring.solid_deflection();
    let by_rate = setup.spring.rate() * shortening;
    let force = imperfect
        .event(EventKind::Limit(LimitKind::Solid))
        .map_or(by_rate, |(event, _)| event.point.force_n);
    limit(
        setup,
        LimitKind::Solid,
        Some((shortening + force * seat_compliance(setup), force, None)),
        setup.spring.solid_rule.to_owned(),
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
        .event(EventKind::Limit(kind))
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
            looked_up_to_m: imperfect.ends_before_solid(setup),
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
    let stress_pa = torsion_stress(
        &spring.wire,
        spring.index(),
        radius,
        spring.rate() * spring.solid_deflection(),
        0.0,
    );
    StressAtSolid {
        stress_pa,
        allowable_pa: setup.duty.allowable_stress,
        within: setup
            .duty
            .allowable_stress
            .map(|allowable| stress_pa <= allowable),
    }
}

/// What a reader must know of the models used on this case.
pub(super) fn assumptions(
    setup: &Setup,
    column: Option<&ImperfectColumn>,
    imperfect: &Imperfect,
) -> Vec<String> {
    let mut notes = Vec::new();
    let true_seats = [&setup.bottom, &setup.top]
        .iter()
        .all(|support| support.tilt == 0.0 && support.offset == 0.0);
    if setup.imperfections.is_perfect() && true_seats {
        notes.push(
            "No imperfection is given: the imperfect column is the perfect one on its branch. A \
             real spring bows earlier."
                .to_owned(),
        );
    }
    if setup.spring.active_coils < 5.0 {
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
    if let Some(share) = imperfect.knocked_over_from(setup) {
        let what = match setup.duty.loading {
            Loading::Force => "load",
            Loading::Deflection => "travel",
        };
        notes.push(format!(
            "From {:.1} % of the lost {what} on, a bowed state stands beside the one the spring is \
             in: a knock can throw it over before the {what} is lost.",
            100.0 * share
        ));
    }
    if let Some(column) = column
        && let Some(sign) = &column.worse_parallelism_sign
    {
        notes.push(format!(
            "Both signs of the parallelism deviation were tried at the top; {sign} is the worse \
             and is shown."
        ));
    }
    notes
}
