//! Measured laws, and lists in general: what is refused, and how.

use super::end_mistakes::check_top;
use super::ends::with_top;
use super::{read, refused};

#[test]
fn laws_that_do_not_rise_or_cannot_be_read() {
    check_top(&[
        (
            "kind = \"clamped\"\naxial_stiffness = \"3 N/mm\"\n\
             axial_law = [{ motion = \"1 mm\", force = \"3 N\" }]",
            (15, 1),
            "`axial_stiffness` and `axial_law`",
            "keep one",
        ),
        (
            "kind = \"elastic\"\nsideways_stiffness = \"rigid\"\nrotational_stiffness = \"none\"\n\
             rotational_law = [{ motion = \"1 deg\", moment = \"1 N m\" }]",
            (16, 1),
            "`rotational_stiffness` and `rotational_law`",
            "keep one",
        ),
        (
            "kind = \"elastic\"\nsideways_stiffness = \"rigid\"",
            (13, 8),
            "needs `rotational_stiffness` or `rotational_law`",
            "rotational_stiffness = ",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"2 mm\", force = \"3 N\" }, \
             { motion = \"2 mm\", force = \"5 N\" }]",
            (14, 61),
            "`motion` does not rise: it is not above that of the row before",
            "rising motion",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"2 mm\", force = \"3 N\" }, \
             { motion = \"3 mm\", force = \"2 N\" }]",
            (14, 77),
            "`force` does not rise",
            "more load",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"0 mm\", force = \"3 N\" }]",
            (14, 25),
            "`motion` does not rise: it is not above nought, where every law begins",
            "rising motion",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"0 mm\", force = \"0 N\" }]",
            (14, 13),
            "says nothing but that it begins at nought",
            "axial_law = [{ motion = \"1 mm\", force = \"300 N\" }]",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"1e-300 m\", force = \"1 N\" }]",
            (14, 14),
            "outside what can be computed",
            "check both numbers",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"1 m\", force = \"1e-10 N\" }]",
            (14, 14),
            "outside what can be computed",
            "check both numbers",
        ),
        (
            "kind = \"clamped\"\naxial_law = []",
            (14, 13),
            "has 0 rows: it needs at least 1 row",
            "motion = \"1 mm\"",
        ),
        (
            "kind = \"clamped\"\naxial_law = \"500 N/mm\"",
            (14, 13),
            "`top.axial_law` is a list of tables, not text",
            "axial_law = [{",
        ),
        (
            "kind = \"clamped\"\naxial_law = { motion = \"1 mm\", force = \"3 N\" }",
            (14, 13),
            "`top.axial_law` is a list of tables, not a table",
            "axial_law = [{",
        ),
        (
            "kind = \"clamped\"\naxial_law = [[\"1 mm\", \"3 N\"]]",
            (14, 14),
            "row 1 of top.axial_law is a table in braces, not a list",
            "axial_law = [{",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"1 mm\" }]",
            (14, 14),
            "row 1 of top.axial_law lacks `force`",
            "force = \"300 N\"",
        ),
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"1 mm\", force = \"3 N\", moment = \"3 N m\" }]",
            (14, 48),
            "row 1 of top.axial_law has no field `moment`",
            "motion, force",
        ),
    ]);
}

#[test]
fn both_members_of_a_law_are_checked_by_their_dimension() {
    check_top(&[
        (
            "kind = \"clamped\"\naxial_law = [{ motion = \"1 deg\", force = \"3 N\" }]",
            (14, 25),
            "`motion` must be a length",
            "1 mm",
        ),
        (
            "kind = \"elastic\"\nsideways_stiffness = \"rigid\"\n\
             rotational_law = [{ motion = \"1 mm\", moment = \"3 N m\" }]",
            (15, 30),
            "`motion` must be an angle",
            "1 deg",
        ),
        (
            "kind = \"elastic\"\nsideways_stiffness = \"rigid\"\n\
             rotational_law = [{ motion = \"1 deg\", moment = \"3 N m/rad\" }]",
            (15, 48),
            "`moment` must be a moment",
            "0.6 N m",
        ),
    ]);
    let rows = |count: usize| {
        let rows: Vec<String> = (1..=count)
            .map(|i| format!("{{ motion = \"{i} mm\", force = \"{i} N\" }}"))
            .collect();
        with_top(&format!(
            "kind = \"clamped\"\naxial_law = [{}]",
            rows.join(", ")
        ))
    };
    read(&rows(23));
    let mistakes = refused(&rows(24));
    assert!(
        mistakes.items()[0].message.contains("24 rows: at most 23"),
        "{mistakes}"
    );
}

/// Brackets, commas and quotes of lists: the cause is named, and nothing that follows from it.
#[test]
fn lists_that_are_not_toml() {
    let law = |rows: &str| with_top(&format!("kind = \"clamped\"\naxial_law = {rows}"));
    for (text, line, message) in [
        (
            law("[\n{ motion = \"1 mm\", force = \"3 N\" },"),
            16,
            "a bracket is not closed",
        ),
        (
            law("[{ motion = \"1 mm\", force = \"3 N\" } { motion = \"2 mm\", force = \"6 N\" }]"),
            14,
            "a comma is missing",
        ),
        (
            law("[{ motion = \"1 mm\" force = \"3 N\" }]"),
            14,
            "a comma is missing",
        ),
        (
            law("[{ motion = 1 mm, force = \"3 N\" }]"),
            14,
            "needs quotes",
        ),
        (
            with_top("kind = \"hinged\"\n[[guide]\nkind = \"rod\"\ndiameter = \"50 mm\""),
            14,
            "not closed",
        ),
    ] {
        let mistakes = refused(&text);
        let item = &mistakes.items()[0];
        assert_eq!(mistakes.items().len(), 1, "{mistakes}");
        assert_eq!(item.line, line, "{mistakes}");
        assert!(item.message.contains(message), "{mistakes}");
    }
}
