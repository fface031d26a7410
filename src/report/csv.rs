//! A load path as CSV: SI, full precision, one column for each field of a path point.

use crate::result::Path;

/// The path as CSV with a heading. Numbers are the shortest text that reads back as the same number.
///
/// # Errors
/// The writer's own error, passed on.
pub fn csv(path: &Path) -> Result<Vec<u8>, csv::Error> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    for point in &path.points {
        writer.serialize(point)?;
    }
    writer
        .into_inner()
        .map_err(|error| csv::Error::from(error.into_error()))
}
