//! The straight column: critical deflection and transverse rate against the closed form, against
//! exact roots, and against the transfer matrix of elastic ends.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod fixture;
mod reference;

use approx::assert_relative_eq;
use coilstay::column::{Column, Idealisation, StraightScan};
use coilstay::criteria::{critical_share, second_share, transverse_rate_ratio};
use coilstay::setup::{Restraint, Setup, Support};
use fixture::setup;
use reference::closed_form;
use reference::elastic_ends::{self, End};
use reference::transverse_rate::transverse_rate;

/// Mesh of every check to 1e-8.
const ELEMENTS: usize = 16;
/// The scan ends at 0.999 of the length: a root beyond is "never" to it.
const LAST: f64 = 0.999;

fn critical(setup: &Setup) -> Option<f64> {
    let mut column = Column::of_setup(setup, Idealisation::WholeLength, ELEMENTS, None);
    StraightScan::new(&mut column)
        .buckling()
        .map(|b| b.shortening)
}

/// The same end for the column: stiffnesses are in k·L² and k, arms in L.
fn support(setup: &Setup, length: f64, end: &End) -> Support {
    let rate = setup.spring.rate();
    Support {
        rotation: Restraint::from_stiffness(end.rotation * rate * length.powi(2)),
        sideways: Restraint::from_stiffness(end.sideways * rate),
        arm: end.arm * length,
        ..Support::clamped()
    }
}

/// Critical share by the column and by the transfer matrix.
fn both_ways(r: f64, slenderness: f64, bottom: &End, top: &End) -> [Option<f64>; 2] {
    let mut case = setup(slenderness, r, Support::clamped(), Support::clamped());
    let length = case.spring.free_length;
    case.bottom = support(&case, length, bottom);
    case.top = support(&case, length, top);
    let column = elastic_ends::Column::of_spring(r, slenderness);
    [
        critical(&case),
        elastic_ends::critical_share(&column, bottom, top).filter(|share| *share < LAST),
    ]
}

fn assert_same(r: f64, slenderness: f64, bottom: &End, top: &End) -> Option<f64> {
    let [column, exact] = both_ways(r, slenderness, bottom, top);
    match (column, exact) {
        (Some(column), Some(exact)) => assert!(
            (column / exact - 1.0).abs() < 1e-8,
            "Λ {slenderness}, r {r}, {bottom:?}, {top:?}: {column} {exact}"
        ),
        (column, exact) => assert_eq!(column, exact, "Λ {slenderness}, r {r}, {bottom:?}, {top:?}"),
    }
    column
}

/// EN 13906-1 buckling clause [M], Shigley critical deflection [S]: 16 elements meet it to 1e-8
/// of itself, for λ ≥ 1.01 of the limit of "never"; and the second root, where the column
/// straightens again.
#[test]
fn meets_the_closed_form() {
    let ends = [
        (Support::clamped(), Support::clamped(), 0.5),
        (Support::clamped(), Support::sliding(), 1.0),
        (Support::hinged(), Support::hinged(), 1.0),
        (Support::clamped(), Support::free(), 2.0),
    ];
    for (bottom, top, alpha) in ends {
        for r in [2.2, 206.0 / 81.5, 2.6, 3.0] {
            let limit = closed_form::never_limit(r);
            for factor in [1.01, 1.02, 1.05, 1.1, 1.2, 1.5, 2.0, 3.0, 5.0, 10.0, 30.0] {
                let setup = setup(factor * limit / alpha, r, bottom, top);
                let length = setup.spring.free_length;
                let section = setup.spring.section(length);
                let formula = critical_share(&section, alpha * length).expect("buckles");
                let mut column =
                    Column::of_setup(&setup, Idealisation::WholeLength, ELEMENTS, None);
                let found = StraightScan::new(&mut column).buckling().expect("buckles");
                assert!(
                    (found.shortening / formula - 1.0).abs() < 1e-8,
                    "α {alpha}, r {r}, factor {factor}: {} {formula}",
                    found.shortening
                );
                let second = second_share(&section, alpha * length).filter(|share| *share < LAST);
                match (found.straightens_again, second) {
                    (Some(column), Some(second)) => {
                        assert_relative_eq!(column, second, max_relative = 1e-8);
                    }
                    (column, second) => {
                        assert_eq!(column, second, "α {alpha}, r {r}, factor {factor}");
                    }
                }
            }
            for factor in [0.5, 0.9, 0.99] {
                let setup = setup(factor * limit / alpha, r, bottom, top);
                assert_eq!(critical(&setup), None, "α {alpha}, r {r}, factor {factor}");
            }
        }
    }
}

