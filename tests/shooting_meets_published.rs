//! The shooting of the exact column against published values and against the other references.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod reference;

use approx::assert_relative_eq;
use reference::after_buckling;
use reference::closed_form::critical_share;
use reference::elastic_ends::{self, Column, End};
use reference::elastica;
use reference::shooting::{Parameter, Problem, Rod, Seat, State};
use reference::transverse_rate::transverse_rate;
use std::f64::consts::PI;

/// The rate by shooting: the top between parallel ends moved a little, compressed and stretched.
#[test]
fn shooting_meets_the_transverse_rate() {
    for (slenderness, share) in [(2.0, 0.4), (3.0, 0.2), (3.0, 0.4), (3.0, -0.3), (8.0, 0.06)] {
        let shift = 1e-5;
        let problem = Problem {
            rod: Rod::of_spring(2.6, slenderness),
            bottom: Seat::CLAMPED,
            top: Seat {
                offset: shift,
                ..Seat::CLAMPED
            },
        };
        let state = follow(&problem, Parameter::Load, share);
        assert_relative_eq!(
            state.side_force / shift,
            transverse_rate(2.6, slenderness, share),
            max_relative = 1e-6,
            epsilon = 1e-8
        );
    }
}

/// Elastica cantilever: P/P_cr by tip angle. Timoshenko & Gere, post-buckling table [M]; more
/// digits [C]. The shot column, stiff against shortening and shear, gives the same and its tip.
#[test]
fn elastica_meets_its_table() {
    let table = [
        (20.0, 1.015, 1.015_396_866),
        (40.0, 1.063, 1.063_663_266),
        (60.0, 1.152, 1.151_719_620),
        (80.0, 1.293, 1.293_889_324),
        (100.0, 1.518, 1.518_388_793),
        (120.0, 1.884, 1.884_800_869),
        (140.0, 2.541, 2.542_258_370),
        (160.0, 4.029, 4.030_085_966),
        (176.0, 9.116, 9.116_218_298),
    ];
    let problem = Problem {
        rod: Rod::straight(f64::INFINITY, f64::INFINITY, 1.0, 1.0),
        bottom: Seat::CLAMPED,
        top: Seat::FREE,
    };
    let critical = PI.powi(2) / 4.0;
    let mut state = onto_branch(&problem, critical, Parameter::TopTurn, 1e-2);
    for (degrees, printed, digits) in table {
        let angle = f64::to_radians(degrees);
        let exact = elastica::cantilever(angle);
        assert_relative_eq!(exact.load_ratio, digits, max_relative = 1e-9);
        // The printed table is cut or rounded by up to one and a half units of its last place.
        assert!((exact.load_ratio - printed).abs() < 1.5e-3);
        state = problem
            .follow(Parameter::TopTurn, &[angle], &state)
            .expect("follows")[0];
        assert_relative_eq!(state.load / critical, exact.load_ratio, max_relative = 1e-9);
        assert_relative_eq!(state.top.x, exact.tip_x, epsilon = 1e-9);
        assert_relative_eq!(state.top.y, exact.tip_y, epsilon = 1e-9);
    }
}

/// Cantilever with a dead load across its tip, Mattiasson, Int. J. Numer. Meth. Engng 17 (1981)
/// 145–153 [S]: P L²/EI, w/L, u/L.
#[test]
fn shooting_meets_the_bent_cantilever() {
    let mut problem = Problem {
        rod: Rod::straight(f64::INFINITY, f64::INFINITY, 1.0, 1.0),
        bottom: Seat::CLAMPED,
        top: Seat::FREE,
    };
    let mut state = problem.unloaded().expect("straight");
    for (load, aside, down) in [
        (1.0, 0.301_72, 0.056_43),
        (2.0, 0.493_46, 0.160_64),
        (5.0, 0.713_79, 0.387_63),
        (10.0, 0.810_61, 0.555_00),
    ] {
        problem.top.force = load;
        state = problem.solve(Parameter::Load, 0.0, &state).expect("solves");
        assert!((state.top.y - aside).abs() < 6e-6);
        assert!((state.shortening - down).abs() < 6e-6);
    }
}

