//! Numbers as text: unit systems, significant digits, error estimates.

use crate::units::{self, Joule, Metre, Newton, Pascal, Radian, ShownUnit, significant};

/// The units a report is written in. Data files (JSON, CSV) are always SI.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Units {
    /// mm, N, N/mm, MPa, deg.
    #[default]
    Metric,
    /// in, lbf, lbf/in, ksi, deg.
    Inch,
}

/// A unit of the report.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Unit {
    /// Symbol as printed.
    pub symbol: &'static str,
    unit: units::Unit,
}

impl From<ShownUnit> for Unit {
    fn from(shown: ShownUnit) -> Self {
        Unit {
            symbol: shown.symbol,
            unit: shown.unit,
        }
    }
}

impl Unit {
    /// The SI value in this unit.
    pub fn of(self, si: f64) -> f64 {
        self.unit.from_si(si)
    }

    /// The SI value with four significant digits and the symbol: "43.21 mm".
    pub fn show(self, si: f64) -> String {
        format!("{} {}", significant(self.of(si), 4), self.symbol)
    }

    /// The SI value as it was probably typed, up to six digits, with the symbol: "62 mm".
    pub fn show_input(self, si: f64) -> String {
        format!("{} {}", shortest(self.of(si)), self.symbol)
    }

    /// The SI value with up to four significant digits and the symbol: "4 mm".
    pub fn show_rounded(self, si: f64) -> String {
        format!("{} {}", rounded(self.of(si)), self.symbol)
    }

    /// An error estimate with the symbol: "3e-9 mm".
    pub fn show_error(self, si: f64) -> String {
        format!("{} {}", error(self.of(si)), self.symbol)
    }
}

impl Units {
    fn choose(self, metric: ShownUnit, inch: ShownUnit) -> Unit {
        match self {
            Units::Metric => metric.into(),
            Units::Inch => inch.into(),
        }
    }

    /// Unit of lengths and deflections.
    pub fn length(self) -> Unit {
        self.choose(units::MILLIMETRE, units::INCH)
    }

    /// Unit of forces.
    pub fn force(self) -> Unit {
        self.choose(units::NEWTON, units::POUND_FORCE)
    }

    /// Unit of rates.
    pub fn rate(self) -> Unit {
        self.choose(units::NEWTON_PER_MILLIMETRE, units::POUND_FORCE_PER_INCH)
    }

    /// Unit of stresses.
    pub fn stress(self) -> Unit {
        self.choose(units::MEGAPASCAL, units::KSI)
    }

    /// Unit of moduli.
    pub fn modulus(self) -> Unit {
        self.choose(units::GIGAPASCAL, units::KSI)
    }

    /// Unit of rotational stiffnesses.
    pub fn rotational_stiffness(self) -> Unit {
        self.choose(
            units::NEWTON_METRE_PER_RADIAN,
            units::POUND_FORCE_INCH_PER_RADIAN,
        )
    }

    /// Unit of moments.
    pub fn moment(self) -> Unit {
        self.choose(units::NEWTON_METRE, units::POUND_FORCE_INCH)
    }

    /// Unit of energies.
    pub fn energy(self) -> Unit {
        self.choose(units::JOULE, units::POUND_FORCE_INCH)
    }

    /// Unit of angles.
    pub fn angle(self) -> Unit {
        units::DEGREE.into()
    }

    /// "43.21 mm".
    pub fn show_length(self, value: Metre) -> String {
        self.length().show(value)
    }

    /// "320.4 N".
    pub fn show_force(self, value: Newton) -> String {
        self.force().show(value)
    }

    /// "812.3 MPa".
    pub fn show_stress(self, value: Pascal) -> String {
        self.stress().show(value)
    }

    /// "1.2 J".
    pub fn show_energy(self, value: Joule) -> String {
        self.energy().show(value)
    }

    /// "0.31 deg".
    pub fn show_angle(self, value: Radian) -> String {
        self.angle().show_input(value)
    }
}

/// Decimals that show `value` with `digits` significant digits.
fn decimals_for(value: f64, digits: i32) -> usize {
    if value == 0.0 || !value.is_finite() {
        return 0;
    }
    // Rounding may carry into the next power of ten (9.9996): ask the rounded number.
    let scientific = format!("{:.*e}", (digits - 1).max(0) as usize, value.abs());
    let exponent = scientific
        .split_once('e')
        .and_then(|(_, exponent)| exponent.parse::<i32>().ok())
        .unwrap_or(0);
    (digits - 1 - exponent).max(0) as usize
}

/// Decimals that show the largest of `values` with `digits` significant digits: one count for a
/// whole column.
pub fn column_decimals(values: impl IntoIterator<Item = f64>, digits: i32) -> usize {
    let largest = values
        .into_iter()
        .filter(|value| value.is_finite())
        .fold(0.0, |largest: f64, value| largest.max(value.abs()));
    decimals_for(largest, digits).min(9)
}

/// From here on a number is written with a power of ten, so that it fits its column.
const LARGE: f64 = 1e7;

