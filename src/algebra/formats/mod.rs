//! Reading matrices from files: one file a format, one line in the register.
//!
//! In: the bytes of a file and the field its entries belong to. Out: a [`Matrix`] of which every
//! entry is an element of that field, or a [`ReadError`] with the line at fault. Nothing is
//! allocated on the word of a header alone. Writing the same formats is the business of `emit`.

mod alist;
mod csv;
mod json;
mod mtx;
mod notation;
mod npy;
mod text;
mod txt;

pub use notation::modulus_text;

use std::fmt;

use super::{Element, Field, Matrix};

/// The most entries that a matrix from a file may have.
pub const MOST_ENTRIES: u64 = 1 << 31;

/// Entries a sparse file may ask for however short it is, and then for each of its bytes: enough
/// for the longest sparse check matrices in use, and no way to exhaust memory with a header.
const FREE_ENTRIES: u64 = 1 << 24;
const ENTRIES_A_BYTE: u64 = 1 << 10;

/// A format that matrices are read from.
#[derive(Clone, Copy, Debug)]
pub struct Format {
    /// The file name extension, without a dot, in lower case.
    pub extension: &'static str,
    /// What it is.
    pub says: &'static str,
    /// The reader.
    pub read: fn(&[u8], &Field) -> Result<Matrix, ReadError>,
}

/// Every format that is read, in the order they are named to the user.
pub const FORMATS: &[Format] = &[
    Format {
        extension: "mtx",
        says: "Matrix Market, coordinate or array",
        read: mtx::read,
    },
    Format {
        extension: "alist",
        says: "alist, binary or with values",
        read: alist::read,
    },
    Format {
        extension: "npy",
        says: "NumPy array of integers",
        read: npy::read,
    },
    Format {
        extension: "csv",
        says: "rows of integers separated by commas",
        read: csv::read,
    },
    Format {
        extension: "txt",
        says: "rows of integers separated by blanks",
        read: txt::read,
    },
    Format {
        extension: "json",
        says: "object with entries, or array of rows",
        read: json::read,
    },
];

/// Why a file is no matrix over the given field.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct ReadError {
    /// The line at fault, from 1, when the format has lines.
    pub line: Option<usize>,
    /// What is wrong and what is expected, lower case, no full stop.
    pub says: String,
}

impl ReadError {
    fn new(says: impl Into<String>) -> ReadError {
        ReadError {
            line: None,
            says: says.into(),
        }
    }

    fn at(line: usize, says: impl Into<String>) -> ReadError {
        ReadError {
            line: Some(line),
            says: says.into(),
        }
    }
}

impl fmt::Display for ReadError {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.line {
            Some(line) => write!(formatter, "line {line}: {}", self.says),
            None => formatter.write_str(&self.says),
        }
    }
}

impl std::error::Error for ReadError {}

/// The matrix over `field` in a file named `path`, whose extension says the format.
///
/// # Errors
/// When the extension is none of [`FORMATS`], the bytes do not follow the format, an entry is no
/// integer in 0 … q−1, or the matrix is larger than [`MOST_ENTRIES`].
pub fn read(path: &str, bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    let name = path.rsplit(['/', '\\']).next().unwrap_or(path);
    let extension = match name.rsplit_once('.') {
        Some((_, extension)) => extension.to_ascii_lowercase(),
        None => String::new(),
    };
    match FORMATS.iter().find(|format| format.extension == extension) {
        Some(format) => (format.read)(bytes, field),
        None => {
            let known: Vec<&str> = FORMATS.iter().map(|format| format.extension).collect();
            let known = known.join(", .");
            Err(ReadError::new(format!(
                "the name {name} does not say its format; known endings are .{known}"
            )))
        }
    }
}

/// The element that an integer in a file names.
fn element(value: u64, field: &Field) -> Result<Element, String> {
    if value < field.order() {
        Ok(value as Element)
    } else {
        Err(no_element(&value.to_string(), field))
    }
}

fn no_element(written: &str, field: &Field) -> String {
    let last = field.order() - 1;
    format!("{written} names no element of {field}; entries are integers from 0 to {last}")
}

/// Checks that a matrix of this shape may be made from a dense file.
fn check_size(rows: u64, columns: u64) -> Result<(), String> {
    match rows.checked_mul(columns) {
        // Each side is bounded too, so that a matrix without entries stays small.
        Some(entries) if entries <= MOST_ENTRIES && rows.max(columns) <= MOST_ENTRIES => Ok(()),
        _ => Err(format!(
            "{rows} rows and {columns} columns are more than the {MOST_ENTRIES} entries a matrix may have"
        )),
    }
}

/// Checks that a matrix of this shape may be made from a sparse file of `bytes` bytes.
fn check_sparse_size(rows: u64, columns: u64, bytes: usize) -> Result<(), String> {
    check_size(rows, columns)?;
    let allowed = FREE_ENTRIES.saturating_add((bytes as u64).saturating_mul(ENTRIES_A_BYTE));
    if rows.saturating_mul(columns).max(rows).max(columns) > allowed {
        return Err(format!(
            "a file of {bytes} bytes is too short to be a matrix of {rows} rows and {columns} columns"
        ));
    }
    Ok(())
}

/// A matrix from rows already checked against the field; all must be of one length.
fn from_rows(field: &Field, rows: &[(usize, Vec<Element>)]) -> Result<Matrix, ReadError> {
    let Some((_, first)) = rows.first() else {
        return Err(ReadError::new("there are no rows"));
    };
    if let Some((line, row)) = rows.iter().find(|(_, row)| row.len() != first.len()) {
        return Err(ReadError::at(
            *line,
            format!(
                "this row has {} entries, the first one has {}",
                row.len(),
                first.len()
            ),
        ));
    }
    check_size(rows.len() as u64, first.len() as u64).map_err(ReadError::new)?;
    Ok(Matrix::from_fn(
        field,
        rows.len(),
        first.len(),
        |row, column| rows[row].1[column],
    ))
}
