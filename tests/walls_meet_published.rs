//! The reference computations of columns between walls, against published values, against the closed
//! form and against shooting, so that what the program is compared with has been compared itself.
//! [S]: seen in a published text. [M]: from memory of the named source. [C]: computed by an
//! independent program, not published.

mod reference;

use approx::assert_relative_eq;
use reference::closed_form::critical_share;
use reference::shooting::{Parameter, Problem, Rod, Seat};
use reference::walls::closed_form::{Contact, Ends};
use reference::walls::{Against, HalfAgainstWall, Hold, Point, Set, Walls, richardson};
use std::f64::consts::PI;

/// Loads at which the phases change: Chai, J. Mech. Phys. Solids 46 (1998) [M]; mid contact force
/// Q L³/(EI h) of the hinged column, h from the straight axis to the wall [C].
#[test]
fn closed_form_meets_its_table() {
    let first = PI.powi(2);
    for (ratio, force) in [
        (1.1, 4.878_496),
        (2.0, 49.615_891),
        (3.0, 101.701_929),
        (4.0, 16.0 * first),
    ] {
        let got = Ends::Hinged.contact(ratio * first).expect("touches").force;
        assert_relative_eq!(got, force, max_relative = 2e-7);
    }
    assert_relative_eq!(Ends::Hinged.flat_buckles(), 16.0 * first);
    assert_relative_eq!(Ends::Clamped.flatten(), 16.0 * first);
    assert_relative_eq!(Ends::Clamped.flat_buckles(), 36.0 * first);
    assert_eq!(Ends::Hinged.contact(0.99 * first), None);
    assert_eq!(Ends::Clamped.contact(36.1 * first), None);
}

/// The closed form solves its own problem: the shape touches the wall with a level tangent and goes
/// nowhere beyond, its moment and shear balance the load and the wall's force, the shortening is the
/// quadrature of its slope, and both phases agree where one turns into the other.
#[test]
fn closed_form_solves_the_equation() {
    for ends in [Ends::Hinged, Ends::Clamped] {
        let touch = ends.touch();
        for load in [1.0001, 1.3, 2.0, 3.9, 4.0, 4.1, 6.0, 8.9].map(|ratio| ratio * touch) {
            let Contact {
                force,
                flat,
                shortening,
            } = ends.contact(load).expect("touches");
            let y = |x: f64| ends.shape(load, x).expect("touches");
            assert_relative_eq!(y(0.5), 1.0, max_relative = 1e-12);
            assert_relative_eq!(y(0.5 * (1.0 - flat)), 1.0, max_relative = 1e-12);
            let step = 1e-3;
            let slope = |x: f64| (y(x + step) - y(x - step)) / (2.0 * step);
            // At a free place EI y''' + P y' is the force Q/2 of the seat, by differences.
            let third = |x: f64| {
                (y(x + 2.0 * step) - 2.0 * y(x + step) + 2.0 * y(x - step) - y(x - 2.0 * step))
                    / (2.0 * step.powi(3))
            };
            for x in [0.05, 0.1, 0.15] {
                let side = third(x) + load * slope(x);
                assert!((side - 0.5 * force).abs() < 4e-3 * load, "{side} {force}");
            }
            let second = (y(2.0 * step) - 2.0 * y(step) + y(0.0)) / step.powi(2);
            match ends {
                Ends::Hinged => assert!(second.abs() < 2e-2 * load, "{second}"),
                Ends::Clamped => assert!(y(step).abs() < load * step * step),
            }
            const CELLS: u32 = 20_000;
            let mut length = 0.0;
            let mut largest = 0.0_f64;
            for i in 0..CELLS {
                let (low, high) = (
                    y(f64::from(i) / f64::from(CELLS)),
                    y(f64::from(i + 1) / f64::from(CELLS)),
                );
                length += 0.5 * (high - low).powi(2) * f64::from(CELLS);
                largest = largest.max(high);
            }
            assert_relative_eq!(length, shortening, max_relative = 1e-6);
            assert!(largest < 1.0 + 1e-12);
        }
        let (before, after) = (
            ends.contact(4.0 * touch * (1.0 - 1e-9)).expect("point"),
            ends.contact(4.0 * touch * (1.0 + 1e-9)).expect("line"),
        );
        assert_relative_eq!(before.force, after.force, max_relative = 1e-8);
        assert_relative_eq!(before.shortening, after.shortening, max_relative = 1e-8);
    }
}

