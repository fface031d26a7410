//! The coil grows in diameter as it is compressed.

use crate::units::Metre;
use std::f64::consts::PI;

/// Mean radius at pitch `pitch_now`, m, for ends kept from turning: the wire keeps its length,
/// `D(L)² = D² + (p² − p_L²)/π²`.
///
/// Source: the length of a helix; EN 13906-1 has the same at solid (from memory).
pub fn compressed_radius(mean_diameter: Metre, free_pitch: Metre, pitch_now: Metre) -> Metre {
    (mean_diameter.powi(2) + (free_pitch.powi(2) - pitch_now.powi(2)) / PI.powi(2)).sqrt() / 2.0
}
