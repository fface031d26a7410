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

/// A support as resolved. Stiffness `null` means held completely.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[allow(missing_docs)]
pub struct SupportEcho {
    /// clamped, hinged, free, sliding or elastic.
    pub kind: String,
    pub rotational_stiffness_n_m_per_rad: Option<f64>,
    pub sideways_stiffness_n_per_m: Option<f64>,
    pub axial_stiffness_n_per_m: Option<f64>,
    pub arm_m: f64,
    pub tilt_rad: f64,
    pub offset_m: f64,
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