/// A column that bends only, as nearly as numbers allow, with a trace of a bow; EA = GA.
fn stiff(ends: Ends, axial: f64, clearance: f64, segments: usize) -> Walls {
    let hold = match ends {
        Ends::Hinged => Hold::HINGED,
        Ends::Clamped => Hold::CLAMPED,
    };
    Walls {
        rod: Rod::straight(axial, axial, 1.0, 1.0).bowed(1e-9 * clearance),
        bottom: hold,
        top: hold,
        clearance,
        segments,
    }
}

/// The stable states under each of `ratios` of the first critical load, in turn.
fn under_loads(walls: &Walls, ends: Ends, ratios: &[f64]) -> Vec<Point> {
    let sets: Vec<Set> = ratios
        .iter()
        .map(|ratio| Set::Load(ratio * ends.touch()))
        .collect();
    let start = walls.unloaded().expect("unloaded");
    walls.follow(&sets, &start).expect("follows")
}

/// As EA and GA grow the minimum under bounds goes to the table: hinged, P/P1 = 1.1 to 4 [C], and
/// to the closed form in the line phase, wall force and length of the flat. What is left
/// falls as 1/EA.
#[test]
fn minimum_meets_the_hinged_table() {
    let ratios = [1.1, 2.0, 3.0, 4.0, 6.0, 9.0, 12.0, 15.0];
    let table = [4.878_496, 49.615_891, 101.701_929, 16.0 * PI.powi(2)];
    let clearance = 2e-4;
    let forces = |axial: f64| {
        let [coarse, fine] = [200, 400].map(|segments| {
            under_loads(
                &stiff(Ends::Hinged, axial, clearance, segments),
                Ends::Hinged,
                &ratios,
            )
        });
        for (point, ratio) in fine.iter().zip(ratios) {
            let contact = Ends::Hinged.contact(ratio * PI.powi(2)).expect("touches");
            let touches = point.touches();
            assert_eq!(touches.len(), if ratio > 4.0 { 2 } else { 1 });
            if ratio > 4.0 {
                let flat = touches[1].1 - touches[0].0;
                assert!(
                    (flat - contact.flat).abs() < 2.0 / 200.0,
                    "{flat} {contact:?}"
                );
                assert_relative_eq!(touches[0].2, touches[1].2, max_relative = 1e-6);
            }
        }
        (0..ratios.len())
            .map(|i| {
                let [low, high] = [&coarse, &fine].map(|points| points[i].wall_forces()[0]);
                richardson(low, high) / clearance
            })
            .collect::<Vec<f64>>()
    };
    let (soft, hard) = (forces(1e6), forces(1e7));
    for (i, ratio) in ratios.into_iter().enumerate() {
        let exact = Ends::Hinged
            .contact(ratio * PI.powi(2))
            .expect("touches")
            .force;
        let want = table.get(i).copied().unwrap_or(exact);
        let (before, after) = (soft[i] / want - 1.0, hard[i] / want - 1.0);
        assert!(after.abs() < 2e-4, "{ratio}: {after}");
        if i < 4 {
            // In the line phase the edges move from node to node, and that is what is left.
            assert!(
                after.abs() < 0.2 * before.abs(),
                "{ratio}: {before} {after}"
            );
        }
    }
}

