//! Paths of imperfect columns in their supports, through and past the bow-out, against shooting:
//! another formulation (stiffnesses, not compliances), another method, an integrator of a general
//! crate at 1e-13.

mod fixture;
mod reference;

use coilstay::assess::assess;
use coilstay::column::{Column, Deviations, Idealisation};
use coilstay::setup::{Orientation, Restraint, Setup, Support, TopPosition};
use coilstay::solve::{Newton, Outcome, PathSettings, follow, start};
use fixture::setup;
use reference::shooting::{Parameter, Problem, Rod, Seat, State};

const ELEMENTS: usize = 32;
/// Points of a path that are compared.
const POINTS: usize = 10;
/// Agreement asked for, of lengths in L, forces in kL, angles in rad.
const CLOSE: f64 = 1e-8;

/// The same problem for shooting, in L = 1 and k = 1.
fn problem(setup: &Setup) -> Problem {
    let (spring, imperfections) = (&setup.spring, &setup.imperfections);
    let length = spring.deformable_length();
    let (rate, dead) = (spring.rate(), spring.dead_height() / 2.0);
    let lean = imperfections.squareness / spring.free_length;
    let wedge = imperfections.parallelism / spring.outer_diameter();
    let landed = match imperfections.top_position {
        TopPosition::Piloted => 0.0,
        TopPosition::Landed => imperfections.squareness,
    };
    // An arm stands square on the seat, which leans against the section by `angle`: towards +y
    // below the spring, towards −y above it, for a positive angle.
    let seat = |support: &Support, angle: f64, aside: f64, up: f64| Seat {
        angle: support.tilt + angle,
        offset: (support.offset + aside) / length,
        arm: (dead + support.arm * angle.cos()) / length,
        // The pivot lies to the other side of the axis.
        eccentricity: -(imperfections.eccentricity + up * support.arm * angle.sin()) / length,
        ..Seat::elastic(
            support.rotation.stiffness() / (rate * length * length),
            support.sideways.stiffness() / rate,
        )
    };
    let r = spring.youngs_modulus / spring.shear_modulus;
    Problem {
        rod: Rod::of_spring(r, length / spring.mean_diameter).bowed(imperfections.bow / length),
        bottom: seat(&setup.bottom, lean, 0.0, -1.0),
        top: seat(&setup.top, lean + wedge, landed, 1.0),
    }
}

/// Follows the column's path until it has shortened by `share` of its deformable length and
/// compares points spread evenly over it with the shot state of the same shortening.
fn compare(setup: &Setup, share: f64) {
    let deviations = Deviations {
        sizes: &setup.imperfections,
        orientation: Orientation::plain(),
        mode: None,
    };
    let mut column = Column::of_setup(setup, Idealisation::AsBuilt, ELEMENTS, Some(&deviations));
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let mut points = vec![start(&mut column, &mut newton, &guess, 0.0).expect("unloaded")];
    let mut profile = Vec::new();
    let watched = column.clone();
    let (outcome, _) = follow(
        &mut column,
        &mut newton,
        &mut points,
        &PathSettings::default(),
        |points| {
            watched.profile(&points[points.len() - 1].state, &mut profile);
            1.0 - (profile[profile.len() - 1].x - profile[0].x) > share
        },
    );
    assert_eq!(outcome, Outcome::Stopped);
    assert!(points.len() > 3 * POINTS);
    let problem = problem(setup);
    let mut state = problem.unloaded().expect("unloaded");
    let length = setup.spring.deformable_length();
    let force = column.scale.force / (setup.spring.rate() * length);
    let mut bow = 0.0_f64;
    for i in 0..=POINTS {
        let point = &points[i * (points.len() - 1) / POINTS];
        column.profile(&point.state, &mut profile);
        let last = profile.len() - 1;
        let shortening = 1.0 - (profile[last].x - profile[0].x);
        state = problem
            .follow(Parameter::Shortening, &[shortening], &state)
            .expect("follows")[0];
        let shares: Vec<f64> = profile.iter().map(|station| station.place).collect();
        let stations = problem.profile(&state, &shares);
        let moment = force * column.scale.length / length;
        let actions = column.end_actions(&point.state);
        let tops = [&point.state.nodes[0], &point.state.nodes[ELEMENTS]];
        let mut pairs = vec![
            ("load", point.load * force, state.load),
            ("side", point.state.inner[0][4] * force, state.side_force),
            ("bottom pivot", tops[0][1], state.pivots[0]),
            ("top pivot", tops[1][1], state.pivots[1]),
            ("bottom turn", tops[0][2], state.bottom.theta),
            ("top turn", tops[1][2], state.top.theta),
            (
                "bottom moment",
                -actions[0][2] * moment,
                state.pivot_moments[0],
            ),
            ("top moment", actions[1][2] * moment, state.pivot_moments[1]),
        ];
        for (mine, its) in profile.iter().zip(&stations) {
            pairs.push(("x", mine.x, its.x));
            pairs.push(("y", mine.y, its.y));
            pairs.push(("moment", mine.moment * moment, its.moment));
            bow = bow.max(mine.y.abs());
        }
        // The rotation of a section inside an element is interpolated: one order less.
        for (mine, its) in profile.iter().zip(&stations).step_by(4) {
            pairs.push(("angle", mine.angle, its.theta));
        }
        for (what, mine, its) in pairs {
            assert!(
                (mine - its).abs() < CLOSE,
                "{what} at ξ = {shortening}: {mine} {its}"
            );
        }
    }
    // The comparison went past the bow-out, not along a straight column.
    assert!(bow > 0.05, "{bow}");
}

