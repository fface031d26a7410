//! Supports and guides as resolved.

use super::inputs::Input;
use crate::report::Units;
use crate::report::numbers::{Unit, percent_input, shortest};
use crate::result::{
    ForceLawPoint, GuideEcho, LateralEcho, MomentLawPoint, MotionEcho, SupportEcho,
};

/// How an end is held, how it sits, and what its seat does.
pub fn support(place: &str, support: &SupportEcho, units: Units) -> Vec<Input> {
    let keys = |names: &[&str]| names.iter().map(|name| format!("{place}.{name}")).collect();
    let mut inputs = vec![
        Input {
            keys: keys(&["kind"]),
            label: format!("{place} support"),
            value: kind(support, units),
        },
        Input {
            keys: keys(&["arm", "tilt", "offset"]),
            label: format!("{place} seat"),
            value: format!(
                "arm {}, {}",
                units.length().show_input(support.arm_m),
                pose(support.tilt_rad, support.offset_m, units)
            ),
        },
    ];
    if let Some(value) = contact(support, units) {
        inputs.push(Input {
            keys: keys(&["seat_radius", "ground_share", "friction", "ball_radius"]),
            label: format!("{place} contact"),
            value,
        });
    }
    if let Some(link) = &support.link {
        inputs.push(Input {
            keys: keys(&["link"]),
            label: format!("{place} link"),
            value: format!(
                "a {} of {} between its hinges",
                link.kind,
                units.length().show_input(link.length_m)
            ),
        });
    }
    if let Some(seat) = &support.motion {
        inputs.push(Input {
            keys: keys(&["lever", "motion"]),
            label: format!("{place} seat moves"),
            value: motion(seat, units),
        });
    }
    if let Some(other) = &support.other_plane {
        inputs.push(Input {
            keys: keys(&["other_plane", "plane"]),
            label: format!("{place}, other plane"),
            value: other_plane(other, support.plane_rad, units),
        });
    }
    inputs
}

fn kind(support: &SupportEcho, units: Units) -> String {
    let plain = ["clamped", "hinged", "free", "sliding"].contains(&support.kind.as_str());
    let held = support.rotational_stiffness_n_m_per_rad.is_none()
        && support.sideways_stiffness_n_per_m.is_none();
    let mut text = support.kind.clone();
    if !plain && !held {
        text += &format!(
            ": {}",
            held_by(
                support.rotational_stiffness_n_m_per_rad,
                support.rotational_law.as_deref(),
                support.sideways_stiffness_n_per_m,
                support.sideways_law.as_deref(),
                units
            )
        );
    }
    if let Some(law) = &support.axial_law {
        text += &format!(", gives along the axis by {}", force_law(law, units));
    } else if let Some(axial) = support.axial_stiffness_n_per_m {
        text += &format!(
            ", gives along the axis with {}",
            units.rate().show_input(axial)
        );
    }
    text
}

/// "rotation held, sideways 12 N/mm".
fn held_by(
    rotation: Option<f64>,
    rotational_law: Option<&[MomentLawPoint]>,
    sideways: Option<f64>,
    sideways_law: Option<&[ForceLawPoint]>,
    units: Units,
) -> String {
    let stiffness = |value: Option<f64>, unit: Unit| match value {
        None => "held".to_string(),
        Some(0.0) => "free".to_string(),
        Some(value) => unit.show_input(value),
    };
    let rotation = rotational_law.map_or_else(
        || stiffness(rotation, units.rotational_stiffness()),
        |law| format!("by {}", moment_law(law, units)),
    );
    let sideways = sideways_law.map_or_else(
        || stiffness(sideways, units.rate()),
        |law| format!("by {}", force_law(law, units)),
    );
    format!("rotation {rotation}, sideways {sideways}")
}

/// "the law 0 mm 0 N, 1 mm 20 N, …".
fn force_law(law: &[ForceLawPoint], units: Units) -> String {
    let points = law.iter().map(|point| {
        (
            units.length().show_input(point.motion_m),
            units.force().show_input(point.force_n),
        )
    });
    table(points)
}

