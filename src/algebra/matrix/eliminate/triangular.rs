//! Short cuts for sparse matrices that are triangular after exchanging rows and columns.
//!
//! A column met by a single row makes that row independent of the rest; setting the row aside may
//! leave further such columns. When every row can be set aside, back-substitution replaces
//! elimination (Richardson and Urbanke, Efficient encoding of low-density parity-check codes, 2001).

use super::super::Matrix;
use super::super::bits::{self, Bits};

/// Sets rows aside, one after the other, each the only one left to meet some admitted column.
/// Returns those (row, column) in turn, and the rows left over, ascending.
pub(super) fn peel(
    matrix: &Matrix,
    admitted: impl Fn(usize) -> bool,
) -> (Vec<(usize, usize)>, Vec<usize>) {
    let mut left = vec![true; matrix.rows()];
    let mut weights = vec![0usize; matrix.columns()];
    for row in 0..matrix.rows() {
        for (column, _) in matrix.nonzero(row) {
            weights[column] += 1;
        }
    }
    let mut ready: Vec<usize> = (0..matrix.columns())
        .filter(|&column| weights[column] == 1 && admitted(column))
        .collect();
    let mut aside = Vec::new();
    while let Some(column) = ready.pop() {
        if weights[column] != 1 {
            continue;
        }
        let support = matrix.column_support(column);
        let row = support
            .into_iter()
            .find(|&row| left[row])
            .expect("one row is left");
        left[row] = false;
        aside.push((row, column));
        for (other, _) in matrix.nonzero(row) {
            weights[other] -= 1;
            if weights[other] == 1 && admitted(other) {
                ready.push(other);
            }
        }
    }
    let rest = (0..matrix.rows()).filter(|&row| left[row]).collect();
    (aside, rest)
}

/// The reduced form of a sparse matrix over GF(2) whose first columns in the order, as many as it
/// has rows, are triangular; `None` for every other.
pub(super) fn reduce(matrix: &Matrix, order: &[usize]) -> Option<(Bits, Vec<usize>)> {
    let count = matrix.rows();
    if !matrix.is_sparse() || order.len() < count {
        return None;
    }
    const NONE: usize = usize::MAX;
    let mut rank = vec![NONE; matrix.columns()];
    for (at, &column) in order[..count].iter().enumerate() {
        rank[column] = at;
    }
    let (aside, rest) = peel(matrix, |column| rank[column] != NONE);
    if !rest.is_empty() {
        return None;
    }
    // A row set aside meets, among these columns, only its own and those of rows set aside later.
    let mut reduced = Bits::zero(count, matrix.columns());
    for &(row, own) in aside.iter().rev() {
        let target = rank[own];
        for (column, _) in matrix.nonzero(row) {
            let bits = reduced.row_mut(target);
            bits[column / 64] ^= 1 << (column % 64);
        }
        for (column, _) in matrix.nonzero(row) {
            if column != own && rank[column] != NONE {
                let (to, from) = reduced.row_pair(target, rank[column]);
                bits::add(to, from);
            }
        }
    }
    Some((reduced, order[..count].to_vec()))
}
