//! Factorisation of a block-tridiagonal matrix that is not symmetric: banded elimination with
//! partial pivoting, row by row.
//!
//! `A = P₁L₁P₂L₂ … U`: rows are exchanged within the band, so that U has twice the band to the right.
//! The determinant's sign comes with it; a number of negative eigenvalues does not.
//!
//! Source: Golub & Van Loan, Matrix Computations, band Gaussian elimination with partial pivoting
//! (from memory; tested against a dense factorisation).

use super::BlockTridiagonal;
use nalgebra::SVector;

/// Factor of a [`BlockTridiagonal`], to be refilled again and again without allocating.
#[derive(Clone, Debug)]
pub struct GeneralFactor<const B: usize> {
    /// Scalar rows; `upper[i][k]` stands in column i + k once row i is done.
    upper: Vec<f64>,
    /// Multipliers below each pivot.
    lower: Vec<f64>,
    exchanged: Vec<usize>,
    /// Whether the determinant is negative.
    pub negative: bool,
}

impl<const B: usize> GeneralFactor<B> {
    /// Entries below the diagonal in a column, and right of it in a row.
    const BAND: usize = 2 * B - 1;
    /// Entries of a row of U.
    const WIDTH: usize = 2 * Self::BAND + 1;
    /// A row while it is worked on: what is left of the diagonal too.
    const STORED: usize = Self::WIDTH + Self::BAND;

    /// Room for `rows` block rows.
    pub fn with_rows(rows: usize) -> Self {
        let n = B * rows;
        GeneralFactor {
            upper: vec![0.0; n * Self::STORED],
            lower: vec![0.0; n * Self::BAND],
            exchanged: vec![0; n],
            negative: false,
        }
    }

    /// Factors `matrix`.
    pub fn factor(&mut self, matrix: &BlockTridiagonal<B>) {
        let (band, stored) = (Self::BAND, Self::STORED);
        let rows = matrix.rows();
        let n = B * rows;
        self.upper.fill(0.0);
        for block in 0..rows {
            for r in 0..B {
                let i = block * B + r;
                let row = &mut self.upper[i * stored..(i + 1) * stored];
                // Column j of the matrix stands at band + j − i.
                let at = |other: usize, c: usize| band + other * B + c - i;
                for c in 0..B {
                    row[at(block, c)] = matrix.diagonal[block][(r, c)];
                    if block + 1 < rows {
                        row[at(block + 1, c)] = matrix.right[block][(r, c)];
                    }
                    if block > 0 {
                        row[at(block - 1, c)] = match matrix.left.get(block - 1) {
                            Some(left) => left[(r, c)],
                            None => matrix.right[block - 1][(c, r)],
                        };
                    }
                }
            }
        }
        self.negative = false;
        let largest = self.upper.iter().fold(0.0_f64, |most, v| most.max(v.abs()));
        let least = (f64::EPSILON * largest).max(f64::MIN_POSITIVE);
        for i in 0..n {
            let below = band.min(n - 1 - i);
            let entry = |row: usize| row * stored + band - (row - i);
            let mut pivot = i;
            for row in i + 1..=i + below {
                if self.upper[entry(row)].abs() > self.upper[entry(pivot)].abs() {
                    pivot = row;
                }
            }
            self.exchanged[i] = pivot;
            let width = Self::WIDTH.min(n - i);
            if pivot != i {
                self.negative = !self.negative;
                for k in 0..width {
                    self.upper.swap(entry(i) + k, entry(pivot) + k);
                }
            }
            let mut leading = self.upper[entry(i)];
            if leading.abs() < least {
                // Singular to round-off: a pivot of that size keeps the bordered solve exact.
                leading = least.copysign(leading);
                self.upper[entry(i)] = leading;
            }
            self.negative ^= leading < 0.0;
            let (head, tail) = self.upper.split_at_mut((i + 1) * stored);
            let pivot_row = &head[i * stored + band..i * stored + band + width];
            for step in 1..=below {
                let start = (step - 1) * stored + band - step;
                let row = &mut tail[start..start + width];
                let multiplier = row[0] / leading;
                self.lower[i * band + step - 1] = multiplier;
                if multiplier != 0.0 {
                    for (mine, its) in row.iter_mut().zip(pivot_row) {
                        *mine -= multiplier * its;
                    }
                }
            }
        }
    }

    fn row(&self, i: usize, n: usize) -> &[f64] {
        let start = i * Self::STORED + Self::BAND;
        &self.upper[start..start + Self::WIDTH.min(n - i)]
    }

