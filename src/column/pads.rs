//! The pads of a leaning element: what each of them does, and their unknowns eliminated together
//! with the element's own. Equations (4) and (5) of [`super::lean`].

use super::element::INNER;
use super::lean::{Held, PADS, PadForms};
use super::wall::{Facing, TopSeat, Wall};
use crate::solve::SymmetricFactor;
use nalgebra::{Matrix3, SMatrix, SVector, Vector3};

/// Unknowns of the pads of an element: (J_x, J_y) of each.
pub(super) const PAD_UNKNOWNS: usize = 2 * PADS;
/// Reduced outer unknowns: x_B − x_A, y_B − y_A, θ_A, θ_B, x_B, y_B.
const OUTER: usize = 6;
/// Friction holds up to this share above its limit, against round-off.
const HOLDS: f64 = 1.0 + 1e-9;

/// What a pad does.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Pad {
    /// It leans on nothing.
    Away,
    /// It leans on the wall at this side (+1: at +y).
    Leans {
        side: f64,
        facing: Facing,
        motion: Motion,
    },
}

/// How a leaning pad moves along the wall.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Motion {
    /// Friction along the force jump: s μ.
    Slips(f64),
    Sticks,
}

/// What a leaning element adds to the chain, its own unknowns eliminated, and what recovers them.
#[derive(Clone, Debug)]
pub(super) struct Condensed {
    /// Residual at A and B.
    pub residual: [Vector3<f64>; 2],
    /// Blocks AA, AB, BA, BB.
    pub blocks: [Matrix3<f64>; 4],
    /// Of [`super::element::ElementForms::inner_right`], as for a plain element.
    pub inner_answers: SMatrix<f64, 5, INNER>,
    /// The inner unknowns' answers to the pads' unknowns, one a row.
    pub to_pads: SMatrix<f64, PAD_UNKNOWNS, INNER>,
    /// The pads' answers to the reduced outer unknowns and the residual, one a column.
    pub pad_answers: SMatrix<f64, PAD_UNKNOWNS, 7>,
    /// Negative eigenvalues beyond those of a stable state; unsymmetric: modulo 2.
    pub negatives: i64,
    symmetric: bool,
}

