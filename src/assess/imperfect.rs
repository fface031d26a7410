//! The column as built and imperfect: its load path on two meshes, followed through and past the
//! bow-out, with its events.

use super::MESHES;
use super::events::{Event, EventKind, Track};
use super::observe::{Observer, Seen};
use super::southwell;
use super::straight::measure;
use super::walk::walk;
use crate::column::{Column, Deviations, Idealisation, StraightScan};
use crate::result::{Computed, Failure, ImperfectColumn, Limit, Mark, Path, Southwell};
use crate::setup::{LimitKind, Loading, Restraint, Setup};
use crate::solve::{Newton, start};

/// A path on one mesh.
pub(super) struct Run {
    pub seen: Vec<Seen>,
    pub events: Vec<Event>,
    /// Indices of branch points the path turned at.
    pub corners: Vec<usize>,
    pub failure: Option<Failure>,
    pub southwell: Option<Southwell>,
    pub elements: usize,
}

/// Both meshes, for the worse sign of the parallelism deviation.
pub(super) struct Imperfect {
    pub fine: Run,
    pub coarse: Run,
    pub worse_sign: Option<f64>,
    pub failures: Vec<Failure>,
}

pub(super) fn run(setup: &Setup) -> Imperfect {
    let [coarse_mesh, fine_mesh] = MESHES;
    let turns = |restraint: Restraint| restraint != Restraint::Free;
    let matters = setup.imperfections.parallelism != 0.0 && turns(setup.top.rotation);
    let mut coarse = one(setup, coarse_mesh, 1.0);
    let mut sign = 1.0;
    if matters {
        let other = one(setup, coarse_mesh, -1.0);
        if other.severity(setup) > coarse.severity(setup) {
            coarse = other;
            sign = -1.0;
        }
    }
    let fine = one(setup, fine_mesh, sign);
    let failures = fine.failure.iter().cloned().collect();
    Imperfect {
        fine,
        coarse,
        worse_sign: matters.then_some(sign),
        failures,
    }
}

impl Run {
    /// How near the nearest limit is to what is needed of it: needed over reached, the largest.
    fn severity(&self, setup: &Setup) -> f64 {
        let limits = self.events.iter().filter_map(|event| match event.kind {
            EventKind::Limit(kind) => Some(setup.duty.needed(kind) / event.point.deflection_m),
            _ => None,
        });
        let bow = self
            .seen
            .iter()
            .find(|seen| seen.point.deflection_m >= setup.duty.working_deflection)
            .map_or(0.0, |seen| 1e-9 * seen.point.bow_m / setup.duty.bow_limit);
        limits.fold(bow, f64::max)
    }

    /// The event of that kind.
    pub fn event(&self, kind: EventKind) -> Option<&Event> {
        self.events.iter().find(|event| event.kind == kind)
    }

    /// Bow and stress at that travel on the way up, by the path point nearest below and above.
    fn last_deflection(&self) -> Option<f64> {
        self.seen.last().map(|seen| seen.point.deflection_m)
    }
}

/// Follows the path on one mesh.
fn one(setup: &Setup, elements: usize, parallelism_sign: f64) -> Run {
    let mut perfect = Column::of_setup(setup, Idealisation::AsBuilt, elements, None);
    let buckling = StraightScan::new(&mut perfect).buckling();
    let deviations = Deviations {
        sizes: &setup.imperfections,
        parallelism_sign,
        mode: buckling.as_ref().map(|b| &b.mode),
    };
    let mut column = Column::of_setup(setup, Idealisation::AsBuilt, elements, Some(&deviations));
    let mut newton = Newton::new(&column);
    let mut run = Run {
        seen: Vec::new(),
        events: Vec::new(),
        corners: Vec::new(),
        failure: None,
        southwell: None,
        elements,
    };
    let guess = column.first_guess();
    let first = match start(&mut column, &mut newton, &guess, 0.0) {
        Ok(first) => first,
        Err(failed) => {
            run.failure = Some(Failure {
                what: "unloaded state of the imperfect column".into(),
                cause: format!(
                    "Newton did not converge in {} iterations (last step {:.1e})",
                    failed.iterations, failed.last_step
                ),
                last_good_deflection_m: None,
            });
            return run;
        }
    };
    let observer = Observer::new(setup, &column, &first);
    let mut points = vec![first];
    let walked = walk(setup, &mut column, &mut newton, &mut points);
    run.seen = points
        .iter()
        .map(|point| observer.see(setup, &column, point))
        .collect();
    for (index, incoming) in &walked.branches {
        run.seen[*index] = observer.see(setup, &column, incoming);
    }
    run.corners = walked.branches.iter().map(|(index, _)| *index).collect();
    run.failure = walked.failure.map(|failure| Failure {
        last_good_deflection_m: run.last_deflection(),
        ..failure
    });
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
        buckling.and_then(|b| southwell::estimate(setup, &column, &observer, &points, &b));
    run
}

