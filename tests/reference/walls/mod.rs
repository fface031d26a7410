//! The column between two rigid walls |y| ≤ c without friction, as a minimum of energy under bounds.
//!
//! **Beam.** n equal segments; every node has three displacements, u = x − S, y, θ. A segment's
//! strains are those of its middle, with u', y', θ' the differences over its length and θ the mean
//! of its two ends:
//!
//!     1 + ε = (1 + u') cos θ + y' sin θ,   γ = y' cos θ − (1 + u') sin θ,   κ = θ' − κ0
//!
//! and the energy of the column is Σ (EA ε² + GA γ² + EI κ²) L/2n, plus k_θ(θ − angle)²/2 and
//! k_u(y − offset)²/2 of ends that give. No force is an unknown. One point per segment keeps it
//! from locking; P, heights and reactions are off by O(1/n²), and where the places of contact do
//! not move with n (or move smoothly) one Richardson step from n to 2n takes that term out. Held
//! against shooting for a real spring in contact (`shot`): P to 1e-6 of itself with n = 200 and 400.
//! With several contacts that move, n = 400 and 800 agree to 5e-6.
//!
//! A spring column has shear, so a smooth wall never pushes it in a point: see `shot`.
//!
//! **Bounds.** The walls act at the nodes: −c ≤ y ≤ c. With the shortening set, u of the top is
//! set and the energy is least; with the load set, the energy less P times the shortening is.
//!
//! **Minimum.** Sequential quadratic programming: the energy's exact second derivatives, a
//! primal active-set method for the quadratic step under the bounds (one wall node enters or
//! leaves at a time), and a line search that only lets the energy fall. The matrix is banded and
//! symmetric; Cholesky's factorisation without pivoting refuses it where it is not positive, and
//! it is then shifted. So only a minimum can be found, and only downhill from the point before.
//! Where the gradient vanishes, the wall nodes without a reaction are let go and the second
//! variation is looked at again: if it is not positive (a straight column past its first critical
//! load, a flat part about to leave its wall) the state is left along the softest mode.
//!
//! Any consistent units.

mod band;
mod beam;
mod bounded;
pub mod closed_form;
mod path;
mod shot;

pub use path::{Hold, Lost, Point, Set, Walls, richardson};
pub use shot::{Against, HalfAgainstWall};
