//! How the spring deviates from the perfect column.

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

/// Deviations from the perfect column. All zero: the perfect column.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Imperfections {
    /// Deviation from square e1, m: the free spring, stood on one end, leans by this much at its
    /// top. Acts as a seat angle e1/L0 at both ends, same sign.
    pub squareness: Metre,
    /// Deviation from parallel of the end planes e2, m, over the outer diameter: a further angle
    /// ±e2/D_outer at the top. Both signs are tried, the worse is kept.
    pub parallelism: Metre,
    /// Height of the stress-free bow, m.
    pub bow: Metre,
    /// Shape of the stress-free bow.
    pub bow_shape: BowShape,
    /// Distance of the line of load from the column's axis, m, the same at both ends. Positive: the
    /// axis lies on the side to which a positive bow bends, so that the two add up.
    pub eccentricity: Metre,
    /// Where the top of an out-of-square spring is held.
    pub top_position: TopPosition,
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

    /// Whether nothing deviates.
    pub fn is_perfect(&self) -> bool {
        self.squareness == 0.0
            && self.parallelism == 0.0
            && self.bow == 0.0
            && self.eccentricity == 0.0
    }
}
