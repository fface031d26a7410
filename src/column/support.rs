//! How supports and imperfections of a setup act on the column.

use super::Peak;
use super::element::Lever;
use super::layout::{Column, ColumnState, EndLaws, Hold, NaturalShape, Scale};
use super::seat::{Seat, Touch};
use super::wall::Wall;
use crate::setup::{
    self, BowShape, FixedTo, Guide, GuideKind, Imperfections, Orientation, Restraint, Setup,
    Support, TopPosition,
};
use std::f64::consts::PI;

/// What of the spring is taken as deformable.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Idealisation {
    /// The whole free length, as the closed form does. Dead coils work like active ones.
    WholeLength,
    /// The active part between two rigid dead pieces of equal height.
    AsBuilt,
}

/// The imperfections to build in.
#[derive(Clone, Copy, Debug)]
pub struct Deviations<'a> {
    /// Their sizes.
    pub sizes: &'a Imperfections,
    /// How they lie to one another.
    pub orientation: Orientation,
    /// First mode on the same mesh, with its largest sideways motion of size one: needed for a
    /// bow of that shape.
    pub mode: Option<&'a ColumnState>,
}

/// The seat of a support. On the straight path of the perfect column a swivel's friction and the arc
/// of a moving seat have nothing to act on: there a ball is a hinge.
fn seat(support: &Support, scale: Scale, start: f64, at_top: bool, real: bool) -> Seat {
    let touch = match (support.contact, support.link) {
        (_, Some(link)) => Touch::Link {
            length: link.length / scale.length,
            hanging: link.hanging,
        },
        (setup::Contact::Flat(flat), _) => Touch::Flat {
            edge: flat.edge() / scale.length,
        },
        (setup::Contact::Swivel(swivel), _) if real => Touch::Swivel {
            reach: swivel.friction * swivel.radius / scale.length,
        },
        _ => Touch::Joined,
    };
    let built = f64::from(real);
    Seat {
        touch,
        motion: support.motion.filter(|_| real),
        length: scale.length,
        start,
        tilt: built * support.tilt,
        offset: built * support.offset / scale.length,
        at_top,
    }
}

/// A guide of the setup, in the column's units.
fn wall(setup: &Setup, guide: &Guide, scale: Scale) -> Wall {
    let spring = &setup.spring;
    let length = |value: f64| value / scale.length;
    // Its places are counted from the end plane; the column begins at the pivot.
    let arm = match guide.fixed_to {
        FixedTo::Ground | FixedTo::Bottom => setup.bottom.arm,
        FixedTo::Top => setup.top.arm,
    };
    let half_wire = 0.5 * spring.wire.radial_size();
    // A guide on a seat leans and stands aside with it. The top seat's own position is added there.
    let (offset, tilt) = match guide.fixed_to {
        FixedTo::Bottom => (setup.bottom.offset, setup.bottom.tilt),
        FixedTo::Ground | FixedTo::Top => (0.0, 0.0),
    };
    Wall {
        around: guide.kind == GuideKind::Bore,
        radius: length(0.5 * guide.diameter),
        half_wire: length(half_wire),
        mean_diameter: length(spring.mean_diameter),
        pitch: length(spring.pitch()),
        offset: length(offset),
        slope: tilt.tan(),
        from: if guide.from > 0.0 {
            length(guide.from + arm)
        } else {
            f64::NEG_INFINITY
        },
        to: length(guide.to + arm),
        from_top: guide.fixed_to == FixedTo::Top,
        friction: guide.friction,
        may_touch: guide.touching_allowed,
    }
}

