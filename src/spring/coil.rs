//! The spring as resolved from a case file: everything decided, at service temperature.

use super::{EndType, Section, TurnCompliance, Wire};
use crate::units::{Metre, NewtonPerMetre, Pascal};

/// Which way the coil is wound. The planar column does not feel it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Hand {
    /// Right-hand helix.
    Right,
    /// Left-hand helix.
    Left,
}

/// A cylindrical helical compression spring of constant pitch, all values at service temperature.
#[derive(Clone, Debug, PartialEq)]
pub struct Spring {
    /// Cross-section of the wire.
    pub wire: Wire,
    /// Mean coil diameter D, m.
    pub mean_diameter: Metre,
    /// Free length L0, m.
    pub free_length: Metre,
    /// Active coils n.
    pub active_coils: f64,
    /// Total coils n_t.
    pub total_coils: f64,
    /// How the ends are made.
    pub ends: EndType,
    /// Which way it is wound.
    pub hand: Hand,
    /// Young's modulus E of the wire, Pa.
    pub youngs_modulus: Pascal,
    /// Shear modulus G of the wire, Pa.
    pub shear_modulus: Pascal,
    /// The measured axial rate, N/m, where there is one: it replaces the formula's rate, and
    /// with it scales every stiffness.
    pub measured_rate: Option<NewtonPerMetre>,
    /// Solid length, m.
    pub solid_length: Metre,
    /// The rule that gave the solid length, in words.
    pub solid_rule: &'static str,
}

impl Spring {
    /// Mean coil radius R = D/2, m.
    pub fn mean_radius(&self) -> Metre {
        self.mean_diameter / 2.0
    }

    /// Outer diameter, m.
    pub fn outer_diameter(&self) -> Metre {
        self.mean_diameter + self.wire.radial_size()
    }

    /// Inner diameter, m.
    pub fn inner_diameter(&self) -> Metre {
        self.mean_diameter - self.wire.radial_size()
    }

    /// Spring index w = D / (wire size along the radius).
    pub fn index(&self) -> f64 {
        self.mean_diameter / self.wire.radial_size()
    }

    /// Axial rate by the formula, N/m: 1/(n·c) with c the axial compliance of a turn; for round
    /// wire G d⁴/(8 D³ n).
    pub fn formula_rate(&self) -> NewtonPerMetre {
        1.0 / (self.active_coils * self.formula_compliance().axial)
    }

    /// Axial rate used, N/m: the measured one, else the formula's.
    pub fn rate(&self) -> NewtonPerMetre {
        self.measured_rate.unwrap_or_else(|| self.formula_rate())
    }

    /// Compliance of a turn, scaled so that it gives [`Spring::rate`].
    pub fn turn_compliance(&self) -> TurnCompliance {
        self.formula_compliance()
            .scaled(self.formula_rate() / self.rate())
    }

    fn formula_compliance(&self) -> TurnCompliance {
        TurnCompliance::of(
            &self.wire,
            self.mean_radius(),
            self.youngs_modulus,
            self.shear_modulus,
        )
    }

    /// Slenderness Λ = L0/D.
    pub fn slenderness(&self) -> f64 {
        self.free_length / self.mean_diameter
    }

    /// Largest deflection, free to solid, m.
    pub fn solid_deflection(&self) -> Metre {
        self.free_length - self.solid_length
    }

    /// Height of the dead coils at *both* ends together, m: L_s − n·d, so that the active coils
    /// close exactly when the spring is solid.
    pub fn dead_height(&self) -> Metre {
        self.solid_length - self.active_coils * self.wire.axial_size()
    }

    /// Length of the active part of the free spring, m: L_a = L0 − dead height.
    pub fn deformable_length(&self) -> Metre {
        self.free_length - self.dead_height()
    }

    /// Pitch of the active coils, m: L_a / n.
    pub fn pitch(&self) -> Metre {
        self.deformable_length() / self.active_coils
    }

    /// Stiffnesses of the equivalent column of the given free length, m: the whole free length
    /// for the closed form's idealisation, [`Spring::deformable_length`] for the column as built.
    pub fn section(&self, column_length: Metre) -> Section {
        self.turn_compliance()
            .section(column_length / self.active_coils)
    }
}
