//! One value of the file becomes the content of its field, or a fault.

use super::fault::Fault;
use super::field::{Field, Kind, Range};
use super::filled::{Content, dotted, title_of};
use super::nearest::{excerpt, nearest};
use super::quantity::{checked, quantity};
use crate::units::Dimension;
use toml::de::DeValue;

/// Content of a value that is no table.
pub(super) fn content(field: &Field, value: &DeValue<'_>) -> Result<Content, Fault> {
    match (field.kind, value) {
        (Kind::Number(range) | Kind::Share(range), DeValue::Integer(_) | DeValue::Float(_)) => {
            let number = bare_number(value);
            checked(field, number, Dimension::NUMBER, range).map(Content::Number)
        }
        (Kind::QuantityOrShare(_), DeValue::Integer(_) | DeValue::Float(_)) => {
            let number = bare_number(value);
            checked(field, number, Dimension::NUMBER, Range::ProperShare).map(Content::Share)
        }
        (Kind::Flag, DeValue::Boolean(flag)) => Ok(Content::Flag(*flag)),
        (Kind::Flag, _) => Err(Fault {
            message: format!(
                "`{}` is true or false, not {}",
                field.key,
                kind_of_toml(value)
            ),
            label: String::new(),
            cure: format!("without quotes, for example {}", field.example_line()),
        }),
        (Kind::Number(_), DeValue::String(text)) => Err(Fault {
            message: format!("`{}` is a bare number, not text", field.key),
            label: "in quotes".to_string(),
            cure: match text.trim().parse::<f64>() {
                Ok(_) => format!("leave out the quotes: {} = {}", field.key, text.trim()),
                Err(_) => format!("for example {}", field.example_line()),
            },
        }),
        (_, DeValue::String(text)) => content_of_text(field, text),
        (_, DeValue::Integer(_) | DeValue::Float(_)) => Err(unquoted(field, value)),
        _ => Err(Fault {
            message: format!("`{}` cannot be {}", field.key, kind_of_toml(value)),
            label: String::new(),
            cure: format!("for example {}", field.example_line()),
        }),
    }
}

/// Content of the text of a value.
pub(super) fn content_of_text(field: &Field, text: &str) -> Result<Content, Fault> {
    match field.kind {
        Kind::Text => plain_text(field, text),
        Kind::Choice(words) => choice(field, text, &words()),
        Kind::Quantity(dimension, range) => {
            quantity(field, text, dimension, range).map(Content::Number)
        }
        Kind::LengthOrTable(_) => {
            quantity(field, text, Dimension::LENGTH, Range::Positive).map(Content::Number)
        }
        Kind::Share(range) => quantity(field, text, Dimension::NUMBER, range).map(Content::Number),
        Kind::QuantityOrShare(dimension) => {
            if text.trim().ends_with('%') {
                quantity(field, text, Dimension::NUMBER, Range::ProperShare).map(Content::Share)
            } else {
                quantity(field, text, dimension, Range::Positive).map(Content::Number)
            }
        }
        Kind::Stiffness {
            dimension,
            may_be_free,
        } => stiffness(field, text, dimension, may_be_free),
        Kind::Number(_) | Kind::Flag | Kind::Table(_) | Kind::Rows { .. } => Err(Fault {
            message: format!("`{}` cannot be text", field.key),
            label: String::new(),
            cure: format!("for example {}", field.example_line()),
        }),
    }
}

fn plain_text(field: &Field, text: &str) -> Result<Content, Fault> {
    let fault = |cause: &str| {
        Err(Fault {
            message: format!("`{}` {cause}", field.key),
            label: String::new(),
            cure: format!("one short line, for example {}", field.example_line()),
        })
    };
    if text.trim().is_empty() {
        fault("is empty")
    } else if text.chars().count() > 200 {
        fault("is longer than 200 characters")
    } else if text.chars().any(char::is_control) {
        fault("holds a line break or another control character")
    } else {
        Ok(Content::Text(text.trim().to_string()))
    }
}

