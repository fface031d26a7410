//! A ball with friction at the top against shooting, and its loop.

use crate::fixture::setup;
use crate::reference::shooting::{Rod, Seat, SwivelColumn};
use crate::walk::{Point, Walk, assert_same};
use coilstay::setup::{Contact, Setup, Support, Swivel};

const ELEMENTS: usize = 32;

/// A bowed spring of Λ = 4 and r = 2.6 whose top is on a ball 0.05 L above it; ρ = μ r_ball in L.
fn case(drag: f64) -> Setup {
    let mut case = setup(4.0, 2.6, Support::clamped(), Support::hinged());
    let length = case.spring.free_length;
    case.imperfections.bow = 0.01 * length;
    case.top = Support {
        arm: 0.05 * length,
        contact: Contact::Swivel(Swivel {
            friction: 0.2,
            radius: 5.0 * drag * length,
        }),
        ..Support::hinged()
    };
    case
}

fn shot(drag: f64) -> SwivelColumn {
    let ball = Seat {
        arm: 0.05,
        ..Seat::HINGED
    };
    SwivelColumn::new(
        Rod::of_spring(2.6, 4.0).bowed(0.01),
        Seat::CLAMPED,
        ball,
        drag,
    )
}

/// Moment at the ball in kL².
fn moment(walk: &Walk, point: &Point) -> f64 {
    walk.moments(&point.state)[1]
}

/// Work lost in friction along the points, by trapezoids.
fn lost(walk: &Walk, drag: f64) -> f64 {
    walk.points
        .windows(2)
        .map(|pair| {
            let turn = walk.turns(&pair[1].state)[1] - walk.turns(&pair[0].state)[1];
            drag * 0.5 * (walk.load(&pair[0]) + walk.load(&pair[1])) * turn.abs()
        })
        .sum()
}

/// Step by step the same as shooting, on the way there and back: load, rotation, moment, work lost.
#[test]
fn strokes_meet_shooting() {
    for drag in [0.001, 0.004] {
        let mut walk = Walk::new(&case(drag), ELEMENTS);
        let mut column = shot(drag);
        let mut state = column.unloaded().expect("unloaded");
        let mut taken = 0.0;
        for target in [0.45, 0.05, 0.4] {
            walk.go_on(target, 0.02);
            for point in &walk.points[1..] {
                state = column.step(walk.travel(point), &state).expect("follows");
                assert_same(
                    &format!("s = {}", walk.travel(point)),
                    1e-10,
                    &[
                        ("load", walk.load(point), state.column.load),
                        (
                            "side",
                            walk.side_force(&point.state),
                            state.column.side_force,
                        ),
                        ("turn", walk.turns(&point.state)[1], state.column.top.theta),
                        (
                            "moment",
                            moment(&walk, point),
                            state.column.pivot_moments[1],
                        ),
                    ],
                );
            }
            taken += lost(&walk, drag);
            assert_same("the end", 1e-10, &[("lost", taken, state.lost)]);
            walk.turn();
        }
        assert!(taken > 1e-5, "{taken}");
    }
}

