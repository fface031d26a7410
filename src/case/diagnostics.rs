//! The mistakes of a case file, all at once, each with its place, cause and cure.

use annotate_snippets::{
    AnnotationKind, Group, Level, Origin, Renderer, Snippet, normalize_untrusted_str,
};
use std::collections::BTreeMap;
use std::fmt;
use std::ops::Range;

/// Bytes of the text from where to where.
pub(super) type Place = Range<usize>;

/// More mistakes than this are counted, not listed.
const LISTED: usize = 200;

/// Of one kind, more than this are counted, not listed.
const LISTED_OF_A_KIND: usize = 20;

/// A line longer than this many bytes is named, not shown.
const SHOWN_BYTES: usize = 2000;

/// One mistake, as noted while reading.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Mistake {
    /// What is wrong.
    pub message: String,
    /// Where; `None`: the file as a whole.
    pub place: Option<Place>,
    /// Said under the underlined text.
    pub label: String,
    /// Other places that matter, with what to say under each.
    pub also: Vec<(Place, String)>,
    /// What to do about it.
    pub cure: String,
    /// Keys whose absence is the mistake: not raised where a line that cannot be read has one.
    pub absent: Vec<&'static str>,
}

impl Mistake {
    /// A mistake at `place`.
    pub fn at(place: Place, message: impl Into<String>, cure: impl Into<String>) -> Self {
        Mistake {
            place: Some(place),
            ..Mistake::of_file(message, cure)
        }
    }

    /// A mistake of the file as a whole.
    pub fn of_file(message: impl Into<String>, cure: impl Into<String>) -> Self {
        Mistake {
            message: message.into(),
            place: None,
            label: String::new(),
            also: Vec::new(),
            cure: cure.into(),
            absent: Vec::new(),
        }
    }

    /// The same, with words under the underlined text.
    pub fn label(mut self, label: impl Into<String>) -> Self {
        self.label = label.into();
        self
    }

    /// The same, with another place that matters.
    pub fn also(mut self, place: Place, label: impl Into<String>) -> Self {
        self.also.push((place, label.into()));
        self
    }
}

/// One mistake with its place in lines and columns.
#[derive(Clone, Debug, PartialEq)]
pub struct Item {
    /// Line, from 1. A mistake of the file as a whole stands at line 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
    /// What is wrong.
    pub message: String,
    /// What to do about it.
    pub cure: String,
    mistake: Mistake,
}

/// Every mistake of a case file, in the order of the text.
#[derive(Clone, Debug, PartialEq)]
pub struct Diagnostics {
    file: String,
    text: String,
    items: Vec<Item>,
    /// How many more there are of a kind that has too many, behind an example of it.
    repeated: Vec<(String, usize)>,
    unlisted: usize,
}

impl Diagnostics {
    pub(super) fn new(file: &str, text: &str, mut mistakes: Vec<Mistake>) -> Self {
        mistakes.sort_by_key(|m| m.place.as_ref().map_or(0, |place| place.start));
        let count = mistakes.len();
        let repeated = thin_out(&mut mistakes);
        mistakes.truncate(LISTED);
        let unlisted = count - mistakes.len();
        let lines = Lines::of(text);
        let items = mistakes
            .into_iter()
            .map(|mut mistake| {
                let fit = |place: &mut Place| *place = lines.fit(place);
                mistake.place.iter_mut().for_each(fit);
                mistake.also.iter_mut().for_each(|(place, _)| fit(place));
                let start = mistake.place.as_ref().map_or(0, |place| place.start);
                let (line, column) = lines.position(start);
                Item {
                    line,
                    column,
                    message: mistake.message.clone(),
                    cure: mistake.cure.clone(),
                    mistake,
                }
            })
            .collect();
        Diagnostics {
            file: file.to_string(),
            text: text.to_string(),
            items,
            repeated,
            unlisted,
        }
    }

    /// Name of the file, as given.
    pub fn file(&self) -> &str {
        &self.file
    }

    /// The mistakes, in the order of the text; at most 20 of one kind, and 200 in all.
    pub fn items(&self) -> &[Item] {
        &self.items
    }

    /// Number of mistakes, the unlisted ones included.
    pub fn count(&self) -> usize {
        self.items.len() + self.unlisted
    }

    /// All mistakes as text: file, line, the text underlined, cause and cure. With `coloured`,
    /// with escape sequences for a terminal.
    pub fn render(&self, coloured: bool) -> String {
        let renderer = if coloured {
            Renderer::styled()
        } else {
            Renderer::plain()
        };
        let lines = Lines::of(&self.text);
        let mut out = String::new();
        for item in &self.items {
            out += &renderer.render(&[self.group(item, &lines)]);
            out += "\n\n";
        }
        for (example, more) in &self.repeated {
            let example = normalize_untrusted_str(example);
            out += &format!("... and {more} more like this: {example}\n\n");
        }
        let others = self.unlisted - self.repeated.iter().map(|(_, more)| more).sum::<usize>();
        if others > 0 {
            out += &format!("... and {others} more mistakes after these\n\n");
        }
        let plural = if self.count() == 1 { "" } else { "s" };
        let file = normalize_untrusted_str(&self.file);
        out + &format!(
            "{} mistake{plural} in {file}: nothing was computed\n",
            self.count()
        )
    }

