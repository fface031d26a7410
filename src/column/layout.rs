//! A column laid out in elements, in dimensionless form.
//!
//! Lengths are counted in the length of the column, forces in `EI/L²` and moments in `EI/L` with
//! the bending stiffness at the bottom, so that the numbers solved for do not depend on the units
//! of the case and are of order one.

use super::basis::{GAUSS_AT, Tables};
use super::element::{Element, INNER, Lever, PointLaw};
use super::guided::Leaning;
use super::seat::Seat;
use crate::setup::Curve;
use crate::solve::{System, Unknowns};
use crate::spring::Section;
use crate::units::{Metre, Newton, NewtonMetre, Radian};
use nalgebra::{Matrix3, SMatrix, Vector3};

/// State of a column: (x, y, θ) at the nodes, (c_1, c_2, c_3, F_x, F_y) in the elements.
pub type ColumnState = Unknowns<3, INNER>;

/// Units in which a column counts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scale {
    /// Unit of length, m.
    pub length: Metre,
    /// Unit of force, N.
    pub force: Newton,
}

impl Scale {
    /// Unit of moment, N·m.
    pub fn moment(&self) -> NewtonMetre {
        self.length * self.force
    }

    /// Unit of stiffness, N/m.
    pub fn stiffness(&self) -> f64 {
        self.force / self.length
    }
}

#[allow(clippy::large_enum_variant)] // plain data, kept `Copy`
/// How one unknown of an end is held. Values in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Hold {
    /// Nothing acts.
    Free,
    /// A spring of this stiffness, at rest at this value.
    Elastic {
        /// Stiffness.
        stiffness: f64,
        /// Value at rest.
        rest: f64,
    },
    /// A law as measured, at rest at this value.
    Curved {
        /// Force or moment over motion, in SI.
        curve: Curve,
        /// Unit of its motion, m or rad for one of the column's.
        motion_unit: f64,
        /// Unit of its force, N or N·m for one of the column's.
        force_unit: f64,
        /// Value at rest.
        rest: f64,
    },
    /// Fixed at this value.
    Held(f64),
}

impl Hold {
    /// Force and stiffness of an elastic law at a value of its unknown; `None` for the others.
    pub(super) fn law(&self, value: f64) -> Option<(f64, f64)> {
        match self {
            Hold::Elastic { stiffness, rest } => Some((stiffness * (value - rest), *stiffness)),
            Hold::Curved {
                curve,
                motion_unit,
                force_unit,
                rest,
            } => {
                let point = curve.odd_at((value - rest) * motion_unit);
                Some((
                    point.value / force_unit,
                    point.slope * motion_unit / force_unit,
                ))
            }
            Hold::Free | Hold::Held(_) => None,
        }
    }

    /// Energy stored in an elastic law at a value of its unknown.
    fn energy(&self, value: f64) -> f64 {
        match self {
            Hold::Elastic { stiffness, rest } => 0.5 * stiffness * (value - rest).powi(2),
            Hold::Curved {
                curve,
                motion_unit,
                force_unit,
                rest,
            } => curve.odd_energy((value - rest) * motion_unit) / (force_unit * motion_unit),
            Hold::Free | Hold::Held(_) => 0.0,
        }
    }
}

/// How an end node is held, in the order x, y, θ.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EndLaws(pub [Hold; 3]);

/// A load that grows with λ: (F_x, F_y, M) at a node, in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct NodeLoad {
    /// Node.
    pub node: usize,
    /// (F_x, F_y, M) for λ = 1.
    pub load: [f64; 3],
}

/// Stress-free shape of the axis, over the share of the length from the bottom.
pub struct NaturalShape<'a> {
    /// Rotation of the section, rad.
    pub angle: &'a dyn Fn(f64) -> Radian,
    /// Its derivative with respect to the share of the length, rad.
    pub curvature: &'a dyn Fn(f64) -> Radian,
}

impl NaturalShape<'static> {
    /// The straight axis.
    pub fn straight() -> Self {
        NaturalShape {
            angle: &|_| 0.0,
            curvature: &|_| 0.0,
        }
    }
}

