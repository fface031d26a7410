//! The planar element: Reissner's beam with axial, shear and bending deformation of any size.
//!
//! Along the stress-free axis S, with section rotation θ, `t = (cos θ, sin θ)`, `n = (−sin θ, cos θ)`:
//!
//! ```text
//! x' = (1+ε) t + γ n,   N = EA ε,   Q = GA γ,   M = EI (θ' − κ0)                   (1)
//! ```
//!
//! Between two nodes no load acts, so the force F in the column is constant there: it is taken as
//! an unknown of the element, together with the rotation, and the position follows without any
//! interpolation. With `N = F·t`, `Q = F·n` the energy of the element is (Hellinger–Reissner)
//!
//! ```text
//! Π = ∫ [ ½ EI (θ' − κ0)² + h(θ, F) ] dS + F·(x_B − x_A),
//! h = −F·t − N²/(2 EA) − Q²/(2 GA)                                                 (2)
//! ```
//!
//! stationary in θ and F. Its derivatives, with `c = 1/EA − 1/GA`:
//!
//! ```text
//! h_F  = −(1 + N/EA) t − (Q/GA) n = −x'
//! h_θ  = −Q − c N Q
//! h_θθ = N + c (N² − Q²)
//! h_θF = −n − c (Q t + N n)                                                        (3)
//! h_FF = −t tᵀ/EA − n nᵀ/GA
//! ```
//!
//! (`h_θ` is −(x' F_y − y' F_x), the change of the moment.) Compliances, not stiffnesses, appear:
//! a column that can neither shorten nor shear is the plain case 1/EA = 1/GA = 0, and there is
//! nothing to lock.
//!
//! A rigid piece at an end, `along` the section normal and `across` it, adds `−F·(along t + across
//! n)` at that end's rotation: one more point of the sum, without compliance. Dead coils, arms and
//! eccentric pivots are such pieces.
//!
//! Source: Reissner, J. Appl. Math. Phys. (ZAMP) 23 (1972) 795–804; the choice of N and Q along
//! and across the section normal is Haringx's, Philips Res. Rep. 3 (1948) (both from memory;
//! derived above).

use super::basis::{FUNCTIONS, GAUSS_POINTS, GAUSS_WEIGHT, Tables};
use nalgebra::{SMatrix, SVector, Vector3};

/// Unknowns inside an element: three rotation amplitudes and the force (F_x, F_y).
pub(super) const INNER: usize = 5;

/// What the column is at a point: EI, 1/EA, 1/GA, and the stress-free curvature κ0.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PointLaw {
    /// Bending stiffness.
    pub bending: f64,
    /// 1/EA.
    pub axial_compliance: f64,
    /// 1/GA.
    pub shear_compliance: f64,
    /// Stress-free curvature.
    pub natural_curvature: f64,
}

/// A rigid piece from one point to another: along the section normal and across it.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Lever {
    /// Along the section normal.
    pub along: f64,
    /// Across, to the left of it.
    pub across: f64,
}

/// An element.
#[derive(Clone, Debug, PartialEq)]
pub struct Element {
    /// Stress-free length of the deformable part.
    pub length: f64,
    /// The law at its quadrature points.
    pub points: [PointLaw; GAUSS_POINTS],
    /// Rigid piece from node A to the deformable part.
    pub from_a: Lever,
    /// Rigid piece from the deformable part to node B.
    pub to_b: Lever,
}

/// First and second derivatives of the element's energy, rotations in the order
/// [θ_A, θ_B, c_1, c_2, c_3], force [F_x, F_y].
#[derive(Clone, Copy, Debug, Default)]
pub struct ElementForms {
    /// ∂Π/∂θ.
    pub moment: [f64; FUNCTIONS],
    /// ∂Π/∂F.
    pub gap: [f64; 2],
    /// ∂²Π/∂θ².
    pub bending: [[f64; FUNCTIONS]; FUNCTIONS],
    /// ∂²Π/∂θ∂F.
    pub coupling: [[f64; 2]; FUNCTIONS],
    /// ∂²Π/∂F², order xx, xy, yy.
    pub compliance: [f64; 3],
}

