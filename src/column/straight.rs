//! The perfect, straight column: where its tangent turns singular.
//!
//! Straight and shortened, the state is known without solving: no rotation, F = (−P, 0). Along it
//! the number of negative eigenvalues is counted; where it leaves zero the load is bracketed and
//! halved. The count may return to zero (the column straightens again), so that a scan could step
//! over a short unstable stretch: the deflection where the effect of the load peaks, C1 of the
//! closed form, is always among those tried, and where every count is zero the smallest eigenvalue
//! is followed to its least value.

use super::layout::{Column, ColumnState};
use crate::solve::{Newton, System, null_direction};
use nalgebra::Vector3;

/// Deflections tried, evenly over the length.
const STEPS: usize = 64;
/// The largest share of the length tried: at 1 nothing is left of the column.
const LARGEST_SHARE: f64 = 0.999;

/// A critical state of the straight column, in the column's units.
#[derive(Clone, Debug)]
pub struct Buckling {
    /// Critical load.
    pub load: f64,
    /// Shortening there.
    pub shortening: f64,
    /// Width of the last bracket of the shortening.
    pub bracket: f64,
    /// Shortening at which the column straightens again, where it does.
    pub straightens_again: Option<f64>,
    /// The mode, with its largest sideways motion of size one to the left (+y).
    pub mode: ColumnState,
}

/// The straight path of a column.
pub struct StraightScan<'a> {
    column: &'a mut Column,
    newton: Newton<3, 5>,
    /// Shortening per unit of load.
    compliance: f64,
    /// Share at which the effect of the load peaks.
    peak: Option<f64>,
}

impl<'a> StraightScan<'a> {
    /// The straight path of `column`, whose supports and shape must be without imperfection.
    pub fn new(column: &'a mut Column) -> Self {
        let newton = Newton::new(column);
        let compliance = column.axial_compliance();
        let first = column.elements[0].points[0];
        // C1 = 1/(2m), m = 1 − EA/GA; written so that GA may be infinite.
        let peak = 0.5 / (1.0 - first.shear_compliance / first.axial_compliance);
        StraightScan {
            column,
            newton,
            compliance,
            peak: (peak > 0.0 && peak < LARGEST_SHARE).then_some(peak),
        }
    }

    /// Number of unstable directions at shortening `share` of the deformable length.
    pub fn unstable_at(&mut self, share: f64) -> u32 {
        let load = share / self.compliance;
        let state = self.column.straight_state(load);
        self.newton.evaluate(self.column, &state, load)
    }

    /// Smallest lateral eigenvalue in size and its direction at that shortening.
    fn softest_at(&mut self, share: f64) -> (ColumnState, f64) {
        let load = share / self.compliance;
        let state = self.column.straight_state(load);
        // Straight, the axial unknowns stand apart: only sideways motion and rotation count.
        null_direction(
            self.column,
            &mut self.newton,
            &state,
            load,
            [false, true, true],
        )
    }

    /// A share at which the straight column is unstable, before `limit`, and one before it at
    /// which it is stable; `None` if it never is unstable.
    fn first_unstable(&mut self, limit: f64) -> Option<(f64, f64)> {
        let mut shares: Vec<f64> = (1..=STEPS)
            .map(|i| limit * i as f64 / STEPS as f64)
            .chain(self.peak.filter(|peak| *peak < limit))
            .collect();
        shares.sort_by(f64::total_cmp);
        let mut before = 0.0;
        for share in &shares {
            if self.unstable_at(*share) > 0 {
                return Some((before, *share));
            }
            before = *share;
        }
        // Everywhere stable as far as tried: look at the softest place between.
        let softness: Vec<f64> = shares.iter().map(|s| self.softest_at(*s).1).collect();
        let lowest = (0..shares.len()).min_by(|a, b| softness[*a].total_cmp(&softness[*b]))?;
        let (mut low, mut high) = (
            if lowest == 0 { 0.0 } else { shares[lowest - 1] },
            *shares.get(lowest + 1).unwrap_or(&shares[lowest]),
        );
        let from = low;
        let golden = 0.5 * (5.0_f64.sqrt() - 1.0);
        for _ in 0..60 {
            let (left, right) = (high - golden * (high - low), low + golden * (high - low));
            for share in [left, right] {
                if self.unstable_at(share) > 0 {
                    return Some((from, share));
                }
            }
            if self.softest_at(left).1 < self.softest_at(right).1 {
                high = right;
            } else {
                low = left;
            }
            // The eigenvalue is flat at its least value: what is missed is of the width's square.
            if high - low < 1e-5 {
                break;
            }
        }
        None
    }

