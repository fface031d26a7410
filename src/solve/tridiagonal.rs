//! Block-tridiagonal symmetric matrices, possibly indefinite: factorisation with pivot count.
//!
//! With diagonal blocks `A_i` and blocks `C_i` to the right of them, block elimination gives
//!
//! ```text
//! D_0 = A_0,   X_i = D_i⁻¹ C_i,   D_{i+1} = A_{i+1} − C_iᵀ X_i                     (1)
//! ```
//!
//! and the number of negative eigenvalues is the sum over the D_i (Sylvester). Where the leading
//! part of the matrix is itself nearly singular, D_i is, and (1) would lose digits although the
//! whole matrix is harmless. There the rows i and i+1 are taken together as one pivot of twice the
//! size (2), which is singular only where the next leading part is singular too. Where both are
//! nearly so, the one farther from singular is divided by.

use super::SymmetricFactor;
use super::pivots::{self, Found, Pivot};
use nalgebra::{SMatrix, SVector};

/// Growth of an eliminated block over the block it is taken from, beyond which two block rows
/// are joined to one pivot where that grows less: costs that many times the round-off.
const GROWTH: f64 = 1e3;

/// A block-tridiagonal matrix, symmetric unless it has blocks of its own to the left.
#[derive(Clone, Debug)]
pub struct BlockTridiagonal<const B: usize> {
    /// Diagonal blocks.
    pub diagonal: Vec<SMatrix<f64, B, B>>,
    /// `right[i]` stands in row i, column i+1.
    pub right: Vec<SMatrix<f64, B, B>>,
    /// `left[i]` stands in row i+1, column i; empty where it is the transpose of `right[i]`.
    pub left: Vec<SMatrix<f64, B, B>>,
}

impl<const B: usize> BlockTridiagonal<B> {
    /// Zero, with `rows` block rows.
    pub fn zero(rows: usize) -> Self {
        BlockTridiagonal {
            diagonal: vec![SMatrix::zeros(); rows],
            right: vec![SMatrix::zeros(); rows.saturating_sub(1)],
            left: Vec::new(),
        }
    }

    /// Zero, with `rows` block rows and blocks of its own to the left.
    pub fn unsymmetric(rows: usize) -> Self {
        BlockTridiagonal {
            left: vec![SMatrix::zeros(); rows.saturating_sub(1)],
            ..BlockTridiagonal::zero(rows)
        }
    }

    /// Whether it is symmetric.
    pub fn is_symmetric(&self) -> bool {
        self.left.is_empty()
    }

    /// Number of block rows.
    pub fn rows(&self) -> usize {
        self.diagonal.len()
    }

    /// `out = A x`.
    pub fn multiply(&self, x: &[SVector<f64, B>], out: &mut [SVector<f64, B>]) {
        for (i, row) in out.iter_mut().enumerate() {
            *row = self.diagonal[i] * x[i];
            if i > 0 {
                *row += match self.left.get(i - 1) {
                    Some(left) => left * x[i - 1],
                    None => self.right[i - 1].tr_mul(&x[i - 1]),
                };
            }
            if i + 1 < self.rows() {
                *row += self.right[i] * x[i + 1];
            }
        }
    }

    /// `xᵀ A x` of a symmetric matrix.
    pub fn quadratic(&self, x: &[SVector<f64, B>]) -> f64 {
        let mut sum = 0.0;
        for (i, value) in x.iter().enumerate() {
            sum += value.dot(&(self.diagonal[i] * value));
            if i + 1 < self.rows() {
                sum += 2.0 * value.dot(&(self.right[i] * x[i + 1]));
            }
        }
        sum
    }
}

/// How a block row was eliminated.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Row {
    Alone,
    /// First of a pair; the pair's number.
    FirstOfPair(usize),
    SecondOfPair,
}

/// Factor of a [`BlockTridiagonal`], to be refilled again and again without allocating.
#[derive(Clone, Debug)]
pub struct Factorisation<const B: usize> {
    rows: Vec<Row>,
    pivots: Vec<SymmetricFactor<B>>,
    /// X_i of equation (1); for the second row of a pair, the lower half of the pair's X.
    ahead: Vec<SMatrix<f64, B, B>>,
    /// Upper half of a pair's X, at the pair's first row.
    ahead_of_first: Vec<SMatrix<f64, B, B>>,
    pairs: PairPivots,
    /// Number of negative eigenvalues.
    pub negatives: u32,
}

/// Dense pivots of two block rows, in flat storage.
#[derive(Clone, Debug, Default)]
struct PairPivots {
    entries: Vec<f64>,
    kinds: Vec<Pivot>,
    order: Vec<u8>,
    count: usize,
}

impl<const B: usize> Factorisation<B> {
    /// Room for `rows` block rows.
    pub fn with_rows(rows: usize) -> Self {
        let most_pairs = rows / 2 + 1;
        Factorisation {
            rows: vec![Row::Alone; rows],
            pivots: vec![SymmetricFactor::identity(); rows],
            ahead: vec![SMatrix::zeros(); rows],
            ahead_of_first: vec![SMatrix::zeros(); rows],
            pairs: PairPivots {
                entries: vec![0.0; most_pairs * 4 * B * B],
                kinds: vec![Pivot::Single; most_pairs * 2 * B],
                order: vec![0; most_pairs * 2 * B],
                count: 0,
            },
            negatives: 0,
        }
    }

