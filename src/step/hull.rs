//! `hull`: the words that a code shares with its dual.

use super::{Step, carried, dual, meet};
use crate::code::{Code, Made};
use crate::finding::Found;
use crate::value::Call;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "hull",
    parameters: &[],
    says: "The words of the code that are orthogonal to all its words: its meet with its dual.",
    theory: "A self-orthogonal subcode, zero just when the dual is a complement (Massey, 1992); d is at least \
             that of the code and that of its dual (Assmus and Key, 1992, for the name). A cyclic code has a cyclic hull.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then hull
  is [7, 3, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let dual = carried::between(dual::dual(code), code, call);
    Ok(meet::met(code, dual))
}
