//! Rows of integers separated by commas (RFC 4180, without quotes and without a header line).

use super::{ReadError, from_rows, text};
use crate::algebra::{Field, Matrix};

/// One row a line; empty lines are passed over.
pub(super) fn read(bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    let mut rows = Vec::new();
    for (number, line) in text::lines(text::utf8(bytes)?) {
        if line.trim().is_empty() {
            continue;
        }
        let row: Result<Vec<_>, _> = line
            .split(',')
            .map(|word| text::entry(word.trim(), number, field))
            .collect();
        rows.push((number, row?));
    }
    from_rows(field, &rows)
}
