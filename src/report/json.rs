//! The same as data: SI, `null` for "never" and for what is not a finite number.

use crate::result::{Outcome, WireMaterial};
use serde::Serialize;

/// One case as an object, several as `{"cases": [...]}`; indented, with a line end.
///
/// # Errors
/// None for these types in practice; the serialiser's own error is passed on.
pub fn json(outcomes: &[Outcome]) -> Result<String, serde_json::Error> {
    #[derive(Serialize)]
    struct Cases<'a> {
        cases: &'a [Outcome],
    }
    match outcomes {
        [one] => indented(one),
        several => indented(&Cases { cases: several }),
    }
}

/// The built-in wires as `{"materials": [...]}`.
///
/// # Errors
/// As [`json`].
pub fn materials_json(materials: &[WireMaterial]) -> Result<String, serde_json::Error> {
    #[derive(Serialize)]
    struct Materials<'a> {
        materials: &'a [WireMaterial],
    }
    indented(&Materials { materials })
}

fn indented<T: Serialize>(data: &T) -> Result<String, serde_json::Error> {
    // serde_json writes NaN and infinities as null.
    serde_json::to_string_pretty(data).map(|text| text + "\n")
}
