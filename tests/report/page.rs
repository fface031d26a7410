//! The verdict as text.

use super::fixture::{Shape, assessment, in_every_support};
use coilstay::report::{self, Units};
use coilstay::result::{
    Assessment, Failure, LimitKind, Mistake, Outcome, Refusal, Verdict, wire_materials,
};
use unicode_width::UnicodeWidthStr;

fn plain(text: &str) -> String {
    anstream::adapter::strip_str(text).to_string()
}

fn page(assessment: &Assessment, units: Units) -> String {
    let outcome = Outcome::Assessed(Box::new(assessment.clone()));
    plain(&report::text(&outcome, units))
}

/// The page as one line, for words that may be anywhere in it.
fn spoken(page: &str) -> String {
    page.split_whitespace().collect::<Vec<_>>().join(" ")
}

fn assert_fits(page: &str) {
    for line in page.lines() {
        assert!(line.width() <= 100, "{} columns: {line}", line.width());
        assert!(!line.chars().any(char::is_control), "{line:?}");
    }
}

#[test]
fn set_deflection() {
    insta::assert_snapshot!(page(&assessment(Shape::Rising), Units::Metric));
}

#[test]
fn every_support_and_guide() {
    let all = in_every_support();
    for units in [Units::Metric, Units::Inch] {
        assert_fits(&page(&all, units));
    }
    insta::assert_snapshot!(page(&all, Units::Metric));
}

#[test]
fn dead_load_in_inches() {
    insta::assert_snapshot!(page(&assessment(Shape::Falling), Units::Inch));
}

#[test]
fn sections_stand_in_their_order() {
    let page = page(&assessment(Shape::Falling), Units::Metric);
    let headings = [
        "Track brake of the funicular",
        "cases/track-brake.toml",
        "Question",
        "Answer",
        "Warnings",
        "Formula and column",
        "Formula against straight column",
        "Effective end constant",
        "Limits, in order",
        "Under a dead load",
        "Absolute stability",
        "Stress at solid",
        "Inputs as resolved",
        "Caution",
    ];
    let mut from = 0;
    for heading in headings {
        let at = page[from..].find(heading);
        from += at.unwrap_or_else(|| panic!("{heading} is missing or out of order"));
    }
}

#[test]
fn the_governing_limit_is_marked_by_sign_and_word() {
    let page = page(&assessment(Shape::Rising), Units::Metric);
    let marked: Vec<&str> = page.lines().filter(|line| line.starts_with("> ")).collect();
    assert_eq!(marked.len(), 1);
    assert!(marked[0].contains("axial rate lost") && marked[0].ends_with("governs"));
}

#[test]
fn the_state_at_work_stands_in_the_answer() {
    let mut case = assessment(Shape::Rising);
    let answer = |case: &Assessment| {
        let page = page(case, Units::Metric);
        let from = page.find("Answer").unwrap();
        spoken(&page[from..page.find("Warnings").unwrap()])
    };
    assert!(answer(&case).contains(
        "At the working deflection, tolerance included: bow 1.750 mm of 2.8 mm allowed (error \
         estimate 6e-8 mm), wire 612.0 MPa."
    ));
    case.imperfect_column.as_mut().unwrap().bow_at_working_m = None;
    assert!(answer(&case).contains(
        "The path of the imperfect column does not get to the working deflection, tolerance included."
    ));
}

#[test]
fn a_dead_load_is_judged_by_force() {
    let page = spoken(&page(&assessment(Shape::Falling), Units::Metric));
    for words in [
        // 326 N at 40 mm: 330.1 N with the tolerance of 0.5 mm, 354.5 N with 3 mm more.
        "margins are taken against 330.1 N",
        "overtravel 3 mm (to 354.5 N)",
        "with a margin of force of 15 %",
        "reached under 273.1 N (at 33.54 mm, 21.0 % of the free length): margin of force -17.19 %",
        "The overtravel, counted as load, ends at 354.5 N, 81.41 N beyond it.",
        "At the working load, tolerance included: bow",
        "Margins of a dead load are ratios of forces",
    ] {
        assert!(page.contains(words), "{words}\n{page}");
    }
}

