//! The straight column against the closed form and against exact roots.

use coilstay::column::{Column, Idealisation, StraightScan};
use coilstay::criteria::{critical_share, second_share};
use coilstay::setup::{Duty, Imperfections, Loading, Margins, Restraint, Setup, Support};
use coilstay::spring::{EndType, Hand, Spring, Wire};

/// A spring with Λ = `slenderness` and E/G = `r`, ends without dead coils.
fn setup(slenderness: f64, r: f64, bottom: Support, top: Support) -> Setup {
    let mean_diameter = 0.05;
    Setup {
        title: String::new(),
        material: String::new(),
        temperature: 20.0,
        spring: Spring {
            wire: Wire::Round { diameter: 0.006 },
            mean_diameter,
            free_length: slenderness * mean_diameter,
            active_coils: 9.0,
            total_coils: 9.0,
            ends: EndType::ClosedGround,
            hand: Hand::Right,
            youngs_modulus: r * 80e9,
            shear_modulus: 80e9,
            measured_rate: None,
            solid_length: 9.0 * 0.006,
            solid_rule: "",
        },
        bottom,
        top,
        imperfections: Imperfections::none(),
        duty: Duty {
            loading: Loading::Deflection,
            installed_deflection: 0.0,
            working_deflection: 0.01,
            working_force: None,
            working_tolerance: 0.0,
            overtravel: 0.0,
            margins: Margins {
                general: 0.15,
                own: Vec::new(),
            },
            bow_limit: 0.005,
            rate_loss_share: 0.05,
            allowable_stress: None,
        },
        defaulted: Vec::new(),
        warnings: Vec::new(),
    }
}

fn critical(setup: &Setup, elements: usize) -> Option<f64> {
    let mut column = Column::of_setup(setup, Idealisation::WholeLength, elements, None);
    StraightScan::new(&mut column)
        .buckling()
        .map(|b| b.shortening)
}

/// EN 13906-1 buckling clause (from memory), Shigley critical deflection (seen): 16 elements meet
/// it to 1e-8 of itself, for λ ≥ 1.01 of the limit of "never".
#[test]
fn meets_the_closed_form() {
    let ends = [
        (Support::clamped(), Support::clamped(), 0.5),
        (Support::clamped(), Support::sliding(), 1.0),
        (Support::hinged(), Support::hinged(), 1.0),
        (Support::clamped(), Support::free(), 2.0),
    ];
    let mut worst = 0.0_f64;
    for (bottom, top, alpha) in ends {
        for r in [2.2, 206.0 / 81.5, 2.6, 3.0] {
            let limit = (2.0 * std::f64::consts::PI.powi(2) * (r - 1.0) / (2.0 + r)).sqrt();
            for factor in [1.01, 1.02, 1.05, 1.1, 1.2, 1.5, 2.0, 3.0, 5.0, 10.0, 30.0] {
                let setup = setup(factor * limit / alpha, r, bottom, top);
                let length = setup.spring.free_length;
                let section = setup.spring.section(length);
                let formula = critical_share(&section, alpha * length).expect("buckles");
                let column = critical(&setup, 16).expect("buckles");
                worst = worst.max((column / formula - 1.0).abs());
                assert!(
                    (column / formula - 1.0).abs() < 1e-8,
                    "α {alpha}, r {r}, factor {factor}: {column} {formula}"
                );
            }
            for factor in [0.5, 0.9, 0.99] {
                let setup = setup(factor * limit / alpha, r, bottom, top);
                assert_eq!(
                    critical(&setup, 16),
                    None,
                    "α {alpha}, r {r}, factor {factor}"
                );
            }
        }
    }
    println!("worst {worst:e}");
}
