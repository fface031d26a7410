//! `assess`: cases in, verdicts out.

use super::output::{complain, error_takes_colour, print};
use super::{Format, Trouble, UnitSystem};
use crate::case::{self, Diagnostics};
use crate::report;
use crate::result::{Mistake, Outcome, Refusal, Verdict};
use crate::setup::Setup;
use crate::store::{self, Existing, Output};
use crate::study::{Question, assess_all};
use clap::Args;
use indicatif::{ProgressBar, ProgressStyle};
use std::path::{Path, PathBuf};

/// Arguments of `assess`.
#[derive(Debug, Args)]
pub struct AssessRequest {
    /// Case files.
    #[arg(required = true, value_name = "CASE")]
    pub cases: Vec<PathBuf>,
    /// Form of the verdict.
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub format: Format,
    /// Units of text and pictures; JSON and CSV are SI always.
    #[arg(long, value_enum, default_value_t = UnitSystem::Metric)]
    pub units: UnitSystem,
    /// Also write each load path into this directory: CASE-path.csv and CASE-path.svg.
    #[arg(long, value_name = "DIR")]
    pub out: Option<PathBuf>,
    /// Let files that exist be written anew.
    #[arg(long, requires = "out")]
    pub replace: bool,
}

/// A case as read: its question, or why it has none.
pub type Loaded = Result<Question, Refusal>;

impl AssessRequest {
    /// Whether the outputs asked for may be written, before anything is computed.
    ///
    /// # Errors
    /// [`Trouble::Store`]: a file exists already, or two cases would write the same one.
    pub fn check_outputs(&self) -> Result<(), Trouble> {
        let Some(directory) = &self.out else {
            return Ok(());
        };
        let paths: Vec<PathBuf> = self
            .cases
            .iter()
            .flat_map(|case| path_files(directory, case))
            .collect();
        Ok(store::check(
            paths.iter().map(PathBuf::as_path),
            self.existing(),
        )?)
    }

    /// Reads every case. The mistakes of those that cannot be used are explained on standard
    /// error; they do not stop the others.
    pub fn load(&self) -> Vec<Loaded> {
        self.cases.iter().map(|path| load(path)).collect()
    }

    /// Assesses every case that could be read.
    pub fn run(&self, cases: Vec<Loaded>) -> Vec<Outcome> {
        let questions: Vec<Question> = cases.iter().flatten().cloned().collect();
        let progress = progress(questions.len());
        let mut answers = assess_all(&questions, &|| progress.inc(1)).into_iter();
        progress.finish_and_clear();
        cases
            .into_iter()
            .filter_map(|case| match case {
                Ok(_) => answers
                    .next()
                    .map(|answer| Outcome::Assessed(Box::new(answer))),
                Err(refusal) => Some(Outcome::Refused(refusal)),
            })
            .collect()
    }

    /// Writes the load paths where they are wanted, then prints the verdicts.
    ///
    /// # Errors
    /// [`Trouble`]: an output file or standard output could not be written.
    pub fn show(&self, outcomes: &[Outcome]) -> Result<(), Trouble> {
        if let Some(directory) = &self.out {
            let outputs = self.load_paths(directory, outcomes)?;
            store::write(&outputs, self.existing())?;
        }
        let units = self.units.into();
        match self.format {
            Format::Json => {
                let data =
                    report::json(outcomes).map_err(|error| Trouble::Report(error.to_string()))?;
                print(&data)
            }
            Format::Text => {
                let mut texts: Vec<String> = outcomes
                    .iter()
                    .map(|outcome| report::text(outcome, units))
                    .collect();
                if outcomes.len() > 1 {
                    texts.push(report::summary(outcomes, units));
                }
                print(&texts.join("\n\n"))
            }
        }
    }

    fn existing(&self) -> Existing {
        if self.replace {
            Existing::Replace
        } else {
            Existing::Refuse
        }
    }

    /// CSV and picture of every case that has a load path.
    fn load_paths(&self, directory: &Path, outcomes: &[Outcome]) -> Result<Vec<Output>, Trouble> {
        let mut outputs = Vec::new();
        for (case, outcome) in self.cases.iter().zip(outcomes) {
            let Outcome::Assessed(assessment) = outcome else {
                continue;
            };
            let Some(column) = &assessment.imperfect_column else {
                let file = &assessment.file;
                complain(&format!(
                    "coilstay: {file}: no load path was computed, none is written\n"
                ));
                continue;
            };
            let table =
                report::csv(&column.path).map_err(|error| Trouble::Report(error.to_string()))?;
            let picture = report::plot(assessment, &column.path, self.units.into())
                .map_err(|error| Trouble::Report(error.to_string()))?;
            let contents = [table, picture.into_bytes()];
            for (path, content) in path_files(directory, case).into_iter().zip(contents) {
                outputs.push(Output { path, content });
            }
        }
        Ok(outputs)
    }
}

/// Cases below which the work is done before a bar would be read.
const FEW_CASES: usize = 8;

/// A bar of cases done with the time left, on standard error if that is a terminal.
fn progress(cases: usize) -> ProgressBar {
    if cases < FEW_CASES {
        return ProgressBar::hidden();
    }
    let style = ProgressStyle::with_template("assessed {pos} of {len} cases, {eta} left {bar:30}")
        .unwrap_or_else(|_| ProgressStyle::default_bar());
    ProgressBar::new(cases as u64).with_style(style)
}

/// The verdict of several: the worst.
pub fn worst(outcomes: &[Outcome]) -> Verdict {
    let verdicts = || outcomes.iter().map(Outcome::verdict);
    [Verdict::Undecided, Verdict::DoesNotHold]
        .into_iter()
        .find(|bad| verdicts().any(|verdict| verdict == *bad))
        .unwrap_or(Verdict::Holds)
}

fn load(path: &Path) -> Loaded {
    let file = path.display().to_string();
    match case::load(path) {
        Ok(read) => {
            let setup: Setup = read.setup;
            Ok(Question { file, setup })
        }
        Err(diagnostics) => {
            complain(&diagnostics.render(error_takes_colour()));
            Err(Refusal::new(file, mistakes(&diagnostics)))
        }
    }
}

fn mistakes(diagnostics: &Diagnostics) -> Vec<Mistake> {
    let items = diagnostics.items();
    let mut mistakes: Vec<Mistake> = items
        .iter()
        .map(|item| Mistake {
            line: item.line,
            column: item.column,
            message: item.message.clone(),
            cure: item.cure.clone(),
        })
        .collect();
    let unlisted = diagnostics.count() - items.len();
    if let (Some(last), true) = (items.last(), unlisted > 0) {
        mistakes.push(Mistake {
            line: last.line,
            column: last.column,
            message: format!("and {unlisted} more mistakes after these"),
            cure: "mend these, then run again".into(),
        });
    }
    mistakes
}

/// Where the load path of a case goes: its table and its picture.
fn path_files(directory: &Path, case: &Path) -> [PathBuf; 2] {
    let stem = case.file_stem().unwrap_or(case.as_os_str());
    ["-path.csv", "-path.svg"].map(|ending| {
        let mut name = stem.to_os_string();
        name.push(ending);
        directory.join(name)
    })
}
