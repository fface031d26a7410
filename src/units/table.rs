//! The table of unit symbols: factor to SI, dimension exponents.
//!
//! Source of the factors: the international yard and pound agreement of 1959 (1 in = 25.4 mm,
//! 1 lb = 0.45359237 kg) and the standard acceleration 9.80665 m/s², all exact (from memory).

/// Exponents of a unit: kilogram, metre, second, kelvin, radian. The angle counts as a dimension
/// of its own, so that "3 deg" is no length and "40 N m" no rotational stiffness.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Dimension {
    /// Exponents in the order kg, m, s, K, rad.
    pub exponents: [i8; 5],
}

impl Dimension {
    /// A pure number.
    pub const NUMBER: Dimension = Dimension::new([0, 0, 0, 0, 0]);
    /// Length.
    pub const LENGTH: Dimension = Dimension::new([0, 1, 0, 0, 0]);
    /// Force.
    pub const FORCE: Dimension = Dimension::new([1, 1, -2, 0, 0]);
    /// Stress or modulus.
    pub const STRESS: Dimension = Dimension::new([1, -1, -2, 0, 0]);
    /// Plane angle.
    pub const ANGLE: Dimension = Dimension::new([0, 0, 0, 0, 1]);
    /// Temperature.
    pub const TEMPERATURE: Dimension = Dimension::new([0, 0, 0, 1, 0]);
    /// Change per kelvin.
    pub const PER_KELVIN: Dimension = Dimension::new([0, 0, 0, -1, 0]);
    /// Translational stiffness, force per length.
    pub const STIFFNESS: Dimension = Dimension::new([1, 0, -2, 0, 0]);
    /// Moment or energy.
    pub const MOMENT: Dimension = Dimension::new([1, 2, -2, 0, 0]);
    /// Rotational stiffness, moment per angle.
    pub const ROTATIONAL_STIFFNESS: Dimension = Dimension::new([1, 2, -2, 0, -1]);
    /// Mass.
    pub const MASS: Dimension = Dimension::new([1, 0, 0, 0, 0]);
    /// Density.
    pub const DENSITY: Dimension = Dimension::new([1, -3, 0, 0, 0]);

    const fn new(exponents: [i8; 5]) -> Self {
        Dimension { exponents }
    }

    /// What it is called, with its article: "a length". Unusual ones by their exponents.
    pub fn title(self) -> String {
        let known = match self {
            Dimension::NUMBER => "a pure number",
            Dimension::LENGTH => "a length",
            Dimension::FORCE => "a force",
            Dimension::STRESS => "a stress or modulus",
            Dimension::ANGLE => "an angle",
            Dimension::TEMPERATURE => "a temperature",
            Dimension::PER_KELVIN => "a change per kelvin",
            Dimension::STIFFNESS => "a stiffness (force per length)",
            Dimension::MOMENT => "a moment or energy",
            Dimension::ROTATIONAL_STIFFNESS => "a rotational stiffness (moment per angle)",
            Dimension::MASS => "a mass",
            Dimension::DENSITY => "a density",
            _ => return self.in_base_units(),
        };
        known.to_string()
    }

    fn in_base_units(self) -> String {
        let parts: Vec<String> = ["kg", "m", "s", "K", "rad"]
            .iter()
            .zip(self.exponents)
            .filter(|(_, exponent)| *exponent != 0)
            .map(|(name, exponent)| match exponent {
                1 => (*name).to_string(),
                _ => format!("{name}^{exponent}"),
            })
            .collect();
        format!("a quantity in {}", parts.join(" "))
    }
}

/// A unit symbol.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Symbol {
    /// As written.
    pub text: &'static str,
    /// One of it in SI.
    pub factor: f64,
    /// Its dimension.
    pub dimension: Dimension,
    /// What its zero is on the scale used inside (°C), where it stands alone. Nought but for
    /// temperatures.
    pub zero: f64,
}

/// Every unit symbol. Spellings of one unit stand next to each other.
pub fn symbols() -> &'static [Symbol] {
    &SYMBOLS
}

/// The symbol so written, to the letter.
pub(super) fn find(text: &str) -> Option<&'static Symbol> {
    SYMBOLS.iter().find(|symbol| symbol.text == text)
}

const fn symbol(text: &'static str, factor: f64, dimension: Dimension) -> Symbol {
    Symbol {
        text,
        factor,
        dimension,
        zero: 0.0,
    }
}

const fn temperature(text: &'static str, factor: f64, zero: f64) -> Symbol {
    Symbol {
        text,
        factor,
        dimension: Dimension::TEMPERATURE,
        zero,
    }
}

