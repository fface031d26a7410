//! The shooting of the exact column against published values and against the other references.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod reference;

use approx::assert_relative_eq;
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
        let state = problem.loaded(Parameter::Load, share).expect("follows");
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
    let mut state = problem
        .branch(critical, Parameter::TopTurn, 1e-2)
        .expect("finds the branch");
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
        let state = problem
            .branch(critical, Parameter::BottomTurn, 1e-4)
            .expect("finds the branch");
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
            let state = problem
                .branch(share, Parameter::Height(0.5), 1e-5)
                .expect("finds the branch");
            assert_relative_eq!(state.load, share, max_relative = 1e-7);
        }
    }
}

/// Units do not matter: the same column in millimetres and newtons, bowed, on elastic tilted
/// seats with arms.
#[test]
fn units_do_not_matter() {
    let seats = |length: f64, force: f64| {
        let bottom = Seat {
            angle: 0.02,
            arm: 0.05 * length,
            eccentricity: 0.01 * length,
            ..Seat::elastic(0.03 * force * length, 0.5 * force / length)
        };
        let top = Seat {
            offset: 0.02 * length,
            arm: 0.1 * length,
            ..Seat::elastic(0.01 * force * length, 2.0 * force / length)
        };
        (bottom, top)
    };
    let plain = Rod::of_spring(2.6, 4.0);
    let (length, force) = (120.0, 3500.0);
    let large = Rod::straight(
        force * plain.axial,
        force * plain.shear,
        force * length * length * plain.bending,
        length,
    );
    let state = |rod: Rod, length: f64, force: f64| {
        let (bottom, top) = seats(length, force);
        let problem = Problem {
            rod: rod.bowed(0.01 * length),
            bottom,
            top,
        };
        let state = problem
            .loaded(Parameter::Shortening, 0.2 * length)
            .expect("follows");
        let bow = problem.farthest(&state);
        [
            state.load / force,
            state.side_force / force,
            state.travel / length,
            state.top.y / length,
            state.pivot_moments[1] / (force * length),
            bow.y / length,
            bow.theta,
        ]
    };
    let (plain, large) = (state(plain, 1.0, 1.0), state(large, length, force));
    for (one, other) in plain.into_iter().zip(large) {
        assert_relative_eq!(one, other, max_relative = 1e-9, epsilon = 1e-11);
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
