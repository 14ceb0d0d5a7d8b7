//! Evaluates expressions.

use super::{Evaluator, Measured, Outcome, Scope, Stop};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{
    BinaryOperator, Comprehension, Expression, ExpressionKind, UnaryOperator,
};
use crate::value::{self, SET_SIZE, Trouble, Value};
use num_traits::ToPrimitive;
use std::cmp::Ordering;
use std::sync::Arc;

impl Evaluator<'_> {
    /// The value of an expression.
    ///
    /// # Errors
    /// Why there is none.
    pub fn evaluate(&self, expression: &Expression, scope: &Scope) -> Outcome<Value> {
        let span = expression.span;
        self.spend(1, span)?;
        match &expression.kind {
            ExpressionKind::Integer(number) => Ok(Value::Integer(number.clone())),
            ExpressionKind::Decimal(number) => Ok(Value::rational(number.clone())),
            ExpressionKind::Boolean(value) => Ok(Value::Boolean(*value)),
            ExpressionKind::Text(text) => Ok(Value::Text(text.as_str().into())),
            ExpressionKind::Name(name) => self.name(name, span, scope),
            ExpressionKind::Call {
                function,
                arguments,
            } => self.call(function, arguments, span, scope),
            ExpressionKind::Index(base, index) => self.index(base, index, scope),
            ExpressionKind::Member(base, name) => {
                let value = self.evaluate(base, scope)?;
                self.member(&value, name, base.span)
            }
            ExpressionKind::Unary(operator, operand) => self.unary(*operator, operand, scope),
            ExpressionKind::Binary(operator, left, right) => {
                self.binary(*operator, left, right, span, scope)
            }
            ExpressionKind::Range(first, last) => {
                let (first, last) = (self.evaluate(first, scope)?, self.evaluate(last, scope)?);
                placed(Value::range(&first, &last), span)
            }
            ExpressionKind::Set(items) => {
                let members = self.members(items, span, scope)?;
                placed(Value::set(members), span)
            }
            ExpressionKind::List(items) => {
                Ok(Value::List(Arc::new(self.members(items, span, scope)?)))
            }
            ExpressionKind::Comprehension(comprehension) => {
                self.comprehension(comprehension, span, scope)
            }
            ExpressionKind::Conditional {
                condition,
                then,
                otherwise,
            } => {
                if self.condition(condition, scope)? {
                    self.evaluate(then, scope)
                } else {
                    self.evaluate(otherwise, scope)
                }
            }
            ExpressionKind::Field(literal) => {
                Ok(Value::Field(self.field_literal(literal, span, scope)?))
            }
            ExpressionKind::Rows(rows) => self.rows(rows, span, scope),
            ExpressionKind::Blocks(rows) => self.blocks(rows, span, scope),
            ExpressionKind::Circulants { size, rows } => self.circulants(size, rows, span, scope),
            ExpressionKind::Columns(columns) => self.columns(columns, span, scope),
            ExpressionKind::Monomials(monomials) => self.monomials(monomials, span, scope),
            ExpressionKind::Points(points) => self.points(points, span, scope),
            ExpressionKind::Over(value, field) => self.over(value, field, scope),
            ExpressionKind::Then(code, step) => self.then(code, step, scope),
            ExpressionKind::Pick(pick) => self.pick(pick, span, scope),
        }
    }

    /// A condition: true or false.
    ///
    /// # Errors
    /// When the expression is neither.
    pub fn condition(&self, expression: &Expression, scope: &Scope) -> Outcome<bool> {
        match self.evaluate(expression, scope)? {
            Value::Boolean(value) => Ok(value),
            other => Err(mistyped(
                expression.span,
                "a condition is true or false",
                &other,
            )),
        }
    }

    /// An integer from `least` to `most`.
    ///
    /// # Errors
    /// When the expression is none.
    pub(super) fn size(
        &self,
        expression: &Expression,
        scope: &Scope,
        what: &str,
        least: usize,
        most: usize,
    ) -> Outcome<usize> {
        match self.evaluate(expression, scope)? {
            Value::Integer(number) => number
                .to_usize()
                .filter(|size| (least..=most).contains(size))
                .ok_or_else(|| {
                    let message = format!("{what} is {number}, but it lies in {least}..{most}");
                    wrong(catalogue::BAD_ARGUMENT, expression.span, message)
                }),
            other => Err(mistyped(
                expression.span,
                &format!("{what} is an integer"),
                &other,
            )),
        }
    }

    fn unary(
        &self,
        operator: UnaryOperator,
        operand: &Expression,
        scope: &Scope,
    ) -> Outcome<Value> {
        match operator {
            UnaryOperator::Not => Ok(Value::Boolean(!self.condition(operand, scope)?)),
            UnaryOperator::Negate => {
                let value = self.evaluate(operand, scope)?;
                placed(value::negate(&value), operand.span)
            }
        }
    }

    fn binary(
        &self,
        operator: BinaryOperator,
        left: &Expression,
        right: &Expression,
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        use BinaryOperator as Op;
        if matches!(operator, Op::And | Op::Or) {
            // The right side is evaluated only when it matters.
            let first = self.condition(left, scope)?;
            let settled = first == (operator == Op::Or);
            return Ok(Value::Boolean(if settled {
                first
            } else {
                self.condition(right, scope)?
            }));
        }
        let (left, right) = (self.evaluate(left, scope)?, self.evaluate(right, scope)?);
        let ordered = |test: fn(Ordering) -> bool| {
            placed(value::compare(&left, &right), span).map(|order| Value::Boolean(test(order)))
        };
        match operator {
            Op::Equal => placed(value::equal(&left, &right), span).map(Value::Boolean),
            Op::Unequal => {
                placed(value::equal(&left, &right), span).map(|same| Value::Boolean(!same))
            }
            Op::Less => ordered(Ordering::is_lt),
            Op::AtMost => ordered(Ordering::is_le),
            Op::Greater => ordered(Ordering::is_gt),
            Op::AtLeast => ordered(Ordering::is_ge),
            Op::In => placed(value::contains(&left, &right), span).map(Value::Boolean),
            _ => placed(value::binary(operator, &left, &right), span),
        }
    }

    fn index(&self, base: &Expression, index: &Expression, scope: &Scope) -> Outcome<Value> {
        let value = self.evaluate(base, scope)?;
        let count = match &value {
            Value::Vector(_, entries) => entries.len(),
            Value::List(items) | Value::Set(items) => items.len(),
            other => {
                return Err(mistyped(
                    base.span,
                    "only vectors and lists have entries",
                    other,
                ));
            }
        };
        if count == 0 {
            return Err(wrong(
                catalogue::BAD_ARGUMENT,
                index.span,
                "this has no entries".into(),
            ));
        }
        let at = self.size(index, scope, "an index", 0, count - 1)?;
        Ok(match &value {
            Value::Vector(field, entries) => Value::Element(field.clone(), entries[at]),
            Value::List(items) | Value::Set(items) => items[at].clone(),
            _ => unreachable!("checked above"),
        })
    }

    /// The members of a set or list literal; a range stands for its members.
    fn members(&self, items: &[Expression], span: Span, scope: &Scope) -> Outcome<Vec<Value>> {
        let mut members = Vec::new();
        for item in items {
            let value = self.evaluate(item, scope)?;
            match (&item.kind, &value) {
                (ExpressionKind::Range(..), Value::Set(range)) => {
                    members.extend(range.iter().cloned());
                }
                _ => members.push(value),
            }
            if members.len() > SET_SIZE {
                return Err(too_many(span));
            }
        }
        Ok(members)
    }

    fn comprehension(&self, of: &Comprehension, span: Span, scope: &Scope) -> Outcome<Value> {
        let mut members = Vec::new();
        self.choices(of, 0, scope, &mut members, span)?;
        if of.list {
            Ok(Value::List(Arc::new(members)))
        } else {
            placed(Value::set(members), span)
        }
    }

    fn choices(
        &self,
        of: &Comprehension,
        depth: usize,
        scope: &Scope,
        members: &mut Vec<Value>,
        span: Span,
    ) -> Outcome<()> {
        let Some((name, domain)) = of.binders.get(depth) else {
            let wanted = match &of.condition {
                Some(condition) => self.condition(condition, scope)?,
                None => true,
            };
            if wanted {
                members.push(self.evaluate(&of.element, scope)?);
                if members.len() > SET_SIZE {
                    return Err(too_many(span));
                }
            }
            return Ok(());
        };
        let domain_value = self.evaluate(domain, scope)?;
        for value in placed(value::items_of(&domain_value), domain.span)? {
            self.choices(of, depth + 1, &scope.with(&name.text, value), members, span)?;
        }
        Ok(())
    }

    /// A quantity of a code, exactly.
    pub(super) fn measured(&self, measured: Measured, name: &str) -> Outcome<Value> {
        match measured {
            Measured::Exactly(value) => Ok(value),
            Measured::Between(lower, upper) => Err(Stop::Unsettled {
                name: name.to_string(),
                lower,
                upper,
            }),
            Measured::Within(lower, upper) => Err(Stop::Enclosed {
                name: name.to_string(),
                ends: Box::new((lower, upper)),
            }),
        }
    }
}

/// A result with its place.
pub(super) fn placed<T>(result: Result<T, Trouble>, span: Span) -> Outcome<T> {
    result.map_err(|trouble| trouble.at(span).into())
}

/// A finding that stops.
pub(super) fn wrong(code: crate::finding::Code, span: Span, message: String) -> Stop {
    Stop::Finding(Box::new(Finding::new(code, span, message)))
}

/// A value of the wrong kind.
pub(super) fn mistyped(span: Span, rule: &str, value: &Value) -> Stop {
    wrong(
        catalogue::WRONG_TYPE,
        span,
        format!("{rule}; this is {}", value.kind()),
    )
}

fn too_many(span: Span) -> Stop {
    wrong(
        catalogue::LIMIT,
        span,
        format!("this has more than the {SET_SIZE} members a set may have"),
    )
}
