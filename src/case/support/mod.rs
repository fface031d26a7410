//! `[bottom]` and `[top]`: what holds the ends.

mod contact;
mod law;
mod motion;
mod planes;

pub(super) use motion::check_reach;
pub(super) use planes::line_up;

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range, Rule};
use super::filled::{Filled, Log};
use crate::setup::{Restraint, Support};
use crate::spring::Spring;
use crate::units::{Dimension, MILLIMETRE, Metre};
use contact::{BALL_RADIUS, FRICTION, GROUND_SHARE, LINK_ACTS, LINK_LENGTH, PILOTED, SEAT_RADIUS};
use law::{AXIAL_LAW, ROTATIONAL_LAW, SIDEWAYS_LAW};
use motion::{LEVER, MOTION};
use planes::{OTHER_PLANE, PLANE};

static KIND: Field = Field::new(
    "kind",
    Kind::Choice(|| {
        vec![
            "clamped", "hinged", "free", "sliding", "elastic", "flat", "ball", "link",
        ]
    }),
    "clamped",
    "What the seat does to the end: clamped (held in rotation and sideways), hinged (may rotate), \
     free (may rotate and move sideways), sliding (clamped-sliding: rotation held, may move \
     sideways), elastic (held by the stiffnesses or laws given), flat (a flat ground end on a flat \
     seat, which can only push), ball (a ball or swivel, `arm` beyond the end plane, free or with \
     friction), link (loaded through a bar hinged at both ends).",
);
static ROTATIONAL: Field = Field::new(
    "rotational_stiffness",
    Kind::Stiffness {
        dimension: Dimension::ROTATIONAL_STIFFNESS,
        may_be_free: true,
    },
    "40 N m/rad",
    "With kind = \"elastic\": stiffness against rotation; \"rigid\" and \"none\" are allowed.",
)
.or(Absent::Nothing);
static SIDEWAYS: Field = Field::new(
    "sideways_stiffness",
    Kind::Stiffness {
        dimension: Dimension::STIFFNESS,
        may_be_free: true,
    },
    "8 N/mm",
    "With kind = \"elastic\": stiffness against sideways motion; \"rigid\" and \"none\" are allowed.",
)
.or(Absent::Nothing);
static AXIAL: Field = Field::new(
    "axial_stiffness",
    Kind::Stiffness {
        dimension: Dimension::STIFFNESS,
        may_be_free: false,
    },
    "500 N/mm",
    "Stiffness of the seat along the axis, in series with the spring. Any kind.",
)
.or(Absent::Value("rigid"));
static ARM: Field = Field::new(
    "arm",
    Kind::Quantity(Dimension::LENGTH, Range::Any),
    "10 mm",
    "Distance of the pivot beyond the end plane of the spring, rigidly joined to it; outward \
     positive, inward negative. Any kind but flat, which bears in the end plane.",
)
.or(Absent::Value("0 mm"));
static TILT: Field = Field::new(
    "tilt",
    Kind::Quantity(Dimension::ANGLE, Range::Any),
    "0.3 deg",
    "Angle of the seat as built, in the plane of bowing; with its sign: positive leans so that the \
     section turns towards +y.",
)
.or(Absent::Value("0 deg"));
static OFFSET: Field = Field::new(
    "offset",
    Kind::Quantity(Dimension::LENGTH, Range::Any),
    "0.2 mm",
    "Sideways position of the seat as built, in the plane of bowing; with its sign: positive is towards +y.",
)
.or(Absent::Value("0 mm"));

/// Of both ends. At the bottom those about fields that the top alone has never apply.
static RULES: [Rule; 17] = [
    Rule::OnlyWith {
        field: &KIND,
        words: &["elastic"],
        fields: &[&ROTATIONAL, &ROTATIONAL_LAW, &SIDEWAYS, &SIDEWAYS_LAW],
    },
    Rule::OneOfWith {
        field: &KIND,
        word: "elastic",
        fields: &[&ROTATIONAL, &ROTATIONAL_LAW],
    },
    Rule::OneOfWith {
        field: &KIND,
        word: "elastic",
        fields: &[&SIDEWAYS, &SIDEWAYS_LAW],
    },
    Rule::AtMostOneOf(&[&AXIAL, &AXIAL_LAW]),
    Rule::OnlyWith {
        field: &KIND,
        words: &[
            "clamped", "hinged", "free", "sliding", "elastic", "ball", "link",
        ],
        fields: &[&ARM],
    },
    Rule::OnlyWith {
        field: &KIND,
        words: &["flat"],
        fields: &[&SEAT_RADIUS, &GROUND_SHARE, &PILOTED],
    },
    Rule::OnlyWith {
        field: &KIND,
        words: &["flat", "ball"],
        fields: &[&FRICTION],
    },
    Rule::OnlyWith {
        field: &KIND,
        words: &["ball"],
        fields: &[&BALL_RADIUS],
    },
    Rule::Needs {
        field: &BALL_RADIUS,
        needed: &FRICTION,
        with: Some((&KIND, "ball")),
    },
    Rule::Needs {
        field: &FRICTION,
        needed: &BALL_RADIUS,
        with: Some((&KIND, "ball")),
    },
    Rule::OnlyWith {
        field: &KIND,
        words: &["link"],
        fields: &[&LINK_LENGTH, &LINK_ACTS],
    },
    Rule::Demands {
        field: &KIND,
        word: "link",
        needed: &LINK_LENGTH,
    },
    Rule::Demands {
        field: &KIND,
        word: "link",
        needed: &LINK_ACTS,
    },
    Rule::OnlyWith {
        field: &KIND,
        words: &["clamped", "hinged", "free", "sliding", "elastic"],
        fields: &[&PLANE, &OTHER_PLANE],
    },
    Rule::Needs {
        field: &PLANE,
        needed: &OTHER_PLANE,
        with: None,
    },
    Rule::AtMostOneOf(&[&LEVER, &MOTION]),
    Rule::OnlyWith {
        field: &KIND,
        words: &["clamped", "hinged", "elastic", "flat", "ball"],
        fields: &[&LEVER, &MOTION],
    },
];

