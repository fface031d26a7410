//! Following a path of solutions by pseudo-arc-length through limit points.
//!
//! From a point (u, λ) with unit tangent (t, t_λ) the next one is found on the plane at distance h
//! along the tangent: `t·(v − u)/n + t_λ (μ − λ)/λ_ref² = h`, with the norm
//! `|(t, t_λ)|² = Σ|t_node|²/n + (t_λ/λ_ref)²` over the n nodes. Newton starts at `u + h t + ½ h²
//! (t − t₋)/h₋`, t₋ the tangent one step of h₋ before. The step adapts to the iterations taken and to
//! the angle between successive tangents, and is halved where Newton fails or where the step would
//! cross another path: a real branch point is then approached in short steps, while a path that only
//! passes close by is not left. One-sided laws put kinks into a path; a short step goes over them.
//!
//! Source: Keller, in Applications of Bifurcation Theory (1977); Seydel, Practical Bifurcation and
//! Stability Analysis (both from memory).

use super::{
    Newton, NotConverged, System, Unknowns, crosses_another, newton::Constraint, unknowns::dot,
};
use nalgebra::SVector;

/// Smallest step in which contacts are taken in at the beginning of a path.
const SMALLEST_EASING: f64 = 1e-3;
/// Distances along the tangent beyond which a point on the plane belongs to another path.
const FAR_AWAY: f64 = 30.0;
/// Step at which a kink is looked for where Newton fails.
const AT_A_KINK: f64 = 1e-9;
/// How far ahead the kink may lie.
const BEYOND_A_KINK: f64 = 1e-6;
/// First step behind a kink.
const BEHIND_A_KINK: f64 = 1e-4;
/// Times Newton begins anew where its last step went over a kink.
const MOST_AGAIN: usize = 4;
/// Kinks turned at before a path is given up.
const MOST_CORNERS: usize = 40;
/// Cosine of the angle between successive tangents from which the bend is extrapolated.
const LEAST_COMMON: f64 = 0.9;

/// A point of a path with everything needed to go on from it.
#[derive(Clone, Debug)]
pub struct PathPoint<const B: usize, const I: usize> {
    /// Unknowns.
    pub state: Unknowns<B, I>,
    /// Load λ.
    pub load: f64,
    /// Unit tangent, part of the unknowns.
    pub direction: Unknowns<B, I>,
    /// Unit tangent, part of the load.
    pub load_direction: f64,
    /// Negative eigenvalues of the tangent matrix.
    pub negatives: u32,
    /// Number of the one-sided laws that hold there.
    pub regime: u64,
    /// Distance along this point's tangent at which the next point lies; 0 at the last.
    pub distance: f64,
}

/// How to follow.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PathSettings {
    /// First step.
    pub first_step: f64,
    /// Largest step.
    pub largest_step: f64,
    /// Smallest step before giving up.
    pub smallest_step: f64,
    /// Largest angle between successive tangents, rad.
    pub largest_turn: f64,
    /// Step down to which a step across another path is not believed: a path that turns sharply
    /// before another one is easily jumped from.
    pub crossing_step: f64,
    /// Step down to which a sharp turn is not believed in a system whose paths have kinks.
    pub kink_step: f64,
    /// Newton iterations altogether before giving up.
    pub most_iterations: usize,
    /// Points before giving up.
    pub most_points: usize,
}

impl Default for PathSettings {
    fn default() -> Self {
        PathSettings {
            first_step: 0.01,
            largest_step: 0.03,
            smallest_step: 1e-12,
            largest_turn: 0.15,
            crossing_step: 1e-5,
            kink_step: 1e-4,
            most_iterations: 20_000,
            most_points: 1500,
        }
    }
}

/// How following ended.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Outcome {
    /// The stopping rule was met at the last point.
    Stopped,
    /// As many points as allowed, without meeting the stopping rule.
    TooLong,
    /// Newton failed down to the smallest step; the last point is good.
    Lost(NotConverged),
}

/// What was done on the way: a silent slow-down shows here.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Walk {
    /// Steps taken.
    pub steps: usize,
    /// Steps refused and halved.
    pub refused: usize,
    /// Newton iterations of the steps taken.
    pub iterations: usize,
    /// Those of refused steps too.
    pub spent: usize,
    /// Points at which the path turned round a kink: they stand at it, less than 1e-6 from the one before,
    /// with the direction behind it.
    pub corners: Vec<usize>,
}

