//! `shorten`: keep the words that are zero in some positions, and leave those out.

use super::{Step, mask, positions};
use crate::code::{Bound, Code, Knowledge, Made, Rules, Space};
use crate::finding::Found;
use crate::value::Call;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "shorten",
    parameters: positions::PARAMETERS,
    says: "Keeps the words that are zero in the named positions, and leaves these positions out: a check matrix loses those columns.",
    theory: "Every word of the new code is one of the old with zeros added, so d does not fall \
             (MacWilliams and Sloane, 1977, ch. 1 §9); k falls by the rank of the positions. \
             A cyclic code has any k neighbouring positions as information positions.",
    example: "\
field bit = GF(2)
code gauge_byte over bit
  = hamming(4)
  then shorten(first: 3)
  is [12, 8, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let positions = positions::positions(code, call)?;
    let mut made = Made::new(
        code.field().clone(),
        code.length() - positions.len(),
        positions::shortened(code, &positions),
    )
    .masked(mask::moved(code, |word| {
        mask::at(word, &positions::others(code.length(), &positions))
    }))
    .rules(Shortened);
    let neighbours = positions.windows(2).all(|pair| pair[1] == pair[0] + 1);
    if matches!(code.space(), Space::Cyclic(_)) && neighbours && positions.len() <= code.dimension()
    {
        made.dimension = Some(code.dimension() - positions.len());
    }
    Ok(made)
}

struct Shortened;

impl Rules for Shortened {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 || code.dimension() == 0 {
            return Vec::new();
        }
        before
            .carried_lower("shortening keeps it")
            .into_iter()
            .collect()
    }
}
