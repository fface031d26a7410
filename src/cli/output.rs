//! Standard output and error, and the exit code.

use crate::result::Verdict;
use crate::store::StoreError;
use std::fmt;
use std::io::{self, Write};
use std::process::ExitCode;

/// Why a command could not finish.
#[derive(Debug)]
pub enum Trouble {
    /// An output file.
    Store(StoreError),
    /// Standard output.
    Print(io::Error),
    /// A report could not be made.
    Report(String),
}

impl fmt::Display for Trouble {
    fn fmt(&self, f: &mut fmt::Formatter) -> fmt::Result {
        match self {
            Trouble::Store(error) => write!(f, "{error}"),
            Trouble::Print(error) => write!(f, "standard output could not be written: {error}"),
            Trouble::Report(error) => write!(f, "{error}"),
        }
    }
}

impl std::error::Error for Trouble {}

impl From<StoreError> for Trouble {
    fn from(error: StoreError) -> Self {
        Trouble::Store(error)
    }
}

/// Prints text with styles; they are left out where standard output takes none (a pipe,
/// `NO_COLOR`). A reader that has gone away is no trouble: what it wanted it has.
///
/// # Errors
/// [`Trouble::Print`] for everything else, a full disk for one.
pub fn print(text: &str) -> Result<(), Trouble> {
    let mut out = anstream::stdout().lock();
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() == io::ErrorKind::BrokenPipe => Ok(()),
        Err(error) => Err(Trouble::Print(error)),
        Ok(()) => Ok(()),
    }
}

/// Prints to standard error, where nothing can be done about failing.
pub fn complain(text: &str) {
    let mut out = anstream::stderr().lock();
    let _ = out.write_all(text.as_bytes()).and_then(|()| out.flush());
}

/// Whether standard error takes colour.
pub fn error_takes_colour() -> bool {
    anstream::AutoStream::choice(&io::stderr()) != anstream::ColorChoice::Never
}

/// The exit code of a verdict: 0 holds, 1 does not hold, 2 could not be decided; 2 for trouble,
/// which is said on standard error.
pub fn exit_code(done: Result<Verdict, Trouble>) -> ExitCode {
    match done {
        Ok(Verdict::Holds) => ExitCode::SUCCESS,
        Ok(Verdict::DoesNotHold) => ExitCode::from(1),
        Ok(Verdict::Undecided) => ExitCode::from(2),
        Err(trouble) => {
            complain(&format!("coilstay: {trouble}\n"));
            ExitCode::from(2)
        }
    }
}
