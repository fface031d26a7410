//! Flat ends on flat seats against shooting, standing on edges, flush and past lift-off.

use crate::fixture::setup;
use crate::reference::shooting::{FlatColumn, FlatSeat, FlatState, Parameter, Rod, Standing};
use crate::walk::{Point, Walk, assert_same};
use coilstay::setup::{FlatSeat as Ring, LimitKind, Setup, Support};

const ELEMENTS: usize = 32;
/// Points compared in each way of standing.
const POINTS: usize = 10;

/// A flat seat whose ring has `radius` in D, tilted.
pub fn flat(radius: f64, tilt: f64) -> Support {
    Support {
        tilt,
        ..Support::flat(Ring {
            radius: radius * 0.05,
            ground_share: 1.0,
            friction: None,
        })
    }
}

/// The same column for shooting, in L = 1 and k = 1.
pub fn shot(setup: &Setup) -> FlatColumn {
    let length = setup.spring.deformable_length();
    let r = setup.spring.youngs_modulus / setup.spring.shear_modulus;
    let rod = Rod::of_spring(r, length / setup.spring.mean_diameter)
        .bowed(setup.imperfections.bow / length);
    let lean = setup.imperfections.squareness / setup.spring.free_length;
    let seat = |support: &Support| {
        let coilstay::setup::Contact::Flat(ring) = support.contact else {
            panic!("not flat");
        };
        FlatSeat {
            radius: ring.edge() / length,
            angle: support.tilt,
            offset: support.offset / length,
            arm: setup.spring.dead_height() / (2.0 * length),
            lean,
        }
    };
    FlatColumn::new(rod, [seat(&setup.bottom), seat(&setup.top)])
}

/// How the ends stand at a point: flush or on which edge.
pub fn standing(walk: &Walk, point: &Point) -> [Standing; 2] {
    let presses = walk.presses(&point.state);
    std::array::from_fn(|end| {
        let turned = presses[end].turned;
        if turned == 0.0 {
            Standing::Flat
        } else {
            Standing::Edge(if end == 0 { turned } else { -turned }.signum())
        }
    })
}

/// Follows the column until it has travelled `travel` or has rocked by 0.3 rad, then compares
/// `POINTS` points of every way in which it stood on the way, to `close` of lengths in L, forces in kL and
/// angles in rad. Gives these ways.
fn compare(setup: &Setup, travel: f64, close: f64) -> Vec<[Standing; 2]> {
    let mut walk = Walk::new(setup, ELEMENTS);
    walk.until(0.02, |walk, point| {
        let rocked = walk
            .presses(&point.state)
            .iter()
            .any(|press| press.turned.abs() > 0.3);
        walk.travel(point) > travel || rocked
    });
    let mut stretches: Vec<([Standing; 2], Vec<&Point>)> = Vec::new();
    for point in &walk.points[1..] {
        let ways = standing(&walk, point);
        match stretches.last_mut() {
            Some((last, points)) if *last == ways => points.push(point),
            _ => stretches.push((ways, vec![point])),
        }
    }
    let ways: Vec<[Standing; 2]> = stretches.iter().map(|(ways, _)| *ways).collect();
    let mut column = shot(setup);
    let mut state = column
        .start(walk.load(&walk.points[1]))
        .expect("stands in one way");
    assert_eq!(state.standing, ways[0]);
    let mut before: &[&Point] = &[];
    let mut lifted = false;
    for (ways, points) in &stretches {
        if state.standing != *ways {
            state = change(&mut column, lifted, &state, before, &walk);
        }
        before = points;
        lifted |= *ways == [Standing::Flat; 2];
        for i in 0..POINTS.min(points.len()) {
            let point = points[i * (points.len() - 1) / (POINTS - 1).max(1)];
            state = same(&mut column, lifted, &state, point, &walk, close);
            assert_eq!(state.standing, *ways);
        }
    }
    ways
}

/// The state in which the shot column stands otherwise, on its way from `state`, past the last two of
/// `points`.
fn change(
    column: &mut FlatColumn,
    lifted: bool,
    state: &FlatState,
    points: &[&Point],
    walk: &Walk,
) -> FlatState {
    let (parameter, last) = marked(lifted, state, points[points.len() - 1], walk);
    let before = points
        .len()
        .checked_sub(2)
        .map_or(0.0, |i| marked(lifted, state, points[i], walk).1);
    let target = last + 5e-3 * (last - before).signum();
    column
        .next_change(parameter, target, state)
        .expect("changes")
}

/// What tells states apart that stand as `state` does, and its value at a point. It is
/// the travel until the ends sit flush, then how far a lifted end has turned.
fn marked(lifted: bool, state: &FlatState, point: &Point, walk: &Walk) -> (Parameter, f64) {
    let turns = walk.turns(&point.state);
    match state.standing {
        [Standing::Edge(_), _] if lifted => (Parameter::BottomTurn, turns[0]),
        [_, Standing::Edge(_)] if lifted => (Parameter::TopTurn, turns[1]),
        _ => (Parameter::Travel, walk.travel(point)),
    }
}

