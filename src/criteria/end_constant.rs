//! End constants of the handbooks.

/// An end as the handbooks know it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HandbookEnd {
    /// Rotation and sideways motion held.
    Clamped,
    /// Free to rotate about a point in the end plane, held sideways.
    Hinged,
    /// Free to rotate and to move sideways.
    Free,
    /// Rotation held, sideways free.
    Sliding,
}

/// An end constant with its source.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EndConstant {
    /// α: effective length over free length.
    pub value: f64,
    /// Who prints it.
    pub source: &'static str,
}

const fn constant(value: f64, source: &'static str) -> EndConstant {
    EndConstant { value, source }
}

const BOTH: &str = "EN 13906-1 (from memory) and Shigley, table of end constants (seen)";
const EN: &str = "EN 13906-1 (from memory)";
const SHIGLEY: &str = "Shigley, table of end constants (seen)";

static BOTH_CLAMPED: [EndConstant; 1] = [constant(0.5, BOTH)];
static CLAMPED_SLIDING: [EndConstant; 1] = [constant(1.0, EN)];
static BOTH_HINGED: [EndConstant; 1] = [constant(1.0, BOTH)];
static CLAMPED_FREE: [EndConstant; 1] = [constant(2.0, BOTH)];
static CLAMPED_HINGED: [EndConstant; 2] = [constant(0.7, EN), constant(0.707, SHIGLEY)];

/// The constants the handbooks give for a pair of ends: both clamped 0.5; clamped and
/// clamped–sliding 1; both hinged 1; one clamped, one free 2; one clamped, one hinged 0.7 (EN)
/// or 0.707 (Shigley). Empty where they give none.
pub fn end_constants(one: HandbookEnd, other: HandbookEnd) -> &'static [EndConstant] {
    use HandbookEnd::{Clamped, Free, Hinged, Sliding};
    match (one, other) {
        (Clamped, Clamped) => &BOTH_CLAMPED,
        (Clamped, Sliding) | (Sliding, Clamped) => &CLAMPED_SLIDING,
        (Hinged, Hinged) => &BOTH_HINGED,
        (Clamped, Free) | (Free, Clamped) => &CLAMPED_FREE,
        (Clamped, Hinged) | (Hinged, Clamped) => &CLAMPED_HINGED,
        _ => &[],
    }
}

/// A pair of ends as the handbooks list it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HandbookCase {
    /// The pairs of ends that have these constants, in words.
    pub ends: &'static str,
    /// Its constants: two where the handbooks differ.
    pub constants: &'static [EndConstant],
}

/// The handbooks' cases by rising constant; two pairs share the constant 1.
pub fn handbook_cases() -> [HandbookCase; 4] {
    let case = |ends, constants| HandbookCase { ends, constants };
    [
        case("clamped-clamped", &BOTH_CLAMPED),
        case("clamped-hinged", &CLAMPED_HINGED),
        case("hinged-hinged or clamped-sliding", &BOTH_HINGED),
        case("clamped-free", &CLAMPED_FREE),
    ]
}

/// The case of that pair of ends, with the pair's own name; `None` where the handbooks give none.
pub fn handbook_case(one: HandbookEnd, other: HandbookEnd) -> Option<HandbookCase> {
    use HandbookEnd::{Clamped, Hinged};
    let constants = end_constants(one, other);
    let ends = match (one, other) {
        (Hinged, Hinged) => "hinged-hinged",
        (Clamped, Clamped) => "clamped-clamped",
        (Clamped, Hinged) | (Hinged, Clamped) => "clamped-hinged",
        (HandbookEnd::Sliding, _) | (_, HandbookEnd::Sliding) => "clamped-sliding",
        _ => "clamped-free",
    };
    (!constants.is_empty()).then_some(HandbookCase { ends, constants })
}

/// The case whose constant is nearest to `end_constant` by ratio, and that constant of its.
pub fn nearest_case(end_constant: f64) -> (HandbookCase, EndConstant) {
    let away = |constant: &EndConstant| (constant.value / end_constant).ln().abs();
    let [first, others @ ..] = handbook_cases();
    let mut nearest = (first, first.constants[0]);
    for case in others {
        for constant in case.constants {
            if away(constant) < away(&nearest.1) {
                nearest = (case, *constant);
            }
        }
    }
    nearest
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_nearest_case_is_nearest_by_ratio() {
        // The borders are the geometric means.
        for (end_constant, ends, nearest) in [
            (0.3, "clamped-clamped", 0.5),
            (0.591, "clamped-clamped", 0.5),
            (0.592, "clamped-hinged", 0.7),
            (0.7034, "clamped-hinged", 0.7),
            (0.7036, "clamped-hinged", 0.707),
            (0.840, "clamped-hinged", 0.707),
            (0.842, "hinged-hinged or clamped-sliding", 1.0),
            (1.41, "hinged-hinged or clamped-sliding", 1.0),
            (1.42, "clamped-free", 2.0),
            (30.0, "clamped-free", 2.0),
        ] {
            let (case, constant) = nearest_case(end_constant);
            assert_eq!((case.ends, constant.value), (ends, nearest));
        }
    }
}
