//! The column's element on exact beams that are not springs: large rotations, limit points,
//! natural curvature.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod reference;

use approx::assert_relative_eq;
use coilstay::column::{Column, EndLaws, Hold, NaturalShape, NodeLoad, StraightScan};
use coilstay::solve::{
    Newton, Outcome, PathPoint, PathSettings, branch_point, crosses_another, follow, locate, start,
};
use coilstay::spring::Section;
use reference::after_buckling;
use reference::elastica;
use reference::shooting::{Parameter, Problem, Rod, Seat};
use std::f64::consts::PI;

const HINGED: EndLaws = EndLaws([Hold::Held(0.0), Hold::Held(0.0), Hold::Free]);
const HINGED_TOP: EndLaws = EndLaws([Hold::Free, Hold::Held(0.0), Hold::Free]);

/// Only bends.
const ELASTICA: Section = Section {
    axial: f64::INFINITY,
    shear: f64::INFINITY,
    bending: 1.0,
};

fn rod(section: Section, elements: usize) -> Column {
    Column::new(1.0, elements, &|_| section, &NaturalShape::straight())
}

/// Follows the straight path of `column` to its first branch point and the branch from there, to
/// the left, until `stop`. Returns the points of the branch, the branch point first.
fn branch(
    column: &mut Column,
    newton: &mut Newton<3, 5>,
    stop: impl Fn(&PathPoint<3, 5>) -> bool,
) -> Vec<PathPoint<3, 5>> {
    let settings = PathSettings::default();
    let guess = column.first_guess();
    let mut points = vec![start(column, newton, &guess, 0.0).expect("unloaded")];
    let (outcome, _) = follow(column, newton, &mut points, &settings, |points| {
        let n = points.len();
        n > 1 && crosses_another(&points[n - 2], &points[n - 1])
    });
    assert_eq!(outcome, Outcome::Stopped);
    let after = points.len() - 2;
    let found = branch_point(column, newton, &points, after, 1e-12).expect("crosses");
    let to_left = found.mode.nodes.iter().map(|n| n[1]).sum::<f64>().signum();
    let mut points = vec![found.turned(to_left)];
    let (outcome, _) = follow(column, newton, &mut points, &settings, |points| {
        stop(&points[points.len() - 1])
    });
    assert_eq!(outcome, Outcome::Stopped);
    points
}

/// Elastica cantilever, P/P_cr by tip angle: Timoshenko & Gere, post-buckling table [M]; complete
/// elliptic integrals for the load and the place of the tip [C].
#[test]
fn elastica_meets_its_table() {
    let elements = 48;
    let mut column = rod(ELASTICA, elements);
    let mut newton = Newton::new(&column);
    let tip = |point: &PathPoint<3, 5>| point.state.nodes[elements];
    let points = branch(&mut column, &mut newton, |point| tip(point)[2].abs() > 3.1);
    assert_relative_eq!(points[0].load, PI * PI / 4.0, max_relative = 1e-10);
    for (degrees, printed) in [
        (20.0, 1.015),
        (40.0, 1.063),
        (60.0, 1.152),
        (80.0, 1.293),
        (100.0, 1.518),
        (120.0, 1.884),
        (140.0, 2.541),
        (160.0, 4.029),
        (176.0, 9.116),
    ] {
        let angle = f64::to_radians(degrees);
        let exact = elastica::cantilever(angle);
        let missing = |point: &PathPoint<3, 5>| angle - tip(point)[2].abs();
        let after = points
            .windows(2)
            .position(|pair| missing(&pair[0]) > 0.0 && missing(&pair[1]) <= 0.0)
            .expect("turns so far");
        let found =
            locate(&mut column, &mut newton, &points, after, 1e-14, missing).expect("changes sign");
        assert!(found.converged);
        let (load, tip) = (found.point.load / (PI * PI / 4.0), tip(&found.point));
        // The printed table is cut or rounded by up to one and a half units of its last place.
        assert!((load - printed).abs() < 1.5e-3, "{degrees}: {load}");
        assert_relative_eq!(load, exact.load_ratio, max_relative = 1e-9);
        assert_relative_eq!(tip[0], exact.tip_x, epsilon = 1e-9);
        assert_relative_eq!(tip[1].abs(), exact.tip_y, epsilon = 1e-9);
        assert_eq!(found.point.negatives, 0);
    }
}

