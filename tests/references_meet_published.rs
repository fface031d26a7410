//! The reference computations against published values, so that what the program is compared
//! with has been compared itself. [S]: seen in a published text. [M]: from memory of the named
//! source. [C]: computed by an independent program, not published.

mod reference;

use approx::assert_relative_eq;
use reference::after_buckling;
use reference::closed_form::{
    clamped_hinged, critical_share, hinged_arms, never_limit, peak_share, straightening_share,
    wave_number,
};
use reference::elastic_ends::{self, Column, End};
use reference::elastica;
use reference::shooting::{Parameter, Problem, Rod, Seat, State};
use reference::transverse_rate::{printed_rate, transverse_compliance, transverse_rate};
use std::f64::consts::PI;

const STEELS: [f64; 3] = [2.6, 206.0 / 81.5, 185.0 / 73.0];

/// EN 13906-1, buckling clause [M]; Shigley's Mechanical Engineering Design, ch. 10, C1, C2 and α
/// [S]. The digits are [C].
#[test]
fn closed_form_meets_its_table() {
    let table = [
        (2.7, [0.616_507_740_8, 0.584_098_733_2, 0.586_817_377_2]),
        (3.0, [0.416_843_343_7, 0.405_460_565_3, 0.406_493_225_4]),
        (4.0, [0.198_598_977_0, 0.195_214_963_4, 0.195_528_005_4]),
        (6.0, [0.081_573_714_44, 0.080_436_084_67, 0.080_541_751_02]),
        (10.0, [0.028_388_295_86, 0.028_023_938_02, 0.028_057_820_91]),
    ];
    for (slenderness, shares) in table {
        for (r, want) in STEELS.into_iter().zip(shares) {
            let got = critical_share(r, slenderness).expect("buckles");
            assert_relative_eq!(got, want, max_relative = 3e-10);
        }
    }
    for (r, want) in STEELS
        .into_iter()
        .zip([2.620_269_41, 2.580_693_11, 2.584_400_91])
    {
        assert_relative_eq!(never_limit(r), want, max_relative = 3e-9);
        assert_eq!(critical_share(r, want * 0.999), None);
    }
    // Handbooks print L0 < 2.63 D/α for steels (Shigley) [M]; 30/11.5 Mpsi gives 2.6249 [C].
    assert!((never_limit(30.0 / 11.5) - 2.6249).abs() < 5e-5);
}

/// Shigley's worked spring: d = 0.037 in, D = 0.400 in, L0 = 2.06 in, deflected 1.56 in, squared
/// ends, α = 0.5 [M]. 29.0/11.85 Mpsi [S] give a limit of 2.0276 in and y_cr ≈ 0.696 L0 [C].
#[test]
fn worked_spring_of_the_handbook_buckles() {
    let r = 29.0 / 11.85;
    assert!((never_limit(r) * 0.400 / 0.5 - 2.0276).abs() < 5e-5);
    let share = critical_share(r, 0.5 * 2.06 / 0.400).expect("buckles");
    assert!((share - 0.696).abs() < 5e-4);
    assert!(share * 2.06 < 1.56);
}

/// tan q = q a/(a + b), E/G = 2.6, digits [C]. Handbook constants 0.707 (Shigley) [S] and
/// 0.7 (EN 13906-1) [M] beside it.
#[test]
fn clamped_hinged_root_meets_its_table() {
    let table = [
        (4.0, 0.493_316_695_3, 0.506_851, 0.526_091),
        (5.0, 0.269_854_983_2, 0.267_114, 0.273_839),
        (8.0, 0.094_273_457_85, 0.092_450, 0.094_430),
    ];
    for (slenderness, exact, with_707, with_700) in table {
        let got = clamped_hinged(2.6, slenderness).expect("buckles");
        assert_relative_eq!(got, exact, max_relative = 2e-10);
        for (constant, want) in [(0.707, with_707), (0.7, with_700)] {
            let got = critical_share(2.6, constant * slenderness).expect("buckles");
            assert!((got - want).abs() < 6e-7);
        }
    }
    // Where the formula with 0.7 promises "never" [C].
    let got = clamped_hinged(2.6, 3.5).expect("buckles");
    assert!((got - 0.783_726).abs() < 5e-7);
    assert_eq!(critical_share(2.6, 0.7 * 3.5), None);
    // Its own limit [C].
    assert!(clamped_hinged(2.6, 2.6935).is_some());
    assert!(clamped_hinged(2.6, 2.6925).is_none());
    // A long column does not shorten before it buckles: tan q = q, Timoshenko & Gere [M].
    let long = 3000.0;
    let share = clamped_hinged(2.6, long).expect("buckles");
    assert!((wave_number(2.6, long, share) - 4.493_409_457_91).abs() < 1e-6);
}

