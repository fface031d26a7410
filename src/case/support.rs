//! `[bottom]` and `[top]`: what holds the ends.

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range, Rule};
use super::filled::{Filled, Log};
use crate::setup::{Restraint, Support};
use crate::units::{Dimension, MILLIMETRE, Metre};

static KIND: Field = Field::new(
    "kind",
    Kind::Choice(|| vec!["clamped", "hinged", "free", "sliding", "elastic"]),
    "clamped",
    "What the seat does to the end: clamped (held in rotation and sideways), hinged (may rotate), \
     free (may rotate and move sideways), sliding (clamped-sliding: rotation held, may move \
     sideways), elastic (held by the stiffnesses given).",
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
     positive, inward negative.",
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

pub(super) static FORM: Form = Form {
    doc: "What holds this end of the spring.",
    fields: &[&KIND, &ROTATIONAL, &SIDEWAYS, &AXIAL, &ARM, &TILT, &OFFSET],
    rules: &[Rule::OnlyWith {
        field: &KIND,
        word: "elastic",
        fields: &[&ROTATIONAL, &SIDEWAYS],
    }],
};

/// Reads a support.
pub(super) fn support(filled: &Filled, log: &mut Log) -> Option<Support> {
    let kind = filled.word(&KIND, log);
    let axial = filled.number(&AXIAL, log);
    let arm = filled.number(&ARM, log);
    let tilt = filled.number(&TILT, log);
    let offset = filled.number(&OFFSET, log);
    let held = match kind?.as_str() {
        "clamped" => Support::clamped(),
        "hinged" => Support::hinged(),
        "free" => Support::free(),
        "sliding" => Support::sliding(),
        _ => Support {
            rotation: Restraint::from_stiffness(filled.number(&ROTATIONAL, log)?),
            sideways: Restraint::from_stiffness(filled.number(&SIDEWAYS, log)?),
            ..Support::clamped()
        },
    };
    Some(Support {
        axial: Restraint::from_stiffness(axial?),
        arm: arm?,
        tilt: tilt?,
        offset: offset?,
        ..held
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
