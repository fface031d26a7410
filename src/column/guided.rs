//! The guides of a column: which elements lean on them, and what passes through the contact.

use super::element::{Element, INNER, PointLaw};
use super::layout::{Column, ColumnState};
use super::lean::{Condensed, Held, PAD_UNKNOWNS, PADS, Pad, PadTables, decide};
use super::wall::{TopSeat, Wall};
use crate::solve::Assembled;
use nalgebra::{SVector, Vector3};

/// Weight of a gap against a force in the search for what leans (see [`super::lean`]), in EI/L³: of
/// the size of forces over motions that occur. The answer does not depend on it.
const SEARCH: f64 = 1e3;

/// Guides and the contact of a column with them.
#[derive(Clone, Debug)]
pub struct Leaning {
    pub(super) walls: Vec<Wall>,
    pub(super) tables: PadTables,
    pub(super) laws: Vec<[PointLaw; 2 * PADS]>,
    pub(super) symmetric: bool,
    search: f64,
    /// Where each pad was along x when the step began.
    was: Vec<f64>,
    /// Of the last assembly.
    pads: Vec<[Pad; PADS]>,
    condensed: Vec<Option<Condensed>>,
    /// From the pads' unknowns of the state to those it was assembled with.
    mended: Vec<[[f64; 2]; PADS]>,
}

/// A stretch of the column that leans on a guide, in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Contact {
    /// Its middle along the stress-free axis, share of the length from the bottom.
    pub place: f64,
    /// Its length, share of the column's.
    pub width: f64,
    /// Side of the strip on which it leans: +1 at +y.
    pub side: f64,
    /// Force across the wall.
    pub push: f64,
    /// Force of friction on the column along x.
    pub drag: f64,
    /// Whether it leans on the corner at the end of a guide.
    pub at_corner: bool,
}

impl Leaning {
    pub(super) fn new(walls: Vec<Wall>, elements: &[Element]) -> Self {
        let tables = PadTables::new();
        let symmetric = walls
            .iter()
            .all(|wall| wall.is_straight() && wall.friction == 0.0);
        Leaning {
            laws: elements
                .iter()
                .map(|element| tables.laws(element))
                .collect(),
            tables,
            walls,
            symmetric,
            search: SEARCH,
            was: vec![0.0; elements.len() * PADS],
            pads: vec![[Pad::Away; PADS]; elements.len()],
            condensed: vec![None; elements.len()],
            mended: vec![[[0.0; 2]; PADS]; elements.len()],
        }
    }

    /// The jumps of the force over the pads of an element.
    pub(super) fn jumps(side: &[f64], e: usize) -> [[f64; 2]; PADS] {
        let mine = &side[e * PAD_UNKNOWNS..(e + 1) * PAD_UNKNOWNS];
        std::array::from_fn(|k| [mine[2 * k], mine[2 * k + 1]])
    }

    /// Whether an element may lean on a wall: it does already, or comes near.
    fn is_near(&self, top: &TopSeat, held: &Held<'_>) -> bool {
        if held.jumps.iter().flatten().any(|j| *j != 0.0) {
            return true;
        }
        let (a, b, inner) = (held.a, held.b, held.inner);
        let law = &held.element.points[0];
        let turned = a[2].abs() + b[2].abs() + inner[0].abs() + inner[1].abs() + inner[2].abs();
        let slope = turned * (1.0 + inner[3].abs() * law.shear_compliance)
            + inner[4].abs() * law.shear_compliance;
        let reach = held.element.length * slope;
        self.walls.iter().any(|wall| {
            wall.reaches(a[0], b[0], top)
                && [a, b].iter().any(|node| {
                    wall.room(node[0], node[1], inner[3], law.axial_compliance, top) < reach
                })
        })
    }

    /// Assembles element `e` where it leans; false where it does not, and is a plain one.
    pub(super) fn assemble(
        &mut self,
        plain: &super::basis::Tables,
        e: usize,
        top: &TopSeat,
        mut held: Held<'_>,
        out: &mut Assembled<3>,
    ) -> bool {
        self.condensed[e] = None;
        self.pads[e] = [Pad::Away; PADS];
        if !self.is_near(top, &held) {
            return false;
        }
        let means = held.means(&self.tables);
        let was = &self.was[e * PADS..(e + 1) * PADS];
        let pads = decide(
            &self.walls,
            top,
            &held,
            &means,
            was,
            self.search,
            self.symmetric,
        );
        if pads == [Pad::Away; PADS] && held.jumps == [[0.0; 2]; PADS] {
            return false;
        }
        let given = held.jumps;
        for (pad, jump) in pads.iter().zip(&mut held.jumps) {
            match pad {
                Pad::Away => *jump = [0.0; 2],
                Pad::Leans { side, facing, .. } if self.symmetric => {
                    jump[0] = -(facing.axis_slope + side * facing.widening) * jump[1];
                }
                Pad::Leans { .. } => {}
            }
        }
        for k in 0..PADS {
            for axis in 0..2 {
                self.mended[e][k][axis] = held.jumps[k][axis] - given[k][axis];
            }
        }
        let marked = pads.map(|pad| pad != Pad::Away);
        let forms = held.forms(plain, &self.tables, marked);
        let forces = [[held.inner[3], held.inner[4]], held.end_force()];
        let condensed = forms.condense(&pads, &held.jumps, was, forces, self.symmetric);
        out.inner_negatives += condensed.negatives;
        for (node, residual) in condensed.residual.iter().enumerate() {
            out.residual[e + node] += residual;
        }
        let [aa, ab, ba, bb] = &condensed.blocks;
        out.tangent.diagonal[e] += aa;
        out.tangent.diagonal[e + 1] += bb;
        out.tangent.right[e] = *ab;
        if let Some(left) = out.tangent.left.get_mut(e) {
            *left = *ba;
        }
        self.pads[e] = pads;
        self.condensed[e] = Some(condensed);
        true
    }