/// The hinged column's phases begin where Chai (1998) has them [M]: touch at P1, line from 4 P1, and
/// at 16 P1 the flat part leaves for the other wall.
#[test]
fn hinged_phases_begin_where_published() {
    let (ends, clearance) = (Ends::Hinged, 1e-3);
    let walls = stiff(ends, 1e7, clearance, 400);
    let ratios = [
        0.5, 0.99, 1.01, 1.5, 2.0, 3.0, 3.96, 4.2, 5.0, 7.0, 9.0, 11.0, 13.0, 15.0, 15.7, 16.3,
    ];
    for (point, ratio) in under_loads(&walls, ends, &ratios).iter().zip(ratios) {
        let [upper, lower] = point.wall_forces();
        assert_eq!(upper > 0.0, ratio > 1.0, "{ratio}");
        assert_eq!(lower > 0.0, ratio > 16.0, "{ratio}");
        let runs = point.touches().len();
        match ratio {
            ..1.0 => assert_eq!(runs, 0, "{ratio}"),
            ..4.0 => assert_eq!(runs, 1, "{ratio}"),
            ..16.0 => assert_eq!(runs, 2, "{ratio}"),
            _ => assert!(runs > 2, "{ratio}"),
        }
    }
}

/// The clamped column's: touch at P1, line from 4 P1 [M]; wall force and flat part as in the closed
/// form, in the line phase too.
///
/// Between frictionless walls the flat state of a *perfect* clamped column is no strict minimum: each
/// free end has kℓ = 2π, where a lift off by (1 − cos kx) is neutral, and a longer one is unstable.
/// The least disturbance ends it at 4 P1, where the column goes into an S that leans on both walls, at
/// less energy. So 9 P1, where the flat part buckles, is not seen by a minimum. A
/// natural bow of a tenth of the clearance presses the flat part against its wall and holds it.
#[test]
fn clamped_phases_begin_where_published() {
    let (ends, clearance) = (Ends::Clamped, 1e-3);
    let ratios = [0.99, 1.01, 1.1, 1.5, 2.0, 3.0, 3.5, 3.9];
    let walls = stiff(ends, 1e7, clearance, 401);
    let perfect = under_loads(&walls, ends, &ratios);
    for (point, ratio) in perfect.iter().zip(ratios) {
        let [upper, lower] = point.wall_forces();
        assert_eq!(upper > 0.0, ratio > 1.0, "{ratio}");
        assert_eq!(lower, 0.0, "{ratio}");
        let want = ends.contact(ratio * ends.touch()).map_or(0.0, |c| c.force);
        assert!(
            (upper / clearance - want).abs() < 1e-3 * want.max(20.0),
            "{ratio}"
        );
    }
    let gone = walls
        .follow(
            &[4.1, 4.6].map(|ratio| Set::Load(ratio * ends.touch())),
            &perfect[7],
        )
        .expect("follows");
    assert!(gone[1].wall_forces()[1] > 0.5 * gone[1].wall_forces()[0]);

    let bowed = Walls {
        rod: Rod::straight(1e7, 1e7, 1.0, 1.0).bowed(0.1 * clearance),
        ..walls
    };
    // In small steps: what holds it is not much.
    let ratios: Vec<f64> = (0..=40).map(|i| 0.8 + 0.2 * f64::from(i)).collect();
    for (point, ratio) in under_loads(&bowed, ends, &ratios)
        .iter()
        .zip(ratios)
        .skip(18)
    {
        let want = ends.contact(ratio * ends.touch()).expect("touches");
        let [upper, lower] = point.wall_forces();
        assert_eq!(lower, 0.0, "{ratio}");
        assert_relative_eq!(upper / clearance, want.force, max_relative = 0.012);
        let runs = point.touches();
        let flat = runs[runs.len() - 1].1 - runs[0].0;
        assert!((flat - want.flat).abs() < 0.022, "{ratio}: {flat} {want:?}");
    }
}

