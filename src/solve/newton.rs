//! Newton's iteration on the system bordered by one linear constraint, or with the load held.

use super::{Assembled, Bordered, Factored, System, Unknowns, unknowns::dot};
use nalgebra::SVector;

/// Iterations before giving up.
const MOST_ITERATIONS: usize = 14;
/// The same where one-sided laws may have to change one at a time.
const MOST_WITH_KINKS: usize = 40;
/// And where a path begins: much may be in contact at once.
const MOST_AT_THE_START: usize = 150;
/// A step below this is at round-off after it is taken, as convergence is quadratic.
const SMALL_STEP: f64 = 1e-9;
/// Where the next step, as quadratic convergence predicts it, is below this, it is not taken.
const NO_STEP: f64 = 1e-13;
/// A step that does not shrink any more is round-off, if it is below this.
const ROUND_OFF_STEP: f64 = 1e-6;

/// Why an iteration did not converge.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct NotConverged {
    /// Iterations done.
    pub iterations: usize,
    /// Norm of the last step.
    pub last_step: f64,
}

/// Work space of Newton's iteration; holds the last tangent and its factor.
#[derive(Clone, Debug)]
pub struct Newton<const B: usize, const I: usize> {
    /// Residual and tangent of the last assembly.
    pub assembled: Assembled<B>,
    /// Factor of the last tangent.
    pub factor: Factored<B>,
    bordered: Bordered<B>,
    step: Unknowns<B, I>,
    minus_pattern: Vec<SVector<f64, B>>,
    work: [Vec<SVector<f64, B>>; 2],
    /// Iterations of the last solve.
    pub iterations: usize,
}

/// The constraint `row·(u − u0) + d (λ − λ0) = distance`.
pub(super) struct Constraint<'a, const B: usize, const I: usize> {
    pub row: &'a [SVector<f64, B>],
    pub d: f64,
    pub from: &'a Unknowns<B, I>,
    pub from_load: f64,
    pub distance: f64,
}

impl<const B: usize, const I: usize> Newton<B, I> {
    /// Work space for `system`.
    pub fn new(system: &impl System<B, I>) -> Self {
        let links = system.links();
        let rows = links + 1;
        Newton {
            assembled: Assembled::of(system),
            factor: Factored::with_rows(rows, system.is_symmetric()),
            bordered: Bordered::with_rows(rows),
            step: system.zero(),
            minus_pattern: system.load_pattern().iter().map(|q| -q).collect(),
            work: [vec![SVector::zeros(); rows], vec![SVector::zeros(); rows]],
            iterations: 0,
        }
    }

    /// Assembles and factors at `state`, `load`; returns the number of negative eigenvalues.
    pub fn evaluate(
        &mut self,
        system: &mut impl System<B, I>,
        state: &Unknowns<B, I>,
        load: f64,
    ) -> u32 {
        system.iterating(1);
        system.assemble(state, load, &mut self.assembled);
        self.factor.factor(&self.assembled.tangent);
        self.negatives()
    }

    /// Negative eigenvalues of the last tangent.
    pub fn negatives(&self) -> u32 {
        self.factor.negatives(self.assembled.inner_negatives)
    }

    /// Solves with the load held, from `state`, in place.
    ///
    /// # Errors
    /// Where the iteration does not converge; `state` is then worthless.
    pub fn solve_at_load(
        &mut self,
        system: &mut impl System<B, I>,
        state: &mut Unknowns<B, I>,
        load: f64,
    ) -> Result<(), NotConverged> {
        self.iterate(system, state, load, None).map(|_| ())
    }

    /// Solves with the load free and a constraint, from `state` and `load`, in place.
    pub(super) fn solve_constrained(
        &mut self,
        system: &mut impl System<B, I>,
        state: &mut Unknowns<B, I>,
        load: &mut f64,
        constraint: &Constraint<'_, B, I>,
    ) -> Result<(), NotConverged> {
        *load = self.iterate(system, state, *load, Some(constraint))?;
        Ok(())
    }

