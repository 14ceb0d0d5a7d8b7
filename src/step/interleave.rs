//! `interleave`: several words, position by position.

use super::{Step, mask, presentation::Plain, product::too_large};
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Counts, Cyclic, Knowledge, Made, Rules, Space, Weights};
use crate::finding::Found;
use crate::value::{CODE_LENGTH, Call, needed};
use num_bigint::BigUint;

/// The longest code whose weight enumerator is raised to a power.
const WEIGHTS_LENGTH: usize = 2048;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "interleave",
    parameters: &[needed(
        "depth",
        "an integer",
        "how many words are sent together",
    )],
    says: "So many words together: first all their first symbols, then all their second ones. Position i of word j stands at depth * i + j.",
    theory: "A direct sum in another order: n and k are multiplied, d stays, the weight enumerator is \
             raised to a power. A burst of at most depth * b positions touches each word in a burst of \
             at most b (Lin and Costello, 2004, §20.4, from memory); a cyclic code stays cyclic, its \
             generator g(x) becoming g(x^depth).",
    example: "\
field bit = GF(2)
code gauge_frame over bit
  = hamming(3)
  then interleave(depth: 3)
  is [21, 12, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let depth = call.size("depth", 1, CODE_LENGTH)?;
    let length = code.length().saturating_mul(depth);
    let field = code.field();
    let space = match code.space() {
        Space::Cyclic(cyclic) => {
            too_large(call, 1, length)?;
            let mut generator = vec![0; (cyclic.generator().len() - 1) * depth + 1];
            for (at, &coefficient) in cyclic.generator().iter().enumerate() {
                generator[at * depth] = coefficient;
            }
            Space::Cyclic(
                Cyclic::new(field, length, generator)
                    .expect("g(x^t) divides x^(nt) - 1 where g divides x^n - 1"),
            )
        }
        _ => match Plain::of(code) {
            Plain::Check(matrix) => Space::Check(spread(call, matrix, depth)?),
            Plain::Span(matrix) => Space::Span(spread(call, matrix, depth)?),
        },
    };
    let offset = mask::moved(code, |word| {
        (0..length).map(|at| word[at / depth]).collect()
    });
    Ok(Made::new(field.clone(), length, space)
        .dimension(code.dimension() * depth)
        .masked(offset)
        .rules(Interleaved { depth }))
}

fn spread(call: &Call, matrix: &Matrix, depth: usize) -> Found<Matrix> {
    let rows = matrix.rows().saturating_mul(depth);
    too_large(call, rows, matrix.columns().saturating_mul(depth))?;
    Ok(matrix.kronecker(&Matrix::identity(matrix.field(), depth)))
}

struct Interleaved {
    depth: usize,
}

impl Rules for Interleaved {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let depth = self.depth;
        let alone = |word: &Vec<u32>| {
            let mut frame = vec![0; word.len() * depth];
            for (at, &entry) in word.iter().enumerate() {
                frame[at * depth] = entry;
            }
            frame
        };
        let carry = |bound: Bound| {
            let word = bound.witness.as_ref().map(alone);
            bound
                .carried("a non-zero frame holds a non-zero word")
                .witness(word)
        };
        before.grounds.into_iter().map(carry).collect()
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        if code.length() > WEIGHTS_LENGTH {
            return None;
        }
        let before = known.weights(&code.origin().parents[0])?;
        let mut counts = Counts::from([(0, BigUint::from(1u8))]);
        for _ in 0..self.depth {
            let mut next = Counts::new();
            for (left, many) in &counts {
                for (right, more) in &before.counts {
                    *next.entry(left + right).or_default() += many * more;
                }
            }
            counts = next;
        }
        Some(Weights {
            counts,
            says: format!(
                "the weight enumerator to the power {}; before: {}",
                self.depth, before.says
            ),
        })
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        known.cyclic(&code.origin().parents[0]).then(|| {
            "shifting a frame moves each word to its neighbour, the last one to the first and shifted"
                .into()
        })
    }
}
