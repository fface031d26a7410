//! The stroke with friction: out to the largest working deflection and back, twice. The first time the
//! contact forms as it comes; the second stroke is the one that repeats.

use super::events::EventKind;
use super::imperfect::Imperfect;
use super::observe::{Observer, Seen, Solved};
use super::run::Run;
use super::walk::BRACKET;
use crate::column::Column;
use crate::result::Stroke;
use crate::setup::Setup;
use crate::solve::{Newton, Outcome, PathSettings, follow, locate, start, turn_back};

/// Largest step of a stroke, of order-one unknowns: the loop's area is summed over its points.
const STEP: f64 = 5e-3;
/// A spring installed without deflection comes back to this share of the largest one.
const NEARLY_FREE: f64 = 1e-3;

/// One column on its way.
struct Way<'a> {
    setup: &'a Setup,
    column: Column,
    newton: Newton<3, 5>,
    observer: Observer,
}

/// One leg of the stroke.
struct Leg {
    points: Vec<Solved>,
    seen: Vec<Seen>,
}

/// The second stroke of the imperfect column in its worst orientation; `None` without friction, or
/// where the path does not lead to the working deflection.
pub(super) fn stroke(setup: &Setup, imperfect: &Imperfect) -> Option<Stroke> {
    imperfect.fine.event(EventKind::LargestWorking)?;
    let mut column = Run::column(setup, imperfect.fine.elements, imperfect.orientation);
    if !column.has_friction() {
        return None;
    }
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let first = start(&mut column, &mut newton, &guess, 0.0).ok()?;
    let observer = Observer::new(&column, &first);
    let mut way = Way {
        setup,
        column,
        newton,
        observer,
    };
    let most = setup.duty.largest_working_deflection();
    let least = setup.duty.installed_deflection.max(NEARLY_FREE * most);
    let there = way.leg(first, most, 1.0)?;
    let back = way.back_from(&there, least, -1.0)?;
    let out = way.back_from(&back, most, 1.0)?;
    let home = way.back_from(&out, least, -1.0)?;
    let (begins, ends) = (out.seen.first()?.point, home.seen.last()?.point);
    Some(Stroke {
        from_deflection_m: least,
        to_deflection_m: most,
        energy_lost_j: out.work() + home.work(),
        friction_work_j: -(way.friction(&out) + way.friction(&home)),
        closes_within: (ends.force_n - begins.force_n).abs() / out.seen.last()?.point.force_n,
        out: out.seen.iter().map(|seen| seen.point).collect(),
        back: home.seen.iter().map(|seen| seen.point).collect(),
    })
}

impl Way<'_> {
    /// From the end of `leg` back.
    fn back_from(&mut self, leg: &Leg, target: f64, sense: f64) -> Option<Leg> {
        let first = turn_back(&mut self.column, &mut self.newton, leg.points.last()?);
        self.leg(first, target, sense)
    }

    /// From `first` to the deflection `target`, going `sense` (+1: further in).
    fn leg(&mut self, first: Solved, target: f64, sense: f64) -> Option<Leg> {
        let (setup, observer) = (self.setup, &self.observer);
        let watched = self.column.clone();
        let short = |point: &Solved| {
            let travel = observer.see(setup, &watched, point).point.deflection_m;
            sense * (target - travel)
        };
        let settings = PathSettings {
            largest_step: STEP,
            first_step: STEP,
            most_points: 6000,
            ..PathSettings::default()
        };
        let mut points = vec![first];
        let (outcome, _) = follow(
            &mut self.column,
            &mut self.newton,
            &mut points,
            &settings,
            |points| points.last().is_some_and(|point| short(point) <= 0.0),
        );
        if outcome != Outcome::Stopped || points.len() < 2 {
            return None;
        }
        let after = points.len() - 2;
        let end = locate(
            &mut self.column,
            &mut self.newton,
            &points,
            after,
            BRACKET,
            short,
        )?;
        points.pop();
        points[after].distance = end.distance;
        points.push(end.point);
        let seen = points
            .iter()
            .map(|point| self.observer.see(setup, &watched, point))
            .collect();
        Some(Leg { points, seen })
    }

    /// Work of friction along a leg, J.
    fn friction(&self, leg: &Leg) -> f64 {
        let work: f64 = leg
            .points
            .windows(2)
            .map(|pair| self.column.friction_work(&pair[0].state, &pair[1].state))
            .sum();
        work * self.column.scale.moment()
    }
}

impl Leg {
    /// Work of the machine along it, J: trapezoids over its points.
    fn work(&self) -> f64 {
        self.seen
            .windows(2)
            .map(|pair| {
                let (a, b) = (&pair[0].point, &pair[1].point);
                0.5 * (a.force_n + b.force_n) * (b.deflection_m - a.deflection_m)
            })
            .sum()
    }
}
