//! Requirements that are expressions: comparisons and properties, decided also where a quantity is
//! only known to lie between two values.

use super::{Court, Ruling, numbers};
use crate::derive::{Effort, Judgement, Verdict, support};
use crate::evaluate::{CompiledCode, Stop, position_names};
use crate::finding::{Finding, catalogue};
use crate::syntax::tree::{Expression, ExpressionKind};
use crate::value::Value;
use num_rational::BigRational;

impl Court<'_> {
    /// A comparison or a property: first with what theorems say of the distance, then after a
    /// search.
    pub(super) fn expression(
        &self,
        compiled: &CompiledCode,
        expression: &Expression,
    ) -> Result<Ruling, Stop> {
        self.measures.effort.set(Effort::Theorems);
        let quick = self.weighed(compiled, expression);
        self.measures.effort.set(Effort::Full);
        match quick {
            Ok(ruling) if ruling.judgement.verdict == Verdict::Undecided => {
                self.weighed(compiled, expression)
            }
            Err(Stop::Enclosed { .. } | Stop::Unsettled { .. }) => {
                self.weighed(compiled, expression)
            }
            settled => settled,
        }
    }

    /// A comparison or a property. A distance that is only known to lie in an interval is gone
    /// through value by value: the verdict stands when all agree.
    fn weighed(&self, compiled: &CompiledCode, expression: &Expression) -> Result<Ruling, Stop> {
        self.measures.last.borrow_mut().take();
        let says = |holds: bool| self.grounds(compiled, expression, holds);
        match self.assumed(compiled, expression, Vec::new()) {
            Ok(holds) => {
                let plain = self.measures.last.borrow_mut().take();
                let judgement = match plain {
                    Some(judgement) => {
                        let judgement = self.shown(compiled, expression, judgement);
                        let verdict = if holds {
                            Verdict::Holds
                        } else {
                            Verdict::Fails
                        };
                        Judgement {
                            verdict,
                            ..judgement
                        }
                    }
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
            Err(stop @ Stop::Enclosed { .. }) => self.enclosed(compiled, expression, stop),
            Err(Stop::Finding(finding)) if finding.code == catalogue::CLAIM_UNDECIDED => {
                Ok(Ruling::new(Judgement::undecided(finding.message)))
            }
            Err(stop) => Err(stop),
        }
    }

    /// A property's judgement with the places that refute it named.
    fn shown(
        &self,
        compiled: &CompiledCode,
        expression: &Expression,
        judgement: Judgement,
    ) -> Judgement {
        let (ExpressionKind::Name(name), Some(word), Verdict::Fails) =
            (&expression.kind, &judgement.witness, judgement.verdict)
        else {
            return judgement;
        };
        let (positions, _) = support(word);
        let named = position_names(compiled.position_names.as_deref(), &positions).join(", ");
        let says = match (name.as_str(), positions.len()) {
            ("mds", lost) => format!(
                "{}: the {lost} symbols at {named}, no more than n - k = {}, cannot be recovered when they are lost",
                judgement.says,
                compiled.code.redundancy()
            ),
            (_, 1..=16) => format!("{}: a word lives at {named}", judgement.says),
            _ => return judgement,
        };
        Judgement { says, ..judgement }
    }

    /// A comparison of numbers that are only known to lie between two fractions: it stands when
    /// all of one side lies on the right side of all of the other.
    fn enclosed(
        &self,
        compiled: &CompiledCode,
        expression: &Expression,
        stop: Stop,
    ) -> Result<Ruling, Stop> {
        let ExpressionKind::Binary(operator, left, right) = &expression.kind else {
            return Err(stop);
        };
        let (one, one_says) = self.ends(compiled, left)?;
        let (other, other_says) = self.ends(compiled, right)?;
        let Some(verdict) = numbers::compared(*operator, &one, &other) else {
            return Err(stop);
        };
        let says = [one_says, other_says]
            .into_iter()
            .flatten()
            .collect::<Vec<_>>();
        Ok(Ruling::new(Judgement {
            verdict,
            says: says.join(" and "),
            witness: None,
        }))
    }

    /// A number, or the two it lies between, with the grounds if it is a figure.
    fn ends(
        &self,
        compiled: &CompiledCode,
        side: &Expression,
    ) -> Result<(numbers::Ends, Option<String>), Stop> {
        self.measures.last.borrow_mut().take();
        let scope = compiled.scope.about(&compiled.code, Vec::new());
        let ends = match self.evaluator.evaluate(side, &scope) {
            Ok(Value::Integer(number)) => {
                let number = BigRational::from_integer(number);
                (number.clone(), number)
            }
            Ok(Value::Rational(number)) => (number.clone(), number),
            Err(Stop::Enclosed { ends, .. }) => *ends,
            Ok(other) => {
                return Err(Stop::Finding(Box::new(Finding::new(
                    catalogue::WRONG_TYPE,
                    side.span,
                    format!("a number is compared here, not {}", other.kind()),
                ))));
            }
            Err(stop) => return Err(stop),
        };
        let grounds = self.measures.last.borrow_mut().take();
        Ok((ends, grounds.map(|judgement| judgement.says)))
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
}
