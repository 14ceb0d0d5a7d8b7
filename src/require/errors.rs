//! Random errors and losses: decided by the distance alone.

use super::{Asked, Court, Phrase, Ruling, interval, of_columns, phrases};
use crate::derive::{Effort, Judgement, support};
use crate::evaluate::{CompiledCode, Stop};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{ClauseKind, Condition, PhrasePart};
use crate::value::Value;
use num_traits::ToPrimitive;

/// The phrases of this file.
pub const PHRASES: &[Phrase] = &[
    Phrase {
        pattern: "corrects _",
        says: "Any N errors are corrected: 2N + 1 <= d.",
        decide: |asked| {
            let errors = asked.number(0)?;
            Ok(by_distance(
                asked,
                2 * errors + 1,
                &format!("2*{errors} + 1"),
                |asked, word| confusion(asked, word, errors),
            ))
        },
    },
    Phrase {
        pattern: "detects _",
        says: "Any N errors are detected: N + 1 <= d.",
        decide: |asked| {
            let errors = asked.number(0)?;
            Ok(by_distance(
                asked,
                errors + 1,
                &format!("{errors} + 1"),
                |asked, word| {
                    format!(
                        "errors at {} turn a word into another and go unseen",
                        asked.word_named(word)
                    )
                },
            ))
        },
    },
    Phrase {
        pattern: "corrects _ while detecting _",
        says: "Any N errors are corrected and, by the same decoder, any M are at least detected: N + M + 1 <= d, M >= N.",
        decide: while_detecting,
    },
    Phrase {
        pattern: "recovers _ losses",
        says: "Any N symbols lost at known places are recovered: N + 1 <= d.",
        decide: |asked| {
            let losses = asked.number(0)?;
            Ok(by_distance(
                asked,
                losses + 1,
                &format!("{losses} + 1"),
                |asked, word| {
                    format!(
                        "what is lost at {} cannot be recovered: a word lives there",
                        asked.word_named(word)
                    )
                },
            ))
        },
    },
    Phrase {
        pattern: "corrects _ with _ losses",
        says: "Any N errors are corrected beside any M losses at known places: 2N + M + 1 <= d.",
        decide: |asked| {
            let (errors, losses) = (asked.number(0)?, asked.number(1)?);
            let needed = 2 * errors + losses + 1;
            Ok(by_distance(
                asked,
                needed,
                &format!("2*{errors} + {losses} + 1"),
                |asked, word| {
                    let (positions, _) = support(word);
                    let (lost, rest) = positions.split_at(losses.min(positions.len()));
                    let (one, other) = rest.split_at(errors.min(rest.len()));
                    format!(
                        "with losses at {}, errors at {} look like errors at {}",
                        asked.named(lost),
                        named_or_none(asked, one),
                        named_or_none(asked, other)
                    )
                },
            ))
        },
    },
];

fn while_detecting(asked: &Asked) -> Result<Ruling, Stop> {
    let (corrected, detected) = (asked.number(0)?, asked.number(1)?);
    if detected < corrected {
        let mut ruling = Ruling::new(Judgement::fails(format!(
            "what is corrected is detected too, so the second number is at least the first: {detected} < {corrected}"
        )));
        ruling.help = Some(format!(
            "write `corrects {corrected} while detecting {corrected}`, or `corrects {corrected}`"
        ));
        return Ok(ruling);
    }
    let needed = corrected + detected + 1;
    let mut ruling = by_distance(
        asked,
        needed,
        &format!("{corrected} + {detected} + 1"),
        |asked, word| confusion(asked, word, detected),
    );
    let distance = asked.court.session.distance_by(asked.code(), Effort::Full);
    if let Some(d) = distance.exact().filter(|&d| d < needed) {
        ruling.help = Some(together(d));
    }
    Ok(ruling)
}

/// What a distance gives at once.
fn together(d: usize) -> String {
    let choices: Vec<String> = (0..=(d - 1) / 2)
        .rev()
        .map(|corrected| match (corrected, d - 1 - corrected) {
            (0, detected) => format!("detect {detected} and correct none"),
            (corrected, detected) if corrected == detected => format!("correct {corrected}"),
            (corrected, detected) => format!("correct {corrected} while detecting {detected}"),
        })
        .collect();
    format!("with d = {d} a decoder can {}", choices.join(", or "))
}

