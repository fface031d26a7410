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

/// Mean diameter of the coil, m, at pitch p' for the worse of the two ways in which its ends can be
/// held about the axis: kept from rotating, `√(D² + (p² − p'²)/π²)`, or free to rotate, where at solid
/// it has grown by `0.1 (p² − 0.8 p d − 0.2 d²)/D` (taken in proportion to p² − p'² before).
///
/// Source: EN 13906-1, increase of the coil diameter (from memory).
pub fn widest_diameter(
    mean_diameter: Metre,
    free_pitch: Metre,
    wire: Metre,
    pitch_now: Metre,
) -> Metre {
    let held = 2.0 * compressed_radius(mean_diameter, free_pitch, pitch_now);
    let (p, d) = (free_pitch, wire);
    let closed = 0.1 * (p * p - 0.8 * p * d - 0.2 * d * d) / mean_diameter;
    let done = if p > d {
        (p * p - pitch_now * pitch_now) / (p * p - d * d)
    } else {
        0.0
    };
    held.max(mean_diameter + closed.max(0.0) * done)
}
