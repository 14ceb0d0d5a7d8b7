//! Elimination over extension fields of more than 256 elements.

use super::reduce_by_rows;
use crate::algebra::{Element, Field};

/// Reduces a flat matrix in place; returns the pivots.
pub(super) fn reduce(
    field: &Field,
    entries: &mut [Element],
    columns: usize,
    eligible: usize,
) -> Vec<usize> {
    let scale = |row: &mut [Element]| {
        let inverse = field.inv(row[0]).expect("a pivot is not zero");
        for entry in row {
            *entry = field.mul(*entry, inverse);
        }
    };
    reduce_by_rows(entries, columns, eligible, scale, |pivot, row, _| {
        field.add_multiple(row, field.neg(row[0]), pivot);
    })
}
