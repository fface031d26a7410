//! The resolved inputs, as they are shown.

use crate::result::{DutyEcho, ImperfectionEcho, SpringEcho, SupportEcho, SupportsEcho};
use crate::setup::{BowShape, Loading, Restraint, Setup, Support, TopPosition};
use crate::spring::{Hand, Wire};

pub(super) fn spring(setup: &Setup) -> SpringEcho {
    let spring = &setup.spring;
    let section = spring.section(spring.free_length);
    SpringEcho {
        wire_section: match spring.wire {
            Wire::Round { .. } => "round",
            Wire::Rectangular { .. } => "rectangular",
        }
        .to_owned(),
        wire_diameter_m: spring.wire.radial_size(),
        wire_axial_size_m: spring.wire.axial_size(),
        mean_diameter_m: spring.mean_diameter,
        outer_diameter_m: spring.outer_diameter(),
        inner_diameter_m: spring.inner_diameter(),
        spring_index: spring.index(),
        free_length_m: spring.free_length,
        slenderness: spring.slenderness(),
        active_coils: spring.active_coils,
        total_coils: spring.total_coils,
        pitch_m: spring.pitch(),
        ends: spring.ends.word().to_owned(),
        hand: match spring.hand {
            Hand::Right => "right",
            Hand::Left => "left",
        }
        .to_owned(),
        material: setup.material.clone(),
        service_temperature_degc: setup.temperature,
        youngs_modulus_pa: spring.youngs_modulus,
        shear_modulus_pa: spring.shear_modulus,
        rate_n_per_m: spring.rate(),
        rate_is_measured: spring.measured_rate.is_some(),
        formula_rate_n_per_m: spring.formula_rate(),
        solid_length_m: spring.solid_length,
        solid_rule: spring.solid_rule.to_owned(),
        dead_height_m: spring.dead_height(),
        deformable_length_m: spring.deformable_length(),
        axial_stiffness_n: section.axial,
        shear_stiffness_n: section.shear,
        bending_stiffness_n_m2: section.bending,
    }
}

pub(super) fn supports(setup: &Setup) -> SupportsEcho {
    SupportsEcho {
        bottom: support(&setup.bottom),
        top: support(&setup.top),
    }
}

fn support(support: &Support) -> SupportEcho {
    let stiffness = |restraint: Restraint| match restraint {
        Restraint::Held => None,
        other => Some(other.stiffness()),
    };
    SupportEcho {
        kind: support.word().to_owned(),
        rotational_stiffness_n_m_per_rad: stiffness(support.rotation),
        sideways_stiffness_n_per_m: stiffness(support.sideways),
        axial_stiffness_n_per_m: stiffness(support.axial),
        arm_m: support.arm,
        tilt_rad: support.tilt,
        offset_m: support.offset,
    }
}

pub(super) fn imperfections(setup: &Setup) -> ImperfectionEcho {
    let sizes = &setup.imperfections;
    ImperfectionEcho {
        squareness_m: sizes.squareness,
        parallelism_m: sizes.parallelism,
        bow_m: sizes.bow,
        bow_shape: match sizes.bow_shape {
            BowShape::HalfSine => "half-sine",
            BowShape::FirstMode => "first-mode",
        }
        .to_owned(),
        eccentricity_m: sizes.eccentricity,
        top_position: match sizes.top_position {
            TopPosition::Piloted => "piloted",
            TopPosition::Landed => "landed",
        }
        .to_owned(),
    }
}

pub(super) fn duty(setup: &Setup) -> DutyEcho {
    let duty = &setup.duty;
    DutyEcho {
        loading: match duty.loading {
            Loading::Deflection => "deflection",
            Loading::Force => "force",
        }
        .to_owned(),
        installed_deflection_m: duty.installed_deflection,
        working_deflection_m: duty.working_deflection,
        working_force_n: duty.working_force,
        working_tolerance_m: duty.working_tolerance,
        overtravel_m: duty.overtravel,
        required_margin: duty.margins.general,
        bow_limit_m: duty.bow_limit,
        rate_loss_share: duty.rate_loss_share,
        allowable_stress_pa: duty.allowable_stress,
    }
}
