//! Critical deflection of a spring between ends that a single end constant describes.
//!
//! Linearise the column about its straight, shortened state, ξ = s/L0, a = 1 − ξ, b = ξ/r with
//! r = GA/EA (E/G for round wire): it buckles where
//!
//! ```text
//! P (a + b) = π² EI/(α L0)²,   P = EA ξ
//! ξ (1 − m ξ) = K,   m = 1 − 1/r,   K = π² EI/(EA (α L0)²)
//! ξ_cr = 2K/(1 + √(1 − 4 m K));   never, where 4 m K > 1
//! ```
//!
//! For round wire K = π² r/(2(2 + r) λ²), λ = α L0/D, which is the handbooks'
//! `ξ_cr = C1 (1 − √(1 − C2/λ²))` with C1 = r/(2(r − 1)), C2 = 2π²(r − 1)/(2 + r).
//!
//! Source: EN 13906-1, buckling clause (from memory); Shigley's Mechanical Engineering Design,
//! chapter on mechanical springs, critical deflection with C1' and C2' (seen in a public reprint).

use crate::spring::Section;
use crate::units::Metre;
use std::f64::consts::PI;

fn load_term(section: &Section, effective_length: Metre) -> (f64, f64) {
    let m = 1.0 - section.axial / section.shear;
    let k = PI.powi(2) * section.bending / (section.axial * effective_length.powi(2));
    (m, k)
}

/// Critical deflection as a share of the free length, for the stiffnesses of the column that takes
/// the whole free length as deformable, and the effective length α·L0, m. `None`: never, or only
/// where nothing of the length would be left (ξ ≥ 1).
pub fn critical_share(section: &Section, effective_length: Metre) -> Option<f64> {
    let (m, k) = load_term(section, effective_length);
    let under = 1.0 - 4.0 * m * k;
    let share = 2.0 * k / (1.0 + under.sqrt());
    (under >= 0.0 && share < 1.0).then_some(share)
}

/// Second root of the same equation, where the column straightens again: C1 (1 + √(1 − C2/λ²)).
/// `None` where there is none below 1.
pub fn second_share(section: &Section, effective_length: Metre) -> Option<f64> {
    let (m, k) = load_term(section, effective_length);
    let under = 1.0 - 4.0 * m * k;
    let share = (1.0 + under.sqrt()) / (2.0 * m);
    (under >= 0.0 && m > 0.0 && share < 1.0).then_some(share)
}

/// The end constant of a column that is critical at this share of its free length, m:
///
/// ```text
/// α = π/q,   q² = L0² EA ξ(1 − m ξ)/EI
/// ```
///
/// Whatever holds its ends, the linearised column obeys θ'' + (q/L0)² θ = const: its mode is a piece
/// of a sine with half waves of the length π L0/q, and the closed form's α L0 is that length. The
/// relation ξ(1 − m ξ) = K is the closed form's own, read from ξ to α, so α is exact for every
/// support and wire section. Up to ξ = C1 = 1/(2m) it is the constant for which
/// [`critical_share`] gives ξ; beyond C1, where only the ends can make a column critical first, it
/// is the one for which [`second_share`] does. `None` outside 0 < ξ < 1.
///
/// Source: derived here from the closed form above.
pub fn effective_end_constant(section: &Section, free_length: Metre, share: f64) -> Option<f64> {
    let (m, k) = load_term(section, free_length);
    (share > 0.0 && share < 1.0).then(|| (k / (share * (1.0 - m * share))).sqrt())
}

/// The end constant below which the closed form finds no critical share: where K passes the
/// largest value of ξ(1 − m ξ) over 0 < ξ < 1, which is 1/(4m) at C1, or 1 − m at ξ = 1 where
/// m ≤ ½. Source: as above.
pub fn never_critical_below(section: &Section, free_length: Metre) -> f64 {
    let (m, k) = load_term(section, free_length);
    let largest = if m > 0.5 { 0.25 / m } else { 1.0 - m };
    (k / largest).sqrt()
}

