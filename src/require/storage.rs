//! What a store of symbols on many devices asks for. Locality, availability and the cost of an
//! update are quantities of their own, compared in expressions.

use super::{Asked, Phrase, Ruling};
use crate::derive::{Judgement, locality};
use crate::evaluate::Stop;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[Phrase {
    pattern: "repairs one loss reading <= _",
    says: "Any one lost symbol follows from N others or fewer: its locality is at most N.",
    decide: repairs,
}];

fn repairs(asked: &Asked) -> Result<Ruling, Stop> {
    let allowed = asked.number(0)?;
    let session = asked.court.session;
    let positions = match locality::of_positions(session, asked.code()) {
        Ok(positions) => positions,
        Err(alone) => {
            return Ok(Ruling::new(Judgement::fails(format!(
                "no check touches {}, so its symbol follows from no others",
                asked.named(&[alone])
            ))));
        }
    };
    let worst = |end: fn(&locality::Known) -> usize| {
        let most = positions.iter().map(end).max().unwrap_or(0);
        (
            positions
                .iter()
                .position(|known| end(known) == most)
                .unwrap_or(0),
            most,
        )
    };
    let (at, needed) = worst(|known| known.lower);
    let (_, enough) = worst(|known| known.upper);
    Ok(Ruling::new(if enough <= allowed {
        Judgement::holds(format!(
            "every symbol follows from {enough} others or fewer"
        ))
    } else if needed > allowed {
        Judgement::fails(format!(
            "no {allowed} others give the symbol at {}; it takes {}{needed}",
            asked.named(&[at]),
            if positions[at].upper == needed {
                ""
            } else {
                "at least "
            }
        ))
    } else {
        Judgement::undecided(format!(
            "the worst position takes between {needed} and {enough} others"
        ))
    }))
}
