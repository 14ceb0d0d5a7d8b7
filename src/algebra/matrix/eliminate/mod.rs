//! The one elimination: reduced row echelon form with pivots in a given order of columns.
//!
//! The columns are laid out in that order, eliminated from left to right by the method that suits
//! the field, and put back. The reduced form is unique, so all methods agree on every entry.

mod binary;
mod bytes;
mod prime;
mod triangular;
mod words;

use super::{Echelon, Matrix, Store};
pub(super) use bytes::add_byte_multiple;

impl Matrix {
    /// The row echelon form whose pivots are chosen greedily in the given order of columns (a
    /// permutation of all of them). Columns keep their places; row i's leading 1 stands in column
    /// `pivots[i]`, and is the only non-zero entry there.
    pub fn reduced_in(&self, order: &[usize]) -> Echelon {
        let in_place = order.len() == self.columns && order.iter().copied().eq(0..self.columns);
        let arranged = Arrangement::new(self.columns, order);
        let field = &self.field;
        if field.is_binary() {
            let solved = triangular::reduce(self, order);
            let (bits, pivots) =
                solved.unwrap_or_else(|| binary::reduce(self, &arranged, in_place));
            let matrix = Matrix {
                field: field.clone(),
                rows: pivots.len(),
                columns: self.columns,
                store: Store::Bits(bits),
            };
            return Echelon { matrix, pivots };
        }
        let (mut store, pivots) = if field.order() <= 256 {
            let mut entries = arranged.lay_out(self, |value| value as u8);
            let pivots = if field.degree() == 1 {
                prime::reduce(field, &mut entries, self.columns, arranged.eligible)
            } else {
                bytes::reduce(field, &mut entries, self.columns, arranged.eligible)
            };
            entries.truncate(pivots.len() * self.columns);
            (Store::Bytes(entries), pivots)
        } else {
            let mut entries = arranged.lay_out(self, |value| value);
            let pivots = if field.degree() == 1 {
                prime::reduce(field, &mut entries, self.columns, arranged.eligible)
            } else {
                words::reduce(field, &mut entries, self.columns, arranged.eligible)
            };
            entries.truncate(pivots.len() * self.columns);
            (Store::Words(entries), pivots)
        };
        if !in_place {
            match &mut store {
                Store::Bytes(entries) => arranged.put_back(entries),
                Store::Words(entries) => arranged.put_back(entries),
                _ => unreachable!("larger fields are bytes or words"),
            }
        }
        let matrix = Matrix {
            field: field.clone(),
            rows: pivots.len(),
            columns: self.columns,
            store,
        };
        let pivots = pivots.iter().map(|&at| arranged.columns[at]).collect();
        Echelon { matrix, pivots }
    }

    /// The rank. On a sparse matrix, rows that alone meet some column are counted and set aside
    /// before the rest is eliminated.
    pub fn rank(&self) -> usize {
        if !self.is_sparse() {
            return self.reduced().pivots.len();
        }
        let (counted, rest) = triangular::peel(self, |_| true);
        if rest.is_empty() {
            return counted.len();
        }
        let mut counted_columns = vec![false; self.columns];
        for &(_, column) in &counted {
            counted_columns[column] = true;
        }
        let part = self.select_rows(&rest);
        let columns: Vec<usize> = (0..self.columns)
            .filter(|&column| !counted_columns[column] && part.column_weight(column) > 0)
            .collect();
        counted.len()
            + part
                .select_columns(&columns)
                .to_dense()
                .reduced()
                .pivots
                .len()
    }
}

/// Columns laid out in another order: first those eligible as pivots, then the rest.
struct Arrangement {
    /// The original column at each place.
    columns: Vec<usize>,
    /// The place of each original column.
    places: Vec<usize>,
    eligible: usize,
}

impl Arrangement {
    fn new(count: usize, order: &[usize]) -> Arrangement {
        let mut columns = order.to_vec();
        let mut places = vec![usize::MAX; count];
        for (place, &column) in order.iter().enumerate() {
            assert_eq!(
                places[column],
                usize::MAX,
                "column {column} stands twice in an order"
            );
            places[column] = place;
        }
        for (column, place) in places.iter_mut().enumerate() {
            if *place == usize::MAX {
                *place = columns.len();
                columns.push(column);
            }
        }
        Arrangement {
            columns,
            places,
            eligible: order.len(),
        }
    }

    fn lay_out<T: Copy + Default>(&self, matrix: &Matrix, entry: impl Fn(u32) -> T) -> Vec<T> {
        let count = self.columns.len();
        let mut entries = vec![T::default(); matrix.rows * count];
        for row in 0..matrix.rows {
            let to = &mut entries[row * count..(row + 1) * count];
            for (column, value) in matrix.nonzero(row) {
                to[self.places[column]] = entry(value);
            }
        }
        entries
    }

    fn put_back<T: Copy>(&self, entries: &mut [T]) {
        let count = self.columns.len();
        if count == 0 {
            return;
        }
        for row in entries.chunks_exact_mut(count) {
            let arranged = row.to_vec();
            for (value, &column) in arranged.into_iter().zip(&self.columns) {
                row[column] = value;
            }
        }
    }
}

/// Exchanges two rows of a flat matrix.
fn swap_rows<T>(entries: &mut [T], columns: usize, left: usize, right: usize) {
    if left != right {
        let (low, high) = (left.min(right), left.max(right));
        let (head, tail) = entries.split_at_mut(high * columns);
        head[low * columns..(low + 1) * columns].swap_with_slice(&mut tail[..columns]);
    }
}

/// Textbook elimination over a flat matrix whose row operations are given: `scale(row)` makes the
/// first entry 1, `clear(pivot, row)` adds to the row the multiple of the pivot's row that clears
/// its first entry. Both get rows from the pivot's column on. Returns the pivots.
fn reduce_by_rows<T: Copy + Default + PartialEq>(
    entries: &mut [T],
    columns: usize,
    eligible: usize,
    mut scale: impl FnMut(&mut [T]),
    mut clear: impl FnMut(&[T], &mut [T], bool),
) -> Vec<usize> {
    let mut pivots = Vec::new();
    let rows = entries.len().checked_div(columns).unwrap_or(0);
    let zero = T::default();
    for column in 0..eligible {
        let rank = pivots.len();
        let Some(found) = (rank..rows).find(|&row| entries[row * columns + column] != zero) else {
            continue;
        };
        swap_rows(entries, columns, rank, found);
        let span = rank * columns + column..(rank + 1) * columns;
        scale(&mut entries[span.clone()]);
        let pivot = entries[span].to_vec();
        let mut first = true;
        for row in 0..rows {
            let tail = &mut entries[row * columns + column..(row + 1) * columns];
            if row != rank && tail[0] != zero {
                clear(&pivot, tail, first);
                first = false;
            }
        }
        pivots.push(column);
        if pivots.len() == rows {
            break;
        }
    }
    pivots
}
