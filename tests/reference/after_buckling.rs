//! What the load and the shortening do right after buckling, for ends that leave H = 0 (both
//! hinged, both clamped, clamped–sliding, clamped–free).
//!
//! With H = 0 the beam's equations give EI θ'' = −P y' and, p = P/EA,
//! y' = sin θ − m p sin θ cos θ, x' = cos θ − p + m p sin² θ. To third order
//!
//!     θ'' + (P/EI)[(1 − m p) θ − (1 − 4 m p) θ³/6] = 0,
//!
//! whose solution θ0 cos ωS has ω² = (P/EI)[1 − m p − (1 − 4 m p) θ0²/8]. The ends fix ω, so
//! p(1 − m p) − p(1 − 4 m p)θ0²/8 keeps its value ξ_cr(1 − z), z = m ξ_cr; and the mean of
//! 1 − x' is p + (1 − 2 m p)θ0²/4.

/// d(P/EA)/dθ0² at the bifurcation: ξ_cr(1 − 4z)/(8(1 − 2z)). θ0 is the largest rotation along
/// the column: that of the ends where both are hinged, of the free end, of the quarter points
/// where both are clamped.
pub fn load_slope(r: f64, critical_share: f64) -> f64 {
    let z = (1.0 - 1.0 / r) * critical_share;
    critical_share * (1.0 - 4.0 * z) / (8.0 * (1.0 - 2.0 * z))
}

/// dξ/dθ0² at the bifurcation: the load's slope and (1 − 2z)/4.
pub fn share_slope(r: f64, critical_share: f64) -> f64 {
    let z = (1.0 - 1.0 / r) * critical_share;
    load_slope(r, critical_share) + (1.0 - 2.0 * z) / 4.0
}

/// Axial rate right after buckling as a share of k.
pub fn rate_left(r: f64, critical_share: f64) -> f64 {
    load_slope(r, critical_share) / share_slope(r, critical_share)
}

/// λ below which the load falls after buckling: z = 1/4, so √(4/3) of the limit of "never".
pub fn load_falls_below(r: f64) -> f64 {
    super::closed_form::never_limit(r) * (4.0_f64 / 3.0).sqrt()
}

/// λ below which the shortening falls too: z the smaller root of
/// z(1 − 4z)/m + 2(1 − 2z)² = 0, and λ²/C2 = 1/(4z(1 − z)).
pub fn share_falls_below(r: f64) -> f64 {
    let m = 1.0 - 1.0 / r;
    let (a, b, c) = (8.0 - 4.0 / m, 1.0 / m - 8.0, 2.0);
    let z = 2.0 * c / (-b + (b * b - 4.0 * a * c).sqrt());
    super::closed_form::never_limit(r) / (4.0 * z * (1.0 - z)).sqrt()
}
