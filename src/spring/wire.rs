//! The wire's cross-section.

use crate::units::Metre;
use std::f64::consts::PI;

/// Cross-section of the wire, by its size across the coil's radius and along the coil's axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Wire {
    /// Round wire of the given diameter, m.
    Round {
        /// Diameter, m.
        diameter: Metre,
    },
    /// Rectangular wire.
    Rectangular {
        /// Side in the direction of the coil's radius, m.
        radial: Metre,
        /// Side in the direction of the coil's axis, m.
        axial: Metre,
    },
}

impl Wire {
    /// Size along the coil's axis, m: what counts for the solid length.
    pub fn axial_size(&self) -> Metre {
        match *self {
            Wire::Round { diameter } => diameter,
            Wire::Rectangular { axial, .. } => axial,
        }
    }

    /// Size along the coil's radius, m: what counts for outer and inner diameter and the index.
    pub fn radial_size(&self) -> Metre {
        match *self {
            Wire::Round { diameter } => diameter,
            Wire::Rectangular { radial, .. } => radial,
        }
    }

    /// Area, m².
    pub fn area(&self) -> f64 {
        match *self {
            Wire::Round { diameter } => PI * diameter.powi(2) / 4.0,
            Wire::Rectangular { radial, axial } => radial * axial,
        }
    }

    /// Second moment for bending in the plane of the coil (about the coil's axis), m⁴.
    /// It resists a change of the coil's curvature: transverse force and torque about the axis.
    pub fn second_moment_about_axis(&self) -> f64 {
        match *self {
            Wire::Round { diameter } => PI * diameter.powi(4) / 64.0,
            Wire::Rectangular { radial, axial } => axial * radial.powi(3) / 12.0,
        }
    }

    /// Second moment for bending out of the plane of the coil (about the coil's radius), m⁴.
    pub fn second_moment_about_radius(&self) -> f64 {
        match *self {
            Wire::Round { diameter } => PI * diameter.powi(4) / 64.0,
            Wire::Rectangular { radial, axial } => radial * axial.powi(3) / 12.0,
        }
    }

    /// Torsion constant J, m⁴ (St Venant). Round: πd⁴/32. Rectangle of long side `a`, short side
    /// `b`: `J = a b³ (1/3 − 64 b/(π⁵ a) Σ tanh((2i+1)πa/2b)/(2i+1)⁵)`.
    ///
    /// Source: Timoshenko & Goodier, Theory of Elasticity, torsion of a rectangular bar (series
    /// from memory; tested against the handbook constants 0.1406 and 0.2287 of the same book).
    pub fn torsion_constant(&self) -> f64 {
        match *self {
            Wire::Round { diameter } => PI * diameter.powi(4) / 32.0,
            Wire::Rectangular { radial, axial } => {
                let (a, b) = (radial.max(axial), radial.min(axial));
                let series: f64 = odd_terms()
                    .map(|n| (n * PI * a / (2.0 * b)).tanh() / n.powi(5))
                    .sum();
                a * b.powi(3) * (1.0 / 3.0 - 64.0 * b / (PI.powi(5) * a) * series)
            }
        }
    }

    /// Largest shear stress in a straight wire per unit of torque, 1/m³. Round: `16/(πd³)`.
    /// Rectangle (middle of the long side): `b/J·(1 − 8/π² Σ 1/((2i+1)² cosh((2i+1)πa/2b)))`.
    ///
    /// Source: as for [`Wire::torsion_constant`].
    pub fn torsion_stress_per_torque(&self) -> f64 {
        match *self {
            Wire::Round { diameter } => 16.0 / (PI * diameter.powi(3)),
            Wire::Rectangular { radial, axial } => {
                let (a, b) = (radial.max(axial), radial.min(axial));
                let series: f64 = odd_terms()
                    .map(|n| 1.0 / (n.powi(2) * (n * PI * a / (2.0 * b)).cosh()))
                    .sum();
                b * (1.0 - 8.0 / PI.powi(2) * series) / self.torsion_constant()
            }
        }
    }
}

/// 1, 3, 5, …: as many terms as double precision can see in the torsion series.
fn odd_terms() -> impl Iterator<Item = f64> {
    (0..400).map(|i| f64::from(2 * i + 1))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Timoshenko & Goodier, table of k1 and k for rectangular bars (from memory):
    /// J = k1 a b³ with k1 = 0.1406 (square), 0.229 (a/b = 2), 0.312 (10);
    /// τ = T/(k2 a b²) with k2 = 0.208, 0.246, 0.312.
    #[test]
    fn rectangular_torsion_meets_the_handbook_table() {
        for (ratio, k1, k2) in [
            (1.0, 0.1406, 0.208),
            (2.0, 0.229, 0.246),
            (10.0, 0.312, 0.312),
        ] {
            for (radial, axial) in [(ratio, 1.0), (1.0, ratio)] {
                let wire = Wire::Rectangular { radial, axial };
                // Half a unit in the table's last place.
                assert!((wire.torsion_constant() / ratio - k1).abs() < 7e-4);
                assert!((1.0 / (wire.torsion_stress_per_torque() * ratio) - k2).abs() < 7e-4);
            }
        }
    }
}
