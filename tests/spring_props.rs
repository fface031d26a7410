//! Properties of the spring that hold whatever its sizes: what scales with what, and what must
//! close. They know no formula that the code could share a mistake with.

use approx::assert_relative_eq;
use coilstay::spring::{
    EndType, Hand, Section, Spring, TurnCompliance, Wire, compressed_radius, curvature_factor,
    materials, named_material, torsion_stress,
};
use proptest::prelude::*;
use std::f64::consts::PI;

/// Round or rectangular, 0.1 mm to 20 mm, sides up to 1 : 5.
fn wires() -> impl Strategy<Value = Wire> {
    let size = 1e-4..20e-3;
    prop_oneof![
        size.clone().prop_map(|diameter| Wire::Round { diameter }),
        (size, 0.2..5.0).prop_map(|(radial, ratio)| Wire::Rectangular {
            radial,
            axial: radial * ratio,
        }),
    ]
}

/// A spring whose parts fit: index 3 to 20, its active coils apart when free.
fn springs() -> impl Strategy<Value = Spring> {
    let moduli = (50e9..230e9, 1.8..3.2);
    let coils = (2.0..30.0, 0.0..3.0);
    let shape = (3.0..20.0, 1.05..4.0, 0_usize..4);
    (wires(), moduli, coils, shape).prop_map(
        |(wire, (youngs_modulus, r), (active_coils, dead), (index, open, ends))| {
            let ends = EndType::ALL[ends];
            let total_coils = active_coils + dead;
            let solid_length = ends.solid_length(total_coils, wire.axial_size());
            Spring {
                wire,
                mean_diameter: index * wire.radial_size(),
                free_length: open * solid_length,
                active_coils,
                total_coils,
                ends,
                hand: Hand::Right,
                youngs_modulus,
                shear_modulus: youngs_modulus / r,
                measured_rate: None,
                solid_length,
                solid_rule: ends.solid_rule(),
            }
        },
    )
}

/// The wire with every length multiplied.
fn larger(wire: Wire, factor: f64) -> Wire {
    match wire {
        Wire::Round { diameter } => Wire::Round {
            diameter: diameter * factor,
        },
        Wire::Rectangular { radial, axial } => Wire::Rectangular {
            radial: radial * factor,
            axial: axial * factor,
        },
    }
}

fn assert_sections_meet(got: &Section, want: &Section) {
    assert_relative_eq!(got.axial, want.axial, max_relative = 1e-12);
    assert_relative_eq!(got.shear, want.shear, max_relative = 1e-12);
    assert_relative_eq!(got.bending, want.bending, max_relative = 1e-12);
}

