//! `mask`: a fixed word added on the wire.

use super::{Step, carried::Carried};
use crate::algebra::{Element, Field};
use crate::code::{Code, Made, weight};
use crate::finding::{Found, catalogue};
use crate::value::{Call, Value, needed};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "mask",
    parameters: &[needed(
        "with",
        "a list of n elements",
        "the word added to every word before it is sent",
    )],
    says: "Adds a fixed word to every word on the wire, so that a stuck line need be no word; the linear code stays as it is, and what is delivered is shifted.",
    theory: "A translate of the code: the difference of two words sent is a word of the code, so d, \
             weights and what is detected stay. Later steps act on what is sent: `mask` before \
             `extend` is not `mask` after it. `shorten`, `expurgate`, `augment` and `subcode` choose words \
             before the mask is added. A step that has no meaning for a translate is refused.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = hamming(3)
  then mask(with: [1, 1, 0, 0, 0, 0, 1])
  then extend
  is [8, 4, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let field = code.field();
    let word = word(call, "with", field, code.length())?;
    let sum = match code.offset() {
        None => word.clone(),
        Some(before) => sum(field, before, &word),
    };
    let shown = shown(&word);
    Ok(
        Made::new(field.clone(), code.length(), code.space().clone())
            .dimension(code.dimension())
            .masked(Some(sum))
            .rules(
                Carried::new("a word added on the wire changes no difference", |word| {
                    word.to_vec()
                })
                .cyclic(),
            )
            .assuming(format!("{shown} is added to every word on the wire")),
    )
}

/// A word as reports show it, a long one by its weight.
fn shown(word: &[Element]) -> String {
    if word.len() > 80 {
        return format!("a stated word of weight {}", weight(word));
    }
    let entries: Vec<String> = word.iter().map(Element::to_string).collect();
    format!("the word {}", entries.join(" "))
}

/// A word of the code's length: a list of elements, a vector, or a matrix of one row.
///
/// # Errors
/// When it is none, or has another length.
pub(super) fn word(call: &Call, name: &str, field: &Field, length: usize) -> Found<Vec<Element>> {
    let word = match call.value(name) {
        Value::Matrix(matrix) if matrix.rows() == 1 && matrix.field() == field => matrix.row(0),
        _ => call.elements(name, field)?,
    };
    if word.len() != length {
        let message = format!(
            "this word has {} entries, but the code has {length} positions",
            word.len()
        );
        let mut finding = call.wrong(name, catalogue::SHAPE, message);
        finding.help = Some(format!("give {length} elements, one for each position"));
        return Err(finding);
    }
    Ok(word)
}

/// The sum of two words.
pub(super) fn sum(field: &Field, one: &[Element], other: &[Element]) -> Vec<Element> {
    one.iter()
        .zip(other)
        .map(|(&left, &right)| field.add(left, right))
        .collect()
}

/// The mask after a step that does this to each word on the wire, when there is a mask.
pub(super) fn moved(
    code: &Code,
    change: impl FnOnce(&[Element]) -> Vec<Element>,
) -> Option<Vec<Element>> {
    code.offset().map(change)
}

/// The mask of a code made of the words of two, when one of them has a mask.
pub(super) fn paired(
    code: &Code,
    other: &Code,
    change: impl FnOnce(&[Element], &[Element]) -> Vec<Element>,
) -> Option<Vec<Element>> {
    if code.offset().is_none() && other.offset().is_none() {
        return None;
    }
    let of = |code: &Code| match code.offset() {
        Some(word) => word.to_vec(),
        None => vec![0; code.length()],
    };
    Some(change(&of(code), &of(other)))
}

/// The entries of a word at these positions, in their order.
pub(super) fn at(word: &[Element], positions: &[usize]) -> Vec<Element> {
    positions.iter().map(|&at| word[at]).collect()
}
