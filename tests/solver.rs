//! The solver of chained blocks against general dense and sparse ones, next to singular leading
//! parts, and on the column's own systems.

mod fixture;

use coilstay::column::{Column, ColumnState, Deviations, Idealisation};
use coilstay::setup::{Orientation, Restraint, Setup, Support};
use coilstay::solve::{
    Assembled, BlockTridiagonal, Bordered, Factored, Factorisation, Newton, System,
};
use fixture::setup;
use nalgebra::{DMatrix, DVector, Matrix3, SymmetricEigen, Vector3};
use nalgebra_sparse::factorization::CscCholesky;
use nalgebra_sparse::{CooMatrix, CscMatrix};
use proptest::prelude::*;

/// The matrix written out.
fn dense(matrix: &BlockTridiagonal<3>) -> DMatrix<f64> {
    let n = matrix.rows();
    let mut out = DMatrix::zeros(3 * n, 3 * n);
    for i in 0..n {
        out.view_mut((3 * i, 3 * i), (3, 3))
            .copy_from(&matrix.diagonal[i]);
        if i + 1 < n {
            out.view_mut((3 * i, 3 * i + 3), (3, 3))
                .copy_from(&matrix.right[i]);
            out.view_mut((3 * i + 3, 3 * i), (3, 3))
                .copy_from(&matrix.right[i].transpose());
        }
    }
    out
}

fn flat(blocks: &[Vector3<f64>]) -> DVector<f64> {
    DVector::from_iterator(
        3 * blocks.len(),
        blocks.iter().flat_map(|block| block.iter().copied()),
    )
}

/// A random indefinite matrix from numbers in [−1, 1], 15 a row.
fn random(numbers: &[f64]) -> BlockTridiagonal<3> {
    let rows = numbers.len() / 15;
    let mut matrix = BlockTridiagonal::zero(rows);
    for i in 0..rows {
        let part = &numbers[15 * i..15 * (i + 1)];
        let upper = Matrix3::from_column_slice(&[
            part[0], 0.0, 0.0, part[1], part[2], 0.0, part[3], part[4], part[5],
        ]);
        matrix.diagonal[i] = upper + upper.transpose();
        if i + 1 < rows {
            matrix.right[i] = Matrix3::from_column_slice(&part[6..15]);
        }
    }
    matrix
}

/// Shifts the diagonal so that the leading `rows` block rows have an eigenvalue of this size: of
/// the block Schur complement a part that is nearly singular.
fn make_leading_part_singular(matrix: &mut BlockTridiagonal<3>, rows: usize, size: f64) {
    let whole = dense(matrix);
    let part = whole.view((0, 0), (3 * rows, 3 * rows)).into_owned();
    let values = part.symmetric_eigenvalues();
    let nearest = values
        .iter()
        .copied()
        .min_by(|a, b| a.abs().total_cmp(&b.abs()));
    let shift = nearest.unwrap_or(0.0) - size;
    for block in &mut matrix.diagonal[..rows] {
        *block -= Matrix3::identity() * shift;
    }
}

/// Two leading parts in a row, both nearly singular: rows 0 to i alone have the eigenvalue `first`,
/// rows 0 to i+1 `second`.
fn make_two_leading_parts_singular(matrix: &mut BlockTridiagonal<3>, i: usize, sizes: [f64; 2]) {
    // The last diagonal block of a leading part shifts that part's eigenvalues and no smaller
    // part's. Newton's method on the one nearest to its size.
    for (rows, size) in [(i + 1, sizes[0]), (i + 2, sizes[1])] {
        for _ in 0..60 {
            let whole = dense(matrix);
            let part = whole.view((0, 0), (3 * rows, 3 * rows)).into_owned();
            let pairs = SymmetricEigen::new(part);
            let near = |k: &usize| (pairs.eigenvalues[*k] - size).abs();
            let k = (0..3 * rows).min_by(|a, b| near(a).total_cmp(&near(b)));
            let k = k.unwrap_or(0);
            let tail = pairs
                .eigenvectors
                .column(k)
                .rows(3 * rows - 3, 3)
                .norm_squared();
            let shift = (pairs.eigenvalues[k] - size) / tail.max(0.05);
            matrix.diagonal[rows - 1] -= Matrix3::identity() * shift;
        }
    }
}

