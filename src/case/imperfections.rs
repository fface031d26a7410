//! `[imperfections]`: how the spring and its load deviate from perfect.

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range};
use super::filled::{Filled, Log};
use crate::setup::{BowShape, Imperfections, TopPosition};
use crate::spring::Spring;
use crate::units::{Dimension, MILLIMETRE};

/// What holds where the whole table is left out.
pub(super) const LEFT_OUT: &str = "squareness 0.05 of the free length and parallelism 0.03 of the outer diameter, as EN 15800 grade 2 (from memory)";

const DEVIATION: Kind = Kind::Quantity(Dimension::LENGTH, Range::Size);

static SQUARENESS: Field = Field::new(
    "squareness",
    DEVIATION,
    "10 mm",
    "Deviation from square e1: the free spring, stood on one end, leans by this much at its top. A size.",
)
.or(Absent::Value("0 mm"));
static PARALLELISM: Field = Field::new(
    "parallelism",
    DEVIATION,
    "2 mm",
    "Deviation from parallel of the end planes e2, over the outer diameter. A size; at which end it lies is tried.",
)
.or(Absent::Value("0 mm"));
static BOW: Field = Field::new(
    "bow",
    DEVIATION,
    "0.5 mm",
    "Height of the bow of the unloaded spring. A size.",
)
.or(Absent::Value("0 mm"));
static BOW_SHAPE: Field = Field::new(
    "bow_shape",
    Kind::Choice(|| vec!["half-sine", "first-mode"]),
    "half-sine",
    "Shape of that bow: half a sine wave, or the first buckling mode.",
)
.or(Absent::Value("half-sine"));
static ECCENTRICITY: Field = Field::new(
    "eccentricity",
    DEVIATION,
    "0.5 mm",
    "Distance of the line of load from the axis, the same at both ends. A size.",
)
.or(Absent::Value("0 mm"));
static TOP_POSITION: Field = Field::new(
    "top_position",
    Kind::Choice(|| vec!["piloted", "landed"]),
    "piloted",
    "Where the top of an out-of-square spring is held: in line with the bottom on a pilot, or where it lands.",
)
.or(Absent::Value("piloted"));

pub(super) static FORM: Form = Form {
    doc: "Deviations from the perfect spring and seat, as sizes: how they lie to one another (all \
          signs, and which end is out of parallel) is tried, and the worst is taken. In a table that is given, what is left out \
          is 0. Left out as a whole: squareness 0.05 of the free length and parallelism 0.03 of \
          the outer diameter, as EN 15800 grade 2 (from memory).",
    fields: &[
        &SQUARENESS,
        &PARALLELISM,
        &BOW,
        &BOW_SHAPE,
        &ECCENTRICITY,
        &TOP_POSITION,
    ],
    rules: &[],
};

/// Reads the imperfections. Squareness, parallelism and bow are dimensions of the spring and grow
/// with it by `length_factor`.
pub(super) fn imperfections(
    filled: &Filled,
    length_factor: f64,
    log: &mut Log,
) -> Option<Imperfections> {
    let squareness = filled.number(&SQUARENESS, log);
    let parallelism = filled.number(&PARALLELISM, log);
    let bow = filled.number(&BOW, log);
    let bow_shape = filled.word(&BOW_SHAPE, log);
    let eccentricity = filled.number(&ECCENTRICITY, log);
    let top_position = filled.word(&TOP_POSITION, log);
    Some(Imperfections {
        squareness: squareness? * length_factor,
        parallelism: parallelism? * length_factor,
        bow: bow? * length_factor,
        bow_shape: match bow_shape?.as_str() {
            "first-mode" => BowShape::FirstMode,
            _ => BowShape::HalfSine,
        },
        eccentricity: eccentricity?,
        top_position: match top_position?.as_str() {
            "landed" => TopPosition::Landed,
            _ => TopPosition::Piloted,
        },
    })
}

/// Notes deviations that are slips: larger than half the dimension they deviate from.
pub(super) fn check(
    filled: &Filled,
    imperfections: &Imperfections,
    spring: &Spring,
    log: &mut Log,
) {
    let length = ("half the free length", spring.free_length / 2.0);
    let diameter = ("half the outer diameter", spring.outer_diameter() / 2.0);
    for (field, value, (words, most)) in [
        (&SQUARENESS, imperfections.squareness, length),
        (&PARALLELISM, imperfections.parallelism, diameter),
        (&BOW, imperfections.bow, length),
    ] {
        if value > most {
            log.mistakes.push(Mistake::at(
                filled.at(field),
                format!(
                    "`{}` is more than {words}, {}",
                    field.key,
                    MILLIMETRE.show(most, 4)
                ),
                format!(
                    "check the number and its unit, for example {}",
                    field.example_line()
                ),
            ));
        }
    }
}

/// The imperfections of a file that says nothing about them.
pub(super) fn assumed(spring: &Spring, log: &mut Log) -> Imperfections {
    let imperfections = Imperfections {
        squareness: 0.05 * spring.free_length,
        parallelism: 0.03 * spring.outer_diameter(),
        ..Imperfections::none()
    };
    for field in FORM.fields {
        log.defaulted.push(format!("imperfections.{}", field.key));
    }
    log.warnings.push(format!(
        "no [imperfections] given: squareness {} and parallelism {} are assumed, 0.05 of the free \
         length and 0.03 of the outer diameter, as EN 15800 grade 2 (from memory)",
        MILLIMETRE.show(imperfections.squareness, 3),
        MILLIMETRE.show(imperfections.parallelism, 3)
    ));
    imperfections
}