#[test]
fn rows_past_the_clash_and_in_the_jump_are_marked() {
    let mut case = assessment(Shape::Rising);
    let row = |case: &Assessment, name: &str| {
        let page = page(case, Units::Metric);
        let found = page
            .lines()
            .find(|line| line.trim_start().starts_with(name));
        found.unwrap().to_string()
    };
    let mut set = |name: LimitKind, deflection: f64| {
        let limit = case.limits.iter_mut().find(|l| l.name == name).unwrap();
        limit.deflection_m = Some(deflection);
        case.clone()
    };
    let past = set(LimitKind::Bow, 0.0531);
    assert!(row(&past, "bow limit").ends_with("past clash"));
    for untouched in ["axial rate lost", "first coils clash", "solid "] {
        assert!(!row(&past, untouched).contains("past clash"));
    }
    let late = set(LimitKind::Critical, 0.09);
    assert!(!row(&late, "critical").contains("past clash"));

    let mut jump = assessment(Shape::Falling);
    let of = |case: &Assessment, name: LimitKind| {
        case.limits.iter().find(|l| l.name == name).unwrap().clone()
    };
    let lost = of(&jump, LimitKind::DeadLoadLost);
    for limit in &mut jump.limits {
        if limit.name == LimitKind::Bow {
            limit.deflection_m = lost.deflection_m;
        }
    }
    assert!(row(&jump, "bow limit").ends_with("in the jump"));
    assert!(!row(&jump, "dead load lost").ends_with("in the jump"));
    assert!(page(&jump, Units::Metric).contains("in the jump: reached on the way"));
}

#[test]
fn what_is_unusual_is_said_once() {
    let mut case = assessment(Shape::Rising);
    let usual = page(&case, Units::Metric);
    assert!(usual.contains("\nInputs as resolved\n"));
    assert!(!usual.contains("soft seats"));
    case.spring.service_temperature_degc = -10.0;
    case.supports.top.axial_stiffness_n_per_m = Some(5e5);
    case.title = case.file.clone();
    let page = page(&case, Units::Metric);
    assert!(page.contains("Inputs as resolved, at the service temperature of -10 degC\n"));
    assert!(spoken(&page).contains("soft seats included; shares are of the spring alone"));
    assert_eq!(page.matches("cases/track-brake.toml").count(), 1);
}

#[test]
fn never_and_none_before_solid_are_said_in_words() {
    let mut odd = assessment(Shape::Rising);
    odd.closed_form.curves[0].critical = None;
    odd.closed_form.curves[0].critical_deflection_m = None;
    odd.closed_form.curves[1].beyond_solid = true;
    odd.straight_column.critical = None;
    odd.comparisons[0].relative_difference = None;
    odd.limits
        .iter_mut()
        .filter(|limit| limit.name == LimitKind::Clash)
        .for_each(|limit| limit.deflection_m = None);
    let page = page(&odd, Units::Metric);
    let line = |start: &str| {
        let found = page
            .lines()
            .find(|line| line.trim_start().starts_with(start));
        found.unwrap_or_else(|| panic!("{start}")).to_string()
    };
    assert!(line("formula, end constant 0.7 ").ends_with("never"));
    assert!(
        line("formula, end constant 0.707 ").ends_with("none before solid (would be at 47.30 mm)")
    );
    assert!(line("straight column ").ends_with("never"));
    assert!(line("first coils clash ").ends_with("none before solid"));
    assert!(
        spoken(&page)
            .contains("promises that the spring never buckles; the straight column does at 48.20")
    );
}

#[test]
fn what_failed_is_not_called_never() {
    let mut failed = assessment(Shape::Rising);
    failed.verdict = Verdict::Undecided;
    failed.undecided_reason = Some("an invented reason".into());
    failed.straight_column.critical = None;
    failed.imperfect_column = None;
    failed.failures.push(Failure {
        what: "path of the imperfect column".into(),
        cause: "no convergence at steps of 1e-9 of the free length".into(),
        last_good_deflection_m: Some(0.0312),
    });
    let page = page(&failed, Units::Metric);
    assert!(page.contains("COULD NOT BE DECIDED."));
    assert!(spoken(&page).contains("Last good point at 31.20 mm."));
    assert!(page.contains("not computed"));
    assert!(!page.contains("never"), "{page}");
}

/// Whatever the numbers and names, the page keeps its width, and a name cannot steer the terminal.
#[test]
fn extremes_fit_the_page() {
    for scale in [1e-9, 1.0, 1e6, 1e12, f64::INFINITY, f64::NAN] {
        let mut odd = assessment(Shape::Falling);
        odd.title = format!("{} \u{1b}[31m ä", "long ".repeat(50));
        odd.file = "x".repeat(300);
        for limit in &mut odd.limits {
            limit.deflection_m = limit.deflection_m.map(|x| x * scale);
            limit.force_n = limit.force_n.map(|x| x * scale);
            limit.margin = limit.margin.map(|x| x * scale);
        }
        odd.spring.free_length_m *= scale;
        odd.closed_form.curves[0].source = "word ".repeat(100);
        for units in [Units::Metric, Units::Inch] {
            assert_fits(&page(&odd, units));
        }
    }
}

