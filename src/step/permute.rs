//! `permute`: another order of positions.

use super::{Step, carried::Carried, mask};
use crate::code::{Code, Made, Space};
use crate::finding::{Found, catalogue};
use crate::value::{Call, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "permute",
    parameters: &[needed(
        "order",
        "a list of integers",
        "new position i holds what stood at order[i]; each position once",
    )],
    says: "Puts the positions in another order.",
    theory: "An equivalent code: n, k, d and weights stay (MacWilliams and Sloane, 1977, ch. 1 §8).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then permute([2, 4, 5, 6, 0, 1, 3])
  is [7, 4, 3]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let length = code.length();
    let mut seen = vec![false; length];
    let mut order = Vec::with_capacity(length);
    for at in call.naturals("order")? {
        let place = usize::try_from(at).ok().filter(|&at| at < length);
        match place {
            Some(at) if !seen[at] => {
                seen[at] = true;
                order.push(at);
            }
            Some(at) => {
                return Err(call.wrong(
                    "order",
                    catalogue::BAD_POSITIONS,
                    format!("position {at} is named twice"),
                ));
            }
            None => {
                let message = format!(
                    "there is no position {at}; this code's are 0..{}",
                    length - 1
                );
                return Err(call.wrong("order", catalogue::BAD_POSITIONS, message));
            }
        }
    }
    if order.len() != length {
        let missing = seen.iter().position(|&seen| !seen).unwrap_or(0);
        let message = format!(
            "the order names {} of {length} positions; position {missing} is missing",
            order.len()
        );
        return Err(call.wrong("order", catalogue::BAD_POSITIONS, message));
    }
    Ok(reordered(
        code,
        order,
        "another order of positions keeps it",
    ))
}

/// The code with new position i holding old position `order[i]`, a permutation.
pub(super) fn reordered(code: &Code, order: Vec<usize>, says: &'static str) -> Made {
    let space = match code.space() {
        Space::Check(matrix) => Space::Check(matrix.select_columns(&order)),
        Space::Span(matrix) => Space::Span(matrix.select_columns(&order)),
        Space::Cyclic(_) if order.iter().enumerate().all(|(at, &from)| at == from) => {
            code.space().clone()
        }
        Space::Cyclic(_) if code.redundancy() <= code.dimension() => {
            Space::Check(code.check_matrix().select_columns(&order))
        }
        Space::Cyclic(_) => Space::Span(code.generator_matrix().select_columns(&order)),
    };
    Made::new(code.field().clone(), code.length(), space)
        .dimension(code.dimension())
        .masked(mask::moved(code, |word| mask::at(word, &order)))
        .rules(Carried::new(says, move |word| mask::at(word, &order)))
}
