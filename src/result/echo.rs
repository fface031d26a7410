//! The resolved inputs, echoed.

use serde::Serialize;

/// The spring as resolved, at service temperature.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct SpringEcho {
    /// "round" or "rectangular".
    pub wire_section: String,
    /// Diameter of round wire; the side along the coil's radius of rectangular wire.
    pub wire_diameter_m: f64,
    /// Side along the coil's axis.
    pub wire_axial_size_m: f64,
    pub mean_diameter_m: f64,
    pub outer_diameter_m: f64,
    pub inner_diameter_m: f64,
    pub spring_index: f64,
    pub free_length_m: f64,
    pub slenderness: f64,
    pub active_coils: f64,
    pub total_coils: f64,
    pub pitch_m: f64,
    pub ends: String,
    pub hand: String,
    pub material: String,
    pub service_temperature_degc: f64,
    pub youngs_modulus_pa: f64,
    pub shear_modulus_pa: f64,
    pub rate_n_per_m: f64,
    pub rate_is_measured: bool,
    pub formula_rate_n_per_m: f64,
    pub solid_length_m: f64,
    pub solid_rule: String,
    pub dead_height_m: f64,
    pub deformable_length_m: f64,
    /// Stiffnesses of the column that takes the whole free length as deformable.
    pub axial_stiffness_n: f64,
    pub shear_stiffness_n: f64,
    pub bending_stiffness_n_m2: f64,
}

/// A support as resolved. Stiffness `null` means held completely; of a measured law it is that at
/// rest.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct SupportEcho {
    /// clamped, hinged, free, sliding, elastic, flat, ball or link.
    pub kind: String,
    pub rotational_stiffness_n_m_per_rad: Option<f64>,
    pub sideways_stiffness_n_per_m: Option<f64>,
    pub axial_stiffness_n_per_m: Option<f64>,
    /// Laws as measured; `null`: linear.
    pub rotational_law: Option<Vec<MomentLawPoint>>,
    pub sideways_law: Option<Vec<ForceLawPoint>>,
    pub axial_law: Option<Vec<ForceLawPoint>>,
    pub arm_m: f64,
    pub tilt_rad: f64,
    pub offset_m: f64,
    /// How the end sits: "joined", "flat" or "ball".
    pub contact: String,
    /// Radius of the ring that bears on a flat seat.
    pub seat_radius_m: Option<f64>,
    /// Distance from its centre to the nearest edge of what bears.
    pub seat_edge_m: Option<f64>,
    /// Share of a turn that is ground, on a flat seat.
    pub ground_share: Option<f64>,
    /// Friction of flat seat or ball; `null`: the end does not slide or turns freely.
    pub friction: Option<f64>,
    /// Radius at which the friction of a ball acts.
    pub swivel_radius_m: Option<f64>,
    pub link: Option<LinkEcho>,
    pub motion: Option<MotionEcho>,
    /// In the other lateral plane; `null`: alike all round.
    pub other_plane: Option<LateralEcho>,
    /// Direction of the first plane.
    pub plane_rad: f64,
}

/// What holds an end in the other lateral plane.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct LateralEcho {
    pub rotational_stiffness_n_m_per_rad: Option<f64>,
    pub sideways_stiffness_n_per_m: Option<f64>,
    pub rotational_law: Option<Vec<MomentLawPoint>>,
    pub sideways_law: Option<Vec<ForceLawPoint>>,
    pub tilt_rad: f64,
    pub offset_m: f64,
}

/// A point of a law as measured.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct ForceLawPoint {
    pub motion_m: f64,
    pub force_n: f64,
}

/// A point of a law as measured.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct MomentLawPoint {
    pub rotation_rad: f64,
    pub moment_n_m: f64,
}

/// The link through which the load comes.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct LinkEcho {
    /// "strut" or "hanger".
    pub kind: String,
    pub length_m: f64,
}

/// How the top seat moves aside as it travels: on a lever, or as a table.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct MotionEcho {
    /// "lever" or "table".
    pub kind: String,
    /// Pivot of the lever from the seat's centre, along the spring's axis, outward.
    pub pivot_along_m: Option<f64>,
    /// Across it, towards +y.
    pub pivot_across_m: Option<f64>,
    pub table: Vec<MotionPoint>,
}

/// A point of a seat's motion.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct MotionPoint {
    pub travel_m: f64,
    pub offset_m: f64,
    pub tilt_rad: f64,
}

/// A guide as resolved.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct GuideEcho {
    /// "rod" or "bore".
    pub kind: String,
    pub diameter_m: f64,
    /// Radial clearance of the free spring.
    pub clearance_free_m: f64,
    /// … of the coils pressed together, grown in diameter.
    pub clearance_closed_m: f64,
    /// "ground", "bottom" or "top".
    pub fixed_to: String,
    /// Where it begins, from the seat it is counted from.
    pub from_m: f64,
    /// Where it ends; `null`: it goes along the whole spring.
    pub to_m: Option<f64>,
    pub friction: f64,
    pub touching_allowed: bool,
}

/// Both supports.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct SupportsEcho {
    pub bottom: SupportEcho,
    pub top: SupportEcho,
}

/// The imperfections as resolved.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct ImperfectionEcho {
    pub squareness_m: f64,
    pub parallelism_m: f64,
    pub bow_m: f64,
    /// "half-sine" or "first-mode".
    pub bow_shape: String,
    pub eccentricity_m: f64,
    /// "piloted" or "landed".
    pub top_position: String,
}

/// The duty as resolved.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct DutyEcho {
    /// "deflection" or "force".
    pub loading: String,
    pub installed_deflection_m: f64,
    pub working_deflection_m: f64,
    pub working_force_n: Option<f64>,
    pub working_tolerance_m: f64,
    pub overtravel_m: f64,
    pub required_margin: f64,
    pub bow_limit_m: f64,
    pub rate_loss_share: f64,
    pub allowable_stress_pa: Option<f64>,
}
