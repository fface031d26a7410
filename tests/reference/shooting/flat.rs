//! Flat ends on flat seats that can only push, by shooting: a rigid ring of radius R at each end.
//!
//! A ring lies flat, or stands on one of its two edges. Lying, its centre is that of its seat and its
//! angle the seat's; |M| ≤ N R about its centre. Standing on the edge e = ±R, that edge is where it
//! was in the seat, at e along the seat plane from the seat's centre, and is a hinge: the
//! centre rises by R |sin φ| and moves aside by R(1 − cos φ), φ = θ − β − angle. Then
//! M = e(P cos(θ − β) − H sin(θ − β)) about the ring's centre, and the other edge must be off the seat: e φ ≥ 0
//! at the bottom, e φ ≤ 0 at the top. The seat's force across and along its normal is
//! N = P cos(angle) − H sin(angle), T = P sin(angle) + H cos(angle). No edge slides.
//!
//! The path is followed in any parameter; each way of standing is a boundary value problem of its own, and
//! where it stops being possible is found by bisection.

use super::axis::Rod;
use super::problem::{Failure, Parameter, Problem, State};
use super::seat::Seat;

/// A flat seat and the ring on it.
#[derive(Clone, Copy, Debug)]
pub struct FlatSeat {
    /// R.
    pub radius: f64,
    /// Angle of the seat, rad.
    pub angle: f64,
    /// Sideways position of the seat's centre.
    pub offset: f64,
    /// From the end of the flexible part to the ring's centre, outward positive.
    pub arm: f64,
    /// Angle β by which the ring's plane falls short of the section's: lying, the section stands at
    /// angle + β.
    pub lean: f64,
}

/// What rounding may leave of a moment beyond N R (in kL²) or of an angle into the seat.
const NEAR: f64 = 1e-11;

/// How a ring is on its seat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Standing {
    /// It lies flat.
    Flat,
    /// It stands on its edge towards +y (1) or −y (−1).
    Edge(f64),
}

/// A column between flat seats.
pub struct FlatColumn {
    problem: Problem,
    seats: [FlatSeat; 2],
    standing: [Standing; 2],
}

/// A state of it.
#[derive(Clone, Copy, Debug)]
pub struct FlatState {
    /// The column's state; its pivots are the centres of rings that lie and the edges of others.
    pub column: State,
    /// How each ring is on its seat, bottom and top.
    pub standing: [Standing; 2],
    /// Approach of the seats' centres from where they are L and both arms apart.
    pub travel: f64,
    /// Normal force N of each seat.
    pub normal: [f64; 2],
    /// Tangential force T of each seat.
    pub tangential: [f64; 2],
    /// Moment M that the column passes at each ring's centre.
    pub moment: [f64; 2],
    /// φ of each ring.
    pub opening: [f64; 2],
}

impl FlatColumn {
    /// Of a rod between a bottom and a top seat.
    pub fn new(rod: Rod, seats: [FlatSeat; 2]) -> FlatColumn {
        let problem = Problem {
            rod,
            bottom: Seat::CLAMPED,
            top: Seat::CLAMPED,
        };
        let mut column = FlatColumn {
            problem,
            seats,
            standing: [Standing::Flat; 2],
        };
        column.stand(column.standing);
        column
    }

    /// The state under the small load `load`: the only way of standing that is possible there.
    pub fn start(&mut self, load: f64) -> Option<FlatState> {
        let ways = [Standing::Flat, Standing::Edge(1.0), Standing::Edge(-1.0)];
        let mut found = Vec::new();
        for bottom in ways {
            for top in ways {
                self.stand([bottom, top]);
                let Ok(state) = self.problem.loaded(Parameter::Load, load) else {
                    continue;
                };
                let state = self.look(state);
                if self.wrong(&state).iter().all(|wrong| *wrong <= NEAR) {
                    found.push(state);
                }
            }
        }
        let state = found.pop()?;
        self.stand(state.standing);
        found.is_empty().then_some(state)
    }

    /// The state where `parameter` (`Travel`: of the seats' centres) is `target`, followed from
    /// `from` through every lift-off and return.
    pub fn follow(
        &mut self,
        parameter: Parameter,
        target: f64,
        from: &FlatState,
    ) -> Result<FlatState, Failure> {
        let mut at = *from;
        for _ in 0..20 {
            self.stand(at.standing);
            let reached = self.on(parameter, target, &at.column)?;
            if self.wrong(&reached).iter().all(|wrong| *wrong <= NEAR) {
                return Ok(reached);
            }
            at = self.change(parameter, target, at, reached)?;
        }
        Err(Failure {
            parameter,
            value: target,
            correction: f64::INFINITY,
        })
    }

    /// y of the column's middle.
    pub fn height(&mut self, state: &FlatState) -> f64 {
        self.stand(state.standing);
        self.problem.profile(&state.column, &[0.5])[0].y
    }

    /// The state between `from` and `target` in which a ring can no longer lie or stand
    /// as it does, in its next way of standing. A column that lifts off because it bows does so at a
    /// limit of travel: from there it is followed in `BottomTurn`.
    pub fn next_change(
        &mut self,
        parameter: Parameter,
        target: f64,
        from: &FlatState,
    ) -> Result<FlatState, Failure> {
        self.stand(from.standing);
        let reached = self.on(parameter, target, &from.column)?;
        self.change(parameter, target, *from, reached)
    }

