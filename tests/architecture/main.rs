//! The house keeps its own rules: which room may import which, which crate is known where, how
//! long a file may be.

mod source;

use source::{Source, paths_used, sources};

/// Rooms and what each may import besides `units`.
const ROOMS: [(&str, &[&str]); 15] = [
    ("units", &[]),
    ("spring", &[]),
    ("setup", &["spring"]),
    ("criteria", &["spring"]),
    ("solve", &[]),
    ("column", &["spring", "setup", "solve"]),
    ("wire", &["spring", "setup", "solve"]),
    ("result", &["spring", "setup"]),
    ("assess", ABOVE_ASSESS),
    ("proof", ABOVE_PROOF),
    ("study", &["spring", "setup", "assess", "result"]),
    ("store", &["result"]),
    ("case", &["spring", "setup"]),
    ("report", &["result"]),
    ("cli", ALL),
];

const ABOVE_ASSESS: &[&str] = &[
    "spring", "setup", "criteria", "solve", "column", "wire", "result",
];
const ABOVE_PROOF: &[&str] = &[
    "spring", "setup", "criteria", "solve", "column", "wire", "result", "assess",
];
const ALL: &[&str] = &[
    "spring", "setup", "criteria", "solve", "column", "wire", "result", "assess", "proof", "study",
    "store", "case", "report",
];

/// Crates that one room alone knows.
const CRATES: [(&str, &str); 5] = [
    ("clap", "cli"),
    ("toml", "case"),
    ("plotters", "report"),
    ("plotters_backend", "report"),
    ("rayon", "study"),
];

const LONGEST_FILE: usize = 500;

/// What `source` imports against the table.
fn trespasses(source: &Source) -> Vec<String> {
    let file = source.path.display();
    let mut found = Vec::new();
    for used in paths_used(source) {
        for (krate, home) in CRATES {
            if used == ["", krate] && source.room != home {
                found.push(format!("{file}: only `{home}` knows the crate `{krate}`"));
            }
        }
        let [root, room, ..] = used.as_slice() else {
            continue;
        };
        // `main.rs` stands outside: it imports what it likes, but by the crate's name.
        if root != "crate" || source.room.is_empty() || *room == source.room {
            continue;
        }
        match ROOMS.iter().find(|(name, _)| *name == source.room) {
            Some((_, allowed)) if allowed.contains(&room.as_str()) || room == "units" => {}
            Some(_) => found.push(format!("{file}: `{}` imports `{room}`", source.room)),
            None => found.push(format!("{file}: `{}` is no room of the house", source.room)),
        }
    }
    found
}

#[test]
fn rooms_import_what_the_table_allows() {
    let sources = sources();
    assert!(sources.len() > 20, "sources not found");
    let found: Vec<String> = sources.iter().flat_map(trespasses).collect();
    assert!(found.is_empty(), "\n{}", found.join("\n"));
}

#[test]
fn every_room_is_in_the_table() {
    for source in sources() {
        let known = source.room.is_empty() || ROOMS.iter().any(|(name, _)| *name == source.room);
        assert!(known, "{} is in no room", source.path.display());
    }
}

#[test]
fn no_file_is_longer_than_a_room_allows() {
    for source in sources() {
        let lines = source.text.lines().count();
        let file = source.path.display();
        assert!(lines <= LONGEST_FILE, "{file} has {lines} lines: split it");
    }
}

#[test]
fn the_solver_has_no_word_of_springs() {
    let solver: Vec<Source> = sources()
        .into_iter()
        .filter(|source| source.room == "solve")
        .collect();
    assert!(!solver.is_empty(), "the solver is gone");
    for source in solver {
        let file = source.path.display();
        assert!(!source.text.to_lowercase().contains("spring"), "{file}");
    }
}

/// The checks above can fail: each way of importing is seen.
#[test]
fn every_way_of_importing_is_seen() {
    let report = |text: &str| trespasses(&Source::of("report/text/answer.rs", text)).len();
    for (text, count) in [
        ("use crate::result::Limit; use crate::units::Metre;", 0),
        ("use crate::spring::Spring;", 1),
        ("use crate::{result, setup::{Duty, Loading}, spring};", 2),
        ("use super::super::super::solve::Newton;", 1),
        ("use super::super::numbers;", 0),
        ("mod tests { use super::super::super::solve; }", 0),
        ("mod tests { use super::super::super::super::solve; }", 1),
        ("use super::super::super::{solve, result};", 1),
        ("fn f() { coilstay::column::g() }", 1),
        ("use coilstay::{column, wire};", 2),
        ("fn f(x: crate :: column::Beam) {}", 1),
        ("// use crate::spring;\n/* use crate::spring; */", 0),
        (
            "const A: &str = \"crate::spring\"; const B: char = '\"';",
            0,
        ),
        ("const A: &str = r#\"use clap::Parser \"#;", 0),
        ("use clap::Parser;", 1),
        ("use clap;", 1),
        ("#[derive(clap::Parser)] struct A;", 1),
        ("use {clap::Parser, rayon::prelude::*};", 2),
        ("use plotters::prelude::*;", 0),
        ("fn f<'a>(x: &'a str) { toml::from_str(x) }", 1),
        ("use crate::report::text;", 0),
    ] {
        assert_eq!(report(text), count, "{text}");
    }
    let case = |text: &str| trespasses(&Source::of("case/mod.rs", text)).len();
    assert_eq!(case("use super::report::text;"), 1);
    assert_eq!(case("use toml::de::DeTable; mod toml;"), 0);
    let nowhere = trespasses(&Source::of("helpers/mod.rs", "use crate::solve;"));
    assert_eq!(nowhere.len(), 1);
}
