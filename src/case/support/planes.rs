//! A support that differs between its two principal planes.

use super::super::diagnostics::Mistake;
use super::super::field::{Absent, Field, Form, Kind, Range, Rule};
use super::super::filled::{Filled, Log};
use super::law::{ROTATIONAL_LAW, SIDEWAYS_LAW};
use super::{OFFSET, ROTATIONAL, SIDEWAYS, TILT, sideways_and_turning};
use crate::setup::{Lateral, Support};
use crate::units::{DEGREE, Dimension, Radian};
use std::f64::consts::{FRAC_PI_2, PI};

/// Directions nearer to one another than this are the same, rad: room for round-off of their units.
const SAME_DIRECTION: Radian = 1e-6;

static KIND: Field = Field::new(
    "kind",
    Kind::Choice(|| vec!["clamped", "hinged", "free", "sliding", "elastic"]),
    "hinged",
    "What the seat does to the end in the other plane; the words mean what they mean there.",
);
static FORM: Form = Form {
    doc: "What holds the end in the other principal plane, at right angles to the one described \
          beside it. Left out, the support is the same all round. Both planes are analysed.",
    fields: &[
        &KIND,
        &ROTATIONAL,
        &ROTATIONAL_LAW,
        &SIDEWAYS,
        &SIDEWAYS_LAW,
        &TILT,
        &OFFSET,
    ],
    rules: &[
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
    ],
};
pub(super) static OTHER_PLANE: Field =
    Field::new("other_plane", Kind::Table(&FORM), "", FORM.doc).or(Absent::Nothing);
pub(super) static PLANE: Field = Field::new(
    "plane",
    Kind::Quantity(Dimension::ANGLE, Range::Any),
    "30 deg",
    "With other_plane: direction of the first principal plane, the one described in this table \
     itself, seen from above; counted the same way at both ends. The planes of both ends must line \
     up.",
)
.or(Absent::Rule("0 deg"));

/// Direction of the first plane, and what holds the end in the other one if that differs.
pub(super) fn planes(filled: &Filled, log: &mut Log) -> Option<(Radian, Option<Lateral>)> {
    if !filled.is_given(&OTHER_PLANE) {
        return Some((0.0, None));
    }
    let plane = if filled.is_given(&PLANE) {
        filled.number(&PLANE, log)
    } else {
        filled.note_default(&PLANE, log);
        Some(0.0)
    };
    let other = filled.table(&OTHER_PLANE)?;
    let tilt = other.number(&TILT, log);
    let offset = other.number(&OFFSET, log);
    let word = other.word(&KIND, log)?;
    let (rotation, sideways) = sideways_and_turning(&word, other, log)?;
    let lateral = Lateral {
        rotation,
        sideways,
        tilt: tilt?,
        offset: offset?,
    };
    Some((plane?, Some(lateral)))
}

/// An end: its table and what was read there.
type End<'a> = (&'a Filled, &'a mut Support);

/// Counts the planes of both ends alike: where their directions differ by a right angle, those of
/// one end are exchanged (of the bottom, where the top moves aside in its first one). Notes ends
/// whose planes do not line up; says whether they do.
pub(in crate::case) fn line_up(bottom: End<'_>, top: End<'_>, log: &mut Log) -> bool {
    let directed = |support: &Support| {
        support
            .other_plane
            .is_some_and(|other| other != support.lateral())
    };
    if !directed(bottom.1) || !directed(top.1) {
        return true;
    }
    let apart = (top.1.plane - bottom.1.plane).rem_euclid(PI);
    if apart.min(PI - apart) <= SAME_DIRECTION {
        return true;
    }
    if (apart - FRAC_PI_2).abs() <= SAME_DIRECTION {
        let turned = if top.1.motion.is_none() {
            top.1
        } else {
            bottom.1
        };
        *turned = exchanged(turned);
        return true;
    }
    log.mistakes.push(
        Mistake::at(
            top.0.at(&PLANE),
            format!(
                "the principal axes of the two ends do not line up: they lie {} apart, and the two \
                 lateral planes would be coupled",
                DEGREE.show(apart.min(PI - apart), 4)
            ),
            "a bow in one plane would then drive the other, which this assessment does not follow: \
             line the axes up, give `plane` in a whole multiple of 90 deg between the ends, or take \
             the softer values at one end all round",
        )
        .label("the top")
        .also(bottom.0.at(&PLANE), "the bottom"),
    );
    false
}

/// The same support, its planes named the other way round.
fn exchanged(support: &Support) -> Support {
    let other = support.other_plane.unwrap_or_else(|| support.lateral());
    Support {
        rotation: other.rotation,
        sideways: other.sideways,
        tilt: other.tilt,
        offset: other.offset,
        other_plane: Some(support.lateral()),
        plane: support.plane + FRAC_PI_2,
        ..*support
    }
}
