//! From coil to column: the stiffnesses of the equivalent column from the energy of one turn.
//!
//! Take one turn of wire of radius R, small pitch, loaded by what a section of the column
//! carries, and add up the energy of the wire over the turn (Castigliano). The wire's angle
//! around the turn is φ.
//!
//! * Axial force N: the wire twists, T = N R all around. Energy 2πR·(N R)²/(2GJ).
//! * Transverse force Q, at the turn's height: the wire bends in the plane of the coil,
//!   M = Q R sin φ. Energy Q² R³ π/(2 E I_axis).
//! * Moment M about a diameter: the wire twists by M sin φ and bends out of the plane of the
//!   coil by M cos φ. Energy M² π R (1/GJ + 1/E I_radius)/2.
//! * Torque about the axis: the wire bends in the plane of the coil, all around.
//!
//! The wire's own direct shear and the pitch angle are left out; the wire model answers for them.

use super::Wire;
use crate::units::{Metre, Pascal};
use std::f64::consts::PI;

/// Compliance of one turn of wire, each as (displacement or rotation)/(force or moment).
///
/// Source: Haringx, Philips Res. Rep. 3 (1948); Timoshenko & Gere, Theory of Elastic Stability,
/// article on helical springs; Wahl, Mechanical Springs (all from memory; derived above).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TurnCompliance {
    /// Axial force, m/N: 2πR³/(GJ); round wire 64R³/(Gd⁴).
    pub axial: f64,
    /// Transverse force, m/N: πR³/(E I_axis); round wire 64R³/(Ed⁴).
    pub transverse: f64,
    /// Moment about a diameter, rad/(N·m): πR(1/(GJ) + 1/(E I_radius)).
    pub bending: f64,
    /// Torque about the axis, rad/(N·m): 2πR/(E I_axis).
    pub torque: f64,
}

impl TurnCompliance {
    /// Compliance of a turn of `wire` at mean radius `radius` with moduli E and G.
    pub fn of(wire: &Wire, radius: Metre, youngs: Pascal, shear: Pascal) -> Self {
        let gj = shear * wire.torsion_constant();
        let ei_axis = youngs * wire.second_moment_about_axis();
        let ei_radius = youngs * wire.second_moment_about_radius();
        TurnCompliance {
            axial: 2.0 * PI * radius.powi(3) / gj,
            transverse: PI * radius.powi(3) / ei_axis,
            bending: PI * radius * (1.0 / gj + 1.0 / ei_radius),
            torque: 2.0 * PI * radius / ei_axis,
        }
    }

    /// Every compliance times `factor`.
    pub fn scaled(self, factor: f64) -> Self {
        TurnCompliance {
            axial: self.axial * factor,
            transverse: self.transverse * factor,
            bending: self.bending * factor,
            torque: self.torque * factor,
        }
    }

    /// The section law where one turn takes up `length_per_turn` of the free column, m.
    pub fn section(&self, length_per_turn: Metre) -> Section {
        Section {
            axial: length_per_turn / self.axial,
            shear: length_per_turn / self.transverse,
            bending: length_per_turn / self.bending,
        }
    }
}

/// Stiffnesses of a section of the equivalent column. `f64::INFINITY` is allowed for `axial` and
/// `shear` (a column that cannot shorten or shear).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Section {
    /// EA, N.
    pub axial: f64,
    /// GA, N.
    pub shear: f64,
    /// EI, N·m².
    pub bending: f64,
}

#[cfg(test)]
mod tests {
    use super::*;

    /// EA = k L0, GA = r k L0, EI = k L0 D² r/(2(2 + r)) for round wire (physics of the model;
    /// Timoshenko & Gere, article on helical springs, from memory).
    #[test]
    fn round_wire_gives_the_published_stiffnesses() {
        let (d, radius, youngs, shear, n, length) = (8e-3, 31e-3, 206e9, 81.5e9, 8.5, 0.21);
        let wire = Wire::Round { diameter: d };
        let section = TurnCompliance::of(&wire, radius, youngs, shear).section(length / n);
        let diameter = 2.0 * radius;
        let rate = shear * d.powi(4) / (8.0 * diameter.powi(3) * n);
        let r = youngs / shear;
        approx::assert_relative_eq!(section.axial, rate * length, max_relative = 1e-14);
        approx::assert_relative_eq!(section.shear, r * rate * length, max_relative = 1e-14);
        approx::assert_relative_eq!(
            section.bending,
            rate * length * diameter.powi(2) * r / (2.0 * (2.0 + r)),
            max_relative = 1e-14
        );
    }

    /// The energy of a turn, integrated numerically around the wire: an independent route to the
    /// closed compliances, for a wire whose two second moments differ.
    #[test]
    fn compliances_are_the_energy_of_a_turn() {
        let wire = Wire::Rectangular {
            radial: 3e-3,
            axial: 5e-3,
        };
        let (radius, youngs, shear) = (20e-3, 185e9, 73e9);
        let turn = TurnCompliance::of(&wire, radius, youngs, shear);
        let steps = 1000;
        let twice_energy = |torque: &dyn Fn(f64) -> f64,
                            in_plane: &dyn Fn(f64) -> f64,
                            out: &dyn Fn(f64) -> f64| {
            (0..steps)
                .map(|i| {
                    let phi = 2.0 * PI * (f64::from(i) + 0.5) / f64::from(steps);
                    (torque(phi).powi(2) / (shear * wire.torsion_constant())
                        + in_plane(phi).powi(2) / (youngs * wire.second_moment_about_axis())
                        + out(phi).powi(2) / (youngs * wire.second_moment_about_radius()))
                        * radius
                        * 2.0
                        * PI
                        / f64::from(steps)
                })
                .sum::<f64>()
        };
        let none = |_: f64| 0.0;
        let all = |value: f64| move |_: f64| value;
        for (got, want) in [
            (turn.axial, twice_energy(&all(radius), &none, &none)),
            (
                turn.transverse,
                twice_energy(&none, &|p| radius * p.sin(), &none),
            ),
            (
                turn.bending,
                twice_energy(&|p| p.sin(), &none, &|p| p.cos()),
            ),
            (turn.torque, twice_energy(&none, &all(1.0), &none)),
        ] {
            approx::assert_relative_eq!(got, want, max_relative = 1e-12);
        }
    }
}
