//! The spring as an equivalent column: a planar beam that shortens, shears and bends by any
//! amount, in its supports.

mod assembly;
mod basis;
mod corner;
mod element;
mod ends;
mod guided;
mod layout;
mod lean;
mod pads;
mod profile;
mod seat;
mod straight;
mod support;
mod wall;

pub use basis::GAUSS_POINTS;
pub use element::{Element, ElementForms, Lever, PointLaw};
pub use ends::SeatPress;
pub use guided::{Contact, Leaning};
pub use layout::{Column, ColumnState, EndLaws, Hold, NaturalShape, NodeLoad, Scale};
pub use profile::{Peak, Station};
pub use seat::{Seat, Touch};
pub use straight::{Buckling, StraightScan};
pub use support::{Deviations, Idealisation};
pub use wall::Wall;
