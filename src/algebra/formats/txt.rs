//! Rows of integers separated by blanks; `#` begins a comment.

use super::{ReadError, from_rows, text};
use crate::algebra::{Field, Matrix};

/// One row a line; empty lines and comments are passed over.
pub(super) fn read(bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    let mut rows = Vec::new();
    for (number, line) in text::lines(text::utf8(bytes)?) {
        let line = line.split('#').next().unwrap_or_default();
        if line.trim().is_empty() {
            continue;
        }
        let row: Result<Vec<_>, _> = line
            .split_whitespace()
            .map(|word| text::entry(word, number, field))
            .collect();
        rows.push((number, row?));
    }
    from_rows(field, &rows)
}
