//! What the supports do to the answer: sensitivities against exact roots, two lateral planes,
//! measured laws of axial seats by hand.

use coilstay::assess::assess;
use coilstay::result::{Assessment, LimitKind, PathPoint, SupportSensitivity};
use coilstay::setup::{
    Contact, Curve, FixedTo, FlatSeat, Guide, GuideKind, Lateral, LeverArc, Link, Motion,
    Restraint, Setup, Support, Swivel,
};
use reference::elastic_ends::{self, End};

mod fixture;
mod reference;

const R: f64 = 2.6;

/// Elastic on the bottom in rotation, on the top sideways, in units of the spring: k L², k.
fn elastic(slenderness: f64, rotation: f64, sideways: f64) -> Setup {
    let mut case = fixture::setup(slenderness, R, Support::hinged(), Support::clamped());
    let rate = case.spring.rate();
    let length = case.spring.free_length;
    case.bottom.rotation = Restraint::Elastic(rotation * rate * length.powi(2));
    case.top.sideways = Restraint::Elastic(sideways * rate);
    case
}

fn exact(slenderness: f64, rotation: f64, sideways: f64, bottom_arm: f64) -> Option<f64> {
    let column = elastic_ends::Column::of_spring(R, slenderness);
    let bottom = End::elastic(rotation, f64::INFINITY).with_arm(bottom_arm);
    let top = End::elastic(f64::INFINITY, sideways);
    elastic_ends::critical_share(&column, &bottom, &top)
}

fn properties(answer: &Assessment) -> &[SupportSensitivity] {
    let found = answer.support_sensitivity.as_ref().expect("has some");
    &found.properties
}

fn of<'a>(answer: &'a Assessment, end: &str, property: &str) -> &'a SupportSensitivity {
    let mut all = properties(answer).iter();
    all.find(|one| one.end == end && one.property == property)
        .unwrap_or_else(|| panic!("{end} {property}"))
}

fn changes(found: &SupportSensitivity) -> (f64, f64) {
    (
        found.relative_change_if_larger.expect("critical"),
        found.relative_change_if_smaller.expect("critical"),
    )
}

#[test]
fn sensitivities_are_the_differences_of_exact_roots() {
    for (slenderness, rotation, sideways) in [(6.0, 0.02, 1.0), (5.0, 0.1, 0.5), (8.0, 0.003, 3.0)]
    {
        let mut case = elastic(slenderness, rotation, sideways);
        let arm = 0.04;
        case.bottom.arm = arm * case.spring.free_length;
        let answer = assess(&case, "");
        let now = exact(slenderness, rotation, sideways, arm).expect("critical");
        let change = |factors: [f64; 3]| {
            let then = exact(
                slenderness,
                rotation * factors[0],
                sideways * factors[1],
                arm * factors[2],
            );
            then.expect("critical") / now - 1.0
        };
        for (place, end, property) in [
            (0, "bottom", "rotational_stiffness"),
            (1, "top", "sideways_stiffness"),
            (2, "bottom", "arm"),
        ] {
            let found = of(&answer, end, property);
            let (larger, smaller) = changes(found);
            let want = [1.1, 0.9].map(|factor| {
                let mut factors = [1.0; 3];
                factors[place] = factor;
                change(factors)
            });
            approx::assert_abs_diff_eq!(larger, want[0], epsilon = 1e-8);
            approx::assert_abs_diff_eq!(smaller, want[1], epsilon = 1e-8);
            assert!(found.relative_change_error.expect("estimated") < 1e-8);
            if property.ends_with("stiffness") {
                assert!(
                    larger > 0.0 && smaller < 0.0,
                    "a stiffer support is never worse"
                );
            }
        }
        assert_eq!(properties(&answer).len(), 3);
        let sizes: Vec<f64> = properties(&answer)
            .iter()
            .map(|found| changes(found).0.abs().max(changes(found).1.abs()))
            .collect();
        assert!(sizes.windows(2).all(|pair| pair[0] >= pair[1]));
        let first = properties(&answer)[0].property.replace('_', " ");
        let sentence = &answer.support_sensitivity.as_ref().expect("has").sentence;
        assert!(sentence.contains(&first), "{sentence}");
    }
}

