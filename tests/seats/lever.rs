//! A seat that moves aside and turns as it travels, against shooting with the end held where the seat has
//! put it.

use crate::fixture::setup;
use crate::flat::{flat, shot};
use crate::reference::shooting::{Parameter, Problem, Rod, Seat};
use crate::walk::{Point, Walk, assert_same};
use coilstay::setup::{Curve, LeverArc, Motion, Setup, Support};

const ELEMENTS: usize = 32;

/// A bowed spring between a clamped end and one on a lever, which is out of true as built by `tilt` and
/// `offset` in L. `arm` is the lever's pivot from the seat, along and across, in L.
fn case(arm: [f64; 2], tilt: f64, offset: f64) -> Setup {
    let mut case = setup(4.0, 2.6, Support::clamped(), Support::clamped());
    let length = case.spring.free_length;
    case.imperfections.bow = 0.005 * length;
    case.top = Support {
        tilt,
        offset: offset * length,
        motion: Some(Motion::Lever(LeverArc {
            along: arm[0] * length,
            across: arm[1] * length,
        })),
        ..Support::clamped()
    };
    case
}

/// Where a lever's arc has brought the seat after the travel `s`: aside, turned and the rates of both, by
/// turning the arm (a, b) by ψ about the pivot, a cos ψ − b sin ψ = a + s, found by bisection.
fn arc([a, b]: [f64; 2], s: f64) -> ([f64; 2], [f64; 2]) {
    let fallen = |turn: f64| (a * turn.cos() - b * turn.sin() - a - s) * -b.signum();
    let turn = crate::reference::root::bisect(
        |turn| fallen(-b.signum() * turn),
        -0.5,
        std::f64::consts::FRAC_PI_2 - (a / b.abs()).atan(),
    ) * -b.signum();
    let (sin, cos) = turn.sin_cos();
    // ds/dψ and dv/dψ.
    let (fall, aside) = (-a * sin - b * cos, -a * cos + b * sin);
    ([b - a * sin - b * cos, turn], [aside / fall, 1.0 / fall])
}

const CASES: [([f64; 2], f64, f64); 5] = [
    ([0.0, 0.8], 0.0, 0.0),
    ([0.1, -1.2], 0.0, 0.0),
    ([-0.15, 1.0], 0.02, 0.01),
    ([0.0, -0.7], -0.03, 0.0),
    ([0.2, 1.5], 0.0, -0.02),
];

/// At each travel the column carries what it carries when its end is held in that pose, as built and by
/// travel added up; and the load is the one the seat's own travel works against,
/// λ = P + H dv/ds + M dτ/ds.
#[test]
fn the_end_is_held_where_the_lever_has_put_it() {
    for (arm, tilt, offset) in CASES {
        let walk = Walk::to(&case(arm, tilt, offset), ELEMENTS, 0.42);
        let problem = |s: f64| {
            let ([aside, turn], _) = arc(arm, s);
            Problem {
                rod: Rod::of_spring(2.6, 4.0).bowed(0.005),
                bottom: Seat::CLAMPED,
                top: Seat {
                    angle: tilt + turn,
                    offset: offset + aside,
                    ..Seat::CLAMPED
                },
            }
        };
        let mut state = problem(0.0).unloaded().expect("unloaded");
        for i in 1..=20 {
            let travel = 0.02 * f64::from(i);
            state = problem(travel)
                .follow(Parameter::Travel, &[travel], &state)
                .expect("follows")[0];
            state = problem(travel)
                .solve(Parameter::Travel, travel, &state)
                .expect("found");
            let point = walk.at(travel);
            let (_, [aside, turn]) = arc(arm, travel);
            let [bottom, top] = walk.moments(&point.state);
            let load = state.load + aside * state.side_force + turn * state.pivot_moments[1];
            let press = walk.presses(&point.state);
            let angle = state.top.theta;
            assert_same(
                &format!("{arm:?}, s = {travel}"),
                1e-11,
                &[
                    ("load", walk.load(&point), load),
                    ("P", -point.state.inner[0][3] * walk.force, state.load),
                    ("H", walk.side_force(&point.state), state.side_force),
                    ("bottom moment", bottom, state.pivot_moments[0]),
                    ("top moment", top, state.pivot_moments[1]),
                    // In the frame of the seat as it stands then, its tilt as built included.
                    (
                        "thrust",
                        press[1].thrust * walk.force,
                        state.side_force * angle.cos() + state.load * angle.sin(),
                    ),
                    (
                        "press",
                        press[1].press * walk.force,
                        state.load * angle.cos() - state.side_force * angle.sin(),
                    ),
                ],
            );
        }
    }
}

/// The work of the load over the seat's travel is what the column stores.
#[test]
fn the_load_works_on_the_travel() {
    for (arm, tilt, offset) in CASES {
        let mut walk = Walk::new(&case(arm, tilt, offset), ELEMENTS);
        walk.go_on(0.42, 0.01);
        let stored = walk.energy(walk.last()) - walk.energy(&walk.points[0]);
        assert!(
            (walk.work() - stored).abs() < 1e-9,
            "{} {stored}",
            walk.work()
        );
    }
}

