//! The column as a system to be solved: elements condensed and chained, ends held.

use super::element::INNER;
use super::ends::{End, Turning};
use super::guided::Leaning;
use super::layout::{Column, ColumnState, Hold};
use super::lean::Held;
use super::pads::PAD_UNKNOWNS;
use super::seat::{Seat, Touch};
use super::wall::TopSeat;
use crate::solve::{Assembled, SymmetricFactor, System};
use nalgebra::{Matrix3, SVector, Vector3};
use nalgebra_sparse::{CooMatrix, CscMatrix};

/// Negative eigenvalues of an element's inner matrix in every stable state: its two forces,
/// multipliers of the geometry.
const ALWAYS_NEGATIVE: i64 = 2;

/// How far along a path it is looked whether its seats stay as they are.
const LOOK_AHEAD: f64 = 1e-6;

/// Iterations in which all pads may change what they do at once.
const ALL_AT_ONCE: usize = 8;

impl System<3, INNER> for Column {
    fn links(&self) -> usize {
        self.elements.len()
    }

    fn side(&self) -> usize {
        if self.leaning.is_some() {
            self.elements.len() * PAD_UNKNOWNS
        } else {
            0
        }
    }

    fn is_symmetric(&self) -> bool {
        let swivel = |seat: &Seat| matches!(seat.touch, Touch::Swivel { .. });
        self.leaning
            .as_ref()
            .is_none_or(|leaning| leaning.symmetric)
            && !self.seats.iter().any(swivel)
    }

    fn has_kinks(&self) -> bool {
        self.leaning.is_some()
            || self
                .seats
                .iter()
                .any(|seat| matches!(seat.touch, Touch::Flat { .. } | Touch::Swivel { .. }))
    }

    fn iterating(&mut self, iteration: usize) {
        if let Some(leaning) = &mut self.leaning {
            leaning.one_at_a_time = leaning.is_forced() || iteration > ALL_AT_ONCE;
        }
    }

    fn changed(&self) -> bool {
        self.seats_changed || self.leaning.as_ref().is_some_and(|leaning| leaning.changed)
    }

    fn regime(&self) -> u64 {
        let seats = u64::from(self.turned_how[0]) * 8 + u64::from(self.turned_how[1]);
        self.leaning
            .as_ref()
            .map_or(seats, |leaning| leaning.regime(seats))
    }

    fn pass_kink(&mut self, state: &ColumnState, beyond: &ColumnState) -> Option<f64> {
        if let Some(share) = self.pass_seat_kinks(state, beyond) {
            return Some(share);
        }
        let ends = [self.end(beyond, 0), self.end(beyond, 1)];
        let top = self.top_seat(beyond);
        let mut leaning = self.leaning.take()?;
        leaning.begin();
        self.choose(&mut leaning, beyond, &ends, &top);
        let passed = leaning.force_turn();
        self.leaning = Some(leaning);
        // Pads are turned where the path has come to: the kink is nearer than what it is followed by.
        passed.then_some(0.0)
    }

    fn leads_on(&self, state: &ColumnState, direction: &ColumnState) -> Option<bool> {
        let ahead = |way: f64| {
            let mut state = state.clone();
            state.add(way * LOOK_AHEAD, direction);
            self.seats_stay(&state)
        };
        match [ahead(1.0)?, ahead(-1.0)?] {
            [true, false] => Some(true),
            [false, true] => Some(false),
            _ => None,
        }
    }

    fn ease(&mut self, share: Option<f64>, state: &ColumnState) {
        let Some(mut leaning) = self.leaning.take() else {
            return;
        };
        let entered = share.unwrap_or(0.0);
        leaning.smooth = share.is_some();
        leaning.eased = entered >= 1.0;
        let deepest = if entered < 1.0 && entered > 0.0 {
            leaning.deepest(state, &self.top_seat(state))
        } else {
            0.0
        };
        leaning.slack = entered * deepest;
        self.leaning = Some(leaning);
    }