/// A straight rod under M = 2πEI/L closes to a circle: exact, common knowledge of mechanics.
#[test]
fn shooting_rolls_a_rod_up() {
    let mut problem = Problem {
        rod: Rod::straight(1e3, 5e2, 2.0, 3.0),
        bottom: Seat::CLAMPED,
        top: Seat::FREE,
    };
    let mut state = problem.unloaded().expect("straight");
    for quarter in 1..=4 {
        problem.top.moment = f64::from(quarter) * 0.5 * PI * 2.0 / 3.0;
        state = problem.solve(Parameter::Load, 0.0, &state).expect("solves");
    }
    assert_relative_eq!(state.top.theta, 2.0 * PI, max_relative = 1e-11);
    assert!(state.top.x.abs() < 1e-10 && state.top.y.abs() < 1e-10);
    let half = problem.profile(&state, &[0.5])[0];
    assert_relative_eq!(half.y, 3.0 / PI, max_relative = 1e-11);
}

/// Hinged column that may shorten and not shear: (e/2)(1 − √(1 − 4π²/e)), Magnusson, Ristinmaa,
/// Ljung, Int. J. Solids Struct. 38 (2001).
#[test]
fn shooting_meets_the_column_that_may_shorten() {
    assert_eq!(elastica::shortening_column_load(39.0), None);
    for axial in [45.0, 80.0, 1e3, 1e6] {
        let problem = Problem {
            rod: Rod::straight(axial, f64::INFINITY, 1.0, 1.0),
            bottom: Seat::HINGED,
            top: Seat::HINGED,
        };
        let critical = elastica::shortening_column_load(axial).expect("buckles");
        let state = onto_branch(&problem, critical, Parameter::BottomTurn, 1e-4);
        assert_relative_eq!(state.load, critical, max_relative = 1e-8);
    }
}

/// Where the bowed branch leaves the straight one, by shooting with hardly any bow, for ends that
/// have no closed form: clamped–hinged, arms, and elastic ends.
#[test]
fn shooting_meets_the_straight_column() {
    let inf = f64::INFINITY;
    let ends = [
        (End::CLAMPED, End::HINGED),
        (End::HINGED.with_arm(0.0625), End::HINGED.with_arm(0.0625)),
        (End::elastic(0.02, inf), End::elastic(0.1, inf)),
        (
            End::elastic(0.02, 0.4).with_arm(0.05),
            End::elastic(inf, 1.5).with_arm(0.02),
        ),
        (
            End::elastic(0.2, 3.0).with_arm(0.05),
            End::elastic(0.0, 30.0).with_arm(-0.03),
        ),
    ];
    let seat = |end: &End| Seat {
        arm: end.arm,
        ..Seat::elastic(end.rotation, end.sideways)
    };
    for slenderness in [3.6, 4.5, 8.0] {
        for (bottom, top) in &ends {
            let column = Column::of_spring(2.6, slenderness);
            let share = elastic_ends::critical_share(&column, bottom, top).expect("buckles");
            let problem = Problem {
                rod: Rod::of_spring(2.6, slenderness),
                bottom: seat(bottom),
                top: seat(top),
            };
            let state = onto_branch(&problem, share, Parameter::Height(0.5), 1e-5);
            assert_relative_eq!(state.load, share, max_relative = 1e-7);
        }
    }
}

