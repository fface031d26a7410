//! Each law goes to its neighbours as its parameter goes to its ends, and the critical deflections of
//! columns on links.

use crate::fixture::setup;
use crate::flat::flat;
use crate::reference::{closed_form, elastic_ends};
use crate::walk::{Point, Walk};
use coilstay::column::{Column, Idealisation, StraightScan};
use coilstay::setup::{Curve, Link, Restraint, Setup, Support};
use elastic_ends::End;

const ELEMENTS: usize = 16;

/// A bowed spring between these ends.
fn bowed(slenderness: f64, bottom: Support, top: Support) -> Setup {
    let mut case = setup(slenderness, 2.6, bottom, top);
    case.imperfections.bow = 0.01 * case.spring.free_length;
    case
}

/// Largest difference of load and end rotations of two columns over travels up to `last`.
fn apart(one: &Setup, two: &Setup, last: f64) -> f64 {
    let [one, two] = [one, two].map(|case| Walk::to(case, ELEMENTS, last * 1.01));
    let mut worst: f64 = 0.0;
    for i in 1..=10 {
        let travel = last * f64::from(i) / 10.0;
        let (a, b) = (one.at(travel), two.at(travel));
        worst = worst.max((one.load(&a) - two.load(&b)).abs());
        for (a, b) in one.turns(&a.state).iter().zip(two.turns(&b.state)) {
            worst = worst.max((a - b).abs());
        }
    }
    worst
}

/// The larger the ring, the later it lifts off; until then the end is clamped, and a ring that never
/// lifts off is a clamped end all the way.
#[test]
fn a_flat_end_goes_to_clamped_as_its_ring_grows() {
    let clamped = Walk::to(
        &bowed(6.0, Support::clamped(), Support::clamped()),
        ELEMENTS,
        0.5,
    );
    let mut before = 0.0;
    for radius in [0.15, 0.2, 0.3, 0.5, 0.8, 1.2, 2.0] {
        let case = bowed(6.0, flat(radius, 0.0), flat(radius, 0.0));
        let mut walk = Walk::new(&case, ELEMENTS);
        let lifted = |walk: &Walk, point: &Point| {
            walk.presses(&point.state)
                .iter()
                .any(|press| press.turned != 0.0)
        };
        walk.until(0.02, |walk, point| !lifted(walk, point));
        walk.until(0.02, |walk, point| {
            walk.travel(point) > 0.5 || lifted(walk, point)
        });
        // It sits down early, from where it is the clamped column.
        let flush: Vec<_> = walk
            .points
            .iter()
            .filter(|point| !lifted(&walk, point))
            .collect();
        for point in &flush {
            let travel = walk.travel(point);
            if travel < 0.499 {
                let there = clamped.at(travel);
                let (one, two) = (walk.load(point), clamped.load(&there));
                assert!((one - two).abs() < 1e-11, "{radius}: {one} {two}");
                let (one, two) = (walk.moments(&point.state), clamped.moments(&there.state));
                assert!((one[0] - two[0]).abs() < 1e-11, "{radius}: {one:?} {two:?}");
            }
        }
        let reached = walk.travel(flush[flush.len() - 1]);
        assert!(
            reached > before || reached > 0.49,
            "{radius}: {reached} {before}"
        );
        before = reached;
    }
    assert!(before > 0.5, "{before}");
}

/// A ring of no size is a hinge; what is left falls with it.
#[test]
fn a_flat_end_goes_to_hinged_as_its_ring_shrinks() {
    let hinged = bowed(5.0, Support::hinged(), Support::hinged());
    let mut before = f64::INFINITY;
    for radius in [1e-3, 1e-4, 1e-5, 1e-6] {
        let case = bowed(5.0, flat(radius, 0.0), flat(radius, 0.0));
        let apart = apart(&case, &hinged, 0.4);
        assert!(apart < 0.15 * before, "{radius}: {apart} {before}");
        before = apart;
    }
    assert!(before < 1e-5, "{before}");
}

