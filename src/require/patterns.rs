//! Errors of a certain shape: bursts, neighbours, groups, stuck lines. Decided by the check matrix
//! at the places where such errors lie, not by the distance.

use super::layout::{self, Groups};
use super::{Asked, Phrase, Ruling};
use crate::derive::patterns::{self, Tested};
use crate::derive::{Judgement, Verdict, support};
use crate::evaluate::Stop;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[
    Phrase {
        pattern: "detects bursts of _",
        says: "Any error confined to N positions in a row is detected: no word but zero lives in such a window.",
        decide: |asked| bursts(asked, false, 1),
    },
    Phrase {
        pattern: "corrects bursts of _",
        says: "Any error confined to N positions in a row is corrected: no word but zero lives in two such windows together.",
        decide: |asked| bursts(asked, false, 2),
    },
    Phrase {
        pattern: "detects cyclic bursts of _",
        says: "Like `detects bursts of N`, the first position following the last.",
        decide: |asked| bursts(asked, true, 1),
    },
    Phrase {
        pattern: "corrects cyclic bursts of _",
        says: "Like `corrects bursts of N`, the first position following the last.",
        decide: |asked| bursts(asked, true, 2),
    },
    Phrase {
        pattern: "detects adjacent _",
        says: "Any error confined to N neighbouring positions is detected.",
        decide: |asked| bursts(asked, false, 1),
    },
    Phrase {
        pattern: "corrects adjacent _",
        says: "Any error confined to N neighbouring positions, in the order of the code's positions, is corrected.",
        decide: |asked| bursts(asked, false, 2),
    },
    Phrase {
        pattern: "detects odd errors",
        says: "Any error in an odd number of positions is detected: no word has an odd weight.",
        decide: odd_errors,
    },
    Phrase {
        pattern: "detects all_zeros",
        says: "The word of zeros, as a stuck bus gives it, is no word as sent: a mask counts.",
        decide: |asked| {
            if asked.code().offset().is_some() {
                return Ok(stuck(asked, 0));
            }
            let mut ruling = Ruling::new(Judgement::fails(
                "the word of zeros is a word of every linear code",
            ));
            ruling.help = Some(
                "a fixed word added on the wire makes the bus at rest no codeword; the code itself, a linear space, always has it".into(),
            );
            Ok(ruling)
        },
    },
    Phrase {
        pattern: "detects all_ones",
        says: "The word with every bit of every symbol set, as a stuck bus gives it, is no word as sent: a mask counts.",
        decide: |asked| Ok(stuck(asked, asked.code().field().order() as u32 - 1)),
    },
    Phrase {
        pattern: "detects _ groups of _",
        says: "Any error confined to N of the groups (named, or runs of so many positions) is detected.",
        decide: |asked| groups(asked, Some(1), Use::Detects),
    },
    Phrase {
        pattern: "detects _ groups",
        says: "Any error confined to N of the groups that `bits` names is detected.",
        decide: |asked| groups(asked, None, Use::Detects),
    },
    Phrase {
        pattern: "corrects _ groups of _",
        says: "Any error confined to N of the groups (named, or runs of so many positions) is corrected.",
        decide: |asked| groups(asked, Some(1), Use::Corrects),
    },
    Phrase {
        pattern: "corrects _ groups",
        says: "Any error confined to N of the groups that `bits` names is corrected.",
        decide: |asked| groups(asked, None, Use::Corrects),
    },
    Phrase {
        pattern: "recovers _ groups of _",
        says: "Whatever is lost in any N of the groups (named, or runs of so many positions) is recovered.",
        decide: |asked| groups(asked, Some(1), Use::Recovers),
    },
    Phrase {
        pattern: "recovers _ groups",
        says: "Whatever is lost in any N of the groups that `bits` names is recovered.",
        decide: |asked| groups(asked, None, Use::Recovers),
    },
    Phrase {
        pattern: "recovers any _ of _",
        says: "Whatever is lost in any N of the named groups is recovered.",
        decide: |asked| groups(asked, Some(1), Use::Recovers),
    },
];

fn too_much(what: &str) -> Ruling {
    let mut ruling = Ruling::new(Judgement::undecided(format!(
        "there are too many {what} to test"
    )));
    ruling.help = Some("shorten the code, or ask for less".into());
    ruling
}

fn bursts(asked: &Asked, wrap: bool, at_once: usize) -> Result<Ruling, Stop> {
    let span = asked.number(0)?;
    let (code, session) = (asked.code(), asked.court.session);
    let n = code.length();
    if code.dimension() == 0 {
        return Ok(Ruling::new(Judgement::holds(
            "the code has only one word, so no error leads to another",
        )));
    }
    let together = if at_once == 1 {
        "each window"
    } else {
        "any two windows"
    };
    Ok(
        match patterns::test_bursts(session, code, span, wrap, at_once) {
            Tested::Independent => Ruling::new(Judgement::holds(format!(
                "the checks at {together} of {span} neighbouring positions are independent"
            ))),
            Tested::TooMuch => too_much("windows"),
            Tested::Dependent { sets, word } => {
                let first = &patterns::windows(n, span, wrap)[sets[0]];
                let mut ruling = Ruling::new(
                    Judgement::fails(story(asked, &word, first, at_once)).witness(Some(word)),
                );
                ruling.help = limit_help(asked, wrap, at_once);
                ruling
            }
        },
    )
}

