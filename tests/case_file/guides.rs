//! `[[guide]]`: rods and bores, what they mean and what is refused.

use super::{BASE, check_text, read, refused, with};
use approx::assert_relative_eq;
use coilstay::setup::{FixedTo, Guide, GuideKind, LimitKind, Setup};

/// The base with these guides before its duty.
fn guided(lines: &str) -> String {
    with("[duty]", &format!("{lines}\n[duty]"))
}

fn setup(lines: &str) -> Setup {
    read(&guided(lines)).setup
}

#[test]
fn guides_in_si_and_their_defaults() {
    let setup = setup(
        "[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\n\
         [[guide]]\nkind = \"bore\"\ndiameter = \"76 mm\"\nfixed_to = \"bottom\"\nfrom = \"10 mm\"\n\
         to = \"60 mm\"\nfriction = 0.12\ntouching = \"allowed\"",
    );
    let [rod, bore] = setup.guides.as_slice() else {
        panic!("{:?}", setup.guides)
    };
    assert_eq!(
        *rod,
        Guide {
            kind: GuideKind::Rod,
            diameter: 0.05,
            fixed_to: FixedTo::Ground,
            from: 0.0,
            to: f64::INFINITY,
            friction: 0.0,
            touching_allowed: false,
        }
    );
    assert_eq!(
        (bore.kind, bore.fixed_to),
        (GuideKind::Bore, FixedTo::Bottom)
    );
    assert_relative_eq!(bore.diameter, 0.076, max_relative = 1e-14);
    assert_relative_eq!(bore.from, 0.01, max_relative = 1e-14);
    assert_relative_eq!(bore.to, 0.06, max_relative = 1e-14);
    assert_eq!((bore.friction, bore.touching_allowed), (0.12, true));
    for name in [
        "guide.1.fixed_to",
        "guide.1.from",
        "guide.1.to",
        "guide.1.friction",
        "guide.1.touching",
    ] {
        assert!(setup.defaulted.iter().any(|d| d == name), "{name}");
    }
    assert!(!setup.defaulted.iter().any(|d| d.starts_with("guide.2")));
    assert!(setup.warnings.is_empty(), "{:?}", setup.warnings);
    assert!(setup.has(LimitKind::GuideTouch) && setup.has(LimitKind::BoreFilled));
    assert!(read(BASE).setup.guides.is_empty());
}

