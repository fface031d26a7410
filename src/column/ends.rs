//! The ends of a column at a state: where its seats put them, what they carry, and whether a flat end
//! is flush or on its edge, a swivel sticks or turns.

use super::element::ElementForms;
use super::guided::Leaning;
use super::layout::{Column, ColumnState, Hold};
use super::lean::SLOTS;
use super::seat::{Pose, Touch};
use super::wall::TopSeat;
use crate::solve::Assembled;
use nalgebra::Vector3;

/// Moment, EI/L, that is round-off: unloaded, a flat seat carries none at all.
const NO_MOMENT: f64 = 1e-12;
/// Rotation, rad, below which a flat end is flush: round-off.
const FLUSH: f64 = 1e-13;
/// Flat ends whose kinks lie as close together, as a share of the way looked ahead, pass at once.
const AT_ONCE: f64 = 2e-3;
/// Moment, EI/L, that is none: without a load a ball that is at rest sticks.
const AT_REST: f64 = 1e-12;
/// Weight of a rotation against a moment in the search for which way a swivel turns, EI/L.
const SWIVEL_SEARCH: f64 = 1e2;

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
    /// Rotation of the end, rad.
    pub angle: f64,
}

/// An end at a state: where it is, and what its seat makes of its rotation.
pub(super) struct End {
    pub pose: Pose,
    /// What the column does to it: F_x, F_y, M (internal, as in the residual).
    actions: Vector3<f64>,
    pub turning: Turning,
    /// The edge it stands on, if it does.
    pub standing: Option<f64>,
}

impl Turning {
    /// A number for it.
    pub fn number(self, standing: Option<f64>) -> u8 {
        match self {
            Turning::ByLaw => 0,
            Turning::Stands => 1 + u8::from(standing.is_some_and(|side| side > 0.0)),
            Turning::HeldAt(_) => 3,
            Turning::Drags { factor } => 4 + u8::from(factor > 0.0),
        }
    }
}

/// What an end does at a kink.
#[derive(Clone, Copy)]
enum SeatKink {
    /// A flat one stands up on an edge.
    Stands(f64),
    /// A flat one sits down.
    Sits,
    /// A swivel that stuck turns, against this factor times |F_x|.
    Turns(f64),
}

/// What a seat makes of the rotation of an end.
#[derive(Clone, Copy)]
pub(super) enum Turning {
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
    pub(super) fn turned(&self, state: &ColumnState, which: usize) -> f64 {
        let node = which * self.elements.len();
        let laws = if which == 0 { &self.bottom } else { &self.top };
        match laws.0[2] {
            Hold::Held(rest) => {
                let turned = state.nodes[node][2] - rest;
                if turned.abs() < FLUSH || self.sits[which] {
                    0.0
                } else {
                    turned
                }
            }
            _ => 0.0,
        }
    }

    /// The edge on which a flat end stands: the one it stood on, else the one it is turned to.
    fn side_of(&self, which: usize, turned: f64) -> Option<f64> {
        match self.seats[which].touch {
            Touch::Flat { .. } => self.standing[which]
                .or_else(|| (turned != 0.0).then(|| self.seats[which].edge_side(turned))),
            _ => None,
        }
    }

    /// Which flat ends, flush at `state` or standing, do the other before `beyond`, and which swivel that
    /// sticks turns there: from the next assembly
    /// on they do, at the share of the way that is given. Both only where both are there at once, as in a
    /// column that is its own mirror image: the path may turn, and what lies farther on along its old
    /// direction is not met then.
    pub(super) fn pass_seat_kinks(
        &mut self,
        state: &ColumnState,
        beyond: &ColumnState,
    ) -> Option<f64> {
        self.standing = [None; 2];
        self.standing = [0, 1].map(|which| self.side_of(which, self.turned(state, which)));
        let kinks = [0, 1].map(|which| self.seat_kink(which, state, beyond));
        self.passed = [false; 2];
        self.sits = [false; 2];
        let first = kinks
            .iter()
            .flatten()
            .map(|kink| kink.0)
            .min_by(f64::total_cmp)?;
        for (which, kink) in kinks.iter().enumerate() {
            match kink {
                Some((share, _)) if *share > first + AT_ONCE => {}
                Some((_, SeatKink::Stands(side))) => {
                    self.standing[which] = Some(*side);
                    self.passed[which] = true;
                }
                Some((_, SeatKink::Sits)) => {
                    self.standing[which] = None;
                    self.passed[which] = true;
                    self.sits[which] = true;
                }
                Some((_, SeatKink::Turns(factor))) => self.turns_over[which] = Some(*factor),
                None => {}
            }
        }
        Some(first)
    }

    /// Whether the flat ends that have just passed a kink are at `state` as they were left behind it;
    /// `None` where none has.
    pub(super) fn seats_stay(&self, state: &ColumnState) -> Option<bool> {
        let stays = |which: usize| {
            let end = self.end(state, which);
            end.standing == self.standing[which] && !matches!(end.turning, Turning::HeldAt(_))
        };
        let mut passed = (0..2).filter(|which| self.passed[*which]).peekable();
        passed.peek()?;
        Some(passed.all(stays))
    }

