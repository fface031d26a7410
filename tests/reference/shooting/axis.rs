//! One sweep along the axis: the initial value problem.
//!
//! The integrator is `ode_solvers::Dop853`, a general crate with an explicit pair of order 8: the
//! equations are smooth and not stiff, and 1e-13 costs it some twenty steps. Version 0.6.2 has
//! c₁₂ = c₁₃ = 0 where the method has 1, so it is wrong for a right side that depends on the independent
//! variable. S is therefore carried as a fifth component with S' = 1, which the fault cannot reach.

use ode_solvers::dop_shared::{OutputType, System};
use ode_solvers::{Dop853, Vector5};

/// The flexible part of the column.
pub struct Rod {
    /// EA; may be infinite.
    pub axial: f64,
    /// GA; may be infinite.
    pub shear: f64,
    /// EI.
    pub bending: f64,
    /// Length L along the stress-free axis.
    pub length: f64,
    /// Natural curvature κ0 at S ∈ [0, L], in 1/length.
    pub natural_curvature: Box<dyn Fn(f64) -> f64>,
}

impl Rod {
    /// Straight when free of stress.
    pub fn straight(axial: f64, shear: f64, bending: f64, length: f64) -> Rod {
        Rod {
            axial,
            shear,
            bending,
            length,
            natural_curvature: Box::new(|_| 0.0),
        }
    }

    /// The spring of E/G = `r` and L/D = `slenderness` with L = 1 and k = 1:
    /// EA = 1, GA = r, EI = r/(2(2 + r)Λ²). P is then ξ on the straight path.
    pub fn of_spring(r: f64, slenderness: f64) -> Rod {
        Rod::straight(1.0, r, r / (2.0 * (2.0 + r) * slenderness.powi(2)), 1.0)
    }

    /// The same with the natural curvature `curvature(S)`.
    pub fn curved(self, curvature: impl Fn(f64) -> f64 + 'static) -> Rod {
        Rod {
            natural_curvature: Box::new(curvature),
            ..self
        }
    }

    /// The same with a half-sine bow: κ0 = −A(π/L)² sin(πS/L), so θ = A(π/L) cos(πS/L) when free
    /// of stress and with its middle parallel to the line of load, and y = A sin(πS/L) to second
    /// order in A/L.
    pub fn bowed(self, height: f64) -> Rod {
        let wave = std::f64::consts::PI / self.length;
        self.curved(move |s| -height * wave.powi(2) * (wave * s).sin())
    }
}

/// A section of the deformed column.
#[derive(Clone, Copy, Debug)]
pub struct Station {
    /// Place along the stress-free axis, from the bottom.
    pub s: f64,
    /// Along the line of load; the bottom's pivot is at 0.
    pub x: f64,
    /// Sideways.
    pub y: f64,
    /// Rotation of the section, rad.
    pub theta: f64,
    /// Moment.
    pub moment: f64,
}

/// The beam's equations in units of L and EI.
pub(super) struct Axis<'a> {
    pub rod: &'a Rod,
    /// P L²/EI.
    pub load: f64,
    /// H L²/EI.
    pub side: f64,
}

/// x, y, θ, M, and S itself.
pub(super) type Section = Vector5<f64>;

impl Axis<'_> {
    /// (x', y') of a section that has turned by θ.
    pub fn direction(&self, theta: f64) -> (f64, f64) {
        let unit = self.rod.bending / self.rod.length.powi(2);
        let (sin, cos) = theta.sin_cos();
        let stretch = 1.0 + (-self.load * cos + self.side * sin) * unit / self.rod.axial;
        let slide = (self.load * sin + self.side * cos) * unit / self.rod.shear;
        (stretch * cos - slide * sin, stretch * sin + slide * cos)
    }

    /// Carries a section from `from` to `to` (shares of L). `None` where the integrator gives up.
    pub fn carry(&self, from: f64, to: f64, section: Section) -> Option<Section> {
        const TOLERANCE: f64 = 1e-13;
        if from == to {
            return Some(section);
        }
        let mut start = section;
        start[4] = from;
        let mut sweep = Dop853::new(self, from, to, to - from, start, TOLERANCE, TOLERANCE);
        sweep.set_output(OutputType::Sparse);
        sweep.integrate().ok()?;
        sweep.y_out().last().copied()
    }
}

impl System<f64, Section> for &Axis<'_> {
    fn system(&self, _: f64, section: &Section, slope: &mut Section) {
        let length = self.rod.length;
        let (x, y) = self.direction(section[2]);
        slope[0] = x;
        slope[1] = y;
        slope[2] = section[3] + length * (self.rod.natural_curvature)(section[4] * length);
        slope[3] = -(x * self.side + y * self.load);
        slope[4] = 1.0;
    }
}
