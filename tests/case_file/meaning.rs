//! What a case file means: SI values, defaults, temperature, forces and lengths.

use super::{BASE, read, with};
use approx::assert_relative_eq;
use coilstay::setup::{Imperfections, LimitKind, Loading, Restraint, Setup};
use coilstay::spring::{EndType, Wire};
use proptest::prelude::*;

const EXACT: f64 = 1e-14;

#[test]
fn the_base_in_si() {
    let case = read(BASE);
    let setup = &case.setup;
    let spring = &setup.spring;
    assert_eq!(setup.title, "Test");
    assert_eq!(setup.material, "patented-carbon-steel");
    assert_eq!(spring.ends, EndType::ClosedGround);
    assert_relative_eq!(spring.wire.radial_size(), 8e-3, max_relative = EXACT);
    assert_relative_eq!(spring.mean_diameter, 62e-3, max_relative = EXACT);
    assert_relative_eq!(spring.solid_length, 84e-3, max_relative = EXACT);
    assert_eq!(spring.youngs_modulus, 206e9);
    assert_eq!(setup.bottom.word(), "clamped");
    assert_eq!(setup.top.word(), "hinged");
    assert_relative_eq!(setup.imperfections.squareness, 4e-3, max_relative = EXACT);
    assert_eq!(setup.imperfections.parallelism, 0.0);
    assert_eq!(setup.duty.margins.general, 0.15);
    assert_relative_eq!(setup.duty.bow_limit, 6.2e-3, max_relative = EXACT);
    assert_eq!(case.material.density, Some(7850.0));
    assert!(setup.warnings.is_empty());
}

#[test]
fn defaults_are_named() {
    let setup = read(BASE).setup;
    for name in [
        "spring.ends",
        "spring.hand",
        "spring.solid_length",
        "material.service_temperature",
        "bottom.axial_stiffness",
        "top.arm",
        "imperfections.parallelism",
        "duty.loading",
        "duty.installed_deflection",
        "duty.required_margin",
        "duty.bow_limit",
        "duty.rate_loss_share",
    ] {
        assert_eq!(
            setup.defaulted.iter().filter(|d| *d == name).count(),
            1,
            "{name} in {:?}",
            setup.defaulted
        );
    }
    for name in [
        "spring.wire",
        "imperfections.squareness",
        "duty.working_deflection",
        "title",
    ] {
        assert!(!setup.defaulted.iter().any(|d| d == name), "{name}");
    }
    let untitled = read(&with("title = \"Test\"\n", "")).setup;
    assert_eq!(untitled.title, "test.toml");
    assert!(untitled.defaulted.iter().any(|d| d == "title"));
}

/// EN 15800 grade 2 (from memory): e1 = 0.05 L0, e2 = 0.03 D_outer.
#[test]
fn imperfections_left_out_are_assumed() {
    let setup = read(&with("[imperfections]\nsquareness = \"4 mm\"\n", "")).setup;
    assert_relative_eq!(
        setup.imperfections.squareness,
        0.05 * 0.21,
        max_relative = EXACT
    );
    assert_relative_eq!(
        setup.imperfections.parallelism,
        0.03 * 0.07,
        max_relative = EXACT
    );
    assert!(
        setup
            .defaulted
            .iter()
            .any(|d| d == "imperfections.squareness")
    );
    assert!(setup.warnings.iter().any(|w| w.contains("EN 15800")));
    let perfect = read(&with("squareness = \"4 mm\"\n", "")).setup;
    assert_eq!(perfect.imperfections, Imperfections::none());
}