impl Column {
    /// The column of a setup, perfect if no deviations are given: then seats are without tilt and
    /// offset too.
    pub fn of_setup(
        setup: &Setup,
        idealisation: Idealisation,
        elements: usize,
        deviations: Option<&Deviations<'_>>,
    ) -> Self {
        let spring = &setup.spring;
        let (length, dead) = match idealisation {
            Idealisation::WholeLength => (spring.free_length, 0.0),
            Idealisation::AsBuilt => (spring.deformable_length(), spring.dead_height() / 2.0),
        };
        let section = spring.section(length);
        let bow = deviations
            .filter(|d| d.sizes.bow_shape == BowShape::HalfSine)
            .map_or(0.0, |d| d.orientation.bow * d.sizes.bow / length);
        let shape = NaturalShape {
            angle: &|s| bow * PI * (PI * s).cos(),
            curvature: &|s| -bow * PI * PI * (PI * s).sin(),
        };
        let across = deviations.map_or(0.0, |d| d.orientation.eccentricity * d.sizes.eccentricity);
        let (leans, landed) = deviations.map_or(([0.0; 2], 0.0), |d| {
            let lean = d.orientation.squareness * d.sizes.squareness;
            let wedge = d.orientation.parallelism * d.sizes.parallelism / spring.outer_diameter();
            let landed = match d.sizes.top_position {
                TopPosition::Piloted => 0.0,
                TopPosition::Landed => lean,
            };
            let angle = lean / spring.free_length;
            let leans = if d.orientation.wedge_at_top {
                [angle, angle + wedge]
            } else {
                [angle + wedge, angle]
            };
            (leans, landed)
        });
        // An arm stands square on the end plane, which leans against the section by `lean`.
        let lever = |arm: f64, across: f64, lean: f64| Lever {
            along: (dead + arm * lean.cos()) / length,
            across: (across - arm * lean.sin()) / length,
        };
        let mut column = Column::new(length, elements, &|_| section, &shape).with_levers(
            lever(setup.bottom.arm, across, leans[0]),
            lever(setup.top.arm, -across, leans[1]),
        );
        let real = f64::from(deviations.is_some());
        let scale = column.scale;
        let laws = |support: &Support, axial: Hold, angle: f64, aside: f64| {
            let hold = |restraint: Restraint, force_unit: f64, unit: f64, rest: f64| match restraint
            {
                Restraint::Free => Hold::Free,
                Restraint::Held => Hold::Held(rest),
                Restraint::Elastic(stiffness) => Hold::Elastic {
                    stiffness: stiffness / unit,
                    rest,
                },
                Restraint::Progressive(curve) => Hold::Curved {
                    curve,
                    motion_unit: force_unit / unit,
                    force_unit,
                    rest,
                },
            };
            EndLaws([
                axial,
                hold(
                    support.sideways,
                    scale.force,
                    scale.stiffness(),
                    (real * support.offset + aside) / scale.length,
                ),
                hold(
                    support.rotation,
                    scale.moment(),
                    scale.moment(),
                    real * support.tilt + angle,
                ),
            ])
        };
        let bottom = laws(&setup.bottom, Hold::Held(0.0), leans[0], 0.0);
        let top = laws(&setup.top, Hold::Free, leans[1], landed);
        column = column.held(bottom, top);
        let start = column.straight_state(0.0).nodes[elements][0];
        column = column.seated(
            seat(&setup.bottom, scale, start, false, deviations.is_some()),
            seat(&setup.top, scale, start, true, deviations.is_some()),
        );
        if deviations.is_some() {
            let walls = setup.guides.iter().map(|guide| wall(setup, guide, scale));
            column = column.with_guides(walls.collect());
        }
        if let Some(d) = deviations
            && d.sizes.bow_shape == BowShape::FirstMode
            && let Some(mode) = d.mode
        {
            column.add_bow(mode, d.orientation.bow * d.sizes.bow / length);
        }
        column
    }

    /// Adds a stress-free bow of the given height (share of the length) in the shape that the
    /// rotations of `mode` give: its axis without shear.
    fn add_bow(&mut self, mode: &ColumnState, height: f64) {
        // Sideways course of the rotations, node by node: ∫θ dS by the elements' own quadrature.
        let mut course = vec![0.0];
        for (e, element) in self.elements.iter().enumerate() {
            let rotations =
                super::Element::rotations(&mode.nodes[e], &mode.nodes[e + 1], &mode.inner[e]);
            let step: f64 = self
                .tables
                .values
                .iter()
                .zip(super::basis::GAUSS_WEIGHT)
                .map(|(values, weight)| {
                    weight
                        * 0.5
                        * element.length
                        * values
                            .iter()
                            .zip(rotations)
                            .map(|(n, q)| n * q)
                            .sum::<f64>()
                })
                .sum();
            course.push(course[e] + step);
        }
        let last = self.elements() as f64;
        let end = course[self.elements()];
        // From the chord where both ends are held sideways; else from side to side.
        let between = self.top.0[1] != Hold::Free && self.bottom.0[1] != Hold::Free;
        let chord = if between { end / last } else { 0.0 };
        let heights = |sign: f64| {
            Peak::of(
                course
                    .iter()
                    .zip(&mode.nodes)
                    .enumerate()
                    .map(|(i, (y, node))| {
                        let height = sign * (y - chord * i as f64);
                        (i as f64 / last, height, sign * (node[2] - chord * last))
                    }),
            )
            .value
        };
        let (left, right) = (heights(1.0), heights(-1.0));
        let size = if between {
            left.max(right)
        } else {
            left + right
        };
        let crown = if left >= right { size } else { -size };
        self.add_natural_field(mode, height / crown);
    }
}
