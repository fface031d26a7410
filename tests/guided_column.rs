//! The column that leans on guides.

mod reference;

use coilstay::column::{
    Column, ColumnState, Contact, EndLaws, Hold, NaturalShape, StraightScan, Wall,
};
use coilstay::solve::{
    Newton, Outcome, PathPoint, PathSettings, System, follow, locate, start, turn_back,
};
use coilstay::spring::Section;
use reference::shooting::Rod;
use reference::walls::closed_form::Ends;
use reference::walls::{self, Set, Walls, richardson};
use std::f64::consts::PI;

type Point = PathPoint<3, 5>;

/// A guided column in its own units (EI = 1, L = 1), with a half-sine bow.
#[derive(Clone)]
struct Case {
    axial: f64,
    shear: f64,
    clamped: [bool; 2],
    bow: f64,
    walls: Vec<Wall>,
    elements: usize,
    search: f64,
}

/// A spring of slenderness Λ and E/G = r: EA L²/EI = 2(2 + r)/r Λ².
fn spring(slenderness: f64, r: f64, clamped: [bool; 2], bow: f64, clearance: f64) -> Case {
    let axial = 2.0 * (2.0 + r) / r * slenderness * slenderness;
    Case {
        axial,
        shear: r * axial,
        clamped,
        bow,
        walls: vec![Wall::plain(clearance)],
        elements: 64,
        search: 1.0,
    }
}

impl Case {
    fn column(&self) -> Column {
        let section = Section {
            axial: self.axial,
            shear: self.shear,
            bending: 1.0,
        };
        let bow = self.bow;
        let shape = NaturalShape {
            angle: &|s| bow * PI * (PI * s).cos(),
            curvature: &|s| -bow * PI * PI * (PI * s).sin(),
        };
        let turning = |clamped: bool| if clamped { Hold::Held(0.0) } else { Hold::Free };
        let [bottom, top] = self.clamped.map(turning);
        let column = Column::new(1.0, self.elements, &|_| section, &shape)
            .held(
                EndLaws([Hold::Held(0.0), Hold::Held(0.0), bottom]),
                EndLaws([Hold::Free, Hold::Held(0.0), top]),
            )
            .with_guides(self.walls.clone())
            .with_search(self.search);
        let scale = column.load_scale();
        column.with_load_scale(scale.min(20.0))
    }

    /// The path to a shortening.
    fn to(&self, shortening: f64, largest_step: f64) -> Walk {
        let mut column = self.column();
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let first = start(&mut column, &mut newton, &guess, 0.0).expect("starts");
        let mut walk = Walk {
            column,
            newton,
            points: vec![first],
            start: 0.0,
        };
        walk.start = walk.height(&walk.points[0]);
        walk.go_on(shortening, 1.0, largest_step);
        walk
    }
}

/// A path under way.
struct Walk {
    column: Column,
    newton: Newton<3, 5>,
    points: Vec<Point>,
    start: f64,
}

impl Walk {
    fn height(&self, point: &Point) -> f64 {
        point.state.nodes[self.column.elements()][0]
    }

    /// Follows the path on to exactly that shortening, going `sense`.
    fn go_on(&mut self, shortening: f64, sense: f64, largest_step: f64) {
        let (last, start) = (self.column.elements(), self.start);
        let short = |point: &Point| sense * (shortening - start + point.state.nodes[last][0]);
        let settings = PathSettings {
            largest_step,
            most_points: 6000,
            ..PathSettings::default()
        };
        let (column, newton, points) = (&mut self.column, &mut self.newton, &mut self.points);
        let (outcome, _) = follow(column, newton, points, &settings, |points| {
            short(&points[points.len() - 1]) <= 0.0
        });
        assert_eq!(outcome, Outcome::Stopped);
        let after = points.len() - 2;
        let end = locate(column, newton, points, after, 1e-12, short).expect("reached");
        points.pop();
        points[after].distance = end.distance;
        points.push(end.point);
    }

