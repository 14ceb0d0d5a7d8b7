//! `arrange`: data first or last.

use super::{Step, permute};
use crate::code::{Code, Made, information_positions};
use crate::finding::{Found, catalogue};
use crate::value::{Call, Value, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "arrange",
    parameters: &[needed(
        "data",
        "`first` or `last`",
        "where the information positions go; their order among themselves stays",
    )],
    says: "Moves the information positions to one end and the check positions to the other.",
    theory: "An equivalent code: n, k, d and weights stay. Check positions are chosen from the check \
             matrix as built: first its columns with a single non-zero entry, then the last columns \
             that complete them to a basis.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then arrange(data: first)
  is [7, 4, 3]
  require systematic
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let first = match call.value("data") {
        Value::Text(word) if &**word == "first" => true,
        Value::Text(word) if &**word == "last" => false,
        other => {
            return Err(call.wrong(
                "data",
                catalogue::BAD_ARGUMENT,
                format!("data goes `first` or `last`, not {other}"),
            ));
        }
    };
    let data = information_positions(code);
    let checks: Vec<usize> = (0..code.length())
        .filter(|at| data.binary_search(at).is_err())
        .collect();
    let (order, assumption) = if first {
        (
            data.into_iter().chain(checks).collect(),
            "information positions first, check positions last",
        )
    } else {
        (
            checks.into_iter().chain(data).collect(),
            "check positions first, information positions last",
        )
    };
    Ok(permute::reordered(code, order, "moving positions keeps it").assuming(assumption))
}
