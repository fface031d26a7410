//! What happens at and after the critical deflection: slopes of the branch, the load that
//! imperfections take off, and how each measure of "critical" tends to the straight column's as
//! imperfections go to nought.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod fixture;
mod reference;

use approx::assert_relative_eq;
use coilstay::assess::assess;
use coilstay::column::{Column, Deviations, Idealisation, StraightScan};
use coilstay::result::{Assessment, Limit};
use coilstay::setup::{BowShape, LimitKind, Loading, Orientation, Setup, Support};
use coilstay::solve::{
    Newton, Outcome, PathPoint, PathSettings, branch_point, crosses_another, follow, locate, start,
};
use fixture::setup;
use reference::after_buckling;
use reference::closed_form::critical_share;
use std::f64::consts::PI;

const ELEMENTS: usize = 16;

/// Ends that leave H = 0: end constant, supports, and the node share with the largest rotation.
fn ends() -> [(f64, Support, Support, usize); 4] {
    [
        (1.0, Support::hinged(), Support::hinged(), 0),
        (0.5, Support::clamped(), Support::clamped(), ELEMENTS / 4),
        (1.0, Support::clamped(), Support::sliding(), ELEMENTS / 2),
        (2.0, Support::clamped(), Support::free(), ELEMENTS),
    ]
}

/// Slopes d(P/EA)/dθ0² and dξ/dθ0² of the branch the column takes: two small rotations,
/// extrapolated to none.
fn slopes(setup: &Setup, place: usize) -> [f64; 2] {
    let mut column = Column::of_setup(setup, Idealisation::WholeLength, ELEMENTS, None);
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let mut points = vec![start(&mut column, &mut newton, &guess, 0.0).expect("unloaded")];
    let settings = PathSettings::default();
    let (outcome, _) = follow(&mut column, &mut newton, &mut points, &settings, |points| {
        let n = points.len();
        n > 1 && crosses_another(&points[n - 2], &points[n - 1])
    });
    assert_eq!(outcome, Outcome::Stopped);
    let after = points.len() - 2;
    let found = branch_point(&mut column, &mut newton, &points, after, 1e-12).expect("crosses");
    let turn = |point: &PathPoint<3, 5>| point.state.nodes[place][2].abs();
    let mut points = vec![found.turned(1.0)];
    let small = PathSettings {
        first_step: 1e-4,
        largest_step: 3e-3,
        ..settings
    };
    let (outcome, _) = follow(&mut column, &mut newton, &mut points, &small, |points| {
        turn(&points[points.len() - 1]) > 0.021
    });
    assert_eq!(outcome, Outcome::Stopped);
    let compliance = column.axial_compliance();
    let critical = StraightScan::new(&mut column.clone())
        .buckling()
        .expect("buckles")
        .shortening;
    let mut slope = |target: f64| {
        let missing = |point: &PathPoint<3, 5>| target - turn(point);
        let after = points
            .iter()
            .position(|p| missing(p) <= 0.0)
            .expect("turns")
            - 1;
        let found = locate(&mut column, &mut newton, &points, after, 1e-15, missing)
            .expect("changes sign")
            .point;
        let square = turn(&found).powi(2);
        [
            (found.load * compliance - critical) / square,
            (1.0 - found.state.nodes[ELEMENTS][0] - critical) / square,
        ]
    };
    let (near, far) = (slope(0.01), slope(0.02));
    [0, 1].map(|i| (4.0 * near[i] - far[i]) / 3.0)
}

/// Slopes d(P/EA)/dθ0² = ξ_cr(1 − 4z)/(8(1 − 2z)) and dξ/dθ0² = that + (1 − 2z)/4, z = mξ_cr
/// (derived in the reference): the branch leaves with them, falling or rising.
#[test]
fn the_branch_leaves_with_the_slopes_of_theory() {
    for r in [2.6, 206.0 / 81.5] {
        for effective in [2.7, 2.9, 4.0, 10.0] {
            let critical = critical_share(r, effective).expect("buckles");
            let want = [
                after_buckling::load_slope(r, critical),
                after_buckling::share_slope(r, critical),
            ];
            for (constant, bottom, top, place) in ends() {
                let setup = setup(effective / constant, r, bottom, top);
                let got = slopes(&setup, place);
                for i in 0..2 {
                    assert_relative_eq!(got[i], want[i], max_relative = 1e-6, epsilon = 1e-8);
                }
            }
        }
    }
}

