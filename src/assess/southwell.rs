//! Southwell's estimate of the critical deflection from the path before the bow-out.
//!
//! In the linear column a bow in the shape of the mode grows as `δ = A q/(q_cr − q)` with
//! `q = ξ(1 − mξ)`, ξ the share of the deformable length, δ the growth of the height taken as
//! `v/(1 − mξ) − A`. So `δ/q = (δ + A)/q_cr`: a straight line of slope 1/q_cr against δ. Other
//! imperfections follow it near q_cr only.
//!
//! Source: Southwell, Proc. R. Soc. A 135 (1932) 601–616, for the plot; its variables for a spring
//! derived here.

use super::observe::{Observer, Solved};
use crate::column::{Buckling, Column};
use crate::result::Southwell;
use crate::setup::Setup;

/// Part of the way to the critical deflection from which points are taken.
const FROM: f64 = 0.4;
/// … up to which.
const TO: f64 = 0.95;
/// Fewest points for a line.
const FEWEST: usize = 5;

pub(super) fn estimate(
    setup: &Setup,
    column: &Column,
    observer: &Observer,
    points: &[Solved],
    buckling: &Buckling,
) -> Option<Southwell> {
    let spring = &setup.spring;
    let section = spring.section(spring.deformable_length());
    let m = 1.0 - section.axial / section.shear;
    let compliance = column.axial_compliance();
    let share = |point: &Solved| point.load * compliance;
    let used: Vec<&Solved> = points
        .iter()
        .take_while(|point| point.load_direction > 0.0 && share(point) < TO * buckling.shortening)
        .filter(|point| share(point) > FROM * buckling.shortening)
        .collect();
    let mut profile = Vec::new();
    column.profile(&used.last()?.state, &mut profile);
    let growth_at = |i: usize, y: f64| y - observer.start()[i].y;
    let place = (0..profile.len()).max_by(|a, b| {
        growth_at(*a, profile[*a].y)
            .abs()
            .total_cmp(&growth_at(*b, profile[*b].y).abs())
    })?;
    let before = observer.start()[place].y;
    let mut line: Vec<(f64, f64)> = Vec::with_capacity(used.len());
    for point in &used {
        column.profile(&point.state, &mut profile);
        let xi = share(point);
        let growth = profile[place].y / (1.0 - m * xi) - before;
        line.push((growth, growth / (xi * (1.0 - m * xi))));
    }
    let smallest = 1e-9;
    if line.len() < FEWEST || line.iter().all(|(growth, _)| growth.abs() < smallest) {
        return None;
    }
    let (slope, r_squared) = straight_line(&line)?;
    let q = 1.0 / slope;
    let under = 1.0 - 4.0 * m * q;
    if !(q > 0.0 && under >= 0.0) {
        return None;
    }
    let xi = 2.0 * q / (1.0 + under.sqrt());
    let force = xi / compliance * column.scale.force;
    Some(Southwell {
        deflection_m: xi * column.scale.length + setup.seats_give(force).0,
        r_squared,
        points: line.len(),
    })
}

/// Slope and coefficient of determination of the least-squares line.
fn straight_line(points: &[(f64, f64)]) -> Option<(f64, f64)> {
    let n = points.len() as f64;
    let (mean_x, mean_y) = (
        points.iter().map(|p| p.0).sum::<f64>() / n,
        points.iter().map(|p| p.1).sum::<f64>() / n,
    );
    let sum = |f: &dyn Fn(f64, f64) -> f64| -> f64 {
        points.iter().map(|p| f(p.0 - mean_x, p.1 - mean_y)).sum()
    };
    let (xx, xy, yy) = (sum(&|x, _| x * x), sum(&|x, y| x * y), sum(&|_, y| y * y));
    (xx > 0.0 && yy > 0.0).then(|| (xy / xx, xy * xy / (xx * yy)))
}
