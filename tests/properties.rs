//! What must hold for every column: its mirror image, its units, its stiffer supports.

mod fixture;

use approx::assert_relative_eq;
use coilstay::assess::assess;
use coilstay::column::{Column, Deviations, Idealisation, StraightScan};
use coilstay::result::Assessment;
use coilstay::setup::{Loading, Orientation, Restraint, Setup, Support, TopPosition};
use coilstay::solve::{Newton, PathSettings, follow, start};
use coilstay::spring::Wire;
use fixture::setup;
use proptest::prelude::*;

/// A support of any stiffness, from a spread of exponents; 0 and ∞ included.
fn stiffness(unit: f64) -> impl Strategy<Value = Restraint> {
    prop_oneof![
        1 => Just(Restraint::Held),
        1 => Just(Restraint::Free),
        3 => (-2.0..2.0_f64).prop_map(move |p| Restraint::Elastic(unit * 10.0_f64.powf(p))),
    ]
}

fn support() -> impl Strategy<Value = Support> {
    // Units: EI/L and EI/L³ of a middling case of the fixture.
    (
        stiffness(4.0),
        stiffness(100.0),
        -0.004..0.01_f64,
        -0.02..0.02_f64,
        -0.002..0.002_f64,
    )
        .prop_map(|(rotation, sideways, arm, tilt, offset)| Support {
            rotation,
            sideways,
            arm,
            tilt,
            offset,
            ..Support::clamped()
        })
}

/// An imperfect spring in any supports that hold it.
fn case() -> impl Strategy<Value = Setup> {
    (
        2.8..9.0_f64,
        2.2..3.0_f64,
        support(),
        support(),
        (
            -0.03..0.03_f64,
            -0.03..0.03_f64,
            -0.02..0.02_f64,
            -0.05..0.05_f64,
        ),
        any::<bool>(),
    )
        .prop_map(|(slenderness, r, bottom, top, sizes, landed)| {
            let mut case = setup(slenderness, r, bottom, top);
            case.spring.total_coils = 11.0;
            case.spring.solid_length = 11.0 * 0.006;
            case.imperfections.squareness = sizes.0 * case.spring.free_length;
            case.imperfections.parallelism = sizes.1 * case.spring.mean_diameter;
            case.imperfections.bow = sizes.2 * case.spring.free_length;
            case.imperfections.eccentricity = sizes.3 * case.spring.mean_diameter;
            if landed {
                case.imperfections.top_position = TopPosition::Landed;
            }
            case
        })
        .prop_filter("holds the spring", Setup::is_held)
}

/// The same case seen from the other side.
fn mirrored(case: &Setup) -> Setup {
    let mut other = case.clone();
    for support in [&mut other.bottom, &mut other.top] {
        support.tilt = -support.tilt;
        support.offset = -support.offset;
    }
    let sizes = &mut other.imperfections;
    sizes.squareness = -sizes.squareness;
    sizes.parallelism = -sizes.parallelism;
    sizes.bow = -sizes.bow;
    sizes.eccentricity = -sizes.eccentricity;
    other
}

/// The same case with lengths and forces in other units.
fn rescaled(case: &Setup, length: f64, force: f64) -> Setup {
    let mut other = case.clone();
    let spring = &mut other.spring;
    if let Wire::Round { diameter } = &mut spring.wire {
        *diameter *= length;
    }
    spring.mean_diameter *= length;
    spring.free_length *= length;
    spring.solid_length *= length;
    let pressure = force / length.powi(2);
    spring.youngs_modulus *= pressure;
    spring.shear_modulus *= pressure;
    for support in [&mut other.bottom, &mut other.top] {
        let scaled = |restraint: Restraint, factor: f64| {
            Restraint::from_stiffness(restraint.stiffness() * factor)
        };
        support.rotation = scaled(support.rotation, force * length);
        support.sideways = scaled(support.sideways, force / length);
        support.axial = scaled(support.axial, force / length);
        support.arm *= length;
        support.offset *= length;
    }
    let sizes = &mut other.imperfections;
    sizes.squareness *= length;
    sizes.parallelism *= length;
    sizes.bow *= length;
    sizes.eccentricity *= length;
    let duty = &mut other.duty;
    duty.installed_deflection *= length;
    duty.working_deflection *= length;
    duty.working_tolerance *= length;
    duty.overtravel *= length;
    duty.bow_limit *= length;
    duty.working_force = duty.working_force.map(|f| f * force);
    duty.allowable_stress = duty.allowable_stress.map(|s| s * pressure);
    other
}

