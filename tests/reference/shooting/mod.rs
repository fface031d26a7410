//! The geometrically exact planar column by shooting.
//!
//! Along the stress-free axis S with θ the rotation of the section, F = (−P, H) constant:
//!
//!     N = −P cos θ + H sin θ,   Q = P sin θ + H cos θ,   ε = N/EA,   γ = Q/GA
//!     x' = (1 + ε) cos θ − γ sin θ,   y' = (1 + ε) sin θ + γ cos θ
//!     θ' = κ0(S) + M/EI,   M' = −(x' H + y' P)
//!
//! It is integrated by an explicit Runge–Kutta pair of order 8 (Dormand & Prince) at a tolerance
//! of 1e-13, from the bottom to the top. Newton's method, with central differences for the
//! tangent, finds the bottom's sideways position, rotation and moment, H and P from the two
//! conditions at each end and one that says which point of the path is meant.
//!
//! Any consistent units. Inside, lengths are in L, forces in EI/L², moments in EI/L.

mod axis;
mod flat;
mod problem;
mod seat;
mod swivel;

pub use axis::{Rod, Station};
pub use flat::{FlatColumn, FlatSeat, FlatState, Standing};
pub use problem::{Failure, Parameter, Problem, State};
pub use seat::Seat;
pub use swivel::{SwivelColumn, SwivelState};