/// A flat end on a lever rocks on the seat as it stands then.
#[test]
fn a_flat_end_rocks_on_a_lever() {
    let arm = [0.05, 1.0];
    let mut case = setup(5.0, 2.6, flat(0.5, 0.0), flat(0.1, 0.01));
    let length = case.spring.free_length;
    case.imperfections.bow = 0.005 * length;
    case.top.motion = Some(Motion::Lever(LeverArc {
        along: arm[0] * length,
        across: arm[1] * length,
    }));
    let walk = Walk::to(&case, ELEMENTS, 0.3);
    let mut rocked = 0;
    for i in 1..=10 {
        let travel = 0.028 * f64::from(i);
        let ([aside, turn], _) = arc(arm, travel);
        let mut there = case.clone();
        there.top.motion = None;
        there.top.tilt += turn;
        there.top.offset += aside * length;
        let mut column = shot(&there);
        let start = column.start(1e-3).expect("starts");
        let state = column
            .follow(Parameter::Travel, travel, &start)
            .expect("follows");
        let point = walk.at(travel);
        let presses = walk.presses(&point.state);
        rocked += usize::from(presses[1].turned != 0.0);
        let moments = walk.moments(&point.state);
        assert_same(
            &format!("s = {travel}"),
            1e-11,
            &[
                (
                    "P",
                    -point.state.inner[0][3] * walk.force,
                    state.column.load,
                ),
                ("H", walk.side_force(&point.state), state.column.side_force),
                ("bottom opening", presses[0].turned, state.opening[0]),
                ("top opening", presses[1].turned, state.opening[1]),
                ("bottom moment", moments[0], state.moment[0]),
                ("top moment", moments[1], state.moment[1]),
            ],
        );
    }
    assert!((3..9).contains(&rocked), "{rocked}");
}

/// A flat end that rocks on a lever takes no energy and gives none.
#[test]
fn rocking_on_a_lever_stores_what_is_put_in() {
    for across in [0.8, -1.0] {
        let mut case = setup(6.0, 2.6, flat(0.3, 0.01), flat(0.3, 0.0));
        let length = case.spring.free_length;
        case.imperfections.bow = 0.005 * length;
        case.top.motion = Some(Motion::Lever(LeverArc {
            along: 0.02,
            across: across * length,
        }));
        let mut walk = Walk::new(&case, ELEMENTS);
        walk.go_on(0.25, 0.002);
        let rocks = |point: &&Point| walk.presses(&point.state)[1].turned != 0.0;
        let rocked = walk.points.iter().filter(rocks).count();
        assert!(rocked > 20, "{rocked} of {}", walk.points.len());
        let stored = walk.energy(walk.last()) - walk.energy(&walk.points[0]);
        assert!(
            (walk.work() - stored).abs() < 1e-7,
            "{} {stored}",
            walk.work()
        );
    }
}

/// A lever with a long arm at right angles moves its seat straight: what is left falls with the arm.
#[test]
fn a_long_lever_moves_its_seat_straight() {
    let straight = Setup {
        top: Support::clamped(),
        ..case([0.0, 1.0], 0.0, 0.0)
    };
    let straight = Walk::to(&straight, ELEMENTS, 0.4);
    let want = straight.at(0.35);
    let mut before = f64::INFINITY;
    for across in [1e2, 1e3, 1e4, 1e5] {
        let walk = Walk::to(&case([0.0, across], 0.0, 0.0), ELEMENTS, 0.4);
        let point = walk.at(0.35);
        let aside = (walk.moments(&point.state)[1] - straight.moments(&want.state)[1]).abs();
        assert!(aside < 0.11 * before, "{across}: {aside} {before}");
        before = aside;
    }
    assert!(before < 1e-6, "{before}");
}

/// The arc of a lever given as a table is the lever, but for what the table leaves out between its
/// points.
#[test]
fn a_table_of_the_arc_is_the_lever() {
    let arm = [0.1, 1.0];
    let lever = case(arm, 0.01, 0.0);
    let length = lever.spring.free_length;
    let exact = Walk::to(&lever, ELEMENTS, 0.42);
    let mut errors = Vec::new();
    for count in [6_u32, 12, 24] {
        let points = |k: usize, unit: f64| -> Curve {
            let points: Vec<(f64, f64)> = (0..count)
                .map(|i| {
                    let s = 0.45 * f64::from(i) / f64::from(count - 1);
                    (s * length, arc(arm, s).0[k] * unit)
                })
                .collect();
            Curve::through(&points).expect("rises")
        };
        let mut table = lever.clone();
        table.top.motion = Some(Motion::Table {
            offset: points(0, length),
            tilt: points(1, 1.0),
        });
        let walk = Walk::to(&table, ELEMENTS, 0.42);
        let worst = (1..20)
            .map(|i| {
                let travel = 0.021 * f64::from(i);
                let (one, two) = (walk.at(travel), exact.at(travel));
                (walk.moments(&one.state)[1] - exact.moments(&two.state)[1]).abs()
            })
            .fold(0.0, f64::max);
        errors.push(worst);
    }
    for pair in errors.windows(2) {
        assert!(pair[1] < 0.3 * pair[0], "{errors:?}");
    }
    assert!(errors[2] < 1e-5, "{errors:?}");
}
