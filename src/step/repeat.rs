//! `repeat`: every word several times in a row.

use super::{Step, mask, presentation::Plain, product::too_large};
use crate::algebra::Matrix;
use crate::code::{
    Bound, Code, Counts, Knowledge, Made, Rules, Side, Space, Weights, lower, upper,
};
use crate::finding::Found;
use crate::value::{CODE_LENGTH, Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "repeat",
    parameters: &[needed("times", "an integer", "how often each word is sent")],
    says: "The words (c | c | … | c), so many times each.",
    theory: "k stays, n, d and every weight are multiplied (MacWilliams and Sloane, 1977, ch. 1 §9); \
             a cyclic code stays cyclic. A check matrix gains the checks that the copies agree.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = parity(3)
  then repeat(times: 3)
  is [9, 2, 6] with weights {0: 1, 6: 3}
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let times = call.size("times", 1, CODE_LENGTH)?;
    let n = code.length();
    let length = n.saturating_mul(times);
    let rows = match Plain::of(code) {
        Plain::Check(matrix) => matrix.rows().saturating_add(length - n.min(length)),
        Plain::Span(matrix) => matrix.rows(),
    };
    too_large(call, rows, length)?;
    let space = match Plain::of(code) {
        Plain::Check(matrix) => Space::Check(agreeing(matrix, times)),
        Plain::Span(matrix) => {
            let columns: Vec<usize> = (0..length).map(|at| at % n).collect();
            Space::Span(matrix.select_columns(&columns))
        }
    };
    Ok(Made::new(code.field().clone(), length, space)
        .dimension(code.dimension())
        .masked(mask::moved(code, |word| word.repeat(times)))
        .rules(Repeated { times }))
}

/// The checks on the first copy, then for each further copy that it equals the one before.
fn agreeing(matrix: &Matrix, times: usize) -> Matrix {
    let field = matrix.field();
    let n = matrix.columns();
    let top = matrix.beside(&Matrix::zero(field, matrix.rows(), n * (times - 1)));
    let mut bottom = Matrix::zero(field, n * (times - 1), n * times);
    let minus = field.neg(1);
    for row in 0..bottom.rows() {
        bottom.set(row, row, 1);
        bottom.set(row, row + n, minus);
    }
    top.above(&bottom)
}

struct Repeated {
    times: usize,
}

impl Rules for Repeated {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let times = self.times;
        let says = |side, value| {
            let grounds = before.ground(side).map_or("", |bound| bound.says.as_str());
            format!("{times} copies of words of weight {value}; before: {grounds}")
        };
        let word = before.witness.as_ref().map(|word| word.repeat(times));
        vec![
            lower(
                times * before.lower,
                "repetition",
                says(Side::Lower, before.lower),
            ),
            upper(
                times * before.upper,
                "repetition",
                says(Side::Upper, before.upper),
                word,
            ),
        ]
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        let before = known.weights(&code.origin().parents[0])?;
        let times = self.times;
        let counts: Counts = before
            .counts
            .into_iter()
            .map(|(weight, count)| (times * weight, count))
            .collect();
        Some(Weights {
            counts,
            says: format!("{times} copies of each word; before: {}", before.says),
        })
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        known
            .cyclic(&code.origin().parents[0])
            .then(|| "copies of a cyclic code's words, shifted, are copies of shifted words".into())
    }
}
