//! The column as built and imperfect: its load path on two meshes, followed through and past the
//! bow-out, with its events.

use super::MESHES;
use super::observe::{Observer, Seen, Solved};
use super::southwell;
use super::straight::measure;
use crate::column::{Column, Deviations, Idealisation, StraightScan};
use crate::result::{Computed, Failure, ImperfectColumn, Limit, Mark, Path, PathPoint, Southwell};
use crate::setup::{LimitKind, Restraint, Setup};
use crate::solve::{
    Newton, Outcome, PathSettings, branch_point, crosses_another, follow, locate, start,
};

/// Rotation of a section beyond which a path is not followed: long past any use of the spring.
const LARGEST_ROTATION: f64 = 1.5;
/// Width of an event's last bracket along the path, of order-one unknowns.
const BRACKET: f64 = 1e-11;

/// An event on a path.
#[derive(Clone, Debug)]
pub(super) struct Event {
    pub kind: EventKind,
    pub point: PathPoint,
    /// Strain energy of spring and lateral seats, J.
    pub strain_energy: f64,
    /// Width of the last bracket, m of travel.
    pub bracket: f64,
}

/// What happens.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum EventKind {
    Limit(LimitKind),
    /// The force comes back up to the largest it had, in a stable state.
    ForceRegained,
    Branch,
    Installed,
    Working,
}

/// A path on one mesh.
pub(super) struct Run {
    pub seen: Vec<Seen>,
    pub events: Vec<Event>,
    pub branches: usize,
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
        branches: 0,
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
    let branch_points = walk(setup, &mut column, &mut newton, &mut points, &mut run);
    run.branches = branch_points.len();
    run.seen = points
        .iter()
        .map(|point| observer.see(setup, &column, point))
        .collect();
    run.events = find_events(
        setup,
        &mut column,
        &mut newton,
        &observer,
        &points,
        &run.seen,
    );
    for index in branch_points {
        run.events.push(Event {
            kind: EventKind::Branch,
            point: run.seen[index].point,
            strain_energy: 0.0,
            bracket: 0.0,
        });
    }
    run.southwell =
        buckling.and_then(|b| southwell::estimate(setup, &column, &observer, &points, &b));
    run
}

/// Follows to solid, onto another branch where the path loses its stability at one. Returns the
/// indices of the branch points.
fn walk(
    setup: &Setup,
    column: &mut Column,
    newton: &mut Newton<3, 5>,
    points: &mut Vec<Solved>,
    run: &mut Run,
) -> Vec<usize> {
    let last = column.elements();
    let top = points[0].state.nodes[last][0];
    let solid = setup.spring.solid_deflection() / column.scale.length;
    let mut settings = PathSettings::default();
    let mut branches: Vec<usize> = Vec::new();
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
            Outcome::Stopped if crossed && branches.len() < 4 => {
                let after = points.len() - 2;
                let Some(mut found) = branch_point(column, newton, points, after, BRACKET) else {
                    return branches;
                };
                if sideways(&found.point) < 0.0 {
                    found.point.direction.scale(-1.0);
                }
                points.pop();
                points[after].distance = found.distance;
                branches.push(points.len());
                points.push(found.point);
                settings.first_step = 0.01;
            }
            Outcome::Stopped => return branches,
            Outcome::TooLong | Outcome::Lost(_) => {
                run.failure = Some(failure(outcome, &settings));
                return branches;
            }
        }
    }
}

