//! `[bottom]` and `[top]`: what is refused, and how.

use super::ends::with_top;
use super::{check_text, refused};

pub type Row = (&'static str, (usize, usize), &'static str, &'static str);

/// Each: the lines of `[top]`, the first of which is line 13; place; part of the message, of the cure.
pub fn check_top(rows: &[Row]) {
    let texts: Vec<_> = rows
        .iter()
        .map(|(lines, place, message, cure)| (with_top(lines), *place, *message, *cure))
        .collect();
    check_text(&texts);
}

#[test]
fn fields_of_another_kind() {
    check_top(&[
        (
            "kind = \"clamped\"\nseat_radius = \"30 mm\"",
            (14, 1),
            "`seat_radius` contradicts kind = \"clamped\"",
            "set kind = \"flat\", or remove",
        ),
        (
            "kind = \"hinged\"\nground_share = 0.8",
            (14, 1),
            "`ground_share` contradicts",
            "flat",
        ),
        (
            "kind = \"hinged\"\npiloted = false",
            (14, 1),
            "`piloted` contradicts",
            "flat",
        ),
        (
            "kind = \"hinged\"\nfriction = 0.1",
            (14, 1),
            "`friction` contradicts kind = \"hinged\"",
            "flat, ball",
        ),
        (
            "kind = \"hinged\"\nlink_length = \"80 mm\"",
            (14, 1),
            "`link_length` contradicts",
            "link",
        ),
        (
            "kind = \"hinged\"\nlink_acts = \"strut\"",
            (14, 1),
            "`link_acts` contradicts",
            "link",
        ),
        (
            "kind = \"flat\"\npiloted = true\narm = \"0 mm\"",
            (15, 1),
            "`arm` contradicts kind = \"flat\"",
            "remove `arm`",
        ),
        (
            "kind = \"flat\"\npiloted = true\nother_plane = { kind = \"hinged\" }",
            (15, 1),
            "`other_plane` contradicts kind = \"flat\"",
            "clamped, hinged, free, sliding, elastic",
        ),
        (
            "kind = \"clamped\"\nrotational_law = [{ motion = \"1 deg\", moment = \"1 N m\" }]",
            (14, 1),
            "`rotational_law` contradicts kind = \"clamped\"",
            "elastic",
        ),
        (
            "kind = \"clamped\"\nsideways_law = [{ motion = \"1 mm\", force = \"1 N\" }]",
            (14, 1),
            "`sideways_law` contradicts kind = \"clamped\"",
            "elastic",
        ),
        (
            "kind = \"sliding\"\nlever = { pivot_along = \"0 mm\", pivot_across = \"200 mm\" }",
            (14, 1),
            "`lever` contradicts kind = \"sliding\"",
            "remove `lever`",
        ),
    ]);
}

#[test]
fn seats_that_can_only_push() {
    check_top(&[
        (
            "kind = \"flat\"\npiloted = true\nground_share = 0.5",
            (15, 16),
            "must be more than 0.5 and at most 1",
            "0.75",
        ),
        (
            "kind = \"flat\"\npiloted = true\nground_share = 1.01",
            (15, 16),
            "must be more than 0.5 and at most 1",
            "0.75",
        ),
        (
            "kind = \"flat\"\npiloted = true\nground_share = \"50 %\"",
            (15, 16),
            "must be more than 0.5",
            "0.75",
        ),
        (
            "kind = \"flat\"\npiloted = true\nseat_radius = \"36 mm\"",
            (15, 15),
            "beyond the coil's outer radius, 35.00 mm",
            "a radius, not a diameter",
        ),
        (
            "kind = \"flat\"\npiloted = true\nfriction = 0.1",
            (15, 12),
            "`friction` contradicts piloted = true",
            "piloted = false",
        ),
        (
            "kind = \"flat\"\npiloted = \"yes\"",
            (14, 11),
            "`piloted` is true or false, not text",
            "without quotes",
        ),
        (
            "kind = \"flat\"\npiloted = 1",
            (14, 11),
            "`piloted` is true or false, not a number",
            "piloted = true",
        ),
        (
            "kind = \"flat\"\nfriction = -0.1",
            (14, 12),
            "must be 0 or more, and below 1",
            "0.12",
        ),
        (
            "kind = \"flat\"\nfriction = 1.0",
            (14, 12),
            "must be 0 or more, and below 1",
            "0.12",
        ),
        (
            "kind = \"ball\"\nfriction = 0.1",
            (14, 1),
            "`friction` needs `ball_radius` beside it",
            "ball_radius = \"8 mm\"",
        ),
        (
            "kind = \"ball\"\nball_radius = \"8 mm\"",
            (14, 1),
            "`ball_radius` needs `friction` beside it",
            "friction = 0.12",
        ),
        (
            "kind = \"flat\"\nfriction = 0.1\nball_radius = \"8 mm\"",
            (15, 1),
            "`ball_radius` contradicts kind = \"flat\"",
            "ball",
        ),
        (
            "kind = \"link\"\nlink_acts = \"strut\"",
            (13, 8),
            "kind = \"link\" needs `link_length`",
            "link_length = \"80 mm\"",
        ),
        (
            "kind = \"link\"\nlink_length = \"80 mm\"",
            (13, 8),
            "kind = \"link\" needs `link_acts`",
            "link_acts = \"strut\"",
        ),
        (
            "kind = \"link\"\nlink_length = \"0 mm\"\nlink_acts = \"strut\"",
            (14, 15),
            "above 0",
            "80 mm",
        ),
        (
            "kind = \"link\"\nlink_length = \"80 mm\"\nlink_acts = \"rope\"",
            (15, 13),
            "cannot be \"rope\"",
            "strut, hanger",
        ),
    ]);
}

#[test]
fn planes() {
    check_top(&[
        (
            "kind = \"clamped\"\nplane = \"30 deg\"",
            (14, 1),
            "`plane` needs `other_plane` beside it",
            "other_plane = { kind = \"hinged\" }",
        ),
        (
            "kind = \"clamped\"\nother_plane = {}",
            (14, 1),
            "[top.other_plane] lacks `kind`",
            "kind = \"hinged\"",
        ),
        (
            "kind = \"clamped\"\nother_plane = \"hinged\"",
            (14, 15),
            "`top.other_plane` is a table, not text",
            "[top.other_plane]",
        ),
        (
            "kind = \"clamped\"\nother_plane = { kind = \"flat\" }",
            (14, 24),
            "cannot be \"flat\"",
            "clamped, hinged",
        ),
        (
            "kind = \"clamped\"\nother_plane = { kind = \"elastic\", sideways_stiffness = \"rigid\" }",
            (14, 24),
            "needs `rotational_stiffness` or `rotational_law`",
            "40 N m/rad",
        ),
        (
            "kind = \"clamped\"\nother_plane = { kind = \"hinged\", sideways_stiffness = \"rigid\" }",
            (14, 34),
            "`sideways_stiffness` contradicts kind = \"hinged\"",
            "elastic",
        ),
        (
            "kind = \"clamped\"\nplane = \"91 deg\"\nother_plane = { kind = \"hinged\" }",
            (14, 9),
            "-90 deg to 90 deg",
            "30 deg",
        ),
    ]);
}

#[test]
fn seats_that_move_aside() {
    let start = "{ travel = \"0 mm\", offset = \"0 mm\", tilt = \"0 deg\" }";
    check_top(&[
        (
            "kind = \"hinged\"\nlever = { pivot_along = \"90 mm\", pivot_across = \"0 mm\" }",
            (14, 49),
            "lies on the spring's axis",
            "pivot_across = \"120 mm\"",
        ),
        (
            "kind = \"hinged\"\nlever = { pivot_along = \"-90 mm\", pivot_across = \"-0.8 mm\" }",
            (14, 50),
            "or next to it",
            "pivot_across = \"120 mm\"",
        ),
        // The arc would have to be counted with what the seat gives.
        (
            "kind = \"hinged\"\naxial_stiffness = \"200 N/mm\"\n\
             lever = { pivot_along = \"0 mm\", pivot_across = \"130 mm\" }",
            (15, 9),
            "beside one that gives axially is not computed",
            "leave the axial stiffness rigid",
        ),
        (
            "kind = \"hinged\"\nlever = { pivot_along = \"20 mm\", pivot_across = \"60 mm\" }",
            (14, 49),
            "the seat can travel 43.25 mm only; the spring is solid after 126.0 mm",
            "check the pivot",
        ),
        (
            "kind = \"hinged\"\nlever = { pivot_across = \"60 mm\" }",
            (14, 1),
            "[top.lever] lacks `pivot_along`",
            "pivot_along = \"20 mm\"",
        ),
        (
            "kind = \"hinged\"\nlever = [1]",
            (14, 9),
            "`top.lever` is a table, not a list",
            "[top.lever]",
        ),
        (
            "kind = \"elastic\"\nrotational_stiffness = \"rigid\"\nsideways_stiffness = \"none\"\n\
             lever = { pivot_along = \"0 mm\", pivot_across = \"200 mm\" }",
            (16, 9),
            "does not hold the end sideways",
            "remove `lever`",
        ),
    ]);
    for (rows, column, message, cure) in [
        (
            start.to_string(),
            10,
            "has 1 row: it needs at least 2 rows",
            "motion = [{",
        ),
        (
            format!(
                "{}, {}",
                start.replace("travel = \"0", "travel = \"1"),
                start.replace("travel = \"0", "travel = \"9")
            ),
            22,
            "`travel` of the first row must be 0",
            "first touch",
        ),
        (
            format!(
                "{}, {}",
                start.replace("tilt = \"0", "tilt = \"1"),
                start.replace("travel = \"0", "travel = \"9")
            ),
            54,
            "`tilt` of the first row must be 0",
            "`tilt` of [top]",
        ),
        (
            format!("{start}, {start}"),
            76,
            "`travel` does not rise",
            "rising travel",
        ),
        (
            format!("{start}, {{ travel = \"9 mm\", tilt = \"1 deg\" }}"),
            65,
            "row 2 of top.motion lacks `offset`",
            "offset = \"0 mm\"",
        ),
    ] {
        let text = with_top(&format!("kind = \"hinged\"\nmotion = [{rows}]"));
        check_text(&[(text, (14, column), message, cure)]);
    }
    let both = with_top(&format!(
        "kind = \"hinged\"\nlever = {{ pivot_along = \"-90 mm\", pivot_across = \"90 mm\" }}\n\
         motion = [{start}, {}]",
        start.replace("travel = \"0", "travel = \"9")
    ));
    check_text(&[(both, (15, 1), "`lever` and `motion`", "keep one")]);
}

/// Only the top moves: what stands at the bottom is sent there.
#[test]
fn a_bottom_that_moves_is_sent_to_the_top() {
    for line in [
        "lever = { pivot_along = \"-90 mm\", pivot_across = \"90 mm\" }",
        "motion = []",
    ] {
        let text = super::with("\"clamped\"", &format!("\"clamped\"\n{line}"));
        check_text(&[(
            text,
            (12, 1),
            "[bottom] has no field",
            "belongs to [top]: move it there",
        )]);
    }
}

/// All the mistakes of the ends and guides in one go.
#[test]
fn ends_and_guides_all_at_once() {
    let text = with_top(
        "kind = \"flat\"\nground_share = 0.4\narm = \"3 mm\"\nfriction = \"slippery\"\n\
         axial_law = [{ motion = \"1 mm\", force = \"3 N\" }, { motion = \"1 mm\" }]\n\
         lever = { pivot_along = \"1 mm\", pivot_across = \"0 mm\" }\n\
         [[guide]]\nkind = \"rod\"\ndiameter = \"60 mm\"\nfrom = \"300 mm\"\n\
         [[guide]]\nkind = \"tube\"",
    );
    insta::assert_snapshot!("ends_and_guides", refused(&text).render(false));
}
