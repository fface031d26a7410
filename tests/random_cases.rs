//! Random springs in random supports, with random imperfections: each ends in an answer with an
//! error estimate, and the straight column agrees with the closed form wherever that is exact.

use coilstay::assess::assess;
use coilstay::result::{Assessment, Verdict};
use coilstay::setup::{BowShape, Loading, Restraint, Setup, Support, TopPosition};
use proptest::prelude::*;

mod fixture;

/// A number between `low` and `high`, evenly in its logarithm.
fn spread(low: f64, high: f64) -> impl Strategy<Value = f64> {
    (low.ln()..high.ln()).prop_map(f64::exp)
}

fn sometimes(values: impl Strategy<Value = f64> + 'static) -> impl Strategy<Value = f64> {
    prop_oneof![Just(0.0).boxed(), values.boxed()]
}

fn support() -> impl Strategy<Value = Support> {
    let elastic = (spread(1e-2, 1e6), spread(1.0, 1e8)).prop_map(|(turn, aside)| Support {
        rotation: Restraint::Elastic(turn),
        sideways: Restraint::Elastic(aside),
        ..Support::clamped()
    });
    let kind = prop_oneof![
        Just(Support::clamped()).boxed(),
        Just(Support::hinged()).boxed(),
        Just(Support::free()).boxed(),
        Just(Support::sliding()).boxed(),
        elastic.boxed(),
    ];
    (
        kind,
        sometimes(-0.01..0.03_f64),
        sometimes(-0.05..0.05_f64),
        sometimes(-0.005..0.005_f64),
        prop::option::weighted(0.2, spread(1e3, 1e7)),
    )
        .prop_map(|(kind, arm, tilt, offset, axial)| Support {
            arm,
            tilt,
            offset,
            axial: axial.map_or(Restraint::Held, Restraint::Elastic),
            ..kind
        })
}

fn random_case() -> impl Strategy<Value = Setup> {
    (
        (spread(1.5, 20.0), 2.0..3.5_f64, support(), support()),
        sometimes(spread(1e-6, 0.1)),
        sometimes(spread(1e-6, 0.1)),
        sometimes(spread(1e-7, 0.05)),
        sometimes(spread(1e-6, 0.2)),
        (any::<bool>(), any::<bool>(), any::<bool>(), any::<bool>()),
    )
        .prop_map(
            |((slenderness, ratio, bottom, top), e1, e2, bow, eccentricity, flags)| {
                let mut setup = fixture::setup(slenderness, ratio, bottom, top);
                let spring = &mut setup.spring;
                if flags.0 {
                    spring.total_coils += 2.0;
                    spring.solid_length += 2.0 * spring.wire.axial_size();
                }
                let (length, diameter) = (spring.free_length, spring.mean_diameter);
                let sizes = &mut setup.imperfections;
                sizes.squareness = e1 * length;
                sizes.parallelism = e2 * diameter;
                sizes.bow = bow * length;
                sizes.eccentricity = eccentricity * diameter;
                if flags.1 {
                    sizes.bow_shape = BowShape::FirstMode;
                }
                if flags.2 {
                    sizes.top_position = TopPosition::Landed;
                }
                if flags.3 {
                    setup.duty.loading = Loading::Force;
                }
                setup.duty.allowable_stress = Some(1e9);
                let working = 0.3 * setup.spring.solid_deflection();
                setup.duty.working_deflection = working;
                if setup.duty.loading == Loading::Force {
                    let soft =
                        1.0 / setup.bottom.axial.stiffness() + 1.0 / setup.top.axial.stiffness();
                    setup.duty.working_force = Some(working / (1.0 / setup.spring.rate() + soft));
                }
                setup
            },
        )
        .prop_filter("held, and longer than solid", |setup| {
            setup.is_held() && setup.spring.free_length > 1.1 * setup.spring.solid_length
        })
}

