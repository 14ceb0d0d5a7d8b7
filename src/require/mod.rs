//! Claims and requirements: three verdicts, with witnesses in the spec's own positions, and the
//! step that lost what was needed.
//!
//! In: compiled codes and a session. Out: [`Judged`] clauses for reports, and findings for what
//! fails or stays open. One file a group of requirements, one line each in its register.

mod asked;
mod claims;
mod errors;
mod expressions;
mod layout;
mod limits;
mod miscorrection;
mod numbers;
mod patterns;
mod phrases;
mod promise;
mod relations;
mod storage;
mod structure;

pub use asked::{Asked, Ruling};
pub use phrases::{Phrase, phrases};

use crate::code::{Code, Distance};
use crate::derive::{
    Effort, Judgement, MEASURES, Session, SessionMeasures, Verdict, channel::FIGURES,
    channel::decimal, properties, support,
};
use crate::evaluate::{CompiledCode, Evaluator, Stop, position_names};
use crate::finding::{Code as FindingCode, Finding, Related, catalogue, near_names};
use crate::source::Span;
use crate::syntax::tree::{
    ClauseKind, Condition, Expression, ExpressionKind, PhrasePart, Requirement, Strength,
};
use crate::value::{Channel, Value};

/// What kind of clause was judged.
#[derive(Clone, Copy, PartialEq, Eq, Debug, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Kind {
    /// `is […]`
    Claim,
    /// `require …`
    Require,
    /// `prefer …`
    Prefer,
}

/// A clause and its verdict.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Judged {
    /// The clause's text.
    pub text: String,
    /// What kind of clause it is.
    pub kind: Kind,
    /// The verdict with its grounds.
    pub judgement: Judgement,
    /// Where it stands.
    pub span: Span,
}

/// The clauses of a code with their verdicts, and the findings they raise.
#[derive(Clone, PartialEq, Eq, Debug, Default)]
pub struct Verdicts {
    /// In the order of the spec.
    pub clauses: Vec<Judged>,
    /// What fails, is undecided, or cannot be understood.
    pub findings: Vec<Finding>,
}

/// What a requirement is judged by.
pub struct Court<'a> {
    /// Evaluates operands.
    pub evaluator: &'a Evaluator<'a>,
    /// Derives.
    pub session: &'a Session<'a>,
    /// Answers expressions.
    pub measures: &'a SessionMeasures<'a>,
}

/// The names that expressions about a code may use.
pub fn quantities() -> Vec<&'static str> {
    MEASURES
        .iter()
        .map(|&(name, _)| name)
        .chain(properties::PROPERTIES.iter().map(|property| property.name))
        .collect()
}

/// The channels that a code's requirements name, as written, each once.
pub fn channels(evaluator: &Evaluator, compiled: &CompiledCode) -> Vec<(String, Channel)> {
    let mut found: Vec<(String, Channel)> = Vec::new();
    let scope = compiled.scope.about(&compiled.code, Vec::new());
    for clause in &evaluator.declaration_of(compiled).clauses {
        let ClauseKind::Requirement(requirement) = &clause.kind else {
            continue;
        };
        let Condition::Expression(expression) = &requirement.condition else {
            continue;
        };
        let sides: Vec<&Expression> = match &expression.kind {
            ExpressionKind::Binary(_, left, right) => vec![left, right],
            _ => vec![expression],
        };
        for side in sides {
            let ExpressionKind::Call {
                function,
                arguments,
            } = &side.kind
            else {
                continue;
            };
            if let ([argument], true) = (
                arguments.as_slice(),
                FIGURES.contains(&function.text.as_str()),
            ) && let Ok(Value::Channel(channel)) = evaluator.evaluate(&argument.value, &scope)
                && !found.iter().any(|(_, known)| *known == channel)
            {
                found.push((evaluator.text(argument.value.span), channel));
            }
        }
    }
    found
}

