//! The verdict as text, to be read aloud: the answer first, then what to beware of,
//! then what it rests on.

mod answer;
mod contact;
mod ends;
mod inputs;
mod limits;
mod measures;
mod remarks;
mod summary;
mod supports;

pub use summary::summary;

use super::Units;
use super::layout::{HEADING, OPEN, STRONG, paragraph, styled};
use crate::result::{Assessment, Outcome, Refusal};

/// What every verdict ends with.
pub const CAUTION: &str = "A buckled spring can hurt people. This is a calculation with an idealised column, not an \
     approval: the governing codes come first, a physical test confirms, and a licensed engineer decides.";

/// One case as text, with styles.
pub fn text(outcome: &Outcome, units: Units) -> String {
    match outcome {
        Outcome::Assessed(assessment) => verdict(assessment, units),
        Outcome::Refused(refusal) => refused(refusal),
    }
}

fn verdict(assessment: &Assessment, units: Units) -> String {
    let sections = [
        title(&assessment.title, &assessment.file),
        answer::question(assessment, units),
        answer::answer(assessment, units),
        ends::planes(assessment, units),
        remarks::warnings(assessment),
        measures::measures(assessment, units),
        measures::comparisons(assessment, units),
        ends::end_constant(assessment),
        limits::limits(assessment, units),
        remarks::dead_load(assessment, units),
        remarks::snap(assessment, units),
        contact::guides(assessment, units),
        contact::seats(assessment, units),
        contact::stroke(assessment, units),
        ends::sensitivity(assessment),
        remarks::absolute_stability(assessment, units),
        remarks::stress_at_solid(assessment, units),
        inputs::inputs(assessment, units),
        section("Caution", &paragraph("  ", CAUTION)),
    ];
    join(&sections)
}

/// A case that could not be read. The mistakes stand on standard error with the text they are in.
fn refused(refusal: &Refusal) -> String {
    let count = match refusal.mistakes.len() {
        1 => "one mistake",
        _ => "mistakes",
    };
    let words = format!("{count} in the input, explained on standard error.");
    let verdict = styled("COULD NOT BE DECIDED:", OPEN);
    format!(
        "{}\n  {verdict} {words}\n",
        styled(paragraph("", &refusal.file).trim_end(), STRONG)
    )
}

/// The title, and the file below it; a case without a title is called by its file already.
fn title(title: &str, file: &str) -> String {
    let title = paragraph("", title);
    let file = paragraph("", file);
    let below = if file == title { "" } else { &file };
    format!("{}\n{below}", styled(title.trim_end(), STRONG))
}

/// A section under its heading; none where there is nothing to say.
fn section(heading: &str, body: &str) -> String {
    if body.is_empty() {
        return String::new();
    }
    format!("{}\n{body}", styled(heading, HEADING))
}

fn join(sections: &[String]) -> String {
    let present: Vec<&str> = sections
        .iter()
        .map(String::as_str)
        .filter(|section| !section.is_empty())
        .collect();
    present.join("\n")
}
