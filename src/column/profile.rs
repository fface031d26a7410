//! What the column looks like at a state: its axis and what its sections carry.

use super::basis::{GAUSS_AT, GAUSS_WEIGHT, values};
use super::element::Element;
use super::layout::{Column, ColumnState};
use super::lean::{PADS, SLOTS};

/// Stations in an element.
const STATIONS: usize = 4;

/// A section of the column at a state, in the column's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Station {
    /// Place along the stress-free axis, share of the length from the bottom.
    pub place: f64,
    /// Position.
    pub x: f64,
    /// Position.
    pub y: f64,
    /// Rotation, rad.
    pub angle: f64,
    /// Axial force N along the section normal; compression negative.
    pub axial_force: f64,
    /// Shear force Q across it.
    pub shear_force: f64,
    /// Moment M.
    pub moment: f64,
    /// Curvature θ' now, the stress-free one included.
    pub curvature: f64,
    /// Its derivative dθ'/dS, for a stiffness that changes little.
    pub curvature_slope: f64,
    /// Axial strain ε.
    pub stretch: f64,
    /// Shear strain γ.
    pub slide: f64,
    /// dx/dS.
    pub x_slope: f64,
    /// dy/dS.
    pub y_slope: f64,
    /// dM/dS.
    pub moment_slope: f64,
}

/// The largest value of a quantity along the column.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Peak {
    /// Place, share of the length from the bottom.
    pub place: f64,
    /// Value.
    pub value: f64,
}

impl Column {
    /// The jumps of the force in an element, and where the corner of a guide is.
    fn pushes(&self, state: &ColumnState, e: usize) -> ([[f64; 2]; SLOTS], Option<f64>) {
        let Some(leaning) = &self.leaning else {
            return ([[0.0; 2]; SLOTS], None);
        };
        let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
        let held = leaning.held_with_corner(self, state, &a, &b, e);
        (held.jumps, held.corner)
    }

    /// Sections of the column at `state`, four in an element and one at the top, from bottom to
    /// top. The moment follows from the balance of the part below; no derivative of the
    /// interpolation is used.
    pub fn profile(&self, state: &ColumnState, out: &mut Vec<Station>) {
        self.profile_with(STATIONS, state, out);
    }

    /// The same with a number of sections in an element, a multiple of four.
    pub fn profile_with(&self, per_element: usize, state: &ColumnState, out: &mut Vec<Station>) {
        out.clear();
        // The moment at the end node, from below.
        let mut moment = -self.end_actions(state)[0][2];
        let mut start = 0.0;
        for (e, element) in self.elements.iter().enumerate() {
            let (a, b) = (self.pose_at(state, e), self.pose_at(state, e + 1));
            let inner = &state.inner[e];
            let rotations = Element::rotations(&a, &b, inner);
            let pushes = self.pushes(state, e);
            let angle_at =
                |t: f64| -> f64 { values(t).iter().zip(rotations).map(|(n, q)| n * q).sum() };
            let strains = |angle: f64, t: f64| {
                let (sin, cos) = angle.sin_cos();
                let (fx, fy) = force_at(inner, &pushes, t);
                let law = element.law_at(t);
                let (axial, shear) = (fx * cos + fy * sin, fy * cos - fx * sin);
                let (stretch, slide) = (axial * law.axial_compliance, shear * law.shear_compliance);
                let slopes = (
                    (1.0 + stretch) * cos - slide * sin,
                    (1.0 + stretch) * sin + slide * cos,
                );
                (
                    axial,
                    shear,
                    stretch,
                    slide,
                    slopes,
                    slopes.0 * fy - slopes.1 * fx,
                )
            };
            let (sin, cos) = a[2].sin_cos();
            let lever = element.from_a;
            let reach = [
                lever.along * cos - lever.across * sin,
                lever.along * sin + lever.across * cos,
            ];
            let (mut x, mut y) = (a[0] + reach[0], a[1] + reach[1]);
            moment -= reach[0] * inner[4] - reach[1] * inner[3];
            let part = 2.0 / per_element as f64;
            let stations = per_element + usize::from(e + 1 == self.elements.len());
            for k in 0..stations {
                let t = -1.0 + part * k as f64;
                let angle = angle_at(t);
                let (axial_force, shear_force, stretch, slide, slopes, arm) = strains(angle, t);
                let moment_slope = -arm;
                let law = element.law_at(t);
                out.push(Station {
                    place: start + 0.5 * (1.0 + t) * element.length,
                    x,
                    y,
                    angle,
                    axial_force,
                    shear_force,
                    moment,
                    curvature: moment / law.bending + law.natural_curvature,
                    curvature_slope: moment_slope / law.bending
                        + element.natural_curvature_slope(t),
                    stretch,
                    slide,
                    x_slope: slopes.0,
                    y_slope: slopes.1,
                    moment_slope,
                });
                if k < per_element {
                    for (at, weight) in GAUSS_AT.iter().zip(GAUSS_WEIGHT) {
                        let u = t + 0.5 * part * (1.0 + at);
                        let (.., (dx, dy), arm) = strains(angle_at(u), u);
                        let share = weight * 0.25 * part * element.length;
                        x += share * dx;
                        y += share * dy;
                        moment -= share * arm;
                    }
                }
            }
            start += element.length;
        }
    }
}

