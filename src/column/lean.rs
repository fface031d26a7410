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
//! X_k = (X, Y) the mean position of the axis along pad k. The pad may not leave the strip
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
//! by the same energy the push shortens the coil a little: `−N ∂c/∂F_x` in the row of F_x.)
//!
//! Which of (5) holds is found by Newton's own iteration, as a semi-smooth one (Alart & Curnier,
//! Comput. Methods Appl. Mech. Eng. 92 (1991); Hintermüller, Ito & Kunisch, SIAM J. Optim. 13 (2002);
//! both from memory): leaning where `N − ρ gap > 0`, sticking where
//! `|J_x + w_x J_y + ρ ΔX| ≤ μ N`. ρ guides the search and is not in the answer.

use super::basis::{FUNCTIONS, GAUSS_POINTS, GAUSS_WEIGHT, Tables, values};
use super::element::{Element, ElementForms, INNER, PointLaw};
use super::wall::{Facing, TopSeat, Wall};
use crate::solve::SymmetricFactor;
use nalgebra::{Matrix3, SMatrix, SVector, Vector3};

/// Pads in an element.
pub(super) const PADS: usize = 4;
/// Unknowns of the pads of an element: (J_x, J_y) of each.
pub(super) const PAD_UNKNOWNS: usize = 2 * PADS;
/// Points of quadrature of h: two a pad.
const POINTS: usize = 2 * PADS;
/// Reduced outer unknowns: x_B − x_A, y_B − y_A, θ_A, θ_B, x_B, y_B.
const OUTER: usize = 6;
/// Friction holds up to this share above its limit, against round-off.
const HOLDS: f64 = 1.0 + 1e-9;

/// What a pad does.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Pad {
    /// It leans on nothing.
    Away,
    /// It is pushed with what the state says, and not held.
    Pushed,
    /// It leans on the wall at this side (+1: at +y).
    Leans {
        side: f64,
        facing: Facing,
        motion: Motion,
    },
}

/// How a leaning pad moves along the wall.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Motion {
    /// Friction along the force jump: s μ.
    Slips(f64),
    Sticks,
}

/// Quadrature of h in an element: two-point Gauss in each pad.
#[derive(Clone, Debug)]
pub(super) struct PadTables {
    values: [[f64; FUNCTIONS]; POINTS],
    at: [f64; POINTS],
    /// ψ of the pad in which the point lies.
    share: [f64; 2],
}

impl PadTables {
    pub fn new() -> Self {
        let half = 1.0 / PADS as f64;
        let offset = half / 3.0_f64.sqrt();
        let at = std::array::from_fn(|g| {
            let middle = -1.0 + half * (2 * (g / 2) + 1) as f64;
            middle + if g % 2 == 0 { -offset } else { offset }
        });
        PadTables {
            values: at.map(values),
            at,
            share: [
                0.5 * (1.0 - 1.0 / 3.0_f64.sqrt()),
                0.5 * (1.0 + 1.0 / 3.0_f64.sqrt()),
            ],
        }
    }

    /// The law of an element at its points.
    pub fn laws(&self, element: &Element) -> [PointLaw; POINTS] {
        self.at.map(|t| element.law_at(t))
    }
}

/// A state of an element with pads.
pub(super) struct Held<'a> {
    pub element: &'a Element,
    pub laws: &'a [PointLaw; POINTS],
    pub a: &'a Vector3<f64>,
    pub b: &'a Vector3<f64>,
    pub inner: &'a SVector<f64, INNER>,
    pub jumps: [[f64; 2]; PADS],
}

/// Derivatives of Π of an element with pads.
pub(super) struct PadForms {
    /// Those without the pads' unknowns.
    pub forms: ElementForms,
    /// Mean positions X_k.
    pub means: [[f64; 2]; PADS],
    /// ∂X_k/∂θ, ∂X_k/∂F_A (xx, xy, yy).
    turning: [[[f64; 2]; FUNCTIONS]; PADS],
    stretch: [[f64; 3]; PADS],
    /// ∂X_k/∂J_l, l ≥ k (xx, xy, yy).
    mutual: [[[f64; 3]; PADS]; PADS],
}

