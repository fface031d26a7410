//! Stress in the wire at the worst point of a turn.

use super::Wire;
use crate::units::{NewtonMetre, Pascal};

/// Stress correction for the wire's curvature, `(w + ½)/(w − ¾)` with the index w (Bergsträsser).
///
/// Source: EN 13906-1, stress correction factor; Shigley's Mechanical Engineering Design,
/// equation for K_B (both from memory). For rectangular wire its use is common practice, no source.
pub fn curvature_factor(index: f64) -> f64 {
    (index + 0.5) / (index - 0.75)
}

/// Largest corrected shear stress in the wire, Pa, under the torque `torque`, N·m: that per unit of
/// torque times the curvature factor; round wire 16 T/(π d³).
///
/// At the worst point of a turn in a bowed section `T = |N| R + |M|`, with the section's axial force
/// N and moment M and the coil's current radius R. The transverse force adds none: it bends the wire
/// in the plane of the coil.
pub fn torsion_stress(wire: &Wire, index: f64, torque: NewtonMetre) -> Pascal {
    wire.torsion_stress_per_torque() * torque * curvature_factor(index)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Straight spring: τ = K·8 F D/(π d³), Shigley's equation for the shear stress of a helical
    /// spring (from memory).
    #[test]
    fn straight_spring_meets_the_handbook_formula() {
        let (d, mean, force) = (4e-3_f64, 32e-3, 300.0);
        let wire = Wire::Round { diameter: d };
        let want = (8.5 / 7.25) * 8.0 * force * mean / (std::f64::consts::PI * d.powi(3));
        let got = torsion_stress(&wire, 8.0, force * mean / 2.0);
        approx::assert_relative_eq!(got, want, max_relative = 1e-14);
    }
}
