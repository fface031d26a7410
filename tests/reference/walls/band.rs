//! A symmetric band matrix and its Cholesky factorisation.

/// Entries below and on the diagonal: three displacements a node, neighbours coupled.
pub const WIDTH: usize = 6;

/// Row i holds A(i, i), A(i, i − 1), … A(i, i − 5).
#[derive(Clone)]
pub struct Band(pub Vec<[f64; WIDTH]>);

/// L with A = L Lᵀ.
pub struct Factor(Vec<[f64; WIDTH]>);

impl Band {
    /// All nought, of `size` rows.
    pub fn zeros(size: usize) -> Band {
        Band(vec![[0.0; WIDTH]; size])
    }

    /// Adds to A(i, j) = A(j, i), |i − j| < 6.
    pub fn add(&mut self, i: usize, j: usize, value: f64) {
        self.0[i.max(j)][i.abs_diff(j)] += value;
    }

    /// A x.
    pub fn times(&self, x: &[f64]) -> Vec<f64> {
        let mut product = vec![0.0; x.len()];
        for (i, row) in self.0.iter().enumerate() {
            product[i] += row[0] * x[i];
            for k in 1..WIDTH.min(i + 1) {
                product[i] += row[k] * x[i - k];
                product[i - k] += row[k] * x[i];
            }
        }
        product
    }

    /// Factor of the matrix in which the `held` unknowns are taken out (1 on their diagonal) and
    /// `shift` is added to the diagonal of the others. `None`: not positive definite.
    pub fn factor(&self, held: &[bool], shift: f64) -> Option<Factor> {
        let mut lower = self.0.clone();
        for i in 0..lower.len() {
            for k in 0..WIDTH.min(i + 1) {
                if held[i] || held[i - k] {
                    lower[i][k] = if k == 0 { 1.0 } else { 0.0 };
                } else if k == 0 {
                    lower[i][0] += shift;
                }
            }
            for k in (0..WIDTH.min(i + 1)).rev() {
                let j = i - k;
                let mut rest = lower[i][k];
                for m in (k + 1)..WIDTH.min(i + 1) {
                    if m - k < WIDTH {
                        rest -= lower[i][m] * lower[j][m - k];
                    }
                }
                if k > 0 {
                    lower[i][k] = rest / lower[j][0];
                } else {
                    // What round-off leaves of a singular matrix is not taken for positive.
                    if rest <= 1e-14 * self.0[i][0].abs() || !rest.is_finite() {
                        return None;
                    }
                    lower[i][0] = rest.sqrt();
                }
            }
        }
        Some(Factor(lower))
    }
}

impl Factor {
    /// Solves A x = b in place.
    pub fn solve(&self, x: &mut [f64]) {
        for i in 0..x.len() {
            for k in 1..WIDTH.min(i + 1) {
                x[i] -= self.0[i][k] * x[i - k];
            }
            x[i] /= self.0[i][0];
        }
        for i in (0..x.len()).rev() {
            x[i] /= self.0[i][0];
            for k in 1..WIDTH.min(i + 1) {
                x[i - k] -= self.0[i][k] * x[i];
            }
        }
    }
}