#[test]
fn diameters_coils_and_wire() {
    let mean = |line: &str| {
        read(&with("mean_diameter = \"62 mm\"", line))
            .setup
            .spring
            .mean_diameter
    };
    assert_relative_eq!(
        mean("outer_diameter = \"70 mm\""),
        62e-3,
        max_relative = EXACT
    );
    assert_relative_eq!(
        mean("inner_diameter = \"54 mm\""),
        62e-3,
        max_relative = EXACT
    );
    let coils = |lines: &str, ends: &str| {
        let lines = format!("ends = \"{ends}\"\n{lines}");
        let spring = read(&with("active_coils = 8.5\ntotal_coils = 10.5", &lines))
            .setup
            .spring;
        (spring.active_coils, spring.total_coils, spring.solid_length)
    };
    for (ends, dead, more) in [
        ("closed-ground", 2.0, 0.0),
        ("closed", 2.0, 1.0),
        ("open-ground", 1.0, 0.0),
        ("open", 0.0, 1.0),
    ] {
        let (active, total, solid) = coils("active_coils = 9", ends);
        assert_eq!((active, total), (9.0, 9.0 + dead));
        assert_relative_eq!(solid, (9.0 + dead + more) * 8e-3, max_relative = EXACT);
        assert_eq!(coils("total_coils = 12", ends).0, 12.0 - dead);
    }
    let text = with("\"8 mm\"", "{ radial = \"6 mm\", axial = \"4 mm\" }");
    let spring = read(&text.replace("mean_diameter = \"62", "outer_diameter = \"68"))
        .setup
        .spring;
    assert!(matches!(spring.wire, Wire::Rectangular { .. }));
    assert_relative_eq!(spring.wire.axial_size(), 4e-3, max_relative = EXACT);
    assert_relative_eq!(spring.mean_diameter, 62e-3, max_relative = EXACT);
    assert_relative_eq!(spring.solid_length, 42e-3, max_relative = EXACT);
    let given = read(&with("[spring]", "[spring]\nsolid_length = \"90 mm\""))
        .setup
        .spring;
    assert_eq!(given.solid_rule, "as given");
    assert_relative_eq!(given.dead_height(), 22e-3, max_relative = 1e-12);
}

#[test]
fn supports() {
    let top = |lines: &str| read(&with("kind = \"hinged\"", lines)).setup.top;
    let elastic = top(
        "kind = \"elastic\"\nrotational_stiffness = \"40 N m/rad\"\nsideways_stiffness = \"8 N/mm\"",
    );
    assert_eq!(elastic.rotation, Restraint::Elastic(40.0));
    assert_eq!(elastic.sideways, Restraint::Elastic(8000.0));
    let ends = top(
        "kind = \"elastic\"\nrotational_stiffness = \"0 N m/rad\"\nsideways_stiffness = \"rigid\"",
    );
    assert_eq!(ends.word(), "hinged");
    let ends =
        top("kind = \"elastic\"\nrotational_stiffness = \"none\"\nsideways_stiffness = \"none\"");
    assert_eq!(ends.word(), "free");
    let more = top(
        "kind = \"sliding\"\naxial_stiffness = \"500 N/mm\"\narm = \"-10 mm\"\ntilt = \"-0.3 deg\"\noffset = \"0.2 mm\"",
    );
    assert_eq!(more.axial, Restraint::Elastic(500e3));
    assert_relative_eq!(more.arm, -0.01, max_relative = EXACT);
    assert_relative_eq!(more.tilt, -0.3_f64.to_radians(), max_relative = EXACT);
    assert_relative_eq!(more.offset, 0.2e-3, max_relative = EXACT);
}

