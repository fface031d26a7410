//! Newton's iteration works in the memory it was given.

mod fixture;

use coilstay::column::{Column, Deviations, Idealisation};
use coilstay::setup::{Contact, FixedTo, FlatSeat, Guide, GuideKind, Orientation, Support, Swivel};
use coilstay::solve::{Assembled, Newton, System, start};
use fixture::setup;

/// Assembly, factorisation, solves and recovery allocate nothing, through a bow-out that takes
/// many iterations; nor does the bookkeeping of singular pivots.
#[test]
fn newton_does_not_allocate() {
    let mut case = setup(6.0, 2.6, Support::clamped(), Support::clamped());
    case.imperfections.squareness = 0.03 * case.spring.free_length;
    case.imperfections.bow = 0.02 * case.spring.free_length;
    let deviations = Deviations {
        sizes: &case.imperfections,
        orientation: Orientation::plain(),
        mode: None,
    };
    let mut column = Column::of_setup(&case, Idealisation::AsBuilt, 64, Some(&deviations));
    let mut newton = Newton::new(&column);
    let mut state = column.first_guess();
    let mut assembled = Assembled::zero(64);
    let mut right = assembled.residual.clone();
    right[16][1] = 1.0;
    let step = 0.02 / column.axial_compliance();
    // The counter counts.
    let counted = allocation_counter::measure(|| drop(std::hint::black_box(vec![0_u8; 8])));
    assert_eq!(counted.count_total, 1);
    let mut iterations = 0;
    let counted = allocation_counter::measure(|| {
        for i in 1..=20 {
            newton
                .solve_at_load(&mut column, &mut state, f64::from(i) * step)
                .expect("solves");
            iterations += newton.iterations;
        }
        column.assemble(&state, 20.0 * step, &mut assembled);
        newton.evaluate(&mut column, &state, 20.0 * step);
        newton.solve_linear(&mut right);
    });
    assert!(iterations > 40, "{iterations}");
    let (pushed, bowed) = (right[16][1], state.nodes[32][1]);
    assert!(pushed > 0.0 && bowed.abs() > 0.05, "{pushed} {bowed}");
    assert_eq!(counted.count_total, 0);
}

/// The same where the column leans on a rod, along all of it or on the corner where it stops short,
/// with friction on it and at the ball on top; and where flat ends stand on their edges and sit down.
#[test]
fn contact_does_not_allocate() {
    let flat = Support::flat(FlatSeat {
        radius: 0.025,
        ground_share: 1.0,
        friction: None,
    });
    let ball = Support {
        contact: Contact::Swivel(Swivel {
            friction: 0.1,
            radius: 0.005,
        }),
        ..Support::hinged()
    };
    for (bottom, top, reach) in [
        (Support::clamped(), ball, Some(f64::INFINITY)),
        (Support::clamped(), ball, Some(0.45)),
        (flat, flat, None),
    ] {
        let mut case = setup(6.0, 2.6, bottom, top);
        case.imperfections.squareness = 0.01 * case.spring.free_length;
        case.guides.extend(reach.map(|reach| Guide {
            kind: GuideKind::Rod,
            diameter: case.spring.inner_diameter() - 0.001,
            fixed_to: FixedTo::Ground,
            from: 0.0,
            to: reach * case.spring.free_length,
            friction: 0.15,
            touching_allowed: true,
        }));
        let deviations = Deviations {
            sizes: &case.imperfections,
            orientation: Orientation::plain(),
            mode: None,
        };
        let mut column = Column::of_setup(&case, Idealisation::AsBuilt, 64, Some(&deviations));
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let mut state = start(&mut column, &mut newton, &guess, 0.0)
            .expect("starts")
            .state;
        let step = 0.001 / column.axial_compliance();
        let mut iterations = 0;
        let counted = allocation_counter::measure(|| {
            for i in 1..=160 {
                column.depart(&state);
                newton
                    .solve_at_load(&mut column, &mut state, f64::from(i) * step)
                    .expect("solves");
                iterations += newton.iterations;
            }
        });
        assert!(iterations > 160, "{iterations}");
        let leans = state.side.iter().any(|push| *push != 0.0);
        assert_eq!(leans, reach.is_some());
        assert_eq!(counted.count_total, 0);
    }
}
