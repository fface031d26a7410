//! Our side of the comparison that `against_scipy.py` runs: timings and numbers as JSON lines, and
//! the matrices of one Newton step as files of little-endian f64 in the directory given.
//!
//! `peer step DIR` · `peer path ELEMENTS …`

use coilstay::column::{Column, ColumnState, EndLaws, Hold, NaturalShape};
use coilstay::solve::{
    Assembled, Factorisation, Newton, PathPoint, PathSettings, System, follow, start,
};
use coilstay::spring::Section;
use nalgebra::{DMatrix, Vector3};
use serde_json::json;
use std::error::Error;
use std::hint::black_box;
use std::path::Path;
use std::time::Instant;

/// Free length over mean diameter.
const SLENDERNESS: f64 = 6.0;
/// E/G.
const RATIO: f64 = 2.6;
/// Section stiffnesses of a round spring for unit rate and unit mean diameter.
const SECTION: Section = Section {
    axial: SLENDERNESS,
    shear: RATIO * SLENDERNESS,
    bending: SLENDERNESS * RATIO / (2.0 * (2.0 + RATIO)),
};
/// Tilt of the top seat, rad.
const TILT: f64 = 0.02;
/// Elements of the Newton step.
const STEP_ELEMENTS: usize = 64;
/// Points of the path.
const POINTS: usize = 30;

/// Round spring column, clamped, the top seat tilted; lengths in mean diameters.
fn column(elements: usize) -> Column {
    Column::new(
        SLENDERNESS,
        elements,
        &|_| SECTION,
        &NaturalShape::straight(),
    )
    .held(
        EndLaws([Hold::Held(0.0); 3]),
        EndLaws([Hold::Free, Hold::Held(0.0), Hold::Held(TILT)]),
    )
}

/// Median time of one call, s, over `repeats` batches of `batch` calls.
fn median_seconds(repeats: usize, batch: usize, mut call: impl FnMut()) -> f64 {
    let mut times: Vec<f64> = (0..repeats)
        .map(|_| {
            let begin = Instant::now();
            for _ in 0..batch {
                call();
            }
            begin.elapsed().as_secs_f64() / batch as f64
        })
        .collect();
    times.sort_by(f64::total_cmp);
    times[repeats / 2]
}

/// Points of the path of the tilted column, from no load through bow-out.
fn follow_tilted(column: &mut Column, newton: &mut Newton<3, 5>) -> Vec<PathPoint<3, 5>> {
    let settings = PathSettings {
        first_step: 0.05,
        largest_step: 0.1,
        most_points: POINTS,
        ..PathSettings::default()
    };
    let guess = column.first_guess();
    let mut points: Vec<_> = start(column, newton, &guess, 0.0).into_iter().collect();
    let _ended = follow(column, newton, &mut points, &settings, |_| false);
    points
}

fn main() -> Result<(), Box<dyn Error>> {
    let arguments: Vec<String> = std::env::args().skip(1).collect();
    match arguments.iter().map(String::as_str).collect::<Vec<_>>()[..] {
        ["step", directory] => step(Path::new(directory)),
        ["path", ..] => arguments[1..]
            .iter()
            .try_for_each(|elements| path(elements.parse()?)),
        // `cargo bench` runs every target, with arguments of its own.
        _ => Ok(()),
    }
}

