//! What is not TOML: the parser's findings in our words, each with a cure, and what of the other
//! mistakes they explain.

use super::diagnostics::{Lines, Mistake, Place};
use super::nearest::excerpt;
use std::collections::BTreeSet;
use toml::de::Error;

/// The mistakes of syntax, at most one a line: the others on that line follow from it.
pub(super) fn mistakes(text: &str, errors: &[Error]) -> Vec<Mistake> {
    let lines = Lines::of(text);
    let mut places: Vec<(Place, &Error)> = errors
        .iter()
        .map(|error| (error.span().unwrap_or(0..0), error))
        .collect();
    places.sort_by_key(|(place, _)| place.start);
    let mut seen = BTreeSet::new();
    places
        .into_iter()
        .filter(|(place, _)| seen.insert(lines.index(place.start)))
        .map(|(place, error)| mistake(text, &lines, place, error.message()))
        .collect()
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

fn mistake(text: &str, lines: &Lines<'_>, place: Place, parser: &str) -> Mistake {
    let here = text.get(place.clone()).unwrap_or_default();
    let line = lines.text(lines.index(place.start));
    let (message, cure) = if parser.starts_with("string values must be quoted") {
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
    } else if parser.starts_with("unexpected key or value") {
        more_on_the_line(text, &place)
    } else if parser.starts_with("missing comma") {
        (
            "a comma is missing, or a bracket is not closed".to_string(),
            "put commas between the parts, and close the bracket, as in { radial = \"6 mm\", axial = \"4 mm\" }"
                .to_string(),
        )
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

/// Drops of `others` what the mistakes of syntax explain: whatever stands on one of their lines,
/// and the absence of a key that such a line has, or of any key where a header is broken.
pub(super) fn unexplained(text: &str, syntax: &[Mistake], others: Vec<Mistake>) -> Vec<Mistake> {
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
    let multi_line = text.contains("\"\"\"") || text.contains("'''");
    let all_absent = multi_line
        || broken
            .iter()
            .any(|line| lines.text(*line).trim_start().starts_with('['));
    let has = |key: &&str| broken.iter().any(|line| lines.text(*line).contains(*key));
    others
        .into_iter()
        .filter(|mistake| {
            if mistake.absent.is_empty() {
                !broken.contains(&line_of(mistake))
            } else {
                !all_absent && !mistake.absent.iter().any(has)
            }
        })
        .collect()
}
