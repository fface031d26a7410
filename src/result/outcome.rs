//! What became of a case file: an answer, or the mistakes that kept it from one.

use super::{Assessment, Verdict};
use serde::Serialize;

/// What became of one case.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[serde(untagged)]
pub enum Outcome {
    /// It was read and assessed.
    Assessed(Box<Assessment>),
    /// Its input could not be used.
    Refused(Refusal),
}

impl Outcome {
    /// The verdict; input that could not be used is undecided.
    pub fn verdict(&self) -> Verdict {
        match self {
            Outcome::Assessed(assessment) => assessment.verdict,
            Outcome::Refused(refusal) => refusal.verdict,
        }
    }

    /// File of the case, as given on the command line.
    pub fn file(&self) -> &str {
        match self {
            Outcome::Assessed(assessment) => &assessment.file,
            Outcome::Refused(refusal) => &refusal.file,
        }
    }
}

/// A case whose input could not be used.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Refusal {
    /// File of the case, as given on the command line.
    pub file: String,
    /// Always undecided.
    pub verdict: Verdict,
    /// Every mistake found, in the order of the file.
    pub mistakes: Vec<Mistake>,
}

impl Refusal {
    /// The refusal of `file` for its `mistakes`.
    pub fn new(file: impl Into<String>, mistakes: Vec<Mistake>) -> Self {
        Refusal {
            file: file.into(),
            verdict: Verdict::Undecided,
            mistakes,
        }
    }
}

/// A mistake in a case file.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Mistake {
    /// Line, from 1. A mistake of the file as a whole stands at line 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
    /// What is wrong, and why.
    pub message: String,
    /// What to do about it.
    pub cure: String,
}
