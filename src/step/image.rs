//! `image`: each symbol written as coordinates over a subfield.

use super::{Step, mask};
use crate::algebra::{Basis, Element, Embedding, Field, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules, Space};
use crate::finding::{Found, catalogue};
use crate::step::{presentation::generators, product::too_large};
use crate::value::{Call, Value, optional};
use std::collections::BTreeMap;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "image",
    parameters: &[
        optional(
            "basis",
            "a list of m elements, or `polynomial`, `normal` or `dual`",
            "the basis in which a symbol is written, 1, a, a², … (`polynomial`) unless said; its first coordinate is sent first. `normal`: the conjugates of the least power of the generator that makes a basis; `dual`: the dual of the polynomial basis",
        )
        .or_words(&["polynomial", "normal", "dual"]),
        optional("to", "a field", "the subfield, the prime field unless said"),
    ],
    says: "Writes each symbol as its coordinates over a subfield: n and k grow by the degree over it.",
    theory: "A non-zero symbol has a non-zero coordinate, so d does not fall, and no symbol has more than \
             m of them (MacWilliams and Sloane, 1977, ch. 10 §5). Dual bases: ch. 4 §8.",
    example: "\
field octal = GF(8) where a^3 = a + 1
code gauge_word
  = reed_solomon(length: 7, dimension: 3) over octal
  then image
  is [21, 9, 6]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let field = code.field();
    let small = if call.has("to") {
        call.field_argument("to")?.clone()
    } else {
        Field::prime(u64::from(field.characteristic())).map_err(|_| {
            call.trouble(catalogue::BAD_FIELD_ORDER, "the prime field cannot be made")
        })?
    };
    let Some(embedding) = field.embedding_of(&small) else {
        let message = format!("{small} is no subfield of {field}");
        return Err(call.wrong("to", catalogue::FIELD_MISMATCH, message));
    };
    let (basis, named) = stated_basis(call, &embedding)?;
    let degree = embedding.degree() as usize;
    let rows = match code.space() {
        Space::Check(matrix) => matrix.rows(),
        _ => generators(code).rows(),
    };
    too_large(
        call,
        rows.saturating_mul(degree),
        code.length().saturating_mul(degree),
    )?;
    let mut symbols = Symbols::new(basis);
    let space = match code.space() {
        Space::Check(matrix) => Space::Check(checks(&mut symbols, matrix)),
        _ => Space::Span(words(&mut symbols, generators(code))),
    };
    let offset = mask::moved(code, |word| symbols.of_word(word));
    Ok(Made::new(small.clone(), code.length() * degree, space)
        .dimension(code.dimension() * degree)
        .masked(offset)
        .rules(Image { degree })
        .assuming(format!(
            "symbols of {field} are written over {small} in {named}, first coordinate first"
        )))
}

/// The basis meant, and how reports call it.
fn stated_basis(call: &Call, embedding: &Embedding) -> Found<(Basis, &'static str)> {
    let polynomial = || embedding.polynomial_basis();
    if !call.has("basis") {
        return Ok((polynomial(), "the basis 1, a, a^2, …"));
    }
    let field = embedding.field();
    match call.value("basis") {
        Value::Text(word) => match &**word {
            "polynomial" => Ok((polynomial(), "the basis 1, a, a^2, …")),
            "dual" => Ok((polynomial().dual(), "the dual of the basis 1, a, a^2, …")),
            "normal" => {
                let basis = (0..field.order() - 1)
                    .find_map(|at| embedding.normal_basis(field.power_of_generator(at)));
                let basis = basis.expect("every extension has a normal basis (Hensel, 1888)");
                Ok((basis, "the normal basis of the least power of a"))
            }
            other => Err(call.wrong(
                "basis",
                catalogue::BAD_ARGUMENT,
                format!("a basis is `polynomial`, `normal`, `dual` or a list, not `{other}`"),
            )),
        },
        _ => {
            let elements = call.elements("basis", field)?;
            let basis = embedding.basis(&elements).ok_or_else(|| {
                let message = format!(
                    "these elements are no basis of {field} over {}; {} independent ones are needed",
                    embedding.sub(),
                    embedding.degree()
                );
                call.wrong("basis", catalogue::BAD_ARGUMENT, message)
            })?;
            Ok((basis, "the stated basis"))
        }
    }
}

/// The coordinates of symbols in a basis, each worked out once.
pub(super) struct Symbols {
    basis: Basis,
    known: BTreeMap<Element, Vec<Element>>,
}

impl Symbols {
    /// In this basis.
    pub fn new(basis: Basis) -> Symbols {
        Symbols {
            basis,
            known: BTreeMap::new(),
        }
    }

    /// The basis.
    pub fn basis(&self) -> &Basis {
        &self.basis
    }

    /// The coordinates of a symbol.
    pub fn of(&mut self, symbol: Element) -> &[Element] {
        let basis = &self.basis;
        self.known
            .entry(symbol)
            .or_insert_with(|| basis.coordinates(symbol))
    }

    /// The coordinates of all symbols of a word, one symbol after the other.
    pub fn of_word(&mut self, word: &[Element]) -> Vec<Element> {
        let mut digits = Vec::with_capacity(word.len() * self.basis.elements().len());
        for &symbol in word {
            digits.extend_from_slice(self.of(symbol));
        }
        digits
    }
}

/// The images of each row times each element of the basis.
fn words(symbols: &mut Symbols, generator: &Matrix) -> Matrix {
    let basis = symbols.basis().elements().to_vec();
    let small = symbols.basis().embedding().sub().clone();
    let field = generator.field();
    let degree = basis.len();
    let mut image = Matrix::zero(
        &small,
        generator.rows() * degree,
        generator.columns() * degree,
    );
    for row in 0..generator.rows() {
        for (scaled, &factor) in basis.iter().enumerate() {
            for (place, entry) in generator.nonzero(row) {
                for (at, &value) in symbols.of(field.mul(factor, entry)).iter().enumerate() {
                    image.set(row * degree + scaled, place * degree + at, value);
                }
            }
        }
    }
    image
}

/// A check for each coordinate of each check's sum: coordinate i of symbol c counts with the
/// coordinates of the check's entry times the i-th element of the basis.
fn checks(symbols: &mut Symbols, check: &Matrix) -> Matrix {
    let basis = symbols.basis().elements().to_vec();
    let small = symbols.basis().embedding().sub().clone();
    let field = check.field();
    let degree = basis.len();
    let mut image = Matrix::zero(&small, check.rows() * degree, check.columns() * degree);
    for row in 0..check.rows() {
        for (place, entry) in check.nonzero(row) {
            for (at, &element) in basis.iter().enumerate() {
                for (sum, &value) in symbols.of(field.mul(entry, element)).iter().enumerate() {
                    image.set(row * degree + sum, place * degree + at, value);
                }
            }
        }
    }
    image
}

struct Image {
    degree: usize,
}

impl Rules for Image {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let mut bounds =
            Vec::from_iter(before.carried_lower("a non-zero symbol has a non-zero coordinate"));
        bounds.push(crate::code::upper(
            before.upper * self.degree,
            "image",
            format!(
                "a word of at most {} symbols has at most {} times as many non-zero coordinates",
                before.upper, self.degree
            ),
            None,
        ));
        bounds
    }
}
