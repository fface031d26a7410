//! Every mistake at its place, with cause and cure.

use super::{BASE, only_mistake, refused, with};

/// (replaced, by, line, column, part of the message, part of the cure)
type Expected = (
    &'static str,
    &'static str,
    usize,
    usize,
    &'static str,
    &'static str,
);

fn check(table: &[Expected]) {
    for (from, to, line, column, message, cure) in table {
        let item = only_mistake(&with(from, to));
        assert_eq!((item.line, item.column), (*line, *column), "{to}: {item:?}");
        assert!(item.message.contains(message), "{to}: {}", item.message);
        assert!(item.cure.contains(cure), "{to}: {}", item.cure);
    }
}

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

/// "free-length" is also a missing free_length: both are said, the cure of the first mends both.
#[test]
fn a_misspelt_key_is_not_also_missing() {
    let mistakes = refused(&with("free_length", "free_lenght"));
    assert_eq!(mistakes.items().len(), 1, "{mistakes}");
}

#[test]
fn said_twice_or_contradictory() {
    check(&[
        (
            "mean_diameter = \"62 mm\"",
            "mean_diameter = \"62 mm\"\nouter_diameter = \"70 mm\"",
            5,
            1,
            "`mean_diameter` and `outer_diameter`",
            "keep one",
        ),
        (
            "mean_diameter = \"62 mm\"\n",
            "",
            2,
            2,
            "needs `mean_diameter`, `outer_diameter` or `inner_diameter`",
            "mean_diameter = ",
        ),
        (
            "active_coils = 8.5\ntotal_coils = 10.5\n",
            "",
            2,
            2,
            "needs `active_coils` or `total_coils`",
            "active_coils = ",
        ),
        (
            "[material]\n",
            "[material]\nyoungs_modulus = \"200 GPa\"\n",
            9,
            1,
            "`name` and `youngs_modulus`",
            "remove `youngs_modulus`",
        ),
        (
            "[material]\n",
            "[material]\nexpansion_per_kelvin = \"1e-5 1/K\"\n",
            9,
            1,
            "`name` and `expansion_per_kelvin`",
            "remove",
        ),
        (
            "name = \"patented-carbon-steel\"",
            "shear_modulus = \"79 GPa\"",
            9,
            1,
            "needs `youngs_modulus`",
            "youngs_modulus = ",
        ),
        (
            "name = \"patented-carbon-steel\"\n",
            "",
            8,
            2,
            "needs `name`, `youngs_modulus` or `shear_modulus`",
            "name = ",
        ),
        (
            "kind = \"hinged\"",
            "kind = \"hinged\"\nsideways_stiffness = \"8 N/mm\"",
            14,
            1,
            "contradicts kind = \"hinged\"",
            "elastic",
        ),
        (
            "kind = \"hinged\"",
            "kind = \"elastic\"\nrotational_stiffness = \"rigid\"",
            13,
            8,
            "needs `sideways_stiffness`",
            "sideways_stiffness = ",
        ),
        (
            "kind = \"hinged\"",
            "kind = \"hinged\"\naxial_stiffness = \"none\"",
            14,
            19,
            "carries no load",
            "rigid",
        ),
        (
            "kind = \"hinged\"",
            "kind = \"hinged\"\naxial_stiffness = \"0 N/mm\"",
            14,
            19,
            "above 0",
            "500 N/mm",
        ),
        (
            "kind = \"hinged\"",
            "kind = \"hinged\"\naxial_stiffness = \"stiff\"",
            14,
            19,
            "cannot be \"stiff\"",
            "rigid",
        ),
        (
            "working_deflection = \"95 mm\"",
            "working_deflection = \"95 mm\"\nworking_force = \"900 N\"",
            18,
            1,
            "`working_deflection` and `working_force`",
            "keep one",
        ),
        (
            "working_deflection = \"95 mm\"\n",
            "",
            16,
            2,
            "needs `working_deflection`, `working_force` or `working_length`",
            "working_deflection = ",
        ),
        (
            "[duty]",
            "[duty]\ninstalled_force = \"3 N\"\ninstalled_length = \"200 mm\"",
            18,
            1,
            "`installed_force` and `installed_length`",
            "keep one",
        ),
        (
            "[duty]",
            "[duty]\nloading = \"force\"",
            17,
            11,
            "needs `working_force`",
            "working_force = ",
        ),
    ]);
}