    fn iterate(
        &mut self,
        system: &mut impl System<B, I>,
        state: &mut Unknowns<B, I>,
        mut load: f64,
        constraint: Option<&Constraint<'_, B, I>>,
    ) -> Result<f64, NotConverged> {
        let mut last = f64::INFINITY;
        let most = if system.has_kinks() && constraint.is_none() {
            MOST_AT_THE_START
        } else if system.has_kinks() {
            MOST_WITH_KINKS
        } else {
            MOST_ITERATIONS
        };
        for iteration in 1..=most {
            self.iterations = iteration;
            system.iterating(iteration);
            system.assemble(state, load, &mut self.assembled);
            self.factor.factor(&self.assembled.tangent);
            for (step, residual) in self.step.nodes.iter_mut().zip(&self.assembled.residual) {
                *step = -residual;
            }
            let load_step = match constraint {
                None => {
                    self.factor.solve(&mut self.step.nodes);
                    0.0
                }
                Some(constraint) => self.bordered_step(constraint, state, load),
            };
            system.recover(&mut self.step, true);
            let size = (dot(&self.step.nodes, &self.step.nodes) / self.step.nodes.len() as f64
                + (load_step / system.load_scale()).powi(2))
            .sqrt();
            if !size.is_finite() || size > 1e6 {
                return Err(NotConverged {
                    iterations: iteration,
                    last_step: size,
                });
            }
            state.add(1.0, &self.step);
            load += load_step;
            // Steps e, C e², C² e⁴ …: the next is size³/last².
            let next = size * (size / last).powi(2);
            let small = size < SMALL_STEP
                || (size < ROUND_OFF_STEP && size > 0.25 * last)
                || (size < ROUND_OFF_STEP && iteration > 1 && next < NO_STEP);
            // Laws that change places within round-off change nothing.
            if small && (!system.changed() || size < NO_STEP) {
                return Ok(load);
            }
            last = size;
        }
        Err(NotConverged {
            iterations: most,
            last_step: last,
        })
    }

    fn bordered_step(
        &mut self,
        constraint: &Constraint<'_, B, I>,
        state: &Unknowns<B, I>,
        load: f64,
    ) -> f64 {
        let gone: f64 = constraint
            .row
            .iter()
            .zip(state.nodes.iter().zip(&constraint.from.nodes))
            .map(|(row, (now, before))| row.dot(&(now - before)))
            .sum::<f64>()
            + constraint.d * (load - constraint.from_load);
        let (b, c, d) = (&self.minus_pattern, constraint.row, constraint.d);
        self.bordered.prepare(&self.factor, b, c, d);
        self.bordered.solve(
            &self.factor,
            b,
            c,
            d,
            &mut self.step.nodes,
            constraint.distance - gone,
        )
    }

    /// The path's tangent at the state last evaluated: solves the bordered system with right-hand
    /// side (0, 1) and the given border row; writes the direction, returns its load part.
    pub(super) fn tangent(
        &mut self,
        system: &impl System<B, I>,
        row: &[SVector<f64, B>],
        d: f64,
        out: &mut Unknowns<B, I>,
    ) -> f64 {
        out.nodes.iter_mut().for_each(|v| *v = SVector::zeros());
        self.bordered
            .prepare(&self.factor, &self.minus_pattern, row, d);
        let load = self.bordered.solve(
            &self.factor,
            &self.minus_pattern,
            row,
            d,
            &mut out.nodes,
            1.0,
        );
        system.recover(out, false);
        load
    }

    /// Solves `K x = b` in place with the last factor, improved once.
    pub fn solve_linear(&mut self, b: &mut [SVector<f64, B>]) {
        let [right, product] = &mut self.work;
        self.factor
            .solve_refined(&self.assembled.tangent, b, right, product);
    }
}