/// Largest residual over (size of matrix × size of solution + right side): the backward error.
fn backward_error(matrix: &BlockTridiagonal<3>, x: &[Vector3<f64>], b: &[Vector3<f64>]) -> f64 {
    let mut product = vec![Vector3::zeros(); x.len()];
    matrix.multiply(x, &mut product);
    let largest = |blocks: &[Vector3<f64>]| blocks.iter().map(|v| v.amax()).fold(0.0, f64::max);
    let residual: Vec<_> = product.iter().zip(b).map(|(p, b)| p - b).collect();
    let size = matrix.diagonal.iter().chain(&matrix.right);
    let size = size.map(|block| block.amax()).fold(0.0, f64::max);
    largest(&residual) / (size * largest(x) + largest(b))
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 300,
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    /// Next to a singular leading part the solution keeps nine digits and more, and one correction
    /// brings the residual to round-off; the pivot count is the number of negative eigenvalues that a
    /// dense eigen-solver finds.
    #[test]
    fn a_singular_leading_part_costs_nothing(
        numbers in prop::collection::vec(-1.0..1.0_f64, 15 * 7),
        rows in 1..7_usize,
        right in prop::collection::vec(-1.0..1.0_f64, 21),
    ) {
        for power in 0..=17 {
            let size = if power == 17 { 0.0 } else { 10.0_f64.powi(-power) };
            let mut matrix = random(&numbers);
            make_leading_part_singular(&mut matrix, rows, size);
            let values = SymmetricEigen::new(dense(&matrix)).eigenvalues;
            let smallest = values.iter().fold(f64::INFINITY, |s, v| s.min(v.abs()));
            prop_assume!(smallest > 1e-3);
            let mut factor = Factored::with_rows(7, true);
            factor.factor(&matrix);
            let negative = values.iter().filter(|v| **v < 0.0).count();
            prop_assert_eq!(factor.negatives(0) as usize, negative, "1e-{}, {} rows", power, rows);
            let b: Vec<Vector3<f64>> = right.chunks(3).map(Vector3::from_column_slice).collect();
            let mut x = b.clone();
            factor.solve(&mut x);
            let error = backward_error(&matrix, &x, &b);
            prop_assert!(error < 1e-9, "1e-{power}, {rows} rows: backward error {error:e}");
            let mut work = [b.clone(), b.clone()];
            let [one, two] = &mut work;
            x.copy_from_slice(&b);
            factor.solve_refined(&matrix, &mut x, one, two);
            let error = backward_error(&matrix, &x, &b);
            prop_assert!(error < 1e-14, "1e-{power}, {rows} rows: refined {error:e}");
        }
    }

    /// Two singular leading parts in a row: neither row nor pair is a good pivot, the better is taken.
    #[test]
    fn two_singular_leading_parts_in_a_row_cost_little(
        numbers in prop::collection::vec(-1.0..1.0_f64, 15 * 6),
        i in 0..4_usize,
        right in prop::collection::vec(-1.0..1.0_f64, 18),
    ) {
        for sizes in [[1e-4, 1e-12], [1e-12, 1e-4], [1e-5, 0.0], [1e-5, 1e-5]] {
            let mut matrix = random(&numbers);
            make_two_leading_parts_singular(&mut matrix, i, sizes);
            let values = SymmetricEigen::new(dense(&matrix)).eigenvalues;
            let smallest = values.iter().fold(f64::INFINITY, |s, v| s.min(v.abs()));
            prop_assume!(smallest > 1e-3);
            let mut factor = Factorisation::with_rows(6);
            factor.factor(&matrix);
            let b: Vec<Vector3<f64>> = right.chunks(3).map(Vector3::from_column_slice).collect();
            let mut x = b.clone();
            factor.solve(&mut x);
            let error = backward_error(&matrix, &x, &b);
            prop_assert!(error < 1e-8, "{sizes:?}, row {i}: backward error {error:e}");
            let negative = values.iter().filter(|v| **v < 0.0).count();
            prop_assert_eq!(factor.negatives as usize, negative);
        }
    }

    /// The bordered solve loses nothing where the matrix itself is singular: against a dense LU of
    /// the whole, at every distance from singular and on it.
    #[test]
    fn the_bordered_solve_is_exact_at_a_singular_matrix(
        numbers in prop::collection::vec(-1.0..1.0_f64, 15 * 5),
        border in prop::collection::vec(-1.0..1.0_f64, 45),
        corner in -1.0..1.0_f64,
    ) {
        let blocks = |part: &[f64]| -> Vec<Vector3<f64>> {
            part.chunks(3).map(Vector3::from_column_slice).collect()
        };
        let (b, c, f) = (blocks(&border[..15]), blocks(&border[15..30]), blocks(&border[30..]));
        for power in (0..=17).step_by(2) {
            let size = if power == 16 { 0.0 } else { 10.0_f64.powi(-power) };
            let mut matrix = random(&numbers);
            make_leading_part_singular(&mut matrix, 5, size);
            let mut whole = DMatrix::zeros(16, 16);
            whole.view_mut((0, 0), (15, 15)).copy_from(&dense(&matrix));
            whole.view_mut((0, 15), (15, 1)).copy_from(&flat(&b));
            whole.view_mut((15, 0), (1, 15)).copy_from(&flat(&c).transpose());
            whole[(15, 15)] = corner;
            let mut right = DVector::zeros(16);
            right.rows_mut(0, 15).copy_from(&flat(&f));
            right[15] = 0.7;
            let singular_values = whole.clone().singular_values();
            let condition = singular_values.max() / singular_values.min();
            prop_assume!(condition < 1e3);
            let exact = whole.lu().solve(&right).expect("regular");
            for symmetric in [true, false] {
            let mut factor = Factored::with_rows(5, symmetric);
            factor.factor(&matrix);
            let mut bordered = Bordered::with_rows(5);
            bordered.prepare(&factor, &b, &c, corner);
            let mut x = f.clone();
            let y = bordered.solve(&factor, &b, &c, corner, &mut x, 0.7);
            let wrong = (flat(&x) - exact.rows(0, 15)).amax().max((y - exact[15]).abs());
            prop_assert!(
                wrong < 1e-10 * condition * exact.amax().max(1.0),
                "1e-{power}: {wrong:e}, condition {condition:e}"
            );
            }
        }
    }
}

