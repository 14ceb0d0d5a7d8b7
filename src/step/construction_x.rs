//! `construction_x`: a tail for what a subcode does not cover.

use super::{Step, presentation::generators, product::same_field};
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower, upper};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "construction_x",
    parameters: &[
        needed(
            "sub",
            "a code",
            "a subcode of the code so far, with a greater distance",
        ),
        needed(
            "tail",
            "a code",
            "of as many dimensions as the code so far has more than the subcode",
        ),
    ],
    says: "Appends to each word a word of the tail that tells its coset of the subcode. The rows of the code's generator matrix that are independent of the subcode and of each other, in order, take the rows of the tail's.",
    theory: "n adds up, k stays, and d is at least the lesser of the subcode's distance and the sum of \
             the code's and the tail's (Sloane, Reddy and Chen, 1972; MacWilliams and Sloane, 1977, ch. 18 §7, from memory).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then construction_x(sub: simplex(3), tail: repetition(1))
  is [8, 4, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let (sub, tail) = (call.code("sub")?, call.code("tail")?);
    same_field(code, sub, call, "sub")?;
    same_field(code, tail, call, "tail")?;
    if sub.length() != code.length() {
        let message = format!(
            "the subcode has {} positions, the code {}",
            sub.length(),
            code.length()
        );
        return Err(call.wrong("sub", catalogue::SHAPE, message));
    }
    let below = sub.generator_matrix();
    if let Some(row) = (0..below.rows()).find(|&row| !code.contains(&below.row(row))) {
        return Err(call.wrong(
            "sub",
            catalogue::BAD_ARGUMENT,
            format!("row {row} of its generator matrix is no word of the code so far, so it is no subcode"),
        ));
    }
    let more = code.dimension() - sub.dimension();
    if tail.dimension() != more {
        let message = format!(
            "the code has {more} dimensions more than the subcode, but the tail has {}",
            tail.dimension()
        );
        let mut finding = call.wrong("tail", catalogue::SHAPE, message);
        finding.help = Some(format!("give a tail of dimension {more}"));
        return Err(finding);
    }
    let above = generators(code).select_rows(&independent(below, generators(code)));
    let top = below.beside(&Matrix::zero(code.field(), below.rows(), tail.length()));
    let matrix = top.above(&above.beside(tail.generator_matrix()));
    Ok(Made::span(matrix)
        .dimension(code.dimension())
        .from([sub.clone(), tail.clone()])
        .rules(ConstructionX))
}

/// The rows of a matrix that are independent of those below and of the rows before them.
pub(super) fn independent(below: &Matrix, rows: &Matrix) -> Vec<usize> {
    let pivots = below.above(rows).transpose().reduced().pivots;
    pivots
        .into_iter()
        .filter_map(|at| at.checked_sub(below.rows()))
        .collect()
}

struct ConstructionX;

impl Rules for ConstructionX {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parents = &code.origin().parents;
        let [all, sub, tail] = [0, 1, 2].map(|at| known.distance(&parents[at]));
        let within = (sub.lower > 0).then_some(sub.lower);
        let outside = (tail.lower > 0).then_some(all.lower + tail.lower);
        let mut bounds = Vec::new();
        if let Some(value) = within.into_iter().chain(outside).min() {
            bounds.push(lower(
                value,
                "construction-x",
                format!(
                    "words of the subcode weigh at least {}, all others at least {} and {} in the tail",
                    sub.lower, all.lower, tail.lower
                ),
            ));
        }
        if sub.lower > 0 {
            let word = sub
                .witness
                .map(|word| [word, vec![0; parents[2].length()]].concat());
            let says = format!(
                "(s | 0) with a word s of the subcode of weight at most {}",
                sub.upper
            );
            bounds.push(upper(sub.upper, "construction-x", says, word));
        }
        bounds
    }
}
