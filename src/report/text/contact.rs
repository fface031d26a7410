//! What guides and seats bear, and what friction takes out of a stroke.

use super::limits::of_flat_ends;
use super::section;
use crate::report::Units;
use crate::report::layout::{Row, paragraph, table};
use crate::report::leaning::{Place, places};
use crate::report::losses::is_lossless;
use crate::report::numbers::{column_decimals, fixed, percent, rounded};
use crate::result::{Assessment, GuideAnswer, PathPoint, SeatLoad};

const AT_PLACES: &str = "Places along the part that deforms, from its bottom, spring unloaded: each as \
     long as the stretches that lean on the same side less than a pitch apart. Forces across the \
     guide. + and - are its two sides: + is where a positive offset of a seat points.";

/// Shares below this are round-off.
const ROUND_OFF: f64 = 1e-8;

/// What the guides do.
pub fn guides(assessment: &Assessment, units: Units) -> String {
    let Some(answer) = &assessment.guide_answer else {
        return String::new();
    };
    let mut body = paragraph("  ", &answer.sentence);
    body += &paragraph("  ", &onset(assessment, answer, units));
    body += &paragraph("  ", &at_work(assessment, answer, units));
    let mut out = section("Guides", &body);
    let places = places(&answer.leaning, assessment.spring.pitch_m);
    if !places.is_empty() {
        out += &places_table(&places, units);
    }
    out
}

/// "at 0.31 of the deformable length (47.1 mm from its bottom)".
fn place(assessment: &Assessment, share: f64, units: Units) -> String {
    format!(
        "at {} of the deformable length ({} from its bottom)",
        rounded(share),
        units.show_length(share * assessment.spring.deformable_length_m)
    )
}

/// From where on it touches, and how.
fn onset(assessment: &Assessment, answer: &GuideAnswer, units: Units) -> String {
    let Some(touch) = answer.first_touch_m else {
        return match answer.at_working.guide_room_m {
            Some(room) => format!(
                "Room left {}: {}.",
                where_told(assessment, &answer.at_working, units),
                units.show_length(room)
            ),
            None => String::new(),
        };
    };
    let mut text = if touch > 0.0 {
        let place = answer
            .first_touch_place
            .map(|share| format!(", {}", place(assessment, share, units)))
            .unwrap_or_default();
        format!("First touch at {}{place}.", units.show_length(touch))
    } else {
        "It touches before it is deflected.".to_string()
    };
    let from = |at: Option<f64>, what: &str| {
        at.map(|at| format!(" {what} from {}.", units.show_length(at)))
            .unwrap_or_default()
    };
    text += &from(
        answer.line_contact_m,
        "More than one coil leans at one place",
    );
    text += &from(
        answer.second_place_m,
        "It leans at another place too (the next mode)",
    );
    if let Some(at) = answer.loose_flat_m {
        text += &format!(
            " From {} a stretch that lies flat could leave the guide by itself, into the next mode: \
             what is told beyond is told of the mode it is in.",
            units.show_length(at)
        );
    }
    text
}

/// "at the largest working deflection, 40.50 mm", or where the path ends before.
fn where_told(assessment: &Assessment, point: &PathPoint, units: Units) -> String {
    let reached = assessment
        .imperfect_column
        .as_ref()
        .is_some_and(|column| column.bow_at_working_m.is_some());
    let at = units.show_length(point.deflection_m);
    match (reached, assessment.duty.loading.as_str()) {
        (false, _) => format!("where the path ends, at {at}"),
        (true, "force") => format!(
            "under the largest working load, {} at {at}",
            units.show_force(point.force_n)
        ),
        (true, _) => format!("at the largest working deflection, {at}"),
    }
}

/// What the guides bear at work.
fn at_work(assessment: &Assessment, answer: &GuideAnswer, units: Units) -> String {
    if answer.first_touch_m.is_none() {
        return String::new();
    }
    let point = &answer.at_working;
    let force = |value| units.show_force(value);
    let told = where_told(assessment, point, units);
    if point.guide_force_n <= 0.0 {
        let before = if answer.largest_coil_force_n > 0.0 {
            format!(
                "; on the way there one coil bore {}",
                force(answer.largest_coil_force_n)
            )
        } else {
            String::new()
        };
        return format!("It leans on no guide {told}{before}.");
    }
    let at = place(assessment, point.guide_coil_place, units);
    // Shown with four digits.
    let share = |part: f64, whole: f64| part > (1.0 - 5e-5) * whole;
    let on_one = if share(point.guide_coil_force_n, point.guide_force_n) {
        format!("all of it on one coil, {at}")
    } else {
        let most = force(point.guide_coil_force_n);
        format!("{most} of it on the coil that bears most, {at}")
    };
    let mut text = format!(
        "On the guides {told}: {} in all, {on_one}",
        force(point.guide_force_n)
    );
    if !share(point.guide_coil_force_n, answer.largest_coil_force_n) {
        text += &format!(
            " ({} on one coil on the way there)",
            force(answer.largest_coil_force_n)
        );
    }
    text += ".";
    if point.guide_corner_force_n > 0.0 {
        let part = if share(point.guide_corner_force_n, point.guide_force_n) {
            "All".to_string()
        } else {
            force(point.guide_corner_force_n)
        };
        text += &format!(
            " {part} of it rests on the corner at the end of a guide, where a coil can catch."
        );
    }
    if point.guide_friction_n != 0.0 {
        let word = if point.guide_friction_n > 0.0 {
            "less"
        } else {
            "more"
        };
        text += &format!(
            " Friction on the guides takes {}: the bottom gets {word} axial force by that than the \
             top.",
            force(point.guide_friction_n.abs())
        );
    }
    text
}

