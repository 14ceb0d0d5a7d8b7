//! `concatenate`: each symbol encoded by an inner code.

use super::{Step, image::digit};
use crate::algebra::{Element, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower};
use crate::finding::{Found, catalogue};
use crate::value::{Call, MATRIX_ENTRIES, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "concatenate",
    parameters: &[needed(
        "inner",
        "a code",
        "over the prime field, of as many dimensions as a symbol has digits",
    )],
    says: "Writes each symbol in the basis 1, a, a², … and encodes its digits by the inner code's generator matrix.",
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
    let degree = field.degree() as usize;
    if inner.field().order() != u64::from(field.characteristic()) {
        let message = format!(
            "the inner code is over {}, but the symbols of {field} have digits in GF({})",
            inner.field(),
            field.characteristic()
        );
        return Err(call.wrong("inner", catalogue::FIELD_MISMATCH, message));
    }
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
            inner.dimension()
        ));
        return Err(finding);
    }
    let rows = code.dimension() * degree;
    let length = code.length().saturating_mul(inner.length());
    if rows.saturating_mul(length) > MATRIX_ENTRIES {
        return Err(call.trouble(
            catalogue::LIMIT,
            "the concatenated generator matrix would be too large to build",
        ));
    }
    let outer = code.generator_matrix();
    let basis: Vec<Element> = (0..degree as u32)
        .map(|at| field.characteristic().pow(at))
        .collect();
    let mut matrix = Matrix::zero(inner.field(), rows, length);
    for row in 0..outer.rows() {
        for (at, &scale) in basis.iter().enumerate() {
            for (place, &entry) in outer.row(row).iter().enumerate() {
                let symbol = field.mul(scale, entry);
                for (offset, value) in encoded(inner, symbol, field.characteristic())
                    .into_iter()
                    .enumerate()
                {
                    if value != 0 {
                        matrix.set(row * degree + at, place * inner.length() + offset, value);
                    }
                }
            }
        }
    }
    Ok(Made::span(matrix)
        .dimension(rows)
        .from([inner.clone()])
        .rules(Concatenated)
        .assuming(format!("symbols of {field} enter the inner code in the basis 1, a, a^2, …, by its generator matrix as built")))
}

fn encoded(inner: &Code, symbol: Element, characteristic: u32) -> Vec<Element> {
    let field = inner.field();
    let generator = inner.generator_matrix();
    let mut word = vec![0; inner.length()];
    for row in 0..generator.rows() {
        let digit = digit(symbol, row, characteristic);
        if digit != 0 {
            for (entry, add) in word.iter_mut().zip(generator.row(row)) {
                *entry = field.add(*entry, field.mul(digit, add));
            }
        }
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
