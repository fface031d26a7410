//! `[bottom]` and `[top]`: what each kind of seat means.

use super::{read, refused, with};
use approx::assert_relative_eq;
use coilstay::setup::{
    Contact, FlatSeat, Lateral, LeverArc, Link, Motion, Restraint, Setup, Support, Swivel,
};

const EXACT: f64 = 1e-14;

/// The base with its top replaced.
pub fn with_top(lines: &str) -> String {
    with("kind = \"hinged\"", lines)
}

fn top(lines: &str) -> Support {
    read(&with_top(lines)).setup.top
}

fn flat(lines: &str) -> (FlatSeat, Setup) {
    let setup = read(&with_top(&format!("kind = \"flat\"\n{lines}"))).setup;
    let Contact::Flat(seat) = setup.top.contact else {
        panic!("{:?}", setup.top.contact)
    };
    (seat, setup)
}

#[test]
fn flat_seats() {
    let (seat, setup) = flat("friction = 0.12");
    assert_relative_eq!(seat.radius, 31e-3, max_relative = EXACT);
    assert_eq!((seat.ground_share, seat.friction), (1.0, Some(0.12)));
    assert_eq!(setup.top.word(), "flat");
    assert_eq!(setup.top.rotation, Restraint::Held);
    assert_eq!(setup.top.arm, 0.0);
    for name in ["top.seat_radius", "top.ground_share", "top.piloted"] {
        assert!(setup.defaulted.iter().any(|d| d == name), "{name}");
    }
    assert!(!setup.defaulted.iter().any(|d| d == "top.arm"));
    assert!(setup.warnings.is_empty(), "{:?}", setup.warnings);
    let (seat, setup) = flat("seat_radius = \"33 mm\"\nground_share = \"75 %\"\npiloted = true");
    assert_relative_eq!(seat.radius, 33e-3, max_relative = EXACT);
    assert_relative_eq!(seat.ground_share, 0.75, max_relative = EXACT);
    assert_eq!(seat.friction, None);
    assert!(setup.warnings.is_empty(), "{:?}", setup.warnings);
    assert_eq!(flat("ground_share = 1\npiloted = true").0.ground_share, 1.0);
}

/// The bearing ring of a spring that grows with temperature grows with it; one that is given is the
/// machine's.
#[test]
fn the_seat_radius_left_out_is_the_coils_when_warm() {
    let warm = |lines: &str| {
        let text = with_top(&format!("kind = \"flat\"\npiloted = true\n{lines}"));
        let text = text.replace("[bottom]", "service_temperature = \"120 degC\"\n[bottom]");
        match read(&text).setup.top.contact {
            Contact::Flat(seat) => seat.radius,
            other => panic!("{other:?}"),
        }
    };
    assert_relative_eq!(warm(""), 31e-3 * (1.0 + 11.7e-4), max_relative = 1e-13);
    assert_relative_eq!(warm("seat_radius = \"31 mm\""), 31e-3, max_relative = EXACT);
}

#[test]
fn what_a_flat_seat_leaves_open_is_said() {
    let (seat, setup) = flat("");
    assert_eq!(seat.friction, None);
    let warnings = setup.warnings.join("\n");
    assert!(
        warnings.contains("[top] is flat and not piloted"),
        "{warnings}"
    );
    assert!(warnings.contains("is not checked"));
    for (ends, warned) in [
        ("closed-ground", false),
        ("closed", true),
        ("open-ground", true),
        ("open", true),
    ] {
        let text = with_top("kind = \"flat\"\nfriction = 0.1");
        let text = text.replace("[material]", &format!("ends = \"{ends}\"\n[material]"));
        let warnings = read(&text).setup.warnings.join("\n");
        let said = format!("the spring's ends are {ends}:");
        assert_eq!(warnings.contains(&said), warned, "{ends}: {warnings}");
    }
}

#[test]
fn balls_with_and_without_friction() {
    let free = top("kind = \"ball\"\narm = \"12 mm\"");
    assert_eq!(
        free,
        Support {
            arm: 0.012,
            ..Support::hinged()
        }
    );
    let held = top("kind = \"ball\"\narm = \"-12 mm\"\nfriction = 0.15\nball_radius = \"8 mm\"");
    assert_relative_eq!(held.arm, -0.012, max_relative = EXACT);
    assert_eq!(held.rotation, Restraint::Free);
    let Contact::Swivel(Swivel { friction, radius }) = held.contact else {
        panic!("{:?}", held.contact)
    };
    assert_eq!(friction, 0.15);
    assert_relative_eq!(radius, 8e-3, max_relative = EXACT);
    assert_eq!(held.word(), "ball");
}

