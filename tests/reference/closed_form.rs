//! Critical deflection of the straight column where one equation gives it. Dimensionless:
//! r = E/G, Λ = L/D, ξ = s/L with L the deformable length.
//!
//! Linearised about the straight, shortened state, with a = 1 − ξ, b = ξ/r and S along the
//! stress-free axis, the beam's equations are y' = (a + b)θ + H/GA, M = EI θ' and
//! M' = −(a H + P y') = −(a + b)(P θ + H), so
//!
//!     θ'' + (q/L)² θ = −(q/L)² H/P,     q² = P(a + b)L²/EI = ξ(1 − mξ) Λ² 2(2 + r)/r,  m = 1 − 1/r.

use super::root::first_loss;
use std::f64::consts::PI;

/// ξ_cr of the column of effective slenderness λ = αΛ: the smaller root of q = π at Λ = λ,
/// ξ(1 − mξ) = π² r/(2(2 + r)λ²). `None`: never.
pub fn critical_share(r: f64, effective_slenderness: f64) -> Option<f64> {
    let need = PI.powi(2) * r / (2.0 * (2.0 + r) * effective_slenderness.powi(2));
    let left = 1.0 - 4.0 * (1.0 - 1.0 / r) * need;
    (left >= 0.0).then(|| 2.0 * need / (1.0 + left.sqrt()))
}

/// The other root, where the column straightens again. `None`: never, or never buckled.
pub fn straightening_share(r: f64, effective_slenderness: f64) -> Option<f64> {
    let m = 1.0 - 1.0 / r;
    critical_share(r, effective_slenderness)
        .map(|first| 1.0 / m - first)
        .filter(|second| m > 0.0 && *second < 1.0)
}

/// λ below which the column never buckles, √C2 = π √(2(r − 1)/(2 + r)); r > 1.
pub fn never_limit(r: f64) -> f64 {
    PI * (2.0 * (r - 1.0) / (2.0 + r)).sqrt()
}

/// Where ξ(1 − mξ) is largest: C1 = r/(2(r − 1)), or infinity for r ≤ 1.
pub fn peak_share(r: f64) -> f64 {
    if r > 1.0 {
        r / (2.0 * (r - 1.0))
    } else {
        f64::INFINITY
    }
}

/// q at the deflection ξ.
pub fn wave_number(r: f64, slenderness: f64, share: f64) -> f64 {
    let m = 1.0 - 1.0 / r;
    (share * (1.0 - m * share) * 2.0 * (2.0 + r) / r).sqrt() * slenderness
}

/// ξ_cr of the column clamped at one end and hinged at the other, exactly.
///
/// θ(0) = 0, M(L) = 0, y(L) = y(0): θ = (H/P)(cos qS/L − 1 + tan q · sin qS/L), and the last
/// condition gives tan q = q a/(a + b). `None`: never before ξ = 1.
pub fn clamped_hinged(r: f64, slenderness: f64) -> Option<f64> {
    let left = |share: f64| {
        let q = wave_number(r, slenderness, share);
        let ratio = (1.0 - share) / (1.0 - share + share / r);
        // Divided by q³: at q → 0 and share → 0 both terms vanish together.
        (q.sin() - q * ratio * q.cos()) / q.powi(3)
    };
    first_loss(left, &[peak_share(r)])
}

/// ξ_cr of the column with equal rigid arms at both ends, hinged at their far ends.
/// `arm_share` = h/L, positive outward.
///
/// Symmetric mode, H = 0: θ ∝ sin(q(1/2 − S/L)), and M = −P h θ at the bottom's end plane gives
/// q (h/L) tan(q/2) = a + b. The antisymmetric mode is not looked at: `elastic_ends` has both.
/// `None`: never before ξ = 1.
pub fn hinged_arms(r: f64, slenderness: f64, arm_share: f64) -> Option<f64> {
    let left = |share: f64| {
        let q = wave_number(r, slenderness, share);
        let height = 1.0 - share + share / r;
        height * (0.5 * q).cos() - q * arm_share * (0.5 * q).sin()
    };
    first_loss(left, &[peak_share(r)])
}

/// ξ_cr of the column clamped at one end whose other end is hinged to a link of length ℓ,
/// `link_share` = ℓ/L; a `hanging` one has its far hinge on the column's side.
///
/// θ(0) = 0 and M(L) = 0 give θ as in `clamped_hinged` and
/// y(L) = (H L/P)[(a + b) tan q/q − a]; with H = ±P y(L)/ℓ (strut +, hanger −)
///
///     (a + b) tan q/q = a + ℓ/L   (strut),      (a + b) tan q/q = a − ℓ/L   (hanger)
///
/// ℓ → ∞ is the free end, q = π/2; a hanger of no length holds it sideways; one as long as the
/// shortened column sends the load through the foot, q = π (Timoshenko & Gere, load through a
/// fixed point, from memory). `None`: never before ξ = 1.
pub fn clamped_link(r: f64, slenderness: f64, link_share: f64, hanging: bool) -> Option<f64> {
    let sign = if hanging { -1.0 } else { 1.0 };
    let left = |share: f64| {
        let q = wave_number(r, slenderness, share);
        let height = 1.0 - share + share / r;
        // Times cos q, positive without load.
        sign * (1.0 - share + sign * link_share) * q.cos() - sign * height * q.sin() / q
    };
    first_loss(left, &[peak_share(r)])
}