/// Where the pair of roots is, the second one is where the column straightens: below ξ = 1 for
/// λ < 2.6930, E/G = 2.6 [C]. Both solve the same equation, q = π.
#[test]
fn second_root_lies_below_one_only_close_to_the_limit() {
    assert!(straightening_share(2.6, 2.6929).is_some());
    assert!(straightening_share(2.6, 2.6931).is_none());
    let second = straightening_share(2.6, 2.65).expect("straightens");
    assert_relative_eq!(wave_number(2.6, 2.65, second), PI, max_relative = 1e-13);
    assert!(second > peak_share(2.6));
}

/// The general ends against the four ends that the closed form covers exactly: α = 0.5 (both
/// clamped), 1 (clamped–sliding), 1 (both hinged), 2 (clamped–free). EN 13906-1, seatings [M].
#[test]
fn general_ends_meet_the_closed_form() {
    let ends = [
        (0.5, End::CLAMPED, End::CLAMPED),
        (1.0, End::CLAMPED, End::SLIDING),
        (1.0, End::HINGED, End::HINGED),
        (2.0, End::CLAMPED, End::FREE),
    ];
    for r in [0.9, 2.3, 2.6, 206.0 / 81.5] {
        for effective in [2.5, 2.63, 2.65, 2.7, 3.0, 3.5, 4.0, 5.0, 7.0, 10.0, 25.0] {
            for (constant, bottom, top) in &ends {
                let column = Column::of_spring(r, effective / constant);
                for (first, second) in [(bottom, top), (top, bottom)] {
                    meet(
                        elastic_ends::critical_share(&column, first, second),
                        critical_share(r, effective).filter(|share| *share < 1.0),
                        1e-11,
                    );
                }
            }
        }
    }
}

/// The general ends against the clamped–hinged root and the hinged arms, both their own equations.
#[test]
fn general_ends_meet_the_exact_roots() {
    for r in STEELS {
        for slenderness in [2.5, 3.0, 3.5, 4.0, 6.0, 10.0] {
            let column = Column::of_spring(r, slenderness);
            meet(
                elastic_ends::critical_share(&column, &End::CLAMPED, &End::HINGED),
                clamped_hinged(r, slenderness),
                1e-11,
            );
            for arm in [0.02, 0.1, 0.5, -0.02] {
                let end = End::HINGED.with_arm(arm);
                // Inward arms: at ξ = 1 + 2h/L the two pivots meet, and the column turns about them.
                let pivots_meet = (arm < 0.0).then_some(1.0 + 2.0 * arm);
                meet(
                    elastic_ends::critical_share(&column, &end, &end),
                    hinged_arms(r, slenderness, arm).or(pivots_meet),
                    1e-11,
                );
            }
        }
    }
}

/// What costs most in practice, E/G = 2.6 [C]: a top seat held sideways by 0.5 k and 2 k between
/// clamped ends, Λ = 5; hinges 1, 2, 4 wire diameters beyond the ends, D/d = 8, L_a/D = 4.
#[test]
fn soft_and_long_seats_meet_their_figures() {
    let column = Column::of_spring(2.6, 5.0);
    assert_eq!(critical_share(2.6, 0.5 * 5.0), None);
    for (side, want) in [(0.5, 0.395_887), (2.0, 0.690_016)] {
        let seat = End::elastic(f64::INFINITY, side);
        let got = elastic_ends::critical_share(&column, &End::CLAMPED, &seat).expect("buckles");
        assert!((got - want).abs() < 6e-7, "{got}");
        assert_relative_eq!(transverse_rate(2.6, 5.0, got), -side, max_relative = 1e-10);
    }
    let without = critical_share(2.6, 4.0).expect("buckles");
    for (wires, percent) in [(1.0, 14.3), (2.0, 25.1), (4.0, 40.4)] {
        let share = hinged_arms(2.6, 4.0, wires / 8.0 / 4.0).expect("buckles");
        let cost = 100.0 * (1.0 - share / without);
        assert!((cost - percent).abs() < 0.05, "{cost}");
    }
}

