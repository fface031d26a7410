//! What the supports do to the answer.

use super::Verdict;
use crate::setup::LimitKind;
use crate::units::{Metre, Newton, Radian};
use serde::Serialize;

/// The end constant that stands for the case's supports in the closed form.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct EffectiveEndConstant {
    /// α for which the closed form is critical where the straight column is; `null`: never critical.
    pub end_constant: Option<f64>,
    /// Error estimate of it.
    pub end_constant_error: Option<f64>,
    /// Where the column is never critical: the α below which the formula is not either.
    pub end_constant_below: Option<f64>,
    /// Whether the column is critical beyond C1, where the formula's second root is meant.
    pub beyond_peak: bool,
    /// The handbook's ends that these are, or that are nearest, in words; `null` where none can be
    /// named.
    pub handbook_ends: Option<String>,
    /// Their constants.
    pub handbook_constants: Vec<f64>,
    /// Whether the supports are exactly those ends.
    pub is_handbook_case: bool,
    /// Critical deflection of the spring over that by the formula for the nearest constant, − 1;
    /// `null` where one of them says "never".
    pub relative_difference: Option<f64>,
    /// The finding in a sentence.
    pub sentence: String,
}

/// How far the critical deflection moves when one property of a support changes by 10 %.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct SupportSensitivity {
    /// "bottom" or "top".
    pub end: String,
    /// What is changed: "rotational_stiffness", "sideways_stiffness", "axial_stiffness", "arm" or
    /// "link_length".
    pub property: String,
    /// Critical deflection with 110 % of it, m; `null`: never.
    pub critical_if_larger_m: Option<Metre>,
    /// Critical deflection with 90 % of it, m; `null`: never.
    pub critical_if_smaller_m: Option<Metre>,
    /// Relative change with 110 %; `null` where there, or now, it is never critical.
    pub relative_change_if_larger: Option<f64>,
    /// Relative change with 90 %.
    pub relative_change_if_smaller: Option<f64>,
    /// Error estimate of the changes: difference of two meshes plus the refinement's floor.
    pub relative_change_error: Option<f64>,
}

/// Which property of the supports to know best.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Sensitivities {
    /// By falling effect on the critical deflection of the perfect column as built.
    pub properties: Vec<SupportSensitivity>,
    /// What to measure first, in a sentence.
    pub sentence: String,
}

/// The answer in one of two lateral planes.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct PlaneAnswer {
    /// Direction in which the spring bows, rad, seen from above from the case's reference direction.
    pub direction_rad: Radian,
    /// Whether it is the weaker one, to which the rest of the answer belongs.
    pub governs: bool,
    /// The answer in this plane.
    pub verdict: Verdict,
    /// Why it could not be decided.
    pub undecided_reason: Option<String>,
    /// Its governing limit.
    pub governing: Option<LimitKind>,
    /// Deflection at which that is reached, m.
    pub deflection_m: Option<Metre>,
    /// Force there, N.
    pub force_n: Option<Newton>,
    /// Margin of it.
    pub margin: Option<f64>,
    /// Margin required of it.
    pub required_margin: Option<f64>,
    /// Critical deflection of the perfect column as built, m; `null`: never.
    pub critical_deflection_m: Option<Metre>,
}
