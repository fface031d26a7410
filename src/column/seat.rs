//! How the end of the column sits on its seat.
//!
//! The unknowns of an end node are those of its seat: q = (X, η, φ), X where the seat is along the line
//! of load, η sideways, φ the rotation. The end of the column is at the pose u(q) = (x, y, θ):
//!
//! ```text
//! joined:      u = q
//! moving seat: y = η + v(s), θ = φ + τ(s)                      s = X_0 − X the seat's travel
//! link:        x = X ± (ℓ − √(ℓ² − (η − η_0)²))               + strut at the top, hanger at the bottom
//! flat seat:   (x, y) moved by Rot(τ) σR (sin φ', 1 − cos φ') while rocking, φ' from flush
//! ```
//!
//! A flat end rocks about its edge at σR (σ = sign φ' at the bottom, −sign φ' at the top): its centre
//! rises R|sin φ'| from the seat and moves R(1 − cos φ') aside. Forces follow by virtual work,
//!
//! ```text
//! r_q = Jᵀ r_u,   K_q = Jᵀ K_u J + Σ r_u ∂²u/∂q²,   J = ∂u/∂q                       (6)
//! ```
//!
//! so the load λ on X is the one the seat's own travel works against: on a lever, that of the lever.
//! Flush, a flat seat carries any moment up to N R about its centre, N across the seat; beyond it
//! the end rocks. Nothing is cut off: either the rotation is held and the moment is the answer, or
//! the end stands on its edge and the rotation is.
//!
//! A swivel with friction turns under the moment `μ r |N|` against the way it turns, and holds
//! what is less: a row that is not symmetric.

use crate::setup;
use nalgebra::{Matrix3, Vector3};

/// What the end does on its seat. Lengths in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Touch {
    /// As its laws say.
    Joined,
    /// A flat ring of this radius that can only be pushed.
    Flat {
        /// Radius of the ring.
        edge: f64,
    },
    /// A pivot with friction.
    Swivel {
        /// Coefficient of friction times the radius at which it acts.
        reach: f64,
    },
    /// Through a link.
    Link {
        /// Its length.
        length: f64,
        /// Whether it hangs.
        hanging: bool,
    },
}

/// A seat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Seat {
    /// What the end does on it.
    pub touch: Touch,
    /// How it moves aside as it travels, in SI.
    pub motion: Option<setup::Motion>,
    /// Metres for one of the column's units of length.
    pub length: f64,
    /// Where it stands along the line of load before it has travelled.
    pub start: f64,
    /// Angle as built, rad.
    pub tilt: f64,
    /// Sideways position as built.
    pub offset: f64,
    /// Whether it is the top one.
    pub at_top: bool,
}

/// The pose of an end with its derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Pose {
    pub at: Vector3<f64>,
    pub by: Matrix3<f64>,
    seconds: [Matrix3<f64>; 3],
    plain: bool,
}

impl Seat {
    /// A seat to which the end is joined.
    pub fn joined(at_top: bool) -> Self {
        Seat {
            touch: Touch::Joined,
            motion: None,
            length: 1.0,
            start: 0.0,
            tilt: 0.0,
            offset: 0.0,
            at_top,
        }
    }

    /// Whether the pose is q itself.
    pub(super) fn is_plain(&self) -> bool {
        self.motion.is_none() && matches!(self.touch, Touch::Joined | Touch::Swivel { .. })
    }

    /// Offset and tilt of a moving seat where it is, each with two derivatives by X.
    fn moved(&self, x: f64) -> ([f64; 3], [f64; 3]) {
        let Some(motion) = &self.motion else {
            return ([0.0; 3], [0.0; 3]);
        };
        let pose = motion.pose((self.start - x) * self.length);
        (
            [
                pose.offset.value / self.length,
                -pose.offset.slope,
                pose.offset.bend * self.length,
            ],
            [
                pose.tilt.value,
                -pose.tilt.slope * self.length,
                pose.tilt.bend * self.length * self.length,
            ],
        )
    }

    /// Sideways position and slope of the seat itself.
    pub(super) fn stands(&self, x: f64) -> (f64, f64) {
        let (offset, tilt) = self.moved(x);
        (self.offset + offset[0], (self.tilt + tilt[0]).tan())
    }

    /// Edge on which the end stands where it is turned by `turned` from flush.
    pub(super) fn edge_side(&self, turned: f64) -> f64 {
        if self.at_top {
            -turned.signum()
        } else {
            turned.signum()
        }
    }

