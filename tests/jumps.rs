//! The energy a lost load or a lost travel frees, against the area under the load path.

use coilstay::assess::assess;
use coilstay::result::{Assessment, PathPoint};
use coilstay::setup::{Curve, Loading, Restraint, Setup, Support};
use coilstay::spring::Wire;

mod fixture;

/// A hinged spring of thin wire, so that solid is far, with a small bow.
fn case(slenderness: f64, bow: f64, loading: Loading) -> Setup {
    let mut case = fixture::setup(slenderness, 2.6, Support::hinged(), Support::hinged());
    case.spring.wire = Wire::Round { diameter: 0.002 };
    case.spring.solid_length = 0.018;
    case.imperfections.bow = bow;
    case.duty.loading = loading;
    if loading == Loading::Force {
        case.duty.working_force = Some(case.spring.rate() * case.duty.working_deflection);
    }
    case
}

fn mark(answer: &Assessment, name: &str) -> PathPoint {
    let path = &answer.imperfect_column.as_ref().expect("followed").path;
    let found = path.marks.iter().find(|mark| mark.name == name);
    found.unwrap_or_else(|| panic!("{name}")).point
}

/// The path from one mark to another, by the bow, which grows all along.
fn between(answer: &Assessment, from: PathPoint, to: PathPoint) -> Vec<PathPoint> {
    let path = &answer.imperfect_column.as_ref().expect("followed").path;
    let inside = path
        .points
        .iter()
        .filter(|point| point.bow_m > from.bow_m && point.bow_m < to.bow_m);
    std::iter::once(from)
        .chain(inside.copied())
        .chain([to])
        .collect()
}

/// ∫ P ds over the bow b: by parts of the trapezoidal rule with the slopes' end correction where
/// P(s) is a function, dP/ds known at every point.
fn work(points: &[PathPoint]) -> f64 {
    points
        .windows(2)
        .map(|pair| {
            let step = pair[1].shortening_m - pair[0].shortening_m;
            let slopes = pair[0].rate_n_per_m - pair[1].rate_n_per_m;
            0.5 * step * (pair[0].force_n + pair[1].force_n) + step * step * slopes / 12.0
        })
        .sum()
}

/// Under a dead load P the jump frees ∫ (P − P(s)) ds. The path falls and rises again, so the area
/// is a small difference: Λ = 2.85 and 2.9, where P(s) is a function all along.
#[test]
fn a_lost_load_frees_the_area_above_the_path() {
    for (slenderness, bow) in [(2.85, 1e-4), (2.9, 1e-4), (2.9, 1e-5)] {
        let answer = assess(&case(slenderness, bow, Loading::Force), "");
        let load = answer.dead_load.as_ref().expect("dead load");
        let force = load.lost_at_force_n.expect("lost");
        assert!(!load.rests_solid);
        let (from, to) = (
            mark(&answer, "dead_load_lost"),
            mark(&answer, "force_regained"),
        );
        let jump = load.jump_m.expect("jumps");
        let area = force * jump - work(&between(&answer, from, to));
        let freed = load.energy_freed_j.expect("frees");
        assert!((area / freed - 1.0).abs() < 1e-3, "{area} {freed}");
    }
}

/// With the travel held the snap frees −∫ P ds around the loop of the path. P(s) folds there, so
/// the plain trapezoidal rule in the points of the path serves, with its error of second order.
#[test]
fn a_snap_frees_the_loop_of_the_path() {
    for (slenderness, bow) in [(2.70, 1e-6), (2.66, 1e-6)] {
        let answer = assess(&case(slenderness, bow, Loading::Deflection), "");
        let snap = answer.snap.as_ref().expect("snaps");
        let (from, to) = (
            mark(&answer, "travel_lost"),
            mark(&answer, "travel_regained"),
        );
        let points = between(&answer, from, to);
        let area: f64 = points
            .windows(2)
            .map(|pair| {
                let step = pair[1].shortening_m - pair[0].shortening_m;
                -0.5 * step * (pair[0].force_n + pair[1].force_n)
            })
            .sum();
        let freed = snap.energy_freed_j.expect("frees");
        assert!((area / freed - 1.0).abs() < 1e-2, "{area} {freed}");
        assert!(snap.force_after_n.expect("rests") < snap.force_before_n);
    }
}

/// The same loop in the travel of the machine, on a seat whose law stiffens: its energy is freed too.
/// With the travel held, the loop of the spring alone and that of the seat differ.
#[test]
fn a_snap_on_a_stiffening_seat_frees_the_loop_in_the_travel() {
    let mut case = case(2.70, 1e-6, Loading::Deflection);
    let force = 0.6 * case.spring.rate() * case.spring.free_length;
    let law = [(0.0, 0.0), (1e-3, 0.3), (2e-3, 0.9), (3e-3, 2.0)];
    let law = law.map(|(motion, share)| (motion, share * force));
    case.top.axial = Restraint::Progressive(Curve::odd(&law).expect("rises"));
    let answer = assess(&case, "");
    let snap = answer.snap.as_ref().expect("snaps");
    let (from, to) = (
        mark(&answer, "travel_lost"),
        mark(&answer, "travel_regained"),
    );
    let points = between(&answer, from, to);
    let area = |of: fn(&PathPoint) -> f64| -> f64 {
        points
            .windows(2)
            .map(|pair| -0.5 * (of(&pair[1]) - of(&pair[0])) * (pair[0].force_n + pair[1].force_n))
            .sum()
    };
    let freed = snap.energy_freed_j.expect("frees");
    let loop_area = area(|point| point.deflection_m);
    assert!(
        (loop_area / freed - 1.0).abs() < 1e-2,
        "{loop_area} {freed}"
    );
    assert!((area(|point| point.shortening_m) / freed - 1.0).abs() > 0.1);
}

/// Between soft seats a snap can end solid at less shortening than any travel passed: solid then
/// counts as reached where the snap starts, with all that lies in it, and does not govern.
#[test]
fn solid_in_a_snap_is_reached_where_it_starts() {
    let text = r#"
        [spring]
        wire = "2 mm"
        mean_diameter = "12 mm"
        free_length = "33 mm"
        active_coils = 5
        total_coils = 7
        [material]
        name = "patented-carbon-steel"
        [bottom]
        kind = "elastic"
        rotational_stiffness = "600 N m/rad"
        sideways_stiffness = "12 N/mm"
        arm = "-2 mm"
        tilt = "2 deg"
        [top]
        kind = "elastic"
        rotational_stiffness = "0.25 N m/rad"
        sideways_stiffness = "300 N/mm"
        axial_stiffness = "5 N/mm"
        [imperfections]
        parallelism = "0.6 mm"
        [duty]
        working_deflection = "50 mm"
    "#;
    let case = coilstay::case::parse("soft.toml", text).expect("reads");
    let answer = assess(&case.setup, "");
    let snap = answer.snap.as_ref().expect("snaps");
    assert!(snap.rests_solid);
    let solid = answer
        .limits
        .iter()
        .find(|limit| limit.name.key() == "solid")
        .expect("listed");
    assert_eq!(solid.deflection_m, Some(snap.lost_at_deflection_m));
    // Solid, the seat takes up the rest of the travel.
    let rest = snap.lost_at_deflection_m - case.setup.spring.solid_deflection();
    let force = snap.force_after_n.expect("rests");
    assert!((force / (5000.0 * rest) - 1.0).abs() < 1e-9);
    assert!(force < snap.force_before_n);
    assert!(snap.energy_freed_j.expect("frees") > 0.0);
}
