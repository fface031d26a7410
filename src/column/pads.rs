//! The pads of a leaning element: what each of them does, and their unknowns eliminated together
//! with the element's own. Equations (4) and (5) of [`super::lean`].

use super::corner::Brink;
use super::element::INNER;
use super::lean::{PADS, PadForms, SLOTS};
use super::wall::Facing;
use crate::solve::SymmetricFactor;
use nalgebra::{Matrix3, SMatrix, SVector, Vector3};

/// Unknowns of the slots of an element: (J_x, J_y) of each, pads and corner.
pub(super) const PAD_UNKNOWNS: usize = 2 * SLOTS;
/// Those, and the place of the corner.
const ALL: usize = PAD_UNKNOWNS + 1;
/// Numbers of the corner's unknowns.
const CORNER: [usize; 3] = [2 * PADS, 2 * PADS + 1, 2 * PADS + 2];
/// Reduced outer unknowns: x_B − x_A, y_B − y_A, θ_A, θ_B, x_B, y_B.
const OUTER: usize = 6;
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
    pub to_pads: SMatrix<f64, ALL, INNER>,
    /// The pads' answers to the reduced outer unknowns and the residual, one a column.
    pub pad_answers: SMatrix<f64, ALL, 7>,
    /// Negative eigenvalues beyond those of a stable state; unsymmetric: modulo 2.
    pub negatives: i64,
    symmetric: bool,
}

