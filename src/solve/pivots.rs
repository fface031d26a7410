//! Factorisation of a small, dense, symmetric and possibly indefinite matrix, with its inertia.
//!
//! `Pᵀ A P = L D Lᵀ`, D of 1×1 and 2×2 pivots, chosen by Bunch and Kaufman's partial pivoting, so
//! that neither a zero on the diagonal nor an indefinite matrix spoils the accuracy. By Sylvester's
//! law the number of negative eigenvalues of A is that of D.
//!
//! Most matrices need no interchange at all: every diagonal entry in turn passes the test of the
//! pivoting as it stands. Those take a plain path of fixed length, without branches; the first
//! failed test sends the matrix down the general one. The pivots are the same on both.
//!
//! Source: Bunch & Kaufman, Math. Comp. 31 (1977) 163–179; Golub & Van Loan, Matrix
//! Computations, section on symmetric indefinite systems (both from memory).

use nalgebra::{SMatrix, SVector};

/// (1 + √17)/8: balances the growth of 1×1 against 2×2 pivots (Bunch & Kaufman).
const ALPHA: f64 = 0.640_388_203_202_208_1;

/// Factor of a symmetric N×N matrix.
#[derive(Clone, Copy, Debug)]
pub struct SymmetricFactor<const N: usize> {
    /// L below the diagonal; on it 1/D if the factor is plain, D if not.
    lower: SMatrix<f64, N, N>,
    /// Without interchanges and 2×2 pivots; `kinds` and `order` are then not used.
    plain: bool,
    kinds: [Pivot; N],
    order: [u8; N],
    /// Number of negative eigenvalues.
    pub negatives: u32,
    /// Smallest pivot over largest entry of the matrix: tells how near to singular it is.
    pub smallest_pivot: f64,
}

/// What stands on the diagonal of D at one place.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub(super) enum Pivot {
    /// A 1×1 pivot.
    #[default]
    Single,
    /// The first row of a 2×2 pivot.
    First,
    /// Its second row.
    Second,
}

/// What a factorisation found out about its matrix.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Found {
    pub negatives: u32,
    pub smallest_pivot: f64,
}

impl<const N: usize> SymmetricFactor<N> {
    /// Factor of `matrix`; only its lower triangle is read. A pivot that is zero is replaced by
    /// the round-off of the matrix, so that solving stays finite; `smallest_pivot` tells.
    #[inline]
    pub fn new(matrix: &SMatrix<f64, N, N>) -> Self {
        let factor = Self::without_interchange(matrix);
        if factor.plain {
            factor
        } else {
            Self::with_interchanges(matrix)
        }
    }

    /// The factor with every pivot taken where it stands; `plain` tells whether that was right.
    #[inline(always)]
    fn without_interchange(matrix: &SMatrix<f64, N, N>) -> Self {
        let mut lower = *matrix;
        let a = &mut lower.data.0;
        let mut largest = f64::MIN_POSITIVE;
        for (j, column) in a.iter().enumerate() {
            for entry in &column[j..] {
                largest = larger(largest, entry.abs());
            }
        }
        let mut plain = true;
        let mut negatives = 0;
        let mut smallest = f64::INFINITY;
        for k in 0..N {
            let pivot = a[k][k];
            let size = pivot.abs();
            let inverse = 1.0 / pivot;
            negatives += u32::from(pivot < 0.0);
            smallest = if size < smallest { size } else { smallest };
            let column = a[k];
            for j in k + 1..N {
                plain &= size >= ALPHA * column[j].abs();
                let factor = column[j] * inverse;
                a[k][j] = factor;
                for i in j..N {
                    a[j][i] -= column[i] * factor;
                }
            }
            a[k][k] = inverse;
        }
        SymmetricFactor {
            lower,
            plain: plain && smallest >= largest * f64::EPSILON,
            kinds: [Pivot::Single; N],
            order: [0; N],
            negatives,
            smallest_pivot: smallest / largest,
        }
    }

