//! `[[guide]]`: rods and bores that the spring may lean on.

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range};
use super::filled::{Filled, Log};
use super::form;
use crate::setup::{Contact, FixedTo, Guide, GuideKind, Restraint, Support};
use crate::spring::Spring;
use crate::units::{Dimension, MILLIMETRE, Metre};

/// Most guides of a case.
pub(super) const MOST: usize = 4;

/// Handbook rule for the diametral clearance of rods and bores: this share of the mean diameter
/// below [`SMALL`], else [`SHARE`]. From memory.
const SHARE_OF_SMALL: f64 = 0.1;
const SHARE: f64 = 0.05;
const SMALL: Metre = 13e-3;

static KIND: Field = Field::new(
    "kind",
    Kind::Choice(|| vec!["rod", "bore"]),
    "rod",
    "rod (a mandrel or pilot inside the coil) or bore (a tube or pocket around it).",
);
static DIAMETER: Field = Field::new(
    "diameter",
    Kind::Quantity(Dimension::LENGTH, Range::Positive),
    "50 mm",
    "Diameter of the rod or bore, at service temperature.",
);
static FIXED_TO: Field = Field::new(
    "fixed_to",
    Kind::Choice(|| vec!["ground", "bottom", "top"]),
    "ground",
    "What carries it: the ground (in line with the true axis), or the bottom or top seat, whose \
     tilt and motion it shares.",
)
.or(Absent::Value("ground"));
static FROM: Field = Field::new(
    "from",
    Kind::Quantity(Dimension::LENGTH, Range::NotNegative),
    "0 mm",
    "Where it begins, counted from the bottom seat; with fixed_to = \"top\" from the top seat, downwards.",
)
.or(Absent::Value("0 mm"));
static TO: Field = Field::new(
    "to",
    Kind::Quantity(Dimension::LENGTH, Range::Positive),
    "60 mm",
    "Where it ends, counted from there: a pilot that stops short.",
)
.or(Absent::Rule("along the whole spring"));
static FRICTION: Field = Field::new(
    "friction",
    Kind::Number(Range::BelowOne),
    "0.12",
    "Coefficient of friction between coil and guide. With fixed_to = \"top\" the case is computed \
     turned over, bottom and top exchanged.",
)
.or(Absent::Value("0"));
static TOUCHING: Field = Field::new(
    "touching",
    Kind::Choice(|| vec!["allowed", "not-allowed"]),
    "allowed",
    "Whether the spring may lean on it in service. Not allowed, first touch is a limit: the \
     cautious reading where nothing is said.",
)
.or(Absent::Value("not-allowed"));

pub(super) static FORM: Form = Form {
    doc: "A rod inside the spring or a bore around it. [[guide]] may stand up to four times.",
    fields: &[
        &KIND, &DIAMETER, &FIXED_TO, &FROM, &TO, &FRICTION, &TOUCHING,
    ],
    rules: &[],
};

/// Reads the guides. What can be checked without the spring or the seats is, where these are not
/// known for their own mistakes.
pub(super) fn guides(
    file: &Filled,
    spring: Option<&Spring>,
    seats: [Option<&Support>; 2],
    log: &mut Log,
) -> Option<Vec<Guide>> {
    if !file.is_given(&form::GUIDE) {
        return Some(Vec::new());
    }
    let rows = file.rows(&form::GUIDE)?;
    let guides: Vec<Option<Guide>> = rows
        .iter()
        .map(|row| {
            let guide = guide(row, log)?;
            let reaches = spring.is_none_or(|s| check_reach(row, &guide, s.free_length, log));
            let fits = spring.is_none_or(|s| check_clearance(row, &guide, s, log));
            let carried = check_seat(row, &guide, file, seats, log);
            (reaches && fits && carried).then_some(guide)
        })
        .collect();
    let guides: Option<Vec<Guide>> = guides.into_iter().collect();
    let guides = guides?;
    let rubbing = rows
        .iter()
        .zip(&guides)
        .find(|(_, guide)| rubs_on_top(guide));
    let stays = |guide: &Guide| match guide.fixed_to {
        FixedTo::Top => false,
        FixedTo::Bottom => guide.friction > 0.0,
        FixedTo::Ground => true,
    };
    if let Some((row, _)) = rubbing
        && guides.iter().any(stays)
    {
        log.mistakes.push(Mistake::at(
            row.at(&FRICTION),
            "friction on a guide that the top seat carries is not computed beside a guide that stays \
             where it is",
            "leave the friction of one of them out",
        ));
        return None;
    }
    Some(guides)
}

/// Whether a guide rubs that moves with the top seat: such a case is computed turned over.
pub(super) fn rubs_on_top(guide: &Guide) -> bool {
    guide.fixed_to == FixedTo::Top && guide.friction > 0.0
}

