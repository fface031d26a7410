//! Random springs on real seats and in guides: flat ends that can only push, balls with friction, links,
//! levers, rods and bores of any reach, with friction. Each ends in an answer with an error
//! estimate, or says honestly that it could not be decided.

use coilstay::assess::assess;
use coilstay::result::{Assessment, Verdict};
use coilstay::setup::{
    Contact, FixedTo, FlatSeat, Guide, GuideKind, LeverArc, Link, Motion, Setup, Support, Swivel,
};
use proptest::prelude::*;

mod fixture;

/// A number between `low` and `high`, evenly in its logarithm.
fn spread(low: f64, high: f64) -> impl Strategy<Value = f64> {
    (low.ln()..high.ln()).prop_map(f64::exp)
}

fn sometimes(values: impl Strategy<Value = f64> + 'static) -> impl Strategy<Value = f64> {
    prop_oneof![Just(0.0).boxed(), values.boxed()]
}

/// A support of a spring of 50 mm mean diameter.
fn support(top: bool) -> impl Strategy<Value = Support> {
    let flat = (0.6..1.0_f64, prop::option::of(0.05..0.5_f64)).prop_map(|(share, friction)| {
        Support::flat(FlatSeat {
            radius: 0.025,
            ground_share: share,
            friction,
        })
    });
    let ball =
        (0.01..0.4_f64, 0.002..0.02_f64, -0.01..0.02_f64).prop_map(|(friction, radius, arm)| {
            Support {
                contact: Contact::Swivel(Swivel { friction, radius }),
                arm,
                ..Support::hinged()
            }
        });
    let link = (spread(0.02, 1.0), any::<bool>()).prop_map(|(length, hanging)| Support {
        link: Some(Link { length, hanging }),
        ..Support::free()
    });
    let lever =
        (-0.02..0.02_f64, 0.15..0.6_f64, any::<bool>()).prop_map(|(along, across, left)| Support {
            motion: Some(Motion::Lever(LeverArc {
                along,
                across: if left { across } else { -across },
            })),
            ..Support::clamped()
        });
    let plain = prop_oneof![Just(Support::clamped()), Just(Support::hinged())];
    let kind = if top {
        prop_oneof![
            flat.boxed(),
            ball.boxed(),
            link.boxed(),
            lever.boxed(),
            plain.boxed()
        ]
        .boxed()
    } else {
        prop_oneof![2 => flat.boxed(), 1 => ball.boxed(), 2 => plain.boxed()].boxed()
    };
    (kind, sometimes(-0.02..0.02_f64)).prop_map(|(kind, tilt)| Support { tilt, ..kind })
}

/// A guide, its places as shares of the free length.
fn guide() -> impl Strategy<Value = (Guide, f64)> {
    (
        any::<bool>(),
        spread(1e-4, 0.005),
        sometimes(0.02..0.5_f64),
        sometimes(0.02..0.4_f64),
        sometimes(0.1..0.3_f64),
        (
            any::<bool>(),
            prop_oneof![Just(FixedTo::Ground), Just(FixedTo::Bottom)],
        ),
    )
        .prop_map(
            |(rod, clearance, to, friction, from, (allowed, fixed_to))| {
                let guide = Guide {
                    kind: if rod { GuideKind::Rod } else { GuideKind::Bore },
                    diameter: 0.0,
                    fixed_to,
                    from: if to > from + 0.05 { from } else { 0.0 },
                    to: if to > 0.0 { to } else { f64::INFINITY },
                    friction,
                    touching_allowed: allowed,
                };
                (guide, clearance)
            },
        )
}

fn real_case() -> impl Strategy<Value = Setup> {
    (
        (spread(2.0, 9.0), support(false), support(true)),
        prop::option::weighted(0.7, guide()),
        (
            sometimes(spread(1e-4, 0.04)),
            sometimes(spread(1e-4, 0.04)),
            sometimes(spread(1e-5, 0.01)),
        ),
        0.1..0.6_f64,
    )
        .prop_map(
            |((slenderness, bottom, top), guide, (e1, e2, bow), share)| {
                let mut setup = fixture::setup(slenderness, 206.0 / 81.5, bottom, top);
                let spring = &setup.spring;
                let (length, diameter) = (spring.free_length, spring.mean_diameter);
                if let Some((mut guide, clearance)) = guide {
                    guide.diameter = match guide.kind {
                        GuideKind::Rod => spring.inner_diameter() - 2.0 * clearance,
                        GuideKind::Bore => spring.outer_diameter() + 2.0 * clearance,
                    };
                    guide.from *= length;
                    guide.to *= length;
                    setup.guides.push(guide);
                }
                setup.imperfections.squareness = e1 * length;
                setup.imperfections.parallelism = e2 * diameter;
                setup.imperfections.bow = bow * length;
                setup.duty.allowable_stress = Some(1e9);
                setup.duty.working_deflection = share * setup.spring.solid_deflection();
                setup
            },
        )
        .prop_filter("held, longer than solid, lever long enough", |setup| {
            let reach = match setup.top.motion {
                Some(Motion::Lever(arc)) => arc.largest_travel(),
                _ => f64::INFINITY,
            };
            setup.is_held()
                && setup.spring.free_length > 1.1 * setup.spring.solid_length
                && reach > 1.2 * setup.spring.solid_deflection()
        })
}

fn check(setup: &Setup, answer: &Assessment) -> Result<(), TestCaseError> {
    prop_assert!(answer.governing.is_some());
    for limit in answer.limits.iter().filter(|limit| !limit.beyond_solid) {
        let Some(deflection) = limit.deflection_m else {
            continue;
        };
        prop_assert!(deflection.is_finite() && deflection >= -1e-9, "{limit:?}");
        prop_assert!(limit.error_m.is_none_or(|error| error >= 0.0), "{limit:?}");
    }
    if answer.verdict == Verdict::Undecided {
        prop_assert!(answer.undecided_reason.is_some());
        println!("could not be decided: {:?}", answer.failures);
    } else if answer.verdict == Verdict::Holds {
        // A path may be left where it leads nowhere, but not before it is known that all limits hold.
        let last = answer
            .failures
            .iter()
            .map(|failure| failure.last_good_deflection_m);
        let known = last
            .map(|last| last.unwrap_or(0.0))
            .fold(f64::INFINITY, f64::min);
        prop_assert!(
            known >= setup.duty.working_deflection,
            "{:?}",
            answer.failures
        );
    }
    if let Some(stroke) = &answer.stroke {
        let given = -stroke.friction_work_j;
        prop_assert!(
            given <= 1e-6 * stroke.energy_lost_j.abs() + 1e-9,
            "{given:e}"
        );
    }
    Ok(())
}

/// How many; more with `REAL_CASES=200 cargo test --release --test real_cases -- --nocapture`, which
/// also tells of each that could not be decided.
fn cases() -> u32 {
    let given = std::env::var("REAL_CASES").ok();
    given.and_then(|number| number.parse().ok()).unwrap_or(10)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(cases()))]
    #[test]
    fn every_valid_case_is_answered_or_says_why_not(setup in real_case()) {
        check(&setup, &assess(&setup, "random"))?;
    }
}
