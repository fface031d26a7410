//! Sideways rate of the compressed column whose ends stay parallel.

/// R_Q/k at deflection ξ (negative: stretched), for E/G = `r` and Λ = L/D.
///
/// Ends with θ = 0, the top moved sideways by H/R_Q at constant ξ. From the equations of
/// `closed_form`, θ = −(H/P)(1 − cos qS/L − tan(q/2) sin qS/L) and
/// y(L) = (H/P)[(a + b)(2L/q) tan(q/2) − aL]. Written so that nothing cancels as ξ → 0, and real
/// for either sign of ξ: with u = (q/2)² = Λ²(1/2 + 1/r) ξ(1 − mξ) and g(u) = (tan√u/√u − 1)/u,
///
///     k/R_Q = 1/r + Λ²(1/2 + 1/r)(1 − mξ)² g(u).
pub fn transverse_rate(r: f64, slenderness: f64, share: f64) -> f64 {
    1.0 / transverse_compliance(r, slenderness, share)
}

/// k/R_Q. Infinite nowhere below q = π; zero where R_Q has a pole.
pub fn transverse_compliance(r: f64, slenderness: f64, share: f64) -> f64 {
    let height = 1.0 - (1.0 - 1.0 / r) * share;
    let bend = slenderness.powi(2) * (0.5 + 1.0 / r);
    1.0 / r + bend * height.powi(2) * excess(bend * share * height)
}

/// The same rate as it is printed: ξ/[ξ − 1 + (1/Λ)/c · √w · tan(Λξ√w)] with c = 1/2 + 1/r and
/// w = c(1/r + (1 − ξ)/ξ), for 0 < ξ < 1.
///
/// Source: EN 13906-1, transverse spring rate under axial load (from memory).
pub fn printed_rate(r: f64, slenderness: f64, share: f64) -> f64 {
    let half = 0.5 + 1.0 / r;
    let root = (half * (1.0 / r + (1.0 - share) / share)).sqrt();
    share / (share - 1.0 + root * (slenderness * share * root).tan() / (slenderness * half))
}

/// (tan√u/√u − 1)/u, continued through u = 0 to (tanh√−u/√−u − 1)/u.
fn excess(u: f64) -> f64 {
    if u.abs() < 1e-2 {
        // tan z = z + z³/3 + 2z⁵/15 + 17z⁷/315 + 62z⁹/2835 + 1382z¹¹/155925 + …
        let terms = [
            1.0 / 3.0,
            2.0 / 15.0,
            17.0 / 315.0,
            62.0 / 2835.0,
            1382.0 / 155_925.0,
            21_844.0 / 6_081_075.0,
            929_569.0 / 638_512_875.0,
        ];
        terms.iter().rev().fold(0.0, |sum, term| sum * u + term)
    } else if u > 0.0 {
        (u.sqrt().tan() / u.sqrt() - 1.0) / u
    } else {
        ((-u).sqrt().tanh() / (-u).sqrt() - 1.0) / u
    }
}
