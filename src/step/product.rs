//! `product`: rectangles whose rows and columns are words.

use super::Step;
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower, upper};
use crate::finding::{Found, catalogue};
use crate::value::{CODE_LENGTH, Call, MATRIX_ENTRIES, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "product",
    parameters: &[needed(
        "with",
        "a code",
        "the code of the rows; the code so far is that of the columns",
    )],
    says: "The words of a rectangle, sent row by row, whose columns lie in the code so far and whose rows lie in the other.",
    theory: "n, k and d are the products of the two codes' (Elias, 1954; MacWilliams and Sloane, 1977, ch. 18 §2).",
    example: "\
field bit = GF(2)
code gauge_page over bit
  = parity(3)
  then product(hamming(3))
  is [21, 8, 6]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let other = call.code("with")?;
    same_field(code, other, call, "with")?;
    too_large(
        call,
        code.dimension().saturating_mul(other.dimension()),
        code.length().saturating_mul(other.length()),
    )?;
    let matrix = code.generator_matrix().kronecker(other.generator_matrix());
    Ok(Made::span(matrix)
        .dimension(code.dimension() * other.dimension())
        .from([other.clone()])
        .rules(Product))
}

/// That a code of so many positions, given by a matrix of so many rows, is small enough to build.
pub(super) fn too_large(call: &Call, rows: usize, length: usize) -> Found<()> {
    if length > CODE_LENGTH {
        let message = format!(
            "`{}` would give a code of {length} positions, more than the {CODE_LENGTH} one may have",
            call.name
        );
        return Err(call.trouble(catalogue::LIMIT, message));
    }
    if rows.saturating_mul(length) > MATRIX_ENTRIES {
        let message = format!(
            "`{}` would give a matrix of {rows} rows and {length} columns, too large to build",
            call.name
        );
        return Err(call.trouble(catalogue::LIMIT, message));
    }
    Ok(())
}

/// That two codes share a field.
pub(super) fn same_field(code: &Code, other: &Code, call: &Call, name: &str) -> Found<()> {
    if code.field() != other.field() {
        let message = format!(
            "the code so far is over {}, the other over {}",
            code.field(),
            other.field()
        );
        let mut finding = call.wrong(name, catalogue::FIELD_MISMATCH, message);
        finding.help = Some(format!(
            "both have to be over one field: build the other over {}, or take this one to its prime field with `then image`",
            code.field()
        ));
        return Err(finding);
    }
    Ok(())
}

struct Product;

impl Rules for Product {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parents = &code.origin().parents;
        let (first, second) = (known.distance(&parents[0]), known.distance(&parents[1]));
        if first.lower == 0 || second.lower == 0 {
            return Vec::new();
        }
        let mut bounds = vec![lower(
            first.lower * second.lower,
            "product",
            format!(
                "a non-zero word has at least {} non-zero rows of weight at least {}",
                first.lower, second.lower
            ),
        )];
        let field = code.field();
        let witness = first.witness.zip(second.witness).map(|(left, right)| {
            left.iter()
                .flat_map(|&entry| right.iter().map(move |&other| field.mul(entry, other)))
                .collect()
        });
        bounds.push(upper(
            first.upper * second.upper,
            "product",
            format!(
                "a light column times a light row: {} times {}",
                first.upper, second.upper
            ),
            witness,
        ));
        bounds
    }
}
