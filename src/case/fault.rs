//! What is wrong with a value, and what to do about it.

/// Why a value is not the one wanted.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Fault {
    /// What is wrong.
    pub message: String,
    /// Said under the underlined text.
    pub label: String,
    /// What to do about it.
    pub cure: String,
}
