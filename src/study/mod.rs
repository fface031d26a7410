//! Many assessments at once.

use crate::assess::assess;
use crate::result::Assessment;
use crate::setup::Setup;
use rayon::prelude::*;

/// A case to be assessed.
#[derive(Clone, Debug, PartialEq)]
pub struct Question {
    /// File of the case, as given on the command line.
    pub file: String,
    /// The question.
    pub setup: Setup,
}

/// Assesses every question, as many at once as there are processors. The answers stand in the
/// order of the questions and do not depend on the number of threads: no two share anything.
/// `done` is called after each.
pub fn assess_all(questions: &[Question], done: &(dyn Fn() + Sync)) -> Vec<Assessment> {
    questions
        .par_iter()
        .map(|question| {
            let answer = assess(&question.setup, &question.file);
            done();
            answer
        })
        .collect()
}