/// Follows the path from the last of `points` (with its tangent) and appends to it, until `stop`
/// says so or nothing more can be found.
pub fn follow<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    points: &mut Vec<PathPoint<B, I>>,
    settings: &PathSettings,
    mut stop: impl FnMut(&[PathPoint<B, I>]) -> bool,
) -> (Outcome, Walk) {
    let mut walk = Walk::default();
    let mut step = settings.first_step;
    let mut trouble = NotConverged {
        iterations: 0,
        last_step: 0.0,
    };
    loop {
        if stop(points) {
            return (Outcome::Stopped, walk);
        }
        walk.spent += newton.iterations;
        if points.len() >= settings.most_points || walk.spent > settings.most_iterations {
            return (Outcome::TooLong, walk);
        }
        let Some((base, earlier)) = points.split_last_mut() else {
            return (Outcome::Lost(trouble), walk);
        };
        let mut next = match at_distance(system, newton, earlier.last(), base, step) {
            Ok(next) => next,
            Err(failed) => {
                trouble = failed;
                walk.iterations += failed.iterations;
                walk.refused += 1;
                step *= 0.5;
                let kinks = system.has_kinks() && walk.corners.len() < MOST_CORNERS;
                if kinks
                    && step < AT_A_KINK
                    && walk.corners.last() != Some(&earlier.len())
                    && let Some(behind) = behind_kink(system, newton, base)
                {
                    walk.corners.push(points.len());
                    points.push(behind);
                    step = BEHIND_A_KINK;
                    continue;
                }
                if step < settings.smallest_step {
                    return (Outcome::Lost(trouble), walk);
                }
                continue;
            }
        };
        walk.iterations += newton.iterations;
        let turn = inner_product(system, base, &next).clamp(-1.0, 1.0).acos();
        let believed = if system.has_kinks() {
            settings.kink_step
        } else {
            4.0 * settings.smallest_step
        };
        let sharp = turn > settings.largest_turn && step > believed;
        if sharp || (step > settings.crossing_step && crosses_another(base, &next)) {
            walk.refused += 1;
            step *= 0.5;
            continue;
        }
        base.distance = step;
        walk.steps += 1;
        let odd = base.negatives.abs_diff(next.negatives) % 2 == 1;
        let same_way = (base.load_direction >= 0.0) == (next.load_direction >= 0.0);
        if base.regime != next.regime && odd == same_way {
            // No other path is crossed: over the kink this one turns sharply round.
            next.direction.scale(-1.0);
            next.load_direction = -next.load_direction;
            walk.corners.push(points.len());
            step = BEHIND_A_KINK;
            points.push(next);
            continue;
        }
        let by_iterations = 4.0 / newton.iterations.max(1) as f64;
        let by_turn = 0.6 * settings.largest_turn / turn.max(1e-12);
        step = (step * by_iterations.min(by_turn).clamp(0.5, 1.6)).min(settings.largest_step);
        points.push(next);
    }
}

/// The point at the kink just ahead, with the direction of the path behind it. A one-sided law that lets
/// go can turn the path sharply round, so that no next point lies on the plane ahead.
///
/// Along a path of such a system the sign of dλ times that of the determinant stays the same over a
/// kink: both pieces solve the same equations on their own side, and the degree is kept. Where several
/// kinks fall together that tells nothing, and the system is asked first.
fn behind_kink<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    base: &mut PathPoint<B, I>,
) -> Option<PathPoint<B, I>> {
    let mut state = base.state.clone();
    let mut beyond = base.state.clone();
    beyond.add(BEYOND_A_KINK, &base.direction);
    newton.evaluate(system, &state, base.load);
    let distance = BEYOND_A_KINK * system.pass_kink(&state, &beyond)?;
    state.add(distance, &base.direction);
    let load = base.load + distance * base.load_direction;
    let weight = 1.0 / base.state.nodes.len() as f64;
    let row: Vec<SVector<f64, B>> = base.direction.nodes.iter().map(|t| t * weight).collect();
    let d = base.load_direction / system.load_scale().powi(2);
    let mut behind = complete(system, newton, state, load, &row, d);
    let odd = (behind.negatives + base.negatives) % 2 == 1;
    let same_way = (behind.load_direction >= 0.0) == (base.load_direction >= 0.0);
    let turn = match system.leads_on(&behind.state, &behind.direction) {
        Some(leads_on) => !leads_on,
        None => odd == same_way,
    };
    if turn {
        behind.direction.scale(-1.0);
        behind.load_direction = -behind.load_direction;
    }
    base.distance = distance;
    Some(behind)
}

/// The point on the plane at `distance` along the tangent of `base`, with its own tangent. The
/// point `before` it, if any, serves to tell how the path bends.
///
/// # Errors
/// Where Newton does not converge.
pub(super) fn at_distance<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    before: Option<&PathPoint<B, I>>,
    base: &PathPoint<B, I>,
    distance: f64,
) -> Result<PathPoint<B, I>, NotConverged> {
    system.depart(&base.state);
    let mut state = base.state.clone();
    state.add(distance, &base.direction);
    let mut load = base.load + distance * base.load_direction;
    // Not across a turn onto another branch: there the directions have nothing in common.
    if let Some(before) = before
        && before.distance > 0.0
        && inner_product(system, before, base) > LEAST_COMMON
    {
        let bend = 0.5 * distance * distance / before.distance;
        state.add(bend, &base.direction);
        state.add(-bend, &before.direction);
        load += bend * (base.load_direction - before.load_direction);
    }
    let weight = 1.0 / base.state.nodes.len() as f64;
    let row: Vec<SVector<f64, B>> = base.direction.nodes.iter().map(|t| t * weight).collect();
    let d = base.load_direction / system.load_scale().powi(2);
    let constraint = Constraint {
        row: &row,
        d,
        from: &base.state,
        from_load: base.load,
        distance,
    };
    let mut iterations = 0;
    // The last step may go over a kink.
    for again in 0..MOST_AGAIN {
        newton.solve_constrained(system, &mut state, &mut load, &constraint)?;
        iterations += newton.iterations;
        let point = complete(system, newton, state, load, &row, d);
        let apart = apart(system, base, &point);
        if apart > FAR_AWAY * distance {
            // On the plane, but of another path.
            return Err(NotConverged {
                iterations,
                last_step: apart,
            });
        }
        let within_round_off = again > 0 && newton.iterations == 1;
        if !system.changed() || within_round_off {
            newton.iterations = iterations;
            return Ok(point);
        }
        PathPoint { state, load, .. } = point;
    }
    Err(NotConverged {
        iterations,
        last_step: 0.0,
    })
}

