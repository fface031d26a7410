//! How the spring deviates from the perfect column.

use super::{Restraint, Support};
use crate::units::Metre;

/// Shape of the stress-free bow.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum BowShape {
    /// Half a sine wave over the deformable length.
    HalfSine,
    /// The first buckling mode of the straight column in its supports.
    FirstMode,
}

/// Where the top of an out-of-square spring is held sideways.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TopPosition {
    /// On a pilot: in line with the bottom.
    Piloted,
    /// Held by friction where it lands: as far off line as the spring leans.
    Landed,
}

/// Deviations from the perfect column, as sizes. All zero: the perfect column. How the spring stands
/// in its seats is left to chance, so their signs against each other and against the seats are too:
/// see [`Orientation`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Imperfections {
    /// Deviation from square e1, m: the free spring, stood on one end, leans by this much at its
    /// top. Acts as an angle e1/L0 between seat and section at both ends, same sign.
    pub squareness: Metre,
    /// Deviation from parallel of the end planes e2, m, over the outer diameter: a further angle
    /// e2/D_outer at one end.
    pub parallelism: Metre,
    /// Height of the stress-free bow, m: of the half sine; of the mode from its chord where both
    /// ends are held sideways, else from side to side.
    pub bow: Metre,
    /// Shape of the stress-free bow.
    pub bow_shape: BowShape,
    /// Distance of the line of load from the column's axis, m, the same at both ends.
    pub eccentricity: Metre,
    /// Where the top of an out-of-square spring is held.
    pub top_position: TopPosition,
}

/// How the deviations lie to one another: signs, +1 or −1, and the end that is out of parallel.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Orientation {
    /// Sign of the lean.
    pub squareness: f64,
    /// Sign of the wedge.
    pub parallelism: f64,
    /// Whether the wedge is at the top.
    pub wedge_at_top: bool,
    /// Sign of the bow.
    pub bow: f64,
    /// Sign of the eccentricity.
    pub eccentricity: f64,
    /// Side (+1: +y) of the branch that is taken where the path runs into a branch point.
    pub branch: f64,
}

impl Orientation {
    /// All positive, the wedge at the top.
    pub fn plain() -> Self {
        Orientation {
            squareness: 1.0,
            parallelism: 1.0,
            wedge_at_top: true,
            bow: 1.0,
            eccentricity: 1.0,
            branch: 1.0,
        }
    }
}

impl Imperfections {
    /// The perfect column.
    pub fn none() -> Self {
        Imperfections {
            squareness: 0.0,
            parallelism: 0.0,
            bow: 0.0,
            bow_shape: BowShape::HalfSine,
            eccentricity: 0.0,
            top_position: TopPosition::Piloted,
        }
    }

    /// Every way in which the deviations can lie to one another between these seats; the mirror
    /// image of one already listed is left out where the seats are true and move straight. 16 at
    /// most, or 32 between seats that do not.
    pub fn orientations(&self, bottom: &Support, top: &Support) -> Vec<Orientation> {
        let acts_at = |support: &Support| support.rotation != Restraint::Free || support.arm != 0.0;
        let true_seats = [bottom, top].iter().all(|support| {
            support.tilt == 0.0 && support.offset == 0.0 && support.motion.is_none()
        });
        let mut ends: Vec<bool> = Vec::new();
        if self.parallelism != 0.0 {
            ends.extend(acts_at(top).then_some(true));
            ends.extend(acts_at(bottom).then_some(false));
        }
        let mut found = vec![Orientation::plain()];
        let mut one_sign_chosen = !true_seats;
        // The first deviation may be taken as positive: the rest lie to it one way or the other.
        let mut split = |found: &mut Vec<Orientation>, set: fn(&mut Orientation, f64)| {
            if !one_sign_chosen {
                one_sign_chosen = true;
                return;
            }
            let mirrored: Vec<Orientation> = found
                .iter()
                .map(|orientation| {
                    let mut other = *orientation;
                    set(&mut other, -1.0);
                    other
                })
                .collect();
            found.extend(mirrored);
        };
        if self.squareness != 0.0 {
            split(&mut found, |o, sign| o.squareness = sign);
        }
        if self.bow != 0.0 {
            split(&mut found, |o, sign| o.bow = sign);
        }
        // A load off the axis of an end that cannot turn is carried by its seat.
        let can_turn = [bottom, top]
            .iter()
            .any(|support| support.rotation != Restraint::Held);
        if self.eccentricity != 0.0 && can_turn {
            split(&mut found, |o, sign| o.eccentricity = sign);
        }
        if !ends.is_empty() {
            split(&mut found, |o, sign| o.parallelism = sign);
        }
        ends.iter()
            .flat_map(|at_top| {
                found.iter().map(|orientation| Orientation {
                    wedge_at_top: *at_top,
                    ..*orientation
                })
            })
            .chain(found.iter().copied().filter(|_| ends.is_empty()))
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::setup::{FlatSeat, LeverArc, Motion};

    fn sizes(squareness: f64, parallelism: f64, bow: f64, eccentricity: f64) -> Imperfections {
        Imperfections {
            squareness,
            parallelism,
            bow,
            eccentricity,
            ..Imperfections::none()
        }
    }

    #[test]
    fn every_relative_sign_and_end_is_listed_once() {
        let (clamped, hinged) = (Support::clamped(), Support::hinged());
        let count = |sizes: Imperfections, bottom: &Support, top: &Support| {
            let found = sizes.orientations(bottom, top);
            for (i, one) in found.iter().enumerate() {
                assert!(!found[..i].contains(one));
            }
            found.len()
        };
        assert_eq!(count(sizes(0.0, 0.0, 0.0, 0.0), &clamped, &clamped), 1);
        assert_eq!(count(sizes(1.0, 0.0, 0.0, 0.0), &clamped, &clamped), 1);
        assert_eq!(count(sizes(1.0, 1.0, 0.0, 0.0), &clamped, &clamped), 4);
        assert_eq!(count(sizes(1.0, 1.0, 0.0, 0.0), &clamped, &hinged), 2);
        assert_eq!(count(sizes(1.0, 1.0, 1.0, 1.0), &clamped, &clamped), 8);
        assert_eq!(count(sizes(1.0, 1.0, 1.0, 1.0), &clamped, &hinged), 8);
        let soft = Support {
            rotation: Restraint::Elastic(1.0),
            ..clamped
        };
        assert_eq!(count(sizes(1.0, 1.0, 1.0, 1.0), &clamped, &soft), 16);
        let tilted = Support {
            tilt: 0.01,
            ..clamped
        };
        assert_eq!(count(sizes(1.0, 1.0, 1.0, 1.0), &tilted, &soft), 32);
        // A seat on a lever is not mirrored; a flat one holds rotation as a clamped one does.
        let across = 0.1;
        let on_lever = Support {
            motion: Some(Motion::Lever(LeverArc { along: 0.0, across })),
            ..clamped
        };
        assert_eq!(count(sizes(1.0, 0.0, 0.0, 0.0), &clamped, &on_lever), 2);
        let flat = Support::flat(FlatSeat {
            radius: 0.02,
            ground_share: 1.0,
            friction: None,
        });
        assert_eq!(count(sizes(1.0, 1.0, 1.0, 1.0), &clamped, &flat), 8);
    }
}
