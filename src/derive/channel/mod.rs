//! Figures on a channel: how likely a word goes wrong, is corrected wrongly, or is lost.
//!
//! In: a code, what is known of its distance and weights, a channel. Out: a probability as an
//! exact fraction or enclosed between two, never a rounded number without its side. Where the
//! weights are not known, the two ends are bounds that the distance gives.

mod enclosure;
mod losses;
mod patterns;
mod probability;

pub use patterns::wrongly_corrected;
pub use probability::{Noise, Probability, decimal};

use super::{Effort, Session};
use crate::code::Code;
use crate::finding::catalogue;
use crate::value::{Channel, Trouble};
use num_bigint::BigUint;

/// A figure with its grounds.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Figure {
    /// The probability.
    pub value: Probability,
    /// How it was computed.
    pub says: String,
}

/// The names of the figures.
pub const FIGURES: &[&str] = &["undetected", "failure", "miscorrection", "loss"];

/// The figure of that name, after looking for the distance as hard as said; `None` when there is
/// none.
///
/// # Errors
/// When the channel is of the other kind, or the code has no distance.
pub fn figure(
    session: &Session,
    code: &Code,
    name: &str,
    channel: &Channel,
    effort: Effort,
) -> Option<Result<Figure, Trouble>> {
    FIGURES.iter().find(|known| **known == name)?;
    if code.dimension() == 0 {
        return Some(Err(Trouble::new(
            catalogue::BAD_NUMBER,
            "the code holds only the zero word, so nothing is sent",
        )));
    }
    Some(match (name, channel) {
        ("loss", Channel::Erasure(rate)) => {
            let noise = Noise::new(code.length(), rate, 1);
            Ok(losses::loss(session, code, &noise))
        }
        ("loss", Channel::Symmetric(_)) => Err(Trouble::new(
            catalogue::BAD_ARGUMENT,
            "`loss` is asked of a channel that loses symbols at known places",
        )
        .help("declare one with `bec(rate)`, or ask for `failure(channel)`")),
        (_, Channel::Erasure(_)) => Err(Trouble::new(
            catalogue::BAD_ARGUMENT,
            format!("`{name}` is asked of a channel that changes symbols"),
        )
        .help("declare one with `bsc(rate)`, or ask for `loss(channel)`")),
        (_, Channel::Symmetric(rate)) => {
            let noise = Noise::new(code.length(), rate, code.field().order() - 1);
            Ok(match name {
                "undetected" => undetected(session, code, &noise, effort),
                "failure" => failure(session, code, &noise, effort),
                _ => miscorrection(session, code, &noise, effort),
            })
        }
    })
}

/// Every figure that makes sense on a channel, by name: for reports.
pub fn figures(session: &Session, code: &Code, channel: &Channel) -> Vec<(&'static str, Figure)> {
    FIGURES
        .iter()
        .filter_map(|&name| {
            let figure = figure(session, code, name, channel, Effort::Full)?.ok()?;
            Some((name, figure))
        })
        .collect()
}

fn undetected(session: &Session, code: &Code, noise: &Noise, effort: Effort) -> Figure {
    if let Some(weights) = session.weights_by(code, Effort::Full) {
        let counts: Vec<(usize, BigUint)> = weights
            .counts
            .into_iter()
            .filter(|&(weight, _)| weight > 0)
            .collect();
        return Figure {
            value: noise.of_patterns(&counts),
            says: format!("summed over the weights ({})", weights.says),
        };
    }
    let distance = session.distance_by(code, effort);
    let tail = noise.more_than(distance.lower - 1);
    // A word and its multiples.
    let multiples = BigUint::from(code.field().order() - 1);
    let lightest = noise.of_patterns(&[(distance.upper, multiples)]);
    let (value, floor) = match distance.exact() {
        Some(d) => (
            Probability::between(&lightest, &tail),
            format!("a word of weight {d} and its multiples"),
        ),
        None => (
            Probability::between(&noise.of_patterns(&[]), &tail),
            "nothing".to_string(),
        ),
    };
    Figure {
        value,
        says: format!(
            "the weights are not known: at least {floor}, at most all errors in {} places or more",
            distance.lower
        ),
    }
}

fn failure(session: &Session, code: &Code, noise: &Noise, effort: Effort) -> Figure {
    let distance = session.distance_by(code, effort);
    let (least, most) = ((distance.lower - 1) / 2, (distance.upper - 1) / 2);
    let n = code.length();
    if least == most {
        return Figure {
            value: noise.more_than(least),
            says: format!("more than t = {least} of {n} symbols change"),
        };
    }
    Figure {
        value: Probability::between(&noise.more_than(most), &noise.more_than(least)),
        says: format!(
            "more than t of {n} symbols change; d lies in {}..{}, so t in {least}..{most}",
            distance.lower, distance.upper
        ),
    }
}

fn miscorrection(session: &Session, code: &Code, noise: &Noise, effort: Effort) -> Figure {
    let weights = session.weights_by(code, Effort::Full);
    let distance = session.distance_by(code, effort);
    if let (Some(weights), Some(d)) = (weights, distance.exact())
        && let Some(counts) = wrongly_corrected(
            &weights.counts,
            code.length(),
            code.field().order(),
            (d - 1) / 2,
        )
    {
        return Figure {
            value: noise.of_patterns(&counts),
            says: format!(
                "errors within t = {} of another word, counted from the weights ({})",
                (d - 1) / 2,
                weights.says
            ),
        };
    }
    Figure {
        value: Probability::between(
            &noise.of_patterns(&[]),
            &noise.more_than((distance.lower - 1) / 2),
        ),
        says: format!(
            "the weights are not known: at most all errors in more than {} places",
            (distance.lower - 1) / 2
        ),
    }
}
