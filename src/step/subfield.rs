//! `subfield`: the words whose symbols all lie in the prime field.

use super::{Step, image::digit};
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Knowledge, Made, Rules};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "subfield",
    parameters: &[needed(
        "field",
        "a field",
        "the prime field under the code's",
    )],
    says: "Keeps the words whose symbols all lie in the subfield: each row of a check matrix becomes a row for each of its digits.",
    theory: "A subset of the code, so d does not fall; k is at least n - m(n - k) (Delsarte, 1975; MacWilliams and Sloane, 1977, ch. 7 §7).",
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
    if small.order() != u64::from(field.characteristic()) {
        let message = format!(
            "{small} is not the prime field of {field}, which is GF({})",
            field.characteristic()
        );
        return Err(call.wrong("field", catalogue::FIELD_MISMATCH, message));
    }
    let check = code
        .check_matrix_as_built()
        .unwrap_or_else(|| code.check_matrix());
    let degree = field.degree() as usize;
    let matrix = Matrix::from_fn(
        small,
        check.rows() * degree,
        check.columns(),
        |row, column| {
            digit(
                check.get(row / degree, column),
                row % degree,
                field.characteristic(),
            )
        },
    );
    Ok(Made::check(matrix).rules(Subfield))
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
}
