//! The schema and the reader must agree on what a case file is.

use super::{BASE, with};
use coilstay::case;
use serde_json::{Value, json};

/// Whether `value` meets `schema`, by JSON Schema draft 7, for the keywords that our schema uses.
/// An unknown keyword is a failure of the test: it would be ignored otherwise.
fn meets(value: &Value, schema: &Value) -> bool {
    let schema = schema.as_object().expect("a schema is an object");
    schema.iter().all(|(keyword, rule)| match keyword.as_str() {
        "$schema" | "title" | "description" | "examples" | "default" => true,
        "type" => match rule.as_str() {
            Some("object") => value.is_object(),
            Some("string") => value.is_string(),
            Some("number") => value.is_number(),
            Some("boolean") => value.is_boolean(),
            Some("array") => value.is_array(),
            other => panic!("type {other:?}"),
        },
        "items" => value
            .as_array()
            .is_none_or(|list| list.iter().all(|item| meets(item, rule))),
        "minItems" => value
            .as_array()
            .is_none_or(|list| list.len() as u64 >= rule.as_u64().unwrap()),
        "maxItems" => value
            .as_array()
            .is_none_or(|list| list.len() as u64 <= rule.as_u64().unwrap()),
        "properties" => value.as_object().is_none_or(|object| {
            object
                .iter()
                .all(|(key, inner)| rule.get(key).is_none_or(|s| meets(inner, s)))
        }),
        "additionalProperties" => {
            assert_eq!(rule, &json!(false));
            value
                .as_object()
                .is_none_or(|object| object.keys().all(|k| schema["properties"].get(k).is_some()))
        }
        "required" => value
            .as_object()
            .is_none_or(|object| strings(rule).iter().all(|key| object.contains_key(*key))),
        "dependencies" => value.as_object().is_none_or(|object| {
            rule.as_object().unwrap().iter().all(|(key, needed)| {
                !object.contains_key(key) || strings(needed).iter().all(|n| object.contains_key(*n))
            })
        }),
        "enum" => rule.as_array().unwrap().contains(value),
        "minimum" => value.as_f64().is_none_or(|v| v >= rule.as_f64().unwrap()),
        "maximum" => value.as_f64().is_none_or(|v| v <= rule.as_f64().unwrap()),
        "exclusiveMinimum" => value.as_f64().is_none_or(|v| v > rule.as_f64().unwrap()),
        "exclusiveMaximum" => value.as_f64().is_none_or(|v| v < rule.as_f64().unwrap()),
        "minLength" => value
            .as_str()
            .is_none_or(|s| s.chars().count() as u64 >= rule.as_u64().unwrap()),
        "maxLength" => value
            .as_str()
            .is_none_or(|s| s.chars().count() as u64 <= rule.as_u64().unwrap()),
        "pattern" => value
            .as_str()
            .is_none_or(|s| looks_like(s, rule.as_str().unwrap())),
        "allOf" => rule.as_array().unwrap().iter().all(|s| meets(value, s)),
        "anyOf" => rule.as_array().unwrap().iter().any(|s| meets(value, s)),
        "oneOf" => {
            rule.as_array()
                .unwrap()
                .iter()
                .filter(|s| meets(value, s))
                .count()
                == 1
        }
        "not" => !meets(value, rule),
        "if" => {
            let branch = if meets(value, rule) { "then" } else { "else" };
            schema.get(branch).is_none_or(|s| meets(value, s))
        }
        "then" | "else" => true,
        other => panic!("keyword {other} is not understood by this test"),
    })
}

fn strings(list: &Value) -> Vec<&str> {
    list.as_array()
        .unwrap()
        .iter()
        .filter_map(Value::as_str)
        .collect()
}

/// The two patterns are a number with a unit and a percentage.
fn looks_like(text: &str, pattern: &str) -> bool {
    regex::Regex::new(pattern).unwrap().is_match(text)
}

fn as_json(text: &str) -> Value {
    serde_json::to_value(toml::from_str::<toml::Table>(text).unwrap()).unwrap()
}

