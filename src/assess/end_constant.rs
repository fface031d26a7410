//! The effective end constant: the handbook's α that would stand for the case's real supports.

use super::formula::handbook_end;
use crate::criteria::{
    EndConstant, HandbookCase, critical_share, effective_end_constant, handbook_case,
    handbook_cases, is_beyond_peak, nearest_case, never_critical_below,
};
use crate::result::{EffectiveEndConstant, StraightColumn};
use crate::setup::{Contact, Setup};

/// From the straight column's critical state, by the closed form read backwards.
pub(super) fn effective(setup: &Setup, column: &StraightColumn) -> EffectiveEndConstant {
    let spring = &setup.spring;
    let length = spring.free_length;
    let section = spring.section(length);
    let own = handbook_end(&setup.bottom)
        .zip(handbook_end(&setup.top))
        .and_then(|(bottom, top)| handbook_case(bottom, top));
    let found = column.critical.as_ref().and_then(|critical| {
        let share = critical.measure.share_of_free_length;
        Some((
            effective_end_constant(&section, length, share)?,
            share,
            critical.error_m / critical.measure.deflection_m,
        ))
    });
    let Some((value, share, relative_error)) = found else {
        return never(own, never_critical_below(&section, length));
    };
    let (case, constant) = match own {
        Some(case) => (case, nearest_of(&case, value)),
        None => nearest_case(value),
    };
    let of_case = critical_share(&section, constant.value * length);
    let change = of_case.map(|of_case| share / of_case - 1.0);
    let beyond_peak = is_beyond_peak(&section, share);
    // dα/α = −½ dK/K, K = ξ(1 − mξ).
    let m = 1.0 - section.axial / section.shear;
    let error = 0.5 * value * relative_error * ((1.0 - 2.0 * m * share) / (1.0 - m * share)).abs();
    EffectiveEndConstant {
        end_constant: Some(value),
        end_constant_error: Some(error),
        end_constant_below: None,
        beyond_peak,
        handbook_ends: Some(case.ends.to_owned()),
        handbook_constants: values(&case),
        is_handbook_case: own.is_some(),
        relative_difference: change,
        sentence: sentence(
            value,
            &case,
            constant,
            own.is_some(),
            change,
            beyond_peak,
            unseen(setup),
        ),
    }
}

fn values(case: &HandbookCase) -> Vec<f64> {
    case.constants
        .iter()
        .map(|constant| constant.value)
        .collect()
}

/// "clamped-hinged (0.7 / 0.707)".
fn name(case: &HandbookCase) -> String {
    let constants: Vec<String> = values(case).iter().map(ToString::to_string).collect();
    format!("{} ({})", case.ends, constants.join(" / "))
}

fn nearest_of(case: &HandbookCase, value: f64) -> EndConstant {
    let away = |constant: &EndConstant| (constant.value / value).ln().abs();
    let mut nearest = case.constants[0];
    for constant in case.constants {
        if away(constant) < away(&nearest) {
            nearest = *constant;
        }
    }
    nearest
}

/// What the straight path does not see of these supports.
fn unseen(setup: &Setup) -> &'static str {
    let swivels = [&setup.bottom, &setup.top]
        .iter()
        .any(|end| matches!(end.contact, Contact::Swivel(_)));
    match (setup.top.motion.is_some(), swivels) {
        (true, true) => " The arc of the seat and the friction of the ball are not in it.",
        (true, false) => " The arc on which the seat moves is not in it.",
        (false, true) => " The friction of the ball is not in it.",
        (false, false) => "",
    }
}

fn sentence(
    value: f64,
    case: &HandbookCase,
    constant: EndConstant,
    is_own: bool,
    change: Option<f64>,
    beyond_peak: bool,
    unseen: &str,
) -> String {
    let whose = if is_own {
        format!("the ends are the handbook's own, {}", name(case))
    } else {
        format!("the nearest handbook case is {}", name(case))
    };
    let mut text = format!("As if alpha were {value:.4}; {whose}");
    // Less than this is the error of solving the column.
    const SAME: f64 = 1e-7;
    text += &match change {
        Some(change) if change.abs() < SAME => ", and the supports do what it says.".to_owned(),
        Some(change) if is_own => format!(
            ". The column is critical {:.2} % {} than by the formula with {}.",
            100.0 * change.abs(),
            if change < 0.0 { "earlier" } else { "later" },
            constant.value
        ),
        Some(change) => format!(
            ". Against it, with {}, the supports {} the critical deflection by {:.2} %.",
            constant.value,
            if change < 0.0 { "lower" } else { "raise" },
            100.0 * change.abs()
        ),
        None => format!(
            ". With {} the formula is never critical; in these supports the column is.",
            constant.value
        ),
    };
    text += unseen;
    if beyond_peak {
        text += " (It is critical beyond the deflection at which the load acts most, where a \
                 handbook case of that alpha would straighten again.)";
    }
    text
}

/// No critical deflection, so no constant: only how large it would have to be.
fn never(own: Option<HandbookCase>, below: f64) -> EffectiveEndConstant {
    let alike: Vec<HandbookCase> = handbook_cases()
        .into_iter()
        .filter(|case| case.constants.iter().all(|constant| constant.value < below))
        .collect();
    let mut text = format!(
        "As if alpha were below {below:.4}: the column is never critical, and nor is the formula \
         with such a constant"
    );
    text += &match own {
        Some(case) => format!("; the ends are the handbook's own, {}.", name(&case)),
        None if alike.is_empty() => {
            ". The formula of every handbook case is critical: these supports do better.".to_owned()
        }
        None => {
            let names: Vec<String> = alike.iter().map(name).collect();
            format!(": so {}.", names.join(", "))
        }
    };
    EffectiveEndConstant {
        end_constant: None,
        end_constant_error: None,
        end_constant_below: Some(below),
        beyond_peak: false,
        handbook_ends: own.map(|case| case.ends.to_owned()),
        handbook_constants: own.map(|case| values(&case)).unwrap_or_default(),
        is_handbook_case: own.is_some(),
        relative_difference: None,
        sentence: text,
    }
}