pub(super) static BOTTOM: Form = Form {
    doc: "What holds the bottom of the spring.",
    fields: &[
        &KIND,
        &ROTATIONAL,
        &ROTATIONAL_LAW,
        &SIDEWAYS,
        &SIDEWAYS_LAW,
        &AXIAL,
        &AXIAL_LAW,
        &ARM,
        &TILT,
        &OFFSET,
        &SEAT_RADIUS,
        &GROUND_SHARE,
        &PILOTED,
        &FRICTION,
        &BALL_RADIUS,
        &LINK_LENGTH,
        &LINK_ACTS,
        &PLANE,
        &OTHER_PLANE,
    ],
    rules: &RULES,
};

pub(super) static TOP: Form = Form {
    doc: "What holds the top of the spring, where the load comes in.",
    fields: &[
        &KIND,
        &ROTATIONAL,
        &ROTATIONAL_LAW,
        &SIDEWAYS,
        &SIDEWAYS_LAW,
        &AXIAL,
        &AXIAL_LAW,
        &ARM,
        &TILT,
        &OFFSET,
        &SEAT_RADIUS,
        &GROUND_SHARE,
        &PILOTED,
        &FRICTION,
        &BALL_RADIUS,
        &LINK_LENGTH,
        &LINK_ACTS,
        &PLANE,
        &OTHER_PLANE,
        &LEVER,
        &MOTION,
    ],
    rules: &RULES,
};

/// Reads the support of `spring`, of which only what depends on it needs to be known.
pub(super) fn support(filled: &Filled, spring: Option<&Spring>, log: &mut Log) -> Option<Support> {
    let kind = filled.word(&KIND, log);
    let flat = kind.as_deref() == Some("flat");
    let axial = law::restraint(filled, &AXIAL, &AXIAL_LAW, log);
    let arm = if flat {
        Some(0.0)
    } else {
        filled.number(&ARM, log)
    };
    let tilt = filled.number(&TILT, log);
    let offset = filled.number(&OFFSET, log);
    let motion = motion::motion(filled, log);
    let planes = planes::planes(filled, log);
    let held = match kind?.as_str() {
        "flat" => contact::flat(filled, spring, log),
        "ball" => contact::ball(filled, log),
        "link" => contact::link(filled, log),
        word => sideways_and_turning(word, filled, log).map(|(rotation, sideways)| Support {
            rotation,
            sideways,
            ..Support::clamped()
        }),
    };
    let (plane, other_plane) = planes?;
    let support = Support {
        axial: axial?,
        arm: arm?,
        tilt: tilt?,
        offset: offset?,
        motion: motion?,
        plane,
        other_plane,
        ..held?
    };
    motion::check_led(filled, &support, log).then_some(support)
}

/// Restraints of rotation and of sideways motion by their word.
fn sideways_and_turning(
    word: &str,
    filled: &Filled,
    log: &mut Log,
) -> Option<(Restraint, Restraint)> {
    Some(match word {
        "clamped" => (Restraint::Held, Restraint::Held),
        "hinged" => (Restraint::Free, Restraint::Held),
        "free" => (Restraint::Free, Restraint::Free),
        "sliding" => (Restraint::Held, Restraint::Free),
        _ => {
            let rotation = law::restraint(filled, &ROTATIONAL, &ROTATIONAL_LAW, log);
            let sideways = law::restraint(filled, &SIDEWAYS, &SIDEWAYS_LAW, log);
            (rotation?, sideways?)
        }
    })
}

/// Notes an inward arm that reaches beyond the middle of the spring; says whether the arm is sound.
pub(super) fn check_arm(
    filled: &Filled,
    support: &Support,
    free_length: Metre,
    log: &mut Log,
) -> bool {
    let sound = support.arm >= -free_length / 2.0;
    if !sound {
        log.mistakes.push(Mistake::at(
            filled.at(&ARM),
            format!(
                "the inward arm reaches beyond the middle of the spring, whose free length is {}",
                MILLIMETRE.show(free_length, 4)
            ),
            "an inward arm is negative and at most half the free length; outward ones are positive",
        ));
    }
    sound
}

/// The mistake of two supports that together do not hold the spring.
pub(super) fn not_held(bottom: &Filled, top: &Filled) -> Mistake {
    Mistake::at(
        top.at(&KIND),
        "these two supports do not hold the spring: unloaded already it could move sideways or tip over",
        "clamp one end; or let both be held sideways (hinged); or let one be hinged and the other sliding",
    )
    .label("the top")
    .also(bottom.at(&KIND), "the bottom")
}

/// Where `kind` stands, to show beside what contradicts it.
pub(super) fn place_of_kind(filled: &Filled) -> super::diagnostics::Place {
    filled.at(&KIND)
}
