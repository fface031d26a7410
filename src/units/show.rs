//! Numbers become text: the units a report shows, and rounding to significant digits.

use super::expression::Unit;
use super::table::Dimension;

/// A unit with the text it is shown by.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ShownUnit {
    /// The symbol, as a case file would have it.
    pub symbol: &'static str,
    /// What it is.
    pub unit: Unit,
}

impl ShownUnit {
    const fn new(symbol: &'static str, factor: f64, dimension: Dimension) -> Self {
        ShownUnit {
            symbol,
            unit: Unit {
                factor,
                dimension,
                zero: 0.0,
            },
        }
    }

    /// The SI value `si` in this unit to `digits` significant digits, without the symbol.
    pub fn number(self, si: f64, digits: usize) -> String {
        significant(self.unit.from_si(si), digits)
    }

    /// The SI value `si` in this unit to `digits` significant digits, with the symbol: "62.00 mm".
    pub fn show(self, si: f64, digits: usize) -> String {
        format!("{} {}", self.number(si, digits), self.symbol)
    }
}

/// One pound-force in newton.
const LBF: f64 = 4.448_221_615_260_5;

/// mm.
pub const MILLIMETRE: ShownUnit = ShownUnit::new("mm", 1e-3, Dimension::LENGTH);
/// in.
pub const INCH: ShownUnit = ShownUnit::new("in", 0.0254, Dimension::LENGTH);
/// N.
pub const NEWTON: ShownUnit = ShownUnit::new("N", 1.0, Dimension::FORCE);
/// MPa.
pub const MEGAPASCAL: ShownUnit = ShownUnit::new("MPa", 1e6, Dimension::STRESS);
/// GPa.
pub const GIGAPASCAL: ShownUnit = ShownUnit::new("GPa", 1e9, Dimension::STRESS);
/// N/mm.
pub const NEWTON_PER_MILLIMETRE: ShownUnit = ShownUnit::new("N/mm", 1e3, Dimension::STIFFNESS);
/// lbf.
pub const POUND_FORCE: ShownUnit = ShownUnit::new("lbf", LBF, Dimension::FORCE);
/// lbf/in.
pub const POUND_FORCE_PER_INCH: ShownUnit =
    ShownUnit::new("lbf/in", LBF / 0.0254, Dimension::STIFFNESS);
/// ksi.
pub const KSI: ShownUnit = ShownUnit::new("ksi", 1e3 * LBF / (0.0254 * 0.0254), Dimension::STRESS);
/// lbf in.
pub const POUND_FORCE_INCH: ShownUnit = ShownUnit::new("lbf in", LBF * 0.0254, Dimension::MOMENT);
/// lbf in/rad.
pub const POUND_FORCE_INCH_PER_RADIAN: ShownUnit =
    ShownUnit::new("lbf in/rad", LBF * 0.0254, Dimension::ROTATIONAL_STIFFNESS);
/// N m.
pub const NEWTON_METRE: ShownUnit = ShownUnit::new("N m", 1.0, Dimension::MOMENT);
/// N m/rad.
pub const NEWTON_METRE_PER_RADIAN: ShownUnit =
    ShownUnit::new("N m/rad", 1.0, Dimension::ROTATIONAL_STIFFNESS);
/// J.
pub const JOULE: ShownUnit = ShownUnit::new("J", 1.0, Dimension::MOMENT);
/// deg.
pub const DEGREE: ShownUnit = ShownUnit::new("deg", std::f64::consts::PI / 180.0, Dimension::ANGLE);
/// degC.
pub const DEGREE_CELSIUS: ShownUnit = ShownUnit::new("degC", 1.0, Dimension::TEMPERATURE);
/// kg/m^3.
pub const KILOGRAM_PER_CUBIC_METRE: ShownUnit = ShownUnit::new("kg/m^3", 1.0, Dimension::DENSITY);
/// 1/K.
pub const PER_KELVIN: ShownUnit = ShownUnit::new("1/K", 1.0, Dimension::PER_KELVIN);

/// `value` to `digits` significant digits: plain decimals from 1e-4 to below 1e7, powers of ten
/// beyond. Never "-0".
pub fn significant(value: f64, digits: usize) -> String {
    if value == 0.0 || !value.is_finite() {
        return format!("{}", if value == 0.0 { 0.0 } else { value });
    }
    let digits = digits.clamp(1, 17);
    let scientific = format!("{value:.*e}", digits - 1);
    // The exponent after rounding: 9.996 to three digits is 10.0, not 9.996 to two decimals.
    let exponent = scientific
        .rsplit('e')
        .next()
        .and_then(|text| text.parse::<i32>().ok())
        .unwrap_or(0);
    if !(-4..7).contains(&exponent) {
        return scientific;
    }
    let decimals = (digits as i32 - 1 - exponent).max(0) as usize;
    format!("{value:.decimals$}")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn shown_units_are_those_of_the_table() {
        for shown in [
            MILLIMETRE,
            INCH,
            NEWTON,
            MEGAPASCAL,
            GIGAPASCAL,
            NEWTON_PER_MILLIMETRE,
            POUND_FORCE,
            POUND_FORCE_PER_INCH,
            KSI,
            POUND_FORCE_INCH,
            POUND_FORCE_INCH_PER_RADIAN,
            NEWTON_METRE,
            NEWTON_METRE_PER_RADIAN,
            JOULE,
            DEGREE,
            DEGREE_CELSIUS,
            KILOGRAM_PER_CUBIC_METRE,
            PER_KELVIN,
        ] {
            let parsed = Unit::parse(shown.symbol).unwrap();
            assert_eq!(parsed.dimension, shown.unit.dimension, "{}", shown.symbol);
            assert_eq!(parsed.zero, shown.unit.zero);
            approx::assert_relative_eq!(parsed.factor, shown.unit.factor, max_relative = 1e-15);
        }
    }

    #[test]
    fn significant_digits() {
        for (value, digits, want) in [
            (0.0, 4, "0"),
            (-0.0, 4, "0"),
            (62.0, 4, "62.00"),
            (9.996, 3, "10.0"),
            (0.012345, 3, "0.0123"),
            (123456.7, 3, "123457"),
            (1.5e9, 3, "1.50e9"),
            (-2.5e-7, 2, "-2.5e-7"),
            (f64::INFINITY, 3, "inf"),
            (f64::NAN, 3, "NaN"),
        ] {
            assert_eq!(significant(value, digits), want);
        }
        assert_eq!(MILLIMETRE.show(0.062, 4), "62.00 mm");
        assert_eq!(NEWTON_PER_MILLIMETRE.show(12e3, 3), "12.0 N/mm");
    }
}
