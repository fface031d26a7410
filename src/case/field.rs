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
    /// True or false.
    Flag,
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
    /// A list of tables of one form.
    Rows {
        /// Of each.
        form: &'static Form,
        /// Fewest.
        least: usize,
        /// Most.
        most: usize,
    },
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
    /// Nought or above, and below one.
    BelowOne,
    /// Above one half, and one at most.
    MoreThanHalf,
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
    /// A mistake where `field` says anything but one of `words`.
    OnlyWith {
        /// The field that decides.
        field: &'static Field,
        /// Its deciding words.
        words: &'static [&'static str],
        /// The fields that go with it.
        fields: &'static [&'static Field],
    },
    /// Where `field` says `word`, exactly one of `fields` must be given.
    OneOfWith {
        /// The field that decides.
        field: &'static Field,
        /// Its deciding word.
        word: &'static str,
        /// The fields of which one is needed.
        fields: &'static [&'static Field],
    },
    /// Where `field` is given, `needed` must be too; where `with` names a field and its word, only
    /// where that field says so.
    Needs {
        /// The field that is given.
        field: &'static Field,
        /// The field then needed.
        needed: &'static Field,
        /// The field that decides whether it is, and its word.
        with: Option<(&'static Field, &'static str)>,
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

    /// `text` as this field's value in TOML: quoted, but for bare numbers and truths.
    pub fn toml(&self, text: &str) -> String {
        match self.kind {
            Kind::Number(_) | Kind::Share(_) | Kind::Flag => text.to_string(),
            _ => format!("\"{text}\""),
        }
    }

    /// The example as a line of TOML: `free_length = "210 mm"`.
    pub fn example_line(&self) -> String {
        let value = match self.kind {
            Kind::Table(form) => form.example(),
            Kind::Rows { form, .. } => format!("[{}]", form.example()),
            _ => self.toml(self.example),
        };
        format!("{} = {value}", self.key)
    }

    /// The unit of the example: "mm".
    pub fn example_unit(&self) -> &'static str {
        self.example.split_once(' ').map_or("", |(_, unit)| unit)
    }
}

impl Form {
    /// The fields that must be given.
    pub fn required(&self) -> impl Iterator<Item = &'static Field> {
        let must = |field: &&Field| field.absent == Absent::Mistake;
        self.fields.iter().copied().filter(must)
    }

    /// What must be given, as a table in one line: `{ motion = "1 mm", force = "300 N" }`.
    pub fn example(&self) -> String {
        let lines: Vec<String> = self.required().map(Field::example_line).collect();
        format!("{{ {} }}", lines.join(", "))
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
