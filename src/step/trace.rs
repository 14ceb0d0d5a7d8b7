//! `trace`: the traces of all words.

use super::{
    Step,
    presentation::generators,
    product::too_large,
    subfield::{embedding, expanded},
};
use crate::algebra::{Element, Embedding};
use crate::code::{Bound, Code, Knowledge, Made, Rules, upper, weight};
use crate::finding::Found;
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "trace",
    parameters: &[needed("field", "a field", "a subfield of the code's")],
    says: "Replaces every symbol of every word by its trace to the subfield; each row of a generator matrix becomes a row for each of its coordinates.",
    theory: "The dual of the subfield subcode of the dual, of dimension at most mk, m the degree over the \
             subfield (Delsarte, 1975; MacWilliams and Sloane, 1977, ch. 7 §7 theorem 11). d does not rise: some \
             multiple of a word has a trace that is not zero. A cyclic code stays cyclic.",
    example: "\
field octal = GF(8) where a^3 = a + 1
code gauge_word
  = reed_solomon(length: 7, dimension: 1, first_root: 0) over octal
  then trace(GF(2))
  is [7, 3, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let embedding = embedding(call, code.field(), call.field_argument("field")?)?;
    let rows = generators(code);
    too_large(
        call,
        rows.rows().saturating_mul(embedding.degree() as usize),
        code.length(),
    )?;
    // The coordinates of a word are the traces of its multiples by the dual basis.
    Ok(Made::span(expanded(&embedding, rows)).rules(Trace { embedding }))
}

struct Trace {
    embedding: Embedding,
}

impl Trace {
    /// The trace of a multiple of a word that is not zero.
    fn of_multiple(&self, word: &[Element]) -> Option<Vec<Element>> {
        let field = self.embedding.field();
        let basis = self.embedding.polynomial_basis();
        basis.elements().iter().find_map(|&factor| {
            let traces: Vec<Element> = word
                .iter()
                .map(|&entry| self.embedding.trace(field.mul(factor, entry)))
                .collect();
            (weight(&traces) > 0).then_some(traces)
        })
    }
}

impl Rules for Trace {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let traced = before.witness.and_then(|word| self.of_multiple(&word));
        let value = traced.as_deref().map_or(before.upper, weight);
        vec![upper(
            value,
            "trace",
            format!(
                "the trace of a multiple of a word of weight at most {}",
                before.upper
            ),
            traced,
        )]
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        known
            .cyclic(&code.origin().parents[0])
            .then(|| "traces of a cyclic code's words, shifted, are traces of shifted words".into())
    }
}
