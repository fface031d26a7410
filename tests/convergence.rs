//! How fast the column's answers converge with the mesh, and that they do not lock.
//!
//! A rotation of degree four and forces that balance exactly make an error of order 2·4 = 8 in
//! critical loads and in what happens at the nodes (superconvergence, common knowledge of finite
//! elements); what a test asserts is the observed order.

mod fixture;
mod reference;

use coilstay::column::{
    Column, ColumnState, EndLaws, Hold, Idealisation, NaturalShape, NodeLoad, StraightScan,
};
use coilstay::criteria::critical_share;
use coilstay::setup::{Orientation, Setup, Support};
use coilstay::solve::Newton;
use coilstay::spring::Section;
use fixture::setup;
use reference::closed_form;
use reference::shooting::{Parameter, Problem, Rod, Seat};

/// Meshes between which the order is observed: errors well above round-off on the finest.
const MESHES: [usize; 3] = [2, 4, 8];

/// Asserts the order between successive meshes.
fn assert_order(what: &str, errors: &[f64]) {
    for pair in errors.windows(2) {
        let order = (pair[0] / pair[1]).log2();
        assert!(
            order > 7.5 && pair[0] > 1e-12,
            "{what}: order {order} of {errors:?}"
        );
    }
}

fn critical(setup: &Setup, elements: usize) -> f64 {
    let mut column = Column::of_setup(setup, Idealisation::WholeLength, elements, None);
    StraightScan::new(&mut column)
        .buckling()
        .expect("buckles")
        .shortening
}

/// ξ_cr against the closed form (EN 13906-1, from memory; Shigley, seen) and against the exact
/// clamped–hinged root.
#[test]
fn critical_deflection_has_order_eight() {
    let ends = [
        (Support::clamped(), Support::clamped(), 0.5),
        (Support::clamped(), Support::sliding(), 1.0),
        (Support::hinged(), Support::hinged(), 1.0),
    ];
    for (bottom, top, alpha) in ends {
        for effective in [2.7, 4.0, 10.0] {
            let setup = setup(effective / alpha, 2.6, bottom, top);
            let length = setup.spring.free_length;
            let exact = critical_share(&setup.spring.section(length), alpha * length);
            let exact = exact.expect("buckles");
            let errors = MESHES.map(|n| (critical(&setup, n) / exact - 1.0).abs());
            assert_order(&format!("α {alpha}, λ {effective}"), &errors);
        }
    }
    let setup = setup(5.0, 2.6, Support::clamped(), Support::hinged());
    let exact = closed_form::clamped_hinged(2.6, 5.0).expect("buckles");
    let errors = MESHES.map(|n| (critical(&setup, n) / exact - 1.0).abs());
    assert_order("clamped–hinged", &errors);
}

/// Bow, shortening and transverse force of imperfect columns at a fixed load, at 90 % of the
/// critical one, against shooting at 1e-13. Two elements are too few there to show the order yet.
#[test]
fn an_imperfect_path_has_order_eight() {
    let hinged = Problem {
        rod: Rod::of_spring(2.6, 4.0).bowed(0.02),
        bottom: Seat::HINGED,
        top: Seat::HINGED,
    };
    let tilted = Problem {
        rod: Rod::of_spring(2.6, 5.0).bowed(0.02),
        bottom: Seat {
            angle: 0.03,
            ..Seat::CLAMPED
        },
        top: Seat::HINGED,
    };
    for (problem, slenderness, ends, load) in [
        (&hinged, 4.0, (Support::hinged(), Support::hinged()), 0.18),
        (
            &tilted,
            5.0,
            (
                Support {
                    tilt: 0.03,
                    ..Support::clamped()
                },
                Support::hinged(),
            ),
            0.24,
        ),
    ] {
        let state = problem.loaded(Parameter::Load, load).expect("follows");
        let middle = problem.profile(&state, &[0.5])[0];
        let exact = [middle.y, state.shortening, state.top.theta];
        let mut case = setup(slenderness, 2.6, ends.0, ends.1);
        let length = case.spring.free_length;
        case.imperfections.bow = 0.02 * length;
        let at = |elements: usize| {
            let mut column = deviating(&case, elements);
            let mut newton = Newton::new(&column);
            let mut state = column.first_guess();
            let unit = case.spring.rate() * length / column.scale.force;
            for part in 1..=10 {
                let load = load * unit * f64::from(part) / 10.0;
                newton
                    .solve_at_load(&mut column, &mut state, load)
                    .expect("solves");
            }
            let (top, middle) = (&state.nodes[elements], &state.nodes[elements / 2]);
            [middle[1], 1.0 - top[0], top[2]]
        };
        let found = [4, 8, 16].map(at);
        for (i, exact) in exact.iter().enumerate() {
            let errors = found.map(|f| (f[i] / exact - 1.0).abs());
            assert_order(&format!("Λ {slenderness}, quantity {i}"), &errors);
        }
    }
}

