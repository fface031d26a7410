//! What holds an end of the spring, in one lateral plane.

mod contact;
mod curve;
mod motion;
mod restraint;

pub use contact::{Contact, FlatSeat, Link, Swivel};
pub use curve::{Curve, CurvePoint, MOST_POINTS};
pub use motion::{LeverArc, Motion, SeatPose};
pub use restraint::Restraint;

use crate::units::{Metre, Radian};

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
    /// How the end sits on its seat.
    pub contact: Contact,
    /// The link through which the load comes, if any. The end is hinged to it.
    pub link: Option<Link>,
    /// How the seat moves aside as it travels (top only); `None`: straight.
    pub motion: Option<Motion>,
    /// What holds it in the other principal plane; `None`: the same all round.
    pub other_plane: Option<Lateral>,
    /// Direction of the first principal plane, rad, seen from above from the case's reference
    /// direction. Of no account where both planes are alike.
    pub plane: Radian,
}

/// What differs between the two principal planes of a support.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lateral {
    /// Rotation of the end.
    pub rotation: Restraint,
    /// Sideways motion.
    pub sideways: Restraint,
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
            contact: Contact::Joined,
            link: None,
            motion: None,
            other_plane: None,
            plane: 0.0,
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

    /// A flat end on a flat seat.
    pub fn flat(seat: FlatSeat) -> Self {
        Support {
            contact: Contact::Flat(seat),
            ..Support::clamped()
        }
    }

    /// What holds it in its first principal plane.
    pub fn lateral(&self) -> Lateral {
        Lateral {
            rotation: self.rotation,
            sideways: self.sideways,
            tilt: self.tilt,
            offset: self.offset,
        }
    }

    /// The support as it is in its other principal plane, alike all round. A seat with two planes
    /// moves aside in its first one only; of one without, nobody knows in which: it is taken to do so
    /// in both.
    pub fn in_other_plane(&self) -> Self {
        let there = self.other_plane.unwrap_or_else(|| self.lateral());
        Support {
            rotation: there.rotation,
            sideways: there.sideways,
            tilt: there.tilt,
            offset: there.offset,
            motion: self.motion.filter(|_| self.other_plane.is_none()),
            other_plane: None,
            ..*self
        }
    }

    /// The support as it is in its first principal plane, alike all round.
    pub fn in_first_plane(&self) -> Self {
        Support {
            other_plane: None,
            ..*self
        }
    }

    /// The trade's word for it: clamped, hinged, free, sliding, elastic, flat, ball or link.
    pub fn word(&self) -> &'static str {
        if self.link.is_some() {
            return "link";
        }
        match self.contact {
            Contact::Flat(_) => return "flat",
            Contact::Swivel(_) => return "ball",
            Contact::Joined => {}
        }
        match (self.rotation, self.sideways) {
            (Restraint::Held, Restraint::Held) => "clamped",
            (Restraint::Free, Restraint::Held) => "hinged",
            (Restraint::Free, Restraint::Free) => "free",
            (Restraint::Held, Restraint::Free) => "sliding",
            _ => "elastic",
        }
    }
}
