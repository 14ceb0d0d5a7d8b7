//! Finding and reading files on the disk.

use crate::source::{LoadError, Loader};
use std::path::{Component, Path, PathBuf};

/// The most bytes of a file that a spec names.
const FILE_SIZE: u64 = 1 << 30;

/// The specs named on the command line: names as shown and texts. A folder stands for every
/// `*.coset` below it, in order.
///
/// # Errors
/// The first file that cannot be read, in words.
pub fn specs(named: &[String]) -> Result<Vec<(String, String)>, String> {
    let mut paths = Vec::new();
    for name in named {
        let path = Path::new(name);
        if path.is_dir() {
            let before = paths.len();
            below(path, &mut paths)
                .map_err(|error| format!("cannot read the folder {name}: {error}"))?;
            if paths.len() == before {
                return Err(format!("there is no *.coset file below {name}"));
            }
        } else {
            paths.push(path.to_path_buf());
        }
    }
    let mut seen = std::collections::BTreeSet::new();
    paths.retain(|path| seen.insert(path.clone()));
    paths
        .iter()
        .map(|path| {
            let shown = shown(path);
            let bytes =
                std::fs::read(path).map_err(|error| format!("cannot read {shown}: {error}"))?;
            let text = String::from_utf8(bytes).map_err(|error| {
                format!(
                    "{shown} is no UTF-8 text: byte {} is wrong",
                    error.utf8_error().valid_up_to()
                )
            })?;
            Ok((shown, text))
        })
        .collect()
}

fn shown(path: &Path) -> String {
    path.to_string_lossy().replace('\\', "/")
}

fn below(folder: &Path, found: &mut Vec<PathBuf>) -> std::io::Result<()> {
    let mut entries: Vec<PathBuf> = std::fs::read_dir(folder)?
        .map(|entry| Ok(entry?.path()))
        .collect::<std::io::Result<_>>()?;
    entries.sort();
    for path in entries {
        if path.is_dir() && !path.is_symlink() {
            below(&path, found)?;
        } else if path
            .extension()
            .is_some_and(|extension| extension == "coset")
        {
            found.push(path);
        }
    }
    Ok(())
}

/// Reads what specs name, from the disk, relative to the naming file and never outside the
/// project's root: the working folder for files below it, otherwise the naming file's own folder.
pub struct Disk;

impl Loader for Disk {
    fn load(&self, from: &str, path: &str) -> Result<(String, Vec<u8>), LoadError> {
        let folder = Path::new(from)
            .parent()
            .unwrap_or(Path::new(""))
            .to_path_buf();
        if Path::new(path).is_absolute() {
            return Err(LoadError(format!(
                "{path}: a spec names files relative to itself"
            )));
        }
        let wanted = tidied(&folder.join(path));
        let real = |path: &Path| {
            let path = if path.as_os_str().is_empty() {
                Path::new(".")
            } else {
                path
            };
            path.canonicalize()
                .map_err(|error| LoadError(format!("{}: {error}", shown(path))))
        };
        let target = real(&wanted)?;
        let working = real(Path::new("."))?;
        let home = real(&folder)?;
        let root = if home.starts_with(&working) {
            &working
        } else {
            &home
        };
        if !target.starts_with(root) {
            return Err(LoadError(format!("{path} lies outside the project's root")));
        }
        let size =
            std::fs::metadata(&target).map_err(|error| LoadError(format!("{path}: {error}")))?;
        if !size.is_file() {
            return Err(LoadError(format!("{path} is no file")));
        }
        if size.len() > FILE_SIZE {
            return Err(LoadError(format!(
                "{path} is larger than {FILE_SIZE} bytes"
            )));
        }
        let bytes =
            std::fs::read(&target).map_err(|error| LoadError(format!("{path}: {error}")))?;
        Ok((shown(&wanted), bytes))
    }
}

/// A path without `.` and, where possible, `..`.
fn tidied(path: &Path) -> PathBuf {
    let mut tidy = PathBuf::new();
    for component in path.components() {
        match component {
            Component::CurDir => {}
            Component::ParentDir
                if matches!(tidy.components().next_back(), Some(Component::Normal(_))) =>
            {
                tidy.pop();
            }
            other => tidy.push(other),
        }
    }
    tidy
}
