//! Reference computations, each from the equations of the column and by a method of its own:
//! none of them uses the program's solver, element or closed form. What a test compares the
//! program with comes from here or from a published value beside the check.
//!
//! Signs everywhere: x along the line of load from the bottom to the top, y to the side, the
//! rotation θ from x to y. P > 0 is compression. A section passes the force (F_x, F_y) = (−P, H)
//! and the moment M from its upper to its lower side. Stiffnesses of supports restore.

#![allow(
    dead_code,
    unused_imports,
    reason = "each test binary uses its own part"
)]

pub mod after_buckling;
pub mod closed_form;
pub mod elastic_ends;
pub mod elastica;
pub mod root;
pub mod shooting;
pub mod transverse_rate;
pub mod walls;
