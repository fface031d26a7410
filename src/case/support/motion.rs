//! A top seat that does not move straight: on a lever, or as measured.

use super::super::diagnostics::Mistake;
use super::super::field::{Absent, Field, Form, Kind, Range};
use super::super::filled::{Filled, Log};
use super::SIDEWAYS;
use super::law::LEAST_STEP;
use crate::setup::{Curve, LeverArc, MOST_POINTS, Motion, Restraint, Support};
use crate::spring::Spring;
use crate::units::{Dimension, MILLIMETRE};

/// A pivot nearer to the axis than this share of its distance along it leaves the seat no travel.
const NEAR_AXIS: f64 = 0.01;

static ALONG: Field = Field::new(
    "pivot_along",
    Kind::Quantity(Dimension::LENGTH, Range::Any),
    "20 mm",
    "Where the lever's pivot lies along the spring's axis, seen from the centre of the seat, spring \
     unloaded; beyond the seat positive, on the spring's side negative.",
);
static ACROSS: Field = Field::new(
    "pivot_across",
    Kind::Quantity(Dimension::LENGTH, Range::Any),
    "120 mm",
    "Where the lever's pivot lies across the spring's axis; with its sign: positive is towards +y.",
);
static LEVER_FORM: Form = Form {
    doc: "The pivot of a lever that carries the top seat: the seat moves on an arc, its offset and \
          tilt grow with its travel.",
    fields: &[&ALONG, &ACROSS],
    rules: &[],
};
pub(super) static LEVER: Field =
    Field::new("lever", Kind::Table(&LEVER_FORM), "", LEVER_FORM.doc).or(Absent::Nothing);

static TRAVEL: Field = Field::new(
    "travel",
    Kind::Quantity(Dimension::LENGTH, Range::NotNegative),
    "0 mm",
    "How far the seat has moved along the axis from first touch.",
);
static OFFSET: Field = Field::new(
    "offset",
    Kind::Quantity(Dimension::LENGTH, Range::Any),
    "0 mm",
    "How far it has moved sideways by then, towards +y positive, on top of its offset as built.",
);
static TILT: Field = Field::new(
    "tilt",
    Kind::Quantity(Dimension::ANGLE, Range::Any),
    "0 deg",
    "How far it has turned by then, on top of its tilt as built.",
);
static ROW: Form = Form {
    doc: "Where the seat is after a travel.",
    fields: &[&TRAVEL, &OFFSET, &TILT],
    rules: &[],
};
pub(super) static MOTION: Field = Field::new(
    "motion",
    Kind::Rows {
        form: &ROW,
        least: 2,
        most: MOST_POINTS,
    },
    "",
    "Instead of lever: how the top seat moves aside and turns as it travels, from travel 0 on. \
     Between the rows it runs smoothly, beyond the last row it goes on straight.",
)
.or(Absent::Nothing);

/// How the seat moves aside; `Some(None)`: it moves straight.
pub(super) fn motion(filled: &Filled, log: &mut Log) -> Option<Option<Motion>> {
    if filled.is_given(&LEVER) {
        lever(filled.table(&LEVER)?, log).map(|arc| Some(Motion::Lever(arc)))
    } else if filled.is_given(&MOTION) {
        table(filled.rows(&MOTION)?, log).map(Some)
    } else {
        Some(None)
    }
}

fn lever(filled: &Filled, log: &mut Log) -> Option<LeverArc> {
    let along = filled.number(&ALONG, log);
    let across = filled.number(&ACROSS, log);
    if let Some(across) = across
        && (across == 0.0 || along.is_some_and(|along| across.abs() < NEAR_AXIS * along.abs()))
    {
        log.mistakes.push(Mistake::at(
            filled.at(&ACROSS),
            "the lever's pivot lies on the spring's axis, or next to it: its seat could not travel along it",
            format!(
                "give its distance from the axis, for example {}",
                ACROSS.example_line()
            ),
        ));
        return None;
    }
    Some(LeverArc {
        along: along?,
        across: across?,
    })
}

