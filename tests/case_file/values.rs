//! Values, keys and words that cannot be read.

use super::{check, refused, with};

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
            "0.5 in",
        ),
        (
            "\"8 mm\"",
            "\"1 1/2 in\"",
            3,
            8,
            "more than one number",
            "0.5 in",
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
