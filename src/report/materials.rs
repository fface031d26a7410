//! The built-in wires as text.

use super::Units;
use super::layout::{Row, paragraph, table};
use super::numbers::fixed;
use crate::result::WireMaterial;

/// A table of the wires, then what each is, its source, and how sure the moduli are.
pub fn materials_text(materials: &[WireMaterial], units: Units) -> String {
    let modulus = units.modulus();
    let decimals = if modulus.symbol == "GPa" { 1 } else { 0 };
    let rows: Vec<Row> = materials
        .iter()
        .map(|material| {
            Row::of(
                material.name,
                vec![
                    fixed(modulus.of(material.youngs_modulus_pa), decimals),
                    fixed(modulus.of(material.shear_modulus_pa), decimals),
                    fixed(-1e4 * material.modulus_loss_per_k, 1),
                    fixed(1e6 * material.expansion_per_k, 1),
                    fixed(material.density_kg_per_m3, 0),
                    material.sureness.to_string(),
                ],
            )
        })
        .collect();
    let mut out = table(
        "Wire at 20 degC",
        &["E", "G", "E, G change", "expansion", "density", "moduli"],
        &[
            modulus.symbol,
            modulus.symbol,
            "%/100 K",
            "1e-6/K",
            "kg/m3",
            "",
        ],
        &rows,
    );
    out.push('\n');
    for material in materials {
        let text = format!("{}. Moduli: {}.", material.title, material.source);
        out += &paragraph(&format!("{}: ", material.name), &text);
    }
    out.push('\n');
    out += &paragraph(
        "",
        "Change of the moduli with temperature: EN 13906-1 (from memory), the share of G taken for E \
         too. Expansion and density: common handbook values, from memory. Tables of moduli differ by \
         some per cent. Where the maker of the wire gives a value, use that.",
    );
    out
}
