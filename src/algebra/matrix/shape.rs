//! Matrices made from others by moving entries. The result is sparse when a part is.

use super::bits::transpose_block;
use super::{Matrix, Store};
use crate::algebra::{Element, Field};

impl Matrix {
    /// A matrix from the non-zero entries of its rows, each given in any order.
    fn gather<I: Iterator<Item = (usize, Element)>>(
        field: &Field,
        rows: usize,
        columns: usize,
        sparse: bool,
        entries: impl Fn(usize) -> I,
    ) -> Matrix {
        if sparse {
            let lists = (0..rows).map(|row| entries(row).collect()).collect();
            return Matrix::from_sparse(field, rows, columns, lists);
        }
        let mut matrix = Matrix::zero(field, rows, columns);
        for row in 0..rows {
            for (column, value) in entries(row) {
                matrix.set(row, column, value);
            }
        }
        matrix
    }

    /// The same matrix, stored densely.
    pub fn to_dense(&self) -> Matrix {
        if !self.is_sparse() {
            return self.clone();
        }
        Matrix::gather(&self.field, self.rows, self.columns, false, |row| {
            self.nonzero(row)
        })
    }

    /// Rows and columns exchanged.
    pub fn transpose(&self) -> Matrix {
        match &self.store {
            Store::Sparse(_) => {
                let mut lists = vec![Vec::new(); self.columns];
                for row in 0..self.rows {
                    for (column, value) in self.nonzero(row) {
                        lists[column].push((row, value));
                    }
                }
                Matrix::from_sparse(&self.field, self.columns, self.rows, lists)
            }
            Store::Bits(bits) => {
                let mut transposed = Matrix::zero(&self.field, self.columns, self.rows);
                let Store::Bits(target) = &mut transposed.store else {
                    unreachable!("the field is GF(2)");
                };
                for top in (0..self.rows).step_by(64) {
                    for left in (0..self.columns).step_by(64) {
                        let mut block = [0; 64];
                        for (row, word) in (top..self.rows.min(top + 64)).zip(&mut block) {
                            *word = bits.row(row)[left / 64];
                        }
                        transpose_block(&mut block);
                        for (row, &word) in (left..self.columns.min(left + 64)).zip(&block) {
                            target.row_mut(row)[top / 64] = word;
                        }
                    }
                }
                transposed
            }
            _ => Matrix::from_fn(&self.field, self.columns, self.rows, |row, column| {
                self.get(column, row)
            }),
        }
    }

    /// The columns named, in that order; repetition allowed.
    pub fn select_columns(&self, positions: &[usize]) -> Matrix {
        if !self.is_sparse() {
            return Matrix::from_fn(&self.field, self.rows, positions.len(), |row, column| {
                self.get(row, positions[column])
            });
        }
        let mut places = vec![Vec::new(); self.columns];
        for (place, &position) in positions.iter().enumerate() {
            places[position].push(place);
        }
        Matrix::gather(&self.field, self.rows, positions.len(), true, |row| {
            self.nonzero(row)
                .flat_map(|(column, value)| places[column].iter().map(move |&place| (place, value)))
        })
    }

    /// The rows named, in that order; repetition allowed.
    pub fn select_rows(&self, rows: &[usize]) -> Matrix {
        Matrix::gather(
            &self.field,
            rows.len(),
            self.columns,
            self.is_sparse(),
            |row| self.nonzero(rows[row]),
        )
    }

    /// This matrix with `other` to its right; as many rows.
    pub fn beside(&self, other: &Matrix) -> Matrix {
        assert_eq!(self.rows, other.rows, "rows of matrices side by side");
        let columns = self.columns + other.columns;
        let sparse = self.is_sparse() || other.is_sparse();
        Matrix::gather(&self.field, self.rows, columns, sparse, |row| {
            let right = other.nonzero(row);
            self.nonzero(row)
                .chain(right.map(|(column, value)| (self.columns + column, value)))
        })
    }

    /// This matrix with `other` below it; as many columns.
    pub fn above(&self, other: &Matrix) -> Matrix {
        assert_eq!(self.columns, other.columns, "columns of stacked matrices");
        let rows = self.rows + other.rows;
        let mut stacked = match (&self.store, &other.store) {
            (Store::Bits(_), Store::Bits(_))
            | (Store::Bytes(_), Store::Bytes(_))
            | (Store::Words(_), Store::Words(_)) => self.clone(),
            _ => {
                return Matrix::gather(&self.field, rows, self.columns, true, |row| {
                    let (part, row) = if row < self.rows {
                        (self, row)
                    } else {
                        (other, row - self.rows)
                    };
                    part.nonzero(row)
                });
            }
        };
        stacked.rows = rows;
        match (&mut stacked.store, &other.store) {
            (Store::Bits(upper), Store::Bits(lower)) => upper.append(lower),
            (Store::Bytes(upper), Store::Bytes(lower)) => upper.extend_from_slice(lower),
            (Store::Words(upper), Store::Words(lower)) => upper.extend_from_slice(lower),
            _ => unreachable!("sparse parts are stacked above"),
        }
        stacked
    }

    /// The Kronecker product.
    pub fn kronecker(&self, other: &Matrix) -> Matrix {
        let (rows, columns) = (self.rows * other.rows, self.columns * other.columns);
        let sparse = self.is_sparse() || other.is_sparse();
        Matrix::gather(&self.field, rows, columns, sparse, |row| {
            let (upper, lower) = (row / other.rows, row % other.rows);
            self.nonzero(upper).flat_map(move |(block, left)| {
                other.nonzero(lower).map(move |(column, right)| {
                    (block * other.columns + column, self.field.mul(left, right))
                })
            })
        })
    }
}
