//! The reference computations of flat seats, swivels and links by shooting against limits, statics
//! and energy, so that what the program is compared with has been compared itself.
//! [C]: computed by an independent program, not published.

mod reference;

use reference::elastic_ends::{self, Column, End, Link};
use reference::shooting::{
    FlatColumn, FlatSeat, FlatState, Parameter, Problem, Rod, Seat, Standing, State, SwivelColumn,
};
use reference::transverse_rate::transverse_rate;

fn flat(radius: f64, angle: f64) -> FlatSeat {
    FlatSeat {
        radius,
        angle,
        offset: 0.0,
        arm: 0.0,
        lean: 0.0,
    }
}

/// A hundred steps of travel from a load of 1e-3 to `last`; where `after` is given, then to the
/// lift-off before that travel and a hundred steps of the bottom's turn from it.
fn path(column: &mut FlatColumn, last: f64, after: Option<f64>) -> Vec<FlatState> {
    let mut states = vec![column.start(1e-3).expect("starts")];
    let first = states[0].travel;
    for i in 1..=100 {
        let target = first + (last - first) * f64::from(i) / 100.0;
        let state = column
            .follow(Parameter::Travel, target, &states[states.len() - 1])
            .expect("follows");
        states.push(state);
    }
    if let Some(beyond) = after {
        let state = column
            .next_change(Parameter::Travel, beyond, &states[100])
            .expect("lifts off");
        states.push(state);
        for i in 1..=100 {
            let turn = 0.002 * f64::from(i);
            let state = column
                .follow(Parameter::BottomTurn, turn, &states[states.len() - 1])
                .expect("follows");
            states.push(state);
        }
        // The lift-off is a limit of travel and of the load.
        let (limit, past) = (&states[101], &states[111]);
        assert!(past.travel < limit.travel && past.column.load < limit.column.load);
    }
    states
}

/// The way the rings of `states` stand, each once, in turn.
fn ways(states: &[FlatState]) -> Vec<[Standing; 2]> {
    let mut ways: Vec<[Standing; 2]> = states.iter().map(|state| state.standing).collect();
    ways.dedup();
    ways
}

/// A column that buckles between its seats lifts off both; one between seats out of true stands on
/// edges, lies down and lifts off again.
fn cases() -> Vec<(f64, [FlatSeat; 2], f64, Option<f64>)> {
    let radius = |slenderness: f64| 0.5 / slenderness;
    let small = |slenderness: f64| 0.3 / slenderness;
    vec![
        (
            6.0,
            [flat(small(6.0), 0.0), flat(small(6.0), 0.0)],
            0.433,
            Some(0.4345),
        ),
        (
            5.0,
            [flat(radius(5.0), 0.0), flat(0.4 * radius(5.0), 0.02)],
            0.4,
            None,
        ),
        (
            7.0,
            [flat(small(7.0), 0.02), flat(small(7.0), 0.05)],
            0.2,
            None,
        ),
        (
            4.0,
            [flat(radius(4.0), 0.0), flat(radius(4.0), 0.02)],
            0.4,
            None,
        ),
    ]
}

