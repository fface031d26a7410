//! The case file: TOML with quantities in quotes, read, checked and resolved into a
//! [`Setup`]. All mistakes are reported at once, each with its place, cause and cure.
//!
//! One table of fields (a `Form` for each TOML table, in the file named after it) serves the
//! reader, the messages and the schema. A field is read by `value`, the fields of a table are held
//! against one another by `rules`, and what only makes sense together is checked where the table
//! is resolved.

mod diagnostics;
mod duty;
mod fault;
mod field;
mod file;
mod filled;
mod form;
mod guide;
mod imperfections;
mod look_alike;
mod material;
mod nearest;
mod quantity;
mod reader;
mod resolve;
mod rules;
mod schema;
mod spring;
mod support;
mod syntax;
mod value;

pub use diagnostics::{Diagnostics, Item};
pub use material::MaterialNotes;
pub use schema::schema;

use crate::setup::Setup;
use diagnostics::Mistake;
use filled::Log;
use std::path::Path;
use toml::de::DeTable;

/// A case: what a file asks, resolved.
#[derive(Clone, Debug, PartialEq)]
pub struct Case {
    /// The question.
    pub setup: Setup,
    /// What the file says of the material beyond that.
    pub material: MaterialNotes,
    /// The file as it was read.
    pub text: String,
}

/// Reads the case file at `path`.
///
/// # Errors
/// All mistakes of the file at once; also where it cannot be read, is a directory, is no text in
/// UTF-8, or is larger than 1 MB (it is not read any further then).
pub fn load(path: &Path) -> Result<Case, Diagnostics> {
    let text = file::text_of(path)?;
    parse(&path.display().to_string(), &text)
}

/// Reads a case from its text. `file_name` is what messages call it.
///
/// # Errors
/// All mistakes of the text at once, of syntax and of meaning.
pub fn parse(file_name: &str, text: &str) -> Result<Case, Diagnostics> {
    let (table, errors) = DeTable::parse_recoverable(text);
    let refuse = |mistakes| Err(Diagnostics::new(file_name, text, mistakes));
    if table.get_ref().is_empty() && errors.is_empty() {
        return refuse(vec![Mistake::of_file(
            "the file says nothing: it is empty, or has comments only",
            "`coilstay starter` prints a case to begin from",
        )]);
    }
    let blanked = syntax::without_stops(text, &errors);
    let table = match &blanked {
        Some(text) => DeTable::parse_recoverable(text).0,
        None => table,
    };
    let mut log = Log::default();
    let filled = reader::read(table.get_ref(), &form::CASE, "", 0..0, &mut log);
    let resolved = resolve::resolve(&filled, file_name, &mut log);
    let syntax = syntax::mistakes(text, &errors);
    let mut mistakes = syntax::unexplained(text, &errors, &syntax, log.mistakes);
    mistakes.extend(syntax);
    match resolved {
        Some((setup, material)) if mistakes.is_empty() => Ok(Case {
            setup,
            material,
            text: text.to_string(),
        }),
        _ => refuse(mistakes),
    }
}

/// A commented case to begin from.
pub fn starter() -> &'static str {
    include_str!("starter.toml")
}