/// Clamped–hinged meets the exact root tan q = q a/(a + b), not the formula with 0.7 (EN 13906-1
/// [M]) or 0.707 (Shigley [S]): Λ = 4, 5, 8 [C], and at Λ = 3.5, where the formula says "never",
/// 0.783726 [C]. Its own limit of "never" is where the root reaches ξ = 1: a = 0 there, so q = π,
/// Λ = π r/√(2(2 + r)).
#[test]
fn clamped_hinged_meets_the_exact_root() {
    let column = |slenderness: f64, r: f64| {
        critical(&setup(
            slenderness,
            r,
            Support::clamped(),
            Support::hinged(),
        ))
    };
    for (slenderness, share, half) in [
        (3.5, 0.783_726, 5e-7),
        (4.0, 0.493_316_695_3, 5e-11),
        (5.0, 0.269_854_983_2, 5e-11),
        (8.0, 0.094_273_457_85, 5e-12),
    ] {
        let found = column(slenderness, 2.6).expect("buckles");
        assert!(
            (found - share).abs() < half + 1e-8 * share,
            "Λ {slenderness}: {found}"
        );
        for alpha in [0.7, 0.707] {
            let formula = closed_form::critical_share(2.6, alpha * slenderness);
            assert_eq!(formula.is_none(), slenderness == 3.5);
            assert!(formula.is_none_or(|f| (f / found - 1.0).abs() > 1e-3));
        }
    }
    for r in [2.2, 206.0 / 81.5, 2.6, 3.0] {
        let never = std::f64::consts::PI * r / (2.0 * (2.0 + r)).sqrt();
        for factor in [1.01, 1.05, 1.2, 1.5, 2.0, 3.0, 5.0, 10.0, 30.0] {
            let exact = closed_form::clamped_hinged(r, factor * never).expect("buckles");
            let found = column(factor * never, r).expect("buckles");
            assert_relative_eq!(found, exact, max_relative = 1e-8);
        }
        for factor in [0.5, 0.9, 0.99] {
            assert_eq!(column(factor * never, r), None, "r {r}, factor {factor}");
        }
    }
}

/// Hinged arms beyond the ends, q (h/L) tan(q/2) = a + b: D/d = 8, Λ = 4, arms of 1, 2, 4 wire
/// diameters cost 14.3, 25.1 and 40.4 % of ξ_cr [C]. Inward arms of the same sizes raise it. The
/// root knows the symmetric mode only; the transfer matrix has both.
#[test]
fn hinged_arms_meet_their_root() {
    let plain = closed_form::critical_share(2.6, 4.0).expect("buckles");
    for (arm, cost) in [(1.0, 14.3), (2.0, 25.1), (4.0, 40.4)] {
        let share = arm / 8.0 / 4.0;
        let end = End::HINGED.with_arm(share);
        let found = assert_same(2.6, 4.0, &end, &end).expect("buckles");
        assert!((100.0 * (1.0 - found / plain) - cost).abs() < 0.05);
    }
    for slenderness in [3.2, 4.0, 6.0, 12.0] {
        for arm in [0.2, 0.05, 0.01, -0.01, -0.05, -0.1, -0.2, -0.3] {
            let end = End::HINGED.with_arm(arm);
            let found = assert_same(2.6, slenderness, &end, &end);
            let symmetric = closed_form::hinged_arms(2.6, slenderness, arm);
            if arm > -0.1 {
                let (found, symmetric) = (found.expect("buckles"), symmetric.expect("buckles"));
                assert_relative_eq!(found, symmetric, max_relative = 1e-8);
            } else if let Some(symmetric) = symmetric {
                assert!(found.is_some_and(|f| f <= symmetric * (1.0 + 1e-8)));
            }
        }
    }
}

