//! End constants of the handbooks.

use crate::setup::Support;

/// An end constant with its source.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EndConstant {
    /// α: effective length over free length.
    pub value: f64,
    /// Who prints it.
    pub source: &'static str,
}

const BOTH: &str = "EN 13906-1 (from memory) and Shigley, table of end constants (seen)";
const EN: &str = "EN 13906-1 (from memory)";
const SHIGLEY: &str = "Shigley, table of end constants (seen)";

/// The constants the handbooks give for a pair of supports: both clamped 0.5; clamped and
/// clamped–sliding 1; both hinged 1; one clamped, one free 2; one clamped, one hinged 0.7 (EN)
/// or 0.707 (Shigley). Empty where no closed form covers the supports: elastic ones, and pivots
/// away from the end plane.
pub fn end_constants(bottom: &Support, top: &Support) -> Vec<EndConstant> {
    let has_arm = |s: &Support| s.arm != 0.0 && s.word() != "clamped" && s.word() != "sliding";
    if has_arm(bottom) || has_arm(top) {
        return Vec::new();
    }
    let one = |value, source| vec![EndConstant { value, source }];
    match (bottom.word(), top.word()) {
        ("clamped", "clamped") => one(0.5, BOTH),
        ("clamped", "sliding") | ("sliding", "clamped") => one(1.0, EN),
        ("hinged", "hinged") => one(1.0, BOTH),
        ("clamped", "free") | ("free", "clamped") => one(2.0, BOTH),
        ("clamped", "hinged") | ("hinged", "clamped") => vec![
            EndConstant {
                value: 0.7,
                source: EN,
            },
            EndConstant {
                value: 0.707,
                source: SHIGLEY,
            },
        ],
        _ => Vec::new(),
    }
}
