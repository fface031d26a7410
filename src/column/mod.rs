//! The spring as an equivalent column: a planar beam that shortens, shears and bends by any
//! amount, in its supports.

mod assembly;
mod basis;
mod contact;
mod corner;
mod element;
mod ends;
mod guided;
mod judge;
mod layout;
mod lean;
mod nodes;
mod pads;
mod profile;
mod seat;
mod straight;
mod support;
mod wall;

pub use basis::GAUSS_POINTS;
pub use contact::Contact;
pub use element::{Element, ElementForms, Lever, PointLaw};
pub use ends::SeatPress;
pub use guided::Leaning;
pub use layout::{Column, ColumnState, EndLaws, Hold, NaturalShape, NodeLoad, Scale};
pub use profile::{Peak, Station};
pub use seat::{Seat, Touch};
pub use straight::{Buckling, StraightScan};
pub use support::{Deviations, Idealisation};
pub use wall::Wall;