impl Court<'_> {
    /// Judges every clause of a code.
    pub fn judge(&self, compiled: &CompiledCode) -> Verdicts {
        let mut verdicts = Verdicts::default();
        for clause in &self.evaluator.declaration_of(compiled).clauses {
            match &clause.kind {
                ClauseKind::Claim(claim) => {
                    self.judge_claim(compiled, claim, clause.span, &mut verdicts)
                }
                ClauseKind::Requirement(requirement) => {
                    self.judge_requirement(compiled, requirement, &mut verdicts);
                }
                ClauseKind::Bits(_) | ClauseKind::Note(_) => {}
            }
        }
        verdicts
            .findings
            .extend(errors::not_at_once(self, compiled));
        verdicts
    }

    fn judge_requirement(
        &self,
        compiled: &CompiledCode,
        requirement: &Requirement,
        verdicts: &mut Verdicts,
    ) {
        let decided = match &requirement.condition {
            Condition::Phrase(parts) => self.phrase(compiled, parts, requirement),
            Condition::Expression(expression) => self.expression(compiled, expression),
        };
        let ruling = match decided {
            Ok(ruling) => ruling,
            Err(Stop::Finding(finding)) => {
                verdicts.findings.push(*finding);
                return;
            }
            Err(Stop::Reported) => return,
            Err(Stop::Unsettled { name, lower, upper }) => Ruling::new(Judgement::undecided(
                format!("{name} is only known to lie in {lower}..{upper}"),
            )),
            Err(Stop::Enclosed { name, ends }) => Ruling::new(Judgement::undecided(format!(
                "{name} is only known to lie between {} and {}",
                decimal(&ends.0, false),
                decimal(&ends.1, true)
            ))),
        };
        if let Some(finding) = self.finding(compiled, requirement, &ruling) {
            verdicts.findings.push(finding);
        }
        verdicts.clauses.push(Judged {
            text: requirement.text.clone(),
            kind: match requirement.strength {
                Strength::Require => Kind::Require,
                Strength::Prefer => Kind::Prefer,
            },
            judgement: ruling.judgement,
            span: requirement.span,
        });
    }

    fn phrase(
        &self,
        compiled: &CompiledCode,
        parts: &[PhrasePart],
        requirement: &Requirement,
    ) -> Result<Ruling, Stop> {
        let pattern = phrases::pattern_of(parts);
        let Some(phrase) = phrases().find(|phrase| phrase.pattern == pattern) else {
            return Err(Stop::Finding(Box::new(unknown_phrase(
                &pattern,
                requirement.span,
            ))));
        };
        let mut operands = Vec::new();
        for part in parts {
            if let PhrasePart::Operand(expression) = part {
                let scope = compiled.scope.inside(&compiled.code);
                let value = match layout::operand(self.evaluator, compiled, expression) {
                    Some(groups) => groups?,
                    None => self.evaluator.evaluate(expression, &scope)?,
                };
                operands.push((value, expression.span));
            }
        }
        (phrase.decide)(&Asked {
            court: self,
            compiled,
            operands,
            span: requirement.span,
        })
    }

    fn finding(
        &self,
        compiled: &CompiledCode,
        requirement: &Requirement,
        ruling: &Ruling,
    ) -> Option<Finding> {
        let (code, verb) = match (ruling.judgement.verdict, requirement.strength) {
            (Verdict::Holds, _) => return None,
            (Verdict::Fails, Strength::Require) => {
                (catalogue::REQUIREMENT_FAILS, "is required, but fails")
            }
            (Verdict::Fails, Strength::Prefer) => {
                (catalogue::PREFERENCE_FAILS, "is preferred, but fails")
            }
            (Verdict::Undecided, Strength::Require) => (
                catalogue::REQUIREMENT_UNDECIDED,
                "is required, but undecided",
            ),
            (Verdict::Undecided, Strength::Prefer) => (
                catalogue::PREFERENCE_UNDECIDED,
                "is preferred, but undecided",
            ),
        };
        let message = format!("{}: `{}` {verb}", compiled.title(), requirement.text);
        let mut label = ruling.judgement.says.clone();
        if let (None, Some(word)) = (ruling.needed, &ruling.judgement.witness) {
            // Grounds that name positions themselves need no second list.
            if !label.contains("(position ") && !label.contains(" position ") {
                let shown = name_places(compiled, word);
                label = format!("{label}, as the word on {shown} shows");
            }
        }
        let mut finding = Finding::new(code, requirement.span, message).label(label);
        finding.help = ruling.help.clone();
        if let Some(needed) = ruling.needed {
            finding.related.extend(self.blame(&compiled.code, needed));
        }
        if ruling.judgement.verdict == Verdict::Undecided && finding.help.is_none() {
            finding.help = Some("give a larger --budget".to_string());
        }
        Some(finding)
    }

    /// The step at which the distance fell below what is needed.
    pub(crate) fn blame(&self, code: &Code, needed: usize) -> Option<Related> {
        let trail = code.trail();
        let distances: Vec<Distance> = trail
            .iter()
            .enumerate()
            .map(|(at, step)| {
                let effort = if at + 1 == trail.len() {
                    Effort::Full
                } else {
                    Effort::Small
                };
                self.session.distance_by(step, effort)
            })
            .collect();
        let short = |at: usize| distances[at].upper < needed && distances[at].lower > 0;
        // An early step may fall short and a later one make up for it: the last fall counts.
        let at = (0..trail.len()).rev().take_while(|&at| short(at)).last()?;
        let span = trail[at].origin().span;
        let now = interval(&distances[at]);
        let message = if at == 0 {
            format!("d is {now} from the start: `{}`", trail[0].origin().text)
        } else if distances[at - 1].lower >= needed {
            format!("d fell from {} to {now} here", interval(&distances[at - 1]))
        } else {
            format!("d is {now} from here on")
        };
        Some(Related { message, span })
    }
}

