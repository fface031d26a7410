//! Following the load path of the imperfect column to solid, onto another branch where the path
//! loses its stability at one.

use super::observe::Solved;
use crate::column::{Column, ColumnState};
use crate::result::Failure;
use crate::setup::Setup;
use crate::solve::{Newton, Outcome, PathSettings, branch_point, crosses_another, follow};

/// Rotation of a section beyond which a path is not followed: long past any use of the spring.
const LARGEST_ROTATION: f64 = 1.5;
/// Width of an event's last bracket along the path, of order-one unknowns.
pub(super) const BRACKET: f64 = 1e-11;
/// First step on a branch: so short that the slope there is that at the branch point but for its
/// square, and so long that the slope is far above round-off.
const FIRST_ON_BRANCH: f64 = 2e-3;
/// Branch points turned at before the path is left as it is.
const MOST_BRANCHES: usize = 4;

/// How following ended.
pub(super) struct Walked {
    /// Branch points: their index, and the point with the tangent of the path that led there.
    pub branches: Vec<(usize, Solved)>,
    /// Why it did not end at solid.
    pub failure: Option<Failure>,
}

/// Follows from the one point given and appends.
pub(super) fn walk(
    setup: &Setup,
    column: &mut Column,
    newton: &mut Newton<3, 5>,
    points: &mut Vec<Solved>,
) -> Walked {
    let last = column.elements();
    let top = points[0].state.nodes[last][0];
    let solid = setup.spring.solid_deflection() / column.scale.length;
    let mut settings = PathSettings::default();
    let mut branches: Vec<(usize, Solved)> = Vec::new();
    loop {
        let mut crossed = false;
        let from = points.len();
        let (outcome, _) = follow(column, newton, points, &settings, |points| {
            let n = points.len();
            if n > from {
                crossed = crosses_another(&points[n - 2], &points[n - 1])
                    && points[n - 1].negatives > points[n - 2].negatives;
            }
            let now = &points[n - 1];
            crossed
                || top - now.state.nodes[last][0] >= solid
                || now
                    .state
                    .nodes
                    .iter()
                    .any(|node| node[2].abs() > LARGEST_ROTATION)
        });
        match outcome {
            Outcome::Stopped if crossed && branches.len() < MOST_BRANCHES => {
                let after = points.len() - 2;
                let Some(found) = branch_point(column, newton, points, after, BRACKET) else {
                    return Walked {
                        branches,
                        failure: None,
                    };
                };
                points.pop();
                points[after].distance = found.located.distance;
                branches.push((points.len(), found.located.point.clone()));
                points.push(found.turned(sideways(&found.mode).signum()));
                settings.first_step = FIRST_ON_BRANCH;
            }
            Outcome::Stopped => {
                return Walked {
                    branches,
                    failure: None,
                };
            }
            Outcome::TooLong | Outcome::Lost(_) => {
                return Walked {
                    branches,
                    failure: Some(failure(outcome, &settings)),
                };
            }
        }
    }
}

/// Largest sideways part of a direction, with its sign.
fn sideways(direction: &ColumnState) -> f64 {
    direction
        .nodes
        .iter()
        .map(|node| node[1])
        .max_by(|a, b| a.abs().total_cmp(&b.abs()))
        .unwrap_or(0.0)
}

fn failure(outcome: Outcome, settings: &PathSettings) -> Failure {
    let cause = match outcome {
        Outcome::Lost(failed) => format!(
            "Newton did not converge ({} iterations, last step {:.1e}); the step was halved down \
             to {:.0e}",
            failed.iterations, failed.last_step, settings.smallest_step
        ),
        _ => format!(
            "the path did not end within {} points",
            settings.most_points
        ),
    };
    Failure {
        what: "load path of the imperfect column".into(),
        cause,
        last_good_deflection_m: None,
    }
}