/// Slopes after buckling, derived in the module and met by the shot branch: two small rotations,
/// extrapolated. Figures for the limits and for the rate left, E/G = 2.6 and 206/81.5 [C].
#[test]
fn slopes_after_buckling_meet_the_shot_branch() {
    // End constant, ends, where the rotation is largest, and a place where the mode has a height.
    let ends = [
        (1.0, Seat::HINGED, Seat::HINGED, 0.0, 0.5),
        (0.5, Seat::CLAMPED, Seat::CLAMPED, 0.25, 0.5),
        (1.0, Seat::CLAMPED, Seat::SLIDING, 0.5, 1.0),
        (2.0, Seat::CLAMPED, Seat::FREE, 1.0, 1.0),
    ];
    for effective in [2.7, 3.0, 4.0, 10.0] {
        let critical = critical_share(2.6, effective).expect("buckles");
        for (constant, bottom, top, place, high) in ends {
            let problem = Problem {
                rod: Rod::of_spring(2.6, effective / constant),
                bottom,
                top,
            };
            let slopes = |height: f64| {
                let state = onto_branch(&problem, critical, Parameter::Height(high), height);
                let turn = problem.profile(&state, &[place])[0].theta.powi(2);
                [
                    (state.load - critical) / turn,
                    (state.shortening - critical) / turn,
                ]
            };
            let (near, far) = (slopes(2e-3), slopes(4e-3));
            let want = [
                after_buckling::load_slope(2.6, critical),
                after_buckling::share_slope(2.6, critical),
            ];
            for i in 0..2 {
                let limit = (4.0 * near[i] - far[i]) / 3.0;
                assert_relative_eq!(limit, want[i], max_relative = 6e-6, epsilon = 3e-7);
            }
        }
    }
    let share = |slenderness| critical_share(2.6, slenderness).expect("buckles");
    assert!((after_buckling::rate_left(2.6, share(4.0)) - 0.082).abs() < 5e-4);
    assert!((after_buckling::rate_left(2.6, share(10.0)) - 0.014).abs() < 5e-4);
    for (r, load, shortening) in [(2.6, 3.0256, 2.7635), (206.0 / 81.5, 2.9799, 2.7231)] {
        let (load_limit, share_limit) = (
            after_buckling::load_falls_below(r),
            after_buckling::share_falls_below(r),
        );
        assert!((load_limit - load).abs() < 5e-5, "{load_limit}");
        assert!((share_limit - shortening).abs() < 5e-5, "{share_limit}");
        // The limits are where the slopes change sign.
        let slope = |f: fn(f64, f64) -> f64, at: f64| f(r, critical_share(r, at).expect("buckles"));
        assert!(slope(after_buckling::load_slope, load_limit - 1e-6) < 0.0);
        assert!(slope(after_buckling::load_slope, load_limit + 1e-6) > 0.0);
        assert!(slope(after_buckling::share_slope, share_limit - 1e-6) < 0.0);
        assert!(slope(after_buckling::share_slope, share_limit + 1e-6) > 0.0);
    }
}

/// Hinged, Λ = 4, E/G = 2.6: a bow of 0.1 D is reached at 0.2002, not at 0.1986 [C].
#[test]
fn bow_limit_of_the_hinged_column_meets_its_figure() {
    let problem = Problem {
        rod: Rod::of_spring(2.6, 4.0),
        bottom: Seat::HINGED,
        top: Seat::HINGED,
    };
    let state = onto_branch(&problem, 0.198_599, Parameter::Height(0.5), 0.1 / 4.0);
    assert_relative_eq!(problem.farthest(&state).y, 0.025, max_relative = 1e-9);
    assert!(
        (state.shortening - 0.2002).abs() < 5e-5,
        "{}",
        state.shortening
    );
}

/// Southwell's line for a spring: with a free bow in the shape of the mode and H = 0 the rotations
/// grow as q_cr/(q_cr − q_S) with q_S = ξ(1 − mξ), and the heights as 1 − mξ times that
/// (Southwell 1932; derived for the spring) [C].
#[test]
fn small_bow_grows_as_southwell_says() {
    let (height, m) = (1e-6, 1.0 - 1.0 / 2.6);
    let problem = Problem {
        rod: Rod::of_spring(2.6, 4.0).bowed(height),
        bottom: Seat::HINGED,
        top: Seat::HINGED,
    };
    let critical = critical_share(2.6, 4.0).expect("buckles");
    let grown = |share: f64| share * (1.0 - m * share);
    for part in [0.2, 0.5, 0.8, 0.95] {
        let share = part * critical;
        let state = follow(&problem, Parameter::Load, share);
        let growth = grown(critical) / (grown(critical) - grown(share));
        assert_relative_eq!(
            state.bottom.theta,
            height * PI * growth,
            max_relative = 1e-6
        );
        let middle = problem.profile(&state, &[0.5])[0].y;
        assert_relative_eq!(
            middle,
            (1.0 - m * share) * height * growth,
            max_relative = 1e-6
        );
    }
}

