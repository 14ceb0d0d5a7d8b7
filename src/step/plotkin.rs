//! `plotkin`: the words (u | u + v).

use super::{Step, mask, product::same_field};
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Distance, Knowledge, Made, Rules, lower, upper};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "plotkin",
    parameters: &[needed(
        "with",
        "a code",
        "the code of v, as long as the code so far, which is that of u",
    )],
    says: "The words (u | u + v), u in the code so far and v in the other.",
    theory: "k adds up and d is the lesser of 2 d(u) and d(v) (Plotkin, 1960; MacWilliams and Sloane, 1977, ch. 2 §9).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = parity(4)
  then plotkin(repetition(4))
  is [8, 4, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let other = call.code("with")?;
    same_field(code, other, call, "with")?;
    if code.length() != other.length() {
        let message = format!(
            "u has {} positions, v has {}; they must be as long",
            code.length(),
            other.length()
        );
        return Err(call.wrong("with", catalogue::SHAPE, message));
    }
    let (u, v) = (code.generator_matrix(), other.generator_matrix());
    let top = u.beside(u);
    let bottom = Matrix::zero(code.field(), v.rows(), v.columns()).beside(v);
    Ok(Made::span(top.above(&bottom))
        .dimension(code.dimension() + other.dimension())
        .from([other.clone()])
        .masked(mask::paired(code, other, |u, v| {
            [u, &mask::sum(code.field(), u, v)].concat()
        }))
        .rules(Plotkin))
}

struct Plotkin;

impl Rules for Plotkin {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parents = &code.origin().parents;
        let (u, v) = (known.distance(&parents[0]), known.distance(&parents[1]));
        let mut bounds = Vec::new();
        let least =
            |doubled: Option<usize>, single: Option<usize>| doubled.into_iter().chain(single).min();
        let defined = |distance: &Distance, value: usize| (distance.lower > 0).then_some(value);
        if let Some(value) = least(defined(&u, 2 * u.lower), defined(&v, v.lower)) {
            bounds.push(lower(
                value,
                "plotkin",
                format!("(u | u + v): the lesser of 2 * {} and {}", u.lower, v.lower),
            ));
        }
        if let Some(value) = defined(&u, 2 * u.upper) {
            let witness = u.witness.map(|word| [word.clone(), word].concat());
            bounds.push(upper(
                value,
                "plotkin",
                format!("(u | u) with a word u of weight at most {}", u.upper),
                witness,
            ));
        }
        if let Some(value) = defined(&v, v.upper) {
            let witness = v.witness.map(|word| [vec![0; word.len()], word].concat());
            bounds.push(upper(
                value,
                "plotkin",
                format!("(0 | v) with a word v of weight at most {}", v.upper),
                witness,
            ));
        }
        bounds
    }
}
