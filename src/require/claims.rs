//! `is [n, k, d] with weights {…}`.

use super::{Court, Judged, Kind, Verdicts, claim_code, interval};
use crate::derive::{Effort, Judgement, Verdict, support};
use crate::evaluate::{Claimed, CompiledCode, Expected, position_names};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{BinaryOperator, Claim};
use num_bigint::BigUint;
use num_traits::ToPrimitive;
use std::collections::BTreeMap;

impl Court<'_> {
    pub(super) fn judge_claim(
        &self,
        compiled: &CompiledCode,
        claim: &Claim,
        span: Span,
        verdicts: &mut Verdicts,
    ) {
        let claimed = match self.evaluator.claimed(claim, compiled) {
            Ok(claimed) => claimed,
            Err(stop) => {
                self.evaluator.give_up(stop, span);
                return;
            }
        };
        let mut judgements = vec![
            self.size_claim(compiled, &claimed.length, "n", verdicts),
            self.size_claim(compiled, &claimed.dimension, "k", verdicts),
        ];
        if let Some(expected) = &claimed.distance {
            judgements.push(self.distance_claim(compiled, expected, verdicts));
        }
        if let Some((place, counts)) = &claimed.weights {
            judgements.push(self.weights_claim(compiled, *place, counts, verdicts));
        }
        verdicts.clauses.push(Judged {
            text: text(&claimed),
            kind: Kind::Claim,
            judgement: combined(judgements),
            span,
        });
    }

    fn size_claim(
        &self,
        compiled: &CompiledCode,
        expected: &Expected,
        which: &str,
        verdicts: &mut Verdicts,
    ) -> Judgement {
        let code = &compiled.code;
        let (actual, finding_code, grounds) = match which {
            "n" => (code.length(), catalogue::CLAIM_LENGTH, "positions"),
            _ => (
                code.dimension(),
                catalogue::CLAIM_DIMENSION,
                "n minus the rank of the checks",
            ),
        };
        if expected.holds(actual) {
            return Judgement::holds(format!("{which} = {actual}"));
        }
        let message = format!(
            "{} is claimed to have {which} {}, but {which} = {actual}",
            compiled.title(),
            relation(expected)
        );
        let mut finding = Finding::new(finding_code, expected.span, message)
            .label(format!("{which} is {actual}: {grounds}"))
            .help(format!("write {actual} here if that is what is meant"));
        // The first step after which the number is the one found, seen from the end.
        if let Some(step) = code.trail().iter().find(|step| match which {
            "n" => step.length() == actual,
            _ => step.dimension() == actual && step.length() == code.length(),
        }) {
            finding = finding.related(
                step.origin().span,
                format!("[{}, {}] here", step.length(), step.dimension()),
            );
        }
        verdicts.findings.push(finding);
        Judgement::fails(format!("{which} = {actual}"))
    }

    fn distance_claim(
        &self,
        compiled: &CompiledCode,
        expected: &Expected,
        verdicts: &mut Verdicts,
    ) -> Judgement {
        let Some((operator, wanted)) = &expected.says else {
            return Judgement::holds("d is left open");
        };
        if compiled.code.dimension() == 0 {
            let message = format!(
                "{} holds only the zero word, so it has no distance",
                compiled.title()
            );
            let finding = Finding::new(catalogue::CLAIM_DISTANCE, expected.span, message)
                .help("write `_` for d");
            verdicts.findings.push(finding);
            return Judgement::fails("the zero code has no distance");
        }
        let distance = self.session.distance_by(&compiled.code, Effort::Full);
        let shown = interval(&distance);
        let verdict = interval_verdict(*operator, clamped(wanted), distance.lower, distance.upper);
        let judgement = match verdict {
            Verdict::Holds => {
                return Judgement::holds(format!("d = {shown}")).witness(distance.witness);
            }
            Verdict::Fails => {
                Judgement::fails(format!("d = {shown}")).witness(distance.witness.clone())
            }
            Verdict::Undecided => Judgement::undecided(format!("d lies in {shown}")),
        };
        let message = match verdict {
            Verdict::Fails => format!(
                "{} is claimed to have d {}, but {}",
                compiled.title(),
                relation(expected),
                if distance.exact().is_some() {
                    format!("d = {shown}")
                } else {
                    format!("d lies in {shown}")
                }
            ),
            _ => format!(
                "{} is claimed to have d {}; d is only known to lie in {shown}",
                compiled.title(),
                relation(expected)
            ),
        };
        let mut finding = Finding::new(
            claim_code(verdict, catalogue::CLAIM_DISTANCE),
            expected.span,
            message,
        );
        let too_low = wanted
            .to_usize()
            .is_some_and(|wanted| distance.upper < wanted);
        if verdict == Verdict::Fails {
            let claim = match distance.exact() {
                Some(exact) => exact.to_string(),
                None => format!("`>= {}`", distance.lower),
            };
            finding = finding.help(format!("write {claim} here if that is what is meant"));
            match distance.witness.as_ref().filter(|_| too_low) {
                Some(word) => {
                    let (positions, values) = support(word);
                    let named =
                        position_names(compiled.position_names.as_deref(), &positions).join(", ");
                    let mut label = format!("a word of weight {}: {named}", positions.len());
                    if values.iter().any(|&value| value != 1) {
                        label = format!("{label}, with values {values:?}");
                    }
                    finding = finding.label(label);
                }
                None => {
                    let ground = distance.grounds.first().map(|bound| bound.says.clone());
                    finding = finding.label(ground.unwrap_or_default());
                }
            }
            if too_low {
                finding
                    .related
                    .extend(self.blame(&compiled.code, wanted.to_usize().unwrap_or(0)));
            }
        } else {
            let grounds: Vec<&str> = distance
                .grounds
                .iter()
                .map(|bound| bound.says.as_str())
                .collect();
            finding = finding.label(format!("d lies in {shown}")).help(format!(
                "known so far: {}; a larger --budget may decide",
                grounds.join("; ")
            ));
        }
        verdicts.findings.push(finding);
        judgement
    }

    fn weights_claim(
        &self,
        compiled: &CompiledCode,
        span: Span,
        claimed: &BTreeMap<usize, BigUint>,
        verdicts: &mut Verdicts,
    ) -> Judgement {
        let Some(weights) = self.session.weights_by(&compiled.code, Effort::Full) else {
            let message = format!(
                "the weights of {} could not be derived within the budget",
                compiled.title()
            );
            let finding = Finding::new(catalogue::CLAIM_UNDECIDED, span, message)
                .help("give a larger --budget");
            verdicts.findings.push(finding);
            return Judgement::undecided("the weights are not known");
        };
        let zero = BigUint::default();
        let differing = claimed
            .keys()
            .chain(weights.counts.keys())
            .copied()
            .filter(|weight| {
                claimed.get(weight).unwrap_or(&zero) != weights.counts.get(weight).unwrap_or(&zero)
            })
            .min();
        let Some(weight) = differing else {
            return Judgement::holds(format!("weights agree: {}", weights.says));
        };
        let actual = weights.counts.get(&weight).unwrap_or(&zero);
        let stated = claimed.get(&weight).unwrap_or(&zero);
        let message = format!(
            "{} is claimed to have {stated} words of weight {weight}, but has {actual}",
            compiled.title()
        );
        let shown: Vec<String> = weights
            .counts
            .iter()
            .take(12)
            .map(|(weight, count)| format!("{weight}: {count}"))
            .collect();
        let more = if weights.counts.len() > 12 {
            ", …"
        } else {
            ""
        };
        let finding = Finding::new(catalogue::CLAIM_WEIGHTS, span, message)
            .label(weights.says.clone())
            .help(format!("the weights are {{{}{more}}}", shown.join(", ")));
        verdicts.findings.push(finding);
        Judgement::fails(format!("there are {actual} words of weight {weight}"))
    }
}

