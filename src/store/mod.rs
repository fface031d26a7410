//! Outputs whole or not at all: each file is written beside its place under a temporary name,
//! then renamed. Nothing is overwritten unless that was asked for.

use std::collections::BTreeSet;
use std::fmt;
use std::fs;
use std::io::{self, Write};
use std::path::{Path, PathBuf};
use tempfile::{Builder, NamedTempFile};

/// A file to be written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Output {
    /// Where.
    pub path: PathBuf,
    /// What.
    pub content: Vec<u8>,
}

/// Whether a file that is already there may be replaced.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Existing {
    /// Leave it, refuse.
    Refuse,
    /// Replace it.
    Replace,
}

/// Why an output was not written.
#[derive(Debug)]
pub enum StoreError {
    /// Something is there and was not to be replaced.
    Exists(PathBuf),
    /// A directory stands where the file should.
    IsDirectory(PathBuf),
    /// The directory to write into is something else.
    NotDirectory(PathBuf),
    /// Two outputs would have the same name.
    Twice(PathBuf),
    /// The system refused.
    System(PathBuf, io::Error),
}

impl fmt::Display for StoreError {
    fn fmt(&self, f: &mut fmt::Formatter) -> fmt::Result {
        match self {
            StoreError::Exists(path) => write!(
                f,
                "{} exists and is left as it is; use --replace to write it anew",
                path.display()
            ),
            StoreError::IsDirectory(path) => {
                write!(f, "{} is a directory; name a file", path.display())
            }
            StoreError::NotDirectory(path) => write!(
                f,
                "{} is not a directory; name a directory to write into",
                path.display()
            ),
            StoreError::Twice(path) => write!(
                f,
                "{} would be written twice; write cases of the same file name into different directories",
                path.display()
            ),
            StoreError::System(path, cause) => {
                write!(f, "{} could not be written: {cause}", path.display())
            }
        }
    }
}

impl std::error::Error for StoreError {}

/// Whether outputs of these names could be written, as far as can be told beforehand.
///
/// # Errors
/// As [`write()`], without touching the disk.
pub fn check<'a>(
    paths: impl IntoIterator<Item = &'a Path>,
    existing: Existing,
) -> Result<(), StoreError> {
    let mut names = BTreeSet::new();
    for path in paths {
        if !names.insert(path) {
            return Err(StoreError::Twice(path.to_path_buf()));
        }
        let directory = directory_of(path);
        if directory.exists() && !directory.is_dir() {
            return Err(StoreError::NotDirectory(directory.to_path_buf()));
        }
        match fs::symlink_metadata(path) {
            Ok(_) if path.is_dir() => return Err(StoreError::IsDirectory(path.to_path_buf())),
            Ok(_) if existing == Existing::Refuse => {
                return Err(StoreError::Exists(path.to_path_buf()));
            }
            _ => {}
        }
    }
    Ok(())
}

/// Writes the outputs. Every one is complete on the disk under a temporary name before the first
/// takes its place; directories that are missing are made.
///
/// # Errors
/// [`StoreError`]: something is there already, a directory is in the way, two outputs have the
/// same name, or the system refuses. No output is ever left half written.
pub fn write(outputs: &[Output], existing: Existing) -> Result<(), StoreError> {
    check(outputs.iter().map(|output| output.path.as_path()), existing)?;
    let mut ready = Vec::with_capacity(outputs.len());
    for output in outputs {
        let temporary = written_beside(output)
            .map_err(|cause| StoreError::System(output.path.clone(), cause))?;
        ready.push((temporary, &output.path));
    }
    for (temporary, path) in ready {
        let placed = match existing {
            Existing::Replace => temporary.persist(path),
            Existing::Refuse => temporary.persist_noclobber(path),
        };
        placed.map_err(|failed| match failed.error.kind() {
            io::ErrorKind::AlreadyExists => StoreError::Exists(path.clone()),
            _ => StoreError::System(path.clone(), failed.error),
        })?;
    }
    Ok(())
}

/// The whole content in a temporary file in the output's own directory. Dropped, it is gone.
fn written_beside(output: &Output) -> io::Result<NamedTempFile> {
    let directory = directory_of(&output.path);
    fs::create_dir_all(directory)?;
    let mut builder = Builder::new();
    builder.prefix(".coilstay-");
    #[cfg(unix)]
    {
        // As any new file: what the user's mask leaves of it.
        use std::os::unix::fs::PermissionsExt;
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    let mut file = builder.tempfile_in(directory)?;
    file.write_all(&output.content)?;
    file.as_file().sync_all()?;
    Ok(file)
}

/// The directory a path lies in.
fn directory_of(path: &Path) -> &Path {
    match path.parent() {
        Some(parent) if !parent.as_os_str().is_empty() => parent,
        _ => Path::new("."),
    }
}
