//! What is not TOML: the parser's findings in our words, each with a cure, and what of the other
//! mistakes they explain.

use super::diagnostics::{Lines, Mistake, Place};
use super::nearest::excerpt;
use std::collections::BTreeSet;
use toml::de::Error;

/// How the parser begins to say that a value has no quotes.
const UNQUOTED: &str = "string values must be quoted";

/// The mistakes of syntax, at most one a line: the others on that line follow from it. Of brackets
/// that are not closed only the first: it swallows the lines after it.
pub(super) fn mistakes(text: &str, errors: &[Error]) -> Vec<Mistake> {
    let lines = Lines::of(text);
    let mut places: Vec<(Place, &Error)> = errors
        .iter()
        .map(|error| (error.span().unwrap_or(0..0), error))
        .collect();
    places.sort_by_key(|(place, _)| place.start);
    let mut seen = BTreeSet::new();
    let mut swallowed = false;
    places
        .into_iter()
        .filter(|(place, _)| seen.insert(lines.index(place.start)))
        .filter(|(_, error)| {
            let first = !swallowed;
            let swallows = swallows(&lines, error);
            swallowed |= swallows;
            first || !swallows
        })
        .map(|(place, error)| mistake(text, &lines, place, error))
        .collect()
}

/// Whether the parser takes what follows for part of a bracket, or gives up.
fn swallows(lines: &Lines<'_>, error: &Error) -> bool {
    let message = error.message();
    is_header_in_value(lines, error)
        || message.starts_with("missing comma")
        || message.contains("inline table")
        || is_too_deep(message)
}

/// Whether a table header is taken for a value, inside a bracket that is not closed.
fn is_header_in_value(lines: &Lines<'_>, error: &Error) -> bool {
    let start = error.span().map_or(0, |place| place.start);
    let line = lines.text(lines.index(start));
    let parser = error.message();
    let value = parser.starts_with("invalid") && !parser.contains("key");
    (parser.starts_with(UNQUOTED) || value) && line.trim_start().starts_with('[')
}

fn is_too_deep(parser: &str) -> bool {
    parser.contains("recurse") || parser.contains("recursion")
}

/// `text` with the lines blanked out at which the parser would stop building tables, byte for byte
/// as long; `None` where there are none. So the lines after them are read all the same.
pub(super) fn without_stops(text: &str, errors: &[Error]) -> Option<String> {
    let lines = Lines::of(text);
    let stops: BTreeSet<usize> = errors
        .iter()
        .filter(|error| {
            error.message().contains("key") && !error.message().starts_with("duplicate key")
        })
        .map(|error| lines.index(error.span().map_or(0, |place| place.start)))
        .collect();
    if stops.is_empty() {
        return None;
    }
    let blanked = text.split_inclusive('\n').enumerate().map(|(index, line)| {
        match (stops.contains(&index), line.strip_suffix('\n')) {
            (false, _) => line.to_string(),
            (true, Some(line)) => " ".repeat(line.len()) + "\n",
            (true, None) => " ".repeat(line.len()),
        }
    });
    Some(blanked.collect())
}

fn mistake(text: &str, lines: &Lines<'_>, place: Place, error: &Error) -> Mistake {
    let parser = error.message();
    let here = text.get(place.clone()).unwrap_or_default();
    let line = lines.text(lines.index(place.start));
    let (message, cure) = if parser.starts_with("missing comma")
        || parser.contains("inline table")
        || is_header_in_value(lines, error)
    {
        (
            "a comma is missing, or a bracket is not closed".to_string(),
            "put commas between the parts, and close the bracket, as in { radial = \"6 mm\", axial = \"4 mm\" }"
                .to_string(),
        )
    } else if parser.starts_with(UNQUOTED) {
        unquoted(here)
    } else if parser.starts_with("invalid literal string")
        && here.is_empty()
        && !line.contains('\'')
    {
        unquoted("")
    } else if parser.contains("string") && parser.contains("expected") {
        (
            "a quoted text is not closed, or holds what it may not".to_string(),
            "end it on the same line with the quote it begins with".to_string(),
        )
    } else if parser.starts_with("duplicate key") {
        (
            format!("`{}` is given twice", excerpt(here)),
            "keep one of the two".to_string(),
        )
    } else if parser.starts_with("key with no value") {
        (
            "a line with neither `key = value` nor a [table] header".to_string(),
            "write key = value, as in free_length = \"210 mm\"; comments begin with #".to_string(),
        )
    } else if parser.starts_with("unclosed table") {
        (
            "a table header is not closed".to_string(),
            "end it with a bracket, as in [spring]".to_string(),
        )
    } else if parser.starts_with("unclosed array table") {
        (
            "the header of a list is not closed".to_string(),
            "end it with two brackets, as in [[guide]]".to_string(),
        )
    } else if is_too_deep(parser) {
        (
            "brackets or keys are nested too deeply".to_string(),
            "a case file is flat: [table] headers with key = value below, at most { key = value } in a value"
                .to_string(),
        )
    } else if parser.starts_with("unexpected key or value") {
        more_on_the_line(text, &place)
    } else if parser.contains("unquoted key") {
        (
            "not a key: keys have letters, digits, `_` and `-`".to_string(),
            "write key = value, as in free_length = \"210 mm\"; comments begin with #".to_string(),
        )
    } else {
        (
            format!("not TOML: {parser}"),
            "lines read key = value, under headers such as [spring]; `coilstay starter` prints a case to begin from"
                .to_string(),
        )
    };
    let place = if parser.starts_with("key with no value") {
        lines.words(lines.index(place.start))
    } else {
        place
    };
    Mistake::at(place, message, cure)
}

