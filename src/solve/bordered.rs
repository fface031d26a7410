//! The bordered solve: a matrix with one more row and column.
//!
//! ```text
//! [ A   b ] [x]   [f]
//! [ cᵀ  d ] [y] = [g]                                                              (1)
//! ```
//!
//! stays regular where A is singular, at a limit point, but block elimination with the factor of A
//! alone loses digits there. Govaerts and Pryce's mixed elimination (BEMW) uses the factor three
//! times, the first pass for y from the left null space, the second correcting x and y, and is
//! backward stable for A of rank deficiency one.
//!
//! Source: Govaerts & Pryce, Numer. Math. 63 (1993) 155–169 (from memory; tested).

use super::{Factored, unknowns::dot};
use nalgebra::SVector;

/// Work space of bordered solves.
#[derive(Clone, Debug)]
pub struct Bordered<const B: usize> {
    left: Vec<SVector<f64, B>>,
    right: Vec<SVector<f64, B>>,
    rest: Vec<SVector<f64, B>>,
    left_delta: f64,
    right_delta: f64,
}

impl<const B: usize> Bordered<B> {
    /// Room for `rows` block rows.
    pub fn with_rows(rows: usize) -> Self {
        Bordered {
            left: vec![SVector::zeros(); rows],
            right: vec![SVector::zeros(); rows],
            rest: vec![SVector::zeros(); rows],
            left_delta: 1.0,
            right_delta: 1.0,
        }
    }

    /// Prepares for the border `b`, `c`, `d` around the matrix of `factor`.
    pub fn prepare(
        &mut self,
        factor: &Factored<B>,
        b: &[SVector<f64, B>],
        c: &[SVector<f64, B>],
        d: f64,
    ) {
        self.left.copy_from_slice(c);
        factor.solve_transposed(&mut self.left);
        self.left_delta = d - dot(&self.left, b);
        self.right.copy_from_slice(b);
        factor.solve(&mut self.right);
        self.right_delta = d - dot(c, &self.right);
    }

    /// Solves (1) for the right-hand side (f, g) in place of `f`; returns y.
    pub fn solve(
        &mut self,
        factor: &Factored<B>,
        b: &[SVector<f64, B>],
        c: &[SVector<f64, B>],
        d: f64,
        f: &mut [SVector<f64, B>],
        g: f64,
    ) -> f64 {
        let y1 = (g - dot(&self.left, f)) / self.left_delta;
        for ((rest, f), b) in self.rest.iter_mut().zip(f.iter()).zip(b) {
            *rest = f - b * y1;
        }
        let g1 = g - d * y1;
        factor.solve(&mut self.rest);
        let y2 = (g1 - dot(c, &self.rest)) / self.right_delta;
        for ((x, rest), right) in f.iter_mut().zip(&self.rest).zip(&self.right) {
            *x = rest - right * y2;
        }
        y1 + y2
    }
}
