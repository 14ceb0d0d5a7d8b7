//! Claims with their expressions evaluated.

use super::expression::{mistyped, wrong};
use super::{CompiledCode, Evaluator, Outcome};
use crate::finding::catalogue;
use crate::source::Span;
use crate::syntax::tree::{BinaryOperator, Bound, BoundKind, Claim, Expression};
use crate::value::Value;
use num_bigint::{BigInt, BigUint};
use num_traits::ToPrimitive;
use std::collections::BTreeMap;

/// What a claim says of one parameter.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Expected {
    /// Where.
    pub span: Span,
    /// The comparison and the number; `None` for `_`.
    pub says: Option<(BinaryOperator, BigInt)>,
}

/// A claim, evaluated.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Claimed {
    /// Of the length.
    pub length: Expected,
    /// Of the dimension.
    pub dimension: Expected,
    /// Of the distance.
    pub distance: Option<Expected>,
    /// Of the weights.
    pub weights: Option<(Span, BTreeMap<usize, BigUint>)>,
}

impl Expected {
    /// Whether a value satisfies it.
    pub fn holds(&self, value: usize) -> bool {
        let value = BigInt::from(value);
        match &self.says {
            None => true,
            Some((BinaryOperator::Equal, wanted)) => value == *wanted,
            Some((BinaryOperator::Unequal, wanted)) => value != *wanted,
            Some((BinaryOperator::Less, wanted)) => value < *wanted,
            Some((BinaryOperator::AtMost, wanted)) => value <= *wanted,
            Some((BinaryOperator::Greater, wanted)) => value > *wanted,
            Some((_, wanted)) => value >= *wanted,
        }
    }

    /// As written: `4`, `>= 43`, `_`.
    pub fn text(&self) -> String {
        match &self.says {
            None => "_".to_string(),
            Some((BinaryOperator::Equal, wanted)) => wanted.to_string(),
            Some((operator, wanted)) => format!("{} {wanted}", crate::value::symbol(*operator)),
        }
    }
}

impl Evaluator<'_> {
    /// A claim of a code, evaluated.
    ///
    /// # Errors
    /// When an entry has no value.
    pub fn claimed(&self, claim: &Claim, of: &CompiledCode) -> Outcome<Claimed> {
        let weights = match &claim.weights {
            None => None,
            Some(weights) => {
                let mut counts = BTreeMap::new();
                for (weight, count) in &weights.entries {
                    let at = self.natural(weight, of)?;
                    let at = at
                        .to_usize()
                        .filter(|&at| at <= of.code.length())
                        .ok_or_else(|| {
                            let message = format!(
                                "no word has weight {at}: the length is {}",
                                of.code.length()
                            );
                            wrong(catalogue::BAD_ARGUMENT, weight.span, message)
                        })?;
                    let many = self.natural(count, of)?;
                    if counts.insert(at, many).is_some() {
                        return Err(wrong(
                            catalogue::BAD_ARGUMENT,
                            weight.span,
                            format!("weight {at} is claimed twice"),
                        ));
                    }
                }
                counts.retain(|_, count| *count != BigUint::default());
                Some((weights.span, counts))
            }
        };
        Ok(Claimed {
            length: self.expected(&claim.length, of)?,
            dimension: self.expected(&claim.dimension, of)?,
            distance: match &claim.distance {
                None => None,
                Some(bound) => Some(self.expected(bound, of)?),
            },
            weights,
        })
    }

    fn expected(&self, bound: &Bound, of: &CompiledCode) -> Outcome<Expected> {
        let says = match &bound.kind {
            BoundKind::Open => None,
            BoundKind::Exactly(expression) => {
                Some((BinaryOperator::Equal, self.whole(expression, of)?))
            }
            BoundKind::Compared(operator, expression) => {
                Some((*operator, self.whole(expression, of)?))
            }
        };
        Ok(Expected {
            span: bound.span,
            says,
        })
    }

    fn whole(&self, expression: &Expression, of: &CompiledCode) -> Outcome<BigInt> {
        match self.evaluate(expression, &of.scope)? {
            Value::Integer(number) => Ok(number),
            other => Err(mistyped(expression.span, "a claim is an integer", &other)),
        }
    }

    fn natural(&self, expression: &Expression, of: &CompiledCode) -> Outcome<BigUint> {
        let number = self.whole(expression, of)?;
        number.to_biguint().ok_or_else(|| {
            wrong(
                catalogue::BAD_ARGUMENT,
                expression.span,
                "a count is not negative".into(),
            )
        })
    }
}
