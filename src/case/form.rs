//! The whole case file as a form.

use super::field::{Absent, Field, Form, Kind};
use super::{duty, guide, imperfections, material, spring, support};

pub(super) static TITLE: Field = Field::new(
    "title",
    Kind::Text,
    "Track brake, application spring",
    "What the case is called in reports.",
)
.or(Absent::Rule("the name of the file"));

pub(super) static SPRING: Field = table("spring", &spring::FORM);
pub(super) static MATERIAL: Field = table("material", &material::FORM);
pub(super) static BOTTOM: Field = table("bottom", &support::BOTTOM);
pub(super) static TOP: Field = table("top", &support::TOP);
pub(super) static GUIDE: Field = Field::new(
    "guide",
    Kind::Rows {
        form: &guide::FORM,
        least: 0,
        most: guide::MOST,
    },
    "",
    guide::FORM.doc,
)
.or(Absent::Rule("no guides"));
pub(super) static IMPERFECTIONS: Field =
    table("imperfections", &imperfections::FORM).or(Absent::Rule(imperfections::LEFT_OUT));
pub(super) static DUTY: Field = table("duty", &duty::FORM);

/// The case file.
pub(super) static CASE: Form = Form {
    doc: "A helical compression spring in its supports, its imperfections and its duty. \
          Quantities are numbers with units in quotes, metric or inch. Dimensions of the spring \
          are those at 20 degC.",
    fields: &[
        &TITLE,
        &SPRING,
        &MATERIAL,
        &BOTTOM,
        &TOP,
        &GUIDE,
        &IMPERFECTIONS,
        &DUTY,
    ],
    rules: &[],
};

const fn table(key: &'static str, form: &'static Form) -> Field {
    Field::new(key, Kind::Table(form), "", form.doc)
}

/// The table that has a field `key`, for keys that stand in the wrong one.
pub(super) fn home_of(key: &str) -> Option<&'static str> {
    CASE.fields.iter().find_map(|field| match field.kind {
        Kind::Table(form) if form.fields.iter().any(|f| f.key == key) => Some(field.key),
        _ => None,
    })
}
