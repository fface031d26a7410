//! The element that leans on a guide.
//!
//! A guide pushes over a stretch of the column; how long it is belongs to the answer. (Pushed at a
//! single place on a straight wall, a column that can shear would kink through it: y' jumps by ΔF/GA
//! towards the wall.) An element has [`PADS`] pads of equal length; pad k passes a force on evenly
//! over its length, so that the force in the column is `F(S) = F_A + Σ ψ_k(S) J_k`, ψ_k rising from 0
//! to 1 along the pad, and J_k the jump over it. In the energy (2) of [`super::element`]
//!
//! ```text
//! Π = ∫ [ ½ EI (θ' − κ0)² + h(θ, F(S)) ] dS + F_A·(x_B − x_A) + Σ J_k·x_B
//! ∂Π/∂J_k = x_B + ∫ ψ_k h_F dS = X_k,                                              (4)
//! ```
//!
//! X_k = (X, Y) the mean position of the axis along pad k. (The corner of a guide passes its force on at
//! one place, ψ a step there: see [`super::corner`].) The pad may not leave the strip
//! `σ(Y − y_g(X)) ≤ c(X, F_x)` on either side σ = ±1 (see [`super::wall`]). With `w = y_g + σ c` and
//! the contact force N = σ J_y ≥ 0:
//!
//! ```text
//! away:     J = 0
//! leaning:  Y − w(X, F_x) = 0,   and   J_x + w_x J_y = s μ N   slipping the way s = sign(ΔX)
//!                                      or  X = X where it was   sticking, |J_x + w_x J_y| ≤ μ N   (5)
//! ```
//!
//! Without friction on a straight wall, J = (−w_x, 1) R and (5) is the stationarity of
//! `Π − Σ R (w − w_x X)` in R: symmetric, and every leaning pad takes one negative eigenvalue with
//! it. Otherwise the tangent is unsymmetric. (The clearance falls with F_x as the coil grows, and
//! by the same energy the push shortens the coil a little: `−N ∂c/∂F_x` in the row of F_x.
//! Only where all pads slip without friction: a stretch that sticks between pads would have a spring of
//! the wrong sign in it. The shortening is below 1e-5 of the travel, and left out with friction.)
//!
//! (On a corner the cone of friction is taken about the wall instead of about the axis's own tangent: off by
//! the square of the slope there, some per cent of μ.)
//!
//! Which of (5) holds is found by Newton's own iteration, as a semi-smooth one (Alart & Curnier,
//! Comput. Methods Appl. Mech. Eng. 92 (1991); Hintermüller, Ito & Kunisch, SIAM J. Optim. 13 (2002);
//! both from memory): leaning where `N − ρ gap > 0`, sticking where
//! `|J_x + w_x J_y + ρ ΔX| ≤ μ N`. ρ guides the search and is not in the answer.

use super::basis::{FUNCTIONS, GAUSS_POINTS, GAUSS_WEIGHT, Tables};
use super::element::{Element, ElementForms, INNER, PointLaw};
use super::nodes::{Node, PadTables};
use nalgebra::{SVector, Vector3};

/// Pads in an element.
pub(super) const PADS: usize = 4;
/// Places of an element through which force passes: its pads, and the corner of a guide.
pub(super) const SLOTS: usize = PADS + 1;
/// A state of an element with pads.
pub(super) struct Held<'a> {
    pub element: &'a Element,
    pub laws: &'a [PointLaw; 2 * PADS],
    pub a: &'a Vector3<f64>,
    pub b: &'a Vector3<f64>,
    pub inner: &'a SVector<f64, INNER>,
    pub jumps: [[f64; 2]; SLOTS],
    /// Where on [−1, 1] the corner of a guide is.
    pub corner: Option<f64>,
}

/// Derivatives of Π of an element with pads.
pub(super) struct PadForms {
    /// Those without the pads' unknowns.
    pub forms: ElementForms,
    /// Mean positions X_k; of the corner, where it is.
    pub means: [[f64; 2]; SLOTS],
    /// ∂X_k/∂θ.
    pub turning: [[[f64; 2]; FUNCTIONS]; SLOTS],
    /// ∂X_k/∂F_A (xx, xy, yy).
    pub stretch: [[f64; 3]; SLOTS],
    /// ∂X_k/∂J_l (xx, xy, yy).
    pub mutual: [[[f64; 3]; SLOTS]; SLOTS],
}

