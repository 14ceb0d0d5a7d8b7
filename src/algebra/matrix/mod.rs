//! Matrices over a finite field.
//!
//! One type, four kinds of storage behind it: packed bits over GF(2), bytes for q ≤ 256, words
//! above, and lists of non-zero entries for large sparse matrices ([`Matrix::from_sparse`]). What
//! is built from sparse matrices by moving entries stays sparse; what elimination makes is dense.
//! [`Matrix::reduced_in`] is the one elimination; the rest of linear algebra goes through it.

mod bits;
mod eliminate;
mod shape;
mod solve;
mod sparse;
#[cfg(test)]
mod tests;

use std::fmt;

use super::{Element, Field};
use bits::Bits;
use sparse::Sparse;

/// A matrix over a finite field, of any shape, zero rows or columns included.
#[derive(Clone)]
pub struct Matrix {
    field: Field,
    rows: usize,
    columns: usize,
    store: Store,
}

#[derive(Clone)]
enum Store {
    Bits(Bits),
    Bytes(Vec<u8>),
    Words(Vec<u32>),
    Sparse(Sparse),
}

/// A reduced row echelon form.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Echelon {
    /// The non-zero rows, each with a leading 1 that is the only non-zero entry of its column.
    pub matrix: Matrix,
    /// The column of each row's leading 1, ascending.
    pub pivots: Vec<usize>,
}

impl Matrix {
    /// The zero matrix, dense.
    pub fn zero(field: &Field, rows: usize, columns: usize) -> Matrix {
        let store = match field.order() {
            2 => Store::Bits(Bits::zero(rows, columns)),
            order if order <= 256 => Store::Bytes(vec![0; rows * columns]),
            _ => Store::Words(vec![0; rows * columns]),
        };
        Matrix {
            field: field.clone(),
            rows,
            columns,
            store,
        }
    }

    /// The identity of the given size.
    pub fn identity(field: &Field, size: usize) -> Matrix {
        let mut matrix = Matrix::zero(field, size, size);
        for at in 0..size {
            matrix.set(at, at, 1);
        }
        matrix
    }

    /// Entry by entry.
    pub fn from_fn(
        field: &Field,
        rows: usize,
        columns: usize,
        mut entry: impl FnMut(usize, usize) -> Element,
    ) -> Matrix {
        let mut matrix = Matrix::zero(field, rows, columns);
        for row in 0..rows {
            for column in 0..columns {
                matrix.set(row, column, entry(row, column));
            }
        }
        matrix
    }

    /// From rows of equal length `columns` (given for the case of no rows).
    pub fn from_rows(field: &Field, columns: usize, rows: &[Vec<Element>]) -> Matrix {
        Matrix::from_fn(field, rows.len(), columns, |row, column| rows[row][column])
    }

    /// A sparse matrix from (column, value) entries row by row, in any order; entries at one place
    /// are summed.
    ///
    /// # Panics
    /// When there are not `rows` lists, or a column is out of range.
    pub fn from_sparse(
        field: &Field,
        rows: usize,
        columns: usize,
        entries: Vec<Vec<(usize, Element)>>,
    ) -> Matrix {
        assert_eq!(entries.len(), rows, "rows of a sparse matrix");
        Matrix {
            field: field.clone(),
            rows,
            columns,
            store: Store::Sparse(Sparse::new(field, columns, entries)),
        }
    }

    /// The field of its entries.
    pub fn field(&self) -> &Field {
        &self.field
    }

    /// How many rows.
    pub fn rows(&self) -> usize {
        self.rows
    }

    /// How many columns.
    pub fn columns(&self) -> usize {
        self.columns
    }

    /// Whether it is kept as lists of non-zero entries.
    pub fn is_sparse(&self) -> bool {
        matches!(self.store, Store::Sparse(_))
    }

    /// An entry.
    #[inline]
    pub fn get(&self, row: usize, column: usize) -> Element {
        debug_assert!(
            row < self.rows && column < self.columns,
            "an entry out of range"
        );
        match &self.store {
            Store::Bits(bits) => Element::from(bits.get(row, column)),
            Store::Bytes(bytes) => bytes[row * self.columns + column].into(),
            Store::Words(words) => words[row * self.columns + column],
            Store::Sparse(sparse) => sparse.get(row, column),
        }
    }