fn relation(expected: &Expected) -> String {
    match &expected.says {
        Some((BinaryOperator::Equal, wanted)) => format!("= {wanted}"),
        _ => expected.text(),
    }
}

/// A number as wide as any distance; what lies beyond stays beyond.
fn clamped(number: &num_bigint::BigInt) -> i64 {
    let beyond = if number.sign() == num_bigint::Sign::Minus {
        i64::MIN
    } else {
        i64::MAX
    };
    number.to_i64().unwrap_or(beyond)
}

/// Whether a comparison holds for all, none, or some of an interval.
fn interval_verdict(operator: BinaryOperator, wanted: i64, lower: usize, upper: usize) -> Verdict {
    let (lower, upper) = (lower as i64, upper as i64);
    let (all, none) = match operator {
        BinaryOperator::Equal => (
            lower == wanted && upper == wanted,
            wanted < lower || wanted > upper,
        ),
        BinaryOperator::Unequal => (
            wanted < lower || wanted > upper,
            lower == wanted && upper == wanted,
        ),
        BinaryOperator::Less => (upper < wanted, lower >= wanted),
        BinaryOperator::AtMost => (upper <= wanted, lower > wanted),
        BinaryOperator::Greater => (lower > wanted, upper <= wanted),
        _ => (lower >= wanted, upper < wanted),
    };
    match (all, none) {
        (true, _) => Verdict::Holds,
        (_, true) => Verdict::Fails,
        _ => Verdict::Undecided,
    }
}

/// `[72, 64, 4]` as claimed, without the word that introduces it.
fn text(claimed: &Claimed) -> String {
    let mut entries = vec![claimed.length.text(), claimed.dimension.text()];
    entries.extend(claimed.distance.as_ref().map(Expected::text));
    let mut text = format!("[{}]", entries.join(", "));
    if claimed.weights.is_some() {
        text.push_str(" with weights");
    }
    text
}

/// All judgements of a claim as one: refuted if one is, else undecided if one is.
fn combined(judgements: Vec<Judgement>) -> Judgement {
    let verdict = if judgements
        .iter()
        .any(|judgement| judgement.verdict == Verdict::Fails)
    {
        Verdict::Fails
    } else if judgements
        .iter()
        .any(|judgement| judgement.verdict == Verdict::Undecided)
    {
        Verdict::Undecided
    } else {
        Verdict::Holds
    };
    let says: Vec<&str> = judgements
        .iter()
        .map(|judgement| judgement.says.as_str())
        .collect();
    let witness = judgements
        .iter()
        .find_map(|judgement| judgement.witness.clone());
    Judgement {
        verdict,
        says: says.join(", "),
        witness,
    }
}