    /// Whether the straight column turns unstable anywhere.
    pub fn is_ever_unstable(&mut self) -> bool {
        self.first_unstable(LARGEST_SHARE).is_some()
    }

    /// The critical state; `None`: never, at any shortening.
    pub fn buckling(&mut self) -> Option<Buckling> {
        let (stable, unstable) = self.first_unstable(LARGEST_SHARE)?;
        let (low, high) = self.halve(stable, unstable);
        let share = 0.5 * (low + high);
        let straightens_again = self.stable_after(unstable).map(|stable| {
            let (low, high) = self.halve(stable, unstable);
            0.5 * (low + high)
        });
        let (mut mode, _) = self.softest_at(share);
        self.column.normalise_sideways(&mut mode);
        Some(Buckling {
            load: share / self.compliance,
            shortening: share,
            bracket: (high - low).abs(),
            straightens_again,
            mode,
        })
    }

    /// A share after `unstable` at which the column is stable again.
    fn stable_after(&mut self, unstable: f64) -> Option<f64> {
        (1..=STEPS)
            .map(|i| unstable + (LARGEST_SHARE - unstable) * i as f64 / STEPS as f64)
            .find(|share| self.unstable_at(*share) == 0)
    }

    /// Halves the bracket between a stable and an unstable share down to round-off.
    fn halve(&mut self, stable: f64, unstable: f64) -> (f64, f64) {
        let (mut stable, mut unstable) = (stable, unstable);
        for _ in 0..200 {
            let middle = 0.5 * (stable + unstable);
            if (stable - unstable).abs() <= 1e-13 * unstable
                || middle == stable
                || middle == unstable
            {
                break;
            }
            if self.unstable_at(middle) > 0 {
                unstable = middle;
            } else {
                stable = middle;
            }
        }
        (stable, unstable)
    }

    /// Transverse rate at shortening `share`: force per sideways displacement of the top, which
    /// must be free sideways; in the column's units.
    pub fn transverse_rate(&mut self, share: f64) -> f64 {
        self.unstable_at(share);
        let last = self.column.elements();
        let mut push = vec![Vector3::zeros(); last + 1];
        push[last][1] = 1.0;
        self.newton.solve_linear(&mut push);
        1.0 / push[last][1]
    }
}

impl Column {
    /// Shortening per unit of axial load of the straight column, in the column's units.
    pub fn axial_compliance(&self) -> f64 {
        self.elements
            .iter()
            .map(|element| {
                element
                    .points
                    .iter()
                    .zip(super::basis::GAUSS_WEIGHT)
                    .map(|(point, weight)| 0.5 * weight * point.axial_compliance)
                    .sum::<f64>()
                    * element.length
            })
            .sum()
    }

    /// The straight state under `load`: exact, for a column without imperfection.
    pub fn straight_state(&self, load: f64) -> ColumnState {
        let mut state = self.zero();
        let mut x = 0.0;
        for (e, element) in self.elements.iter().enumerate() {
            let shortened: f64 = element
                .points
                .iter()
                .zip(super::basis::GAUSS_WEIGHT)
                .map(|(point, weight)| 0.5 * weight * (1.0 - load * point.axial_compliance))
                .sum();
            x += element.from_a.along + element.to_b.along + shortened * element.length;
            state.nodes[e + 1][0] = x;
            state.inner[e][3] = -load;
        }
        state
    }

    /// Scales a direction so that its largest sideways motion is of size one and positive.
    pub(super) fn normalise_sideways(&self, mode: &mut ColumnState) {
        let largest = mode
            .nodes
            .iter()
            .map(|node| node[1])
            .max_by(|a, b| a.abs().total_cmp(&b.abs()))
            .unwrap_or(1.0);
        mode.scale(1.0 / largest);
    }
}