/// A column.
#[derive(Clone, Debug)]
pub struct Column {
    /// Units.
    pub scale: Scale,
    pub(super) elements: Vec<Element>,
    pub(super) bottom: EndLaws,
    pub(super) top: EndLaws,
    pub(super) seats: [Seat; 2],
    pub(super) leaning: Option<Leaning>,
    pub(super) pattern: Vec<Vector3<f64>>,
    pub(super) natural_angles: Vec<f64>,
    pub(super) load_scale: f64,
    pub(super) tables: Tables,
    /// For back-substitution, of the last assembly: what the inner unknowns answer to the columns
    /// of [`super::element::ElementForms::inner_right`], one a row.
    pub(super) inner_answers: Vec<SMatrix<f64, 5, INNER>>,
    /// ∂u/∂q of the ends, of the last assembly.
    pub(super) end_turns: [Matrix3<f64>; 2],
    /// Rotations of the ends when the step began.
    pub(super) end_was: [f64; 2],
    /// Which way a swivel turns against friction, set for one assembly from outside.
    pub(super) turns_over: [Option<f64>; 2],
    /// What the seats made of the rotations in the last assembly, as numbers.
    pub(super) turned_how: [u8; 2],
    /// Edge on which a flat end stands, in the iteration under way.
    pub(super) standing: [Option<f64>; 2],
    /// Flat ends that passed the kink last passed.
    pub(super) passed: [bool; 2],
    /// Flat ends that sit down in the next assembly whatever their moment, which round-off decides there.
    pub(super) sits: [bool; 2],
    /// Whether a flat end stood otherwise in the assembly before the last.
    pub(super) seats_changed: bool,
}

/// Force at which a load along a path counts as of order one: about (2π)² EI/L².
const LARGEST_LOAD_SCALE: f64 = 40.0;

impl Column {
    /// A column of the given length, m, and number of elements, clamped at the bottom and free at
    /// the top, loaded at the top along −x by λ.
    ///
    /// `section` gives the stiffnesses at a share of the length from the bottom, `natural` the
    /// stress-free shape; both may vary along the column.
    pub fn new(
        length: Metre,
        elements: usize,
        section: &dyn Fn(f64) -> Section,
        natural: &NaturalShape<'_>,
    ) -> Self {
        let first = section(0.0);
        let scale = Scale {
            length,
            force: first.bending / length.powi(2),
        };
        let size = 1.0 / elements as f64;
        let law = |at: f64| {
            let here = section(at);
            PointLaw {
                bending: here.bending / first.bending,
                axial_compliance: scale.force / here.axial,
                shear_compliance: scale.force / here.shear,
                natural_curvature: (natural.curvature)(at),
            }
        };
        let parts: Vec<Element> = (0..elements)
            .map(|e| {
                let at = |t: f64| (e as f64 + 0.5 * (1.0 + t)) * size;
                Element {
                    length: size,
                    points: GAUSS_AT.map(|t| law(at(t))),
                    from_a: Lever::default(),
                    to_b: Lever::default(),
                }
            })
            .collect();
        let mut pattern = vec![Vector3::zeros(); elements + 1];
        pattern[elements] = Vector3::new(-1.0, 0.0, 0.0);
        Column {
            scale,
            elements: parts,
            bottom: EndLaws([Hold::Held(0.0); 3]),
            top: EndLaws([Hold::Free; 3]),
            seats: [Seat::joined(false), Seat::joined(true)],
            leaning: None,
            pattern,
            natural_angles: (0..=elements)
                .map(|i| (natural.angle)(i as f64 * size))
                .collect(),
            load_scale: (first.axial / scale.force).min(LARGEST_LOAD_SCALE),
            tables: Tables::new(),
            inner_answers: vec![SMatrix::zeros(); elements],
            end_turns: [Matrix3::identity(); 2],
            end_was: [0.0; 2],
            turns_over: [None; 2],
            turned_how: [0; 2],
            standing: [None; 2],
            passed: [false; 2],
            sits: [false; 2],
            seats_changed: false,
        }
    }

    /// Holds the end nodes as given.
    pub fn held(mut self, bottom: EndLaws, top: EndLaws) -> Self {
        self.bottom = bottom;
        self.top = top;
        self
    }

    /// Sets the end nodes on these seats.
    pub fn seated(mut self, bottom: Seat, top: Seat) -> Self {
        self.seats = [bottom, top];
        self
    }

    /// Puts rigid pieces, in units of the column's length, between the end nodes and the
    /// deformable part: from the bottom node up to it, and from it to the top node.
    pub fn with_levers(mut self, bottom: Lever, top: Lever) -> Self {
        if let Some(first) = self.elements.first_mut() {
            first.from_a = bottom;
        }
        if let Some(last) = self.elements.last_mut() {
            last.to_b = top;
        }
        self
    }

