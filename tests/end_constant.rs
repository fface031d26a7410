//! The effective end constant against exact values: π/q, q the wave number of the exact critical
//! state.

use coilstay::assess::assess;
use coilstay::result::{EffectiveEndConstant, StraightColumn};
use coilstay::setup::{Restraint, Setup, Support};
use coilstay::spring::Wire;
use reference::closed_form::{clamped_hinged, hinged_arms, never_limit, wave_number};
use reference::elastic_ends::{self, End};
use std::f64::consts::PI;

mod fixture;
mod reference;

const R: f64 = 2.6;

fn answer(setup: &Setup) -> (EffectiveEndConstant, StraightColumn) {
    let answer = assess(setup, "");
    (answer.effective_end_constant, answer.straight_column)
}

fn found(slenderness: f64, bottom: Support, top: Support) -> EffectiveEndConstant {
    answer(&fixture::setup(slenderness, R, bottom, top)).0
}

fn constant(found: &EffectiveEndConstant) -> f64 {
    found.end_constant.expect("critical")
}

#[test]
fn handbook_ends_have_the_handbook_constant() {
    let (clamped, hinged) = (Support::clamped(), Support::hinged());
    for (bottom, top, want, ends) in [
        (clamped, clamped, 0.5, "clamped-clamped"),
        (clamped, Support::sliding(), 1.0, "clamped-sliding"),
        (hinged, hinged, 1.0, "hinged-hinged"),
        (Support::free(), clamped, 2.0, "clamped-free"),
    ] {
        let found = found(7.0, bottom, top);
        approx::assert_relative_eq!(constant(&found), want, max_relative = 1e-9);
        assert!(found.is_handbook_case && !found.beyond_peak);
        assert_eq!(found.handbook_ends.as_deref(), Some(ends));
        assert_eq!(found.handbook_constants, [want]);
        assert!(found.relative_difference.expect("both critical").abs() < 1e-8);
        assert!(found.end_constant_error.expect("estimated") < 1e-8);
        assert!(
            found.sentence.contains("the handbook's own"),
            "{}",
            found.sentence
        );
    }
}

/// The stiffnesses are the section's, so the wire's section does not matter.
#[test]
fn rectangular_wire_between_handbook_ends_has_the_same_constant() {
    for (bottom, want) in [(Support::clamped(), 0.5), (Support::hinged(), 1.0)] {
        let mut case = fixture::setup(8.0, R, bottom, bottom);
        case.spring.wire = Wire::Rectangular {
            radial: 0.004,
            axial: 0.006,
        };
        let (found, _) = answer(&case);
        approx::assert_relative_eq!(constant(&found), want, max_relative = 1e-9);
    }
}

/// One end clamped, one hinged: neither 0.7 nor 0.707. ξ_cr by an independent program (computed,
/// six decimals), and the exact root of this column.
#[test]
fn clamped_hinged_has_a_constant_of_its_own_at_every_slenderness() {
    for (slenderness, share) in [
        (8.0, 0.094273),
        (5.0, 0.269855),
        (4.0, 0.493317),
        (3.5, 0.783726),
    ] {
        let found = found(slenderness, Support::clamped(), Support::hinged());
        let value = constant(&found);
        let of = |share: f64| PI / wave_number(R, slenderness, share);
        // Half a unit of the last printed decimal either way.
        let (low, high) = (of(share + 5e-7), of(share - 5e-7));
        assert!(value > low && value < high, "{value}: {low} to {high}");
        let exact = clamped_hinged(R, slenderness).expect("critical");
        approx::assert_relative_eq!(value, of(exact), max_relative = 1e-8);
        assert!(found.is_handbook_case);
        assert_eq!(found.handbook_constants, [0.7, 0.707]);
    }
    // Where both constants promise "never" there is nothing to take per cent of.
    let found = found(3.5, Support::clamped(), Support::hinged());
    assert_eq!(found.relative_difference, None);
    assert!(
        found.sentence.contains("never critical"),
        "{}",
        found.sentence
    );
}