    /// The pose of the end at q. `rocking`: how far it is turned from flush, and on which edge.
    pub(super) fn pose(&self, q: &Vector3<f64>, rocking: Option<(f64, f64)>) -> Pose {
        let mut pose = Pose {
            at: *q,
            by: Matrix3::identity(),
            seconds: [Matrix3::zeros(); 3],
            plain: true,
        };
        let (offset, tilt) = self.moved(q[0]);
        if self.motion.is_some() {
            pose.plain = false;
            pose.at[1] += offset[0];
            pose.at[2] += tilt[0];
            pose.by[(1, 0)] = offset[1];
            pose.by[(2, 0)] = tilt[1];
            pose.seconds[1][(0, 0)] = offset[2];
            pose.seconds[2][(0, 0)] = tilt[2];
        }
        match self.touch {
            Touch::Joined | Touch::Swivel { .. } => {}
            Touch::Link { length, hanging } => {
                pose.plain = false;
                let sense = if hanging == self.at_top { -1.0 } else { 1.0 };
                // Beyond its own length it cannot reach: kept just within.
                let aside = (q[1] - self.offset).clamp(-0.99 * length, 0.99 * length);
                let root = (length * length - aside * aside).sqrt();
                pose.at[0] += sense * aside * aside / (length + root);
                pose.by[(0, 1)] += sense * aside / root;
                pose.seconds[0][(1, 1)] += sense * length * length / root.powi(3);
            }
            Touch::Flat { edge } => {
                if let Some((turned, side)) = rocking {
                    pose.plain = false;
                    let (sin, cos) = (self.tilt + tilt[0]).sin_cos();
                    let turn = |v: [f64; 2]| [cos * v[0] - sin * v[1], sin * v[0] + cos * v[1]];
                    let (sf, cf) = turned.sin_cos();
                    let reach = side * edge;
                    let half = (0.5 * turned).sin();
                    let shift = turn([reach * sf, reach * 2.0 * half * half]);
                    let by = turn([reach * cf, reach * sf]);
                    let bend = turn([-reach * sf, reach * cf]);
                    let (rate, rate_bend) = (tilt[1], tilt[2]);
                    // d Rot(τ)v/dτ = (−v_y, v_x).
                    let swung = [-shift[1], shift[0]];
                    let swung_by = [-by[1], by[0]];
                    for axis in 0..2 {
                        pose.at[axis] += shift[axis];
                        pose.by[(axis, 2)] += by[axis];
                        pose.by[(axis, 0)] += rate * swung[axis];
                        let second = &mut pose.seconds[axis];
                        second[(2, 2)] += bend[axis];
                        second[(0, 2)] += rate * swung_by[axis];
                        second[(2, 0)] += rate * swung_by[axis];
                        second[(0, 0)] += rate_bend * swung[axis] - rate * rate * shift[axis];
                    }
                }
            }
        }
        pose
    }

    /// Force across the seat with which the end presses on it, from its force on the column, and
    /// the force along it.
    pub(super) fn pressed(&self, x: f64, force: [f64; 2]) -> (f64, f64) {
        let (_, tilt) = self.moved(x);
        let (sin, cos) = (self.tilt + tilt[0]).sin_cos();
        // The seat pushes along its normal: +x at the bottom, −x at the top.
        let sense = if self.at_top { -1.0 } else { 1.0 };
        (
            sense * (force[0] * cos + force[1] * sin),
            force[1] * cos - force[0] * sin,
        )
    }
}

impl Pose {
    /// Whether it is q itself.
    pub fn is_plain(&self) -> bool {
        self.plain
    }

    /// Σ r ∂²u/∂q².
    pub fn curving(&self, actions: &Vector3<f64>) -> Matrix3<f64> {
        self.seconds[0] * actions[0] + self.seconds[1] * actions[1] + self.seconds[2] * actions[2]
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::setup::{LeverArc, Motion};

    #[test]
    fn derivatives_of_every_pose_are_the_differences() {
        let lever = Motion::Lever(LeverArc {
            along: 0.01,
            across: -0.3,
        });
        let base = Seat {
            length: 0.2,
            start: 1.0,
            tilt: 0.03,
            offset: 0.01,
            ..Seat::joined(true)
        };
        let mut seats = Vec::new();
        for at_top in [false, true] {
            for motion in [None, Some(lever)] {
                seats.push(Seat {
                    touch: Touch::Flat { edge: 0.13 },
                    motion,
                    at_top,
                    ..base
                });
            }
            for hanging in [false, true] {
                seats.push(Seat {
                    touch: Touch::Link {
                        length: 0.3,
                        hanging,
                    },
                    at_top,
                    ..base
                });
            }
        }
        seats.push(Seat {
            motion: Some(lever),
            ..base
        });
        let actions = Vector3::new(-3.0, 0.7, 1.1);
        for seat in seats {
            for turned in [0.07, -0.05] {
                let flush = 0.02;
                let q = Vector3::new(0.9, 0.05, flush + turned);
                let at = |q: &Vector3<f64>| {
                    let turned = q[2] - flush;
                    seat.pose(q, Some((turned, seat.edge_side(turned))))
                };
                let here = at(&q);
                let step = 1e-6;
                for k in 0..3 {
                    let (mut up, mut down) = (q, q);
                    up[k] += step;
                    down[k] -= step;
                    let (up, down) = (at(&up), at(&down));
                    let difference = (up.at - down.at) / (2.0 * step);
                    assert!((difference - here.by.column(k)).amax() < 1e-8, "{seat:?}");
                    let difference = (up.by - down.by).tr_mul(&actions) / (2.0 * step);
                    assert!(
                        (difference - here.curving(&actions).column(k)).amax() < 1e-7,
                        "{seat:?}"
                    );
                }
                // A rocking end leaves its seat, it does not enter it.
                if let (Touch::Flat { edge }, None) = (seat.touch, seat.motion) {
                    let rise = (here.at[0] - q[0]) * seat.tilt.cos()
                        + (here.at[1] - q[1]) * seat.tilt.sin();
                    let sense = if seat.at_top { -1.0 } else { 1.0 };
                    approx::assert_abs_diff_eq!(
                        sense * rise,
                        edge * turned.sin().abs(),
                        epsilon = 1e-14
                    );
                }
            }
        }
    }
}
