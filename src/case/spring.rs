//! `[spring]`: its fields, and the geometry that can exist.

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range, Rule};
use super::filled::{Content, Filled, Log};
use super::material::Moduli;
use crate::spring::{EndType, Hand, Spring, Wire};
use crate::units::{Dimension, MILLIMETRE, Metre, NEWTON_PER_MILLIMETRE, NewtonPerMetre};

const LENGTH: Kind = Kind::Quantity(Dimension::LENGTH, Range::Positive);
const COILS: Kind = Kind::Number(Range::Positive);

static RADIAL: Field = Field::new(
    "radial",
    LENGTH,
    "6 mm",
    "Side of rectangular wire in the direction of the coil's radius.",
);
static AXIAL: Field = Field::new(
    "axial",
    LENGTH,
    "4 mm",
    "Side of rectangular wire in the direction of the coil's axis.",
);
static RECTANGULAR: Form = Form {
    doc: "Rectangular wire by its two sides.",
    fields: &[&RADIAL, &AXIAL],
    rules: &[],
};

static WIRE: Field = Field::new(
    "wire",
    Kind::LengthOrTable(&RECTANGULAR),
    "8 mm",
    "Diameter of round wire, or the sides of rectangular wire: { radial = \"6 mm\", axial = \"4 mm\" }.",
);
static MEAN_DIAMETER: Field = Field::new(
    "mean_diameter",
    LENGTH,
    "62 mm",
    "Mean coil diameter D. Give this, the outer or the inner diameter.",
)
.or(Absent::Nothing);
static OUTER_DIAMETER: Field = Field::new(
    "outer_diameter",
    LENGTH,
    "70 mm",
    "Outer coil diameter, instead of the mean one.",
)
.or(Absent::Nothing);
static INNER_DIAMETER: Field = Field::new(
    "inner_diameter",
    LENGTH,
    "54 mm",
    "Inner coil diameter, instead of the mean one.",
)
.or(Absent::Nothing);
static FREE_LENGTH: Field = Field::new("free_length", LENGTH, "210 mm", "Unloaded length L0.");
static ACTIVE_COILS: Field = Field::new(
    "active_coils",
    COILS,
    "8.5",
    "Coils that work. Left out, total coils less the usual dead ones of the end type.",
)
.or(Absent::Rule(
    "total_coils less the usual dead coils of the end type",
));
static TOTAL_COILS: Field = Field::new(
    "total_coils",
    COILS,
    "10.5",
    "All coils. Left out, active coils and the usual dead ones of the end type: closed 2, open and ground 1, open 0.",
)
.or(Absent::Rule("active_coils and the usual dead coils of the end type"));
static ENDS: Field = Field::new(
    "ends",
    Kind::Choice(|| EndType::ALL.map(EndType::word).to_vec()),
    "closed-ground",
    "How the ends are made. Decides the usual dead coils and the rule for the solid length.",
)
.or(Absent::Value("closed-ground"));
static HAND: Field = Field::new(
    "hand",
    Kind::Choice(|| vec!["right", "left"]),
    "right",
    "Which way the coil is wound. The column does not feel it.",
)
.or(Absent::Value("right"));
static MEASURED_RATE: Field = Field::new(
    "measured_rate",
    Kind::Quantity(Dimension::STIFFNESS, Range::Positive),
    "20 N/mm",
    "Axial rate as measured at 20 degC. It replaces the formula's rate, and scales every stiffness with it.",
)
.or(Absent::Nothing);
static SOLID_LENGTH: Field = Field::new(
    "solid_length",
    LENGTH,
    "84 mm",
    "Solid length of the drawing. Left out, by the end type: ground ends total coils x wire, unground (total coils + 1) x wire.",
)
.or(Absent::Rule("by the end type"));

pub(super) static FORM: Form = Form {
    doc: "The spring: a cylindrical helical compression spring of constant pitch, at 20 degC.",
    fields: &[
        &WIRE,
        &MEAN_DIAMETER,
        &OUTER_DIAMETER,
        &INNER_DIAMETER,
        &FREE_LENGTH,
        &ACTIVE_COILS,
        &TOTAL_COILS,
        &ENDS,
        &HAND,
        &MEASURED_RATE,
        &SOLID_LENGTH,
    ],
    rules: &[
        Rule::OneOf(&[&MEAN_DIAMETER, &OUTER_DIAMETER, &INNER_DIAMETER]),
        Rule::AtLeastOneOf(&[&ACTIVE_COILS, &TOTAL_COILS]),
    ],
};

