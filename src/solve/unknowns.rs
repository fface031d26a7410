//! The unknowns of a system: those of the chain's nodes, and those that each link keeps to itself.

use nalgebra::SVector;

/// Unknowns: `B` at each node of the chain, `I` inside each link between two nodes. The same
/// type serves for a state and for a direction.
#[derive(Clone, Debug, PartialEq)]
pub struct Unknowns<const B: usize, const I: usize> {
    /// One block a node.
    pub nodes: Vec<SVector<f64, B>>,
    /// One block a link; one less than there are nodes.
    pub inner: Vec<SVector<f64, I>>,
    /// Further unknowns of links that come and go (forces of one-sided contacts); eliminated with
    /// the inner ones. Empty where there are none.
    pub side: Vec<f64>,
}

impl<const B: usize, const I: usize> Unknowns<B, I> {
    /// All zero, for a chain of `links` links.
    pub fn zero(links: usize) -> Self {
        Unknowns {
            nodes: vec![SVector::zeros(); links + 1],
            inner: vec![SVector::zeros(); links],
            side: Vec::new(),
        }
    }

    /// Takes over the values of `other`, of the same size, without allocating.
    pub fn copy_from(&mut self, other: &Self) {
        self.nodes.copy_from_slice(&other.nodes);
        self.inner.copy_from_slice(&other.inner);
        self.side.copy_from_slice(&other.side);
    }

    /// Adds `factor` times `direction`.
    pub fn add(&mut self, factor: f64, direction: &Self) {
        for (mine, its) in self.nodes.iter_mut().zip(&direction.nodes) {
            *mine += *its * factor;
        }
        for (mine, its) in self.inner.iter_mut().zip(&direction.inner) {
            *mine += *its * factor;
        }
        for (mine, its) in self.side.iter_mut().zip(&direction.side) {
            *mine += its * factor;
        }
    }

    /// Multiplies everything by `factor`.
    pub fn scale(&mut self, factor: f64) {
        self.nodes.iter_mut().for_each(|v| *v *= factor);
        self.inner.iter_mut().for_each(|v| *v *= factor);
        self.side.iter_mut().for_each(|v| *v *= factor);
    }
}

/// Scalar product of two lists of node blocks.
#[inline]
pub(super) fn dot<const B: usize>(a: &[SVector<f64, B>], b: &[SVector<f64, B>]) -> f64 {
    a.iter().zip(b).map(|(x, y)| x.dot(y)).sum()
}
