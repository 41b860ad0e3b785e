//! Where a result goes.

use std::fs;
use std::io::{self, Write};
use std::path::Path;

use tempfile::NamedTempFile;

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

/// Writes a file all at once: a reader sees the old one or the new one, never half of it. A link keeps pointing where it points,
/// and what is no ordinary file, such as a device or a pipe, is written to and stays what it is.
fn write_file(text: &str, path: &Path) -> Result<(), Failure> {
    replace(text, path).map_err(|error| Failure::file("cannot write", &path.display().to_string(), &error))
}

fn replace(text: &str, path: &Path) -> io::Result<()> {
    let target = match fs::canonicalize(path) {
        Ok(target) => target,
        Err(error) if error.kind() == io::ErrorKind::NotFound && !path.is_symlink() => path.to_path_buf(),
        Err(error) => return Err(error),
    };
    let old = fs::metadata(&target).ok();
    if old.as_ref().is_some_and(|old| !old.is_file()) {
        return fs::OpenOptions::new().write(true).open(&target)?.write_all(text.as_bytes());
    }
    let folder = target.parent().filter(|parent| !parent.as_os_str().is_empty()).unwrap_or(Path::new("."));
    fs::metadata(folder)?;
    // An error of the temporary file itself would name it to a user who never heard of it.
    let file = created(folder).map_err(|error| io::Error::from(error.kind()))?;
    file.as_file().write_all(text.as_bytes())?;
    if let Some(old) = old {
        file.as_file().set_permissions(old.permissions())?;
    }
    file.as_file().sync_all()?;
    file.persist(&target).map_err(|error| error.error)?;
    Ok(())
}

/// A new file in `folder` with the permissions that the user's other new files get.
fn created(folder: &Path) -> io::Result<NamedTempFile> {
    let mut builder = tempfile::Builder::new();
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    builder.tempfile_in(folder)
}
