//! `tensor`: rectangles with zero syndromes of rows, summed over the columns' checks.

use super::{
    Step,
    presentation::checks,
    product::{same_field, too_large},
};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower, upper};
use crate::finding::Found;
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "tensor",
    parameters: &[needed(
        "with",
        "a code",
        "its check matrix checks within the blocks; the code so far checks across them",
    )],
    says: "The code whose check matrix is the Kronecker product of the two check matrices, the code so far first; a word is a rectangle, sent row by row.",
    theory: "n and n - k are the products of the two codes' (Wolf, 1965, from memory). It is the dual of the product of \
             the two duals, and d is the lesser of the two: so few columns are independent in one factor or the other, \
             and a light word of either code, put in one column or one row, is a word.",
    example: "\
field bit = GF(2)
code gauge_page over bit
  = hamming(2)
  then tensor(parity(3))
  is [9, 7, 2]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let other = call.code("with")?;
    same_field(code, other, call, "with")?;
    let (first, second) = (checks(code), checks(other));
    let length = code.length().saturating_mul(other.length());
    too_large(call, first.rows().saturating_mul(second.rows()), length)?;
    Ok(Made::check(first.kronecker(second))
        .dimension(length - code.redundancy() * other.redundancy())
        .from([other.clone()])
        .rules(Tensor))
}

struct Tensor;

impl Rules for Tensor {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parents = &code.origin().parents;
        let (rows, columns) = (parents[0].length(), parents[1].length());
        let (first, second) = (known.distance(&parents[0]), known.distance(&parents[1]));
        let mut bounds = Vec::new();
        let defined = [first.lower, second.lower];
        if let Some(&value) = defined.iter().filter(|&&value| value > 0).min() {
            bounds.push(lower(
                value,
                "tensor",
                "fewer columns than either distance are independent in both factors",
            ));
        }
        if first.lower > 0 {
            let word = first.witness.map(|word| {
                let mut page = vec![0; rows * columns];
                for (row, &entry) in word.iter().enumerate() {
                    page[row * columns] = entry;
                }
                page
            });
            let says = format!(
                "a word of weight at most {} in the first column",
                first.upper
            );
            bounds.push(upper(first.upper, "tensor", says, word));
        }
        if second.lower > 0 {
            let word = second.witness.map(|word| {
                let mut page = word;
                page.resize(rows * columns, 0);
                page
            });
            let says = format!("a word of weight at most {} in the first row", second.upper);
            bounds.push(upper(second.upper, "tensor", says, word));
        }
        bounds
    }
}