    fn turn(&mut self) {
        let last = &self.points[self.points.len() - 1];
        let back = turn_back(&mut self.column, &mut self.newton, last);
        self.points = vec![back];
    }

    /// The state at a shortening on the way.
    fn at(&mut self, shortening: f64) -> Point {
        let (last, start) = (self.column.elements(), self.start);
        let short = |point: &Point| shortening - start + point.state.nodes[last][0];
        let after = self
            .points
            .windows(2)
            .position(|pair| short(&pair[0]) > 0.0 && short(&pair[1]) <= 0.0)
            .expect("on the way");
        locate(
            &mut self.column,
            &mut self.newton,
            &self.points,
            after,
            1e-13,
            short,
        )
        .expect("there")
        .point
    }

    fn contacts(&self, state: &ColumnState) -> Vec<Contact> {
        let mut contacts = Vec::new();
        self.column.contacts(state, &mut contacts);
        contacts
    }

    fn push(&self, state: &ColumnState) -> f64 {
        self.contacts(state)
            .iter()
            .map(|contact| contact.push)
            .sum()
    }

    /// Work of the load along the points, by trapezoids.
    fn work(&self) -> f64 {
        self.points
            .windows(2)
            .map(|pair| {
                0.5 * (pair[0].load + pair[1].load)
                    * (self.height(&pair[0]) - self.height(&pair[1]))
            })
            .sum()
    }

    fn friction_work(&self) -> f64 {
        self.points
            .windows(2)
            .map(|pair| self.column.friction_work(&pair[0].state, &pair[1].state))
            .sum()
    }
}

const R: f64 = 206.0 / 81.5;

/// Real springs between walls against an independent minimum of the energy under bounds, ten points
/// along each path: load and wall force at a set shortening. [C]
#[test]
fn paths_meet_a_minimum_under_bounds() {
    for (slenderness, clamped, bow, clearance, farthest) in [
        (6.0, [false, false], 0.01, 0.02, 0.4),
        (8.0, [true, true], 0.004, 0.012, 0.45),
        (7.0, [true, false], 0.006, 0.008, 0.4),
    ] {
        let case = spring(slenderness, R, clamped, bow, clearance);
        let mut path = case.to(farthest * 1.01, 0.03);
        let hold = |clamped: bool| {
            if clamped {
                walls::Hold::CLAMPED
            } else {
                walls::Hold::HINGED
            }
        };
        let reference = |segments: usize, sets: &[Set]| {
            let walls = Walls {
                rod: Rod::straight(case.axial, case.shear, 1.0, 1.0).bowed(bow),
                bottom: hold(clamped[0]),
                top: hold(clamped[1]),
                clearance,
                segments,
            };
            let first = walls.unloaded().expect("unloaded");
            walls.follow(sets, &first).expect("a minimum")
        };
        let unloaded = 1.0 - path.start;
        let shortenings: Vec<f64> = (1..=10).map(|i| farthest * f64::from(i) / 10.0).collect();
        let sets: Vec<Set> = shortenings
            .iter()
            .map(|s| Set::Shortening(s + unloaded))
            .collect();
        let (coarse, fine) = (reference(200, &sets), reference(400, &sets));
        let mut touched = 0;
        for (i, shortening) in shortenings.iter().enumerate() {
            let here = path.at(*shortening);
            let load = richardson(coarse[i].load, fine[i].load);
            let wall = |point: &walls::Point| point.wall_forces().iter().sum::<f64>();
            let push = richardson(wall(&coarse[i]), wall(&fine[i]));
            let ours = path.push(&here.state);
            assert!(
                (here.load / load - 1.0).abs() < 1e-4,
                "{slenderness} {i}: {} {load}",
                here.load
            );
            assert!(
                (ours - push).abs() < 1e-4 * load,
                "{slenderness} {i}: {ours} {push}"
            );
            touched += usize::from(push > 0.0);
        }
        assert!(touched >= 5, "{touched}");
    }
}

