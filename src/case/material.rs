//! `[material]`: a built-in wire or given moduli, and the service temperature.

use super::diagnostics::Mistake;
use super::field::{Absent, Field, Form, Kind, Range, Rule, listed};
use super::filled::{Content, Filled, Log};
use crate::spring::{Material, materials, named_material};
use crate::units::{Celsius, Dimension, Pascal};

const MODULUS: Kind = Kind::Quantity(Dimension::STRESS, Range::Positive);

static NAME: Field = Field::new(
    "name",
    Kind::Choice(|| materials().iter().map(|m| m.name).collect()),
    "patented-carbon-steel",
    "A built-in wire. Instead of it, give youngs_modulus and shear_modulus.",
)
.or(Absent::Nothing);
static YOUNGS_MODULUS: Field = Field::new(
    "youngs_modulus",
    MODULUS,
    "206 GPa",
    "Young's modulus E of the wire at 20 degC.",
)
.or(Absent::Nothing);
static SHEAR_MODULUS: Field = Field::new(
    "shear_modulus",
    MODULUS,
    "81.5 GPa",
    "Shear modulus G of the wire at 20 degC. It need not follow from E.",
)
.or(Absent::Nothing);
static YOUNGS_UNCERTAINTY: Field = Field::new(
    "youngs_modulus_uncertainty",
    Kind::QuantityOrShare(Dimension::STRESS),
    "4 GPa",
    "Standard uncertainty of E, as a quantity or as a share (0.02 or \"2 %\").",
)
.or(Absent::Nothing);
static SHEAR_UNCERTAINTY: Field = Field::new(
    "shear_modulus_uncertainty",
    Kind::QuantityOrShare(Dimension::STRESS),
    "1.5 GPa",
    "Standard uncertainty of G, as a quantity or as a share (0.02 or \"2 %\").",
)
.or(Absent::Nothing);
static DENSITY: Field = Field::new(
    "density",
    Kind::Quantity(Dimension::DENSITY, Range::Positive),
    "7850 kg/m^3",
    "Density of the wire, with given moduli.",
)
.or(Absent::Nothing);
static LOSS: Field = Field::new(
    "modulus_loss_per_kelvin",
    Kind::Quantity(Dimension::PER_KELVIN, Range::Any),
    "0.00025 1/K",
    "Relative loss of both moduli per kelvin above 20 degC, with given moduli.",
)
.or(Absent::Rule("the named wire's; 0 1/K with given moduli"));
static EXPANSION: Field = Field::new(
    "expansion_per_kelvin",
    Kind::Quantity(Dimension::PER_KELVIN, Range::Any),
    "11.7e-6 1/K",
    "Linear thermal expansion of the wire, with given moduli.",
)
.or(Absent::Rule("the named wire's; 0 1/K with given moduli"));
static TEMPERATURE: Field = Field::new(
    "service_temperature",
    Kind::Quantity(Dimension::TEMPERATURE, Range::Any),
    "20 degC",
    "Temperature at which the spring works. Moduli, rate and dimensions are taken from 20 degC to it.",
)
.or(Absent::Value("20 degC"));

pub(super) static FORM: Form = Form {
    doc: "The wire's material: a built-in name, or E and G.",
    fields: &[
        &NAME,
        &YOUNGS_MODULUS,
        &SHEAR_MODULUS,
        &YOUNGS_UNCERTAINTY,
        &SHEAR_UNCERTAINTY,
        &DENSITY,
        &LOSS,
        &EXPANSION,
        &TEMPERATURE,
    ],
    rules: &[
        Rule::AtLeastOneOf(&[&NAME, &YOUNGS_MODULUS, &SHEAR_MODULUS]),
        Rule::NotBeside(
            &NAME,
            &[&YOUNGS_MODULUS, &SHEAR_MODULUS, &DENSITY, &LOSS, &EXPANSION],
        ),
        Rule::Together {
            fields: &[&YOUNGS_MODULUS, &SHEAR_MODULUS],
            unless: &NAME,
        },
    ],
};

/// What the file says of the material beyond the setup, kept for those who vary inputs.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct MaterialNotes {
    /// Standard uncertainty of E at service temperature, Pa, where given.
    pub youngs_modulus_uncertainty: Option<Pascal>,
    /// Standard uncertainty of G at service temperature, Pa, where given.
    pub shear_modulus_uncertainty: Option<Pascal>,
    /// Density, kg/m³: the named wire's or as given.
    pub density: Option<f64>,
}

/// The moduli at 20 °C with their change, and the service temperature.
#[derive(Clone, Debug)]
pub(super) struct Moduli {
    /// Name of the wire, or "given moduli".
    pub name: String,
    /// E at 20 °C, Pa.
    pub youngs_modulus: Pascal,
    /// G at 20 °C, Pa.
    pub shear_modulus: Pascal,
    /// Service temperature, °C.
    pub temperature: Celsius,
    loss_per_kelvin: f64,
    expansion_per_kelvin: f64,
    /// The rest, at service temperature.
    pub notes: MaterialNotes,
}

impl Moduli {
    /// Factor on E and G at service temperature.
    pub fn modulus_factor(&self) -> f64 {
        self.as_material().modulus_factor(self.temperature)
    }

    /// Factor on lengths at service temperature.
    pub fn length_factor(&self) -> f64 {
        self.as_material().length_factor(self.temperature)
    }