/// Springs in supports of every kind, imperfect.
fn columns() -> Vec<(Setup, Column)> {
    let soft = |rotation: f64, sideways: f64| Support {
        rotation: Restraint::from_stiffness(rotation),
        sideways: Restraint::from_stiffness(sideways),
        tilt: 0.02,
        offset: 0.001,
        arm: 0.003,
        ..Support::clamped()
    };
    let inf = f64::INFINITY;
    [
        (6.0, Support::clamped(), Support::clamped()),
        (4.0, Support::hinged(), Support::hinged()),
        (3.0, Support::clamped(), Support::sliding()),
        (2.5, Support::clamped(), Support::free()),
        (5.0, soft(10.0, inf), soft(3.0, 2e4)),
        (5.0, soft(inf, 3e3), soft(0.5, 1e3)),
    ]
    .map(|(slenderness, bottom, top)| {
        let mut case = setup(slenderness, 2.6, bottom, top);
        case.imperfections.bow = 0.01 * case.spring.free_length;
        case.imperfections.eccentricity = 0.002;
        let deviations = Deviations {
            sizes: &case.imperfections,
            orientation: Orientation::plain(),
            mode: None,
        };
        let column = Column::of_setup(&case, Idealisation::AsBuilt, 6, Some(&deviations));
        (case, column)
    })
    .into()
}

/// States near the path at these parts of EA, bent at will: not in balance, as a solver meets them.
fn states(column: &Column) -> Vec<(ColumnState, f64)> {
    let mut states = Vec::new();
    for part in [-0.5, 0.05, 0.2, 0.5, 0.9] {
        for bent in [0.0, 0.3, 1.0] {
            let load = part / column.axial_compliance();
            let mut state = column.straight_state(load);
            for (i, node) in state.nodes.iter_mut().enumerate() {
                node[2] += bent * (1.7 * i as f64).sin();
                node[1] += 0.2 * bent * (0.9 * i as f64).sin();
            }
            for (e, inner) in state.inner.iter_mut().enumerate() {
                inner[0] += 0.1 * bent * (2.3 * e as f64).cos();
                inner[4] += 3.0 * bent;
            }
            states.push((state, load));
        }
    }
    states
}

