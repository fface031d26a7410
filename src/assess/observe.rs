//! From a state of the column to what people ask about it.

use crate::column::{Column, Peak, Station};
use crate::result::PathPoint;
use crate::setup::Setup;
use crate::solve;
use crate::spring::{Wire, compressed_radius, torsion_stress};
use std::f64::consts::PI;

/// A path point of the column's system.
pub(super) type Solved = solve::PathPoint<3, 5>;

/// Looks at states of one column and says what they mean for its spring.
pub(super) struct Observer {
    /// Unloaded in its seats: sideways position and slope at each station.
    start: Vec<Station>,
    start_height: f64,
}

/// A path point with what only limits need.
#[derive(Clone, Copy, Debug)]
pub(super) struct Seen {
    pub point: PathPoint,
    /// Axial gap between coils at the tightest place on the inside of the bow, m; 0 at contact.
    pub clearance: f64,
    /// Direction of the path: change of the force, N, and of the travel, m.
    pub along: (f64, f64),
}

impl Observer {
    /// An observer of paths that start at `unloaded`.
    pub fn new(column: &Column, unloaded: &Solved) -> Self {
        let mut start = Vec::new();
        column.profile(&unloaded.state, &mut start);
        Observer {
            start,
            start_height: unloaded.state.nodes[column.elements()][0],
        }
    }

    /// Stations of the unloaded column.
    pub fn start(&self) -> &[Station] {
        &self.start
    }

    /// What the state of `solved` means.
    pub fn see(&self, setup: &Setup, column: &Column, solved: &Solved) -> Seen {
        let mut stations = Vec::with_capacity(self.start.len());
        column.profile(&solved.state, &mut stations);
        let scale = column.scale;
        let last = column.elements();
        let force = solved.load * scale.force;
        let shortening = (self.start_height - solved.state.nodes[last][0]) * scale.length;
        let force_along = solved.load_direction * scale.force;
        let (seats, seat_compliance) = setup.seats_give(force);
        let travel_along =
            -solved.direction.nodes[last][0] * scale.length + force_along * seat_compliance;
        let dead = setup.spring.dead_height() / (2.0 * scale.length);
        let growth = |sign: f64| {
            let along = Peak::of(stations.iter().zip(&self.start).map(|(now, then)| {
                (
                    now.place,
                    sign * (now.y - then.y),
                    sign * (now.y_slope - then.y_slope),
                )
            }));
            // The end planes, beyond the dead coils.
            let ends = [(0, -dead, 0.0), (stations.len() - 1, dead, 1.0)];
            ends.iter().fold(along, |peak, (i, dead, place)| {
                let (now, then) = (&stations[*i], &self.start[*i]);
                let end = |station: &Station| station.y + dead * station.angle.sin();
                let value = sign * (end(now) - end(then));
                if value > peak.value {
                    Peak {
                        place: *place,
                        value,
                    }
                } else {
                    peak
                }
            })
        };
        let (left, right) = (growth(1.0), growth(-1.0));
        let (bow, lateral) = if left.value >= right.value {
            (left, left.value)
        } else {
            (right, -right.value)
        };
        let actions = column.end_actions(&solved.state);
        let falling = force_along * travel_along < 0.0;
        Seen {
            point: PathPoint {
                deflection_m: shortening + seats,
                shortening_m: shortening,
                force_n: force,
                bow_m: bow.value * scale.length,
                bow_place: bow.place,
                lateral_m: lateral * scale.length,
                bottom_rotation_rad: solved.state.nodes[0][2],
                top_rotation_rad: solved.state.nodes[last][2],
                bottom_moment_n_m: actions[0][2] * scale.moment(),
                top_moment_n_m: actions[1][2] * scale.moment(),
                transverse_force_n: solved.state.inner[0][4] * scale.force,
                rate_n_per_m: force_along / travel_along,
                wire_stress_pa: wire_stress(setup, column, &stations),
                unstable_set_deflection: solved.negatives
                    - u32::from(falling && solved.negatives > 0),
                unstable_dead_load: solved.negatives,
            },
            clearance: clearance(setup, column, &stations),
            along: (force_along, travel_along),
        }
    }
}

/// Largest corrected shear stress in the wire: T = |N| R + |M| at the worst section.
fn wire_stress(setup: &Setup, column: &Column, stations: &[Station]) -> f64 {
    let spring = &setup.spring;
    let (pitch, diameter) = (spring.pitch(), spring.mean_diameter);
    let torque = |sign: f64| {
        Peak::of(stations.iter().map(|s| {
            let open = 1.0 + s.stretch;
            let radius = compressed_radius(diameter, pitch, pitch * open);
            // N' = Q θ', and R follows ε = N/EA.
            let force_slope = s.shear_force * s.curvature;
            let stretch_slope = if s.axial_force == 0.0 {
                0.0
            } else {
                force_slope * s.stretch / s.axial_force
            };
            let radius_slope = -pitch.powi(2) * open / (4.0 * PI.powi(2) * radius) * stretch_slope;
            let push = s.axial_force.abs();
            let push_slope = force_slope * s.axial_force.signum();
            let arm = radius / column.scale.length;
            (
                s.place,
                push * arm + sign * s.moment,
                push_slope * arm
                    + push * radius_slope / column.scale.length
                    + sign * s.moment_slope,
            )
        }))
        .value
    };
    let worst = torque(1.0).max(torque(-1.0)) * column.scale.moment();
    torsion_stress(&spring.wire, spring.index(), worst)
}

/// Smallest axial gap between neighbouring coils, m: on the inside of the bow
/// `p(1 + ε − R|θ'|) − √(d² − (γp)²)`, for rectangular wire less its axial size.
fn clearance(setup: &Setup, column: &Column, stations: &[Station]) -> f64 {
    let spring = &setup.spring;
    let (pitch, diameter) = (spring.pitch(), spring.mean_diameter);
    let per = |strain: f64, force: f64| if force == 0.0 { 0.0 } else { strain / force };
    let tightness = |sign: f64| {
        Peak::of(stations.iter().map(|s| {
            let open = 1.0 + s.stretch;
            let radius = compressed_radius(diameter, pitch, pitch * open);
            let (arm, turn) = (radius / column.scale.length, sign * s.curvature);
            // N' = Q θ', Q' = −N θ', and the strains follow the forces.
            let stretch_slope = s.shear_force * s.curvature * per(s.stretch, s.axial_force);
            let slide_slope = -s.axial_force * s.curvature * per(s.slide, s.shear_force);
            let arm_slope = -pitch.powi(2) * open * stretch_slope
                / (4.0 * PI.powi(2) * radius * column.scale.length);
            let turn_slope = sign * s.curvature_slope;
            let (wire, wire_slope) = match spring.wire {
                Wire::Round { diameter } => {
                    let wire = (diameter.powi(2) - (s.slide * pitch).powi(2))
                        .max(0.0)
                        .sqrt();
                    let slope = if wire > 0.0 {
                        -s.slide * slide_slope * pitch.powi(2) / wire
                    } else {
                        0.0
                    };
                    (wire, slope)
                }
                Wire::Rectangular { axial, .. } => (axial, 0.0),
            };
            (
                s.place,
                wire - pitch * (open - arm * turn),
                wire_slope - pitch * (stretch_slope - arm_slope * turn - arm * turn_slope),
            )
        }))
        .value
    };
    -tightness(1.0).max(tightness(-1.0))
}