/// A number of errors, and where it is required.
type Stated = Option<(usize, Span)>;

/// `corrects N` and `detects M` as two requirements: each may hold alone while no decoder gives
/// both.
pub(super) fn not_at_once(court: &Court, compiled: &CompiledCode) -> Option<Finding> {
    let mut corrected: Stated = None;
    let mut detected: Stated = None;
    for clause in &court.evaluator.declaration_of(compiled).clauses {
        let ClauseKind::Requirement(requirement) = &clause.kind else {
            continue;
        };
        let Condition::Phrase(parts) = &requirement.condition else {
            continue;
        };
        let most = match phrases::pattern_of(parts).as_str() {
            "corrects _" => &mut corrected,
            "detects _" => &mut detected,
            _ => continue,
        };
        let Some(PhrasePart::Operand(operand)) = parts.last() else {
            continue;
        };
        let scope = compiled.scope.inside(&compiled.code);
        if let Ok(Value::Integer(number)) = court.evaluator.evaluate(operand, &scope)
            && let Some(number) = number.to_usize()
            && most.is_none_or(|(known, _)| known < number)
        {
            *most = Some((number, requirement.span));
        }
    }
    let ((corrected, first), (detected, second)) = (corrected?, detected?);
    let d = court
        .session
        .distance_by(&compiled.code, Effort::Small)
        .exact()?;
    let alone = 2 * corrected < d && detected < d;
    if !alone || detected <= corrected || corrected + detected < d {
        return None;
    }
    Some(
        Finding::new(
            catalogue::NOT_AT_ONCE,
            second,
            format!(
                "{}: a decoder that corrects {corrected} does not detect all {detected} errors as well",
                compiled.title()
            ),
        )
        .label(format!(
            "alone this holds; with the other it takes d >= {}, and d = {d}",
            corrected + detected + 1
        ))
        .related(first, "required here")
        .help(together(d)),
    )
}

/// Two sets of errors, the first of so many, that look alike.
fn confusion(asked: &Asked, word: &[u32], errors: usize) -> String {
    let (positions, _) = support(word);
    let (one, other) = positions.split_at(errors.min(positions.len()));
    if other.is_empty() {
        return format!(
            "errors at {} turn a word into another and go unseen",
            asked.named(one)
        );
    }
    format!(
        "errors at {} look like errors at {}",
        asked.named(one),
        asked.named(other)
    )
}

fn named_or_none(asked: &Asked, positions: &[usize]) -> String {
    if positions.is_empty() {
        "no place".to_string()
    } else {
        asked.named(positions)
    }
}

/// Holds when d reaches what is needed; fails, with a story about a light word, when it does not.
fn by_distance(
    asked: &Asked,
    needed: usize,
    formula: &str,
    story: impl Fn(&Asked, &[u32]) -> String,
) -> Ruling {
    let code = asked.code();
    if code.dimension() == 0 {
        return Ruling::new(Judgement::holds(
            "the code has only one word, so no error leads to another",
        ));
    }
    // What theorems settle needs no search.
    let mut distance = asked.court.session.distance_by(code, Effort::Theorems);
    if distance.lower < needed {
        distance = asked.court.session.distance_by(code, Effort::Full);
    }
    let shown = interval(&distance);
    if distance.lower >= needed {
        let known = if distance.exact().is_some() {
            format!("d = {shown}")
        } else {
            format!("d >= {}", distance.lower)
        };
        return Ruling::new(Judgement::holds(format!("{formula} = {needed} <= {known}")));
    }
    if distance.upper >= needed {
        return Ruling::new(Judgement::undecided(format!(
            "{formula} = {needed}, and d is only known to lie in {shown}"
        )));
    }
    let mut says = format!("d = {shown}, but {formula} = {needed} is needed");
    if let Some(word) = &distance.witness {
        says = format!("{says}: {}", story(asked, word));
        let named: Vec<String> = support(word)
            .0
            .iter()
            .map(|&at| asked.named(&[at]))
            .collect();
        if let Some(columns) = of_columns(&named, code.field().is_binary()) {
            says = format!("{says}; {columns}");
        }
    }
    let mut ruling = Ruling::new(Judgement::fails(says).witness(distance.witness));
    ruling.needed = Some(needed);
    ruling
}
