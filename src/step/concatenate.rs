//! `concatenate`: each symbol encoded by an inner code.

use super::{Step, image::Symbols, mask, product::too_large};
use crate::algebra::{Element, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "concatenate",
    parameters: &[needed(
        "inner",
        "a code",
        "over a subfield, of as many dimensions as a symbol has coordinates over it",
    )],
    says: "Writes each symbol in the basis 1, a, a², … and encodes its coordinates by the inner code's generator matrix.",
    theory: "n and k are the products, d is at least the product of the two distances (Forney, 1966; MacWilliams and Sloane, 1977, ch. 10 §11).",
    example: "\
field octal = GF(8) where a^3 = a + 1
field bit = GF(2)
code gauge_frame
  = reed_solomon(length: 7, dimension: 3) over octal
  then concatenate(simplex(3) over bit)
  is [49, 9, 20]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let inner = call.code("inner")?;
    let field = code.field();
    let Some(embedding) = field.embedding_of(inner.field()) else {
        let message = format!(
            "the inner code is over {}, which is no subfield of {field}",
            inner.field()
        );
        return Err(call.wrong("inner", catalogue::FIELD_MISMATCH, message));
    };
    let degree = embedding.degree() as usize;
    if inner.dimension() != degree {
        let mut finding = call.wrong(
            "inner",
            catalogue::SYMBOL_WIDTH,
            format!(
                "a symbol of {field} has {degree} digits, but the inner code carries {}",
                inner.dimension()
            ),
        );
        finding.help = Some(format!(
            "take an inner code of dimension {degree}, or an outer code over GF({}^{})",
            field.characteristic(),
            inner.dimension() * inner.field().degree() as usize
        ));
        return Err(finding);
    }
    let rows = code.dimension().saturating_mul(degree);
    too_large(call, rows, code.length().saturating_mul(inner.length()))?;
    let mut symbols = Symbols::new(embedding.polynomial_basis());
    let matrix = frames(&mut symbols, code.generator_matrix(), inner);
    let offset = mask::paired(code, inner, |outer_word, inner_word| {
        let repeated = inner_word.repeat(code.length());
        let encoded: Vec<Element> = outer_word
            .iter()
            .flat_map(|&symbol| encoded(&mut symbols, symbol, inner))
            .collect();
        mask::sum(inner.field(), &encoded, &repeated)
    });
    Ok(Made::span(matrix)
        .dimension(rows)
        .from([inner.clone()])
        .masked(offset)
        .rules(Concatenated)
        .assuming(format!("symbols of {field} enter the inner code in the basis 1, a, a^2, …, by its generator matrix as built")))
}

/// Each row of the outer generator matrix times each element of the basis, encoded.
fn frames(symbols: &mut Symbols, outer: &Matrix, inner: &Code) -> Matrix {
    let basis = symbols.basis().elements().to_vec();
    let (degree, block) = (basis.len(), inner.length());
    let mut matrix = Matrix::zero(
        inner.field(),
        outer.rows() * degree,
        outer.columns() * block,
    );
    for row in 0..outer.rows() {
        for (at, &scale) in basis.iter().enumerate() {
            for (place, entry) in outer.nonzero(row) {
                let symbol = outer.field().mul(scale, entry);
                let word = encoded(symbols, symbol, inner);
                for (offset, &value) in word.iter().enumerate() {
                    matrix.set(row * degree + at, place * block + offset, value);
                }
            }
        }
    }
    matrix
}

/// The inner word of a symbol.
fn encoded(symbols: &mut Symbols, symbol: Element, inner: &Code) -> Vec<Element> {
    let generator = inner.generator_matrix();
    let mut word = vec![0; inner.length()];
    for (row, &digit) in symbols.of(symbol).iter().enumerate() {
        inner
            .field()
            .add_multiple(&mut word, digit, &generator.row(row));
    }
    word
}

struct Concatenated;

impl Rules for Concatenated {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parents = &code.origin().parents;
        let (outer, inner) = (known.distance(&parents[0]), known.distance(&parents[1]));
        if outer.lower == 0 || inner.lower == 0 {
            return Vec::new();
        }
        vec![lower(
            outer.lower * inner.lower,
            "concatenation",
            format!(
                "at least {} non-zero symbols, each an inner word of weight at least {}",
                outer.lower, inner.lower
            ),
        )]
    }
}
