//! `span(M)`: the row space of a matrix.

use super::Construction;
use crate::code::Made;
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Construction = Construction {
    name: "span",
    parameters: &[needed(
        "matrix",
        "a matrix",
        "the generator matrix; its rows may be dependent",
    )],
    says: "The code of all combinations of a matrix's rows.",
    theory: "k is the rank; parameters come from the words themselves.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = span(| 1 0 0 1 1 |
         | 0 1 1 0 1 |)
  is [5, 2, 3]
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
    Ok(Made::span((*matrix).clone()))
}
