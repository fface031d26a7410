//! The guides of a column: which elements lean on them, and what they add to the chain.

use super::element::{Element, INNER, PointLaw};
use super::judge::{AtCorner, Judge};
use super::layout::{Column, ColumnState};
use super::lean::{Held, PADS, SLOTS};
use super::nodes::PadTables;
use super::pads::{Condensed, PAD_UNKNOWNS, Pad};
use super::wall::{TopSeat, Wall};
use crate::solve::Assembled;
use nalgebra::{SVector, Vector3};

/// Weight of a gap against a force in the search for what leans (see [`super::lean`]), in EI/L³: of
/// the size of forces over motions that occur. The answer does not depend on it.
const SEARCH: f64 = 1e3;

/// Force, EI/L², by which a pad's condition must be missed to count as missed.
const ROUND_OFF: f64 = 1e-10;

/// Guides and the contact of a column with them.
#[derive(Clone, Debug)]
pub struct Leaning {
    pub(super) walls: Vec<Wall>,
    pub(super) tables: PadTables,
    pub(super) laws: Vec<[PointLaw; 2 * PADS]>,
    pub(super) symmetric: bool,
    search: f64,
    pub(super) eased: bool,
    /// Whether friction is left out, at the beginning of a path.
    pub(super) smooth: bool,
    /// By how much all clearances are widened, at the beginning of a path.
    pub(super) slack: f64,
    /// Whether one pad changes at a time, the one that is farthest from right: late in an iteration,
    /// where the pads at the ends of a contact take turns.
    pub(super) one_at_a_time: bool,
    turn: Option<(usize, Pad)>,
    farthest: f64,
    /// Whether the turn is set from outside, for one assembly.
    forced: bool,
    /// Whether the last assembly changed what any pad does.
    pub(super) changed: bool,
    /// Where each pad was along x when the step began.
    pub(super) was: Vec<f64>,
    /// Where the corners of each wall were along the column then.
    corners_were: Vec<[Option<f64>; 2]>,
    /// Of the last assembly.
    pads: Vec<[Pad; SLOTS]>,
    condensed: Vec<Option<Condensed>>,
    /// From the pads' unknowns of the state to those it was assembled with.
    mended: Vec<[[f64; 2]; SLOTS]>,
}

/// The force on a corner in an element next to `e`.
fn neighbours(e: usize, side: &[f64]) -> [f64; 2] {
    let slot = |e: usize| {
        let first = e * PAD_UNKNOWNS + 2 * PADS;
        match side.get(first..first + 2) {
            Some(jump) => [jump[0], jump[1]],
            None => [0.0; 2],
        }
    };
    let before = e.checked_sub(1).map_or([0.0; 2], slot);
    if before == [0.0; 2] {
        slot(e + 1)
    } else {
        before
    }
}