/// On reversal the ball sticks at its angle until its moment has gone from one limit to the other; the
/// loop closes on the second stroke over an area that is the work lost; friction never gives energy.
#[test]
fn the_loop_closes_over_what_friction_takes() {
    for drag in [0.0, 0.001, 0.004] {
        let mut walk = Walk::new(&case(drag), ELEMENTS);
        walk.go_on(0.45, 0.004);
        let mut ends = Vec::new();
        let (mut area, mut taken) = (0.0, 0.0);
        for (stroke, target) in [0.05, 0.45, 0.05, 0.45].into_iter().enumerate() {
            walk.turn();
            let before = walk.turns(&walk.points[0].state)[1];
            let stored = walk.energy(&walk.points[0]);
            walk.go_on(target, 0.004);
            let limit = |point: &Point| drag * walk.load(point);
            let mut sticks = true;
            for pair in walk.points.windows(2) {
                let [from, to] = [&pair[0], &pair[1]];
                let turn = walk.turns(&to.state)[1] - walk.turns(&from.state)[1];
                let held = moment(&walk, to);
                assert!(
                    held.abs() <= limit(to) * (1.0 + 1e-9) + 1e-12,
                    "{held} {}",
                    limit(to)
                );
                // Where it turns, the whole of its friction is against it.
                if turn.abs() > 1e-12 {
                    sticks = false;
                    assert!(
                        (held.abs() - limit(to)).abs() < 1e-11,
                        "{held} {}",
                        limit(to)
                    );
                    assert!(drag == 0.0 || held * turn <= 0.0);
                } else {
                    assert!(sticks, "sticks again at {}", walk.travel(to));
                }
            }
            let second = walk.turns(&walk.points[1].state)[1];
            assert_eq!(second == before, drag > 0.0);
            // What goes in is stored or lost.
            let gained = walk.energy(walk.last()) - stored;
            let friction = lost(&walk, drag);
            assert!(
                (walk.work() - gained - friction).abs() < 2e-8,
                "{} {gained} {friction}",
                walk.work()
            );
            if stroke >= 2 {
                area += walk.work();
                taken += friction;
            }
            ends.push(walk.load(walk.last()));
        }
        assert!(
            (ends[1] - ends[3]).abs() < 1e-10 && (ends[0] - ends[2]).abs() < 1e-10,
            "{ends:?}"
        );
        assert!((area - taken).abs() < 2e-8, "{area} {taken}");
        assert_eq!(taken > 1e-5, drag > 0.0);
    }
}

/// Without friction the ball is a hinge; with very much of it the end stays clamped at the angle at which
/// it stood without load.
#[test]
fn friction_goes_from_hinged_to_clamped() {
    let hinged = Setup {
        top: Support {
            contact: Contact::Joined,
            ..case(0.0).top
        },
        ..case(0.0)
    };
    let mut clamped = hinged.clone();
    let rest = Walk::new(&case(1.0), ELEMENTS);
    clamped.top.rotation = coilstay::setup::Restraint::Held;
    clamped.top.tilt = rest.turns(&rest.points[0].state)[1];
    let hinged = Walk::to(&hinged, ELEMENTS, 0.45);
    let clamped = Walk::to(&clamped, ELEMENTS, 0.45);
    let mut before = f64::INFINITY;
    for drag in [1e-3, 1e-4, 1e-5, 0.0] {
        let walk = Walk::to(&case(drag), ELEMENTS, 0.45);
        let apart = (walk.load(&walk.at(0.3)) - hinged.load(&hinged.at(0.3))).abs();
        assert!(apart < 0.12 * before, "{drag}: {apart} {before}");
        before = apart;
    }
    assert!(before < 1e-11, "{before}");
    let stuck = Walk::to(&case(10.0), ELEMENTS, 0.45);
    for travel in [0.1, 0.2, 0.3, 0.4] {
        let (one, two) = (stuck.at(travel), clamped.at(travel));
        assert!((stuck.load(&one) - clamped.load(&two)).abs() < 1e-11);
    }
}

/// Turned over, with the ball at the bottom, the spring carries the same.
#[test]
fn a_ball_below_is_a_ball_above() {
    let above = case(0.002);
    let below = Setup {
        bottom: above.top,
        top: above.bottom,
        ..above.clone()
    };
    let [mut one, mut two] = [above, below].map(|case| Walk::new(&case, ELEMENTS));
    for target in [0.4, 0.1, 0.3] {
        one.go_on(target, 0.01);
        two.go_on(target, 0.01);
        let [from, to] = [&one.points[0], one.last()].map(|point| one.travel(point));
        for i in 1..10 {
            let travel = from + (to - from) * f64::from(i) / 10.0;
            let (above, below) = (one.at(travel), two.at(travel));
            assert_same(
                &format!("{i} on the way to {target}"),
                1e-12,
                &[
                    ("load", one.load(&above), two.load(&below)),
                    (
                        "turn",
                        one.turns(&above.state)[1],
                        -two.turns(&below.state)[0],
                    ),
                    (
                        "moment",
                        one.moments(&above.state)[1],
                        two.moments(&below.state)[0],
                    ),
                ],
            );
        }
        one.turn();
        two.turn();
    }
}
