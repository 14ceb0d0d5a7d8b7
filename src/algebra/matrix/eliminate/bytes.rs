//! Elimination over the extension fields of at most 256 elements, by tables of products.

use super::reduce_by_rows;
use crate::algebra::Field;
use crate::algebra::field::ByteTables;

/// `row += factor · other` over a field of at most 256 elements.
pub(in crate::algebra::matrix) fn add_byte_multiple(
    field: &Field,
    row: &mut [u8],
    factor: u8,
    other: &[u8],
) {
    let tables = field
        .byte_tables()
        .expect("bytes hold fields of at most 256 elements");
    add_multiple(tables, field.characteristic() == 2, row, factor, other);
}

fn add_multiple(tables: &ByteTables, even: bool, row: &mut [u8], factor: u8, other: &[u8]) {
    let products = tables.products(factor);
    if even {
        for (entry, &summand) in row.iter_mut().zip(other) {
            *entry ^= products[usize::from(summand)];
        }
    } else {
        for (entry, &summand) in row.iter_mut().zip(other) {
            *entry = tables.sum(*entry, products[usize::from(summand)]);
        }
    }
}

/// Reduces a flat matrix in place; returns the pivots.
pub(super) fn reduce(
    field: &Field,
    entries: &mut [u8],
    columns: usize,
    eligible: usize,
) -> Vec<usize> {
    let tables = field
        .byte_tables()
        .expect("bytes hold fields of at most 256 elements");
    let scale = |row: &mut [u8]| {
        let inverse = field.inv(row[0].into()).expect("a pivot is not zero");
        let products = tables.products(inverse as u8);
        for entry in row {
            *entry = products[usize::from(*entry)];
        }
    };
    let rows = entries.len().checked_div(columns).unwrap_or(0);
    if field.characteristic() == 2 && rows >= 32 {
        let mut multiples = Multiples::default();
        return reduce_by_rows(entries, columns, eligible, scale, |pivot, row, first| {
            if first {
                multiples.prepare(tables, pivot);
            }
            multiples.add(row);
        });
    }
    let even = field.characteristic() == 2;
    reduce_by_rows(entries, columns, eligible, scale, |pivot, row, _| {
        let factor = field.neg(row[0].into()) as u8;
        add_multiple(tables, even, row, factor, pivot);
    })
}

/// In characteristic 2, the multiples of a pivot row by all elements x and 16·x, x < 16: any
/// multiple is a sum of two of them, by whole rows (after the four Russians: Arlazarov, Dinic,
/// Kronrod and Faradžev, 1970).
#[derive(Default)]
struct Multiples {
    length: usize,
    low: Vec<u8>,
    high: Vec<u8>,
}

impl Multiples {
    fn prepare(&mut self, tables: &ByteTables, pivot: &[u8]) {
        self.length = pivot.len();
        self.low.clear();
        self.high.clear();
        for digit in 0..16u8 {
            if usize::from(digit) < tables.order() {
                let products = tables.products(digit);
                self.low
                    .extend(pivot.iter().map(|&entry| products[usize::from(entry)]));
            }
            if usize::from(digit) * 16 < tables.order() {
                let products = tables.products(digit * 16);
                self.high
                    .extend(pivot.iter().map(|&entry| products[usize::from(entry)]));
            }
        }
    }

    /// Clears the first entry of a row.
    fn add(&self, row: &mut [u8]) {
        let (low, high) = (usize::from(row[0] & 15), usize::from(row[0] >> 4));
        let length = self.length;
        let low = &self.low[low * length..(low + 1) * length];
        let high = &self.high[high * length..(high + 1) * length];
        for ((entry, &low), &high) in row.iter_mut().zip(low).zip(high) {
            *entry ^= low ^ high;
        }
    }
}
