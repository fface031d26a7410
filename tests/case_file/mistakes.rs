//! What is said twice, contradicts, cannot exist or is no TOML; and all of it at once.

use super::{BASE, check, only_mistake, refused, with};

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
        // The arm is the cause, not what it makes of the supports.
        (
            "kind = \"hinged\"",
            "kind = \"hinged\"\narm = \"-215 mm\"",
            14,
            7,
            "beyond the middle",
            "at most half",
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
    let flood: String = (0..60_000).map(|i| format!("x{i} = 1\n")).collect();
    let mistakes = refused(&(flood + &with("\"8 mm\"", "\"8 N\"")));
    // Twenty of a kind, and the one of another kind behind them.
    assert_eq!(mistakes.items().len(), 21);
    assert_eq!(mistakes.count(), 60_001);
    let text = mistakes.render(false);
    assert!(text.contains("and 59980 more like this: a case file has no field `x20`"));
    assert!(text.contains("`wire` must be a length"));
    assert!(text.lines().count() < 200, "{}", text.lines().count());
}

/// A bracket or quote that is not closed swallows what follows: no table is called missing.
#[test]
fn what_is_swallowed_is_not_missing() {
    for (from, to, message) in [
        ("[spring]", "x = [[1,\n[spring]", "bracket is not closed"),
        (
            "\"8 mm\"",
            "{ radial = \"8 mm\", axial = \"3 mm\"",
            "bracket is not closed",
        ),
        ("\"8 mm\"", "\"\"\"8 mm", "not closed"),
        ("[material]", "material]", "neither `key = value`"),
        ("[material]", "[[material", "not closed"),
    ] {
        let mistakes = refused(&with(from, to));
        let mut messages = mistakes.items().iter().map(|item| &item.message);
        assert!(messages.any(|said| said.contains(message)), "{mistakes}");
        for item in mistakes.items() {
            assert!(
                !item.message.contains("is missing") || item.message.contains("comma"),
                "{mistakes}"
            );
            assert!(!item.message.contains("lacks"), "{mistakes}");
            assert!(!item.message.contains("has no field `name`"), "{mistakes}");
        }
        assert!(mistakes.count() <= 2, "{mistakes}");
    }
    for deep in [
        format!("x = {}{}\n", "[".repeat(500), "]".repeat(500)),
        format!("x = {}1{}\n", "{a = ".repeat(500), "}".repeat(500)),
        format!("[{}]\n", ["a"; 500].join(".")),
    ] {
        let item = only_mistake(&(deep.clone() + BASE));
        assert!(item.message.contains("nested too deeply"), "{deep}");
        assert!(item.cure.contains("flat"));
    }
}
