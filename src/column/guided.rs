//! The guides of a column: which elements lean on them, and what passes through the contact.

use super::element::{Element, INNER, PointLaw};
use super::layout::{Column, ColumnState};
use super::lean::{Held, PADS, PadTables};
use super::pads::{Condensed, PAD_UNKNOWNS, Pad, decide};
use super::profile::{Peak, Station};
use super::seat::Touch;
use super::wall::{TopSeat, Wall};
use crate::solve::{Assembled, System};
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
            eased: false,
            one_at_a_time: false,
            turn: None,
            farthest: 0.0,
            forced: false,
            changed: false,
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
        let before = std::mem::replace(&mut self.pads[e], [Pad::Away; PADS]);
        if self.eased || !self.is_near(top, &held) {
            self.changed |= before != [Pad::Away; PADS];
            return false;
        }
        let means = held.means(&self.tables);
        let pads = if self.one_at_a_time {
            std::array::from_fn(|k| match self.turn {
                Some((at, pad)) if at == e * PADS + k => pad,
                _ => before[k].kept(&self.walls, top, &held, means[k]),
            })
        } else {
            self.decide(top, &held, &means, e).map(|decided| decided.0)
        };
        self.changed |= pads
            .iter()
            .zip(&before)
            .any(|(pad, before)| pad.differs(before));
        let was = &self.was[e * PADS..(e + 1) * PADS];
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

    /// Chooses, of the pads of an element that should do something else than they did, the one that is
    /// farthest from right, if it is farther than those chosen before.
    pub(super) fn choose(&mut self, e: usize, top: &TopSeat, held: &Held<'_>) {
        if !self.is_near(top, held) {
            return;
        }
        let means = held.means(&self.tables);
        let decided = self.decide(top, held, &means, e);
        for (k, (pad, by)) in decided.into_iter().enumerate() {
            if pad.differs(&self.pads[e][k]) && by > self.farthest {
                self.farthest = by;
                self.turn = Some((e * PADS + k, pad));
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

    fn decide(
        &self,
        top: &TopSeat,
        held: &Held<'_>,
        means: &[[f64; 2]; PADS],
        e: usize,
    ) -> [(Pad, f64); PADS] {
        let was = &self.was[e * PADS..(e + 1) * PADS];
        decide(
            &self.walls,
            top,
            held,
            means,
            was,
            self.search,
            self.symmetric,
        )
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
            let pads = leaning.decide(&top, &held, &means, e);
            for (k, (pad, _)) in pads.iter().enumerate() {
                let Pad::Leans { side, facing, .. } = pad else {
                    continue;
                };
                if jumps[k][1] == 0.0 {
                    continue;
                }
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

    /// The tightest place between the axis and the guides, of all or of those that may not be
    /// touched: its place and the room there, negative inside a guide; `None` where there is no guide
    /// beside the column. `stations` are those of [`Column::profile`] at this state.
    pub fn tightest(
        &self,
        state: &ColumnState,
        stations: &[Station],
        forbidden_only: bool,
    ) -> Option<Peak> {
        let leaning = self.leaning.as_ref()?;
        let top = self.top_seat(state);
        let compliance = self.elements[0].points[0].axial_compliance;
        let walls = leaning
            .walls
            .iter()
            .filter(|wall| !(forbidden_only && wall.may_touch));
        let depth = walls
            .flat_map(|wall| [(wall, 1.0), (wall, -1.0)])
            .map(|(wall, side)| {
                Peak::of(stations.iter().filter_map(|s| {
                    // F_x, as the growth of the coil has it.
                    let force = s.axial_force * s.angle.cos() - s.shear_force * s.angle.sin();
                    let facing = wall.face(s.x, force, compliance, &top)?;
                    let depth = side * (s.y - facing.axis) - facing.clearance;
                    let slope = side * (s.y_slope - facing.axis_slope * s.x_slope)
                        - facing.widening * s.x_slope;
                    Some((s.place, depth, slope))
                }))
            })
            .max_by(|a, b| a.value.total_cmp(&b.value))?;
        depth.value.is_finite().then_some(Peak {
            place: depth.place,
            value: -depth.value,
        })
    }

    /// Work of the friction on guides and swivels from one state to the next, in units of force ×
    /// length; negative: it takes energy.
    pub fn friction_work(&self, from: &ColumnState, to: &ColumnState) -> f64 {
        let last = self.elements.len();
        let mut work = 0.0;
        for (which, seat) in self.seats.iter().enumerate() {
            if let Touch::Swivel { .. } = seat.touch {
                let turn = to.nodes[which * last][2] - from.nodes[which * last][2];
                let moment = |state| self.end_actions(state)[which][2];
                work += 0.5 * (moment(from) + moment(to)) * turn;
            }
        }
        let Some(leaning) = &self.leaning else {
            return work;
        };
        if leaning.symmetric {
            return work;
        }
        let tops = [self.top_seat(from), self.top_seat(to)];
        for e in 0..last {
            let drags = [from, to].map(|state| Leaning::jumps(&state.side, e));
            if drags == [[[0.0; 2]; PADS]; 2] {
                continue;
            }
            let both = [(from, &tops[0]), (to, &tops[1])].map(|(state, top)| {
                let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
                let held = Held {
                    element: &self.elements[e],
                    laws: &leaning.laws[e],
                    a: &a,
                    b: &b,
                    inner: &state.inner[e],
                    jumps: Leaning::jumps(&state.side, e),
                };
                let means = held.means(&leaning.tables);
                let pads = leaning.decide(top, &held, &means, e);
                (means, pads)
            });
            for k in 0..PADS {
                let drag = |i: usize| match &both[i].1[k].0 {
                    Pad::Leans { side, facing, .. } => {
                        let slope = facing.axis_slope + side * facing.widening;
                        let rides = if facing.from_top { tops[i].x } else { 0.0 };
                        (-(drags[i][k][0] + slope * drags[i][k][1]), Some(rides))
                    }
                    _ => (0.0, None),
                };
                let ((before, ride), (after, ride_after)) = (drag(0), drag(1));
                let carried = match (ride, ride_after) {
                    (Some(before), Some(after)) => after - before,
                    _ => 0.0,
                };
                let moved = both[1].0[k][0] - both[0].0[k][0] - carried;
                work += 0.5 * (before + after) * moved;
            }
        }
        work
    }

    /// Whether friction acts on it.
    pub fn has_friction(&self) -> bool {
        !self.is_symmetric()
            && (self
                .seats
                .iter()
                .any(|seat| matches!(seat.touch, Touch::Swivel { .. }))
                || self
                    .leaning
                    .as_ref()
                    .is_some_and(|leaning| leaning.walls.iter().any(|wall| wall.friction > 0.0)))
    }

    /// Wave number q, in 1/L, of the waves into which the straight column bends freely under an axial
    /// force: `q² = P (a + b)/EI`, a = 1 − P/EA, b = P/GA. A part of length ℓ that lies flat on a wall,
    /// its ends held in place and slope, buckles away from it at `q ℓ = 2π`.
    pub fn wave_number(&self, force: f64) -> f64 {
        let law = &self.elements[0].points[0];
        let open = 1.0 + force * (law.shear_compliance - law.axial_compliance);
        (force * open / law.bending).max(0.0).sqrt()
    }
}
