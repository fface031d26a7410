//! Names for `f64` in SI, and the table of unit symbols. Inside the program every quantity is SI
//! (temperatures in °C); text becomes numbers in `case` and numbers become text in `report`, both
//! by the table in this module.

mod expression;
mod show;
mod table;

pub use expression::{Unit, UnitError};
pub use show::{
    DEGREE, DEGREE_CELSIUS, GIGAPASCAL, INCH, JOULE, KILOGRAM_PER_CUBIC_METRE, KSI, MEGAPASCAL,
    MILLIMETRE, NEWTON, NEWTON_METRE, NEWTON_METRE_PER_RADIAN, NEWTON_PER_MILLIMETRE, PER_KELVIN,
    POUND_FORCE, POUND_FORCE_INCH, POUND_FORCE_INCH_PER_RADIAN, POUND_FORCE_PER_INCH, ShownUnit,
    significant,
};
pub use table::{Dimension, Symbol, symbols};

/// Length, m.
pub type Metre = f64;
/// Force, N.
pub type Newton = f64;
/// Stress or modulus, Pa.
pub type Pascal = f64;
/// Plane angle, rad.
pub type Radian = f64;
/// Temperature, °C in the setup (service temperature), K as a difference.
pub type Celsius = f64;
/// Translational stiffness, N/m.
pub type NewtonPerMetre = f64;
/// Rotational stiffness, N·m/rad.
pub type NewtonMetrePerRadian = f64;
/// Moment, N·m.
pub type NewtonMetre = f64;
/// Energy, J.
pub type Joule = f64;
