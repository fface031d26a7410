//! A measured law as a table: force against deflection of a rubber pad, or the arc of a lever.
//!
//! Between its points a cubic Hermite interpolant runs with the slopes of Fritsch and Carlson: it
//! rises where the table rises and never overshoots; beyond the ends it goes on straight. Value and
//! slope are continuous, the second derivative jumps at the points.
//!
//! Source: Fritsch & Carlson, SIAM J. Numer. Anal. 17 (1980) 238–246 (from memory; tested).

/// Most points of a curve.
pub const MOST_POINTS: usize = 24;

/// A function given by points of rising argument.
#[derive(Clone, Copy, PartialEq)]
pub struct Curve {
    count: usize,
    at: [f64; MOST_POINTS],
    value: [f64; MOST_POINTS],
    slope: [f64; MOST_POINTS],
}

impl std::fmt::Debug for Curve {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_list().entries(self.points()).finish()
    }
}

/// A point of a curve: value, first and second derivative.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CurvePoint {
    /// Value.
    pub value: f64,
    /// First derivative.
    pub slope: f64,
    /// Second derivative.
    pub bend: f64,
}

impl Curve {
    /// The curve through `points`, whose first members must rise; `None` for less than two or more
    /// than [`MOST_POINTS`] points, or where they do not rise.
    pub fn through(points: &[(f64, f64)]) -> Option<Self> {
        let count = points.len();
        let rises = points.windows(2).all(|w| w[1].0 > w[0].0);
        let finite = points.iter().all(|p| p.0.is_finite() && p.1.is_finite());
        if !(2..=MOST_POINTS).contains(&count) || !rises || !finite {
            return None;
        }
        let mut curve = Curve {
            count,
            at: [0.0; MOST_POINTS],
            value: [0.0; MOST_POINTS],
            slope: [0.0; MOST_POINTS],
        };
        for (i, (at, value)) in points.iter().enumerate() {
            curve.at[i] = *at;
            curve.value[i] = *value;
        }
        let secant = |i: usize| (points[i + 1].1 - points[i].1) / (points[i + 1].0 - points[i].0);
        for i in 0..count {
            curve.slope[i] = if i == 0 {
                secant(0)
            } else if i + 1 == count {
                secant(count - 2)
            } else {
                let (left, right) = (secant(i - 1), secant(i));
                if left * right <= 0.0 {
                    0.0
                } else {
                    // Weighted harmonic mean: within the limits that keep the interpolant monotone.
                    let (h0, h1) = (points[i].0 - points[i - 1].0, points[i + 1].0 - points[i].0);
                    let (w0, w1) = (2.0 * h1 + h0, h1 + 2.0 * h0);
                    (w0 + w1) / (w0 / left + w1 / right)
                }
            };
        }
        Some(curve)
    }

    /// An odd law through the origin: `points` give its positive half, from (0, 0) on, which must be
    /// the first; values rise. At the origin the slope is the first secant.
    pub fn odd(points: &[(f64, f64)]) -> Option<Self> {
        let starts = points.first() == Some(&(0.0, 0.0));
        let rises = points.windows(2).all(|w| w[1].1 > w[0].1);
        if starts && rises {
            Curve::through(points)
        } else {
            None
        }
    }

