//! From a state of the column to what people ask about it.

use super::leaned::Leaned;
use crate::column::{Column, Peak, SeatPress, Station};
use crate::result::PathPoint;
use crate::setup::{Contact, FlatSeat, Setup};
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
    /// Least of what keeps a flat end flush, positive while all are: how far the force line stays
    /// inside the edge, share of its distance; negative: how far the end is turned out.
    pub seated: Option<f64>,
    /// Least of friction less thrust where an end could slide, N.
    pub slides: Option<f64>,
    /// How long what lies flat on a guide is, over the length at which it buckles away by itself.
    pub flat: f64,
    /// Smallest room to a guide that may not be touched, in the column's length; where it is touched,
    /// the force, negative.
    pub forbidden_room: Option<f64>,
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
        let seats_pressed = [0, 1].map(|end| column.seat_press(&solved.state, end));
        let line =
            |press: &SeatPress| (press.press.abs() > NO_FORCE).then_some(press.line * scale.length);
        let guide = Leaned::on(setup, column, &solved.state, &stations);
        let friction = guide.drag * scale.force;
        let falling = force_along * travel_along < 0.0;
        Seen {
            point: PathPoint {
                deflection_m: shortening + seats,
                shortening_m: shortening,
                force_n: force,
                bow_m: bow.value * scale.length,
                bow_place: bow.place,
                lateral_m: lateral * scale.length,
                bottom_rotation_rad: seats_pressed[0].angle,
                top_rotation_rad: seats_pressed[1].angle,
                bottom_moment_n_m: actions[0][2] * scale.moment(),
                top_moment_n_m: actions[1][2] * scale.moment(),
                transverse_force_n: solved.state.inner[0][4] * scale.force,
                bottom_thrust_n: seats_pressed[0].thrust * scale.force,
                top_thrust_n: seats_pressed[1].thrust * scale.force,
                bottom_line_m: line(&seats_pressed[0]),
                top_line_m: line(&seats_pressed[1]),
                bottom_lift_rad: seats_pressed[0].turned,
                top_lift_rad: seats_pressed[1].turned,
                guide_room_m: guide.room.map(|room| room * scale.length),
                guide_tightest_place: guide.tightest_place,
                guide_force_n: guide.push * scale.force,
                guide_coil_force_n: guide.on_one_coil.value * scale.force,
                guide_coil_place: guide.on_one_coil.place,
                guide_places: guide.places,
                guide_longest_m: guide.longest * scale.length,
                guide_corner_force_n: guide.at_corners * scale.force,
                guide_friction_n: friction,
                rate_n_per_m: force_along / travel_along,
                wire_stress_pa: wire_stress(setup, column, &stations),
                unstable_set_deflection: solved.negatives
                    - u32::from(falling && solved.negatives > 0),
                unstable_dead_load: solved.negatives,
            },
            flat: guide.flat,
            clearance: clearance(setup, column, &stations),
            seated: flat_ends(setup, &seats_pressed, scale.length),
            slides: sliding_ends(setup, &seats_pressed, scale.force),
            forbidden_room: column
                .tightest(&solved.state, &stations, true)
                .map(|tight| {
                    if guide.forbidden > 0.0 {
                        -guide.forbidden
                    } else {
                        tight.value
                    }
                }),
            along: (force_along, travel_along),
        }
    }
}

/// Force, EI/L², below which a force line has no place.
const NO_FORCE: f64 = 1e-9;

/// What keeps flat ends flush; `None` without a flat end.
fn flat_ends(setup: &Setup, pressed: &[SeatPress; 2], length: f64) -> Option<f64> {
    let kept = [&setup.bottom, &setup.top]
        .into_iter()
        .zip(pressed)
        .filter_map(|(end, press)| match end.contact {
            Contact::Flat(_) if press.turned != 0.0 => Some(-press.turned.abs()),
            Contact::Flat(flat) => {
                // Nothing is carried yet: flush by itself.
                if press.press.abs() < NO_FORCE {
                    return Some(1.0);
                }
                Some(1.0 - (press.line * length / flat.edge()).abs())
            }
            _ => None,
        });
    kept.reduce(f64::min)
}

/// Friction less thrust where an end could slide; `None` where none can.
fn sliding_ends(setup: &Setup, pressed: &[SeatPress; 2], force: f64) -> Option<f64> {
    let kept = [&setup.bottom, &setup.top]
        .into_iter()
        .zip(pressed)
        .filter_map(|(end, press)| match end.contact {
            Contact::Flat(FlatSeat {
                friction: Some(friction),
                ..
            }) => Some((friction * press.press - press.thrust.abs()) * force),
            _ => None,
        });
    kept.reduce(f64::min)
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