/// A seat that gives along the axis takes travel and no more: s + P/k, so 10 % of k give the
/// travel −P/(11 k) and +P/(9 k).
#[test]
fn an_axial_seat_moves_the_travel_only() {
    let mut case = elastic(6.0, 0.02, 1.0);
    let axial = 3.0 * case.spring.rate();
    case.top.axial = Restraint::Elastic(axial);
    let answer = assess(&case, "");
    let critical = answer
        .limits
        .iter()
        .find(|limit| limit.name == LimitKind::Critical)
        .expect("listed");
    let (travel, force) = (
        critical.deflection_m.expect("critical"),
        critical.force_n.expect("critical"),
    );
    let (larger, smaller) = changes(of(&answer, "top", "axial_stiffness"));
    approx::assert_relative_eq!(
        larger,
        -force / (11.0 * axial) / travel,
        max_relative = 1e-8
    );
    approx::assert_relative_eq!(smaller, force / (9.0 * axial) / travel, max_relative = 1e-8);
}

/// Where 10 % of a stiffness lie between a critical deflection and none, that comes first.
#[test]
fn what_decides_between_critical_and_never_comes_first() {
    let slenderness = 5.0;
    let critical = |sideways: f64| exact(slenderness, 0.5, sideways, 0.0).is_some();
    let (mut low, mut high) = (0.5, 1e3);
    assert!(critical(low) && !critical(high));
    while high / low > 1.0 + 1e-3 {
        let middle = (low * high).sqrt();
        if critical(middle) {
            low = middle;
        } else {
            high = middle;
        }
    }
    for (sideways, never_now) in [(0.95 * low, false), (1.05 * high, true)] {
        let answer = assess(&elastic(slenderness, 0.5, sideways), "");
        let first = &properties(&answer)[0];
        assert_eq!(first.property, "sideways_stiffness");
        assert_eq!(first.critical_if_larger_m, None);
        assert!(first.critical_if_smaller_m.is_some());
        assert_eq!(first.relative_change_if_smaller.is_none(), never_now);
        let sentence = &answer.support_sensitivity.as_ref().expect("has").sentence;
        assert!(sentence.contains("at all"), "{sentence}");
    }
}

#[test]
fn rigid_supports_have_nothing_to_measure() {
    let case = fixture::setup(6.0, R, Support::clamped(), Support::hinged());
    assert_eq!(assess(&case, "").support_sensitivity, None);
}

/// Before it bows, a flat seat clamps, a ball is a hinge, and a seat on a lever is of the kind it is;
/// no handbook end is like a link. What the formula does not see is said.
#[test]
fn seats_count_as_the_handbook_ends_they_are_before_the_bow() {
    let flat = Support::flat(FlatSeat {
        radius: 0.025,
        ground_share: 0.75,
        friction: Some(0.2),
    });
    let ball = Support {
        contact: Contact::Swivel(Swivel {
            friction: 0.1,
            radius: 0.008,
        }),
        ..Support::hinged()
    };
    let on_lever = Support {
        motion: Some(Motion::Lever(LeverArc {
            along: 0.0,
            across: 0.4,
        })),
        ..Support::hinged()
    };
    let linked = Support {
        link: Some(Link {
            length: 0.1,
            hanging: false,
        }),
        ..Support::hinged()
    };
    let clamped = Support::clamped();
    for (bottom, top, constants, said) in [
        (flat, clamped, &[0.5][..], "flat bottom seat"),
        (flat, ball, &[0.7, 0.707], "friction of the top ball"),
        (clamped, on_lever, &[0.7, 0.707], "moves aside"),
        (clamped, linked, &[], "no handbook end is like it"),
    ] {
        let closed = assess(&fixture::setup(6.0, R, bottom, top), "").closed_form;
        let found: Vec<f64> = closed
            .curves
            .iter()
            .map(|curve| curve.end_constant)
            .collect();
        assert_eq!(found, constants);
        assert!(
            closed.unseen.iter().any(|note| note.contains(said)),
            "{said}"
        );
    }
    let mut case = fixture::setup(6.0, R, clamped, clamped);
    assert!(assess(&case, "").closed_form.unseen.is_empty());
    case.guides.push(Guide {
        kind: GuideKind::Rod,
        diameter: 0.04,
        fixed_to: FixedTo::Bottom,
        from: 0.0,
        to: f64::INFINITY,
        friction: 0.0,
        touching_allowed: true,
    });
    let answer = assess(&case, "");
    assert!(answer.closed_form.unseen[0].starts_with("Guides do not count"));
    let [guide] = &answer.guides[..] else {
        panic!("one guide");
    };
    // (D − d − d_rod)/2, and with the diameter grown to D² + (p² − d²)/π² where coils touch.
    approx::assert_relative_eq!(guide.clearance_free_m, 0.002, max_relative = 1e-9);
    let pitch = case.spring.pitch();
    let grown = (0.05_f64.powi(2)
        + (pitch.powi(2) - 0.006_f64.powi(2)) / std::f64::consts::PI.powi(2))
    .sqrt();
    approx::assert_relative_eq!(
        guide.clearance_closed_m,
        0.5 * (grown - 0.006 - 0.04),
        max_relative = 1e-12
    );
    assert_eq!(guide.to_m, None);
}