#[test]
fn geometry_that_cannot_exist() {
    check(&[
        (
            "\"62 mm\"",
            "\"8 mm\"",
            4,
            17,
            "the coil has no inside",
            "4 to 20 times",
        ),
        (
            "mean_diameter = \"62 mm\"",
            "outer_diameter = \"15 mm\"",
            4,
            18,
            "the coil has no inside",
            "4 to 20 times",
        ),
        (
            "\"210 mm\"",
            "\"84 mm\"",
            5,
            15,
            "the wire is not thinner than the pitch",
            "must exceed",
        ),
        (
            "\"210 mm\"",
            "\"60 mm\"",
            5,
            15,
            "solid length 84.00 mm",
            "must exceed",
        ),
        (
            "= 8.5",
            "= 11",
            6,
            16,
            "more active coils, 11, than coils in total, 10.5",
            "larger",
        ),
        (
            "active_coils = 8.5\ntotal_coils = 10.5",
            "total_coils = 2",
            6,
            15,
            "no coil is left to work",
            "active coils",
        ),
        (
            "[spring]",
            "[spring]\nsolid_length = \"60 mm\"",
            3,
            16,
            "less than its 8.5 active coils stacked, 68.00 mm",
            "gives 84.00 mm",
        ),
        (
            "[spring]",
            "[spring]\nsolid_length = \"0.22 m\"",
            6,
            15,
            "solid length 220.0 mm (as given)",
            "must exceed",
        ),
        (
            "kind = \"hinged\"",
            "kind = \"free\"\n[imperfections2]",
            14,
            2,
            "no field `imperfections2`",
            "`imperfections`",
        ),
        (
            "kind = \"clamped\"",
            "kind = \"sliding\"\narm = \"-106 mm\"",
            12,
            7,
            "beyond the middle",
            "at most half",
        ),
        (
            "\"4 mm\"",
            "\"110 mm\"",
            15,
            14,
            "more than half the free length",
            "unit",
        ),
        (
            "\"95 mm\"",
            "\"215 mm\"",
            17,
            22,
            "more than its free length",
            "solid",
        ),
        (
            "[duty]",
            "[duty]\ninstalled_deflection = \"96 mm\"",
            18,
            22,
            "less than the installed one",
            "check both",
        ),
        (
            "working_deflection = \"95 mm\"",
            "working_length = \"210 mm\"",
            17,
            18,
            "lie loose",
            "shorter",
        ),
        (
            "[duty]",
            "[duty]\ninstalled_length = \"210.1 mm\"",
            17,
            20,
            "lie loose",
            "shorter",
        ),
        (
            "[material]",
            "[material]\nservice_temperature = \"-300 degC\"",
            9,
            23,
            "outside what can be computed",
            "20 degC",
        ),
    ]);
}

#[test]
fn supports_that_do_not_hold() {
    for (bottom, top) in [
        ("free", "hinged"),
        ("free", "free"),
        ("sliding", "sliding"),
        ("hinged", "free"),
    ] {
        let text = with("\"clamped\"", &format!("\"{bottom}\""))
            .replace("\"hinged\"\n[imp", &format!("\"{top}\"\n[imp"));
        let item = only_mistake(&text);
        assert_eq!((item.line, item.column), (13, 8));
        assert!(item.message.contains("do not hold the spring"));
        assert!(item.cure.contains("clamp one end"));
        // The other place is shown too.
        assert!(refused(&text).render(false).contains("the bottom"));
    }
}

#[test]
fn what_is_not_toml() {
    check(&[
        ("\"8 mm\"", "8 mm", 3, 8, "`8 mm` needs quotes", "\"8 mm\""),
        ("\"8 mm\"", "\"8 mm", 3, 13, "not closed", "quote"),
        ("\"8 mm\"", "", 3, 8, "nothing stands after `=`", "value"),
        ("= 8.5", "= 8,5", 6, 17, "a comma in a number", "8.5"),
        (
            "= 8.5",
            "8.5",
            6,
            1,
            "neither `key = value`",
            "free_length = ",
        ),
        ("[spring]", "[spring", 2, 8, "not closed", "[spring]"),
        (
            "[duty]",
            "[top]\n[duty]",
            16,
            2,
            "`top` is given twice",
            "keep one",
        ),
        (
            "wire =",
            "wire = \"7 mm\"\nwire =",
            4,
            1,
            "`wire` is given twice",
            "keep one",
        ),
        (
            "\"clamped\"",
            "clamped",
            11,
            8,
            "`clamped` needs quotes",
            "\"clamped\"",
        ),
        (
            "[duty]",
            "[[duty]]",
            16,
            1,
            "is a table, not a list",
            "[duty]",
        ),
        (
            "[spring]",
            "spring = 3\n[spring]",
            3,
            2,
            "given twice",
            "keep one",
        ),
    ]);
}

/// Syntax and meaning in one go, in the order of the text, the noise that follows from a broken
/// line left out.
#[test]
fn all_at_once() {
    let text = r#"titel = "x"
[spring]
wire = 8 mm
mean_diameter = 62
free_length = "21,5 mm"
active_coils = nan
total_coils 10.5
[material]
name = "patented-carbon-steel"
service_temperature = "20"
[bottom]
kind = "elastic"
rotational_stiffness = "40 N m"
[top]
kind = "hinged"
sideways_stiffness = "3 N/mm"
[duty]
installed_deflection = "90 mm"
working_deflection = "80 mm"
margins = { solid = -1, snapp = 0 }
"#;
    let mistakes = refused(text);
    insta::assert_snapshot!("all_at_once", mistakes.render(false));
    assert_eq!(mistakes.count(), mistakes.items().len());
    assert!(!mistakes.render(false).contains('\u{1b}'));
    assert!(mistakes.render(true).contains('\u{1b}'));
}

/// A mistake in one table does not hide those of the next.
#[test]
fn tables_are_checked_on_their_own() {
    let text = with("\"8 mm\"", "\"8 N\"")
        .replace("\"clamped\"", "\"free\"")
        .replace("[duty]", "[duty]\ninstalled_deflection = \"99 mm\"");
    let lines: Vec<usize> = refused(&text).items().iter().map(|i| i.line).collect();
    assert_eq!(lines, [3, 13, 18]);
}

#[test]
fn a_flood_of_mistakes_is_counted() {
    let flood: String = (0..5000).map(|i| format!("x{i} = 1\n")).collect();
    let mistakes = refused(&(flood + BASE));
    assert_eq!(mistakes.items().len(), 200);
    assert_eq!(mistakes.count(), 5000);
    assert!(mistakes.render(false).contains("and 4800 more"));
}
