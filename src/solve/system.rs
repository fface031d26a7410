//! What a system must offer to be solved.

use super::{BlockTridiagonal, Unknowns};
use nalgebra::SVector;

/// Residual `r(u, λ) = g(u) − λ q` and tangent `∂g/∂u` at a state, the links' inner unknowns
/// already eliminated.
#[derive(Clone, Debug)]
pub struct Assembled<const B: usize> {
    /// Condensed tangent, one block row a node.
    pub tangent: BlockTridiagonal<B>,
    /// Condensed residual.
    pub residual: Vec<SVector<f64, B>>,
    /// Negative eigenvalues that the eliminated inner unknowns take with them, less those they
    /// have in every stable state.
    pub inner_negatives: i64,
}

impl<const B: usize> Assembled<B> {
    /// Zero, for a chain of `links` links.
    pub fn zero(links: usize) -> Self {
        Assembled {
            tangent: BlockTridiagonal::zero(links + 1),
            residual: vec![SVector::zeros(); links + 1],
            inner_negatives: 0,
        }
    }

    /// Zero, for `system`.
    pub fn of<const I: usize>(system: &impl System<B, I>) -> Self {
        let mut assembled = Assembled::zero(system.links());
        if !system.is_symmetric() {
            assembled.tangent = BlockTridiagonal::unsymmetric(system.links() + 1);
        }
        assembled
    }
}

/// A system of equations `g(u) = λ q` along a chain of links, whose links keep `I` inner unknowns to
/// themselves and share `B` at each node.
///
/// Unknowns are expected of order one, so that one norm fits them all.
pub trait System<const B: usize, const I: usize> {
    /// Number of links.
    fn links(&self) -> usize;

    /// Unknowns on the side of a state.
    fn side(&self) -> usize {
        0
    }

    /// Unknowns of this system, all zero.
    fn zero(&self) -> Unknowns<B, I> {
        Unknowns {
            side: vec![0.0; self.side()],
            ..Unknowns::zero(self.links())
        }
    }

    /// Whether the tangent is symmetric. Where it is not, only the sign of its determinant is
    /// known, and `negatives` is 0 or 1.
    fn is_symmetric(&self) -> bool {
        true
    }

    /// Whether one-sided laws put kinks into its paths.
    fn has_kinks(&self) -> bool {
        false
    }

    /// Takes `state` as the one from which the next is reached, for laws that depend on the way
    /// (friction sticks to where it was). Does not allocate.
    fn depart(&mut self, _state: &Unknowns<B, I>) {}

    /// Told before each assembly of an iteration, counted from 1.
    fn iterating(&mut self, _iteration: usize) {}

    /// Whether the last assembly took other one-sided laws for valid than the one before: the
    /// iteration is then not at its end, however small the step.
    fn changed(&self) -> bool {
        false
    }

    /// A number for the one-sided laws that held in the last assembly: over a kink it changes.
    fn regime(&self) -> u64 {
        0
    }

    /// Takes the kink for passed that lies between `state`, last assembled, and `beyond`, a state
    /// extrapolated from it: the next assembly is that of the path behind the kink. Gives the share of the
    /// way at which it lies; `None` where there is none.
    fn pass_kink(&mut self, _state: &Unknowns<B, I>, _beyond: &Unknowns<B, I>) -> Option<f64> {
        None
    }

    /// Whether the path behind the kinks just passed at `state` can go in `direction`; `None` where that
    /// is not known, or neither way.
    fn leads_on(&self, _state: &Unknowns<B, I>, _direction: &Unknowns<B, I>) -> Option<bool> {
        None
    }

    /// Sets how far contacts that come and go give way, without friction, to find a state to begin
    /// with: 1 leaves them out of account, shares below let them be entered by that share of what
    /// `state`, found without them, does. `None`: they are as they are, and friction acts.
    fn ease(&mut self, _share: Option<f64>, _state: &Unknowns<B, I>) {}

    /// Evaluates residual and tangent at `state` under the load `load`, and remembers what
    /// [`System::recover`] needs. Does not allocate.
    fn assemble(&mut self, state: &Unknowns<B, I>, load: f64, out: &mut Assembled<B>);

    /// The load pattern q.
    fn load_pattern(&self) -> &[SVector<f64, B>];

    /// Fills the inner part of `step` that belongs to its node part: at the state last assembled,
    /// with that state's inner residual (a Newton step) or without (a direction).
    fn recover(&self, step: &mut Unknowns<B, I>, with_residual: bool);

    /// A load of the size that matters: λ is measured in it along a path.
    fn load_scale(&self) -> f64;
}
