//! What a bounded-distance corrector, which corrects up to t = (d − 1)/2 errors, makes of more.

use super::{Asked, Phrase, Ruling, interval};
use crate::algebra::Element;
use crate::derive::channel::wrongly_corrected;
use crate::derive::{Effort, Judgement, support};
use crate::evaluate::Stop;
use num_bigint::BigUint;
use num_traits::Zero;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[
    Phrase {
        pattern: "miscorrects at most _ of _",
        says: "Of all errors in t + 1 = (d - 1)/2 + 1 places, a share of at most N in M is turned into a wrong word by a corrector of up to t errors.",
        decide: at_most,
    },
    Phrase {
        pattern: "never miscorrects singles",
        says: "No single error is turned into a wrong word by a corrector of up to (d - 1)/2 errors.",
        decide: |asked| never(asked, 1),
    },
    Phrase {
        pattern: "never miscorrects doubles",
        says: "No error in two places is turned into a wrong word by a corrector of up to (d - 1)/2 errors.",
        decide: |asked| never(asked, 2),
    },
    Phrase {
        pattern: "never miscorrects triples",
        says: "No error in three places is turned into a wrong word by a corrector of up to (d - 1)/2 errors.",
        decide: |asked| never(asked, 3),
    },
];

/// What t is, or why it is not known.
fn radius(asked: &Asked) -> Result<usize, Ruling> {
    if asked.code().dimension() == 0 {
        return Err(Ruling::new(Judgement::holds(
            "the code has only one word, so there is no wrong one",
        )));
    }
    let distance = asked.court.session.distance_by(asked.code(), Effort::Full);
    match distance.exact() {
        Some(d) => Ok((d - 1) / 2),
        None => Err(Ruling::new(Judgement::undecided(format!(
            "d is only known to lie in {}",
            interval(&distance)
        )))),
    }
}

fn at_most(asked: &Asked) -> Result<Ruling, Stop> {
    let (part, whole) = (asked.number(0)?, asked.number(1)?);
    let t = match radius(asked) {
        Ok(t) => t,
        Err(ruling) => return Ok(ruling),
    };
    let (code, session) = (asked.code(), asked.court.session);
    let (n, q) = (code.length(), code.field().order());
    let distance = session.distance_by(code, Effort::Full);
    let all = errors(n, q, t + 1);
    if distance.lower.is_multiple_of(2) {
        return Ok(Ruling::new(Judgement::holds(format!(
            "d = {}, so errors in t + 1 = {} places lie next to no wrong word",
            distance.lower,
            t + 1
        ))));
    }
    let Some(wrong) = count(asked, t, t + 1) else {
        return Ok(Ruling::new(Judgement::undecided(
            "the weights are not known",
        )));
    };
    // wrong / all <= part / whole, without a division.
    let holds = &wrong * whole <= &all * part;
    let says = format!(
        "of {all} errors in t + 1 = {} places {wrong} become a wrong word, {} in 100",
        t + 1,
        percent(&wrong, &all)
    );
    let witness = distance.witness.clone();
    let mut ruling = Ruling::new(Judgement::of(holds, says.clone(), says));
    if !holds {
        ruling.judgement.witness = witness;
        ruling.needed = Some(2 * t + 2);
    }
    Ok(ruling)
}

/// The errors in so many places.
fn errors(n: usize, q: u64, weight: usize) -> BigUint {
    if weight > n {
        return BigUint::zero();
    }
    (0..weight).fold(BigUint::from(1u8), |product, at| {
        product * (n - at) * (q - 1) / (at + 1)
    })
}

/// How many errors of a weight a corrector of up to `t` errors turns into a wrong word.
fn count(asked: &Asked, t: usize, weight: usize) -> Option<BigUint> {
    let code = asked.code();
    let weights = asked.court.session.weights_by(code, Effort::Full)?;
    let counts = wrongly_corrected(&weights.counts, code.length(), code.field().order(), t)?;
    let found = counts.into_iter().find(|&(at, _)| at == weight);
    Some(found.map(|(_, count)| count).unwrap_or_default())
}

/// A share in hundredths, to one digit behind the point, rounded up.
fn percent(part: &BigUint, whole: &BigUint) -> String {
    if whole.is_zero() {
        return "0".to_string();
    }
    let tenths = (part * 1000u32 + whole - 1u32) / whole;
    format!("{}.{}", &tenths / 10u32, &tenths % 10u32)
}

fn never(asked: &Asked, weight: usize) -> Result<Ruling, Stop> {
    let t = match radius(asked) {
        Ok(t) => t,
        Err(ruling) => return Ok(ruling),
    };
    let code = asked.code();
    let distance = asked.court.session.distance_by(code, Effort::Full);
    let d = distance.lower;
    if weight > code.length() || d > weight + t {
        return Ok(Ruling::new(Judgement::holds(format!(
            "d = {d} and t = {t}: an error in {weight} places lies more than {t} from every wrong word"
        ))));
    }
    // A word of weight d is met when it lies within t of the error's weight.
    if let Some(word) = distance.witness.as_ref().filter(|_| d + t >= weight) {
        return Ok(refuted(asked, word, weight, t, d));
    }
    Ok(Ruling::new(match count(asked, t, weight) {
        None if d + t >= weight => Judgement::fails(format!(
            "d = {d} and t = {t}: an error in {weight} places can lie within {t} of a word of weight {d}"
        )),
        None => Judgement::undecided("the weights are not known"),
        Some(count) if count.is_zero() => {
            Judgement::holds(format!("no word's weight lies within t = {t} of {weight}"))
        }
        Some(count) => Judgement::fails(format!(
            "{count} errors in {weight} places become a wrong word, with t = {t}"
        )),
    }))
}

/// An error of a weight near a lightest word, and what becomes of it.
fn refuted(asked: &Asked, word: &[Element], weight: usize, t: usize, d: usize) -> Ruling {
    let (mut positions, _) = support(word);
    let outside = (0..word.len()).filter(|&at| word[at] == 0);
    let missing = weight.saturating_sub(positions.len());
    let added: Vec<usize> = outside.take(missing).collect();
    let corrected: Vec<usize> = positions.split_off(weight.min(positions.len()));
    positions.extend(added.iter().copied());
    let wrong = if added.is_empty() { &corrected } else { &added };
    let says = if wrong.is_empty() {
        format!(
            "d = {d}: errors at {} turn a word into another",
            asked.named(&positions)
        )
    } else {
        format!(
            "d = {d}, t = {t}: errors at {} look like {} at {}, and are corrected there",
            asked.named(&positions),
            if wrong.len() == 1 { "one" } else { "those" },
            asked.named(wrong)
        )
    };
    let mut ruling = Ruling::new(Judgement::fails(says).witness(Some(word.to_vec())));
    ruling.needed = Some(weight + t + 1);
    ruling
}
