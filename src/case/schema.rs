//! JSON Schema of the case file, from the table of fields that the reader uses.

use super::field::{Absent, Field, Form, Kind, Range, Rule};
use super::form::CASE;
use crate::units::Dimension;
use serde_json::{Map, Value, json};

/// A number, then a unit.
const QUANTITY: &str = r"^\s*[+-]?([0-9]+\.?[0-9]*|\.[0-9]+)([eE][+-]?[0-9]+)?\s*[^\s0-9.,+-].*$|^\s*[+-]?[0-9.]+([eE][+-]?[0-9]+)?\s+1\s*/.+$";
/// A percentage.
const PERCENTAGE: &str = r"^\s*[0-9]*\.?[0-9]+([eE][+-]?[0-9]+)?\s*%\s*$";

/// JSON Schema (draft 7) of the case file, so that editors complete and check it. It knows keys,
/// kinds of values and which fields go together; it cannot know dimensions of units or geometry,
/// for which there is [`super::parse`].
pub fn schema() -> Value {
    let mut schema = form(&CASE);
    if let Value::Object(members) = &mut schema {
        let head = [
            ("$schema", json!("http://json-schema.org/draft-07/schema#")),
            ("title", json!("coilstay case file")),
        ];
        for (at, (key, value)) in head.into_iter().enumerate() {
            members.shift_insert(at, key.to_string(), value);
        }
    }
    schema
}

fn form(form: &Form) -> Value {
    let properties: Map<String, Value> = form
        .fields
        .iter()
        .map(|field| (field.key.to_string(), property(field)))
        .collect();
    let required: Vec<&str> = form.required().map(|f| f.key).collect();
    let mut object = json!({
        "description": form.doc,
        "type": "object",
        "properties": properties,
        "additionalProperties": false,
    });
    if !required.is_empty() {
        object["required"] = json!(required);
    }
    let rules: Vec<Value> = form.rules.iter().map(rule).collect();
    if !rules.is_empty() {
        object["allOf"] = json!(rules);
    }
    object
}

fn property(field: &Field) -> Value {
    let mut value = match field.kind {
        Kind::Text => json!({ "type": "string", "minLength": 1, "maxLength": 200 }),
        Kind::Choice(words) => json!({ "type": "string", "enum": words() }),
        Kind::Number(range) => number(range),
        Kind::Share(range) => json!({ "anyOf": [number(range), text(PERCENTAGE)] }),
        Kind::Flag => json!({ "type": "boolean" }),
        Kind::Quantity(..) => text(QUANTITY),
        Kind::QuantityOrShare(_) => {
            json!({ "anyOf": [number(Range::ProperShare), text(QUANTITY)] })
        }
        Kind::Stiffness { may_be_free, .. } => {
            let words: &[&str] = if may_be_free {
                &["rigid", "none"]
            } else {
                &["rigid"]
            };
            json!({ "anyOf": [{ "type": "string", "enum": words }, text(QUANTITY)] })
        }
        Kind::Table(inner) => form(inner),
        Kind::Rows {
            form: of,
            least,
            most,
        } => json!({
            "type": "array",
            "items": form(of),
            "minItems": least,
            "maxItems": most,
        }),
        Kind::LengthOrTable(inner) => json!({ "anyOf": [text(QUANTITY), form(inner)] }),
    };
    value["description"] = json!(description(field));
    if !field.example.is_empty() {
        value["examples"] = json!([literal(field, field.example)]);
    }
    if let Kind::Rows {
        form: of, least, ..
    } = field.kind
    {
        let row: Map<String, Value> = of
            .required()
            .map(|f| (f.key.to_string(), literal(f, f.example)))
            .collect();
        value["examples"] = json!([vec![row; least.max(1)]]);
    }
    if let Absent::Value(default) = field.absent {
        value["default"] = literal(field, default);
    }
    value
}

fn text(pattern: &str) -> Value {
    json!({ "type": "string", "pattern": pattern })
}