/// A force F is a travel of F·(1/k + 1/k_bottom + 1/k_top).
#[test]
fn forces_and_lengths_become_travel() {
    let text = with(
        "working_deflection = \"95 mm\"",
        "working_force = \"900 N\"\ninstalled_length = \"200 mm\"",
    )
    .replace(
        "kind = \"clamped\"",
        "kind = \"clamped\"\naxial_stiffness = \"300 N/mm\"",
    )
    .replace(
        "kind = \"hinged\"",
        "kind = \"hinged\"\naxial_stiffness = \"500 N/mm\"",
    );
    let setup = read(&text).setup;
    let rate = setup.spring.rate();
    assert_relative_eq!(
        setup.duty.working_deflection,
        900.0 * (1.0 / rate + 1.0 / 300e3 + 1.0 / 500e3),
        max_relative = EXACT
    );
    assert_eq!(setup.duty.working_force, Some(900.0));
    assert_relative_eq!(setup.duty.installed_deflection, 0.01, max_relative = 1e-12);
    let dead = read(&with(
        "working_deflection = \"95 mm\"",
        "loading = \"force\"\nworking_force = \"900 N\"",
    ))
    .setup;
    assert_eq!(dead.duty.loading, Loading::Force);
    let measured = read(
        &with(
            "working_deflection = \"95 mm\"",
            "working_force = \"900 N\"",
        )
        .replace("[spring]", "[spring]\nmeasured_rate = \"20 N/mm\""),
    );
    assert_relative_eq!(
        measured.setup.duty.working_deflection,
        0.045,
        max_relative = EXACT
    );
}

#[test]
fn margins() {
    let duty = read(&with(
        "[duty]",
        "[duty]\nrequired_margin = \"20 %\"\nmargins = { solid = 0.05, bow = \"0 %\" }",
    ))
    .setup
    .duty;
    assert_relative_eq!(
        duty.margins.of(LimitKind::Critical),
        0.2,
        max_relative = EXACT
    );
    assert_eq!(duty.margins.of(LimitKind::Solid), 0.05);
    assert_eq!(duty.margins.of(LimitKind::Bow), 0.0);
}

/// At 120 °C patented wire has lost 2.5 % of its moduli and grown by 11.7e-6·100; the measured
/// rate goes with G and one length. Lengths of the machine do not grow.
#[test]
fn service_temperature() {
    let cold = with(
        "[spring]",
        "[spring]\nmeasured_rate = \"20 N/mm\"\nsolid_length = \"90 mm\"",
    );
    let hot = cold
        .replace(
            "[material]",
            "[material]\nservice_temperature = \"120 degC\"",
        )
        .replace(
            "working_deflection = \"95 mm\"",
            "working_length = \"115 mm\"",
        );
    let (cold, hot) = (read(&cold).setup, read(&hot).setup);
    let (grown, softer) = (1.0 + 11.7e-4, 0.975);
    for (hot, cold, factor) in [
        (hot.spring.free_length, cold.spring.free_length, grown),
        (hot.spring.mean_diameter, cold.spring.mean_diameter, grown),
        (hot.spring.solid_length, cold.spring.solid_length, grown),
        (
            hot.spring.wire.axial_size(),
            cold.spring.wire.axial_size(),
            grown,
        ),
        (
            hot.imperfections.squareness,
            cold.imperfections.squareness,
            grown,
        ),
        (
            hot.spring.youngs_modulus,
            cold.spring.youngs_modulus,
            softer,
        ),
        (hot.spring.shear_modulus, cold.spring.shear_modulus, softer),
        (hot.spring.rate(), cold.spring.rate(), softer * grown),
        (
            hot.spring.formula_rate(),
            cold.spring.formula_rate(),
            softer * grown,
        ),
    ] {
        assert_relative_eq!(hot, cold * factor, max_relative = 1e-13);
    }
    assert_eq!(hot.temperature, 120.0);
    assert_relative_eq!(
        hot.duty.working_deflection,
        0.21 * grown - 0.115,
        max_relative = 1e-13
    );
}

