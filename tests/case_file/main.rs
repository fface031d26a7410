//! The case file: what is read, what is refused and how.

mod end_mistakes;
mod ends;
mod files;
mod garbage;
mod guides;
mod law_mistakes;
mod meaning;
mod mistakes;
mod schema;
mod values;

use coilstay::case::{self, Case, Diagnostics, Item};

/// A complete case that every test changes a little.
const BASE: &str = r#"title = "Test"
[spring]
wire = "8 mm"
mean_diameter = "62 mm"
free_length = "210 mm"
active_coils = 8.5
total_coils = 10.5
[material]
name = "patented-carbon-steel"
[bottom]
kind = "clamped"
[top]
kind = "hinged"
[imperfections]
squareness = "4 mm"
[duty]
working_deflection = "95 mm"
"#;

/// The base with one piece replaced.
fn with(from: &str, to: &str) -> String {
    assert_eq!(BASE.matches(from).count(), 1, "{from}");
    BASE.replace(from, to)
}

fn read(text: &str) -> Case {
    match case::parse("test.toml", text) {
        Ok(case) => case,
        Err(mistakes) => panic!("{mistakes}"),
    }
}

fn refused(text: &str) -> Diagnostics {
    match case::parse("test.toml", text) {
        Ok(case) => panic!("read as {:#?}", case.setup),
        Err(mistakes) => mistakes,
    }
}

/// The single mistake of a text.
fn only_mistake(text: &str) -> Item {
    let mistakes = refused(text);
    assert_eq!(mistakes.items().len(), 1, "{mistakes}");
    mistakes.items()[0].clone()
}

/// A piece replaced, and the single mistake that comes of it: (replaced, by, line, column, part of the message, part of the cure)
type Expected = (
    &'static str,
    &'static str,
    usize,
    usize,
    &'static str,
    &'static str,
);

fn check(table: &[Expected]) {
    for (from, to, line, column, message, cure) in table {
        let item = only_mistake(&with(from, to));
        assert_eq!((item.line, item.column), (*line, *column), "{to}: {item:?}");
        assert!(item.message.contains(message), "{to}: {}", item.message);
        assert!(item.cure.contains(cure), "{to}: {}", item.cure);
    }
}

/// Whole texts, and the single mistake of each: (text, (line, column), part of the message, part of the cure)
fn check_text(table: &[(String, (usize, usize), &str, &str)]) {
    for (text, place, message, cure) in table {
        let item = only_mistake(text);
        assert_eq!((item.line, item.column), *place, "{text}: {item:?}");
        assert!(item.message.contains(message), "{text}: {}", item.message);
        assert!(item.cure.contains(cure), "{text}: {}", item.cure);
    }
}
