//! What seats and guides have to bear.

use super::{LimitKind, PathPoint};
use crate::units::{Metre, Newton, NewtonPerMetre};
use serde::Serialize;

/// A stretch of the spring that leans on a guide.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Leaning {
    /// Where it begins along the deformable length, m from the bottom, spring unloaded.
    pub from_m: Metre,
    /// Where it ends, m.
    pub to_m: Metre,
    /// Side of the guide: +1 at +y, −1 at −y.
    pub side: f64,
    /// Force across the guide per length of the unloaded spring, N/m, evenly spread.
    pub force_n_per_m: NewtonPerMetre,
    /// Whether it is the corner at the end of a guide.
    pub at_corner: bool,
}

/// What the guides do in service.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct GuideAnswer {
    /// Deflection of the first touch, m; `null`: none on the path.
    pub first_touch_m: Option<Metre>,
    /// Where it touches first, share of the deformable length from the bottom.
    pub first_touch_place: Option<f64>,
    /// Deflection from which more than one coil leans at one place, m.
    pub line_contact_m: Option<Metre>,
    /// Deflection from which it leans at another place too, m: the next mode.
    pub second_place_m: Option<Metre>,
    /// Deflection from which a stretch that lies flat could buckle away into the next mode by itself,
    /// m; what is told beyond it is told of the mode it is in. `null`: nowhere, or not known (with
    /// friction).
    pub loose_flat_m: Option<Metre>,
    /// At the largest working deflection, or where the path ends before.
    pub at_working: PathPoint,
    /// Where and how hard it leans there, from bottom to top.
    pub leaning: Vec<Leaning>,
    /// Largest force on one coil on the way there, N.
    pub largest_coil_force_n: Newton,
    /// How far the computed axis enters a guide at most on the path, m.
    pub deepest_m: Metre,
    /// The first limit of the same spring without its guides; `null`: none before solid.
    pub without_first_limit: Option<LimitKind>,
    /// Its deflection, m.
    pub without_first_limit_m: Option<Metre>,
    /// What the guides did to the answer, in a sentence.
    pub sentence: String,
}

/// What one seat has to bear up to the largest working deflection.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct SeatLoad {
    /// Largest thrust along the seat, N, with its sign (towards +y positive, on the spring).
    pub largest_thrust_n: Newton,
    /// Deflection there, m.
    pub at_deflection_m: Metre,
    /// Where the force line passes the seat at that deflection at which it passes farthest from the
    /// centre (from the installed deflection on), m; `null` without force.
    pub farthest_line_m: Option<Metre>,
    /// Where it passes at the largest working deflection, m.
    pub line_at_working_m: Option<Metre>,
}