const INCH: f64 = 0.0254;
const POUND: f64 = 0.453_592_37;
const POUND_FORCE: f64 = 4.448_221_615_260_5;
const PSI: f64 = POUND_FORCE / (INCH * INCH);
const DEGREE: f64 = std::f64::consts::PI / 180.0;

static SYMBOLS: [Symbol; 49] = [
    symbol("m", 1.0, Dimension::LENGTH),
    symbol("cm", 1e-2, Dimension::LENGTH),
    symbol("mm", 1e-3, Dimension::LENGTH),
    symbol("um", 1e-6, Dimension::LENGTH),
    symbol("µm", 1e-6, Dimension::LENGTH),
    symbol("μm", 1e-6, Dimension::LENGTH),
    symbol("in", INCH, Dimension::LENGTH),
    symbol("ft", 12.0 * INCH, Dimension::LENGTH),
    symbol("mil", 1e-3 * INCH, Dimension::LENGTH),
    symbol("N", 1.0, Dimension::FORCE),
    symbol("mN", 1e-3, Dimension::FORCE),
    symbol("kN", 1e3, Dimension::FORCE),
    symbol("MN", 1e6, Dimension::FORCE),
    symbol("kgf", 9.806_65, Dimension::FORCE),
    symbol("lbf", POUND_FORCE, Dimension::FORCE),
    symbol("ozf", POUND_FORCE / 16.0, Dimension::FORCE),
    symbol("kip", 1e3 * POUND_FORCE, Dimension::FORCE),
    symbol("Pa", 1.0, Dimension::STRESS),
    symbol("kPa", 1e3, Dimension::STRESS),
    symbol("MPa", 1e6, Dimension::STRESS),
    symbol("GPa", 1e9, Dimension::STRESS),
    symbol("bar", 1e5, Dimension::STRESS),
    symbol("psi", PSI, Dimension::STRESS),
    symbol("ksi", 1e3 * PSI, Dimension::STRESS),
    symbol("Mpsi", 1e6 * PSI, Dimension::STRESS),
    symbol("rad", 1.0, Dimension::ANGLE),
    symbol("mrad", 1e-3, Dimension::ANGLE),
    symbol("deg", DEGREE, Dimension::ANGLE),
    symbol("°", DEGREE, Dimension::ANGLE),
    symbol("arcmin", DEGREE / 60.0, Dimension::ANGLE),
    temperature("degC", 1.0, 0.0),
    temperature("°C", 1.0, 0.0),
    temperature("degF", 5.0 / 9.0, -160.0 / 9.0),
    temperature("°F", 5.0 / 9.0, -160.0 / 9.0),
    temperature("K", 1.0, -273.15),
    symbol("J", 1.0, Dimension::MOMENT),
    symbol("mJ", 1e-3, Dimension::MOMENT),
    symbol("kJ", 1e3, Dimension::MOMENT),
    symbol("kg", 1.0, Dimension::MASS),
    symbol("g", 1e-3, Dimension::MASS),
    symbol("t", 1e3, Dimension::MASS),
    symbol("lb", POUND, Dimension::MASS),
    symbol("oz", POUND / 16.0, Dimension::MASS),
    symbol("s", 1.0, Dimension::new([0, 0, 1, 0, 0])),
    symbol("ms", 1e-3, Dimension::new([0, 0, 1, 0, 0])),
    symbol("min", 60.0, Dimension::new([0, 0, 1, 0, 0])),
    symbol("%", 1e-2, Dimension::NUMBER),
    symbol("ppm", 1e-6, Dimension::NUMBER),
    symbol("1", 1.0, Dimension::NUMBER),
];

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_symbol_twice() {
        for (i, symbol) in symbols().iter().enumerate() {
            assert!(symbols()[..i].iter().all(|s| s.text != symbol.text));
        }
    }

    /// NIST Special Publication 811, appendix B (from memory): 1 psi = 6894.757 Pa,
    /// 1 lbf = 4.448222 N, 1 kgf = 9.80665 N, 1 kip = 4448.222 N, 1 lbf·in = 0.1129848 N·m. Seven figures are printed:
    /// half a unit of the last one is at most 5e-7.
    #[test]
    fn customary_factors_meet_the_published_table() {
        let factor = |text: &str| find(text).map_or(f64::NAN, |s| s.factor);
        for (got, want) in [
            (factor("psi"), 6894.757),
            (factor("lbf"), 4.448222),
            (factor("kgf"), 9.80665),
            (factor("kip"), 4448.222),
            (factor("lbf") * factor("in"), 0.1129848),
        ] {
            approx::assert_relative_eq!(got, want, max_relative = 5e-7);
        }
    }
}
