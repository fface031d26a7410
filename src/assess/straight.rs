//! The straight, perfect column on two meshes: with the formula's idealisation, and as built.

use super::MESHES;
use crate::column::{Column, Idealisation, StraightScan};
use crate::result::{Computed, Measure, StraightColumn};
use crate::setup::Setup;
use crate::units::{Metre, Newton};

/// A critical state with its error estimate, SI.
#[derive(Clone, Copy, Debug)]
pub(super) struct Critical {
    /// Travel of the machine, m.
    pub deflection: Metre,
    /// Axial force, N.
    pub force: Newton,
    /// Error estimate of the deflection, m.
    pub error: Metre,
    /// Where the column straightens again, m.
    pub straightens_again: Option<Metre>,
}

/// Share of a deflection, and of the free length, below which refining it is round-off.
const FLOOR_OF_DEFLECTION: f64 = 1e-11;
const FLOOR_OF_LENGTH: f64 = 1e-12;

/// What refining a deflection leaves as round-off, m.
pub(super) fn floor(setup: &Setup, deflection: Metre) -> Metre {
    FLOOR_OF_DEFLECTION * deflection + FLOOR_OF_LENGTH * setup.spring.free_length
}

fn critical(setup: &Setup, idealisation: Idealisation) -> Option<Critical> {
    let on_mesh = |elements: usize| {
        let mut column = Column::of_setup(setup, idealisation, elements, None);
        let scale = column.scale;
        StraightScan::new(&mut column).buckling().map(|found| {
            let force = found.load * scale.force;
            let travel = |shortening: f64| {
                let share = shortening / found.shortening;
                shortening * scale.length + setup.seats_give(share * force).0
            };
            (
                travel(found.shortening),
                force,
                found.bracket * scale.length,
                found.straightens_again.map(travel),
            )
        })
    };
    let [coarse, fine] = MESHES.map(on_mesh);
    let (deflection, force, bracket, straightens_again) = fine?;
    // Where the coarser mesh finds no critical state the two differ by as much as there is.
    let difference = coarse.map_or(deflection, |(other, ..)| (other - deflection).abs());
    Some(Critical {
        deflection,
        force,
        error: difference + bracket + floor(setup, deflection),
        straightens_again,
    })
}

/// The perfect column as built, dead coils and arms included.
pub(super) fn as_built(setup: &Setup) -> Option<Critical> {
    critical(setup, Idealisation::AsBuilt)
}

/// The perfect column with the whole free length deformable.
pub(super) fn idealised(setup: &Setup) -> StraightColumn {
    let found = critical(setup, Idealisation::WholeLength);
    StraightColumn {
        critical_deflection_m: found.map(|c| c.deflection),
        critical_force_n: found.map(|c| c.force),
        error_m: found.map(|c| c.error),
        critical: found.map(|c| Computed {
            measure: measure(setup, c.deflection, c.force),
            error_m: c.error,
        }),
        beyond_solid: found.is_some_and(|c| is_beyond_solid(setup, c.deflection, c.force)),
        straightens_again_at_m: found.and_then(|c| c.straightens_again),
    }
}

/// A deflection in the ways people quote it.
pub(super) fn measure(setup: &Setup, deflection: Metre, force: Newton) -> Measure {
    Measure {
        deflection_m: deflection,
        share_of_free_length: share_of_free_length(setup, deflection, force),
        force_n: force,
        margin: setup.duty.margin(deflection, force),
    }
}

/// Shortening of the spring, without what its seats give, over its free length.
pub(super) fn share_of_free_length(setup: &Setup, deflection: Metre, force: Newton) -> f64 {
    (deflection - setup.seats_give(force).0) / setup.spring.free_length
}

/// Whether the spring is solid before it gets there.
pub(super) fn is_beyond_solid(setup: &Setup, deflection: Metre, force: Newton) -> bool {
    deflection - setup.seats_give(force).0 > setup.spring.solid_deflection()
}
