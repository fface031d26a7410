//! Text becomes a number: "62 mm", "12 N/mm", "5 %".

use super::fault::Fault;
use super::field::{Field, Range};
use super::look_alike::{decimal_of_fraction, foreign_character};
use super::nearest::{excerpt, nearest};
use crate::units::{Dimension, Unit, UnitError, symbols};

/// The quantity written in `text`, in SI (°C for a temperature), for `field`.
pub(super) fn quantity(
    field: &Field,
    text: &str,
    dimension: Dimension,
    range: Range,
) -> Result<f64, Fault> {
    let (value, unit) = parts(field, text)?;
    if unit.is_empty() && dimension != Dimension::NUMBER {
        return Err(Fault {
            message: format!("`{}` has no unit: {}", field.key, wanted(dimension)),
            label: "a unit is missing".to_string(),
            cure: format!(
                "add the unit, for example {} = {}",
                field.key,
                field.toml(&format!("{} {}", text.trim(), field.example_unit()))
            ),
        });
    }
    let unit = match Unit::parse(unit) {
        Ok(unit) => unit,
        Err(UnitError::Empty) => Unit::ONE,
        Err(error) => return Err(bad_unit(field, unit, dimension, &error)),
    };
    if unit.dimension != dimension {
        return Err(Fault {
            message: format!(
                "`{}` must be {}, but \"{}\" is {}",
                field.key,
                dimension.title(),
                excerpt(text),
                unit.dimension.title()
            ),
            label: unit.dimension.title(),
            cure: format!(
                "give {}, for example {}",
                dimension.title(),
                field.example_line()
            ),
        });
    }
    checked(field, unit.to_si(value), dimension, range)
}

/// `value`, in SI, if it is one that `field` may have.
pub(super) fn checked(
    field: &Field,
    value: f64,
    dimension: Dimension,
    range: Range,
) -> Result<f64, Fault> {
    let fault = |cause: &str| {
        Err(Fault {
            message: format!("`{}` {cause}", field.key),
            label: String::new(),
            cure: format!("for example {}", field.example_line()),
        })
    };
    if !value.is_finite() {
        return fault("must be a finite number: not infinite, not NaN, not beyond 1e308");
    }
    match range {
        Range::Size if value < 0.0 => {
            return Err(Fault {
                message: format!("`{}` is a size: it must not be negative", field.key),
                label: String::new(),
                cure: "leave out the sign: every way the deviations can lie to one another is tried, and the worst is taken"
                    .to_string(),
            });
        }
        Range::Positive if value <= 0.0 => return fault("must be above 0"),
        Range::NotNegative if value < 0.0 => return fault("must not be negative"),
        Range::ProperShare if value <= 0.0 || value >= 1.0 => {
            return fault("must lie between 0 and 1, both excluded");
        }
        Range::BelowOne if !(0.0..1.0).contains(&value) => {
            return fault("must be 0 or more, and below 1");
        }
        Range::MoreThanHalf if value <= 0.5 || value > 1.0 => {
            return fault("must be more than 0.5 and at most 1");
        }
        _ => {}
    }
    let reach = Reach::of(dimension);
    let least = match range {
        _ if dimension == Dimension::TEMPERATURE => reach.least,
        Range::Positive => reach.least,
        Range::NotNegative
        | Range::Size
        | Range::ProperShare
        | Range::BelowOne
        | Range::MoreThanHalf => 0.0,
        Range::Any => -reach.most,
    };
    // What is written exactly at an end may miss it by round-off of its unit.
    let slack = 1e-9 * reach.least.abs();
    if value < least - slack || value > reach.most * (1.0 + 1e-9) {
        let words = match range {
            _ if dimension == Dimension::TEMPERATURE => reach.words(),
            Range::Positive => reach.words(),
            Range::NotNegative
            | Range::Size
            | Range::ProperShare
            | Range::BelowOne
            | Range::MoreThanHalf => {
                format!("0 to {}", reach.most_words)
            }
            Range::Any => format!("-{0} to {0}", reach.most_words),
        };
        return fault(&format!("is outside what can be computed, {words}"));
    }
    Ok(value)
}

/// Values that can be computed. Sanity only: what is outside is a slip, or would leave the range of
/// a computer's numbers.
struct Reach {
    /// Least size, but for nought; of temperatures the least value.
    least: f64,
    most: f64,
    least_words: &'static str,
    most_words: &'static str,
}

impl Reach {
    fn of(dimension: Dimension) -> Self {
        let (least, most, least_words, most_words) = match dimension {
            Dimension::LENGTH => (1e-6, 1e3, "1 um", "1000 m"),
            Dimension::FORCE => (1e-6, 1e12, "0.001 mN", "1e6 MN"),
            Dimension::STRESS => (1.0, 1e14, "1 Pa", "1e5 GPa"),
            Dimension::ANGLE => (0.0, std::f64::consts::FRAC_PI_2, "0 deg", "90 deg"),
            Dimension::TEMPERATURE => (-273.15, 2000.0, "-273.15 degC", "2000 degC"),
            Dimension::STIFFNESS => (1e-9, 1e15, "1e-9 N/m", "1e15 N/m"),
            Dimension::ROTATIONAL_STIFFNESS => (1e-9, 1e15, "1e-9 N m/rad", "1e15 N m/rad"),
            Dimension::MOMENT => (1e-9, 1e12, "1e-9 N m", "1e12 N m"),
            Dimension::DENSITY => (1e-3, 1e6, "0.001 kg/m^3", "1e6 kg/m^3"),
            Dimension::PER_KELVIN => (0.0, 0.01, "0 1/K", "0.01 1/K"),
            _ => (1e-3, 1e5, "0.001", "100000"),
        };
        Reach {
            least,
            most,
            least_words,
            most_words,
        }
    }

