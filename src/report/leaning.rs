//! The stretches of a spring that lean on a guide, put together into places.

use crate::result::Leaning;

/// A place at which the spring leans on a guide.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Where it begins along the deformable length, m from the bottom, spring unloaded.
    pub from_m: f64,
    /// Where it ends, m.
    pub to_m: f64,
    /// Whether it is on the guide's + side.
    pub positive: bool,
    /// Force across the guide, N.
    pub force_n: f64,
    /// The part of it on the corner at the end of a guide, N.
    pub corner_force_n: f64,
    /// Whether all of it is on corners.
    pub corner_only: bool,
}

impl Place {
    fn of(stretch: &Leaning) -> Self {
        let force_n = stretch.force_n_per_m * (stretch.to_m - stretch.from_m);
        Place {
            from_m: stretch.from_m,
            to_m: stretch.to_m,
            positive: stretch.side > 0.0,
            force_n,
            corner_force_n: if stretch.at_corner { force_n } else { 0.0 },
            corner_only: stretch.at_corner,
        }
    }

    /// "+" or "-".
    pub fn sign(&self) -> &'static str {
        if self.positive { "+" } else { "-" }
    }

    /// What it is, in words.
    pub fn place_word(&self) -> &'static str {
        if self.corner_only {
            "corner at a guide's end"
        } else {
            "along a guide"
        }
    }
}

/// Stretches from bottom to top, those on the same side less than a `pitch` (m) apart as one: the
/// coils between bear them together.
pub fn places(leaning: &[Leaning], pitch: f64) -> Vec<Place> {
    let mut places: Vec<Place> = Vec::new();
    for next in leaning.iter().map(Place::of) {
        match places.last_mut() {
            Some(last) if last.positive == next.positive && next.from_m - last.to_m < pitch => {
                last.to_m = next.to_m;
                last.force_n += next.force_n;
                last.corner_force_n += next.corner_force_n;
                last.corner_only &= next.corner_only;
            }
            _ => places.push(next),
        }
    }
    places
}

#[cfg(test)]
mod tests {
    use super::*;

    fn stretch(from_m: f64, side: f64, at_corner: bool) -> Leaning {
        Leaning {
            from_m,
            to_m: from_m + 0.01,
            side,
            force_n_per_m: 200.0,
            at_corner,
        }
    }

    #[test]
    fn stretches_are_one_place_until_side_or_gap_part_them() {
        let leaning = [
            stretch(0.00, 1.0, false),
            stretch(0.01, 1.0, true),
            stretch(0.02, -1.0, true),
            stretch(0.05, -1.0, false),
        ];
        let places = places(&leaning, 0.015);
        assert_eq!(places.len(), 3);
        approx::assert_abs_diff_eq!(places[0].force_n, 4.0, epsilon = 1e-12);
        approx::assert_abs_diff_eq!(places[0].corner_force_n, 2.0, epsilon = 1e-12);
        assert_eq!((places[0].from_m, places[0].to_m), (0.0, 0.02));
        assert!(!places[0].corner_only && places[1].corner_only && !places[2].corner_only);
        assert_eq!([places[0].sign(), places[1].sign()], ["+", "-"]);
        assert!(super::places(&[], 0.01).is_empty());
    }
}
