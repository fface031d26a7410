//! The command line as an interface: exit codes, what goes where, what is never done.

use assert_cmd::Command;
use serde_json::Value;
use std::fs;
use std::path::Path;
use std::process::{Output, Stdio};

fn coilstay(arguments: &[&str], directory: &Path) -> Output {
    Command::cargo_bin("coilstay")
        .unwrap()
        .args(arguments)
        .current_dir(directory)
        .output()
        .unwrap()
}

fn code(output: &Output) -> i32 {
    output.status.code().unwrap()
}

fn text(bytes: &[u8]) -> &str {
    std::str::from_utf8(bytes).unwrap()
}

fn json(output: &Output) -> Value {
    serde_json::from_slice(&output.stdout).unwrap()
}

/// The exit code that a verdict stands for.
fn code_of(verdict: &Value) -> i32 {
    match verdict.as_str().unwrap() {
        "holds" => 0,
        "does_not_hold" => 1,
        "undecided" => 2,
        other => panic!("{other}"),
    }
}

fn place() -> tempfile::TempDir {
    let place = tempfile::tempdir().unwrap();
    let made = coilstay(&["starter", "-o", "good.toml"], place.path());
    assert_eq!(code(&made), 0, "{}", text(&made.stderr));
    let bad = fs::read_to_string(place.path().join("good.toml"))
        .unwrap()
        .replace("free_length = \"210 mm\"", "free_length = \"210 N\"");
    fs::write(place.path().join("bad.toml"), bad).unwrap();
    place
}

#[test]
fn starter_is_printed_or_written_but_never_over_a_file() {
    let place = place();
    let printed = coilstay(&["starter"], place.path());
    assert_eq!(code(&printed), 0);
    let file = place.path().join("good.toml");
    assert_eq!(fs::read(&file).unwrap(), printed.stdout);

    fs::write(&file, "mine").unwrap();
    let refused = coilstay(&["starter", "-o", "good.toml"], place.path());
    assert_eq!(code(&refused), 2);
    assert!(text(&refused.stderr).contains("--replace"));
    assert_eq!(fs::read_to_string(&file).unwrap(), "mine");

    let replaced = coilstay(&["starter", "-o", "good.toml", "--replace"], place.path());
    assert_eq!(code(&replaced), 0);
    assert_eq!(fs::read(&file).unwrap(), printed.stdout);

    let directory = coilstay(&["starter", "-o", "."], place.path());
    assert_eq!(code(&directory), 2);
    assert!(text(&directory.stderr).contains("directory"));
}

#[test]
fn schema_and_materials_are_data() {
    let place = tempfile::tempdir().unwrap();
    let schema = coilstay(&["schema"], place.path());
    assert_eq!(code(&schema), 0);
    assert!(json(&schema)["properties"]["spring"].is_object());

    let materials = coilstay(&["materials", "--format", "json"], place.path());
    assert_eq!(code(&materials), 0);
    let listed = json(&materials);
    let listed = listed["materials"].as_array().unwrap();
    assert!(listed.len() > 5);
    for material in listed {
        for key in [
            "youngs_modulus_pa",
            "shear_modulus_pa",
            "modulus_loss_per_k",
            "expansion_per_k",
            "density_kg_per_m3",
        ] {
            assert!(material[key].as_f64().unwrap() > 0.0, "{material}");
        }
        assert!(!material["source"].as_str().unwrap().is_empty());
    }
    let shown = coilstay(&["materials"], place.path());
    for material in listed {
        assert!(text(&shown.stdout).contains(material["name"].as_str().unwrap()));
    }
}

#[test]
fn the_exit_code_is_the_verdict() {
    let place = place();
    let assessed = coilstay(&["assess", "good.toml", "--format", "json"], place.path());
    let answer = json(&assessed);
    assert_eq!(answer["file"], "good.toml");
    assert_eq!(code(&assessed), code_of(&answer["verdict"]));
    let as_text = coilstay(&["assess", "good.toml"], place.path());
    assert_eq!(code(&as_text), code(&assessed));
    assert!(text(&as_text.stdout).contains("licensed engineer"));
}

#[test]
fn bad_input_is_undecided_and_stops_no_other_case() {
    let place = place();
    for missing in ["nowhere.toml", "."] {
        let output = coilstay(&["assess", missing], place.path());
        assert_eq!(code(&output), 2);
        assert!(text(&output.stderr).contains(missing));
    }
    let both = coilstay(
        &["assess", "bad.toml", "good.toml", "--format", "json"],
        place.path(),
    );
    assert_eq!(code(&both), 2, "the worst counts");
    let answer = json(&both);
    let cases = answer["cases"].as_array().unwrap();
    assert_eq!(cases.len(), 2);
    assert_eq!(cases[0]["file"], "bad.toml");
    assert_eq!(cases[0]["verdict"], "undecided");
    let mistake = &cases[0]["mistakes"][0];
    assert!(mistake["line"].as_u64().unwrap() > 1);
    assert!(mistake["column"].as_u64().unwrap() > 1);
    assert!(mistake["message"].as_str().unwrap().contains("210 N"));
    assert!(mistake["cure"].as_str().unwrap().contains("mm"));
    assert_eq!(cases[1]["file"], "good.toml");
    assert!(cases[1]["spring"].is_object());
    // The mistake is explained to people as well, with its place.
    assert!(text(&both.stderr).contains("bad.toml:"));
}