    fn depart(&mut self, state: &ColumnState) {
        let last = self.elements.len();
        self.end_was = [state.nodes[0][2], state.nodes[last][2]];
        self.standing = [None; 2];
        let Some(mut leaning) = self.leaning.take_if(|leaning| !leaning.symmetric) else {
            return;
        };
        let top = self.top_seat(state);
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
            let laws = leaning.laws[e];
            let mut held = Held {
                element,
                laws: &laws,
                a: &a,
                b: &b,
                inner: &state.inner[e],
                jumps: Leaning::jumps(&state.side, e),
                corner: None,
            };
            leaning.depart(e, &top, &state.side, &mut held);
        }
        self.leaning = Some(leaning);
    }

    fn assemble(&mut self, state: &ColumnState, load: f64, out: &mut Assembled<3>) {
        let last = self.elements.len();
        let symmetric = self.is_symmetric();
        out.inner_negatives = if symmetric {
            -ALWAYS_NEGATIVE * last as i64
        } else {
            0
        };
        out.residual.fill(Vector3::zeros());
        out.tangent.diagonal.fill(Matrix3::zeros());
        let ends = [self.end(state, 0), self.end(state, 1)];
        let top = self.top_seat(state);
        let mut leaning = self.leaning.take();
        if let Some(leaning) = &mut leaning {
            leaning.begin();
            if leaning.one_at_a_time && !leaning.is_forced() {
                self.choose(leaning, state, &ends, &top);
            }
        }
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b) = self.element_poses(state, &ends, e);
            let inner = &state.inner[e];
            if let Some(leaning) = &mut leaning {
                let laws = leaning.laws[e];
                let held = Held {
                    element,
                    laws: &laws,
                    a,
                    b,
                    inner,
                    jumps: Leaning::jumps(&state.side, e),
                    corner: None,
                };
                if leaning.assemble(&self.tables, e, &top, held, &state.side, out) {
                    if symmetric {
                        out.inner_negatives += ALWAYS_NEGATIVE;
                    }
                    continue;
                }
            }
            let forms = element.forms(&self.tables, a, b, inner);
            let factor = SymmetricFactor::new(&forms.inner_matrix());
            out.inner_negatives += i64::from(factor.negatives);
            let right = forms.inner_right();
            let mut answers = right;
            factor.solve_rows(&mut answers);
            let taken = |row: usize, other: usize| -> f64 {
                (0..INNER)
                    .map(|k| right[(row, k)] * answers[(other, k)])
                    .sum()
            };
            // Rows of `right` for the differences of position have a single entry, 1.
            let (xx, xy, yy) = (answers[(0, 3)], answers[(0, 4)], answers[(1, 4)]);
            let (xa, ya) = (answers[(2, 3)], answers[(2, 4)]);
            let (xb, yb) = (answers[(3, 3)], answers[(3, 4)]);
            let (fx, fy) = (inner[3] - answers[(4, 3)], inner[4] - answers[(4, 4)]);
            let aa = forms.bending[0][0] - taken(2, 2);
            let ab = forms.bending[1][0] - taken(2, 3);
            let bb = forms.bending[1][1] - taken(3, 3);
            out.residual[e] += Vector3::new(-fx, -fy, forms.moment[0] - taken(2, 4));
            out.residual[e + 1] += Vector3::new(fx, fy, forms.moment[1] - taken(3, 4));
            out.tangent.diagonal[e] += Matrix3::new(-xx, -xy, xa, -xy, -yy, ya, xa, ya, aa);
            out.tangent.diagonal[e + 1] += Matrix3::new(-xx, -xy, -xb, -xy, -yy, -yb, -xb, -yb, bb);
            out.tangent.right[e] = Matrix3::new(xx, xy, xb, xy, yy, yb, -xa, -ya, ab);
            if let Some(left) = out.tangent.left.get_mut(e) {
                *left = out.tangent.right[e].transpose();
            }
            self.inner_answers[e] = answers;
        }
        if let Some(leaning) = &mut leaning {
            leaning.end();
        }
        self.leaning = leaning;
        self.seats_changed = false;
        self.sits = [false; 2];
        for (which, end) in ends.iter().enumerate() {
            end.seat_on(which * last, out);
            self.end_turns[which] = end.pose.by;
            self.seats_changed |= end.standing != self.standing[which];
            self.standing[which] = end.standing;
            self.turns_over[which] = None;
            self.turned_how[which] = end.turning.number(end.standing);
        }
        for (residual, pattern) in out.residual.iter_mut().zip(&self.pattern) {
            *residual -= pattern * load;
        }
        for (which, laws) in [&self.bottom, &self.top].iter().enumerate() {
            for (k, hold) in laws.0.iter().enumerate() {
                let hold = match (k, ends[which].turning) {
                    (2, Turning::Stands) => Hold::Free,
                    (2, Turning::HeldAt(angle)) => Hold::Held(angle),
                    _ => *hold,
                };
                hold_unknown(&hold, which * last, k, state, out);
            }
        }
    }

    fn load_pattern(&self) -> &[Vector3<f64>] {
        &self.pattern
    }

    fn recover(&self, step: &mut ColumnState, with_residual: bool) {
        let last = self.elements.len();
        let residual = if with_residual { 1.0 } else { 0.0 };
        for e in 0..last {
            let mut a = step.nodes[e];
            let mut b = step.nodes[e + 1];
            if e == 0 {
                a = self.end_turns[0] * a;
            }
            if e + 1 == last {
                b = self.end_turns[1] * b;
            }
            if let Some(leaning) = &self.leaning
                && leaning.recover(e, &a, &b, residual, &mut step.inner[e], &mut step.side)
            {
                continue;
            }
            let outer = SVector::from([b[0] - a[0], b[1] - a[1], a[2], b[2], residual]);
            step.inner[e] = -self.inner_answers[e].tr_mul(&outer);
        }
    }

    fn load_scale(&self) -> f64 {
        self.load_scale
    }
}

