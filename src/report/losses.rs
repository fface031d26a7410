//! Whether friction took anything out of a stroke.

use crate::result::Stroke;

/// Energies below this share of the largest force times the stroke's length are round-off.
const ROUND_OFF: f64 = 1e-9;

/// Whether a stroke lost nothing but round-off: neither has its loop an area nor did friction work.
pub fn is_lossless(stroke: &Stroke) -> bool {
    let largest = stroke
        .out
        .iter()
        .map(|point| point.force_n.abs())
        .fold(0.0, f64::max);
    let floor = ROUND_OFF * largest * (stroke.to_deflection_m - stroke.from_deflection_m).abs();
    stroke.energy_lost_j.abs() <= floor && stroke.friction_work_j.abs() <= floor
}