/// The word as one error that goes unseen, or as two that look alike, the first inside a set.
fn story(asked: &Asked, word: &[u32], first: &[usize], at_once: usize) -> String {
    let (positions, _) = support(word);
    let (one, other): (Vec<usize>, Vec<usize>) = positions
        .iter()
        .partition(|position| first.contains(position));
    if at_once == 1 || one.is_empty() || other.is_empty() {
        return format!(
            "{} at {} turn a word into another and go unseen{}",
            if positions.len() == 1 {
                "an error"
            } else {
                "errors"
            },
            asked.named(&positions),
            values(word)
        );
    }
    format!(
        "errors at {} look like errors at {}{}",
        asked.named(&one),
        asked.named(&other),
        values(word)
    )
}

/// The values of a word that is not all ones where it is not zero.
fn values(word: &[u32]) -> String {
    let (_, values) = support(word);
    if values.iter().all(|&value| value == 1) {
        String::new()
    } else {
        format!(": the word has values {values:?} there")
    }
}

/// What span would be in order.
fn limit_help(asked: &Asked, wrap: bool, at_once: usize) -> Option<String> {
    let (session, code) = (asked.court.session, asked.code());
    let (verb, (lower, upper)) = if at_once == 1 {
        ("detected", patterns::burst_detection(session, code, wrap))
    } else {
        ("corrected", patterns::burst_correction(session, code, wrap))
    };
    let kind = if wrap { "cyclic bursts" } else { "bursts" };
    (lower == upper).then(|| match lower {
        0 => format!("no {kind} of any span are all {verb}"),
        _ => format!("{kind} of span up to {lower} are all {verb}"),
    })
}

fn odd_errors(asked: &Asked) -> Result<Ruling, Stop> {
    let judgement = patterns::detects_odd(asked.court.session, asked.code());
    Ok(Ruling::new(match (judgement.verdict, &judgement.witness) {
        (Verdict::Fails, Some(word)) => {
            let says = format!("errors at {} go unseen", asked.word_named(word));
            Judgement { says, ..judgement }
        }
        _ => judgement,
    }))
}

/// Whether a bus that is stuck at one symbol gives no word: what is sent is a word of the code with
/// the fixed word of `mask` added, if there is one.
fn stuck(asked: &Asked, symbol: u32) -> Ruling {
    let code = asked.code();
    let field = code.field();
    let mut word = vec![symbol; code.length()];
    let masked = code.offset().is_some();
    for (entry, &offset) in word.iter_mut().zip(code.offset().unwrap_or(&[])) {
        *entry = field.sub(*entry, offset);
    }
    let without = if masked {
        ", the fixed word taken off,"
    } else {
        ""
    };
    if code.contains(&word) {
        let judgement = Judgement::fails(format!("it{without} passes all checks"));
        return Ruling::new(if masked {
            judgement
        } else {
            judgement.witness(Some(word))
        });
    }
    let symptoms = code.check_matrix().times(&word);
    let failed = symptoms.iter().filter(|&&entry| entry != 0).count();
    Ruling::new(Judgement::holds(format!(
        "it{without} fails {failed} of {} checks",
        symptoms.len()
    )))
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum Use {
    Detects,
    Corrects,
    Recovers,
}

fn groups(asked: &Asked, operand: Option<usize>, how: Use) -> Result<Ruling, Stop> {
    let count = asked.number(0)?;
    let Groups { names, sets } = layout::groups(asked, operand)?;
    let at_once = match how {
        Use::Corrects => count.saturating_mul(2),
        Use::Detects | Use::Recovers => count,
    };
    Ok(
        match patterns::test_unions(asked.code(), &sets, at_once, false) {
            Tested::Independent => Ruling::new(Judgement::holds(format!(
                "the checks at any {} of the {} groups are independent",
                at_once.min(sets.len()),
                sets.len()
            ))),
            Tested::TooMuch => too_much("choices of groups"),
            Tested::Dependent { sets: found, word } => {
                let says = match how {
                    Use::Recovers => format!(
                        "what is lost in {} cannot be recovered: a word lives at {}{}",
                        listed(&names, &found),
                        asked.word_named(&word),
                        values(&word)
                    ),
                    Use::Detects => format!(
                        "errors in {} go unseen: a word lives at {}{}",
                        listed(&names, &found),
                        asked.word_named(&word),
                        values(&word)
                    ),
                    Use::Corrects => {
                        let (one, _) = found.split_at(count.min(found.len()));
                        let first: Vec<usize> = one
                            .iter()
                            .flat_map(|&at| sets[at].iter().copied())
                            .collect();
                        story(asked, &word, &first, 2)
                    }
                };
                Ruling::new(Judgement::fails(says).witness(Some(word)))
            }
        },
    )
}

fn listed(names: &[String], found: &[usize]) -> String {
    let named: Vec<&str> = found.iter().map(|&at| names[at].as_str()).collect();
    named.join(" and ")
}