/// The weaker plane's answer is the answer of the case with that plane all round.
#[test]
fn the_weaker_of_two_planes_governs() {
    let plain = |top: Support| {
        let mut case = fixture::setup(6.0, R, Support::clamped(), top);
        case.imperfections.squareness = 0.003;
        case.imperfections.bow = 0.0005;
        case
    };
    let lateral = |support: Support| Lateral {
        tilt: 0.01,
        ..support.lateral()
    };
    let (strong, weak) = (Support::clamped(), Support::hinged());
    let tilted = |support: Support| Support {
        tilt: 0.01,
        ..support
    };
    for (top, weaker_is_other) in [
        (
            Support {
                other_plane: Some(lateral(weak)),
                ..tilted(strong)
            },
            true,
        ),
        (
            Support {
                other_plane: Some(lateral(strong)),
                ..tilted(weak)
            },
            false,
        ),
    ] {
        let direction = 0.3;
        let answer = assess(
            &plain(Support {
                plane: direction,
                ..top
            }),
            "",
        );
        let alone = [weak, strong].map(|support| assess(&plain(tilted(support)), ""));
        let [first, other] = &answer.planes[..] else {
            panic!("two planes");
        };
        assert_eq!(
            (first.governs, other.governs),
            (!weaker_is_other, weaker_is_other)
        );
        assert_eq!(first.direction_rad, direction);
        assert_eq!(other.direction_rad, direction + std::f64::consts::FRAC_PI_2);
        let (weaker, stronger) = if weaker_is_other {
            (other, first)
        } else {
            (first, other)
        };
        for (plane, alone) in [(weaker, &alone[0]), (stronger, &alone[1])] {
            let governing = alone.limits.iter().find(|limit| limit.governs);
            let governing = governing.expect("governs");
            assert_eq!(plane.verdict, alone.verdict);
            assert_eq!(plane.governing, alone.governing);
            assert_eq!(plane.deflection_m, governing.deflection_m);
            assert_eq!(plane.margin, governing.margin);
        }
        assert!(weaker.margin < stronger.margin);
        assert_eq!(answer.limits, alone[0].limits);
        assert_eq!(answer.closed_form, alone[0].closed_form);
        assert_eq!(answer.straight_column, alone[0].straight_column);
        assert!(answer.sentence.contains("weaker"));
        // The echo is of the whole support, not of one plane.
        assert!(answer.supports.top.other_plane.is_some());
    }
    assert!(assess(&plain(strong), "").planes.is_empty());
}

/// The law of the axial seat, at its points: motion, m, and force over that of the spring at half
/// its free length.
const LAW: [(f64, f64); 4] = [(0.0, 0.0), (1e-3, 0.1), (2e-3, 0.4), (3e-3, 1.2)];

