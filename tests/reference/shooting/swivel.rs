//! A ball or swivel with friction at the top, by shooting.
//!
//! It holds the end at its angle while |M| ≤ ρP, ρ the coefficient of friction times the ball's
//! radius, and turns against |M| = ρP. Which it does is asked step by step: a step in which it would
//! hold more than it can is a step in which it turns, and one in which it would turn the way
//! its moment pushes it is one in which it holds. Steps end where travel turns back, so that what a
//! step joins is one way of going.

use super::axis::Rod;
use super::problem::{Failure, Parameter, Problem, State};
use super::seat::Seat;

/// A column on any bottom seat whose top turns against friction.
pub struct SwivelColumn {
    problem: Problem,
    /// ρ.
    drag: f64,
    pivot: Seat,
}

/// A state of it.
#[derive(Clone, Copy, Debug)]
pub struct SwivelState {
    /// The column's state.
    pub column: State,
    /// Sign of the moment on the end while it turns; 0 while it holds.
    pub turning: f64,
    /// Work lost in friction since the start, by the trapezium rule over the steps.
    pub lost: f64,
}

impl SwivelColumn {
    /// `pivot` says where the ball is: its arm, offset and eccentricity.
    pub fn new(rod: Rod, bottom: Seat, pivot: Seat, drag: f64) -> SwivelColumn {
        SwivelColumn {
            problem: Problem {
                rod,
                bottom,
                top: pivot,
            },
            drag,
            pivot,
        }
    }

    /// Without load, the ball at the angle at which it has no moment.
    pub fn unloaded(&mut self) -> Result<SwivelState, Failure> {
        self.turn(0.0);
        Ok(SwivelState {
            column: self.problem.unloaded()?,
            turning: 0.0,
            lost: 0.0,
        })
    }

    /// The next state, at the travel `target`.
    pub fn step(&mut self, target: f64, from: &SwivelState) -> Result<SwivelState, Failure> {
        let before = &from.column;
        if from.turning != 0.0 {
            let state = self.turned(target, from, from.turning)?;
            if from.turning * (state.column.top.theta - before.top.theta) <= 0.0 {
                return Ok(state);
            }
        }
        self.problem.top = Seat {
            rotation: f64::INFINITY,
            angle: before.top.theta,
            ..self.pivot
        };
        let column = self.reach(target, before)?;
        let held = column.pivot_moments[1];
        if held.abs() <= self.drag * column.load {
            return Ok(SwivelState {
                column,
                turning: 0.0,
                lost: from.lost,
            });
        }
        self.turned(target, from, held.signum())
    }

    fn turned(
        &mut self,
        target: f64,
        from: &SwivelState,
        sign: f64,
    ) -> Result<SwivelState, Failure> {
        self.turn(sign);
        let column = self.reach(target, &from.column)?;
        let mean = 0.5 * (column.load + from.column.load);
        let turn = (column.top.theta - from.column.top.theta).abs();
        Ok(SwivelState {
            column,
            turning: sign,
            lost: from.lost + self.drag * mean * turn,
        })
    }

    fn turn(&mut self, sign: f64) {
        self.problem.top = Seat {
            rotation: 0.0,
            drag: sign * self.drag,
            ..self.pivot
        };
    }

    fn reach(&self, target: f64, from: &State) -> Result<State, Failure> {
        Ok(self.problem.follow(Parameter::Travel, &[target], from)?[0])
    }
}
