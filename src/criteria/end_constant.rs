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
