//! Unit expressions: symbols joined by `*` (also `·` or a blank) and `/`, with whole exponents.

use super::table::{Dimension, find};
use std::fmt;

/// A unit: what one of it is in SI, and its dimension.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Unit {
    /// One of it in SI.
    pub factor: f64,
    /// Its dimension.
    pub dimension: Dimension,
    /// Where its zero lies, °C: nought but for a temperature standing alone.
    pub zero: f64,
}

/// Why a text is not a unit.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum UnitError {
    /// Nothing there.
    Empty,
    /// A symbol that is not in the table.
    Unknown {
        /// The symbol as written.
        symbol: String,
    },
    /// An operator with no symbol behind it, or an exponent that is no whole number up to ±9.
    Malformed {
        /// What is wrong, in words.
        cause: String,
    },
}

impl fmt::Display for UnitError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            UnitError::Empty => write!(f, "no unit"),
            UnitError::Unknown { symbol } => write!(f, "unknown unit `{symbol}`"),
            UnitError::Malformed { cause } => write!(f, "{cause}"),
        }
    }
}

impl std::error::Error for UnitError {}

impl Unit {
    /// The pure number 1.
    pub const ONE: Unit = Unit {
        factor: 1.0,
        dimension: Dimension::NUMBER,
        zero: 0.0,
    };

    /// The unit written in `text`: "mm", "N/mm", "N m/rad", "kg/m^3", "1/K". Read from left to
    /// right, `/` acts on the one symbol behind it. A temperature that stands alone has its own
    /// zero ("20 degF" is −6.7 °C); inside an expression it counts as a difference.
    ///
    /// # Errors
    /// [`UnitError`], naming the symbol or the operator at fault.
    pub fn parse(text: &str) -> Result<Unit, UnitError> {
        let text = text.trim();
        if text.is_empty() {
            return Err(UnitError::Empty);
        }
        if let Some(symbol) = find(text) {
            return Ok(Unit {
                factor: symbol.factor,
                dimension: symbol.dimension,
                zero: symbol.zero,
            });
        }
        let mut unit = Unit::ONE;
        let mut rest = text;
        let mut divides = false;
        if let Some(after) = rest.strip_prefix('/') {
            divides = true;
            rest = after.trim_start();
        }
        loop {
            let (part, exponent, after) = next_power(rest)?;
            let signed = if divides { -exponent } else { exponent };
            unit = unit.times(part, signed)?;
            rest = after.trim_start();
            if rest.is_empty() {
                break;
            }
            divides = rest.starts_with('/');
            rest = rest
                .strip_prefix(['/', '*', '·'])
                .unwrap_or(rest)
                .trim_start();
        }
        Ok(unit)
    }

    fn times(self, part: Unit, exponent: i8) -> Result<Unit, UnitError> {
        let mut exponents = self.dimension.exponents;
        for (sum, one) in exponents.iter_mut().zip(part.dimension.exponents) {
            *sum = one
                .checked_mul(exponent)
                .and_then(|more| sum.checked_add(more))
                .ok_or_else(|| malformed("exponents too large"))?;
        }
        let factor = self.factor * part.factor.powi(i32::from(exponent));
        if !factor.is_normal() {
            return Err(malformed("factor out of range"));
        }
        Ok(Unit {
            factor,
            dimension: Dimension { exponents },
            zero: 0.0,
        })
    }

    /// `value` of this unit in SI (°C for a temperature).
    pub fn to_si(self, value: f64) -> f64 {
        value * self.factor + self.zero
    }

    /// The SI value `si` in this unit.
    pub fn from_si(self, si: f64) -> f64 {
        (si - self.zero) / self.factor
    }
}

fn malformed(cause: &str) -> UnitError {
    UnitError::Malformed {
        cause: cause.to_string(),
    }
}

