//! Factor of a small symmetric block, of fixed size.
//!
//! Most blocks need no interchange: every diagonal entry in turn passes the pivoting's test as it
//! stands. Those take a plain path of fixed length without branches; a failed test sends the block
//! down the general one in [`super::pivots`]. Which pivots are taken does not depend on the path.

use super::pivots::{self, ALPHA, Pivot};
use nalgebra::{SMatrix, SVector};

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
        let found = pivots::factor(lower.as_mut_slice(), N, &mut kinds, &mut order);
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
        pivots::solve(self.lower.as_slice(), N, &self.kinds, &self.order, b);
    }
}

/// The larger of two numbers that are not NaN.
#[inline(always)]
fn larger(a: f64, b: f64) -> f64 {
    if b > a { b } else { a }
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

    proptest! {
        /// Blocks that need no interchange: the plain path against the general one.
        #[test]
        fn plain_and_general_path_agree(
            values in prop::collection::vec(-1.0..1.0_f64, 21),
            signs in prop::collection::vec(any::<bool>(), 6),
            right in prop::collection::vec(-1.0..1.0_f64, 18),
        ) {
            let mut matrix = symmetric(&values, false);
            for (j, positive) in signs.iter().enumerate() {
                matrix[(j, j)] += if *positive { 12.0 } else { -12.0 };
            }
            let plain = SymmetricFactor::new(&matrix);
            prop_assert!(plain.plain);
            let general = SymmetricFactor::with_interchanges(&matrix);
            prop_assert_eq!(plain.negatives, negatives(&matrix));
            prop_assert_eq!(general.negatives, plain.negatives);
            prop_assert!((plain.smallest_pivot - general.smallest_pivot).abs() < 1e-14);
            let b = SMatrix::<f64, 3, 6>::from_column_slice(&right);
            for factor in [plain, general] {
                let mut x = b;
                factor.solve_rows(&mut x);
                prop_assert!((x * matrix - b).amax() < 1e-14);
                let mut first = b.row(0).transpose();
                factor.solve(&mut first);
                prop_assert!((first.transpose() - x.row(0)).amax() < 1e-15);
            }
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
