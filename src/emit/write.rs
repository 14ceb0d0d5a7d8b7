//! The one writer for files.

use std::io::{self, Write};
use std::path::Path;

/// Writes `bytes` to `path`, whole or not at all: to a temporary file in the same folder first,
/// which then takes the name. Folders on the way are made.
///
/// # Errors
/// What the system says; a file that stood at `path` is then untouched.
pub fn write_whole(path: &Path, bytes: &[u8]) -> io::Result<()> {
    let folder = match path.parent() {
        Some(folder) if !folder.as_os_str().is_empty() => folder,
        _ => Path::new("."),
    };
    if path.file_name().is_none() {
        return Err(io::Error::new(
            io::ErrorKind::InvalidInput,
            "this names no file",
        ));
    }
    std::fs::create_dir_all(folder)?;
    let mut builder = tempfile::Builder::new();
    builder.prefix(".cosetta-").suffix(".part");
    // A temporary file is private; what is delivered is as readable as any new file.
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        builder.permissions(std::fs::Permissions::from_mode(0o666));
    }
    let mut file = builder.tempfile_in(folder)?;
    file.write_all(bytes)?;
    file.as_file().sync_all()?;
    file.persist(path).map_err(|error| error.error)?;
    Ok(())
}
