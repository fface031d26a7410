//! What seats and guides bear in service.

use super::events::EventKind;
use super::imperfect::Imperfect;
use crate::result::{GuideAnswer, Limit, PathPoint, SeatLoad};
use crate::setup::{LimitKind, Setup};

/// Share of the working force below which the place of a force line means nothing.
const CARRIES: f64 = 0.05;
/// Limits that the column itself sets.
const OF_THE_PATH: [LimitKind; 7] = [
    LimitKind::Bow,
    LimitKind::RateLost,
    LimitKind::DeadLoadLost,
    LimitKind::TravelLost,
    LimitKind::Stress,
    LimitKind::Clash,
    LimitKind::LiftOff,
];

/// The path up to the largest working deflection, that point included.
fn up_to_working(imperfect: &Imperfect) -> Vec<PathPoint> {
    let path = &imperfect.fine;
    let Some(working) = path.event(EventKind::LargestWorking) else {
        return path.seen.iter().map(|seen| seen.point).collect();
    };
    path.seen
        .iter()
        .take(working.place.floor() as usize + 1)
        .map(|seen| seen.point)
        .chain([working.point])
        .collect()
}

/// What the guides do.
pub(super) fn guides(
    setup: &Setup,
    imperfect: &Imperfect,
    limits: &[Limit],
) -> Option<GuideAnswer> {
    if setup.guides.is_empty() {
        return None;
    }
    let path = &imperfect.fine;
    let way = up_to_working(imperfect);
    let at_working = *way.last()?;
    let at = |kind: EventKind| path.event(kind).map(|event| event.reached.0);
    let touch = path.event(EventKind::FirstTouch);
    let bare = Setup {
        guides: Vec::new(),
        ..setup.clone()
    };
    let without = super::imperfect::run(&bare);
    let bare_limits = super::limits::collect(&bare, None, &without);
    let first = |limits: &[Limit]| {
        limits
            .iter()
            .filter(|limit| OF_THE_PATH.contains(&limit.name))
            .find_map(|limit| Some((limit.name, limit.deflection_m?, limit.share_of_free_length?)))
    };
    let (with, bare_first) = (first(limits), first(&bare_limits));
    Some(GuideAnswer {
        first_touch_m: touch.map(|event| event.reached.0),
        first_touch_place: touch.and_then(|event| event.point.guide_tightest_place),
        line_contact_m: at(EventKind::LineContact),
        second_place_m: at(EventKind::SecondPlace),
        loose_flat_m: at(EventKind::LooseFlat),
        at_working,
        leaning: path
            .event(EventKind::LargestWorking)
            .map(|event| event.leaning.clone())
            .unwrap_or_default(),
        largest_coil_force_n: way
            .iter()
            .map(|point| point.guide_coil_force_n)
            .fold(0.0, f64::max),
        deepest_m: path
            .seen
            .iter()
            .filter_map(|seen| seen.point.guide_room_m)
            .fold(0.0, |deepest: f64, room| deepest.max(-room)),
        without_first_limit: bare_first.map(|first| first.0),
        without_first_limit_m: bare_first.map(|first| first.1),
        sentence: sentence(touch.is_some(), with, bare_first) + told_of(imperfect),
    })
}

/// A limit, its deflection, m, and the spring's share of it in its free length.
type FirstLimit = (LimitKind, f64, f64);

/// What the guides did to the answer.
fn sentence(touched: bool, with: Option<FirstLimit>, without: Option<FirstLimit>) -> String {
    let share = |share: f64| 100.0 * share;
    if !touched {
        return "The spring never touches its guide on the path computed: the guide changes nothing."
            .to_owned();
    }
    match (without, with) {
        (None, None) => {
            "With the guide or without, the column sets no limit before solid.".to_owned()
        }
        (Some((kind, _, at)), None) => format!(
            "Without the guide the first limit of the column ({}) would come at {:.1} % of the free \
             length; with it none comes before solid.",
            kind.title(),
            share(at)
        ),
        (None, Some((kind, _, at))) => format!(
            "Without the guide the column would set no limit before solid; with it the first ({}) \
             comes at {:.1} % of the free length.",
            kind.title(),
            share(at)
        ),
        (Some((bare, _, before)), Some((kind, _, at))) => format!(
            "Without the guide the first limit of the column ({}) would come at {:.1} % of the free \
             length; with it the first ({}) comes at {:.1} %.",
            bare.title(),
            share(before),
            kind.title(),
            share(at)
        ),
    }
}

/// Of which way to lie all this is told.
fn told_of(imperfect: &Imperfect) -> &'static str {
    if imperfect.orientations_tried > 1 {
        " (Told of the worst way in which the deviations can lie; in others it may touch sooner.)"
    } else {
        ""
    }
}

/// What the bottom and the top seat bear.
pub(super) fn seats(setup: &Setup, imperfect: &Imperfect) -> Option<[SeatLoad; 2]> {
    let way = up_to_working(imperfect);
    let working = *way.last()?;
    let installed = setup.duty.installed_deflection;
    let start = imperfect.fine.event(EventKind::Installed).map(|e| e.point);
    let in_service: Vec<&PathPoint> = way
        .iter()
        .chain(&start)
        .filter(|point| {
            point.deflection_m >= installed && point.force_n >= CARRIES * working.force_n
        })
        .collect();
    let load = |thrust: fn(&PathPoint) -> f64, line: fn(&PathPoint) -> Option<f64>| {
        let worst = in_service
            .iter()
            .max_by(|a, b| thrust(a).abs().total_cmp(&thrust(b).abs()))?;
        let farthest = in_service
            .iter()
            .filter_map(|point| line(point))
            .max_by(|a, b| a.abs().total_cmp(&b.abs()));
        Some(SeatLoad {
            largest_thrust_n: thrust(worst),
            at_deflection_m: worst.deflection_m,
            farthest_line_m: farthest,
            line_at_working_m: line(&working),
        })
    };
    Some([
        load(|p| p.bottom_thrust_n, |p| p.bottom_line_m)?,
        load(|p| p.top_thrust_n, |p| p.top_line_m)?,
    ])
}
