//! What passes through the contact of a column with its guides: where it leans, how near it is, what
//! friction takes.

use super::guided::Leaning;
use super::judge::AtCorner;
use super::layout::{Column, ColumnState};
use super::lean::{PADS, SLOTS};
use super::pads::Pad;
use super::profile::{Peak, Station};
use super::seat::Touch;
use super::wall::TopSeat;
use crate::solve::System;

/// A stretch of the column that leans on a guide, in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Contact {
    /// Its middle along the stress-free axis, share of the length from the bottom.
    pub place: f64,
    /// Its length, share of the column's.
    pub width: f64,
    /// Side of the strip on which it leans: +1 at +y.
    pub side: f64,
    /// Force across the wall.
    pub push: f64,
    /// Force of friction on the column along x.
    pub drag: f64,
    /// Whether it leans on the corner at the end of a guide.
    pub at_corner: bool,
    /// Whether it may lean there.
    pub may_touch: bool,
}

/// A place of the axis.
struct Place {
    place: f64,
    x: f64,
    y: f64,
    x_slope: f64,
    y_slope: f64,
    /// F_x, as the growth of the coil has it.
    force: f64,
}

impl Place {
    fn of(station: &Station) -> Self {
        Place {
            place: station.place,
            x: station.x,
            y: station.y,
            x_slope: station.x_slope,
            y_slope: station.y_slope,
            force: station.axial_force * station.angle.cos()
                - station.shear_force * station.angle.sin(),
        }
    }

    /// Where the axis passes x between two stations: of the cubics through both.
    fn at(stations: &[Station], x: f64) -> Option<Self> {
        let pair = stations
            .windows(2)
            .find(|pair| pair[0].x <= x && x < pair[1].x)?;
        let (one, other) = (Place::of(&pair[0]), Place::of(&pair[1]));
        let h = other.place - one.place;
        let cubic = |a: f64, b: f64, slope_a: f64, slope_b: f64, u: f64| {
            let (p, q) = (slope_a * h, slope_b * h);
            let value =
                a + u * (p + u * (3.0 * (b - a) - 2.0 * p - q + u * (p + q - 2.0 * (b - a))));
            let slope =
                p + u * (2.0 * (3.0 * (b - a) - 2.0 * p - q) + 3.0 * u * (p + q - 2.0 * (b - a)));
            (value, slope / h)
        };
        let along = |u: f64| cubic(one.x, other.x, one.x_slope, other.x_slope, u);
        let mut u = (x - one.x) / (other.x - one.x);
        for _ in 0..8 {
            let (value, slope) = along(u);
            u = (u - (value - x) / (slope * h)).clamp(0.0, 1.0);
        }
        let (y, y_slope) = cubic(one.y, other.y, one.y_slope, other.y_slope, u);
        Some(Place {
            place: one.place + u * h,
            x,
            y,
            x_slope: along(u).1,
            y_slope,
            force: one.force + u * (other.force - one.force),
        })
    }
}

/// A place dragged along a guide.
struct Dragged {
    slot: Slot,
    /// Force of friction on it along x.
    drag: f64,
    /// Whether its guide rides on the top seat.
    rides: bool,
}

enum Slot {
    /// Pad of an element.
    Pad(usize, usize),
    /// Corner at an end of a wall.
    Corner(usize, usize),
}

impl Column {
    /// Where it leans at a state, from bottom to top.
    pub fn contacts(&self, state: &ColumnState, out: &mut Vec<Contact>) {
        out.clear();
        let Some(leaning) = &self.leaning else { return };
        let top = self.top_seat(state);
        let width = 1.0 / (self.elements.len() * PADS) as f64;
        for e in 0..self.elements.len() {
            self.in_element(leaning, state, &top, e, |k, pad, jump, corner| {
                let Pad::Leans { side, facing, .. } = pad else {
                    return;
                };
                let slope = corner.map_or(facing.slope, |corner| corner.tilt);
                let pad_place = ((e * PADS + k) as f64 + 0.5) * width;
                out.push(Contact {
                    place: corner.map_or(pad_place, |corner| corner.place),
                    width,
                    side: *side,
                    push: side * jump[1],
                    // The jump of the force is the force on the column, reversed.
                    drag: -(jump[0] + slope * jump[1]),
                    at_corner: corner.is_some(),
                    may_touch: facing.may_touch,
                });
            });
        }
        out.sort_by(|a, b| a.place.total_cmp(&b.place));
    }

    /// Calls `act` for every place of an element through which force passes: its number, what it does,
    /// its jump, and the corner it is, if it is one.
    fn in_element(
        &self,
        leaning: &Leaning,
        state: &ColumnState,
        top: &TopSeat,
        e: usize,
        mut act: impl FnMut(usize, &Pad, [f64; 2], Option<&AtCorner>),
    ) {
        let jumps = Leaning::jumps(&state.side, e);
        if jumps.iter().all(|j| j[1] == 0.0) {
            return;
        }
        let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
        let mut held = leaning.held(self, state, &a, &b, e);
        let corner = leaning.corner_in(e, top, &state.side, &mut held);
        let means = held.means(&leaning.tables);
        let were = &leaning.was[e * SLOTS..(e + 1) * SLOTS];
        let judge = leaning.judge(top);
        let decided = judge.decide(&held, &means, were, corner.as_ref());
        for (k, (pad, _)) in decided.iter().enumerate() {
            if jumps[k][1] != 0.0 {
                act(k, pad, jumps[k], corner.as_ref().filter(|_| k == PADS));
            }
        }
    }

