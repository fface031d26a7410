//! The column as built and imperfect, for the worst way in which its deviations lie, on two meshes.

use super::events::{Event, EventKind};
use super::guided_meshes;
use super::run::Run;
use super::straight::floor;
use super::walk::{PathEnd, Reach};
use crate::column::{Column, Idealisation, StraightScan};
use crate::result::{Failure, PathPoint};
use crate::setup::{LimitKind, Loading, Orientation, Setup};

/// Relative difference of what two orientations reach that is discretisation, not a difference.
const SAME_SEVERITY: f64 = 1e-6;
/// Share of the lost load or travel above which a bowed state beside is not worth a word.
const NEARLY_ALL: f64 = 0.999;

/// Both meshes, for the worst of the orientations.
pub(super) struct Imperfect {
    pub fine: Run,
    pub coarse: Run,
    pub orientation: Orientation,
    pub orientations_tried: usize,
    pub failures: Vec<Failure>,
    /// Whether the path followed is not the spring's, within what is needed.
    pub left_its_path: bool,
}

/// Follows the path for every orientation on the coarser mesh, which decides between them, and for
/// the worst on the finer.
pub(super) fn run(setup: &Setup) -> Imperfect {
    let [coarse_mesh, fine_mesh] = guided_meshes(setup);
    let perfect = |elements: usize| {
        let mut column = Column::of_setup(setup, Idealisation::AsBuilt, elements, None);
        StraightScan::new(&mut column).buckling()
    };
    let buckling = perfect(coarse_mesh);
    let orientations = setup.imperfections.orientations(&setup.bottom, &setup.top);
    let on_coarse = |orientation: Orientation| {
        Run::new(
            setup,
            coarse_mesh,
            orientation,
            buckling.as_ref(),
            Reach::FARTHER,
        )
    };
    let mut worst: Option<(Run, Orientation)> = None;
    for orientation in &orientations {
        let run = on_coarse(*orientation);
        let branches = !run.corners.is_empty();
        keep_worse(&mut worst, run, *orientation, setup);
        if branches {
            // Between seats that are not true the two sides of a branch need not be mirror images.
            let other = Orientation {
                branch: -1.0,
                ..*orientation
            };
            keep_worse(&mut worst, on_coarse(other), other, setup);
        }
    }
    let plain = Orientation::plain();
    let (coarse, orientation) = worst.unwrap_or_else(|| (on_coarse(plain), plain));
    let buckling = perfect(fine_mesh);
    let fine = Run::new(
        setup,
        fine_mesh,
        orientation,
        buckling.as_ref(),
        Reach::SOLID,
    );
    let needed = setup.farthest_needed();
    let mut failures: Vec<Failure> = Vec::new();
    for run in [&fine, &coarse] {
        if let PathEnd::Lost(failure) = &run.end {
            failures.push(failure.clone());
        }
    }
    let unstable = fine.unstable_before(setup, needed);
    let left_its_path = unstable.is_some();
    failures.extend(unstable);
    Imperfect {
        fine,
        coarse,
        orientation,
        orientations_tried: orientations.len(),
        failures,
        left_its_path,
    }
}

/// Keeps the worse of two runs.
fn keep_worse(
    worst: &mut Option<(Run, Orientation)>,
    run: Run,
    orientation: Orientation,
    setup: &Setup,
) {
    if worst
        .as_ref()
        .is_none_or(|(other, _)| is_worse(&run, other, setup))
    {
        *worst = Some((run, orientation));
    }
}

/// Whether one run is worse than another by more than round-off.
fn is_worse(one: &Run, other: &Run, setup: &Setup) -> bool {
    let ((grade, nearness), (other_grade, other_nearness)) =
        (one.severity(setup), other.severity(setup));
    if grade != other_grade {
        return grade > other_grade;
    }
    let different = |(mine, its): &(&f64, &f64)| {
        (*mine - *its).abs() > SAME_SEVERITY * mine.abs().max(its.abs())
    };
    match nearness.iter().zip(&other_nearness).find(different) {
        Some((mine, its)) => mine > its,
        None => nearness.len() > other_nearness.len(),
    }
}

impl Imperfect {
    /// An event with its error estimate: the difference of the two meshes and the last bracket.
    pub fn event(&self, setup: &Setup, kind: EventKind) -> Option<(&Event, f64)> {
        let fine = self.fine.event(kind)?;
        let other = self.coarse.event(kind).map_or_else(
            // Only the finer mesh has the event: the coarser says it is not before its end.
            || self.coarse.farthest(|seen| seen.point.deflection_m),
            |coarse| coarse.reached.0,
        );
        let difference = (other - fine.reached.0).abs();
        Some((
            fine,
            difference + fine.bracket + floor(setup, fine.reached.0),
        ))
    }

    /// Whether the path is known, on both meshes, as far as the limits of this duty need it.
    pub fn is_known_far_enough(&self, setup: &Setup) -> bool {
        let both = [&self.fine, &self.coarse];
        !self.left_its_path && both.iter().all(|run| run.is_known_far_enough(setup))
    }

    /// Largest travel of the path, m, where it ends short of solid: bowed far over, or lost.
    pub fn ends_before_solid(&self) -> Option<f64> {
        (self.fine.end != PathEnd::Solid)
            .then(|| self.fine.farthest(|seen| seen.point.deflection_m))
    }

    /// Whether the deviations leave the buckling mode alone: the path runs into a branch point.
    pub fn meets_a_branch(&self) -> bool {
        !self.fine.corners.is_empty()
    }

    /// Lowest share of the lost travel, or of the lost dead load, at which a bowed state stands
    /// beside the one the spring is in: from there on a knock can throw it over.
    pub fn knocked_over_from(&self, setup: &Setup) -> Option<f64> {
        let (kind, value): (LimitKind, fn(&PathPoint) -> f64) = match setup.duty.loading {
            Loading::Force => (LimitKind::DeadLoadLost, |point| point.force_n),
            Loading::Deflection => (LimitKind::TravelLost, |point| point.deflection_m),
        };
        let lost = self.fine.event(EventKind::Limit(kind))?;
        let lowest = self
            .fine
            .seen
            .iter()
            .skip(lost.place.ceil() as usize)
            .map(|seen| value(&seen.point))
            .fold(f64::INFINITY, f64::min);
        let share = lowest / value(&lost.point);
        (share < NEARLY_ALL).then_some(share)
    }
}
