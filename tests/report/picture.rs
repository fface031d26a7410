//! The picture of a load path.

use super::fixture::{Shape, assessment, in_every_support};
use coilstay::report::{self, Units};
use coilstay::result::{Assessment, Path};

fn picture(assessment: &Assessment, path: &Path) -> String {
    report::plot(assessment, path, Units::Metric).unwrap()
}

fn drawn(shape: Shape) -> String {
    let assessment = assessment(shape);
    let path = &assessment.imperfect_column.as_ref().unwrap().path;
    picture(&assessment, path)
}

/// Numbers of an attribute, wherever it stands.
fn numbers(svg: &str, attribute: &str) -> Vec<f64> {
    svg.split(&format!(" {attribute}=\""))
        .skip(1)
        .filter_map(|rest| rest.split('"').next())
        .flat_map(|value| value.split([' ', ',']).map(|n| n.parse::<f64>().unwrap()))
        .collect()
}

/// Every element is closed, every number is one, nothing lies outside the sheet.
fn assert_sound(svg: &str) {
    assert!(svg.starts_with("<svg ") && svg.ends_with("</svg>\n"));
    assert_eq!(svg.matches('<').count(), svg.matches('>').count());
    let opened = svg.matches('<').count() - svg.matches("</").count() - svg.matches("/>").count();
    assert_eq!(opened, svg.matches("</").count());
    let size = [numbers(svg, "width")[0], numbers(svg, "height")[0]];
    for attribute in ["x", "cx"] {
        for x in numbers(svg, attribute) {
            assert!((0.0..=size[0]).contains(&x), "{attribute} {x}");
        }
    }
    for attribute in ["y", "cy"] {
        for y in numbers(svg, attribute) {
            assert!((0.0..=size[1]).contains(&y), "{attribute} {y}");
        }
    }
    for point in numbers(svg, "points").chunks(2) {
        assert!((0.0..=size[0]).contains(&point[0]), "{point:?}");
        assert!((0.0..=size[1]).contains(&point[1]), "{point:?}");
    }
}

fn texts(svg: &str) -> Vec<&str> {
    svg.split("<text ")
        .skip(1)
        .filter_map(|rest| rest.split_once('>')?.1.split("</text>").next())
        .collect()
}

#[test]
fn pictures_are_sound() {
    for shape in [Shape::Rising, Shape::Falling, Shape::Short, Shape::Straight] {
        assert_sound(&drawn(shape));
    }
}

#[test]
fn marks_are_numbered_named_and_the_governing_one_said() {
    let svg = drawn(Shape::Falling);
    let texts = texts(&svg);
    for name in [
        "installed",
        "working point",
        "axial rate lost, governs",
        "bow limit",
        "dead load lost",
        "critical, perfect column as built",
        "critical, straight column",
        "formula, end constant 0.7",
        "formula, end constant 0.707",
        "first coils clash",
        "solid (force of the straight spring) (off the picture)",
        "past the first clash of coils: the column model is a guide only",
        "axial deflection, mm",
        "axial force, N",
        "bow, mm",
    ] {
        assert!(texts.contains(&name), "{name} is missing");
    }
    assert!(
        !texts.contains(&"largest force"),
        "the same as the dead load lost"
    );
    // Above the panels and in the key.
    for number in 1..=10 {
        let number = number.to_string();
        let count = texts.iter().filter(|text| **text == number).count();
        assert!(count >= 2, "{number}");
    }
}

/// The column is a guide only past the first clash: broken there, and named in the key; a path
/// without a clash is drawn in one.
#[test]
fn the_path_past_the_clash_is_broken() {
    let said = |svg: &str| {
        texts(svg)
            .iter()
            .any(|text| text.starts_with("past the first clash"))
    };
    assert!(said(&drawn(Shape::Rising)) && !said(&drawn(Shape::Straight)));
    let assessment = assessment(Shape::Rising);
    let whole = &assessment.imperfect_column.as_ref().unwrap().path;
    let mut unclashed = whole.clone();
    unclashed.marks.retain(|mark| mark.name != "clash");
    let svg = picture(&assessment, &unclashed);
    let strokes = |svg: &str| svg.matches("<polyline").count();
    assert!(strokes(&svg) < strokes(&drawn(Shape::Rising)));
}

#[test]
fn a_new_rest_after_a_jump_is_named() {
    let mut assessment = assessment(Shape::Falling);
    let path = &mut assessment.imperfect_column.as_mut().unwrap().path;
    let mut rest = path.marks[0].clone();
    rest.name = "force_regained".into();
    rest.point.deflection_m = 0.058;
    path.marks.push(rest);
    let path = path.clone();
    let svg = picture(&assessment, &path);
    assert!(texts(&svg).contains(&"rests again, same force"));
}

#[test]
fn numbers_above_the_panels_do_not_overlap() {
    let svg = drawn(Shape::Falling);
    let centres = numbers(&svg, "cx");
    let heights = numbers(&svg, "cy");
    let mut row: Vec<f64> = centres
        .iter()
        .zip(&heights)
        .filter(|(_, y)| **y == 72.0)
        .map(|(x, _)| *x)
        .collect();
    row.dedup();
    assert_eq!(row.len(), 10);
    assert!(
        row.windows(2).all(|pair| pair[1] - pair[0] > 20.5),
        "{row:?}"
    );
}

