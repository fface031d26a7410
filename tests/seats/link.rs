//! The load through a link against shooting, through the bow-out.

use crate::fixture::setup;
use crate::reference::elastic_ends;
use crate::reference::shooting::{Parameter, Problem, Rod, Seat};
use crate::walk::{Walk, assert_same};
use coilstay::setup::{Link, Setup, Support};

const ELEMENTS: usize = 32;
/// Points of a path that are compared.
const POINTS: usize = 12;

/// A bowed spring of slenderness Λ whose top (or, turned over, bottom) hangs on a link of `length` in L,
/// whose near hinge is `arm` beyond the end and whose far one stands `offset` aside.
fn case(slenderness: f64, length: f64, hanging: bool, arm: f64, offset: f64, over: bool) -> Setup {
    let unit = slenderness * 0.05;
    let linked = Support {
        link: Some(Link {
            length: length * unit,
            hanging,
        }),
        arm: arm * unit,
        offset: offset * unit,
        ..Support::free()
    };
    let (bottom, top) = if over {
        (linked, Support::clamped())
    } else {
        (Support::clamped(), linked)
    };
    let mut case = setup(slenderness, 2.6, bottom, top);
    case.imperfections.bow = 0.005 * unit;
    case
}

/// Load, rotations, sideways motion and travel of the far hinges along the path.
#[test]
fn linked_columns_meet_shooting() {
    for (slenderness, length, hanging, arm, offset) in [
        (3.0, 0.5, false, 0.0, 0.0),
        (2.0, 1.0, false, 0.05, 0.01),
        (4.0, 0.6, true, 0.0, 0.0),
        (5.0, 1.5, true, -0.02, -0.01),
    ] {
        for over in [false, true] {
            let setup = case(slenderness, length, hanging, arm, offset, over);
            let mut walk = Walk::new(&setup, ELEMENTS);
            walk.until(0.02, |walk, point| {
                let turns = walk.turns(&point.state);
                walk.travel(point) > 0.45 || turns.iter().any(|turn| turn.abs() > 0.8)
            });
            let linked = Seat {
                arm,
                offset,
                ..Seat::linked(elastic_ends::Link { length, hanging })
            };
            let (bottom, top) = if over {
                (linked, Seat::CLAMPED)
            } else {
                (Seat::CLAMPED, linked)
            };
            let problem = Problem {
                rod: Rod::of_spring(2.6, slenderness).bowed(0.005),
                bottom,
                top,
            };
            let mut state = problem.unloaded().expect("unloaded");
            let mut profile = Vec::new();
            for i in 0..=POINTS {
                let point = &walk.points[i * (walk.points.len() - 1) / POINTS];
                let turns = walk.turns(&point.state);
                // A strut turns on and on where load and travel turn back; a hanger does not at first.
                let (parameter, target) = if hanging {
                    (Parameter::Travel, walk.travel(point))
                } else if over {
                    (Parameter::BottomTurn, turns[0])
                } else {
                    (Parameter::TopTurn, turns[1])
                };
                state = problem
                    .follow(parameter, &[target], &state)
                    .expect("follows")[0];
                walk.column.profile(&point.state, &mut profile);
                let moments = walk.moments(&point.state);
                assert_same(
                    &format!(
                        "Λ {slenderness}, {length}, {hanging}, {over}: s = {}",
                        state.travel
                    ),
                    1e-11,
                    &[
                        ("load", walk.load(point), state.load),
                        ("travel", walk.travel(point), state.travel),
                        ("side", walk.side_force(&point.state), state.side_force),
                        ("bottom turn", turns[0], state.bottom.theta),
                        ("top turn", turns[1], state.top.theta),
                        ("bottom y", profile[0].y, state.bottom.y),
                        ("top y", profile[profile.len() - 1].y, state.top.y),
                        ("bottom moment", moments[0], state.pivot_moments[0]),
                        ("top moment", moments[1], state.pivot_moments[1]),
                    ],
                );
            }
            let last = walk.turns(&walk.last().state);
            assert!(last.iter().any(|turn| turn.abs() > 0.2), "{last:?}");
        }
    }
}

/// A link takes no energy: what the load puts in over the travel of the far hinge is stored.
#[test]
fn links_store_nothing() {
    for (length, hanging) in [(0.5, false), (0.8, true)] {
        let mut walk = Walk::new(&case(3.5, length, hanging, 0.03, 0.02, false), ELEMENTS);
        walk.until(0.01, |walk, point| walk.turns(&point.state)[1].abs() > 0.7);
        let stored = walk.energy(walk.last()) - walk.energy(&walk.points[0]);
        assert!(
            (walk.work() - stored).abs() < 2e-9,
            "{} {stored}",
            walk.work()
        );
    }
}
