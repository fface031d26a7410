//! Events: a function along the path whose sign change is bracketed and refined. A guide that is
//! touched, a limit that is reached, a limit point and a branch point are all the same here.

use super::{Newton, PathPoint, System, path::at_distance};

/// Evaluations before the bracket is returned as it is.
const MOST_EVALUATIONS: usize = 80;

/// An event found between two points of a path.
#[derive(Clone, Debug)]
pub struct Located<const B: usize, const I: usize> {
    /// The point, on the far side of the sign change or exactly on it.
    pub point: PathPoint<B, I>,
    /// Index of the path point before it.
    pub after: usize,
    /// Its distance along the tangent of that point.
    pub distance: f64,
    /// Width of the last bracket along the path.
    pub bracket: f64,
    /// Whether the bracket shrank to the tolerance asked for.
    pub converged: bool,
}

/// Finds where `function` changes sign between `points[after]` and the next point, to a bracket of
/// `tolerance` along the path. `None` where it does not change sign there.
///
/// The points between are solutions, found from `points[after]` as the next point was. False
/// position with Illinois' rule, bisection where that is slow or the function jumps.
pub fn locate<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    points: &[PathPoint<B, I>],
    after: usize,
    tolerance: f64,
    function: impl Fn(&PathPoint<B, I>) -> f64,
) -> Option<Located<B, I>> {
    let (base, next) = (points.get(after)?, points.get(after + 1)?);
    let before = after.checked_sub(1).and_then(|i| points.get(i));
    let (mut low, mut high) = (0.0, base.distance);
    let (mut at_low, mut at_high) = (function(base), function(next));
    let changes = at_low * at_high <= 0.0 && at_low != 0.0;
    if !changes {
        return None;
    }
    let mut best = next.clone();
    let mut side = 0;
    for evaluation in 0..MOST_EVALUATIONS {
        if at_high == 0.0 || high - low <= tolerance {
            break;
        }
        let middle = 0.5 * (low + high);
        let mut at = if evaluation % 3 == 2 {
            middle
        } else {
            (low * at_high - high * at_low) / (at_high - at_low)
        };
        if !(at > low && at < high) {
            at = middle;
        }
        if at <= low || at >= high {
            break;
        }
        let Ok(point) = at_distance(system, newton, before, base, at) else {
            return Some(located(best, after, high, high - low, tolerance));
        };
        let value = function(&point);
        if value * at_low > 0.0 {
            (low, at_low) = (at, value);
            if side == 1 {
                at_high *= 0.5;
            }
            side = 1;
        } else {
            (high, at_high) = (at, value);
            best = point;
            if side == -1 {
                at_low *= 0.5;
            }
            side = -1;
        }
    }
    let width = if at_high == 0.0 { 0.0 } else { high - low };
    Some(located(best, after, high, width, tolerance))
}

fn located<const B: usize, const I: usize>(
    mut point: PathPoint<B, I>,
    after: usize,
    distance: f64,
    bracket: f64,
    tolerance: f64,
) -> Located<B, I> {
    point.distance = 0.0;
    Located {
        point,
        after,
        distance,
        bracket,
        // A bracket of a few units in the last place of the distances themselves is all there is.
        converged: bracket <= tolerance.max(1e-14),
    }
}
