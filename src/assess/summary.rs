//! What is told of the imperfect column, and its path with its marks.

use super::events::EventKind;
use super::imperfect::Imperfect;
use super::straight::measure;
use crate::result::{Computed, ImperfectColumn, Limit, Mark, Path};
use crate::setup::{LimitKind, Loading, Orientation, Setup};

impl Imperfect {
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
            LimitKind::LiftOff,
            LimitKind::Slide,
            LimitKind::GuideTouch,
        ];
        let first = limits
            .iter()
            .find(|limit| own.contains(&limit.name) && limit.deflection_m.is_some());
        let working = self
            .event(setup, EventKind::LargestWorking)
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
            worst_orientation: (self.orientations_tried > 1)
                .then(|| orientation_words(setup, &self.orientation)),
            orientations_tried: self.orientations_tried,
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
        if self.fine.seen.len() < 2 {
            return "one point: it ends where it starts".into();
        }
        match (self.fine.corners.len(), bent) {
            (0, false) => "straight all the way: no imperfection acts and no branch leaves".into(),
            (0, true) => {
                "one path from the unloaded state: the imperfections bow it from the start".into()
            }
            (n, _) => format!(
                "up to a branch point, and from there on the branch that leaves to the {}, the \
                 worse or as bad as the other ({n} branch point{} met)",
                if self.orientation.branch > 0.0 {
                    "left (+y)"
                } else {
                    "right (-y)"
                },
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
        (EventKind::TravelRegained, Loading::Deflection) => "travel_regained",
        (EventKind::ForceRegained | EventKind::TravelRegained | EventKind::LargestWorking, _) => {
            return None;
        }
        (EventKind::Installed, _) => "installed",
        (EventKind::Working, _) => "working",
        (EventKind::Seated, _) => "seated",
        (EventKind::FirstTouch, _) => "first_touch",
        (EventKind::LineContact, _) => "line_contact",
        (EventKind::SecondPlace, _) => "second_place",
        (EventKind::LooseFlat, _) => "loose_flat",
    })
}

/// How the deviations lie, in words: "squareness +, bow -".
fn orientation_words(setup: &Setup, orientation: &Orientation) -> String {
    let sizes = &setup.imperfections;
    let sign = |sign: f64| if sign > 0.0 { "+" } else { "-" };
    let end = if orientation.wedge_at_top {
        "top"
    } else {
        "bottom"
    };
    [
        (
            sizes.squareness,
            format!("squareness {}", sign(orientation.squareness)),
        ),
        (
            sizes.parallelism,
            format!("parallelism {} at the {end}", sign(orientation.parallelism)),
        ),
        (sizes.bow, format!("bow {}", sign(orientation.bow))),
        (
            sizes.eccentricity,
            format!("eccentricity {}", sign(orientation.eccentricity)),
        ),
    ]
    .into_iter()
    .filter(|(size, _)| *size != 0.0)
    .map(|(_, words)| words)
    .collect::<Vec<_>>()
    .join(", ")
}
