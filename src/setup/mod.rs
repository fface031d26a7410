//! The question as plain data: a spring in its supports, its imperfections and its duty. All
//! decided, all SI: the optional fields of the case file have become values here.

mod duty;
mod imperfections;
mod support;

pub use duty::{Duty, LimitKind, Loading, Margins};
pub use imperfections::{BowShape, Imperfections, Orientation, TopPosition};
pub use support::{Restraint, Support};

use crate::spring::Spring;
use crate::units::{Celsius, Metre};

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
    /// Whether the two supports together hold the unloaded spring: as a rigid body it may neither
    /// shift sideways nor turn without being resisted.
    pub fn is_held(&self) -> bool {
        hold(&self.bottom, &self.top, self.spring.free_length)
    }
}

/// Whether two supports together hold a rigid spring of this free length, m: its stiffness against
/// (shift of the bottom, turn) must be definite.
pub fn hold(bottom: &Support, top: &Support, length: Metre) -> bool {
    let resists = |restraint: Restraint| !matches!(restraint, Restraint::Free);
    let reach = length + bottom.arm + top.arm;
    let sideways = [resists(bottom.sideways), resists(top.sideways)];
    let turning = resists(bottom.rotation) || resists(top.rotation);
    match sideways {
        [true, true] => reach > 0.0 || turning,
        [true, false] | [false, true] => turning,
        [false, false] => false,
    }
}
