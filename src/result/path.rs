//! A load path.

use crate::units::{Metre, Newton, NewtonMetre, NewtonPerMetre, Pascal, Radian};
use serde::Serialize;

/// One point of a load path. The names are also the columns of the CSV.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct PathPoint {
    /// Travel of the machine, m (shortening of the spring plus what soft seats give).
    pub deflection_m: Metre,
    /// Shortening of the spring between its seats, m.
    pub shortening_m: Metre,
    /// Axial force, N.
    pub force_n: Newton,
    /// Bow, m: the largest sideways distance of the axis from where it stood in its seats, unloaded.
    pub bow_m: Metre,
    /// Place of the largest bow, as a share of the deformable length from the bottom.
    pub bow_place: f64,
    /// Signed sideways distance at that place, m, from where it stood unloaded.
    pub lateral_m: Metre,
    /// Rotation of the bottom end, rad.
    pub bottom_rotation_rad: Radian,
    /// Rotation of the top end, rad.
    pub top_rotation_rad: Radian,
    /// Moment of the bottom seat on the spring, N·m.
    pub bottom_moment_n_m: NewtonMetre,
    /// Moment of the top seat on the spring, N·m.
    pub top_moment_n_m: NewtonMetre,
    /// Transverse force at the bottom of the spring, N.
    pub transverse_force_n: Newton,
    /// Thrust of the bottom end along its seat, N.
    pub bottom_thrust_n: Newton,
    /// Thrust of the top end along its seat, N.
    pub top_thrust_n: Newton,
    /// Where the force line passes the bottom seat, m from its centre; `null` without force.
    pub bottom_line_m: Option<Metre>,
    /// Where it passes the top seat.
    pub top_line_m: Option<Metre>,
    /// Rotation of the bottom end out of its flat seat, rad; 0: flush, or no flat seat.
    pub bottom_lift_rad: Radian,
    /// The same at the top.
    pub top_lift_rad: Radian,
    /// Smallest room between coil and guide, m, negative by what the discretisation leaves;
    /// `null` without a guide.
    pub guide_room_m: Option<Metre>,
    /// Where that is, share of the deformable length from the bottom; `null` without a guide.
    pub guide_tightest_place: Option<f64>,
    /// Forces with which the spring leans on its guides, added up, N.
    pub guide_force_n: Newton,
    /// The largest share of them on one coil: over any one pitch of the spring, N.
    pub guide_coil_force_n: Newton,
    /// Where that is, share of the deformable length from the bottom.
    pub guide_coil_place: f64,
    /// Number of separate places at which it leans.
    pub guide_places: u32,
    /// Length of the longest of them, m of free length.
    pub guide_longest_m: Metre,
    /// Force with which it leans on the corner at the end of a guide, N.
    pub guide_corner_force_n: Newton,
    /// Axial force that friction on the guides takes: at the top more than at the bottom, N; negative
    /// on the way back.
    pub guide_friction_n: Newton,
    /// Slope dP/ds of the path, N/m (the machine's travel s).
    pub rate_n_per_m: NewtonPerMetre,
    /// Largest corrected shear stress in the wire, Pa.
    pub wire_stress_pa: Pascal,
    /// Number of ways in which the state is unstable when the deflection is set.
    pub unstable_set_deflection: u32,
    /// Number of ways in which the state is unstable under a dead load.
    pub unstable_dead_load: u32,
}

/// A point of a path with a name: a limit, a singular point, the working point.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Mark {
    /// Key of what happens here: a limit's key, "branch_point", "largest_force",
    /// "largest_travel", "installed", "working", "seated" (flat ends sit flush), "first_touch" (of a
    /// guide), "line_contact" (longer than a pitch), "second_place" or "loose_flat" (what lies flat on
    /// a guide could buckle away from it).
    pub name: String,
    /// The point, refined.
    pub point: PathPoint,
}

/// A load path with its marks.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Path {
    /// Points in the order they were found.
    pub points: Vec<PathPoint>,
    /// Named points, in the order along the path.
    pub marks: Vec<Mark>,
    /// Which branch it follows, in words.
    pub branch: String,
}
