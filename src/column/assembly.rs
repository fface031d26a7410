//! The column as a system to be solved: elements condensed and chained, ends held.

use super::element::{Element, INNER};
use super::layout::{Column, ColumnState, EndLaws, Hold};
use crate::solve::{Assembled, SymmetricFactor, System};
use nalgebra::{Matrix3, SVector, Vector3};
use nalgebra_sparse::{CooMatrix, CscMatrix};

/// Negative eigenvalues of an element's inner matrix in every stable state: its two forces,
/// multipliers of the geometry.
const ALWAYS_NEGATIVE: i64 = 2;

impl System<3, INNER> for Column {
    fn links(&self) -> usize {
        self.elements.len()
    }

    fn assemble(&mut self, state: &ColumnState, load: f64, out: &mut Assembled<3>) {
        out.inner_negatives = -ALWAYS_NEGATIVE * self.elements.len() as i64;
        for (residual, pattern) in out.residual.iter_mut().zip(&self.pattern) {
            *residual = pattern * -load;
        }
        out.tangent.diagonal.fill(Matrix3::zeros());
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b, inner) = (&state.nodes[e], &state.nodes[e + 1], &state.inner[e]);
            let forms = element.forms(&self.tables, a, b, inner);
            let factor = SymmetricFactor::new(&forms.inner_matrix());
            out.inner_negatives += i64::from(factor.negatives);
            let right = forms.inner_right();
            let mut answers = right;
            factor.solve_rows(&mut answers);
            let taken = |row: usize, other: usize| -> f64 {
                (0..INNER)
                    .map(|k| right[(row, k)] * answers[(other, k)])
                    .sum()
            };
            // Rows of `right` for the differences of position have a single entry, 1.
            let (xx, xy, yy) = (answers[(0, 3)], answers[(0, 4)], answers[(1, 4)]);
            let (xa, ya) = (answers[(2, 3)], answers[(2, 4)]);
            let (xb, yb) = (answers[(3, 3)], answers[(3, 4)]);
            let (fx, fy) = (inner[3] - answers[(4, 3)], inner[4] - answers[(4, 4)]);
            let aa = forms.bending[0][0] - taken(2, 2);
            let ab = forms.bending[1][0] - taken(2, 3);
            let bb = forms.bending[1][1] - taken(3, 3);
            out.residual[e] += Vector3::new(-fx, -fy, forms.moment[0] - taken(2, 4));
            out.residual[e + 1] += Vector3::new(fx, fy, forms.moment[1] - taken(3, 4));
            out.tangent.diagonal[e] += Matrix3::new(-xx, -xy, xa, -xy, -yy, ya, xa, ya, aa);
            out.tangent.diagonal[e + 1] += Matrix3::new(-xx, -xy, -xb, -xy, -yy, -yb, -xb, -yb, bb);
            out.tangent.right[e] = Matrix3::new(xx, xy, xb, xy, yy, yb, -xa, -ya, ab);
            self.inner_answers[e] = answers;
        }
        let last = self.elements.len();
        hold_end(&self.bottom, 0, state, out);
        hold_end(&self.top, last, state, out);
    }

    fn load_pattern(&self) -> &[Vector3<f64>] {
        &self.pattern
    }

    fn recover(&self, step: &mut ColumnState, with_residual: bool) {
        for e in 0..self.elements.len() {
            let (a, b) = (&step.nodes[e], &step.nodes[e + 1]);
            let residual = if with_residual { 1.0 } else { 0.0 };
            let outer = SVector::from([b[0] - a[0], b[1] - a[1], a[2], b[2], residual]);
            let inner = -self.inner_answers[e].tr_mul(&outer);
            step.inner[e] = inner;
        }
    }

    fn load_scale(&self) -> f64 {
        self.load_scale
    }
}

