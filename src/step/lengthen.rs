//! `lengthen`: add the all-ones word and an overall check, or given columns.

use super::{Step, augment, carried, extend};
use crate::code::{Bound, Code, Knowledge, Made, Rules, upper};
use crate::finding::{Found, catalogue};
use crate::value::{Call, optional};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "lengthen",
    parameters: &[optional(
        "columns",
        "a matrix of k rows",
        "further columns of the generator matrix as built, in place of the all-ones word and its check",
    )],
    says: "Adds the all-ones word and then an overall check, as `augment` and `extend` do in a row; or, with columns, appends these to the generator matrix as built.",
    theory: "n and k grow by one each, k only when the all-ones word is new (MacWilliams and Sloane, 1977, ch. 1 §9). \
             With columns, k stays and d does not fall, nor rise by more than the number of columns.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = simplex(3)
  then lengthen
  is [8, 4, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    if call.has("columns") {
        return with_columns(code, call);
    }
    let ones = vec![1; code.length()];
    let augmented = carried::between(
        augment::with(code, ones, code.field().is_binary()),
        code,
        call,
    );
    let extended = carried::between(extend::extended(&augmented), &augmented, call);
    Ok(carried::last_of_two(extended))
}

fn with_columns(code: &Code, call: &Call) -> Found<Made> {
    let columns = call.matrix("columns")?;
    let as_built = code.generator_matrix_as_built();
    let Some(generator) = as_built.filter(|matrix| matrix.rows() == code.dimension()) else {
        let mut finding = call.wrong(
            "columns",
            catalogue::BAD_ARGUMENT,
            "this code was not built from a generator matrix of independent rows, so it does not follow which rows the columns extend",
        );
        finding.help = Some("write `then systematic` before it".into());
        return Err(finding);
    };
    if columns.field() != code.field() {
        let message = format!(
            "the code is over {}, the columns over {}",
            code.field(),
            columns.field()
        );
        return Err(call.wrong("columns", catalogue::FIELD_MISMATCH, message));
    }
    if columns.rows() != generator.rows() {
        let message = format!(
            "the columns have {} entries, but the generator matrix has {} rows",
            columns.rows(),
            generator.rows()
        );
        return Err(call.wrong("columns", catalogue::SHAPE, message));
    }
    Ok(Made::span(generator.beside(&columns))
        .dimension(code.dimension())
        .rules(Lengthened {
            added: columns.columns(),
        }))
}

struct Lengthened {
    added: usize,
}

impl Rules for Lengthened {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let mut bounds = Vec::from_iter(before.carried_lower("further columns keep it"));
        bounds.push(upper(
            before.upper + self.added,
            "lengthening",
            format!(
                "a word of weight at most {} gains {} positions",
                before.upper, self.added
            ),
            None,
        ));
        bounds
    }
}