    /// Loads the column by these loads times λ instead of at the top along −x.
    pub fn loaded(mut self, loads: &[NodeLoad]) -> Self {
        self.pattern.fill(Vector3::zeros());
        for load in loads {
            self.pattern[load.node] += Vector3::from(load.load);
        }
        self
    }

    /// Sets the load that counts as of order one along a path.
    pub fn with_load_scale(mut self, load_scale: f64) -> Self {
        self.load_scale = load_scale;
        self
    }

    /// Number of elements.
    pub fn elements(&self) -> usize {
        self.elements.len()
    }

    /// Adds a stress-free rotation given at the quadrature points as a field of this column's
    /// own interpolation: end rotations and inner amplitudes of `field`, times `factor`.
    pub fn add_natural_field(&mut self, field: &ColumnState, factor: f64) {
        for (e, element) in self.elements.iter_mut().enumerate() {
            let rotations =
                Element::rotations(&field.nodes[e], &field.nodes[e + 1], &field.inner[e]);
            for (point, slopes) in element.points.iter_mut().zip(&self.tables.slopes) {
                let turn: f64 = slopes.iter().zip(rotations).map(|(s, q)| s * q).sum();
                point.natural_curvature += factor * turn * 2.0 / element.length;
            }
        }
        for (angle, node) in self.natural_angles.iter_mut().zip(&field.nodes) {
            *angle += factor * node[2];
        }
    }

    /// A state near the stress-free one: the stress-free rotations, turned and shifted so that
    /// the bottom node stands where it is held, and all held unknowns at their values.
    pub fn first_guess(&self) -> ColumnState {
        let mut state = self.zero();
        let held = |hold: Hold| match hold {
            Hold::Held(value) => Some(value),
            Hold::Elastic { rest, .. } | Hold::Curved { rest, .. } => Some(rest),
            Hold::Free => None,
        };
        let turn = match (held(self.bottom.0[2]), held(self.top.0[2])) {
            (Some(angle), _) => angle - self.natural_angles[0],
            (None, Some(angle)) => angle - self.natural_angles[self.elements()],
            (None, None) => 0.0,
        };
        let (mut x, mut y) = (
            held(self.bottom.0[0]).unwrap_or(0.0),
            held(self.bottom.0[1]).unwrap_or(0.0),
        );
        for (i, angle) in self.natural_angles.iter().enumerate() {
            state.nodes[i] = Vector3::new(x, y, angle + turn);
            if let Some(element) = self.elements.get(i) {
                let next = self.natural_angles[i + 1] + turn;
                let middle = 0.5 * (angle + turn + next);
                for (lever, angle) in [
                    (element.from_a, angle + turn),
                    (
                        Lever {
                            along: element.length,
                            across: 0.0,
                        },
                        middle,
                    ),
                    (element.to_b, next),
                ] {
                    let (sin, cos) = angle.sin_cos();
                    x += lever.along * cos - lever.across * sin;
                    y += lever.along * sin + lever.across * cos;
                }
            }
        }
        let last = self.elements();
        for (node, laws) in [(0, &self.bottom), (last, &self.top)] {
            for (k, hold) in laws.0.iter().enumerate() {
                if let Hold::Held(value) = hold {
                    state.nodes[node][k] = *value;
                }
            }
        }
        state
    }

    /// Strain energy of column and end springs, in units of force × length.
    pub fn strain_energy(&self, state: &ColumnState) -> f64 {
        let column: f64 = self
            .elements
            .iter()
            .enumerate()
            .map(|(e, element)| {
                let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
                let inner = &state.inner[e];
                match &self.leaning {
                    Some(leaning) => leaning
                        .held_with_corner(self, state, &a, &b, e)
                        .strain_energy(&self.tables, &leaning.tables),
                    None => element.strain_energy(&self.tables, &a, &b, inner),
                }
            })
            .sum();
        let last = self.elements();
        let ends: f64 = [(0, &self.bottom), (last, &self.top)]
            .iter()
            .flat_map(|(node, laws)| {
                laws.0
                    .iter()
                    .enumerate()
                    .map(|(k, hold)| hold.energy(state.nodes[*node][k]))
            })
            .sum();
        column + ends
    }
}