    /// Sets an entry to an element of the field.
    #[inline]
    pub fn set(&mut self, row: usize, column: usize, value: Element) {
        assert!(
            row < self.rows && column < self.columns,
            "entry ({row}, {column}) of a {} by {} matrix",
            self.rows,
            self.columns
        );
        debug_assert!(
            u64::from(value) < self.field.order(),
            "{value} is no element"
        );
        match &mut self.store {
            Store::Bits(bits) => bits.set(row, column, value != 0),
            Store::Bytes(bytes) => bytes[row * self.columns + column] = value as u8,
            Store::Words(words) => words[row * self.columns + column] = value,
            Store::Sparse(sparse) => sparse.set(row, column, value),
        }
    }

    /// A row as a vector.
    pub fn row(&self, row: usize) -> Vec<Element> {
        let span = row * self.columns..(row + 1) * self.columns;
        match &self.store {
            Store::Bytes(bytes) => bytes[span].iter().map(|&entry| entry.into()).collect(),
            Store::Words(words) => words[span].to_vec(),
            Store::Bits(_) | Store::Sparse(_) => {
                let mut vector = vec![0; self.columns];
                for (column, value) in self.nonzero(row) {
                    vector[column] = value;
                }
                vector
            }
        }
    }

    /// A row of a dense matrix over GF(2) as packed words: column c is bit c mod 64 of word c/64,
    /// bits past the last column are zero. `None` for every other matrix.
    pub fn row_bits(&self, row: usize) -> Option<&[u64]> {
        match &self.store {
            Store::Bits(bits) => Some(bits.row(row)),
            _ => None,
        }
    }

    /// A row of a dense matrix over a field of 3 to 256 elements as bytes; `None` for every other.
    pub fn row_bytes(&self, row: usize) -> Option<&[u8]> {
        match &self.store {
            Store::Bytes(bytes) => Some(&bytes[row * self.columns..(row + 1) * self.columns]),
            _ => None,
        }
    }

