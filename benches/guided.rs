//! A path between walls against the same without, in one run: 200 points at 64 elements, contact
//! changes included, with and without friction; and how the cost grows with the number of elements.
//!
//! `cargo bench --bench guided`

use coilstay::column::{Column, EndLaws, Hold, NaturalShape, Wall};
use coilstay::solve::{Newton, PathSettings, follow, start};
use coilstay::spring::Section;
use std::time::Instant;

const POINTS: usize = 200;
const REPEATS: usize = 15;

/// Spring column of Λ = 8, E/G = 2.6, hinged, with a bow of 1 % of its length.
fn column(elements: usize, wall: Option<Wall>) -> Column {
    let (slenderness, r) = (8.0, 2.6);
    let section = Section {
        axial: 1.0,
        shear: r,
        bending: r / (2.0 * (2.0 + r)) / (slenderness * slenderness),
    };
    let bow = 0.01;
    let shape = NaturalShape {
        angle: &|s| bow * std::f64::consts::PI * (std::f64::consts::PI * s).cos(),
        curvature: &|s| -bow * std::f64::consts::PI.powi(2) * (std::f64::consts::PI * s).sin(),
    };
    let held = |axial| EndLaws([axial, Hold::Held(0.0), Hold::Free]);
    Column::new(1.0, elements, &|_| section, &shape)
        .held(held(Hold::Held(0.0)), held(Hold::Free))
        .with_guides(wall.into_iter().collect())
        .with_load_scale(10.0)
}

/// Median time of a path of 200 points, s; how many of them lean, and Newton's iterations.
fn path(elements: usize, wall: Option<Wall>) -> (f64, usize, usize) {
    let mut column = column(elements, wall);
    let settings = PathSettings {
        most_points: POINTS,
        ..PathSettings::default()
    };
    let mut times = Vec::new();
    let (mut leaning, mut iterations) = (0, 0);
    for _ in 0..REPEATS {
        let begin = Instant::now();
        let mut newton = Newton::new(&column);
        let guess = column.first_guess();
        let first = start(&mut column, &mut newton, &guess, 0.0);
        let mut points: Vec<_> = first.into_iter().collect();
        let (_, walk) = follow(&mut column, &mut newton, &mut points, &settings, |_| false);
        times.push(begin.elapsed().as_secs_f64());
        assert_eq!(points.len(), POINTS);
        let leans = |side: &[f64]| side.iter().any(|push| *push != 0.0);
        leaning = points.iter().filter(|p| leans(&p.state.side)).count();
        iterations = walk.iterations;
    }
    times.sort_by(f64::total_cmp);
    (times[times.len() / 2], leaning, iterations)
}

fn main() {
    let smooth = Wall::plain(0.02);
    let rough = Wall {
        friction: 0.15,
        ..smooth
    };
    let (bare, _, bare_iterations) = path(64, None);
    println!("64 elements, {POINTS} points, median of {REPEATS}");
    println!(
        "  without walls     {:8.2} ms, {bare_iterations} iterations",
        1e3 * bare
    );
    for (name, wall) in [("between walls", smooth), ("with friction", rough)] {
        let (time, leaning, iterations) = path(64, Some(wall));
        println!(
            "  {name:<17} {:8.2} ms, {iterations} iterations, {leaning} points lean: {:.2} times",
            1e3 * time,
            time / bare
        );
    }
    println!("cost by elements, between walls (µs an element and iteration)");
    for elements in [16, 64, 256, 1024] {
        let (time, _, iterations) = path(elements, Some(smooth));
        println!(
            "  {elements:5} {:9.2} ms {iterations:6} iterations {:8.3}",
            1e3 * time,
            1e6 * time / (elements * iterations) as f64
        );
    }
}
