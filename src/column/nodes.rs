//! Where h of a leaning element is integrated: two points in each pad, and the pad in which the corner
//! of a guide lies split there.

use super::basis::{FUNCTIONS, values};
use super::element::{Element, PointLaw};
use super::lean::{Held, PADS};

/// Points of quadrature of h: two a pad, and two more in the pad in which a corner lies.
pub(super) const MOST_NODES: usize = 2 * PADS + 2;

/// A point of quadrature of h.
#[derive(Clone, Copy, Debug)]
pub(super) struct Node {
    pub values: [f64; FUNCTIONS],
    pub law: PointLaw,
    pub weight: f64,
    /// The pad it lies in, and ψ of that pad there.
    pub pad: usize,
    pub share: f64,
    /// 1 behind the corner, towards B; 0 before it.
    pub behind: f64,
}

/// Where the pads of an element are, and the points of quadrature in them.
#[derive(Clone, Debug)]
pub(super) struct PadTables {
    values: [[f64; FUNCTIONS]; 2 * PADS],
    at: [f64; 2 * PADS],
    /// ψ at the two points of a pad.
    share: [f64; 2],
}

impl PadTables {
    pub fn new() -> Self {
        let share = GAUSS_TWO.map(|g| 0.5 * (1.0 + g));
        let at = std::array::from_fn(|g| pad_start(g / 2) + PAD * share[g % 2]);
        PadTables {
            values: at.map(values),
            at,
            share,
        }
    }

    /// The law of an element at its points.
    pub fn laws(&self, element: &Element) -> [PointLaw; 2 * PADS] {
        self.at.map(|t| element.law_at(t))
    }
}

/// Length of a pad on [−1, 1].
const PAD: f64 = 2.0 / PADS as f64;
/// Abscissae of the two-point Gauss–Legendre rule.
const GAUSS_TWO: [f64; 2] = [-0.577_350_269_189_625_8, 0.577_350_269_189_625_8];

fn pad_start(pad: usize) -> f64 {
    -1.0 + PAD * pad as f64
}

/// The pad in which `t` lies, and ψ of that pad there.
pub(super) fn pad_of(t: f64) -> (usize, f64) {
    let at = (t + 1.0) / PAD;
    let pad = (at.max(0.0) as usize).min(PADS - 1);
    (pad, at - pad as f64)
}

impl Held<'_> {
    /// The points of quadrature.
    pub(super) fn nodes(&self, tables: &PadTables) -> ([Node; MOST_NODES], usize) {
        let weight = self.element.length / (2 * PADS) as f64;
        let node = |g: usize| Node {
            values: tables.values[g],
            law: self.laws[g],
            weight,
            pad: g / 2,
            share: tables.share[g % 2],
            behind: 0.0,
        };
        let mut nodes = [node(0); MOST_NODES];
        let Some(corner) = self.corner else {
            for (g, place) in nodes.iter_mut().enumerate().take(2 * PADS) {
                *place = node(g);
            }
            return (nodes, 2 * PADS);
        };
        let (split, share) = pad_of(corner);
        let mut count = 0;
        for pad in 0..PADS {
            let behind = f64::from(pad > split);
            if pad != split {
                for g in [2 * pad, 2 * pad + 1] {
                    nodes[count] = Node { behind, ..node(g) };
                    count += 1;
                }
                continue;
            }
            for (from, to, behind) in [(0.0, share, 0.0), (share, 1.0, 1.0)] {
                for g in GAUSS_TWO {
                    let psi = from + (to - from) * 0.5 * (1.0 + g);
                    let t = pad_start(pad) + PAD * psi;
                    nodes[count] = Node {
                        values: values(t),
                        law: self.element.law_at(t),
                        weight: weight * (to - from),
                        pad,
                        share: psi,
                        behind,
                    };
                    count += 1;
                }
            }
        }
        (nodes, count)
    }
}
