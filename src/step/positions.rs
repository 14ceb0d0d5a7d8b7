//! Which positions a step speaks of, and what removing them does to a matrix.

use crate::algebra::Matrix;
use crate::code::{Code, Space};
use crate::finding::{Finding, Found, catalogue};
use crate::value::{Call, Parameter, optional};

/// The parameters `first`, `last`, `at` of steps that take positions.
pub const PARAMETERS: &[Parameter] = &[
    optional("first", "an integer", "so many positions from the start"),
    optional("last", "an integer", "so many positions at the end"),
    optional("at", "a set of integers", "these positions, counted from 0"),
];

/// The positions named by `first`, `last`, `at` together, ascending, each once.
///
/// # Errors
/// When none is named, one does not exist, or all are.
pub fn positions(code: &Code, call: &Call) -> Found<Vec<usize>> {
    let length = code.length();
    let mut chosen = vec![false; length];
    let mut choose = |name: &str, at: u64| match usize::try_from(at).ok().filter(|&at| at < length)
    {
        None => Err(call.wrong(
            name,
            catalogue::BAD_POSITIONS,
            format!(
                "there is no position {at}; this code's are 0..{}",
                length - 1
            ),
        )),
        Some(at) if chosen[at] => Err(call.wrong(
            name,
            catalogue::BAD_POSITIONS,
            format!("position {at} is named twice"),
        )),
        Some(at) => {
            chosen[at] = true;
            Ok(())
        }
    };
    let mut any = false;
    for name in ["first", "last"] {
        if call.has(name) {
            any = true;
            let count = call.size(name, 0, length)?;
            for at in 0..count {
                choose(
                    name,
                    if name == "first" { at } else { length - 1 - at } as u64,
                )?;
            }
        }
    }
    if call.has("at") {
        any = true;
        for at in call.naturals("at")? {
            choose("at", at)?;
        }
    }
    // A bare number says how many, not which; the two ends give different codes.
    if !any || call.unnamed().is_some() {
        let mut finding = Box::new(Finding::new(
            catalogue::BAD_POSITIONS,
            call.unnamed().unwrap_or(call.span),
            format!("which positions `{}` means is not stated", call.name),
        ));
        finding.help = Some(format!(
            "write `{0}(first: 3)`, `{0}(last: 3)` or `{0}(at: {{0, 4..9}})`",
            call.name
        ));
        return Err(finding);
    }
    let found: Vec<usize> = (0..length).filter(|&at| chosen[at]).collect();
    if found.len() == length {
        return Err(call.trouble(
            catalogue::BAD_POSITIONS,
            format!("`{}` would take all {length} positions away", call.name),
        ));
    }
    Ok(found)
}

/// All positions of 0..length but the ones given (ascending).
pub fn others(length: usize, positions: &[usize]) -> Vec<usize> {
    (0..length)
        .filter(|at| positions.binary_search(at).is_err())
        .collect()
}

/// The words of the space without these positions.
pub fn punctured(code: &Code, positions: &[usize]) -> Space {
    if positions.is_empty() {
        return code.space().clone();
    }
    match code.space() {
        Space::Span(matrix) => Space::Span(dropped(matrix, positions)),
        Space::Check(matrix) => Space::Check(cleared(matrix, positions)),
        Space::Cyclic(_) if code.redundancy() <= code.dimension() => {
            Space::Check(cleared(code.check_matrix(), positions))
        }
        Space::Cyclic(_) => Space::Span(dropped(code.generator_matrix(), positions)),
    }
}

/// The words of the space that are zero in these positions, without them.
pub fn shortened(code: &Code, positions: &[usize]) -> Space {
    if positions.is_empty() {
        return code.space().clone();
    }
    match code.space() {
        Space::Check(matrix) => Space::Check(dropped(matrix, positions)),
        Space::Span(matrix) => Space::Span(cleared(matrix, positions)),
        Space::Cyclic(_) => Space::Check(dropped(code.check_matrix(), positions)),
    }
}

fn dropped(matrix: &Matrix, positions: &[usize]) -> Matrix {
    matrix.select_columns(&others(matrix.columns(), positions))
}

/// A basis of the combinations of rows that are zero in these positions, without them.
fn cleared(matrix: &Matrix, positions: &[usize]) -> Matrix {
    let rest = others(matrix.columns(), positions);
    let order: Vec<usize> = positions.iter().chain(&rest).copied().collect();
    let echelon = matrix.reduced_in(&order);
    let kept: Vec<usize> = (0..echelon.pivots.len())
        .filter(|&row| positions.binary_search(&echelon.pivots[row]).is_err())
        .collect();
    echelon.matrix.select_rows(&kept).select_columns(&rest)
}

/// A basis of the combinations of rows whose product with `vector` is zero: the rows themselves
/// where they are, the last row that is not used to clear the others.
pub fn orthogonal_part(matrix: &Matrix, vector: &[u32]) -> Matrix {
    let field = matrix.field();
    let products = matrix.times(vector);
    let Some(pivot) = products.iter().rposition(|&product| product != 0) else {
        return matrix.clone();
    };
    let scale = field.inv(products[pivot]).expect("the pivot is not zero");
    let pivot_row = matrix.row(pivot);
    let rows: Vec<Vec<u32>> = (0..matrix.rows())
        .filter(|&row| row != pivot)
        .map(|row| {
            let factor = field.neg(field.mul(products[row], scale));
            let entries = matrix.row(row);
            entries
                .iter()
                .zip(&pivot_row)
                .map(|(&entry, &add)| field.add(entry, field.mul(factor, add)))
                .collect()
        })
        .collect();
    Matrix::from_rows(field, matrix.columns(), &rows)
}

/// The matrix with a further row below.
pub fn with_row(matrix: &Matrix, row: &[u32]) -> Matrix {
    matrix.above(&Matrix::from_rows(
        matrix.field(),
        matrix.columns(),
        &[row.to_vec()],
    ))
}
