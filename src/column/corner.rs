//! The corner at the end of a guide, on which the coil catches.
//!
//! A guide that stops short ends at x_e. The column leans on its corner at one place S_e, that with
//! `x(S_e) = x_e`; as the spring is compressed, the place wanders along it. The force J jumps there.
//! With S_e free in the energy of [`super::lean`], ψ the step at S_e,
//!
//! ```text
//! ∂Π/∂S_e = h(θ, F₋) − h(θ, F₊) = x̄'·J,    x̄' the mean of x' before and behind,            (7)
//! ```
//!
//! as h is quadratic in F: without friction the corner pushes square on the axis. The equations are
//!
//! ```text
//! x(S_e) = x_e,   y(S_e) = w(x_e),   J_x + τ J_y = s μ N,   τ = ȳ'/x̄'                        (8)
//! ```
//!
//! or, where it sticks, S_e as it was. S_e is found for every state before anything else; its step
//! is one of the unknowns eliminated, so that the tangent is exact; but for a guide that the top seat
//! carries, whose own motion is left out of it (Newton then converges a little slower, and slopes of
//! the path are off by some 1e-4). The wire is round, and its axis
//! would run around the corner on a circle of its radius d/2; at the slopes at which a spring leans
//! that shifts the place by less than a tenth of d and is left out.

use super::basis::{FUNCTIONS, slopes, values};
use super::element::Element;
use super::lean::{Held, PADS};
use super::nodes::{PadTables, pad_of};

/// What changes at a corner as its place moves along the column.
#[derive(Clone, Copy, Debug)]
pub(super) struct Brink {
    /// The functions of the rotation there.
    pub values: [f64; FUNCTIONS],
    /// ψ of each pad there.
    pub passed: [f64; PADS],
    /// h_θ before less behind.
    pub twist: f64,
    /// h_F before less behind: −(x'₋ − x'₊).
    pub fold: [f64; 2],
    /// x' behind.
    pub slope: [f64; 2],
    /// x̄'.
    pub mean: [f64; 2],
    /// ∂x̄'/∂θ.
    pub mean_turn: [f64; 2],
    /// ∂x̄'/∂F̄ (xx, xy, yy).
    pub mean_give: [f64; 3],
    /// ∂x̄'/∂S.
    pub mean_bend: [f64; 2],
}

impl Held<'_> {
    /// Whether x lies between the ends of the element's deformable part. The ends of neighbours are the
    /// same, so that a corner is in one element and not in two or none.
    pub fn passes(&self, x: f64) -> bool {
        let along = |node: &nalgebra::Vector3<f64>, lever: &super::element::Lever| {
            let (sin, cos) = node[2].sin_cos();
            lever.along * cos - lever.across * sin
        };
        let start = self.a[0] + along(self.a, &self.element.from_a);
        let end = self.b[0] - along(self.b, &self.element.to_b);
        start <= x && x < end
    }

    /// Finds where on [−1, 1] the axis passes x, which lies between the ends, and keeps it.
    pub fn find_place(&mut self, tables: &PadTables, x: f64) -> f64 {
        let half = 0.5 * self.element.length;
        let mut t = 0.0;
        for _ in 0..30 {
            self.corner = Some(t);
            let rate = self.brink(t).slope[0];
            let step = (x - self.means(tables)[PADS][0]) / (rate * half);
            let next = (t + step).clamp(-1.0, 1.0);
            let moved = (next - t).abs();
            t = next;
            if moved < 1e-15 {
                break;
            }
        }
        self.corner = Some(t);
        t
    }

    /// What changes at a corner at `t`.
    pub fn brink(&self, t: f64) -> Brink {
        let element = self.element;
        let q = Element::rotations(self.a, self.b, self.inner);
        let (here, turns) = (values(t), slopes(t));
        let sum =
            |table: &[f64; FUNCTIONS]| -> f64 { table.iter().zip(q).map(|(n, q)| n * q).sum() };
        let (angle, turn) = (sum(&here), sum(&turns) * 2.0 / element.length);
        let (sin, cos) = angle.sin_cos();
        let law = element.law_at(t);
        let (ca, cs) = (law.axial_compliance, law.shear_compliance);
        let c = ca - cs;
        let (pad, share) = pad_of(t);
        let at = |behind: f64| {
            let (fx, fy) = self.force_at(pad, share, behind);
            let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
            let (open, slide) = (1.0 + axial * ca, shear * cs);
            let slope = [open * cos - slide * sin, open * sin + slide * cos];
            // h_θ = −Q − c N Q; ∂x'/∂θ = n + c (Q t + N n).
            let twist = -shear * (1.0 + c * axial);
            let turned = [
                -sin + c * (shear * cos - axial * sin),
                cos + c * (shear * sin + axial * cos),
            ];
            (slope, twist, turned)
        };
        let ((before, twist, _), (behind, twist_behind, _), (mean, _, mean_turn)) =
            (at(0.0), at(1.0), at(0.5));
        let give = [
            cos * cos * ca + sin * sin * cs,
            sin * cos * c,
            sin * sin * ca + cos * cos * cs,
        ];
        // Along S the rotation changes, and the force where the pad pushes.
        let ramp = PADS as f64 / element.length;
        let (jx, jy) = (self.jumps[pad][0] * ramp, self.jumps[pad][1] * ramp);
        Brink {
            values: here,
            passed: std::array::from_fn(|k| {
                if k < pad {
                    1.0
                } else if k == pad {
                    share
                } else {
                    0.0
                }
            }),
            twist: twist - twist_behind,
            fold: [behind[0] - before[0], behind[1] - before[1]],
            slope: behind,
            mean,
            mean_turn,
            mean_give: give,
            mean_bend: [
                mean_turn[0] * turn + give[0] * jx + give[1] * jy,
                mean_turn[1] * turn + give[1] * jx + give[2] * jy,
            ],
        }
    }
}