/// Whether a share lies beyond C1, where the effect of the load on the column is largest.
pub fn is_beyond_peak(section: &Section, share: f64) -> bool {
    2.0 * (1.0 - section.axial / section.shear) * share > 1.0
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Section of unit rate and diameter: lengths in D, E/G = r, round wire.
    fn section(r: f64, length: f64) -> Section {
        Section {
            axial: length,
            shear: r * length,
            bending: length * r / (2.0 * (2.0 + r)),
        }
    }

    /// The handbook's own writing of the formula, C1 (1 − √(1 − C2/λ²)), Shigley (seen).
    fn as_printed(r: f64, lambda: f64) -> f64 {
        let c1 = r / (2.0 * (r - 1.0));
        let c2 = 2.0 * PI.powi(2) * (r - 1.0) / (2.0 + r);
        c1 * (1.0 - (1.0 - c2 / lambda.powi(2)).sqrt())
    }

    #[test]
    fn meets_the_formula_as_printed() {
        for r in [2.0, 2.6, 206.0 / 81.5, 3.5] {
            for lambda in [2.75, 3.0, 4.0, 6.0, 10.0, 30.0] {
                let Some(share) = critical_share(&section(r, lambda), lambda) else {
                    assert!(as_printed(r, lambda).is_nan());
                    continue;
                };
                approx::assert_relative_eq!(share, as_printed(r, lambda), max_relative = 1e-10);
            }
        }
    }

    /// Table of ξ at αL0/D, computed by an independent program to 10 digits: not published, good
    /// for digits. E/G = 2.6, 206/81.5 and 185/73 (moduli of EN 10270 wire).
    #[test]
    fn meets_independent_digits() {
        let table = [
            (2.7, [0.6165077408, 0.5840987332, 0.5868173772]),
            (3.0, [0.4168433437, 0.4054605653, 0.4064932254]),
            (4.0, [0.1985989770, 0.1952149634, 0.1955280054]),
            (6.0, [0.08157371444, 0.08043608467, 0.08054175102]),
            (10.0, [0.02838829586, 0.02802393802, 0.02805782091]),
        ];
        for (lambda, row) in table {
            for (r, want) in [2.6, 206.0 / 81.5, 185.0 / 73.0].into_iter().zip(row) {
                let got = critical_share(&section(r, lambda), lambda).expect("buckles");
                approx::assert_relative_eq!(got, want, max_relative = 3e-10);
            }
        }
    }

    #[test]
    fn r_of_one_is_no_special_case() {
        let (lambda, k) = (4.0, PI.powi(2) / (6.0 * 16.0));
        let share = critical_share(&section(1.0, lambda), lambda);
        approx::assert_relative_eq!(share.expect("buckles"), k, max_relative = 1e-14);
    }

    #[test]
    fn the_end_constant_is_the_formula_read_backwards() {
        for r in [1.0, 1.7, 2.6, 3.5] {
            for length in [2.7, 4.0, 9.0] {
                let section = section(r, length);
                for share in [1e-6, 0.01, 0.3, 0.6, 0.9, 0.98] {
                    let alpha = effective_end_constant(&section, length, share).expect("in range");
                    let back = if is_beyond_peak(&section, share) {
                        second_share(&section, alpha * length)
                    } else {
                        critical_share(&section, alpha * length)
                    };
                    approx::assert_relative_eq!(
                        back.expect("critical"),
                        share,
                        max_relative = 1e-7
                    );
                }
                assert_eq!(effective_end_constant(&section, length, 1.0), None);
            }
        }
    }

    #[test]
    fn below_its_limit_the_formula_is_never_critical() {
        for r in [1.2, 1.9, 2.6, 3.5] {
            let section = section(r, 5.0);
            let limit = never_critical_below(&section, 5.0);
            assert!(critical_share(&section, 5.0 * limit * (1.0 - 1e-9)).is_none());
            assert!(critical_share(&section, 5.0 * limit * (1.0 + 1e-9)).is_some());
        }
    }
}
