//! The built-in wires as plain data.

use crate::spring::{Material, Sureness, materials};
use serde::Serialize;

/// A built-in wire material at 20 °C.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct WireMaterial {
    pub name: &'static str,
    pub title: &'static str,
    pub youngs_modulus_pa: f64,
    pub shear_modulus_pa: f64,
    /// Relative loss of both moduli per kelvin above 20 °C.
    pub modulus_loss_per_k: f64,
    pub expansion_per_k: f64,
    pub density_kg_per_m3: f64,
    pub source: &'static str,
    /// How sure the moduli are: "seen" in the source, or "from memory" of it.
    pub sureness: &'static str,
    /// Source of the change with temperature and how sure it is.
    pub modulus_loss_source: &'static str,
    /// Source of expansion and density and how sure they are.
    pub expansion_and_density_source: &'static str,
}

impl From<&Material> for WireMaterial {
    fn from(material: &Material) -> Self {
        WireMaterial {
            name: material.name,
            title: material.title,
            youngs_modulus_pa: material.youngs_modulus,
            shear_modulus_pa: material.shear_modulus,
            modulus_loss_per_k: material.loss_per_kelvin,
            expansion_per_k: material.expansion_per_kelvin,
            density_kg_per_m3: material.density,
            source: material.source,
            sureness: match material.sureness {
                Sureness::Seen => "seen",
                Sureness::FromMemory => "from memory",
            },
            modulus_loss_source: "EN 13906-1 (from memory), the share of G taken for E too",
            expansion_and_density_source: "common handbook values, from memory",
        }
    }
}

/// Every built-in wire material, in the order of the table.
pub fn wire_materials() -> Vec<WireMaterial> {
    materials().iter().map(WireMaterial::from).collect()
}
