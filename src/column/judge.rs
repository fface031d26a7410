//! What a pad does: which of the laws (5) and (8) holds, from where it is and what it carries.

use super::lean::{Held, PADS, SLOTS};
use super::pads::{Motion, Pad};
use super::wall::{Facing, TopSeat, Wall};

/// Friction holds up to this share above its limit, against round-off.
const HOLDS: f64 = 1.0 + 1e-9;

/// What decides what a pad does, besides its own place and force.
pub(super) struct Judge<'a> {
    pub walls: &'a [Wall],
    pub top: &'a TopSeat,
    /// ρ of the search.
    pub search: f64,
    pub symmetric: bool,
    /// By how much all clearances are widened.
    pub slack: f64,
    /// Whether friction is left out.
    pub smooth: bool,
}

impl Judge<'_> {
    /// What the pads of an element do at their mean positions, from what they did and where they
    /// `were`; and by how much the condition that decides it is met, as a force. `corner`: the wall
    /// whose corner lies in the element, its tilt τ there, and how far its place has moved towards −x.
    pub fn decide(
        &self,
        held: &Held<'_>,
        means: &[[f64; 2]; SLOTS],
        were: &[f64],
        corner: Option<&AtCorner>,
    ) -> [(Pad, f64); SLOTS] {
        std::array::from_fn(|k| {
            let (place, jump) = (means[k], held.jumps[k]);
            let facing = match (k, corner) {
                (PADS, None) => None,
                (PADS, Some(corner)) => Some(self.surface(&self.walls[corner.wall], held, place)),
                _ => self.nearest(held, place),
            };
            let Some(facing) = facing else {
                return (Pad::Away, f64::INFINITY);
            };
            let aside = place[1] - facing.axis;
            let side = if jump[1] != 0.0 {
                jump[1].signum()
            } else {
                aside.signum()
            };
            let gap = facing.clearance - side * aside;
            let push = side * jump[1];
            let held_on = push - self.search * gap;
            if held_on <= 0.0 {
                return (Pad::Away, -held_on);
            }
            let (motion, by) = if self.symmetric || self.smooth || facing.friction == 0.0 {
                (Motion::Slips(0.0), held_on)
            } else {
                let (slope, moved) = match (k, corner) {
                    (PADS, Some(corner)) => (corner.tilt, corner.moved),
                    _ => (facing.slope, place[0] - were[k]),
                };
                let drag = jump[0] + slope * jump[1];
                let trial = drag + self.search * moved;
                let most = facing.friction * push * HOLDS;
                if trial.abs() <= most {
                    (Motion::Sticks, most - trial.abs())
                } else {
                    let way = Motion::Slips(trial.signum() * facing.friction);
                    (way, trial.abs() - most)
                }
            };
            let pad = Pad::Leans {
                side,
                facing,
                motion,
            };
            (pad, by)
        })
    }

    /// What a pad did, where the axis is now.
    pub fn kept(
        &self,
        pad: &Pad,
        k: usize,
        held: &Held<'_>,
        place: [f64; 2],
        corner: Option<&AtCorner>,
    ) -> Pad {
        let facing = match (k, corner) {
            (PADS, None) => None,
            (PADS, Some(corner)) => Some(self.surface(&self.walls[corner.wall], held, place)),
            _ => self.nearest(held, place),
        };
        match (pad, facing) {
            (Pad::Leans { side, motion, .. }, Some(facing)) => Pad::Leans {
                side: *side,
                facing,
                motion: *motion,
            },
            _ => Pad::Away,
        }
    }

    fn surface(&self, wall: &Wall, held: &Held<'_>, place: [f64; 2]) -> Facing {
        let compliance = held.element.points[0].axial_compliance;
        let facing = wall.surface(place[0], held.inner[3], compliance, self.top);
        Facing {
            clearance: facing.clearance + self.slack,
            ..facing
        }
    }

    /// The nearest wall that lies beside the whole pad.
    fn nearest(&self, held: &Held<'_>, place: [f64; 2]) -> Option<Facing> {
        let open = 1.0 + held.inner[3] * held.element.points[0].axial_compliance;
        let half = 0.5 * held.element.length / PADS as f64 * open;
        self.walls
            .iter()
            .filter(|wall| wall.covers(place[0], half, self.top))
            .map(|wall| self.surface(wall, held, place))
            .min_by(|a, b| {
                let room = |f: &Facing| f.clearance - (place[1] - f.axis).abs();
                room(a).total_cmp(&room(b))
            })
    }
}

/// A corner in an element.
#[derive(Clone, Copy, Debug)]
pub(super) struct AtCorner {
    /// The wall whose corner it is.
    pub wall: usize,
    /// Which end of it.
    pub end: usize,
    /// Its place along the column, in units of its length.
    pub place: f64,
    /// How far that is from where it was when the step began.
    pub strayed: f64,
    /// τ of [`super::corner`].
    pub tilt: f64,
    /// How far what was at the corner has moved along x since the step began.
    pub moved: f64,
}
