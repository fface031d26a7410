//! The surface of a guide, as the axis of the column sees it.
//!
//! The axis may not leave the strip `|y − y_g(x)| ≤ c(x, F)`: y_g is the guide's axis, c the radial
//! clearance. It changes with the compression, as the coil grows: with D² + (p² − p'²)/π² for the
//! square of the mean diameter at pitch p' (ends kept from rotating), p' = p(1 + F_x/EA).
//!
//! Where a guide ends between the seats, its corner is a place where the coil catches. A round wire
//! of diameter d leans on a sharp corner from all sides: its axis runs around it on a circle of
//! radius d/2, so that beyond the end by δ the clearance opens as `d/2 − √((d/2)² − δ²)`; from
//! [`STEEPEST`] on it goes on straight.

/// Slope at which the circle around a corner goes over into a straight line: 60°.
const STEEPEST: f64 = 1.732_050_807_568_877_2;

/// A guide in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wall {
    /// Whether it lies around the coil; else inside.
    pub around: bool,
    /// Its radius.
    pub radius: f64,
    /// Half the wire's size across the coil.
    pub half_wire: f64,
    /// Free mean diameter of the coil.
    pub mean_diameter: f64,
    /// Free pitch; nought: the coil does not grow.
    pub pitch: f64,
    /// Sideways position of its axis at the seat it is counted from.
    pub offset: f64,
    /// Slope of its axis against the column's line of load.
    pub slope: f64,
    /// Where it begins, along x from its seat; −∞: at the seat.
    pub from: f64,
    /// Where it ends; ∞: at the other seat.
    pub to: f64,
    /// Whether it is carried by the top seat, and counted downwards from it.
    pub from_top: bool,
    /// Radius on which the wire's axis runs around its ends.
    pub corner: f64,
    /// Coefficient of friction.
    pub friction: f64,
    /// Whether it may be touched.
    pub may_touch: bool,
}

/// Where the top seat is.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct TopSeat {
    pub x: f64,
    pub y: f64,
    pub slope: f64,
}

/// A wall at one place: value and derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Facing {
    /// y_g, and its derivative by x.
    pub axis: f64,
    pub axis_slope: f64,
    /// c, its derivatives by x (two) and by F_x (two).
    pub clearance: f64,
    pub widening: f64,
    pub widening_bend: f64,
    pub by_force: f64,
    pub by_force_bend: f64,
    pub friction: f64,
    /// Whether the place is on a corner.
    pub at_corner: bool,
    /// Whether it rides on the top seat.
    pub from_top: bool,
}

impl Wall {
    /// A strip of the given half width around the line of load, which nothing changes.
    pub fn plain(clearance: f64) -> Self {
        Wall {
            around: true,
            radius: clearance,
            half_wire: 0.0,
            mean_diameter: 0.0,
            pitch: 0.0,
            offset: 0.0,
            slope: 0.0,
            from: f64::NEG_INFINITY,
            to: f64::INFINITY,
            from_top: false,
            corner: 0.0,
            friction: 0.0,
            may_touch: true,
        }
    }

    /// Whether its surface is straight everywhere: no ends between the seats.
    pub(super) fn is_straight(&self) -> bool {
        self.from == f64::NEG_INFINITY && self.to == f64::INFINITY && !self.from_top
    }

    /// The wall at x under the axial force F_x; `None` beyond its ends.
    pub(super) fn face(
        &self,
        x: f64,
        force: f64,
        compliance: f64,
        top: &TopSeat,
    ) -> Option<Facing> {
        // Growth: R(o) = ½√(D² + p²(1 − o²)/π²), o = 1 + F_x/EA.
        let open = 1.0 + force * compliance;
        let share = (self.pitch / std::f64::consts::PI).powi(2);
        let square = self.mean_diameter.powi(2) + share * (1.0 - open * open);
        let radius = 0.5 * square.max(0.0).sqrt();
        let (turn, bend) = if share > 0.0 && radius > 0.0 {
            let turn = -share * open / (4.0 * radius);
            (turn, -share / (4.0 * radius) - turn * turn / radius)
        } else {
            (0.0, 0.0)
        };
        let (play, sense) = if self.around {
            (self.radius - radius - self.half_wire, -1.0)
        } else {
            (radius - self.half_wire - self.radius, 1.0)
        };
        let (place, sign, axis, axis_slope) = if self.from_top {
            let slope = top.slope + self.slope;
            (
                top.x - x,
                -1.0,
                top.y + self.offset + slope * (x - top.x),
                slope,
            )
        } else {
            (x, 1.0, self.offset + self.slope * x, self.slope)
        };
        let (beyond, outward) = if place > self.to {
            (place - self.to, sign)
        } else if place < self.from {
            (self.from - place, -sign)
        } else {
            (0.0, 0.0)
        };
        let (opening, rate, rate_bend) = self.corner_at(beyond)?;
        Some(Facing {
            axis,
            axis_slope,
            clearance: play + opening,
            widening: outward * rate,
            widening_bend: rate_bend,
            by_force: sense * turn * compliance,
            by_force_bend: sense * bend * compliance * compliance,
            friction: self.friction,
            at_corner: beyond > 0.0,
            from_top: self.from_top,
        })
    }