/// First points of the imperfect path: load, and (x, y, θ) of every node, in the column's units.
fn path(case: &Setup) -> Vec<(f64, Vec<[f64; 3]>)> {
    let deviations = Deviations {
        sizes: &case.imperfections,
        orientation: Orientation::plain(),
        mode: None,
    };
    let mut column = Column::of_setup(case, Idealisation::AsBuilt, 12, Some(&deviations));
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let Ok(first) = start(&mut column, &mut newton, &guess, 0.0) else {
        return Vec::new();
    };
    let mut points = vec![first];
    let settings = PathSettings {
        most_points: 40,
        ..PathSettings::default()
    };
    follow(&mut column, &mut newton, &mut points, &settings, |_| false);
    points
        .iter()
        .map(|point| {
            let nodes = point.state.nodes.iter().map(|n| [n[0], n[1], n[2]]);
            (point.load, nodes.collect())
        })
        .collect()
}

fn critical(case: &Setup) -> f64 {
    let mut column = Column::of_setup(case, Idealisation::AsBuilt, 12, None);
    StraightScan::new(&mut column)
        .buckling()
        .map_or(f64::INFINITY, |b| b.shortening)
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 40,
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    /// Mirrored, everything sideways changes its sign and nothing else anything: to the last bit.
    #[test]
    fn the_mirror_image_answers_mirrored(case in case()) {
        let (plain, other) = (path(&case), path(&mirrored(&case)));
        prop_assert!(plain.len() > 10);
        prop_assert_eq!(plain.len(), other.len());
        for ((load, nodes), (its_load, its_nodes)) in plain.iter().zip(&other) {
            prop_assert_eq!(load, its_load);
            for (a, b) in nodes.iter().zip(its_nodes) {
                prop_assert_eq!([a[0], a[1], a[2]], [b[0], -b[1], -b[2]]);
            }
        }
        prop_assert_eq!(critical(&case), critical(&mirrored(&case)));
    }

    /// Units do not matter: inches for millimetres, pounds for newtons.
    #[test]
    fn units_do_not_matter_to_the_path(case in case()) {
        let (plain, other) = (path(&case), path(&rescaled(&case, 25.4, 4.448)));
        prop_assert!(plain.len() > 10);
        let (unit, its) = (critical(&case), critical(&rescaled(&case, 25.4, 4.448)));
        prop_assert!(unit == its || (unit / its - 1.0).abs() < 1e-10, "{unit} {its}");
        // Round-off may decide where the next point lies: compare as far as the steps are the same.
        let mut same = 0;
        for ((load, nodes), (its_load, its_nodes)) in plain.iter().zip(&other) {
            if (load - its_load).abs() > 1e-9 * (1.0 + load.abs()) {
                break;
            }
            for (a, b) in nodes.iter().zip(its_nodes) {
                for k in 0..3 {
                    prop_assert!((a[k] - b[k]).abs() < 1e-8, "{a:?} {b:?}");
                }
            }
            same += 1;
        }
        prop_assert!(same > 10, "{same}");
    }

    /// A stiffer support never lowers the straight column's critical deflection.
    #[test]
    fn a_stiffer_support_never_lowers_the_critical_deflection(
        case in case(),
        which in 0..4_usize,
        power in 0.0..4.0_f64,
    ) {
        let factor = 10.0_f64.powf(power);
        let mut stiffer = case.clone();
        let end = if which < 2 { &mut stiffer.bottom } else { &mut stiffer.top };
        let (restraint, unit) = if which % 2 == 0 {
            (&mut end.rotation, 0.1)
        } else {
            (&mut end.sideways, 10.0)
        };
        *restraint = match *restraint {
            Restraint::Free => Restraint::Elastic(unit * factor),
            Restraint::Elastic(k) => Restraint::Elastic(k * factor),
            other => other,
        };
        let (soft, hard) = (critical(&case), critical(&stiffer));
        prop_assert!(hard >= soft * (1.0 - 1e-9), "{soft} {hard}");
    }
}