    /// Factors `matrix`.
    pub fn factor(&mut self, matrix: &BlockTridiagonal<B>) {
        let n = matrix.rows();
        self.pairs.count = 0;
        self.negatives = 0;
        let mut block = matrix.diagonal[0];
        let mut i = 0;
        loop {
            let pivot = SymmetricFactor::new(&block);
            if i + 1 == n {
                self.negatives += pivot.negatives;
                self.pivots[i] = pivot;
                self.rows[i] = Row::Alone;
                return;
            }
            let coupling = &matrix.right[i];
            let mut ahead = coupling.transpose();
            pivot.solve_rows(&mut ahead);
            let ahead = ahead.transpose();
            let taken = coupling.tr_mul(&ahead);
            let alone = taken.amax() / (matrix.diagonal[i + 1].amax() + coupling.amax());
            if alone > GROWTH {
                let found = self.factor_pair(i, &block, coupling, &matrix.diagonal[i + 1]);
                if i + 2 == n {
                    self.negatives += found.negatives;
                    return;
                }
                let (coupling, next) = (&matrix.right[i + 1], &matrix.diagonal[i + 2]);
                let taken = self.pair_ahead(i, coupling);
                let together = taken.amax() / (next.amax() + coupling.amax());
                // Where the pair is nearer to singular than the first row alone, that row is the
                // lesser evil, and its neighbour makes a better pair.
                if together <= alone {
                    self.negatives += found.negatives;
                    block = next - taken;
                    i += 2;
                    continue;
                }
                self.pairs.count -= 1;
            }
            self.negatives += pivot.negatives;
            self.pivots[i] = pivot;
            self.rows[i] = Row::Alone;
            self.ahead[i] = ahead;
            block = matrix.diagonal[i + 1] - taken;
            i += 1;
        }
    }

    /// Equation (2): the pivot [[D, C], [Cᵀ, A]] of rows i and i+1.
    fn factor_pair(
        &mut self,
        i: usize,
        block: &SMatrix<f64, B, B>,
        coupling: &SMatrix<f64, B, B>,
        next: &SMatrix<f64, B, B>,
    ) -> Found {
        let (size, number) = (2 * B, self.pairs.count);
        let entries = &mut self.pairs.entries[number * size * size..(number + 1) * size * size];
        for column in 0..B {
            for row in 0..B {
                entries[row + column * size] = block[(row, column)];
                entries[B + row + column * size] = coupling[(column, row)];
                entries[row + (B + column) * size] = coupling[(row, column)];
                entries[B + row + (B + column) * size] = next[(row, column)];
            }
        }
        let places = number * size..(number + 1) * size;
        let found = pivots::factor(
            entries,
            size,
            &mut self.pairs.kinds[places.clone()],
            &mut self.pairs.order[places],
        );
        self.pairs.count += 1;
        self.rows[i] = Row::FirstOfPair(number);
        self.rows[i + 1] = Row::SecondOfPair;
        found
    }

    /// X of a pair at rows i, i+1, from the coupling of row i+1 to i+2; returns Cᵀ X.
    fn pair_ahead(&mut self, i: usize, coupling: &SMatrix<f64, B, B>) -> SMatrix<f64, B, B> {
        for column in 0..B {
            let mut upper = SVector::<f64, B>::zeros();
            let mut lower: SVector<f64, B> = coupling.column(column).into_owned();
            self.solve_pair(i, &mut upper, &mut lower);
            self.ahead_of_first[i].set_column(column, &upper);
            self.ahead[i + 1].set_column(column, &lower);
        }
        coupling.tr_mul(&self.ahead[i + 1])
    }

    fn solve_pair(&self, i: usize, upper: &mut SVector<f64, B>, lower: &mut SVector<f64, B>) {
        let Row::FirstOfPair(number) = self.rows[i] else {
            return;
        };
        let size = 2 * B;
        let mut both = SMatrix::<f64, B, 2>::zeros();
        both.set_column(0, upper);
        both.set_column(1, lower);
        let places = number * size..(number + 1) * size;
        pivots::solve(
            &self.pairs.entries[number * size * size..(number + 1) * size * size],
            size,
            &self.pairs.kinds[places.clone()],
            &self.pairs.order[places],
            both.as_mut_slice(),
        );
        upper.copy_from(&both.column(0));
        lower.copy_from(&both.column(1));
    }

    /// Solves `A x = b` in place.
    pub fn solve(&self, b: &mut [SVector<f64, B>]) {
        let n = self.rows.len();
        for i in 0..n {
            match self.rows[i] {
                Row::Alone => {
                    if i + 1 < n {
                        let carried = self.ahead[i].tr_mul(&b[i]);
                        b[i + 1] -= carried;
                    }
                    self.pivots[i].solve(&mut b[i]);
                }
                Row::FirstOfPair(_) => {
                    if i + 2 < n {
                        let carried = self.ahead_of_first[i].tr_mul(&b[i])
                            + self.ahead[i + 1].tr_mul(&b[i + 1]);
                        b[i + 2] -= carried;
                    }
                    let (first, second) = b.split_at_mut(i + 1);
                    self.solve_pair(i, &mut first[i], &mut second[0]);
                }
                Row::SecondOfPair => {}
            }
        }
        for i in (0..n).rev() {
            match self.rows[i] {
                Row::Alone if i + 1 < n => {
                    let behind = self.ahead[i] * b[i + 1];
                    b[i] -= behind;
                }
                Row::FirstOfPair(_) if i + 2 < n => {
                    let next = b[i + 2];
                    b[i] -= self.ahead_of_first[i] * next;
                    b[i + 1] -= self.ahead[i + 1] * next;
                }
                _ => {}
            }
        }
    }
}