impl PadForms {
    /// Eliminates the element's inner unknowns and its pads'. `was` is where each pad was along x,
    /// `forces` the force at either end.
    pub fn condense(
        mut self,
        pads: &[Pad; PADS],
        jumps: &[[f64; 2]; PADS],
        was: &[f64],
        forces: [[f64; 2]; 2],
        symmetric: bool,
    ) -> Condensed {
        type Pads = SMatrix<f64, PAD_UNKNOWNS, PAD_UNKNOWNS>;
        let mut own = Pads::zeros();
        let mut residual = SVector::<f64, PAD_UNKNOWNS>::zeros();
        // Columns: what an unknown does (J = Σ doing·p). Rows: what its equation looks at.
        let mut doing = [[0.0; 2]; PAD_UNKNOWNS];
        let mut looking = [[0.0; 2]; PAD_UNKNOWNS];
        let mut by_force = [0.0; PAD_UNKNOWNS];
        // Negative eigenvalues, or the parity of them, that the pads have in every stable state.
        let mut usual = if symmetric { PAD_UNKNOWNS as i64 } else { 0 };
        for (k, pad) in pads.iter().enumerate() {
            let (first, second) = (2 * k, 2 * k + 1);
            match *pad {
                Pad::Away => {
                    let sign = if symmetric { -1.0 } else { 1.0 };
                    own[(first, first)] = sign;
                    own[(second, second)] = sign;
                }
                Pad::Leans {
                    side,
                    facing,
                    motion,
                } => {
                    let [x, y] = self.means[k];
                    let slope = facing.axis_slope + side * facing.widening;
                    let push = side * jumps[k][1];
                    let gap = y - facing.axis - side * facing.clearance;
                    self.forms.gap[0] -= push * facing.by_force;
                    self.forms.compliance[0] -= push * facing.by_force_bend;
                    if symmetric {
                        doing[first] = [-slope, 1.0];
                        looking[first] = [-slope, 1.0];
                        residual[first] = gap;
                        by_force[first] = -side * facing.by_force;
                        own[(second, second)] = -1.0;
                        continue;
                    }
                    doing[first] = [1.0, 0.0];
                    doing[second] = [0.0, 1.0];
                    looking[second] = [-slope, 1.0];
                    residual[second] = gap;
                    by_force[second] = -side * facing.by_force;
                    match motion {
                        Motion::Slips(friction) => {
                            looking[first] = [side * facing.widening_bend * jumps[k][1], 0.0];
                            own[(first, first)] = 1.0;
                            own[(first, second)] = slope - friction * side;
                            residual[first] = jumps[k][0] + slope * jumps[k][1] - friction * push;
                            usual += 1;
                        }
                        Motion::Sticks => {
                            looking[first] = [1.0, 0.0];
                            residual[first] = x - was[k];
                        }
                    }
                }
            }
        }
        let product = |v: [f64; 2], m: &[f64; 3], w: [f64; 2]| {
            v[0] * (m[0] * w[0] + m[1] * w[1]) + v[1] * (m[1] * w[0] + m[2] * w[1])
        };
        // Pads against inner (c, F), both ways; against the reduced outer unknowns, both ways.
        let mut inner_columns = SMatrix::<f64, PAD_UNKNOWNS, INNER>::zeros();
        let mut inner_rows = SMatrix::<f64, PAD_UNKNOWNS, INNER>::zeros();
        let mut outer_columns = SMatrix::<f64, PAD_UNKNOWNS, OUTER>::zeros();
        let mut outer_rows = SMatrix::<f64, PAD_UNKNOWNS, OUTER>::zeros();
        for p in 0..PAD_UNKNOWNS {
            let k = p / 2;
            for (vector, inner, outer) in [
                (doing[p], &mut inner_columns, &mut outer_columns),
                (looking[p], &mut inner_rows, &mut outer_rows),
            ] {
                let turn = |i: usize| {
                    vector[0] * self.turning[k][i][0] + vector[1] * self.turning[k][i][1]
                };
                for i in 0..3 {
                    inner[(p, i)] = turn(2 + i);
                }
                let s = &self.stretch[k];
                inner[(p, 3)] = vector[0] * s[0] + vector[1] * s[1];
                inner[(p, 4)] = vector[0] * s[1] + vector[1] * s[2];
                outer[(p, 2)] = turn(0);
                outer[(p, 3)] = turn(1);
                outer[(p, 4)] = vector[0];
                outer[(p, 5)] = vector[1];
            }
            inner_rows[(p, 3)] += by_force[p];
            // By the energy of the growth, the push acts on F_x the same way.
            inner_columns[(p, 3)] += by_force[p];
            for other in 0..PAD_UNKNOWNS {
                own[(p, other)] += product(looking[p], &self.mutual[k][other / 2], doing[other]);
            }
        }
        let inner_factor = SymmetricFactor::new(&self.forms.inner_matrix());
        let right = self.forms.inner_right();
        let mut answers = right;
        inner_factor.solve_rows(&mut answers);
        let mut to_pads = inner_columns;
        inner_factor.solve_rows(&mut to_pads);
        own -= inner_rows * to_pads.transpose();
        // Columns: outer (dx, dy, θ_A, θ_B: through the inner ones too; x_B, y_B), and residual.
        let mut seen = SMatrix::<f64, PAD_UNKNOWNS, 7>::zeros();
        let through = inner_rows * answers.transpose();
        for p in 0..PAD_UNKNOWNS {
            for column in 0..OUTER {
                seen[(p, column)] = outer_rows[(p, column)]
                    - if column < 4 {
                        through[(p, column)]
                    } else {
                        0.0
                    };
            }
            seen[(p, 6)] = residual[p] - through[(p, 4)];
        }
        let (pad_answers, pad_negatives) = if symmetric {
            let factor = SymmetricFactor::new(&own);
            let mut rows = seen.transpose();
            factor.solve_rows(&mut rows);
            (rows.transpose(), i64::from(factor.negatives))
        } else {
            let factor = own.lu();
            let mut columns = seen;
            factor.solve_mut(&mut columns);
            (columns, i64::from(factor.determinant() < 0.0))
        };
        // Condensed matrix and residual of the reduced unknowns.
        let mut from_pads = outer_columns;
        let through = to_pads * right.transpose();
        for p in 0..PAD_UNKNOWNS {
            for column in 0..4 {
                from_pads[(p, column)] -= through[(p, column)];
            }
        }
        let by_pads = from_pads.tr_mul(&pad_answers);
        let by_inner = right * answers.transpose();
        let mut matrix = SMatrix::<f64, OUTER, OUTER>::zeros();
        let [first, last] = forces;
        let mut reduced = SVector::<f64, OUTER>::from([
            first[0],
            first[1],
            self.forms.moment[0],
            self.forms.moment[1],
            last[0] - first[0],
            last[1] - first[1],
        ]);
        for i in 0..OUTER {
            for j in 0..OUTER {
                if i < 4 && j < 4 {
                    matrix[(i, j)] -= by_inner[(i, j)];
                }
                matrix[(i, j)] -= by_pads[(i, j)];
            }
            if i < 4 {
                reduced[i] -= by_inner[(i, 4)];
            }
            reduced[i] -= by_pads[(i, 6)];
        }
        for i in 0..2 {
            for j in 0..2 {
                matrix[(2 + i, 2 + j)] += self.forms.bending[i.max(j)][i.min(j)];
            }
        }
        // From (x_A, y_A, θ_A, x_B, y_B, θ_B) to the reduced unknowns.
        let mut reduce = SMatrix::<f64, OUTER, 6>::zeros();
        for axis in 0..2 {
            reduce[(axis, axis)] = -1.0;
            reduce[(axis, 3 + axis)] = 1.0;
            reduce[(4 + axis, 3 + axis)] = 1.0;
        }
        reduce[(2, 2)] = 1.0;
        reduce[(3, 5)] = 1.0;
        let whole = reduce.tr_mul(&(matrix * reduce));
        let residual = reduce.tr_mul(&reduced);
        Condensed {
            residual: [
                residual.fixed_rows::<3>(0).into_owned(),
                residual.fixed_rows::<3>(3).into_owned(),
            ],
            blocks: [(0, 0), (0, 3), (3, 0), (3, 3)]
                .map(|at| whole.fixed_view::<3, 3>(at.0, at.1).into_owned()),
            inner_answers: answers,
            to_pads,
            pad_answers,
            negatives: i64::from(inner_factor.negatives) - 2 + pad_negatives - usual,
            symmetric,
        }
    }
}

