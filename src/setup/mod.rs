//! The question as plain data: a spring in its supports, its imperfections and its duty. All
//! decided, all SI: the optional fields of the case file have become values here.

mod duty;
mod guide;
mod imperfections;
mod support;

pub use duty::{Duty, LimitKind, Loading, Margins};
pub use guide::{FixedTo, Guide, GuideKind};
pub use imperfections::{BowShape, Imperfections, Orientation, TopPosition};
pub use support::{
    Contact, Curve, CurvePoint, FlatSeat, Lateral, LeverArc, Link, MOST_POINTS, Motion, Restraint,
    SeatPose, Support, Swivel,
};

use crate::spring::Spring;
use crate::units::{Celsius, Joule, Metre, Newton};

/// A spring in its supports, its imperfections and its duty.
#[derive(Clone, Debug, PartialEq)]
pub struct Setup {
    /// Title of the case.
    pub title: String,
    /// Name of the wire material, or "given moduli".
    pub material: String,
    /// Service temperature, °C.
    pub temperature: Celsius,
    /// The spring, at service temperature.
    pub spring: Spring,
    /// Support at the bottom, x = 0.
    pub bottom: Support,
    /// Support at the top, where the load comes in.
    pub top: Support,
    /// Rods and bores that the spring may lean on.
    pub guides: Vec<Guide>,
    /// How the spring and its seats deviate from perfect.
    pub imperfections: Imperfections,
    /// What it must do.
    pub duty: Duty,
    /// Dotted names of the inputs that were not given but taken by default ("duty.bow_limit").
    pub defaulted: Vec<String>,
    /// Warnings raised while reading (index below 3, …).
    pub warnings: Vec<String>,
}

impl Setup {
    /// What the seats give axially under a force, m, and the derivative by the force, m/N.
    pub fn seats_give(&self, force: Newton) -> (Metre, f64) {
        let (bottom, top) = (
            self.bottom.axial.gives_under(force),
            self.top.axial.gives_under(force),
        );
        (bottom.0 + top.0, bottom.1 + top.1)
    }

    /// Energy that the seats store axially under a force, J.
    pub fn seats_store(&self, force: Newton) -> Joule {
        self.bottom.axial.stores_under(force) + self.top.axial.stores_under(force)
    }

    /// Whether that limit exists for this case.
    pub fn has(&self, limit: LimitKind) -> bool {
        let ends = [&self.bottom, &self.top];
        let flat = |of: fn(&FlatSeat) -> bool| {
            ends.iter()
                .any(|end| matches!(&end.contact, Contact::Flat(seat) if of(seat)))
        };
        match limit {
            LimitKind::LiftOff => flat(|_| true),
            LimitKind::Slide => flat(|seat| seat.friction.is_some()),
            LimitKind::GuideTouch => self.guides.iter().any(|guide| !guide.touching_allowed),
            LimitKind::Critical => !self.may_lean(),
            LimitKind::BoreFilled => self
                .guides
                .iter()
                .any(|guide| guide.kind == GuideKind::Bore),
            _ => self.duty.has(limit),
        }
    }

    /// Whether the spring may lean on a guide: buckling is then what the guide is there for, and the
    /// critical deflection of the perfect column is no limit.
    pub fn may_lean(&self) -> bool {
        self.guides.iter().any(|guide| guide.touching_allowed)
    }

    /// The same spring in the same seats, stood on its head: turned by half a turn in the plane of
    /// bowing, so that angles stay and sideways positions change sign. For seats that move straight and
    /// guides that the seats carry.
    pub fn turned_over(self) -> Self {
        let turned = |support: Support| Support {
            offset: -support.offset,
            other_plane: support.other_plane.map(|plane| Lateral {
                offset: -plane.offset,
                ..plane
            }),
            ..support
        };
        let guides = self.guides.iter().map(|guide| Guide {
            fixed_to: match guide.fixed_to {
                FixedTo::Top => FixedTo::Bottom,
                FixedTo::Bottom => FixedTo::Top,
                FixedTo::Ground => FixedTo::Ground,
            },
            ..*guide
        });
        Setup {
            guides: guides.collect(),
            bottom: turned(self.top),
            top: turned(self.bottom),
            ..self
        }
    }

    /// The largest deflection that any limit of this case must reach, m.
    pub fn farthest_needed(&self) -> Metre {
        LimitKind::ALL
            .iter()
            .filter(|kind| self.has(**kind))
            .map(|kind| self.duty.needed(*kind))
            .fold(0.0, f64::max)
    }

    /// Whether the two supports together hold the unloaded spring: as a rigid body it may neither
    /// shift sideways nor turn without being resisted.
    pub fn is_held(&self) -> bool {
        hold(&self.bottom, &self.top, self.spring.free_length)
    }
}

/// Whether two supports together hold a rigid spring of this free length, m, in both lateral planes:
/// its stiffness against (shift of the bottom, turn) must be definite.
pub fn hold(bottom: &Support, top: &Support, length: Metre) -> bool {
    hold_in_plane(&bottom.in_first_plane(), &top.in_first_plane(), length)
        && hold_in_plane(&bottom.in_other_plane(), &top.in_other_plane(), length)
}

/// The same in the first plane of both. A flat seat holds rotation. A link holds nothing sideways as
/// long as it is not loaded: its transverse rate goes with its force.
fn hold_in_plane(bottom: &Support, top: &Support, length: Metre) -> bool {
    let resists = |restraint: Restraint| !matches!(restraint, Restraint::Free);
    let reach = length + bottom.arm + top.arm;
    let sideways = [bottom, top].map(|end| end.link.is_none() && resists(end.sideways));
    let turning = resists(bottom.rotation) || resists(top.rotation);
    match sideways {
        [true, true] => reach > 0.0 || turning,
        [true, false] | [false, true] => turning,
        [false, false] => false,
    }
}
