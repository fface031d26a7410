//! Guides and links from the case file to the answer.

mod reference;

use coilstay::assess::assess;
use coilstay::result::{Assessment, Limit, LimitKind};
use reference::closed_form::clamped_link;

fn answer(text: &str) -> Assessment {
    let case = coilstay::case::parse("test.toml", text).expect("reads");
    assess(&case.setup, "")
}

fn limit(answer: &Assessment, kind: LimitKind) -> &Limit {
    let found = answer.limits.iter().find(|limit| limit.name == kind);
    found.expect("listed")
}

fn shipped(name: &str) -> String {
    let path = format!("{}/cases/{name}.toml", env!("CARGO_MANIFEST_DIR"));
    std::fs::read_to_string(path).expect("shipped")
}

/// A clamped spring under a link: the critical share of the exact root, for every length. [C]
#[test]
fn a_link_in_a_case_file_has_its_length() {
    for (length, acts) in [
        (40.0, "hanger"),
        (150.0, "hanger"),
        (150.0, "strut"),
        (900.0, "strut"),
    ] {
        let text = format!(
            r#"
            [spring]
            wire = "8 mm"
            mean_diameter = "60 mm"
            free_length = "300 mm"
            active_coils = 10
            total_coils = 10
            [material]
            youngs_modulus = "206 GPa"
            shear_modulus = "81.5 GPa"
            [bottom]
            kind = "clamped"
            [top]
            kind = "link"
            link_length = "{length} mm"
            link_acts = "{acts}"
            [duty]
            working_deflection = "20 mm"
            "#
        );
        let share = answer(&text)
            .straight_column
            .critical
            .map(|c| c.measure.share_of_free_length);
        let exact = clamped_link(206.0 / 81.5, 5.0, length / 300.0, acts == "hanger");
        match (share, exact) {
            (Some(share), Some(exact)) => {
                approx::assert_relative_eq!(share, exact, max_relative = 1e-8);
            }
            (found, exact) => assert_eq!(found.is_some(), exact.is_some(), "{length} {acts}"),
        }
    }
}

/// A rod that stops short and may not be touched: the limit is where its corner begins to bear.
#[test]
fn a_forbidden_corner_is_a_limit_where_it_begins_to_bear() {
    let text = shipped("brake-pilot-rod")
        .replace("touching = \"allowed\"", "touching = \"not-allowed\"")
        .replace("squareness = \"5 mm\"", "squareness = \"2 mm\"");
    let found = answer(&text);
    let touch = limit(&found, LimitKind::GuideTouch)
        .deflection_m
        .expect("touches");
    let path = &found.imperfect_column.as_ref().expect("a path").path.points;
    let bears = |point: &&coilstay::result::PathPoint| point.guide_force_n > 0.0;
    let first = path.iter().find(bears).expect("bears");
    let before = path
        .iter()
        .take_while(|point| !bears(point))
        .last()
        .expect("free at first");
    assert!(
        before.deflection_m <= touch && touch <= first.deflection_m,
        "{touch}"
    );
    assert!(
        limit(&found, LimitKind::Critical)
            .margin
            .is_none_or(|m| m > 0.0)
    );
    assert!(!limit(&found, LimitKind::Critical).for_information);
}

/// A guide that may be leaned on makes the critical deflection of the perfect column information; what
/// friction takes out of a stroke is counted two ways; a guide out of reach changes nothing.
#[test]
fn a_bore_that_may_be_leaned_on_carries_the_spring() {
    let text = shipped("rubber-buffer");
    let leaning = answer(&text);
    assert!(limit(&leaning, LimitKind::Critical).for_information);
    assert!(leaning.governing != Some(LimitKind::Critical));
    let guides = leaning.guide_answer.as_ref().expect("guided");
    assert!(guides.at_working.guide_force_n > 0.0 && !guides.leaning.is_empty());
    let stroke = leaning.stroke.as_ref().expect("friction");
    assert!(stroke.energy_lost_j > 0.0);
    approx::assert_relative_eq!(
        stroke.energy_lost_j,
        stroke.friction_work_j,
        max_relative = 1e-4
    );
    assert!(stroke.closes_within < 1e-9);
    let far = answer(&text.replace("diameter = \"85 mm\"", "diameter = \"600 mm\""));
    let guide = text.find("[[guide]]").expect("a guide");
    let next = guide + 2 + text[guide + 2..].find("\n[").expect("another table");
    let bare = answer(&format!("{}{}", &text[..guide], &text[next..]));
    for kind in [
        LimitKind::Bow,
        LimitKind::Stress,
        LimitKind::Clash,
        LimitKind::RateLost,
    ] {
        let (one, two) = (limit(&far, kind), limit(&bare, kind));
        match (one.deflection_m, two.deflection_m) {
            (Some(a), Some(b)) => {
                let error = one.error_m.unwrap_or(0.0) + two.error_m.unwrap_or(0.0);
                assert!((a - b).abs() <= error, "{kind:?} {a} {b}");
            }
            (a, b) => assert_eq!(a, b, "{kind:?}"),
        }
    }
}