/// Sampled at 20 places in every element, the axis enters no wall by more than 1e-4 of the clearance;
/// thrusts and pushes balance; ρ of the search is not in the answer.
#[test]
fn walls_keep_the_axis_out_and_forces_balance() {
    for (slenderness, clamped, bow, clearance) in [
        (6.0, [false, false], 0.01, 0.02),
        (10.0, [true, false], 0.002, 0.01),
        (12.0, [true, true], 0.003, 0.015),
    ] {
        let case = spring(slenderness, R, clamped, bow, clearance);
        // Not as far as it could leave its mode.
        let path = case.to(0.28, 0.03);
        let mut stations = Vec::new();
        for point in &path.points {
            path.column.profile_with(20, &point.state, &mut stations);
            let deepest = stations
                .iter()
                .map(|s| s.y.abs() - clearance)
                .fold(-1.0, f64::max);
            assert!(deepest < 1e-4 * clearance, "{slenderness}: {deepest:e}");
            let [bottom, top] = path.column.end_actions(&point.state);
            let walls: f64 = path
                .contacts(&point.state)
                .iter()
                .map(|c| -c.side * c.push)
                .sum();
            assert!(
                (bottom[1] + top[1] + walls).abs() < 1e-9,
                "{bottom} {top} {walls}"
            );
            assert!(path.contacts(&point.state).iter().all(|c| c.push > -1e-9));
        }
        let end = &path.points[path.points.len() - 1];
        for search in [1e-3, 1e3] {
            let other = Case {
                search,
                ..case.clone()
            }
            .to(0.28, 0.03);
            let there = &other.points[other.points.len() - 1];
            assert!((there.load / end.load - 1.0).abs() < 1e-10, "{search}");
            let (one, two) = (path.push(&end.state), other.push(&there.state));
            assert!((one / two - 1.0).abs() < 1e-8, "{search}: {one} {two}");
        }
    }
}

/// The error of a guided path falls with the square of the mesh. Where the ends of the contact lie
/// within their pads differs from mesh to mesh and from point to point, so it is a mean over a
/// stretch of the path.
#[test]
fn guided_paths_converge() {
    let places: Vec<f64> = (0..24).map(|i| 0.2 + 0.007 * f64::from(i)).collect();
    let loads = |elements: usize| -> Vec<f64> {
        let case = Case {
            elements,
            ..spring(6.0, R, [false, false], 0.01, 0.02)
        };
        let mut path = case.to(0.4, 0.03);
        places.iter().map(|place| path.at(*place).load).collect()
    };
    let exact = loads(256);
    let errors: Vec<f64> = [8, 16, 32, 64]
        .iter()
        .map(|n| {
            let found = loads(*n);
            let squares: f64 = found
                .iter()
                .zip(&exact)
                .map(|(f, e)| (f / e - 1.0).powi(2))
                .sum();
            (squares / exact.len() as f64).sqrt()
        })
        .collect();
    for pair in errors.windows(2) {
        let order = (pair[0] / pair[1]).log2();
        assert!(order > 1.8, "{errors:?}");
    }
    assert!(errors[3] < 1e-6, "{errors:?}");
}

/// A column between walls that hardly shortens or shears, EA = GA, with its contacts.
struct Stiff {
    ends: Ends,
    column: Column,
    newton: Newton<3, 5>,
    points: Vec<Point>,
}

const STIFF_CLEARANCE: f64 = 1e-4;

