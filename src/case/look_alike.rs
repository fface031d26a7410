//! What people write for a number that is none: fractions, and characters that only look right.

use super::fault::Fault;
use super::field::Field;
use super::nearest::excerpt;

/// "1/2 in" and "1 1/2 in" with a decimal number: "0.5 in", "1.5 in".
pub(super) fn decimal_of_fraction(text: &str) -> Option<String> {
    let whole_number = |text: &str| -> Option<f64> {
        let digits = !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit());
        text.parse().ok().filter(|_| digits)
    };
    let (above, rest) = text.split_once('/')?;
    let rest = rest.trim_start();
    let end = rest
        .find(|c: char| !c.is_ascii_digit())
        .unwrap_or(rest.len());
    let (below, unit) = rest.split_at(end);
    let above: Vec<&str> = above.split_whitespace().collect();
    let (whole, above) = match above.as_slice() {
        [above] => (0.0, whole_number(above)?),
        [whole, above] => (whole_number(whole)?, whole_number(above)?),
        _ => return None,
    };
    let value = whole + above / whole_number(below)?;
    let unit = unit.trim_start();
    let plain = !unit.contains(|c: char| c.is_ascii_digit() || c.is_control());
    (value.is_finite() && plain)
        .then(|| format!("{value} {}", excerpt(unit)).trim_end().to_string())
}

/// A character that only looks like one of a number's, or cannot be seen: which, and the text
/// without it where that is plain.
pub(super) fn foreign_character(field: &Field, text: &str) -> Option<Fault> {
    let found = text.chars().find(|c| look_alike(*c).is_some())?;
    let (what, _) = look_alike(found)?;
    let plain: String = text
        .chars()
        .filter_map(|c| match look_alike(c) {
            None => Some(c),
            Some((_, plain)) => plain,
        })
        .collect();
    let shown = if is_invisible(found) {
        String::new()
    } else {
        format!(" `{found}`")
    };
    let known = text
        .chars()
        .all(|c| look_alike(c).is_none_or(|(_, plain)| plain.is_some() || is_invisible(c)));
    Some(Fault {
        message: format!(
            "`{}` holds{shown} (U+{:04X}), {what}",
            field.key,
            u32::from(found)
        ),
        label: String::new(),
        cure: if known {
            format!("write {} = {}", field.key, field.toml(&excerpt(&plain)))
        } else {
            format!(
                "write the number with plain digits, for example {}",
                field.example_line()
            )
        },
    })
}

/// What a character is that only looks like one of a number's, and which it looks like.
fn look_alike(c: char) -> Option<(&'static str, Option<char>)> {
    match c {
        '\u{2010}'..='\u{2015}' | '\u{2212}' | '\u{fe58}' | '\u{fe63}' => {
            Some(("a dash that is not the plain minus `-`", Some('-')))
        }
        '\u{ff01}'..='\u{ff5e}' => {
            let plain = char::from_u32(u32::from(c) - 0xfee0);
            Some(("a full-width character", plain))
        }
        c if is_invisible(c) => Some(("which cannot be seen", None)),
        '²' | '³' => None,
        c if !c.is_ascii() && c.is_numeric() => Some(("which is not a plain digit", None)),
        _ => None,
    }
}

fn is_invisible(c: char) -> bool {
    matches!(
        c,
        '\u{ad}' | '\u{200b}'..='\u{200f}' | '\u{2060}' | '\u{feff}'
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn fractions_have_a_decimal() {
        for (text, decimal) in [
            ("1/2 in", Some("0.5 in")),
            ("1 1/2 in", Some("1.5 in")),
            ("3/8in", Some("0.375 in")),
            ("1/0 in", None),
            ("a/2 in", None),
            ("1 000 mm", None),
        ] {
            assert_eq!(decimal_of_fraction(text).as_deref(), decimal, "{text}");
        }
    }
}