    /// What an end does between `state` and `beyond`, and at which share of the way.
    fn seat_kink(
        &self,
        which: usize,
        state: &ColumnState,
        beyond: &ColumnState,
    ) -> Option<(f64, SeatKink)> {
        if let Touch::Swivel { .. } = self.seats[which].touch {
            let before = self.end(state, which).turning;
            return match (before, self.end(beyond, which).turning) {
                (Turning::HeldAt(_), Turning::Drags { factor }) => {
                    Some((0.0, SeatKink::Turns(factor)))
                }
                _ => None,
            };
        }
        if !matches!(self.seats[which].touch, Touch::Flat { .. }) {
            return None;
        }
        let crossing = |from: f64, to: f64| (from / (from - to)).clamp(0.0, 1.0);
        let end = self.end(beyond, which);
        match (end.turning, self.standing[which]) {
            (Turning::Stands, None) => {
                let side = end.standing?;
                let excess = |state: &ColumnState| {
                    let pose = self.pose_at(state, which * self.elements.len());
                    let actions = self.actions_on(state, which, &pose);
                    self.overturning(state, which, self.turned(state, which), side, &actions)
                        .1
                };
                Some((
                    crossing(excess(state), excess(beyond)),
                    SeatKink::Stands(side),
                ))
            }
            (Turning::HeldAt(_), Some(_)) => {
                let share = crossing(self.turned(state, which), self.turned(beyond, which));
                Some((share, SeatKink::Sits))
            }
            _ => None,
        }
    }

    /// Where the top seat is.
    pub(super) fn top_seat(&self, state: &ColumnState) -> TopSeat {
        let x = state.nodes[self.elements.len()][0];
        let (y, slope) = self.seats[1].stands(x);
        TopSeat { x, y, slope }
    }

    /// The end's pose, what the column does to it, and how its seat answers.
    pub(super) fn end(&self, state: &ColumnState, which: usize) -> End {
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
        let side = self.side_of(which, turned);
        if let Some(side) = side {
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
                end.turning = if let Some(factor) = self.turns_over[which] {
                    Turning::Drags { factor }
                } else if trial.abs() <= holds * (1.0 + 1e-9) + AT_REST {
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
        if let Some(side) = self.side_of(which, turned) {
            if turned == 0.0 || seat.edge_side(turned) == side {
                end.turning = Turning::Stands;
                end.standing = Some(side);
            } else {
                // Turned through flush: it sits down.
                end.turning = Turning::HeldAt(q[2] - turned);
            }
            return;
        }
        if self.sits[which] {
            return;
        }
        for side in [1.0, -1.0] {
            let (pose, excess, most) = self.overturning(state, which, turned, side, &end.actions);
            if excess > 1e-12 * most + NO_MOMENT {
                end.pose = pose;
                end.turning = Turning::Stands;
                end.standing = Some(side);
            }
        }
    }

    /// Of a flat end on an edge: its pose, by how much its moment exceeds what the seat can oppose there,
    /// and that.
    fn overturning(
        &self,
        state: &ColumnState,
        which: usize,
        turned: f64,
        side: f64,
        actions: &Vector3<f64>,
    ) -> (Pose, f64, f64) {
        let q = &state.nodes[which * self.elements.len()];
        let pose = self.seats[which].pose(q, Some((turned, side)));
        let way = if which == 0 { -side } else { side };
        let opposed = -way * (pose.by[(0, 2)] * actions[0] + pose.by[(1, 2)] * actions[1]);
        let most = opposed.max(0.0);
        (pose, actions[2] * way - most, most)
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
            if jumps != [[0.0; 2]; SLOTS] {
                let held = leaning.held_with_corner(self, state, a, b, e);
                let forms = held
                    .forms(&self.tables, &leaning.tables, [false; SLOTS])
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
    pub fn seat_on(&self, node: usize, out: &mut Assembled<3>) {
        let tangent = &mut out.tangent;
        // The row of F_x, at the pose: a swivel's friction is that of the force it bears.
        let bears = (
            out.residual[node][0],
            tangent.diagonal[node].row(0) * self.pose.by,
            if node == 0 {
                tangent.right[0].row(0).into_owned()
            } else {
                match tangent.left.get(node - 1) {
                    Some(left) => left.row(0).into_owned(),
                    None => tangent.right[node - 1].column(0).transpose(),
                }
            },
        );
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
            let (push, own, across) = bears;
            out.residual[node][2] += factor * push;
            let coupling = if node == 0 {
                tangent.right.get_mut(0)
            } else {
                tangent.left.get_mut(node - 1)
            };
            for k in 0..3 {
                tangent.diagonal[node][(2, k)] += factor * own[k];
            }
            if let Some(coupling) = coupling {
                for k in 0..3 {
                    coupling[(2, k)] += factor * across[k];
                }
            }
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
            angle: at[2],
        }
    }
}
