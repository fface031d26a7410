//! Critical deflection of the straight column on any elastic ends with rigid arms and links.
//!
//! Units: the column's length is 1 and its EI is 1 inside; outside any consistent set.
//!
//! With the equations of `closed_form`, c = cos q, σ = sin q/q, β = (a + b)(1 − c)/q²,
//! η = 1/g − (a + b)²(1 − σ)/q², g = GA L²/EI, p = P L²/EI, the state (y, θ, M, H) goes from the
//! bottom of the column to its top by
//!
//!     y₁ = y₀ + (a + b)σ θ₀ + β M₀ + η H
//!     θ₁ =         c θ₀     + σ M₀ − β H
//!     M₁ =    −q²σ θ₀       + c M₀ − (a + b)σ H
//!
//! and over a rigid arm of length h by y₁ = y₀ + hθ, M₁ = M₀ − h(H + pθ).
//!
//! A link of length ℓ is a rigid bar hinged to the pivot and to a far point that is held sideways.
//! It carries P along itself. Standing beyond the pivot (a strut) it pushes the pivot farther out,
//! P y/ℓ; hanging from it, its far hinge on the column's side (a hanger), it pulls it back: in
//! `sideways` it is the rate −P/ℓ or +P/ℓ.
//!
//! Two routes: the smallest eigenvalue of the stiffness against the four motions of the pivots
//! (which finds double roots too), and the determinant of the conditions at both ends.

use super::root::first_loss;
use nalgebra::{DMatrix, Matrix2, Matrix4, Vector4};
use std::f64::consts::PI;

/// A straight column of constant section.
#[derive(Clone, Copy, Debug)]
pub struct Column {
    /// EA.
    pub axial: f64,
    /// GA, may be infinite.
    pub shear: f64,
    /// EI.
    pub bending: f64,
    /// Deformable length L.
    pub length: f64,
}

impl Column {
    /// The spring of E/G = `r` and L/D = `slenderness` with L = 1 and axial rate k = 1:
    /// EA = 1, GA = r, EI = r/(2(2 + r)Λ²). Stiffnesses of supports are then in k and k·L².
    pub fn of_spring(r: f64, slenderness: f64) -> Self {
        Column {
            axial: 1.0,
            shear: r,
            bending: r / (2.0 * (2.0 + r) * slenderness.powi(2)),
            length: 1.0,
        }
    }
}

/// How an end is held. The stiffnesses act at the pivot, `arm` beyond the end plane.
#[derive(Clone, Copy, Debug)]
pub struct End {
    /// Moment per rotation, 0 to infinity.
    pub rotation: f64,
    /// Force per sideways motion, 0 to infinity.
    pub sideways: f64,
    /// Rigid arm from the end plane to the pivot, outward positive.
    pub arm: f64,
    /// A link at the pivot, besides what else holds it.
    pub link: Option<Link>,
}

/// A rigid bar through which the load comes, hinged at both ends, its far end held sideways.
#[derive(Clone, Copy, Debug)]
pub struct Link {
    /// Length ℓ.
    pub length: f64,
    /// Whether the far hinge lies on the column's side, the link pulled.
    pub hanging: bool,
}

impl Link {
    /// Force on the pivot per sideways motion, positive back to the middle, under the load P.
    pub fn rate(&self, load: f64) -> f64 {
        load / if self.hanging {
            self.length
        } else {
            -self.length
        }
    }
}

impl End {
    /// Both held.
    pub const CLAMPED: End = End::elastic(f64::INFINITY, f64::INFINITY);
    /// Free to turn, held sideways.
    pub const HINGED: End = End::elastic(0.0, f64::INFINITY);
    /// Kept from turning, free sideways.
    pub const SLIDING: End = End::elastic(f64::INFINITY, 0.0);
    /// Not held.
    pub const FREE: End = End::elastic(0.0, 0.0);

    /// Elastic, without an arm.
    pub const fn elastic(rotation: f64, sideways: f64) -> End {
        End {
            rotation,
            sideways,
            arm: 0.0,
            link: None,
        }
    }

    /// Hinged to a strut of this length, held by nothing else.
    pub const fn strut(length: f64) -> End {
        End {
            link: Some(Link {
                length,
                hanging: false,
            }),
            ..End::FREE
        }
    }

