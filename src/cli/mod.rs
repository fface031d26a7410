//! The command line: arguments, and one file for each command.

mod assess;
mod materials;
mod output;
mod schema;
mod starter;

pub use assess::{AssessRequest, worst};
pub use materials::MaterialsRequest;
pub use output::{Trouble, exit_code};
pub use schema::print_schema;
pub use starter::StarterRequest;

use crate::report::Units;
use clap::{Parser, Subcommand, ValueEnum};

/// Will a helical compression spring stay straight through its whole travel, and which limit
/// governs?
#[derive(Debug, Parser)]
#[command(
    name = "coilstay",
    version,
    about,
    max_term_width = 100,
    after_help = "Exit code: 0 every case holds, 1 a case does not hold, 2 a case could not be decided \
                  (mistakes in the input, no convergence) or the command line is wrong.\n\n\
                  A buckled spring can hurt people: results defer to the governing codes, a physical test \
                  and a licensed engineer."
)]
pub struct Arguments {
    /// What to do.
    #[command(subcommand)]
    pub command: Command,
}

/// What to do.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Assess one or more case files.
    Assess(AssessRequest),
    /// Print a commented case file to begin from.
    Starter(StarterRequest),
    /// Print the JSON Schema of the case file, for editors that complete and check it.
    Schema,
    /// List the built-in wire materials.
    Materials(MaterialsRequest),
}

/// Form of what is printed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum Format {
    /// Text to be read.
    Text,
    /// Data: SI, `null` for "never".
    Json,
}

/// Units of text and pictures. JSON and CSV are SI always.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum UnitSystem {
    /// mm, N, N/mm, MPa, deg.
    Metric,
    /// in, lbf, lbf/in, ksi, deg.
    Inch,
}

impl From<UnitSystem> for Units {
    fn from(system: UnitSystem) -> Self {
        match system {
            UnitSystem::Metric => Units::Metric,
            UnitSystem::Inch => Units::Inch,
        }
    }
}

/// The arguments this program was started with. Help, version and mistakes in the arguments are
/// dealt with here: the program ends with exit code 0 or 2.
pub fn parse() -> Command {
    Arguments::parse().command
}
