//! Values, keys and words that cannot be read.

use super::{check, only_mistake, read, refused, with};
use coilstay::case;

#[test]
fn values_that_are_no_quantity() {
    check(&[
        (
            "\"8 mm\"",
            "\"60 N\"",
            3,
            8,
            "must be a length, but \"60 N\" is a force",
            "wire = \"8 mm\"",
        ),
        (
            "\"8 mm\"",
            "8",
            3,
            8,
            "its unit is missing",
            "wire = \"8 mm\"",
        ),
        (
            "\"8 mm\"",
            "8.25",
            3,
            8,
            "its unit is missing",
            "wire = \"8.25 mm\"",
        ),
        ("\"8 mm\"", "\"8\"", 3, 8, "has no unit", "wire = \"8 mm\""),
        (
            "\"8 mm\"",
            "\"8 MM\"",
            3,
            8,
            "unknown unit, `MM`",
            "did you mean `mm`",
        ),
        (
            "\"8 mm\"",
            "\"8 furlongs\"",
            3,
            8,
            "unknown unit, `furlongs`",
            "8 mm",
        ),
        (
            "\"8 mm\"",
            "\"mm\"",
            3,
            8,
            "does not begin with a number",
            "8 mm",
        ),
        (
            "\"8 mm\"",
            "\"\"",
            3,
            8,
            "does not begin with a number",
            "8 mm",
        ),
        ("\"8 mm\"", "\"8,5 mm\"", 3, 8, "comma", "decimal point"),
        (
            "\"8 mm\"",
            "\"5/16 in\"",
            3,
            8,
            "more than one number",
            "wire = \"0.3125 in\"",
        ),
        (
            "\"8 mm\"",
            "\"1 1/2 in\"",
            3,
            8,
            "more than one number",
            "wire = \"1.5 in\"",
        ),
        ("\"8 mm\"", "\"nan mm\"", 3, 8, "finite", "8 mm"),
        ("\"8 mm\"", "\"-inf mm\"", 3, 8, "finite", "8 mm"),
        ("\"8 mm\"", "\"1e400 mm\"", 3, 8, "finite", "8 mm"),
        ("\"8 mm\"", "\"0 mm\"", 3, 8, "above 0", "8 mm"),
        ("\"8 mm\"", "\"-8 mm\"", 3, 8, "above 0", "8 mm"),
        ("\"8 mm\"", "\"8 mm/\"", 3, 8, "no readable unit", "8 mm"),
        ("\"8 mm\"", "true", 3, 8, "cannot be true or false", "8 mm"),
        ("\"8 mm\"", "[8]", 3, 8, "cannot be a list", "8 mm"),
        ("\"8 mm\"", "nan", 3, 8, "its unit is missing", "8 mm"),
        ("\"210 mm\"", "\"210 km\"", 5, 15, "unknown unit", "mm"),
        (
            "\"210 mm\"",
            "\"2100 m\"",
            5,
            15,
            "outside what can be computed",
            "210 mm",
        ),
        ("= 8.5", "= nan", 6, 16, "finite", "8.5"),
        ("= 8.5", "= -inf", 6, 16, "finite", "8.5"),
        ("= 8.5", "= 1e400", 6, 16, "finite", "8.5"),
        ("= 8.5", "= 0", 6, 16, "above 0", "8.5"),
        (
            "= 8.5",
            "= \"8.5\"",
            6,
            16,
            "bare number",
            "active_coils = 8.5",
        ),
        ("= 8.5", "= 0x7fffffffffffffff", 6, 16, "outside", "8.5"),
        ("\"Test\"", "7", 1, 9, "is text, not a number", "title = "),
        (
            "\"Test\"",
            "\"\\u001b[31m\"",
            1,
            9,
            "control character",
            "title = ",
        ),
        ("\"Test\"", "\" \"", 1, 9, "is empty", "title = "),
    ]);
}

#[test]
fn characters_that_only_look_right() {
    check(&[
        (
            "\"95 mm\"",
            "\"\u{2212}95 mm\"",
            17,
            22,
            "`\u{2212}` (U+2212), a dash that is not the plain minus",
            "working_deflection = \"-95 mm\"",
        ),
        (
            "\"8 mm\"",
            "\"\u{ff18} mm\"",
            3,
            8,
            "(U+FF18), a full-width character",
            "wire = \"8 mm\"",
        ),
        (
            "\"8 mm\"",
            "\"8\u{200b} mm\"",
            3,
            8,
            "(U+200B), which cannot be seen",
            "wire = \"8 mm\"",
        ),
        (
            "\"8 mm\"",
            "\"\u{bd} in\"",
            3,
            8,
            "(U+00BD), which is not a plain digit",
            "plain digits",
        ),
    ]);
    // A superscript belongs to a unit.
    let text = with("[duty]", "[duty]\nallowable_stress = \"700 N/mm\u{b2}\"");
    assert_eq!(read(&text).setup.duty.allowable_stress, Some(700e6));
}

