//! The least energy under bounds.

use super::band::{Band, Factor};
use super::beam::Beam;

/// What is held, and between which bounds the rest may be.
pub struct Bounds {
    /// Unknowns with a set value.
    pub held: Vec<bool>,
    /// Least value of each unknown.
    pub low: Vec<f64>,
    /// Its largest value.
    pub high: Vec<f64>,
}

/// A minimum.
pub struct Minimum {
    /// The unknowns.
    pub at: Vec<f64>,
    /// Gradient of the energy there: the forces that hold the held, the walls' reactions.
    pub gradient: Vec<f64>,
    /// How often a state without a gradient had to be left because it was no minimum.
    pub left: usize,
}

/// Steps of the outer method before it gives up.
const STEPS: usize = 200;

/// The minimum downhill from `at`. `force` is the scale of forces: it is found where no force is
/// left larger than 1e-11 of it (or than round-off allows). `None`: not found.
pub fn minimise(beam: &Beam, bounds: &Bounds, mut at: Vec<f64>, force: f64) -> Option<Minimum> {
    for i in 0..at.len() {
        if !bounds.held[i] {
            at[i] = at[i].clamp(bounds.low[i], bounds.high[i]);
        }
    }
    let mut left = 0;
    let mut working: Vec<bool> = (0..at.len()).map(|i| bounds.touches(&at, i)).collect();
    let mut before = f64::INFINITY;
    for _ in 0..STEPS {
        let gradient = beam.gradient(&at);
        let hessian = beam.hessian(&at);
        let rest = bounds.rest(&at, &gradient);
        // Near the end, go on while the rest still shrinks.
        if rest < 1e-6 * force && (rest < 1e-11 * force || rest > 0.5 * before) {
            match bounds.way_down(&hessian, &at, &gradient, force) {
                None => return Some(Minimum { at, gradient, left }),
                Some(mode) => {
                    left += 1;
                    before = f64::INFINITY;
                    let moved = kick(beam, bounds, &at, &mode)?;
                    at = moved;
                    working = (0..at.len()).map(|i| bounds.touches(&at, i)).collect();
                    continue;
                }
            }
        }
        before = rest;
        let mut shift = 0.0;
        let step = loop {
            let mut trial = working.clone();
            if let Some(step) = quadratic(bounds, &hessian, &at, &gradient, shift, &mut trial) {
                working = trial;
                break step;
            }
            shift = if shift == 0.0 {
                1e-6 * force
            } else {
                4.0 * shift
            };
            if shift > 1e30 * force {
                return None;
            }
        };
        let falls: f64 = gradient.iter().zip(&step).map(|(g, d)| g * d).sum();
        let here = beam.energy(&at);
        let mut share = 1.0;
        loop {
            let next: Vec<f64> = at.iter().zip(&step).map(|(x, d)| x + share * d).collect();
            let noise = 1e-13 * here.abs();
            if beam.energy(&next) <= here + 1e-4 * share * falls + noise {
                at = next;
                break;
            }
            share *= 0.5;
            if share < 1e-12 {
                return None;
            }
        }
        for i in 0..at.len() {
            if bounds.held[i] {
                continue;
            }
            if working[i] && share == 1.0 {
                // Exactly on the wall, whatever the sum was rounded to.
                at[i] = if at[i] > 0.5 * (bounds.low[i] + bounds.high[i]) {
                    bounds.high[i]
                } else {
                    bounds.low[i]
                };
            }
            at[i] = at[i].clamp(bounds.low[i], bounds.high[i]);
            working[i] &= bounds.touches(&at, i);
        }
    }
    None
}

impl Bounds {
    fn touches(&self, at: &[f64], i: usize) -> bool {
        !self.held[i] && (at[i] <= self.low[i] || at[i] >= self.high[i])
    }

    /// Which way the wall that `i` touches pushes: −1 off the upper, 1 off the lower.
    fn off(&self, at: &[f64], i: usize) -> f64 {
        if at[i] >= self.high[i] { -1.0 } else { 1.0 }
    }

    /// Largest force that nothing carries.
    fn rest(&self, at: &[f64], gradient: &[f64]) -> f64 {
        (0..at.len())
            .filter(|i| !self.held[*i])
            .map(|i| {
                if self.touches(at, i) {
                    (-self.off(at, i) * gradient[i]).max(0.0)
                } else {
                    gradient[i].abs()
                }
            })
            .fold(0.0, f64::max)
    }

