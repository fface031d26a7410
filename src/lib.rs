//! Will a helical compression spring stay straight through its whole travel, and which limit
//! governs? The spring as an equivalent column (Timoshenko–Haringx), loaded with its imperfections
//! in its real supports, held against the closed form.
//!
//! Data goes one way: case file → [`setup`] → model → solve → [`result`] → report.

pub mod assess;
pub mod case;
pub mod cli;
pub mod column;
pub mod criteria;
pub mod report;
pub mod result;
pub mod setup;
pub mod solve;
pub mod spring;
pub mod store;
pub mod study;
pub mod units;