/// `value` with so many decimals, without a negative zero; "not a number" is said in words.
pub fn fixed(value: f64, decimals: usize) -> String {
    if value.is_nan() {
        return "undefined".into();
    }
    if value.is_infinite() {
        return if value > 0.0 {
            "unlimited"
        } else {
            "-unlimited"
        }
        .into();
    }
    if value.abs() >= LARGE {
        return format!("{value:.3e}");
    }
    let text = format!("{value:.decimals$}");
    match text.strip_prefix('-') {
        Some(positive) if positive.chars().all(|c| c == '0' || c == '.') => positive.into(),
        _ => text,
    }
}

/// `value` with up to six significant digits and no trailing zeros.
pub fn shortest(value: f64) -> String {
    without_zeros(significant(value, 6))
}

fn without_zeros(text: String) -> String {
    let (mantissa, exponent) = match text.find('e') {
        Some(at) => text.split_at(at),
        None => (text.as_str(), ""),
    };
    if mantissa.contains('.') {
        let trimmed = mantissa.trim_end_matches('0').trim_end_matches('.');
        format!("{trimmed}{exponent}")
    } else {
        text
    }
}

/// An error estimate: one significant digit, two where the first is 1.
pub fn error(value: f64) -> String {
    let size = value.abs();
    if size == 0.0 || !size.is_finite() {
        return fixed(size, 0);
    }
    let leading = format!("{size:.1e}");
    let digits = if leading.starts_with('1') { 2 } else { 1 };
    if (1e-3..1e4).contains(&size) {
        fixed(size, decimals_for(size, digits))
    } else {
        format!("{:.*e}", (digits - 1) as usize, size)
    }
}

/// A share as a percentage, three significant digits but not more than two decimals unless it has
/// fewer than two digits then: "-4.02 %", "0.0034 %".
pub fn percent(share: f64) -> String {
    let value = 100.0 * share;
    let decimals = decimals_for(value, 3).min(2);
    format!("{} %", fixed(value, decimals.max(decimals_of_small(value))))
}

/// A share in per cent for a column of a table, without the sign; small ones with two significant
/// digits.
pub fn percent_number(share: f64, decimals: usize) -> String {
    let value = 100.0 * share;
    fixed(value, decimals.max(decimals_of_small(value)))
}

/// Decimals that show a small percentage with two significant digits. What is smaller still is
/// round-off.
fn decimals_of_small(value: f64) -> usize {
    const ROUND_OFF: f64 = 1e-6;
    if value.abs() < ROUND_OFF {
        return 0;
    }
    decimals_for(value, 2)
}

/// A derived number with four significant digits and no trailing zeros.
pub fn rounded(value: f64) -> String {
    without_zeros(significant(value, 4))
}

/// A share as a percentage as it was probably typed: "15 %".
pub fn percent_input(share: f64) -> String {
    format!("{} %", shortest(100.0 * share))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn digits_are_those_that_matter() {
        assert_eq!(shortest(62.000_000_000_1), "62");
        assert_eq!(shortest(0.5), "0.5");
        assert_eq!(shortest(1e-9), "1e-9");
        assert_eq!(shortest(100.0), "100");
        assert_eq!(fixed(-0.001, 2), "0.00");
        assert_eq!(fixed(f64::NAN, 2), "undefined");
        assert_eq!(fixed(f64::INFINITY, 2), "unlimited");
    }

    #[test]
    fn errors_have_one_digit_or_two() {
        assert_eq!(error(3.44e-9), "3e-9");
        assert_eq!(error(1.26e-9), "1.3e-9");
        assert_eq!(error(0.0437), "0.04");
        assert_eq!(error(0.0), "0");
        assert_eq!(error(0.99), "1");
    }

    #[test]
    fn a_column_has_one_count_of_decimals() {
        assert_eq!(column_decimals([43.2, 9.0], 4), 2);
        assert_eq!(column_decimals([], 4), 0);
        assert_eq!(column_decimals([f64::NAN, 0.5], 4), 4);
    }

    #[test]
    fn inch_units_are_the_exact_ones() {
        assert_eq!(Units::Inch.show_length(0.0254), "1.000 in");
        assert_eq!(Units::Inch.show_force(4.448_221_615_260_5), "1.000 lbf");
        assert_eq!(Units::Inch.show_stress(6.894_757_293_168e6), "1.000 ksi");
        assert_eq!(percent(-0.0402), "-4.02 %");
        assert_eq!(percent(0.123_456), "12.3 %");
    }

    #[test]
    fn small_shares_keep_two_digits_and_round_off_is_nought() {
        assert_eq!(percent(0.000_034), "0.0034 %");
        assert_eq!(percent(-0.000_5), "-0.050 %");
        assert_eq!(percent(0.0), "0 %");
        assert_eq!(percent_number(0.000_034, 2), "0.0034");
        assert_eq!(percent_number(0.000_4, 1), "0.040");
        assert_eq!(percent_number(0.05, 1), "5.0");
        assert_eq!(percent_number(-1.1e-16, 2), "0.00");
    }

    #[test]
    fn large_numbers_fit_a_column() {
        assert_eq!(fixed(123_456.78, 1), "123456.8");
        assert_eq!(fixed(-2.5e12, 2), "-2.500e12");
    }
}
