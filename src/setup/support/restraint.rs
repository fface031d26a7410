//! How one motion of a seat is held.

use super::Curve;

#[allow(clippy::large_enum_variant)] // plain data, kept `Copy`
/// How one motion of a seat is held. The stiffness is in N/m or N·m/rad and positive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Restraint {
    /// Not at all (stiffness 0).
    Free,
    /// By a linear spring.
    Elastic(f64),
    /// By a law as measured: force or moment over motion, its positive half.
    Progressive(Curve),
    /// Completely (stiffness ∞).
    Held,
}

impl Restraint {
    /// The restraint of the given stiffness: 0 is free, ∞ is held.
    pub fn from_stiffness(stiffness: f64) -> Self {
        if stiffness == 0.0 {
            Restraint::Free
        } else if stiffness.is_infinite() {
            Restraint::Held
        } else {
            Restraint::Elastic(stiffness)
        }
    }

    /// Its stiffness, of a law at rest: 0 for free, ∞ for held.
    pub fn stiffness(self) -> f64 {
        match self {
            Restraint::Free => 0.0,
            Restraint::Elastic(k) => k,
            Restraint::Progressive(curve) => curve.at(0.0).slope,
            Restraint::Held => f64::INFINITY,
        }
    }

    /// Whether it gives, by a linear or a measured law.
    pub fn gives(self) -> bool {
        matches!(self, Restraint::Elastic(_) | Restraint::Progressive(_))
    }

    /// Motion under a force, and its derivative: the compliance there. Not for a free one.
    pub fn gives_under(self, force: f64) -> (f64, f64) {
        match self {
            Restraint::Free => (f64::INFINITY, f64::INFINITY),
            Restraint::Elastic(k) => (force / k, 1.0 / k),
            Restraint::Progressive(curve) => {
                let motion = curve.inverse(force.abs()).copysign(force);
                (motion, 1.0 / curve.odd_at(motion).slope)
            }
            Restraint::Held => (0.0, 0.0),
        }
    }

    /// Energy stored under a force. Not for a free one.
    pub fn stores_under(self, force: f64) -> f64 {
        match self {
            Restraint::Free => f64::INFINITY,
            Restraint::Elastic(k) => 0.5 * force * force / k,
            Restraint::Progressive(curve) => curve.odd_energy(curve.inverse(force.abs())),
            Restraint::Held => 0.0,
        }
    }

    /// The same law with its stiffness times `factor`.
    pub fn stiffened(self, factor: f64) -> Self {
        match self {
            Restraint::Elastic(k) => Restraint::Elastic(k * factor),
            Restraint::Progressive(curve) => {
                let points: Vec<(f64, f64)> =
                    curve.points().map(|(x, y)| (x, y * factor)).collect();
                Curve::odd(&points).map_or(self, Restraint::Progressive)
            }
            other => other,
        }
    }
}
