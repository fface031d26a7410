//! Energy of the discrete column, its gradient and its second derivatives.

use super::band::Band;
use super::path::Hold;
use crate::reference::shooting::Rod;

/// The column cut into segments. Unknowns: u = x − S, y, θ of each node from the bottom.
pub struct Beam<'a> {
    pub rod: &'a Rod,
    pub ends: [&'a Hold; 2],
    pub segments: usize,
    /// Dead load on the top, towards the bottom.
    pub load: f64,
}

/// First and second derivatives of a segment's strains, in the order of the six displacements
/// (u, y, θ of its lower node, then of its upper one).
struct Strain {
    value: f64,
    slope: [f64; 6],
    bend: [[f64; 6]; 6],
}

impl Beam<'_> {
    /// Length of a segment.
    pub fn cell(&self) -> f64 {
        self.rod.length / self.segments as f64
    }

    /// Energy, the load's included.
    pub fn energy(&self, at: &[f64]) -> f64 {
        let cell = self.cell();
        let column: f64 = (0..self.segments)
            .map(|i| {
                let [stretch, slide, curve] = self.strains(at, i);
                0.5 * cell
                    * (self.rod.axial * stretch.powi(2)
                        + self.rod.shear * slide.powi(2)
                        + self.rod.bending * curve.powi(2))
            })
            .sum();
        let seats: f64 = self
            .springs()
            .map(|(place, stiffness, rest)| 0.5 * stiffness * (at[place] - rest).powi(2))
            .sum();
        column + seats + self.load * at[3 * self.segments]
    }

    /// Gradient of the energy.
    pub fn gradient(&self, at: &[f64]) -> Vec<f64> {
        let mut gradient = vec![0.0; at.len()];
        for i in 0..self.segments {
            for (stiffness, strain) in self.stiff_strains(at, i) {
                for a in 0..6 {
                    gradient[3 * i + a] += stiffness * strain.value * strain.slope[a];
                }
            }
        }
        for (place, stiffness, rest) in self.springs() {
            gradient[place] += stiffness * (at[place] - rest);
        }
        gradient[3 * self.segments] += self.load;
        gradient
    }

    /// Second derivatives of the energy.
    pub fn hessian(&self, at: &[f64]) -> Band {
        let mut hessian = Band::zeros(at.len());
        for i in 0..self.segments {
            for (stiffness, strain) in self.stiff_strains(at, i) {
                for a in 0..6 {
                    for b in 0..=a {
                        let value =
                            strain.slope[a] * strain.slope[b] + strain.value * strain.bend[a][b];
                        hessian.add(3 * i + a, 3 * i + b, stiffness * value);
                    }
                }
            }
        }
        for (place, stiffness, _) in self.springs() {
            hessian.add(place, place, stiffness);
        }
        hessian
    }

    /// ε, γ and κ in the middle of segment `i`. Nothing is lost where they are small.
    pub fn strains(&self, at: &[f64], i: usize) -> [f64; 3] {
        let (along, across, turn, mean) = self.middle(at, i);
        let (sin, cos) = mean.sin_cos();
        let less = -2.0 * (0.5 * mean).sin().powi(2);
        [
            along * cos + less + across * sin,
            across * cos - (1.0 + along) * sin,
            turn - (self.rod.natural_curvature)((i as f64 + 0.5) * self.cell()),
        ]
    }

    /// u', y', θ' and θ in the middle of segment `i`.
    fn middle(&self, at: &[f64], i: usize) -> (f64, f64, f64, f64) {
        let cell = self.cell();
        let (low, high) = (&at[3 * i..3 * i + 3], &at[3 * i + 3..3 * i + 6]);
        (
            (high[0] - low[0]) / cell,
            (high[1] - low[1]) / cell,
            (high[2] - low[2]) / cell,
            0.5 * (high[2] + low[2]),
        )
    }

    /// The three strains of segment `i`, each with its stiffness times the segment's length.
    fn stiff_strains(&self, at: &[f64], i: usize) -> [(f64, Strain); 3] {
        let cell = self.cell();
        let [stretch, slide, curve] = self.strains(at, i);
        let (along, across, _, mean) = self.middle(at, i);
        let (sin, cos) = mean.sin_cos();
        // By (u', y', θ): ε has the slopes (cos, sin, γ), γ has (−sin, cos, −(1 + ε)).
        let one_more = (1.0 + along) * cos + across * sin;
        let strain = |value: f64, slope: [f64; 3], cross: [f64; 2], twice: f64| {
            let by = |a: usize| match a {
                0 | 1 => -1.0 / cell,
                3 | 4 => 1.0 / cell,
                _ => 0.5,
            };
            let of = |a: usize| a % 3;
            let second = |a: usize, b: usize| match (of(a), of(b)) {
                (2, 2) => twice,
                (2, other) | (other, 2) => cross[other],
                _ => 0.0,
            };
            Strain {
                value,
                slope: std::array::from_fn(|a| slope[of(a)] * by(a)),
                bend: std::array::from_fn(|a| {
                    std::array::from_fn(|b| second(a, b) * by(a) * by(b))
                }),
            }
        };
        let mut turn = Strain {
            value: curve,
            slope: [0.0; 6],
            bend: [[0.0; 6]; 6],
        };
        turn.slope[2] = -1.0 / cell;
        turn.slope[5] = 1.0 / cell;
        [
            (
                self.rod.axial * cell,
                strain(stretch, [cos, sin, slide], [-sin, cos], -one_more),
            ),
            (
                self.rod.shear * cell,
                strain(slide, [-sin, cos, -one_more], [-cos, -sin], -slide),
            ),
            (self.rod.bending * cell, turn),
        ]
    }

    /// Ends that give: the unknown, its stiffness and where it rests.
    fn springs(&self) -> impl Iterator<Item = (usize, f64, f64)> {
        [0, self.segments]
            .into_iter()
            .zip(self.ends)
            .flat_map(|(node, hold)| {
                [
                    (3 * node + 1, hold.sideways, hold.offset),
                    (3 * node + 2, hold.rotation, hold.angle),
                ]
            })
            .filter(|(_, stiffness, _)| stiffness.is_finite() && *stiffness > 0.0)
    }
}
