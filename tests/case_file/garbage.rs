//! Whatever is typed: read, or refused with place and cure; never a panic.

use super::BASE;
use coilstay::case;
use proptest::prelude::*;

/// Fragments that a mutation may put in.
const FRAGMENTS: [&str; 29] = [
    "\"",
    "'",
    "[",
    "]",
    "{",
    "}",
    "=",
    ",",
    ".",
    "#",
    "\n",
    "\t",
    " ",
    "\r",
    "\"\"\"",
    "nan",
    "1e400",
    "-",
    "µ",
    "\u{0}",
    "\u{1b}[31m",
    "[spring]\n",
    "wire = 3\n",
    "\"8 mm\"",
    "[[guide]]\n",
    "[top.lever]\n",
    "axial_law = [{ motion = \"1 mm\" }]\n",
    "piloted = true\n",
    "kind = \"flat\"\n",
];

/// The starter, and cases with lists and tables of tables.
const TEXTS: [&str; 4] = [
    BASE,
    include_str!("../../cases/rubber-buffer.toml"),
    include_str!("../../cases/lever-latch.toml"),
    include_str!("../../src/case/starter.toml"),
];

fn must_be_sound(text: &str) {
    if let Err(mistakes) = case::parse("garbage.toml", text) {
        assert!(!mistakes.items().is_empty());
        let lines = text.split('\n').count();
        for item in mistakes.items() {
            assert!((1..=lines).contains(&item.line), "{item:?}");
            assert!(item.column >= 1);
            assert!(!item.message.trim().is_empty());
            assert!(!item.cure.trim().is_empty());
        }
        let plain = mistakes.render(false);
        assert!(!plain.contains('\u{1b}'));
        assert!(plain.contains("help: "));
        mistakes.render(true);
    }
}

proptest! {
    #[test]
    fn printable_garbage(text in "[ -~\n]{0,400}") {
        must_be_sound(&text);
    }

    #[test]
    fn any_text(text in "(?s).{0,200}") {
        must_be_sound(&text);
    }

    #[test]
    fn garbage_as_a_value(value in "[ -~]{0,40}", quoted in any::<bool>(), line in 0usize..14) {
        let value = if quoted { format!("{:?}", value) } else { value };
        let text: Vec<String> = BASE
            .lines()
            .filter(|l| l.contains('='))
            .map(str::to_string)
            .collect();
        let key = text[line % text.len()].split('=').next().unwrap_or_default().to_string();
        let old = &text[line % text.len()];
        must_be_sound(&BASE.replace(old, &format!("{key}= {value}")));
    }

    #[test]
    fn mutated_files(
        edits in prop::collection::vec(
            (any::<prop::sample::Index>(), 0usize..12, 0usize..FRAGMENTS.len()),
            1..6,
        ),
        which in 0usize..TEXTS.len(),
    ) {
        let mut text: Vec<char> = TEXTS[which].chars().collect();
        for (at, remove, fragment) in edits {
            let start = at.index(text.len().max(1)).min(text.len());
            let end = (start + remove).min(text.len());
            text.splice(start..end, FRAGMENTS[fragment].chars());
        }
        must_be_sound(&text.into_iter().collect::<String>());
    }

    #[test]
    fn lines_left_out_or_doubled(at in any::<prop::sample::Index>(), double in any::<bool>()) {
        let mut lines: Vec<&str> = BASE.lines().collect();
        let line = at.index(lines.len());
        if double {
            lines.insert(line, lines[line]);
        } else {
            lines.remove(line);
        }
        must_be_sound(&lines.join("\n"));
    }
}

/// Large, deep or one-line nonsense within the size that is read.
#[test]
fn nonsense_of_a_megabyte() {
    for text in [
        "[".repeat(999_999),
        "a = ".to_string() + &"[".repeat(900_000),
        "=\n".repeat(400_000),
        format!("a = {{ {} }}", "b = 1, ".repeat(100_000)),
        format!("title = \"{}\"", "x".repeat(900_000)),
        format!("[spring]\nwire = \"{} mm\"", "9".repeat(900_000)),
        format!("[spring]\nwire = \"8 {}\"", "m ".repeat(400_000)),
        "x".repeat(900_000) + " = 1",
        (0..80_000).map(|i| format!("k{i} = 1\n")).collect(),
    ] {
        must_be_sound(&text);
    }
}
