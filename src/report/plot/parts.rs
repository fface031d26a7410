//! The path in two parts: up to one of its points, and past it.

use std::array::from_fn;

/// A path up to the point `at` and what follows; nothing follows where there is no such point.
pub fn parted<const N: usize>(
    points: &[[f64; N]],
    at: Option<[f64; N]>,
) -> (Vec<[f64; N]>, Vec<[f64; N]>) {
    let finite = at.filter(|at| at.iter().all(|value| value.is_finite()));
    let Some((at, after)) = finite.and_then(|at| Some((at, piece_with(points, at)?))) else {
        return (points.to_vec(), Vec::new());
    };
    let mut before = points[..=after].to_vec();
    before.push(at);
    let mut past = vec![at];
    past.extend_from_slice(&points[after + 1..]);
    (before, past)
}

/// Index of the piece between two neighbouring points that passes nearest to `at`.
fn piece_with<const N: usize>(points: &[[f64; N]], at: [f64; N]) -> Option<usize> {
    let sizes: [f64; N] = from_fn(|i| {
        let largest = points.iter().map(|p| p[i].abs()).fold(0.0, f64::max);
        if largest > 0.0 { largest } else { 1.0 }
    });
    let distance = |pair: &[[f64; N]]| -> f64 {
        let along: [f64; N] = from_fn(|i| (pair[1][i] - pair[0][i]) / sizes[i]);
        let to: [f64; N] = from_fn(|i| (at[i] - pair[0][i]) / sizes[i]);
        let dot = |a: [f64; N], b: [f64; N]| -> f64 { a.iter().zip(b).map(|(a, b)| a * b).sum() };
        let length = dot(along, along);
        let share = if length > 0.0 {
            (dot(to, along) / length).clamp(0.0, 1.0)
        } else {
            0.0
        };
        let off: [f64; N] = from_fn(|i| to[i] - share * along[i]);
        dot(off, off)
    };
    (0..points.len().saturating_sub(1)).min_by(|a, b| {
        let to = |index: usize| distance(&points[index..index + 2]);
        to(*a).total_cmp(&to(*b))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A path that turns back in deflection: the point is found by all three of its numbers.
    #[test]
    fn the_piece_is_the_one_the_point_lies_on() {
        let points = [
            [0.0, 0.0, 0.0],
            [10.0, 5.0, 1.0],
            [8.0, 3.0, 4.0],
            [12.0, 2.0, 9.0],
        ];
        let (before, past) = parted(&points, Some([9.0, 4.0, 2.5]));
        assert_eq!(before.len(), 3);
        assert_eq!(past, [[9.0, 4.0, 2.5], points[2], points[3]]);
        assert_eq!(parted(&points, None).1.len(), 0);
        assert_eq!(parted(&points, Some([f64::NAN, 0.0, 0.0])).0.len(), 4);
        assert_eq!(parted(&points[..1], Some(points[0])).0, points[..1]);
        assert!(parted(&[], Some(points[0])).1.is_empty());
    }
}
