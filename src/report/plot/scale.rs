//! Round numbers on axes, lines cut off at the edges, labels kept apart.

use std::ops::RangeInclusive;

/// An axis: its range and the round numbers on it.
#[derive(Clone, Debug, PartialEq)]
pub struct Axis {
    /// Lower end.
    pub from: f64,
    /// Upper end.
    pub to: f64,
    /// Round numbers from lower to upper end.
    pub ticks: Vec<f64>,
    /// Decimals that all of them need.
    pub decimals: usize,
}

impl Axis {
    /// An axis over `from..to` with about `count` round numbers. A range without extent, or one
    /// that is not finite, becomes 0..1.
    pub fn over(from: f64, to: f64, count: usize) -> Self {
        let extent = to - from;
        let (from, to) = if extent.is_finite() && extent > 0.0 {
            (from, to)
        } else {
            (0.0, 1.0)
        };
        let rough = (to - from) / count.max(1) as f64;
        let power = 10f64.powf(rough.log10().floor());
        let step = [1.0, 2.0, 5.0, 10.0]
            .into_iter()
            .map(|round| round * power)
            .find(|step| *step >= 0.999 * rough)
            .unwrap_or(10.0 * power);
        let first = (from / step - 1e-9).ceil();
        let last = (to / step + 1e-9).floor();
        let ticks = (0..=(last - first).max(0.0) as usize)
            .map(|number| (first + number as f64) * step)
            .collect();
        let decimals = (-step.log10() - 1e-9).ceil().clamp(0.0, 9.0) as usize;
        Axis {
            from,
            to,
            ticks,
            decimals,
        }
    }

    /// Whether `value` lies on it.
    pub fn contains(&self, value: f64) -> bool {
        (self.from..=self.to).contains(&value)
    }
}

/// The polyline cut off at the edges of the box: its pieces inside.
pub fn clipped(
    line: &[(f64, f64)],
    x: RangeInclusive<f64>,
    y: RangeInclusive<f64>,
) -> Vec<Vec<(f64, f64)>> {
    let mut pieces: Vec<Vec<(f64, f64)>> = Vec::new();
    let mut joined = false;
    for pair in line.windows(2) {
        let Some((start, end)) = segment(pair[0], pair[1], &x, &y) else {
            joined = false;
            continue;
        };
        match pieces.last_mut() {
            Some(piece) if joined => piece.push(end),
            _ => pieces.push(vec![start, end]),
        }
        joined = end == pair[1];
    }
    pieces
}

/// The part of a segment inside the box (Liang and Barsky).
fn segment(
    a: (f64, f64),
    b: (f64, f64),
    x: &RangeInclusive<f64>,
    y: &RangeInclusive<f64>,
) -> Option<((f64, f64), (f64, f64))> {
    let (dx, dy) = (b.0 - a.0, b.1 - a.1);
    if !(dx.is_finite() && dy.is_finite()) {
        return None;
    }
    let (mut enter, mut leave) = (0.0f64, 1.0f64);
    let edges = [
        (-dx, a.0 - x.start()),
        (dx, x.end() - a.0),
        (-dy, a.1 - y.start()),
        (dy, y.end() - a.1),
    ];
    for (outward, room) in edges {
        if outward == 0.0 {
            if room < 0.0 {
                return None;
            }
        } else if outward < 0.0 {
            enter = enter.max(room / outward);
        } else {
            leave = leave.min(room / outward);
        }
    }
    if enter > leave {
        return None;
    }
    let at = |t: f64| {
        if t == 1.0 {
            b
        } else {
            (a.0 + t * dx, a.1 + t * dy)
        }
    };
    Some((at(enter), at(leave)))
}

/// Places for labels as near as may be (least squares) to where they belong, in the same order
/// and at least `gap` apart, inside the range if there is room. `wanted` ascends.
pub fn apart(wanted: &[f64], gap: f64, range: RangeInclusive<f64>) -> Vec<f64> {
    // With i·gap taken off, "at least gap apart" becomes "not descending": pool neighbours that
    // descend until none does.
    let mut pools: Vec<(f64, usize)> = Vec::new();
    for (number, place) in wanted.iter().enumerate() {
        let mut pool = (place - number as f64 * gap, 1);
        while let Some(previous) = pools.last().copied() {
            if previous.0 <= pool.0 {
                break;
            }
            pools.pop();
            let count = previous.1 + pool.1;
            let sum = previous.0 * previous.1 as f64 + pool.0 * pool.1 as f64;
            pool = (sum / count as f64, count);
        }
        pools.push(pool);
    }
    let room = (range.end() - range.start() - gap * wanted.len().saturating_sub(1) as f64).max(0.0);
    pools
        .iter()
        .flat_map(|(place, count)| std::iter::repeat_n(*place, *count))
        .enumerate()
        .map(|(number, place)| {
            place.clamp(*range.start(), range.start() + room) + number as f64 * gap
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ticks_are_round() {
        let axis = Axis::over(0.0, 62.0, 6);
        assert_eq!(axis.ticks, [0.0, 20.0, 40.0, 60.0]);
        assert_eq!(axis.decimals, 0);
        assert_eq!(Axis::over(0.0, 0.0234, 5).ticks.len(), 5);
        assert_eq!(Axis::over(0.0, 0.0234, 5).decimals, 3);
        assert_eq!(Axis::over(0.0, 0.0, 5).to, 1.0);
        assert_eq!(Axis::over(0.0, f64::NAN, 5).to, 1.0);
    }

    #[test]
    fn lines_end_at_the_edge() {
        let line = [(0.0, 0.0), (2.0, 2.0), (3.0, 0.0)];
        let pieces = clipped(&line, 0.0..=4.0, 0.0..=1.0);
        assert_eq!(
            pieces,
            [vec![(0.0, 0.0), (1.0, 1.0)], vec![(2.5, 1.0), (3.0, 0.0)]]
        );
        assert!(clipped(&[(f64::NAN, 0.0), (1.0, 1.0)], 0.0..=4.0, 0.0..=1.0).is_empty());
    }

    #[test]
    fn labels_are_kept_apart_and_in_order() {
        let places = apart(&[10.0, 10.5, 11.0, 50.0], 5.0, 0.0..=60.0);
        assert_eq!(places, [5.5, 10.5, 15.5, 50.0]);
        let crowded = apart(&[58.0, 59.0, 60.0], 5.0, 0.0..=60.0);
        assert_eq!(crowded, [50.0, 55.0, 60.0]);
    }
}