fn number(range: Range) -> Value {
    match range {
        Range::Positive => json!({ "type": "number", "exclusiveMinimum": 0 }),
        Range::NotNegative | Range::Size => json!({ "type": "number", "minimum": 0 }),
        Range::Any => json!({ "type": "number" }),
        Range::ProperShare => {
            json!({ "type": "number", "exclusiveMinimum": 0, "exclusiveMaximum": 1 })
        }
        Range::BelowOne => json!({ "type": "number", "minimum": 0, "exclusiveMaximum": 1 }),
        Range::MoreThanHalf => {
            json!({ "type": "number", "exclusiveMinimum": 0.5, "maximum": 1 })
        }
    }
}

/// What the field means, its dimension, and what holds where it is left out.
fn description(field: &Field) -> String {
    let dimension = match field.kind {
        Kind::Quantity(dimension, _)
        | Kind::QuantityOrShare(dimension)
        | Kind::Stiffness { dimension, .. } => Some(dimension),
        Kind::LengthOrTable(_) => Some(Dimension::LENGTH),
        _ => None,
    };
    let mut words = field.doc.to_string();
    if let Some(dimension) = dimension {
        words += &format!(" It is {} with its unit, in quotes.", dimension.title());
    }
    match field.absent {
        Absent::Mistake | Absent::Nothing => {}
        Absent::Value(value) => words += &format!(" Left out: {value}."),
        Absent::Rule(rule) => words += &format!(" Left out: {rule}."),
    }
    words
}

/// `text` as a JSON value of this field.
fn literal(field: &Field, text: &str) -> Value {
    match (field.kind, text.parse::<f64>()) {
        (Kind::Number(_) | Kind::Share(_), Ok(number)) => json!(number),
        (Kind::Flag, _) => json!(text == "true"),
        _ => json!(text),
    }
}

fn rule(rule: &Rule) -> Value {
    let each = |fields: &[&Field]| -> Vec<Value> {
        fields
            .iter()
            .map(|field| json!({ "required": [field.key] }))
            .collect()
    };
    match *rule {
        Rule::OneOf(fields) => json!({ "oneOf": each(fields) }),
        Rule::AtLeastOneOf(fields) => json!({ "anyOf": each(fields) }),
        Rule::AtMostOneOf(fields) => {
            let mut choices = each(fields);
            choices.push(json!({ "not": { "anyOf": each(fields) } }));
            json!({ "oneOf": choices })
        }
        Rule::Together { fields, .. } => {
            let keys: Vec<&str> = fields.iter().map(|f| f.key).collect();
            let all: Map<String, Value> = keys
                .iter()
                .map(|key| ((*key).to_string(), json!(keys)))
                .collect();
            json!({ "dependencies": all })
        }
        Rule::NotBeside(field, others) => json!({
            "if": { "required": [field.key] },
            "then": { "not": { "anyOf": each(others) } },
        }),
        Rule::OnlyWith {
            field,
            words,
            fields,
        } => json!({
            "if": says(field, words),
            "else": { "not": { "anyOf": each(fields) } },
        }),
        Rule::OneOfWith {
            field,
            word,
            fields,
        } => json!({
            "if": says(field, &[word]),
            "then": { "oneOf": each(fields) },
        }),
        Rule::Needs {
            field,
            needed,
            with: None,
        } => json!({ "dependencies": { field.key: [needed.key] } }),
        Rule::Needs {
            field,
            needed,
            with: Some((decides, word)),
        } => json!({
            "if": { "allOf": [{ "required": [field.key] }, says(decides, &[word])] },
            "then": { "required": [needed.key] },
        }),
        Rule::Demands {
            field,
            word,
            needed,
        } => json!({
            "if": says(field, &[word]),
            "then": { "required": [needed.key] },
        }),
    }
}

fn says(field: &Field, words: &[&str]) -> Value {
    json!({ "required": [field.key], "properties": { field.key: { "enum": words } } })
}
