//! Roots of a scalar function by bisection: slow, and without a way to go wrong.

/// The root of `f` in `[low, high]`, at whose ends `f` has different signs, to the last bit that
/// bisection can give.
pub fn bisect(f: impl Fn(f64) -> f64, mut low: f64, mut high: f64) -> f64 {
    let positive_below = f(low) > 0.0;
    assert_ne!(positive_below, f(high) > 0.0, "no change of sign to bisect");
    loop {
        let middle = 0.5 * (low + high);
        if middle <= low || middle >= high {
            return middle;
        }
        if (f(middle) > 0.0) == positive_below {
            low = middle;
        } else {
            high = middle;
        }
    }
}

/// The smallest point of (0, 1) where `f`, positive at first, stops being positive; `None` where
/// it stays positive.
///
/// `f` is looked at on a fine grid (even, and in steps of 1 % from 1e-9) and at `suspects` (a place where it is known to be least). Where
/// three neighbours show a minimum, the minimum itself is looked at too, so that a pair of close
/// roots is not stepped over.
pub fn first_loss(f: impl Fn(f64) -> f64, suspects: &[f64]) -> Option<f64> {
    const CELLS: u32 = 4000;
    let mut points: Vec<f64> = (1..CELLS)
        .map(|i| f64::from(i) / f64::from(CELLS))
        .chain((0..1250).map(|i| 1e-9 * 1.01_f64.powi(i)))
        .chain([1.0 - 1e-12])
        .chain(suspects.iter().copied().filter(|x| *x > 0.0 && *x < 1.0))
        .collect();
    points.sort_by(f64::total_cmp);
    let values: Vec<f64> = points.iter().map(|x| f(*x)).collect();
    if values[0] <= 0.0 {
        return Some(0.0);
    }
    for i in 1..points.len() {
        if values[i] <= 0.0 {
            return Some(bisect(&f, points[i - 1], points[i]));
        }
        let dips = i + 1 < points.len()
            && values[i + 1] > 0.0
            && values[i] <= values[i - 1]
            && values[i] <= values[i + 1];
        if dips {
            let least = minimum(&f, points[i - 1], points[i + 1]);
            if f(least) <= 0.0 {
                return Some(bisect(&f, points[i - 1], least));
            }
        }
    }
    None
}

/// Place of the minimum of `f` between `low` and `high`, by golden section.
fn minimum(f: impl Fn(f64) -> f64, mut low: f64, mut high: f64) -> f64 {
    let golden = 0.5 * (5.0_f64.sqrt() - 1.0);
    while high - low > 1e-10 {
        let (left, right) = (high - golden * (high - low), low + golden * (high - low));
        if f(left) < f(right) {
            high = right;
        } else {
            low = left;
        }
    }
    0.5 * (low + high)
}