/// The load falls after buckling for λ < 3.0256 and the shortening too for λ < 2.7635, at
/// E/G = 2.6; for 206/81.5 below 2.9799 and 2.7231 [C].
#[test]
fn load_and_shortening_fall_below_their_slenderness() {
    for (r, falls) in [(2.6, [3.0256, 2.7635]), (206.0 / 81.5, [2.9799, 2.7231])] {
        for (i, limit) in falls.into_iter().enumerate() {
            for (away, sign) in [(-2e-4, -1.0), (2e-4, 1.0)] {
                let effective = limit + away;
                for (constant, bottom, top, place) in ends() {
                    let setup = setup(effective / constant, r, bottom, top);
                    let slope = slopes(&setup, place)[i];
                    assert!(slope * sign > 0.0, "λ {effective}, {i}: {slope}");
                }
            }
        }
    }
}

/// The load that is lost, in EA, of a hinged column with this bow or eccentricity, in L0, on the
/// same mesh as the critical load of the perfect one; and that critical load.
fn lost_load(slenderness: f64, bow: f64, eccentricity: f64) -> [f64; 2] {
    let mut case = setup(slenderness, 2.6, Support::hinged(), Support::hinged());
    let length = case.spring.free_length;
    case.imperfections.bow = bow * length;
    case.imperfections.eccentricity = eccentricity * length;
    let mut perfect = Column::of_setup(&case, Idealisation::AsBuilt, ELEMENTS, None);
    let compliance = perfect.axial_compliance();
    let critical = StraightScan::new(&mut perfect).buckling().expect("buckles");
    let deviations = Deviations {
        sizes: &case.imperfections,
        orientation: Orientation::plain(),
        mode: None,
    };
    let mut column = Column::of_setup(&case, Idealisation::AsBuilt, ELEMENTS, Some(&deviations));
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let mut points = vec![start(&mut column, &mut newton, &guess, 0.0).expect("unloaded")];
    let settings = PathSettings::default();
    let (outcome, _) = follow(&mut column, &mut newton, &mut points, &settings, |points| {
        points[points.len() - 1].load_direction < 0.0
    });
    assert_eq!(outcome, Outcome::Stopped);
    let after = points.len() - 2;
    let lost = locate(&mut column, &mut newton, &points, after, 1e-14, |point| {
        point.load_direction
    })
    .expect("changes sign");
    [lost.point.load * compliance, critical.load * compliance]
}

/// Koiter (1945; [M]): where the load falls after buckling, a small imperfection of size A takes
/// off the load that is lost as A^(2/3). αΛ = 2.85 is 5 % below the change at 3.0256. The local
/// exponent tends to 2/3 with the drop itself, over bows and eccentricities of 1e-7 to 1e-4 of L0.
///
/// The factor: near the bifurcation θ0 (p_cr + c θ0² − p) n = θ_free p_cr (1 − z), n = 1 − 2z,
/// θ_free = πA/L, whose largest p is p_cr − (3/2)(2|c|)^(1/3) (θ_free p_cr (1 − z)/n)^(2/3). An
/// eccentricity e does the work 2 P e θ0 on the mode where the bow does P(1 − z) A π θ0/2: it
/// counts as a bow of 4e/(π(1 − z)).
#[test]
fn imperfections_take_off_load_as_koiter_says() {
    let slenderness = 2.85;
    assert!(slenderness < 0.95 * after_buckling::load_falls_below(2.6));
    let critical = critical_share(2.6, slenderness).expect("buckles");
    let z = (1.0 - 1.0 / 2.6) * critical;
    let leading = |bow: f64| {
        let push = PI * bow * critical * (1.0 - z) / (1.0 - 2.0 * z);
        let falling = -after_buckling::load_slope(2.6, critical);
        1.5 * (2.0 * falling).cbrt() * push.powf(2.0 / 3.0)
    };
    let sizes = [1e-7, 1e-6, 1e-5, 1e-4];
    for eccentric in [false, true] {
        let drops = sizes.map(|size| {
            let (bow, eccentricity) = if eccentric { (0.0, size) } else { (size, 0.0) };
            let [lost, critical] = lost_load(slenderness, bow, eccentricity);
            critical - lost
        });
        let exponents: Vec<f64> = drops
            .windows(2)
            .map(|pair| (pair[1] / pair[0]).log10())
            .collect();
        // What separates them from 2/3 is of the order of the drop itself, so it shrinks by
        // 10^(2/3) from pair to pair, and two pairs give the limit.
        let shrink = 10.0_f64.powf(2.0 / 3.0);
        let limit = exponents[0] + (exponents[0] - exponents[1]) / (shrink - 1.0);
        assert!((limit - 2.0 / 3.0).abs() < 5e-5, "{exponents:?}");
        let away: Vec<f64> = exponents.iter().map(|e| 2.0 / 3.0 - e).collect();
        for pair in away.windows(2) {
            assert_relative_eq!(pair[1] / pair[0], shrink, max_relative = 0.05);
        }
        let as_bow = if eccentric {
            4.0 / (PI * (1.0 - z))
        } else {
            1.0
        };
        assert_relative_eq!(drops[0], leading(as_bow * sizes[0]), max_relative = 2e-3);
    }
}

