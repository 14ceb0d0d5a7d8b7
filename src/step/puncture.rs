//! `puncture`: leave positions out of every word.

use super::{Step, positions};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower, upper, weight};
use crate::finding::Found;
use crate::value::Call;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "puncture",
    parameters: positions::PARAMETERS,
    says: "Leaves the named positions out of every word: a generator matrix loses those columns.",
    theory: "d falls by at most the number of positions (MacWilliams and Sloane, 1977, ch. 1 §9); \
             k falls only when a word lives on the positions left out.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then extend
  then puncture(last: 1)
  is [7, 4, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let positions = positions::positions(code, call)?;
    let kept = positions::others(code.length(), &positions);
    Ok(Made::new(
        code.field().clone(),
        kept.len(),
        positions::punctured(code, &positions),
    )
    .rules(Punctured { kept }))
}

struct Punctured {
    kept: Vec<usize>,
}

impl Rules for Punctured {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parent = &code.origin().parents[0];
        let before = known.distance(parent);
        let lost = parent.length() - self.kept.len();
        let mut bounds = Vec::new();
        if before.lower > lost {
            bounds.push(lower(
                before.lower - lost,
                "puncturing",
                format!(
                    "{lost} positions left out of words of weight at least {}",
                    before.lower
                ),
            ));
        }
        if let Some(word) = before.witness {
            let word: Vec<u32> = self.kept.iter().map(|&at| word[at]).collect();
            let left = weight(&word);
            if left > 0 {
                bounds.push(upper(
                    left,
                    "puncturing",
                    format!("a word of weight {} before has weight {left} without the positions left out", before.upper),
                    Some(word),
                ));
            }
        }
        bounds
    }
}
