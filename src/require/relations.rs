//! Relations between codes and with matrices.

use super::{Asked, Phrase, Ruling};
use crate::code::Code;
use crate::derive::{Judgement, structure};
use crate::evaluate::Stop;
use crate::finding::{Finding, catalogue};
use crate::value::Value;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[
    Phrase {
        pattern: "contains _",
        says: "Every word of the other code is a word of this one.",
        decide: |asked| {
            let other = asked.code_operand(0)?;
            comparable(asked, other)?;
            Ok(Ruling::new(inside(other, asked.code(), "the other code")))
        },
    },
    Phrase {
        pattern: "within _",
        says: "Every word of this code is a word of the other.",
        decide: |asked| {
            let other = asked.code_operand(0)?;
            comparable(asked, other)?;
            Ok(Ruling::new(inside(asked.code(), other, "this code")))
        },
    },
    Phrase {
        pattern: "same code as _",
        says: "Both are the same set of words, position by position.",
        decide: same_code,
    },
    Phrase {
        pattern: "same matrix as _",
        says: "The check matrix as built is the given matrix, entry by entry.",
        decide: same_matrix,
    },
];

fn comparable(asked: &Asked, other: &Code) -> Result<(), Stop> {
    let code = asked.code();
    if code.field() == other.field() && code.length() == other.length() {
        return Ok(());
    }
    let message = format!(
        "codes of one field and length can be compared; this is [{}, {}] over {}, the other [{}, {}] over {}",
        code.length(),
        code.dimension(),
        code.field(),
        other.length(),
        other.dimension(),
        other.field()
    );
    Err(Stop::Finding(Box::new(Finding::new(
        catalogue::SHAPE,
        asked.operands[0].1,
        message,
    ))))
}

/// Whether all words of one code lie in another.
fn inside(small: &Code, large: &Code, whose: &str) -> Judgement {
    let generator = small.generator_matrix();
    let stranger = (0..generator.rows())
        .map(|row| generator.row(row))
        .find(|word| !large.contains(word));
    match stranger {
        None => Judgement::holds(format!("a basis of {whose} passes all checks")),
        Some(word) => {
            Judgement::fails(format!("a word of {whose} fails a check")).witness(Some(word))
        }
    }
}

/// Whether the fixed words added on the wire move the two codes apart.
fn masks_differ(code: &Code, other: &Code) -> bool {
    let field = code.field();
    let none = vec![0; code.length()];
    let own = code.offset().unwrap_or(&none);
    let theirs = other.offset().unwrap_or(&none);
    let difference: Vec<u32> = own
        .iter()
        .zip(theirs)
        .map(|(&left, &right)| field.sub(left, right))
        .collect();
    !code.contains(&difference)
}

fn same_code(asked: &Asked) -> Result<Ruling, Stop> {
    let other = asked.code_operand(0)?;
    comparable(asked, other)?;
    let code = asked.code();
    if masks_differ(code, other) {
        return Ok(Ruling::new(Judgement::fails(
            "the fixed words of `mask` differ by a word that is not in the code, so other words are sent",
        )));
    }
    if code.dimension() != other.dimension() {
        return Ok(Ruling::new(Judgement::fails(format!(
            "k is {}, the other's is {}",
            code.dimension(),
            other.dimension()
        ))));
    }
    let judgement = inside(code, other, "this code");
    Ok(Ruling::new(judgement))
}

fn same_matrix(asked: &Asked) -> Result<Ruling, Stop> {
    let given = match &asked.operands[0] {
        (Value::Matrix(matrix), _) => matrix,
        (other, span) => {
            let message = format!("a matrix is needed here, not {}", other.kind());
            return Err(Stop::Finding(Box::new(Finding::new(
                catalogue::WRONG_TYPE,
                *span,
                message,
            ))));
        }
    };
    let own = structure::check_matrix(asked.code());
    if own.rows() != given.rows() || own.columns() != given.columns() {
        return Ok(Ruling::new(Judgement::fails(format!(
            "the check matrix is {} x {}, the given one {} x {}",
            own.rows(),
            own.columns(),
            given.rows(),
            given.columns()
        ))));
    }
    let differing = (0..own.columns()).find(|&column| own.column(column) != given.column(column));
    Ok(Ruling::new(match differing {
        None => Judgement::holds(format!("all {} columns agree", own.columns())),
        Some(at) => Judgement::fails(format!(
            "the columns of {} differ: {:?} in this code, {:?} in the given matrix",
            asked.named(&[at]),
            own.column(at),
            given.column(at)
        )),
    }))
}
