//! `lift`: the same generator matrix over a larger field.

use super::{Step, carried::Carried, mask, presentation::Plain, subfield::embedding};
use crate::algebra::{Embedding, Matrix};
use crate::code::{Code, Cyclic, Made, Space};
use crate::finding::Found;
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "lift",
    parameters: &[needed("field", "a field", "one that contains the code's")],
    says: "All combinations of the code's words with factors from a larger field: the same generator and check matrices over that field.",
    theory: "n and k stay. The coordinates of a word, in a basis over the smaller field, are words of \
             the code before, so d stays (Stichtenoth, 1990, from memory); there are further words, so weights \
             change. A cyclic code stays cyclic with the same generator.",
    example: "\
field quad = GF(4) where a^2 = a + 1
code gauge_word over quad
  = hamming(3) over GF(2)
  then lift(quad)
  is [7, 4, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let large = call.field_argument("field")?;
    let embedding = embedding(call, large, code.field())?;
    let space = match code.space() {
        Space::Cyclic(cyclic) => {
            let generator = up(&embedding, cyclic.generator());
            Space::Cyclic(
                Cyclic::new(large, code.length(), generator)
                    .expect("a divisor of x^n - 1 stays one over a larger field"),
            )
        }
        _ => match Plain::of(code) {
            Plain::Check(matrix) => Space::Check(lifted(&embedding, matrix)),
            Plain::Span(matrix) => Space::Span(lifted(&embedding, matrix)),
        },
    };
    let offset = mask::moved(code, |word| up(&embedding, word));
    Ok(Made::new(large.clone(), code.length(), space)
        .dimension(code.dimension())
        .masked(offset)
        .rules(
            Carried::new("a larger field keeps it", move |word| up(&embedding, word))
                .with_further_words()
                .cyclic(),
        ))
}

fn up(embedding: &Embedding, word: &[u32]) -> Vec<u32> {
    word.iter().map(|&entry| embedding.up(entry)).collect()
}

fn lifted(embedding: &Embedding, matrix: &Matrix) -> Matrix {
    let (field, rows, columns) = (embedding.field(), matrix.rows(), matrix.columns());
    let entries = |row| {
        let entries = matrix.nonzero(row);
        entries.map(|(column, value)| (column, embedding.up(value)))
    };
    if matrix.is_sparse() {
        let lists = (0..rows).map(|row| entries(row).collect()).collect();
        return Matrix::from_sparse(field, rows, columns, lists);
    }
    let mut lifted = Matrix::zero(field, rows, columns);
    for row in 0..rows {
        for (column, value) in entries(row) {
            lifted.set(row, column, value);
        }
    }
    lifted
}
