//! The reference computations of the straight column against published values, so that what the
//! program is compared with has been compared itself.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod reference;

use approx::assert_relative_eq;
use reference::closed_form::{
    clamped_hinged, clamped_link, critical_share, hinged_arms, never_limit, peak_share,
    straightening_share, wave_number,
};
use reference::elastic_ends::{self, Column, End};
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
        (
            End::elastic(0.05, inf),
            End {
                rotation: 0.01,
                ..End::strut(0.7).with_arm(0.04)
            },
        ),
        (
            End::elastic(inf, 0.9).with_arm(-0.02),
            End::hanger(0.4).with_arm(0.06),
        ),
        (
            End::hanger(0.3).with_arm(0.02),
            End::elastic(0.04, 0.6).with_arm(0.1),
        ),
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
    assert!(found >= 20, "{found}");
}

/// A link at the top of a clamped column against its own equation, and at its limits: very long it
/// is the free end; a short hanger holds the end sideways; a hanger as long as the shortened column
/// sends the load through the foot, where the column goes as hinged at both ends (Timoshenko &
/// Gere, load through a fixed point [M]).
#[test]
fn links_meet_their_equation_and_their_limits() {
    for r in STEELS {
        for slenderness in [1.5, 2.5, 3.0, 4.0, 6.0, 10.0] {
            let column = Column::of_spring(r, slenderness);
            let by = |top: End| elastic_ends::critical_share(&column, &End::CLAMPED, &top);
            for length in [0.01, 0.1, 0.5, 1.0, 3.0, 20.0] {
                for (top, hanging) in [(End::strut(length), false), (End::hanger(length), true)] {
                    let exact = clamped_link(r, slenderness, length, hanging);
                    meet(by(top), exact, 1e-10);
                    let turned = elastic_ends::critical_share(&column, &top, &End::CLAMPED);
                    meet(turned, exact, 1e-10);
                }
            }
            let free = critical_share(r, 2.0 * slenderness);
            meet(by(End::strut(1e9)), free, 1e-8);
            meet(by(End::hanger(1e9)), free, 1e-8);
            if let Some(held) = clamped_hinged(r, slenderness) {
                meet(by(End::hanger(1e-9)), Some(held), 1e-7);
            }
            if let Some(hinged) = critical_share(r, slenderness).filter(|share| *share < 1.0) {
                meet(by(End::hanger(1.0 - hinged)), Some(hinged), 1e-10);
            }
            // The stiffer the link stands by the column, the later it goes.
            let order = [
                by(End::strut(0.1)),
                by(End::strut(1.0)),
                free,
                by(End::hanger(1.0)),
                by(End::hanger(0.1)),
            ];
            for pair in order.windows(2) {
                assert!(
                    pair[0].unwrap_or(1.0) <= pair[1].unwrap_or(1.0),
                    "{order:?}"
                );
            }
        }
    }
    // A strut of no length: the end goes when P/ℓ is its transverse rate.
    let column = Column::of_spring(2.6, 4.0);
    let share = elastic_ends::critical_share(&column, &End::CLAMPED, &End::strut(1e-7));
    let rate = 1.0 / (1.0 / (3.0 * column.bending) + 1.0 / column.shear);
    meet(share, Some(1e-7 * rate), 1e-5);
}

/// Links at both ends. Two struts, or a strut on a hinge, are a mechanism from the start. A column
/// between two hangers of length ℓ, or between a hinge and one, falls over as a rigid body
/// as soon as it is shorter than both together allow: 1 − ξ = 2ℓ/L and 1 − ξ = ℓ/L.
#[test]
fn links_without_a_clamped_end() {
    for slenderness in [2.0, 4.0, 8.0] {
        let column = Column::of_spring(2.6, slenderness);
        let by = |bottom: End, top: End| elastic_ends::critical_share(&column, &bottom, &top);
        for (bottom, top) in [
            (End::HINGED, End::strut(0.5)),
            (End::strut(0.5), End::strut(2.0)),
            (End::HINGED, End::hanger(1.2)),
        ] {
            assert_eq!(by(bottom, top), Some(0.0), "{bottom:?} {top:?}");
        }
        let bends = critical_share(2.6, slenderness).unwrap_or(1.0);
        for (bottom, top, length) in [
            (End::hanger(0.45), End::hanger(0.45), 0.9),
            (End::hanger(0.1), End::hanger(0.1), 0.2),
            (End::HINGED, End::hanger(0.7), 0.7),
            (End::HINGED, End::hanger(0.3), 0.3),
            (End::hanger(0.3), End::HINGED, 0.3),
        ] {
            let want = bends.min(1.0 - length);
            meet(by(bottom, top), Some(want), 1e-7);
        }
    }
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

fn meet(got: Option<f64>, want: Option<f64>, relative: f64) {
    match (got, want) {
        (Some(got), Some(want)) => assert_relative_eq!(got, want, max_relative = relative),
        (None, None) => {}
        other => panic!("one of the two never goes: {other:?}"),
    }
}