/// Force at `t` in an element with the jumps of its pads.
fn force_at(
    inner: &nalgebra::SVector<f64, { super::element::INNER }>,
    (jumps, corner): &([[f64; 2]; SLOTS], Option<f64>),
    t: f64,
) -> (f64, f64) {
    let at = 0.5 * (1.0 + t) * PADS as f64;
    let mut force = (inner[3], inner[4]);
    for (k, jump) in jumps.iter().enumerate() {
        let share = if k < PADS {
            (at - k as f64).clamp(0.0, 1.0)
        } else {
            f64::from(corner.is_some_and(|corner| t > corner))
        };
        force.0 += share * jump[0];
        force.1 += share * jump[1];
    }
    force
}

impl Element {
    /// The law at `t`, from the cubic through its quadrature points.
    pub(super) fn law_at(&self, t: f64) -> super::PointLaw {
        let mut law = super::PointLaw {
            bending: 0.0,
            axial_compliance: 0.0,
            shear_compliance: 0.0,
            natural_curvature: 0.0,
        };
        for (i, point) in self.points.iter().enumerate() {
            let mut share = 1.0;
            for (j, at) in GAUSS_AT.iter().enumerate() {
                if i != j {
                    share *= (t - at) / (GAUSS_AT[i] - at);
                }
            }
            law.bending += share * point.bending;
            law.axial_compliance += share * point.axial_compliance;
            law.shear_compliance += share * point.shear_compliance;
            law.natural_curvature += share * point.natural_curvature;
        }
        law
    }

    /// Derivative of the stress-free curvature along the axis at `t`, of the same cubic.
    fn natural_curvature_slope(&self, t: f64) -> f64 {
        let mut slope = 0.0;
        for (i, point) in self.points.iter().enumerate() {
            for left_out in 0..GAUSS_AT.len() {
                if left_out == i {
                    continue;
                }
                let mut share = 1.0 / (GAUSS_AT[i] - GAUSS_AT[left_out]);
                for (j, at) in GAUSS_AT.iter().enumerate() {
                    if j != i && j != left_out {
                        share *= (t - at) / (GAUSS_AT[i] - at);
                    }
                }
                slope += share * point.natural_curvature;
            }
        }
        slope * 2.0 / self.length
    }
}

impl Peak {
    /// The largest value of a function known by values and slopes at places: the maximum of its
    /// cubic Hermite interpolant. Error of order spacing⁴.
    pub fn of(samples: impl Iterator<Item = (f64, f64, f64)>) -> Self {
        let mut peak = Peak {
            place: 0.0,
            value: f64::NEG_INFINITY,
        };
        let mut before: Option<(f64, f64, f64)> = None;
        for (place, value, slope) in samples {
            if value > peak.value {
                peak = Peak { place, value };
            }
            if let Some((place0, value0, slope0)) = before
                && slope0 > 0.0
                && slope < 0.0
            {
                let h = place - place0;
                // Slope of the interpolant: a u² + b u + c, u in [0, 1]; it changes sign once.
                let c = slope0 * h;
                let rise = value - value0;
                let b = 2.0 * (3.0 * rise - (2.0 * slope0 + slope) * h);
                let a = 3.0 * ((slope0 + slope) * h - 2.0 * rise);
                let root = (b * b - 4.0 * a * c).max(0.0).sqrt();
                // c > 0 and the slope falls through zero: this form has no cancellation.
                let u = (2.0 * c / (root - b)).clamp(0.0, 1.0);
                let top = value0 + u * (c + u * (0.5 * b + u * a / 3.0));
                if top > peak.value {
                    peak = Peak {
                        place: place0 + u * h,
                        value: top,
                    };
                }
            }
            before = Some((place, value, slope));
        }
        peak
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn peak_of_a_sine_has_order_four() {
        let error = |n: usize| {
            let peak = Peak::of((0..=n).map(|i| {
                let s = i as f64 / n as f64;
                ((s), (2.0 * s).sin(), 2.0 * (2.0 * s).cos())
            }));
            (peak.value - 1.0).abs()
        };
        let (coarse, fine) = (error(7), error(28));
        assert!(coarse < 1e-4 && fine < coarse / 100.0, "{coarse} {fine}");
    }
}
