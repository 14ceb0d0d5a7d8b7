//! `dual`: the words orthogonal to all of the code.

use super::Step;
use crate::code::{
    Bound, Code, Knowledge, Made, Rules, Weights, counted, listed, lower, macwilliams,
};
use crate::finding::Found;
use crate::value::Call;

/// The longest code whose weights are transformed; the work grows as n³.
const TRANSFORM_LENGTH: usize = 1024;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "dual",
    parameters: &[],
    says: "The code of all words orthogonal to every word: check matrix and generator matrix change places.",
    theory: "The weights follow from the code's own (MacWilliams, 1963). The dual of an MDS code is \
             MDS (MacWilliams and Sloane, 1977, ch. 11 §2 theorem 2), that of a cyclic code cyclic.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then dual
  is [7, 3, 4]
",
    run,
};

fn run(code: &Code, _call: &Call) -> Found<Made> {
    Ok(dual(code))
}

/// The dual of a code.
pub(super) fn dual(code: &Code) -> Made {
    Made::new(code.field().clone(), code.length(), code.dual_space())
        .dimension(code.redundancy())
        .rules(Dual)
}

struct Dual;

impl Rules for Dual {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parent = &code.origin().parents[0];
        let singleton = parent.redundancy() + 1;
        if parent.dimension() == 0
            || code.dimension() == 0
            || known.distance(parent).lower != singleton
        {
            return Vec::new();
        }
        let value = parent.dimension() + 1;
        vec![lower(
            value,
            "mds-dual",
            format!("the dual of an MDS code is MDS, so d is k + 1 = {value} of the code before"),
        )]
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        let parent = &code.origin().parents[0];
        let (n, k, q) = (parent.length(), parent.dimension(), code.field().order());
        if n > TRANSFORM_LENGTH {
            return None;
        }
        let before = known.weights(parent)?;
        let counts = macwilliams(&listed(&before.counts, n), q, n, k)?;
        Some(Weights {
            counts: counted(counts),
            says: format!("MacWilliams, from the code before: {}", before.says),
        })
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        known
            .cyclic(&code.origin().parents[0])
            .then(|| "the dual of a cyclic code is cyclic".to_string())
    }
}