    fn group<'a>(&'a self, item: &'a Item, lines: &Lines<'a>) -> Group<'a> {
        let title = Level::ERROR.primary_title(item.message.as_str());
        let cure = Level::HELP.message(normalize_untrusted_str(&item.cure));
        let mistake = &item.mistake;
        let Some(place) = &mistake.place else {
            return title
                .element(Origin::path(self.file.as_str()))
                .element(cure);
        };
        let places = || std::iter::once(place).chain(mistake.also.iter().map(|(place, _)| place));
        let first = places().map(|p| lines.index(p.start)).min().unwrap_or(0);
        let last = places().map(|p| lines.index(p.end)).max().unwrap_or(first);
        if (first..=last).any(|line| lines.text(line).len() > SHOWN_BYTES) {
            let origin = Origin::path(self.file.as_str())
                .line(item.line)
                .char_column(item.column);
            return title.element(origin).element(cure);
        }
        let start = lines.starts[first];
        let shifted = |place: &Place| place.start - start..place.end - start;
        let mut snippet = Snippet::source(lines.between(first, last))
            .line_start(first + 1)
            .path(self.file.as_str())
            .annotation(
                AnnotationKind::Primary
                    .span(shifted(place))
                    .label(said(&mistake.label)),
            );
        for (place, label) in &mistake.also {
            snippet = snippet.annotation(
                AnnotationKind::Context
                    .span(shifted(place))
                    .label(said(label)),
            );
        }
        title.element(snippet).element(cure)
    }
}

/// Leaves of each kind of mistake the first few; returns an example of each kind that had more, and
/// how many were taken out. Two are of a kind if their messages differ only in what they quote.
fn thin_out(mistakes: &mut Vec<Mistake>) -> Vec<(String, usize)> {
    let mut kinds: BTreeMap<String, usize> = BTreeMap::new();
    let mut repeated: Vec<(String, usize)> = Vec::new();
    let mut places: BTreeMap<String, usize> = BTreeMap::new();
    mistakes.retain(|mistake| {
        let kind = kind(&mistake.message);
        let count = kinds.entry(kind.clone()).or_insert(0);
        *count += 1;
        if *count <= LISTED_OF_A_KIND {
            return true;
        }
        let place = *places.entry(kind).or_insert_with(|| {
            repeated.push((mistake.message.clone(), 0));
            repeated.len() - 1
        });
        repeated[place].1 += 1;
        false
    });
    repeated
}

/// A message without what it quotes.
fn kind(message: &str) -> String {
    let quoted = |quote: char, text: &str| -> String { text.split(quote).step_by(2).collect() };
    quoted('"', &quoted('`', message))
}

fn said(label: &str) -> Option<&str> {
    Some(label).filter(|label| !label.is_empty())
}

impl fmt::Display for Diagnostics {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.render(false))
    }
}

impl std::error::Error for Diagnostics {}

/// Where the lines of a text begin.
pub(super) struct Lines<'a> {
    text: &'a str,
    starts: Vec<usize>,
}

impl<'a> Lines<'a> {
    pub fn of(text: &'a str) -> Self {
        let starts = std::iter::once(0)
            .chain(text.match_indices('\n').map(|(at, _)| at + 1))
            .collect();
        Lines { text, starts }
    }

    /// Index of the line that holds byte `at`.
    pub fn index(&self, at: usize) -> usize {
        self.starts
            .partition_point(|start| *start <= at)
            .saturating_sub(1)
    }

    /// Line and column in characters of byte `at`, both from 1. A byte-order mark counts for none.
    pub fn position(&self, at: usize) -> (usize, usize) {
        let index = self.index(at);
        let before = self.text.get(self.starts[index]..at).unwrap_or_default();
        let column = before.trim_start_matches('\u{feff}').chars().count();
        (index + 1, column + 1)
    }

    /// Text of line `index`, without its end.
    pub fn text(&self, index: usize) -> &'a str {
        self.between(index, index)
    }

    /// Indices of all lines.
    pub fn indices(&self) -> Range<usize> {
        0..self.starts.len()
    }

    /// Where the words of line `index` stand, without the blanks around them.
    pub fn words(&self, index: usize) -> Place {
        let line = self.text(index);
        let start = self.starts[index] + line.len() - line.trim_start().len();
        start..start + line.trim().len()
    }

    /// Text of the lines from `first` to `last`, without the last one's end.
    fn between(&self, first: usize, last: usize) -> &'a str {
        let end = self.starts.get(last + 1).map_or(self.text.len(), |s| s - 1);
        self.text
            .get(self.starts[first]..end)
            .unwrap_or_default()
            .trim_end_matches('\r')
    }

    /// `place` within its first line and on whole characters.
    fn fit(&self, place: &Place) -> Place {
        let whole = |mut at: usize| {
            while !self.text.is_char_boundary(at) {
                at -= 1;
            }
            at
        };
        let start = whole(place.start.min(self.text.len()));
        let line = self.index(start);
        let line_end = self.starts[line] + self.text(line).len();
        let end = whole(place.end.min(line_end.max(start)).max(start));
        start..end
    }
}
