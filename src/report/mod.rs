//! Results as text, JSON, CSV and pictures. Computes no mechanics: it takes `result` and turns
//! numbers into text.

mod csv;
mod json;
mod layout;
mod leaning;
mod losses;
mod materials;
mod names;
mod numbers;
mod plot;
mod text;

pub use csv::csv;
pub use json::{json, materials_json};
pub use materials::materials_text;
pub use numbers::{Unit, Units};
pub use plot::{PlotError, plot};
pub use text::{CAUTION, summary, text};
