//! JSON and CSV.

use super::fixture::{Shape, assessment, in_every_support};
use coilstay::report;
use coilstay::result::{Assessment, Mistake, Outcome, PathPoint, Refusal};
use serde_json::Value;

fn json(outcomes: &[Outcome]) -> Value {
    serde_json::from_str(&report::json(outcomes).unwrap()).unwrap()
}

fn assessed(assessment: Assessment) -> Outcome {
    Outcome::Assessed(Box::new(assessment))
}

#[test]
fn the_shape_is_kept() {
    insta::assert_json_snapshot!(json(&[assessed(assessment(Shape::Falling))]));
}

#[test]
fn the_shape_of_supports_and_guides_is_kept() {
    let all = json(&[assessed(in_every_support())]);
    let parts: serde_json::Map<String, Value> = [
        "supports",
        "guides",
        "planes",
        "effective_end_constant",
        "support_sensitivity",
        "guide_answer",
        "seat_loads",
        "stroke",
    ]
    .into_iter()
    .map(|key| (key.to_owned(), all[key].clone()))
    .collect();
    insta::assert_json_snapshot!(parts);
}

#[test]
fn what_is_not_finite_is_null() {
    let mut odd = assessment(Shape::Rising);
    odd.spring.rate_n_per_m = f64::NAN;
    odd.spring.free_length_m = f64::INFINITY;
    odd.limits[0].margin = Some(f64::NEG_INFINITY);
    let data = json(&[assessed(odd)]);
    assert_eq!(data["spring"]["rate_n_per_m"], Value::Null);
    assert_eq!(data["spring"]["free_length_m"], Value::Null);
    assert_eq!(data["limits"][0]["margin"], Value::Null);
}

#[test]
fn several_are_a_list_with_the_refused_in_place() {
    let refusal = Refusal::new(
        "bad.toml",
        vec![Mistake {
            line: 3,
            column: 7,
            message: "a force where a length belongs".into(),
            cure: "give a length".into(),
        }],
    );
    let data = json(&[
        Outcome::Refused(refusal),
        assessed(assessment(Shape::Straight)),
    ]);
    let expected = serde_json::json!({
        "file": "bad.toml",
        "verdict": "undecided",
        "mistakes": [{
            "line": 3,
            "column": 7,
            "message": "a force where a length belongs",
            "cure": "give a length",
        }],
    });
    assert_eq!(data["cases"][0], expected);
    assert_eq!(data["cases"][1]["verdict"], "holds");
}

/// Every key of a quantity ends in its unit: no number without one, but for pure numbers.
#[test]
fn quantities_end_in_their_unit() {
    const UNITS: [&str; 12] = [
        "_m",
        "_n",
        "_n_per_m",
        "_pa",
        "_rad",
        "_j",
        "_degc",
        "_n_m2",
        "_n_m",
        "_n_m_per_rad",
        "_per_k",
        "_kg_per_m3",
    ];
    const PURE: [&str; 32] = [
        "spring_index",
        "slenderness",
        "active_coils",
        "total_coils",
        "required_margin",
        "rate_loss_share",
        "end_constant",
        "share_of_free_length",
        "margin",
        "r_squared",
        "points",
        "elements",
        "orientations_tried",
        "relative_difference",
        "bow_place",
        "line",
        "column",
        "end_constant_error",
        "end_constant_below",
        "handbook_constants",
        "relative_change_if_larger",
        "relative_change_if_smaller",
        "relative_change_error",
        "ground_share",
        "friction",
        "guide_coil_place",
        "guide_places",
        "first_touch_place",
        "side",
        "closes_within",
        "unstable_set_deflection",
        "unstable_dead_load",
    ];
    fn walk(value: &Value, found: &mut Vec<String>) {
        match value {
            Value::Object(fields) => {
                for (key, field) in fields {
                    if field.is_number() {
                        found.push(key.clone());
                    }
                    walk(field, found);
                }
            }
            Value::Array(items) => items.iter().for_each(|item| walk(item, found)),
            _ => {}
        }
    }
    let mut keys = Vec::new();
    walk(&json(&[assessed(assessment(Shape::Falling))]), &mut keys);
    walk(&json(&[assessed(in_every_support())]), &mut keys);
    assert!(keys.len() > 50);
    for key in keys {
        let unit = UNITS.iter().any(|unit| key.ends_with(unit));
        assert!(unit || PURE.contains(&key.as_str()), "{key}");
    }
}

#[test]
fn the_table_reads_back_digit_for_digit() {
    for path in [
        assessment(Shape::Falling).imperfect_column.unwrap().path,
        in_every_support().imperfect_column.unwrap().path,
    ] {
        let table = report::csv(&path).unwrap();
        let mut reader = csv::Reader::from_reader(table.as_slice());
        let columns = reader.headers().unwrap().clone();
        assert_eq!(columns.len(), 30);
        let rows: Vec<csv::StringRecord> = reader.records().map(|row| row.unwrap()).collect();
        assert_eq!(rows.len(), path.points.len());
        for (row, point) in rows.iter().zip(&path.points) {
            let text = |name: &str| &row[columns.iter().position(|c| c == name).unwrap()];
            // An empty cell where there is no number.
            let cell = |name: &str| (!text(name).is_empty()).then(|| text(name).parse().unwrap());
            let PathPoint {
                deflection_m,
                force_n,
                bow_m,
                wire_stress_pa,
                guide_force_n,
                guide_room_m,
                bottom_line_m,
                ..
            } = *point;
            for (name, value) in [
                ("deflection_m", Some(deflection_m)),
                ("force_n", Some(force_n)),
                ("bow_m", Some(bow_m)),
                ("wire_stress_pa", Some(wire_stress_pa)),
                ("guide_force_n", Some(guide_force_n)),
                ("guide_room_m", guide_room_m),
                ("bottom_line_m", bottom_line_m),
            ] {
                assert_eq!(cell(name), value, "{name}");
            }
        }
    }
}