proptest! {
    /// Units of length do not matter: area goes with the square, second moments and torsion
    /// constant with the fourth power, stress per torque with the inverse third.
    #[test]
    fn wire_scales_with_its_size(wire in wires(), factor in 0.01..100.0_f64) {
        let big = larger(wire, factor);
        for (got, small, power) in [
            (big.area(), wire.area(), 2),
            (big.second_moment_about_axis(), wire.second_moment_about_axis(), 4),
            (big.second_moment_about_radius(), wire.second_moment_about_radius(), 4),
            (big.torsion_constant(), wire.torsion_constant(), 4),
            (big.torsion_stress_per_torque(), wire.torsion_stress_per_torque(), -3),
        ] {
            assert_relative_eq!(got, small * factor.powi(power), max_relative = 1e-11);
        }
    }

    /// Turned by a quarter, a rectangle twists the same and swaps its two second moments.
    #[test]
    fn rectangle_turned_by_a_quarter_swaps_its_moments(a in 1e-3..10e-3, b in 1e-3..10e-3) {
        let wire = Wire::Rectangular { radial: a, axial: b };
        let turned = Wire::Rectangular { radial: b, axial: a };
        assert_relative_eq!(
            wire.second_moment_about_axis(), turned.second_moment_about_radius(), max_relative = 1e-13
        );
        assert_relative_eq!(wire.torsion_constant(), turned.torsion_constant(), max_relative = 1e-13);
        assert_relative_eq!(
            wire.torsion_stress_per_torque(), turned.torsion_stress_per_torque(), max_relative = 1e-13
        );
        // A bar twists no stiffer than its polar moment (Saint-Venant's bound, from memory), and
        // at least as stiffly as the ellipse drawn in it, π a³b³/(16(a² + b²)).
        let polar = wire.second_moment_about_axis() + wire.second_moment_about_radius();
        let ellipse = PI * (a * b).powi(3) / (16.0 * (a * a + b * b));
        prop_assert!(wire.torsion_constant() < polar);
        prop_assert!(wire.torsion_constant() > ellipse);
    }

    /// The column's axial stiffness is the rate times its length, whatever length is chosen, and
    /// all three stiffnesses stay in proportion.
    #[test]
    fn axial_stiffness_is_rate_times_length(spring in springs(), share in 0.2..1.0) {
        let length = share * spring.free_length;
        let section = spring.section(length);
        assert_relative_eq!(section.axial, spring.rate() * length, max_relative = 1e-12);
        let whole = spring.section(spring.free_length);
        assert_relative_eq!(section.shear * whole.axial, whole.shear * section.axial, max_relative = 1e-12);
        assert_relative_eq!(section.bending * whole.axial, whole.bending * section.axial, max_relative = 1e-12);
    }

    /// A measured rate replaces the formula's in every stiffness, by one factor; measuring what
    /// the formula says changes nothing.
    #[test]
    fn measured_rate_scales_every_stiffness(spring in springs(), factor in 0.5..2.0) {
        let plain = spring.section(spring.free_length);
        let measured = Spring { measured_rate: Some(factor * spring.formula_rate()), ..spring.clone() };
        assert_relative_eq!(measured.rate(), factor * spring.rate(), max_relative = 1e-14);
        assert_relative_eq!(measured.formula_rate(), spring.formula_rate());
        let section = measured.section(measured.free_length);
        assert_sections_meet(&section, &Section {
            axial: factor * plain.axial,
            shear: factor * plain.shear,
            bending: factor * plain.bending,
        });
        let same = Spring { measured_rate: Some(spring.formula_rate()), ..spring.clone() };
        assert_sections_meet(&same.section(same.free_length), &plain);
    }

    /// Half the coils is twice the rate; twice both moduli too.
    #[test]
    fn rate_follows_coils_and_moduli(spring in springs()) {
        let fewer = Spring { active_coils: 0.5 * spring.active_coils, ..spring.clone() };
        assert_relative_eq!(fewer.rate(), 2.0 * spring.rate(), max_relative = 1e-13);
        let stiffer = Spring {
            youngs_modulus: 2.0 * spring.youngs_modulus,
            shear_modulus: 2.0 * spring.shear_modulus,
            ..spring.clone()
        };
        assert_relative_eq!(stiffer.rate(), 2.0 * spring.rate(), max_relative = 1e-13);
    }

    /// A spring twice as large has twice the rate (N/m), 4 times EA and GA, 16 times EI.
    #[test]
    fn spring_scales_with_its_size(spring in springs(), factor in 0.1..10.0_f64) {
        let big = Spring {
            wire: larger(spring.wire, factor),
            mean_diameter: factor * spring.mean_diameter,
            free_length: factor * spring.free_length,
            solid_length: factor * spring.solid_length,
            ..spring.clone()
        };
        assert_relative_eq!(big.rate(), factor * spring.rate(), max_relative = 1e-12);
        let (plain, scaled) = (spring.section(spring.free_length), big.section(big.free_length));
        assert_sections_meet(&scaled, &Section {
            axial: factor.powi(2) * plain.axial,
            shear: factor.powi(2) * plain.shear,
            bending: factor.powi(4) * plain.bending,
        });
        assert_relative_eq!(big.slenderness(), spring.slenderness(), max_relative = 1e-13);
        assert_relative_eq!(big.index(), spring.index(), max_relative = 1e-13);
    }

    /// Lengths close: dead and deformable make the free length, the deformable part is the active
    /// coils at their pitch, and the coils touch exactly when the spring is solid.
    #[test]
    fn lengths_close(spring in springs()) {
        assert_relative_eq!(
            spring.dead_height() + spring.deformable_length(), spring.free_length, max_relative = 1e-14
        );
        assert_relative_eq!(
            spring.pitch() * spring.active_coils, spring.deformable_length(), max_relative = 1e-14
        );
        let gaps = spring.active_coils * (spring.pitch() - spring.wire.axial_size());
        assert_relative_eq!(gaps, spring.solid_deflection(), max_relative = 1e-10);
        assert_relative_eq!(
            spring.outer_diameter() - spring.inner_diameter(), 2.0 * spring.wire.radial_size(), max_relative = 1e-11
        );
        assert_relative_eq!(
            0.5 * (spring.outer_diameter() + spring.inner_diameter()), 2.0 * spring.mean_radius(), max_relative = 1e-14
        );
    }

    /// More coils are never shorter when solid; unground ends never shorter than ground ones.
    #[test]
    fn solid_length_rises(coils in 2.0..40.0, more in 0.0..5.0, size in 1e-4..20e-3) {
        for ends in EndType::ALL {
            prop_assert!(ends.solid_length(coils + more, size) >= ends.solid_length(coils, size));
            prop_assert!(ends.usual_dead_coils() >= 0.0);
        }
        prop_assert!(
            EndType::Closed.solid_length(coils, size) > EndType::ClosedGround.solid_length(coils, size)
        );
    }

    /// Compliances and section stiffnesses are inverse to each other, per turn.
    #[test]
    fn section_inverts_the_compliance(wire in wires(), index in 3.0..20.0, per_turn in 1e-3..0.1) {
        let radius = 0.5 * index * wire.radial_size();
        let turn = TurnCompliance::of(&wire, radius, 206e9, 81.5e9);
        let section = turn.section(per_turn);
        assert_relative_eq!(per_turn / section.axial, turn.axial, max_relative = 1e-14);
        assert_relative_eq!(per_turn / section.shear, turn.transverse, max_relative = 1e-14);
        assert_relative_eq!(per_turn / section.bending, turn.bending, max_relative = 1e-14);
        // Bent in the plane of the coil all around it is twice as soft as under a transverse
        // force at unit arm, whatever the wire.
        assert_relative_eq!(
            turn.torque * radius * radius, 2.0 * turn.transverse, max_relative = 1e-13
        );
    }

    /// The wire keeps its length while the coil is pressed: √((πD)² + p²) per turn.
    #[test]
    fn pressed_coil_keeps_its_wire(mean in 5e-3..0.3, pitch in 0.05..0.6, left in 0.0..1.0) {
        let (pitch, now) = (pitch * mean, left * pitch * mean);
        let radius = compressed_radius(mean, pitch, now);
        let turn = |diameter: f64, pitch: f64| (PI * diameter).hypot(pitch);
        assert_relative_eq!(turn(2.0 * radius, now), turn(mean, pitch), max_relative = 1e-13);
        prop_assert!(2.0 * radius >= mean * (1.0 - 1e-15));
    }

    /// Stress goes with the torque, and the correction falls towards 1 as the index rises.
    #[test]
    fn stress_is_linear_in_the_torque(
        wire in wires(), index in 3.0..20.0, torque in 0.0..1e4, factor in 0.1..10.0
    ) {
        let stress = |torque| torsion_stress(&wire, index, torque);
        assert_relative_eq!(stress(factor * torque), factor * stress(torque), max_relative = 1e-13);
        prop_assert!(curvature_factor(index) > curvature_factor(index + 1.0));
        prop_assert!(curvature_factor(index) > 1.0);
    }
}

