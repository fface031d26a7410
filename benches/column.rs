//! Timings of the column: element chain, factorisation, Newton step, critical deflection, path.

use coilstay::column::{Column, EndLaws, Hold, NaturalShape, StraightScan};
use coilstay::solve::{Assembled, Factorisation, Newton, PathSettings, System, follow, start};
use coilstay::spring::Section;
use criterion::{BenchmarkId, Criterion, criterion_group, criterion_main};
use std::hint::black_box;

/// Spring column of Λ = 6, E/G = 2.6, clamped, the top seat tilted by `tilt`.
fn column(elements: usize, tilt: f64) -> Column {
    let (slenderness, r) = (6.0, 2.6);
    let section = Section {
        axial: slenderness,
        shear: r * slenderness,
        bending: slenderness * r / (2.0 * (2.0 + r)),
    };
    Column::new(
        slenderness,
        elements,
        &|_| section,
        &NaturalShape::straight(),
    )
    .held(
        EndLaws([Hold::Held(0.0); 3]),
        EndLaws([Hold::Free, Hold::Held(0.0), Hold::Held(tilt)]),
    )
}

fn newton_parts(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("newton");
    for elements in [16, 64, 256] {
        let mut column = column(elements, 0.02);
        let mut newton = Newton::new(&column);
        let mut state = column.first_guess();
        let solved = newton.solve_at_load(&mut column, &mut state, 10.0);
        assert!(solved.is_ok());
        let mut assembled = Assembled::zero(elements);
        group.bench_function(BenchmarkId::new("assemble", elements), |b| {
            b.iter(|| column.assemble(black_box(&state), 10.0, &mut assembled));
        });
        let mut factor = Factorisation::with_rows(elements + 1);
        group.bench_function(BenchmarkId::new("factor", elements), |b| {
            b.iter(|| factor.factor(black_box(&assembled.tangent)));
        });
        let mut right = assembled.residual.clone();
        group.bench_function(BenchmarkId::new("solve", elements), |b| {
            b.iter(|| factor.solve(black_box(&mut right)));
        });
        let mut step = state.clone();
        group.bench_function(BenchmarkId::new("whole step", elements), |b| {
            b.iter(|| {
                column.assemble(black_box(&state), 10.0, &mut assembled);
                factor.factor(&assembled.tangent);
                for (step, residual) in step.nodes.iter_mut().zip(&assembled.residual) {
                    *step = -residual;
                }
                factor.solve(&mut step.nodes);
                column.recover(&mut step, true);
                state.add(1.0, &step);
            });
        });
    }
    group.finish();
}

fn answers(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("answers");
    group.sample_size(30);
    let mut perfect = column(32, 0.0);
    group.bench_function("straight critical deflection, 32 elements", |b| {
        b.iter(|| StraightScan::new(black_box(&mut perfect)).buckling());
    });
    let mut tilted = column(32, 0.02);
    let settings = PathSettings {
        most_points: 100,
        ..PathSettings::default()
    };
    group.bench_function("imperfect path of 100 points, 32 elements", |b| {
        b.iter(|| {
            let mut newton = Newton::new(&tilted);
            let guess = tilted.first_guess();
            let first = start(&mut tilted, &mut newton, &guess, 0.0);
            let mut points: Vec<_> = first.into_iter().collect();
            let ended = follow(&mut tilted, &mut newton, &mut points, &settings, |_| false);
            assert_eq!(points.len(), 100);
            ended
        });
    });
    group.finish();
}

criterion_group!(benches, newton_parts, answers);
criterion_main!(benches);
