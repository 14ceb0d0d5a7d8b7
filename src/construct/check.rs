//! `check(M)`: the null space of a matrix.

use super::Construction;
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Knowledge, Made, Rules, Space, lower};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Construction = Construction {
    name: "check",
    parameters: &[needed(
        "matrix",
        "a matrix",
        "the check matrix; its rows may be dependent",
    )],
    says: "The code of all words whose checks all vanish: the null space of a matrix.",
    theory: "k is n minus the rank. The distance is the least number of dependent columns \
             (MacWilliams and Sloane, 1977, ch. 1 §10 theorem 10). When no two columns share two \
             rows, d is more than the least column weight: the checks of one position have no other \
             position in common (Massey, 1963).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = check(| 1 0 1 0 1 0 1 |
          | 0 1 1 0 0 1 1 |
          | 0 0 0 1 1 1 1 |)
  is [7, 4, 3]
",
    run,
};

fn run(call: &Call) -> Found<Made> {
    let matrix = call.matrix("matrix")?;
    if matrix.columns() == 0 {
        return Err(call.wrong(
            "matrix",
            catalogue::SHAPE,
            "a code needs at least one position; this matrix has no columns",
        ));
    }
    Ok(Made::check((*matrix).clone()).rules(Checks))
}

/// The most pairs of rows that meet in a column and are gone through.
const PAIRS: usize = 1 << 22;

struct Checks;

impl Rules for Checks {
    fn distance(&self, code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        let Space::Check(matrix) = code.space() else {
            return Vec::new();
        };
        // With w checks on each position, at most one of them on any two: each check of a position
        // where a word is not zero has a further such position, another one for each.
        let Some(weight) = separate_checks(matrix).filter(|&weight| weight > 1) else {
            return Vec::new();
        };
        vec![lower(
            weight + 1,
            "separate-checks",
            format!(
                "each position has at least {weight} checks, and no two positions share two of them (Massey, 1963)"
            ),
        )]
    }
}

/// The least column weight of a matrix no two columns of which share two rows.
fn separate_checks(matrix: &Matrix) -> Option<usize> {
    let mut checks: Vec<Vec<u32>> = vec![Vec::new(); matrix.columns()];
    let mut pairs = 0usize;
    for row in 0..matrix.rows() {
        for (column, &entry) in matrix.row(row).iter().enumerate() {
            if entry != 0 {
                pairs += checks[column].len();
                checks[column].push(row as u32);
            }
        }
        if pairs > PAIRS {
            return None;
        }
    }
    let mut seen = std::collections::HashSet::new();
    for rows in &checks {
        for (at, &row) in rows.iter().enumerate() {
            if !rows[..at].iter().all(|&other| seen.insert((other, row))) {
                return None;
            }
        }
    }
    checks.iter().map(Vec::len).min()
}
