//! One load path of the imperfect column: one mesh, one way in which its deviations lie.

use super::events::{Event, EventKind, Track};
use super::observe::{Observer, Seen};
use super::southwell;
use super::walk::{PathEnd, Reach, failure, walk};
use crate::column::{Buckling, Column, Deviations, Idealisation};
use crate::result::{Failure, Southwell};
use crate::setup::{Loading, Orientation, Setup};
use crate::solve::{Newton, System, start};

/// The path's steps are measured by the critical load, so that there are points enough before the
/// bow-out, but not by less than this (EI/L²): on very soft seats the path goes on far beyond it.
const SMALLEST_LOAD_SCALE: f64 = 1.0;

/// What a path says of its limits, the worst last.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Grade {
    /// All are met.
    Met,
    /// None is missed as far as the path is known, which is not far enough.
    Unknown,
    /// One is missed.
    Missed,
}

/// A path on one mesh.
pub(super) struct Run {
    pub seen: Vec<Seen>,
    pub events: Vec<Event>,
    /// Indices of branch points the path turned at.
    pub corners: Vec<usize>,
    pub end: PathEnd,
    pub southwell: Option<Southwell>,
    pub elements: usize,
}

impl Run {
    /// Follows the path on one mesh. `perfect` is the critical state of the perfect column as built
    /// on the same mesh.
    pub fn new(
        setup: &Setup,
        elements: usize,
        orientation: Orientation,
        perfect: Option<&Buckling>,
        reach: Reach,
    ) -> Self {
        let deviations = Deviations {
            sizes: &setup.imperfections,
            orientation,
            mode: perfect.map(|buckling| &buckling.mode),
        };
        let mut column =
            Column::of_setup(setup, Idealisation::AsBuilt, elements, Some(&deviations));
        if let Some(buckling) = perfect {
            let scale = buckling
                .load
                .max(SMALLEST_LOAD_SCALE)
                .min(column.load_scale());
            column = column.with_load_scale(scale);
        }
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let mut run = Run {
            seen: Vec::new(),
            events: Vec::new(),
            corners: Vec::new(),
            end: PathEnd::Solid,
            southwell: None,
            elements,
        };
        let first = match start(&mut column, &mut newton, &guess, 0.0) {
            Ok(first) => first,
            Err(failed) => {
                run.end = PathEnd::Lost(failure(format!(
                    "Newton did not converge on the unloaded state in {} iterations (last step \
                     {:.1e})",
                    failed.iterations, failed.last_step
                )));
                return run;
            }
        };
        let observer = Observer::new(&column, &first);
        let mut points = vec![first];
        let walked = walk(
            setup,
            &mut column,
            &mut newton,
            &mut points,
            reach,
            orientation.branch,
        );
        run.seen = points
            .iter()
            .map(|point| observer.see(setup, &column, point))
            .collect();
        for (index, incoming) in &walked.branches {
            run.seen[*index] = observer.see(setup, &column, incoming);
        }
        run.corners = walked.branches.iter().map(|(index, _)| *index).collect();
        run.end = match walked.end {
            PathEnd::Lost(failure) => PathEnd::Lost(Failure {
                last_good_deflection_m: run.seen.last().map(|seen| seen.point.deflection_m),
                ..failure
            }),
            end => end,
        };
        run.events = Track {
            setup,
            column: &mut column,
            newton: &mut newton,
            observer: &observer,
            points: &points,
            seen: &run.seen,
            corners: &run.corners,
        }
        .events();
        run.southwell =
            perfect.and_then(|b| southwell::estimate(setup, &column, &observer, &points, b));
        run
    }

    /// How bad the path is, to be compared: whether a limit is missed, or the path is lost before
    /// it is known that none is; then, for the limits from the nearest on, what is needed of each
    /// over what it reaches; last the bow at the working deflection.
    pub fn severity(&self, setup: &Setup) -> (Grade, Vec<f64>) {
        let duty = &setup.duty;
        let mut nearness: Vec<f64> = self
            .events
            .iter()
            .filter_map(|event| match event.kind {
                EventKind::Limit(kind) if setup.has(kind) => {
                    Some(duty.needed(kind) / duty.reached(event.reached.0, event.reached.1))
                }
                _ => None,
            })
            .collect();
        nearness.sort_by(|a, b| b.total_cmp(a));
        let grade = if nearness.first().is_some_and(|nearest| *nearest > 1.0) {
            Grade::Missed
        } else if self.is_known_far_enough(setup) {
            Grade::Met
        } else {
            Grade::Unknown
        };
        nearness.push(
            self.event(EventKind::LargestWorking)
                .map_or(0.0, |event| event.point.bow_m / duty.bow_limit),
        );
        (grade, nearness)
    }

    /// Whether the path goes as far as the limits of this duty need it to be known.
    pub fn is_known_far_enough(&self, setup: &Setup) -> bool {
        let duty = &setup.duty;
        self.end == PathEnd::Solid
            || self.farthest(|seen| duty.reached(seen.point.deflection_m, seen.point.force_n))
                >= setup.farthest_needed()
    }

    /// The event of that kind.
    pub fn event(&self, kind: EventKind) -> Option<&Event> {
        self.events.iter().find(|event| event.kind == kind)
    }

    /// How far the path goes, by a measure of its points.
    pub fn farthest(&self, measure: impl Fn(&Seen) -> f64) -> f64 {
        self.seen.iter().map(measure).fold(0.0, f64::max)
    }

    /// A state, before the load or travel is lost and within what is needed, that is unstable under
    /// the duty's loading: a branch was missed there, and what follows is not the spring's path.
    pub fn unstable_before(&self, setup: &Setup, needed: f64) -> Option<Failure> {
        let duty = &setup.duty;
        let lost = self
            .events
            .iter()
            .filter(|event| matches!(event.kind, EventKind::Limit(kind) if kind.is_loss() && setup.has(kind)))
            .map(|event| event.place)
            .fold(f64::INFINITY, f64::min);
        let (index, seen) = self.seen.iter().enumerate().find(|(index, seen)| {
            let count = match duty.loading {
                Loading::Force => seen.point.unstable_dead_load,
                Loading::Deflection => seen.point.unstable_set_deflection,
            };
            count > 0 && (*index as f64) < lost && !self.corners.contains(index)
        })?;
        let before = &self.seen[index.saturating_sub(1)].point;
        (duty.reached(seen.point.deflection_m, seen.point.force_n) <= needed).then(|| Failure {
            last_good_deflection_m: Some(before.deflection_m),
            ..failure(
                "the path goes on through unstable states: a branch that leaves it was not taken"
                    .into(),
            )
        })
    }
}