    /// Fills in the inner and side part of a step for steps `a`, `b` of the element's ends; false
    /// for a plain element, whose side part alone is set.
    pub(super) fn recover(
        &self,
        e: usize,
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        residual: f64,
        inner: &mut SVector<f64, INNER>,
        side: &mut [f64],
    ) -> bool {
        let mine = &mut side[e * PAD_UNKNOWNS..(e + 1) * PAD_UNKNOWNS];
        let Some(condensed) = &self.condensed[e] else {
            mine.fill(0.0);
            return false;
        };
        let (step, jumps) = condensed.recover(&self.pads[e], a, b, residual);
        *inner = step;
        for (k, jump) in jumps.iter().enumerate() {
            mine[2 * k] = jump[0] + residual * self.mended[e][k][0];
            mine[2 * k + 1] = jump[1] + residual * self.mended[e][k][1];
        }
        true
    }

    /// Remembers where every pad is: what sticks, sticks there.
    pub(super) fn depart(&mut self, e: usize, held: &Held<'_>) {
        let means = held.means(&self.tables);
        for (was, mean) in self.was[e * PADS..].iter_mut().zip(means) {
            *was = mean[0];
        }
    }
}

impl Column {
    /// Puts guides around or into the column.
    pub fn with_guides(mut self, walls: Vec<Wall>) -> Self {
        self.leaning = (!walls.is_empty()).then(|| Leaning::new(walls, &self.elements));
        self
    }

    /// The same column, searching for its contacts with the weight `factor` times the usual one.
    pub fn with_search(mut self, factor: f64) -> Self {
        if let Some(leaning) = &mut self.leaning {
            leaning.search = SEARCH * factor;
        }
        self
    }

    /// Whether it has guides.
    pub fn is_guided(&self) -> bool {
        self.leaning.is_some()
    }

    /// Where it leans at a state, from bottom to top.
    pub fn contacts(&self, state: &ColumnState, out: &mut Vec<Contact>) {
        out.clear();
        let Some(leaning) = &self.leaning else { return };
        let top = self.top_seat(state);
        let width = 1.0 / (self.elements.len() * PADS) as f64;
        for (e, element) in self.elements.iter().enumerate() {
            let jumps = Leaning::jumps(&state.side, e);
            if jumps.iter().all(|j| j[1] == 0.0) {
                continue;
            }
            let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
            let held = Held {
                element,
                laws: &leaning.laws[e],
                a: &a,
                b: &b,
                inner: &state.inner[e],
                jumps,
            };
            let means = held.means(&leaning.tables);
            let was = &leaning.was[e * PADS..(e + 1) * PADS];
            let pads = decide(
                &leaning.walls,
                &top,
                &held,
                &means,
                was,
                leaning.search,
                leaning.symmetric,
            );
            for (k, pad) in pads.iter().enumerate() {
                let Pad::Leans { side, facing, .. } = pad else {
                    continue;
                };
                let slope = facing.axis_slope + side * facing.widening;
                out.push(Contact {
                    place: ((e * PADS + k) as f64 + 0.5) * width,
                    width,
                    side: *side,
                    push: side * jumps[k][1],
                    // The jump of the force is the force on the column, reversed.
                    drag: -(jumps[k][0] + slope * jumps[k][1]),
                    at_corner: facing.at_corner,
                });
            }
        }
    }

    /// Room between the axis at (x, y) and the nearest guide, negative inside it, with the axial
    /// force there; ∞ where there is none.
    pub fn room(&self, state: &ColumnState, x: f64, y: f64, force: f64) -> f64 {
        let Some(leaning) = &self.leaning else {
            return f64::INFINITY;
        };
        let top = self.top_seat(state);
        let compliance = self.elements[0].points[0].axial_compliance;
        leaning
            .walls
            .iter()
            .filter_map(|wall| wall.face(x, force, compliance, &top))
            .map(|facing| facing.clearance - (y - facing.axis).abs())
            .fold(f64::INFINITY, f64::min)
    }
}
