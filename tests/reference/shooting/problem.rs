//! The boundary value problem: supports, load, and the way along the path.

use super::axis::{Axis, Rod, Section, Station};
use super::seat::Seat;
use nalgebra::{SMatrix, SVector};

/// A column in its seats.
pub struct Problem {
    /// The column.
    pub rod: Rod,
    /// Seat at S = 0.
    pub bottom: Seat,
    /// Seat at S = L, where the load comes in.
    pub top: Seat,
}

/// What is set to single out a point of the path.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Parameter {
    /// P.
    Load,
    /// Shortening of the flexible part: L − (x of its top − x of its bottom).
    Shortening,
    /// Approach of the pivots: L + both arms − (x of the top pivot − x of the bottom pivot); with
    /// links, of their far hinges.
    Travel,
    /// Rotation of the bottom, rad.
    BottomTurn,
    /// Rotation of the top, rad.
    TopTurn,
    /// y of the section at this share of the length.
    Height(f64),
}

/// A state of equilibrium.
#[derive(Clone, Copy, Debug)]
pub struct State {
    /// P.
    pub load: f64,
    /// H.
    pub side_force: f64,
    /// L − (x of the flexible part's top − x of its bottom).
    pub shortening: f64,
    /// L + both arms − (x of the top pivot − x of the bottom pivot), and what leaning links add.
    pub travel: f64,
    /// Section at the bottom of the flexible part.
    pub bottom: Station,
    /// Section at its top.
    pub top: Station,
    /// Sideways position of the pivots, bottom and top.
    pub pivots: [f64; 2],
    /// Moment that the column passes at the pivots, bottom and top.
    pub pivot_moments: [f64; 2],
    unknowns: Unknowns,
}

/// Newton's method or the integrator gave up.
#[derive(Debug)]
pub struct Failure {
    /// What was set.
    pub parameter: Parameter,
    /// To which value.
    pub value: f64,
    /// Last size of the correction.
    pub correction: f64,
}

/// y of the bottom pivot, θ of the bottom, H, M at the bottom pivot, P, in units of L and EI.
type Unknowns = SVector<f64, 5>;

impl Problem {
    /// The state without load, from the straight column as a guess.
    pub fn unloaded(&self) -> Result<State, Failure> {
        let mut guess = Unknowns::zeros();
        guess[1] = self.bottom.angle;
        self.newton(Parameter::Load, 0.0, guess)
    }

    /// The state where `parameter` has `value`, followed from the unloaded one in twenty steps or
    /// more: for an imperfect column that is the physical path, up to its first turning point in
    /// `parameter`.
    pub fn loaded(&self, parameter: Parameter, value: f64) -> Result<State, Failure> {
        let start = self.unloaded()?;
        let at = self.value(parameter, &start);
        let values: Vec<f64> = (1..20)
            .map(|i| at + (value - at) * f64::from(i) / 20.0)
            .chain([value])
            .collect();
        Ok(self.follow(parameter, &values, &start)?[19])
    }

    /// The state where `parameter` has `value`, by Newton's method from `guess`.
    pub fn solve(&self, parameter: Parameter, value: f64, guess: &State) -> Result<State, Failure> {
        self.newton(parameter, value, guess.unknowns)
    }

    /// The states where `parameter` takes each of `values`, followed from `start` in steps that
    /// are halved where Newton's method gives up.
    pub fn follow(
        &self,
        parameter: Parameter,
        values: &[f64],
        start: &State,
    ) -> Result<Vec<State>, Failure> {
        let mut at = self.value(parameter, start);
        let mut state = *start;
        let mut found = Vec::with_capacity(values.len());
        for &target in values {
            let least = 1e-6 * (target - at).abs();
            let mut step = target - at;
            while at != target {
                if step.abs() >= (target - at).abs() {
                    step = target - at;
                }
                let next = if step == target - at {
                    target
                } else {
                    at + step
                };
                match self.solve(parameter, next, &state) {
                    Ok(reached) => {
                        (state, at) = (reached, next);
                        step *= 2.0;
                    }
                    Err(failure) if step.abs() <= least => return Err(failure),
                    Err(_) => step *= 0.5,
                }
            }
            found.push(state);
        }
        Ok(found)
    }

    /// The state of the bowed branch of a perfect column where `parameter`, zero on the straight
    /// path, has the small `value`. The guess is the straight state at `critical_load` with the
    /// mode laid over it: the direction in which the conditions at the ends change least.
    pub fn branch(
        &self,
        critical_load: f64,
        parameter: Parameter,
        value: f64,
    ) -> Result<State, Failure> {
        let failure = Failure {
            parameter,
            value,
            correction: f64::INFINITY,
        };
        let load = critical_load / self.unit_force();
        let straight = Unknowns::new(0.0, 0.0, 0.0, 0.0, load);
        let bent = self
            .tangent(Parameter::Load, critical_load, &straight)
            .and_then(|tangent| tangent.svd(false, true).v_t)
            .map(|rows| rows.row(4).transpose())
            .filter(|mode| mode[4].abs() < 1e-3)
            .map(|mode| 1e-4 * Unknowns::new(mode[0], mode[1], mode[2], mode[3], 0.0));
        let Some(bent) = bent else {
            return Err(failure);
        };
        let Some(shape) = self.state(&(straight + bent)) else {
            return Err(failure);
        };
        let scale = value / self.value(parameter, &shape);
        self.newton(parameter, value, straight + scale * bent)
    }