/// The spring at 20 °C.
#[derive(Clone, Debug)]
pub(super) struct Cold {
    wire: Wire,
    mean_diameter: Metre,
    free_length: Metre,
    active_coils: f64,
    total_coils: f64,
    ends: EndType,
    hand: Hand,
    measured_rate: Option<NewtonPerMetre>,
    solid_length: Metre,
    solid_rule: &'static str,
}

/// Reads the geometry, noting what cannot exist.
pub(super) fn cold(filled: &Filled, log: &mut Log) -> Option<Cold> {
    let wire = wire(filled, log);
    let ends = filled
        .word(&ENDS, log)
        .and_then(|word| EndType::ALL.into_iter().find(|e| e.word() == word));
    let hand = filled.word(&HAND, log).map(|word| match word.as_str() {
        "left" => Hand::Left,
        _ => Hand::Right,
    });
    let free_length = filled.number(&FREE_LENGTH, log);
    let measured_rate = filled.number(&MEASURED_RATE, log);
    let mean_diameter = wire.and_then(|wire| mean_diameter(filled, wire, log));
    let coils = ends.and_then(|ends| coils(filled, ends, log));
    let (wire, ends, (active_coils, total_coils)) = (wire?, ends?, coils?);
    let solid = solid(filled, wire, ends, (active_coils, total_coils), log);
    let ((solid_length, solid_rule), free_length) = (solid?, free_length?);
    if free_length <= solid_length {
        log.mistakes
            .push(no_pitch(filled, free_length, solid_length, solid_rule));
        return None;
    }
    Some(Cold {
        wire,
        mean_diameter: mean_diameter?,
        free_length,
        active_coils,
        total_coils,
        ends,
        hand: hand?,
        measured_rate,
        solid_length,
        solid_rule,
    })
}

/// Free length at 20 °C, m, where it can be read.
pub(super) fn free_length(filled: &Filled, log: &mut Log) -> Option<Metre> {
    filled.number(&FREE_LENGTH, log)
}

/// There is no gap between the active coils: their pitch L_a/n = d + (L0 − L_s)/n exceeds the wire
/// exactly where the free length exceeds the solid one.
fn no_pitch(filled: &Filled, free_length: Metre, solid_length: Metre, rule: &str) -> Mistake {
    Mistake::at(
        filled.at(&FREE_LENGTH),
        format!(
            "the wire is not thinner than the pitch: free length {}, solid length {} ({rule})",
            MILLIMETRE.show(free_length, 4),
            MILLIMETRE.show(solid_length, 4),
        ),
        "the free length must exceed the solid one: check it, the wire and the number of coils",
    )
    .also(filled.at(&WIRE), "the wire")
}

fn wire(filled: &Filled, log: &mut Log) -> Option<Wire> {
    match filled.answer(&WIRE)?.content.as_ref()? {
        Content::Number(diameter) => Some(Wire::Round {
            diameter: *diameter,
        }),
        Content::Table(sides) => {
            let radial = sides.number(&RADIAL, log);
            let axial = sides.number(&AXIAL, log);
            Some(Wire::Rectangular {
                radial: radial?,
                axial: axial?,
            })
        }
        _ => None,
    }
}

fn mean_diameter(filled: &Filled, wire: Wire, log: &mut Log) -> Option<Metre> {
    let given: Vec<(&Field, f64)> = [
        (&MEAN_DIAMETER, 0.0),
        (&OUTER_DIAMETER, -1.0),
        (&INNER_DIAMETER, 1.0),
    ]
    .into_iter()
    .filter(|(field, _)| filled.is_given(field))
    .collect();
    let [(field, sign)] = given.as_slice() else {
        return None;
    };
    let size = wire.radial_size();
    let mean = filled.number(field, log)? + sign * size;
    if mean <= size {
        log.mistakes.push(
            Mistake::at(
                filled.at(field),
                format!(
                    "the coil has no inside: its mean diameter would be {}, with wire of {} across",
                    MILLIMETRE.show(mean, 4),
                    MILLIMETRE.show(size, 4)
                ),
                "check both: the mean diameter is usually 4 to 20 times the wire",
            )
            .also(filled.at(&WIRE), "the wire"),
        );
        return None;
    }
    let index = mean / size;
    if index < 3.0 {
        log.warnings.push(format!(
            "spring index D/d = {index:.2} is below 3: such a coil is hard to wind, and the \
             formulas for rate and stress were not made for it"
        ));
    } else if index > 20.0 {
        log.warnings.push(format!(
            "spring index D/d = {index:.1} is above 20: such a coil tangles and holds its size \
             poorly; check the diameter and the wire"
        ));
    }
    Some(mean)
}

