//! A rod inside the spring or a bore around it.

use crate::spring::{Spring, compressed_radius, widest_diameter};
use crate::units::Metre;

/// Which side of the coil it faces.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum GuideKind {
    /// A rod, mandrel or pilot inside the coil.
    Rod,
    /// A bore, tube or pocket around it.
    Bore,
}

/// What carries the guide.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum FixedTo {
    /// The ground, in line with the true axis; its places are counted from the bottom seat.
    Ground,
    /// The bottom seat, with its offset and tilt as built.
    Bottom,
    /// The top seat: it moves with it; its places are counted from there, downwards.
    Top,
}

/// A guide.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Guide {
    /// Rod or bore.
    pub kind: GuideKind,
    /// Its diameter, m.
    pub diameter: Metre,
    /// What carries it.
    pub fixed_to: FixedTo,
    /// Where it begins, m from the seat plane it is counted from.
    pub from: Metre,
    /// Where it ends, m from there; ∞: it goes along the whole spring.
    pub to: Metre,
    /// Coefficient of friction between coil and guide.
    pub friction: f64,
    /// Whether the spring may touch it in service.
    pub touching_allowed: bool,
}

impl Guide {
    /// Pitch, m, at which the coil, grown by compression, fills the bore, for the worse of the two
    /// ways in which its ends may be held about the axis; `None`: not down to closed coils, or a rod.
    pub fn filled_at_pitch(&self, spring: &Spring) -> Option<Metre> {
        if self.kind == GuideKind::Rod {
            return None;
        }
        let wire = spring.wire.axial_size();
        let widest = |pitch: Metre| {
            widest_diameter(spring.mean_diameter, spring.pitch(), wire, pitch)
                + spring.wire.radial_size()
        };
        let (mut low, mut high) = (wire, spring.pitch());
        if widest(low) <= self.diameter {
            return None;
        }
        for _ in 0..200 {
            let middle = 0.5 * (low + high);
            if widest(middle) > self.diameter {
                low = middle;
            } else {
                high = middle;
            }
        }
        Some(high)
    }

    /// Outer diameter of the coil pressed closed, m, for the worse of those two ways.
    pub fn closed_outer_diameter(spring: &Spring) -> Metre {
        let wire = spring.wire.axial_size();
        widest_diameter(spring.mean_diameter, spring.pitch(), wire, wire)
            + spring.wire.radial_size()
    }

    /// Radial clearance, m, where the coils' pitch is compressed to `open` times the free one:
    /// `(D' − d − d_rod)/2` or `(d_bore − D' − d)/2`, D' the mean diameter grown by compression.
    pub fn clearance(&self, spring: &Spring, open: f64) -> Metre {
        let pitch = spring.pitch();
        let radius = compressed_radius(spring.mean_diameter, pitch, pitch * open);
        let half_wire = 0.5 * spring.wire.radial_size();
        match self.kind {
            GuideKind::Rod => radius - half_wire - 0.5 * self.diameter,
            GuideKind::Bore => 0.5 * self.diameter - radius - half_wire,
        }
    }
}
