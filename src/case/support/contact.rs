//! Seats that can only push, balls with friction, links.

use super::super::diagnostics::Mistake;
use super::super::field::{Absent, Field, Kind, Range};
use super::super::filled::{Filled, Log};
use crate::setup::{Contact, FlatSeat, Link, Support, Swivel};
use crate::spring::{EndType, Spring};
use crate::units::{Dimension, MILLIMETRE, Metre};

const LENGTH: Kind = Kind::Quantity(Dimension::LENGTH, Range::Positive);

pub(super) static SEAT_RADIUS: Field = Field::new(
    "seat_radius",
    LENGTH,
    "31 mm",
    "With kind = \"flat\": radius of the ring on which the end bears. The end lifts off where the \
     force line leaves it.",
)
.or(Absent::Rule("the coil's mean radius"));
pub(super) static GROUND_SHARE: Field = Field::new(
    "ground_share",
    Kind::Share(Range::MoreThanHalf),
    "0.75",
    "With kind = \"flat\": share of a turn that is ground and bears, above 0.5. Less brings the edge \
     nearer to the centre; at one half it would have come there.",
)
.or(Absent::Value("1"));
pub(super) static PILOTED: Field = Field::new(
    "piloted",
    Kind::Flag,
    "true",
    "With kind = \"flat\": whether a pilot or recess keeps the end from sliding. No friction is \
     needed then.",
)
.or(Absent::Value("false"));
pub(super) static FRICTION: Field = Field::new(
    "friction",
    Kind::Number(Range::BelowOne),
    "0.12",
    "Coefficient of friction. With kind = \"flat\": between end and seat; left out, sliding is not \
     checked. With kind = \"ball\": in the ball, beside ball_radius; left out, the ball turns freely.",
)
.or(Absent::Nothing);
pub(super) static BALL_RADIUS: Field = Field::new(
    "ball_radius",
    LENGTH,
    "8 mm",
    "With kind = \"ball\" and friction: radius at which the friction acts, of the ball.",
)
.or(Absent::Nothing);
pub(super) static LINK_LENGTH: Field = Field::new(
    "link_length",
    LENGTH,
    "80 mm",
    "With kind = \"link\": length of the bar between its two hinges. The far hinge is held sideways.",
)
.or(Absent::Nothing);
pub(super) static LINK_ACTS: Field = Field::new(
    "link_acts",
    Kind::Choice(|| vec!["strut", "hanger"]),
    "strut",
    "With kind = \"link\": strut (the bar pushes, its far hinge lies beyond the end) or hanger (the \
     bar pulls, its far hinge lies on the spring's side).",
)
.or(Absent::Nothing);

/// A flat ground end on a flat seat.
pub(super) fn flat(filled: &Filled, spring: Option<&Spring>, log: &mut Log) -> Option<Support> {
    let title = filled.title();
    let radius = radius(filled, spring, log);
    let ground_share = filled.number(&GROUND_SHARE, log);
    let piloted = filled.flag(&PILOTED, log);
    let friction = filled.number(&FRICTION, log);
    if piloted == Some(true) && filled.is_given(&FRICTION) {
        log.mistakes.push(
            Mistake::at(
                filled.at(&FRICTION),
                "`friction` contradicts piloted = true: a piloted end does not slide",
                "remove `friction`, or set piloted = false to have sliding checked",
            )
            .also(filled.at(&PILOTED), "piloted is set here"),
        );
        return None;
    }
    if piloted == Some(false) && !filled.is_given(&FRICTION) {
        log.warnings.push(format!(
            "{title} is flat and not piloted, and its friction is not given: whether the end slides \
             on its seat is not checked"
        ));
    }
    if let Some(ends) = spring.map(|spring| spring.ends)
        && ends != EndType::ClosedGround
    {
        log.warnings.push(format!(
            "{title} is flat, but the spring's ends are {}: only a closed and ground end bears on a \
             flat seat all round",
            ends.word()
        ));
    }
    Some(Support::flat(FlatSeat {
        radius: radius?,
        ground_share: ground_share?,
        friction,
    }))
}

fn radius(filled: &Filled, spring: Option<&Spring>, log: &mut Log) -> Option<Metre> {
    if !filled.is_given(&SEAT_RADIUS) {
        filled.note_default(&SEAT_RADIUS, log);
        return spring.map(Spring::mean_radius);
    }
    let radius = filled.number(&SEAT_RADIUS, log)?;
    let most = spring.map(|spring| 0.5 * spring.outer_diameter());
    if let Some(most) = most
        && radius > most * (1.0 + 1e-9)
    {
        log.mistakes.push(Mistake::at(
            filled.at(&SEAT_RADIUS),
            format!(
                "the end cannot bear beyond the coil's outer radius, {}",
                MILLIMETRE.show(most, 4)
            ),
            "give a radius, not a diameter; or leave it out: the coil's mean radius is taken",
        ));
        return None;
    }
    Some(radius)
}

/// A ball or swivel.
pub(super) fn ball(filled: &Filled, log: &mut Log) -> Option<Support> {
    let friction = filled.number(&FRICTION, log);
    let radius = filled.number(&BALL_RADIUS, log);
    let contact = match (friction, radius) {
        (Some(0.0), Some(_)) => Contact::Joined,
        (Some(friction), Some(radius)) => Contact::Swivel(Swivel { friction, radius }),
        // One without the other, or one that cannot be read, is a mistake noted already.
        _ if filled.is_given(&FRICTION) || filled.is_given(&BALL_RADIUS) => return None,
        _ => Contact::Joined,
    };
    Some(Support {
        contact,
        ..Support::hinged()
    })
}

/// A link.
pub(super) fn link(filled: &Filled, log: &mut Log) -> Option<Support> {
    let length = filled.number(&LINK_LENGTH, log);
    let acts = filled.word(&LINK_ACTS, log);
    Some(Support {
        link: Some(Link {
            length: length?,
            hanging: acts?.as_str() == "hanger",
        }),
        ..Support::free()
    })
}