#[test]
fn clamped_and_tilted() {
    let mut case = setup(7.0, 2.6, Support::clamped(), Support::clamped());
    case.imperfections.squareness = 0.03 * case.spring.free_length;
    case.imperfections.parallelism = 0.02 * case.spring.outer_diameter();
    compare(&case, 0.5);
}

#[test]
fn hinged_and_bowed() {
    let mut case = setup(4.0, 2.6, Support::hinged(), Support::hinged());
    case.imperfections.bow = 0.01 * case.spring.free_length;
    compare(&case, 0.5);
}

#[test]
fn hinged_and_loaded_off_its_axis() {
    let mut case = setup(4.0, 206.0 / 81.5, Support::hinged(), Support::hinged());
    case.imperfections.eccentricity = 0.05 * case.spring.mean_diameter;
    compare(&case, 0.5);
}

#[test]
fn clamped_and_sliding() {
    let mut case = setup(3.5, 2.6, Support::clamped(), Support::sliding());
    case.imperfections.squareness = 0.02 * case.spring.free_length;
    compare(&case, 0.5);
}

#[test]
fn clamped_and_hinged_and_bowed() {
    let mut case = setup(5.0, 2.6, Support::clamped(), Support::hinged());
    case.imperfections.bow = 0.01 * case.spring.free_length;
    compare(&case, 0.5);
}

#[test]
fn elastic_in_rotation() {
    let mut case = setup(5.0, 2.6, Support::clamped(), Support::clamped());
    let unit = case.spring.rate() * case.spring.free_length.powi(2);
    case.bottom.rotation = Restraint::Elastic(0.02 * unit);
    case.top.rotation = Restraint::Elastic(0.05 * unit);
    case.imperfections.squareness = 0.03 * case.spring.free_length;
    compare(&case, 0.5);
}

/// Everything at once: dead coils, arms, soft seats, offset, tilt, bow, eccentricity, a top that
/// stays where it lands.
#[test]
fn everything_together() {
    let mut case = setup(6.0, 2.6, Support::clamped(), Support::clamped());
    case.spring.total_coils = 11.0;
    case.spring.solid_length = 11.0 * 0.006;
    let (rate, length) = (case.spring.rate(), case.spring.free_length);
    case.bottom = Support {
        rotation: Restraint::Elastic(0.03 * rate * length * length),
        sideways: Restraint::Elastic(1.5 * rate),
        arm: 0.006,
        tilt: 0.01,
        ..Support::clamped()
    };
    case.top = Support {
        rotation: Restraint::Elastic(0.01 * rate * length * length),
        arm: -0.002,
        offset: 0.003,
        ..Support::clamped()
    };
    case.imperfections.squareness = 0.03 * length;
    case.imperfections.parallelism = -0.02 * case.spring.outer_diameter();
    case.imperfections.bow = 0.004 * length;
    case.imperfections.eccentricity = 0.002;
    case.imperfections.top_position = TopPosition::Landed;
    compare(&case, 0.5);
}