#[test]
fn links_push_or_pull() {
    let link = |acts: &str| {
        top(&format!(
            "kind = \"link\"\nlink_length = \"80 mm\"\nlink_acts = \"{acts}\"\narm = \"5 mm\""
        ))
    };
    for (acts, hanging) in [("strut", false), ("hanger", true)] {
        let support = link(acts);
        let length = 0.08;
        assert_eq!(support.link, Some(Link { length, hanging }));
        assert_eq!(support.rotation, Restraint::Free);
        assert_relative_eq!(support.arm, 0.005, max_relative = EXACT);
        assert_eq!(support.word(), "link");
    }
}

fn law_of(restraint: Restraint) -> Vec<(f64, f64)> {
    match restraint {
        Restraint::Progressive(curve) => curve.points().collect(),
        other => panic!("{other:?}"),
    }
}

fn close(found: &[(f64, f64)], wanted: &[(f64, f64)]) {
    assert_eq!(found.len(), wanted.len(), "{found:?}");
    for (found, wanted) in found.iter().zip(wanted) {
        assert_relative_eq!(found.0, wanted.0, max_relative = EXACT);
        assert_relative_eq!(found.1, wanted.1, max_relative = EXACT);
    }
}

#[test]
fn measured_laws_begin_at_nought() {
    let axial = "axial_law = [{ motion = \"1 mm\", force = \"300 N\" }, \
                 { motion = \"2 mm\", force = \"1.2 kN\" }]";
    let wanted = [(0.0, 0.0), (1e-3, 300.0), (2e-3, 1200.0)];
    for kind in ["clamped", "hinged"] {
        let seat = top(&format!("kind = \"{kind}\"\n{axial}"));
        close(&law_of(seat.axial), &wanted);
        assert_eq!(seat.word(), kind);
    }
    // Said or not, the first point is nought; and rows may be tables with headers of their own.
    let said = axial.replace('[', "[{ motion = \"0 mm\", force = \"0 N\" }, ");
    close(
        &law_of(top(&format!("kind = \"clamped\"\n{said}")).axial),
        &wanted,
    );
    let headed = top(
        "kind = \"clamped\"\n[[top.axial_law]]\nmotion = \"1 mm\"\nforce = \"300 N\"\n\
         [[top.axial_law]]\nmotion = \"2 mm\"\nforce = \"1200 N\"",
    );
    close(&law_of(headed.axial), &wanted);
    let defaulted = read(&with_top(&format!("kind = \"clamped\"\n{axial}")))
        .setup
        .defaulted;
    assert!(!defaulted.iter().any(|d| d == "top.axial_stiffness"));
    let elastic = top(
        "kind = \"elastic\"\nrotational_law = [{ motion = \"1 deg\", moment = \"600 N mm\" }]\n\
         sideways_law = [{ motion = \"0.5 mm\", force = \"20 N\" }]",
    );
    close(
        &law_of(elastic.rotation),
        &[(0.0, 0.0), (1_f64.to_radians(), 0.6)],
    );
    close(&law_of(elastic.sideways), &[(0.0, 0.0), (0.5e-3, 20.0)]);
    assert_eq!(elastic.word(), "elastic");
}

/// 25.4 mm to the inch and 4.4482216152605 N to the pound of force, written out.
#[test]
fn laws_in_inches_are_the_same_laws() {
    let (inch, pound) = (25.4e-3, 4.4482216152605);
    let seat = top(
        "kind = \"elastic\"\nsideways_law = [{ motion = \"0.1 in\", force = \"10 lbf\" }]\n\
         rotational_law = [{ motion = \"0.1 rad\", moment = \"30 lbf in\" }]",
    );
    close(
        &law_of(seat.sideways),
        &[(0.0, 0.0), (0.1 * inch, 10.0 * pound)],
    );
    close(
        &law_of(seat.rotation),
        &[(0.0, 0.0), (0.1, 30.0 * pound * inch)],
    );
}

/// A force F is a travel of F/k and what a measured seat gives under F; the compression under a
/// travel is its inverse.
#[test]
fn measured_seats_turn_forces_into_travel() {
    let text = with_top(
        "kind = \"hinged\"\naxial_law = [{ motion = \"2 mm\", force = \"300 N\" }, \
         { motion = \"3 mm\", force = \"900 N\" }]",
    )
    .replace(
        "kind = \"clamped\"",
        "kind = \"clamped\"\naxial_stiffness = \"300 N/mm\"",
    );
    for (force, gives) in [(300.0, 2e-3), (900.0, 3e-3)] {
        let setup = read(&text.replace(
            "working_deflection = \"95 mm\"",
            &format!("working_force = \"{force} N\""),
        ))
        .setup;
        assert_relative_eq!(
            setup.duty.working_deflection,
            force / setup.spring.rate() + force / 300e3 + gives,
            max_relative = 1e-12
        );
    }
    // A seat that takes most of the travel: 220 mm are more than the free length of 210 mm, but the
    // spring takes part of it only.
    let soft =
        with_top("kind = \"hinged\"\naxial_law = [{ motion = \"60 mm\", force = \"500 N\" }]")
            .replace("\"95 mm\"", "\"220 mm\"");
    assert_relative_eq!(
        read(&soft).setup.duty.working_deflection,
        0.22,
        max_relative = EXACT
    );
    let stiff = soft.replace("\"60 mm\"", "\"1 mm\"");
    let mistakes = refused(&stiff);
    assert!(
        mistakes.items()[0]
            .message
            .contains("more than its free length")
    );
}