fn unquoted(value: &str) -> (String, String) {
    match value.trim() {
        "" => (
            "nothing stands after `=`".to_string(),
            "give the value, as in free_length = \"210 mm\", or remove the line".to_string(),
        ),
        value => (
            format!("`{}` needs quotes", excerpt(value)),
            format!(
                "write \"{}\": quantities and words stand in quotes",
                excerpt(value.trim_end_matches(['"', '\'']))
            ),
        ),
    }
}

fn more_on_the_line(text: &str, place: &Place) -> (String, String) {
    let before = text.get(..place.start).unwrap_or_default();
    let after = text.get(place.start..).unwrap_or_default();
    let comma = after.starts_with(',') && before.ends_with(|c: char| c.is_ascii_digit());
    if comma {
        (
            "a comma in a number".to_string(),
            "write a decimal point: 8.5".to_string(),
        )
    } else {
        (
            "the line goes on after its value".to_string(),
            "one key = value a line; comments begin with #".to_string(),
        )
    }
}

/// Drops of `others` what the mistakes of syntax, found as `errors`, explain: whatever stands on one
/// of their lines, the absence of a key that such a line has, of any key where a header is broken or
/// a bracket swallows what follows, and the keys under a header that is not seen as one.
pub(super) fn unexplained(
    text: &str,
    errors: &[Error],
    syntax: &[Mistake],
    others: Vec<Mistake>,
) -> Vec<Mistake> {
    let lines = Lines::of(text);
    let line_of = |mistake: &Mistake| {
        mistake
            .place
            .as_ref()
            .map_or(0, |place| lines.index(place.start))
    };
    let broken: BTreeSet<usize> = syntax.iter().map(line_of).collect();
    if broken.is_empty() {
        return others;
    }
    let is_header = |line: usize| lines.text(line).trim_start().starts_with('[');
    let lost_header = |line: usize| {
        let words = lines.text(line).trim();
        !is_header(line) && words.ends_with(']') && !words.contains('=')
    };
    // A key is read as one of another table where the header last above it is lost.
    let headers: BTreeSet<usize> = lines
        .indices()
        .filter(|line| is_header(*line) || (broken.contains(line) && lost_header(*line)))
        .collect();
    let is_astray = |mistake: &Mistake| {
        let above = headers.range(..=line_of(mistake)).next_back();
        above.is_some_and(|above| !is_header(*above))
    };
    // A text in triple quotes that is not closed runs on to where that was noticed.
    let runs_on = |mistake: &Mistake| {
        mistake.place.as_ref().is_some_and(|place| {
            let value = text.get(place.clone()).unwrap_or_default();
            (value.starts_with("\"\"\"") || value.starts_with("'''"))
                && broken.contains(&lines.index(place.end))
        })
    };
    // What follows a header that is taken for a value is taken for values too.
    let swallowed_from = errors
        .iter()
        .filter(|error| is_header_in_value(&lines, error))
        .map(|error| lines.index(error.span().map_or(0, |place| place.start)))
        .min()
        .unwrap_or(usize::MAX);
    let all_absent = text.contains("\"\"\"")
        || text.contains("'''")
        || errors.iter().any(|error| swallows(&lines, error))
        || broken
            .iter()
            .any(|line| is_header(*line) || lost_header(*line));
    let has = |key: &&str| broken.iter().any(|line| lines.text(*line).contains(*key));
    others
        .into_iter()
        .filter(|mistake| line_of(mistake) < swallowed_from)
        .filter(|mistake| {
            if mistake.absent.is_empty() {
                !broken.contains(&line_of(mistake)) && !is_astray(mistake) && !runs_on(mistake)
            } else {
                !all_absent && !mistake.absent.iter().any(has)
            }
        })
        .collect()
}
