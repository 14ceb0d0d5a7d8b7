//! Which positions of a code carry its information.

use super::{Code, Space};
use crate::algebra::Matrix;

/// The positions that act as checks, ascending: n − k places whose columns in a check matrix are
/// independent. The check matrix as built decides: first the columns with a single non-zero entry
/// (each row's first such from the end), then the last positions that complete them.
pub fn check_positions(code: &Code) -> Vec<usize> {
    let redundancy = code.redundancy();
    if let Space::Cyclic(_) = code.space() {
        return (code.dimension()..code.length()).collect();
    }
    let check = code.check_matrix();
    let mut order = unit_columns(check);
    let taken: std::collections::BTreeSet<usize> = order.iter().copied().collect();
    order.extend((0..code.length()).rev().filter(|at| !taken.contains(at)));
    let mut pivots = check.reduced_in(&order).pivots;
    pivots.truncate(redundancy);
    pivots.sort_unstable();
    pivots
}

/// The positions that carry the information, ascending: all that are not check positions.
pub fn information_positions(code: &Code) -> Vec<usize> {
    let checks = check_positions(code);
    (0..code.length())
        .filter(|at| checks.binary_search(at).is_err())
        .collect()
}

/// One column with a single non-zero entry for each row that has one, the last such.
fn unit_columns(matrix: &Matrix) -> Vec<usize> {
    let mut of_row: Vec<Option<usize>> = vec![None; matrix.rows()];
    let mut count = vec![0usize; matrix.columns()];
    let mut place = vec![0usize; matrix.columns()];
    for row in 0..matrix.rows() {
        for (column, _) in matrix.nonzero(row) {
            count[column] += 1;
            place[column] = row;
        }
    }
    for column in 0..matrix.columns() {
        if count[column] == 1 {
            of_row[place[column]] = Some(column);
        }
    }
    of_row.into_iter().flatten().collect()
}