    /// The non-zero entries of a row as (column, value), columns ascending.
    pub fn nonzero(&self, row: usize) -> impl Iterator<Item = (usize, Element)> + '_ {
        let span = row * self.columns..(row + 1) * self.columns;
        let (mut bits, mut bytes, mut words, mut sparse) = (None, None, None, None);
        match &self.store {
            Store::Bits(store) => bits = Some(bits::ones(store.row(row))),
            Store::Bytes(store) => bytes = Some(store[span].iter().enumerate()),
            Store::Words(store) => words = Some(store[span].iter().enumerate()),
            Store::Sparse(store) => sparse = Some(store.row(row).iter()),
        }
        let bits = bits.into_iter().flatten().map(|column| (column, 1));
        let bytes = bytes
            .into_iter()
            .flatten()
            .map(|(column, &value)| (column, Element::from(value)));
        let words = words
            .into_iter()
            .flatten()
            .map(|(column, &value)| (column, value));
        let sparse = sparse
            .into_iter()
            .flatten()
            .map(|&(column, value)| (column as usize, value));
        bits.chain(bytes)
            .chain(words)
            .chain(sparse)
            .filter(|&(_, value)| value != 0)
    }

    /// A column as a vector.
    pub fn column(&self, column: usize) -> Vec<Element> {
        (0..self.rows).map(|row| self.get(row, column)).collect()
    }

    /// The rows where a column is not zero, ascending. On a sparse matrix the first call lists all
    /// columns, later ones look up.
    pub fn column_support(&self, column: usize) -> Vec<usize> {
        match &self.store {
            Store::Sparse(sparse) => {
                let rows = sparse.column(self.columns, column);
                rows.iter().map(|&row| row as usize).collect()
            }
            _ => (0..self.rows)
                .filter(|&row| self.get(row, column) != 0)
                .collect(),
        }
    }

    /// How many entries of a row are not zero.
    pub fn row_weight(&self, row: usize) -> usize {
        match &self.store {
            Store::Bits(bits) => bits
                .row(row)
                .iter()
                .map(|word| word.count_ones() as usize)
                .sum(),
            Store::Sparse(sparse) => sparse.row(row).len(),
            _ => self.nonzero(row).count(),
        }
    }

    /// How many entries of a column are not zero.
    pub fn column_weight(&self, column: usize) -> usize {
        match &self.store {
            Store::Sparse(sparse) => sparse.column(self.columns, column).len(),
            _ => (0..self.rows)
                .filter(|&row| self.get(row, column) != 0)
                .count(),
        }
    }

    /// How many entries are not zero.
    pub fn weight(&self) -> usize {
        (0..self.rows).map(|row| self.row_weight(row)).sum()
    }

    /// Whether every entry is zero.
    pub fn is_zero(&self) -> bool {
        match &self.store {
            Store::Bits(bits) => bits.is_zero(),
            _ => (0..self.rows).all(|row| self.nonzero(row).next().is_none()),
        }
    }

    /// The product; `other` must have as many rows as this has columns. Sparse when both are.
    pub fn multiply(&self, other: &Matrix) -> Matrix {
        assert_eq!(self.columns, other.rows, "shapes of a product");
        if self.is_sparse() && other.is_sparse() {
            let field = &self.field;
            let entries = (0..self.rows).map(|row| {
                let terms = self.nonzero(row).flat_map(|(at, factor)| {
                    let scaled = move |(column, value)| (column, field.mul(factor, value));
                    other.nonzero(at).map(scaled)
                });
                terms.collect()
            });
            return Matrix::from_sparse(field, self.rows, other.columns, entries.collect());
        }
        let mut product = Matrix::zero(&self.field, self.rows, other.columns);
        for row in 0..self.rows {
            for (at, factor) in self.nonzero(row) {
                product.add_multiple(row, factor, other, at);
            }
        }
        product
    }

    /// Adds to a row of this dense matrix `factor` times a row of `other`.
    fn add_multiple(&mut self, row: usize, factor: Element, other: &Matrix, from: usize) {
        let (field, columns) = (&self.field, self.columns);
        let (to, from_span) = (
            row * columns..(row + 1) * columns,
            from * columns..(from + 1) * columns,
        );
        match (&mut self.store, &other.store) {
            (Store::Bits(bits), Store::Bits(others)) => {
                bits::add(bits.row_mut(row), others.row(from))
            }
            (Store::Bytes(bytes), Store::Bytes(others)) => {
                eliminate::add_byte_multiple(
                    field,
                    &mut bytes[to],
                    factor as u8,
                    &others[from_span],
                );
            }
            _ => {
                for (column, value) in other.nonzero(from) {
                    let sum = self
                        .field
                        .add(self.get(row, column), self.field.mul(factor, value));
                    self.set(row, column, sum);
                }
            }
        }
    }

    /// This matrix times a column vector of length `columns`.
    pub fn times(&self, vector: &[Element]) -> Vec<Element> {
        assert_eq!(vector.len(), self.columns, "length of a vector");
        if let Store::Bits(bits) = &self.store {
            let packed = bits::pack(vector);
            let sums = (0..self.rows).map(|row| bits::dot(bits.row(row), &packed));
            return sums.map(Element::from).collect();
        }
        let field = &self.field;
        (0..self.rows)
            .map(|row| {
                self.nonzero(row).fold(0, |sum, (column, value)| {
                    field.add(sum, field.mul(value, vector[column]))
                })
            })
            .collect()
    }
}

impl PartialEq for Matrix {
    fn eq(&self, other: &Matrix) -> bool {
        if self.field != other.field || self.rows != other.rows || self.columns != other.columns {
            return false;
        }
        match (&self.store, &other.store) {
            (Store::Bits(left), Store::Bits(right)) => left == right,
            (Store::Bytes(left), Store::Bytes(right)) => left == right,
            _ => (0..self.rows).all(|row| self.nonzero(row).eq(other.nonzero(row))),
        }
    }
}

impl Eq for Matrix {}

impl fmt::Debug for Matrix {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        writeln!(
            formatter,
            "{} by {} over {}",
            self.rows, self.columns, self.field
        )?;
        for row in 0..self.rows {
            writeln!(formatter, "{:?}", self.row(row))?;
        }
        Ok(())
    }
}