    fn multipliers(&self, i: usize, n: usize) -> &[f64] {
        let below = Self::BAND.min(n - 1 - i);
        &self.lower[i * Self::BAND..i * Self::BAND + below]
    }

    /// Solves `A x = b` in place.
    pub fn solve(&self, b: &mut [SVector<f64, B>]) {
        let n = B * b.len();
        for i in 0..n {
            swap(b, i, self.exchanged[i]);
            let value = get(b, i);
            for (step, multiplier) in self.multipliers(i, n).iter().enumerate() {
                *entry(b, i + 1 + step) -= multiplier * value;
            }
        }
        for i in (0..n).rev() {
            let row = self.row(i, n);
            let mut value = get(b, i);
            for (step, upper) in row.iter().enumerate().skip(1) {
                value -= upper * get(b, i + step);
            }
            *entry(b, i) = value / row[0];
        }
    }

    /// Solves `Aᵀ x = b` in place.
    pub fn solve_transposed(&self, b: &mut [SVector<f64, B>]) {
        let n = B * b.len();
        for i in 0..n {
            let row = self.row(i, n);
            let value = get(b, i) / row[0];
            *entry(b, i) = value;
            for (step, upper) in row.iter().enumerate().skip(1) {
                *entry(b, i + step) -= upper * value;
            }
        }
        for i in (0..n).rev() {
            let mut value = get(b, i);
            for (step, multiplier) in self.multipliers(i, n).iter().enumerate() {
                value -= multiplier * get(b, i + 1 + step);
            }
            *entry(b, i) = value;
            swap(b, i, self.exchanged[i]);
        }
    }
}

#[inline]
fn get<const B: usize>(b: &[SVector<f64, B>], i: usize) -> f64 {
    b[i / B][i % B]
}

#[inline]
fn entry<const B: usize>(b: &mut [SVector<f64, B>], i: usize) -> &mut f64 {
    &mut b[i / B][i % B]
}

#[inline]
fn swap<const B: usize>(b: &mut [SVector<f64, B>], i: usize, j: usize) {
    if i != j {
        let (left, right) = (get(b, i), get(b, j));
        *entry(b, i) = right;
        *entry(b, j) = left;
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use nalgebra::{DMatrix, DVector, SMatrix};
    use proptest::prelude::*;

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(64))]
        /// Random matrices, rows out of order and with nothing on the diagonal among them, against
        /// the dense factorisation with partial pivoting of nalgebra.
        #[test]
        fn it_solves_both_ways_and_knows_the_sign(
            values in prop::collection::vec(-1.0..1.0_f64, 5 * 9 + 4 * 18 + 15),
            bare in any::<bool>(),
        ) {
            let rows = 5;
            let mut next = values.iter().copied();
            let mut take = || SMatrix::<f64, 3, 3>::from_fn(|_, _| next.next().unwrap_or(0.5));
            let mut matrix = BlockTridiagonal::<3>::unsymmetric(rows);
            matrix.diagonal.iter_mut().for_each(|block| *block = take());
            matrix.right.iter_mut().for_each(|block| *block = take());
            matrix.left.iter_mut().for_each(|block| *block = take());
            if bare {
                matrix.diagonal.iter_mut().for_each(|block| block.fill_diagonal(0.0));
            }
            let dense = DMatrix::from_fn(15, 15, |i, j| {
                let (bi, bj) = (i / 3, j / 3);
                let at = (i % 3, j % 3);
                if bi == bj { matrix.diagonal[bi][at] }
                else if bj == bi + 1 { matrix.right[bi][at] }
                else if bi == bj + 1 { matrix.left[bj][at] }
                else { 0.0 }
            });
            let determinant = dense.determinant();
            prop_assume!(determinant.abs() > 1e-4);
            let mut factor = GeneralFactor::with_rows(rows);
            factor.factor(&matrix);
            prop_assert_eq!(factor.negative, determinant < 0.0);
            let right: Vec<f64> = (0..15).map(|i| (f64::from(i) * 1.7).sin()).collect();
            let b: Vec<SVector<f64, 3>> =
                right.chunks(3).map(SVector::<f64, 3>::from_column_slice).collect();
            let known = DVector::from_vec(right);
            for transposed in [false, true] {
                let mut x = b.clone();
                if transposed { factor.solve_transposed(&mut x) } else { factor.solve(&mut x) }
                let flat = DVector::from_iterator(15, x.iter().flat_map(|v| v.iter().copied()));
                let product = if transposed { dense.transpose() * &flat } else { &dense * &flat };
                prop_assert!((product - &known).amax() < 1e-10 * flat.amax().max(1.0));
            }
        }
    }
}
