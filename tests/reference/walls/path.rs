//! The problem and the points of its path.

use super::beam::Beam;
use super::bounded::{Bounds, Minimum, minimise};
use crate::reference::shooting::Rod;

/// How an end is held: 0 is free, infinity held, between them elastic.
#[derive(Clone, Copy, Debug)]
pub struct Hold {
    /// Moment per turn away from `angle`.
    pub rotation: f64,
    /// Force per sideways motion away from `offset`.
    pub sideways: f64,
    /// Angle of the seat, rad.
    pub angle: f64,
    /// Sideways position of the seat.
    pub offset: f64,
}

impl Hold {
    /// Held in both.
    pub const CLAMPED: Hold = Hold::elastic(f64::INFINITY, f64::INFINITY);
    /// Free to turn.
    pub const HINGED: Hold = Hold::elastic(0.0, f64::INFINITY);
    /// Kept from turning, free sideways.
    pub const SLIDING: Hold = Hold::elastic(f64::INFINITY, 0.0);

    /// Elastic, at angle and offset 0.
    pub const fn elastic(rotation: f64, sideways: f64) -> Hold {
        Hold {
            rotation,
            sideways,
            angle: 0.0,
            offset: 0.0,
        }
    }

    /// The same with the seat at an angle.
    pub const fn tilted(self, angle: f64) -> Hold {
        Hold { angle, ..self }
    }
}

/// A column between two walls.
pub struct Walls {
    /// The column.
    pub rod: Rod,
    /// Seat at S = 0.
    pub bottom: Hold,
    /// Seat at S = L, where the load comes in.
    pub top: Hold,
    /// c: the walls are at y = ±c. Infinity: there are none. It may be changed between points.
    pub clearance: f64,
    /// Number of segments.
    pub segments: usize,
}

/// What is set.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Set {
    /// L − (x of the top − x of the bottom).
    Shortening(f64),
    /// P.
    Load(f64),
}

/// A stable state.
#[derive(Clone, Debug)]
pub struct Point {
    /// P.
    pub load: f64,
    /// L − (x of the top − x of the bottom).
    pub shortening: f64,
    /// Place S of every node.
    pub places: Vec<f64>,
    /// x of every node; the bottom is at 0.
    pub along: Vec<f64>,
    /// y of every node.
    pub heights: Vec<f64>,
    /// Rotation of the section at every node, rad.
    pub turns: Vec<f64>,
    /// Force of the walls on every node, to +y positive.
    pub reactions: Vec<f64>,
    /// Moments of the seats on the column, bottom and top.
    pub seat_moments: [f64; 2],
    /// Sideways forces of the seats on the column, bottom and top.
    pub seat_forces: [f64; 2],
    /// Energy of the column and of seats that give.
    pub energy: f64,
    /// The column left a state that had stopped being a minimum.
    pub left: bool,
    unknowns: Vec<f64>,
}

/// No minimum was found.
#[derive(Debug)]
pub struct Lost {
    /// What was set.
    pub set: Set,
}

impl Walls {
    /// The stable state with nothing set but P = 0.
    pub fn unloaded(&self) -> Result<Point, Lost> {
        let mut guess = vec![0.0; 3 * (self.segments + 1)];
        for i in 0..=self.segments {
            let share = i as f64 / self.segments as f64;
            guess[3 * i + 2] = self.bottom.angle * (1.0 - share) + self.top.angle * share;
        }
        self.stable(Set::Load(0.0), guess)
    }

    /// The stable state downhill from `start` when `set` is set.
    pub fn next(&self, set: Set, start: &Point) -> Result<Point, Lost> {
        let mut guess = start.unknowns.clone();
        if let Set::Shortening(shortening) = set {
            let more = shortening - start.shortening;
            for i in 0..=self.segments {
                guess[3 * i] -= more * i as f64 / self.segments as f64;
            }
        }
        self.stable(set, guess)
    }

    /// The stable states with each of `sets` set in turn.
    pub fn follow(&self, sets: &[Set], start: &Point) -> Result<Vec<Point>, Lost> {
        let mut points: Vec<Point> = Vec::with_capacity(sets.len());
        for set in sets {
            let next = self.next(*set, points.last().unwrap_or(start))?;
            points.push(next);
        }
        Ok(points)
    }