#[test]
fn given_moduli_and_their_notes() {
    let lines = "youngs_modulus = \"200 GPa\"\nshear_modulus = \"11.5 Mpsi\"\n\
                 youngs_modulus_uncertainty = \"2 %\"\nshear_modulus_uncertainty = \"1 GPa\"\n\
                 density = \"0.284 lb/in^3\"\nmodulus_loss_per_kelvin = \"0.0003 1/K\"\n\
                 expansion_per_kelvin = \"12 ppm/K\"\nservice_temperature = \"212 degF\"";
    let case = read(&with("name = \"patented-carbon-steel\"", lines));
    assert_eq!(case.setup.material, "given moduli");
    let factor = 1.0 - 0.0003 * 80.0;
    assert_relative_eq!(case.setup.temperature, 100.0, max_relative = 1e-13);
    assert_relative_eq!(
        case.setup.spring.youngs_modulus,
        200e9 * factor,
        max_relative = 1e-13
    );
    assert_relative_eq!(
        case.setup.spring.free_length,
        0.21 * (1.0 + 12e-6 * 80.0),
        max_relative = 1e-13
    );
    let notes = case.material;
    assert_relative_eq!(
        notes.youngs_modulus_uncertainty.unwrap(),
        4e9 * factor,
        max_relative = 1e-13
    );
    assert_relative_eq!(
        notes.shear_modulus_uncertainty.unwrap(),
        1e9 * factor,
        max_relative = 1e-13
    );
    // 0.284 lb/in³ is 7861 kg/m³ (Machinery's Handbook, density of steel, from memory).
    assert_relative_eq!(notes.density.unwrap(), 7861.0, max_relative = 1e-4);
}

#[test]
fn warnings_do_not_refuse() {
    let warned = |from: &str, to: &str| read(&with(from, to)).setup.warnings.join("\n");
    assert!(warned("\"62 mm\"", "\"20 mm\"").contains("index D/d = 2.50 is below 3"));
    assert!(warned("\"62 mm\"", "\"200 mm\"").contains("index D/d = 25.0 is above 20"));
    assert!(warned("= 8.5", "= 1.5").contains("1.5 active coils"));
    assert!(
        warned("[spring]", "[spring]\nmeasured_rate = \"2 N/mm\"")
            .contains("differ by more than 20 %")
    );
    assert!(
        warned(
            "name = \"patented-carbon-steel\"",
            "youngs_modulus = \"81 GPa\"\nshear_modulus = \"206 GPa\""
        )
        .contains("E/G = 0.39")
    );
    let margins = warned(
        "[duty]",
        "[duty]\nrequired_margin = 15\nmargins = { solid = 5, bow = 3 }",
    );
    assert!(margins.contains("a margin of 15 is 1500 %"));
    assert!(margins.contains("write required_margin = 0.15"));
    assert!(margins.contains("write margins = { solid = 0.05 }"));
    assert!(!margins.contains("bow"));
}

/// What is accepted for later use is said not to count, in one line.
#[test]
fn inputs_that_do_not_count_are_named() {
    let text = with(
        "name = \"patented-carbon-steel\"",
        "youngs_modulus = \"206 GPa\"\nshear_modulus = \"80 GPa\"\n\
         youngs_modulus_uncertainty = \"2 %\"\ndensity = \"7850 kg/m^3\"",
    );
    assert_eq!(
        read(&text).setup.warnings,
        [
            "`youngs_modulus_uncertainty` and `density` are kept for studies of a batch; this \
             assessment does not use them"
        ]
    );
}

/// Extreme but possible springs are not forbidden.
#[test]
fn extreme_springs() {
    for (wire, mean, free) in [("0.05 mm", "0.4 mm", "1 mm"), ("100 mm", "0.8 m", "10 m")] {
        let text = with("\"8 mm\"", &format!("\"{wire}\""))
            .replace("62 mm", mean)
            .replace("210 mm", free)
            .replace("\"4 mm", "\"0.01 mm")
            .replace("95 mm", "0.2 mm");
        assert!(read(&text).setup.spring.rate().is_finite());
    }
}

