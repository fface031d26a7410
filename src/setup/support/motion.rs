//! A seat that does not move straight: on a lever, or as measured.

use super::{Curve, CurvePoint};
use crate::units::{Metre, Radian};

#[allow(clippy::large_enum_variant)] // plain data, kept `Copy`
/// How the top seat's offset and tilt grow with its travel.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Motion {
    /// The seat is on a lever.
    Lever(LeverArc),
    /// As a table.
    Table {
        /// Sideways offset, m, over the travel, m.
        offset: Curve,
        /// Tilt, rad, over the travel, m.
        tilt: Curve,
    },
}

/// A lever that carries the seat: its pivot seen from the seat's centre, spring unloaded.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LeverArc {
    /// Along the spring's axis, m, outward (beyond the seat) positive.
    pub along: Metre,
    /// Across it, m, towards +y positive.
    pub across: Metre,
}

/// Offset and tilt at a travel, each with two derivatives by the travel.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SeatPose {
    /// Sideways offset, m.
    pub offset: CurvePoint,
    /// Tilt, rad.
    pub tilt: CurvePoint,
}

impl LeverArc {
    /// The largest travel it allows, m: ρ − a, where the seat has come level with the far side of its
    /// circle and moves sideways only.
    pub fn largest_travel(&self) -> Metre {
        self.along.hypot(self.across) - self.along
    }

    /// The pose after a travel u. With the pivot at (a, b) from the seat, the seat turned by ψ about
    /// it stands at `(a, b) − Rot(ψ)(a, b)`; its travel, along −x, is
    /// `u = a cos ψ − b sin ψ − a`, its offset `v = b − a sin ψ − b cos ψ`. Hence
    ///
    /// ```text
    /// cos(ψ + β) = (a + u)/ρ,   ρ = √(a² + b²),   β = atan2(b, a)
    /// dψ/du = −1/(ρ sin(ψ + β)),   dv/du = (a cos ψ − b sin ψ)/(ρ sin(ψ + β))
    /// ```
    pub fn pose(&self, travel: Metre) -> SeatPose {
        let (a, b) = (self.along, self.across);
        let reach = a.hypot(b);
        let start = b.atan2(a);
        let cos = ((a + travel) / reach).clamp(-1.0, 1.0);
        // ψ + β keeps the sign of β: the branch it starts on.
        let sin = (1.0 - cos * cos).sqrt().copysign(b);
        let turned = sin.atan2(cos);
        let angle: Radian = turned - start;
        let turn = -1.0 / (reach * sin);
        // d²ψ/du² from d(sin) = cos dψ.
        let turn_bend = cos * turn / (reach * sin * sin);
        // a cos ψ − b sin ψ = a + u, and v = b − ρ sin(ψ + β).
        let point = |(value, slope, bend)| CurvePoint { value, slope, bend };
        SeatPose {
            offset: point((
                b - reach * sin,
                -reach * cos * turn,
                -reach * (cos * turn_bend - sin * turn * turn),
            )),
            tilt: point((angle, turn, turn_bend)),
        }
    }
}

impl Motion {
    /// Offset and tilt after a travel of the seat, m.
    pub fn pose(&self, travel: Metre) -> SeatPose {
        match self {
            Motion::Lever(arc) => arc.pose(travel),
            Motion::Table { offset, tilt } => SeatPose {
                offset: offset.at(travel),
                tilt: tilt.at(travel),
            },
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_lever_keeps_its_distance_and_its_slopes_are_the_differences() {
        for (along, across) in [(0.0, 0.1), (0.02, -0.12), (-0.01, 0.08)] {
            let arc = LeverArc { along, across };
            // At the largest travel it moves sideways only; a little before, it still turns on.
            let largest = arc.largest_travel();
            let pose = arc.pose(largest * (1.0 - 1e-9));
            assert!((pose.offset.value - across).abs() < 1e-4 * across.abs());
            assert!(pose.tilt.slope.abs() > 1e3 * arc.pose(0.0).tilt.slope.abs());
            for travel in [0.0, 0.01, 0.03] {
                let pose = arc.pose(travel);
                // The seat, at (−travel, offset) from where it was, is as far from the pivot.
                let distance = (along + travel).hypot(across - pose.offset.value);
                approx::assert_abs_diff_eq!(distance, along.hypot(across), epsilon = 1e-14);
                // Turned back by the tilt, the arm points as it did.
                let (sin, cos) = pose.tilt.value.sin_cos();
                let (x, y) = (along + travel, across - pose.offset.value);
                approx::assert_abs_diff_eq!(cos * x + sin * y, along, epsilon = 1e-14);
                approx::assert_abs_diff_eq!(cos * y - sin * x, across, epsilon = 1e-14);
                let step = 1e-6;
                let (up, down) = (arc.pose(travel + step), arc.pose(travel - step));
                for (here, above, below) in [
                    (pose.offset, up.offset, down.offset),
                    (pose.tilt, up.tilt, down.tilt),
                ] {
                    approx::assert_abs_diff_eq!(
                        (above.value - below.value) / (2.0 * step),
                        here.slope,
                        epsilon = 1e-7
                    );
                    approx::assert_abs_diff_eq!(
                        (above.slope - below.slope) / (2.0 * step),
                        here.bend,
                        epsilon = 1e-5
                    );
                }
            }
        }
    }
}
