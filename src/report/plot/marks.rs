//! What is marked in the picture of a load path: its named points, the limits of the perfect
//! column, and what the formula says.

use crate::report::names::mark_title;
use crate::report::numbers::shortest;
use crate::result::{Assessment, LimitKind, Path};

/// Shape of a marker; each kind of point has its own, so that print without colour keeps them apart.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shape {
    /// Working point.
    FilledCircle,
    /// Installed.
    OpenCircle,
    /// Critical.
    TriangleUp,
    /// Largest force.
    TriangleDown,
    /// Largest travel.
    TriangleLeft,
    /// At rest again after a jump.
    TriangleRight,
    /// Bow limit.
    Diamond,
    /// Rate lost.
    Square,
    /// Stress.
    Pentagon,
    /// Clash.
    Star,
    /// Solid.
    Bar,
    /// Branch point.
    Ring,
    /// Formula.
    Cross,
    /// Straight column.
    Plus,
    /// Lift-off from a seat.
    Wedge,
    /// Sliding on a seat.
    Parallelogram,
    /// Touch of a guide that may not be touched.
    HalfDisc,
    /// The bore is filled.
    DottedSquare,
    /// Flat ends sit flush.
    Tee,
    /// First touch of a guide.
    Touch,
    /// More than one coil leans.
    TwoLines,
    /// Leans at another place.
    TwoCircles,
    /// What lies flat could leave the guide.
    Wave,
}

/// A point to be marked.
#[derive(Clone, Debug, PartialEq)]
pub struct Marked {
    /// Key of what happens there, where it is a limit's or a path's mark.
    pub key: String,
    /// Name in the key.
    pub title: String,
    /// Its shape.
    pub shape: Shape,
    /// Deflection, m.
    pub deflection: f64,
    /// Force, N.
    pub force: f64,
    /// Bow, m.
    pub bow: f64,
    /// Force on the guides, N; not a number off the path.
    pub leaning: f64,
    /// Whether it is the governing limit.
    pub governs: bool,
}

/// Everything to be marked, by deflection.
pub fn marked(assessment: &Assessment, path: &Path) -> Vec<Marked> {
    let mut marks: Vec<Marked> = Vec::new();
    let governing = assessment.governing.map(LimitKind::key);
    for mark in &path.marks {
        let repeated = match mark.name.as_str() {
            "largest_force" => has(path, LimitKind::DeadLoadLost.key()),
            "largest_travel" => has(path, LimitKind::TravelLost.key()),
            "first_touch" => same_place(path, "first_touch", LimitKind::GuideTouch.key()),
            _ => false,
        };
        if repeated || is_beyond_solid(assessment, &mark.name) {
            continue;
        }
        marks.push(Marked {
            key: mark.name.clone(),
            title: mark_title(&mark.name),
            shape: shape(&mark.name),
            deflection: mark.point.deflection_m,
            force: mark.point.force_n,
            bow: mark.point.bow_m,
            leaning: mark.point.guide_force_n,
            governs: governing == Some(mark.name.as_str()),
        });
    }
    let off_path = assessment
        .limits
        .iter()
        .filter(|limit| !limit.beyond_solid && !has(path, limit.name.key()));
    for limit in off_path {
        if let (Some(deflection), Some(force)) = (limit.deflection_m, limit.force_n) {
            marks.push(Marked {
                key: limit.name.key().to_string(),
                title: off_path_title(limit.name),
                shape: shape(limit.name.key()),
                deflection,
                force,
                bow: 0.0,
                leaning: f64::NAN,
                governs: limit.governs,
            });
        }
    }
    let perfect = |title: String, shape, measure: &crate::result::Measure| Marked {
        key: String::new(),
        title,
        shape,
        deflection: measure.deflection_m,
        force: measure.force_n,
        bow: 0.0,
        leaning: f64::NAN,
        governs: false,
    };
    for curve in &assessment.closed_form.curves {
        if let (Some(critical), false) = (&curve.critical, curve.beyond_solid) {
            let title = format!("formula, end constant {}", shortest(curve.end_constant));
            marks.push(perfect(title, Shape::Cross, critical));
        }
    }
    let straight = &assessment.straight_column;
    if let (Some(critical), false) = (&straight.critical, straight.beyond_solid) {
        let title = "critical, straight column".to_string();
        marks.push(perfect(title, Shape::Plus, &critical.measure));
    }
    marks.retain(|mark| mark.deflection.is_finite() && mark.force.is_finite());
    marks.sort_by(|a, b| a.deflection.total_cmp(&b.deflection));
    marks
}

fn is_beyond_solid(assessment: &Assessment, key: &str) -> bool {
    assessment
        .limits
        .iter()
        .any(|limit| limit.beyond_solid && limit.name.key() == key)
}

/// Name of a limit that is not on the path.
fn off_path_title(limit: LimitKind) -> String {
    match limit {
        LimitKind::Solid => "solid (force of the straight spring)".to_string(),
        LimitKind::BoreFilled => "coil fills the bore (straight spring)".to_string(),
        other => other.title().to_string(),
    }
}

fn has(path: &Path, name: &str) -> bool {
    path.marks.iter().any(|mark| mark.name == name)
}

/// Whether two marks of a path are one point.
fn same_place(path: &Path, one: &str, other: &str) -> bool {
    let at = |name: &str| {
        let mark = path.marks.iter().find(|mark| mark.name == name)?;
        Some((mark.point.deflection_m, mark.point.force_n))
    };
    at(one).is_some() && at(one) == at(other)
}

fn shape(key: &str) -> Shape {
    match key {
        "installed" => Shape::OpenCircle,
        "working" => Shape::FilledCircle,
        "critical" => Shape::TriangleUp,
        "dead_load_lost" | "largest_force" => Shape::TriangleDown,
        "travel_lost" | "largest_travel" => Shape::TriangleLeft,
        "force_regained" | "travel_regained" => Shape::TriangleRight,
        "bow" => Shape::Diamond,
        "rate_lost" => Shape::Square,
        "stress" => Shape::Pentagon,
        "clash" => Shape::Star,
        "solid" => Shape::Bar,
        "lift_off" => Shape::Wedge,
        "slide" => Shape::Parallelogram,
        "guide_touch" => Shape::HalfDisc,
        "bore_filled" => Shape::DottedSquare,
        "seated" => Shape::Tee,
        "first_touch" => Shape::Touch,
        "line_contact" => Shape::TwoLines,
        "second_place" => Shape::TwoCircles,
        "loose_flat" => Shape::Wave,
        _ => Shape::Ring,
    }
}