/// The two routes of the general ends meet: the determinant of the transfer matrix changes sign
/// where the stiffness loses its first positive eigenvalue, for ends without a closed form.
#[test]
fn stiffness_and_determinant_meet() {
    let inf = f64::INFINITY;
    let ends = [
        (End::elastic(0.02, inf), End::elastic(0.1, inf)),
        (End::elastic(0.02, 0.4), End::elastic(inf, 1.5)),
        (
            End::elastic(inf, inf),
            End::elastic(0.03, 0.2).with_arm(0.1),
        ),
        (
            End::elastic(0.2, 3.0).with_arm(0.05),
            End::elastic(0.0, 30.0).with_arm(-0.03),
        ),
        (End::elastic(1e9, 1e9), End::elastic(0.0, 0.0)),
    ];
    let mut found = 0;
    for slenderness in [3.0, 4.5, 8.0] {
        let column = Column::of_spring(2.6, slenderness);
        for (bottom, top) in &ends {
            let at = |share: f64| elastic_ends::determinant(&column, bottom, top, share).signum();
            let share = elastic_ends::critical_share(&column, bottom, top);
            let before = (1..1000)
                .map(|i| share.unwrap_or(1.0) * (1.0 - 1e-9) * f64::from(i) / 999.0)
                .all(|share| at(share) == at(1e-6));
            assert!(before, "{bottom:?} {top:?}");
            if let Some(share) = share {
                assert_ne!(at(share * (1.0 - 1e-9)), at(share * (1.0 + 1e-9)));
                found += 1;
            }
        }
    }
    assert!(found >= 12, "{found}");
}

/// EN 13906-1, transverse rate under axial load [M]; Haringx, Philips Res. Rep. 4 (1949) 49–80.
/// Digits [C], E/G = 2.6.
#[test]
fn transverse_rate_meets_its_table() {
    let table = [
        (
            2.0,
            [0.639_344_262, 0.631_787_158, 0.628_003_029, 0.641_586_716],
        ),
        (
            3.0,
            [0.329_113_924, 0.268_571_827, 0.198_050_683, 0.018_050_882_1],
        ),
    ];
    for (slenderness, rates) in table {
        for (share, want) in [0.0, 0.1, 0.2, 0.4].into_iter().zip(rates) {
            let got = transverse_rate(2.6, slenderness, share);
            assert_relative_eq!(got, want, max_relative = 3e-9);
            if share > 0.0 {
                let printed = printed_rate(2.6, slenderness, share);
                assert_relative_eq!(got, printed, max_relative = 1e-13);
            }
        }
    }
    // R_Q vanishes where the clamped–sliding column goes, that is, where k/R_Q has its pole.
    for slenderness in [2.7, 3.0, 5.0, 10.0] {
        let share = critical_share(2.6, slenderness).expect("buckles");
        let rate = |factor: f64| transverse_rate(2.6, slenderness, share * factor);
        assert!(rate(1.0 - 1e-9) > 0.0 && rate(1.0 + 1e-9) < 0.0);
    }
    // Smooth through no load, into tension.
    for step in [1e-3, 1e-4] {
        let middle = transverse_compliance(2.6, 3.0, 0.0);
        let mean =
            0.5 * (transverse_compliance(2.6, 3.0, step) + transverse_compliance(2.6, 3.0, -step));
        assert_relative_eq!(middle, mean, max_relative = 10.0 * step * step);
    }
}

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

fn meet(got: Option<f64>, want: Option<f64>, relative: f64) {
    match (got, want) {
        (Some(got), Some(want)) => assert_relative_eq!(got, want, max_relative = relative),
        (None, None) => {}
        other => panic!("one of the two never goes: {other:?}"),
    }
}