    /// The value that `parameter` has in `state`.
    pub fn value(&self, parameter: Parameter, state: &State) -> f64 {
        match parameter {
            Parameter::Load => state.load,
            Parameter::Shortening => state.shortening,
            Parameter::Travel => state.travel,
            Parameter::BottomTurn => state.bottom.theta,
            Parameter::TopTurn => state.top.theta,
            Parameter::Height(share) => self.profile(state, &[share])[0].y,
        }
    }

    /// The state where `quantity` first is largest while `along` grows by steps of a twentieth of
    /// its own value, from `start` (where it must not be zero) to at most `limit`: a limit point
    /// of the load, for instance. Golden section on the bracket; `quantity` there is good to about
    /// 1e-12 of itself, `along` only to about 1e-6. `None`: it still rises at `limit`.
    pub fn first_largest(
        &self,
        quantity: Parameter,
        along: Parameter,
        start: &State,
        limit: f64,
    ) -> Result<Option<State>, Failure> {
        let reach = |value: f64, from: &State| Ok(self.follow(along, &[value], from)?[0]);
        let mut before = *start;
        let mut middle = *start;
        loop {
            let value = 1.05 * self.value(along, &middle);
            if value > limit {
                return Ok(None);
            }
            let after = reach(value, &middle)?;
            if self.value(quantity, &after) < self.value(quantity, &middle) {
                let (mut low, mut high) = (self.value(along, &before), value);
                let golden = 0.5 * (5.0_f64.sqrt() - 1.0);
                while high - low > 1e-7 * high {
                    let span = golden * (high - low);
                    let (left, right) = (reach(high - span, &middle)?, reach(low + span, &middle)?);
                    if self.value(quantity, &left) > self.value(quantity, &right) {
                        high = low + span;
                        middle = left;
                    } else {
                        low = high - span;
                        middle = right;
                    }
                }
                return Ok(Some(middle));
            }
            (before, middle) = (middle, after);
        }
    }

    /// Sections of `state` at `shares` of the length, in rising order.
    pub fn profile(&self, state: &State, shares: &[f64]) -> Vec<Station> {
        let axis = self.axis(&state.unknowns);
        let mut section = self.bottom_section(&state.unknowns);
        let mut at = 0.0;
        shares
            .iter()
            .map(|&share| {
                section = axis
                    .carry(at, share, section)
                    .expect("the state was integrated before");
                at = share;
                self.station(share, &section)
            })
            .collect()
    }

    /// Section where the axis is farthest from the line of load (the largest |y| along it).
    pub fn farthest(&self, state: &State) -> Station {
        const CELLS: u32 = 100;
        let shares: Vec<f64> = (0..=CELLS)
            .map(|i| f64::from(i) / f64::from(CELLS))
            .collect();
        let stations = self.profile(state, &shares);
        let largest = (0..stations.len())
            .max_by(|&i, &j| stations[i].y.abs().total_cmp(&stations[j].y.abs()))
            .unwrap_or(0);
        // The axis runs parallel to the line of load there, unless it is an end.
        let axis = self.axis(&state.unknowns);
        let slope = |share: f64| axis.direction(self.profile(state, &[share])[0].theta).1;
        let (low, high) = (
            shares[largest.saturating_sub(1)],
            shares[(largest + 1).min(shares.len() - 1)],
        );
        if slope(low) * slope(high) < 0.0 {
            let share = super::super::root::bisect(slope, low, high);
            self.profile(state, &[share])[0]
        } else {
            stations[largest]
        }
    }

    /// The section that `state` has at its bottom, as a guess for this problem, whose seats may be
    /// others than those of `state`.
    pub fn adopt(&self, state: &State) -> State {
        let length = self.rod.length;
        let (along, across) = self.bottom.piece(state.bottom.theta, -1.0);
        let mut adopted = *state;
        let u = &mut adopted.unknowns;
        u[0] = (state.bottom.y + across) / length;
        u[3] = state.bottom.moment / self.unit_moment() - (along * u[2] + across * u[4]) / length;
        adopted
    }

    fn newton(
        &self,
        parameter: Parameter,
        value: f64,
        mut unknowns: Unknowns,
    ) -> Result<State, Failure> {
        const CLOSE: f64 = 1e-11;
        let mut correction = f64::INFINITY;
        for _ in 0..20 {
            let Some(change) = self.correction(parameter, value, &unknowns) else {
                break;
            };
            unknowns -= change;
            correction = change
                .component_div(&unknowns.map(|u| 1.0 + u.abs()))
                .amax();
            if correction < CLOSE {
                return self.state(&unknowns).ok_or(Failure {
                    parameter,
                    value,
                    correction,
                });
            }
            if !correction.is_finite() || correction > 10.0 {
                break;
            }
        }
        Err(Failure {
            parameter,
            value,
            correction,
        })
    }

