//! The ends of the column as they really are, against computations of another kind: flat seats, balls
//! with friction, links, levers, measured laws. [C] where compared with shooting: computed by an
//! independent program, not published.

#[path = "../fixture/mod.rs"]
mod fixture;
#[path = "../reference/mod.rs"]
mod reference;

mod flat;
mod lever;
mod limits;
mod link;
mod ring;
mod swivel;
mod walk;