/// Splits one symbol with its exponent off the front: "mm^2 …" gives (mm, 2, " …").
fn next_power(text: &str) -> Result<(Unit, i8, &str), UnitError> {
    let is_symbol = |c: char| !c.is_whitespace() && !"*/·^-²³0123456789".contains(c);
    let end = match text.strip_prefix('1') {
        Some(after) if !after.starts_with(|c: char| c.is_ascii_digit() || is_symbol(c)) => 1,
        _ => text.find(|c| !is_symbol(c)).unwrap_or(text.len()),
    };
    let (name, rest) = text.split_at(end);
    if name.is_empty() {
        return Err(match text.split([' ', '*', '/']).next() {
            Some(word) if !word.is_empty() => UnitError::Unknown {
                symbol: word.to_string(),
            },
            _ => malformed("a unit symbol is missing next to `*` or `/`"),
        });
    }
    let symbol = find(name).ok_or_else(|| UnitError::Unknown {
        symbol: name.to_string(),
    })?;
    let (exponent, rest) = exponent(rest)?;
    let unit = Unit {
        factor: symbol.factor,
        dimension: symbol.dimension,
        zero: 0.0,
    };
    Ok((unit, exponent, rest))
}

/// The exponent at the front of `text`: "^2", "2", "²", "^-1"; 1 where there is none.
fn exponent(text: &str) -> Result<(i8, &str), UnitError> {
    for (sign, value) in [('²', 2), ('³', 3)] {
        if let Some(rest) = text.strip_prefix(sign) {
            return Ok((value, rest));
        }
    }
    let (raised, text) = match text.strip_prefix('^') {
        Some(rest) => (true, rest),
        None => (false, text),
    };
    let digits = text.strip_prefix('-').unwrap_or(text);
    let count = digits.len()
        - digits
            .trim_start_matches(|c: char| c.is_ascii_digit())
            .len();
    let end = text.len() - digits.len() + count;
    if count == 0 && !raised && digits.len() == text.len() {
        return Ok((1, text));
    }
    match text[..end].parse::<i8>() {
        Ok(value) if value.abs() <= 9 => Ok((value, &text[end..])),
        _ => Err(malformed("an exponent is a whole number from -9 to 9")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn check(text: &str, factor: f64, dimension: Dimension) {
        let unit = Unit::parse(text).unwrap();
        approx::assert_relative_eq!(unit.factor, factor, max_relative = 1e-15);
        assert_eq!(unit.dimension, dimension, "{text}");
    }

    #[test]
    fn expressions() {
        check("N/mm", 1e3, Dimension::STIFFNESS);
        check("lbf/in", 4.4482216152605 / 0.0254, Dimension::STIFFNESS);
        check("N m/rad", 1.0, Dimension::ROTATIONAL_STIFFNESS);
        check("N·m / rad", 1.0, Dimension::ROTATIONAL_STIFFNESS);
        check("N*mm/mrad", 1.0, Dimension::ROTATIONAL_STIFFNESS);
        for cube in ["kg/m^3", "kg/m3", "kg/m³", "kg m^-3", "1/m^3*kg"] {
            check(cube, 1.0, Dimension::DENSITY);
        }
        for per_kelvin in ["1/K", "/K", "1/degC", "K^-1"] {
            check(per_kelvin, 1.0, Dimension::PER_KELVIN);
        }
        check("ppm/degF", 1.8e-6, Dimension::PER_KELVIN);
        check("N/mm^2", 1e6, Dimension::STRESS);
    }

    #[test]
    fn temperatures_have_their_own_zero() {
        for (text, value, celsius) in [
            ("degC", 20.0, 20.0),
            ("degF", 68.0, 20.0),
            ("K", 293.15, 20.0),
        ] {
            let unit = Unit::parse(text).unwrap();
            approx::assert_relative_eq!(unit.to_si(value), celsius, max_relative = 1e-14);
            approx::assert_relative_eq!(unit.from_si(celsius), value, max_relative = 1e-14);
        }
    }

    #[test]
    fn faults_are_named() {
        assert_eq!(Unit::parse("  "), Err(UnitError::Empty));
        for (text, symbol) in [
            ("furlong", "furlong"),
            ("N/mn", "mn"),
            ("/2 in", "2"),
            ("(m)", "(m)"),
        ] {
            let symbol = symbol.to_string();
            assert_eq!(Unit::parse(text), Err(UnitError::Unknown { symbol }));
        }
        for text in [
            "N/",
            "N//m",
            "m^",
            "m^x",
            "m^10",
            "m^-",
            "m-",
            &"m9 ".repeat(20),
        ] {
            assert!(
                matches!(Unit::parse(text), Err(UnitError::Malformed { .. })),
                "{text}: {:?}",
                Unit::parse(text)
            );
        }
    }
}
