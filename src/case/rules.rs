//! Holds a filled form against the rules between its fields.

use super::diagnostics::Mistake;
use super::field::{Field, Rule, listed};
use super::filled::{Answer, Content, Filled, Log};

/// Notes where `filled` breaks `rule`.
pub(super) fn check(rule: &Rule, filled: &Filled, log: &mut Log) {
    match *rule {
        Rule::OneOf(fields) => {
            none_of(fields, filled, log);
            several_of(fields, filled, log);
        }
        Rule::AtMostOneOf(fields) => several_of(fields, filled, log),
        Rule::AtLeastOneOf(fields) => none_of(fields, filled, log),
        Rule::Together { fields, unless } => {
            if !filled.is_given(unless) {
                together(fields, filled, log);
            }
        }
        Rule::NotBeside(field, others) => not_beside(field, others, filled, log),
        Rule::OnlyWith {
            field,
            words,
            fields,
        } => match said(filled, field) {
            Some(said) if !words.contains(&said) => {
                only_with(field, words, said, fields, filled, log);
            }
            _ => {}
        },
        Rule::OneOfWith {
            field,
            word,
            fields,
        } => {
            if said(filled, field) == Some(word) {
                if given(fields, filled).is_empty() {
                    demand(field, word, fields, filled, log);
                }
                several_of(fields, filled, log);
            }
        }
        Rule::Needs {
            field,
            needed,
            with,
        } => {
            if with.is_none_or(|(field, word)| said(filled, field) == Some(word)) {
                needs(field, needed, filled, log);
            }
        }
        Rule::Demands {
            field,
            word,
            needed,
        } => {
            if said(filled, field) == Some(word) && !filled.is_given(needed) {
                demand(field, word, &[needed], filled, log);
            }
        }
    }
}

fn given<'f>(fields: &[&Field], filled: &'f Filled) -> Vec<&'f Answer> {
    filled
        .answers
        .iter()
        .filter(|a| fields.iter().any(|f| f.key == a.field.key))
        .collect()
}

fn said<'f>(filled: &'f Filled, field: &Field) -> Option<&'f str> {
    match &filled.answer(field)?.content {
        Some(Content::Text(text)) => Some(text),
        _ => None,
    }
}

fn none_of(fields: &'static [&'static Field], filled: &Filled, log: &mut Log) {
    if !given(fields, filled).is_empty() {
        return;
    }
    let mistake = Mistake::at(
        filled.place.clone(),
        format!("{} needs {}", filled.title(), listed(fields, "or")),
        format!(
            "add one of them, for example {}",
            fields.first().map(|f| f.example_line()).unwrap_or_default()
        ),
    );
    log.mistakes.push(Mistake {
        absent: fields.iter().map(|f| f.key).collect(),
        ..mistake
    });
}

fn several_of(fields: &[&Field], filled: &Filled, log: &mut Log) {
    let given = given(fields, filled);
    let [first, rest @ ..] = given.as_slice() else {
        return;
    };
    let Some(second) = rest.first() else {
        return;
    };
    let all: Vec<&Field> = given.iter().map(|a| a.field).collect();
    log.mistakes.push(
        Mistake::at(
            second.key.clone(),
            format!(
                "{} is given {}: they say the same thing twice",
                filled.title(),
                listed(&all, "and")
            ),
            format!("keep one of {}", listed(&all, "and")),
        )
        .label("given again")
        .also(first.key.clone(), "given here"),
    );
}

fn together(fields: &[&'static Field], filled: &Filled, log: &mut Log) {
    let given = given(fields, filled);
    let Some(first) = given.first() else {
        return;
    };
    for lacking in fields {
        needs(first.field, lacking, filled, log);
    }
}

fn needs(field: &Field, needed: &'static Field, filled: &Filled, log: &mut Log) {
    let Some(answer) = filled.answer(field).filter(|_| !filled.is_given(needed)) else {
        return;
    };
    let mistake = Mistake::at(
        answer.key.clone(),
        format!("`{}` needs `{}` beside it", field.key, needed.key),
        format!("add it, for example {}", needed.example_line()),
    );
    log.mistakes.push(Mistake {
        absent: vec![needed.key],
        ..mistake
    });
}

fn not_beside(field: &Field, others: &[&Field], filled: &Filled, log: &mut Log) {
    let Some(answer) = filled.answer(field) else {
        return;
    };
    for other in given(others, filled) {
        log.mistakes.push(
            Mistake::at(
                other.key.clone(),
                format!("`{}` and `{}` are both given", field.key, other.field.key),
                format!(
                    "remove `{}`, which `{}` brings with it, or give the values instead of `{}`",
                    other.field.key, field.key, field.key
                ),
            )
            .label("given again")
            .also(answer.key.clone(), "brings it already"),
        );
    }
}

fn only_with(
    field: &Field,
    words: &[&str],
    said: &str,
    fields: &[&Field],
    filled: &Filled,
    log: &mut Log,
) {
    for answer in given(fields, filled) {
        log.mistakes.push(
            Mistake::at(
                answer.key.clone(),
                format!(
                    "`{}` contradicts {} = \"{said}\"",
                    answer.field.key, field.key
                ),
                match words {
                    [word] => format!(
                        "set {} = \"{word}\", or remove `{}`",
                        field.key, answer.field.key
                    ),
                    _ => format!(
                        "remove `{}`: it goes with {} = {}",
                        answer.field.key,
                        field.key,
                        words.join(", ")
                    ),
                },
            )
            .also(filled.at(field), format!("the {} is set here", field.key)),
        );
    }
}

fn demand(field: &Field, word: &str, needed: &[&'static Field], filled: &Filled, log: &mut Log) {
    let mistake = Mistake::at(
        filled.at(field),
        format!("{} = \"{word}\" needs {}", field.key, listed(needed, "or")),
        format!(
            "add it, for example {}",
            needed.first().map(|f| f.example_line()).unwrap_or_default()
        ),
    );
    log.mistakes.push(Mistake {
        absent: needed.iter().map(|f| f.key).collect(),
        ..mistake
    });
}
