//! The column between two walls for small rotations, bending only, no friction: EI y'''' + P y'' =
//! contact. Both walls are h from the straight axis. Derived here; the loads at which the phases
//! change are those of Chai, J. Mech. Phys. Solids 46 (1998).
//!
//! k² = P/EI, u = kL/2. With C the first critical load (π²EI/L² hinged, 4π²EI/L² clamped):
//!
//! **Point contact in the middle**, from C to 4 C; wall force Q on the middle, half of it at each
//! seat, y'(L/2) = 0, y(L/2) = h, x from a seat:
//!
//!     hinged    y = B (x − sin kx/(k cos u)),                       h = B (L/2)(1 − tan u/u)
//!     clamped   y = B (x − sin kx/k − tan(u/2)(1 − cos kx)/k),      h = B (L/2)(1 − tan(u/2)/(u/2))
//!
//! with B = Q/2P. The moment in the middle is nought at 4 C: from there the column lies flat.
//!
//! **Line contact**, from 4 C: y'' = 0 at the flat's edge, so the free part at each end is as long
//! as half a wave (hinged: kℓ = π) or a whole one (clamped: kℓ = 2π), B = h/ℓ, and Q/2 = P h/ℓ
//! acts at each edge, nothing between. The flat part, clamped and L − 2ℓ long, buckles off the wall
//! at k(L − 2ℓ) = 2π: 16 C hinged, 9 C clamped.

use std::f64::consts::PI;

/// The two ends that are covered, both alike.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ends {
    /// Free to turn.
    Hinged,
    /// Kept from turning.
    Clamped,
}

/// A state between walls. Units: L and EI are 1 (loads in EI/L²), heights in h.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Contact {
    /// Force of the wall on the whole column, in EI h/L³.
    pub force: f64,
    /// Share of the length that lies flat; 0 for a point.
    pub flat: f64,
    /// Shortening by bending, ½∫y'², in h²/L.
    pub shortening: f64,
}

impl Ends {
    /// Load at which the column first touches, in EI/L².
    pub fn touch(self) -> f64 {
        match self {
            Ends::Hinged => PI.powi(2),
            Ends::Clamped => 4.0 * PI.powi(2),
        }
    }

    /// Load from which it lies flat: where y'' in the middle is nought.
    pub fn flatten(self) -> f64 {
        4.0 * self.touch()
    }

    /// Load at which the flat part buckles.
    pub fn flat_buckles(self) -> f64 {
        match self {
            Ends::Hinged => 16.0 * self.touch(),
            Ends::Clamped => 9.0 * self.touch(),
        }
    }

    /// The contact under `load`; `None` outside of touch … flat part buckles.
    pub fn contact(self, load: f64) -> Option<Contact> {
        if load < self.touch() || load > self.flat_buckles() {
            return None;
        }
        let wave = load.sqrt();
        if load <= self.flatten() {
            let half = 0.5 * wave;
            let ratio = match self {
                Ends::Hinged => half.tan() / half,
                Ends::Clamped => (0.5 * half).tan() / (0.5 * half),
            };
            let slope = 2.0 / (1.0 - ratio);
            return Some(Contact {
                force: 2.0 * load * slope,
                flat: 0.0,
                shortening: slope.powi(2) * self.half_length(half) / wave,
            });
        }
        let free = match self {
            Ends::Hinged => PI / wave,
            Ends::Clamped => 2.0 * PI / wave,
        };
        // y'/B = 1 + cos kx (hinged), 1 − cos kx (clamped): the mean square is 3/2.
        Some(Contact {
            force: 2.0 * load / free,
            flat: 1.0 - 2.0 * free,
            shortening: 1.5 / free,
        })
    }

    /// y/h at the share `x` of the length under `load`, between touch and flat part buckles.
    pub fn shape(self, load: f64, x: f64) -> Option<f64> {
        let contact = self.contact(load)?;
        let x = x.min(1.0 - x);
        let wave = load.sqrt();
        if contact.flat > 0.0 && x >= 0.5 * (1.0 - contact.flat) {
            return Some(1.0);
        }
        let slope = contact.force / (2.0 * load);
        let half = 0.5 * wave;
        let phase = wave * x;
        let along = match (self, contact.flat > 0.0) {
            (Ends::Hinged, false) => phase - phase.sin() / half.cos(),
            (Ends::Hinged, true) => phase + phase.sin(),
            (Ends::Clamped, false) => {
                phase - phase.sin() - (0.5 * half).tan() * (1.0 - phase.cos())
            }
            (Ends::Clamped, true) => phase - phase.sin(),
        };
        Some(slope * along / wave)
    }

    /// ∫ (y'/B)² d(kx) from 0 to u, point contact.
    fn half_length(self, u: f64) -> f64 {
        let (sin, cos) = u.sin_cos();
        match self {
            // y'/B = 1 − cos kx/cos u
            Ends::Hinged => u - 2.0 * sin / cos + 0.5 * (u + sin * cos) / cos.powi(2),
            // y'/B = 1 − cos kx − t sin kx, t = tan(u/2)
            Ends::Clamped => {
                let t = (0.5 * u).tan();
                u - 2.0 * sin - 2.0 * t * (1.0 - cos)
                    + 0.5 * (u + sin * cos)
                    + 0.5 * t * t * (u - sin * cos)
                    + t * sin.powi(2)
            }
        }
    }
}