impl Held<'_> {
    fn directions(&self, tables: &PadTables) -> [(f64, f64); POINTS] {
        let q = Element::rotations(self.a, self.b, self.inner);
        tables.values.map(|value| {
            let angle: f64 = value.iter().zip(q).map(|(n, q)| n * q).sum();
            angle.sin_cos()
        })
    }

    /// Force at a point.
    #[inline]
    fn force(&self, tables: &PadTables, g: usize) -> (f64, f64) {
        let (pad, share) = (g / 2, tables.share[g % 2]);
        let (mut fx, mut fy) = (self.inner[3], self.inner[4]);
        for jump in &self.jumps[..pad] {
            fx += jump[0];
            fy += jump[1];
        }
        (
            fx + share * self.jumps[pad][0],
            fy + share * self.jumps[pad][1],
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

    /// Mean positions of the pads.
    pub fn means(&self, tables: &PadTables) -> [[f64; 2]; PADS] {
        let weight = 0.25 * self.element.length / PADS as f64 * 2.0;
        let (sin, cos) = self.b[2].sin_cos();
        let lever = self.element.to_b;
        let mut x = self.b[0] - (lever.along * cos - lever.across * sin);
        let mut y = self.b[1] - (lever.along * sin + lever.across * cos);
        let directions = self.directions(tables);
        let mut means = [[0.0; 2]; PADS];
        for pad in (0..PADS).rev() {
            let mut mean = [x, y];
            for g in [2 * pad, 2 * pad + 1] {
                let (fx, fy) = self.force(tables, g);
                let (sin, cos) = directions[g];
                let law = &self.laws[g];
                let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
                let (open, slide) = (
                    1.0 + axial * law.axial_compliance,
                    shear * law.shear_compliance,
                );
                let step = [
                    weight * (open * cos - slide * sin),
                    weight * (open * sin + slide * cos),
                ];
                let share = tables.share[g % 2];
                mean[0] -= share * step[0];
                mean[1] -= share * step[1];
                x -= step[0];
                y -= step[1];
            }
            means[pad] = mean;
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
        let directions = self.directions(tables);
        let weight = self.element.length / POINTS as f64;
        let stretching: f64 = (0..POINTS)
            .map(|g| {
                let (fx, fy) = self.force(tables, g);
                let ((sin, cos), law) = (directions[g], &self.laws[g]);
                let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
                0.5 * weight
                    * (law.axial_compliance * axial * axial + law.shear_compliance * shear * shear)
            })
            .sum();
        bending + stretching
    }

    /// All derivatives; of the pads marked only.
    pub fn forms(&self, plain: &Tables, tables: &PadTables, marked: [bool; PADS]) -> PadForms {
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
        let directions = self.directions(tables);
        let weight = element.length / POINTS as f64;
        let mut means = [[self.b[0], self.b[1]]; PADS];
        let mut turning = [[[0.0; 2]; FUNCTIONS]; PADS];
        let mut stretch = [[0.0; 3]; PADS];
        let mut mutual = [[[0.0; 3]; PADS]; PADS];
        for g in 0..POINTS {
            let (value, law) = (&tables.values[g], &self.laws[g]);
            let (fx, fy) = self.force(tables, g);
            let (sin, cos) = directions[g];
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
            let here = g / 2;
            let share = |pad: usize| if pad < here { 1.0 } else { tables.share[g % 2] };
            for k in (0..=here).filter(|k| marked[*k]) {
                let psi = share(k);
                means[k][0] -= psi * step[0];
                means[k][1] -= psi * step[1];
                for i in 0..FUNCTIONS {
                    turning[k][i][0] += psi * value[i] * mixed[0];
                    turning[k][i][1] += psi * value[i] * mixed[1];
                }
                for n in 0..3 {
                    stretch[k][n] += psi * give[n];
                }
                for l in (k..=here).filter(|l| marked[*l]) {
                    let both = psi * share(l);
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
            for k in 0..PADS {
                means[k][0] -= reach[0];
                means[k][1] -= reach[1];
                turning[k][1][0] += reach[1];
                turning[k][1][1] -= reach[0];
            }
        }
        for k in 0..PADS {
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

/// What a leaning element adds to the chain, its own unknowns eliminated, and what recovers them.
#[derive(Clone, Debug)]
pub(super) struct Condensed {
    /// Residual at A and B.
    pub residual: [Vector3<f64>; 2],
    /// Blocks AA, AB, BA, BB.
    pub blocks: [Matrix3<f64>; 4],
    /// Of [`super::element::ElementForms::inner_right`], as for a plain element.
    pub inner_answers: SMatrix<f64, 5, INNER>,
    /// The inner unknowns' answers to the pads' unknowns, one a row.
    pub to_pads: SMatrix<f64, PAD_UNKNOWNS, INNER>,
    /// The pads' answers to the reduced outer unknowns and the residual, one a column.
    pub pad_answers: SMatrix<f64, PAD_UNKNOWNS, 7>,
    /// Negative eigenvalues beyond those of a stable state; unsymmetric: modulo 2.
    pub negatives: i64,
    symmetric: bool,
}

impl PadForms {
    /// Eliminates the element's inner unknowns and its pads'. `was` is where each pad was along x,
    /// `forces` the force at either end.
    pub fn condense(
        mut self,
        pads: &[Pad; PADS],
        jumps: &[[f64; 2]; PADS],
        was: &[f64],
        forces: [[f64; 2]; 2],
        symmetric: bool,
    ) -> Condensed {
        type Pads = SMatrix<f64, PAD_UNKNOWNS, PAD_UNKNOWNS>;
        let mut own = Pads::zeros();
        let mut residual = SVector::<f64, PAD_UNKNOWNS>::zeros();
        // Columns: what an unknown does (J = Σ doing·p). Rows: what its equation looks at.
        let mut doing = [[0.0; 2]; PAD_UNKNOWNS];
        let mut looking = [[0.0; 2]; PAD_UNKNOWNS];
        let mut by_force = [0.0; PAD_UNKNOWNS];
        // Negative eigenvalues, or the parity of them, that the pads have in every stable state.
        let mut usual = if symmetric { PAD_UNKNOWNS as i64 } else { 0 };
        for (k, pad) in pads.iter().enumerate() {
            let (first, second) = (2 * k, 2 * k + 1);
            match *pad {
                Pad::Away | Pad::Pushed => {
                    let sign = if symmetric { -1.0 } else { 1.0 };
                    own[(first, first)] = sign;
                    own[(second, second)] = sign;
                }
                Pad::Leans {
                    side,
                    facing,
                    motion,
                } => {
                    let [x, y] = self.means[k];
                    let slope = facing.axis_slope + side * facing.widening;
                    let push = side * jumps[k][1];
                    let gap = y - facing.axis - side * facing.clearance;
                    self.forms.gap[0] -= push * facing.by_force;
                    self.forms.compliance[0] -= push * facing.by_force_bend;
                    if symmetric {
                        doing[first] = [-slope, 1.0];
                        looking[first] = [-slope, 1.0];
                        residual[first] = gap;
                        by_force[first] = -side * facing.by_force;
                        own[(second, second)] = -1.0;
                        continue;
                    }
                    doing[first] = [1.0, 0.0];
                    doing[second] = [0.0, 1.0];
                    looking[second] = [-slope, 1.0];
                    residual[second] = gap;
                    by_force[second] = -side * facing.by_force;
                    match motion {
                        Motion::Slips(friction) => {
                            looking[first] = [side * facing.widening_bend * jumps[k][1], 0.0];
                            own[(first, first)] = 1.0;
                            own[(first, second)] = slope - friction * side;
                            residual[first] = jumps[k][0] + slope * jumps[k][1] - friction * push;
                            usual += 1;
                        }
                        Motion::Sticks => {
                            looking[first] = [1.0, 0.0];
                            residual[first] = x - was[k];
                        }
                    }
                }
            }
        }
        let product = |v: [f64; 2], m: &[f64; 3], w: [f64; 2]| {
            v[0] * (m[0] * w[0] + m[1] * w[1]) + v[1] * (m[1] * w[0] + m[2] * w[1])
        };
        // Pads against inner (c, F), both ways; against the reduced outer unknowns, both ways.
        let mut inner_columns = SMatrix::<f64, PAD_UNKNOWNS, INNER>::zeros();
        let mut inner_rows = SMatrix::<f64, PAD_UNKNOWNS, INNER>::zeros();
        let mut outer_columns = SMatrix::<f64, PAD_UNKNOWNS, OUTER>::zeros();
        let mut outer_rows = SMatrix::<f64, PAD_UNKNOWNS, OUTER>::zeros();
        for p in 0..PAD_UNKNOWNS {
            let k = p / 2;
            for (vector, inner, outer) in [
                (doing[p], &mut inner_columns, &mut outer_columns),
                (looking[p], &mut inner_rows, &mut outer_rows),
            ] {
                let turn = |i: usize| {
                    vector[0] * self.turning[k][i][0] + vector[1] * self.turning[k][i][1]
                };
                for i in 0..3 {
                    inner[(p, i)] = turn(2 + i);
                }
                let s = &self.stretch[k];
                inner[(p, 3)] = vector[0] * s[0] + vector[1] * s[1];
                inner[(p, 4)] = vector[0] * s[1] + vector[1] * s[2];
                outer[(p, 2)] = turn(0);
                outer[(p, 3)] = turn(1);
                outer[(p, 4)] = vector[0];
                outer[(p, 5)] = vector[1];
            }
            inner_rows[(p, 3)] += by_force[p];
            // By the energy of the growth, the push acts on F_x the same way.
            inner_columns[(p, 3)] += by_force[p];
            for other in 0..PAD_UNKNOWNS {
                own[(p, other)] += product(looking[p], &self.mutual[k][other / 2], doing[other]);
            }
        }
        let inner_factor = SymmetricFactor::new(&self.forms.inner_matrix());
        let right = self.forms.inner_right();
        let mut answers = right;
        inner_factor.solve_rows(&mut answers);
        let mut to_pads = inner_columns;
        inner_factor.solve_rows(&mut to_pads);
        own -= inner_rows * to_pads.transpose();
        // Columns: outer (dx, dy, θ_A, θ_B: through the inner ones too; x_B, y_B), and residual.
        let mut seen = SMatrix::<f64, PAD_UNKNOWNS, 7>::zeros();
        let through = inner_rows * answers.transpose();
        for p in 0..PAD_UNKNOWNS {
            for column in 0..OUTER {
                seen[(p, column)] = outer_rows[(p, column)]
                    - if column < 4 {
                        through[(p, column)]
                    } else {
                        0.0
                    };
            }
            seen[(p, 6)] = residual[p] - through[(p, 4)];
        }
        let (pad_answers, pad_negatives) = if symmetric {
            let factor = SymmetricFactor::new(&own);
            let mut rows = seen.transpose();
            factor.solve_rows(&mut rows);
            (rows.transpose(), i64::from(factor.negatives))
        } else {
            let factor = own.lu();
            let mut columns = seen;
            factor.solve_mut(&mut columns);
            (columns, i64::from(factor.determinant() < 0.0))
        };
        // Condensed matrix and residual of the reduced unknowns.
        let mut from_pads = outer_columns;
        let through = to_pads * right.transpose();
        for p in 0..PAD_UNKNOWNS {
            for column in 0..4 {
                from_pads[(p, column)] -= through[(p, column)];
            }
        }
        let by_pads = from_pads.tr_mul(&pad_answers);
        let by_inner = right * answers.transpose();
        let mut matrix = SMatrix::<f64, OUTER, OUTER>::zeros();
        let [first, last] = forces;
        let mut reduced = SVector::<f64, OUTER>::from([
            first[0],
            first[1],
            self.forms.moment[0],
            self.forms.moment[1],
            last[0] - first[0],
            last[1] - first[1],
        ]);
        for i in 0..OUTER {
            for j in 0..OUTER {
                if i < 4 && j < 4 {
                    matrix[(i, j)] -= by_inner[(i, j)];
                }
                matrix[(i, j)] -= by_pads[(i, j)];
            }
            if i < 4 {
                reduced[i] -= by_inner[(i, 4)];
            }
            reduced[i] -= by_pads[(i, 6)];
        }
        for i in 0..2 {
            for j in 0..2 {
                matrix[(2 + i, 2 + j)] += self.forms.bending[i.max(j)][i.min(j)];
            }
        }
        // From (x_A, y_A, θ_A, x_B, y_B, θ_B) to the reduced unknowns.
        let mut reduce = SMatrix::<f64, OUTER, 6>::zeros();
        for axis in 0..2 {
            reduce[(axis, axis)] = -1.0;
            reduce[(axis, 3 + axis)] = 1.0;
            reduce[(4 + axis, 3 + axis)] = 1.0;
        }
        reduce[(2, 2)] = 1.0;
        reduce[(3, 5)] = 1.0;
        let whole = reduce.tr_mul(&(matrix * reduce));
        let residual = reduce.tr_mul(&reduced);
        Condensed {
            residual: [
                residual.fixed_rows::<3>(0).into_owned(),
                residual.fixed_rows::<3>(3).into_owned(),
            ],
            blocks: [(0, 0), (0, 3), (3, 0), (3, 3)]
                .map(|at| whole.fixed_view::<3, 3>(at.0, at.1).into_owned()),
            inner_answers: answers,
            to_pads,
            pad_answers,
            negatives: i64::from(inner_factor.negatives) - 2 + pad_negatives - usual,
            symmetric,
        }
    }
}

impl Condensed {
    /// Steps of the element's inner unknowns and of its pads' J for steps of its ends.
    pub fn recover(
        &self,
        pads: &[Pad; PADS],
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        residual: f64,
    ) -> (SVector<f64, INNER>, [[f64; 2]; PADS]) {
        let outer = [b[0] - a[0], b[1] - a[1], a[2], b[2], b[0], b[1], residual];
        let pushed = -(self.pad_answers * SVector::from(outer));
        let inner = -(self.inner_answers.tr_mul(&SVector::from([
            outer[0], outer[1], outer[2], outer[3], residual,
        ])) + self.to_pads.tr_mul(&pushed));
        let mut jumps = [[0.0; 2]; PADS];
        for (k, pad) in pads.iter().enumerate() {
            if let Pad::Leans { side, facing, .. } = pad {
                jumps[k] = if self.symmetric {
                    let slope = facing.axis_slope + side * facing.widening;
                    [-slope * pushed[2 * k], pushed[2 * k]]
                } else {
                    [pushed[2 * k], pushed[2 * k + 1]]
                };
            }
        }
        (inner, jumps)
    }
}

/// What the pads of an element do at their mean positions, from what they did and where.
pub(super) fn decide(
    walls: &[Wall],
    top: &TopSeat,
    held: &Held<'_>,
    means: &[[f64; 2]; PADS],
    was: &[f64],
    search: f64,
    symmetric: bool,
) -> [Pad; PADS] {
    let compliance = held.element.points[0].axial_compliance;
    std::array::from_fn(|k| {
        let ([x, y], [jx, jy]) = (means[k], held.jumps[k]);
        let facings = walls
            .iter()
            .filter_map(|wall| wall.face(x, held.inner[3], compliance, top));
        let nearest = facings.min_by(|a, b| {
            let room = |f: &Facing| f.clearance - (y - f.axis).abs();
            room(a).total_cmp(&room(b))
        });
        let Some(facing) = nearest else {
            return Pad::Away;
        };
        let aside = y - facing.axis;
        let side = if jy != 0.0 {
            jy.signum()
        } else {
            aside.signum()
        };
        let gap = facing.clearance - side * aside;
        let push = side * jy;
        if push - search * gap <= 0.0 {
            return Pad::Away;
        }
        let slope = facing.axis_slope + side * facing.widening;
        let motion = if symmetric || facing.friction == 0.0 {
            Motion::Slips(0.0)
        } else {
            let drag = jx + slope * jy;
            let trial = drag + search * (x - was[k]);
            if trial.abs() <= facing.friction * push * HOLDS {
                Motion::Sticks
            } else {
                Motion::Slips(trial.signum() * facing.friction)
            }
        };
        Pad::Leans {
            side,
            facing,
            motion,
        }
    })
}