/// Active and total coils.
fn coils(filled: &Filled, ends: EndType, log: &mut Log) -> Option<(f64, f64)> {
    let active = filled.number(&ACTIVE_COILS, log);
    let total = filled.number(&TOTAL_COILS, log);
    let (active, total) = match (
        filled.is_given(&ACTIVE_COILS),
        filled.is_given(&TOTAL_COILS),
    ) {
        (true, true) => (active?, total?),
        (true, false) => {
            filled.note_default(&TOTAL_COILS, log);
            (active?, active? + ends.usual_dead_coils())
        }
        (false, true) => {
            let active = total? - ends.usual_dead_coils();
            if active <= 0.0 {
                log.mistakes.push(Mistake::at(
                    filled.at(&TOTAL_COILS),
                    format!(
                        "no coil is left to work: {} ends usually have {} dead coils",
                        ends.word(),
                        ends.usual_dead_coils()
                    ),
                    "give the active coils too, or check the total and the end type",
                ));
                return None;
            }
            filled.note_default(&ACTIVE_COILS, log);
            (active, total?)
        }
        (false, false) => return None,
    };
    if active > total {
        log.mistakes.push(
            Mistake::at(
                filled.at(&ACTIVE_COILS),
                format!("more active coils, {active}, than coils in total, {total}"),
                "the total counts the dead end coils too: it is the larger one",
            )
            .also(filled.at(&TOTAL_COILS), "all coils"),
        );
        return None;
    }
    if active < 2.0 {
        log.warnings.push(format!(
            "{active} active coils: with less than 2 the column is a poor picture of the coil \
             (EN 13906-1 begins at 2, from memory)"
        ));
    }
    Some((active, total))
}

/// Solid length, and the rule that gave it.
fn solid(
    filled: &Filled,
    wire: Wire,
    ends: EndType,
    (active, total): (f64, f64),
    log: &mut Log,
) -> Option<(Metre, &'static str)> {
    if !filled.is_given(&SOLID_LENGTH) {
        filled.note_default(&SOLID_LENGTH, log);
        return Some((
            ends.solid_length(total, wire.axial_size()),
            ends.solid_rule(),
        ));
    }
    let solid = filled.number(&SOLID_LENGTH, log)?;
    let stacked = active * wire.axial_size();
    // Room for the rounding of a drawing that states exactly the stacked coils.
    if solid < stacked * (1.0 - 1e-9) {
        log.mistakes.push(
            Mistake::at(
                filled.at(&SOLID_LENGTH),
                format!(
                    "the solid length is less than its {active} active coils stacked, {}",
                    MILLIMETRE.show(stacked, 4)
                ),
                format!(
                    "check it against the wire and the coils, or leave it out: the rule for {} ends gives {}",
                    ends.word(),
                    MILLIMETRE.show(ends.solid_length(total, wire.axial_size()), 4)
                ),
            )
            .also(filled.at(&WIRE), "the wire"),
        );
        return None;
    }
    Some((solid.max(stacked), "as given"))
}

impl Cold {
    /// The spring at the service temperature of `moduli`. Lengths grow by the factor of lengths,
    /// the measured rate changes by that factor and the one of G.
    pub fn at(&self, moduli: &Moduli, log: &mut Log) -> Spring {
        let grown = moduli.length_factor();
        let wire = match self.wire {
            Wire::Round { diameter } => Wire::Round {
                diameter: diameter * grown,
            },
            Wire::Rectangular { radial, axial } => Wire::Rectangular {
                radial: radial * grown,
                axial: axial * grown,
            },
        };
        let spring = Spring {
            wire,
            mean_diameter: self.mean_diameter * grown,
            free_length: self.free_length * grown,
            active_coils: self.active_coils,
            total_coils: self.total_coils,
            ends: self.ends,
            hand: self.hand,
            youngs_modulus: moduli.youngs_modulus * moduli.modulus_factor(),
            shear_modulus: moduli.shear_modulus * moduli.modulus_factor(),
            measured_rate: self
                .measured_rate
                .map(|rate| rate * moduli.modulus_factor() * grown),
            solid_length: self.solid_length * grown,
            solid_rule: self.solid_rule,
        };
        let (used, formula) = (spring.rate(), spring.formula_rate());
        if (used / formula - 1.0).abs() > 0.2 {
            log.warnings.push(format!(
                "the measured rate gives {}, the formula {}: they differ by more than 20 %; check \
                 wire, diameter, coils and material",
                NEWTON_PER_MILLIMETRE.show(used, 4),
                NEWTON_PER_MILLIMETRE.show(formula, 4)
            ));
        }
        spring
    }
}