impl Leaning {
    /// A state of an element.
    pub(super) fn held<'a>(
        &'a self,
        column: &'a Column,
        state: &'a ColumnState,
        a: &'a Vector3<f64>,
        b: &'a Vector3<f64>,
        e: usize,
    ) -> Held<'a> {
        Held {
            element: &column.elements[e],
            laws: &self.laws[e],
            a,
            b,
            inner: &state.inner[e],
            jumps: Leaning::jumps(&state.side, e),
            corner: None,
        }
    }

    /// The same with the corner found that lies in it.
    pub(super) fn held_with_corner<'a>(
        &'a self,
        column: &'a Column,
        state: &'a ColumnState,
        a: &'a Vector3<f64>,
        b: &'a Vector3<f64>,
        e: usize,
    ) -> Held<'a> {
        let mut held = self.held(column, state, a, b, e);
        if held.jumps[PADS] != [0.0; 2] {
            self.corner_in(e, &column.top_seat(state), &state.side, &mut held);
        }
        held
    }

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
            corners_were: vec![[None; 2]; walls.len()],
            walls,
            symmetric,
            search: SEARCH,
            eased: false,
            smooth: false,
            slack: 0.0,
            one_at_a_time: false,
            turn: None,
            farthest: 0.0,
            forced: false,
            changed: false,
            was: vec![0.0; elements.len() * SLOTS],
            pads: vec![[Pad::Away; SLOTS]; elements.len()],
            condensed: vec![None; elements.len()],
            mended: vec![[[0.0; 2]; SLOTS]; elements.len()],
        }
    }

    /// The jumps of the force over the pads of an element.
    pub(super) fn jumps(side: &[f64], e: usize) -> [[f64; 2]; SLOTS] {
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
        side: &[f64],
        out: &mut Assembled<3>,
    ) -> bool {
        self.condensed[e] = None;
        let before = std::mem::replace(&mut self.pads[e], [Pad::Away; SLOTS]);
        if self.eased || !self.is_near(top, &held) {
            self.changed |= before != [Pad::Away; SLOTS];
            return false;
        }
        let given = held.jumps;
        let corner = self.corner_in(e, top, side, &mut held);
        let means = held.means(&self.tables);
        let judge = self.judge(top);
        let were = &self.was[e * SLOTS..(e + 1) * SLOTS];
        let pads = if self.one_at_a_time {
            std::array::from_fn(|k| match self.turn {
                Some((at, pad)) if at == e * SLOTS + k => pad,
                _ => judge.kept(&before[k], k, &held, means[k], corner.as_ref()),
            })
        } else {
            judge
                .decide(&held, &means, were, corner.as_ref())
                .map(|decided| decided.0)
        };
        self.changed |= pads
            .iter()
            .zip(&before)
            .any(|(pad, before)| pad.differs(before));
        if pads == [Pad::Away; SLOTS] && given == [[0.0; 2]; SLOTS] {
            return false;
        }
        for (pad, jump) in pads.iter().zip(&mut held.jumps) {
            match pad {
                Pad::Away => *jump = [0.0; 2],
                Pad::Leans { facing, .. } if self.symmetric => {
                    jump[0] = -facing.slope * jump[1];
                }
                Pad::Leans { .. } => {}
            }
        }
        for k in 0..SLOTS {
            for axis in 0..2 {
                self.mended[e][k][axis] = held.jumps[k][axis] - given[k][axis];
            }
        }
        if pads[PADS] == Pad::Away {
            held.corner = None;
        }
        let marked = pads.map(|pad| pad != Pad::Away);
        let forms = held.forms(plain, &self.tables, marked);
        let forces = [[held.inner[3], held.inner[4]], held.end_force()];
        let brink = corner
            .zip(held.corner)
            .map(|(corner, t)| (held.brink(t), corner.strayed));
        let condensed = forms.condense(&pads, &held.jumps, were, forces, brink, self.symmetric);
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

    /// Chooses, of the pads of an element that should do something else than they did, the one that is
    /// farthest from right, if it is farther than those chosen before.
    pub(super) fn choose(&mut self, e: usize, top: &TopSeat, side: &[f64], held: &mut Held<'_>) {
        if !self.is_near(top, held) {
            return;
        }
        let corner = self.corner_in(e, top, side, held);
        let means = held.means(&self.tables);
        let were = &self.was[e * SLOTS..(e + 1) * SLOTS];
        let decided = self.judge(top).decide(held, &means, were, corner.as_ref());
        for (k, (pad, by)) in decided.into_iter().enumerate() {
            if pad.differs(&self.pads[e][k]) && by > self.farthest {
                self.farthest = by;
                self.turn = Some((e * SLOTS + k, pad));
            }
        }
    }

    /// Begins an assembly.
    pub(super) fn begin(&mut self) {
        self.changed = false;
        if !self.forced {
            self.farthest = ROUND_OFF;
            self.turn = None;
        }
    }

    /// Makes the chosen pad do what it should in the next assembly, all others what they do.
    pub(super) fn force_turn(&mut self) -> bool {
        self.forced = self.turn.is_some();
        self.one_at_a_time = self.forced;
        self.forced
    }

    /// Ends an assembly.
    pub(super) fn end(&mut self) {
        self.forced = false;
    }

    pub(super) fn is_forced(&self) -> bool {
        self.forced
    }

    pub(super) fn judge<'a>(&'a self, top: &'a TopSeat) -> Judge<'a> {
        Judge {
            walls: &self.walls,
            top,
            search: self.search,
            symmetric: self.symmetric,
            slack: self.slack,
            smooth: self.smooth,
        }
    }

    /// A number for what all pads did in the last assembly.
    pub(super) fn regime(&self, seed: u64) -> u64 {
        let mix = |sum: u64, value: u64| (sum ^ value).wrapping_mul(0x0000_0100_0000_01b3);
        let pads = self.pads.iter().flatten().enumerate();
        pads.fold(
            mix(0xcbf2_9ce4_8422_2325, seed),
            |sum, (place, pad)| match pad.number() {
                0 => sum,
                number => mix(mix(sum, place as u64), number),
            },
        )
    }

    /// How far the nodes at a state are inside a wall at most; 0 if none is.
    pub(super) fn deepest(&self, state: &ColumnState, top: &TopSeat) -> f64 {
        let walls = self.walls.iter();
        walls
            .flat_map(|wall| {
                state
                    .nodes
                    .iter()
                    .filter(|node| wall.covers(node[0], 0.0, top))
                    .map(|node| -wall.room(node[0], node[1], 0.0, 0.0, top))
            })
            .fold(0.0, f64::max)
    }

    /// The corner of a guide in an element; its place is put into `held`, and the force on it where
    /// it has just come over from a neighbour. `side` are the side unknowns of the state.
    pub(super) fn corner_in(
        &self,
        e: usize,
        top: &TopSeat,
        side: &[f64],
        held: &mut Held<'_>,
    ) -> Option<AtCorner> {
        if self.symmetric {
            return None;
        }
        let own = held.jumps[PADS];
        if own == [0.0; 2] {
            held.jumps[PADS] = neighbours(e, side);
        }
        let found = self.find_corner(e, top, held);
        if found.is_none() {
            held.jumps[PADS] = own;
        }
        found
    }

    fn find_corner(&self, e: usize, top: &TopSeat, held: &mut Held<'_>) -> Option<AtCorner> {
        let length = held.element.length;
        for (number, wall) in self.walls.iter().enumerate() {
            for (end, corner) in wall.corners(top).into_iter().enumerate() {
                let Some(x) = corner else { continue };
                if !held.passes(x) {
                    continue;
                }
                let t = held.find_place(&self.tables, x);
                let place = (e as f64 + 0.5 * (1.0 + t)) * length;
                let strayed = self.corners_were[number][end].map_or(0.0, |was| place - was);
                let brink = held.brink(t);
                return Some(AtCorner {
                    wall: number,
                    end,
                    place,
                    tilt: brink.mean[1] / brink.mean[0],
                    strayed,
                    moved: -strayed * brink.mean[0],
                });
            }
        }
        None
    }

    /// Remembers where every pad is, and every corner: what sticks, sticks there.
    pub(super) fn depart(&mut self, e: usize, top: &TopSeat, side: &[f64], held: &mut Held<'_>) {
        if e == 0 {
            self.corners_were.fill([None; 2]);
        }
        if let Some(corner) = self.corner_in(e, top, side, held) {
            self.corners_were[corner.wall][corner.end] = Some(corner.place);
        }
        let means = held.means(&self.tables);
        for (was, mean) in self.was[e * SLOTS..].iter_mut().zip(means) {
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
}