/// Every built-in material can be had by its name, and its numbers can exist.
#[test]
fn built_in_materials_can_exist() {
    for (place, material) in materials().iter().enumerate() {
        assert_eq!(named_material(material.name), Some(material));
        assert!(materials()[..place].iter().all(|m| m.name != material.name));
        // Isotropic and stable: 2 < E/G < 3.
        let r = material.youngs_modulus / material.shear_modulus;
        assert!(2.0 < r && r < 3.0, "{}: E/G = {r}", material.name);
        assert!((7000.0..9000.0).contains(&material.density));
        assert!((1e-6..30e-6).contains(&material.expansion_per_kelvin));
        assert_eq!(material.modulus_factor(20.0), 1.0);
        assert_eq!(material.length_factor(20.0), 1.0);
        assert!(material.modulus_factor(100.0) < 1.0 && material.length_factor(100.0) > 1.0);
        assert!(!material.source.is_empty() && !material.title.is_empty());
    }
    assert_eq!(named_material("wood"), None);
}

/// End types have words of their own.
#[test]
fn end_types_have_words_of_their_own() {
    for (place, ends) in EndType::ALL.iter().enumerate() {
        assert!(
            EndType::ALL[..place]
                .iter()
                .all(|e| e.word() != ends.word())
        );
        assert!(!ends.solid_rule().is_empty());
    }
}
