//! The straight column against the closed form and against exact roots.

use coilstay::column::{Column, Idealisation, StraightScan};
use coilstay::criteria::critical_share;
use coilstay::setup::{Setup, Support};
use fixture::setup;

mod fixture;

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