/// Without walls the minimum is the state that shooting finds: a real spring, bowed and tilted, with
/// ends that give, past the bow-out, after one Richardson step to 1e-6 of L and kL.
#[test]
fn minimum_meets_shooting_without_walls() {
    let inf = f64::INFINITY;
    let cases = [
        (8.0, Hold::CLAMPED.tilted(0.03), Hold::CLAMPED.tilted(0.05)),
        (4.0, Hold::HINGED, Hold::HINGED),
        (4.0, Hold::CLAMPED, Hold::SLIDING.tilted(0.02)),
        (
            5.0,
            Hold::elastic(0.02, inf),
            Hold::elastic(inf, 1.5).tilted(-0.02),
        ),
    ];
    for (slenderness, bottom, top) in cases {
        let rod = || Rod::of_spring(2.6, slenderness).bowed(0.01);
        let seat = |hold: &Hold| Seat {
            angle: hold.angle,
            offset: hold.offset,
            ..Seat::elastic(hold.rotation, hold.sideways)
        };
        let problem = Problem {
            rod: rod(),
            bottom: seat(&bottom),
            top: seat(&top),
        };
        let shares: Vec<f64> = (1..=10).map(|i| 0.04 * f64::from(i)).collect();
        let start = problem.unloaded().expect("unloaded");
        let states = problem
            .follow(Parameter::Shortening, &shares, &start)
            .expect("follows");
        let sets: Vec<Set> = shares.iter().map(|share| Set::Shortening(*share)).collect();
        let [coarse, fine] = [200, 400].map(|segments| {
            let walls = Walls {
                rod: rod(),
                bottom,
                top,
                clearance: inf,
                segments,
            };
            let start = walls.unloaded().expect("unloaded");
            walls.follow(&sets, &start).expect("follows")
        });
        for i in 0..shares.len() {
            let pairs = |of: &dyn Fn(&Point) -> f64| richardson(of(&coarse[i]), of(&fine[i]));
            let middle = problem.profile(&states[i], &[0.5])[0].y;
            for (what, got, want) in [
                ("load", pairs(&|p| p.load), states[i].load),
                ("middle", pairs(&|p| p.heights[p.heights.len() / 2]), middle),
                ("side", pairs(&|p| p.seat_forces[1]), states[i].side_force),
                (
                    "bottom",
                    pairs(&|p| -p.seat_moments[0]),
                    states[i].pivot_moments[0],
                ),
                (
                    "top",
                    pairs(&|p| p.seat_moments[1]),
                    states[i].pivot_moments[1],
                ),
            ] {
                assert!(
                    (got - want).abs() < 1e-6,
                    "{what} at {}: {got} {want}",
                    shares[i]
                );
            }
        }
        assert!(fine[9].largest_height() > 0.05);
    }
}

/// Pressed against one wall, symmetric: a real spring by shooting with the contact as a length along
/// which y' = 0. Ten points along each path at equal shortening, from just after the first
/// touch to a long contact: P to 1e-6 of itself, the wall's force to 1e-6 of kL, the edge to a
/// segment and a half.
#[test]
fn contact_of_a_real_spring_meets_shooting() {
    for (ends, hold, slenderness, step) in [
        (Ends::Hinged, Hold::HINGED, 4.0, 0.02),
        (Ends::Hinged, Hold::HINGED, 8.0, 0.02),
        (Ends::Clamped, Hold::CLAMPED, 7.0, 0.02),
    ] {
        let (bow, clearance, r) = (0.004, 0.03, 2.6);
        let rod = || Rod::of_spring(r, slenderness).bowed(bow);
        let effective = if ends == Ends::Hinged {
            slenderness
        } else {
            0.5 * slenderness
        };
        let first = critical_share(r, effective).expect("buckles") + 0.01;
        let shares: Vec<f64> = (0..10).map(|i| first + step * f64::from(i)).collect();
        let sets: Vec<Set> = shares.iter().map(|share| Set::Shortening(*share)).collect();
        let [coarse, fine] = [201, 402].map(|segments| {
            let walls = Walls {
                rod: rod(),
                bottom: hold,
                top: hold,
                clearance,
                segments,
            };
            let start = walls.unloaded().expect("unloaded");
            walls.follow(&sets, &start).expect("follows")
        });
        let whole = rod();
        let half = HalfAgainstWall {
            rod: &whole,
            ends,
            clearance,
        };
        for i in 0..shares.len() {
            let point = &fine[i];
            let touches = point.touches();
            let guess = Against {
                load: point.load,
                wall: point.wall_forces()[0],
                edge: touches[0].0 - 0.5 / 402.0,
                seat: if ends == Ends::Hinged {
                    point.turns[0]
                } else {
                    -point.seat_moments[0]
                },
                pressures: [0.0; 2],
            };
            let state = half.solve(shares[i], &guess).expect("found");
            let load = richardson(coarse[i].load, fine[i].load);
            let wall = richardson(coarse[i].wall_forces()[0], fine[i].wall_forces()[0]);
            assert!((load - state.load).abs() < 1e-6 * load);
            assert!((wall - state.wall).abs() < 1e-6);
            assert!((touches[0].0 - state.edge).abs() < 1.5 / 402.0);
            assert!(state.pressures[0] >= 0.0 && state.pressures[1] >= 0.0);
        }
    }
}

