//! The command line of `coilstay`.

use coilstay::cli::{self, AssessRequest, Command, Trouble};
use coilstay::result::Verdict;
use std::process::ExitCode;

fn main() -> ExitCode {
    let done = match cli::parse() {
        Command::Assess(request) => assess(&request),
        Command::Starter(request) => request.run(),
        Command::Schema => cli::print_schema(),
        Command::Materials(request) => request.run(),
    };
    cli::exit_code(done)
}

fn assess(request: &AssessRequest) -> Result<Verdict, Trouble> {
    request.check_outputs()?;
    let cases = request.load();
    let outcomes = request.run(cases);
    request.show(&outcomes)?;
    Ok(cli::worst(&outcomes))
}
