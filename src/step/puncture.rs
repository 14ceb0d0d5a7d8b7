//! `puncture`: leave positions out of every word.

use super::{Step, mask, positions};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower, upper, weight};
use crate::finding::Found;
use crate::value::Call;

/// The most entries that are looked at to find the shift that loses most.
const SHIFT_WORK: usize = 1 << 26;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "puncture",
    parameters: positions::PARAMETERS,
    says: "Leaves the named positions out of every word: a generator matrix loses those columns.",
    theory: "d falls by at most the number of positions (MacWilliams and Sloane, 1977, ch. 1 §9); \
             k falls only when a word lives on the positions left out. A word of a cyclic code has a shift \
             that is non-zero at a given position, so there one position always costs one.",
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
    Ok(without(code, &positions))
}

/// The code without these positions (ascending).
pub(super) fn without(code: &Code, positions: &[usize]) -> Made {
    let kept = positions::others(code.length(), positions);
    Made::new(
        code.field().clone(),
        kept.len(),
        positions::punctured(code, positions),
    )
    .masked(mask::moved(code, |word| mask::at(word, &kept)))
    .rules(Punctured { kept })
}

struct Punctured {
    kept: Vec<usize>,
}

impl Punctured {
    /// What is left of a word, or of its shift that keeps the least.
    fn lightest(&self, word: &[u32], shifts: bool) -> Vec<u32> {
        let n = word.len();
        let shifted = |by: usize| -> Vec<u32> {
            let kept = self.kept.iter();
            kept.map(|&at| word[(at + by) % n]).collect()
        };
        let count = if shifts && n * n <= SHIFT_WORK { n } else { 1 };
        let least = (0..count).min_by_key(|&by| weight(&shifted(by)));
        shifted(least.unwrap_or(0))
    }
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
        let shifts = lost > 0 && before.lower > lost && known.cyclic(parent);
        if let Some(word) = before.witness {
            let word = self.lightest(&word, shifts);
            let left = weight(&word);
            if left > 0 {
                bounds.push(upper(
                    left,
                    "puncturing",
                    format!("a word of weight {} before has weight {left} without the positions left out", before.upper),
                    Some(word),
                ));
            }
        } else if shifts {
            // Over all n shifts, a word of weight w is non-zero w times at each position.
            let hit = (lost * before.upper).div_ceil(parent.length());
            bounds.push(upper(
                before.upper - hit,
                "puncturing",
                format!(
                    "of the shifts of a word of weight at most {} one loses at least its share, {lost} in {}",
                    before.upper,
                    parent.length()
                ),
                None,
            ));
        }
        bounds
    }
}