fn moment_law(law: &[MomentLawPoint], units: Units) -> String {
    let points = law.iter().map(|point| {
        (
            units.show_angle(point.rotation_rad),
            units.moment().show_input(point.moment_n_m),
        )
    });
    table(points)
}

fn table(points: impl Iterator<Item = (String, String)>) -> String {
    let points: Vec<String> = points.map(|(at, value)| format!("{at}: {value}")).collect();
    format!("the law ({})", points.join(", "))
}

fn pose(tilt: f64, offset: f64, units: Units) -> String {
    format!(
        "tilt {}, offset {}",
        units.show_angle(tilt),
        units.length().show_input(offset)
    )
}

fn contact(support: &SupportEcho, units: Units) -> Option<String> {
    let length = units.length();
    match support.contact.as_str() {
        "flat" => {
            let mut text = "flat, can only push".to_string();
            if let Some(radius) = support.seat_radius_m {
                text += &format!(", bears at the radius {}", length.show_input(radius));
            }
            if let Some(share) = support.ground_share {
                text += &format!(", {} of a turn ground", percent_input(share));
            }
            text += &match support.friction {
                Some(friction) => format!(", friction {}", shortest(friction)),
                None => ", does not slide".to_string(),
            };
            Some(text)
        }
        "ball" => {
            let mut text = "ball or swivel".to_string();
            if let Some(radius) = support.swivel_radius_m {
                text += &format!(" of radius {}", length.show_input(radius));
            }
            if let Some(friction) = support.friction {
                text += &format!(", friction {}", shortest(friction));
            }
            Some(text)
        }
        _ => None,
    }
}

fn motion(motion: &MotionEcho, units: Units) -> String {
    let length = units.length();
    if let (Some(along), Some(across)) = (motion.pivot_along_m, motion.pivot_across_m) {
        return format!(
            "on a lever whose pivot lies {} along the axis and {} across from the seat",
            length.show_input(along),
            length.show_input(across)
        );
    }
    let points: Vec<String> = motion
        .table
        .iter()
        .map(|point| {
            format!(
                "at {} {}",
                length.show_input(point.travel_m),
                pose(point.tilt_rad, point.offset_m, units)
            )
        })
        .collect();
    points.join("; ")
}

fn other_plane(other: &LateralEcho, plane: f64, units: Units) -> String {
    let held = held_by(
        other.rotational_stiffness_n_m_per_rad,
        other.rotational_law.as_deref(),
        other.sideways_stiffness_n_per_m,
        other.sideways_law.as_deref(),
        units,
    );
    format!(
        "{held}, {}; the first plane lies at {}",
        pose(other.tilt_rad, other.offset_m, units),
        units.show_angle(plane)
    )
}

/// Rods and bores.
pub fn guides(guides: &[GuideEcho], units: Units) -> Vec<Input> {
    let length = units.length();
    guides
        .iter()
        .map(|guide| {
            let reach = match guide.to_m {
                None if guide.from_m == 0.0 => "over the whole length".to_string(),
                None => format!("from {} on", length.show_input(guide.from_m)),
                Some(to) => format!(
                    "from {} to {}",
                    length.show_input(guide.from_m),
                    length.show_input(to)
                ),
            };
            let touching = if guide.touching_allowed {
                "touching allowed"
            } else {
                "touching not allowed"
            };
            Input {
                keys: Vec::new(),
                label: guide.kind.clone(),
                value: format!(
                    "diameter {}, clearance around {} free and {} closed, {reach}, fixed to {}, \
                     friction {}, {touching}",
                    length.show_input(guide.diameter_m),
                    length.show_rounded(guide.clearance_free_m),
                    length.show_rounded(guide.clearance_closed_m),
                    fixed_to(&guide.fixed_to),
                    shortest(guide.friction)
                ),
            }
        })
        .collect()
}

fn fixed_to(what: &str) -> String {
    match what {
        "ground" => "the ground".to_string(),
        end => format!("the {end} seat"),
    }
}
