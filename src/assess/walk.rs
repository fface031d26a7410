//! Following the load path of the imperfect column to solid, onto another branch where the path
//! loses its stability at one.

use super::observe::Solved;
use crate::column::{Column, ColumnState};
use crate::result::Failure;
use crate::setup::Setup;
use crate::solve::{Newton, Outcome, PathSettings, System, branch_point, crosses_another, follow};

/// How far a path is followed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Reach {
    /// Largest rotation of a section, rad: long past any use of the spring.
    rotation: f64,
    /// Shortening, in solid deflections.
    solid: f64,
}

impl Reach {
    /// To solid.
    pub const SOLID: Reach = Reach {
        rotation: 1.5,
        solid: 1.0,
    };
    /// A little farther, so that what another mesh finds near its end is found too.
    pub const FARTHER: Reach = Reach {
        rotation: 1.6,
        solid: 1.03,
    };
}

/// Width of an event's last bracket along the path, of order-one unknowns.
pub(super) const BRACKET: f64 = 1e-11;
/// Share of the load scale by which a path may go back into tension before it is left.
const PULLED: f64 = 0.02;
/// Force, in those of the straight spring pressed solid, at which a path with contacts is left.
const JAMMED: f64 = 2.0;
/// Newton iterations of a path, those of refused steps among them: beyond, it leads nowhere.
const MOST_ITERATIONS: usize = 6000;
/// Points after the largest travel without regaining it before a path with contacts is left.
const MOST_AFTER_LOSS: usize = 120;
/// First step on a branch: so short that the slope there is that at the branch point but for its
/// square, and so long that the slope is far above round-off.
const FIRST_ON_BRANCH: f64 = 2e-3;
/// Branch points turned at before the path is left as it is.
const MOST_BRANCHES: usize = 4;

/// How a path ended.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum PathEnd {
    /// The spring is solid.
    Solid,
    /// A section has turned so far that the path is of no use any more.
    BowedOver,
    /// It could not be followed further.
    Lost(Failure),
}

/// A path as followed.
pub(super) struct Walked {
    /// Branch points: their index, and the point with the tangent of the path that led there.
    pub branches: Vec<(usize, Solved)>,
    /// How it ended.
    pub end: PathEnd,
}

/// Follows from the one point given and appends; at a branch point to the side of `branch`.
pub(super) fn walk(
    setup: &Setup,
    column: &mut Column,
    newton: &mut Newton<3, 5>,
    points: &mut Vec<Solved>,
    reach: Reach,
    branch: f64,
) -> Walked {
    let last = column.elements();
    let top = points[0].state.nodes[last][0];
    let solid = reach.solid * setup.spring.solid_deflection() / column.scale.length;
    let column_scale = column.load_scale();
    let column_force = column.scale.force;
    let solid_force = setup.spring.rate() * setup.spring.solid_deflection();
    let bowed_over = |point: &Solved| {
        let nodes = &point.state.nodes;
        // Or pulled, past the loss of its load: a spring is not.
        nodes.iter().any(|node| node[2].abs() > reach.rotation)
            || point.load < -PULLED * column_scale
    };
    let mut settings = PathSettings {
        most_iterations: MOST_ITERATIONS,
        ..PathSettings::default()
    };
    let has_kinks = column.has_kinks();
    let mut branches: Vec<(usize, Solved)> = Vec::new();
    let end = loop {
        let mut crossed = false;
        let mut strayed = false;
        let mut jammed = false;
        let from = points.len();
        let (outcome, _) = follow(column, newton, points, &settings, |points| {
            let n = points.len();
            if n > from {
                crossed = crosses_another(&points[n - 2], &points[n - 1])
                    && points[n - 1].negatives > points[n - 2].negatives;
            }
            let lowest = points
                .iter()
                .enumerate()
                .min_by(|a, b| height(a.1, last).total_cmp(&height(b.1, last)));
            strayed = has_kinks && lowest.is_some_and(|(at, _)| at + MOST_AFTER_LOSS < n);
            let force = points[n - 1].load * column_force;
            jammed = has_kinks && force > JAMMED * solid_force;
            crossed
                || jammed
                || strayed
                || top - height(&points[n - 1], last) >= solid
                || bowed_over(&points[n - 1])
        });
        let lost = |cause: String| PathEnd::Lost(failure(cause));
        match outcome {
            Outcome::Stopped if crossed => {
                if branches.len() == MOST_BRANCHES {
                    break lost(format!("more than {MOST_BRANCHES} branch points were met"));
                }
                let after = points.len() - 2;
                let Some(found) = branch_point(column, newton, points, after, BRACKET) else {
                    break lost("a branch point could not be located".into());
                };
                points.pop();
                points[after].distance = found.located.distance;
                branches.push((points.len(), found.located.point.clone()));
                points.push(found.turned(branch * sideways(&found.mode).signum()));
                settings.first_step = FIRST_ON_BRANCH;
            }
            Outcome::Stopped if jammed => {
                break lost(format!(
                    "it jams: the force has risen to {JAMMED} times that of the spring pressed solid"
                ));
            }
            Outcome::Stopped if strayed => {
                break lost(format!(
                    "after its largest travel the path went on for {MOST_AFTER_LOSS} points without \
                     regaining it"
                ));
            }
            Outcome::Stopped => {
                let bowed = points.last().is_some_and(&bowed_over);
                break if bowed {
                    PathEnd::BowedOver
                } else {
                    PathEnd::Solid
                };
            }
            Outcome::TooLong => {
                break lost(format!(
                    "the path did not end within {} points and {MOST_ITERATIONS} iterations",
                    settings.most_points
                ));
            }
            Outcome::Lost(failed) => {
                break lost(format!(
                    "Newton did not converge ({} iterations, last step {:.1e}); the step was \
                     halved down to {:.0e}",
                    failed.iterations, failed.last_step, settings.smallest_step
                ));
            }
        }
    };
    Walked { branches, end }
}

fn height(point: &Solved, last: usize) -> f64 {
    point.state.nodes[last][0]
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

/// A failure of the load path; where it stopped is filled in by the caller.
pub(super) fn failure(cause: String) -> Failure {
    Failure {
        what: "load path of the imperfect column".into(),
        cause,
        last_good_deflection_m: None,
    }
}