/// The same number beyond the last row: straight on.
#[test]
fn beyond_its_rows_a_law_goes_on_straight() {
    let seat = top(
        "kind = \"clamped\"\naxial_law = [{ motion = \"1 mm\", force = \"100 N\" }, \
         { motion = \"2 mm\", force = \"300 N\" }]",
    );
    let (given, compliance) = seat.axial.gives_under(700.0);
    assert_relative_eq!(given, 4e-3, max_relative = 1e-12);
    assert_relative_eq!(compliance, 1.0 / 200e3, max_relative = 1e-12);
}

#[test]
fn two_planes() {
    let support = top(
        "kind = \"clamped\"\ntilt = \"1 deg\"\nplane = \"30 deg\"\n[top.other_plane]\n\
         kind = \"elastic\"\nrotational_stiffness = \"40 N m/rad\"\n\
         sideways_law = [{ motion = \"1 mm\", force = \"8 N\" }]\noffset = \"0.2 mm\"",
    );
    let other = support.other_plane.unwrap();
    assert_eq!(support.rotation, Restraint::Held);
    assert_eq!(other.rotation, Restraint::Elastic(40.0));
    close(&law_of(other.sideways), &[(0.0, 0.0), (1e-3, 8.0)]);
    assert_relative_eq!(other.offset, 0.2e-3, max_relative = EXACT);
    assert_eq!(other.tilt, 0.0);
    assert_relative_eq!(support.tilt, 1_f64.to_radians(), max_relative = EXACT);
    assert_relative_eq!(support.plane, 30_f64.to_radians(), max_relative = EXACT);
    let fork = top("kind = \"hinged\"\nother_plane = { kind = \"clamped\" }");
    assert_eq!(fork.other_plane, Some(Support::clamped().lateral()));
    assert_eq!(fork.plane, 0.0);
    assert_eq!(top("kind = \"hinged\"").other_plane, None);
}

/// Both ends with two planes each, at these directions.
fn crossed(bottom: &str, top: &str, more: &str) -> String {
    with_top(&format!(
        "kind = \"hinged\"\nplane = \"{top}\"\nother_plane = {{ kind = \"clamped\" }}\n{more}"
    ))
    .replace(
        "kind = \"clamped\"\n[top]",
        &format!(
            "kind = \"elastic\"\nrotational_stiffness = \"30 N m/rad\"\n\
             sideways_stiffness = \"rigid\"\nplane = \"{bottom}\"\n\
             other_plane = {{ kind = \"clamped\", tilt = \"1 deg\" }}\n[top]"
        ),
    )
}

#[test]
fn planes_of_both_ends_are_counted_alike() {
    let hinged = Support::hinged().lateral();
    let clamped = Support::clamped().lateral();
    for (bottom, top) in [
        ("0 deg", "0 deg"),
        ("30 deg", "30 deg"),
        ("90 deg", "-90 deg"),
    ] {
        let setup = read(&crossed(bottom, top, "")).setup;
        assert_eq!(setup.top.lateral(), hinged, "{bottom} {top}");
        assert_eq!(setup.top.other_plane, Some(clamped));
        assert_eq!(setup.bottom.rotation, Restraint::Elastic(30.0));
    }
    for (bottom, top) in [
        ("0 deg", "90 deg"),
        ("60 deg", "-30 deg"),
        ("-30 deg", "60 deg"),
    ] {
        let setup = read(&crossed(bottom, top, "")).setup;
        assert_eq!(setup.top.lateral(), clamped, "{bottom} {top}");
        assert_eq!(setup.top.other_plane, Some(hinged));
        assert_eq!(setup.bottom.rotation, Restraint::Elastic(30.0));
        let apart = (setup.top.plane - setup.bottom.plane).to_degrees();
        assert!(
            (apart.rem_euclid(180.0) - 180.0)
                .abs()
                .min(apart.rem_euclid(180.0))
                < 1e-6
        );
    }
    // Where the top is led aside in its first plane, the bottom's are exchanged.
    let lever = "lever = { pivot_along = \"-150 mm\", pivot_across = \"120 mm\" }";
    let setup = read(&crossed("0 deg", "90 deg", lever)).setup;
    assert_eq!(setup.top.lateral(), hinged);
    assert_eq!(setup.bottom.rotation, Restraint::Held);
    assert_relative_eq!(setup.bottom.tilt, 1_f64.to_radians(), max_relative = EXACT);
    assert_eq!(
        setup.bottom.other_plane.map(|other| other.rotation),
        Some(Restraint::Elastic(30.0))
    );
    assert!(setup.top.in_first_plane().motion.is_some());
    assert!(setup.top.in_other_plane().motion.is_none());
}

