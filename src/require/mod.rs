//! Claims and requirements: three verdicts, with witnesses in the spec's own positions, and the
//! step that lost what was needed.
//!
//! In: compiled codes and a session. Out: [`Judged`] clauses for reports, and findings for what
//! fails or stays open. One file a group of requirements, one line each in its register.

mod claims;
mod errors;
mod phrases;
mod relations;
mod structure;

pub use phrases::{Phrase, phrases};

use crate::code::{Code, Distance};
use crate::derive::{
    Effort, Judgement, MEASURES, Session, SessionMeasures, Verdict, properties, support,
};
use crate::evaluate::{CompiledCode, Evaluator, Stop, position_names};
use crate::finding::{Code as FindingCode, Finding, Related, catalogue, near_names};
use crate::source::Span;
use crate::syntax::tree::{ClauseKind, Condition, Expression, PhrasePart, Requirement, Strength};
use crate::value::Value;

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
                operands.push((
                    self.evaluator.evaluate(expression, &scope)?,
                    expression.span,
                ));
            }
        }
        (phrase.decide)(&Asked {
            court: self,
            compiled,
            operands,
            span: requirement.span,
        })
    }

    /// A comparison or a property. A distance that is only known to lie in an interval is gone
    /// through value by value: the verdict stands when all agree.
    fn expression(&self, compiled: &CompiledCode, expression: &Expression) -> Result<Ruling, Stop> {
        self.measures.last.borrow_mut().take();
        let says = |holds: bool| self.grounds(compiled, expression, holds);
        match self.assumed(compiled, expression, Vec::new()) {
            Ok(holds) => {
                let plain = self.measures.last.borrow_mut().take();
                let judgement = match plain {
                    Some(judgement) => Judgement {
                        verdict: if holds {
                            Verdict::Holds
                        } else {
                            Verdict::Fails
                        },
                        ..judgement
                    },
                    None => Judgement::of(holds, says(true), says(false)),
                };
                Ok(Ruling::new(judgement))
            }
            Err(Stop::Unsettled { name, lower, upper }) => {
                let mut seen = [false; 2];
                for value in lower..=upper {
                    let holds = self.assumed(
                        compiled,
                        expression,
                        vec![(name.clone(), Value::integer(value))],
                    )?;
                    seen[usize::from(holds)] = true;
                }
                let interval = format!("{name} lies in {lower}..{upper}");
                Ok(Ruling::new(match seen {
                    [false, true] => {
                        Judgement::holds(format!("{interval}, and it holds for each of these"))
                    }
                    [true, false] => {
                        Judgement::fails(format!("{interval}, and it fails for each of these"))
                    }
                    _ => Judgement::undecided(format!(
                        "{interval}, and only some of these satisfy it"
                    )),
                }))
            }
            Err(Stop::Finding(finding)) if finding.code == catalogue::CLAIM_UNDECIDED => {
                Ok(Ruling::new(Judgement::undecided(finding.message)))
            }
            Err(stop) => Err(stop),
        }
    }

    fn assumed(
        &self,
        compiled: &CompiledCode,
        expression: &Expression,
        assumed: Vec<(String, Value)>,
    ) -> Result<bool, Stop> {
        let scope = compiled.scope.about(&compiled.code, assumed);
        self.evaluator.condition(expression, &scope)
    }

    /// The two sides of a comparison as they came out: `row_weight is 38, not <= 36`.
    fn grounds(&self, compiled: &CompiledCode, expression: &Expression, holds: bool) -> String {
        use crate::syntax::tree::ExpressionKind;
        let scope = compiled.scope.about(&compiled.code, Vec::new());
        if let ExpressionKind::Binary(_, left, right) = &expression.kind
            && let (Ok(one), Ok(other)) = (
                self.evaluator.evaluate(left, &scope),
                self.evaluator.evaluate(right, &scope),
            )
        {
            // A side that is a plain number says nothing new.
            let sides: Vec<String> = [(left, one), (right, other)]
                .into_iter()
                .map(|(side, value)| (self.evaluator.text(side.span), value.to_string()))
                .filter(|(text, value)| text != value)
                .map(|(text, value)| format!("{text} is {value}"))
                .collect();
            if !sides.is_empty() {
                return sides.join(" and ");
            }
        }
        if holds {
            "it evaluates to true".into()
        } else {
            "it evaluates to false".into()
        }
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
        let mut finding =
            Finding::new(code, requirement.span, message).label(ruling.judgement.says.clone());
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
        let at =
            (0..trail.len()).find(|&at| distances[at].upper < needed && distances[at].lower > 0)?;
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

/// A distance as text: `4`, or `4..6`.
pub fn interval(distance: &Distance) -> String {
    match distance.exact() {
        Some(exact) => exact.to_string(),
        None => format!("{}..{}", distance.lower, distance.upper),
    }
}

/// A requirement with its operands, to be decided.
pub struct Asked<'a> {
    /// What it is judged by.
    pub court: &'a Court<'a>,
    /// The code.
    pub compiled: &'a CompiledCode,
    /// The operands in order, and where they stand.
    pub operands: Vec<(Value, Span)>,
    /// The condition.
    pub span: Span,
}

impl Asked<'_> {
    /// The code.
    pub fn code(&self) -> &Code {
        &self.compiled.code
    }

    /// An operand as a whole number from 0 on.
    ///
    /// # Errors
    /// When it is none.
    pub fn number(&self, at: usize) -> Result<usize, Stop> {
        use num_traits::ToPrimitive;
        let (value, span) = &self.operands[at];
        let number = match value {
            Value::Integer(number) => number.to_usize().filter(|&number| number < 1 << 40),
            _ => None,
        };
        number.ok_or_else(|| {
            Stop::Finding(Box::new(Finding::new(
                catalogue::WRONG_TYPE,
                *span,
                format!("a whole number from 0 on is needed here, not {value}"),
            )))
        })
    }

    /// An operand as a code.
    ///
    /// # Errors
    /// When it is none.
    pub fn code_operand(&self, at: usize) -> Result<&Code, Stop> {
        match &self.operands[at] {
            (Value::Code(code), _) => Ok(code),
            (other, span) => Err(Stop::Finding(Box::new(Finding::new(
                catalogue::WRONG_TYPE,
                *span,
                format!("a code is needed here, not {}", other.kind()),
            )))),
        }
    }

    /// Positions by name.
    pub fn named(&self, positions: &[usize]) -> String {
        position_names(self.compiled.position_names.as_deref(), positions).join(", ")
    }

    /// The positions of a word.
    pub fn word_named(&self, word: &[u32]) -> String {
        self.named(&support(word).0)
    }
}

/// A judgement with what a finding about it needs.
pub struct Ruling {
    /// The verdict.
    pub judgement: Judgement,
    /// What to write instead.
    pub help: Option<String>,
    /// The distance that would have been enough, when that is what is missing.
    pub needed: Option<usize>,
}

impl Ruling {
    /// A judgement alone.
    pub fn new(judgement: Judgement) -> Ruling {
        Ruling {
            judgement,
            help: None,
            needed: None,
        }
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