    /// Hinged to a hanger of this length, held by nothing else.
    pub const fn hanger(length: f64) -> End {
        End {
            link: Some(Link {
                length,
                hanging: true,
            }),
            ..End::FREE
        }
    }

    /// The same with an arm.
    pub const fn with_arm(self, arm: f64) -> End {
        End { arm, ..self }
    }

    /// Force per sideways motion of the pivot under the load, in units of L and EI.
    fn sideways_in(&self, state: &State, column: &Column) -> f64 {
        let link = self
            .link
            .map_or(0.0, |link| link.rate(state.load) * column.length);
        self.sideways * unit_stiffness(column).0 + link
    }
}

/// Smallest ξ = s/L in (0, 1) at which the straight column on these ends stops being stable.
/// `None`: never. The ends must hold the column as a rigid body: neither may it shift sideways nor
/// turn without being resisted (by hangers it may be, as soon as there is a load).
pub fn critical_share(column: &Column, bottom: &End, top: &End) -> Option<f64> {
    let m = 1.0 - column.axial / column.shear;
    first_loss(
        |share| least_stiffness(column, bottom, top, share),
        &[if m > 0.0 { 0.5 / m } else { f64::INFINITY }],
    )
}

/// What the equations need at one deflection, in units of L and EI.
struct State {
    load: f64,
    wave_squared: f64,
    height: f64,
    cosine: f64,
    sine_ratio: f64,
    beta: f64,
    eta: f64,
}

impl State {
    fn at(column: &Column, share: f64) -> State {
        let slenderness = column.length.powi(2) / column.bending;
        let load = share * column.axial * slenderness;
        let height = 1.0 - share + share * column.axial / column.shear;
        let wave_squared = load * height;
        let q = wave_squared.sqrt();
        // (1 − cos q)/q² and (1 − sin q/q)/q² without cancellation.
        let versine = 0.5 * (sine_over(0.5 * q)).powi(2);
        let lag = if q < 0.1 {
            1.0 / 6.0 - wave_squared / 120.0 + wave_squared.powi(2) / 5040.0
                - wave_squared.powi(3) / 362_880.0
        } else {
            (1.0 - q.sin() / q) / wave_squared
        };
        State {
            load,
            wave_squared,
            height,
            cosine: q.cos(),
            sine_ratio: sine_over(q),
            beta: height * versine,
            eta: 1.0 / (column.shear * slenderness) - height.powi(2) * lag,
        }
    }

    /// The map of (y, θ, M, H) from the bottom of the column to its top.
    fn transfer(&self) -> Matrix4<f64> {
        let tilt = self.height * self.sine_ratio;
        Matrix4::new(
            1.0,
            tilt,
            self.beta,
            self.eta, //
            0.0,
            self.cosine,
            self.sine_ratio,
            -self.beta, //
            0.0,
            -self.wave_squared * self.sine_ratio,
            self.cosine,
            -tilt, //
            0.0,
            0.0,
            0.0,
            1.0,
        )
    }

    /// The map over a rigid arm of length `arm`.
    fn arm_transfer(&self, arm: f64) -> Matrix4<f64> {
        Matrix4::new(
            1.0,
            arm,
            0.0,
            0.0, //
            0.0,
            1.0,
            0.0,
            0.0, //
            0.0,
            -arm * self.load,
            1.0,
            -arm, //
            0.0,
            0.0,
            0.0,
            1.0,
        )
    }
}

fn sine_over(q: f64) -> f64 {
    if q.abs() < 1e-4 {
        1.0 - q * q / 6.0
    } else {
        q.sin() / q
    }
}

/// Smallest eigenvalue of the (equilibrated) stiffness against those motions of the two pivots
/// that are not held, or 2π − q where that is smaller: with both end planes held the column has
/// q = 2π as its first critical state, and below it this stiffness decides.
pub fn least_stiffness(column: &Column, bottom: &End, top: &End, share: f64) -> f64 {
    let state = State::at(column, share);
    let room = 2.0 * PI - state.wave_squared.sqrt();
    if room <= 0.0 {
        return room;
    }
    let to_turn = unit_stiffness(column).1;
    let stiffness = pivot_stiffness(&state, bottom.arm / column.length, top.arm / column.length);
    let held = [
        bottom.sideways_in(&state, column),
        bottom.rotation * to_turn,
        top.sideways_in(&state, column),
        top.rotation * to_turn,
    ];
    let free: Vec<usize> = (0..4).filter(|i| held[*i].is_finite()).collect();
    if free.is_empty() {
        return room;
    }
    let entry = |i: usize, j: usize| stiffness[(i, j)] + if i == j { held[i] } else { 0.0 };
    let scale: Vec<f64> = free
        .iter()
        .map(|i| (1.0 + entry(*i, *i).abs()).sqrt())
        .collect();
    let matrix = DMatrix::from_fn(free.len(), free.len(), |i, j| {
        entry(free[i], free[j]) / (scale[i] * scale[j])
    });
    matrix.symmetric_eigenvalues().min().min(room)
}