fn guide(row: &Filled, log: &mut Log) -> Option<Guide> {
    let kind = row.word(&KIND, log);
    let diameter = row.number(&DIAMETER, log);
    let fixed_to = row.word(&FIXED_TO, log);
    let from = row.number(&FROM, log);
    let to = if row.is_given(&TO) {
        row.number(&TO, log)
    } else {
        row.note_default(&TO, log);
        Some(f64::INFINITY)
    };
    let friction = row.number(&FRICTION, log);
    let touching = row.word(&TOUCHING, log);
    let guide = Guide {
        kind: match kind?.as_str() {
            "bore" => GuideKind::Bore,
            _ => GuideKind::Rod,
        },
        diameter: diameter?,
        fixed_to: match fixed_to?.as_str() {
            "bottom" => FixedTo::Bottom,
            "top" => FixedTo::Top,
            _ => FixedTo::Ground,
        },
        from: from?,
        to: to?,
        friction: friction?,
        touching_allowed: touching?.as_str() == "allowed",
    };
    if guide.from >= guide.to {
        log.mistakes.push(
            Mistake::at(
                row.at(&TO),
                "the guide ends where it begins, or before",
                "both are counted from the same seat: `to` must be above `from`",
            )
            .also(row.at(&FROM), "it begins here"),
        );
        return None;
    }
    Some(guide)
}

fn check_reach(row: &Filled, guide: &Guide, free_length: Metre, log: &mut Log) -> bool {
    let sound = guide.from < free_length;
    if !sound {
        log.mistakes.push(Mistake::at(
            row.at(&FROM),
            format!(
                "the guide never meets the spring: it begins beyond the free length, {}",
                MILLIMETRE.show(free_length, 4)
            ),
            "count `from` from the seat: the bottom one, or the top one with fixed_to = \"top\"",
        ));
    }
    sound
}

fn check_clearance(row: &Filled, guide: &Guide, spring: &Spring, log: &mut Log) -> bool {
    let clearance = 2.0 * guide.clearance(spring, 1.0);
    let (what, coil, cure) = match guide.kind {
        GuideKind::Rod => (
            "the rod does not go into the unloaded spring: the coil's inner diameter is",
            spring.inner_diameter(),
            "smaller",
        ),
        GuideKind::Bore => (
            "the unloaded spring does not go into the bore: the coil's outer diameter is",
            spring.outer_diameter(),
            "larger",
        ),
    };
    if clearance <= 0.0 {
        log.mistakes.push(Mistake::at(
            row.at(&DIAMETER),
            format!("{what} {}", MILLIMETRE.show(coil, 4)),
            format!("the guide's diameter must be {cure}: check both"),
        ));
        return false;
    }
    let share = if spring.mean_diameter < SMALL {
        SHARE_OF_SMALL
    } else {
        SHARE
    };
    let usual = share * spring.mean_diameter;
    // Room for the rounding of a drawing that keeps exactly to the rule.
    if clearance < usual * (1.0 - 1e-9) {
        log.warnings.push(format!(
            "{}: its diametral clearance, {}, is below the handbooks' {share} of the mean diameter, \
             {} (from memory)",
            row.title(),
            MILLIMETRE.show(clearance, 3),
            MILLIMETRE.show(usual, 3)
        ));
    }
    true
}

/// A guide turns and moves with its seat: the seat must hold the end, so that its pose is known.
fn check_seat(
    row: &Filled,
    guide: &Guide,
    file: &Filled,
    seats: [Option<&Support>; 2],
    log: &mut Log,
) -> bool {
    let on_an_arc = seats[1].is_some_and(|top| top.motion.is_some());
    if rubs_on_top(guide) && on_an_arc {
        log.mistakes.push(Mistake::at(
            row.at(&FRICTION),
            "friction on a guide that a seat on an arc carries is not computed",
            "leave its friction out, or fix it to the ground",
        ));
        return false;
    }
    let (seat, field) = match guide.fixed_to {
        FixedTo::Ground => return true,
        FixedTo::Bottom => (seats[0], &form::BOTTOM),
        FixedTo::Top => (seats[1], &form::TOP),
    };
    let holds = |seat: &Support| {
        seat.rotation == Restraint::Held
            && seat.sideways == Restraint::Held
            && matches!(seat.contact, Contact::Joined | Contact::Flat(_))
    };
    let sound =
        seat.is_none_or(|seat| holds(&seat.in_first_plane()) && holds(&seat.in_other_plane()));
    if !sound {
        let mistake = Mistake::at(
            row.at(&FIXED_TO),
            format!(
                "a guide cannot be fixed to a seat that gives way: [{}] is not clamped or flat",
                field.key
            ),
            "fix it to the ground, or clamp the seat",
        );
        log.mistakes.push(match file.table(field) {
            Some(table) => {
                mistake.also(super::support::place_of_kind(table), "the kind is set here")
            }
            None => mistake,
        });
    }
    sound
}