#[test]
fn several_cases_end_in_a_summary() {
    let refusal = Refusal::new(
        format!("cases/{}.toml", "long-".repeat(30)),
        vec![Mistake {
            line: 1,
            column: 1,
            message: "nothing there".into(),
            cure: "write something".into(),
        }],
    );
    let outcomes = [
        Outcome::Assessed(Box::new(assessment(Shape::Straight))),
        Outcome::Assessed(Box::new(assessment(Shape::Rising))),
        Outcome::Refused(refusal),
    ];
    let summary = plain(&report::summary(&outcomes, Units::Metric));
    assert_fits(&summary);
    assert!(summary.contains("  cases/l...") && summary.contains("-long-.toml "));
    insta::assert_snapshot!(summary);
    assert_fits(&plain(&report::text(&outcomes[2], Units::Metric)));
}

#[test]
fn materials_fit_the_page() {
    for units in [Units::Metric, Units::Inch] {
        assert_fits(&plain(&report::materials_text(&wire_materials(), units)));
    }
}

/// The words of a section, from its heading to the next empty line, on one line.
fn words_of(page: &str, heading: &str) -> String {
    let from = page.find(&format!("\n{heading}")).unwrap() + 1;
    let end = page[from..].find("\n\n").map_or(page.len(), |to| from + to);
    spoken(&page[from..end])
}

#[test]
fn what_guides_bear_is_said() {
    let mut case = in_every_support();
    let guides = |case: &Assessment| words_of(&page(case, Units::Metric), "Guides");
    let all = guides(&case);
    for words in [
        "An invented help.",
        "at 0.31 of the deformable length (47.12 mm from its bottom).",
        "It leans at another place too (the next mode) from ",
        "Friction on the guides takes ",
        "corner at a guide's end 49.80 50.00 - 0.900",
    ] {
        assert!(all.contains(words), "{words}\n{all}");
    }
    let answer = case.guide_answer.as_mut().unwrap();
    answer.at_working.guide_coil_force_n = answer.at_working.guide_force_n;
    answer.at_working.guide_friction_n = -0.5;
    answer.first_touch_m = Some(0.0);
    answer.largest_coil_force_n = 2.0 * answer.at_working.guide_force_n;
    let one = guides(&case);
    for words in [
        "It touches before it is deflected.",
        "all of it on one coil",
        "on one coil on the way there",
        "takes 0.5000 N: the bottom gets more axial force",
    ] {
        assert!(one.contains(words), "{words}\n{one}");
    }
    let answer = case.guide_answer.as_mut().unwrap();
    answer.at_working.guide_force_n = 0.0;
    answer.leaning.clear();
    let free = guides(&case);
    assert!(free.contains("It leans on no guide at the largest working deflection"));
    assert!(!free.contains("Where it leans"));
    let answer = case.guide_answer.as_mut().unwrap();
    answer.first_touch_m = None;
    answer.at_working.guide_room_m = Some(0.0004);
    assert!(guides(&case).contains("Room left at the largest working deflection"));
}

#[test]
fn what_friction_takes_is_said() {
    let mut case = in_every_support();
    let said = |case: &Assessment| words_of(&page(case, Units::Metric), "Stroke with friction");
    let lossy = said(&case);
    assert!(
        lossy.contains("0.2850 J less than it takes") && lossy.contains("the same to 0.035 %"),
        "{lossy}"
    );
    let stroke = case.stroke.as_mut().unwrap();
    // What is left of nothing after rounding.
    (stroke.energy_lost_j, stroke.friction_work_j) = (-9e-12, 0.0);
    stroke.closes_within = 1e-16;
    let stuck = said(&case);
    assert!(
        stuck.contains("nothing slips and no energy is lost. The loop closes but for round-off."),
        "{stuck}"
    );
}

/// Filling a bore is of the geometry: it is neither of the imperfect column nor past its clash.
#[test]
fn a_filled_bore_is_of_the_geometry() {
    let mut case = in_every_support();
    let text = page(&case, Units::Metric);
    assert!(spoken(&text).contains("Solid, and coil fills the bore: of the spring's geometry."));
    let row = |text: &str| {
        let found = text
            .lines()
            .find(|line| line.trim_start().starts_with("coil fills the bore "));
        found.unwrap().to_string()
    };
    assert!(!row(&text).contains("past clash"));
    for limit in &mut case.limits {
        if limit.name == LimitKind::BoreFilled {
            limit.deflection_m = None;
        }
    }
    case.imperfect_column = None;
    assert!(row(&page(&case, Units::Metric)).ends_with("none before solid"));
}
