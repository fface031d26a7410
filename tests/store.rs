//! Outputs are whole or absent, and nothing is overwritten unasked.

use coilstay::store::{Existing, Output, StoreError, check, write};
use std::fs;
use std::path::Path;

fn output(path: &Path, content: &str) -> Output {
    Output {
        path: path.to_path_buf(),
        content: content.as_bytes().to_vec(),
    }
}

fn names(directory: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(directory)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    names.sort();
    names
}

#[test]
fn writes_all_and_leaves_nothing_else() {
    let place = tempfile::tempdir().unwrap();
    let below = place.path().join("new/deep");
    let outputs = [
        output(&below.join("a"), "one"),
        output(&below.join("b"), "two"),
    ];
    write(&outputs, Existing::Refuse).unwrap();
    assert_eq!(names(&below), ["a", "b"]);
    assert_eq!(fs::read_to_string(below.join("b")).unwrap(), "two");
}

#[test]
fn refuses_what_exists_and_then_writes_none() {
    let place = tempfile::tempdir().unwrap();
    let old = place.path().join("old");
    fs::write(&old, "kept").unwrap();
    let outputs = [output(&place.path().join("new"), "x"), output(&old, "y")];
    let error = write(&outputs, Existing::Refuse).unwrap_err();
    assert!(matches!(&error, StoreError::Exists(path) if *path == old));
    assert!(error.to_string().contains("--replace"));
    assert_eq!(names(place.path()), ["old"]);
    assert_eq!(fs::read_to_string(&old).unwrap(), "kept");

    write(&outputs, Existing::Replace).unwrap();
    assert_eq!(names(place.path()), ["new", "old"]);
    assert_eq!(fs::read_to_string(&old).unwrap(), "y");
}

#[test]
fn a_directory_is_no_file_and_a_file_no_directory() {
    let place = tempfile::tempdir().unwrap();
    for existing in [Existing::Refuse, Existing::Replace] {
        let error = write(&[output(place.path(), "x")], existing).unwrap_err();
        assert!(matches!(error, StoreError::IsDirectory(_)), "{error}");
    }
    let file = place.path().join("file");
    fs::write(&file, "kept").unwrap();
    let error = write(&[output(&file.join("below"), "x")], Existing::Replace).unwrap_err();
    assert!(matches!(error, StoreError::NotDirectory(_)), "{error}");
    assert_eq!(fs::read_to_string(&file).unwrap(), "kept");
}

#[test]
fn two_of_one_name_are_refused() {
    let place = tempfile::tempdir().unwrap();
    let path = place.path().join("same");
    let error = check([path.as_path(), path.as_path()], Existing::Replace).unwrap_err();
    assert!(matches!(error, StoreError::Twice(_)), "{error}");
}

/// One output cannot be written: the others, which could, are not there either.
#[test]
fn one_that_fails_takes_the_others_with_it() {
    let place = tempfile::tempdir().unwrap();
    let long = place.path().join("d".repeat(300)).join("x");
    let outputs = [output(&place.path().join("good"), "x"), output(&long, "y")];
    let error = write(&outputs, Existing::Refuse).unwrap_err();
    assert!(matches!(error, StoreError::System(..)), "{error}");
    assert_eq!(names(place.path()), [] as [&str; 0]);
}

#[cfg(unix)]
#[test]
fn a_dangling_link_counts_as_existing() {
    let place = tempfile::tempdir().unwrap();
    let link = place.path().join("link");
    std::os::unix::fs::symlink(place.path().join("nowhere"), &link).unwrap();
    let error = write(&[output(&link, "x")], Existing::Refuse).unwrap_err();
    assert!(matches!(error, StoreError::Exists(_)), "{error}");
}
