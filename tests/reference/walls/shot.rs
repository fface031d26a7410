//! A symmetric column against one wall, by shooting: the minimum's own check for a real spring.
//!
//! A column with shear does not touch a smooth wall in a point. At a point force R of the wall, H
//! jumps by R and y' by R/GA to the *outside* of the wall: on one side of it the axis would be
//! beyond. So it lies against the wall over a length from the first touch on, along which y' = 0:
//!
//!     (1 + ε) sin θ + γ cos θ = 0,   N = −P cos θ + H sin θ = EA ε,   Q = P sin θ + H cos θ = GA γ
//!
//! gives H = −(sin θ + P sin θ cos θ (1/GA − 1/EA))/(sin²θ/EA + cos²θ/GA) as a function of θ, and
//! H' is the wall's force per length, M' = −x' H, θ' = κ0 + M/EI. At the edge of the contact H, M, θ are
//! continuous. For small θ it decays from the edge as sinh with the length
//! √(EI/((a + b)(GA(a + b) − P))), about D/3 for a round wire: of the order of the coil, so not small.
//! As GA grows it becomes the point and the two edge forces of the bending column.
//!
//! Unknown: P, H of the free part, the end's θ (hinged) or M (clamped), and where the contact begins.

use super::closed_form::Ends;
use crate::reference::shooting::Rod;
use nalgebra::{Matrix4, Vector4};

/// Half of a symmetric column of length 1 between a seat at S = 0 and its middle, pressed against
/// the wall y = c.
pub struct HalfAgainstWall<'a> {
    /// The whole column; its natural curvature is symmetric and its length 1.
    pub rod: &'a Rod,
    /// Both ends.
    pub ends: Ends,
    /// c.
    pub clearance: f64,
}

/// A state in contact.
#[derive(Clone, Copy, Debug)]
pub struct Against {
    /// P.
    pub load: f64,
    /// Force of the wall on the whole column, towards −y.
    pub wall: f64,
    /// Where the contact begins; it ends at 1 − `edge`.
    pub edge: f64,
    /// At the seat: the moment that the column passes (clamped) or its rotation (hinged).
    pub seat: f64,
    /// Force of the wall per length at the edge and in the middle; none may be negative.
    pub pressures: [f64; 2],
}

/// Steps of the integrator (Runge and Kutta's of order 4) over each part.
const STEPS: u32 = 1000;

impl HalfAgainstWall<'_> {
    /// The state of the whole column's `shortening`, by Newton's method from a guess.
    pub fn solve(&self, shortening: f64, guess: &Against) -> Option<Against> {
        let mut unknowns = Vector4::new(guess.load, -0.5 * guess.wall, guess.seat, guess.edge);
        for _ in 0..40 {
            let rest = self.rest(&unknowns, shortening)?;
            let mut tangent = Matrix4::zeros();
            for i in 0..4 {
                let by = 1e-6 * (1e-3 + unknowns[i].abs());
                let moved = |sign: f64| {
                    let mut other = unknowns;
                    other[i] += sign * by;
                    self.rest(&other, shortening)
                };
                tangent.set_column(i, &((moved(1.0)? - moved(-1.0)?) / (2.0 * by)));
            }
            let change = tangent.lu().solve(&rest)?;
            let far = change
                .component_div(&unknowns.map(|u| 1e-3 + u.abs()))
                .amax();
            unknowns -= change * (0.3 / far).min(1.0);
            if far < 1e-10 {
                return Some(self.state(&unknowns));
            }
        }
        None
    }

    fn state(&self, unknowns: &Vector4<f64>) -> Against {
        let [at_edge, middle] = self.sweep(unknowns);
        let pressure = |section: &Vector4<f64>, place: f64| {
            let step = 1e-6;
            let slope = self.turn_slope(section, place);
            (self.side(unknowns[0], section[2] + step) - self.side(unknowns[0], section[2] - step))
                / (2.0 * step)
                * slope
        };
        Against {
            load: unknowns[0],
            wall: -2.0 * unknowns[1],
            edge: unknowns[3],
            seat: unknowns[2],
            pressures: [pressure(&at_edge, unknowns[3]), pressure(&middle, 0.5)],
        }
    }

    /// y = c and y' = 0 at the edge, θ = 0 in the middle, and the shortening.
    fn rest(&self, unknowns: &Vector4<f64>, shortening: f64) -> Option<Vector4<f64>> {
        if !(0.0..0.5).contains(&unknowns[3]) {
            return None;
        }
        let [edge, middle] = self.sweep(unknowns);
        let slope = self.direction(unknowns[0], unknowns[1], edge[2]).1;
        Some(Vector4::new(
            edge[1] - self.clearance,
            slope,
            middle[2],
            2.0 * (0.5 - middle[0]) - shortening,
        ))
    }

    /// Sections (x, y, θ, M) at the edge of the contact and in the middle.
    fn sweep(&self, unknowns: &Vector4<f64>) -> [Vector4<f64>; 2] {
        let (load, side, edge) = (unknowns[0], unknowns[1], unknowns[3]);
        let first = match self.ends {
            Ends::Hinged => Vector4::new(0.0, 0.0, unknowns[2], 0.0),
            Ends::Clamped => Vector4::new(0.0, 0.0, 0.0, unknowns[2]),
        };
        let free = |place: f64, section: &Vector4<f64>| {
            let (x, y) = self.direction(load, side, section[2]);
            Vector4::new(
                x,
                y,
                self.turn_slope(section, place),
                -(x * side + y * load),
            )
        };
        let leaning = |place: f64, section: &Vector4<f64>| {
            let side = self.side(load, section[2]);
            let (x, _) = self.direction(load, side, section[2]);
            Vector4::new(x, 0.0, self.turn_slope(section, place), -x * side)
        };
        let at_edge = march(free, 0.0, edge, first);
        [at_edge, march(leaning, edge, 0.5, at_edge)]
    }

    fn turn_slope(&self, section: &Vector4<f64>, place: f64) -> f64 {
        section[3] / self.rod.bending + (self.rod.natural_curvature)(place)
    }

    /// (x', y').
    fn direction(&self, load: f64, side: f64, turn: f64) -> (f64, f64) {
        let (sin, cos) = turn.sin_cos();
        let stretch = 1.0 + (-load * cos + side * sin) / self.rod.axial;
        let slide = (load * sin + side * cos) / self.rod.shear;
        (stretch * cos - slide * sin, stretch * sin + slide * cos)
    }

    /// H with which y' = 0.
    fn side(&self, load: f64, turn: f64) -> f64 {
        let (sin, cos) = turn.sin_cos();
        let (axial, shear) = (1.0 / self.rod.axial, 1.0 / self.rod.shear);
        -(sin + load * sin * cos * (shear - axial)) / (sin * sin * axial + cos * cos * shear)
    }
}

fn march(
    slope: impl Fn(f64, &Vector4<f64>) -> Vector4<f64>,
    from: f64,
    to: f64,
    mut section: Vector4<f64>,
) -> Vector4<f64> {
    let step = (to - from) / f64::from(STEPS);
    for i in 0..STEPS {
        let at = from + step * f64::from(i);
        let first = slope(at, &section);
        let second = slope(at + 0.5 * step, &(section + 0.5 * step * first));
        let third = slope(at + 0.5 * step, &(section + 0.5 * step * second));
        let fourth = slope(at + step, &(section + step * third));
        section += step / 6.0 * (first + 2.0 * second + 2.0 * third + fourth);
    }
    section
}