/// Stiffness (force bottom, moment bottom, force top, moment top) against (y, θ) of the bottom
/// pivot and of the top pivot, 4×4, without the supports.
fn pivot_stiffness(state: &State, bottom_arm: f64, top_arm: f64) -> Matrix4<f64> {
    // (y₁ − y₀ − (a+b)σθ₀, θ₁ − cθ₀) = F (M₀, H)
    let flexibility = Matrix2::new(state.beta, state.eta, state.sine_ratio, -state.beta);
    let inverse = flexibility.try_inverse().expect("regular for 0 < q < 2π");
    let tilt = state.height * state.sine_ratio;
    let mut plane = Matrix4::zeros();
    for (column, motion) in Matrix4::<f64>::identity().column_iter().enumerate() {
        let (y0, turn0, y1, turn1) = (motion[0], motion[1], motion[2], motion[3]);
        let passed =
            inverse * nalgebra::Vector2::new(y1 - y0 - tilt * turn0, turn1 - state.cosine * turn0);
        let (moment0, side) = (passed[0], passed[1]);
        let moment1 =
            -state.wave_squared * state.sine_ratio * turn0 + state.cosine * moment0 - tilt * side;
        plane.set_column(column, &Vector4::new(-side, -moment0, side, moment1));
    }
    let mut rigid = Matrix4::identity();
    rigid[(0, 1)] = bottom_arm;
    rigid[(2, 3)] = -top_arm;
    let mut at_pivots = rigid.transpose() * plane * rigid;
    // An arm that turns lets the load down by h θ²/2.
    at_pivots[(1, 1)] -= state.load * bottom_arm;
    at_pivots[(3, 3)] -= state.load * top_arm;
    0.5 * (at_pivots + at_pivots.transpose())
}

/// Determinant of the conditions at both pivots, by the transfer matrix. It vanishes where the
/// straight column is critical; its sign away from there means nothing.
pub fn determinant(column: &Column, bottom: &End, top: &End, share: f64) -> f64 {
    let state = State::at(column, share);
    let to_turn = unit_stiffness(column).1;
    // At the bottom H = k_u y and M = k_θ θ: two columns of possible states, (y or H) and (θ or M).
    let (y, side) = ratio(bottom.sideways_in(&state, column));
    let (turn, moment) = ratio(bottom.rotation * to_turn);
    let map = state.arm_transfer(top.arm / column.length)
        * state.transfer()
        * state.arm_transfer(bottom.arm / column.length);
    let first = map * Vector4::new(y, 0.0, 0.0, side);
    let second = map * Vector4::new(0.0, turn, moment, 0.0);
    // At the top H = −k_u y and M = −k_θ θ.
    let (y, side) = ratio(top.sideways_in(&state, column));
    let (turn, moment) = ratio(top.rotation * to_turn);
    let sideways = |v: &Vector4<f64>| y * v[3] + side * v[0];
    let rotation = |v: &Vector4<f64>| turn * v[2] + moment * v[1];
    sideways(&first) * rotation(&second) - sideways(&second) * rotation(&first)
}

/// (motion, force) in the proportion 1 : k, for any k up to infinity.
fn ratio(stiffness: f64) -> (f64, f64) {
    if stiffness.is_infinite() {
        (0.0, 1.0)
    } else {
        let size = 1.0 + stiffness.abs();
        (1.0 / size, stiffness / size)
    }
}

/// Factors that take stiffnesses (force per motion, moment per turn) into units of L and EI.
fn unit_stiffness(column: &Column) -> (f64, f64) {
    (
        column.length.powi(3) / column.bending,
        column.length / column.bending,
    )
}
