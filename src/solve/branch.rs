//! Branch points: where another path crosses the one followed.
//!
//! Between two points of a path the number of negative eigenvalues changes by one at a limit point,
//! together with the sign of the load's direction; any other change is a branch point, or several.
//! The other path leaves a branch point of a symmetric system along the null direction of the
//! tangent.
//!
//! Source: Seydel, Practical Bifurcation and Stability Analysis, branch switching (from memory).

use super::{Located, Newton, PathPoint, System, Unknowns, locate, unknowns::dot};

/// Direction in which the tangent at `state`, `load` is nearest to singular, with its eigenvalue
/// `K φ = μ φ`: inverse iteration with the factor of the indefinite tangent. Unit norm
/// `Σ|node|²/n = 1`. Only the components that `taking_part` start with something: where the tangent
/// does not couple the others to them, these stay zero.
pub fn null_direction<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    state: &Unknowns<B, I>,
    load: f64,
    taking_part: [bool; B],
) -> (Unknowns<B, I>, f64) {
    newton.evaluate(system, state, load);
    let mut direction: Unknowns<B, I> = system.zero();
    // A start with a share of every mode, the same each time.
    let golden = 0.618_033_988_749_895;
    let mut seed = 0.5;
    for node in &mut direction.nodes {
        for (value, takes_part) in node.iter_mut().zip(taking_part) {
            seed = (seed + golden) % 1.0;
            *value = if takes_part { seed + 0.25 } else { 0.0 };
        }
    }
    let count = direction.nodes.len() as f64;
    let mut eigenvalue = f64::NAN;
    for _ in 0..60 {
        newton.solve_linear(&mut direction.nodes);
        let length = (dot(&direction.nodes, &direction.nodes) / count).sqrt();
        direction.nodes.iter_mut().for_each(|v| *v /= length);
        let rayleigh = newton.assembled.tangent.quadratic(&direction.nodes) / count;
        let settled = (rayleigh - eigenvalue).abs() <= 1e-9 * rayleigh.abs();
        eigenvalue = rayleigh;
        if settled {
            break;
        }
    }
    system.recover(&mut direction, false);
    (direction, eigenvalue)
}

/// Whether the path crosses another between these two points: the number of negative eigenvalues
/// changes otherwise than by the one of a limit point, where the load turns.
pub fn crosses_another<const B: usize, const I: usize>(
    before: &PathPoint<B, I>,
    after: &PathPoint<B, I>,
) -> bool {
    let turned = (before.load_direction >= 0.0) != (after.load_direction >= 0.0);
    before.negatives.abs_diff(after.negatives) != u32::from(turned)
}

/// A branch point and the direction in which the other path leaves it.
#[derive(Clone, Debug)]
pub struct BranchPoint<const B: usize, const I: usize> {
    /// The point, with tangent and pivot count of the path point before it.
    pub located: Located<B, I>,
    /// Null direction of the tangent matrix, of unit norm `Σ|node|²/n = 1`.
    pub mode: Unknowns<B, I>,
}

impl<const B: usize, const I: usize> BranchPoint<B, I> {
    /// The point with its direction turned onto the other path, to be followed from there.
    pub fn turned(&self, sign: f64) -> PathPoint<B, I> {
        let mut point = self.located.point.clone();
        point.direction.copy_from(&self.mode);
        point.direction.scale(sign);
        point.load_direction = 0.0;
        point
    }
}

/// The branch point between `points[after]` and the next, to `tolerance` along the path; where
/// several lie together, one direction of theirs is given. `None` where no other path is crossed.
pub fn branch_point<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    points: &[PathPoint<B, I>],
    after: usize,
    tolerance: f64,
) -> Option<BranchPoint<B, I>> {
    let before = points.get(after)?;
    let mut located = locate(system, newton, points, after, tolerance, |point| {
        if crosses_another(before, point) {
            -1.0
        } else {
            1.0
        }
    })?;
    let (mode, _) = null_direction(
        system,
        newton,
        &located.point.state,
        located.point.load,
        [true; B],
    );
    // At the point itself two tangents meet and the count is undecided: take what the path had.
    located.point.direction.copy_from(&before.direction);
    located.point.load_direction = before.load_direction;
    located.point.negatives = before.negatives;
    Some(BranchPoint { located, mode })
}
