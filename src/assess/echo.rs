//! The resolved inputs, as they are shown.

use crate::result::{
    DutyEcho, ForceLawPoint, GuideEcho, ImperfectionEcho, LateralEcho, LinkEcho, MomentLawPoint,
    MotionEcho, MotionPoint, SpringEcho, SupportEcho, SupportsEcho,
};
use crate::setup::{
    BowShape, Contact, Curve, FixedTo, Guide, GuideKind, Lateral, Link, Loading, Motion, Restraint,
    Setup, Support, TopPosition,
};
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
    let (contact, seat, swivel) = match support.contact {
        Contact::Joined => ("joined", None, None),
        Contact::Flat(seat) => ("flat", Some(seat), None),
        Contact::Swivel(swivel) => ("ball", None, Some(swivel)),
    };
    SupportEcho {
        kind: support.word().to_owned(),
        rotational_stiffness_n_m_per_rad: stiffness(support.rotation),
        sideways_stiffness_n_per_m: stiffness(support.sideways),
        axial_stiffness_n_per_m: stiffness(support.axial),
        rotational_law: law(support.rotation, moment_point),
        sideways_law: law(support.sideways, force_point),
        axial_law: law(support.axial, force_point),
        arm_m: support.arm,
        tilt_rad: support.tilt,
        offset_m: support.offset,
        contact: contact.to_owned(),
        seat_radius_m: seat.map(|seat| seat.radius),
        seat_edge_m: seat.map(|seat| seat.edge()),
        ground_share: seat.map(|seat| seat.ground_share),
        friction: seat
            .and_then(|seat| seat.friction)
            .or(swivel.map(|swivel| swivel.friction)),
        swivel_radius_m: swivel.map(|swivel| swivel.radius),
        link: support.link.map(link),
        motion: support.motion.map(motion),
        other_plane: support.other_plane.map(lateral),
        plane_rad: support.plane,
    }
}

/// `None` where it is held.
fn stiffness(restraint: Restraint) -> Option<f64> {
    match restraint {
        Restraint::Held => None,
        other => Some(other.stiffness()),
    }
}

/// The points of a law as measured.
fn law<P>(restraint: Restraint, point: fn((f64, f64)) -> P) -> Option<Vec<P>> {
    match restraint {
        Restraint::Progressive(curve) => Some(curve.points().map(point).collect()),
        _ => None,
    }
}

fn force_point((motion_m, force_n): (f64, f64)) -> ForceLawPoint {
    ForceLawPoint { motion_m, force_n }
}

fn moment_point((rotation_rad, moment_n_m): (f64, f64)) -> MomentLawPoint {
    MomentLawPoint {
        rotation_rad,
        moment_n_m,
    }
}

fn lateral(lateral: Lateral) -> LateralEcho {
    LateralEcho {
        rotational_stiffness_n_m_per_rad: stiffness(lateral.rotation),
        sideways_stiffness_n_per_m: stiffness(lateral.sideways),
        rotational_law: law(lateral.rotation, moment_point),
        sideways_law: law(lateral.sideways, force_point),
        tilt_rad: lateral.tilt,
        offset_m: lateral.offset,
    }
}

fn link(link: Link) -> LinkEcho {
    LinkEcho {
        kind: if link.hanging { "hanger" } else { "strut" }.to_owned(),
        length_m: link.length,
    }
}

fn motion(motion: Motion) -> MotionEcho {
    match motion {
        Motion::Lever(arc) => MotionEcho {
            kind: "lever".to_owned(),
            pivot_along_m: Some(arc.along),
            pivot_across_m: Some(arc.across),
            table: Vec::new(),
        },
        Motion::Table { offset, tilt } => MotionEcho {
            kind: "table".to_owned(),
            pivot_along_m: None,
            pivot_across_m: None,
            table: motion_table(&offset, &tilt),
        },
    }
}

/// Offset and tilt at every travel that either of them is given at.
fn motion_table(offset: &Curve, tilt: &Curve) -> Vec<MotionPoint> {
    let mut travels: Vec<f64> = offset.points().chain(tilt.points()).map(|p| p.0).collect();
    travels.sort_by(f64::total_cmp);
    travels.dedup();
    travels
        .into_iter()
        .map(|travel_m| MotionPoint {
            travel_m,
            offset_m: offset.at(travel_m).value,
            tilt_rad: tilt.at(travel_m).value,
        })
        .collect()
}

pub(super) fn guides(setup: &Setup) -> Vec<GuideEcho> {
    setup.guides.iter().map(|one| guide(setup, one)).collect()
}

fn guide(setup: &Setup, guide: &Guide) -> GuideEcho {
    let spring = &setup.spring;
    let closed = spring.wire.axial_size() / spring.pitch();
    GuideEcho {
        kind: match guide.kind {
            GuideKind::Rod => "rod",
            GuideKind::Bore => "bore",
        }
        .to_owned(),
        diameter_m: guide.diameter,
        clearance_free_m: guide.clearance(spring, 1.0),
        clearance_closed_m: guide.clearance(spring, closed),
        fixed_to: match guide.fixed_to {
            FixedTo::Ground => "ground",
            FixedTo::Bottom => "bottom",
            FixedTo::Top => "top",
        }
        .to_owned(),
        from_m: guide.from,
        to_m: guide.to.is_finite().then_some(guide.to),
        friction: guide.friction,
        touching_allowed: guide.touching_allowed,
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
