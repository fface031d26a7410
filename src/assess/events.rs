//! Events on the load path: limits reached, the working point, and where a dead load comes to rest.

use super::observe::{Observer, Seen, Solved};
use super::walk::BRACKET;
use crate::column::Column;
use crate::result::{Leaning, PathPoint};
use crate::setup::{LimitKind, Loading, Setup};
use crate::solve::{Newton, locate};

/// An event on a path.
#[derive(Clone, Debug)]
pub(super) struct Event {
    pub kind: EventKind,
    pub point: PathPoint,
    /// Strain energy of spring and lateral seats, J.
    pub strain_energy: f64,
    /// Width of the last bracket, m of travel.
    pub bracket: f64,
    /// Place along the path, in path points from its start.
    pub place: f64,
    /// Deflection, m, and force, N, of the spring as loaded when this happens: those of the point,
    /// or those at which the jump starts that passes over it.
    pub reached: (f64, f64),
    /// Whether it happens in a jump.
    pub in_jump: bool,
    /// Where it leans on guides then.
    pub leaning: Vec<Leaning>,
}

/// What happens.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum EventKind {
    Limit(LimitKind),
    /// The force comes back up to the largest it had.
    ForceRegained,
    /// The travel comes back up to the largest it had.
    TravelRegained,
    Installed,
    Working,
    /// The working deflection with its tolerance.
    LargestWorking,
    /// Flat ends that stood on an edge sit flush.
    Seated,
    /// A guide is touched first.
    FirstTouch,
    /// The stretch that leans is longer than a pitch: more than one coil bears.
    LineContact,
    /// It leans at another place too.
    SecondPlace,
    /// From here on what lies flat on a guide could buckle away from it into the next mode.
    LooseFlat,
}

impl Event {
    /// Whether its state is stable under that kind of loading.
    pub fn is_stable(&self, loading: Loading) -> bool {
        match loading {
            Loading::Force => self.point.unstable_dead_load == 0,
            Loading::Deflection => self.point.unstable_set_deflection == 0,
        }
    }
}

/// A path to look for events on.
pub(super) struct Track<'a> {
    pub setup: &'a Setup,
    pub column: &'a mut Column,
    pub newton: &'a mut Newton<3, 5>,
    pub observer: &'a Observer,
    pub points: &'a [Solved],
    pub seen: &'a [Seen],
    /// Indices of branch points: the path turns a corner there.
    pub corners: &'a [usize],
}

/// A function along the path, positive before its event. One that looks at the path's direction
/// jumps at a corner.
struct Watch<'f> {
    kind: EventKind,
    of_direction: bool,
    function: Box<dyn Fn(&Seen) -> f64 + 'f>,
}

impl<'f> Watch<'f> {
    fn state(kind: EventKind, function: impl Fn(&Seen) -> f64 + 'f) -> Self {
        Watch {
            kind,
            of_direction: false,
            function: Box::new(function),
        }
    }

    fn direction(kind: EventKind, function: impl Fn(&Seen) -> f64 + 'f) -> Self {
        Watch {
            of_direction: true,
            ..Watch::state(kind, function)
        }
    }
}

