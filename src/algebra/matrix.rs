//! Matrices over a finite field.

use super::{Element, Field};

/// A matrix over a finite field, of any shape, zero rows or columns included.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Matrix {
    field: Field,
    rows: usize,
    columns: usize,
    entries: Vec<Element>,
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
    /// The zero matrix.
    pub fn zero(field: &Field, rows: usize, columns: usize) -> Matrix {
        Matrix {
            field: field.clone(),
            rows,
            columns,
            entries: vec![0; rows * columns],
        }
    }

    /// The identity of the given size.
    pub fn identity(field: &Field, size: usize) -> Matrix {
        Matrix::from_fn(field, size, size, |row, column| {
            Element::from(row == column)
        })
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

    /// An entry.
    pub fn get(&self, row: usize, column: usize) -> Element {
        self.entries[row * self.columns + column]
    }

    /// Sets an entry.
    pub fn set(&mut self, row: usize, column: usize, value: Element) {
        self.entries[row * self.columns + column] = value;
    }

    /// A row as a vector.
    pub fn row(&self, row: usize) -> Vec<Element> {
        (0..self.columns)
            .map(|column| self.get(row, column))
            .collect()
    }

    /// A column as a vector.
    pub fn column(&self, column: usize) -> Vec<Element> {
        (0..self.rows).map(|row| self.get(row, column)).collect()
    }

    /// Whether every entry is zero.
    pub fn is_zero(&self) -> bool {
        (0..self.rows).all(|row| self.row(row).iter().all(|&entry| entry == 0))
    }

    /// Rows and columns exchanged.
    pub fn transpose(&self) -> Matrix {
        Matrix::from_fn(&self.field, self.columns, self.rows, |row, column| {
            self.get(column, row)
        })
    }

    /// The product; `other` must have as many rows as this has columns.
    pub fn multiply(&self, other: &Matrix) -> Matrix {
        assert_eq!(self.columns, other.rows, "shapes of a product");
        Matrix::from_fn(&self.field, self.rows, other.columns, |row, column| {
            (0..self.columns).fold(0, |sum, at| {
                self.field.add(
                    sum,
                    self.field.mul(self.get(row, at), other.get(at, column)),
                )
            })
        })
    }

    /// This matrix times a column vector of length `columns`.
    pub fn times(&self, vector: &[Element]) -> Vec<Element> {
        (0..self.rows)
            .map(|row| {
                (0..self.columns).fold(0, |sum, at| {
                    self.field
                        .add(sum, self.field.mul(self.get(row, at), vector[at]))
                })
            })
            .collect()
    }

    /// The columns named, in that order; repetition allowed.
    pub fn select_columns(&self, positions: &[usize]) -> Matrix {
        Matrix::from_fn(&self.field, self.rows, positions.len(), |row, column| {
            self.get(row, positions[column])
        })
    }

    /// The rows named, in that order; repetition allowed.
    pub fn select_rows(&self, rows: &[usize]) -> Matrix {
        Matrix::from_fn(&self.field, rows.len(), self.columns, |row, column| {
            self.get(rows[row], column)
        })
    }

    /// This matrix with `other` to its right; as many rows.
    pub fn beside(&self, other: &Matrix) -> Matrix {
        assert_eq!(self.rows, other.rows, "rows of matrices side by side");
        Matrix::from_fn(
            &self.field,
            self.rows,
            self.columns + other.columns,
            |row, column| {
                if column < self.columns {
                    self.get(row, column)
                } else {
                    other.get(row, column - self.columns)
                }
            },
        )
    }

    /// This matrix with `other` below it; as many columns.
    pub fn above(&self, other: &Matrix) -> Matrix {
        assert_eq!(self.columns, other.columns, "columns of stacked matrices");
        Matrix::from_fn(
            &self.field,
            self.rows + other.rows,
            self.columns,
            |row, column| {
                if row < self.rows {
                    self.get(row, column)
                } else {
                    other.get(row - self.rows, column)
                }
            },
        )
    }

    /// The Kronecker product.
    pub fn kronecker(&self, other: &Matrix) -> Matrix {
        Matrix::from_fn(
            &self.field,
            self.rows * other.rows,
            self.columns * other.columns,
            |row, column| {
                self.field.mul(
                    self.get(row / other.rows, column / other.columns),
                    other.get(row % other.rows, column % other.columns),
                )
            },
        )
    }

    /// The reduced row echelon form, pivots as far left as possible.
    pub fn reduced(&self) -> Echelon {
        let order: Vec<usize> = (0..self.columns).collect();
        self.reduced_in(&order)
    }

    /// The row echelon form whose pivots are chosen greedily in the given order of columns (a
    /// permutation of all of them). Columns keep their places; row i's leading 1 stands in column
    /// `pivots[i]`, and is the only non-zero entry there.
    pub fn reduced_in(&self, order: &[usize]) -> Echelon {
        let field = &self.field;
        let mut rows: Vec<Vec<Element>> = (0..self.rows).map(|row| self.row(row)).collect();
        let mut pivots = Vec::new();
        for &column in order {
            let rank = pivots.len();
            let Some(found) = (rank..self.rows).find(|&row| rows[row][column] != 0) else {
                continue;
            };
            rows.swap(rank, found);
            let scale = field.inv(rows[rank][column]).expect("a pivot is not zero");
            for entry in &mut rows[rank] {
                *entry = field.mul(*entry, scale);
            }
            let pivot = rows[rank].clone();
            for (at, row) in rows.iter_mut().enumerate() {
                let factor = field.neg(row[column]);
                if at != rank && factor != 0 {
                    for (entry, &add) in row.iter_mut().zip(&pivot) {
                        *entry = field.add(*entry, field.mul(factor, add));
                    }
                }
            }
            pivots.push(column);
        }
        rows.truncate(pivots.len());
        Echelon {
            matrix: Matrix::from_rows(field, self.columns, &rows),
            pivots,
        }
    }

    /// The rank.
    pub fn rank(&self) -> usize {
        self.reduced().pivots.len()
    }

    /// A basis of all vectors v with `self · v = 0`, as rows: one row for each non-pivot column of
    /// the reduced form, ascending, with 1 there.
    pub fn null_space(&self) -> Matrix {
        let echelon = self.reduced();
        let field = &self.field;
        let free: Vec<usize> = (0..self.columns)
            .filter(|column| echelon.pivots.binary_search(column).is_err())
            .collect();
        let mut basis = Matrix::zero(field, free.len(), self.columns);
        for (row, &column) in free.iter().enumerate() {
            basis.set(row, column, 1);
            for (at, &pivot) in echelon.pivots.iter().enumerate() {
                basis.set(row, pivot, field.neg(echelon.matrix.get(at, column)));
            }
        }
        basis
    }
}
