//! Transverse rate of a compressed spring whose ends stay parallel.

/// Transverse rate over axial rate, R_Q/k, at the deflection share ξ of a round-wire spring of
/// slenderness Λ = L0/D and moduli ratio r = E/G:
///
/// ```text
/// R_Q/k = ξ / [ ξ − 1 + (1/Λ)/(1/2 + 1/r) · q · tan(Λ ξ q) ],
/// q = √((1/2 + 1/r)(1/r + (1 − ξ)/ξ))
/// ```
///
/// Range: 0 < ξ < 1, up to the critical deflection of clamped, clamped–sliding ends, where it
/// falls to zero. Source: EN 13906-1, transverse spring rate (from memory); Haringx, Philips Res.
/// Rep. 4 (1949) 49–80.
pub fn transverse_rate_ratio(slenderness: f64, moduli_ratio: f64, share: f64) -> f64 {
    let half = 0.5 + 1.0 / moduli_ratio;
    let q = (half * (1.0 / moduli_ratio + (1.0 - share) / share)).sqrt();
    let shape = q / (slenderness * half) * (slenderness * share * q).tan();
    share / (share - 1.0 + shape)
}

#[cfg(test)]
mod tests {
    use super::transverse_rate_ratio;

    /// Values at E/G = 2.6 by an independent program (not published, good for digits).
    #[test]
    fn meets_independent_digits() {
        for (slenderness, share, want) in [
            (2.0, 0.1, 0.631787158),
            (2.0, 0.2, 0.628003029),
            (2.0, 0.4, 0.641586716),
            (3.0, 0.1, 0.268571827),
            (3.0, 0.2, 0.198050683),
            (3.0, 0.4, 0.0180508821),
        ] {
            let got = transverse_rate_ratio(slenderness, 2.6, share);
            // Half a unit of the ninth decimal.
            approx::assert_abs_diff_eq!(got, want, epsilon = 6e-10);
        }
    }
}