fn check(setup: &Setup, answer: &Assessment) -> Result<(), TestCaseError> {
    prop_assert!(answer.failures.is_empty(), "{:?}", answer.failures);
    prop_assert!(answer.governing.is_some());
    prop_assert!(answer.verdict != Verdict::Undecided, "{}", answer.sentence);
    let length = setup.spring.free_length;
    for limit in answer.limits.iter().filter(|limit| !limit.beyond_solid) {
        let Some(deflection) = limit.deflection_m else {
            continue;
        };
        prop_assert!(deflection.is_finite() && deflection >= 0.0, "{limit:?}");
        if let Some(error) = limit.error_m {
            prop_assert!(error >= 0.0 && error < 1e-3 * length, "{limit:?}");
        }
    }
    for comparison in &answer.comparisons {
        // 0.7 and 0.707 are not exact; the other constants are.
        if [0.5, 1.0, 2.0].contains(&comparison.end_constant)
            && let Some(difference) = comparison.relative_difference
        {
            prop_assert!(difference.abs() < 1e-8, "{}", comparison.sentence);
        }
    }
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(40))]
    #[test]
    fn every_valid_case_is_answered(setup in random_case()) {
        check(&setup, &assess(&setup, "random"))?;
    }
}

/// The spring with its seats stood on its head: bottom and top change places.
fn turned_over(setup: &Setup) -> Setup {
    Setup {
        bottom: setup.top,
        top: setup.bottom,
        ..setup.clone()
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(12))]
    #[test]
    fn turning_spring_and_seats_over_changes_nothing(setup in random_case()) {
        // A top that stays where it lands is a matter of which end is the top; and an axis that
        // stands oblique moves sideways as it shortens, towards the end that stands.
        let mut setup = setup;
        setup.imperfections.top_position = TopPosition::Piloted;
        (setup.bottom.offset, setup.top.offset) = (0.0, 0.0);
        let (one, other) = (assess(&setup, ""), assess(&turned_over(&setup), ""));
        prop_assert_eq!(one.verdict, other.verdict);
        let length = setup.spring.free_length;
        for limit in &one.limits {
            let same = other.limits.iter().find(|l| l.name == limit.name);
            // Where a path bowed far over ends, a step more or less finds a limit or not.
            if limit.looked_up_to_m.or(same.and_then(|l| l.looked_up_to_m)).is_some() {
                continue;
            }
            let at = |d: Option<f64>| d.unwrap_or(f64::NAN);
            let (a, b) = (at(limit.deflection_m), at(same.and_then(|l| l.deflection_m)));
            let error = limit.error_m.unwrap_or(0.0) + 1e-8 * length;
            prop_assert!(
                (a - b).abs() <= error || (a.is_nan() && b.is_nan()) || limit.beyond_solid,
                "{} {} {}", limit.name.key(), a, b
            );
        }
    }
}

/// A way for the deviations to lie whose path is lost far beyond what is asked must not hide a worse
/// one: where lean and wedge just cancel at one end, the answer is that of a hair beside it.
#[test]
fn a_path_lost_far_out_hides_no_worse_one() {
    let margin = |parallelism: f64| {
        let text = format!(
            r#"
            [spring]
            wire = "8 mm"
            mean_diameter = "62 mm"
            free_length = "620 mm"
            active_coils = 20
            total_coils = 22
            [material]
            name = "patented-carbon-steel"
            [bottom]
            kind = "clamped"
            [top]
            kind = "elastic"
            rotational_stiffness = "rigid"
            sideways_stiffness = "1.5 N/mm"
            [imperfections]
            squareness = "10 mm"
            parallelism = "{parallelism} mm"
            [duty]
            working_deflection = "50 mm"
            "#
        );
        let case = coilstay::case::parse("lean.toml", &text).expect("reads");
        let answer = assess(&case.setup, "");
        let governing = answer.limits.iter().find(|limit| limit.governs);
        governing.and_then(|limit| limit.margin).expect("governed")
    };
    let cancelling = 2.0 * 10.0 * 70.0 / 620.0;
    let (at, beside) = (margin(cancelling), margin(cancelling - 1e-4));
    assert!((at - beside).abs() < 1e-4, "{at} {beside}");
}
