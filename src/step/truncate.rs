//! `truncate`: keep the first positions.

use super::{Step, puncture};
use crate::code::{Code, Made};
use crate::finding::Found;
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "truncate",
    parameters: &[needed(
        "length",
        "an integer",
        "how many positions are kept",
    )],
    says: "Cuts every word off after so many positions: `puncture` from the end, by the length that is left.",
    theory: "d falls by at most the number of positions cut off (MacWilliams and Sloane, 1977, ch. 1 §9); \
             k falls only when a word lives on these.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then extend
  then truncate(length: 7)
  is [7, 4, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let length = call.size("length", 1, code.length())?;
    let dropped: Vec<usize> = (length..code.length()).collect();
    Ok(puncture::without(code, &dropped))
}