/// Largest sideways part of a point's direction, with its sign.
fn sideways(point: &Solved) -> f64 {
    point
        .direction
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

/// Limits and working points along the path, the first of each kind.
fn find_events(
    setup: &Setup,
    column: &mut Column,
    newton: &mut Newton<3, 5>,
    observer: &Observer,
    points: &[Solved],
    seen: &[Seen],
) -> Vec<Event> {
    let duty = &setup.duty;
    let solid = setup.spring.solid_deflection();
    let seats = super::straight::seat_compliance(setup);
    let reference_rate = 1.0 / (1.0 / setup.spring.rate() + seats);
    let left_rate = (1.0 - duty.rate_loss_share) * reference_rate;
    let stress = duty.allowable_stress.unwrap_or(f64::INFINITY);
    type Function<'a> = Box<dyn Fn(&Seen) -> f64 + 'a>;
    let limit = EventKind::Limit;
    // Each function is positive before its event.
    let mut wanted: Vec<(EventKind, Function<'_>)> = vec![
        (
            limit(LimitKind::Bow),
            Box::new(|s| duty.bow_limit - s.point.bow_m),
        ),
        (
            limit(LimitKind::RateLost),
            Box::new(move |s| s.along.0 - left_rate * s.along.1),
        ),
        (limit(LimitKind::DeadLoadLost), Box::new(|s| s.along.0)),
        (limit(LimitKind::TravelLost), Box::new(|s| s.along.1)),
        (limit(LimitKind::Clash), Box::new(|s| s.clearance)),
        (
            limit(LimitKind::Solid),
            Box::new(move |s| solid - s.point.shortening_m),
        ),
        (
            EventKind::Installed,
            Box::new(|s| duty.installed_deflection - s.point.deflection_m),
        ),
        (
            EventKind::Working,
            Box::new(|s| duty.largest_working_deflection() - s.point.deflection_m),
        ),
    ];
    if stress.is_finite() {
        wanted.push((
            limit(LimitKind::Stress),
            Box::new(move |s| stress - s.point.wire_stress_pa),
        ));
    }
    let mut events = Vec::new();
    for (kind, function) in &wanted {
        events.extend(first_event(
            setup, column, newton, observer, points, seen, 0, *kind, function,
        ));
    }
    // After a dead load is lost: where the same force is carried again, in a stable state.
    let lost = events
        .iter()
        .find(|e| e.kind == limit(LimitKind::DeadLoadLost))
        .cloned();
    if let Some(lost) = lost {
        let from = seen
            .iter()
            .position(|s| s.along.0 < 0.0)
            .unwrap_or(seen.len());
        let regained = |s: &Seen| lost.point.force_n - s.point.force_n;
        events.extend(first_event(
            setup,
            column,
            newton,
            observer,
            points,
            seen,
            from,
            EventKind::ForceRegained,
            &regained,
        ));
    }
    events
}

/// The first point from `from` on at which `function` turns from positive to not positive.
#[allow(clippy::too_many_arguments)]
fn first_event(
    setup: &Setup,
    column: &mut Column,
    newton: &mut Newton<3, 5>,
    observer: &Observer,
    points: &[Solved],
    seen: &[Seen],
    from: usize,
    kind: EventKind,
    function: &dyn Fn(&Seen) -> f64,
) -> Option<Event> {
    let make = |column: &Column, solved: &Solved, width: f64| {
        let seen = observer.see(setup, column, solved);
        Event {
            kind,
            point: seen.point,
            strain_energy: column.strain_energy(&solved.state) * column.scale.moment(),
            bracket: (width * column.scale.length).abs(),
        }
    };
    if from == 0 && seen.first().is_some_and(|s| function(s) <= 0.0) {
        return Some(make(column, &points[0], 0.0));
    }
    let after = (from..seen.len().saturating_sub(1))
        .find(|i| function(&seen[*i]) > 0.0 && function(&seen[i + 1]) <= 0.0)?;
    // The observer looks at states of a column like this one, so a copy serves inside the search.
    let watched = column.clone();
    let found = locate(column, newton, points, after, BRACKET, |point| {
        function(&observer.see(setup, &watched, point))
    })?;
    Some(make(column, &found.point, found.bracket))
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
        let working = self.event(EventKind::Working).map(|(event, _)| event);
        let coarse_bow = self.coarse.event(EventKind::Working).map(|e| e.point.bow_m);
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
            path: self.path(),
        })
    }

    fn branch(&self, setup: &Setup) -> String {
        let bent = self
            .fine
            .seen
            .iter()
            .any(|seen| seen.point.bow_m > 1e-6 * setup.spring.mean_diameter);
        match (self.fine.branches, bent) {
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

    fn path(&self) -> Path {
        let mut marks: Vec<Mark> = self
            .fine
            .events
            .iter()
            .map(|event| Mark {
                name: match event.kind {
                    EventKind::Limit(kind) => kind.key(),
                    EventKind::ForceRegained => "force_regained",
                    EventKind::Branch => "branch_point",
                    EventKind::Installed => "installed",
                    EventKind::Working => "working",
                }
                .to_owned(),
                point: event.point,
            })
            .collect();
        marks.sort_by(|a, b| a.point.deflection_m.total_cmp(&b.point.deflection_m));
        Path {
            points: self.fine.seen.iter().map(|seen| seen.point).collect(),
            marks,
            branch: String::new(),
        }
    }
}
