//! The shooting of the exact column against the theory of imperfections and of what comes after
//! buckling: slopes, Southwell's growth, Koiter's exponent. [M]: from memory of the named source.
//! [C]: computed by an independent program, not published.

mod reference;

use approx::assert_relative_eq;
use reference::after_buckling;
use reference::closed_form::critical_share;
use reference::shooting::{Parameter, Problem, Rod, Seat};
use std::f64::consts::PI;

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
                let state = problem
                    .branch(critical, Parameter::Height(high), height)
                    .expect("finds the branch");
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
    let state = problem
        .branch(0.198_599, Parameter::Height(0.5), 0.1 / 4.0)
        .expect("finds the branch");
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
        let state = problem.loaded(Parameter::Load, share).expect("follows");
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

/// Under a dead load a small bow A takes off the load at which the column is lost as A^(2/3) where
/// the load falls after buckling (Koiter 1945; from memory): the local exponent tends to 2/3 as A
/// tends to nought. The factor follows from the slope c = d(P/EA)/dθ0² and Southwell's growth:
/// near the bifurcation θ0 (p_cr + c θ0² − p) n = θ_free p_cr' with n = 1 − 2z, p_cr' = ξ_cr(1 − z),
/// whose largest p is p_cr − (3/2)(2|c|)^(1/3) (θ_free p_cr'/n)^(2/3).
#[test]
fn small_bow_lowers_the_lost_load_as_koiter_says() {
    let (slenderness, m) = (2.85, 1.0 - 1.0 / 2.6);
    assert!(slenderness < 0.95 * after_buckling::load_falls_below(2.6));
    let critical = critical_share(2.6, slenderness).expect("buckles");
    let z = m * critical;
    let falling = -after_buckling::load_slope(2.6, critical);
    let leading = |bow: f64| {
        let push = PI * bow * critical * (1.0 - z) / (1.0 - 2.0 * z);
        1.5 * (2.0 * falling).cbrt() * push.powf(2.0 / 3.0)
    };
    let drop = |bow: f64| {
        let problem = Problem {
            rod: Rod::of_spring(2.6, slenderness).bowed(bow),
            bottom: Seat::HINGED,
            top: Seat::HINGED,
        };
        // Well before the loss, and with a rotation large enough to tell the load by.
        let start = problem
            .loaded(Parameter::Load, critical - 4.0 * leading(bow))
            .expect("follows");
        let lost = problem
            .first_largest(Parameter::Load, Parameter::BottomTurn, &start, 1.0)
            .expect("follows")
            .expect("is lost");
        critical - lost.load
    };
    let bows = [1e-7, 1e-6, 1e-5, 1e-4];
    let drops = bows.map(drop);
    let exponents: Vec<f64> = drops
        .windows(2)
        .map(|pair| (pair[1] / pair[0]).log10())
        .collect();
    // What separates them from 2/3 is of the order of the drop itself, so it shrinks by 10^(2/3)
    // from pair to pair, and two pairs give the limit.
    let shrink = 10.0_f64.powf(2.0 / 3.0);
    let limit = exponents[0] + (exponents[0] - exponents[1]) / (shrink - 1.0);
    assert!((limit - 2.0 / 3.0).abs() < 5e-5, "{exponents:?}");
    let away: Vec<f64> = exponents.iter().map(|e| 2.0 / 3.0 - e).collect();
    for pair in away.windows(2) {
        assert_relative_eq!(pair[1] / pair[0], shrink, max_relative = 0.05);
    }
    assert_relative_eq!(drops[0], leading(bows[0]), max_relative = 2e-3);
}