/// Whatever the ends do, the work of P is the energy stored: dU/d(travel) = P. Nothing of the
/// integration enters this but its result.
#[test]
fn load_is_the_slope_of_the_energy() {
    let inf = f64::INFINITY;
    let seats = [
        (
            Seat {
                angle: 0.02,
                arm: 0.05,
                eccentricity: 0.01,
                ..Seat::elastic(0.03, 0.5)
            },
            Seat {
                angle: -0.01,
                offset: 0.02,
                arm: 0.1,
                eccentricity: 0.02,
                ..Seat::elastic(0.01, 2.0)
            },
        ),
        (
            Seat {
                angle: 0.03,
                arm: 0.05,
                ..Seat::CLAMPED
            },
            Seat {
                arm: 0.02,
                eccentricity: -0.02,
                ..Seat::elastic(0.0, inf)
            },
        ),
    ];
    for (bottom, top) in seats {
        let problem = Problem {
            rod: Rod::of_spring(2.6, 4.0).bowed(0.01),
            bottom,
            top,
        };
        let start = problem.unloaded().expect("solves");
        let step = 1e-3;
        let travels: Vec<f64> = (-2..=2).map(|i| 0.15 + f64::from(i) * step).collect();
        let states = problem
            .follow(Parameter::Travel, &travels, &start)
            .expect("follows");
        let energy: Vec<f64> = states.iter().map(|state| energy(&problem, state)).collect();
        let slope = (8.0 * (energy[3] - energy[1]) - (energy[4] - energy[0])) / (12.0 * step);
        assert_relative_eq!(states[2].load, slope, max_relative = 1e-8);
        assert!(problem.farthest(&states[2]).y.abs() > 0.02);
    }
}

/// Energy of the column (Simpson's rule over its sections) and of its elastic seats.
fn energy(problem: &Problem, state: &State) -> f64 {
    let cells = 200;
    let shares: Vec<f64> = (0..=cells)
        .map(|i| f64::from(i) / f64::from(cells))
        .collect();
    let rod = &problem.rod;
    let column: f64 = problem
        .profile(state, &shares)
        .iter()
        .enumerate()
        .map(|(i, station)| {
            let (sin, cos) = station.theta.sin_cos();
            let normal = -state.load * cos + state.side_force * sin;
            let across = state.load * sin + state.side_force * cos;
            let weight = match i {
                0 => 1.0,
                i if i == shares.len() - 1 => 1.0,
                i if i % 2 == 1 => 4.0,
                _ => 2.0,
            };
            weight
                * 0.5
                * (normal.powi(2) / rod.axial
                    + across.powi(2) / rod.shear
                    + station.moment.powi(2) / rod.bending)
        })
        .sum::<f64>()
        * rod.length
        / (3.0 * f64::from(cells));
    let spring = |stiffness: f64, motion: f64| {
        if stiffness.is_finite() {
            0.5 * stiffness * motion.powi(2)
        } else {
            0.0
        }
    };
    let (bottom, top) = (&problem.bottom, &problem.top);
    column
        + spring(bottom.sideways, state.pivots[0] - bottom.offset)
        + spring(top.sideways, state.pivots[1] - top.offset)
        + spring(bottom.rotation, state.bottom.theta - bottom.angle)
        + spring(top.rotation, state.top.theta - top.angle)
}

/// From no load to `value` of `parameter` in twenty steps.
fn follow(problem: &Problem, parameter: Parameter, value: f64) -> State {
    let start = problem.unloaded().expect("solves");
    let values: Vec<f64> = (1..=20).map(|i| value * f64::from(i) / 20.0).collect();
    problem.follow(parameter, &values, &start).expect("follows")[19]
}

/// The bowed branch of a perfect column with critical load `critical` where `parameter` has
/// `value`.
fn onto_branch(problem: &Problem, critical: f64, parameter: Parameter, value: f64) -> State {
    problem
        .branch(critical, parameter, value)
        .expect("finds the branch")
}
