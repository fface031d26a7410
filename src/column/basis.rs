//! Quartic interpolation of the section rotation inside an element, with its quadrature.
//!
//! `θ(t) = θ_A (1−t)/2 + θ_B (1+t)/2 + Σ_j c_j φ_j(t)`, t ∈ [−1, 1], with the integrated Legendre
//! polynomials `φ_j' = √((2j+1)/2) P_j`, j = 1, 2, 3: zero at both ends, their derivatives
//! orthonormal. Gauss–Legendre with four points integrates the bending energy exactly.

/// Points of quadrature in an element.
pub const GAUSS_POINTS: usize = 4;
/// Functions that carry the rotation: two ends and three inside.
pub(super) const FUNCTIONS: usize = 5;

/// Abscissae of the four-point Gauss–Legendre rule on [−1, 1].
/// Source: Abramowitz & Stegun, table 25.4 (from memory; tested by integrating polynomials).
pub(super) const GAUSS_AT: [f64; GAUSS_POINTS] = [
    -0.861_136_311_594_052_6,
    -0.339_981_043_584_856_26,
    0.339_981_043_584_856_26,
    0.861_136_311_594_052_6,
];
/// Weights of the same rule; they add up to 2.
pub(super) const GAUSS_WEIGHT: [f64; GAUSS_POINTS] = [
    0.347_854_845_137_453_85,
    0.652_145_154_862_546_1,
    0.652_145_154_862_546_1,
    0.347_854_845_137_453_85,
];

/// The functions at `t`.
pub(super) fn values(t: f64) -> [f64; FUNCTIONS] {
    // φ_j = (P_{j+1} − P_{j−1})/√(2(2j+1)).
    let p2 = 0.5 * (3.0 * t * t - 1.0);
    let p3 = 0.5 * t * (5.0 * t * t - 3.0);
    let p4 = (35.0 * t.powi(4) - 30.0 * t * t + 3.0) / 8.0;
    [
        0.5 * (1.0 - t),
        0.5 * (1.0 + t),
        (p2 - 1.0) / 6.0_f64.sqrt(),
        (p3 - t) / 10.0_f64.sqrt(),
        (p4 - p2) / 14.0_f64.sqrt(),
    ]
}

/// Their derivatives with respect to t.
pub(super) fn slopes(t: f64) -> [f64; FUNCTIONS] {
    let p2 = 0.5 * (3.0 * t * t - 1.0);
    let p3 = 0.5 * t * (5.0 * t * t - 3.0);
    [
        -0.5,
        0.5,
        1.5_f64.sqrt() * t,
        2.5_f64.sqrt() * p2,
        3.5_f64.sqrt() * p3,
    ]
}

/// Values and slopes at the Gauss points.
#[derive(Clone, Debug)]
pub(super) struct Tables {
    pub values: [[f64; FUNCTIONS]; GAUSS_POINTS],
    pub slopes: [[f64; FUNCTIONS]; GAUSS_POINTS],
}

impl Tables {
    pub fn new() -> Self {
        Tables {
            values: GAUSS_AT.map(values),
            slopes: GAUSS_AT.map(slopes),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_rule_integrates_up_to_degree_seven_and_not_eight() {
        let integral = |degree: i32| -> f64 {
            GAUSS_AT
                .iter()
                .zip(GAUSS_WEIGHT)
                .map(|(t, w)| w * t.powi(degree))
                .sum()
        };
        for degree in 0..8 {
            let exact = if degree % 2 == 0 {
                2.0 / f64::from(degree + 1)
            } else {
                0.0
            };
            approx::assert_abs_diff_eq!(integral(degree), exact, epsilon = 1e-15);
        }
        assert!((integral(8) - 2.0 / 9.0).abs() > 1e-3);
    }

    #[test]
    fn slopes_are_the_derivatives_of_the_values_and_orthonormal() {
        let step = 1e-5;
        for t in [-0.9, -0.2, 0.4, 1.0] {
            for i in 0..FUNCTIONS {
                let difference = (values(t + step)[i] - values(t - step)[i]) / (2.0 * step);
                approx::assert_abs_diff_eq!(difference, slopes(t)[i], epsilon = 1e-9);
            }
        }
        let tables = Tables::new();
        for i in 2..FUNCTIONS {
            approx::assert_abs_diff_eq!(values(-1.0)[i], 0.0, epsilon = 1e-15);
            approx::assert_abs_diff_eq!(values(1.0)[i], 0.0, epsilon = 1e-15);
            for j in 2..FUNCTIONS {
                let product: f64 = (0..GAUSS_POINTS)
                    .map(|g| GAUSS_WEIGHT[g] * tables.slopes[g][i] * tables.slopes[g][j])
                    .sum();
                approx::assert_abs_diff_eq!(product, f64::from(i == j), epsilon = 1e-14);
            }
        }
    }
}