impl Element {
    /// Rotations [θ_A, θ_B, c_1, c_2, c_3] of a state.
    #[inline(always)]
    pub(super) fn rotations(
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        inner: &SVector<f64, INNER>,
    ) -> [f64; FUNCTIONS] {
        [a[2], b[2], inner[0], inner[1], inner[2]]
    }

    /// Derivatives of the energy at a state: nodes (x, y, θ), inner (c_1, c_2, c_3, F_x, F_y).
    #[inline(always)]
    pub(super) fn forms(
        &self,
        tables: &Tables,
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        inner: &SVector<f64, INNER>,
    ) -> ElementForms {
        let rotations = Self::rotations(a, b, inner);
        let (fx, fy) = (inner[3], inner[4]);
        let mut forms = ElementForms {
            gap: [b[0] - a[0], b[1] - a[1]],
            ..ElementForms::default()
        };
        let half = 0.5 * self.length;
        let inverse_half = 1.0 / half;
        let along = |table: &[f64; FUNCTIONS]| -> f64 {
            table.iter().zip(rotations).map(|(n, q)| n * q).sum()
        };
        // All calls first: the loop below then runs without any.
        let directions = tables.values.each_ref().map(|value| along(value).sin_cos());
        for g in 0..GAUSS_POINTS {
            let (value, slope) = (&tables.values[g], &tables.slopes[g]);
            let law = &self.points[g];
            let turn = along(slope);
            let weight = GAUSS_WEIGHT[g] * half;
            let (sin, cos) = directions[g];
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            let (ca, cs) = (law.axial_compliance, law.shear_compliance);
            let c = ca - cs;
            let moment = law.bending * (turn * inverse_half - law.natural_curvature);
            let (stretch, slide) = (1.0 + axial * ca, shear * cs);
            forms.gap[0] -= weight * (stretch * cos - slide * sin);
            forms.gap[1] -= weight * (stretch * sin + slide * cos);
            forms.compliance[0] -= weight * (cos * cos * ca + sin * sin * cs);
            forms.compliance[1] -= weight * (sin * cos * c);
            forms.compliance[2] -= weight * (sin * sin * ca + cos * cos * cs);
            let bend = weight * inverse_half * moment;
            let twist = -weight * shear * (1.0 + c * axial);
            let stiff = weight * inverse_half * inverse_half * law.bending;
            let soft = weight * (axial + c * (axial * axial - shear * shear));
            let mixed_x = weight * (sin - c * (shear * cos - axial * sin));
            let mixed_y = -weight * (cos + c * (shear * sin + axial * cos));
            for i in 0..FUNCTIONS {
                forms.moment[i] += slope[i] * bend + value[i] * twist;
                forms.coupling[i][0] += value[i] * mixed_x;
                forms.coupling[i][1] += value[i] * mixed_y;
                let (si, vi) = (slope[i] * stiff, value[i] * soft);
                for j in 0..FUNCTIONS {
                    forms.bending[i][j] += si * slope[j] + vi * value[j];
                }
            }
        }
        for (end, lever) in [(0, &self.from_a), (1, &self.to_b)] {
            if lever.along != 0.0 || lever.across != 0.0 {
                forms.add_lever(end, lever, rotations[end], fx, fy);
            }
        }
        forms
    }

    /// Strain energy: ∫ ½EI(θ'−κ0)² + N²/(2EA) + Q²/(2GA).
    pub(super) fn strain_energy(
        &self,
        tables: &Tables,
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        inner: &SVector<f64, INNER>,
    ) -> f64 {
        let rotations = Self::rotations(a, b, inner);
        let (fx, fy) = (inner[3], inner[4]);
        let half = 0.5 * self.length;
        let mut energy = 0.0;
        for g in 0..GAUSS_POINTS {
            let law = &self.points[g];
            let (mut angle, mut turn) = (0.0, 0.0);
            for i in 0..FUNCTIONS {
                angle += tables.values[g][i] * rotations[i];
                turn += tables.slopes[g][i] * rotations[i];
            }
            let bent = turn / half - law.natural_curvature;
            let (sin, cos) = angle.sin_cos();
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            energy += GAUSS_WEIGHT[g]
                * half
                * 0.5
                * (law.bending * bent * bent
                    + law.axial_compliance * axial * axial
                    + law.shear_compliance * shear * shear);
        }
        energy
    }
}

