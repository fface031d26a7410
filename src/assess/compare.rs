//! Formula against column, in a sentence.

use crate::result::{ClosedForm, Comparison, Measure, Side, StraightColumn};

/// Relative difference below which formula and column say the same, if the column's own error is
/// smaller still.
const SAME: f64 = 1e-8;

/// One comparison for each end constant.
pub(super) fn all(formula: &ClosedForm, column: &StraightColumn) -> Vec<Comparison> {
    // Of the spring's own shortening, without what soft seats give.
    let share = |found: &Measure| 100.0 * found.share_of_free_length;
    let column_error = column.error_m.unwrap_or(0.0);
    formula
        .curves
        .iter()
        .map(|curve| {
            let alpha = curve.end_constant;
            let column_critical = column.critical.map(|critical| critical.measure);
            let (relative_difference, side, sentence) = match (curve.critical, column_critical) {
                (None, None) => (
                    None,
                    Side::Equal,
                    format!("With end constant {alpha} formula and column agree: never critical."),
                ),
                (None, Some(found)) => (
                    None,
                    Side::Unsafe,
                    format!(
                        "With end constant {alpha} the formula promises that the spring is never \
                         critical; the column is, at {:.2} % of the free length: the formula is \
                         on the unsafe side.",
                        share(&found)
                    ),
                ),
                (Some(found), None) => (
                    None,
                    Side::Safe,
                    format!(
                        "With end constant {alpha} the formula puts the critical deflection at \
                         {:.2} % of the free length; the column is never critical: the formula is \
                         on the safe side.",
                        share(&found)
                    ),
                ),
                (Some(said), Some(found)) => {
                    let difference = said.deflection_m / found.deflection_m - 1.0;
                    let band = SAME.max(column_error / found.deflection_m);
                    if difference.abs() <= band {
                        (
                            Some(difference),
                            Side::Equal,
                            format!(
                                "With end constant {alpha} formula and column agree within the \
                                 column's error."
                            ),
                        )
                    } else {
                        let (side, word, above) = if difference > 0.0 {
                            (Side::Unsafe, "unsafe", "above")
                        } else {
                            (Side::Safe, "safe", "below")
                        };
                        (
                            Some(difference),
                            side,
                            format!(
                                "With end constant {alpha} the formula lies {:.2} % {above} the \
                                 column ({:.2} % against {:.2} % of the free length): on the \
                                 {word} side.",
                                100.0 * difference.abs(),
                                share(&said),
                                share(&found)
                            ),
                        )
                    }
                }
            };
            Comparison {
                end_constant: alpha,
                relative_difference,
                side,
                sentence,
            }
        })
        .collect()
}
