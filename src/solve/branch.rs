//! Singular points and the branch that leaves there.

use super::newton::Constraint;
use super::path::complete;
use super::{Newton, NotConverged, PathPoint, System, Unknowns, unknowns::dot};
use nalgebra::SVector;

/// A singular point with the direction in which it is singular.
#[derive(Clone, Debug)]
pub struct SingularPoint<const B: usize, const I: usize> {
    /// Load at which the tangent is singular.
    pub load: f64,
    /// State there.
    pub state: Unknowns<B, I>,
    /// Null direction, of unit norm `Σ|node|²/n = 1`.
    pub mode: Unknowns<B, I>,
    /// Eigenvalue left over along the mode, against the largest entry of the tangent.
    pub leftover: f64,
}

/// Direction in which the tangent at `state`, `load` is nearest to singular, with its eigenvalue
/// `K φ = μ φ`: inverse iteration with the factor of the indefinite tangent. Unit norm
/// `Σ|node|²/n = 1`.
pub fn null_direction<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    state: &Unknowns<B, I>,
    load: f64,
) -> (Unknowns<B, I>, f64) {
    newton.evaluate(system, state, load);
    let mut direction: Unknowns<B, I> = Unknowns::zero(system.links());
    // A start with a share of every mode, the same each time.
    let golden = 0.618_033_988_749_895;
    let mut seed = 0.5;
    for node in &mut direction.nodes {
        for value in node.iter_mut() {
            seed = (seed + golden) % 1.0;
            *value = seed + 0.25;
        }
    }
    let count = direction.nodes.len() as f64;
    let mut eigenvalue = f64::NAN;
    for _ in 0..60 {
        newton.solve_linear(&mut direction.nodes);
        let length = (dot(&direction.nodes, &direction.nodes) / count).sqrt();
        direction.nodes.iter_mut().for_each(|v| *v /= length);
        let rayleigh = newton.assembled.tangent.quadratic(&direction.nodes) / count;
        let settled = (rayleigh - eigenvalue).abs() <= 1e-12 * rayleigh.abs();
        eigenvalue = rayleigh;
        if settled {
            break;
        }
    }
    system.recover(&mut direction, false);
    (direction, eigenvalue)
}

/// The first point of the branch that leaves `from` along `mode`, at the signed `amplitude`.
///
/// # Errors
/// Where Newton does not converge.
pub fn switch_at<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    from: &PathPoint<B, I>,
    mode: &Unknowns<B, I>,
    amplitude: f64,
) -> Result<PathPoint<B, I>, NotConverged> {
    let weight = amplitude.signum() / from.state.nodes.len() as f64;
    let row: Vec<SVector<f64, B>> = mode.nodes.iter().map(|t| t * weight).collect();
    let mut state = from.state.clone();
    state.add(amplitude, mode);
    let mut load = from.load;
    let constraint = Constraint {
        row: &row,
        d: 0.0,
        from: &from.state,
        from_load: from.load,
        distance: amplitude.abs(),
    };
    newton.solve_constrained(system, &mut state, &mut load, &constraint)?;
    Ok(complete(system, newton, state, load, &row, 0.0))
}
