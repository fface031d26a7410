//! The column between walls.

use coilstay::column::{Column, Contact, EndLaws, Hold, NaturalShape, Wall};
use coilstay::solve::{Newton, PathSettings, follow, start};
use coilstay::spring::Section;
use std::f64::consts::PI;

fn section(r: f64, slenderness: f64) -> Section {
    // k L0 = 1, L0 = 1: EA = 1, GA = r, EI = D² r/(2(2+r)).
    Section {
        axial: 1.0,
        shear: r,
        bending: r / (2.0 * (2.0 + r)) / slenderness.powi(2),
    }
}

fn go(
    slender: f64,
    c: f64,
    mu: f64,
    to: f64,
    elements: usize,
    show: usize,
    clamped: bool,
    until: f64,
    top: bool,
) {
    let section = section(2.6, slender);
    let bow = 0.002;
    let shape = NaturalShape {
        angle: &|s| bow * PI * (PI * s).cos(),
        curvature: &|s| -bow * PI * PI * (PI * s).sin(),
    };
    let held = |axial| {
        EndLaws([
            axial,
            Hold::Held(0.0),
            if clamped { Hold::Held(0.0) } else { Hold::Free },
        ])
    };
    let mut column = Column::new(1.0, elements, &|_| section, &shape)
        .held(held(Hold::Held(0.0)), held(Hold::Free))
        .with_guides(vec![Wall {
            friction: mu,
            to,
            corner: 0.01,
            from_top: top,
            ..Wall::plain(c)
        }]);
    let mut newton = Newton::new(&column);
    let guess = column.first_guess();
    let first = start(&mut column, &mut newton, &guess, 0.0).expect("starts");
    let mut points = vec![first];
    let clock = std::time::Instant::now();
    let (outcome, walk) = follow(
        &mut column,
        &mut newton,
        &mut points,
        &PathSettings::default(),
        |points| {
            points
                .last()
                .is_some_and(|p| p.state.nodes[elements][0] < until)
        },
    );
    println!(
        "slender {slender} c {c} mu {mu} to {to} el {elements} {outcome:?} {walk:?} {:?}",
        clock.elapsed()
    );
    let mut contacts: Vec<Contact> = Vec::new();
    let mut stations = Vec::new();
    for (i, point) in points.iter().enumerate() {
        if i % show != 0 && i + 3 < points.len() {
            continue;
        }
        column.contacts(&point.state, &mut contacts);
        column.profile(&point.state, &mut stations);
        let room = stations
            .iter()
            .map(|s| column.room(&point.state, s.x, s.y, s.axial_force))
            .fold(1.0, f64::min);
        let total: f64 = contacts.iter().map(|c| c.push).sum();
        let drag: f64 = contacts.iter().map(|c| c.drag).sum();
        print!(
            "x {:.5} P {:.6} dP {:.2} neg {} pads {} push {:.5} drag {:.5} room {:.2e} ",
            point.state.nodes[elements][0],
            point.load,
            point.load_direction,
            point.negatives,
            contacts.len(),
            total,
            drag,
            room
        );
        let mut before = -1.0;
        for c in &contacts {
            if c.place - before > 1.5 * c.width {
                print!("[{:.3}{}", c.place, if c.side > 0.0 { '+' } else { '-' });
            }
            before = c.place;
        }
        println!();
    }
}

#[test]
fn look() {
    let get = |k: &str, d: f64| {
        std::env::var(k)
            .ok()
            .and_then(|v| v.parse().ok())
            .unwrap_or(d)
    };
    go(
        get("L", 6.0),
        get("C", 0.02),
        get("MU", 0.0),
        get("TO", f64::INFINITY),
        get("N", 64.0) as usize,
        get("SHOW", 20.0) as usize,
        get("CL", 0.0) > 0.0,
        get("UNTIL", 0.4),
        get("TOP", 0.0) > 0.0,
    );
}