impl Condensed {
    /// Steps of the element's inner unknowns and of its pads' J for steps of its ends.
    pub fn recover(
        &self,
        pads: &[Pad; PADS],
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        residual: f64,
    ) -> (SVector<f64, INNER>, [[f64; 2]; PADS]) {
        let outer = [b[0] - a[0], b[1] - a[1], a[2], b[2], b[0], b[1], residual];
        let pushed = -(self.pad_answers * SVector::from(outer));
        let inner = -(self.inner_answers.tr_mul(&SVector::from([
            outer[0], outer[1], outer[2], outer[3], residual,
        ])) + self.to_pads.tr_mul(&pushed));
        let mut jumps = [[0.0; 2]; PADS];
        for (k, pad) in pads.iter().enumerate() {
            if let Pad::Leans { side, facing, .. } = pad {
                jumps[k] = if self.symmetric {
                    let slope = facing.axis_slope + side * facing.widening;
                    [-slope * pushed[2 * k], pushed[2 * k]]
                } else {
                    [pushed[2 * k], pushed[2 * k + 1]]
                };
            }
        }
        (inner, jumps)
    }
}

/// What the pads of an element do at their mean positions, from what they did and where; and by how
/// much the condition that decides it is met, as a force.
pub(super) fn decide(
    walls: &[Wall],
    top: &TopSeat,
    held: &Held<'_>,
    means: &[[f64; 2]; PADS],
    was: &[f64],
    search: f64,
    symmetric: bool,
) -> [(Pad, f64); PADS] {
    std::array::from_fn(|k| {
        let ([x, y], [jx, jy]) = (means[k], held.jumps[k]);
        let Some(facing) = nearest(walls, top, held, means[k]) else {
            return (Pad::Away, f64::INFINITY);
        };
        let aside = y - facing.axis;
        let side = if jy != 0.0 {
            jy.signum()
        } else {
            aside.signum()
        };
        let gap = facing.clearance - side * aside;
        let push = side * jy;
        let held_on = push - search * gap;
        if held_on <= 0.0 {
            return (Pad::Away, -held_on);
        }
        let slope = facing.axis_slope + side * facing.widening;
        let (motion, by) = if symmetric || facing.friction == 0.0 {
            (Motion::Slips(0.0), held_on)
        } else {
            let drag = jx + slope * jy;
            let trial = drag + search * (x - was[k]);
            let most = facing.friction * push * HOLDS;
            if trial.abs() <= most {
                (Motion::Sticks, most - trial.abs())
            } else {
                let way = Motion::Slips(trial.signum() * facing.friction);
                (way, trial.abs() - most)
            }
        };
        let pad = Pad::Leans {
            side,
            facing,
            motion,
        };
        (pad, by)
    })
}

/// The wall nearest to a place of the axis.
fn nearest(walls: &[Wall], top: &TopSeat, held: &Held<'_>, [x, y]: [f64; 2]) -> Option<Facing> {
    let compliance = held.element.points[0].axial_compliance;
    walls
        .iter()
        .filter_map(|wall| wall.face(x, held.inner[3], compliance, top))
        .min_by(|a, b| {
            let room = |f: &Facing| f.clearance - (y - f.axis).abs();
            room(a).total_cmp(&room(b))
        })
}

impl Pad {
    /// Whether it does something else than `other`.
    pub fn differs(&self, other: &Pad) -> bool {
        match (self, other) {
            (Pad::Away, Pad::Away) => false,
            (
                Pad::Leans { side, motion, .. },
                Pad::Leans {
                    side: other_side,
                    motion: other_motion,
                    ..
                },
            ) => side != other_side || motion != other_motion,
            _ => true,
        }
    }

    /// The same doing where the axis is now.
    pub fn kept(&self, walls: &[Wall], top: &TopSeat, held: &Held<'_>, mean: [f64; 2]) -> Pad {
        match (self, nearest(walls, top, held, mean)) {
            (Pad::Leans { side, motion, .. }, Some(facing)) => Pad::Leans {
                side: *side,
                facing,
                motion: *motion,
            },
            _ => Pad::Away,
        }
    }
}