#[test]
fn what_the_reader_takes_meets_the_schema() {
    let schema = case::schema();
    for text in [
        BASE.to_string(),
        case::starter().to_string(),
        with("\"8 mm\"", "{ radial = \"6 mm\", axial = \"4 mm\" }"),
        with("\"8 mm\"", "\".3in\""),
        with(
            "kind = \"hinged\"",
            "kind = \"elastic\"\nrotational_stiffness = \"none\"\nsideways_stiffness = \"8 N/mm\"",
        ),
        with(
            "name = \"patented-carbon-steel\"",
            "youngs_modulus = \"200GPa\"\nshear_modulus = \"80 GPa\"\nyoungs_modulus_uncertainty = 0.02\nmodulus_loss_per_kelvin = \"0.0003/K\"\nexpansion_per_kelvin = \"1e-5 1/K\"",
        ),
        with(
            "working_deflection = \"95 mm\"",
            "loading = \"force\"\nworking_force = \"900 N\"\nrequired_margin = \"15 %\"",
        ),
        with("total_coils = 10.5\n", ""),
        with(
            "kind = \"hinged\"",
            "kind = \"flat\"\nground_share = 0.75\npiloted = true",
        ),
        with("kind = \"hinged\"", "kind = \"flat\"\nfriction = 0.1"),
        with(
            "kind = \"hinged\"",
            "kind = \"ball\"\narm = \"9 mm\"\nfriction = 0.1\nball_radius = \"8 mm\"",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"link\"\nlink_length = \"80 mm\"\nlink_acts = \"hanger\"",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"elastic\"\nsideways_stiffness = \"rigid\"\nrotational_law = [{ motion = \"1 deg\", moment = \"1 N m\" }]",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"hinged\"\nplane = \"30 deg\"\nother_plane = { kind = \"clamped\", tilt = \"1 deg\" }\nlever = { pivot_along = \"-90 mm\", pivot_across = \"90 mm\" }",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"hinged\"\nmotion = [{ travel = \"0 mm\", offset = \"0 mm\", tilt = \"0 deg\" }, { travel = \"9 mm\", offset = \"1 mm\", tilt = \"1 deg\" }]",
        ),
        with(
            "[duty]",
            "[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\nfriction = 0\n[[guide]]\nkind = \"bore\"\ndiameter = \"76 mm\"\n[duty]",
        ),
    ] {
        assert!(case::parse("t", &text).is_ok(), "{text}");
        assert!(meets(&as_json(&text), &schema), "{text}");
    }
    for entry in
        std::fs::read_dir(std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("cases")).unwrap()
    {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|e| e == "toml") {
            let text = std::fs::read_to_string(&path).unwrap();
            assert!(meets(&as_json(&text), &schema), "{}", path.display());
        }
    }
}