    fn words(&self) -> String {
        format!("{} to {}", self.least_words, self.most_words)
    }
}

fn wanted(dimension: Dimension) -> String {
    format!("it is {}", dimension.title())
}

/// Splits `text` into its number and the text of its unit.
fn parts<'t>(field: &Field, text: &'t str) -> Result<(f64, &'t str), Fault> {
    let text = text.trim();
    if let Some(fault) = foreign_character(field, text) {
        return Err(fault);
    }
    let fault = |cause: String, cure: String| Fault {
        message: format!("`{}` {cause}", field.key),
        label: String::new(),
        cure,
    };
    let example = || {
        format!(
            "write a number and its unit, for example {}",
            field.example_line()
        )
    };
    let unsigned = text.trim_start_matches(['+', '-']).to_lowercase();
    if unsigned.starts_with("nan") || unsigned.starts_with("inf") {
        return Err(fault("must be a finite number".to_string(), example()));
    }
    let end = number_length(text);
    let (number, rest) = text.split_at(end);
    let Ok(value) = number.parse::<f64>() else {
        let quoted = excerpt(text);
        return Err(fault(
            format!("does not begin with a number: \"{quoted}\""),
            example(),
        ));
    };
    if let Some(after) = rest.strip_prefix(',')
        && after.starts_with(|c: char| c.is_ascii_digit())
    {
        return Err(fault(
            "has a comma in its number".to_string(),
            format!(
                "use a decimal point and no thousands separators, for example {}",
                field.example_line()
            ),
        ));
    }
    let unit = rest.trim_start();
    if unit
        .trim_start_matches(['/', ' ', '_', '\''])
        .starts_with(|c: char| c.is_ascii_digit())
        && !is_reciprocal(unit)
    {
        return Err(fault(
            "has more than one number".to_string(),
            match decimal_of_fraction(text) {
                Some(decimal) => format!(
                    "write one decimal number, then its unit: {} = {}",
                    field.key,
                    field.toml(&decimal)
                ),
                None => "write one decimal number, then its unit: \"0.5 in\" for half an inch, \"1200 mm\" without a gap"
                    .to_string(),
            },
        ));
    }
    Ok((value, unit))
}

/// "1/K": a unit that begins with the number one.
fn is_reciprocal(unit: &str) -> bool {
    unit.strip_prefix('1')
        .and_then(|rest| rest.trim_start().strip_prefix('/'))
        .is_some_and(|rest| !rest.trim_start().starts_with(|c: char| c.is_ascii_digit()))
}

/// Length in bytes of the number that `text` begins with: sign, digits, point, exponent.
fn number_length(text: &str) -> usize {
    let bytes = text.as_bytes();
    let digits = |from: usize| {
        bytes[from.min(bytes.len())..]
            .iter()
            .take_while(|b| b.is_ascii_digit())
            .count()
    };
    let sign = |at: usize| usize::from(matches!(bytes.get(at), Some(b'+' | b'-')));
    let mut end = sign(0);
    end += digits(end);
    if bytes.get(end) == Some(&b'.') {
        end += 1 + digits(end + 1);
    }
    if matches!(bytes.get(end), Some(b'e' | b'E')) {
        let exponent = end + 1 + sign(end + 1);
        if digits(exponent) > 0 {
            end = exponent + digits(exponent);
        }
    }
    end
}

/// The unit that people mean by a symbol they know from elsewhere.
fn usual_slip(symbol: &str, dimension: Dimension) -> Option<&'static str> {
    let temperature = matches!(dimension, Dimension::TEMPERATURE | Dimension::PER_KELVIN);
    match symbol {
        "C" | "c" | "Celsius" | "celsius" if temperature => Some("degC"),
        "F" | "f" | "Fahrenheit" | "fahrenheit" if temperature => Some("degF"),
        "inch" | "inches" | "\"" => Some("in"),
        "Nm" => Some("N m"),
        "Nmm" => Some("N mm"),
        _ => None,
    }
}

fn bad_unit(field: &Field, unit: &str, dimension: Dimension, error: &UnitError) -> Fault {
    let cure = match error {
        UnitError::Unknown { symbol } => {
            let known = symbols().iter().map(|s| s.text);
            match usual_slip(symbol, dimension).or_else(|| nearest(symbol, known)) {
                Some(near) => format!(
                    "did you mean `{near}`? For example {}",
                    field.example_line()
                ),
                None => format!("use a unit such as in {}", field.example_line()),
            }
        }
        _ => format!(
            "join units by `*`, `/` and `^`, for example {}",
            field.example_line()
        ),
    };
    Fault {
        message: match error {
            UnitError::Unknown { symbol } => {
                format!("`{}` has an unknown unit, `{}`", field.key, excerpt(symbol))
            }
            _ => format!(
                "`{}` has no readable unit, `{}`: {error}",
                field.key,
                excerpt(unit)
            ),
        },
        label: String::new(),
        cure,
    }
}
