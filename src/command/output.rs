//! Where a result goes.

use std::io::Write;
use std::path::Path;

use super::failure::Failure;
use super::input::is_stream;

/// Writes a result to `out`, or to standard output.
pub(super) fn write(text: &str, out: Option<&Path>) -> Result<(), Failure> {
    match out {
        Some(path) if !is_stream(path) => write_file(text, path),
        _ => {
            let mut stream = std::io::stdout().lock();
            stream
                .write_all(text.as_bytes())
                .and_then(|()| stream.flush())
                .map_err(|error| Failure::file("cannot write to", "standard output", &error))
        }
    }
}

/// Writes a file all at once: a reader sees the old one or the new one, never half of it.
pub(super) fn write_file(text: &str, path: &Path) -> Result<(), Failure> {
    let name = path.display().to_string();
    let failed = |error: std::io::Error| Failure::file("cannot write", &name, &error);
    let folder = path.parent().filter(|parent| !parent.as_os_str().is_empty()).unwrap_or(Path::new("."));
    // The error names the temporary file, which means nothing to the user.
    let mut file = tempfile::NamedTempFile::new_in(folder).map_err(|error| failed(error.kind().into()))?;
    file.write_all(text.as_bytes()).and_then(|()| file.as_file().sync_all()).map_err(failed)?;
    file.persist(path).map_err(|error| failed(error.error))?;
    Ok(())
}
