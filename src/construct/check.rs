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
             (MacWilliams and Sloane, 1977, ch. 1 §10 theorem 10). Where no two columns share two \
             rows, d is at least one more than the least column weight (Massey, 1963).",
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
    Ok(Made::check((*matrix).clone()).rules(Orthogonal))
}

/// The most pairs of columns that are looked at for a common row.
const PAIRS: usize = 1 << 22;

/// One step of majority logic: where no two columns share two rows, the rows through a non-zero
/// position each hold a further one, all different.
struct Orthogonal;

impl Rules for Orthogonal {
    fn distance(&self, code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        let Space::Check(matrix) = code.space() else {
            return Vec::new();
        };
        let Some(weight) =
            orthogonal_weight(matrix).filter(|&weight| weight > 1 && code.dimension() > 0)
        else {
            return Vec::new();
        };
        vec![lower(
            weight + 1,
            "majority-logic",
            format!(
                "every position stands in {weight} checks or more, no two of which share another: d is at least {}",
                weight + 1
            ),
        )]
    }
}

/// The least column weight, when no two columns share two rows; `None` when some do, or there are
/// too many pairs to look at.
fn orthogonal_weight(matrix: &Matrix) -> Option<usize> {
    let mut weights = vec![0; matrix.columns()];
    let mut pairs = std::collections::HashSet::new();
    let mut looked_at = 0;
    for row in 0..matrix.rows() {
        let places: Vec<usize> = matrix.nonzero(row).map(|(column, _)| column).collect();
        looked_at += places.len() * places.len().saturating_sub(1) / 2;
        if looked_at > PAIRS {
            return None;
        }
        for (at, &one) in places.iter().enumerate() {
            weights[one] += 1;
            for &other in &places[at + 1..] {
                if !pairs.insert((one, other)) {
                    return None;
                }
            }
        }
    }
    weights.into_iter().min()
}