impl Track<'_> {
    /// Limits and working points, the first of each kind.
    pub fn events(&mut self) -> Vec<Event> {
        let setup = self.setup;
        let duty = &setup.duty;
        let solid = setup.spring.solid_deflection();
        // Of the straight spring on its seats, under the same force.
        let left_rate = |force: f64| {
            (1.0 - duty.rate_loss_share) / (1.0 / setup.spring.rate() + setup.seats_give(force).1)
        };
        let stress = duty.allowable_stress.unwrap_or(f64::INFINITY);
        let limit = EventKind::Limit;
        let reached = |s: &Seen| duty.reached(s.point.deflection_m, s.point.force_n);
        let watches = [
            Watch::state(limit(LimitKind::Bow), |s| duty.bow_limit - s.point.bow_m),
            Watch::direction(limit(LimitKind::DeadLoadLost), |s| s.along.0),
            Watch::direction(limit(LimitKind::TravelLost), |s| s.along.1),
            Watch::state(limit(LimitKind::Clash), |s| s.clearance),
            Watch::state(limit(LimitKind::Solid), |s| solid - s.point.shortening_m),
            Watch::state(limit(LimitKind::Stress), |s| {
                stress - s.point.wire_stress_pa
            }),
            Watch::state(EventKind::Installed, move |s| {
                duty.installed_deflection - reached(s)
            }),
            Watch::state(EventKind::Working, move |s| {
                duty.working_deflection - reached(s)
            }),
            Watch::state(EventKind::LargestWorking, move |s| {
                duty.largest_working_deflection() - reached(s)
            }),
        ];
        let mut events: Vec<Event> = watches
            .iter()
            .filter_map(|watch| self.first(watch, 0))
            .collect();
        // A spring that stands on an edge is soft until it sits.
        let seated = self.first_seated();
        let rate = Watch::direction(limit(LimitKind::RateLost), |s| {
            s.along.0 - left_rate(s.point.force_n) * s.along.1
        });
        if let Some(from) = seated.or_else(|| self.is_worked().then_some(0)) {
            events.extend(self.first(&rate, from));
        }
        self.of_flat_ends(seated, &mut events);
        self.of_guides(&mut events);
        // After a load or a travel is lost: where the same is carried again.
        let lost = |events: &[Event], kind: LimitKind| {
            let lost = events.iter().find(|event| event.kind == limit(kind))?;
            Some(lost.point)
        };
        if let Some(lost) = lost(&events, LimitKind::DeadLoadLost)
            && let Some(falling) = self.seen.iter().position(|s| s.along.0 < 0.0)
        {
            let again = move |s: &Seen| lost.force_n - s.point.force_n;
            events.extend(self.first(&Watch::state(EventKind::ForceRegained, again), falling));
        }
        if let Some(lost) = lost(&events, LimitKind::TravelLost)
            && let Some(falling) = self.seen.iter().position(|s| s.along.1 < 0.0)
        {
            let again = move |s: &Seen| lost.deflection_m - s.point.deflection_m;
            events.extend(self.first(&Watch::state(EventKind::TravelRegained, again), falling));
        }
        account_for_jump(duty.loading, &mut events);
        events
    }

    /// Whether the path gets as far as the working deflection.
    fn is_worked(&self) -> bool {
        let duty = &self.setup.duty;
        self.seen.iter().any(|seen| {
            duty.reached(seen.point.deflection_m, seen.point.force_n)
                >= duty.largest_working_deflection()
        })
    }

    /// Index of the first point at which all flat ends sit flush; 0 without flat ends.
    fn first_seated(&self) -> Option<usize> {
        self.seen.iter().position(|seen| {
            // Unloaded, an end stands as it happens to.
            seen.seated
                .is_none_or(|kept| kept > 0.0 && seen.point.force_n > 0.0)
        })
    }

    /// Seating, lift-off and sliding of flat ends. One that has not sat down by the working
    /// deflection counts as lifted from the start.
    fn of_flat_ends(&mut self, seated: Option<usize>, events: &mut Vec<Event>) {
        let setup = self.setup;
        if setup.has(LimitKind::LiftOff) {
            let watch = Watch::state(EventKind::Limit(LimitKind::LiftOff), |s| {
                s.seated.unwrap_or(1.0)
            });
            let reached = |seen: &Seen| {
                setup
                    .duty
                    .reached(seen.point.deflection_m, seen.point.force_n)
            };
            let in_time = seated
                .filter(|i| reached(&self.seen[*i]) <= setup.duty.largest_working_deflection());
            match in_time {
                Some(index) => {
                    if index > 0 {
                        let sits = Watch::state(EventKind::Seated, |s| -s.seated.unwrap_or(1.0));
                        events.extend(self.first(&sits, 0));
                    }
                    events.extend(self.first(&watch, index));
                }
                None if seated.is_some() || self.is_worked() => {
                    events.extend(self.first(&watch, 0));
                }
                // Lost before it could sit down: not known.
                None => {}
            }
        }
        if setup.has(LimitKind::Slide) && self.seen.len() > 1 {
            // Unloaded there is neither thrust nor friction; while it settles, an end finds its place.
            let watch = Watch::state(EventKind::Limit(LimitKind::Slide), |s| {
                s.slides.unwrap_or(f64::INFINITY)
            });
            if let Some(from) = seated.or_else(|| self.is_worked().then_some(0)) {
                events.extend(self.first(&watch, from.max(1)));
            }
        }
    }

    /// Contact with guides.
    fn of_guides(&mut self, events: &mut Vec<Event>) {
        let setup = self.setup;
        if setup.guides.is_empty() {
            return;
        }
        let pitch = setup.spring.pitch();
        let watches = [
            Watch::state(EventKind::Limit(LimitKind::GuideTouch), |s| {
                s.forbidden_room.unwrap_or(f64::INFINITY)
            }),
            Watch::state(EventKind::FirstTouch, |s| {
                if s.point.guide_force_n > 0.0 {
                    -s.point.guide_force_n
                } else {
                    s.point.guide_room_m.unwrap_or(f64::INFINITY)
                }
            }),
            Watch::state(EventKind::LineContact, |s| pitch - s.point.guide_longest_m),
            Watch::state(EventKind::LooseFlat, |s| 1.0 - s.flat),
            Watch::state(EventKind::SecondPlace, |s| {
                1.5 - f64::from(s.point.guide_places)
            }),
        ];
        for watch in &watches {
            events.extend(self.first(watch, 0));
        }
    }

    /// The first point from index `from` on at which the watch turns from positive to not.
    fn first(&mut self, watch: &Watch<'_>, from: usize) -> Option<Event> {
        let value = |i: usize| (watch.function)(&self.seen[i]);
        if from < self.seen.len() && value(from) <= 0.0 {
            return Some(self.event(watch.kind, &self.points[from], 0.0, from as f64));
        }
        let after = (from..self.seen.len().saturating_sub(1))
            .find(|i| value(*i) > 0.0 && value(i + 1) <= 0.0)?;
        if watch.of_direction && self.corners.contains(&after) {
            // The slope jumps at the corner itself.
            return Some(self.event(watch.kind, &self.points[after], 0.0, after as f64));
        }
        // The observer looks at states of a column like this one: a copy serves inside the search.
        let watched = self.column.clone();
        let (setup, observer) = (self.setup, self.observer);
        let found = locate(
            self.column,
            self.newton,
            self.points,
            after,
            BRACKET,
            |point| (watch.function)(&observer.see(setup, &watched, point)),
        )?;
        let place = after as f64 + found.distance / self.points[after].distance;
        Some(self.event(watch.kind, &found.point, found.bracket, place))
    }

    fn event(&self, kind: EventKind, solved: &Solved, width: f64, place: f64) -> Event {
        let point = self.observer.see(self.setup, self.column, solved).point;
        Event {
            kind,
            point,
            strain_energy: self.column.strain_energy(&solved.state) * self.column.scale.moment(),
            bracket: width.abs() * self.column.scale.length,
            place,
            reached: (point.deflection_m, point.force_n),
            in_jump: false,
            leaning: super::leaned::stretches(self.column, &solved.state),
        }
    }
}

/// Gives what lies in the jump of a lost load or travel the deflection and force at which that
/// jump starts: the path in between is never rested on.
fn account_for_jump(loading: Loading, events: &mut [Event]) {
    let (lost, regained) = match loading {
        Loading::Force => (LimitKind::DeadLoadLost, EventKind::ForceRegained),
        Loading::Deflection => (LimitKind::TravelLost, EventKind::TravelRegained),
    };
    let find = |kind: EventKind| events.iter().find(|event| event.kind == kind).cloned();
    let Some(lost) = find(EventKind::Limit(lost)) else {
        return;
    };
    let end = find(regained)
        .filter(|event| event.is_stable(loading))
        .map_or(f64::INFINITY, |event| event.place);
    for event in events {
        let limit = matches!(event.kind, EventKind::Limit(_)) && event.kind != lost.kind;
        if limit && event.place >= lost.place && event.place < end {
            event.reached = lost.reached;
            event.bracket = lost.bracket;
            event.in_jump = true;
        }
    }
}
