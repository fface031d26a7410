//! What holds an end of the spring, in one lateral plane.

use crate::units::{Metre, Radian};

/// How one motion of a seat is held. The stiffness is in N/m or N·m/rad and positive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Restraint {
    /// Not at all (stiffness 0).
    Free,
    /// By a linear spring.
    Elastic(f64),
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

    /// Its stiffness: 0 for free, ∞ for held.
    pub fn stiffness(self) -> f64 {
        match self {
            Restraint::Free => 0.0,
            Restraint::Elastic(k) => k,
            Restraint::Held => f64::INFINITY,
        }
    }
}

/// A support. Its laws act at the *pivot*, which lies `arm` beyond the end plane of the spring
/// (outward positive), rigidly joined to it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Support {
    /// Rotation of the end in the plane of bowing.
    pub rotation: Restraint,
    /// Sideways motion.
    pub sideways: Restraint,
    /// Axial motion of the seat: `Held` or `Elastic`, in series with the spring.
    pub axial: Restraint,
    /// Rigid arm from the end plane to the pivot, m; outward positive.
    pub arm: Metre,
    /// Angle of the seat as built, rad.
    pub tilt: Radian,
    /// Sideways position of the seat as built, m.
    pub offset: Metre,
}

impl Support {
    /// Rotation and sideways motion held.
    pub fn clamped() -> Self {
        Support {
            rotation: Restraint::Held,
            sideways: Restraint::Held,
            axial: Restraint::Held,
            arm: 0.0,
            tilt: 0.0,
            offset: 0.0,
        }
    }

    /// Free to rotate, held sideways.
    pub fn hinged() -> Self {
        Support {
            rotation: Restraint::Free,
            ..Support::clamped()
        }
    }

    /// Free to rotate and to move sideways.
    pub fn free() -> Self {
        Support {
            rotation: Restraint::Free,
            sideways: Restraint::Free,
            ..Support::clamped()
        }
    }

    /// Rotation held, sideways free ("clamped–sliding").
    pub fn sliding() -> Self {
        Support {
            sideways: Restraint::Free,
            ..Support::clamped()
        }
    }

    /// The trade's word for it: clamped, hinged, free, sliding, or elastic.
    pub fn word(&self) -> &'static str {
        match (self.rotation, self.sideways) {
            (Restraint::Held, Restraint::Held) => "clamped",
            (Restraint::Free, Restraint::Held) => "hinged",
            (Restraint::Free, Restraint::Free) => "free",
            (Restraint::Held, Restraint::Free) => "sliding",
            _ => "elastic",
        }
    }
}