fn places_table(places: &[Place], units: Units) -> String {
    let (length, force) = (units.length(), units.force());
    let lengths = column_decimals(places.iter().map(|place| length.of(place.to_m)), 4);
    let forces = column_decimals(places.iter().map(|place| force.of(place.force_n)), 4);
    let rows: Vec<Row> = places
        .iter()
        .map(|place| Row {
            remark: if place.corner_force_n > 0.0 && !place.corner_only {
                format!("corner {}", force.show(place.corner_force_n))
            } else {
                String::new()
            },
            ..Row::of(
                format!("  {}", place.place_word()),
                vec![
                    fixed(length.of(place.from_m), lengths),
                    fixed(length.of(place.to_m), lengths),
                    place.sign().to_string(),
                    fixed(force.of(place.force_n), forces),
                ],
            )
        })
        .collect();
    let mut out = table(
        "  Where it leans there",
        &["from", "to", "side", "force"],
        &[length.symbol, length.symbol, "", force.symbol],
        &rows,
    );
    out += &paragraph("  ", AT_PLACES);
    out
}

/// What the seats bear in service.
pub fn seats(assessment: &Assessment, units: Units) -> String {
    let Some(loads) = &assessment.seat_loads else {
        return String::new();
    };
    let (length, force) = (units.length(), units.force());
    let thrusts = column_decimals(loads.iter().map(|load| force.of(load.largest_thrust_n)), 4);
    let at = column_decimals(loads.iter().map(|load| length.of(load.at_deflection_m)), 4);
    let lines = column_decimals(
        loads
            .iter()
            .flat_map(|load| [load.farthest_line_m, load.line_at_working_m])
            .flatten()
            .map(|line| length.of(line)),
        4,
    );
    let line = |value: Option<f64>| value.map_or("-".into(), |x| fixed(length.of(x), lines));
    let row = |name: &str, load: &SeatLoad| {
        Row::of(
            format!("  {name}"),
            vec![
                fixed(force.of(load.largest_thrust_n), thrusts),
                fixed(length.of(load.at_deflection_m), at),
                line(load.farthest_line_m),
                line(load.line_at_working_m),
            ],
        )
    };
    let mut out = table(
        "Seats in service",
        &[
            "largest thrust",
            "at deflection",
            "force line, farthest",
            "at working",
        ],
        &[force.symbol, length.symbol, length.symbol, length.symbol],
        &[row("bottom", &loads[0]), row("top", &loads[1])],
    );
    let ring = of_flat_ends(assessment, |support| {
        Some(length.show_input(support.seat_edge_m?))
    });
    let ring = if ring.is_empty() {
        String::new()
    } else {
        format!(
            " A flat end can stand flush while the line passes within the edge of its ring{ring}."
        )
    };
    out += &paragraph(
        "  ",
        &format!(
            "From the installed to the largest working deflection (at working), on the way out. \
             Thrust: force of the seat on the spring along the seat, positive where a positive \
             offset points. Force line: where the resultant passes the seat, from its centre.{ring}"
        ),
    );
    out
}

/// What friction takes out of a stroke.
pub fn stroke(assessment: &Assessment, units: Units) -> String {
    let Some(stroke) = &assessment.stroke else {
        return String::new();
    };
    let start = format!(
        "From {} to {} and back, the second time round, ",
        units.show_length(stroke.from_deflection_m),
        units.show_length(stroke.to_deflection_m)
    );
    let closes = if stroke.closes_within < ROUND_OFF {
        "The loop closes but for round-off.".to_string()
    } else {
        format!(
            "The loop closes to {} of the largest force.",
            percent(stroke.closes_within)
        )
    };
    let text = if is_lossless(stroke) {
        format!("{start}nothing slips and no energy is lost. {closes}")
    } else {
        let larger = stroke.energy_lost_j.abs().max(stroke.friction_work_j.abs());
        let apart = (stroke.energy_lost_j - stroke.friction_work_j).abs() / larger;
        format!(
            "{start}the spring gives back {} less than it takes: the area of the loop of force over \
             deflection. The work of friction, counted by itself place by place, is the same to {}. \
             {closes}",
            units.energy().show(stroke.energy_lost_j),
            percent(apart)
        )
    };
    section("Stroke with friction", &paragraph("  ", &text))
}
