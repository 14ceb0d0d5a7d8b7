//! `augment`: add a word and all its sums with the code.

use super::{Step, expurgate, positions};
use crate::code::{Bound, Code, Counts, Knowledge, Made, Rules, Space, Weights, upper, weight};
use crate::finding::Found;
use crate::value::{Call, optional};
use num_bigint::BigUint;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "augment",
    parameters: &[optional(
        "with",
        "a list of n elements",
        "the word added, all ones unless said",
    )],
    says: "Adds a word, by default all ones, with all its multiples and sums: a generator matrix gains a row.",
    theory: "The code before is a subcode, so d does not rise. Over GF(2) with the all-ones word, the \
             weights are those of the code and their complements (MacWilliams and Sloane, 1977, ch. 1 §9).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = simplex(3)
  then augment
  is [7, 4, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let (row, ones) = expurgate::further_row(code, call)?;
    Ok(with(code, row, ones))
}

/// The code with a further word; `ones` when it is the all-ones word over GF(2).
pub(super) fn with(code: &Code, row: Vec<u32>, ones: bool) -> Made {
    let space = match code.space() {
        Space::Check(matrix) => Space::Check(positions::orthogonal_part(matrix, &row)),
        _ => Space::Span(positions::with_row(
            code.generator_matrix_as_built()
                .expect("a generator matrix as built"),
            &row,
        )),
    };
    Made::new(code.field().clone(), code.length(), space)
        .masked(code.offset().map(<[u32]>::to_vec))
        .rules(Augmented { row, ones })
}

struct Augmented {
    row: Vec<u32>,
    ones: bool,
}

impl Rules for Augmented {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        let mut bounds = Vec::new();
        if before.upper > 0 {
            bounds.push(upper(
                before.upper,
                "augmenting",
                format!(
                    "the code before, with d at most {}, is a subcode",
                    before.upper
                ),
                before.witness,
            ));
        }
        let own = weight(&self.row);
        if own > 0 {
            bounds.push(upper(
                own,
                "augmenting",
                format!("the word added has weight {own}"),
                Some(self.row.clone()),
            ));
        }
        bounds
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        let parent = &code.origin().parents[0];
        if !self.ones || code.dimension() == parent.dimension() {
            return None;
        }
        let before = known.weights(parent)?;
        let mut counts = Counts::new();
        for (weight, count) in before.counts {
            for weight in [weight, code.length() - weight] {
                *counts.entry(weight).or_insert_with(|| BigUint::from(0u8)) += &count;
            }
        }
        Some(Weights {
            counts,
            says: format!("each word and its complement; before: {}", before.says),
        })
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        let even = self.row.windows(2).all(|pair| pair[0] == pair[1]);
        (even && known.cyclic(&code.origin().parents[0]))
            .then(|| "a cyclic code and a word that shifts leave alone".into())
    }
}