impl Stiff {
    /// Its path up to `most` times the load of its first touch; `bow` as a share of the clearance.
    fn new(ends: Ends, stiffness: f64, bow: f64, most: f64) -> Self {
        let case = Case {
            axial: stiffness,
            shear: stiffness,
            clamped: [ends == Ends::Clamped; 2],
            bow: bow * STIFF_CLEARANCE,
            walls: vec![Wall::plain(STIFF_CLEARANCE)],
            elements: 128,
            search: 1.0,
        };
        let mut column = case.column().with_load_scale(ends.touch());
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let first = start(&mut column, &mut newton, &guess, 0.0).expect("starts");
        let mut points = vec![first];
        let settings = PathSettings {
            largest_step: 0.1,
            most_points: 6000,
            ..PathSettings::default()
        };
        let most = most * ends.touch();
        let (outcome, _) = follow(&mut column, &mut newton, &mut points, &settings, |points| {
            points[points.len() - 1].load > most
        });
        assert_eq!(outcome, Outcome::Stopped);
        Stiff {
            ends,
            column,
            newton,
            points,
        }
    }

    fn contacts(&self, point: &Point) -> Vec<Contact> {
        let mut contacts = Vec::new();
        self.column.contacts(&point.state, &mut contacts);
        contacts
    }

    /// Length from the first to the last place that leans.
    fn flat(&self, point: &Point) -> f64 {
        let contacts = self.contacts(point);
        match (contacts.first(), contacts.last()) {
            (Some(first), Some(last)) => last.place - first.place + first.width,
            _ => 0.0,
        }
    }

    /// Largest relative error of the force on the wall, over loads in shares of the first touch's.
    fn worst(&mut self, ratios: &[f64]) -> f64 {
        let mut worst: f64 = 0.0;
        for ratio in ratios {
            let load = ratio * self.ends.touch();
            let after = self
                .points
                .windows(2)
                .position(|pair| pair[0].load < load && pair[1].load >= load)
                .expect("on the way");
            let (column, newton) = (&mut self.column, &mut self.newton);
            let there = locate(column, newton, &self.points, after, 1e-12, |p| {
                load - p.load
            })
            .expect("there")
            .point;
            let push: f64 = self.contacts(&there).iter().map(|c| c.push).sum();
            let expected = self.ends.contact(load).expect("touches");
            worst = worst.max((push / STIFF_CLEARANCE / expected.force - 1.0).abs());
            if *ratio > 4.0 {
                // The pressure decays over √(EI/GA) at either end.
                let decay = 1.0 / self.column_stiffness().sqrt();
                assert!(
                    (self.flat(&there) - expected.flat).abs() < 3.0 * decay,
                    "{ratio}"
                );
            }
        }
        worst
    }

    fn column_stiffness(&self) -> f64 {
        1.0 / self.column.axial_compliance()
    }

    /// The load at which what lies flat would buckle away by itself, over the published one.
    fn buckles_flat(&self) -> f64 {
        let buckled = self
            .points
            .iter()
            .find(|point| self.column.wave_number(point.load) * self.flat(point) > 2.0 * PI);
        buckled.expect("buckles").load / self.ends.flat_buckles()
    }
}

/// As EA and GA go to infinity and the clearance to nought: point contact up to 4 P1 with the forces
/// of the small-rotation column, line contact beyond, and the flat part buckles at 16 P1 (hinged)
/// and 9 P1 (clamped; there the path itself leaves the wall before, at the least disturbance). Chai,
/// J. Mech. Phys. Solids 46 (1998) [M]; forces [C].
#[test]
fn a_column_that_only_bends_meets_the_published_phases() {
    for (ends, ratios) in [
        (Ends::Hinged, &[1.1, 2.0, 3.0, 6.0, 8.0] as &[f64]),
        (Ends::Clamped, &[1.1, 2.0, 3.0]),
    ] {
        let most = ratios[ratios.len() - 1] * 1.05;
        let errors = [4e3, 1.6e4, 6.4e4]
            .map(|stiffness| Stiff::new(ends, stiffness, 1e-4, most).worst(ratios));
        for pair in errors.windows(2) {
            assert!(pair[1] < 0.4 * pair[0], "{errors:?}");
        }
        assert!(errors[2] < 4e-3, "{errors:?}");
    }
    let found = Stiff::new(Ends::Hinged, 6.4e4, 1e-4, 16.5).buckles_flat();
    assert!((found - 1.0).abs() < 0.02, "{found}");
    // The same between clamped ends, by the length that lies flat in the published solution.
    let load = Ends::Clamped.flat_buckles();
    let flat = Ends::Clamped
        .contact(load * (1.0 - 1e-9))
        .expect("line")
        .flat;
    let stiff = Stiff::new(Ends::Clamped, 1e6, 1e-4, 1.05);
    approx::assert_relative_eq!(
        stiff.column.wave_number(load) * flat,
        2.0 * PI,
        max_relative = 1e-3
    );
}