/// The shot state at a point of the path, compared with it.
fn same(
    column: &mut FlatColumn,
    lifted: bool,
    from: &FlatState,
    point: &Point,
    walk: &Walk,
    close: f64,
) -> FlatState {
    let turns = walk.turns(&point.state);
    let (parameter, target) = marked(lifted, from, point, walk);
    let shot = column.follow(parameter, target, from).expect("follows");
    let mut profile = Vec::new();
    walk.column.profile(&point.state, &mut profile);
    let presses = walk.presses(&point.state);
    let moments = walk.moments(&point.state);
    let (bottom, top) = (&shot.column.bottom, &shot.column.top);
    let middle = profile[profile.len() / 2].y;
    let mut pairs = vec![
        ("load", walk.load(point), shot.column.load),
        ("travel", walk.travel(point), shot.travel),
        (
            "side force",
            walk.side_force(&point.state),
            shot.column.side_force,
        ),
        ("bottom turn", turns[0], bottom.theta),
        ("top turn", turns[1], top.theta),
        ("middle", middle, column.height(&shot)),
    ];
    for end in 0..2 {
        let outward = [-1.0, 1.0][end];
        pairs.extend([
            ("press", presses[end].press * walk.force, shot.normal[end]),
            (
                "thrust",
                outward * presses[end].thrust * walk.force,
                shot.tangential[end],
            ),
            ("moment", moments[end], shot.moment[end]),
            ("opening", presses[end].turned, shot.opening[end]),
        ]);
    }
    assert_same(&format!("s = {}", shot.travel), close, &pairs);
    shot
}

/// Seats out of parallel: on edges, one down, both down, and lifted off again.
#[test]
fn seats_out_of_parallel() {
    let flush = [Standing::Flat; 2];
    for (slenderness, tilts, radii, bow, squareness, travel) in [
        (7.0, [0.02, 0.05], [0.3, 0.3], 0.005, 0.0, 0.2),
        (4.0, [0.0, 0.02], [0.5, 0.5], 0.005, 0.0, 0.45),
        (5.0, [0.0, 0.02], [0.5, 0.2], 0.005, 0.0, 0.4),
        (5.0, [-0.01, 0.02], [0.5, 0.4], 0.003, 0.02, 0.4),
    ] {
        let mut case = setup(
            slenderness,
            2.6,
            flat(radii[0], tilts[0]),
            flat(radii[1], tilts[1]),
        );
        case.imperfections.bow = bow * case.spring.free_length;
        case.imperfections.squareness = squareness * case.spring.free_length;
        let ways = compare(&case, travel, 1e-11);
        assert!(ways[0] != flush && ways.contains(&flush), "{ways:?}");
    }
}

/// A column that buckles between its seats lifts off one or both: a sharp limit of load and travel, past
/// which the shot states are told apart less well.
#[test]
fn lift_off_where_the_path_turns_back() {
    let flush = [Standing::Flat; 2];
    for (slenderness, radii, squareness, last) in [
        (
            6.0,
            [0.3, 0.3],
            0.0,
            [Standing::Edge(1.0), Standing::Edge(1.0)],
        ),
        (6.0, [0.3, 0.5], 0.0, [Standing::Edge(1.0), Standing::Flat]),
        (7.0, [0.4, 0.3], 0.01, [Standing::Flat, Standing::Edge(1.0)]),
        (8.0, [0.5, 0.5], 0.02, [Standing::Edge(1.0), Standing::Flat]),
    ] {
        let mut case = setup(slenderness, 2.6, flat(radii[0], 0.0), flat(radii[1], 0.0));
        case.imperfections.bow = 0.005 * case.spring.free_length;
        case.imperfections.squareness = squareness * case.spring.free_length;
        case.spring.total_coils = 11.0;
        case.spring.solid_length = 11.0 * 0.006;
        let ways = compare(&case, 0.55, 3e-9);
        let lifts = ways.iter().position(|way| *way == flush).expect("flush");
        assert_eq!(ways[lifts + 1], last, "{ways:?}");
    }
}

/// An assessment finds the lift-off where it is, also where the path turns back sharply there.
#[test]
fn lift_off_is_a_limit_where_it_is() {
    for (slenderness, radii, bow) in [
        (6.0, [0.3, 0.3], 0.005),
        (6.0, [0.3, 0.5], 0.005),
        (7.0, [0.3, 0.3], 0.002),
    ] {
        let mut case = setup(slenderness, 2.6, flat(radii[0], 0.0), flat(radii[1], 0.0));
        let length = case.spring.free_length;
        case.imperfections.bow = bow * length;
        let answer = coilstay::assess::assess(&case, "");
        let limit = answer
            .limits
            .iter()
            .find(|limit| limit.name == LimitKind::LiftOff)
            .expect("is a limit");
        let mut column = shot(&case);
        let start = column.start(1e-9).expect("starts");
        let flush = column
            .follow(Parameter::Travel, 0.1, &start)
            .expect("follows");
        assert_eq!(flush.standing, [Standing::Flat; 2]);
        let deflection = limit.deflection_m.expect("is reached") / length;
        let force = limit.force_n.expect("is reached") / (case.spring.rate() * length);
        // Were it not there, the search would end at its limit.
        let beyond = start.travel + deflection + 1e-3;
        let lifted = column
            .next_change(Parameter::Travel, beyond, &flush)
            .expect("lifts off");
        assert_ne!(lifted.standing, flush.standing);
        // The load with which shooting starts has moved its seats by a little.
        assert_same(
            &format!("{slenderness}, {radii:?}"),
            1e-8,
            &[
                ("travel", deflection, lifted.travel - start.travel),
                ("force", force, lifted.column.load),
            ],
        );
    }
}