/// What `assess` reports of a path: force, rotations, bow from the unloaded state, and the slope
/// of the path, which a difference of shot loads gives too.
#[test]
fn assess_reports_the_same_path() {
    let mut case = setup(4.0, 2.6, Support::hinged(), Support::hinged());
    case.imperfections.bow = 0.005 * case.spring.free_length;
    case.imperfections.eccentricity = 0.01 * case.spring.mean_diameter;
    let column = assess(&case, "").imperfect_column.expect("has a path");
    let problem = problem(&case);
    let start = problem.unloaded().expect("unloaded");
    let (length, rate) = (case.spring.free_length, case.spring.rate());
    let middle = |state: &State| problem.profile(state, &[0.5])[0].y;
    let points = &column.path.points;
    let mut state = start;
    for point in points.iter().skip(1).step_by(points.len() / POINTS) {
        // From the unloaded state, which is a little shorter than a straight column.
        let at = start.travel + point.shortening_m / length;
        let before = state;
        let shot = |share: f64| {
            problem
                .follow(Parameter::Travel, &[share], &before)
                .expect("follows")[0]
        };
        let step = 1e-5;
        let slope = (shot(at + step).load - shot(at - step).load) / (2.0 * step);
        state = shot(at);
        let bow = middle(&state) - middle(&start);
        for (what, mine, its, close) in [
            ("force", point.force_n / (rate * length), state.load, CLOSE),
            (
                "bottom",
                point.bottom_rotation_rad,
                state.bottom.theta,
                CLOSE,
            ),
            ("top", point.top_rotation_rad, state.top.theta, CLOSE),
            ("bow", point.bow_m / length, bow.abs(), CLOSE),
            ("lateral", point.lateral_m / length, bow, CLOSE),
            (
                "place",
                point.bow_place * bow.signum(),
                0.5 * bow.signum(),
                CLOSE,
            ),
            ("slope", point.rate_n_per_m / rate, slope, 2e-6),
        ] {
            assert!(
                (mine - its).abs() < close,
                "{what} at ξ = {at}: {mine} {its}"
            );
        }
        assert_eq!(point.deflection_m, point.shortening_m);
    }
    // At the bow limit (0.1 D by default here) the bow is the limit.
    let mark = column.path.marks.iter().find(|mark| mark.name == "bow");
    let bow = mark.expect("is reached").point.bow_m;
    assert!((bow / case.duty.bow_limit - 1.0).abs() < 1e-9);
}

/// Wire stress and first clash of a hinged, bowed spring from statics alone: at mid-height the
/// section stands square to the load, so N = −P, Q = 0 and M = P v, with v the distance of the axis
/// from the line of load, and it is the worst section. So T = P R + P v, the stress is 16 T/(π d³)
/// times the curvature factor (Shigley's, from memory), the curvature is P v/EI and that of the
/// stress-free bow, and coils touch where p(1 − P/EA − R κ) = d. R follows the pitch at constant
/// length of the wire.
#[test]
fn stress_and_clash_are_those_of_the_middle_section() {
    let mut case = setup(4.0, 2.6, Support::hinged(), Support::hinged());
    let height = 1e-4;
    case.imperfections.bow = height;
    case.duty.allowable_stress = Some(900e6);
    let answer = coilstay::assess::assess(&case, "");
    let path = &answer.imperfect_column.as_ref().expect("followed").path;
    let (spring, pi) = (&case.spring, std::f64::consts::PI);
    let (length, wire) = (spring.free_length, spring.wire.axial_size());
    let section = spring.section(length);
    let at = |name: &str| {
        let mark = path.marks.iter().find(|mark| mark.name == name);
        let point = mark.expect("reached").point;
        let open = 1.0 - point.force_n / section.axial;
        let turn = (spring.mean_diameter * pi).hypot(spring.pitch());
        let radius = (turn.powi(2) - (open * spring.pitch()).powi(2)).sqrt() / (2.0 * pi);
        // The bow is counted from the unloaded axis, which stands `height` off the line of load.
        (point, point.force_n, open, radius, point.bow_m + height)
    };
    for name in ["stress", "bow", "clash"] {
        let (point, force, _, radius, aside) = at(name);
        let factor = (spring.index() + 0.5) / (spring.index() - 0.75);
        let stress = 16.0 * force * (radius + aside) / (pi * wire.powi(3)) * factor;
        assert!(
            (point.wire_stress_pa / stress - 1.0).abs() < CLOSE,
            "{name}"
        );
    }
    let (_, force, open, radius, aside) = at("clash");
    let curvature = force * aside / section.bending + height * (pi / length).powi(2);
    let inside = spring.pitch() * (open - radius * curvature);
    assert!((inside / wire - 1.0).abs() < 1e-7, "{inside} {wire}");
    let stress = at("stress").0.wire_stress_pa;
    assert!((stress / 900e6 - 1.0).abs() < 1e-9, "{stress}");
}