#[test]
fn planes_that_do_not_line_up_are_refused_with_both_places() {
    for (bottom, top, apart) in [
        ("0 deg", "30 deg", "30.00 deg"),
        ("80 deg", "-80 deg", "20.00 deg"),
        ("0 deg", "89 deg", "89.00 deg"),
    ] {
        let mistakes = refused(&crossed(bottom, top, ""));
        assert_eq!(mistakes.items().len(), 1, "{mistakes}");
        let item = &mistakes.items()[0];
        assert!(item.message.contains("do not line up"), "{}", item.message);
        assert!(item.message.contains(apart), "{}", item.message);
        assert!(item.message.contains("coupled"));
        let shown = mistakes.render(false);
        assert!(
            shown.contains("the bottom") && shown.contains("the top"),
            "{shown}"
        );
    }
    // An end that is alike all round has no direction, however it is written.
    let alike = crossed("0 deg", "30 deg", "")
        .replace("kind = \"hinged\"\nplane", "kind = \"clamped\"\nplane");
    let setup = read(&alike).setup;
    assert_eq!(setup.top.other_plane, Some(setup.top.lateral()));
}

#[test]
fn each_plane_must_be_held() {
    let text = with_top("kind = \"hinged\"\nother_plane = { kind = \"free\" }");
    assert!(read(&text).setup.is_held());
    let loose = text.replace("kind = \"clamped\"\n[top]", "kind = \"hinged\"\n[top]");
    let mistakes = refused(&loose);
    assert!(
        mistakes.items()[0]
            .message
            .contains("do not hold the spring")
    );
}

/// Unloaded, a bar hinged at both ends holds nothing sideways: its transverse rate is ∓P/ℓ.
#[test]
fn a_link_does_not_hold_the_unloaded_spring() {
    for acts in ["strut", "hanger"] {
        let link = format!("kind = \"link\"\nlink_length = \"80 mm\"\nlink_acts = \"{acts}\"");
        assert!(read(&with_top(&link)).setup.is_held());
        let hinged = with_top(&link).replace("\"clamped\"", "\"hinged\"");
        let mistakes = refused(&hinged);
        assert!(
            mistakes.items()[0]
                .message
                .contains("do not hold the spring")
        );
        let flat = with_top(&link).replace("\"clamped\"", "\"flat\"\npiloted = true");
        assert!(read(&flat).setup.is_held());
    }
}

#[test]
fn seats_on_levers_and_on_measured_paths() {
    let lever =
        top("kind = \"hinged\"\n[top.lever]\npivot_along = \"-20 mm\"\npivot_across = \"-160 mm\"");
    let Some(Motion::Lever(LeverArc { along, across })) = lever.motion else {
        panic!("{:?}", lever.motion)
    };
    assert_relative_eq!(along, -0.02, max_relative = EXACT);
    assert_relative_eq!(across, -0.16, max_relative = EXACT);
    let table = top("kind = \"clamped\"\nmotion = [\n\
         { travel = \"0 mm\", offset = \"0 mm\", tilt = \"0 deg\" },\n\
         { travel = \"50 mm\", offset = \"-1 mm\", tilt = \"2 deg\" },\n\
         { travel = \"100 mm\", offset = \"0.5 mm\", tilt = \"3 deg\" },\n]");
    let motion = table.motion.unwrap();
    for (travel, offset, tilt) in [(0.05, -1e-3, 2.0_f64), (0.1, 0.5e-3, 3.0)] {
        let pose = motion.pose(travel);
        assert_relative_eq!(pose.offset.value, offset, max_relative = 1e-12);
        assert_relative_eq!(pose.tilt.value, tilt.to_radians(), max_relative = 1e-12);
    }
    assert_eq!(top("kind = \"hinged\"").motion, None);
}

/// A support written with all that its kind may have reads as that, and nothing else is taken.
#[test]
fn an_other_plane_that_says_the_same_is_the_same() {
    let plain = top(
        "kind = \"elastic\"\nrotational_stiffness = \"4 N m/rad\"\nsideways_stiffness = \"rigid\"",
    );
    let lateral = Lateral {
        rotation: Restraint::Elastic(4.0),
        sideways: Restraint::Held,
        tilt: 0.0,
        offset: 0.0,
    };
    assert_eq!(plain.lateral(), lateral);
    assert_eq!(plain.in_other_plane(), plain.in_first_plane());
}
