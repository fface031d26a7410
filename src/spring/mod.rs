//! The spring as a thing: its wire, coil, ends and material, and what follows from them alone
//! (section stiffnesses of the equivalent column, solid length, growth, stress).

mod coil;
mod ends;
mod growth;
mod material;
mod section;
mod stress;
mod wire;

pub use coil::{Hand, Spring};
pub use ends::EndType;
pub use growth::{compressed_radius, widest_diameter};
pub use material::{Material, Sureness, materials, named_material};
pub use section::{Section, TurnCompliance};
pub use stress::{curvature_factor, torsion_stress};
pub use wire::Wire;