/// With friction: the loop's area is the work that friction took, stroke after stroke the same;
/// friction nowhere gives energy back; without friction there is no loop.
#[test]
fn friction_takes_what_the_loop_encloses() {
    // Along the whole spring; on the corner of a guide that stops short; without friction.
    let whole = spring(6.0, R, [true, false], 0.01, 0.015);
    let short = spring(5.0, R, [false, true], 0.03, 0.02);
    for (friction, to, mut case) in [
        (0.15, f64::INFINITY, whole),
        (0.3, 0.15, short.clone()),
        (0.0, 0.15, short),
    ] {
        case.walls[0] = Wall {
            friction,
            to,
            ..case.walls[0]
        };
        let mut path = case.to(0.45, 0.01);
        let mut loop_area = 0.0;
        let mut friction_work = 0.0;
        let mut ends = Vec::new();
        for stroke in 0..4 {
            path.turn();
            let (target, sense) = if stroke % 2 == 0 {
                (0.2, -1.0)
            } else {
                (0.45, 1.0)
            };
            ends.push(path.points[0].load);
            path.go_on(target, sense, 0.002);
            if stroke >= 2 {
                loop_area += path.work();
                friction_work += path.friction_work();
            }
            // Where a pad changes from sticking to slipping within a step the trapezoid errs by the
            // square of the step.
            let given: f64 = path
                .points
                .windows(2)
                .map(|pair| {
                    path.column
                        .friction_work(&pair[0].state, &pair[1].state)
                        .max(0.0)
                })
                .sum();
            let taken = -path.friction_work();
            assert!(given <= 1e-4 * taken + 1e-12, "{given:e} {taken:e}");
        }
        ends.push(path.points[path.points.len() - 1].load);
        assert!((ends[2] / ends[4] - 1.0).abs() < 1e-9, "{ends:?}");
        if friction > 0.0 {
            assert!(loop_area > 1e-2);
            assert!(
                (loop_area / -friction_work - 1.0).abs() < 1e-4,
                "{loop_area} {friction_work}"
            );
        } else {
            assert!(
                loop_area.abs() < 1e-5 && friction_work.abs() < 1e-12,
                "{loop_area:e}"
            );
        }
    }
}

/// Where a guide stops short, the column leans on its corner with a force square on the axis: what
/// the load puts in is all stored, and the load differs between top and bottom.
#[test]
fn a_corner_pushes_square_on_the_axis() {
    let mut case = spring(5.0, R, [false, true], 0.03, 0.02);
    case.walls[0] = Wall {
        to: 0.15,
        ..case.walls[0]
    };
    let path = case.to(0.45, 0.002);
    let end = &path.points[path.points.len() - 1];
    let contacts = path.contacts(&end.state);
    assert!(
        contacts
            .iter()
            .any(|contact| contact.at_corner && contact.push > 0.1),
        "{contacts:?}"
    );
    let stored =
        path.column.strain_energy(&end.state) - path.column.strain_energy(&path.points[0].state);
    assert!(
        (path.work() / stored - 1.0).abs() < 1e-5,
        "{} {stored}",
        path.work()
    );
    let [bottom, top] = path.column.end_actions(&end.state);
    assert!((bottom[0] + top[0]).abs() > 1e-4, "{bottom} {top}");
    // A guide that reaches beyond the spring is one along all of it.
    let whole = spring(5.0, R, [false, true], 0.03, 0.02).to(0.45, 0.03);
    let mut long = spring(5.0, R, [false, true], 0.03, 0.02);
    long.walls[0] = Wall {
        to: 1.5,
        ..long.walls[0]
    };
    let long = long.to(0.45, 0.03);
    let loads = [&whole, &long].map(|walk| walk.points[walk.points.len() - 1].load);
    assert!((loads[0] / loads[1] - 1.0).abs() < 1e-11, "{loads:?}");
}