    /// Whether any of it lies beside the stretch between two places, corners included.
    pub(super) fn reaches(&self, one: f64, other: f64, top: &TopSeat) -> bool {
        let place = |x: f64| if self.from_top { top.x - x } else { x };
        let (one, other) = (place(one), place(other));
        let margin = 4.0 * self.corner;
        one.max(other) >= self.from - margin && one.min(other) <= self.to + margin
    }

    /// Room of an axis at (x, y), its ends left out of account.
    pub(super) fn room(&self, x: f64, y: f64, force: f64, compliance: f64, top: &TopSeat) -> f64 {
        let endless = Wall {
            from: f64::NEG_INFINITY,
            to: f64::INFINITY,
            ..*self
        };
        endless
            .face(x, force, compliance, top)
            .map_or(f64::INFINITY, |f| f.clearance - (y - f.axis).abs())
    }

    /// How far the clearance has opened at a distance beyond the end, with two derivatives; `None`
    /// where nothing is to be leaned on any more.
    fn corner_at(&self, beyond: f64) -> Option<(f64, f64, f64)> {
        let r = self.corner;
        if beyond == 0.0 {
            // Its curvature belongs to the far side.
            return Some((0.0, 0.0, 0.0));
        }
        // tan of the slope angle is δ/√(r² − δ²): δ = r sin(60°) there.
        let last = r * STEEPEST / (1.0 + STEEPEST * STEEPEST).sqrt();
        if beyond > 4.0 * r {
            None
        } else if beyond > last {
            let height = r - (r * r - last * last).sqrt();
            Some((height + STEEPEST * (beyond - last), STEEPEST, 0.0))
        } else {
            let root = (r * r - beyond * beyond).sqrt();
            Some((r - root, beyond / root, r * r / root.powi(3)))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn pilot() -> Wall {
        Wall {
            around: false,
            radius: 0.2,
            half_wire: 0.02,
            mean_diameter: 0.5,
            pitch: 0.1,
            offset: 0.003,
            slope: 0.01,
            from: f64::NEG_INFINITY,
            to: 0.4,
            from_top: false,
            corner: 0.02,
            friction: 0.1,
            may_touch: true,
        }
    }

    #[test]
    fn derivatives_are_the_differences() {
        let top = TopSeat {
            x: 0.9,
            y: 0.01,
            slope: 0.02,
        };
        let (compliance, step) = (0.02, 1e-6);
        for from_top in [false, true] {
            for around in [false, true] {
                let wall = Wall {
                    from_top,
                    around,
                    radius: if around { 0.3 } else { 0.2 },
                    ..pilot()
                };
                for x in [0.1, 0.3, 0.405, 0.415, 0.42, 0.49, 0.495, 0.7] {
                    for force in [0.0, -8.0, -20.0] {
                        let Some(here) = wall.face(x, force, compliance, &top) else {
                            continue;
                        };
                        let at = |x: f64, f: f64| wall.face(x, f, compliance, &top).expect("near");
                        let (left, right) = (at(x - step, force), at(x + step, force));
                        let (less, more) = (at(x, force - 1e-3), at(x, force + 1e-3));
                        let check = |difference: f64, exact: f64, tolerance: f64| {
                            assert!(
                                (difference - exact).abs() < tolerance,
                                "{x} {force}: {difference} {exact}"
                            );
                        };
                        check(
                            (right.clearance - left.clearance) / (2.0 * step),
                            here.widening,
                            1e-6,
                        );
                        check(
                            (right.widening - left.widening) / (2.0 * step),
                            here.widening_bend,
                            1e-2 * here.widening_bend.max(1e-2),
                        );
                        check(
                            (right.axis - left.axis) / (2.0 * step),
                            here.axis_slope,
                            1e-8,
                        );
                        check(
                            (more.clearance - less.clearance) / 2e-3,
                            here.by_force,
                            1e-9,
                        );
                        check(
                            (more.by_force - less.by_force) / 2e-3,
                            here.by_force_bend,
                            1e-8,
                        );
                    }
                }
            }
        }
    }

    #[test]
    fn it_ends() {
        let wall = pilot();
        assert!(wall.face(0.49, 0.0, 0.0, &TopSeat::default()).is_none());
        assert!(
            wall.face(0.41, 0.0, 0.0, &TopSeat::default())
                .is_some_and(|f| f.at_corner)
        );
        let inside = wall
            .face(0.2, 0.0, 0.0, &TopSeat::default())
            .expect("covered");
        approx::assert_abs_diff_eq!(inside.clearance, 0.25 - 0.02 - 0.2, epsilon = 1e-15);
    }
}