    /// Newton's correction.
    fn correction(&self, parameter: Parameter, value: f64, at: &Unknowns) -> Option<Unknowns> {
        self.tangent(parameter, value, at)?
            .lu()
            .solve(&self.residual(parameter, value, at)?)
    }

    /// Tangent of the residual by central differences.
    fn tangent(
        &self,
        parameter: Parameter,
        value: f64,
        at: &Unknowns,
    ) -> Option<SMatrix<f64, 5, 5>> {
        const STEP: f64 = 1e-5;
        let mut tangent = SMatrix::<f64, 5, 5>::zeros();
        for i in 0..5 {
            let step = STEP * (1.0 + at[i].abs());
            let moved = |by: f64| {
                let mut unknowns = *at;
                unknowns[i] += by;
                self.residual(parameter, value, &unknowns)
            };
            tangent.set_column(i, &((moved(step)? - moved(-step)?) / (2.0 * step)));
        }
        Some(tangent)
    }

    /// Two conditions at each end, and the one on `parameter`.
    fn residual(&self, parameter: Parameter, value: f64, u: &Unknowns) -> Option<Unknowns> {
        let state = self.state(u)?;
        let (force, moment) = (self.unit_force(), self.unit_moment());
        let length = self.rod.length;
        let (bottom, top) = (&self.bottom, &self.top);
        let set = match parameter {
            Parameter::Load => (state.load - value) / force,
            Parameter::Shortening => (state.shortening - value) / length,
            Parameter::Travel => (state.travel - value) / length,
            Parameter::BottomTurn => state.bottom.theta - value,
            Parameter::TopTurn => state.top.theta - value,
            Parameter::Height(share) => {
                let section = self.axis(u).carry(0.0, share, self.bottom_section(u))?;
                section[1] - value / length
            }
        };
        // Force on the column: −H at the bottom, H at the top; moments alike.
        let on = |action: f64| (state.load, action);
        Some(Unknowns::new(
            bottom.sideways_rest(on(-state.side_force), state.pivots[0], force, length),
            bottom.turning_rest(on(-state.pivot_moments[0]), state.bottom.theta, moment),
            top.sideways_rest(on(state.side_force), state.pivots[1], force, length),
            top.turning_rest(on(state.pivot_moments[1]), state.top.theta, moment),
            set,
        ))
    }

    /// Everything that follows from the unknowns by one sweep.
    fn state(&self, u: &Unknowns) -> Option<State> {
        let (length, force, moment) = (self.rod.length, self.unit_force(), self.unit_moment());
        let axis = self.axis(u);
        let first = self.bottom_section(u);
        let last = axis.carry(0.0, 1.0, first)?;
        let (along, across) = self.top.piece(last[2], 1.0);
        let (along, across) = (along / length, across / length);
        let top_moment = last[3] - (along * axis.side + across * axis.load);
        let arms = (self.bottom.arm + self.top.arm) / length;
        let pivots = [u[0] * length, (last[1] + across) * length];
        let links = self.bottom.link_sinks(pivots[0]) + self.top.link_sinks(pivots[1]);
        Some(State {
            load: axis.load * force,
            side_force: axis.side * force,
            shortening: (1.0 - (last[0] - first[0])) * length,
            travel: (1.0 + arms - (last[0] + along)) * length + links,
            bottom: self.station(0.0, &first),
            top: self.station(1.0, &last),
            pivots,
            pivot_moments: [u[3] * moment, top_moment * moment],
            unknowns: *u,
        })
    }

    /// The section at S = 0: from the pivot over the rigid piece.
    fn bottom_section(&self, u: &Unknowns) -> Section {
        let (along, across) = self.bottom.piece(u[1], -1.0);
        // From the pivot to the end plane: the way back.
        let length = self.rod.length;
        let (along, across) = (-along / length, -across / length);
        Section::new(
            along,
            u[0] + across,
            u[1],
            u[3] - (along * u[2] + across * u[4]),
            0.0,
        )
    }

    fn axis(&self, u: &Unknowns) -> Axis<'_> {
        Axis {
            rod: &self.rod,
            load: u[4],
            side: u[2],
        }
    }

    fn station(&self, share: f64, section: &Section) -> Station {
        let length = self.rod.length;
        Station {
            s: share * length,
            x: section[0] * length,
            y: section[1] * length,
            theta: section[2],
            moment: section[3] * self.unit_moment(),
        }
    }

    fn unit_force(&self) -> f64 {
        self.rod.bending / self.rod.length.powi(2)
    }

    fn unit_moment(&self) -> f64 {
        self.rod.bending / self.rod.length
    }
}
