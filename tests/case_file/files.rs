//! Files that are not what they should be.

use super::{BASE, with};
use coilstay::case;
use std::fs;
use std::path::{Path, PathBuf};

fn refusal(path: &Path) -> (usize, usize, String) {
    let mistakes = case::load(path).expect_err("must be refused");
    assert_eq!(mistakes.items().len(), 1);
    let item = &mistakes.items()[0];
    assert!(!item.cure.is_empty());
    let text = mistakes.render(false);
    assert!(text.contains(&path.display().to_string()), "{text}");
    assert!(text.contains("help: "), "{text}");
    (item.line, item.column, item.message.clone())
}

fn written(name: &str, bytes: &[u8]) -> (tempfile::TempDir, PathBuf) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join(name);
    fs::write(&path, bytes).unwrap();
    (folder, path)
}

#[test]
fn what_is_no_case_file() {
    let folder = tempfile::tempdir().unwrap();
    assert!(refusal(folder.path()).2.contains("directory"));
    let nothing = refusal(&folder.path().join("nothing.toml"));
    assert!(nothing.2.contains("cannot be read"));
    for empty in ["", "\n \n", "# a comment\n"] {
        let (_folder, path) = written("empty.toml", empty.as_bytes());
        assert!(refusal(&path).2.contains("says nothing"));
    }
}

#[test]
fn binary_files_are_named_by_their_byte() {
    let (_folder, path) = written("picture.toml", b"a = 1\nbc\xff\xfe\n");
    assert_eq!(
        refusal(&path),
        (2, 3, "not a text file: byte 9 is not UTF-8".to_string())
    );
    let (_folder, path) = written("zero.toml", b"ab\0");
    assert_eq!(
        refusal(&path),
        (1, 3, "not a text file: byte 3 is a zero byte".to_string())
    );
}

#[test]
fn large_files_are_not_read_on() {
    let padded = |bytes: usize| {
        let mut text = BASE.to_string();
        text.push('#');
        text.extend(std::iter::repeat_n('x', bytes - text.len() - 1));
        text.push('\n');
        text
    };
    let (_folder, path) = written("at.toml", &padded(1_000_000).as_bytes()[..1_000_000]);
    assert!(case::load(&path).is_ok());
    let (_folder, path) = written("over.toml", padded(1_000_001).as_bytes());
    assert!(refusal(&path).2.contains("larger than 1 MB"));
    // Never ends: refused only because reading stops.
    #[cfg(target_os = "linux")]
    assert!(
        refusal(Path::new("/dev/zero"))
            .2
            .contains("larger than 1 MB")
    );
}

#[cfg(unix)]
#[test]
fn unreadable_files() {
    use std::os::unix::fs::PermissionsExt;
    let (_folder, path) = written("secret.toml", BASE.as_bytes());
    fs::set_permissions(&path, fs::Permissions::from_mode(0o000)).unwrap();
    // An administrator may read it all the same.
    if fs::File::open(&path).is_err() {
        assert!(refusal(&path).2.contains("cannot be read"));
    }
}

/// Saved by another system: byte-order mark, line ends with carriage return.
#[test]
fn line_ends_and_byte_order_mark() {
    let text = format!("\u{feff}{}", BASE.replace('\n', "\r\n"));
    let (_folder, path) = written("windows.toml", text.as_bytes());
    assert!(case::load(&path).is_ok());
    let text = format!("\u{feff}{}", with("title", "titel").replace('\n', "\r\n"));
    let (_folder, path) = written("windows.toml", text.as_bytes());
    let (line, column, message) = refusal(&path);
    assert_eq!((line, column), (1, 1), "{message}");
}

#[test]
fn the_cases_and_the_starter_are_read() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("cases");
    let mut count = 0;
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|e| e == "toml") {
            let case = case::load(&path).unwrap_or_else(|mistakes| panic!("{mistakes}"));
            assert!(case.setup.is_held());
            let unused = |warning: &String| warning.contains("kept for studies of a batch");
            let warnings = &case.setup.warnings;
            assert!(warnings.iter().all(unused), "{warnings:?}");
            count += 1;
        }
    }
    assert!(count >= 4);
    let starter = case::parse("starter", case::starter()).unwrap();
    assert_eq!(starter.text, case::starter());
}

/// What the starter shows commented out must work once it is uncommented: a table as a whole, the
/// other lines one by one.
#[test]
fn the_starters_examples_can_be_used() {
    let block: String = case::starter()
        .lines()
        .skip_while(|line| !line.starts_with("# ["))
        .take_while(|line| !line.is_empty())
        .map(|line| format!("{line}\n"))
        .collect();
    let uncommented = format!("\n{block}").replace("\n# ", "\n");
    let guided = case::starter().replace(&block, &uncommented);
    assert_eq!(
        case::parse("starter", &guided).map(|case| case.setup.guides.len()),
        Ok(1)
    );
    let mut tried = 0;
    for line in case::starter().replace(&block, "").lines() {
        let Some(example) = line.strip_prefix("# ").filter(|l| l.contains(" = ")) else {
            continue;
        };
        let uncommented = case::starter().replace(line, example);
        if let Err(mistakes) = case::parse("starter", &uncommented) {
            // It may contradict what stands beside it, or need its neighbour, but it is known.
            for item in mistakes.items() {
                assert!(
                    ["contradicts", "both given", "given twice", "needs `"]
                        .iter()
                        .any(|known| item.message.contains(known)),
                    "{example}: {mistakes}"
                );
            }
        }
        tried += 1;
    }
    assert!(tried >= 15, "{tried}");
}
