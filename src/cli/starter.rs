//! `starter`: a case to begin from.

use super::Trouble;
use super::output::print;
use crate::case;
use crate::result::Verdict;
use crate::store::{self, Existing, Output};
use clap::Args;
use std::path::PathBuf;

/// Arguments of `starter`.
#[derive(Debug, Args)]
pub struct StarterRequest {
    /// Write it to this file instead of standard output.
    #[arg(short, long, value_name = "FILE")]
    pub output: Option<PathBuf>,
    /// Let the file be written anew if it exists.
    #[arg(long, requires = "output")]
    pub replace: bool,
}

impl StarterRequest {
    /// Prints or writes the case.
    ///
    /// # Errors
    /// [`Trouble`]: the file or standard output could not be written.
    pub fn run(&self) -> Result<Verdict, Trouble> {
        match &self.output {
            None => print(case::starter())?,
            Some(path) => {
                let existing = if self.replace {
                    Existing::Replace
                } else {
                    Existing::Refuse
                };
                let output = Output {
                    path: path.clone(),
                    content: case::starter().into(),
                };
                store::write(&[output], existing)?;
            }
        }
        Ok(Verdict::Holds)
    }
}
