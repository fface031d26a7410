//! Walks the parsed TOML by the table of fields: every value is read or refused, every key known
//! or named as unknown.

use super::diagnostics::{Mistake, Place};
use super::fault::Fault;
use super::field::{Absent, Field, Form, Kind};
use super::filled::{Answer, Content, Filled, Log, dotted, title_of};
use super::nearest::{excerpt, nearest};
use super::value;
use toml::de::{DeArray, DeTable, DeValue};

/// Reads `table` by `form`. `place` is where it begins.
pub(super) fn read(
    table: &DeTable<'_>,
    form: &'static Form,
    name: &str,
    place: Place,
    log: &mut Log,
) -> Filled {
    let mut entries: Vec<_> = table.iter().collect();
    entries.sort_by_key(|(key, _)| key.span().start);
    let mut answers: Vec<Answer> = Vec::new();
    let mut meant = Vec::new();
    for (key, value) in entries {
        let word = key.get_ref().as_ref();
        let Some(field) = form.fields.iter().find(|f| f.key == word) else {
            let near = nearest(word, form.fields.iter().map(|f| f.key));
            meant.extend(near);
            log.mistakes
                .push(unknown(form, name, word, near, key.span()));
            continue;
        };
        let content = match content(field, name, value.get_ref(), &key.span(), log) {
            Ok(content) => Some(content),
            Err(None) => None,
            Err(Some(fault)) => {
                log.mistakes
                    .push(Mistake::at(value.span(), fault.message, fault.cure).label(fault.label));
                None
            }
        };
        answers.push(Answer {
            field,
            key: key.span(),
            value: value.span(),
            content,
        });
    }
    let filled = Filled {
        name: name.to_string(),
        place,
        answers,
    };
    let before = log.mistakes.len();
    for field in form.fields {
        if field.absent == Absent::Mistake && !filled.is_given(field) {
            log.mistakes.push(missing(&filled, field));
        }
    }
    for rule in form.rules {
        super::rules::check(rule, &filled, log);
    }
    // A misspelt key is not also a missing one.
    let absences = log.mistakes.split_off(before).into_iter();
    log.mistakes
        .extend(absences.filter(|m| !m.absent.iter().any(|key| meant.contains(key))));
    filled
}

/// Content of a value; `Err(None)` where its mistakes are noted already.
fn content(
    field: &'static Field,
    table: &str,
    value: &DeValue<'_>,
    key: &Place,
    log: &mut Log,
) -> Result<Content, Option<Fault>> {
    match (field.kind, value) {
        (Kind::Table(form) | Kind::LengthOrTable(form), DeValue::Table(inner)) => {
            let name = dotted(table, field.key);
            Ok(Content::Table(read(inner, form, &name, key.clone(), log)))
        }
        (Kind::Table(_), _) => Err(Some(value::not_a_table(field, table, value))),
        (Kind::Rows { form, least, most }, DeValue::Array(rows)) => {
            if !(least..=most).contains(&rows.len()) {
                return Err(Some(value::wrong_count(field, rows.len(), least, most)));
            }
            list(rows, field, form, &dotted(table, field.key), log)
        }
        (Kind::Rows { .. }, _) => Err(Some(value::not_a_list(field, table, value))),
        _ => value::content(field, value).map_err(Some),
    }
}

/// The tables of a list.
fn list(
    rows: &DeArray<'_>,
    field: &'static Field,
    form: &'static Form,
    name: &str,
    log: &mut Log,
) -> Result<Content, Option<Fault>> {
    let mut read_rows = Vec::new();
    for (index, row) in rows.iter().enumerate() {
        let name = dotted(name, &(index + 1).to_string());
        match row.get_ref() {
            DeValue::Table(inner) => read_rows.push(read(inner, form, &name, row.span(), log)),
            other => {
                let fault = value::not_a_row(field, &name, other);
                log.mistakes
                    .push(Mistake::at(row.span(), fault.message, fault.cure));
            }
        }
    }
    if read_rows.len() == rows.len() {
        Ok(Content::Rows(read_rows))
    } else {
        Err(None)
    }
}

fn unknown(form: &Form, table: &str, word: &str, near: Option<&str>, place: Place) -> Mistake {
    let whose = match table {
        "" => "a case file".to_string(),
        table => title_of(table),
    };
    let keys = form.fields.iter().map(|f| f.key);
    let cure = match (near, super::form::home_of(word)) {
        (Some(near), _) => format!("did you mean `{near}`?"),
        (None, Some(home)) => format!("`{word}` belongs to [{home}]: move it there"),
        (None, None) => format!(
            "remove it, or use a field of {whose}: {}",
            keys.collect::<Vec<_>>().join(", ")
        ),
    };
    Mistake::at(
        place,
        format!("{whose} has no field `{}`", excerpt(word)),
        cure,
    )
    .label("unknown")
}

fn missing(filled: &Filled, field: &Field) -> Mistake {
    let table = matches!(field.kind, Kind::Table(_));
    let (message, cure) = match table {
        true => (
            format!("the table [{}] is missing", field.key),
            format!(
                "add [{}] and its fields; `coilstay starter` prints a case to begin from",
                field.key
            ),
        ),
        false => (
            format!("{} lacks `{}`", filled.title(), field.key),
            format!("add it, for example {}", field.example_line()),
        ),
    };
    Mistake {
        absent: vec![field.key],
        ..Mistake::at(filled.place.clone(), message, cure)
    }
}