/// A measured law that is a straight line is the linear one.
#[test]
fn a_straight_law_is_an_elastic_one() {
    let base = setup(4.0, 2.6, Support::clamped(), Support::clamped());
    let (rate, length) = (base.spring.rate(), base.spring.free_length);
    let line = |stiffness: f64, most: f64| {
        let points = [0.0, 0.3, 0.5, 1.0].map(|x| (x * most, x * most * stiffness));
        Restraint::Progressive(Curve::odd(&points).expect("rises"))
    };
    let (turn, aside) = (0.02 * rate * length * length, 0.8 * rate);
    // Also beyond the last point of the table.
    for most in [1.0, 0.02] {
        let soft = |rotation: Restraint, sideways: Restraint| Support {
            rotation,
            sideways,
            tilt: 0.01,
            offset: 0.0005,
            arm: 0.002,
            ..Support::clamped()
        };
        let elastic = soft(Restraint::Elastic(turn), Restraint::Elastic(aside));
        let measured = soft(line(turn, most), line(aside, most * length));
        let at_top = |support| bowed(4.0, Support::clamped(), support);
        let at_bottom = |support| bowed(4.0, support, Support::hinged());
        for (one, two) in [
            (at_top(elastic), at_top(measured)),
            (at_bottom(elastic), at_bottom(measured)),
        ] {
            let apart = apart(&one, &two, 0.4);
            assert!(apart < 1e-11, "{apart:e}");
            assert_eq!(critical(&one).is_some(), critical(&two).is_some());
            if let (Some(one), Some(two)) = (critical(&one), critical(&two)) {
                assert!((one - two).abs() < 1e-11, "{one} {two}");
            }
        }
    }
}

fn critical(setup: &Setup) -> Option<f64> {
    let mut column = Column::of_setup(setup, Idealisation::WholeLength, ELEMENTS, None);
    StraightScan::new(&mut column)
        .buckling()
        .map(|buckling| buckling.shortening)
}

/// A top hinged to a link whose length is given in L.
fn linked(length: f64, hanging: bool, slenderness: f64) -> Support {
    Support {
        link: Some(Link {
            length: length * slenderness * 0.05,
            hanging,
        }),
        ..Support::free()
    }
}

/// A very long link leaves its end free sideways, as strut from below and as hanger from above; what is
/// left falls with the length.
#[test]
fn a_long_link_leaves_its_end_free() {
    let slenderness = 3.0;
    let free = bowed(slenderness, Support::clamped(), Support::free());
    for hanging in [false, true] {
        let mut before = f64::INFINITY;
        for length in [1e2, 1e3, 1e4, 1e5] {
            let case = bowed(
                slenderness,
                Support::clamped(),
                linked(length, hanging, slenderness),
            );
            let apart = apart(&case, &free, 0.3);
            assert!(apart < 0.12 * before, "{length}: {apart} {before}");
            before = apart;
            let [linked, free] = [&case, &free].map(|case| critical(case).expect("goes"));
            assert_eq!(linked > free, hanging);
            assert!((linked / free - 1.0).abs() < 2.0 / length);
        }
        assert!(before < 1e-4, "{before}");
    }
}

/// Struts and hangers at the top of a clamped column against the exact roots; at either end, with other
/// ends and arms, against the transfer matrix.
#[test]
fn linked_columns_meet_the_exact_roots() {
    let mut gone = 0;
    for r in [2.2, 206.0 / 81.5, 2.6] {
        for slenderness in [1.5, 2.5, 4.0, 8.0] {
            for length in [0.1, 0.4, 0.8, 1.0, 2.0, 10.0] {
                for hanging in [false, true] {
                    let top = linked(length, hanging, slenderness);
                    let case = setup(slenderness, r, Support::clamped(), top);
                    let exact = closed_form::clamped_link(r, slenderness, length, hanging);
                    same(&case, exact, 1e-8);
                    gone += usize::from(exact.is_some());
                    let link = if hanging {
                        End::hanger(length)
                    } else {
                        End::strut(length)
                    };
                    let column = elastic_ends::Column::of_spring(r, slenderness);
                    let (free_length, rate) = (case.spring.free_length, case.spring.rate());
                    for arm in [-0.03, 0.0, 0.06] {
                        let far = End::elastic(0.02, 1.7).with_arm(0.02);
                        let soft = Support {
                            rotation: Restraint::Elastic(0.02 * rate * free_length.powi(2)),
                            sideways: Restraint::Elastic(1.7 * rate),
                            arm: 0.02 * free_length,
                            ..Support::clamped()
                        };
                        let on_link = Support {
                            arm: arm * free_length,
                            ..top
                        };
                        let exact =
                            elastic_ends::critical_share(&column, &far, &link.with_arm(arm));
                        same(&setup(slenderness, r, soft, on_link), exact, 1e-8);
                        same(&setup(slenderness, r, on_link, soft), exact, 1e-8);
                    }
                }
            }
        }
    }
    assert!(gone > 60, "{gone}");
}

/// Critical share by the column and exactly; its scan ends at 0.999 of the length.
fn same(case: &Setup, exact: Option<f64>, close: f64) {
    match (critical(case), exact.filter(|share| *share < 0.999)) {
        (Some(found), Some(exact)) => assert!(
            (found / exact - 1.0).abs() < close,
            "{:?} {:?}: {found} {exact}",
            case.bottom,
            case.top
        ),
        (found, exact) => assert_eq!(found, exact, "{:?} {:?}", case.bottom, case.top),
    }
}