impl ElementForms {
    #[inline]
    pub(super) fn add_lever(&mut self, end: usize, lever: &Lever, angle: f64, fx: f64, fy: f64) {
        let (sin, cos) = angle.sin_cos();
        let reach = [
            lever.along * cos - lever.across * sin,
            lever.along * sin + lever.across * cos,
        ];
        self.gap[0] -= reach[0];
        self.gap[1] -= reach[1];
        // d reach/dθ = (−reach_y, reach_x), d² reach/dθ² = −reach.
        self.moment[end] += fx * reach[1] - fy * reach[0];
        self.bending[end][end] += fx * reach[0] + fy * reach[1];
        self.coupling[end][0] += reach[1];
        self.coupling[end][1] -= reach[0];
    }

    /// Inner matrix (5×5, lower triangle), order [c_1, c_2, c_3, F_x, F_y].
    #[inline(always)]
    pub(super) fn inner_matrix(&self) -> SMatrix<f64, INNER, INNER> {
        let mut matrix = SMatrix::zeros();
        for j in 0..3 {
            for i in j..3 {
                matrix[(i, j)] = self.bending[2 + i][2 + j];
            }
            matrix[(3, j)] = self.coupling[2 + j][0];
            matrix[(4, j)] = self.coupling[2 + j][1];
        }
        matrix[(3, 3)] = self.compliance[0];
        matrix[(4, 3)] = self.compliance[1];
        matrix[(4, 4)] = self.compliance[2];
        matrix
    }