/// Notes a lever on which the top seat cannot travel until the spring is solid; `bottom` gives way
/// as well.
pub(in crate::case) fn check_reach(
    filled: &Filled,
    top: &Support,
    bottom: &Support,
    spring: &Spring,
    log: &mut Log,
) {
    if top.motion.is_some() && [top, bottom].iter().any(|seat| seat.axial.gives()) {
        let field = if filled.is_given(&LEVER) {
            &LEVER
        } else {
            &MOTION
        };
        log.mistakes.push(Mistake::at(
            filled.at(field),
            "a seat that moves on an arc beside one that gives axially is not computed: the arc would \
             be counted from the spring's shortening instead of the seat's travel",
            "leave the axial stiffness rigid, or the arc out",
        ));
        return;
    }
    let (Some(Motion::Lever(arc)), Some(lever)) = (top.motion, filled.table(&LEVER)) else {
        return;
    };
    let (largest, needed) = (arc.largest_travel(), spring.solid_deflection());
    if largest <= needed {
        log.mistakes.push(Mistake::at(
            lever.at(&ACROSS),
            format!(
                "on this lever the seat can travel {} only; the spring is solid after {}",
                MILLIMETRE.show(largest, 4),
                MILLIMETRE.show(needed, 4)
            ),
            "the lever allows sqrt(along^2 + across^2) - along: check the pivot's place and its \
             signs; beyond the seat is positive, on the spring's side negative",
        ));
    }
}

fn table(rows: &[Filled], log: &mut Log) -> Option<Motion> {
    let mut offsets: Vec<(f64, f64)> = Vec::new();
    let mut tilts = Vec::new();
    let mut sound = true;
    for (index, row) in rows.iter().enumerate() {
        let read = [&TRAVEL, &OFFSET, &TILT].map(|field| row.number(field, log));
        let [Some(travel), Some(offset), Some(tilt)] = read else {
            sound = false;
            continue;
        };
        if index == 0 {
            for (field, value) in [(&TRAVEL, travel), (&OFFSET, offset), (&TILT, tilt)] {
                if value != 0.0 {
                    log.mistakes.push(does_not_begin_at_nought(row, field));
                    sound = false;
                }
            }
        } else if offsets
            .last()
            .is_some_and(|before| travel < before.0 + LEAST_STEP)
        {
            log.mistakes.push(Mistake::at(
                row.at(&TRAVEL),
                "`travel` does not rise: it is not above that of the row before, by 1 nm at least",
                "list the rows by rising travel, each travel once",
            ));
            sound = false;
        }
        offsets.push((travel, offset));
        tilts.push((travel, tilt));
    }
    if !sound {
        return None;
    }
    Some(Motion::Table {
        offset: Curve::through(&offsets)?,
        tilt: Curve::through(&tilts)?,
    })
}

fn does_not_begin_at_nought(row: &Filled, field: &Field) -> Mistake {
    let cure = if field.key == TRAVEL.key {
        "begin with the seat at first touch: { travel = \"0 mm\", offset = \"0 mm\", tilt = \"0 deg\" }"
            .to_string()
    } else {
        format!(
            "the rows say what travel adds; put what is there at first touch into `{}` of [top]",
            field.key
        )
    };
    Mistake::at(
        row.at(field),
        format!("`{}` of the first row must be 0", field.key),
        cure,
    )
}

/// Notes an elastic seat that moves aside without holding the end sideways, and says whether the seat
/// is sound; of the other kinds the rules of the form say so.
pub(super) fn check_led(filled: &Filled, support: &Support, log: &mut Log) -> bool {
    let sound = support.motion.is_none() || support.sideways != Restraint::Free;
    if !sound && let Some(answer) = filled.answer(&SIDEWAYS) {
        let field = if filled.is_given(&LEVER) {
            &LEVER
        } else {
            &MOTION
        };
        log.mistakes.push(
            Mistake::at(
                filled.at(field),
                format!(
                    "`{}` moves a seat that does not hold the end sideways: the end would not follow",
                    field.key
                ),
                format!("hold the end sideways, or remove `{}`", field.key),
            )
            .also(answer.value.clone(), "free sideways"),
        );
    }
    sound
}