/// Where a stretch lets go and the path turns sharply round, it is followed into the next mode: the
/// spring then leans on both walls.
#[test]
fn a_path_goes_on_into_the_next_mode() {
    let path = spring(10.0, R, [true, false], 0.002, 0.01).to(0.5, 0.03);
    let end = &path.points[path.points.len() - 1];
    let contacts = path.contacts(&end.state);
    assert_eq!(end.negatives, 0);
    for side in [1.0, -1.0] {
        assert!(
            contacts
                .iter()
                .any(|contact| contact.side == side && contact.push > 0.1)
        );
    }
    assert!(path.points.iter().any(|point| point.load_direction < 0.0));
}

/// Guides leave the critical deflection of the perfect column alone until they are touched, and a
/// guide that is nowhere near changes nothing at all.
#[test]
fn a_guide_out_of_reach_changes_nothing() {
    let near = spring(6.0, R, [false, false], 0.01, 10.0).to(0.1, 0.03);
    let mut bare = spring(6.0, R, [false, false], 0.01, 10.0);
    bare.walls.clear();
    let bare = bare.to(0.1, 0.03);
    let (one, two) = (
        &near.points[near.points.len() - 1],
        &bare.points[bare.points.len() - 1],
    );
    assert!((one.load / two.load - 1.0).abs() < 1e-12);
    let apart = one
        .state
        .nodes
        .iter()
        .zip(&two.state.nodes)
        .map(|(a, b)| (a - b).amax());
    assert!(apart.fold(0.0, f64::max) < 1e-12);
    let mut straight = Case {
        bow: 0.0,
        ..spring(6.0, R, [false, false], 0.0, 0.01)
    }
    .column();
    let mut free = Case {
        bow: 0.0,
        walls: Vec::new(),
        ..spring(6.0, R, [false, false], 0.0, 0.01)
    }
    .column();
    let loads = [&mut straight, &mut free]
        .map(|column| StraightScan::new(column).buckling().expect("buckles").load);
    assert_eq!(loads[0], loads[1]);
}

/// The slope of the path is that of its points, by differences, with friction along a guide and on the
/// corner of one: the unsymmetric tangent, on which the measure of the rate rests, is exact.
#[test]
fn slopes_with_friction_are_those_of_the_path() {
    for (mut case, to) in [
        (spring(6.0, R, [true, false], 0.01, 0.015), f64::INFINITY),
        (spring(5.0, R, [false, true], 0.03, 0.02), 0.15),
    ] {
        case.walls[0] = Wall {
            friction: 0.3,
            to,
            ..case.walls[0]
        };
        let path = case.to(0.45, 0.001);
        let last = case.elements;
        let mut compared = 0;
        for three in path.points.windows(3) {
            let leans = three[1].state.side.iter().any(|push| *push != 0.0);
            if !leans || three.iter().any(|point| point.regime != three[1].regime) {
                continue;
            }
            let height = |point: &Point| point.state.nodes[last][0];
            let (d0, d1) = (three[0].distance, three[1].distance);
            if (d0 / d1 - 1.0).abs() > 1e-9 {
                continue;
            }
            let rate = three[1].load_direction / three[1].direction.nodes[last][0];
            let difference =
                (three[2].load - three[0].load) / (height(&three[2]) - height(&three[0]));
            assert!(
                (rate / difference - 1.0).abs() < 1e-6,
                "{rate} {difference}"
            );
            compared += 1;
        }
        assert!(compared > 10, "{compared}");
    }
}