/// The places of a word by name, the first dozen of them.
fn name_places(compiled: &CompiledCode, word: &[u32]) -> String {
    let (positions, _) = support(word);
    let shown = &positions[..positions.len().min(12)];
    let mut text = position_names(compiled.position_names.as_deref(), shown).join(", ");
    if shown.len() < positions.len() {
        text.push_str(", …");
    }
    text
}

/// A distance as text: `4`, or `4..6`.
pub fn interval(distance: &Distance) -> String {
    match distance.exact() {
        Some(exact) => exact.to_string(),
        None => format!("{}..{}", distance.lower, distance.upper),
    }
}

/// What two or fewer columns of a check matrix make of a word that lives there.
pub(crate) fn of_columns(named: &[String], binary: bool) -> Option<String> {
    match named {
        [one] => Some(format!("the column of {one} is zero: no check sees it")),
        [one, other] if binary => Some(format!(
            "the columns of {one} and {other} are equal: no check tells them apart"
        )),
        [one, other] => Some(format!(
            "the columns of {one} and {other} are multiples of each other"
        )),
        _ => None,
    }
}

/// A pattern with `N` for each operand.
fn readable(pattern: &str) -> String {
    let words: Vec<&str> = pattern
        .split(' ')
        .map(|word| if word == "_" { "N" } else { word })
        .collect();
    words.join(" ")
}

fn unknown_phrase(pattern: &str, span: Span) -> Finding {
    let known: Vec<&str> = phrases().map(|phrase| phrase.pattern).collect();
    let shown = readable(pattern);
    let finding = Finding::new(
        catalogue::UNKNOWN_REQUIREMENT,
        span,
        format!("no requirement reads `{shown}`"),
    );
    let first = pattern.split(' ').next().unwrap_or("");
    let mut near = near_names(pattern, known.iter().copied());
    if near.is_empty() {
        near = known
            .iter()
            .copied()
            .filter(|known| known.split(' ').next() == Some(first))
            .collect();
    }
    if near.is_empty() {
        return finding.help("the requirements are listed by `cosetta explain requirements`");
    }
    let near: Vec<String> = near
        .iter()
        .map(|near| format!("`{}`", readable(near)))
        .collect();
    finding.help(format!("did you mean {}?", near.join(", or ")))
}

/// The finding code of a refuted or undecided claim.
pub(crate) fn claim_code(verdict: Verdict, refuted: FindingCode) -> FindingCode {
    match verdict {
        Verdict::Undecided => catalogue::CLAIM_UNDECIDED,
        _ => refuted,
    }
}