/// What the discretisation lets the axis enter its guides, all along the path to solid.
#[test]
fn the_axis_stays_out_of_its_guides() {
    for (name, clearance) in [("rubber-buffer", 2.5e-3), ("brake-pilot-rod", 1e-3)] {
        let found = answer(&shipped(name));
        let deepest = found.guide_answer.expect("guided").deepest_m;
        assert!(deepest < 1e-4 * clearance, "{name}: {deepest:e}");
    }
}

/// A rod that rubs on the top seat's side is the same rod at the bottom of the spring turned over.
#[test]
fn a_guide_that_rubs_on_top_is_computed_turned_over() {
    let bottom = shipped("brake-pilot-rod");
    let top = bottom.replace("fixed_to = \"bottom\"", "fixed_to = \"top\"");
    assert_ne!(bottom, top);
    let (one, other) = (answer(&bottom), answer(&top));
    assert!(
        other
            .warnings
            .iter()
            .any(|warning| warning.contains("turned over"))
    );
    assert_eq!(one.verdict, other.verdict);
    for (a, b) in one.limits.iter().zip(&other.limits) {
        assert_eq!((a.name, a.deflection_m), (b.name, b.deflection_m));
    }
    let stroke = other.stroke.expect("friction");
    assert!(stroke.energy_lost_j > 0.0 && stroke.friction_work_j > 0.0);
    // Turned twice, a spring stands as it did.
    let setup = coilstay::case::parse("t.toml", &bottom)
        .expect("reads")
        .setup;
    assert_eq!(setup.clone().turned_over().turned_over(), setup);
}

/// A flat end slides where its thrust reaches friction times the force on its seat, counted from where
/// the ends sit flush; with a hair more friction than the path ever asks for it never does.
#[test]
fn a_flat_end_slides_where_thrust_reaches_friction() {
    let with = |friction: f64| {
        let text =
            shipped("flat-seats").replace("friction = 0.25", &format!("friction = {friction}"));
        answer(&text)
    };
    let found = with(0.25);
    let path = &found.imperfect_column.as_ref().expect("a path").path.points;
    let flush = |p: &&coilstay::result::PathPoint| {
        p.bottom_lift_rad == 0.0 && p.top_lift_rad == 0.0 && p.force_n > 0.0
    };
    let ratio = |p: &coilstay::result::PathPoint| {
        p.bottom_thrust_n.abs().max(p.top_thrust_n.abs()) / p.force_n
    };
    let largest = path.iter().filter(flush).map(ratio).fold(0.0, f64::max);
    assert!(
        limit(&with(1.2 * largest), LimitKind::Slide)
            .deflection_m
            .is_none()
    );
    let friction = 0.8 * largest;
    let sliding = with(friction);
    let at = limit(&sliding, LimitKind::Slide)
        .deflection_m
        .expect("slides");
    let points = &sliding
        .imperfect_column
        .as_ref()
        .expect("a path")
        .path
        .points;
    let first = points
        .iter()
        .find(|p| flush(p) && ratio(p) > friction * (1.0 + 1e-3));
    assert!(at <= first.expect("above").deflection_m, "{at}");
    let marks = &sliding
        .imperfect_column
        .as_ref()
        .expect("a path")
        .path
        .marks;
    let slide = marks
        .iter()
        .find(|mark| mark.name == "slide")
        .expect("marked")
        .point;
    assert!(
        ratio(&slide) > friction * (1.0 - 1e-3),
        "{} {friction}",
        ratio(&slide)
    );
}