    /// The tightest place between the axis and the guides, of all or of those that may not be
    /// touched: its place and the room there, negative inside a guide; `None` where there is no guide
    /// beside the column. `stations` are those of [`Column::profile`] at this state.
    pub fn tightest(
        &self,
        state: &ColumnState,
        stations: &[Station],
        forbidden_only: bool,
    ) -> Option<Peak> {
        let leaning = self.leaning.as_ref()?;
        let top = self.top_seat(state);
        let compliance = self.elements[0].points[0].axial_compliance;
        let walls = leaning
            .walls
            .iter()
            .filter(|wall| !(forbidden_only && wall.may_touch));
        let depth = walls
            .flat_map(|wall| [(wall, 1.0), (wall, -1.0)])
            .map(|(wall, side)| {
                let depth_at = |s: &Place| {
                    let facing = wall.surface(s.x, s.force, compliance, &top);
                    let depth = side * (s.y - facing.axis) - facing.clearance;
                    (
                        s.place,
                        depth,
                        side * (s.y_slope - facing.slope * s.x_slope),
                    )
                };
                let beside = stations
                    .iter()
                    .map(Place::of)
                    .filter(|s| wall.covers(s.x, 0.0, &top));
                let along = Peak::of(beside.map(|s| depth_at(&s)));
                let corners = wall.corners(&top).into_iter().flatten();
                corners
                    .filter_map(|x| Place::at(stations, x))
                    .fold(along, |peak, s| {
                        let (place, value, _) = depth_at(&s);
                        if value > peak.value {
                            Peak { place, value }
                        } else {
                            peak
                        }
                    })
            })
            .max_by(|a, b| a.value.total_cmp(&b.value))?;
        depth.value.is_finite().then_some(Peak {
            place: depth.place,
            value: -depth.value,
        })
    }

    /// How far a place slides along its guide, towards +x, from one state to the next.
    fn slid(
        &self,
        leaning: &Leaning,
        dragged: &Dragged,
        states: [(&ColumnState, &TopSeat); 2],
    ) -> f64 {
        match dragged.slot {
            Slot::Pad(e, k) => {
                let [before, after] = states.map(|(state, top)| {
                    let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
                    let held = leaning.held_with_corner(self, state, &a, &b, e);
                    let x = held.means(&leaning.tables)[k][0];
                    if dragged.rides { x - top.x } else { x }
                });
                after - before
            }
            Slot::Corner(wall, end) => {
                let places = states.map(|(state, top)| {
                    (0..self.elements.len()).find_map(|e| {
                        let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
                        let mut held = leaning.held(self, state, &a, &b, e);
                        let x = leaning.walls[wall].corners(top)[end]?;
                        if !held.passes(x) {
                            return None;
                        }
                        let t = held.find_place(&leaning.tables, x);
                        let rate = held.brink(t).mean[0];
                        Some(((e as f64 + 0.5 * (1.0 + t)) * self.elements[e].length, rate))
                    })
                });
                match places {
                    [Some((before, rate)), Some((after, other))] => {
                        -0.5 * (rate + other) * (after - before)
                    }
                    _ => 0.0,
                }
            }
        }
    }

    /// Work of the friction on guides and swivels from one state to the next, in units of force ×
    /// length; negative: it takes energy.
    pub fn friction_work(&self, from: &ColumnState, to: &ColumnState) -> f64 {
        let last = self.elements.len();
        let mut work = 0.0;
        for (which, seat) in self.seats.iter().enumerate() {
            if let Touch::Swivel { .. } = seat.touch {
                let turn = to.nodes[which * last][2] - from.nodes[which * last][2];
                let moment = |state| self.end_actions(state)[which][2];
                work += 0.5 * (moment(from) + moment(to)) * turn;
            }
        }
        let Some(leaning) = &self.leaning else {
            return work;
        };
        if leaning.symmetric {
            return work;
        }
        // (drag, place, what carries the guide) of every place that leans, at both states.
        let gather = |state: &ColumnState| {
            let top = self.top_seat(state);
            let mut found: Vec<Dragged> = Vec::new();
            for e in 0..last {
                self.in_element(leaning, state, &top, e, |k, pad, jump, corner| {
                    let Pad::Leans { facing, .. } = pad else {
                        return;
                    };
                    let slope = corner.map_or(facing.slope, |corner| corner.tilt);
                    found.push(Dragged {
                        slot: match corner {
                            Some(corner) => Slot::Corner(corner.wall, corner.end),
                            None => Slot::Pad(e, k),
                        },
                        drag: -(jump[0] + slope * jump[1]),
                        rides: facing.from_top,
                    });
                });
            }
            (found, top)
        };
        let ((before, top_before), (after, top_after)) = (gather(from), gather(to));
        let both = before
            .iter()
            .map(|d| (d, 0))
            .chain(after.iter().map(|d| (d, 1)));
        for (dragged, _) in both {
            let moved = self.slid(leaning, dragged, [(from, &top_before), (to, &top_after)]);
            work += 0.5 * dragged.drag * moved;
        }
        work
    }

    /// Whether friction acts on it.
    pub fn has_friction(&self) -> bool {
        !self.is_symmetric()
            && (self
                .seats
                .iter()
                .any(|seat| matches!(seat.touch, Touch::Swivel { .. }))
                || self
                    .leaning
                    .as_ref()
                    .is_some_and(|leaning| leaning.walls.iter().any(|wall| wall.friction > 0.0)))
    }

    /// Wave number q, in 1/L, of the waves into which the straight column bends freely under an axial
    /// force: `q² = P (a + b)/EI`, a = 1 − P/EA, b = P/GA. A part of length ℓ that lies flat on a wall,
    /// its ends held in place and slope, buckles away from it at `q ℓ = 2π`.
    pub fn wave_number(&self, force: f64) -> f64 {
        let law = &self.elements[0].points[0];
        let open = 1.0 + force * (law.shear_compliance - law.axial_compliance);
        (force * open / law.bending).max(0.0).sqrt()
    }
}