    #[cold]
    fn with_interchanges(matrix: &SMatrix<f64, N, N>) -> Self {
        let mut lower = *matrix;
        let mut kinds = [Pivot::Single; N];
        let mut order = [0; N];
        let found = factor(lower.as_mut_slice(), N, &mut kinds, &mut order);
        SymmetricFactor {
            lower,
            plain: false,
            kinds,
            order,
            negatives: found.negatives,
            smallest_pivot: found.smallest_pivot,
        }
    }

    /// The identity's factor: a place to write into.
    pub fn identity() -> Self {
        SymmetricFactor::new(&SMatrix::identity())
    }

    /// Solves `A x = b` in place.
    #[inline]
    pub fn solve(&self, b: &mut SVector<f64, N>) {
        if self.plain {
            self.solve_plain(b);
        } else {
            self.solve_general(b.as_mut_slice());
        }
    }

    /// Solves `A X = B` in place for M right-hand sides. Each is a *row* of `b`, its transpose:
    /// so they lie side by side in memory and are solved together.
    #[inline]
    pub fn solve_rows<const M: usize>(&self, b: &mut SMatrix<f64, M, N>) {
        if self.plain {
            let (l, b) = (&self.lower.data.0, &mut b.data.0);
            for k in 0..N {
                let known = b[k];
                for i in k + 1..N {
                    for m in 0..M {
                        b[i][m] -= l[k][i] * known[m];
                    }
                }
            }
            for k in (0..N).rev() {
                for m in 0..M {
                    b[k][m] *= l[k][k];
                }
                for i in k + 1..N {
                    for m in 0..M {
                        b[k][m] -= l[k][i] * b[i][m];
                    }
                }
            }
        } else {
            for mut row in b.row_iter_mut() {
                let mut column = row.transpose();
                self.solve_general(column.as_mut_slice());
                row.copy_from(&column.transpose());
            }
        }
    }

    #[inline(always)]
    fn solve_plain(&self, b: &mut SVector<f64, N>) {
        let (l, b) = (&self.lower.data.0, &mut b.data.0[0]);
        for k in 0..N {
            for i in k + 1..N {
                b[i] -= l[k][i] * b[k];
            }
        }
        for k in (0..N).rev() {
            b[k] *= l[k][k];
            for i in k + 1..N {
                b[k] -= l[k][i] * b[i];
            }
        }
    }

    #[cold]
    fn solve_general(&self, b: &mut [f64]) {
        solve(self.lower.as_slice(), N, &self.kinds, &self.order, b);
    }
}

/// The larger of two numbers that are not NaN.
#[inline(always)]
fn larger(a: f64, b: f64) -> f64 {
    if b > a { b } else { a }
}