/// Elastic ends, in rotation and sideways, with and without arms, from 1e-6 to 1e6 of the
/// natural stiffness EI/L or EI/L³.
#[test]
fn elastic_ends_meet_the_transfer_matrix() {
    let inf = f64::INFINITY;
    for (r, slenderness) in [(2.6, 5.0), (206.0 / 81.5, 3.2), (2.6, 9.0)] {
        let natural = natural(r, slenderness);
        for power in [-6, -4, -2, -1, 0, 1, 2, 4, 6] {
            let k = natural * 10.0_f64.powi(power);
            let ends = [
                (End::elastic(k, inf), End::HINGED),
                (End::elastic(k, inf), End::elastic(k, inf)),
                (End::CLAMPED, End::elastic(k, inf)),
                (End::CLAMPED, End::elastic(inf, k)),
                (End::elastic(inf, k), End::HINGED),
                (End::CLAMPED, End::elastic(0.0, k)),
                (End::CLAMPED, End::elastic(k, k)),
                (
                    End::elastic(k, inf).with_arm(-0.04),
                    End::elastic(natural, k).with_arm(0.1),
                ),
            ];
            for (bottom, top) in &ends {
                assert_same(r, slenderness, bottom, top);
            }
        }
    }
}

/// Both ends elastic both ways. Where both are soft the column moves almost as a rigid body and its
/// critical load is the small difference of large stiffnesses: then the round-off of an element's
/// transverse stiffness over that of the softest seat is what can be had, here 1e-8 or better from
/// 1e-3 of the natural stiffness on.
#[test]
fn two_soft_ends_meet_the_transfer_matrix() {
    for (r, slenderness) in [(2.6, 5.0), (206.0 / 81.5, 3.2), (2.6, 9.0)] {
        let natural = natural(r, slenderness);
        for power in [-6, -5, -4, -3, -2, -1, 0, 1, 2, 4, 6] {
            let part = 10.0_f64.powi(power);
            let k = natural * part;
            let n = ELEMENTS as f64;
            let element = 1.0 / (natural / (r * n) + 1.0 / (12.0 * n.powi(3)));
            let tolerance = if power < -3 {
                f64::EPSILON * element / (0.2 * part)
            } else {
                1e-8
            };
            for (bottom, top) in [
                (End::elastic(3.0 * k, k), End::elastic(k, 0.2 * k)),
                (
                    End::elastic(k, 2.0 * k).with_arm(0.05),
                    End::elastic(0.5 * k, k).with_arm(0.02),
                ),
            ] {
                let [column, exact] = both_ways(r, slenderness, &bottom, &top);
                let wrong = match (column, exact) {
                    (Some(column), Some(exact)) => (column / exact - 1.0).abs(),
                    (column, exact) => f64::from(column != exact),
                };
                assert!(
                    wrong < tolerance,
                    "Λ {slenderness}, r {r}, 1e{power}: {column:?} {exact:?}"
                );
            }
        }
    }
}

/// EI/L in k·L², which is EI/L³ in k too.
fn natural(r: f64, slenderness: f64) -> f64 {
    r / (2.0 * (2.0 + r) * slenderness * slenderness)
}

/// Λ = 5 between clamped ends never buckles by the formula; with the top held sideways by 0.5 k it
/// goes at 0.395887, with 2 k at 0.690016 [C]. It goes where the transverse rate is −k_u.
#[test]
fn a_soft_top_seat_goes_where_the_transverse_rate_meets_it() {
    assert_eq!(closed_form::critical_share(2.6, 2.5), None);
    for (stiffness, share) in [(0.5, 0.395_887), (2.0, 0.690_016)] {
        let found = assert_same(
            2.6,
            5.0,
            &End::CLAMPED,
            &End::elastic(f64::INFINITY, stiffness),
        )
        .expect("buckles");
        assert!((found - share).abs() < 6e-7, "{found}");
        let rate = transverse_rate(2.6, 5.0, found);
        assert_relative_eq!(rate, -stiffness, max_relative = 1e-7);
    }
}