/// Elastic in rotation, from as good as hinged to as good as clamped, against the exact root.
#[test]
fn elastic_ends_go_from_hinged_to_clamped() {
    let slenderness = 6.0;
    let column = elastic_ends::Column::of_spring(R, slenderness);
    let mut before = 1.0 + 1e-9;
    for stiffness in [1e-7, 1e-2, 0.1, 1.0, 10.0, 1e3, 1e8] {
        let mut case = fixture::setup(slenderness, R, Support::hinged(), Support::hinged());
        let unit = case.spring.rate() * case.spring.free_length.powi(2);
        let natural = column.bending;
        for end in [&mut case.bottom, &mut case.top] {
            end.rotation = Restraint::Elastic(stiffness * natural * unit);
        }
        let (found, _) = answer(&case);
        let end = End::elastic(stiffness * natural, f64::INFINITY);
        let share = elastic_ends::critical_share(&column, &end, &end).expect("critical");
        let want = PI / wave_number(R, slenderness, share);
        approx::assert_relative_eq!(constant(&found), want, max_relative = 1e-8);
        assert!(constant(&found) < before);
        before = constant(&found);
        assert!(!found.is_handbook_case);
        match stiffness {
            s if s < 1e-6 => approx::assert_relative_eq!(want, 1.0, max_relative = 1e-6),
            s if s > 1e7 => approx::assert_relative_eq!(want, 0.5, max_relative = 1e-6),
            _ => {}
        }
    }
}

/// Outward arms lengthen the column, inward ones shorten it.
#[test]
fn arms_count() {
    let slenderness = 5.0;
    for arm in [-0.1, 0.05, 0.2, 0.5] {
        let mut case = fixture::setup(slenderness, R, Support::hinged(), Support::hinged());
        for end in [&mut case.bottom, &mut case.top] {
            end.arm = arm * case.spring.free_length;
        }
        let (found, _) = answer(&case);
        let share = hinged_arms(R, slenderness, arm).expect("critical");
        let want = PI / wave_number(R, slenderness, share);
        approx::assert_relative_eq!(constant(&found), want, max_relative = 1e-8);
        assert_eq!(constant(&found) > 1.0, arm > 0.0);
        assert!(!found.is_handbook_case);
    }
}

/// λ² < C2: never; the constant is below √C2/Λ.
#[test]
fn a_column_that_is_never_critical_has_a_bound() {
    let slenderness = 4.0;
    let found = found(slenderness, Support::clamped(), Support::clamped());
    assert_eq!(found.end_constant, None);
    approx::assert_relative_eq!(
        found.end_constant_below.expect("bounded"),
        never_limit(R) / slenderness,
        max_relative = 1e-12
    );
    assert!(
        found.sentence.starts_with("As if alpha were below 0.6551:"),
        "{}",
        found.sentence
    );
}

/// A seat that gives sideways can hold the column past C1: α is then that of the formula's second
/// root, the wave number being the state's all the same.
#[test]
fn beyond_the_peak_the_second_root_is_meant() {
    let slenderness = 5.0;
    let column = elastic_ends::Column::of_spring(R, slenderness);
    let peak = reference::closed_form::peak_share(R);
    let (stiffness, share) = (20..60)
        .map(|i| 0.1 * f64::from(i))
        .filter_map(|stiffness| {
            let end = End::elastic(f64::INFINITY, stiffness);
            let share = elastic_ends::critical_share(&column, &End::CLAMPED, &end)?;
            Some((stiffness, share))
        })
        .find(|(_, share)| *share > peak + 0.01)
        .expect("some stiffness holds it that far");
    let mut case = fixture::setup(slenderness, R, Support::clamped(), Support::clamped());
    case.top.sideways = Restraint::Elastic(stiffness * case.spring.rate());
    let (found, straight) = answer(&case);
    assert!(found.beyond_peak);
    let want = PI / wave_number(R, slenderness, share);
    approx::assert_relative_eq!(constant(&found), want, max_relative = 1e-8);
    let again = reference::closed_form::straightening_share(R, want * slenderness);
    approx::assert_relative_eq!(
        straight
            .critical
            .expect("critical")
            .measure
            .share_of_free_length,
        again.expect("straightens"),
        max_relative = 1e-7
    );
}
