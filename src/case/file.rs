//! A case file becomes text, or a mistake that says why not.

use super::diagnostics::{Diagnostics, Mistake};
use std::fs::File;
use std::io::{ErrorKind, Read};
use std::path::Path;

/// Larger files are refused, bytes.
pub(super) const LARGEST_FILE: u64 = 1_000_000;

/// The text of the file at `path`.
///
/// # Errors
/// Directories, unreadable, empty, binary and non-UTF-8 files, and files over 1 MB; of these no
/// more than 1 MB and one byte is read.
pub(super) fn text_of(path: &Path) -> Result<String, Diagnostics> {
    let name = path.display().to_string();
    let refuse = |message: String, cure: &str| {
        Err(Diagnostics::new(
            &name,
            "",
            vec![Mistake::of_file(message, cure)],
        ))
    };
    if path.is_dir() {
        return refuse(
            "this is a directory, not a case file".to_string(),
            "name the case file in it, for example by adding /case.toml",
        );
    }
    let mut bytes = Vec::new();
    let read =
        File::open(path).and_then(|file| file.take(LARGEST_FILE + 1).read_to_end(&mut bytes));
    if let Err(error) = read {
        let cure = match error.kind() {
            ErrorKind::NotFound => {
                "check the spelling and the folder; `coilstay starter` prints a case to begin from"
            }
            ErrorKind::PermissionDenied => "allow yourself to read it, or copy it to where you may",
            _ => "make sure that the file exists and can be read",
        };
        return refuse(format!("the file cannot be read: {error}"), cure);
    }
    if bytes.len() as u64 > LARGEST_FILE {
        return refuse(
            "the file is larger than 1 MB; a case file has a few kilobytes".to_string(),
            "name a case file; `coilstay starter` prints one to begin from",
        );
    }
    match String::from_utf8(bytes) {
        Ok(text) => match text.find('\0') {
            None => Ok(text),
            Some(at) => Err(not_text(&name, &text[..at], "a zero byte")),
        },
        Err(error) => {
            let valid = error.utf8_error().valid_up_to();
            let before = String::from_utf8_lossy(&error.as_bytes()[..valid]);
            Err(not_text(&name, &before, "not UTF-8"))
        }
    }
}

fn not_text(name: &str, before: &str, what: &str) -> Diagnostics {
    let at = before.len();
    let mistake = Mistake::at(
        at..at,
        format!("not a text file: byte {} is {what}", at + 1),
        "name a case file, saved as text in UTF-8",
    );
    Diagnostics::new(name, before, vec![mistake])
}