impl PadForms {
    /// Eliminates the element's inner unknowns and its pads'. `was` is where each pad was along x, and
    /// the corner along the column; `forces` the force at either end; `corner` what changes where a
    /// corner leans, and how far that place lies from where it was.
    pub fn condense(
        mut self,
        pads: &[Pad; SLOTS],
        jumps: &[[f64; 2]; SLOTS],
        was: &[f64],
        forces: [[f64; 2]; 2],
        corner: Option<(Brink, f64)>,
        symmetric: bool,
    ) -> Condensed {
        type Pads = SMatrix<f64, ALL, ALL>;
        let mut own = Pads::zeros();
        let mut residual = SVector::<f64, ALL>::zeros();
        // Columns: what an unknown does (J = Σ doing·p). Rows: what its equation looks at.
        let mut doing = [[0.0; 2]; ALL];
        let mut looking = [[0.0; 2]; ALL];
        let mut by_force = [0.0; ALL];
        let idle = if symmetric { -1.0 } else { 1.0 };
        // Negative eigenvalues, or the parity of them, that the pads have in every stable state.
        let mut usual = if symmetric { ALL as i64 } else { 0 };
        own[(CORNER[2], CORNER[2])] = idle;
        for (k, pad) in pads.iter().enumerate() {
            let (first, second) = (2 * k, 2 * k + 1);
            let Pad::Leans {
                side,
                facing,
                motion,
            } = *pad
            else {
                own[(first, first)] = idle;
                own[(second, second)] = idle;
                continue;
            };
            let [x, y] = self.means[k];
            let slope = facing.slope;
            let push = side * jumps[k][1];
            let gap = y - facing.axis - side * facing.clearance;
            if symmetric {
                // By the energy of the growth, the push acts on F_x the same way.
                self.forms.gap[0] -= push * facing.by_force;
                self.forms.compliance[0] -= push * facing.by_force_bend;
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
                Motion::Slips(friction) if k < PADS => {
                    own[(first, first)] = 1.0;
                    own[(first, second)] = slope - friction * side;
                    residual[first] = jumps[k][0] + slope * jumps[k][1] - friction * push;
                    usual += 1;
                }
                Motion::Sticks if k < PADS => {
                    looking[first] = [1.0, 0.0];
                    residual[first] = x - was[k];
                }
                Motion::Slips(friction) => {
                    if let Some((brink, _)) = &corner {
                        let tilt = brink.mean[1] / brink.mean[0];
                        own[(first, first)] = 1.0;
                        own[(first, second)] = tilt - friction * side;
                        residual[first] = jumps[k][0] + tilt * jumps[k][1] - friction * push;
                    }
                    usual += 1;
                }
                Motion::Sticks => {
                    own[(first, CORNER[2])] = 1.0;
                    residual[first] = corner.map_or(0.0, |(_, moved)| moved);
                    usual += 1;
                }
            }
        }
        let product = |v: [f64; 2], m: &[f64; 3], w: [f64; 2]| {
            v[0] * (m[0] * w[0] + m[1] * w[1]) + v[1] * (m[1] * w[0] + m[2] * w[1])
        };
        let leans_on_corner = corner.filter(|_| pads[PADS] != Pad::Away);
        if leans_on_corner.is_some() {
            // x(S_e) = x_e, which holds at every state.
            looking[CORNER[2]] = [1.0, 0.0];
        }
        // Pads against inner (c, F), both ways; against the reduced outer unknowns, both ways.
        let mut inner_columns = SMatrix::<f64, ALL, INNER>::zeros();
        let mut inner_rows = SMatrix::<f64, ALL, INNER>::zeros();
        let mut outer_columns = SMatrix::<f64, ALL, OUTER>::zeros();
        let mut outer_rows = SMatrix::<f64, ALL, OUTER>::zeros();
        for p in 0..ALL {
            let k = (p / 2).min(PADS);
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
            if symmetric {
                inner_columns[(p, 3)] += by_force[p];
            }
            for other in 0..PAD_UNKNOWNS {
                own[(p, other)] += product(looking[p], &self.mutual[k][other / 2], doing[other]);
            }
        }
        if let Some((brink, _)) = leans_on_corner {
            let [first, second, place] = CORNER;
            own[(place, place)] = brink.slope[0];
            own[(second, place)] += looking[second][0] * brink.slope[0] + brink.slope[1];
            // The place's column: what its motion does to all the others.
            for i in 0..3 {
                inner_columns[(place, i)] = brink.values[2 + i] * brink.twist;
            }
            for axis in 0..2 {
                inner_columns[(place, 3 + axis)] = brink.fold[axis];
                outer_columns[(place, 2 + axis)] = brink.values[axis] * brink.twist;
            }
            for p in 0..2 * PADS {
                let along = looking[p][0] * brink.fold[0] + looking[p][1] * brink.fold[1];
                own[(p, place)] += brink.passed[p / 2] * along;
            }
            if let Pad::Leans {
                motion: Motion::Slips(_),
                ..
            } = pads[PADS]
            {
                // J_y δτ = g·δx̄'.
                let tilt = brink.mean[1] / brink.mean[0];
                let lever = jumps[PADS][1] / brink.mean[0];
                let g = [-tilt * lever, lever];
                let turn = g[0] * brink.mean_turn[0] + g[1] * brink.mean_turn[1];
                let m = &brink.mean_give;
                let give = [g[0] * m[0] + g[1] * m[1], g[0] * m[1] + g[1] * m[2]];
                for i in 0..3 {
                    inner_rows[(first, i)] += turn * brink.values[2 + i];
                }
                for axis in 0..2 {
                    inner_rows[(first, 3 + axis)] += give[axis];
                    outer_rows[(first, 2 + axis)] += turn * brink.values[axis];
                }
                for p in 0..PAD_UNKNOWNS {
                    let passed = if p < 2 * PADS {
                        brink.passed[p / 2]
                    } else {
                        0.5
                    };
                    own[(first, p)] += passed * (give[0] * doing[p][0] + give[1] * doing[p][1]);
                }
                own[(first, place)] += g[0] * brink.mean_bend[0] + g[1] * brink.mean_bend[1];
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
        let mut seen = SMatrix::<f64, ALL, 7>::zeros();
        let through = inner_rows * answers.transpose();
        for p in 0..ALL {
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
        for p in 0..ALL {
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
        pads: &[Pad; SLOTS],
        a: &Vector3<f64>,
        b: &Vector3<f64>,
        residual: f64,
    ) -> (SVector<f64, INNER>, [[f64; 2]; SLOTS]) {
        let outer = [b[0] - a[0], b[1] - a[1], a[2], b[2], b[0], b[1], residual];
        let pushed = -(self.pad_answers * SVector::from(outer));
        let inner = -(self.inner_answers.tr_mul(&SVector::from([
            outer[0], outer[1], outer[2], outer[3], residual,
        ])) + self.to_pads.tr_mul(&pushed));
        let mut jumps = [[0.0; 2]; SLOTS];
        for (k, pad) in pads.iter().enumerate() {
            if let Pad::Leans { facing, .. } = pad {
                jumps[k] = if self.symmetric {
                    [-facing.slope * pushed[2 * k], pushed[2 * k]]
                } else {
                    [pushed[2 * k], pushed[2 * k + 1]]
                };
            }
        }
        (inner, jumps)
    }
}

impl Pad {
    /// A number for what it does; 0: nothing.
    pub fn number(&self) -> u64 {
        match self {
            Pad::Away => 0,
            Pad::Leans { side, motion, .. } => {
                let way = match motion {
                    Motion::Sticks => 1,
                    Motion::Slips(friction) => 2 + u64::from(*friction > 0.0),
                };
                2 * way + u64::from(*side > 0.0)
            }
        }
    }

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
}