fn limit(answer: &Assessment, kind: LimitKind) -> &Limit {
    let mut limits = answer.limits.iter();
    limits.find(|limit| limit.name == kind).expect("is listed")
}

fn reached(answer: &Assessment, kind: LimitKind) -> Option<f64> {
    limit(answer, kind).share_of_free_length
}

/// A spring of so few coils that solid is far.
fn open(slenderness: f64, bottom: Support, top: Support) -> Setup {
    let mut case = setup(slenderness, 2.6, bottom, top);
    (case.spring.active_coils, case.spring.total_coils) = (2.0, 2.0);
    case.spring.solid_length = 2.0 * 0.006;
    case
}

/// Hinged, bowed by `bow` of L0.
fn bowed(slenderness: f64, bow: f64) -> Setup {
    let mut case = open(slenderness, Support::hinged(), Support::hinged());
    case.imperfections.bow = bow * case.spring.free_length;
    case
}

/// The load lost and Southwell's estimate tend to the straight column's critical deflection.
#[test]
fn lost_load_and_southwell_tend_to_the_critical_deflection() {
    let critical = critical_share(2.6, 2.85).expect("buckles");
    let mut before: Option<[f64; 3]> = None;
    for bow in [1e-3, 1e-4, 1e-5, 1e-6] {
        let mut case = bowed(2.85, bow);
        case.duty.loading = Loading::Force;
        let answer = assess(&case, "");
        let straight = reached(&answer, LimitKind::Critical).expect("buckles");
        assert_relative_eq!(straight, critical, max_relative = 1e-8);
        let lost = limit(&answer, LimitKind::DeadLoadLost);
        let (at, force) = (lost.share_of_free_length, lost.force_n);
        let (at, force) = at.zip(force).expect("is lost");
        let southwell = answer.imperfect_column.and_then(|c| c.southwell);
        let estimate = southwell.expect("estimates").deflection_m / case.spring.free_length;
        // Less load than critical is carried, at more or less than its deflection.
        let share = force / (case.spring.rate() * case.spring.free_length);
        assert!(share < critical, "{bow}: {share}");
        let away = [at, share, estimate].map(|value| (value / critical - 1.0).abs());
        // At this slenderness the bow makes up for almost all of what is lost in deflection.
        assert!(away[0] < away[1], "{bow}: {away:?}");
        if let Some(before) = before {
            // The load's drop, as A^(2/3), and the estimate's error, as A² here.
            for i in 1..3 {
                assert!(away[i] < 0.3 * before[i], "{bow}: {away:?} {before:?}");
            }
        }
        before = Some(away);
    }
    let last = before.expect("went through");
    assert!(
        last[0] < 2e-4 && last[1] < 4e-4 && last[2] < 1e-6,
        "{last:?}"
    );
}

/// A set travel is lost too where the shortening falls after buckling, λ < 2.7635, and tends to the
/// critical deflection; for longer columns it is not lost at all, while a dead load still is.
#[test]
fn set_travel_is_lost_where_the_shortening_falls() {
    let case = |slenderness: f64, bow: f64, loading: Loading| {
        let mut case = bowed(slenderness, bow);
        case.duty.loading = loading;
        assess(&case, "")
    };
    let mut before = f64::INFINITY;
    for bow in [1e-4, 1e-5, 1e-6] {
        let answer = case(2.70, bow, Loading::Deflection);
        let critical = reached(&answer, LimitKind::Critical).expect("buckles");
        let lost = reached(&answer, LimitKind::TravelLost).expect("is lost");
        let away = critical - lost;
        assert!(away > 0.0 && away < 0.3 * before, "{bow}: {away}");
        before = away;
        let answer = case(2.85, bow, Loading::Deflection);
        assert_eq!(reached(&answer, LimitKind::TravelLost), None);
        let answer = case(2.85, bow, Loading::Force);
        assert!(reached(&answer, LimitKind::DeadLoadLost).is_some());
        let answer = case(3.2, bow, Loading::Force);
        assert_eq!(reached(&answer, LimitKind::DeadLoadLost), None);
    }
    assert!(before < 2e-3);
}