#[test]
fn a_list_in_one_line_says_the_same() {
    let headed = setup("[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"").guides;
    let list = "guide = [{ kind = \"rod\", diameter = \"50 mm\" }]\n";
    assert_eq!(read(&(list.to_string() + BASE)).setup.guides, headed);
    assert!(
        read(&("guide = []\n".to_string() + BASE))
            .setup
            .guides
            .is_empty()
    );
}

/// Guides are the machine's: they do not grow with the spring. Its clearance is taken warm.
#[test]
fn guides_do_not_grow_with_the_spring() {
    let hot = guided("[[guide]]\nkind = \"bore\"\ndiameter = \"70.05 mm\"\ntouching = \"allowed\"");
    assert_relative_eq!(
        read(&hot).setup.guides[0].diameter,
        0.07005,
        max_relative = 1e-14
    );
    let hot = hot.replace("[bottom]", "service_temperature = \"120 degC\"\n[bottom]");
    let mistakes = refused(&hot);
    assert!(
        mistakes.items()[0]
            .message
            .contains("outer diameter is 70.08 mm"),
        "{mistakes}"
    );
}

/// Handbook rule, from memory: 0.1 D below 13 mm, 0.05 D above.
#[test]
fn little_clearance_is_named() {
    let warnings = |kind: &str, diameter: &str| {
        let lines = format!("[[guide]]\nkind = \"{kind}\"\ndiameter = \"{diameter}\"");
        setup(&lines).warnings.join("\n")
    };
    // 0.05 of 62 mm is 3.1 mm.
    assert_eq!(warnings("rod", "50.9 mm"), "");
    assert_eq!(warnings("bore", "73.1 mm"), "");
    for (kind, diameter) in [("rod", "51 mm"), ("bore", "73 mm")] {
        let said = warnings(kind, diameter);
        assert!(
            said.contains("guide 1: its diametral clearance, 3.00 mm"),
            "{said}"
        );
        assert!(
            said.contains("0.05 of the mean diameter, 3.10 mm (from memory)"),
            "{said}"
        );
    }
    let small = |diameter: &str| {
        let lines = format!("[[guide]]\nkind = \"rod\"\ndiameter = \"{diameter}\"");
        let text = guided(&lines)
            .replace("\"8 mm\"", "\"1 mm\"")
            .replace("\"62 mm\"", "\"12 mm\"")
            .replace("\"210 mm\"", "\"40 mm\"")
            .replace("\"95 mm\"", "\"10 mm\"")
            .replace("\"4 mm\"", "\"0.4 mm\"");
        read(&text).setup.warnings.join("\n")
    };
    assert_eq!(small("9.8 mm"), "");
    assert!(small("9.9 mm").contains("0.1 of the mean diameter"));
}

/// A closed coil that fills its bore is a limit, no mistake.
#[test]
fn a_coil_that_fills_its_bore_when_closed_is_read() {
    let setup = setup("[[guide]]\nkind = \"bore\"\ndiameter = \"70.2 mm\"");
    let guide = &setup.guides[0];
    let closed = setup.spring.wire.axial_size() / setup.spring.pitch();
    assert!(guide.clearance(&setup.spring, 1.0) > 0.0);
    assert!(guide.clearance(&setup.spring, closed) < 0.0);
}

#[test]
fn a_guide_may_be_fixed_to_a_seat_that_holds() {
    let rod = "[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\nfixed_to = ";
    assert_eq!(
        setup(&format!("{rod}\"bottom\"")).guides[0].fixed_to,
        FixedTo::Bottom
    );
    for seat in [
        "kind = \"flat\"\npiloted = true",
        "kind = \"clamped\"\naxial_stiffness = \"500 N/mm\"",
        "kind = \"elastic\"\nrotational_stiffness = \"rigid\"\nsideways_stiffness = \"rigid\"",
    ] {
        let text = guided(&format!("{rod}\"top\"")).replace("kind = \"hinged\"", seat);
        assert_eq!(read(&text).setup.guides[0].fixed_to, FixedTo::Top, "{seat}");
    }
    for seat in [
        "kind = \"hinged\"",
        "kind = \"sliding\"",
        "kind = \"ball\"\nfriction = 0.1\nball_radius = \"8 mm\"",
        "kind = \"link\"\nlink_length = \"80 mm\"\nlink_acts = \"strut\"",
        "kind = \"elastic\"\nrotational_stiffness = \"rigid\"\nsideways_stiffness = \"8 N/mm\"",
        "kind = \"clamped\"\nother_plane = { kind = \"hinged\" }",
    ] {
        let text = guided(&format!("{rod}\"top\"")).replace("kind = \"hinged\"", seat);
        let mistakes = refused(&text);
        let item = &mistakes.items()[0];
        assert_eq!(mistakes.items().len(), 1, "{mistakes}");
        assert!(
            item.message.contains("[top] is not clamped or flat"),
            "{seat}"
        );
        assert!(item.cure.contains("fix it to the ground"));
        assert!(mistakes.render(false).contains("the kind is set here"));
    }
}

/// A rod from here to there, with more.
fn rod(more: &str) -> String {
    guided(&format!(
        "[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\n{more}"
    ))
}

#[test]
fn guides_that_cannot_be() {
    check_text(&[
        (
            guided("[[guide]]\nkind = \"rod\"\ndiameter = \"54 mm\""),
            (18, 12),
            "the coil's inner diameter is 54.00 mm",
            "must be smaller",
        ),
        (
            guided("[[guide]]\nkind = \"bore\"\ndiameter = \"69 mm\""),
            (18, 12),
            "the coil's outer diameter is 70.00 mm",
            "must be larger",
        ),
        (
            rod("from = \"60 mm\"\nto = \"60 mm\""),
            (20, 6),
            "ends where it begins",
            "must be above `from`",
        ),
        (
            rod("from = \"210 mm\""),
            (19, 8),
            "never meets the spring",
            "from the seat",
        ),
        (
            rod("from = \"-1 mm\""),
            (19, 8),
            "must not be negative",
            "0 mm",
        ),
        (
            rod("friction = 1"),
            (19, 12),
            "0 or more, and below 1",
            "0.12",
        ),
        (rod("friction = -0.1"), (19, 12), "0 or more", "0.12"),
        (
            rod("friction = \"0.1\""),
            (19, 12),
            "bare number, not text",
            "friction = 0.1",
        ),
        (
            rod("touching = true"),
            (19, 12),
            "cannot be true or false",
            "\"allowed\"",
        ),
        (
            rod("touching = \"never\""),
            (19, 12),
            "cannot be \"never\"",
            "not-allowed",
        ),
        (
            rod("fixed_to = \"roof\""),
            (19, 12),
            "cannot be \"roof\"",
            "ground, bottom, top",
        ),
        (
            rod("diametre = \"3 mm\""),
            (19, 1),
            "guide 1 has no field `diametre`",
            "`diameter`",
        ),
        (
            rod("[[guide]]\nkind = \"bore\""),
            (19, 1),
            "guide 2 lacks `diameter`",
            "diameter = \"50 mm\"",
        ),
        (
            guided("[guide]\nkind = \"rod\"\ndiameter = \"50 mm\""),
            (16, 1),
            "`guide` is a list of tables, not a table",
            "[[guide]]",
        ),
        (
            "guide = \"rod\"\n".to_string() + BASE,
            (1, 9),
            "`guide` is a list of tables, not text",
            "guide = [{ kind = \"rod\", diameter = \"50 mm\" }]",
        ),
        (
            "guide = [\"rod\"]\n".to_string() + BASE,
            (1, 10),
            "guide 1 is a table in braces, not text",
            "kind = \"rod\"",
        ),
        (
            guided(&"[[guide]]\nkind = \"rod\"\ndiameter = \"50 mm\"\n".repeat(5)),
            (16, 1),
            "`guide` has 5 rows: at most 4",
            "leave out",
        ),
    ]);
}
