//! Names of limits and of points on a path, as people say them.

use crate::result::LimitKind;

/// The limit inside a sentence.
pub fn phrase(limit: LimitKind) -> &'static str {
    match limit {
        LimitKind::Critical => "the critical deflection of the perfect column as built",
        LimitKind::DeadLoadLost => "the loss of the dead load",
        LimitKind::TravelLost => "the loss of the set travel",
        LimitKind::Bow => "the bow limit",
        LimitKind::RateLost => "the loss of axial rate",
        LimitKind::Stress => "the static wire stress",
        LimitKind::Clash => "the first clash of coils on the inside of the bow",
        LimitKind::LiftOff => "the lift-off of an end from its seat",
        LimitKind::Slide => "the sliding of an end on its seat",
        LimitKind::GuideTouch => "the touch of a guide",
        LimitKind::BoreFilled => "the coil filling its bore",
        LimitKind::Solid => "the solid length",
    }
}

/// The name of a mark on a path: a limit's title, or what else its key stands for.
pub fn mark_title(key: &str) -> String {
    if let Some(limit) = LimitKind::ALL.iter().find(|limit| limit.key() == key) {
        return limit.title().to_string();
    }
    match key {
        "branch_point" => "branch point of the path".to_string(),
        "largest_force" => "largest force".to_string(),
        "largest_travel" => "largest travel".to_string(),
        "force_regained" => "rests again, same force".to_string(),
        "travel_regained" => "rests again, same travel".to_string(),
        "installed" => "installed".to_string(),
        "working" => "working point".to_string(),
        "seated" => "flat ends sit flush".to_string(),
        "first_touch" => "first touch of a guide".to_string(),
        "line_contact" => "more than one coil leans".to_string(),
        "second_place" => "leans at another place".to_string(),
        "loose_flat" => "flat stretch could leave the guide".to_string(),
        other => other.replace('_', " "),
    }
}
