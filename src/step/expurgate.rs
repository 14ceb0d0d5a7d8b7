//! `expurgate`: keep the words that pass a further check.

use super::{Step, positions};
use crate::code::{Bound, Code, Counts, Knowledge, Made, Rules, Space, Weights, lower};
use crate::finding::{Found, catalogue};
use crate::value::{Call, optional};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "expurgate",
    parameters: &[optional(
        "with",
        "a list of n elements",
        "the further check, a row of ones unless said",
    )],
    says: "Keeps the words that pass a further check, by default those whose symbols sum to zero: a check matrix gains a row.",
    theory: "A subcode, so d does not fall; over GF(2) the default keeps the words of even weight, so \
             an odd d rises (MacWilliams and Sloane, 1977, ch. 1 §9).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then expurgate
  is [7, 3, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let (row, even) = further_row(code, call)?;
    let space = match code.space() {
        Space::Span(matrix) => Space::Span(positions::orthogonal_part(matrix, &row)),
        _ => Space::Check(positions::with_row(
            code.check_matrix_as_built()
                .expect("a check matrix as built"),
            &row,
        )),
    };
    let level = row.windows(2).all(|pair| pair[0] == pair[1]);
    Ok(Made::new(code.field().clone(), code.length(), space)
        .masked(code.offset().map(<[u32]>::to_vec))
        .rules(Expurgated { even, level }))
}

/// The row given as `with`, or all ones; and whether it is the all-ones row over GF(2).
pub(super) fn further_row(code: &Code, call: &Call) -> Found<(Vec<u32>, bool)> {
    let ones = vec![1; code.length()];
    if !call.has("with") {
        return Ok((ones, code.field().is_binary()));
    }
    let row = call.elements("with", code.field())?;
    if row.len() != code.length() {
        let message = format!(
            "the row has {} entries, but the code has {} positions",
            row.len(),
            code.length()
        );
        return Err(call.wrong("with", catalogue::SHAPE, message));
    }
    let even = code.field().is_binary() && row == ones;
    Ok((row, even))
}

struct Expurgated {
    even: bool,
    /// Whether all entries of the check are equal.
    level: bool,
}

impl Rules for Expurgated {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 || code.dimension() == 0 {
            return Vec::new();
        }
        if self.even && before.lower % 2 == 1 {
            let says = format!(
                "words of even weight only, d before was at least {}",
                before.lower
            );
            return vec![lower(before.lower + 1, "even-subcode", says)];
        }
        before
            .carried_lower("a subcode keeps it")
            .into_iter()
            .collect()
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        if !self.even {
            return None;
        }
        let before = known.weights(&code.origin().parents[0])?;
        let counts: Counts = before
            .counts
            .into_iter()
            .filter(|(weight, _)| weight % 2 == 0)
            .collect();
        Some(Weights {
            counts,
            says: format!("the even weights of the code before: {}", before.says),
        })
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        (self.level && known.cyclic(&code.origin().parents[0]))
            .then(|| "a cyclic code and a check that shifts leave alone".into())
    }
}
