//! Beams that only bend, and the column that only bends and shortens.

use std::f64::consts::PI;

/// The cantilever under a dead compressive tip load, bent so far that its tip has turned.
#[derive(Clone, Copy, Debug)]
pub struct Cantilever {
    /// P/P_cr with P_cr = π²EI/(4L²).
    pub load_ratio: f64,
    /// Height of the tip over the clamp along the load line, /L.
    pub tip_x: f64,
    /// Distance of the tip from the line, /L.
    pub tip_y: f64,
}

/// Cantilever whose tip has turned by `tip_angle`, rad, in (0, π).
///
/// EI θ'' = −P sin θ. With k = sin(tip/2): L√(P/EI) = K(k), tip_x = 2E(k)/K(k) − 1,
/// tip_y = 2k/K(k). (Timoshenko & Gere, Theory of Elastic Stability, large deflections; from
/// memory, derived from the first integral.)
pub fn cantilever(tip_angle: f64) -> Cantilever {
    let modulus = (0.5 * tip_angle).sin();
    let (first, second) = complete_integrals(modulus);
    Cantilever {
        load_ratio: (2.0 * first / PI).powi(2),
        tip_x: 2.0 * second / first - 1.0,
        tip_y: 2.0 * modulus / first,
    }
}

/// Complete elliptic integrals K(k) and E(k) by the arithmetic–geometric mean:
/// K = π/(2 agm(1, k')), E = K (1 − Σ 2^(n−1) c_n²). (Abramowitz & Stegun, 17.6, from memory.)
pub fn complete_integrals(modulus: f64) -> (f64, f64) {
    let (mut a, mut g) = (1.0, (1.0 - modulus.powi(2)).sqrt());
    let mut c = modulus;
    let (mut weight, mut sum) = (0.5, 0.0);
    // Twelve steps: each doubles the digits, and k = sin 89.9° needs seven.
    for _ in 0..12 {
        sum += weight * c * c;
        weight *= 2.0;
        c = 0.5 * (a - g);
        (a, g) = (0.5 * (a + g), (a * g).sqrt());
    }
    let first = PI / (2.0 * a);
    (first, first * (1.0 - sum))
}

/// Buckling load P L²/EI of the hinged column that may shorten but not shear,
/// (e/2)(1 − √(1 − 4π²/e)) with e = EA L²/EI. `None`: never.
///
/// Source: Magnusson, Ristinmaa, Ljung, Int. J. Solids Struct. 38 (2001).
pub fn shortening_column_load(axial: f64) -> Option<f64> {
    let left = 1.0 - 4.0 * PI.powi(2) / axial;
    // (e/2)(1 − √(1 − x)) = (e/2) x/(1 + √(1 − x)), without cancellation for large e.
    (left >= 0.0).then(|| 2.0 * PI.powi(2) / (1.0 + left.sqrt()))
}

/// Crown load P R²/EI at the first limit point of the arch of 215°, clamped at one end and hinged
/// at the other: the published three figures. Source: DaDeppo & Schmidt, J. Appl. Mech. 42 (1975).
pub const DEEP_ARCH_PUBLISHED: f64 = 8.97;

/// The same from an independent program, for its digits.
pub const DEEP_ARCH_COMPUTED: f64 = 8.973_089_97;