    /// So that given moduli follow the same law as the built-in ones.
    fn as_material(&self) -> Material {
        Material {
            youngs_modulus: self.youngs_modulus,
            shear_modulus: self.shear_modulus,
            loss_per_kelvin: self.loss_per_kelvin,
            expansion_per_kelvin: self.expansion_per_kelvin,
            ..materials()[0]
        }
    }
}

/// Reads the material.
pub(super) fn moduli(filled: &Filled, log: &mut Log) -> Option<Moduli> {
    let temperature = filled.number(&TEMPERATURE, log);
    let mut moduli = if filled.is_given(&NAME) {
        named(named_material(&filled.word(&NAME, log)?)?, temperature?)
    } else {
        given(filled, temperature, log)?
    };
    let factor = moduli.modulus_factor();
    if factor <= 0.0 || moduli.length_factor() <= 0.0 {
        log.mistakes.push(Mistake::at(
            filled.at(&TEMPERATURE),
            format!(
                "at {temperature:.0} degC nothing would be left of the moduli or the lengths",
                temperature = moduli.temperature
            ),
            "check the service temperature, and the change per kelvin where it is given",
        ));
        return None;
    }
    let uncertainty =
        |field: &'static Field, modulus: Pascal| match filled.answer(field)?.content.as_ref()? {
            Content::Share(share) => Some(share * modulus * factor),
            Content::Number(value) => Some(value * factor),
            _ => None,
        };
    moduli.notes.youngs_modulus_uncertainty =
        uncertainty(&YOUNGS_UNCERTAINTY, moduli.youngs_modulus);
    moduli.notes.shear_modulus_uncertainty = uncertainty(&SHEAR_UNCERTAINTY, moduli.shear_modulus);
    for (field, sigma, modulus) in [
        (
            &YOUNGS_UNCERTAINTY,
            moduli.notes.youngs_modulus_uncertainty,
            moduli.youngs_modulus,
        ),
        (
            &SHEAR_UNCERTAINTY,
            moduli.notes.shear_modulus_uncertainty,
            moduli.shear_modulus,
        ),
    ] {
        if sigma.is_some_and(|sigma| sigma >= modulus * factor) {
            log.mistakes.push(Mistake::at(
                filled.at(field),
                format!("`{}` is as large as the modulus itself", field.key),
                "give the uncertainty, not the modulus: usually a few percent, as \"2 %\"",
            ));
        }
    }
    note_unused(filled, log);
    warn(&moduli, log);
    Some(moduli)
}

fn named(material: &Material, temperature: Celsius) -> Moduli {
    Moduli {
        name: material.name.to_string(),
        youngs_modulus: material.youngs_modulus,
        shear_modulus: material.shear_modulus,
        temperature,
        loss_per_kelvin: material.loss_per_kelvin,
        expansion_per_kelvin: material.expansion_per_kelvin,
        notes: MaterialNotes {
            density: Some(material.density),
            ..MaterialNotes::default()
        },
    }
}

fn given(filled: &Filled, temperature: Option<Celsius>, log: &mut Log) -> Option<Moduli> {
    let mut change = |field: &'static Field| match filled.answer(field) {
        Some(_) => filled.number(field, log),
        None => {
            filled.note_default(field, log);
            Some(0.0)
        }
    };
    let (loss, expansion) = (change(&LOSS), change(&EXPANSION));
    let moduli = Moduli {
        name: "given moduli".to_string(),
        youngs_modulus: filled.number(&YOUNGS_MODULUS, log)?,
        shear_modulus: filled.number(&SHEAR_MODULUS, log)?,
        temperature: temperature?,
        loss_per_kelvin: loss?,
        expansion_per_kelvin: expansion?,
        notes: MaterialNotes {
            density: filled.number(&DENSITY, log),
            ..MaterialNotes::default()
        },
    };
    if moduli.temperature != 20.0 && !(filled.is_given(&LOSS) && filled.is_given(&EXPANSION)) {
        log.warnings.push(
            "the service temperature is not 20 degC, but the given moduli come without their \
             change per kelvin (modulus_loss_per_kelvin, expansion_per_kelvin): what is left out \
             is taken as unchanged"
                .to_string(),
        );
    }
    Some(moduli)
}

/// What is given for studies of a batch has no part in the assessment of one spring.
fn note_unused(filled: &Filled, log: &mut Log) {
    let given: Vec<&Field> = [&YOUNGS_UNCERTAINTY, &SHEAR_UNCERTAINTY, &DENSITY]
        .into_iter()
        .filter(|field| filled.is_given(field))
        .collect();
    if given.is_empty() {
        return;
    }
    let (are, them) = if given.len() == 1 {
        ("is", "it")
    } else {
        ("are", "them")
    };
    log.warnings.push(format!(
        "{} {are} kept for studies of a batch; this assessment does not use {them}",
        listed(&given, "and")
    ));
}

fn warn(moduli: &Moduli, log: &mut Log) {
    let ratio = moduli.youngs_modulus / moduli.shear_modulus;
    if !(2.0..=3.0).contains(&ratio) {
        log.warnings.push(format!(
            "E/G = {ratio:.2} lies outside 2 to 3, where isotropic metals are: check both moduli"
        ));
    }
    if !(-100.0..=300.0).contains(&moduli.temperature) {
        log.warnings.push(format!(
            "service temperature {:.0} degC: the linear change of the moduli is used far outside \
             usual spring service (-100 to 300 degC, common practice, no source)",
            moduli.temperature
        ));
    }
}