fn numbers(setup: &Setup) -> Vec<f64> {
    let s = &setup.spring;
    let d = &setup.duty;
    let mut all = vec![
        setup.temperature,
        s.wire.radial_size(),
        s.wire.axial_size(),
        s.mean_diameter,
        s.free_length,
        s.solid_length,
        s.youngs_modulus,
        s.shear_modulus,
        s.rate(),
        setup.imperfections.squareness,
        setup.imperfections.parallelism,
        setup.imperfections.bow,
        setup.imperfections.eccentricity,
        d.installed_deflection,
        d.working_deflection,
        d.working_tolerance,
        d.overtravel,
        d.bow_limit,
        d.allowable_stress.unwrap_or_default(),
    ];
    for support in [&setup.bottom, &setup.top] {
        all.extend([
            support.rotation.stiffness(),
            support.sideways.stiffness(),
            support.axial.stiffness(),
            support.arm,
            support.tilt,
            support.offset,
        ]);
    }
    all
}

proptest! {
    /// The same spring in metric and in inch units is the same setup.
    #[test]
    fn units_do_not_matter(
        wire in 1.0..8.0_f64,
        index in 4.0..15.0_f64,
        coils in 3.0..20.0_f64,
        gap in 0.3..2.0_f64,
        used in 0.1..0.9_f64,
        sideways in 0.1..100.0_f64,
        rotational in 0.1..100.0_f64,
        celsius in -40.0..200.0_f64,
    ) {
        let mean = wire * index;
        let free = wire * (coils + 2.0) + coils * gap * wire;
        let work = used * coils * gap * wire;
        let file = |length: &dyn Fn(f64) -> String, force_per_length: String, moment: String,
                    temperature: String, moduli: [String; 2], stress: String| format!(
            "title = \"t\"\n[spring]\nwire = \"{}\"\nmean_diameter = \"{}\"\nfree_length = \"{}\"\n\
             active_coils = {coils}\n[material]\nyoungs_modulus = \"{}\"\nshear_modulus = \"{}\"\n\
             expansion_per_kelvin = \"12 ppm/K\"\nservice_temperature = \"{temperature}\"\n\
             [bottom]\nkind = \"clamped\"\narm = \"{}\"\n[top]\nkind = \"elastic\"\n\
             sideways_stiffness = \"{force_per_length}\"\nrotational_stiffness = \"{moment}\"\n\
             axial_stiffness = \"{force_per_length}\"\n\
             [imperfections]\nsquareness = \"{}\"\nbow = \"{}\"\n\
             [duty]\nworking_deflection = \"{}\"\novertravel = \"{}\"\nallowable_stress = \"{stress}\"\n",
            length(wire), length(mean), length(free), moduli[0], moduli[1], length(0.1 * wire),
            length(0.02 * free), length(0.01 * wire), length(work), length(0.1 * work),
        );
        // Factors written out, independent of the table: 25.4 mm to the inch, 4.4482216152605 N
        // to the pound of force.
        let (inch, pound) = (25.4, 4.4482216152605);
        let psi = pound / (inch * 1e-3_f64).powi(2);
        let metric = file(
            &|mm| format!("{mm} mm"),
            format!("{sideways} N/mm"),
            format!("{rotational} N m/rad"),
            format!("{celsius} degC"),
            ["206 GPa".into(), "80 GPa".into()],
            "700 MPa".into(),
        );
        let customary = file(
            &|mm| format!("{} in", mm / inch),
            format!("{} lbf/in", sideways / pound * inch),
            format!("{} lbf in/deg", rotational / pound / (inch * 1e-3) * 1f64.to_radians()),
            format!("{} degF", celsius * 1.8 + 32.0),
            [format!("{} Mpsi", 206e3 / psi), format!("{} ksi", 80e6 / psi)],
            format!("{} psi", 700e6 / psi),
        );
        let (metric, customary) = (read(&metric).setup, read(&customary).setup);
        for (a, b) in numbers(&metric).into_iter().zip(numbers(&customary)) {
            assert_relative_eq!(a, b, max_relative = 1e-12, epsilon = 1e-15);
        }
        prop_assert_eq!(metric.defaulted, customary.defaulted);
    }
}
