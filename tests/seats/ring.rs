//! What must hold for every column between flat seats.

use crate::fixture::setup;
use coilstay::column::{Column, Deviations, Idealisation};
use coilstay::setup::{Contact, FlatSeat, LeverArc, Motion, Orientation, Setup, Support};
use coilstay::solve::{Newton, Outcome, PathPoint, PathSettings, follow, start};
use proptest::prelude::*;

const ELEMENTS: usize = 12;

fn seat() -> impl Strategy<Value = Support> {
    (
        0.004..0.03_f64,
        0.6..1.0_f64,
        prop_oneof![Just(0.0), -0.03..0.03_f64],
        prop_oneof![Just(0.0), -0.002..0.002_f64],
    )
        .prop_map(|(radius, ground_share, tilt, offset)| Support {
            tilt,
            offset,
            ..Support::flat(FlatSeat {
                radius,
                ground_share,
                friction: None,
            })
        })
}

/// What is at the other end.
fn other() -> impl Strategy<Value = Support> {
    prop_oneof![
        3 => seat().boxed(),
        1 => Just(Support::clamped()).boxed(),
        1 => Just(Support::hinged()).boxed(),
    ]
}

fn case() -> impl Strategy<Value = Setup> {
    (
        2.8..9.0_f64,
        2.2..3.0_f64,
        seat(),
        other(),
        any::<bool>(),
        prop::option::weighted(
            0.3,
            (-0.02..0.02_f64, prop_oneof![-0.3..-0.1_f64, 0.1..0.3_f64]),
        ),
        (-0.03..0.03_f64, -0.03..0.03_f64, -0.02..0.02_f64),
    )
        .prop_map(|(slenderness, r, one, two, turned, lever, sizes)| {
            let (bottom, mut top) = if turned { (two, one) } else { (one, two) };
            top.motion = lever.map(|(along, across)| Motion::Lever(LeverArc { along, across }));
            let mut case = setup(slenderness, r, bottom, top);
            case.spring.total_coils = 11.0;
            case.spring.solid_length = 11.0 * 0.006;
            case.imperfections.squareness = sizes.0 * case.spring.free_length;
            case.imperfections.parallelism = sizes.1 * case.spring.mean_diameter;
            case.imperfections.bow = sizes.2 * case.spring.free_length;
            case
        })
}

/// The same case seen from the other side.
fn mirrored(case: &Setup) -> Setup {
    let mut other = case.clone();
    for support in [&mut other.bottom, &mut other.top] {
        support.tilt = -support.tilt;
        support.offset = -support.offset;
        if let Some(Motion::Lever(arc)) = &mut support.motion {
            arc.across = -arc.across;
        }
    }
    let sizes = &mut other.imperfections;
    sizes.squareness = -sizes.squareness;
    sizes.parallelism = -sizes.parallelism;
    sizes.bow = -sizes.bow;
    other
}

/// The path to a travel of 0.45 of the length or to a rotation of 0.9 rad, with how it ended.
fn path(case: &Setup) -> (Column, Vec<PathPoint<3, 5>>, Outcome) {
    let deviations = Deviations {
        sizes: &case.imperfections,
        orientation: Orientation::plain(),
        mode: None,
    };
    let mut column = Column::of_setup(case, Idealisation::AsBuilt, ELEMENTS, Some(&deviations));
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let mut points = vec![start(&mut column, &mut newton, &guess, 0.0).expect("starts")];
    let first = points[0].state.nodes[ELEMENTS][0];
    let settings = PathSettings::default();
    let (outcome, _) = follow(&mut column, &mut newton, &mut points, &settings, |points| {
        let nodes = &points[points.len() - 1].state.nodes;
        first - nodes[ELEMENTS][0] > 0.45 || nodes.iter().any(|node| node[2].abs() > 0.9)
    });
    (column, points, outcome)
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 120,
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    /// The seat can only push, and within its ring: about the seat's own centre the force line never
    /// has more than the ring's radius as its arm, whatever the end does on it.
    #[test]
    fn the_force_line_stays_inside_the_ring(case in case()) {
        let (column, points, outcome) = path(&case);
        prop_assert_eq!(outcome, Outcome::Stopped);
        for point in points.iter().filter(|point| point.load.abs() > 1e-6) {
            for (end, support) in [&case.bottom, &case.top].into_iter().enumerate() {
                let Contact::Flat(ring) = support.contact else { continue };
                let press = column.seat_press(&point.state, end);
                let edge = ring.edge() / column.scale.length;
                prop_assert!(press.line.abs() <= edge * (1.0 + 1e-9), "{press:?} {edge}");
                // Turned out of its seat it stands on the edge it turns about, exactly.
                if press.turned != 0.0 {
                    let side = if end == 0 { press.turned } else { -press.turned };
                    prop_assert!((press.line - edge.copysign(side)).abs() < 1e-9 * edge, "{press:?} {edge}");
                }
            }
        }
    }

    /// Mirrored, everything sideways changes its sign and nothing else anything: to the last bit.
    #[test]
    fn the_mirror_image_rocks_mirrored(case in case()) {
        let ((_, plain, _), (_, other, _)) = (path(&case), path(&mirrored(&case)));
        prop_assert_eq!(plain.len(), other.len());
        for (one, two) in plain.iter().zip(&other) {
            prop_assert_eq!(one.load, two.load);
            for (a, b) in one.state.nodes.iter().zip(&two.state.nodes) {
                prop_assert_eq!([a[0], a[1], a[2]], [b[0], -b[1], -b[2]]);
            }
        }
    }
}