#[test]
fn odd_paths_are_drawn_or_left_blank() {
    let assessment = assessment(Shape::Rising);
    let whole = &assessment.imperfect_column.as_ref().unwrap().path;
    let empty = Path {
        points: vec![],
        marks: vec![],
        branch: String::new(),
    };
    let single = Path {
        points: whole.points[3..4].to_vec(),
        ..empty.clone()
    };
    let mut broken = whole.clone();
    broken.points[10].force_n = f64::NAN;
    broken.points[20].bow_m = f64::INFINITY;
    broken.points[30].deflection_m = -0.01;
    broken.points[40].force_n = -250.0;
    broken.marks[0].point.deflection_m = f64::NAN;
    broken.marks[1].point.bow_m = f64::NAN;
    for path in [&empty, &single, &broken] {
        assert_sound(&picture(&assessment, path));
    }
    let mut odd = assessment.clone();
    odd.title = "<b> & \"quotes\" \u{1b}".repeat(20);
    odd.duty.bow_limit_m = 0.0;
    odd.closed_form.curves.clear();
    odd.limits.clear();
    for path in [&empty, &single, &broken] {
        assert_sound(&picture(&odd, path));
    }
}

#[test]
fn guides_and_strokes_have_panels_of_their_own() {
    let guided = in_every_support();
    let path = &guided.imperfect_column.as_ref().unwrap().path;
    for (units, names) in [
        (
            Units::Metric,
            [
                "guide force, N",
                "force on guides, N/mm",
                "along the part that deforms, from its bottom, unloaded, mm",
                "axial force, N",
                "out - back, N",
                "4.800 N",
                "corner 0.9000 N",
                "1.700 N",
                "Stroke with friction: 0.2850 J lost in each",
            ],
        ),
        (
            Units::Inch,
            [
                "guide force, lbf",
                "force on guides, lbf/in",
                "along the part that deforms, from its bottom, unloaded, in",
                "axial force, lbf",
                "out - back, lbf",
                "1.079 lbf",
                "corner 0.2023 lbf",
                "0.3822 lbf",
                "Stroke with friction: 2.522 lbf in lost in each",
            ],
        ),
    ] {
        let svg = report::plot(&guided, path, units).unwrap();
        assert_sound(&svg);
        let texts = texts(&svg);
        for name in names {
            assert!(texts.contains(&name), "{name} is missing in {texts:?}");
        }
        for name in [
            "first touch of a guide",
            "more than one coil leans",
            "leans at another place",
            "flat stretch could leave the guide",
            "flat ends sit flush",
            "end lifts off its seat",
            "end slides on its seat",
            "touches a guide",
            "coil fills the bore (straight spring) (off the picture)",
            "force on the guides, added up",
        ] {
            assert!(texts.contains(&name), "{name} is missing");
        }
    }
    let unguided = drawn(Shape::Rising);
    assert!(!unguided.contains("guide force") && !unguided.contains("Stroke with friction"));
    let mut sticking = guided.clone();
    let stroke = sticking.stroke.as_mut().unwrap();
    (stroke.energy_lost_j, stroke.friction_work_j) = (-9e-12, 0.0);
    assert!(!picture(&sticking, path).contains("Stroke with friction"));
}

/// Where a guide may not be touched, its first touch is that limit and is marked once.
#[test]
fn a_touch_that_is_a_limit_is_marked_once() {
    let mut guided = in_every_support();
    let path = &mut guided.imperfect_column.as_mut().unwrap().path;
    let at = |path: &Path, name: &str| path.marks.iter().position(|m| m.name == name).unwrap();
    let (limit, touch) = (at(path, "guide_touch"), at(path, "first_touch"));
    path.marks[limit].point = path.marks[touch].point;
    let path = path.clone();
    let svg = picture(&guided, &path);
    let texts = texts(&svg);
    assert!(texts.contains(&"touches a guide") && !texts.contains(&"first touch of a guide"));
}

#[test]
fn odd_guides_and_strokes_are_drawn_or_left_blank() {
    let mut odd = in_every_support();
    let path = odd.imperfect_column.as_ref().unwrap().path.clone();
    let answer = odd.guide_answer.as_mut().unwrap();
    answer.leaning[1].force_n_per_m = f64::NAN;
    answer
        .leaning
        .retain(|stretch| stretch.at_corner || stretch.side > 0.0);
    let stroke = odd.stroke.as_mut().unwrap();
    stroke.out[3].force_n = f64::INFINITY;
    stroke.back.truncate(2);
    assert_sound(&picture(&odd, &path));
    odd.guide_answer
        .as_mut()
        .unwrap()
        .leaning
        .retain(|stretch| stretch.at_corner);
    odd.stroke.as_mut().unwrap().back.clear();
    let svg = picture(&odd, &path);
    assert_sound(&svg);
    assert!(texts(&svg).contains(&"corner 0.9000 N") && !svg.contains("out - back"));
    odd.guide_answer.as_mut().unwrap().leaning.clear();
    odd.spring.deformable_length_m = f64::NAN;
    assert!(!picture(&odd, &path).contains("Leaning on the guides"));
}