fn deviating(setup: &Setup, elements: usize) -> Column {
    let deviations = coilstay::column::Deviations {
        sizes: &setup.imperfections,
        orientation: Orientation::plain(),
        mode: None,
    };
    Column::of_setup(setup, Idealisation::AsBuilt, elements, Some(&deviations))
}

/// Critical load P L²/EI of a hinged column by halving on the pivot count, which needs no axial
/// compliance.
fn hinged_load(section: &dyn Fn(f64) -> Section, elements: usize) -> f64 {
    let mut column = Column::new(1.0, elements, section, &NaturalShape::straight()).held(
        EndLaws([Hold::Held(0.0), Hold::Held(0.0), Hold::Free]),
        EndLaws([Hold::Free, Hold::Held(0.0), Hold::Free]),
    );
    let mut newton = Newton::new(&column);
    let (mut low, mut high) = (0.0, 40.0);
    while high - low > 1e-13 * high {
        let middle = 0.5 * (low + high);
        let state = column.straight_state(middle);
        if newton.evaluate(&mut column, &state, middle) == 0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    low
}

/// No locking: on the same mesh the error is within a factor of two the same for GA·L²/EI from 10
/// to 1e9 and infinite, and for EA alike. The exact load of every pair is the smaller root of
/// P(1 − P/EA + P/GA) = π²EI/L² (derived in `reference::closed_form`).
#[test]
fn nothing_locks() {
    let exact = |axial: f64, shear: f64| {
        let c = 1.0 / axial - 1.0 / shear;
        let euler = std::f64::consts::PI.powi(2);
        2.0 * euler / (1.0 + (1.0 - 4.0 * c * euler).sqrt())
    };
    let inf = f64::INFINITY;
    for shear in [10.0, 1e3, 1e6, 1e9, inf] {
        for axial in [1e2, 1e6, inf] {
            let section = Section {
                axial,
                shear,
                bending: 1.0,
            };
            let load = exact(axial, shear);
            let errors = MESHES.map(|n| (hinged_load(&|_| section, n) / load - 1.0).abs());
            assert_order(&format!("EA {axial}, GA {shear}"), &errors);
            assert!(
                errors[0] < 3.2e-6 && errors[1] < 1.3e-8 && errors[2] < 5.1e-11,
                "EA {axial}, GA {shear}: {errors:?}"
            );
        }
    }
    // Bent far: the cantilever of Mattiasson under P L²/EI = 5, by four elements.
    let tip = |shear: f64, axial: f64, elements: usize| -> ColumnState {
        let section = Section {
            axial,
            shear,
            bending: 1.0,
        };
        let mut column = Column::new(1.0, elements, &|_| section, &NaturalShape::straight())
            .loaded(&[NodeLoad {
                node: elements,
                load: [0.0, 1.0, 0.0],
            }]);
        let mut newton = Newton::new(&column);
        let mut state = column.first_guess();
        for load in 1..=5 {
            newton
                .solve_at_load(&mut column, &mut state, f64::from(load))
                .expect("solves");
        }
        state
    };
    let plain = tip(inf, inf, 4).nodes[4][1];
    let fine = tip(inf, inf, 32).nodes[32][1];
    assert!((plain / fine - 1.0).abs() < 1e-7, "{plain} {fine}");
    for (shear, axial) in [(1e6, inf), (inf, 1e6), (1e6, 1e6), (1e9, 1e9)] {
        let (coarse, fine) = (
            tip(shear, axial, 4).nodes[4][1],
            tip(shear, axial, 32).nodes[32][1],
        );
        assert!((coarse / fine - 1.0).abs() < 1e-7, "{coarse} {fine}");
        assert!((coarse / plain - 1.0).abs() < 1e-5, "{coarse} {plain}");
    }
}

/// A section that varies: EI = EI0 (1 + s)² along a hinged column that neither shortens nor shears.
/// Its equation is Euler's, with solutions √x sin(β ln x), β² = P L²/EI0 − 1/4, so that
/// P L²/EI0 = 1/4 + (π/ln 2)². Source: Timoshenko & Gere, Theory of Elastic Stability, bars of
/// varying section (from memory; derived here).
#[test]
fn a_tapered_column_meets_its_load() {
    let taper = |s: f64| Section {
        axial: f64::INFINITY,
        shear: f64::INFINITY,
        bending: (1.0 + s).powi(2),
    };
    let exact = 0.25 + (std::f64::consts::PI / 2.0_f64.ln()).powi(2);
    let error = |n: usize| (hinged_load(&taper, n) / exact - 1.0).abs();
    let orders = [2, 4, 8].map(|n| (error(n) / error(2 * n)).log2());
    // On its way to 8: the taper over one element is not small on the coarse meshes.
    assert!(orders[0] < orders[1] && orders[1] < orders[2], "{orders:?}");
    assert!(orders[2] > 7.5 && orders[2] < 8.5, "{orders:?}");
}