    fn stable(&self, set: Set, mut guess: Vec<f64>) -> Result<Point, Lost> {
        let nodes = self.segments + 1;
        let top = 3 * self.segments;
        let mut bounds = Bounds {
            held: vec![false; 3 * nodes],
            low: vec![f64::NEG_INFINITY; 3 * nodes],
            high: vec![f64::INFINITY; 3 * nodes],
        };
        for i in 0..nodes {
            bounds.low[3 * i + 1] = -self.clearance;
            bounds.high[3 * i + 1] = self.clearance;
        }
        let mut hold = |place: usize, value: f64| {
            bounds.held[place] = true;
            guess[place] = value;
        };
        hold(0, 0.0);
        for (node, end) in [(0, &self.bottom), (self.segments, &self.top)] {
            if end.sideways.is_infinite() {
                hold(3 * node + 1, end.offset);
            }
            if end.rotation.is_infinite() {
                hold(3 * node + 2, end.angle);
            }
        }
        if let Set::Shortening(shortening) = set {
            hold(top, -shortening);
        }
        let beam = Beam {
            rod: &self.rod,
            ends: [&self.bottom, &self.top],
            segments: self.segments,
            load: match set {
                Set::Load(load) => load,
                Set::Shortening(_) => 0.0,
            },
        };
        let force = self.rod.bending / self.rod.length.powi(2);
        let minimum = minimise(&beam, &bounds, guess, force).ok_or(Lost { set })?;
        Ok(self.point(&beam, &bounds, minimum))
    }

    fn point(&self, beam: &Beam, bounds: &Bounds, minimum: Minimum) -> Point {
        let Minimum { at, gradient, left } = minimum;
        let nodes = self.segments + 1;
        let top = 3 * self.segments;
        let every = |of: &dyn Fn(usize) -> f64| (0..nodes).map(of).collect::<Vec<f64>>();
        let cell = beam.cell();
        let wall = |i: usize| {
            let place = 3 * i + 1;
            let touches = at[place] <= bounds.low[place] || at[place] >= bounds.high[place];
            if touches && !bounds.held[place] {
                gradient[place]
            } else {
                0.0
            }
        };
        let seat = |place: usize, stiffness: f64, rest: f64| {
            if stiffness.is_infinite() {
                gradient[place]
            } else {
                -stiffness * (at[place] - rest)
            }
        };
        Point {
            load: beam.load - gradient[top],
            shortening: -at[top],
            places: every(&|i| i as f64 * cell),
            along: every(&|i| i as f64 * cell + at[3 * i]),
            heights: every(&|i| at[3 * i + 1]),
            turns: every(&|i| at[3 * i + 2]),
            reactions: every(&wall),
            seat_moments: [
                seat(2, self.bottom.rotation, self.bottom.angle),
                seat(top + 2, self.top.rotation, self.top.angle),
            ],
            seat_forces: [
                seat(1, self.bottom.sideways, self.bottom.offset),
                seat(top + 1, self.top.sideways, self.top.offset),
            ],
            energy: beam.energy(&at) - beam.load * at[top],
            left: left > 0,
            unknowns: at,
        }
    }
}

impl Point {
    /// Largest |y|.
    pub fn largest_height(&self) -> f64 {
        self.heights.iter().fold(0.0, |most, y| most.max(y.abs()))
    }

    /// Total force of the upper (+y) wall, and of the lower: both positive.
    pub fn wall_forces(&self) -> [f64; 2] {
        let of = |sign: f64| self.reactions.iter().map(|r| (sign * r).max(0.0)).sum();
        [of(-1.0), of(1.0)]
    }

    /// Force of the walls per unit of length at node `i`, to +y positive, averaged over its
    /// neighbourhood of one segment.
    pub fn pressure(&self, i: usize) -> f64 {
        self.reactions[i] / (self.places[1] - self.places[0])
    }

    /// Where the column lies against a wall: runs of touching nodes that carry a force, as first
    /// and last place, and the total force of each, to +y positive.
    pub fn touches(&self) -> Vec<(f64, f64, f64)> {
        let mut runs: Vec<(f64, f64, f64)> = Vec::new();
        let mut open = false;
        for (i, reaction) in self.reactions.iter().enumerate() {
            if *reaction == 0.0 {
                open = false;
            } else if open {
                let last = runs.len() - 1;
                runs[last].1 = self.places[i];
                runs[last].2 += reaction;
            } else {
                runs.push((self.places[i], self.places[i], *reaction));
                open = true;
            }
        }
        runs
    }

    /// y at a place, by a cubic through the four nearest nodes.
    pub fn height_at(&self, place: f64) -> f64 {
        let cell = self.places[1] - self.places[0];
        let last = self.places.len() - 1;
        let first = ((place / cell).floor() as usize)
            .saturating_sub(1)
            .min(last - 3);
        (first..first + 4)
            .map(|i| {
                let weight: f64 = (first..first + 4)
                    .filter(|j| *j != i)
                    .map(|j| (place - self.places[j]) / (self.places[i] - self.places[j]))
                    .product();
                weight * self.heights[i]
            })
            .sum()
    }
}

/// One Richardson step from a value with n segments and one with 2n.
pub fn richardson(coarse: f64, fine: f64) -> f64 {
    (4.0 * fine - coarse) / 3.0
}