#[test]
fn wrong_arguments_are_undecided_too() {
    let place = place();
    for arguments in [
        vec![],
        vec!["assess"],
        vec!["assess", "good.toml", "--format", "xml"],
        vec!["assess", "good.toml", "--replace"],
        vec!["invented"],
    ] {
        assert_eq!(
            code(&coilstay(&arguments, place.path())),
            2,
            "{arguments:?}"
        );
    }
    assert_eq!(code(&coilstay(&["--help"], place.path())), 0);
    assert_eq!(code(&coilstay(&["--version"], place.path())), 0);
}

#[test]
fn the_load_path_is_written_once() {
    let place = place();
    let first = coilstay(&["assess", "good.toml", "--out", "paths"], place.path());
    assert!(code(&first) < 2, "{}", text(&first.stderr));
    let table = place.path().join("paths/good-path.csv");
    let picture = place.path().join("paths/good-path.svg");
    let heading = fs::read_to_string(&table).unwrap();
    assert!(heading.starts_with("deflection_m,shortening_m,force_n,bow_m,"));
    assert!(fs::read_to_string(&picture).unwrap().starts_with("<svg"));

    fs::write(&table, "mine").unwrap();
    let second = coilstay(&["assess", "good.toml", "--out", "paths"], place.path());
    assert_eq!(code(&second), 2);
    assert!(text(&second.stderr).contains("good-path.csv exists"));
    assert!(
        second.stdout.is_empty(),
        "refused before anything is computed"
    );
    assert_eq!(fs::read_to_string(&table).unwrap(), "mine");

    let anew = ["assess", "good.toml", "--out", "paths", "--replace"];
    assert_eq!(code(&coilstay(&anew, place.path())), code(&first));
    assert_eq!(fs::read_to_string(&table).unwrap(), heading);

    let into_file = coilstay(&["assess", "good.toml", "--out", "good.toml"], place.path());
    assert_eq!(code(&into_file), 2);
    assert!(text(&into_file.stderr).contains("not a directory"));

    fs::create_dir(place.path().join("other")).unwrap();
    fs::copy(
        place.path().join("good.toml"),
        place.path().join("other/good.toml"),
    )
    .unwrap();
    let twice = coilstay(
        &["assess", "good.toml", "other/good.toml", "--out", "both"],
        place.path(),
    );
    assert_eq!(code(&twice), 2);
    assert!(text(&twice.stderr).contains("twice"));
    assert!(!place.path().join("both").exists());
}

#[test]
fn no_escapes_into_a_pipe() {
    let place = place();
    for arguments in [
        &["assess", "good.toml", "bad.toml"][..],
        &["materials"],
        &["--help"],
    ] {
        let output = coilstay(arguments, place.path());
        assert!(!output.stdout.contains(&0x1b), "{arguments:?}");
        assert!(!output.stderr.contains(&0x1b), "{arguments:?}");
    }
    let coloured = |no_colour: bool| {
        let mut command = Command::cargo_bin("coilstay").unwrap();
        command.arg("materials").env("CLICOLOR_FORCE", "1");
        if no_colour {
            command.env("NO_COLOR", "1").env_remove("CLICOLOR_FORCE");
        }
        command.output().unwrap().stdout.contains(&0x1b)
    };
    assert!(coloured(false));
    assert!(!coloured(true));
}

/// A reader that goes away ends the program quietly, with the code of what it found.
#[test]
fn a_closed_pipe_is_no_trouble() {
    let place = place();
    for arguments in [&["materials"][..], &["starter"], &["schema"], &["--help"]] {
        let mut child = std::process::Command::new(assert_cmd::cargo::cargo_bin!("coilstay"))
            .args(arguments)
            .current_dir(place.path())
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        drop(child.stdout.take());
        let output = child.wait_with_output().unwrap();
        assert_eq!(output.status.code(), Some(0), "{arguments:?}");
        assert_eq!(text(&output.stderr), "", "{arguments:?}");
    }
}

/// README shows what its first command prints; lines with an error estimate may differ in its last
/// digit from one processor to the next.
#[test]
fn readme_shows_the_real_answer() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let readme = fs::read_to_string(root.join("README.md")).unwrap();
    let shown = readme.split("```text\n").nth(1).unwrap();
    let shown = shown.split("```").next().unwrap();
    let output = Command::cargo_bin("coilstay")
        .unwrap()
        .current_dir(root)
        .args(["assess", "cases/rail-clamp.toml"])
        .output()
        .unwrap();
    let printed = String::from_utf8(output.stdout).unwrap();
    let plain = |text: &str| -> Vec<String> {
        let lines = text.lines().filter(|line| !line.contains("e-"));
        lines.map(|line| line.trim_end().to_owned()).collect()
    };
    let (shown, printed) = (plain(shown), plain(&printed));
    assert!(shown.len() > 30);
    assert_eq!(shown, printed[..shown.len()]);
}

/// A path that ends where it starts decides nothing: exit code 2, with the reason.
#[test]
fn a_path_that_goes_nowhere_is_undecided() {
    let directory = place();
    let text = "[spring]\nwire = \"8 mm\"\nmean_diameter = \"62 mm\"\nfree_length = \"80 mm\"\n\
                active_coils = 4\ntotal_coils = 6\n[material]\nname = \"oil-tempered-steel\"\n\
                [bottom]\nkind = \"clamped\"\ntilt = \"88 deg\"\n[top]\nkind = \"free\"\n\
                [duty]\nworking_deflection = \"15 mm\"\nrate_loss_share = 0.9\n";
    fs::write(directory.path().join("tilted.toml"), text).unwrap();
    let output = coilstay(
        &["assess", "tilted.toml", "--format", "json"],
        directory.path(),
    );
    assert_eq!(code(&output), 2);
    let answer = json(&output);
    assert_eq!(answer["verdict"], "undecided");
    assert!(answer["undecided_reason"].is_string());
}