    /// The points.
    pub fn points(&self) -> impl Iterator<Item = (f64, f64)> + '_ {
        (0..self.count).map(|i| (self.at[i], self.value[i]))
    }

    /// Value and derivatives at `x`.
    pub fn at(&self, x: f64) -> CurvePoint {
        let last = self.count - 1;
        for end in [0, last] {
            let outside = if end == 0 {
                x < self.at[0]
            } else {
                x > self.at[last]
            };
            if outside {
                return CurvePoint {
                    value: self.value[end] + self.slope[end] * (x - self.at[end]),
                    slope: self.slope[end],
                    bend: 0.0,
                };
            }
        }
        let i = (0..last).rev().find(|i| x >= self.at[*i]).unwrap_or(0);
        let h = self.at[i + 1] - self.at[i];
        let u = (x - self.at[i]) / h;
        let rise = self.value[i + 1] - self.value[i];
        let (m0, m1) = (self.slope[i] * h, self.slope[i + 1] * h);
        let (b, a) = (3.0 * rise - 2.0 * m0 - m1, m0 + m1 - 2.0 * rise);
        CurvePoint {
            value: self.value[i] + u * (m0 + u * (b + u * a)),
            slope: (m0 + u * (2.0 * b + 3.0 * u * a)) / h,
            bend: (2.0 * b + 6.0 * u * a) / (h * h),
        }
    }

    /// Value and derivatives of the odd continuation of a curve that starts at the origin.
    pub fn odd_at(&self, x: f64) -> CurvePoint {
        let point = self.at(x.abs());
        if x < 0.0 {
            CurvePoint {
                value: -point.value,
                slope: point.slope,
                bend: -point.bend,
            }
        } else {
            point
        }
    }

    /// ∫₀ˣ of the odd continuation: the energy stored in the law.
    pub fn odd_energy(&self, x: f64) -> f64 {
        let x = x.abs();
        let mut energy = 0.0;
        for i in 0..self.count {
            let from = self.at[i];
            let to = if i + 1 < self.count {
                x.min(self.at[i + 1])
            } else {
                x
            };
            if to <= from {
                break;
            }
            // Simpson's rule is exact for the cubic.
            let middle = self.at(0.5 * (from + to)).value;
            energy += (to - from) / 6.0 * (self.at(from).value + 4.0 * middle + self.at(to).value);
        }
        energy
    }

    /// Where the curve, rising from the origin, has the value `y` ≥ 0.
    pub fn inverse(&self, y: f64) -> f64 {
        let last = self.count - 1;
        if y >= self.value[last] {
            return self.at[last] + (y - self.value[last]) / self.slope[last];
        }
        let (mut low, mut high) = (self.at[0], self.at[last]);
        if y <= self.value[0] {
            return low + (y - self.value[0]) / self.slope[0];
        }
        // Newton kept in its bracket.
        let mut x = low + (high - low) * (y - self.value[0]) / (self.value[last] - self.value[0]);
        for _ in 0..100 {
            let point = self.at(x);
            if point.value > y {
                high = x;
            } else {
                low = x;
            }
            let next = x - (point.value - y) / point.slope;
            let next = if next > low && next < high {
                next
            } else {
                0.5 * (low + high)
            };
            if (next - x).abs() <= 4.0 * f64::EPSILON * next.abs() {
                return next;
            }
            x = next;
        }
        x
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rubber() -> Curve {
        Curve::odd(&[(0.0, 0.0), (1.0, 2.0), (2.0, 6.0), (2.5, 12.0)]).expect("rises")
    }

    #[test]
    fn it_passes_through_its_points_and_rises() {
        let curve = rubber();
        for (x, y) in curve.points().collect::<Vec<_>>() {
            approx::assert_abs_diff_eq!(curve.at(x).value, y, epsilon = 1e-14);
            approx::assert_abs_diff_eq!(curve.inverse(y), x, epsilon = 1e-12);
        }
        let mut before = -1.0;
        for i in 0..=400 {
            let value = curve.at(0.01 * f64::from(i)).value;
            assert!(value > before);
            before = value;
        }
        assert_eq!(curve.odd_at(-1.3).value, -curve.at(1.3).value);
    }

    #[test]
    fn slopes_energy_and_inverse_agree_with_differences() {
        let curve = rubber();
        let step = 1e-6;
        for x in [-3.0, -1.2, 0.3, 1.7, 2.2, 3.1] {
            let point = curve.odd_at(x);
            let (up, down) = (curve.odd_at(x + step), curve.odd_at(x - step));
            approx::assert_abs_diff_eq!(
                (up.value - down.value) / (2.0 * step),
                point.slope,
                epsilon = 1e-7
            );
            approx::assert_abs_diff_eq!(
                (up.slope - down.slope) / (2.0 * step),
                point.bend,
                epsilon = 1e-6
            );
            let work = (curve.odd_energy(x + step) - curve.odd_energy(x - step)) / (2.0 * step);
            approx::assert_abs_diff_eq!(work, point.value, epsilon = 1e-7);
            if x > 0.0 {
                approx::assert_abs_diff_eq!(curve.inverse(point.value), x, epsilon = 1e-12);
            }
        }
    }

    #[test]
    fn tables_that_do_not_rise_are_refused() {
        assert!(Curve::through(&[(0.0, 0.0)]).is_none());
        assert!(Curve::through(&[(0.0, 0.0), (0.0, 1.0)]).is_none());
        assert!(Curve::odd(&[(0.0, 0.0), (1.0, 0.0)]).is_none());
        assert!(Curve::odd(&[(0.1, 0.1), (1.0, 2.0)]).is_none());
    }
}
