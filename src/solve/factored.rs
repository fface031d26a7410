//! The factor of a tangent, symmetric or not.

use super::{BlockTridiagonal, Factorisation, GeneralFactor};
use nalgebra::SVector;

/// Factor of a tangent.
#[derive(Clone, Debug)]
pub enum Factored<const B: usize> {
    /// Symmetric, with the number of negative eigenvalues.
    Symmetric(Factorisation<B>),
    /// Not symmetric, with the sign of the determinant.
    General(GeneralFactor<B>),
}

impl<const B: usize> Factored<B> {
    /// Room for `rows` block rows.
    pub fn with_rows(rows: usize, symmetric: bool) -> Self {
        if symmetric {
            Factored::Symmetric(Factorisation::with_rows(rows))
        } else {
            Factored::General(GeneralFactor::with_rows(rows))
        }
    }

    /// Factors `matrix`.
    pub fn factor(&mut self, matrix: &BlockTridiagonal<B>) {
        match self {
            Factored::Symmetric(factor) => factor.factor(matrix),
            Factored::General(factor) => factor.factor(matrix),
        }
    }

    /// Solves `A x = b` in place.
    pub fn solve(&self, b: &mut [SVector<f64, B>]) {
        match self {
            Factored::Symmetric(factor) => factor.solve(b),
            Factored::General(factor) => factor.solve(b),
        }
    }

    /// Solves `Aᵀ x = b` in place.
    pub fn solve_transposed(&self, b: &mut [SVector<f64, B>]) {
        match self {
            Factored::Symmetric(factor) => factor.solve(b),
            Factored::General(factor) => factor.solve_transposed(b),
        }
    }

    /// Solves `A x = b` in place and improves x once with the residual of `matrix`.
    pub fn solve_refined(
        &self,
        matrix: &BlockTridiagonal<B>,
        b: &mut [SVector<f64, B>],
        right: &mut [SVector<f64, B>],
        product: &mut [SVector<f64, B>],
    ) {
        right.copy_from_slice(b);
        self.solve(b);
        matrix.multiply(b, product);
        for (mine, its) in right.iter_mut().zip(product.iter()) {
            *mine -= its;
        }
        self.solve(right);
        for (x, correction) in b.iter_mut().zip(right.iter()) {
            *x += correction;
        }
    }

    /// Negative eigenvalues, with those (`taken`, negative: to be left out) of unknowns eliminated
    /// before; of a matrix that is not symmetric whether their number is odd.
    pub fn negatives(&self, taken: i64) -> u32 {
        match self {
            Factored::Symmetric(factor) => {
                u32::try_from(i64::from(factor.negatives) + taken).unwrap_or(0)
            }
            Factored::General(factor) => {
                u32::from((i64::from(factor.negative) + taken).rem_euclid(2) == 1)
            }
        }
    }
}
