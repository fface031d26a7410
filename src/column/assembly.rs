//! The column as a system to be solved: elements condensed and chained, ends held.

use super::element::{ElementForms, INNER};
use super::guided::Leaning;
use super::layout::{Column, ColumnState, Hold};
use super::lean::{Held, PAD_UNKNOWNS, PADS};
use super::seat::{Pose, Seat, Touch};
use super::wall::TopSeat;
use crate::solve::{Assembled, SymmetricFactor, System};
use nalgebra::{Matrix3, SVector, Vector3};
use nalgebra_sparse::{CooMatrix, CscMatrix};

/// Negative eigenvalues of an element's inner matrix in every stable state: its two forces,
/// multipliers of the geometry.
const ALWAYS_NEGATIVE: i64 = 2;
/// Weight of a rotation against a moment in the search for which way a swivel turns, EI/L.
const SWIVEL_SEARCH: f64 = 1e2;

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

    fn depart(&mut self, state: &ColumnState) {
        let last = self.elements.len();
        self.end_was = [state.nodes[0][2], state.nodes[last][2]];
        for which in 0..2 {
            let turned = self.turned(state, which);
            self.standing[which] = match self.seats[which].touch {
                Touch::Flat { .. } if turned != 0.0 => Some(self.seats[which].edge_side(turned)),
                _ => None,
            };
        }
        let Some(mut leaning) = self.leaning.take_if(|leaning| !leaning.symmetric) else {
            return;
        };
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
            let laws = leaning.laws[e];
            let held = Held {
                element,
                laws: &laws,
                a: &a,
                b: &b,
                inner: &state.inner[e],
                jumps: Leaning::jumps(&state.side, e),
            };
            leaning.depart(e, &held);
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
        for (e, element) in self.elements.iter().enumerate() {
            let a = if e == 0 {
                &ends[0].pose.at
            } else {
                &state.nodes[e]
            };
            let b = if e + 1 == last {
                &ends[1].pose.at
            } else {
                &state.nodes[e + 1]
            };
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
        self.leaning = leaning;
        for (which, end) in ends.iter().enumerate() {
            end.seat_on(which * last, out);
            self.end_turns[which] = end.pose.by;
            self.standing[which] = end.standing;
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

/// How an end presses on its seat, in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SeatPress {
    /// Force across the seat; pressing positive.
    pub press: f64,
    /// Force of the seat on the end along the seat, towards +y.
    pub thrust: f64,
    /// Where the force line passes the seat plane, from its centre towards +y.
    pub line: f64,
    /// Rotation of a flat end out of its seat, rad; 0 where it is flush.
    pub turned: f64,
}

/// An end at a state: where it is, and what its seat makes of its rotation.
struct End {
    pose: Pose,
    /// What the column does to it: F_x, F_y, M (internal, as in the residual).
    actions: Vector3<f64>,
    turning: Turning,
    /// The edge it stands on, if it does.
    standing: Option<f64>,
}

/// What a seat makes of the rotation of an end.
#[derive(Clone, Copy)]
enum Turning {
    /// What its law says.
    ByLaw,
    /// It stands on an edge, free to turn about it.
    Stands,
    /// It is held at an angle.
    HeldAt(f64),
    /// It turns against friction: `factor` times |F_x| resists.
    Drags { factor: f64 },
}

impl Column {
    /// The pose of a node.
    pub(super) fn pose_at(&self, state: &ColumnState, node: usize) -> Vector3<f64> {
        let last = self.elements.len();
        let which = usize::from(node == last);
        if (node != 0 && node != last) || self.seats[which].is_plain() {
            return state.nodes[node];
        }
        let q = &state.nodes[node];
        let seat = &self.seats[which];
        let turned = self.turned(state, which);
        seat.pose(q, (turned != 0.0).then(|| (turned, seat.edge_side(turned))))
            .at
    }

    /// How far an end is turned from where its law has it at rest.
    fn turned(&self, state: &ColumnState, which: usize) -> f64 {
        let node = which * self.elements.len();
        let laws = if which == 0 { &self.bottom } else { &self.top };
        match laws.0[2] {
            Hold::Held(rest) => state.nodes[node][2] - rest,
            _ => 0.0,
        }
    }

    /// Where the top seat is.
    pub(super) fn top_seat(&self, state: &ColumnState) -> TopSeat {
        let x = state.nodes[self.elements.len()][0];
        let (y, slope) = self.seats[1].stands(x);
        TopSeat { x, y, slope }
    }

    /// The end's pose, what the column does to it, and how its seat answers.
    fn end(&self, state: &ColumnState, which: usize) -> End {
        let last = self.elements.len();
        let seat = &self.seats[which];
        let q = &state.nodes[which * last];
        let mut end = End {
            pose: seat.pose(q, None),
            actions: Vector3::zeros(),
            turning: Turning::ByLaw,
            standing: None,
        };
        if matches!(seat.touch, Touch::Joined) && seat.motion.is_none() {
            return end;
        }
        let turned = self.turned(state, which);
        if let Some(side) = self.standing[which] {
            end.pose = seat.pose(q, Some((turned, side)));
        }
        end.actions = self.actions_on(state, which, &end.pose.at);
        match seat.touch {
            Touch::Flat { .. } => self.flat(state, which, turned, &mut end),
            Touch::Swivel { reach } => {
                let (moment, force) = (end.actions[2], end.actions[0]);
                let holds = reach * force.abs();
                let moved = q[2] - self.end_was[which];
                let trial = SWIVEL_SEARCH * moved - moment;
                end.turning = if trial.abs() <= holds * (1.0 + 1e-9) && holds > 0.0 {
                    Turning::HeldAt(self.end_was[which])
                } else {
                    Turning::Drags {
                        factor: trial.signum() * reach * force.signum(),
                    }
                };
            }
            _ => {}
        }
        end
    }

    /// A flat end: flush, or standing on an edge.
    fn flat(&self, state: &ColumnState, which: usize, turned: f64, end: &mut End) {
        let seat = &self.seats[which];
        let q = &state.nodes[which * self.elements.len()];
        if let Some(side) = self.standing[which] {
            if seat.edge_side(turned) == side {
                end.turning = Turning::Stands;
                end.standing = Some(side);
            } else {
                // Turned through flush: it sits down.
                end.turning = Turning::HeldAt(q[2] - turned);
            }
            return;
        }
        for side in [1.0, -1.0] {
            let pose = seat.pose(q, Some((turned, side)));
            // Moment that the seat can oppose on this edge, and which way it would turn the end.
            let most = -(pose.by[(0, 2)] * end.actions[0] + pose.by[(1, 2)] * end.actions[1]);
            let way = if which == 0 { -side } else { side };
            if end.actions[2] * way > (most * way).max(0.0) * (1.0 + 1e-12) {
                end.pose = pose;
                end.turning = Turning::Stands;
                end.standing = Some(side);
            }
        }
    }

    /// What the column does to an end that is at `pose`: F_x, F_y and M of the residual.
    fn actions_on(&self, state: &ColumnState, which: usize, pose: &Vector3<f64>) -> Vector3<f64> {
        let last = self.elements.len();
        let (e, node) = if which == 0 {
            (0, 1)
        } else {
            (last - 1, last - 1)
        };
        let other = if last == 1 {
            self.pose_at(state, 1 - which)
        } else {
            state.nodes[node]
        };
        let (a, b) = if which == 0 {
            (pose, &other)
        } else {
            (&other, pose)
        };
        let (force, moments) = self.element_ends(state, e, a, b);
        if which == 0 {
            Vector3::new(-force[0][0], -force[0][1], moments[0])
        } else {
            Vector3::new(force[1][0], force[1][1], moments[1])
        }
    }

    /// Force at both ends of an element and its two end moments.
    fn element_ends(
        &self,
        state: &ColumnState,
        e: usize,
        a: &Vector3<f64>,
        b: &Vector3<f64>,
    ) -> ([[f64; 2]; 2], [f64; 2]) {
        let (element, inner) = (&self.elements[e], &state.inner[e]);
        let force = [inner[3], inner[4]];
        if let Some(leaning) = &self.leaning {
            let jumps = Leaning::jumps(&state.side, e);
            if jumps != [[0.0; 2]; PADS] {
                let held = Held {
                    element,
                    laws: &leaning.laws[e],
                    a,
                    b,
                    inner,
                    jumps,
                };
                let forms = held
                    .forms(&self.tables, &leaning.tables, [false; PADS])
                    .forms;
                return (
                    [force, held.end_force()],
                    [forms.moment[0], forms.moment[1]],
                );
            }
        }
        let forms: ElementForms = element.forms(&self.tables, a, b, inner);
        ([force, force], [forms.moment[0], forms.moment[1]])
    }
}

impl End {
    /// Takes the rows and columns of the node from the pose to the seat's unknowns, equation (6) of
    /// [`super::seat`], and lets friction act.
    fn seat_on(&self, node: usize, out: &mut Assembled<3>) {
        let tangent = &mut out.tangent;
        if !self.pose.is_plain() {
            let by = &self.pose.by;
            out.residual[node] = by.tr_mul(&out.residual[node]);
            tangent.diagonal[node] =
                by.tr_mul(&(tangent.diagonal[node] * by)) + self.pose.curving(&self.actions);
            if node == 0 {
                tangent.right[0] = by.tr_mul(&tangent.right[0]);
                if let Some(left) = tangent.left.get_mut(0) {
                    *left *= by;
                }
            } else {
                tangent.right[node - 1] *= by;
                if let Some(left) = tangent.left.get_mut(node - 1) {
                    *left = by.tr_mul(left);
                }
            }
        }
        if let Turning::Drags { factor } = self.turning {
            let push = out.residual[node][0];
            out.residual[node][2] += factor * push;
            let add = |block: &mut Matrix3<f64>| {
                let row = block.row(0) * factor;
                for (k, value) in row.iter().enumerate() {
                    block[(2, k)] += value;
                }
            };
            add(&mut tangent.diagonal[node]);
            if node == 0 {
                add(&mut tangent.right[0]);
            } else if let Some(left) = tangent.left.get_mut(node - 1) {
                add(left);
            }
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
    /// Force and moment that the ends of the column get from outside at `state`, in the column's
    /// units: bottom and top (F_x, F_y, M), load included. They balance.
    pub fn end_actions(&self, state: &ColumnState) -> [Vector3<f64>; 2] {
        let last = self.elements.len();
        let [bottom, top] =
            [0, 1].map(|which| self.actions_on(state, which, &self.pose_at(state, which * last)));
        [bottom, top]
    }

    /// How an end, 0 the bottom one, presses on its seat.
    pub fn seat_press(&self, state: &ColumnState, which: usize) -> SeatPress {
        let node = which * self.elements.len();
        let seat = &self.seats[which];
        let at = self.pose_at(state, node);
        let actions = self.actions_on(state, which, &at);
        let x = state.nodes[node][0];
        let (press, thrust) = seat.pressed(x, [actions[0], actions[1]]);
        // About the seat's centre, from that of the end.
        let centre = match seat.touch {
            Touch::Flat { .. } => seat.pose(&state.nodes[node], None).at,
            _ => at,
        };
        let moment =
            actions[2] + (at[0] - centre[0]) * actions[1] - (at[1] - centre[1]) * actions[0];
        let sense = if seat.at_top { 1.0 } else { -1.0 };
        let turned = match seat.touch {
            Touch::Flat { .. } => self.turned(state, which),
            _ => 0.0,
        };
        SeatPress {
            press,
            thrust,
            line: sense * moment / press,
            turned,
        }
    }

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