/// Stiffnesses of 0 and ∞ are free and held, and very small and very large ones come near.
#[test]
fn elastic_ends_have_the_plain_ones_as_limits() {
    let inf = f64::INFINITY;
    let (r, slenderness) = (2.6, 6.0);
    let unit = natural(r, slenderness);
    let share =
        |bottom: End, top: End| both_ways(r, slenderness, &bottom, &top)[0].expect("buckles");
    type Of = fn(f64) -> End;
    let cases: [(Of, End, f64); 4] = [
        (|k| End::elastic(k, f64::INFINITY), End::HINGED, 0.0),
        (|k| End::elastic(k, f64::INFINITY), End::CLAMPED, inf),
        (|k| End::elastic(f64::INFINITY, k), End::SLIDING, 0.0),
        (|k| End::elastic(f64::INFINITY, k), End::CLAMPED, inf),
    ];
    for (elastic, plain, limit) in cases {
        let want = share(End::CLAMPED, plain);
        assert_eq!(share(End::CLAMPED, elastic(limit)), want);
        let near = if limit == 0.0 { 1e-8 } else { 1e8 };
        let got = share(End::CLAMPED, elastic(near * unit));
        assert_relative_eq!(got, want, max_relative = 1e-6);
        assert!((got > want) == (limit == 0.0), "{got} {want}");
    }
}

/// Dead coils as built are rigid arms of half their height at each end of a column of the active
/// length. Ends kept from turning do not feel them but for the shorter active length; hinges do.
#[test]
fn dead_coils_are_arms() {
    let ends = [
        (End::CLAMPED, End::CLAMPED),
        (End::CLAMPED, End::SLIDING),
        (End::HINGED, End::HINGED),
        (End::CLAMPED, End::HINGED),
        (End::CLAMPED, End::FREE),
        (
            End::elastic(0.03, f64::INFINITY),
            End::elastic(0.01, 0.7).with_arm(0.04),
        ),
    ];
    for slenderness in [5.2, 8.0, 11.0] {
        for (bottom, top) in &ends {
            let mut case = setup(slenderness, 2.6, Support::clamped(), Support::clamped());
            case.spring.total_coils = 11.0;
            case.spring.solid_length = 11.0 * 0.006;
            let active = case.spring.deformable_length();
            let dead = 0.006 / active;
            assert!((case.spring.dead_height() - 0.012).abs() < 1e-15);
            case.bottom = support(&case, active, bottom);
            case.top = support(&case, active, top);
            let mut column = Column::of_setup(&case, Idealisation::AsBuilt, ELEMENTS, None);
            let found = StraightScan::new(&mut column).buckling();
            let spring = elastic_ends::Column::of_spring(2.6, active / case.spring.mean_diameter);
            let with_dead = |end: &End| end.with_arm(end.arm + dead);
            let exact = elastic_ends::critical_share(&spring, &with_dead(bottom), &with_dead(top))
                .filter(|share| *share < LAST);
            assert_eq!(found.is_some(), exact.is_some());
            if let (Some(found), Some(exact)) = (found, exact) {
                assert_relative_eq!(found.shortening, exact, max_relative = 1e-8);
                let same = |end: &End| end.rotation.is_infinite();
                let arms_matter = elastic_ends::critical_share(&spring, bottom, top)
                    .is_none_or(|without| (without / exact - 1.0).abs() > 1e-6);
                assert_eq!(arms_matter, !(same(bottom) && same(top)));
            }
        }
    }
}