#[test]
fn units_known_from_elsewhere() {
    check(&[
        (
            "[bottom]",
            "service_temperature = \"20 C\"\n[bottom]",
            10,
            23,
            "unknown unit, `C`",
            "did you mean `degC`",
        ),
        (
            "\"hinged\"",
            "\"elastic\"\nsideways_stiffness = \"none\"\nrotational_stiffness = \"40 Nm/rad\"",
            15,
            24,
            "unknown unit, `Nm`",
            "did you mean `N m`",
        ),
    ]);
}

#[test]
fn a_size_has_no_sign() {
    for field in ["squareness", "parallelism", "bow", "eccentricity"] {
        let line = format!("{field} = \"-1 mm\"");
        let item = only_mistake(&with("squareness = \"4 mm\"", &line));
        assert!(item.message.contains("is a size"), "{}", item.message);
        assert!(item.cure.contains("the worst is taken"), "{}", item.cure);
    }
    let text = with(
        "\"hinged\"",
        "\"hinged\"\ntilt = \"-1 deg\"\noffset = \"-1 mm\"",
    );
    assert!(read(&text).setup.top.tilt < 0.0 && read(&text).setup.top.offset < 0.0);
}

/// What a message calls the ends of a range is accepted, and what lies a little beyond is not.
#[test]
fn ranges_are_those_in_the_messages() {
    let ends = |from: &str, beyond: &str| {
        let item = only_mistake(&with(from, beyond));
        let words = item.message.split("computed, ").nth(1).unwrap();
        let (low, high) = words.split_once(" to ").unwrap();
        [low.to_string(), high.to_string()]
    };
    let outside = |text: &str| match case::parse("test.toml", text) {
        Ok(_) => false,
        Err(mistakes) => mistakes
            .items()
            .iter()
            .any(|i| i.message.contains("outside")),
    };
    for (from, key, low, high) in [
        ("wire = \"8 mm\"", "wire", "0.9 um", "1001 m"),
        ("squareness = \"4 mm\"", "squareness", "", "1001 m"),
        ("[imperfections]", "arm", "-1001 m", "1001 m"),
        ("[imperfections]", "tilt", "-91 deg", "91 deg"),
        (
            "[imperfections]",
            "axial_stiffness",
            "0.9e-9 N/m",
            "1.1e15 N/m",
        ),
        ("[bottom]", "service_temperature", "-274 degC", "2001 degC"),
        (
            "working_deflection = \"95 mm\"",
            "working_force",
            "0.0009 mN",
            "1.1e6 MN",
        ),
        (
            "working_deflection = \"95 mm\"",
            "allowable_stress",
            "0.9 Pa",
            "1.1e5 GPa",
        ),
    ] {
        let line = |value: &str| {
            let line = format!("{key} = \"{value}\"");
            match from.strip_prefix('[') {
                Some(_) => format!("{line}\n{from}"),
                None if key == "allowable_stress" => format!("{from}\n{line}"),
                None => line,
            }
        };
        for beyond in [low, high].into_iter().filter(|value| !value.is_empty()) {
            assert!(outside(&with(from, &line(beyond))), "{key} {beyond}");
        }
        for end in ends(from, &line(high)) {
            assert!(!outside(&with(from, &line(&end))), "{key} {end}");
        }
    }
}

#[test]
fn keys_and_words() {
    check(&[
        (
            "wire =",
            "wire = \"8 mm\"\nwyre =",
            4,
            1,
            "no field `wyre`",
            "`wire`",
        ),
        (
            "free_length",
            "free-length",
            5,
            1,
            "no field `free-length`",
            "`free_length`",
        ),
        (
            "[spring]",
            "[spring]\nworking_force = \"3 N\"",
            3,
            1,
            "no field `working_force`",
            "belongs to [duty]",
        ),
        (
            "[spring]",
            "[spring]\nqwertyuiop = 1",
            3,
            1,
            "no field `qwertyuiop`",
            "mean_diameter",
        ),
        ("title", "titel", 1, 1, "no field `titel`", "`title`"),
        (
            "\"hinged\"",
            "\"hinge\"",
            13,
            8,
            "cannot be \"hinge\"",
            "\"hinged\"",
        ),
        (
            "\"hinged\"",
            "\"Hinged\"",
            13,
            8,
            "cannot be \"Hinged\"",
            "\"hinged\"",
        ),
        (
            "\"hinged\"",
            "\"welded\"",
            13,
            8,
            "cannot be \"welded\"",
            "clamped, hinged, free, sliding, elastic",
        ),
        (
            "\"patented-carbon-steel\"",
            "\"patented_carbon_stel\"",
            9,
            8,
            "cannot be",
            "did you mean \"patented-carbon-steel\"",
        ),
        (
            "free_length = \"210 mm\"\n",
            "",
            2,
            2,
            "[spring] lacks `free_length`",
            "free_length = \"210 mm\"",
        ),
        (
            "[duty]\nworking_deflection = \"95 mm\"\n",
            "",
            1,
            1,
            "[duty] is missing",
            "starter",
        ),
    ]);
}

#[test]
fn a_misspelt_key_is_not_also_missing() {
    let mistakes = refused(&with("free_length", "free_lenght"));
    assert_eq!(mistakes.items().len(), 1, "{mistakes}");
}