/// Factors the lower triangle of the n×n matrix `a` (column by column) in place.
#[inline(always)]
pub(super) fn factor(a: &mut [f64], n: usize, kinds: &mut [Pivot], order: &mut [u8]) -> Found {
    let a = &mut a[..n * n];
    let kinds = &mut kinds[..n];
    let order = &mut order[..n];
    let mut largest = 0.0_f64;
    for j in 0..n {
        for i in j..n {
            largest = largest.max(a[i + j * n].abs());
        }
    }
    let floor = (largest * f64::EPSILON).max(f64::MIN_POSITIVE);
    let mut found = Found {
        negatives: 0,
        smallest_pivot: f64::INFINITY,
    };
    let mut k = 0;
    while k < n {
        // The largest entry below the diagonal in column k.
        let mut r = k;
        let mut below = 0.0_f64;
        for i in k + 1..n {
            let size = a[i + k * n].abs();
            if size > below {
                below = size;
                r = i;
            }
        }
        let here = a[k + k * n].abs();
        let mut pair = false;
        let mut swap_with = k;
        if here < ALPHA * below {
            let mut across = 0.0_f64;
            for i in k..n {
                if i != r {
                    across = across.max(entry(a, n, i, r).abs());
                }
            }
            if here * across >= ALPHA * below * below {
                // The diagonal is good enough after all.
            } else if a[r + r * n].abs() >= ALPHA * across {
                swap_with = r;
            } else {
                pair = true;
                swap_with = r;
            }
        }
        let target = if pair { k + 1 } else { k };
        order[k] = k as u8;
        if pair {
            order[k + 1] = k as u8 + 1;
        }
        order[target] = swap_with as u8;
        if swap_with != target {
            interchange(a, n, target, swap_with, k);
        }
        if pair {
            eliminate_pair(a, n, k, floor, &mut found);
            kinds[k] = Pivot::First;
            kinds[k + 1] = Pivot::Second;
            k += 2;
        } else {
            let mut d = a[k + k * n];
            if d.abs() < floor {
                d = if d < 0.0 { -floor } else { floor };
                a[k + k * n] = d;
            }
            found.negatives += u32::from(d < 0.0);
            found.smallest_pivot = found.smallest_pivot.min(d.abs());
            for j in k + 1..n {
                let factor = a[j + k * n] / d;
                for i in j..n {
                    a[i + j * n] -= a[i + k * n] * factor;
                }
            }
            for i in k + 1..n {
                a[i + k * n] /= d;
            }
            kinds[k] = Pivot::Single;
            k += 1;
        }
    }
    found.smallest_pivot /= largest.max(f64::MIN_POSITIVE);
    found
}

/// Eliminates the 2×2 pivot at k, k+1. Bunch and Kaufman choose such a pivot only where its
/// determinant is negative: one negative and one positive eigenvalue.
#[inline(always)]
fn eliminate_pair(a: &mut [f64], n: usize, k: usize, floor: f64, found: &mut Found) {
    let (p, q, s) = (a[k + k * n], a[k + 1 + k * n], a[k + 1 + (k + 1) * n]);
    let q = if q.abs() < floor { floor } else { q };
    a[k + 1 + k * n] = q;
    let determinant = p * s - q * q;
    found.negatives += 1;
    // The smaller eigenvalue in size, from the determinant and a bound of the larger.
    found.smallest_pivot = found
        .smallest_pivot
        .min(determinant.abs() / (p.abs().max(s.abs()) + q.abs()));
    for j in k + 2..n {
        let (u, v) = (a[j + k * n], a[j + (k + 1) * n]);
        let l1 = (u * s - v * q) / determinant;
        let l2 = (v * p - u * q) / determinant;
        for i in j..n {
            a[i + j * n] -= a[i + k * n] * l1 + a[i + (k + 1) * n] * l2;
        }
    }
    for i in k + 2..n {
        let (u, v) = (a[i + k * n], a[i + (k + 1) * n]);
        a[i + k * n] = (u * s - v * q) / determinant;
        a[i + (k + 1) * n] = (v * p - u * q) / determinant;
    }
}

/// Entry (i, j) of the symmetric matrix kept in its lower triangle.
#[inline(always)]
fn entry(a: &[f64], n: usize, i: usize, j: usize) -> f64 {
    if i >= j { a[i + j * n] } else { a[j + i * n] }
}

/// Interchanges rows and columns p < q of the trailing matrix and of the rows of L before `done`.
#[inline(always)]
fn interchange(a: &mut [f64], n: usize, p: usize, q: usize, done: usize) {
    for j in 0..p.min(done) {
        a.swap(p + j * n, q + j * n);
    }
    for j in done..p {
        a.swap(p + j * n, q + j * n);
    }
    a.swap(p + p * n, q + q * n);
    for i in p + 1..q {
        a.swap(i + p * n, q + i * n);
    }
    for i in q + 1..n {
        a.swap(i + p * n, i + q * n);
    }
}

