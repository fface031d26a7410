//! How an end sits on its seat.

use crate::units::{Metre, Newton, NewtonMetre};
use std::f64::consts::PI;

/// How the end of the spring and its seat hold together.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Contact {
    /// Joined: the seat can pull as well as push.
    Joined,
    /// A flat end on a flat seat, which can only push.
    Flat(FlatSeat),
    /// A ball or swivel with friction: holds up to a moment, then turns at it.
    Swivel(Swivel),
}

/// A flat ground end on a flat seat: a rigid ring that can only be pushed.
///
/// As long as the force line passes the seat plane inside the ring, `|M| < N a`, the end is clamped;
/// then it pivots on its edge at the distance `a` from the centre, and the far side lifts off. (An
/// elastic ring begins to open earlier, at `|M| = N a/2`; lift-off here is the rigid ring's.)
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FlatSeat {
    /// Radius of the ring that bears, m.
    pub radius: Metre,
    /// Share of a turn that is ground and bears, 0.5 to 1.
    pub ground_share: f64,
    /// Friction between end and seat; `None`: the end does not slide (piloted), or is not asked.
    pub friction: Option<f64>,
}

impl FlatSeat {
    /// Distance from the centre to the nearest edge of what bears, m: where a share f of the turn is
    /// ground the gap spans 2π(1−f), and the chord across it lies R cos(π(1−f)) from the centre. It
    /// is taken on both sides, as nobody knows how the spring will be turned in its seat.
    pub fn edge(&self) -> Metre {
        self.radius * (PI * (1.0 - self.ground_share)).cos()
    }
}

/// Friction of a ball or swivel.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Swivel {
    /// Coefficient of friction.
    pub friction: f64,
    /// Radius at which it acts, m: of the ball.
    pub radius: Metre,
}

impl Swivel {
    /// Moment it holds under an axial force.
    pub fn holds(&self, force: Newton) -> NewtonMetre {
        self.friction * self.radius * force.abs()
    }
}

/// A bar hinged at both ends between the end of the spring and a far hinge that is held sideways.
/// Leaning by the angle ψ it pushes sideways with P tan ψ: a transverse rate of −P/ℓ as a strut,
/// +P/ℓ as a hanger, for small ψ.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Link {
    /// Length ℓ between its hinges, m.
    pub length: Metre,
    /// Whether it hangs: its far hinge lies on the spring's side and it is pulled.
    pub hanging: bool,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_chord_across_what_is_not_ground_is_the_edge() {
        let seat = |ground_share| FlatSeat {
            radius: 10.0,
            ground_share,
            friction: None,
        };
        approx::assert_abs_diff_eq!(seat(1.0).edge(), 10.0);
        approx::assert_abs_diff_eq!(seat(0.75).edge(), 50.0_f64.sqrt(), epsilon = 1e-12);
        approx::assert_abs_diff_eq!(seat(0.5).edge(), 0.0, epsilon = 1e-12);
    }
}
