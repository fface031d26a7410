//! The surface of a guide, as the axis of the column sees it.
//!
//! The axis may not leave the strip `|y − y_g(x)| ≤ c(x, F)`: y_g is the guide's axis, c the radial
//! clearance. It changes with the compression, as the coil grows: with D² + (p² − p'²)/π² for the
//! square of the mean diameter at pitch p' (ends kept from rotating), p' = p(1 + F_x/EA).
//!
//! Where a guide ends between the seats, its corner is a place where the coil catches: see
//! [`super::corner`].

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
    pub slope: f64,
    /// c, and its derivatives by F_x.
    pub clearance: f64,
    pub by_force: f64,
    pub by_force_bend: f64,
    pub friction: f64,
    /// Whether it rides on the top seat.
    pub from_top: bool,
    /// Whether it may be touched.
    pub may_touch: bool,
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
            friction: 0.0,
            may_touch: true,
        }
    }

    /// Whether its surface is straight everywhere: no ends between the seats.
    pub(super) fn is_straight(&self) -> bool {
        self.from == f64::NEG_INFINITY && self.to == f64::INFINITY && !self.from_top
    }

    /// The surface at x under the axial force F_x, its ends left out of account.
    pub(super) fn surface(&self, x: f64, force: f64, compliance: f64, top: &TopSeat) -> Facing {
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
        let (axis, slope) = if self.from_top {
            let slope = top.slope + self.slope;
            (top.y + self.offset + slope * (x - top.x), slope)
        } else {
            (self.offset + self.slope * x, self.slope)
        };
        Facing {
            axis,
            slope,
            clearance: play,
            by_force: sense * turn * compliance,
            by_force_bend: sense * bend * compliance * compliance,
            friction: self.friction,
            from_top: self.from_top,
            may_touch: self.may_touch,
        }
    }

    /// Whether it lies beside the whole stretch from x − half to x + half.
    pub(super) fn covers(&self, x: f64, half: f64, top: &TopSeat) -> bool {
        let place = if self.from_top { top.x - x } else { x };
        place - half >= self.from && place + half <= self.to
    }

    /// Where its corners are along x: those ends that lie between the seats.
    pub(super) fn corners(&self, top: &TopSeat) -> [Option<f64>; 2] {
        [self.from, self.to].map(|end| {
            let x = if self.from_top { top.x - end } else { end };
            end.is_finite().then_some(x)
        })
    }

    /// Whether any of it lies beside the stretch between two places.
    pub(super) fn reaches(&self, one: f64, other: f64, top: &TopSeat) -> bool {
        let place = |x: f64| if self.from_top { top.x - x } else { x };
        let (one, other) = (place(one), place(other));
        one.max(other) >= self.from && one.min(other) <= self.to
    }

    /// Room of an axis at (x, y), its ends left out of account.
    pub(super) fn room(&self, x: f64, y: f64, force: f64, compliance: f64, top: &TopSeat) -> f64 {
        let facing = self.surface(x, force, compliance, top);
        facing.clearance - (y - facing.axis).abs()
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
        let compliance = 0.02;
        for (from_top, around) in [(false, false), (false, true), (true, false), (true, true)] {
            let radius = if around { 0.3 } else { 0.2 };
            let wall = Wall {
                from_top,
                around,
                radius,
                ..pilot()
            };
            for force in [0.0, -8.0, -20.0] {
                let at = |x: f64, f: f64| wall.surface(x, f, compliance, &top);
                let here = at(0.3, force);
                let axis = (at(0.4, force).axis - at(0.2, force).axis) / 0.2;
                approx::assert_abs_diff_eq!(axis, here.slope, epsilon = 1e-14);
                let (less, more) = (at(0.3, force - 1e-3), at(0.3, force + 1e-3));
                let by = (more.clearance - less.clearance) / 2e-3;
                approx::assert_abs_diff_eq!(by, here.by_force, epsilon = 1e-9);
                let bend = (more.by_force - less.by_force) / 2e-3;
                approx::assert_abs_diff_eq!(bend, here.by_force_bend, epsilon = 1e-8);
            }
        }
    }

    #[test]
    fn it_ends_where_it_ends() {
        let (wall, top) = (pilot(), TopSeat::default());
        assert!(wall.covers(0.39, 0.009, &top) && !wall.covers(0.39, 0.011, &top));
        assert_eq!(wall.corners(&top), [None, Some(0.4)]);
        let inside = wall.surface(0.2, 0.0, 0.0, &top);
        approx::assert_abs_diff_eq!(inside.clearance, 0.25 - 0.02 - 0.2, epsilon = 1e-15);
        let hung = Wall {
            from_top: true,
            ..wall
        };
        let top = TopSeat { x: 0.9, ..top };
        assert_eq!(hung.corners(&top), [None, Some(0.5)]);
        assert!(hung.covers(0.7, 0.1, &top) && !hung.covers(0.45, 0.1, &top));
    }
}
