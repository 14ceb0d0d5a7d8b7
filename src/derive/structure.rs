//! What can be read off the check matrix as built: weights of rows and columns, girth, rank.

use crate::algebra::Matrix;
use crate::code::Code;
use std::collections::VecDeque;

/// The most non-zero entries of a matrix whose girth is looked for.
const EDGES: usize = 1 << 20;

/// The check matrix that structure is read off: as built where there is one.
pub fn check_matrix(code: &Code) -> &Matrix {
    code.check_matrix_as_built()
        .unwrap_or_else(|| code.check_matrix())
}

/// The number of non-zero entries of each row of a matrix.
pub fn row_weights(matrix: &Matrix) -> Vec<usize> {
    (0..matrix.rows())
        .map(|row| matrix.row_weight(row))
        .collect()
}

/// The number of non-zero entries of each column of a matrix.
pub fn column_weights(matrix: &Matrix) -> Vec<usize> {
    let mut weights = vec![0; matrix.columns()];
    for row in 0..matrix.rows() {
        for (column, _) in matrix.nonzero(row) {
            weights[column] += 1;
        }
    }
    weights
}

/// A matrix is too large for a question to be answered.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct TooLarge;

/// The length of the shortest cycle in the bipartite graph of rows and columns; `Ok(None)` when
/// there is no cycle, `Err` when the matrix is too large.
pub fn girth(matrix: &Matrix) -> Result<Option<usize>, TooLarge> {
    let rows = matrix.rows();
    let mut neighbours: Vec<Vec<usize>> = vec![Vec::new(); rows + matrix.columns()];
    let mut edges = 0;
    for row in 0..rows {
        for (column, _) in matrix.nonzero(row) {
            neighbours[row].push(rows + column);
            neighbours[rows + column].push(row);
            edges += 1;
        }
    }
    if edges > EDGES || edges.saturating_mul(rows) > 1 << 32 {
        return Err(TooLarge);
    }
    let mut best: Option<usize> = None;
    // Every cycle passes through a row, so it is enough to start there.
    for start in 0..rows {
        if let Some(length) = shortest_through(&neighbours, start, best) {
            best = Some(best.map_or(length, |known| known.min(length)));
        }
        if best == Some(4) {
            break;
        }
    }
    Ok(best)
}

/// The shortest cycle seen from a start by breadth-first search: exact for those through it.
fn shortest_through(neighbours: &[Vec<usize>], start: usize, best: Option<usize>) -> Option<usize> {
    let mut distance = vec![usize::MAX; neighbours.len()];
    let mut parent = vec![usize::MAX; neighbours.len()];
    let mut queue = VecDeque::from([start]);
    distance[start] = 0;
    let mut found: Option<usize> = None;
    while let Some(at) = queue.pop_front() {
        let bound = found.or(best).unwrap_or(usize::MAX);
        if distance[at].saturating_mul(2) >= bound {
            break;
        }
        for &next in &neighbours[at] {
            if distance[next] == usize::MAX {
                distance[next] = distance[at] + 1;
                parent[next] = at;
                queue.push_back(next);
            } else if parent[at] != next {
                let length = distance[at] + distance[next] + 1;
                found = Some(found.map_or(length, |known| known.min(length)));
            }
        }
    }
    found
}

/// Some rows of a matrix with a combination that is zero, none of them superfluous; `None` when
/// the rows are independent.
pub fn dependent_rows(matrix: &Matrix) -> Option<Vec<usize>> {
    let relations = matrix.transpose().null_space();
    if relations.rows() == 0 {
        return None;
    }
    let lightest = (0..relations.rows())
        .map(|row| relations.row(row))
        .min_by_key(|relation| relation.iter().filter(|&&entry| entry != 0).count())?;
    Some(
        (0..lightest.len())
            .filter(|&at| lightest[at] != 0)
            .collect(),
    )
}