/// Solves with a factor, in place.
#[inline(always)]
pub(super) fn solve(a: &[f64], n: usize, kinds: &[Pivot], order: &[u8], b: &mut [f64]) {
    let (a, kinds, order, b) = (&a[..n * n], &kinds[..n], &order[..n], &mut b[..n]);
    for k in 0..n {
        let other = order[k] as usize;
        if other != k {
            b.swap(k, other);
        }
    }
    for k in 0..n {
        let first = k + 1 + usize::from(kinds[k] == Pivot::First);
        for i in first..n {
            b[i] -= a[i + k * n] * b[k];
        }
    }
    let mut k = 0;
    while k < n {
        if kinds[k] == Pivot::First {
            let (p, q, s) = (a[k + k * n], a[k + 1 + k * n], a[k + 1 + (k + 1) * n]);
            let determinant = p * s - q * q;
            let (u, v) = (b[k], b[k + 1]);
            b[k] = (u * s - v * q) / determinant;
            b[k + 1] = (v * p - u * q) / determinant;
            k += 2;
        } else {
            b[k] /= a[k + k * n];
            k += 1;
        }
    }
    for k in (0..n).rev() {
        let first = k + 1 + usize::from(kinds[k] == Pivot::First);
        let mut sum = b[k];
        for i in first..n {
            sum -= a[i + k * n] * b[i];
        }
        b[k] = sum;
    }
    for k in (0..n).rev() {
        let other = order[k] as usize;
        if other != k {
            b.swap(k, other);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    /// Eigenvalues by nalgebra's dense symmetric solver: the independent count.
    fn negatives(matrix: &SMatrix<f64, 6, 6>) -> u32 {
        let full = matrix.symmetric_eigenvalues();
        full.iter().filter(|value| **value < 0.0).count() as u32
    }

    fn symmetric(values: &[f64], zero_diagonal: bool) -> SMatrix<f64, 6, 6> {
        let mut matrix = SMatrix::zeros();
        let mut next = values.iter();
        for j in 0..6 {
            for i in j..6 {
                let value = *next.next().expect("21 values");
                matrix[(i, j)] = value;
                matrix[(j, i)] = value;
            }
            if zero_diagonal {
                matrix[(j, j)] = 0.0;
            }
        }
        matrix
    }

    proptest! {
        #[test]
        fn random_matrices_are_solved_and_counted(
            values in prop::collection::vec(-1.0..1.0_f64, 21),
            zero_diagonal in any::<bool>(),
            right in prop::collection::vec(-1.0..1.0_f64, 6),
        ) {
            let matrix = symmetric(&values, zero_diagonal);
            let values = matrix.symmetric_eigenvalues();
            prop_assume!(values.iter().all(|v| v.abs() > 1e-6));
            let factor = SymmetricFactor::new(&matrix);
            prop_assert_eq!(factor.negatives, negatives(&matrix));
            let b = SVector::<f64, 6>::from_column_slice(&right);
            let mut x = b;
            factor.solve(&mut x);
            prop_assert!((matrix * x - b).amax() <= 1e-13 * x.amax().max(1.0));
        }
    }

    #[test]
    fn a_zero_leading_entry_is_no_obstacle() {
        let matrix = SMatrix::<f64, 2, 2>::new(0.0, 1.0, 1.0, 0.0);
        let factor = SymmetricFactor::new(&matrix);
        assert_eq!(factor.negatives, 1);
        let mut b = SVector::<f64, 2>::new(3.0, 5.0);
        factor.solve(&mut b);
        assert_eq!(b, SVector::<f64, 2>::new(5.0, 3.0));
    }

    #[test]
    fn a_singular_matrix_says_so() {
        let matrix = SMatrix::<f64, 2, 2>::new(1.0, 1.0, 1.0, 1.0);
        assert!(SymmetricFactor::new(&matrix).smallest_pivot < 1e-15);
    }
}
