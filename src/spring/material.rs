//! Built-in wire materials. Moduli are inputs with an uncertainty, not constants: tables differ.

use crate::units::{Celsius, Pascal};

/// How sure a built-in value is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sureness {
    /// Seen in a published text.
    Seen,
    /// From memory of the named source.
    FromMemory,
}

/// A wire material at 20 °C with its linear change over temperature.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Material {
    /// Name used in a case file.
    pub name: &'static str,
    /// What it is, in words.
    pub title: &'static str,
    /// Young's modulus at 20 °C, Pa.
    pub youngs_modulus: Pascal,
    /// Shear modulus at 20 °C, Pa.
    pub shear_modulus: Pascal,
    /// Relative loss of both moduli per kelvin above 20 °C, 1/K.
    pub loss_per_kelvin: f64,
    /// Linear thermal expansion, 1/K.
    pub expansion_per_kelvin: f64,
    /// Density, kg/m³.
    pub density: f64,
    /// Where the moduli come from.
    pub source: &'static str,
    /// How sure the moduli are.
    pub sureness: Sureness,
}

impl Material {
    /// Factor on E and G at `temperature`, °C: `1 − loss·(T − 20)`.
    ///
    /// Source: EN 13906-1, change of G with temperature (from memory); the same share is taken for E.
    pub fn modulus_factor(&self, temperature: Celsius) -> f64 {
        1.0 - self.loss_per_kelvin * (temperature - 20.0)
    }

    /// Factor on every length at `temperature`, °C: `1 + expansion·(T − 20)`.
    pub fn length_factor(&self, temperature: Celsius) -> f64 {
        1.0 + self.expansion_per_kelvin * (temperature - 20.0)
    }
}

/// The built-in materials.
pub fn materials() -> &'static [Material] {
    &MATERIALS
}

/// The built-in material of that name.
pub fn named_material(name: &str) -> Option<&'static Material> {
    MATERIALS.iter().find(|m| m.name == name)
}

const MPSI: f64 = 6.894_757_293_168_361e9;

const fn steel(
    name: &'static str,
    title: &'static str,
    youngs_modulus: Pascal,
    shear_modulus: Pascal,
    source: &'static str,
    sureness: Sureness,
) -> Material {
    Material {
        name,
        title,
        youngs_modulus,
        shear_modulus,
        loss_per_kelvin: 0.25e-3,
        expansion_per_kelvin: 11.7e-6,
        density: 7850.0,
        source,
        sureness,
    }
}

const fn stainless(
    name: &'static str,
    title: &'static str,
    youngs_modulus: Pascal,
    shear_modulus: Pascal,
    source: &'static str,
    sureness: Sureness,
) -> Material {
    Material {
        name,
        title,
        youngs_modulus,
        shear_modulus,
        loss_per_kelvin: 0.40e-3,
        expansion_per_kelvin: 16.0e-6,
        density: 7900.0,
        source,
        sureness,
    }
}

const MUSIC: &str = "Shigley's Mechanical Engineering Design, table of moduli of spring wire";

static MATERIALS: [Material; 11] = [
    steel(
        "patented-carbon-steel",
        "patented cold drawn carbon steel, EN 10270-1",
        206e9,
        81.5e9,
        "EN 10270-1, EN 13906-1",
        Sureness::FromMemory,
    ),
    steel(
        "oil-tempered-steel",
        "oil hardened and tempered steel, EN 10270-2",
        206e9,
        81.5e9,
        "EN 10270-2, EN 13906-1",
        Sureness::FromMemory,
    ),
    stainless(
        "stainless-1.4310",
        "stainless steel 1.4310, EN 10270-3",
        185e9,
        73e9,
        "EN 10270-3",
        Sureness::Seen,
    ),
    stainless(
        "stainless-1.4401",
        "stainless steel 1.4401, EN 10270-3",
        180e9,
        71e9,
        "EN 10270-3",
        Sureness::Seen,
    ),
    steel(
        "music-wire-to-0.032in",
        "music wire, diameter up to 0.032 in",
        29.5 * MPSI,
        12.0 * MPSI,
        MUSIC,
        Sureness::Seen,
    ),
    steel(
        "music-wire-to-0.063in",
        "music wire, diameter 0.033 to 0.063 in",
        29.0 * MPSI,
        11.85 * MPSI,
        MUSIC,
        Sureness::Seen,
    ),
    steel(
        "music-wire-to-0.125in",
        "music wire, diameter 0.064 to 0.125 in",
        28.5 * MPSI,
        11.75 * MPSI,
        MUSIC,
        Sureness::Seen,
    ),
    steel(
        "music-wire-above-0.125in",
        "music wire, diameter above 0.125 in",
        28.0 * MPSI,
        11.6 * MPSI,
        MUSIC,
        Sureness::Seen,
    ),
    steel(
        "chrome-silicon",
        "chrome-silicon steel",
        29.5 * MPSI,
        11.2 * MPSI,
        MUSIC,
        Sureness::Seen,
    ),
    stainless(
        "stainless-302",
        "stainless steel 302, 304 and 316",
        28.0 * MPSI,
        10.0 * MPSI,
        MUSIC,
        Sureness::Seen,
    ),
    Material {
        expansion_per_kelvin: 11.0e-6,
        ..stainless(
            "stainless-17-7ph",
            "stainless steel 17-7PH (other tables print G = 11 Mpsi)",
            29.5 * MPSI,
            10.5 * MPSI,
            MUSIC,
            Sureness::Seen,
        )
    },
];
