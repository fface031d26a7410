//! Absolute stability: never critical, at whatever deflection.

use super::MESHES;
use crate::column::{Column, Idealisation, StraightScan};
use crate::result::{AbsoluteStability, ClosedForm, StraightColumn};
use crate::setup::Setup;
use crate::units::Metre;

/// Free lengths tried, in mean diameters.
const SHORTEST: f64 = 0.05;
const LONGEST: f64 = 200.0;
/// Width of the last bracket of the length, relative.
const BRACKET: f64 = 1e-7;

pub(super) fn stability(
    setup: &Setup,
    formula: &ClosedForm,
    column: &StraightColumn,
) -> AbsoluteStability {
    let formula_below_m = formula
        .curves
        .first()
        .and_then(|curve| curve.absolute_stability_below_m);
    let says = formula
        .curves
        .first()
        .map(|curve| curve.critical_deflection_m.is_none());
    let stable = column.critical_deflection_m.is_none();
    // Half the meshes used elsewhere: the limit's error is of eighth order.
    let [coarse, fine] = MESHES.map(|elements| stable_below(setup, elements / 2));
    let column_below_error_m = match (coarse, fine) {
        (Some(a), Some(b)) => Some((a - b).abs() + BRACKET * b),
        _ => None,
    };
    AbsoluteStability {
        formula: says,
        formula_below_m,
        column: stable,
        column_below_m: fine,
        column_below_error_m,
        sentence: sentence(setup, says, formula_below_m, stable, fine),
    }
}

/// Free length at which the straight column begins to have a critical deflection; rate, coils,
/// diameter and supports as they are.
fn stable_below(setup: &Setup, elements: usize) -> Option<Metre> {
    let diameter = setup.spring.mean_diameter;
    // Inward arms must not cross: the pivots would meet, and the column turn about them.
    let arms = -(setup.bottom.arm + setup.top.arm) / diameter;
    let shortest = SHORTEST.max(1.05 * arms);
    let mut changed = setup.clone();
    let mut unstable_at = |slenderness: f64| {
        changed.spring.free_length = slenderness * diameter;
        let mut column = Column::of_setup(&changed, Idealisation::WholeLength, elements, None);
        StraightScan::new(&mut column).is_ever_unstable()
    };
    let (mut low, mut high) = (
        shortest,
        setup.spring.slenderness().clamp(shortest, LONGEST),
    );
    if unstable_at(low) {
        return None;
    }
    while !unstable_at(high) {
        low = high;
        high *= 2.0;
        if high > LONGEST {
            return None;
        }
    }
    while high - low > BRACKET * high {
        let middle = 0.5 * (low + high);
        if unstable_at(middle) {
            high = middle;
        } else {
            low = middle;
        }
    }
    Some(0.5 * (low + high) * diameter)
}

fn sentence(
    setup: &Setup,
    says: Option<bool>,
    formula_below: Option<Metre>,
    stable: bool,
    column_below: Option<Metre>,
) -> String {
    let length = setup.spring.free_length;
    let factor = |below: Metre| format!("{:.3} of the present free length", below / length);
    let column = match (stable, column_below) {
        (true, Some(below)) => format!(
            "The straight column is absolutely stable; it would stop being so at {}",
            factor(below)
        ),
        (true, None) => "The straight column is absolutely stable, at any free length tried".into(),
        (false, Some(below)) => format!(
            "The straight column is not absolutely stable; it would be below {}",
            factor(below)
        ),
        (false, None) => "The straight column is absolutely stable at no free length tried".into(),
    };
    let formula = match (says, formula_below) {
        (None, _) => "no closed form speaks about this support".to_owned(),
        (Some(true), _) => "the formula promises absolute stability".to_owned(),
        (Some(false), Some(below)) => {
            format!("the formula promises it below {}", factor(below))
        }
        (Some(false), None) => "the formula does not promise it".to_owned(),
    };
    format!("{column}; {formula}.")
}