/// No friction is lost in rocking: on every part of the path the work of P over the approach of the
/// seats is what the column stores, through lift-off and return. The ring that stands on an edge
/// has risen by R |sin φ| and moved by R(1 − cos φ). And the ways of standing do change.
#[test]
fn rocking_stores_what_is_put_in() {
    let mut changes = 0;
    for (slenderness, seats, last, after) in cases() {
        let mut column = FlatColumn::new(Rod::of_spring(2.6, slenderness).bowed(0.005), seats);
        let states = path(&mut column, last, after);
        changes += ways(&states).len() - 1;
        for three in states.windows(3) {
            // The quadratic through three points that need not be evenly spaced.
            let [a, b] = [1, 2].map(|i| three[i].travel - three[i - 1].travel);
            let [first, middle, end] = [0, 1, 2].map(|i| three[i].column.load);
            let work = (a + b) / 6.0
                * ((2.0 - b / a) * first
                    + (a + b).powi(2) / (a * b) * middle
                    + (2.0 - a / b) * end);
            let same = ways(three).len() == 1;
            let work = if same {
                work
            } else {
                0.5 * (a * (first + middle) + b * (middle + end))
            };
            let stored = column.energy(&three[2], 200) - column.energy(&three[0], 200);
            assert!(
                (stored - work).abs() < if same { 5e-8 } else { 2e-5 },
                "{stored} {work} {:?}",
                three[1].travel
            );
        }
        for state in &states {
            for end in 0..2 {
                let seat = seats[end];
                let station = [state.column.bottom, state.column.top][end];
                let (normal, moment) = (state.normal[end], state.moment[end]);
                assert!(normal > 0.0);
                // The force acts within the ring: about the seat's centre it has the arm R at most.
                let opening = state.opening[end];
                let about = match state.standing[end] {
                    Standing::Flat => {
                        assert!(opening.abs() < 1e-12);
                        moment.abs() / normal
                    }
                    Standing::Edge(sign) => {
                        let outward = [1.0, -1.0][end];
                        assert!(sign * outward * opening >= -1e-10);
                        // M of physics: N R cos φ and the tangential force on its arm R sin φ.
                        let arm = seat.radius * sign;
                        let parts =
                            arm * (normal * opening.cos() - state.tangential[end] * opening.sin());
                        assert!((moment - parts).abs() < 1e-13);
                        // Rise and sideways motion, in the seat's frame.
                        let aside = station.y - seat.offset;
                        if seat.angle == 0.0 {
                            let moved = arm * (1.0 - opening.cos());
                            assert!((aside - moved).abs() < 1e-12, "{aside} {moved}");
                        }
                        seat.radius
                    }
                };
                assert!(about <= seat.radius * (1.0 + 1e-8));
            }
        }
    }
    assert!(changes >= 7, "{changes}");
}

/// A very large ring is a clamped end, a very small one a hinge.
#[test]
fn flat_seats_go_to_clamped_and_to_hinged() {
    for (angle, radius, close) in [(0.03, 2.0, 1e-10), (0.0, 1e-7, 1e-5)] {
        let seats = [flat(radius, angle), flat(radius, 1.5 * angle)];
        let rod = || Rod::of_spring(2.6, 5.0).bowed(0.01);
        let seat = |angle: f64| {
            if radius > 1.0 {
                Seat {
                    angle,
                    ..Seat::CLAMPED
                }
            } else {
                Seat::HINGED
            }
        };
        let problem = Problem {
            rod: rod(),
            bottom: seat(angle),
            top: seat(1.5 * angle),
        };
        let mut column = FlatColumn::new(rod(), seats);
        let mut state = column
            .start(if radius > 1.0 { 1e-2 } else { 1e-4 })
            .expect("starts");
        for i in 1..=10 {
            let travel = 0.05 * f64::from(i);
            state = column
                .follow(Parameter::Travel, travel, &state)
                .expect("follows");
            let simple = problem
                .solve(Parameter::Travel, travel, &state.column)
                .expect("found");
            assert!((state.column.load - simple.load).abs() < close);
            assert!((state.column.top.theta - simple.top.theta).abs() < close);
        }
        assert!((state.standing == [Standing::Flat; 2]) == (radius > 1.0));
    }
}

/// A straight column whose top seat is a little aside, by d: H = R_Q d and statics give both ends
/// M = (a L R_Q + P) d/2, so that the rings lie flat from where that is P R.
#[test]
fn small_offset_lifts_off_where_statics_says() {
    for (slenderness, share) in [(3.0, 0.1), (4.0, 0.15), (6.0, 0.05), (2.0, 0.3)] {
        let aside = 1e-5;
        let rate = transverse_rate(2.6, slenderness, share);
        let radius = aside * ((1.0 - share) * rate + share) / (2.0 * share);
        let mut seats = [flat(radius, 0.0); 2];
        seats[1].offset = aside;
        let mut column = FlatColumn::new(Rod::of_spring(2.6, slenderness), seats);
        let start = column.start(1e-4).expect("starts");
        let before = column
            .follow(Parameter::Travel, share * (1.0 - 1e-6), &start)
            .expect("follows");
        let after = column
            .follow(Parameter::Travel, share * (1.0 + 1e-6), &before)
            .expect("follows");
        assert!(
            before
                .standing
                .iter()
                .all(|standing| *standing != Standing::Flat)
        );
        assert_eq!(after.standing, [Standing::Flat; 2]);
    }
}