/// Makes a path point of a solution: pivot count, and the unit tangent that points along the
/// border row given.
pub(super) fn complete<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    state: Unknowns<B, I>,
    load: f64,
    row: &[SVector<f64, B>],
    d: f64,
) -> PathPoint<B, I> {
    let negatives = newton.evaluate(system, &state, load);
    let regime = system.regime();
    let mut direction = system.zero();
    let mut load_direction = newton.tangent(system, row, d, &mut direction);
    let weight = 1.0 / direction.nodes.len() as f64;
    let length = (dot(&direction.nodes, &direction.nodes) * weight
        + (load_direction / system.load_scale()).powi(2))
    .sqrt();
    direction.scale(1.0 / length);
    load_direction /= length;
    PathPoint {
        state,
        load,
        direction,
        load_direction,
        negatives,
        regime,
        distance: 0.0,
    }
}

/// The first point of a path: solves at `load` from `guess`, with the tangent towards more load.
///
/// # Errors
/// Where Newton does not converge.
pub fn start<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    guess: &Unknowns<B, I>,
    load: f64,
) -> Result<PathPoint<B, I>, NotConverged> {
    let mut state = guess.clone();
    if system.has_kinks() {
        begin(system, newton, &mut state, load)?;
    } else {
        newton.solve_at_load(system, &mut state, load)?;
    }
    system.depart(&state);
    let row = vec![SVector::zeros(); system.links() + 1];
    let d = 1.0 / system.load_scale();
    Ok(complete(system, newton, state, load, &row, d))
}

/// The state at `load` from a guess that may lie inside of what it must stay out of: without contacts
/// first, then with contacts that are entered less and less, and without friction: how the state came about is not
/// known.
fn begin<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    state: &mut Unknowns<B, I>,
    load: f64,
) -> Result<(), NotConverged> {
    system.depart(state);
    system.ease(Some(1.0), state);
    let found = newton
        .solve_at_load(system, state, load)
        .and_then(|()| take_in(system, newton, state, load));
    system.ease(None, state);
    found
}

/// Takes contacts in, less and less eased.
fn take_in<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    state: &mut Unknowns<B, I>,
    load: f64,
) -> Result<(), NotConverged> {
    let free = state.clone();
    let (mut share, mut step) = (1.0, 1.0);
    while share > 0.0 {
        let next: f64 = if step < share { share - step } else { 0.0 };
        let mut trial = state.clone();
        system.depart(state);
        system.ease(Some(next), &free);
        match newton.solve_at_load(system, &mut trial, load) {
            Ok(()) => {
                state.copy_from(&trial);
                share = next;
                step *= 2.0;
            }
            Err(failed) => {
                step *= 0.5;
                if step < SMALLEST_EASING {
                    return Err(failed);
                }
            }
        }
    }
    Ok(())
}

/// The same point with its direction turned round, to go back from: what friction held up to now
/// sticks first.
pub fn turn_back<const B: usize, const I: usize>(
    system: &mut impl System<B, I>,
    newton: &mut Newton<B, I>,
    point: &PathPoint<B, I>,
) -> PathPoint<B, I> {
    system.depart(&point.state);
    let weight = -1.0 / point.state.nodes.len() as f64;
    let row: Vec<SVector<f64, B>> = point.direction.nodes.iter().map(|t| t * weight).collect();
    let d = -point.load_direction / system.load_scale().powi(2);
    complete(system, newton, point.state.clone(), point.load, &row, d)
}

/// Distance between two points, in the norm of the path.
fn apart<const B: usize, const I: usize>(
    system: &impl System<B, I>,
    a: &PathPoint<B, I>,
    b: &PathPoint<B, I>,
) -> f64 {
    let nodes = a.state.nodes.iter().zip(&b.state.nodes);
    let squares: f64 = nodes.map(|(a, b)| (a - b).norm_squared()).sum();
    let load = (a.load - b.load) / system.load_scale();
    (squares / a.state.nodes.len() as f64 + load * load).sqrt()
}

fn inner_product<const B: usize, const I: usize>(
    system: &impl System<B, I>,
    a: &PathPoint<B, I>,
    b: &PathPoint<B, I>,
) -> f64 {
    dot(&a.direction.nodes, &b.direction.nodes) / a.direction.nodes.len() as f64
        + a.load_direction * b.load_direction / system.load_scale().powi(2)
}
