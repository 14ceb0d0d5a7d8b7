//! `direct_sum`: the words (u | v).

use super::{Step, mask, product::same_field};
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Counts, Knowledge, Made, Rules, Space, Weights, lower, upper};
use crate::finding::Found;
use crate::value::{Call, needed};
use num_bigint::BigUint;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "direct_sum",
    parameters: &[needed(
        "with",
        "a code",
        "the code of v; the code so far is that of u",
    )],
    says: "The words (u | v), u in the code so far and v in the other.",
    theory: "n and k add up, d is the lesser, and the weight enumerators multiply (MacWilliams and Sloane, 1977, ch. 2 §9).",
    example: "\
field bit = GF(2)
code gauge_pair over bit
  = hamming(3)
  then direct_sum(parity(4))
  is [11, 7, 2]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let other = call.code("with")?;
    same_field(code, other, call, "with")?;
    let space = match (code.space(), other.space()) {
        (Space::Check(one), Space::Check(two)) => Space::Check(diagonal(one, two)),
        _ => Space::Span(diagonal(code.generator_matrix(), other.generator_matrix())),
    };
    Ok(
        Made::new(code.field().clone(), code.length() + other.length(), space)
            .dimension(code.dimension() + other.dimension())
            .from([other.clone()])
            .masked(mask::paired(code, other, |u, v| [u, v].concat()))
            .rules(DirectSum),
    )
}

fn diagonal(one: &Matrix, two: &Matrix) -> Matrix {
    let field = one.field();
    let top = one.beside(&Matrix::zero(field, one.rows(), two.columns()));
    let bottom = Matrix::zero(field, two.rows(), one.columns()).beside(two);
    top.above(&bottom)
}

struct DirectSum;

impl Rules for DirectSum {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parents = &code.origin().parents;
        let (u, v) = (known.distance(&parents[0]), known.distance(&parents[1]));
        let mut bounds = Vec::new();
        let lowers: Vec<usize> = [&u, &v]
            .iter()
            .map(|part| part.lower)
            .filter(|&value| value > 0)
            .collect();
        if let Some(&value) = lowers.iter().min() {
            bounds.push(lower(
                value,
                "direct-sum",
                "(u | v): the lesser of the two distances",
            ));
        }
        if u.lower > 0 {
            let witness = u
                .witness
                .map(|word| [word, vec![0; parents[1].length()]].concat());
            bounds.push(upper(
                u.upper,
                "direct-sum",
                format!("(u | 0) with a word u of weight at most {}", u.upper),
                witness,
            ));
        }
        if v.lower > 0 {
            let witness = v
                .witness
                .map(|word| [vec![0; parents[0].length()], word].concat());
            bounds.push(upper(
                v.upper,
                "direct-sum",
                format!("(0 | v) with a word v of weight at most {}", v.upper),
                witness,
            ));
        }
        bounds
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        let parents = &code.origin().parents;
        let (u, v) = (known.weights(&parents[0])?, known.weights(&parents[1])?);
        let mut counts = Counts::new();
        for (left, many) in &u.counts {
            for (right, more) in &v.counts {
                *counts
                    .entry(left + right)
                    .or_insert_with(|| BigUint::from(0u8)) += many * more;
            }
        }
        Some(Weights {
            counts,
            says: "the product of the two weight enumerators".to_string(),
        })
    }
}
