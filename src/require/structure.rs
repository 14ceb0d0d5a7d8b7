//! Structure of the check matrix as built.

use super::{Asked, Phrase, Ruling};
use crate::code::Space;
use crate::derive::{Judgement, form, structure};
use crate::evaluate::Stop;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[
    Phrase {
        pattern: "column_weight odd",
        says: "Every column of the check matrix as built has an odd number of non-zero entries.",
        decide: column_weight_odd,
    },
    Phrase {
        pattern: "full rank",
        says: "No row of the check matrix as built is a combination of the others.",
        decide: full_rank,
    },
    Phrase {
        pattern: "no four_cycles",
        says: "No two columns of the check matrix as built share two rows.",
        decide: no_four_cycles,
    },
    Phrase {
        pattern: "balanced rows within _",
        says: "The row weights of the check matrix as built differ by at most N.",
        decide: balanced,
    },
    Phrase {
        pattern: "divisible by _",
        says: "Every weight is a multiple of N.",
        decide: |asked| {
            let by = asked.number(0)?;
            let judgement = form::divisible(asked.court.session, asked.code(), by);
            Ok(Ruling::new(judgement))
        },
    },
    Phrase {
        pattern: "quasi_cyclic of index _",
        says: "A cyclic shift by N positions, or of each of N blocks of equal length by one, takes words to words.",
        decide: |asked| {
            Ok(Ruling::new(form::quasi_cyclic(
                asked.code(),
                asked.number(0)?,
            )))
        },
    },
];

fn column_weight_odd(asked: &Asked) -> Result<Ruling, Stop> {
    let weights = structure::column_weights(structure::check_matrix(asked.code()));
    let even = weights.iter().position(|weight| weight % 2 == 0);
    Ok(Ruling::new(match even {
        None => Judgement::holds(format!("all {} columns have odd weight", weights.len())),
        Some(at) => Judgement::fails(format!(
            "the column of {} has weight {}",
            asked.named(&[at]),
            weights[at]
        )),
    }))
}

fn full_rank(asked: &Asked) -> Result<Ruling, Stop> {
    let code = asked.code();
    let rows = match code.space() {
        Space::Check(matrix) => matrix.rows(),
        _ => {
            return Ok(Ruling::new(Judgement::holds(
                "the check matrix is derived, with as many rows as its rank",
            )));
        }
    };
    let rank = code.redundancy();
    if rows == rank {
        return Ok(Ruling::new(Judgement::holds(format!(
            "all {rows} rows are independent"
        ))));
    }
    let dependent = structure::dependent_rows(structure::check_matrix(code));
    let mut says = format!("{rows} rows have rank {rank}");
    if let Some(rows) = dependent {
        let listed: Vec<String> = rows.iter().map(usize::to_string).collect();
        says = format!("{says}: rows {} are dependent", listed.join(", "));
    }
    Ok(Ruling::new(Judgement::fails(says)))
}

fn no_four_cycles(asked: &Asked) -> Result<Ruling, Stop> {
    Ok(Ruling::new(
        match structure::girth(structure::check_matrix(asked.code())) {
            Ok(Some(4)) => Judgement::fails("the girth is 4"),
            Ok(Some(girth)) => Judgement::holds(format!("the girth is {girth}")),
            Ok(None) => Judgement::holds("there is no cycle"),
            Err(structure::TooLarge) => {
                Judgement::undecided("the matrix is too large to look for cycles")
            }
        },
    ))
}

fn balanced(asked: &Asked) -> Result<Ruling, Stop> {
    let allowed = asked.number(0)?;
    let weights = structure::row_weights(structure::check_matrix(asked.code()));
    let (least, most) = (
        weights.iter().min().unwrap_or(&0),
        weights.iter().max().unwrap_or(&0),
    );
    let says = format!("row weights run from {least} to {most}");
    Ok(Ruling::new(Judgement::of(
        most - least <= allowed,
        says.clone(),
        says,
    )))
}
