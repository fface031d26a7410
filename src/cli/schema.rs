//! `schema`: the JSON Schema of the case file.

use super::Trouble;
use super::output::print;
use crate::case;
use crate::result::Verdict;

/// Prints it.
///
/// # Errors
/// [`Trouble::Print`].
pub fn print_schema() -> Result<Verdict, Trouble> {
    print(&format!("{:#}\n", case::schema()))?;
    Ok(Verdict::Holds)
}
