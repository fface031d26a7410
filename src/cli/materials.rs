//! `materials`: the built-in wires.

use super::output::print;
use super::{Format, Trouble, UnitSystem};
use crate::report;
use crate::result::{Verdict, wire_materials};
use clap::Args;

/// Arguments of `materials`.
#[derive(Debug, Args)]
pub struct MaterialsRequest {
    /// Form of the list.
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub format: Format,
    /// Units of the moduli in the text; JSON is SI always.
    #[arg(long, value_enum, default_value_t = UnitSystem::Metric)]
    pub units: UnitSystem,
}

impl MaterialsRequest {
    /// Prints the list.
    ///
    /// # Errors
    /// [`Trouble`]: standard output could not be written.
    pub fn run(&self) -> Result<Verdict, Trouble> {
        let wires = wire_materials();
        let text = match self.format {
            Format::Text => report::materials_text(&wires, self.units.into()),
            Format::Json => report::materials_json(&wires)
                .map_err(|error| Trouble::Report(error.to_string()))?,
        };
        print(&text)?;
        Ok(Verdict::Holds)
    }
}
