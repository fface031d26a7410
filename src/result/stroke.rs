//! A full stroke with friction.

use super::PathPoint;
use crate::units::{Joule, Metre};
use serde::Serialize;

/// What friction takes out of a stroke: the spring goes from the installed to the largest working
/// deflection and back, the second time.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Stroke {
    /// Where the stroke starts, m.
    pub from_deflection_m: Metre,
    /// Where it turns, m.
    pub to_deflection_m: Metre,
    /// Energy lost in it: the area of the loop of force over deflection, J.
    pub energy_lost_j: Joule,
    /// The same as work of the friction, summed over its places, J: an independent count.
    pub friction_work_j: Joule,
    /// How far the second stroke misses the point it started from, share of the largest force.
    pub closes_within: f64,
    /// The way out. Written as CSV and drawn; not part of the JSON.
    #[serde(skip)]
    pub out: Vec<PathPoint>,
    /// The way back.
    #[serde(skip)]
    pub back: Vec<PathPoint>,
}
