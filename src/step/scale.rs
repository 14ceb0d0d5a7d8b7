//! `scale`: each position multiplied by a factor of its own.

use super::{Step, carried::Carried, mask, presentation::Plain};
use crate::algebra::{Element, Field, Matrix};
use crate::code::{Code, Made, Space};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "scale",
    parameters: &[needed(
        "by",
        "a list of n non-zero elements",
        "the factor of each position",
    )],
    says: "Multiplies each position by a non-zero factor of its own; a generator matrix has its columns multiplied, a check matrix divided.",
    theory: "An equivalent code: n, k, d and weights stay (MacWilliams and Sloane, 1977, ch. 1 §8). \
             Neither the order of positions nor, in general, cyclicity or duality to itself does more than that.",
    example: "\
field trit = GF(3)
code gauge_word over trit
  = hamming(2)
  then scale(by: [1, 2, 1, 2])
  is [4, 2, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let field = code.field().clone();
    let factors = mask::word(call, "by", &field, code.length())?;
    let inverses: Option<Vec<Element>> = factors.iter().map(|&factor| field.inv(factor)).collect();
    let Some(inverses) = inverses else {
        let zero = factors.iter().position(|&factor| factor == 0).unwrap_or(0);
        let mut finding = call.wrong(
            "by",
            catalogue::BAD_ARGUMENT,
            format!("the factor of position {zero} is zero, which would lose the position"),
        );
        finding.help = Some(format!("to leave it out, write `puncture(at: {{{zero}}})`"));
        return Err(finding);
    };
    let space = match Plain::of(code) {
        Plain::Check(matrix) => Space::Check(scaled(matrix, &inverses)),
        Plain::Span(matrix) => Space::Span(scaled(matrix, &factors)),
    };
    let offset = mask::moved(code, |word| times(&field, word, &factors));
    let field_of_words = field.clone();
    Ok(Made::new(field, code.length(), space)
        .dimension(code.dimension())
        .masked(offset)
        .rules(Carried::new(
            "factors of single positions keep it",
            move |word| times(&field_of_words, word, &factors),
        )))
}

fn times(field: &Field, word: &[Element], factors: &[Element]) -> Vec<Element> {
    word.iter()
        .zip(factors)
        .map(|(&entry, &factor)| field.mul(entry, factor))
        .collect()
}

fn scaled(matrix: &Matrix, factors: &[Element]) -> Matrix {
    let mut result = matrix.clone();
    for row in 0..matrix.rows() {
        for (column, entry) in matrix.nonzero(row) {
            result.set(row, column, matrix.field().mul(entry, factors[column]));
        }
    }
    result
}