/// The pivot count of the condensed column is the number of negative eigenvalues of the whole,
/// uncondensed tangent, by a dense eigen-solver, less the two forces of each element.
#[test]
fn the_pivot_count_is_the_number_of_negative_eigenvalues() {
    let mut seen = [0; 4];
    for (_, mut column) in columns() {
        let mut newton = Newton::new(&column);
        for (state, load) in states(&column) {
            let count = newton.evaluate(&mut column, &state, load) as usize;
            let whole = DMatrix::from(&column.uncondensed(&state));
            let size = whole.amax();
            let values = SymmetricEigen::new(whole).eigenvalues;
            let smallest = values.iter().fold(f64::INFINITY, |s, v| s.min(v.abs()));
            assert!(smallest > 1e-12 * size, "as good as singular: {smallest}");
            let negative = values.iter().filter(|v| **v < 0.0).count();
            assert_eq!(count, negative - 2 * column.elements());
            seen[count.min(3)] += 1;
        }
    }
    assert!(seen.iter().all(|times| *times > 0), "{seen:?}");
}

/// A Newton step of the condensed column, inner unknowns recovered, against a dense LU of the
/// uncondensed system; the residual of that system by differences of the condensed one would be
/// the same code, so its right side is a unit load on each node in turn.
#[test]
fn the_condensed_solve_meets_the_uncondensed_one() {
    for (_, mut column) in columns() {
        let mut newton = Newton::new(&column);
        for (state, load) in states(&column) {
            newton.evaluate(&mut column, &state, load);
            let n = column.elements();
            let whole = DMatrix::from(&column.uncondensed(&state));
            let scale = whole.clone().singular_values();
            let condition = scale.max() / scale.min();
            let whole = whole.lu();
            for place in [1, n / 2, n - 1] {
                let mut push = vec![Vector3::zeros(); n + 1];
                push[place] = Vector3::new(0.3, 1.0, -0.2);
                let mut right = DVector::zeros(8 * n + 3);
                right.rows_mut(8 * place, 3).copy_from(&push[place]);
                let exact = whole.solve(&right).expect("regular");
                newton.solve_linear(&mut push);
                let mut step = ColumnState::zero(n);
                step.nodes.copy_from_slice(&push);
                column.recover(&mut step, false);
                let mut wrong = 0.0_f64;
                for i in 0..=n {
                    wrong = wrong.max((exact.rows(8 * i, 3) - step.nodes[i]).amax());
                    if i < n {
                        wrong = wrong.max((exact.rows(8 * i + 3, 5) - step.inner[i]).amax());
                    }
                }
                let allowed = 1e-14 * condition * exact.amax();
                assert!(wrong < allowed, "{wrong:e}, condition {condition:e}");
            }
        }
    }
}

/// In a stable state the condensed tangent is positive definite: a general sparse Cholesky
/// factorises it and gives the same solution.
#[test]
fn a_stable_state_meets_sparse_cholesky() {
    for (case, mut column) in columns() {
        let mut newton = Newton::new(&column);
        let mut state = column.first_guess();
        let load = 0.02 * case.spring.rate() * case.spring.free_length / column.scale.force;
        newton
            .solve_at_load(&mut column, &mut state, load)
            .expect("solves");
        assert_eq!(newton.evaluate(&mut column, &state, load), 0);
        let mut assembled = Assembled::zero(column.elements());
        column.assemble(&state, load, &mut assembled);
        let whole = dense(&assembled.tangent);
        let sparse = CscMatrix::from(&CooMatrix::from(&whole));
        let factor = CscCholesky::factor(&sparse).expect("positive definite");
        let condition = whole.clone().symmetric_eigenvalues();
        let condition = condition.max() / condition.min();
        let mut push = vec![Vector3::new(0.4, -1.0, 0.2); column.elements() + 1];
        let right = flat(&push);
        newton.solve_linear(&mut push);
        let exact = factor.solve(&DMatrix::from_column_slice(
            right.len(),
            1,
            right.as_slice(),
        ));
        let wrong = (flat(&push) - exact.column(0)).amax();
        assert!(
            wrong < 1e-14 * condition * exact.amax(),
            "{wrong:e} {condition:e}"
        );
        // Past the critical load it is not.
        let load = 0.95 / column.axial_compliance();
        let state = column.straight_state(load);
        if newton.evaluate(&mut column, &state, load) > 0 {
            column.assemble(&state, load, &mut assembled);
            let sparse = CscMatrix::from(&CooMatrix::from(&dense(&assembled.tangent)));
            assert!(CscCholesky::factor(&sparse).is_err());
        }
    }
}