impl Column {
    /// Poses of the ends of an element.
    fn element_poses<'a>(
        &self,
        state: &'a ColumnState,
        ends: &'a [End; 2],
        e: usize,
    ) -> (&'a Vector3<f64>, &'a Vector3<f64>) {
        let last = self.elements.len();
        let at = |node: usize| match node {
            0 => &ends[0].pose.at,
            n if n == last => &ends[1].pose.at,
            n => &state.nodes[n],
        };
        (at(e), at(e + 1))
    }

    /// Lets the guides choose the pad that is farthest from right at a state.
    fn choose(&self, leaning: &mut Leaning, state: &ColumnState, ends: &[End; 2], top: &TopSeat) {
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b) = self.element_poses(state, ends, e);
            let laws = leaning.laws[e];
            let mut held = Held {
                element,
                laws: &laws,
                a,
                b,
                inner: &state.inner[e],
                jumps: Leaning::jumps(&state.side, e),
                corner: None,
            };
            leaning.choose(e, top, &state.side, &mut held);
        }
    }
}

/// Adds the law of one unknown of an end: elastic ones to residual and tangent; a held unknown
/// becomes an identity row that keeps its value.
fn hold_unknown(hold: &Hold, node: usize, k: usize, state: &ColumnState, out: &mut Assembled<3>) {
    match *hold {
        Hold::Free => {}
        Hold::Elastic { .. } | Hold::Curved { .. } => {
            if let Some((force, stiffness)) = hold.law(state.nodes[node][k]) {
                out.residual[node][k] += force;
                out.tangent.diagonal[node][(k, k)] += stiffness;
            }
        }
        Hold::Held(value) => {
            let off = state.nodes[node][k] - value;
            let tangent = &mut out.tangent;
            // What the others see of the step back to the value.
            let column = tangent.diagonal[node].column(k) * off;
            out.residual[node] -= column;
            let other = if node == 0 { 1 } else { node - 1 };
            let link = node.min(other);
            let across = if node == 0 {
                match tangent.left.get(link) {
                    Some(left) => left.column(k) * off,
                    None => tangent.right[link].row(k).transpose() * off,
                }
            } else {
                tangent.right[link].column(k) * off
            };
            out.residual[other] -= across;
            out.residual[node][k] = off;
            for j in 0..3 {
                tangent.diagonal[node][(k, j)] = 0.0;
                tangent.diagonal[node][(j, k)] = 0.0;
                if node == 0 {
                    tangent.right[link][(k, j)] = 0.0;
                    if let Some(left) = tangent.left.get_mut(link) {
                        left[(j, k)] = 0.0;
                    }
                } else {
                    tangent.right[link][(j, k)] = 0.0;
                    if let Some(left) = tangent.left.get_mut(link) {
                        left[(k, j)] = 0.0;
                    }
                }
            }
            tangent.diagonal[node][(k, k)] = 1.0;
        }
    }
}

impl Column {
    /// The uncondensed tangent at a state, order node 0 (x, y, θ), element 0 (c_1, c_2, c_3, F_x,
    /// F_y), node 1, …: 8 rows an element and 3 more. Held rows and columns are the identity's. For
    /// checks against general solvers, and to hand the matrix out.
    pub fn uncondensed(&self, state: &ColumnState) -> CscMatrix<f64> {
        let n = self.elements.len();
        let size = 8 * n + 3;
        let mut held = vec![false; size];
        let mut matrix = CooMatrix::new(size, size);
        for (first, laws) in [(0, &self.bottom), (8 * n, &self.top)] {
            for (k, hold) in laws.0.iter().enumerate() {
                match *hold {
                    Hold::Free => {}
                    Hold::Elastic { .. } | Hold::Curved { .. } => {
                        let node = if first == 0 { 0 } else { n };
                        if let Some((_, stiffness)) = hold.law(state.nodes[node][k]) {
                            matrix.push(first + k, first + k, stiffness);
                        }
                    }
                    Hold::Held(_) => {
                        held[first + k] = true;
                        matrix.push(first + k, first + k, 1.0);
                    }
                }
            }
        }
        let mut add = |row: usize, column: usize, value: f64| {
            if !held[row] && !held[column] {
                matrix.push(row, column, value);
            }
        };
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b, inner) = (&state.nodes[e], &state.nodes[e + 1], &state.inner[e]);
            let forms = element.forms(&self.tables, a, b, inner);
            let base = 8 * e;
            // Rows of the rotations [θ_A, θ_B, c_1, c_2, c_3] and of the forces.
            let turns = [base + 2, base + 10, base + 3, base + 4, base + 5];
            let forces = [base + 6, base + 7];
            for (i, row) in turns.iter().enumerate() {
                for (j, column) in turns.iter().enumerate() {
                    add(*row, *column, forms.bending[i.max(j)][i.min(j)]);
                }
                for (axis, column) in forces.iter().enumerate() {
                    add(*row, *column, forms.coupling[i][axis]);
                    add(*column, *row, forms.coupling[i][axis]);
                }
            }
            for (i, row) in forces.iter().enumerate() {
                for (j, column) in forces.iter().enumerate() {
                    add(*row, *column, forms.compliance[i + j]);
                }
                for (place, sign) in [(base + i, -1.0), (base + 8 + i, 1.0)] {
                    add(*row, place, sign);
                    add(place, *row, sign);
                }
            }
        }
        CscMatrix::from(&matrix)
    }
}