/// Transverse rate under load, EN 13906-1 [M] and Haringx, Philips Res. Rep. 4 (1949) 49–80 [M]:
/// a unit push on the top of the column between parallel ends, against the printed formula and
/// against the reference's own writing of it. Figures at E/G = 2.6 [C].
#[test]
fn meets_the_transverse_rate() {
    let rate = |slenderness: f64, r: f64, shares: &[f64]| -> Vec<f64> {
        let setup = setup(slenderness, r, Support::clamped(), Support::sliding());
        let mut column = Column::of_setup(&setup, Idealisation::WholeLength, ELEMENTS, None);
        let unit = column.scale.stiffness() / setup.spring.rate();
        let mut scan = StraightScan::new(&mut column);
        let rate = |share: &f64| scan.transverse_rate(*share) * unit;
        shares.iter().map(rate).collect()
    };
    let shares = [1e-9, 0.1, 0.2, 0.4];
    for (slenderness, printed) in [
        (
            2.0,
            [0.639_344_262, 0.631_787_158, 0.628_003_029, 0.641_586_716],
        ),
        (
            3.0,
            [0.329_113_924, 0.268_571_827, 0.198_050_683, 0.018_050_882_1],
        ),
    ] {
        for (found, printed) in rate(slenderness, 2.6, &shares).iter().zip(printed) {
            assert!((found - printed).abs() < 2e-9, "{found} {printed}");
        }
    }
    let shares: Vec<f64> = (1..=18).map(|i| 0.05 * f64::from(i)).collect();
    for r in [2.2, 206.0 / 81.5, 2.6, 3.0] {
        for slenderness in [0.5, 1.0, 2.0, 3.0, 4.0, 6.0] {
            for (share, found) in shares.iter().zip(rate(slenderness, r, &shares)) {
                let formula = transverse_rate_ratio(slenderness, r, *share);
                let exact = transverse_rate(r, slenderness, *share);
                for want in [formula, exact] {
                    // Near its pole the rate itself means little: its reciprocal does.
                    let wrong = (found - want).abs().min((1.0 / found - 1.0 / want).abs());
                    assert!(
                        wrong < 1e-8 * want.abs().min(1.0),
                        "Λ {slenderness}, r {r}, ξ {share}: {found} {want}"
                    );
                }
            }
        }
    }
}

/// The transverse rate falls to zero where clamped, clamped–sliding ends are critical.
#[test]
fn transverse_rate_vanishes_at_the_critical_deflection() {
    for r in [2.2, 2.6, 3.0] {
        for factor in [1.05, 1.2, 2.0, 5.0] {
            let slenderness = factor * closed_form::never_limit(r);
            let setup = setup(slenderness, r, Support::clamped(), Support::sliding());
            let mut column = Column::of_setup(&setup, Idealisation::WholeLength, ELEMENTS, None);
            let formula = closed_form::critical_share(r, slenderness).expect("buckles");
            let scan = std::cell::RefCell::new(StraightScan::new(&mut column));
            let rate = |share: f64| scan.borrow_mut().transverse_rate(share);
            let zero = reference::root::bisect(rate, 0.9 * formula, 1.02 * formula);
            assert_relative_eq!(zero, formula, max_relative = 1e-8);
        }
    }
}

/// Shigley's Mechanical Engineering Design, the worked spring of music wire with d = 0.037 in,
/// D = 0.400 in, L0 = 2.06 in, 12.5 coils, squared ends, pressed by 1.56 in (from memory). The rule
/// of thumb L0 < 2.63 D/α = 2.10 in calls it stable; with the moduli of its own wire size, 29.0 and
/// 11.85 Mpsi (seen), the limit is 2.0276 in and it buckles at 0.696 L0 (independent program).
#[test]
fn the_worked_spring_of_the_handbook_buckles() {
    let text = r#"
        [spring]
        wire = "0.037 in"
        mean_diameter = "0.400 in"
        free_length = "2.06 in"
        total_coils = 12.5
        ends = "closed"
        [material]
        name = "music-wire-to-0.063in"
        [bottom]
        kind = "clamped"
        [top]
        kind = "clamped"
        [duty]
        working_deflection = "1.56 in"
    "#;
    let case = coilstay::case::parse("worked.toml", text).expect("reads");
    let answer = coilstay::assess::assess(&case.setup, "worked.toml");
    let inch = 0.0254;
    let formula = &answer.closed_form.curves[0];
    let limit = formula.absolute_stability_below_m.expect("m > 1/2") / inch;
    assert!((limit - 2.0276).abs() < 5e-5, "{limit}");
    let share = formula.critical_deflection_m.expect("buckles") / case.setup.spring.free_length;
    assert!((share - 0.696).abs() < 5e-4, "{share}");
    let column = answer
        .straight_column
        .critical_deflection_m
        .expect("buckles");
    assert!((column / formula.critical_deflection_m.expect("buckles") - 1.0).abs() < 1e-8);
    assert_eq!(answer.verdict, coilstay::result::Verdict::DoesNotHold);
}
