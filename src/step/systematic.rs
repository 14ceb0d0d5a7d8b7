//! `systematic`: the generator matrix becomes [I | A].

use super::{Step, carried::Carried, mask};
use crate::code::{Code, Made, information_positions};
use crate::finding::Found;
use crate::step::product::too_large;
use crate::value::Call;

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "systematic",
    parameters: &[],
    says: "Moves the information positions to the front and presents the code by the generator matrix [I | A] there; both kinds of positions keep their order among themselves.",
    theory: "An equivalent code: n, k, d and weights stay, and when the information positions already \
             stand first, the same code. Which these are is decided as for `arrange`, which moves \
             positions and leaves the presentation alone.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then systematic
  is [7, 4, 3]
  require systematic
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    too_large(call, code.dimension(), code.length())?;
    let mut order = information_positions(code);
    let checks: Vec<usize> = (0..code.length())
        .filter(|at| order.binary_search(at).is_err())
        .collect();
    order.extend(checks);
    let matrix = code
        .generator_matrix()
        .select_columns(&order)
        .reduced()
        .matrix;
    let offset = mask::moved(code, |word| mask::at(word, &order));
    Ok(Made::span(matrix)
        .dimension(code.dimension())
        .masked(offset)
        .rules(Carried::new("moving positions keeps it", move |word| {
            mask::at(word, &order)
        }))
        .assuming("information positions first, check positions last"))
}
