//! Factorisation of a small, dense, symmetric and possibly indefinite matrix, with its inertia.
//!
//! `Pᵀ A P = L D Lᵀ`, D of 1×1 and 2×2 pivots, chosen by Bunch and Kaufman's partial pivoting, so
//! that neither a zero on the diagonal nor an indefinite matrix spoils the accuracy. By Sylvester's
//! law the number of negative eigenvalues of A is that of D.
//!
//! Source: Bunch & Kaufman, Math. Comp. 31 (1977) 163–179; Golub & Van Loan, Matrix
//! Computations, section on symmetric indefinite systems (both from memory).

/// (1 + √17)/8: balances the growth of 1×1 against 2×2 pivots (Bunch & Kaufman).
pub(super) const ALPHA: f64 = 0.640_388_203_202_208_1;

/// What stands on the diagonal of D at one place.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub(super) enum Pivot {
    /// A 1×1 pivot.
    #[default]
    Single,
    /// The first row of a 2×2 pivot.
    First,
    /// Its second row.
    Second,
}

/// What a factorisation found out about its matrix.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Found {
    pub negatives: u32,
    pub smallest_pivot: f64,
}

/// Factors the lower triangle of the n×n matrix `a` (column by column) in place.
#[inline(always)]
pub(super) fn factor(a: &mut [f64], n: usize, kinds: &mut [Pivot], order: &mut [u8]) -> Found {
    let a = &mut a[..n * n];
    let kinds = &mut kinds[..n];
    let order = &mut order[..n];
    let mut largest = 0.0_f64;
    for j in 0..n {
        for i in j..n {
            largest = largest.max(a[i + j * n].abs());
        }
    }
    let floor = (largest * f64::EPSILON).max(f64::MIN_POSITIVE);
    let mut found = Found {
        negatives: 0,
        smallest_pivot: f64::INFINITY,
    };
    let mut k = 0;
    while k < n {
        // The largest entry below the diagonal in column k.
        let mut r = k;
        let mut below = 0.0_f64;
        for i in k + 1..n {
            let size = a[i + k * n].abs();
            if size > below {
                below = size;
                r = i;
            }
        }
        let here = a[k + k * n].abs();
        let mut pair = false;
        let mut swap_with = k;
        if here < ALPHA * below {
            let mut across = 0.0_f64;
            for i in k..n {
                if i != r {
                    across = across.max(entry(a, n, i, r).abs());
                }
            }
            if here * across >= ALPHA * below * below {
                // The diagonal is good enough after all.
            } else if a[r + r * n].abs() >= ALPHA * across {
                swap_with = r;
            } else {
                pair = true;
                swap_with = r;
            }
        }
        let target = if pair { k + 1 } else { k };
        order[k] = k as u8;
        if pair {
            order[k + 1] = k as u8 + 1;
        }
        order[target] = swap_with as u8;
        if swap_with != target {
            interchange(a, n, target, swap_with, k);
        }
        if pair {
            eliminate_pair(a, n, k, floor, &mut found);
            kinds[k] = Pivot::First;
            kinds[k + 1] = Pivot::Second;
            k += 2;
        } else {
            let mut d = a[k + k * n];
            if d.abs() < floor {
                d = if d < 0.0 { -floor } else { floor };
                a[k + k * n] = d;
            }
            found.negatives += u32::from(d < 0.0);
            found.smallest_pivot = found.smallest_pivot.min(d.abs());
            for j in k + 1..n {
                let factor = a[j + k * n] / d;
                for i in j..n {
                    a[i + j * n] -= a[i + k * n] * factor;
                }
            }
            for i in k + 1..n {
                a[i + k * n] /= d;
            }
            kinds[k] = Pivot::Single;
            k += 1;
        }
    }
    found.smallest_pivot /= largest.max(f64::MIN_POSITIVE);
    found
}

/// Eliminates the 2×2 pivot at k, k+1. Bunch and Kaufman choose such a pivot only where its
/// determinant is negative: one negative and one positive eigenvalue.
#[inline(always)]
fn eliminate_pair(a: &mut [f64], n: usize, k: usize, floor: f64, found: &mut Found) {
    let (p, q, s) = (a[k + k * n], a[k + 1 + k * n], a[k + 1 + (k + 1) * n]);
    let q = if q.abs() < floor { floor } else { q };
    a[k + 1 + k * n] = q;
    let determinant = p * s - q * q;
    found.negatives += 1;
    // The smaller eigenvalue in size, from the determinant and a bound of the larger.
    found.smallest_pivot = found
        .smallest_pivot
        .min(determinant.abs() / (p.abs().max(s.abs()) + q.abs()));
    for j in k + 2..n {
        let (u, v) = (a[j + k * n], a[j + (k + 1) * n]);
        let l1 = (u * s - v * q) / determinant;
        let l2 = (v * p - u * q) / determinant;
        for i in j..n {
            a[i + j * n] -= a[i + k * n] * l1 + a[i + (k + 1) * n] * l2;
        }
    }
    for i in k + 2..n {
        let (u, v) = (a[i + k * n], a[i + (k + 1) * n]);
        a[i + k * n] = (u * s - v * q) / determinant;
        a[i + (k + 1) * n] = (v * p - u * q) / determinant;
    }
}

/// Entry (i, j) of the symmetric matrix kept in its lower triangle.
#[inline(always)]
fn entry(a: &[f64], n: usize, i: usize, j: usize) -> f64 {
    if i >= j { a[i + j * n] } else { a[j + i * n] }
}

/// Interchanges rows and columns p < q of the trailing matrix and of the rows of L before `done`.
#[inline(always)]
fn interchange(a: &mut [f64], n: usize, p: usize, q: usize, done: usize) {
    for j in 0..p.min(done) {
        a.swap(p + j * n, q + j * n);
    }
    for j in done..p {
        a.swap(p + j * n, q + j * n);
    }
    a.swap(p + p * n, q + q * n);
    for i in p + 1..q {
        a.swap(i + p * n, q + i * n);
    }
    for i in q + 1..n {
        a.swap(i + p * n, i + q * n);
    }
}

/// Solves with a factor, in place.
#[inline(always)]
pub(super) fn solve(a: &[f64], n: usize, kinds: &[Pivot], order: &[u8], b: &mut [f64]) {
    let (a, kinds, order, b) = (&a[..n * n], &kinds[..n], &order[..n], &mut b[..n]);
    for k in 0..n {
        let other = order[k] as usize;
        if other != k {
            b.swap(k, other);
        }
    }
    for k in 0..n {
        let first = k + 1 + usize::from(kinds[k] == Pivot::First);
        for i in first..n {
            b[i] -= a[i + k * n] * b[k];
        }
    }
    let mut k = 0;
    while k < n {
        if kinds[k] == Pivot::First {
            let (p, q, s) = (a[k + k * n], a[k + 1 + k * n], a[k + 1 + (k + 1) * n]);
            let determinant = p * s - q * q;
            let (u, v) = (b[k], b[k + 1]);
            b[k] = (u * s - v * q) / determinant;
            b[k + 1] = (v * p - u * q) / determinant;
            k += 2;
        } else {
            b[k] /= a[k + k * n];
            k += 1;
        }
    }
    for k in (0..n).rev() {
        let first = k + 1 + usize::from(kinds[k] == Pivot::First);
        let mut sum = b[k];
        for i in first..n {
            sum -= a[i + k * n] * b[i];
        }
        b[k] = sum;
    }
    for k in (0..n).rev() {
        let other = order[k] as usize;
        if other != k {
            b.swap(k, other);
        }
    }
}
