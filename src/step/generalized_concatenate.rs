//! `generalized_concatenate`: several outer codes, each for a level of a chain of inner ones.

use super::{
    Step, construction_x::independent, image::Symbols, presentation::generators, product::too_large,
};
use crate::algebra::{Element, Embedding, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower};
use crate::finding::{Finding, Found, catalogue};
use crate::value::{Call, Value, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "generalized_concatenate",
    parameters: &[
        needed(
            "outers",
            "a list of codes",
            "the outer codes after the first, which is the code so far",
        ),
        needed(
            "inners",
            "a list of codes",
            "an inner code for each outer one, each containing the next",
        ),
    ],
    says: "At each place, the symbols of all outer words choose an inner word: the first one a coset of the second inner code in the first, the second one a coset of the third in the second, and so on. Symbols are written in the basis 1, a, a², …; the rows of an inner generator matrix that are independent of the next code and of each other, in order, take their coordinates.",
    theory: "n is the product of the lengths, k the sum of each outer code's with the dimensions between its inner \
             codes, and d at least the least product of an outer distance and its inner one's (Blokh and Zyablov, 1974).",
    example: "\
field quad = GF(4) where a^2 = a + 1
field bit = GF(2)
code all over bit = span(identity(3))
code gauge_frame
  = reed_solomon(length: 3, dimension: 2) over quad
  then generalized_concatenate(outers: [all], inners: [parity(4) over bit, repetition(4) over bit])
  is [12, 7, 4]
",
    run,
};

/// One level: the outer code, the rows of the inner one that its symbols choose from.
struct Level {
    outer: Code,
    rows: Matrix,
    embedding: Embedding,
}

fn run(code: &Code, call: &Call) -> Found<Made> {
    let outers = [vec![code.clone()], codes(call, "outers")?].concat();
    let inners = codes(call, "inners")?;
    if outers.len() != inners.len() {
        let message = format!(
            "there are {} outer codes, the code so far included, but {} inner ones",
            outers.len(),
            inners.len()
        );
        return Err(call.wrong("inners", catalogue::SHAPE, message));
    }
    if let Some(outer) = outers.iter().find(|outer| outer.length() != code.length()) {
        let message = format!(
            "an outer code has {} positions, the code so far {}; they must be as long",
            outer.length(),
            code.length()
        );
        return Err(call.wrong("outers", catalogue::SHAPE, message));
    }
    let mut levels = Vec::with_capacity(outers.len());
    for (at, outer) in outers.iter().enumerate() {
        levels.push(level(call, at, outer, &inners)?);
    }
    let dimension = levels
        .iter()
        .map(|level| level.outer.dimension() * level.rows.rows())
        .sum();
    let length = code.length().saturating_mul(inners[0].length());
    too_large(call, dimension, length)?;
    let mut matrix = Matrix::zero(inners[0].field(), 0, length);
    for level in &levels {
        matrix = matrix.above(&frames(level));
    }
    Ok(Made::span(matrix)
        .dimension(dimension)
        .from(outers.into_iter().skip(1))
        .from(inners)
        .rules(Generalized)
        .assuming("symbols of the outer codes choose rows of the inner generator matrices as built in the basis 1, a, a^2, …"))
}

fn codes(call: &Call, name: &str) -> Found<Vec<Code>> {
    call.items(name)?
        .into_iter()
        .map(|item| match item {
            Value::Code(code) => Ok(code),
            other => Err(call.wrong(
                name,
                catalogue::WRONG_TYPE,
                format!("`{name}` takes codes, not {}", other.kind()),
            )),
        })
        .collect()
}

/// A level, checked: each inner code contains the next, and the outer one's symbols have as many
/// coordinates as it has dimensions more.
fn level(call: &Call, at: usize, outer: &Code, inners: &[Code]) -> Found<Level> {
    let (inner, next) = (&inners[at], inners.get(at + 1));
    let wrong = |code, message: String| -> Box<Finding> { call.wrong("inners", code, message) };
    if let Some(next) = next {
        let below = next.generator_matrix();
        let fits = next.field() == inner.field() && next.length() == inner.length();
        if !fits || (0..below.rows()).any(|row| !inner.contains(&below.row(row))) {
            let message = format!("inner code {at} does not contain inner code {}", at + 1);
            return Err(wrong(catalogue::BAD_ARGUMENT, message));
        }
    }
    let none = Matrix::zero(inner.field(), 0, inner.length());
    let below = next.map_or(&none, |next| next.generator_matrix());
    let rows = generators(inner).select_rows(&independent(below, generators(inner)));
    let Some(embedding) = outer.field().embedding_of(inner.field()) else {
        let message = format!(
            "inner code {at} is over {}, which is no subfield of {}",
            inner.field(),
            outer.field()
        );
        return Err(wrong(catalogue::FIELD_MISMATCH, message));
    };
    if rows.rows() != embedding.degree() as usize {
        let message = format!(
            "a symbol of outer code {at} has {} coordinates over {}, but inner code {at} has {} dimensions more than the next",
            embedding.degree(),
            inner.field(),
            rows.rows()
        );
        return Err(wrong(catalogue::SYMBOL_WIDTH, message));
    }
    Ok(Level {
        outer: outer.clone(),
        rows,
        embedding,
    })
}

/// Each row of the outer generator matrix times each element of the basis, its symbols replaced
/// by combinations of the level's rows.
fn frames(level: &Level) -> Matrix {
    let mut symbols = Symbols::new(level.embedding.polynomial_basis());
    let basis: Vec<Element> = symbols.basis().elements().to_vec();
    let (outer, small) = (level.outer.generator_matrix(), level.rows.field());
    let block = level.rows.columns();
    let mut matrix = Matrix::zero(small, outer.rows() * basis.len(), outer.columns() * block);
    for row in 0..outer.rows() {
        for (at, &scale) in basis.iter().enumerate() {
            for (place, entry) in outer.nonzero(row) {
                let mut word = vec![0; block];
                let symbol = level.embedding.field().mul(scale, entry);
                for (chosen, &digit) in symbols.of(symbol).iter().enumerate() {
                    small.add_multiple(&mut word, digit, &level.rows.row(chosen));
                }
                for (offset, &value) in word.iter().enumerate() {
                    matrix.set(row * basis.len() + at, place * block + offset, value);
                }
            }
        }
    }
    matrix
}

struct Generalized;

impl Rules for Generalized {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        // Parents: the outer codes, then as many inner ones.
        let parents = &code.origin().parents;
        let (outers, inners) = parents.split_at(parents.len() / 2);
        // A word whose first non-zero outer word is that of level i lies, at each of that word's
        // places, in inner code i and not in the next.
        let products = outers
            .iter()
            .zip(inners)
            .map(|(outer, inner)| known.distance(outer).lower * known.distance(inner).lower)
            .filter(|&product| product > 0);
        products
            .min()
            .map(|value| {
                lower(
                    value,
                    "generalized-concatenation",
                    "the least product of an outer distance and that of its inner code",
                )
            })
            .into_iter()
            .collect()
    }
}
