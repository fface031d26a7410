//! Solving systems that come in a chain of blocks: factorisation with pivot count, bordered
//! solve, Newton, arc length, events, branches. What the blocks stand for is not known here.

mod bordered;
mod branch;
mod event;
mod factored;
mod general;
mod newton;
mod path;
mod pivots;
mod symmetric;
mod system;
mod tridiagonal;
mod unknowns;

pub use bordered::Bordered;
pub use branch::{BranchPoint, branch_point, crosses_another, null_direction};
pub use event::{Located, locate};
pub use factored::Factored;
pub use general::GeneralFactor;
pub use newton::{Newton, NotConverged};
pub use path::{Outcome, PathPoint, PathSettings, Walk, follow, start};
pub use symmetric::SymmetricFactor;
pub use system::{Assembled, System};
pub use tridiagonal::{BlockTridiagonal, Factorisation};
pub use unknowns::Unknowns;