impl Held<'_> {
    fn direction(&self, node: &Node) -> (f64, f64) {
        let q = Element::rotations(self.a, self.b, self.inner);
        let angle: f64 = node.values.iter().zip(q).map(|(n, q)| n * q).sum();
        angle.sin_cos()
    }

    /// Force at a point.
    #[inline]
    fn force(&self, node: &Node) -> (f64, f64) {
        self.force_at(node.pad, node.share, node.behind)
    }

    /// Force where `share` of a pad's jump, and `behind` of the corner's, is passed.
    pub fn force_at(&self, pad: usize, share: f64, behind: f64) -> (f64, f64) {
        let (mut fx, mut fy) = (self.inner[3], self.inner[4]);
        for jump in &self.jumps[..pad] {
            fx += jump[0];
            fy += jump[1];
        }
        let (here, corner) = (self.jumps[pad], self.jumps[PADS]);
        (
            fx + share * here[0] + behind * corner[0],
            fy + share * here[1] + behind * corner[1],
        )
    }

    /// Force at the end B.
    pub fn end_force(&self) -> [f64; 2] {
        let mut force = [self.inner[3], self.inner[4]];
        for jump in &self.jumps {
            force[0] += jump[0];
            force[1] += jump[1];
        }
        force
    }

    /// Mean positions of the pads, and the corner's place.
    pub fn means(&self, tables: &PadTables) -> [[f64; 2]; SLOTS] {
        let (sin, cos) = self.b[2].sin_cos();
        let lever = self.element.to_b;
        let mut x = self.b[0] - (lever.along * cos - lever.across * sin);
        let mut y = self.b[1] - (lever.along * sin + lever.across * cos);
        let (nodes, count) = self.nodes(tables);
        let mut means = [[x, y]; SLOTS];
        for node in nodes[..count].iter().rev() {
            let (fx, fy) = self.force(node);
            let (sin, cos) = self.direction(node);
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            let open = 1.0 + axial * node.law.axial_compliance;
            let slide = shear * node.law.shear_compliance;
            let step = [
                node.weight * (open * cos - slide * sin),
                node.weight * (open * sin + slide * cos),
            ];
            means[node.pad][0] -= node.share * step[0];
            means[node.pad][1] -= node.share * step[1];
            x -= step[0];
            y -= step[1];
            for mean in means.iter_mut().take(node.pad) {
                *mean = [x, y];
            }
            if node.behind > 0.0 {
                means[PADS] = [x, y];
            }
        }
        means
    }

    /// Strain energy: ∫ ½EI(θ'−κ0)² + N²/(2EA) + Q²/(2GA).
    pub fn strain_energy(&self, plain: &Tables, tables: &PadTables) -> f64 {
        let q = Element::rotations(self.a, self.b, self.inner);
        let half = 0.5 * self.element.length;
        let bending: f64 = (0..GAUSS_POINTS)
            .map(|g| {
                let law = &self.element.points[g];
                let turn: f64 = plain.slopes[g].iter().zip(q).map(|(n, q)| n * q).sum();
                0.5 * GAUSS_WEIGHT[g]
                    * half
                    * law.bending
                    * (turn / half - law.natural_curvature).powi(2)
            })
            .sum();
        let (nodes, count) = self.nodes(tables);
        let stretching: f64 = nodes[..count]
            .iter()
            .map(|node| {
                let (fx, fy) = self.force(node);
                let ((sin, cos), law) = (self.direction(node), &node.law);
                let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
                0.5 * node.weight
                    * (law.axial_compliance * axial * axial + law.shear_compliance * shear * shear)
            })
            .sum();
        bending + stretching
    }

    /// All derivatives; of the slots marked only.
    pub fn forms(&self, plain: &Tables, tables: &PadTables, marked: [bool; SLOTS]) -> PadForms {
        let element = self.element;
        let q = Element::rotations(self.a, self.b, self.inner);
        let mut forms = ElementForms {
            gap: [self.b[0] - self.a[0], self.b[1] - self.a[1]],
            ..ElementForms::default()
        };
        // Bending by the element's own rule, which integrates it exactly.
        let half = 0.5 * element.length;
        for g in 0..GAUSS_POINTS {
            let (slope, law) = (&plain.slopes[g], &element.points[g]);
            let turn: f64 = slope.iter().zip(q).map(|(n, q)| n * q).sum();
            let weight = GAUSS_WEIGHT[g] * half;
            let moment = law.bending * (turn / half - law.natural_curvature);
            let (bend, stiff) = (weight / half * moment, weight / (half * half) * law.bending);
            for i in 0..FUNCTIONS {
                forms.moment[i] += slope[i] * bend;
                for j in 0..FUNCTIONS {
                    forms.bending[i][j] += stiff * slope[i] * slope[j];
                }
            }
        }
        let (nodes, count) = self.nodes(tables);
        let mut means = [[self.b[0], self.b[1]]; SLOTS];
        let mut turning = [[[0.0; 2]; FUNCTIONS]; SLOTS];
        let mut stretch = [[0.0; 3]; SLOTS];
        let mut mutual = [[[0.0; 3]; SLOTS]; SLOTS];
        for node in &nodes[..count] {
            let (value, law, weight) = (&node.values, &node.law, node.weight);
            let (fx, fy) = self.force(node);
            let (sin, cos) = self.direction(node);
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            let (ca, cs) = (law.axial_compliance, law.shear_compliance);
            let c = ca - cs;
            let (open, slide) = (1.0 + axial * ca, shear * cs);
            let step = [
                weight * (open * cos - slide * sin),
                weight * (open * sin + slide * cos),
            ];
            let give = [
                -weight * (cos * cos * ca + sin * sin * cs),
                -weight * (sin * cos * c),
                -weight * (sin * sin * ca + cos * cos * cs),
            ];
            let twist = -weight * shear * (1.0 + c * axial);
            let soft = weight * (axial + c * (axial * axial - shear * shear));
            let mixed = [
                weight * (sin - c * (shear * cos - axial * sin)),
                -weight * (cos + c * (shear * sin + axial * cos)),
            ];
            forms.gap[0] -= step[0];
            forms.gap[1] -= step[1];
            for k in 0..3 {
                forms.compliance[k] += give[k];
            }
            for i in 0..FUNCTIONS {
                forms.moment[i] += value[i] * twist;
                forms.coupling[i][0] += value[i] * mixed[0];
                forms.coupling[i][1] += value[i] * mixed[1];
                for j in 0..FUNCTIONS {
                    forms.bending[i][j] += soft * value[i] * value[j];
                }
            }
            let psi = |slot: usize| match slot {
                PADS => node.behind,
                pad if pad < node.pad => 1.0,
                pad if pad == node.pad => node.share,
                _ => 0.0,
            };
            for k in (0..SLOTS).filter(|k| marked[*k]) {
                let share = psi(k);
                if share == 0.0 {
                    continue;
                }
                means[k][0] -= share * step[0];
                means[k][1] -= share * step[1];
                for i in 0..FUNCTIONS {
                    turning[k][i][0] += share * value[i] * mixed[0];
                    turning[k][i][1] += share * value[i] * mixed[1];
                }
                for n in 0..3 {
                    stretch[k][n] += share * give[n];
                }
                for l in (k..SLOTS).filter(|l| marked[*l]) {
                    let both = share * psi(l);
                    for n in 0..3 {
                        mutual[k][l][n] += both * give[n];
                    }
                }
            }
        }
        let end = self.end_force();
        let lever = element.from_a;
        if lever.along != 0.0 || lever.across != 0.0 {
            forms.add_lever(0, &lever, q[0], self.inner[3], self.inner[4]);
        }
        let lever = element.to_b;
        if lever.along != 0.0 || lever.across != 0.0 {
            forms.add_lever(1, &lever, q[1], end[0], end[1]);
            let (sin, cos) = q[1].sin_cos();
            let reach = [
                lever.along * cos - lever.across * sin,
                lever.along * sin + lever.across * cos,
            ];
            for k in 0..SLOTS {
                means[k][0] -= reach[0];
                means[k][1] -= reach[1];
                turning[k][1][0] += reach[1];
                turning[k][1][1] -= reach[0];
            }
        }
        for k in 0..SLOTS {
            for l in 0..k {
                mutual[k][l] = mutual[l][k];
            }
        }
        PadForms {
            forms,
            means,
            turning,
            stretch,
            mutual,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::column::Lever;
    use proptest::prelude::*;

    const CORNER: f64 = 0.17;

    fn element() -> Element {
        let law = |i: usize| PointLaw {
            bending: 1.0 + 0.1 * i as f64,
            axial_compliance: 0.03,
            shear_compliance: 0.01 + 0.002 * i as f64,
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

    /// Order of the unknowns: A (3), B (3), inner (5), J (10).
    fn held<'a>(
        element: &'a Element,
        laws: &'a [PointLaw; 2 * PADS],
        parts: &'a (Vector3<f64>, Vector3<f64>, SVector<f64, INNER>),
        u: &[f64],
    ) -> Held<'a> {
        Held {
            element,
            laws,
            a: &parts.0,
            b: &parts.1,
            inner: &parts.2,
            jumps: std::array::from_fn(|k| [u[11 + 2 * k], u[12 + 2 * k]]),
            corner: Some(CORNER),
        }
    }

    fn parts(u: &[f64]) -> (Vector3<f64>, Vector3<f64>, SVector<f64, INNER>) {
        (
            Vector3::new(u[0], u[1], u[2]),
            Vector3::new(u[3], u[4], u[5]),
            SVector::from_column_slice(&u[6..11]),
        )
    }

    /// Π of the module's text, by its own quadrature.
    fn energy(u: &[f64]) -> f64 {
        let (element, tables, plain) = (element(), PadTables::new(), Tables::new());
        let (laws, parts) = (tables.laws(&element), parts(u));
        let held = held(&element, &laws, &parts, u);
        let q = Element::rotations(held.a, held.b, held.inner);
        let half = 0.5 * element.length;
        let mut energy = u[9] * (u[3] - u[0]) + u[10] * (u[4] - u[1]);
        for g in 0..GAUSS_POINTS {
            let turn: f64 = plain.slopes[g].iter().zip(q).map(|(n, q)| n * q).sum();
            let bent = turn / half - element.points[g].natural_curvature;
            energy += GAUSS_WEIGHT[g] * half * 0.5 * element.points[g].bending * bent * bent;
        }
        let (nodes, count) = held.nodes(&tables);
        for node in &nodes[..count] {
            let ((sin, cos), (fx, fy)) = (held.direction(node), held.force(node));
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            energy -= node.weight
                * (axial
                    + 0.5 * node.law.axial_compliance * axial * axial
                    + 0.5 * node.law.shear_compliance * shear * shear);
        }
        let reach = |lever: &Lever, angle: f64| {
            let (sin, cos) = angle.sin_cos();
            [
                lever.along * cos - lever.across * sin,
                lever.along * sin + lever.across * cos,
            ]
        };
        let (start, end) = (reach(&element.from_a, u[2]), reach(&element.to_b, u[5]));
        let last = held.end_force();
        energy -= u[9] * start[0] + u[10] * start[1] + last[0] * end[0] + last[1] * end[1];
        for k in 0..SLOTS {
            energy += held.jumps[k][0] * u[3] + held.jumps[k][1] * u[4];
        }
        energy
    }

    fn all(u: &[f64]) -> PadForms {
        let (element, tables) = (element(), PadTables::new());
        let (laws, parts) = (tables.laws(&element), parts(u));
        held(&element, &laws, &parts, u).forms(&Tables::new(), &tables, [true; SLOTS])
    }

    fn gradient(u: &[f64]) -> Vec<f64> {
        let forms = all(u);
        let f = &forms.forms;
        let jumps = |axis: usize| -> f64 { (0..SLOTS).map(|k| u[11 + 2 * k + axis]).sum() };
        let mut g = vec![
            -u[9],
            -u[10],
            f.moment[0],
            u[9] + jumps(0),
            u[10] + jumps(1),
            f.moment[1],
            f.moment[2],
            f.moment[3],
            f.moment[4],
            f.gap[0],
            f.gap[1],
        ];
        g.extend(forms.means.iter().flatten());
        g
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(32))]
        /// Every derivative against fourth-order differences of what it derives from.
        #[test]
        fn residual_is_the_energys_and_tangent_the_residuals(
            u in prop::collection::vec(-1.0..1.0_f64, 21),
        ) {
            let step = 2e-3;
            let shifted = |k: usize, by: f64| { let mut v = u.clone(); v[k] += by; v };
            let exact = gradient(&u);
            let forms = all(&u);
            for k in 0..21 {
                let e = |by: f64| energy(&shifted(k, by));
                let difference =
                    (8.0 * (e(step) - e(-step)) - e(2.0 * step) + e(-2.0 * step)) / (12.0 * step);
                prop_assert!((difference - exact[k]).abs() < 2e-9, "{k}: {difference} {}", exact[k]);
            }
            // The pads' own second derivatives: columns of J.
            for (l, axis) in (0..SLOTS).flat_map(|l| [(l, 0), (l, 1)]) {
                let column = 11 + 2 * l + axis;
                let g = |by: f64| gradient(&shifted(column, by));
                let (p, m, pp, mm) = (g(step), g(-step), g(2.0 * step), g(-2.0 * step));
                for row in 0..21 {
                    let difference = (8.0 * (p[row] - m[row]) - pp[row] + mm[row]) / (12.0 * step);
                    let turn = |i: usize| forms.turning[l][i][axis];
                    let exact = match row {
                        2 => turn(0),
                        3 | 4 => f64::from(row - 3 == axis),
                        5 => turn(1),
                        6..=8 => turn(row - 4),
                        9 | 10 => forms.stretch[l][row - 9 + axis],
                        11.. => forms.mutual[(row - 11) / 2][l][(row - 11) % 2 + axis],
                        _ => 0.0,
                    };
                    prop_assert!((difference - exact).abs() < 1e-8, "{row} {column}: {difference} {exact}");
                }
            }
        }
    }

    /// The mean positions alone are those of the full derivatives.
    #[test]
    fn means_agree() {
        let u: Vec<f64> = (0..21).map(|i| (1.3 * f64::from(i)).sin()).collect();
        let (element, tables) = (element(), PadTables::new());
        let (laws, parts) = (tables.laws(&element), parts(&u));
        let means = held(&element, &laws, &parts, &u).means(&tables);
        for (one, other) in means.iter().flatten().zip(all(&u).means.iter().flatten()) {
            approx::assert_abs_diff_eq!(*one, *other, epsilon = 1e-13);
        }
    }
}
