//! Linear algebra by way of the reduced form.

use super::bits::{ones, transpose_block};
use super::{Echelon, Matrix, Store};
use crate::algebra::Element;

impl Matrix {
    /// The reduced row echelon form, pivots as far left as possible.
    pub fn reduced(&self) -> Echelon {
        let order: Vec<usize> = (0..self.columns).collect();
        self.reduced_in(&order)
    }

    /// A basis of all vectors v with `self · v = 0`, as rows: one row for each non-pivot column of
    /// the reduced form, ascending, with 1 there.
    pub fn null_space(&self) -> Matrix {
        self.reduced().null_space()
    }

    /// As [`Matrix::null_space`], with pivots chosen greedily in the given order of columns, as in
    /// [`Matrix::reduced_in`].
    pub fn null_space_in(&self, order: &[usize]) -> Matrix {
        self.reduced_in(order).null_space()
    }

    /// A vector v with `self · v = target`, zero outside the pivots of the reduced form; `None`
    /// when there is none.
    pub fn solve(&self, target: &[Element]) -> Option<Vec<Element>> {
        assert_eq!(target.len(), self.rows, "length of a right-hand side");
        let column = Matrix::from_fn(&self.field, self.rows, 1, |row, _| target[row]);
        let echelon = self.beside(&column).reduced();
        if echelon.pivots.last() == Some(&self.columns) {
            return None;
        }
        let mut solution = vec![0; self.columns];
        for (row, &pivot) in echelon.pivots.iter().enumerate() {
            solution[pivot] = echelon.matrix.get(row, self.columns);
        }
        Some(solution)
    }

    /// The inverse; `None` when the matrix is singular or not square.
    pub fn inverse(&self) -> Option<Matrix> {
        if self.rows != self.columns {
            return None;
        }
        let size = self.rows;
        let echelon = self.beside(&Matrix::identity(&self.field, size)).reduced();
        let left_is_identity = echelon.pivots.iter().copied().eq(0..size);
        left_is_identity.then(|| {
            let right: Vec<usize> = (size..2 * size).collect();
            echelon.matrix.select_columns(&right)
        })
    }

    /// The determinant of a square matrix; 1 for the empty one.
    pub fn determinant(&self) -> Element {
        assert_eq!(
            self.rows, self.columns,
            "a determinant is of a square matrix"
        );
        let field = &self.field;
        if field.is_binary() {
            return Element::from(self.rank() == self.rows);
        }
        let mut rows: Vec<Vec<Element>> = (0..self.rows).map(|row| self.row(row)).collect();
        let mut determinant = 1;
        for at in 0..self.rows {
            let Some(found) = (at..self.rows).find(|&row| rows[row][at] != 0) else {
                return 0;
            };
            if found != at {
                rows.swap(found, at);
                determinant = field.neg(determinant);
            }
            determinant = field.mul(determinant, rows[at][at]);
            let scale = field.neg(field.inv(rows[at][at]).expect("a pivot is not zero"));
            let (upper, lower) = rows.split_at_mut(at + 1);
            for row in lower {
                let factor = field.mul(scale, row[at]);
                if factor != 0 {
                    for (entry, &add) in row[at..].iter_mut().zip(&upper[at][at..]) {
                        *entry = field.add(*entry, field.mul(factor, add));
                    }
                }
            }
        }
        determinant
    }
}

impl Echelon {
    /// The rank.
    pub fn rank(&self) -> usize {
        self.pivots.len()
    }

    /// The columns without a pivot, ascending.
    pub fn free_columns(&self) -> Vec<usize> {
        let mut is_pivot = vec![false; self.matrix.columns];
        for &pivot in &self.pivots {
            is_pivot[pivot] = true;
        }
        (0..self.matrix.columns)
            .filter(|&column| !is_pivot[column])
            .collect()
    }

    /// A basis of all vectors that the rows send to zero: one for each free column, ascending, with
    /// 1 there and 0 at the other free columns.
    pub fn null_space(&self) -> Matrix {
        let field = &self.matrix.field;
        let free = self.free_columns();
        let mut basis = Matrix::zero(field, free.len(), self.matrix.columns);
        for (row, &column) in free.iter().enumerate() {
            basis.set(row, column, 1);
        }
        if field.is_binary() {
            self.fill_by_blocks(&free, &mut basis);
            return basis;
        }
        for (at, &pivot) in self.pivots.iter().enumerate() {
            for (row, &column) in free.iter().enumerate() {
                basis.set(row, pivot, field.neg(self.matrix.get(at, column)));
            }
        }
        basis
    }

    /// Over GF(2): the free columns become rows, 64 by 64, so that both sides are walked along rows.
    fn fill_by_blocks(&self, free: &[usize], basis: &mut Matrix) {
        let (Store::Bits(source), Store::Bits(target)) = (&self.matrix.store, &mut basis.store)
        else {
            unreachable!("dense matrices over GF(2) are bits");
        };
        let mut next = 0;
        while next < free.len() {
            let word = free[next] / 64;
            let count = free[next..]
                .iter()
                .take_while(|&&column| column / 64 == word)
                .count();
            for (block_at, pivots) in self.pivots.chunks(64).enumerate() {
                let mut block = [0; 64];
                for (row, to) in (block_at * 64..).zip(&mut block).take(pivots.len()) {
                    *to = source.row(row)[word];
                }
                transpose_block(&mut block);
                for row in next..next + count {
                    for at in ones(&block[free[row] % 64..=free[row] % 64]) {
                        target.set(row, pivots[at], true);
                    }
                }
            }
            next += count;
        }
    }
}
