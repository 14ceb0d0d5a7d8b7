//! `extend`: append an overall check.

use super::{Step, mask, positions};
use crate::algebra::{Element, Field, Matrix};
use crate::code::{
    Bound, Code, Counts, Knowledge, Made, Rules, Space, Weights, lower, upper, weight,
};
use crate::finding::Found;
use crate::value::Call;
use num_bigint::BigUint;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "extend",
    parameters: &[],
    says: "Appends one position to every word so that its symbols sum to zero: a check matrix gains a zero column and a row of ones.",
    theory: "Over GF(2) all weights become even, so an odd d rises by one and an even d stays \
             (MacWilliams and Sloane, 1977, ch. 1 §9). Over other fields d rises by one or stays.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then extend
  is [8, 4, 4]
",
    run,
};

fn run(code: &Code, _call: &Call) -> Found<Made> {
    Ok(extended(code))
}

/// The code with an overall check; of what is sent, mask included.
pub(super) fn extended(code: &Code) -> Made {
    let field = code.field().clone();
    let length = code.length();
    let space = match code.space() {
        Space::Span(matrix) => Space::Span(summed(matrix)),
        Space::Check(matrix) => Space::Check(checked(matrix)),
        Space::Cyclic(_) if code.redundancy() <= code.dimension() => {
            Space::Check(checked(code.check_matrix()))
        }
        Space::Cyclic(_) => Space::Span(summed(code.generator_matrix())),
    };
    let offset = mask::moved(code, |word| checked_word(&field, word));
    Made::new(field, length + 1, space)
        .dimension(code.dimension())
        .masked(offset)
        .rules(Extended)
}

/// A word and the symbol that makes its sum zero.
fn checked_word(field: &Field, word: &[Element]) -> Vec<Element> {
    let sum = word.iter().fold(0, |sum, &entry| field.add(sum, entry));
    [word, &[field.neg(sum)]].concat()
}

fn checked(matrix: &Matrix) -> Matrix {
    let field = matrix.field();
    let wide = matrix.beside(&Matrix::zero(field, matrix.rows(), 1));
    positions::with_row(&wide, &vec![1; matrix.columns() + 1])
}

fn summed(matrix: &Matrix) -> Matrix {
    let field = matrix.field();
    let sums = matrix.times(&vec![1; matrix.columns()]);
    let column = Matrix::from_fn(field, matrix.rows(), 1, |row, _| field.neg(sums[row]));
    matrix.beside(&column)
}

struct Extended;

impl Rules for Extended {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let mut bounds = Vec::new();
        let binary = code.field().is_binary();
        if binary && before.lower % 2 == 1 {
            bounds.push(lower(
                before.lower + 1,
                "extension",
                format!(
                    "the overall check makes every weight even, d before was at least {}",
                    before.lower
                ),
            ));
        } else {
            bounds.extend(before.carried_lower("an appended check keeps it"));
        }
        if let Some(word) = before.witness {
            let word = checked_word(code.field(), &word);
            bounds.push(upper(
                weight(&word),
                "extension",
                format!(
                    "a word of weight {} before has weight {} with its check",
                    before.upper,
                    weight(&word)
                ),
                Some(word),
            ));
        } else if binary {
            bounds.push(upper(
                before.upper + before.upper % 2,
                "extension",
                format!(
                    "d before was at most {}, the check adds one to odd weights",
                    before.upper
                ),
                None,
            ));
        }
        bounds
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        if !code.field().is_binary() {
            return None;
        }
        let before = known.weights(&code.origin().parents[0])?;
        let mut counts = Counts::new();
        for (weight, count) in before.counts {
            *counts
                .entry(weight + weight % 2)
                .or_insert_with(|| BigUint::from(0u8)) += count;
        }
        Some(Weights {
            counts,
            says: format!(
                "the overall check adds one to odd weights; before: {}",
                before.says
            ),
        })
    }
}