    /// The same between `low`, which is possible, and `high` at `target`, which is not.
    fn change(
        &mut self,
        parameter: Parameter,
        target: f64,
        mut low: FlatState,
        mut high: FlatState,
    ) -> Result<FlatState, Failure> {
        let (mut least, mut most) = (self.value(parameter, &low), target);
        for _ in 0..45 {
            let value = 0.5 * (least + most);
            let middle = self.on(parameter, value, &low.column)?;
            if self.wrong(&middle).iter().all(|wrong| *wrong <= NEAR) {
                (low, least) = (middle, value);
            } else {
                (high, most) = (middle, value);
            }
        }
        let wrong = self.wrong(&high);
        let next: [Standing; 2] = std::array::from_fn(|end| match high.standing[end] {
            _ if wrong[end] <= 0.0 => high.standing[end],
            Standing::Flat => Standing::Edge(high.moment[end].signum()),
            Standing::Edge(_) => Standing::Flat,
        });
        self.stand(next);
        let adopted = self.problem.adopt(&high.column);
        // A ring that lies does not turn.
        let lies = match parameter {
            Parameter::BottomTurn => next[0] == Standing::Flat,
            Parameter::TopTurn => next[1] == Standing::Flat,
            _ => false,
        };
        if lies {
            self.on(Parameter::Travel, high.travel, &adopted)
        } else {
            self.on(parameter, most, &adopted)
        }
    }

    /// Energy of the column, by Simpson's rule over `2 cells` parts.
    pub fn energy(&mut self, state: &FlatState, cells: u32) -> f64 {
        self.stand(state.standing);
        let rod = &self.problem.rod;
        let last = 2 * cells;
        let shares: Vec<f64> = (0..=last).map(|i| f64::from(i) / f64::from(last)).collect();
        let (load, side) = (state.column.load, state.column.side_force);
        let sum: f64 = self
            .problem
            .profile(&state.column, &shares)
            .iter()
            .zip(0..=last)
            .map(|(station, i)| {
                let (sin, cos) = station.theta.sin_cos();
                let (normal, shear) = (-load * cos + side * sin, load * sin + side * cos);
                let density = 0.5
                    * (normal.powi(2) / rod.axial
                        + shear.powi(2) / rod.shear
                        + station.moment.powi(2) / rod.bending);
                let weight = match i {
                    0 => 1.0,
                    i if i == last => 1.0,
                    i if i % 2 == 1 => 4.0,
                    _ => 2.0,
                };
                weight * density
            })
            .sum();
        sum * rod.length / (3.0 * f64::from(last))
    }

    /// The column's problem for rings that stand so.
    fn stand(&mut self, standing: [Standing; 2]) {
        let seat = |flat: &FlatSeat, outward: f64, standing: Standing| match standing {
            Standing::Flat => Seat {
                angle: flat.angle + flat.lean,
                offset: flat.offset,
                arm: flat.arm,
                ..Seat::CLAMPED
            },
            Standing::Edge(sign) => Seat {
                offset: flat.offset + sign * flat.radius * flat.angle.cos(),
                arm: flat.arm + outward * sign * flat.radius * flat.lean.sin(),
                eccentricity: sign * flat.radius * flat.lean.cos(),
                ..Seat::HINGED
            },
        };
        self.standing = standing;
        self.problem.bottom = seat(&self.seats[0], -1.0, standing[0]);
        self.problem.top = seat(&self.seats[1], 1.0, standing[1]);
    }

    /// Approach of the pivots less that of the seats' centres.
    fn lead(&self) -> f64 {
        let along = |end: usize| match self.standing[end] {
            Standing::Flat => 0.0,
            Standing::Edge(sign) => {
                let seat = &self.seats[end];
                // The pivots' own arms count from the unloaded column too.
                sign * seat.radius * (seat.angle.sin() + seat.lean.sin())
            }
        };
        along(1) - along(0)
    }

    fn value(&self, parameter: Parameter, state: &FlatState) -> f64 {
        match parameter {
            Parameter::Travel => state.travel,
            other => self.problem.value(other, &state.column),
        }
    }

    fn on(&self, parameter: Parameter, target: f64, from: &State) -> Result<FlatState, Failure> {
        let value = match parameter {
            Parameter::Travel => target + self.lead(),
            _ => target,
        };
        let states = self.problem.follow(parameter, &[value], from)?;
        // A guess that already has this value is not a state yet.
        let state = self
            .problem
            .solve(parameter, value, states.last().unwrap_or(from))?;
        Ok(self.look(state))
    }

    fn look(&self, column: State) -> FlatState {
        let (load, side) = (column.load, column.side_force);
        let turns = [column.bottom.theta, column.top.theta];
        FlatState {
            column,
            standing: self.standing,
            travel: column.travel - self.lead(),
            normal: self
                .seats
                .map(|seat| load * seat.angle.cos() - side * seat.angle.sin()),
            tangential: self
                .seats
                .map(|seat| load * seat.angle.sin() + side * seat.angle.cos()),
            moment: std::array::from_fn(|end| match self.standing[end] {
                Standing::Flat => column.pivot_moments[end],
                Standing::Edge(sign) => {
                    let (sin, cos) = (turns[end] - self.seats[end].lean).sin_cos();
                    sign * self.seats[end].radius * (load * cos - side * sin)
                }
            }),
            opening: std::array::from_fn(|end| {
                turns[end] - self.seats[end].lean - self.seats[end].angle
            }),
        }
    }

    /// By how much each end stands as it cannot; possible where it is not positive.
    fn wrong(&self, state: &FlatState) -> [f64; 2] {
        std::array::from_fn(|end| match state.standing[end] {
            Standing::Flat => state.moment[end].abs() - state.normal[end] * self.seats[end].radius,
            Standing::Edge(sign) => {
                let closing = if end == 0 { -1.0 } else { 1.0 };
                let through = closing * sign * state.opening[end];
                // Without a force it does not stand at all.
                if state.normal[end] < 0.0 {
                    1.0
                } else {
                    through
                }
            }
        })
    }
}