/// The steps of `cycles` strokes up to `last` and back to `first`.
fn strokes(first: f64, last: f64, cycles: usize, steps: u32) -> Vec<f64> {
    let along = |from: f64, to: f64| {
        (1..=steps).map(move |i| from + (to - from) * f64::from(i) / f64::from(steps))
    };
    (0..cycles)
        .flat_map(|_| along(first, last).chain(along(last, first)))
        .collect()
}

/// A ball with friction: it holds |M| ≤ ρP, turns at ρP, and the loop of load over travel closes in
/// the second stroke over an area that is what friction took. Without friction the way back
/// is the way there; with very much it is the clamped column.
#[test]
fn swivel_loses_the_area_of_its_loop() {
    let rod = || Rod::of_spring(2.6, 4.0).bowed(0.01);
    let ball = Seat {
        arm: 0.05,
        ..Seat::HINGED
    };
    for (drag, loops) in [(0.0, false), (0.001, true), (0.004, true), (1e3, false)] {
        let mut column = SwivelColumn::new(rod(), Seat::CLAMPED, ball, drag);
        let steps = 400;
        let (first, last) = (0.02, 0.45);
        let mut state = column.unloaded().expect("unloaded");
        state = column.step(first, &state).expect("starts");
        let mut states = vec![state];
        for travel in strokes(first, last, 3, steps) {
            state = column.step(travel, &state).expect("follows");
            states.push(state);
        }
        let round = 2 * steps as usize;
        let area: f64 = states[round..=2 * round]
            .windows(2)
            .map(|pair| {
                0.5 * (pair[0].column.load + pair[1].column.load)
                    * (pair[1].column.travel - pair[0].column.travel)
            })
            .sum();
        let lost = states[2 * round].lost - states[round].lost;
        assert!(
            (area - lost).abs() < 1e-6 + 1e-3 * lost,
            "{drag}: {area} {lost}"
        );
        assert_eq!(lost > 1e-5, loops);
        for (second, third) in states[round..=2 * round].iter().zip(&states[2 * round..]) {
            assert!((second.column.load - third.column.load).abs() < 1e-5);
        }
        for pair in states.windows(2) {
            assert!(pair[1].column.pivot_moments[1].abs() <= drag * pair[1].column.load + 1e-9);
            assert!(pair[1].lost >= pair[0].lost);
        }
        if !loops {
            let held = if drag == 0.0 {
                ball
            } else {
                Seat {
                    angle: states[0].column.top.theta,
                    rotation: f64::INFINITY,
                    ..ball
                }
            };
            let problem = Problem {
                rod: rod(),
                bottom: Seat::CLAMPED,
                top: held,
            };
            for i in [100, 300, 500, 700] {
                let want = problem
                    .solve(
                        Parameter::Travel,
                        states[i].column.travel,
                        &states[i].column,
                    )
                    .expect("found");
                assert!((want.load - states[i].column.load).abs() < 1e-9);
            }
        }
    }
}

/// The perfect column on links, just after it has gone: the shot branch starts from the root of
/// the transfer matrix.
#[test]
fn linked_columns_branch_off_where_the_straight_one_goes() {
    for (slenderness, length, hanging) in [
        (3.0, 0.5, false),
        (4.0, 2.0, false),
        (4.0, 0.6, true),
        (5.0, 1.5, true),
    ] {
        let link = Link { length, hanging };
        let top = if hanging {
            End::hanger(length)
        } else {
            End::strut(length)
        };
        let critical =
            elastic_ends::critical_share(&Column::of_spring(2.6, slenderness), &End::CLAMPED, &top)
                .expect("goes");
        let problem = Problem {
            rod: Rod::of_spring(2.6, slenderness),
            bottom: Seat::CLAMPED,
            top: Seat::linked(link),
        };
        let at = |height: f64| {
            problem
                .branch(critical, Parameter::Height(0.6), height)
                .expect("finds the branch")
        };
        let (near, far) = (at(1e-4), at(2e-4));
        let limit = (4.0 * near.load - far.load) / 3.0;

        assert!((limit / critical - 1.0).abs() < 1e-7, "{limit} {critical}");
        // A strut's far hinge comes nearer as it leans, a hanger's goes away.
        let sink = |state: &State| state.travel - state.shortening;
        let sign = if hanging { -1.0 } else { 1.0 };
        assert!(sign * sink(&near) > 0.0);
    }
}
