//! What holds an end of the column.

use crate::reference::elastic_ends::Link;

/// What holds an end. Its laws act at the pivot, which the rigid piece joins to the end plane.
#[derive(Clone, Copy, Debug)]
pub struct Seat {
    /// Moment on the column per turn away from `angle`, 0 to infinity: M_on = −k_θ(θ − angle).
    pub rotation: f64,
    /// Force on the column per sideways motion away from `offset`, 0 to infinity.
    pub sideways: f64,
    /// Angle of the seat, rad.
    pub angle: f64,
    /// Sideways position of the seat.
    pub offset: f64,
    /// Length of the rigid piece from the end plane to the pivot, along the section's normal,
    /// outward positive (dead coils, arms).
    pub arm: f64,
    /// Distance of the pivot from the axis, along the end plane, positive to +y.
    pub eccentricity: f64,
    /// Dead sideways force on the pivot.
    pub force: f64,
    /// Dead moment on the end.
    pub moment: f64,
    /// Moment on the end per load P, as of a seat that turns against its friction.
    pub drag: f64,
    /// A link at the pivot; its far hinge is held at `offset`.
    pub link: Option<Link>,
}

impl Seat {
    /// Held in both.
    pub const CLAMPED: Seat = Seat::elastic(f64::INFINITY, f64::INFINITY);
    /// Free to turn.
    pub const HINGED: Seat = Seat::elastic(0.0, f64::INFINITY);
    /// Kept from turning, free sideways.
    pub const SLIDING: Seat = Seat::elastic(f64::INFINITY, 0.0);
    /// Not held.
    pub const FREE: Seat = Seat::elastic(0.0, 0.0);

    /// Elastic, at angle and offset 0, without a rigid piece or a load.
    pub const fn elastic(rotation: f64, sideways: f64) -> Seat {
        Seat {
            rotation,
            sideways,
            angle: 0.0,
            offset: 0.0,
            arm: 0.0,
            eccentricity: 0.0,
            force: 0.0,
            moment: 0.0,
            drag: 0.0,
            link: None,
        }
    }

    /// Hinged to a link, held by nothing else.
    pub const fn linked(link: Link) -> Seat {
        Seat {
            link: Some(link),
            ..Seat::FREE
        }
    }

    /// From the end plane's centre to the pivot when the end has turned by `theta`; `outward` is
    /// +1 at the top and −1 at the bottom.
    pub(super) fn piece(&self, theta: f64, outward: f64) -> (f64, f64) {
        let (sin, cos) = theta.sin_cos();
        let arm = outward * self.arm;
        (
            arm * cos - self.eccentricity * sin,
            arm * sin + self.eccentricity * cos,
        )
    }

    /// What is left of the sideways law where the column, under `load`, is pushed by `on` and
    /// stands at `y`, in the given units.
    pub(super) fn sideways_rest(
        &self,
        (load, on): (f64, f64),
        y: f64,
        force: f64,
        length: f64,
    ) -> f64 {
        let (of_force, of_motion) = weights(self.sideways * length / force);
        let aside = y - self.offset;
        // P tan ψ with sin ψ = aside/ℓ: a strut pushes on, a hanger pulls back.
        let link = self.link.map_or(0.0, |link| {
            -link.rate(load) * aside / (1.0 - (aside / link.length).powi(2)).sqrt()
        });
        of_force * (on - self.force - link) / force + of_motion * aside / length
    }

    /// What is left of the law of rotation where the column, under `load`, is turned by `on` and
    /// stands at `theta`.
    pub(super) fn turning_rest(&self, (load, on): (f64, f64), theta: f64, moment: f64) -> f64 {
        let (of_moment, of_turn) = weights(self.rotation / moment);
        of_moment * (on - self.moment - self.drag * load) / moment + of_turn * (theta - self.angle)
    }

    /// How much nearer to the column a link that leans has its far hinge.
    pub(super) fn link_sinks(&self, y: f64) -> f64 {
        self.link.map_or(0.0, |link| {
            let lean = ((y - self.offset) / link.length).asin();
            let sinks = 2.0 * link.length * (0.5 * lean).sin().powi(2);
            if link.hanging { -sinks } else { sinks }
        })
    }
}

/// Weights of force and of motion in (force on the column) + k·(motion) = 0, finite for every k
/// from 0 to infinity.
fn weights(stiffness: f64) -> (f64, f64) {
    if stiffness.is_infinite() {
        (0.0, 1.0)
    } else {
        (1.0 / (1.0 + stiffness), stiffness / (1.0 + stiffness))
    }
}
