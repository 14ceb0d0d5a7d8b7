//! The form of a check matrix and of the code's symmetries: regular, triangular, quasi-cyclic,
//! divisible.

use super::{Effort, Judgement, Session, properties, structure};
use crate::algebra::Element;
use crate::code::{Code, weight};

/// The most multiplications that a question may cost.
const WORK: usize = 1 << 33;

/// Whether all rows of the check matrix as built have one weight, and all columns one.
pub fn regular(code: &Code) -> Judgement {
    let check = structure::check_matrix(code);
    let extremes = |weights: Vec<usize>| {
        let least = weights.iter().copied().min().unwrap_or(0);
        (least, weights.iter().copied().max().unwrap_or(0))
    };
    let rows = extremes(structure::row_weights(check));
    let columns = extremes(structure::column_weights(check));
    Judgement::of(
        rows.0 == rows.1 && columns.0 == columns.1,
        format!(
            "every row has weight {}, every column {}",
            rows.0, columns.0
        ),
        format!(
            "row weights run from {} to {}, column weights from {} to {}",
            rows.0, rows.1, columns.0, columns.1
        ),
    )
}

/// Whether the checks at one end of the word can be computed one after the other by the rows of
/// the check matrix as built: whether its rows and those columns can be ordered so that they make
/// a triangle without a zero on its diagonal.
pub fn triangular(code: &Code) -> Judgement {
    let check = structure::check_matrix(code);
    let (rows, n) = (check.rows(), check.columns());
    if rows > code.redundancy() {
        return Judgement::fails(format!(
            "the {rows} rows are dependent, their rank is {}",
            code.redundancy()
        ));
    }
    let stuck = match stuck_at(code, n - rows) {
        None => {
            return Judgement::holds(
                "the last n - k positions follow one after the other, each from one row",
            );
        }
        Some(stuck) => stuck,
    };
    if stuck_at(code, 0).is_none() {
        return Judgement::holds(
            "the first n - k positions follow one after the other, each from one row",
        );
    }
    Judgement::fails(format!(
        "of the last n - k positions {} follow one after the other, then every row holds two unknown ones or none",
        rows - stuck
    ))
}

/// How many of the n − k positions from `first` on never follow from a single row.
fn stuck_at(code: &Code, first: usize) -> Option<usize> {
    let check = structure::check_matrix(code);
    let rows = check.rows();
    let unknown_of = |row: usize| {
        check
            .nonzero(row)
            .map(|(at, _)| at)
            .filter(|at| (first..first + rows).contains(at))
    };
    let mut left: Vec<usize> = (0..rows).map(|row| unknown_of(row).count()).collect();
    let mut rows_at: Vec<Vec<usize>> = vec![Vec::new(); rows];
    for row in 0..rows {
        for at in unknown_of(row) {
            rows_at[at - first].push(row);
        }
    }
    let mut solved = vec![false; rows];
    let mut ready: Vec<usize> = (0..rows).filter(|&row| left[row] == 1).collect();
    let mut count = 0;
    while let Some(row) = ready.pop() {
        let Some(at) = unknown_of(row).find(|at| !solved[at - first]) else {
            continue;
        };
        solved[at - first] = true;
        count += 1;
        for &other in &rows_at[at - first] {
            left[other] -= 1;
            if left[other] == 1 {
                ready.push(other);
            }
        }
    }
    (count < rows).then_some(rows - count)
}

/// Whether a shift by `index` positions, or of each of `index` blocks by one position, takes words
/// to words.
pub fn quasi_cyclic(code: &Code, index: usize) -> Judgement {
    let n = code.length();
    if index == 0 || !n.is_multiple_of(index) {
        return Judgement::fails(format!("{index} does not divide the length {n}"));
    }
    let cost = code.dimension().saturating_mul(code.redundancy());
    if cost.saturating_mul(n) > WORK {
        return Judgement::undecided("the matrices are too large to multiply");
    }
    let size = n / index;
    let shifted = |from: &dyn Fn(usize) -> usize| -> Option<Vec<Element>> {
        let generator = code.generator_matrix();
        (0..generator.rows())
            .map(|row| generator.row(row))
            .find(|word| {
                let moved: Vec<Element> = (0..n).map(|at| word[from(at)]).collect();
                !code.contains(&moved)
            })
    };
    let Some(word) = shifted(&|at| at / size * size + (at % size + size - 1) % size) else {
        return Judgement::holds(format!(
            "shifting each of {index} blocks of {size} positions by one takes a basis to words"
        ));
    };
    match shifted(&|at| (at + n - index) % n) {
        None => Judgement::holds(format!("a shift by {index} positions takes a basis to words")),
        Some(_) => Judgement::fails(match index {
            1 => "a cyclic shift by one position does not take every word to a word".to_string(),
            _ => format!(
                "neither a shift by {index} positions nor one within {index} blocks takes every word to a word"
            ),
        })
        .witness(Some(word)),
    }
}

/// Whether every weight is a multiple of a number.
pub fn divisible(session: &Session, code: &Code, by: usize) -> Judgement {
    if by == 0 {
        return Judgement::of(
            code.dimension() == 0,
            "there is no word but zero",
            "only 0 is a multiple of 0",
        );
    }
    if let Some(weights) = session.weights_by(code, Effort::Full) {
        let odd = weights.counts.keys().find(|&&weight| weight % by != 0);
        let Some(&odd) = odd else {
            return Judgement::holds(format!("every weight that occurs is a multiple of {by}"));
        };
        return Judgement::fails(format!("words of weight {odd} occur")).witness(row_off(code, by));
    }
    if properties::divisor(code).is_multiple_of(by) {
        return Judgement::holds(format!(
            "the rows of a generator matrix show that every weight is a multiple of {by}"
        ));
    }
    match row_off(code, by) {
        Some(word) => {
            Judgement::fails(format!("a word has weight {}", weight(&word))).witness(Some(word))
        }
        None => Judgement::undecided("the weights are not known"),
    }
}

fn row_off(code: &Code, by: usize) -> Option<Vec<Element>> {
    let generator = code.generator_matrix();
    (0..generator.rows())
        .find(|&row| !generator.row_weight(row).is_multiple_of(by))
        .map(|row| generator.row(row))
}