fn on_a_stiffening_seat(bow: f64) -> (Setup, Curve) {
    let mut case = fixture::setup(6.0, R, Support::hinged(), Support::hinged());
    let force = 0.5 * case.spring.rate() * case.spring.free_length;
    let law = Curve::odd(&LAW.map(|(motion, share)| (motion, share * force))).expect("rises");
    case.bottom.axial = Restraint::Elastic(4.0 * case.spring.rate());
    case.top.axial = Restraint::Progressive(law);
    case.imperfections.bow = bow;
    (case, law)
}

/// What the linear and the measured seat give under a force, by hand: the law's own motion is
/// halved out of its table.
fn give(case: &Setup, law: &Curve, force: f64) -> (f64, f64) {
    let linear = 1.0 / (4.0 * case.spring.rate());
    let motion = reference::root::bisect(|x| law.at(x).value - force, 0.0, 0.1);
    (force * linear + motion, linear + 1.0 / law.at(motion).slope)
}

#[test]
fn a_measured_axial_seat_is_in_series_with_the_spring() {
    let (case, law) = on_a_stiffening_seat(0.0005);
    let answer = assess(&case, "");
    let path = &answer.imperfect_column.as_ref().expect("followed").path;
    let loaded: Vec<&PathPoint> = path
        .points
        .iter()
        .filter(|point| point.force_n > 0.0)
        .collect();
    assert!(loaded.len() > 20);
    for point in &loaded {
        let (travel, _) = give(&case, &law, point.force_n);
        approx::assert_abs_diff_eq!(
            point.deflection_m - point.shortening_m,
            travel,
            epsilon = 1e-12
        );
    }
    // Where the rate is lost, by the slope of the straight spring on its seats under that force.
    let lost = path.marks.iter().find(|mark| mark.name == "rate_lost");
    let lost = lost.expect("lost").point;
    let (_, compliance) = give(&case, &law, lost.force_n);
    let straight = 1.0 / (1.0 / case.spring.rate() + compliance);
    approx::assert_relative_eq!(lost.rate_n_per_m, 0.95 * straight, max_relative = 1e-7);
}

#[test]
fn a_measured_axial_seat_adds_to_every_travel() {
    let (case, law) = on_a_stiffening_seat(0.0);
    let answer = assess(&case, "");
    let (rate, length) = (case.spring.rate(), case.spring.free_length);
    let share = reference::closed_form::critical_share(R, 6.0).expect("critical");
    let travel = |share: f64| share * length + give(&case, &law, rate * share * length).0;
    let want = travel(share);
    for found in [
        answer.closed_form.critical_deflection_m,
        answer.straight_column.critical_deflection_m,
        answer
            .limits
            .iter()
            .find(|limit| limit.name == LimitKind::Critical)
            .and_then(|limit| limit.deflection_m),
    ] {
        approx::assert_relative_eq!(found.expect("critical"), want, max_relative = 1e-8);
    }
    let critical = answer.straight_column.critical.expect("critical").measure;
    approx::assert_relative_eq!(critical.share_of_free_length, share, max_relative = 1e-8);
    let solid = answer
        .limits
        .iter()
        .find(|limit| limit.name == LimitKind::Solid);
    let solid = solid.expect("listed");
    let force = solid.force_n.expect("known");
    approx::assert_relative_eq!(
        solid.deflection_m.expect("known"),
        case.spring.solid_deflection() + give(&case, &law, force).0,
        max_relative = 1e-12
    );
    // The path of the straight spring has the rate of three springs in a row.
    let path = &answer.imperfect_column.as_ref().expect("followed").path;
    for point in path
        .points
        .iter()
        .filter(|point| point.force_n > 0.0)
        .take(5)
    {
        let (_, compliance) = give(&case, &law, point.force_n);
        approx::assert_relative_eq!(
            point.rate_n_per_m,
            1.0 / (1.0 / rate + compliance),
            max_relative = 1e-8
        );
    }
    let constant = answer.effective_end_constant.end_constant;
    approx::assert_relative_eq!(constant.expect("critical"), 1.0, max_relative = 1e-8);
}