/// The bow limit tends to the critical deflection only when the limit goes to nought too: hinged,
/// Λ = 4, a limit of 0.1 D sits at 0.2002, not 0.1986, however small the imperfection [C]. What is
/// between them goes with the square of the limit: on the branch y = (1 − z) θ0 L/π, and
/// dξ/dθ0² is known.
#[test]
fn bow_limit_tends_to_the_critical_deflection_with_the_limit() {
    let critical = critical_share(2.6, 4.0).expect("buckles");
    assert!((critical - 0.1986).abs() < 5e-5);
    let z = (1.0 - 1.0 / 2.6) * critical;
    let slope = after_buckling::share_slope(2.6, critical);
    for part in [0.1, 0.05, 0.025, 0.0125] {
        let at = [1e-7, 1e-8].map(|bow| {
            let mut case = bowed(4.0, bow);
            case.duty.bow_limit = part * case.spring.mean_diameter;
            reached(&assess(&case, ""), LimitKind::Bow).expect("is reached")
        });
        // Linear in so small a bow: extrapolated to none.
        let none = at[1] + (at[1] - at[0]) / 9.0;
        let turn = part / 4.0 * PI / (1.0 - z);
        if part == 0.1 {
            assert!(at.iter().all(|at| (at - 0.2002).abs() < 6e-5), "{at:?}");
        }
        assert_relative_eq!(
            none - critical,
            slope * turn.powi(2),
            max_relative = turn.powi(2)
        );
    }
}

/// The rate lost tends to the critical deflection, as A^(2/3), for a share below the drop of rate
/// after buckling only: hinged, 8.2 % of the rate is left at λ = 4, 1.4 % at λ = 10 [C].
#[test]
fn rate_lost_tends_to_the_critical_deflection_below_the_drop() {
    for (slenderness, left) in [(4.0, 0.082), (10.0, 0.014)] {
        let critical = critical_share(2.6, slenderness).expect("buckles");
        let exact = after_buckling::rate_left(2.6, critical);
        assert!((exact - left).abs() < 5e-4);
        for (share, tends) in [
            (0.05, true),
            (1.0 - 1.1 * left, true),
            (1.0 - 0.9 * left, false),
        ] {
            let away = [1e-4, 1e-5, 1e-6].map(|bow| {
                let mut case = bowed(slenderness, bow);
                case.duty.rate_loss_share = share;
                let answer = assess(&case, "");
                assert!(answer.failures.is_empty(), "{:?}", answer.failures);
                reached(&answer, LimitKind::RateLost).map(|at| (at / critical - 1.0).abs())
            });
            match away {
                [Some(a), Some(b), Some(c)] if tends => {
                    assert!(b < 0.3 * a && c < 0.3 * b && c < 0.1, "{share}: {away:?}");
                }
                away => assert!(
                    !tends && away.iter().flatten().all(|away| *away > 0.05),
                    "{share}: {away:?}"
                ),
            }
        }
    }
}

/// Southwell (1932; [M]) for a spring: a free bow in the shape of the mode, H = 0, grows as
/// q_cr/(q_cr − q_S), q_S = ξ(1 − mξ), exactly in the linear column: then his line has no scatter
/// and its slope is the critical deflection, wherever it was read off.
#[test]
fn southwells_line_is_exact_for_a_bow_like_the_mode() {
    for (constant, bottom, top, _) in ends() {
        for effective in [2.7, 8.0] {
            let mut case = open(effective / constant, bottom, top);
            case.imperfections.bow = 1e-7 * case.spring.free_length;
            case.imperfections.bow_shape = BowShape::FirstMode;
            let answer = assess(&case, "");
            let critical = reached(&answer, LimitKind::Critical).expect("buckles");
            let column = answer.imperfect_column.expect("has a path");
            let southwell = column.southwell.expect("estimates");
            let estimate = southwell.deflection_m / case.spring.free_length;
            assert_relative_eq!(estimate, critical, max_relative = 1e-8);
            assert!(southwell.r_squared > 1.0 - 1e-12);
            // The rotations' own growth, point by point.
            let grown = |share: f64| share * (1.0 - (1.0 - 1.0 / 2.6) * share);
            let free = column.path.points[0].top_rotation_rad;
            for point in &column.path.points {
                let share = point.force_n / (case.spring.rate() * case.spring.free_length);
                if share > 0.9 * critical {
                    break;
                }
                let growth = grown(critical) / (grown(critical) - grown(share));
                assert_relative_eq!(
                    point.top_rotation_rad,
                    free * growth,
                    max_relative = 1e-7,
                    epsilon = 1e-14
                );
            }
        }
    }
}