fn choice(field: &Field, text: &str, words: &[&'static str]) -> Result<Content, Fault> {
    if words.contains(&text) {
        return Ok(Content::Text(text.to_string()));
    }
    let all = words.join(", ");
    Err(Fault {
        message: format!("`{}` cannot be \"{}\"", field.key, excerpt(text)),
        label: String::new(),
        cure: match nearest(text, words.iter().copied()) {
            Some(near) => format!("did you mean \"{near}\"? Known are: {all}"),
            None => format!("one of: {all}"),
        },
    })
}

fn stiffness(
    field: &Field,
    text: &str,
    dimension: Dimension,
    may_be_free: bool,
) -> Result<Content, Fault> {
    match text.trim() {
        "rigid" => Ok(Content::Number(f64::INFINITY)),
        "none" if may_be_free => Ok(Content::Number(0.0)),
        "none" => Err(Fault {
            message: format!(
                "`{}` cannot be \"none\": such a seat carries no load",
                field.key
            ),
            label: String::new(),
            cure: format!(
                "\"rigid\", or a stiffness, for example {}",
                field.example_line()
            ),
        }),
        text if text.starts_with(|c: char| c.is_ascii_alphabetic()) => Err(Fault {
            message: format!("`{}` cannot be \"{}\"", field.key, excerpt(text)),
            label: String::new(),
            cure: format!(
                "\"rigid\"{}, or a stiffness, for example {}",
                if may_be_free { ", \"none\"" } else { "" },
                field.example_line()
            ),
        }),
        text => {
            let any = quantity(field, text, dimension, Range::NotNegative)?;
            if any == 0.0 && may_be_free {
                return Ok(Content::Number(0.0));
            }
            quantity(field, text, dimension, Range::Positive).map(Content::Number)
        }
    }
}

/// The number of a TOML integer or float. NaN where it is neither.
fn bare_number(value: &DeValue<'_>) -> f64 {
    match value {
        DeValue::Integer(integer) if integer.radix() == 10 => {
            integer.as_str().parse().unwrap_or(f64::NAN)
        }
        DeValue::Integer(integer) => i64::from_str_radix(integer.as_str(), integer.radix())
            .map_or(f64::NAN, |value| value as f64),
        DeValue::Float(float) => float.as_str().parse().unwrap_or(f64::NAN),
        _ => f64::NAN,
    }
}

/// A bare number where text is wanted.
fn unquoted(field: &Field, value: &DeValue<'_>) -> Fault {
    let digits = match value {
        DeValue::Integer(integer) if integer.radix() == 10 => integer.as_str().to_string(),
        DeValue::Float(float) if bare_number(value).is_finite() => float.as_str().to_string(),
        _ => String::new(),
    };
    match field.example_unit() {
        _ if matches!(field.kind, Kind::Text | Kind::Choice(_)) => Fault {
            message: format!("`{}` is text, not a number", field.key),
            label: String::new(),
            cure: format!("for example {}", field.example_line()),
        },
        unit => Fault {
            message: format!("`{}` is a bare number: its unit is missing", field.key),
            label: "in which unit?".to_string(),
            cure: match digits.as_str() {
                "" => format!("for example {}", field.example_line()),
                digits => format!(
                    "write the number with its unit in quotes, for example {} = {}",
                    field.key,
                    field.toml(&format!("{} {unit}", excerpt(digits)))
                ),
            },
        },
    }
}

pub(super) fn not_a_table(field: &Field, table: &str, value: &DeValue<'_>) -> Fault {
    let name = dotted(table, field.key);
    Fault {
        message: format!("`{name}` is a table, not {}", kind_of_toml(value)),
        label: String::new(),
        cure: match value {
            DeValue::Array(_) => format!("write its header once, with single brackets: [{name}]"),
            _ => format!("begin it with a header line [{name}] and put its fields below"),
        },
    }
}

/// What stands where a list of tables is wanted.
pub(super) fn not_a_list(field: &Field, table: &str, value: &DeValue<'_>) -> Fault {
    let name = dotted(table, field.key);
    Fault {
        message: format!("`{name}` is a list of tables, not {}", kind_of_toml(value)),
        label: String::new(),
        cure: match value {
            DeValue::Table(_) => format!(
                "write its header with double brackets, [[{name}]], once for each; or a list, {}",
                field.example_line()
            ),
            _ => format!("for example {}", field.example_line()),
        },
    }
}

/// What stands in a list where a table is wanted.
pub(super) fn not_a_row(field: &Field, name: &str, value: &DeValue<'_>) -> Fault {
    Fault {
        message: format!(
            "{} is a table in braces, not {}",
            title_of(name),
            kind_of_toml(value)
        ),
        label: String::new(),
        cure: format!("for example {}", field.example_line()),
    }
}

/// A list that is too short or too long.
pub(super) fn wrong_count(field: &Field, count: usize, least: usize, most: usize) -> Fault {
    let (message, cure) = if count < least {
        let rows = |count: usize| if count == 1 { "row" } else { "rows" };
        (
            format!(
                "`{}` has {count} {}: it needs at least {least} {}",
                field.key,
                rows(count),
                rows(least)
            ),
            format!("for example {}", field.example_line()),
        )
    } else {
        (
            format!("`{}` has {count} rows: at most {most} are read", field.key),
            format!("leave out what matters least until there are {most}"),
        )
    };
    Fault {
        message,
        label: String::new(),
        cure,
    }
}

fn kind_of_toml(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "text",
        DeValue::Integer(_) | DeValue::Float(_) => "a number",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date or time",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}