impl Imperfect {
    /// An event with its error estimate: the difference of the two meshes and the last bracket.
    pub fn event(&self, kind: EventKind) -> Option<(&Event, f64)> {
        let fine = self.fine.event(kind)?;
        let difference = self.coarse.event(kind).map_or_else(
            // Only one mesh has the event: near the end of the path. The end is as far as it goes.
            || {
                let end = self.coarse.last_deflection().unwrap_or(0.0);
                (end - fine.point.deflection_m).abs()
            },
            |coarse| (coarse.point.deflection_m - fine.point.deflection_m).abs(),
        );
        Some((
            fine,
            difference + fine.bracket + 1e-11 * fine.point.deflection_m,
        ))
    }

    /// Travel up to which the path is known on both meshes, m.
    pub fn known_up_to(&self) -> f64 {
        self.fine
            .seen
            .iter()
            .map(|seen| seen.point.deflection_m)
            .fold(0.0, f64::max)
    }

    /// What is told of the imperfect column.
    pub fn summary(&self, setup: &Setup, limits: &[Limit]) -> Option<ImperfectColumn> {
        self.fine.seen.first()?;
        let own = [
            LimitKind::Bow,
            LimitKind::RateLost,
            LimitKind::DeadLoadLost,
            LimitKind::TravelLost,
            LimitKind::Stress,
            LimitKind::Clash,
        ];
        let first = limits
            .iter()
            .find(|limit| own.contains(&limit.name) && limit.deflection_m.is_some());
        let working = self
            .event(EventKind::LargestWorking)
            .map(|(event, _)| event);
        let coarse_bow = self
            .coarse
            .event(EventKind::LargestWorking)
            .map(|e| e.point.bow_m);
        Some(ImperfectColumn {
            first_limit: first.and_then(|limit| {
                Some(Computed {
                    measure: measure(setup, limit.deflection_m?, limit.force_n?),
                    error_m: limit.error_m?,
                })
            }),
            first_limit_name: first.map(|limit| limit.name),
            bow_at_working_m: working.map(|event| event.point.bow_m),
            bow_at_working_error_m: working
                .zip(coarse_bow)
                .map(|(event, coarse)| (event.point.bow_m - coarse).abs()),
            stress_at_working_pa: working.map(|event| event.point.wire_stress_pa),
            worse_parallelism_sign: self
                .worse_sign
                .map(|sign| if sign > 0.0 { "+" } else { "-" }.to_owned()),
            southwell: self.fine.southwell,
            branch: self.branch(setup),
            elements: self.fine.elements,
            path: self.path(setup),
        })
    }

    fn branch(&self, setup: &Setup) -> String {
        let bent = self
            .fine
            .seen
            .iter()
            .any(|seen| seen.point.bow_m > 1e-6 * setup.spring.mean_diameter);
        match (self.fine.corners.len(), bent) {
            (0, false) => "straight all the way: no imperfection acts and no branch leaves".into(),
            (0, true) => {
                "one path from the unloaded state: the imperfections bow it from the start".into()
            }
            (n, _) => format!(
                "up to a branch point, and from there on the branch that leaves to the left (+y); \
                 its mirror image is as likely ({n} branch point{} met)",
                if n == 1 { "" } else { "s" }
            ),
        }
    }

    fn path(&self, setup: &Setup) -> Path {
        let mut marks: Vec<Mark> = self
            .fine
            .events
            .iter()
            .filter_map(|event| {
                Some(Mark {
                    name: mark_name(setup.duty.loading, event.kind)?.to_owned(),
                    point: event.point,
                })
            })
            .collect();
        marks.extend(self.fine.corners.iter().map(|index| Mark {
            name: "branch_point".to_owned(),
            point: self.fine.seen[*index].point,
        }));
        marks.sort_by(|a, b| a.point.deflection_m.total_cmp(&b.point.deflection_m));
        Path {
            points: self.fine.seen.iter().map(|seen| seen.point).collect(),
            marks,
            branch: self.branch(setup),
        }
    }
}

/// Name of an event as a mark on the path: a limit's key where the limit applies to this duty.
fn mark_name(loading: Loading, kind: EventKind) -> Option<&'static str> {
    Some(match (kind, loading) {
        (EventKind::Limit(LimitKind::DeadLoadLost), Loading::Deflection) => "largest_force",
        (EventKind::Limit(LimitKind::TravelLost), Loading::Force) => "largest_travel",
        (EventKind::Limit(kind), _) => kind.key(),
        (EventKind::ForceRegained, Loading::Force) => "force_regained",
        (EventKind::ForceRegained, Loading::Deflection) | (EventKind::LargestWorking, _) => {
            return None;
        }
        (EventKind::Installed, _) => "installed",
        (EventKind::Working, _) => "working",
    })
}
