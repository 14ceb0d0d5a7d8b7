//! `check(M)`: the null space of a matrix.

use super::Construction;
use crate::code::Made;
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
             (MacWilliams and Sloane, 1977, ch. 1 §10 theorem 10).",
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
    Ok(Made::check((*matrix).clone()))
}
