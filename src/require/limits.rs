//! Codes that reach a bound.

use super::{Asked, Phrase, Ruling, interval};
use crate::derive::search::bounds;
use crate::derive::{Effort, Judgement};
use crate::evaluate::Stop;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[
    Phrase {
        pattern: "meets singleton",
        says: "d is the largest that Singleton's bound allows for this n and k.",
        decide: |asked| meets(asked, "Singleton's bound", bounds::singleton),
    },
    Phrase {
        pattern: "meets hamming",
        says: "d is the largest that the sphere-packing bound allows for this n and k.",
        decide: |asked| meets(asked, "the sphere-packing bound", bounds::hamming),
    },
    Phrase {
        pattern: "meets griesmer",
        says: "d is the largest that Griesmer's bound allows for this n and k.",
        decide: |asked| meets(asked, "Griesmer's bound", bounds::griesmer),
    },
    Phrase {
        pattern: "meets plotkin",
        says: "d is the largest that Plotkin's bound allows for this n and k.",
        decide: |asked| meets(asked, "Plotkin's bound", bounds::plotkin),
    },
    Phrase {
        pattern: "meets gilbert_varshamov",
        says: "d is at least what Gilbert and Varshamov promise of some linear code with this n and k.",
        decide: |asked| {
            meets(
                asked,
                "what Gilbert and Varshamov promise",
                bounds::gilbert_varshamov,
            )
        },
    },
];

fn meets(asked: &Asked, name: &str, bound: fn(u64, usize, usize) -> usize) -> Result<Ruling, Stop> {
    let code = asked.code();
    if code.dimension() == 0 {
        return Ok(Ruling::new(Judgement::fails(
            "the code has only one word, so it has no distance",
        )));
    }
    let limit = bound(code.field().order(), code.length(), code.dimension());
    let distance = asked.court.session.distance_by(code, Effort::Full);
    let says = format!("d = {}, {name} is {limit}", interval(&distance));
    let mut ruling = Ruling::new(if distance.lower >= limit {
        Judgement::holds(says)
    } else if distance.upper < limit {
        Judgement::fails(says).witness(distance.witness)
    } else {
        Judgement::undecided(format!(
            "d is only known to lie in {}, {name} is {limit}",
            interval(&distance)
        ))
    });
    ruling.help = (distance.upper < limit)
        .then(|| "the bound may be out of reach: no code need meet it".to_string());
    Ok(ruling)
}
