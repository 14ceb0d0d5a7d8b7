//! Field literals.

use super::expression::{mistyped, wrong};
use super::{Evaluator, Outcome, Scope, Stop};
use crate::algebra::{Field, FieldError};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{Expression, FieldLiteral, Modulus};
use crate::value::{Polynomial, Value};
use num_traits::ToPrimitive;
use std::sync::Arc;

/// The most elements of a field that is no prime field.
const ORDER: u64 = 1 << 24;

impl Evaluator<'_> {
    /// `GF(q) where a^m = …` or `GF(q) modulus …` or `GF(q)`.
    pub(super) fn field_literal(
        &self,
        literal: &FieldLiteral,
        span: Span,
        scope: &Scope,
    ) -> Outcome<Field> {
        let order_span = literal.order.span;
        let order = match self.evaluate(&literal.order, scope)? {
            Value::Integer(number) => number,
            other => {
                return Err(mistyped(
                    order_span,
                    "the order of a field is an integer",
                    &other,
                ));
            }
        };
        let Some((p, m)) = order.to_u64().and_then(prime_power) else {
            return Err(no_such_order(&order, order_span));
        };
        match &literal.modulus {
            None => {
                let field = Field::conway(p, m).map_err(|error| self.refused(&error, span, "x"))?;
                self.remark_unstated(&field, span);
                Ok(field)
            }
            Some(Modulus::Relation {
                symbol,
                left,
                right,
            }) => {
                let place = left.span.to(right.span);
                // The generator stands for the indeterminate while its relation is read.
                let variable = Value::Polynomial(Arc::new(Polynomial::variable(0)));
                let inner = scope.with(&symbol.text, variable);
                let left = self.polynomial(left, &inner)?;
                let right = self.polynomial(right, &inner)?;
                let modulus = left
                    .add(&right.negate())
                    .map_err(|trouble| trouble.at(place))?;
                let field = self.with_modulus(p, m, &modulus, place, true, &symbol.text)?;
                Ok(field.with_symbol(&symbol.text))
            }
            Some(Modulus::Polynomial(expression)) => {
                let modulus = self.polynomial(expression, scope)?;
                self.with_modulus(p, m, &modulus, expression.span, false, "x")
            }
        }
    }

    /// Says which modulus is assumed, where another choice was possible: GF(p) has none, and GF(4)
    /// only one.
    fn remark_unstated(&self, field: &Field, span: Span) {
        if field.degree() == 1 || field.order() == 4 || self.sources.get(span.source).library {
            return;
        }
        let degree = field.degree() as usize;
        let symbol = field.symbol();
        let prime = field.characteristic();
        let right: Vec<u32> = field.modulus()[..degree]
            .iter()
            .map(|&coefficient| (prime - coefficient) % prime)
            .collect();
        let right = crate::algebra::format_polynomial(&right, symbol);
        self.report(
            Finding::new(
                catalogue::UNSTATED_MODULUS,
                span,
                format!(
                    "the modulus of {field} is not stated, so the Conway polynomial is assumed"
                ),
            )
            .label("other moduli give other matrices")
            .help(format!(
                "write `{} where {symbol}^{degree} = {right}`",
                self.text(span)
            )),
        );
    }

    fn polynomial(&self, expression: &Expression, scope: &Scope) -> Outcome<Polynomial> {
        match self.evaluate(expression, scope)? {
            Value::Polynomial(polynomial) => Ok((*polynomial).clone()),
            Value::Integer(number) => Ok(Polynomial::constant(crate::value::Coefficient::Integer(
                number,
            ))),
            other => Err(mistyped(
                expression.span,
                "a modulus is a polynomial",
                &other,
            )),
        }
    }

    fn with_modulus(
        &self,
        p: u64,
        m: u32,
        modulus: &Polynomial,
        span: Span,
        primitive: bool,
        symbol: &str,
    ) -> Outcome<Field> {
        let prime = Field::prime(p).map_err(|error| self.refused(&error, span, symbol))?;
        let coefficients = modulus
            .coefficients(&prime, 1 << 12)
            .map_err(|trouble| trouble.at(span))?;
        if coefficients.len() != m as usize + 1 {
            let degree = coefficients.len().saturating_sub(1);
            return Err(Box::new(
                Finding::new(
                    catalogue::MODULUS_DEGREE,
                    span,
                    format!("the modulus has degree {degree}, but GF({p}^{m}) needs degree {m}"),
                )
                .help(format!(
                    "write a relation for {symbol}^{m}, or GF({p}^{degree})"
                )),
            )
            .into());
        }
        // A multiple of the monic modulus says the same.
        let scale = prime
            .inv(coefficients[m as usize])
            .expect("a leading coefficient");
        let monic: Vec<u32> = coefficients
            .iter()
            .map(|&entry| prime.mul(entry, scale))
            .collect();
        Field::with_modulus(p as u32, &monic, primitive)
            .map_err(|error| self.refused(&error, span, symbol))
    }

    fn refused(&self, error: &FieldError, span: Span, symbol: &str) -> Stop {
        let finding = match error {
            FieldError::NotPrimePower => {
                Finding::new(catalogue::BAD_FIELD_ORDER, span, "a field has a prime power of elements")
            }
            FieldError::TooLarge => Finding::new(
                catalogue::LIMIT,
                span,
                format!("this field is too large: prime fields go to 2^31, others to {ORDER} elements"),
            ),
            FieldError::WrongDegree { stated } => Finding::new(
                catalogue::MODULUS_DEGREE,
                span,
                format!("the modulus has degree {stated}, which is not the field's"),
            ),
            FieldError::Reducible { factor } => Finding::new(
                catalogue::REDUCIBLE_MODULUS,
                span,
                format!(
                    "the modulus is reducible: {} divides it",
                    crate::algebra::format_polynomial(factor, symbol)
                ),
            )
            .help("a modulus has no factors; without `where`, the Conway polynomial is taken"),
            FieldError::NotPrimitive { order } => Finding::new(
                catalogue::MODULUS_NOT_PRIMITIVE,
                span,
                format!("{symbol} does not generate the field: its order is {order}"),
            )
            .help("if this modulus is meant and no generator is needed, write `modulus POLYNOMIAL` in place of `where`"),
        };
        Stop::Finding(Box::new(finding))
    }
}

fn no_such_order(order: &num_bigint::BigInt, span: Span) -> Stop {
    let too_large = order.to_u64().is_none_or(|order| order >= 1 << 31);
    if too_large && order.sign() == num_bigint::Sign::Plus {
        return wrong(
            catalogue::LIMIT,
            span,
            format!(
                "GF({order}) is too large, or {order} is no prime power: prime fields go to 2^31, others to {ORDER} elements"
            ),
        );
    }
    let near = order
        .to_u64()
        .and_then(|order| (order + 1..order + 100).find(|&next| prime_power(next).is_some()));
    let mut finding = Finding::new(
        catalogue::BAD_FIELD_ORDER,
        span,
        format!("there is no field with {order} elements: {order} is no prime power"),
    );
    finding.help = near.map(|near| format!("the next prime power is {near}"));
    Stop::Finding(Box::new(finding))
}

/// p and m with p^m = order within the limits.
fn prime_power(order: u64) -> Option<(u64, u32)> {
    let (p, m) = crate::algebra::prime_power(order)?;
    let supported = if m == 1 { p < 1 << 31 } else { order <= ORDER };
    supported.then_some((p, m))
}
