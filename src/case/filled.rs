//! A form as filled in by a file, and what was noted while reading it.

use super::diagnostics::{Mistake, Place};
use super::field::{Absent, Field, Kind};
use super::value::content_of_text;

/// What was noted while reading.
#[derive(Debug, Default)]
pub(super) struct Log {
    /// Mistakes.
    pub mistakes: Vec<Mistake>,
    /// Dotted names of the inputs taken by default.
    pub defaulted: Vec<String>,
    /// Warnings.
    pub warnings: Vec<String>,
}

/// A form as filled in by a file.
#[derive(Debug)]
pub(super) struct Filled {
    /// Dotted name of the table; empty for the file itself. A row of a list has its number, from
    /// 1, behind the name of the list: "top.axial_law.2".
    pub name: String,
    /// Where the table begins.
    pub place: Place,
    /// What the file says, in the order of the text.
    pub answers: Vec<Answer>,
}

/// What the file says in one field.
#[derive(Debug)]
pub(super) struct Answer {
    /// The field.
    pub field: &'static Field,
    /// Where its key stands.
    pub key: Place,
    /// Where its value stands.
    pub value: Place,
    /// The value; `None`: refused, with a mistake noted.
    pub content: Option<Content>,
}

/// A value read.
#[derive(Debug)]
pub(super) enum Content {
    /// A number, in SI. A stiffness may be 0 (none) or infinite (rigid).
    Number(f64),
    /// A share of the value it belongs to.
    Share(f64),
    /// Text, or a word of a choice.
    Text(String),
    /// True or false.
    Flag(bool),
    /// A table.
    Table(Filled),
    /// A list of tables.
    Rows(Vec<Filled>),
}

impl Filled {
    /// What the file says in `field`.
    pub fn answer(&self, field: &Field) -> Option<&Answer> {
        self.answers.iter().find(|a| a.field.key == field.key)
    }

    /// Whether the file says anything in `field`.
    pub fn is_given(&self, field: &Field) -> bool {
        self.answer(field).is_some()
    }

    /// Where the value of `field` stands, or the table where it is not given.
    pub fn at(&self, field: &Field) -> Place {
        self.answer(field)
            .map_or_else(|| self.place.clone(), |a| a.value.clone())
    }

    /// The table in `field`, if given and readable.
    pub fn table(&self, field: &Field) -> Option<&Filled> {
        match &self.answer(field)?.content {
            Some(Content::Table(table)) => Some(table),
            _ => None,
        }
    }

    /// The tables listed in `field`, if given and readable.
    pub fn rows(&self, field: &Field) -> Option<&[Filled]> {
        match &self.answer(field)?.content {
            Some(Content::Rows(rows)) => Some(rows),
            _ => None,
        }
    }

    /// The table as messages call it: "[top]", "row 2 of top.axial_law", "guide 1".
    pub fn title(&self) -> String {
        title_of(&self.name)
    }

    /// Whether `field` says true, or its default (then noted).
    pub fn flag(&self, field: &Field, log: &mut Log) -> Option<bool> {
        match self.answer(field) {
            Some(answer) => match answer.content {
                Some(Content::Flag(flag)) => Some(flag),
                _ => None,
            },
            None => match default_of(field, log, &self.name)? {
                Content::Flag(flag) => Some(flag),
                _ => None,
            },
        }
    }

    /// The number in `field`, or its default value (then noted).
    pub fn number(&self, field: &Field, log: &mut Log) -> Option<f64> {
        match self.answer(field) {
            Some(answer) => match answer.content {
                Some(Content::Number(value) | Content::Share(value)) => Some(value),
                _ => None,
            },
            None => match default_of(field, log, &self.name)? {
                Content::Number(value) | Content::Share(value) => Some(value),
                _ => None,
            },
        }
    }

    /// The text or word in `field`, or its default (then noted).
    pub fn word(&self, field: &Field, log: &mut Log) -> Option<String> {
        match self.answer(field) {
            Some(answer) => match &answer.content {
                Some(Content::Text(text)) => Some(text.clone()),
                _ => None,
            },
            None => match default_of(field, log, &self.name)? {
                Content::Text(text) => Some(text),
                _ => None,
            },
        }
    }

    /// Notes that `field` was not given and is taken by its rule.
    pub fn note_default(&self, field: &Field, log: &mut Log) {
        log.defaulted.push(dotted(&self.name, field.key));
    }
}

/// The value that `field` has by default, noted as such.
fn default_of(field: &Field, log: &mut Log, table: &str) -> Option<Content> {
    let Absent::Value(text) = field.absent else {
        return None;
    };
    log.defaulted.push(dotted(table, field.key));
    match field.kind {
        Kind::Number(_) => text.parse().ok().map(Content::Number),
        Kind::Flag => text.parse().ok().map(Content::Flag),
        _ => content_of_text(field, text).ok(),
    }
}

/// What messages call the table of that dotted name; not for the file itself.
pub(super) fn title_of(name: &str) -> String {
    match name.rsplit_once('.') {
        Some((list, number)) if number.bytes().all(|b| b.is_ascii_digit()) => {
            if list.contains('.') {
                format!("row {number} of {list}")
            } else {
                format!("{list} {number}")
            }
        }
        _ => format!("[{name}]"),
    }
}

pub(super) fn dotted(table: &str, key: &str) -> String {
    if table.is_empty() {
        key.to_string()
    } else {
        format!("{table}.{key}")
    }
}