/// Forces and moments of every state between walls balance, no node is beyond a wall, no wall
/// pulls, P is the slope of the energy over the shortening, and meshes agree: a tilted spring through
/// first touch, the jump into an S and both walls.
#[test]
fn states_between_walls_are_consistent() {
    let clearance = 0.02;
    let walls = |segments: usize| Walls {
        rod: Rod::of_spring(2.6, 14.0).bowed(0.005),
        bottom: Hold::CLAMPED.tilted(0.02),
        top: Hold::CLAMPED.tilted(0.035),
        clearance,
        segments,
    };
    let sets: Vec<Set> = (1..=40)
        .map(|i| Set::Shortening(0.01 * f64::from(i)))
        .collect();
    let paths = [100, 200, 400, 800].map(|segments| {
        let walls = walls(segments);
        walls
            .follow(&sets, &walls.unloaded().expect("unloaded"))
            .expect("follows")
    });
    for i in 0..sets.len() {
        let [rough, coarse, middle, fine] = [0, 1, 2, 3].map(|j| paths[j][i].load);
        assert!((rough / middle - 1.0).abs() < 2e-4);
        assert!((coarse / middle - 1.0).abs() < 2e-5);
        assert!((middle / fine - 1.0).abs() < 5e-6);
    }
    let mut jumps = 0;
    for three in paths[2].windows(3) {
        let work = 0.01 / 3.0 * (three[0].load + 4.0 * three[1].load + three[2].load);
        let stored = three[2].energy - three[0].energy;
        let [before, middle, after] = [0, 1, 2].map(|i| three[i].touches().len());
        if before == middle && middle == after {
            assert!((stored - work).abs() < 2e-7, "{stored} {work}");
        } else {
            assert!(stored < work + 1e-5, "{stored} {work}");
            jumps += usize::from(stored < work - 2e-5);
        }
    }
    assert!(jumps > 0);
    let last = &paths[2][sets.len() - 1];
    assert!(last.wall_forces().iter().all(|force| *force > 0.05));
    for point in &paths[2] {
        let wall: f64 = point.reactions.iter().sum();
        assert!((wall + point.seat_forces[0] + point.seat_forces[1]).abs() < 1e-9);
        // Moments about the bottom: (x F_y − y F_x) of all that acts on the column.
        let last = point.along.len() - 1;
        let moment: f64 = (0..=last)
            .map(|j| point.along[j] * point.reactions[j])
            .sum::<f64>()
            + point.along[last] * point.seat_forces[1]
            + point.heights[last] * point.load
            - point.heights[0] * point.load
            + point.seat_moments[0]
            + point.seat_moments[1];
        assert!(moment.abs() < 1e-9, "{moment}");
        assert!(point.largest_height() <= clearance);
        for (y, force) in point.heights.iter().zip(&point.reactions) {
            assert!(y * force <= 0.0 && (*force == 0.0 || y.abs() == clearance));
        }
    }
}
