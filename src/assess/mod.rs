//! The job: chooses the models, runs them, compares, and names the governing limit.

mod absolute;
mod compare;
mod echo;
mod end_constant;
mod events;
mod formula;
mod imperfect;
mod jump;
mod leaned;
mod limits;
mod notes;
mod observe;
mod planes;
mod run;
mod sensitivity;
mod service;
mod southwell;
mod straight;
mod stroke;
mod summary;
mod verdict;
mod walk;

use crate::result::Assessment;
use crate::setup::Setup;

/// Elements of the coarser and the finer mesh. Results are the finer's; the difference is the
/// discretisation estimate.
pub const MESHES: [usize; 2] = [16, 32];
/// The same with guides, where the ends of a contact lie between the nodes; for longer springs more,
/// as [`guided_meshes`] says.
const GUIDED_MESH: usize = 128;

/// Coarser and finer mesh of the imperfect column. Between guides the axis may go into half waves
/// as short as those that its force, at solid, lets bend freely: n = q/π, q² = ξ(1 − mξ) L²/K as in the
/// straight column; and a curve of n half waves within the clearance wants elements in proportion.
fn guided_meshes(setup: &Setup) -> [usize; 2] {
    if setup.guides.is_empty() {
        return MESHES;
    }
    let spring = &setup.spring;
    let length = spring.deformable_length();
    let section = spring.section(length);
    let share = (spring.solid_deflection() / length).clamp(0.0, 0.95);
    let load = section.axial * share;
    let squared = load * (1.0 - share + load / section.shear) * length * length / section.bending;
    let waves = squared.max(0.0).sqrt() / std::f64::consts::PI;
    let fine = (GUIDED_MESH as f64 * (waves / FREE_WAVES).max(1.0)).ceil() as usize;
    let coarse = fine.div_ceil(2).min(LARGEST_GUIDED_MESH);
    [coarse, 2 * coarse]
}

/// Half waves for which the plain guided mesh is fine enough.
const FREE_WAVES: f64 = 4.0;
/// Elements of the coarser mesh at most: for springs no guide would be asked to keep straight.
const LARGEST_GUIDED_MESH: usize = 256;

/// Answers one case. `file` is only passed on. Computations that fail are in the result. Where the
/// supports differ between the two lateral planes the answer is that of the weaker one.
pub fn assess(setup: &Setup, file: &str) -> Assessment {
    match planes::of(setup) {
        None => in_one_plane(setup, file),
        Some(planes) => planes::weaker(setup, planes.map(|plane| in_one_plane(&plane, file))),
    }
}

fn in_one_plane(setup: &Setup, file: &str) -> Assessment {
    let closed_form = formula::closed_form(setup);
    let straight = straight::idealised(setup);
    let as_built = straight::as_built(setup);
    let imperfect = imperfect::run(setup);
    let limits = limits::collect(setup, as_built.as_ref(), &imperfect);
    let comparisons = compare::all(&closed_form, &straight);
    let absolute_stability = absolute::stability(setup, &closed_form, &straight);
    let dead_load = jump::dead_load(setup, &imperfect);
    let snap = jump::snap(setup, &imperfect);
    let decided = verdict::decide(setup, &limits, &imperfect);
    let guide_answer = service::guides(setup, &imperfect, &decided.limits);
    let imperfect_column = imperfect.summary(setup, &decided.limits);
    let mut warnings = setup.warnings.clone();
    warnings.extend(notes::notes(setup, &imperfect));
    Assessment {
        title: setup.title.clone(),
        file: file.to_owned(),
        verdict: decided.verdict,
        governing: decided.governing,
        sentence: decided.sentence,
        undecided_reason: decided.undecided_reason.map(str::to_owned),
        spring: echo::spring(setup),
        supports: echo::supports(setup),
        guides: echo::guides(setup),
        imperfections: echo::imperfections(setup),
        duty: echo::duty(setup),
        defaulted: setup.defaulted.clone(),
        planes: Vec::new(),
        closed_form,
        effective_end_constant: end_constant::effective(setup, &straight),
        straight_column: straight,
        imperfect_column,
        comparisons,
        limits: decided.limits,
        dead_load,
        snap,
        guide_answer,
        seat_loads: service::seats(setup, &imperfect),
        stroke: stroke::stroke(setup, &imperfect),
        absolute_stability,
        support_sensitivity: sensitivity::of_supports(setup),
        stress_at_solid: limits::stress_at_solid(setup),
        failures: imperfect.failures,
        warnings,
    }
}
