//! `subfield`: the words whose symbols all lie in a subfield.

use super::{Step, image::Symbols, presentation::checks};
use crate::algebra::{Embedding, Field, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "subfield",
    parameters: &[needed("field", "a field", "a subfield of the code's")],
    says: "Keeps the words whose symbols all lie in the subfield: each row of a check matrix becomes a row for each of its coordinates.",
    theory: "A subset of the code, so d does not fall; k is at least n - m(n - k), m the degree over \
             the subfield (Delsarte, 1975; MacWilliams and Sloane, 1977, ch. 7 §7). A cyclic code stays cyclic.",
    example: "\
field bit = GF(2)
field hex = GF(16) where a^4 = a + 1
code gauge_word
  = reed_solomon(length: 15, dimension: 11) over hex
  then subfield(bit)
  is [15, 7, 5]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let field = code.field();
    let small = call.field_argument("field")?;
    if small == field {
        return Ok(Made::new(field.clone(), code.length(), code.space().clone()).rules(Subfield));
    }
    let embedding = embedding(call, field, small)?;
    Ok(Made::check(expanded(&embedding, checks(code))).rules(Subfield))
}

/// The embedding of a field into a larger one.
///
/// # Errors
/// When it is no subfield.
pub(super) fn embedding(call: &Call, large: &Field, small: &Field) -> Found<Embedding> {
    large.embedding_of(small).ok_or_else(|| {
        let message = format!("{small} is no subfield of {large}");
        let mut finding = call.wrong("field", catalogue::FIELD_MISMATCH, message);
        let (p, m) = (large.characteristic(), large.degree());
        let orders: Vec<String> = (1..=m)
            .filter(|at| m % at == 0)
            .map(|at| match at {
                1 => format!("GF({p})"),
                _ => format!("GF({p}^{at})"),
            })
            .collect();
        finding.help = Some(format!(
            "the subfields of {large} are {}",
            orders.join(", ")
        ));
        finding
    })
}

/// A row over the subfield for each coordinate of each row, in the basis 1, a, a², ….
pub(super) fn expanded(embedding: &Embedding, matrix: &Matrix) -> Matrix {
    let degree = embedding.degree() as usize;
    let mut symbols = Symbols::new(embedding.polynomial_basis());
    let mut expanded = Matrix::zero(embedding.sub(), matrix.rows() * degree, matrix.columns());
    for row in 0..matrix.rows() {
        for (column, entry) in matrix.nonzero(row) {
            for (at, &value) in symbols.of(entry).iter().enumerate() {
                if value != 0 {
                    expanded.set(row * degree + at, column, value);
                }
            }
        }
    }
    expanded
}

struct Subfield;

impl Rules for Subfield {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 || code.dimension() == 0 {
            return Vec::new();
        }
        before
            .carried_lower("a subfield subcode keeps it")
            .into_iter()
            .collect()
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        known.cyclic(&code.origin().parents[0]).then(|| {
            "the words of a cyclic code with symbols in a subfield, shifted, stay such words".into()
        })
    }
}
