//! The free length below which the formula promises that a spring never buckles.

use crate::spring::TurnCompliance;
use crate::units::Metre;
use std::f64::consts::PI;

/// Free length below which `4 m K > 1`, so that no deflection is critical, m:
/// `L0 < (π/α) √(4 m EI/EA)`, where EI/EA is the ratio of a turn's axial to its bending
/// compliance. Round wire: `L0 < (π D/α) √(2(E − G)/(2G + E))`. `None` where m ≤ ½: there the
/// critical deflection reaches the whole length first, which this formula does not speak about.
///
/// Source: Shigley's Mechanical Engineering Design, absolute stability (seen in a public reprint).
pub fn stable_below(turn: &TurnCompliance, end_constant: f64) -> Option<Metre> {
    let m = 1.0 - turn.transverse / turn.axial;
    (m > 0.5).then(|| PI / end_constant * (4.0 * m * turn.axial / turn.bending).sqrt())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::spring::Wire;

    /// π D/α·√(2(E−G)/(2G+E)): 2.62026941 D for E/G = 2.6, 2.58069311 D for 206/81.5 GPa and
    /// 2.58440091 D for 185/73 GPa (independent program); 2.6249 D for 30/11.5 Mpsi, which Shigley
    /// prints as 2.63 for steels (from memory).
    #[test]
    fn meets_the_printed_limit() {
        for (youngs, shear, want, tolerance) in [
            (2.6e9, 1.0e9, 2.62026941, 1e-8),
            (206e9, 81.5e9, 2.58069311, 1e-8),
            (185e9, 73e9, 2.58440091, 1e-8),
            (30e9, 11.5e9, 2.6249, 5e-5),
        ] {
            let wire = Wire::Round { diameter: 0.1 };
            let turn = TurnCompliance::of(&wire, 0.5, youngs, shear);
            let limit = stable_below(&turn, 1.0).expect("m > 1/2");
            assert!((limit - want).abs() < tolerance, "{limit} {want}");
        }
    }
}