    /// Right-hand sides of the condensation, one a row, against the inner unknowns: the inner
    /// rows' columns of x_B − x_A, y_B − y_A, θ_A, θ_B, and the inner residual. Only those
    /// differences of position appear.
    #[inline(always)]
    pub(super) fn inner_right(&self) -> SMatrix<f64, 5, INNER> {
        let mut right = SMatrix::zeros();
        for k in 0..3 {
            right[(2, k)] = self.bending[2 + k][0];
            right[(3, k)] = self.bending[2 + k][1];
            right[(4, k)] = self.moment[2 + k];
        }
        for axis in 0..2 {
            right[(axis, 3 + axis)] = 1.0;
            right[(2, 3 + axis)] = self.coupling[0][axis];
            right[(3, 3 + axis)] = self.coupling[1][axis];
            right[(4, 3 + axis)] = self.gap[axis];
        }
        right
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn element() -> Element {
        let law = |i: usize| PointLaw {
            bending: 1.0 + 0.1 * i as f64,
            axial_compliance: 0.02 + 0.01 * i as f64,
            shear_compliance: 0.01,
            natural_curvature: 0.3 - 0.05 * i as f64,
        };
        Element {
            length: 0.4,
            points: [law(0), law(1), law(2), law(3)],
            from_a: Lever {
                along: 0.1,
                across: -0.05,
            },
            to_b: Lever {
                along: -0.07,
                across: 0.03,
            },
        }
    }

    /// Energy of equation (2) at a state.
    fn energy(
        element: &Element,
        tables: &Tables,
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        inner: &SVector<f64, INNER>,
    ) -> f64 {
        let rotations = Element::rotations(a, b, inner);
        let (fx, fy) = (inner[3], inner[4]);
        let half = 0.5 * element.length;
        let mut energy = fx * (b[0] - a[0]) + fy * (b[1] - a[1]);
        for g in 0..GAUSS_POINTS {
            let law = &element.points[g];
            let sum = |table: &[f64; FUNCTIONS]| -> f64 {
                table.iter().zip(rotations).map(|(n, q)| n * q).sum()
            };
            let angle = sum(&tables.values[g]);
            let bent = sum(&tables.slopes[g]) / half - law.natural_curvature;
            let (sin, cos) = angle.sin_cos();
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            energy += GAUSS_WEIGHT[g]
                * half
                * (0.5 * law.bending * bent * bent
                    - axial
                    - 0.5 * law.axial_compliance * axial * axial
                    - 0.5 * law.shear_compliance * shear * shear);
        }
        for (end, lever) in [(0, &element.from_a), (1, &element.to_b)] {
            let (sin, cos) = rotations[end].sin_cos();
            energy -= fx * (lever.along * cos - lever.across * sin)
                + fy * (lever.along * sin + lever.across * cos);
        }
        energy
    }

    /// All eleven unknowns: x_A, y_A, θ_A, x_B, y_B, θ_B, c_1, c_2, c_3, F_x, F_y.
    fn split(u: &[f64]) -> (Vector3<f64>, Vector3<f64>, SVector<f64, INNER>) {
        (
            Vector3::new(u[0], u[1], u[2]),
            Vector3::new(u[3], u[4], u[5]),
            SVector::from_column_slice(&u[6..11]),
        )
    }

    fn gradient(u: &[f64]) -> [f64; 11] {
        let (a, b, inner) = split(u);
        let forms = element().forms(&Tables::new(), &a, &b, &inner);
        let r = forms.inner_right().row(4).into_owned();
        let (fx, fy) = (inner[3], inner[4]);
        [
            -fx,
            -fy,
            forms.moment[0],
            fx,
            fy,
            forms.moment[1],
            r[0],
            r[1],
            r[2],
            r[3],
            r[4],
        ]
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(64))]
        /// The residual against central differences of the energy, the tangent against those of
        /// the residual, at random states. Fourth-order differences: truncation below 1e-9.
        #[test]
        fn residual_is_the_energys_and_tangent_the_residuals(
            u in prop::collection::vec(-1.5..1.5_f64, 11),
        ) {
            let step = 2e-3;
            let shifted = |k: usize, by: f64| { let mut v = u.clone(); v[k] += by; v };
            let energy_at = |v: &[f64]| { let (a, b, i) = split(v); energy(&element(), &Tables::new(), &a, &b, &i) };
            let exact = gradient(&u);
            let (a, b, inner) = split(&u);
            let forms = element().forms(&Tables::new(), &a, &b, &inner);
            let (ii, right) = (forms.inner_matrix(), forms.inner_right());
            // Inner row against outer column, from the right-hand sides of the condensation.
            let io = |row: usize, column: usize| match column {
                0 | 1 => -right[(column, row)],
                2 => right[(2, row)],
                3 | 4 => right[(column - 3, row)],
                _ => right[(3, row)],
            };
            for k in 0..11 {
                let difference = (8.0 * (energy_at(&shifted(k, step)) - energy_at(&shifted(k, -step)))
                    - energy_at(&shifted(k, 2.0 * step)) + energy_at(&shifted(k, -2.0 * step))) / (12.0 * step);
                prop_assert!((difference - exact[k]).abs() < 2e-9, "residual {k}: {difference} {}", exact[k]);
                let (p, m) = (gradient(&shifted(k, step)), gradient(&shifted(k, -step)));
                let (pp, mm) = (gradient(&shifted(k, 2.0 * step)), gradient(&shifted(k, -2.0 * step)));
                for row in 0..11 {
                    let difference = (8.0 * (p[row] - m[row]) - pp[row] + mm[row]) / (12.0 * step);
                    let exact = match (row, k) {
                        (6.., 6..) => ii[((row - 6).max(k - 6), (row - 6).min(k - 6))],
                        (6.., _) => io(row - 6, k),
                        (_, 6..) => io(k - 6, row),
                        (2, 2) => forms.bending[0][0],
                        (5, 5) => forms.bending[1][1],
                        (2, 5) | (5, 2) => forms.bending[1][0],
                        _ => 0.0,
                    };
                    prop_assert!((difference - exact).abs() < 2e-9, "tangent {row} {k}: {difference} {exact}");
                }
            }
        }
    }
}
