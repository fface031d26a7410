//! What a case file may say: the types of the table of fields. The reader, the schema and the
//! messages all work from the same [`Form`]s, so they cannot disagree.

use crate::units::Dimension;

/// A table of the case file: its fields and the rules between them.
#[derive(Debug)]
pub(super) struct Form {
    /// What the table is for.
    pub doc: &'static str,
    /// Its fields, in the order the documentation lists them.
    pub fields: &'static [&'static Field],
    /// What its fields demand of one another.
    pub rules: &'static [Rule],
}

/// One field.
#[derive(Debug)]
pub(super) struct Field {
    /// Its key.
    pub key: &'static str,
    /// What may stand there.
    pub kind: Kind,
    /// What it means, in a sentence.
    pub doc: &'static str,
    /// An example of its value, without quotes. Empty for tables.
    pub example: &'static str,
    /// What holds where it is left out.
    pub absent: Absent,
}

/// What holds where a field is left out.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Absent {
    /// That is a mistake.
    Mistake,
    /// Nothing: the field says something extra, or a [`Rule`] looks after it.
    Nothing,
    /// This value, written as in the file but without quotes.
    Value(&'static str),
    /// A value that follows from others, by the rule in these words.
    Rule(&'static str),
}

/// What may stand in a field.
#[derive(Clone, Copy, Debug)]
pub(super) enum Kind {
    /// Free text.
    Text,
    /// One of these words.
    Choice(fn() -> Vec<&'static str>),
    /// A bare number.
    Number(Range),
    /// A bare number or a percentage in quotes.
    Share(Range),
    /// A number with its unit, in quotes.
    Quantity(Dimension, Range),
    /// A quantity, or a share of the value it belongs to.
    QuantityOrShare(Dimension),
    /// A stiffness with its unit, or "rigid"; where `may_be_free` also "none" or nought.
    Stiffness {
        /// Of the stiffness.
        dimension: Dimension,
        /// Whether nought is allowed.
        may_be_free: bool,
    },
    /// A table.
    Table(&'static Form),
    /// A length, or a table for what one length does not describe.
    LengthOrTable(&'static Form),
}

/// The values allowed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Range {
    /// Above nought.
    Positive,
    /// Nought or above.
    NotNegative,
    /// Nought or above: the size of a deviation, whose sign the assessment chooses.
    Size,
    /// Either sign.
    Any,
    /// Above nought and below one.
    ProperShare,
}

/// What the fields of a form demand of one another.
#[derive(Debug)]
pub(super) enum Rule {
    /// Exactly one of them.
    OneOf(&'static [&'static Field]),
    /// None or one of them.
    AtMostOneOf(&'static [&'static Field]),
    /// At least one of them.
    AtLeastOneOf(&'static [&'static Field]),
    /// All of them or none; where `unless` is given, another rule looks after them.
    Together {
        /// The fields that go together.
        fields: &'static [&'static Field],
        /// The field beside which none of them may stand.
        unless: &'static Field,
    },
    /// Where the first is given, none of the others may be.
    NotBeside(&'static Field, &'static [&'static Field]),
    /// Needed where `field` says `word`, a mistake where it says anything else.
    OnlyWith {
        /// The field that decides.
        field: &'static Field,
        /// Its deciding word.
        word: &'static str,
        /// The fields that go with it.
        fields: &'static [&'static Field],
    },
    /// Where `field` says `word`, `needed` must be given.
    Demands {
        /// The field that decides.
        field: &'static Field,
        /// Its deciding word.
        word: &'static str,
        /// The field then needed.
        needed: &'static Field,
    },
}

impl Field {
    /// A field that must be given.
    pub const fn new(
        key: &'static str,
        kind: Kind,
        example: &'static str,
        doc: &'static str,
    ) -> Self {
        Field {
            key,
            kind,
            doc,
            example,
            absent: Absent::Mistake,
        }
    }

    /// The same, with what holds where it is left out.
    pub const fn or(self, absent: Absent) -> Self {
        Field { absent, ..self }
    }

    /// `text` as this field's value in TOML: quoted, but for bare numbers.
    pub fn toml(&self, text: &str) -> String {
        match self.kind {
            Kind::Number(_) | Kind::Share(_) => text.to_string(),
            _ => format!("\"{text}\""),
        }
    }

    /// The example as a line of TOML: `free_length = "210 mm"`.
    pub fn example_line(&self) -> String {
        format!("{} = {}", self.key, self.toml(self.example))
    }

    /// The unit of the example: "mm".
    pub fn example_unit(&self) -> &'static str {
        self.example.split_once(' ').map_or("", |(_, unit)| unit)
    }
}

/// "`a`, `b` and `c`".
pub(super) fn listed(fields: &[&Field], joint: &str) -> String {
    let keys: Vec<String> = fields.iter().map(|f| format!("`{}`", f.key)).collect();
    match keys.split_last() {
        Some((last, rest)) if !rest.is_empty() => format!("{} {joint} {last}", rest.join(", ")),
        _ => keys.concat(),
    }
}