/// Cantilever with a dead load across its tip, P L²/EI = 1, 2, 5, 10: w/L, u/L by Mattiasson, Int.
/// J. Numer. Meth. Engng 17 (1981) 145–153 [S], five digits; more by shooting.
#[test]
fn bent_cantilever_meets_its_table() {
    let elements = 16;
    let mut column = rod(ELASTICA, elements).loaded(&[NodeLoad {
        node: elements,
        load: [0.0, 1.0, 0.0],
    }]);
    let mut newton = Newton::new(&column);
    let mut state = column.first_guess();
    let mut shot = Problem {
        rod: Rod::straight(f64::INFINITY, f64::INFINITY, 1.0, 1.0),
        bottom: Seat::CLAMPED,
        top: Seat::FREE,
    };
    let mut reference = shot.unloaded().expect("straight");
    for (load, aside, down) in [
        (1.0, 0.301_72, 0.056_43),
        (2.0, 0.493_46, 0.160_64),
        (5.0, 0.713_79, 0.387_63),
        (10.0, 0.810_61, 0.555_00),
    ] {
        newton
            .solve_at_load(&mut column, &mut state, load)
            .expect("solves");
        let tip = state.nodes[elements];
        assert!((tip[1] - aside).abs() < 6e-6, "{load}: {}", tip[1]);
        assert!((1.0 - tip[0] - down).abs() < 6e-6, "{load}: {}", tip[0]);
        shot.top.force = load;
        reference = shot
            .solve(Parameter::Load, 0.0, &reference)
            .expect("solves");
        assert_relative_eq!(tip[0], reference.top.x, epsilon = 1e-10);
        assert_relative_eq!(tip[1], reference.top.y, epsilon = 1e-10);
        assert_relative_eq!(tip[2], reference.top.theta, epsilon = 1e-10);
    }
}

/// Hinged column that may shorten and not shear, e = EA L²/EI: it buckles at
/// (e/2)(1 − √(1 − 4π²/e)), or never for e < 4π² (Magnusson, Ristinmaa, Ljung, Int. J. Solids
/// Struct. 38 (2001)). The branch meets shooting, and falls from the start where its slope says.
#[test]
fn the_column_that_may_shorten_meets_its_load() {
    let hinged = |axial: f64| {
        let section = Section { axial, ..ELASTICA };
        rod(section, 16).held(HINGED, HINGED_TOP)
    };
    let never = 4.0 * PI * PI;
    for axial in [30.0, 39.0, 0.999_99 * never] {
        assert!(StraightScan::new(&mut hinged(axial)).buckling().is_none());
    }
    for axial in [1.000_01 * never, 45.0, 50.0, 60.0, 100.0, 1e3, 1e6, 1e9] {
        let exact = elastica::shortening_column_load(axial).expect("buckles");
        let mut column = hinged(axial);
        let found = StraightScan::new(&mut column).buckling().expect("buckles");
        // Near the double root the load is as sensitive as the square root's argument is small.
        let root = (1.0 - never / axial).sqrt();
        assert_relative_eq!(
            found.load,
            exact,
            max_relative = 1e-9 + 1e-11 / root.powi(2)
        );
        if !(45.0..=1e3).contains(&axial) {
            continue;
        }
        let mut newton = Newton::new(&column);
        let points = branch(&mut column, &mut newton, |point| {
            point.state.nodes[0][2].abs() > 1.0
        });
        assert_relative_eq!(points[0].load, exact, max_relative = 1e-9);
        let share = exact / axial;
        let slope = after_buckling::load_slope(f64::INFINITY, share);
        assert_eq!(points[1].load < exact, slope < 0.0, "EA {axial}");
        let problem = Problem {
            rod: Rod::straight(axial, f64::INFINITY, 1.0, 1.0),
            bottom: Seat::HINGED,
            top: Seat::HINGED,
        };
        let mut state = problem
            .branch(exact, Parameter::BottomTurn, 1e-2)
            .expect("finds the branch");
        for point in points.iter().skip(1).step_by(9) {
            let turn = point.state.nodes[0][2].abs();
            if turn < 2e-2 {
                continue;
            }
            state = problem
                .follow(Parameter::BottomTurn, &[turn], &state)
                .expect("follows")[0];
            assert_relative_eq!(point.load, state.load, max_relative = 1e-9);
            let height = 1.0 - point.state.nodes[16][0];
            assert_relative_eq!(height, state.shortening, epsilon = 1e-9);
            let middle = problem.profile(&state, &[0.5])[0].y;
            assert_relative_eq!(point.state.nodes[8][1].abs(), middle.abs(), epsilon = 1e-9);
        }
    }
}