/// Adds the laws of an end: elastic ones to residual and tangent; held unknowns become identity
/// rows that keep their value.
fn hold_end(laws: &EndLaws, node: usize, state: &ColumnState, out: &mut Assembled<3>) {
    for (k, hold) in laws.0.iter().enumerate() {
        match *hold {
            Hold::Free => {}
            Hold::Elastic { .. } | Hold::Curved { .. } => {
                if let Some((force, stiffness)) = hold.law(state.nodes[node][k]) {
                    out.residual[node][k] += force;
                    out.tangent.diagonal[node][(k, k)] += stiffness;
                }
            }
            Hold::Held(value) => {
                out.residual[node][k] = state.nodes[node][k] - value;
                for j in 0..3 {
                    out.tangent.diagonal[node][(k, j)] = 0.0;
                    out.tangent.diagonal[node][(j, k)] = 0.0;
                    if node == 0 {
                        out.tangent.right[0][(k, j)] = 0.0;
                    } else {
                        out.tangent.right[node - 1][(j, k)] = 0.0;
                    }
                }
                out.tangent.diagonal[node][(k, k)] = 1.0;
            }
        }
    }
}

impl Column {
    /// Force and moment that the ends of the column get from outside at `state`, in the column's
    /// units: bottom and top (F_x, F_y, M), load included. They balance.
    pub fn end_actions(&self, state: &ColumnState) -> [Vector3<f64>; 2] {
        let moment = |e: usize, end: usize| {
            let element: &Element = &self.elements[e];
            let forms = element.forms(
                &self.tables,
                &state.nodes[e],
                &state.nodes[e + 1],
                &state.inner[e],
            );
            forms.moment[end]
        };
        let last = self.elements.len() - 1;
        let (first_force, last_force) = (&state.inner[0], &state.inner[last]);
        [
            Vector3::new(-first_force[3], -first_force[4], moment(0, 0)),
            Vector3::new(last_force[3], last_force[4], moment(last, 1)),
        ]
    }

    /// The uncondensed tangent at a state, order node 0 (x, y, θ), element 0 (c_1, c_2, c_3, F_x,
    /// F_y), node 1, …: 8 rows an element and 3 more. Held rows and columns are the identity's. For
    /// checks against general solvers, and to hand the matrix out.
    pub fn uncondensed(&self, state: &ColumnState) -> CscMatrix<f64> {
        let n = self.elements.len();
        let size = 8 * n + 3;
        let mut held = vec![false; size];
        let mut matrix = CooMatrix::new(size, size);
        for (first, laws) in [(0, &self.bottom), (8 * n, &self.top)] {
            for (k, hold) in laws.0.iter().enumerate() {
                match *hold {
                    Hold::Free => {}
                    Hold::Elastic { .. } | Hold::Curved { .. } => {
                        let node = if first == 0 { 0 } else { n };
                        if let Some((_, stiffness)) = hold.law(state.nodes[node][k]) {
                            matrix.push(first + k, first + k, stiffness);
                        }
                    }
                    Hold::Held(_) => {
                        held[first + k] = true;
                        matrix.push(first + k, first + k, 1.0);
                    }
                }
            }
        }
        let mut add = |row: usize, column: usize, value: f64| {
            if !held[row] && !held[column] {
                matrix.push(row, column, value);
            }
        };
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b, inner) = (&state.nodes[e], &state.nodes[e + 1], &state.inner[e]);
            let forms = element.forms(&self.tables, a, b, inner);
            let base = 8 * e;
            // Rows of the rotations [θ_A, θ_B, c_1, c_2, c_3] and of the forces.
            let turns = [base + 2, base + 10, base + 3, base + 4, base + 5];
            let forces = [base + 6, base + 7];
            for (i, row) in turns.iter().enumerate() {
                for (j, column) in turns.iter().enumerate() {
                    add(*row, *column, forms.bending[i.max(j)][i.min(j)]);
                }
                for (axis, column) in forces.iter().enumerate() {
                    add(*row, *column, forms.coupling[i][axis]);
                    add(*column, *row, forms.coupling[i][axis]);
                }
            }
            for (i, row) in forces.iter().enumerate() {
                for (j, column) in forces.iter().enumerate() {
                    add(*row, *column, forms.compliance[i + j]);
                }
                for (place, sign) in [(base + i, -1.0), (base + 8 + i, 1.0)] {
                    add(*row, place, sign);
                    add(place, *row, sign);
                }
            }
        }
        CscMatrix::from(&matrix)
    }
}