#[test]
fn what_the_schema_can_see_is_refused_by_both() {
    let schema = case::schema();
    for text in [
        with("title", "titel"),
        with("wire =", "wyre ="),
        with("\"8 mm\"", "8"),
        with("\"8 mm\"", "\"mm\""),
        with("\"8 mm\"", "\"8\""),
        with("\"8 mm\"", "\"8,5 mm\""),
        with("\"8 mm\"", "{ radial = \"6 mm\" }"),
        with("= 8.5", "= 0"),
        with("= 8.5", "= \"8.5\""),
        with("\"hinged\"", "\"welded\""),
        with("free_length = \"210 mm\"\n", ""),
        with("[duty]\nworking_deflection = \"95 mm\"\n", ""),
        with(
            "mean_diameter = \"62 mm\"",
            "mean_diameter = \"62 mm\"\nouter_diameter = \"70 mm\"",
        ),
        with("mean_diameter = \"62 mm\"\n", ""),
        with("active_coils = 8.5\ntotal_coils = 10.5\n", ""),
        with("[material]\n", "[material]\nyoungs_modulus = \"200 GPa\"\n"),
        with(
            "name = \"patented-carbon-steel\"",
            "shear_modulus = \"79 GPa\"",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"hinged\"\nsideways_stiffness = \"8 N/mm\"",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"elastic\"\nrotational_stiffness = \"rigid\"",
        ),
        with(
            "kind = \"hinged\"",
            "kind = \"hinged\"\naxial_stiffness = \"none\"",
        ),
        with("[duty]", "[duty]\nloading = \"force\""),
        with(
            "[duty]",
            "[duty]\ninstalled_force = \"3 N\"\ninstalled_length = \"200 mm\"",
        ),
        with("[duty]", "[duty]\nrate_loss_share = 1.5"),
        with("[duty]", "[duty]\nmargins = { solidd = 0 }"),
        with("[duty]", "[duty]\nrequired_margin = -0.1"),
        with("\"hinged\"", "\"flat\"\narm = \"3 mm\""),
        with("\"hinged\"", "\"flat\"\nground_share = 0.5"),
        with("\"hinged\"", "\"flat\"\nground_share = 1.1"),
        with("\"hinged\"", "\"flat\"\npiloted = \"yes\""),
        with("\"hinged\"", "\"hinged\"\nseat_radius = \"3 mm\""),
        with("\"hinged\"", "\"hinged\"\nfriction = 0.1"),
        with("\"hinged\"", "\"ball\"\nfriction = 0.1"),
        with("\"hinged\"", "\"ball\"\nball_radius = \"8 mm\""),
        with("\"hinged\"", "\"link\"\nlink_length = \"80 mm\""),
        with("\"hinged\"", "\"link\"\nlink_acts = \"strut\""),
        with("\"hinged\"", "\"clamped\"\nplane = \"3 deg\""),
        with("\"hinged\"", "\"clamped\"\nother_plane = {}"),
        with(
            "\"hinged\"",
            "\"clamped\"\nother_plane = { kind = \"elastic\" }",
        ),
        with("\"hinged\"", "\"clamped\"\naxial_law = []"),
        with("\"hinged\"", "\"clamped\"\naxial_law = [3]"),
        with(
            "\"hinged\"",
            "\"clamped\"\naxial_law = [{ motion = \"1 mm\" }]",
        ),
        with(
            "\"hinged\"",
            "\"clamped\"\naxial_stiffness = \"rigid\"\naxial_law = [{ motion = \"1 mm\", force = \"1 N\" }]",
        ),
        with(
            "\"hinged\"",
            "\"free\"\nlever = { pivot_along = \"-90 mm\", pivot_across = \"90 mm\" }",
        ),
        with(
            "\"hinged\"",
            "\"hinged\"\nlever = { pivot_across = \"90 mm\" }",
        ),
        with(
            "\"clamped\"",
            "\"clamped\"\nlever = { pivot_along = \"-90 mm\", pivot_across = \"90 mm\" }",
        ),
        with(
            "[duty]",
            "[guide]\nkind = \"rod\"\ndiameter = \"50 mm\"\n[duty]",
        ),
        with("[duty]", "[[guide]]\nkind = \"rod\"\n[duty]"),
        with(
            "[duty]",
            &("[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\n".repeat(5) + "[duty]"),
        ),
        with(
            "[duty]",
            "[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\nfriction = 1\n[duty]",
        ),
    ] {
        assert!(case::parse("t", &text).is_err(), "{text}");
        assert!(!meets(&as_json(&text), &schema), "{text}");
    }
}

/// Examples and defaults of the schema must be such as the schema itself allows.
#[test]
fn examples_and_defaults_meet_their_own_schema() {
    fn walk(schema: &Value, count: &mut usize) {
        match schema {
            Value::Object(members) => {
                if let Some(kind) = members.get("description").and(Some(schema)) {
                    let examples = kind.get("examples").and_then(Value::as_array);
                    for value in examples.into_iter().flatten().chain(kind.get("default")) {
                        assert!(meets(value, kind), "{value} in {kind}");
                        *count += 1;
                    }
                }
                members.values().for_each(|inner| walk(inner, count));
            }
            Value::Array(list) => list.iter().for_each(|inner| walk(inner, count)),
            _ => {}
        }
    }
    let mut count = 0;
    walk(&case::schema(), &mut count);
    assert!(count > 50, "{count}");
}