    /// The softest mode where the second variation is not positive with every wall node let go that
    /// carries nothing; turned so that it leaves the walls. `None`: it is a minimum.
    fn way_down(
        &self,
        hessian: &Band,
        at: &[f64],
        gradient: &[f64],
        force: f64,
    ) -> Option<Vec<f64>> {
        let loose = |i: usize| self.touches(at, i) && gradient[i].abs() < 1e-7 * force;
        let kept: Vec<bool> = (0..at.len())
            .map(|i| self.held[i] || (self.touches(at, i) && !loose(i)))
            .collect();
        if hessian.factor(&kept, 0.0).is_some() {
            return None;
        }
        let mut high = 1e-6 * force;
        while hessian.factor(&kept, high).is_none() {
            high *= 4.0;
        }
        let mut low = 0.0;
        for _ in 0..30 {
            let middle = 0.5 * (low + high);
            if hessian.factor(&kept, middle).is_some() {
                high = middle;
            } else {
                low = middle;
            }
        }
        let factor: Factor = hessian.factor(&kept, high)?;
        let mut mode: Vec<f64> = (0..at.len())
            .map(|i| if kept[i] { 0.0 } else { 1.0 + (i as f64).sin() })
            .collect();
        for _ in 0..20 {
            factor.solve(&mut mode);
            let size = mode.iter().map(|m| m * m).sum::<f64>().sqrt();
            mode.iter_mut().for_each(|m| *m /= size);
        }
        let leaves: f64 = (0..at.len())
            .filter(|i| loose(*i))
            .map(|i| self.off(at, i) * mode[i])
            .sum();
        if leaves < 0.0 {
            mode.iter_mut().for_each(|m| *m = -*m);
        }
        // A mode that must run into a wall it leans on is no way down.
        let largest = mode.iter().fold(0.0_f64, |most, m| most.max(m.abs()));
        let blocked =
            (0..at.len()).any(|i| loose(i) && self.off(at, i) * mode[i] < -1e-3 * largest);
        (!blocked).then_some(mode)
    }
}

/// A state of less energy along `mode`. `None`: there is none.
fn kick(beam: &Beam, bounds: &Bounds, at: &[f64], mode: &[f64]) -> Option<Vec<f64>> {
    let here = beam.energy(at);
    let mut best: Option<(f64, Vec<f64>)> = None;
    let mut size = 0.1 * beam.rod.length;
    while size > 1e-9 * beam.rod.length {
        for sign in [1.0, -1.0] {
            let next: Vec<f64> = (0..at.len())
                .map(|i| {
                    let moved = at[i] + sign * size * mode[i];
                    if bounds.held[i] {
                        at[i]
                    } else {
                        moved.clamp(bounds.low[i], bounds.high[i])
                    }
                })
                .collect();
            let energy = beam.energy(&next);
            if energy < here && best.as_ref().is_none_or(|(least, _)| energy < *least) {
                best = Some((energy, next));
            }
        }
        size *= 0.5;
    }
    best.map(|(_, next)| next)
}

/// The step d that makes gᵀd + dᵀ(A + shift)d/2 least within the bounds, by the primal active-set
/// method from d = 0; `working` are the wall nodes it starts with and those it ends with.
/// `None`: the matrix is not positive on the way.
fn quadratic(
    bounds: &Bounds,
    matrix: &Band,
    at: &[f64],
    gradient: &[f64],
    shift: f64,
    working: &mut [bool],
) -> Option<Vec<f64>> {
    let size = at.len();
    let mut step = vec![0.0; size];
    let scale = gradient.iter().fold(0.0_f64, |most, g| most.max(g.abs()));
    for _ in 0..(20 * size) {
        let slope: Vec<f64> = matrix
            .times(&step)
            .iter()
            .zip(gradient)
            .zip(&step)
            .map(|((m, g), d)| m + g + shift * d)
            .collect();
        let kept: Vec<bool> = (0..size).map(|i| bounds.held[i] || working[i]).collect();
        let factor = matrix.factor(&kept, shift)?;
        let mut change: Vec<f64> = (0..size)
            .map(|i| if kept[i] { 0.0 } else { -slope[i] })
            .collect();
        factor.solve(&mut change);
        // How far until the first wall.
        let (mut share, mut blocks) = (1.0, None);
        for i in 0..size {
            if kept[i] || change[i] == 0.0 {
                continue;
            }
            let wall = if change[i] > 0.0 {
                bounds.high[i]
            } else {
                bounds.low[i]
            };
            let room = (wall - at[i] - step[i]) / change[i];
            if room < share {
                (share, blocks) = (room.max(0.0), Some((i, wall)));
            }
        }
        for i in 0..size {
            step[i] += share * change[i];
        }
        if let Some((i, wall)) = blocks {
            step[i] = wall - at[i];
            working[i] = true;
            continue;
        }
        // No wall in the way: let go of the node that its wall would have to pull hardest.
        let slope: Vec<f64> = matrix
            .times(&step)
            .iter()
            .zip(gradient)
            .zip(&step)
            .map(|((m, g), d)| m + g + shift * d)
            .collect();
        let pulled = |i: usize| {
            let off = if at[i] + step[i] > 0.5 * (bounds.low[i] + bounds.high[i]) {
                -1.0
            } else {
                1.0
            };
            -off * slope[i]
        };
        let worst = (0..size)
            .filter(|i| working[*i])
            .max_by(|i, j| pulled(*i).total_cmp(&pulled(*j)));
        match worst {
            Some(i) if pulled(i) > 1e-11 * scale => working[i] = false,
            _ => return Some(step),
        }
    }
    None
}