/// One whole Newton step: timings, and the systems it solves with a solution to hold against.
fn step(directory: &Path) -> Result<(), Box<dyn Error>> {
    let mut column = column(STEP_ELEMENTS);
    let mut newton = Newton::new(&column);
    let last = follow_tilted(&mut column, &mut newton)
        .pop()
        .ok_or("no path")?;
    let (mut state, load) = (last.state, last.load);
    let rows = STEP_ELEMENTS + 1;
    let mut assembled = Assembled::zero(STEP_ELEMENTS);
    let mut factor = Factorisation::with_rows(rows);

    // Answer of the column to its load pattern at this state: the right-hand side to compare on.
    let mut answer = state.clone();
    column.assemble(&state, load, &mut assembled);
    factor.factor(&assembled.tangent);
    answer.nodes.copy_from_slice(column.load_pattern());
    factor.solve(&mut answer.nodes);
    column.recover(&mut answer, false);
    let uncondensed = DMatrix::from(&column.uncondensed(&state));
    let pattern: Vec<Vector3<f64>> = column.load_pattern().to_vec();
    let nodes: Vec<f64> = answer.nodes.iter().flatten().copied().collect();
    write(directory, "uncondensed", uncondensed.as_slice())?;
    write(directory, "uncondensed_right", &interleaved(&pattern, None))?;
    write(
        directory,
        "uncondensed_answer",
        &interleaved(&answer.nodes, Some(&answer)),
    )?;
    write(directory, "condensed", &dense(&assembled))?;
    write(directory, "condensed_right", &flat(&pattern))?;
    write(directory, "condensed_answer", &nodes)?;

    let assemble = median_seconds(200, 20, || {
        column.assemble(black_box(&state), load, &mut assembled);
    });
    let factored = median_seconds(200, 20, || factor.factor(black_box(&assembled.tangent)));
    let mut right = assembled.residual.clone();
    let solved = median_seconds(200, 20, || factor.solve(black_box(&mut right)));
    let mut moved = state.clone();
    let whole = median_seconds(200, 20, || {
        column.assemble(black_box(&state), load, &mut assembled);
        factor.factor(&assembled.tangent);
        for (step, residual) in moved.nodes.iter_mut().zip(&assembled.residual) {
            *step = -residual;
        }
        factor.solve(&mut moved.nodes);
        column.recover(&mut moved, true);
        state.add(1.0, &moved);
    });
    println!(
        "{}",
        json!({
            "elements": STEP_ELEMENTS,
            "assemble_s": assemble,
            "factor_s": factored,
            "solve_s": solved,
            "whole_step_s": whole,
        })
    );
    Ok(())
}

fn flat(nodes: &[Vector3<f64>]) -> Vec<f64> {
    nodes.iter().flatten().copied().collect()
}

/// Node blocks with the inner blocks between them (zero where none are given), as the uncondensed
/// system orders them.
fn interleaved(nodes: &[Vector3<f64>], inner: Option<&ColumnState>) -> Vec<f64> {
    let mut all = Vec::new();
    for (i, node) in nodes.iter().enumerate() {
        all.extend(node);
        if i + 1 < nodes.len() {
            match inner {
                Some(state) => all.extend(&state.inner[i]),
                None => all.extend([0.0; 5]),
            }
        }
    }
    all
}

/// The condensed tangent as a dense matrix, column by column.
fn dense(assembled: &Assembled<3>) -> Vec<f64> {
    let tangent = &assembled.tangent;
    let size = 3 * tangent.rows();
    let mut matrix = nalgebra::DMatrix::<f64>::zeros(size, size);
    for (i, block) in tangent.diagonal.iter().enumerate() {
        matrix.view_mut((3 * i, 3 * i), (3, 3)).copy_from(block);
    }
    for (i, block) in tangent.right.iter().enumerate() {
        matrix.view_mut((3 * i, 3 * i + 3), (3, 3)).copy_from(block);
        matrix
            .view_mut((3 * i + 3, 3 * i), (3, 3))
            .copy_from(&block.transpose());
    }
    matrix.as_slice().to_vec()
}

fn write(directory: &Path, name: &str, values: &[f64]) -> std::io::Result<()> {
    let bytes: Vec<u8> = values.iter().flat_map(|v| v.to_le_bytes()).collect();
    std::fs::write(directory.join(format!("{name}.f64")), bytes)
}

/// Follows the tilted column through bow-out with `elements` elements: time per point, and at
/// each point its shortening, force and moment at the bottom, and the sideways position at
/// mid-height, where an even number of elements has a node.
fn path(elements: usize) -> Result<(), Box<dyn Error>> {
    let mut column = column(elements);
    let mut newton = Newton::new(&column);
    let mut points = Vec::new();
    let seconds = median_seconds(51, 1, || points = follow_tilted(&mut column, &mut newton));
    let mut stations = Vec::new();
    let rows: Vec<_> = points
        .iter()
        .map(|point| {
            column.profile(&point.state, &mut stations);
            let last = stations[stations.len() - 1];
            json!({
                "shortening": 1.0 - last.x,
                // The bottom section does not turn: its N, Q are F_x, F_y.
                "force": [stations[0].axial_force, stations[0].shear_force],
                "moment": stations[0].moment,
                "aside_middle": point.state.nodes[elements / 2][1],
            })
        })
        .collect();
    println!(
        "{}",
        json!({
            "elements": elements,
            "column": {
                "axial_compliance": column.scale.force / SECTION.axial,
                "shear_compliance": column.scale.force / SECTION.shear,
                "tilt": TILT,
            },
            "seconds_per_point": seconds / points.len() as f64,
            "points": rows,
        })
    );
    Ok(())
}