fn demanding(loading: Loading) -> Setup {
    let mut case = setup(6.0, 206.0 / 81.5, Support::clamped(), Support::clamped());
    case.spring.total_coils = 11.0;
    case.spring.solid_length = 11.0 * 0.006;
    case.imperfections.squareness = 0.02 * case.spring.free_length;
    case.imperfections.parallelism = 0.01 * case.spring.mean_diameter;
    case.imperfections.eccentricity = 0.01 * case.spring.mean_diameter;
    case.top.rotation = Restraint::Elastic(20.0);
    case.top.sideways = Restraint::Elastic(8e3);
    case.top.axial = Restraint::Elastic(2e5);
    case.top.arm = 0.003;
    case.duty.allowable_stress = Some(600e6);
    case.duty.loading = loading;
    case
}

/// Dimensionless results of an assessment.
fn numbers(answer: &Assessment, force: f64) -> Vec<(String, f64)> {
    let mut numbers = Vec::new();
    let mut add = |name: String, value: Option<f64>| {
        numbers.push((name, value.unwrap_or(-1.0)));
    };
    for limit in &answer.limits {
        add(format!("{:?}", limit.name), limit.share_of_free_length);
        add(format!("{:?} margin", limit.name), limit.margin);
        add(
            format!("{:?} force", limit.name),
            limit.force_n.map(|f| f / force),
        );
    }
    let length = answer.spring.free_length_m;
    let straight = &answer.straight_column;
    add(
        "straight".into(),
        straight.critical_deflection_m.map(|s| s / length),
    );
    add(
        "straight force".into(),
        straight.critical_force_n.map(|f| f / force),
    );
    for curve in &answer.closed_form.curves {
        add(
            "formula".into(),
            curve.critical_deflection_m.map(|s| s / length),
        );
    }
    let stability = &answer.absolute_stability;
    add(
        "stable below".into(),
        stability.column_below_m.map(|l| l / length),
    );
    if let Some(dead) = &answer.dead_load {
        add(
            "rests".into(),
            dead.rests_at_deflection_m.map(|s| s / length),
        );
        add(
            "freed".into(),
            dead.energy_freed_j.map(|e| e / (force * length)),
        );
    }
    let column = answer.imperfect_column.as_ref().expect("has a path");
    add("bow".into(), column.bow_at_working_m.map(|b| b / length));
    add(
        "southwell".into(),
        column.southwell.map(|s| s.deflection_m / length),
    );
    numbers
}

/// A whole assessment in other units gives the same dimensionless results, and the mirror image
/// the same results with the worse side of the parallelism deviation changed.
#[test]
fn assessments_do_not_depend_on_units_or_side() {
    for loading in [Loading::Deflection, Loading::Force] {
        let case = demanding(loading);
        let plain = assess(&case, "");
        assert!(plain.failures.is_empty());
        let (length, force) = (25.4, 4.448_221_615);
        let scaled = assess(&rescaled(&case, length, force), "");
        let unit = case.spring.rate() * case.spring.free_length;
        let mine = numbers(&plain, unit);
        let reached = mine.iter().filter(|(_, value)| *value != -1.0).count();
        assert!(reached >= 18, "{mine:?}");
        for ((name, a), (its_name, b)) in mine.iter().zip(numbers(&scaled, unit * force)) {
            assert_eq!(*name, its_name);
            assert_relative_eq!(*a, b, max_relative = 1e-10);
        }
        assert_eq!(plain.verdict, scaled.verdict);
        assert_eq!(plain.governing, scaled.governing);

        let other = assess(&mirrored(&case), "");
        for ((name, a), (its_name, b)) in mine.iter().zip(numbers(&other, unit)) {
            assert_eq!(*name, its_name);
            assert_relative_eq!(*a, b, max_relative = 1e-12);
        }
        let columns = [&plain, &other].map(|a| a.imperfect_column.as_ref().expect("has a path"));
        let [one, two] = columns;
        assert_eq!(one.path.points.len(), two.path.points.len());
        for (a, b) in one.path.points.iter().zip(&two.path.points) {
            assert_eq!(a.lateral_m, -b.lateral_m);
            assert_eq!(a.bow_m, b.bow_m);
            assert_eq!(a.top_rotation_rad, -b.top_rotation_rad);
            assert_eq!(a.transverse_force_n, -b.transverse_force_n);
        }
    }
}
