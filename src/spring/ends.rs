//! How the ends of the coil are made, and what that costs in length.

use crate::units::Metre;

/// End type of a compression spring.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum EndType {
    /// Closed (squared) and ground.
    ClosedGround,
    /// Closed (squared), not ground.
    Closed,
    /// Open (plain) and ground.
    OpenGround,
    /// Open (plain), not ground.
    Open,
}

impl EndType {
    /// Every end type, in the order the documentation lists them.
    pub const ALL: [EndType; 4] = [
        EndType::ClosedGround,
        EndType::Closed,
        EndType::OpenGround,
        EndType::Open,
    ];

    /// The word for it in a case file.
    pub fn word(self) -> &'static str {
        match self {
            EndType::ClosedGround => "closed-ground",
            EndType::Closed => "closed",
            EndType::OpenGround => "open-ground",
            EndType::Open => "open",
        }
    }

    /// Coils that do not work, total minus active, where the user gives only one of the two:
    /// closed ends 2, open and ground 1, open 0.
    ///
    /// Source: Shigley's Mechanical Engineering Design, table of compression-spring ends (from memory).
    pub fn usual_dead_coils(self) -> f64 {
        match self {
            EndType::ClosedGround | EndType::Closed => 2.0,
            EndType::OpenGround => 1.0,
            EndType::Open => 0.0,
        }
    }

    /// Solid length, m: ground ends `n_t·d`, unground ends `(n_t + 1)·d`, with `d` the wire's
    /// size along the axis.
    ///
    /// Source: Shigley's Mechanical Engineering Design, table of compression-spring ends (from
    /// memory). EN 13906-1 allows up to `(n_t + 1.5)·d` for closed, unground ends (from memory):
    /// give the solid length of the drawing where it is known.
    pub fn solid_length(self, total_coils: f64, axial_size: Metre) -> Metre {
        match self {
            EndType::ClosedGround | EndType::OpenGround => total_coils * axial_size,
            EndType::Closed | EndType::Open => (total_coils + 1.0) * axial_size,
        }
    }

    /// The rule of [`EndType::solid_length`] in words.
    pub fn solid_rule(self) -> &'static str {
        match self {
            EndType::ClosedGround | EndType::OpenGround => {
                "ground ends: total coils × wire (Shigley, table of spring ends, from memory)"
            }
            EndType::Closed | EndType::Open => {
                "unground ends: (total coils + 1) × wire (Shigley, table of spring ends, from memory)"
            }
        }
    }
}
