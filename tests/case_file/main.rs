//! The case file: what is read, what is refused and how.

mod files;
mod garbage;
mod meaning;
mod mistakes;
mod schema;

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
