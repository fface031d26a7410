//! A seat's stiffness as measured: motion and load, row by row.

use super::super::diagnostics::Mistake;
use super::super::field::{Absent, Field, Form, Kind, Range};
use super::super::filled::{Filled, Log};
use crate::setup::{Curve, MOST_POINTS, Restraint};
use crate::units::Dimension;

/// Rows of a law: the first point, nought, goes without saying.
const MOST_ROWS: usize = MOST_POINTS - 1;

/// Rows whose motions are nearer than this, m or rad, are not told apart.
pub(super) const LEAST_STEP: f64 = 1e-9;

/// Slopes that can be computed, N/m or N·m/rad: those of a given stiffness.
const SLOPES: std::ops::RangeInclusive<f64> = 1e-9..=1e15;

static DISTANCE: Field = Field::new(
    "motion",
    Kind::Quantity(Dimension::LENGTH, Range::NotNegative),
    "1 mm",
    "How far the seat has given way.",
);
static FORCE: Field = Field::new(
    "force",
    Kind::Quantity(Dimension::FORCE, Range::NotNegative),
    "300 N",
    "The force that it takes.",
);
static ANGLE: Field = Field::new(
    "motion",
    Kind::Quantity(Dimension::ANGLE, Range::NotNegative),
    "1 deg",
    "How far the seat has turned.",
);
static MOMENT: Field = Field::new(
    "moment",
    Kind::Quantity(Dimension::MOMENT, Range::NotNegative),
    "0.6 N m",
    "The moment that it takes.",
);
static STRAIGHT: Form = Form {
    doc: "A point of a law of force: both members above those of the row before.",
    fields: &[&DISTANCE, &FORCE],
    rules: &[],
};
static TURNING: Form = Form {
    doc: "A point of a law of moment: both members above those of the row before.",
    fields: &[&ANGLE, &MOMENT],
    rules: &[],
};

pub(super) static ROTATIONAL_LAW: Field = law(
    "rotational_law",
    &TURNING,
    "With kind = \"elastic\", instead of rotational_stiffness: moment against rotation as measured, \
     the same both ways. It begins at nought without saying so; between the rows it runs smoothly, \
     beyond the last row it goes on straight.",
);
pub(super) static SIDEWAYS_LAW: Field = law(
    "sideways_law",
    &STRAIGHT,
    "With kind = \"elastic\", instead of sideways_stiffness: force against sideways motion as \
     measured, the same both ways. It begins at nought without saying so; between the rows it runs \
     smoothly, beyond the last row it goes on straight.",
);
pub(super) static AXIAL_LAW: Field = law(
    "axial_law",
    &STRAIGHT,
    "Instead of axial_stiffness, with any kind: force against axial motion of the seat as measured, \
     as of a rubber pad. It begins at nought without saying so; between the rows it runs smoothly, \
     beyond the last row it goes on straight.",
);

const fn law(key: &'static str, form: &'static Form, doc: &'static str) -> Field {
    let kind = Kind::Rows {
        form,
        least: 1,
        most: MOST_ROWS,
    };
    Field::new(key, kind, "", doc).or(Absent::Nothing)
}

/// The restraint given as `law` or, without it, as `stiffness`.
pub(super) fn restraint(
    filled: &Filled,
    stiffness: &Field,
    law: &Field,
    log: &mut Log,
) -> Option<Restraint> {
    if filled.is_given(law) {
        curve(filled, law, log).map(Restraint::Progressive)
    } else {
        filled.number(stiffness, log).map(Restraint::from_stiffness)
    }
}

fn curve(filled: &Filled, law: &Field, log: &mut Log) -> Option<Curve> {
    let Kind::Rows { form, .. } = law.kind else {
        return None;
    };
    let [motion, load] = form.fields else {
        return None;
    };
    let mut points = vec![(0.0, 0.0)];
    let mut sound = true;
    for (index, row) in filled.rows(law)?.iter().enumerate() {
        let (Some(at), Some(value)) = (row.number(motion, log), row.number(load, log)) else {
            sound = false;
            continue;
        };
        let said_start = index == 0 && (at, value) == (0.0, 0.0);
        let before = points.last().copied().unwrap_or_default();
        if said_start {
            continue;
        }
        for (field, now, before) in [(*motion, at, before.0), (*load, value, before.1)] {
            if now <= before {
                log.mistakes.push(does_not_rise(row, field, index));
                sound = false;
            }
        }
        let (step, rise) = (at - before.0, value - before.1);
        if step > 0.0 && rise > 0.0 && !(step >= LEAST_STEP && SLOPES.contains(&(rise / step))) {
            log.mistakes.push(out_of_reach(row));
            sound = false;
        }
        points.push((at, value));
    }
    if sound && points.len() < 2 {
        log.mistakes.push(Mistake::at(
            filled.at(law),
            format!("`{}` says nothing but that it begins at nought", law.key),
            format!("add a measured row, for example {}", law.example_line()),
        ));
        return None;
    }
    sound.then(|| Curve::odd(&points)).flatten()
}

fn out_of_reach(row: &Filled) -> Mistake {
    Mistake::at(
        row.place.clone(),
        "the step to this row is outside what can be computed: motion by 1 nm or 1e-9 rad at least, \
         with a slope of 1e-9 to 1e15 N/m or N m/rad",
        "check both numbers and their units; a seat as hard as that may be left rigid",
    )
}

fn does_not_rise(row: &Filled, field: &Field, index: usize) -> Mistake {
    let before = match index {
        0 => "nought, where every law begins",
        _ => "that of the row before",
    };
    Mistake::at(
        row.at(field),
        format!("`{}` does not rise: it is not above {before}", field.key),
        "list the rows by rising motion, each with more load than the one before: a seat that \
         yields under less load cannot be followed",
    )
}