/// A straight rod under M = 2πEI/L closes to a circle: exact, common knowledge of mechanics. What
/// it can shear and shorten does not matter, as no force acts.
#[test]
fn a_rod_rolls_up_to_a_circle() {
    for section in [
        ELASTICA,
        Section {
            axial: 1e3,
            shear: 5e2,
            bending: 1.0,
        },
    ] {
        let elements = 16;
        let mut column = rod(section, elements).loaded(&[NodeLoad {
            node: elements,
            load: [0.0, 0.0, 1.0],
        }]);
        let mut newton = Newton::new(&column);
        let mut state = column.first_guess();
        for eighth in 1..=8 {
            let moment = f64::from(eighth) * PI / 4.0;
            newton
                .solve_at_load(&mut column, &mut state, moment)
                .expect("solves");
        }
        for (i, node) in state.nodes.iter().enumerate() {
            let angle = 2.0 * PI * i as f64 / elements as f64;
            assert_relative_eq!(node[2], angle, epsilon = 1e-12);
            assert_relative_eq!(node[0], angle.sin() / (2.0 * PI), epsilon = 1e-11);
            assert_relative_eq!(node[1], (1.0 - angle.cos()) / (2.0 * PI), epsilon = 1e-11);
        }
    }
}

/// Deep arch of 215°, clamped at one end and hinged at the other, R = 100, EI = 1e6, under a
/// crown load: it is lost at 897 (DaDeppo & Schmidt, J. Appl. Mech. 42 (1975) [S]), 8.97308997
/// EI/R² [C].
#[test]
fn deep_arch_meets_its_limit_load() {
    let (opening, radius, bending) = (f64::to_radians(215.0), 100.0, 1e6);
    let elements = 64;
    let section = Section {
        bending,
        ..ELASTICA
    };
    let shape = NaturalShape {
        angle: &|s| opening * (0.5 - s),
        curvature: &|_| -opening,
    };
    let chord = 2.0 / opening * (0.5 * opening).sin();
    let mut column = Column::new(radius * opening, elements, &|_| section, &shape)
        .held(
            EndLaws([Hold::Held(0.0), Hold::Held(0.0), Hold::Held(0.5 * opening)]),
            EndLaws([Hold::Held(chord), Hold::Held(0.0), Hold::Free]),
        )
        .loaded(&[NodeLoad {
            node: elements / 2,
            load: [0.0, -1.0, 0.0],
        }]);
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let first = start(&mut column, &mut newton, &guess, 0.0).expect("unloaded");
    let crown = first.state.nodes[elements / 2];
    let height = (1.0 - (0.5 * opening).cos()) / opening;
    assert_relative_eq!(crown[1], height, max_relative = 1e-11);
    let mut points = vec![first];
    let settings = PathSettings {
        largest_step: 0.1,
        ..PathSettings::default()
    };
    let (outcome, _) = follow(&mut column, &mut newton, &mut points, &settings, |points| {
        points[points.len() - 1].load_direction < 0.0
    });
    assert_eq!(outcome, Outcome::Stopped);
    // Nothing is crossed on the way: the arch sways as it sinks.
    assert!(
        points
            .windows(2)
            .all(|pair| !crosses_another(&pair[0], &pair[1]))
    );
    let after = points.len() - 2;
    let lost = locate(&mut column, &mut newton, &points, after, 1e-12, |point| {
        point.load_direction
    })
    .expect("changes sign");
    let load = lost.point.load * column.scale.force;
    assert!((load - 897.0).abs() < 0.5, "{load}");
    let share = load * radius * radius / bending;
    assert_relative_eq!(share, elastica::DEEP_ARCH_COMPUTED, max_relative = 1e-9);
    // Past it the path goes on, with one unstable direction.
    assert_eq!(points[after].negatives, 0);
    let (outcome, _) = follow(&mut column, &mut newton, &mut points, &settings, |points| {
        points.len() > after + 12
    });
    assert_eq!(outcome, Outcome::Stopped);
    assert_eq!(points[points.len() - 1].negatives, 1);
}
