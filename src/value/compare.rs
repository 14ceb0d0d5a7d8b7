//! Equality, order and membership.

use super::{Trouble, Value};
use crate::finding::catalogue;
use num_bigint::BigInt;
use num_rational::BigRational;
use std::cmp::Ordering;

fn cannot(left: &Value, right: &Value, how: &str) -> Trouble {
    Trouble::new(
        catalogue::WRONG_TYPE,
        format!("{} cannot be {how} with {}", left.kind(), right.kind()),
    )
}

/// Whether two values are equal. An integer beside a field element names an element.
///
/// # Errors
/// When the two can never be compared.
pub fn equal(left: &Value, right: &Value) -> Result<bool, Trouble> {
    match (left, right) {
        (Value::Boolean(left), Value::Boolean(right)) => Ok(left == right),
        (Value::Polynomial(left), Value::Polynomial(right)) => {
            Ok(left.add(&right.negate())?.terms.is_empty())
        }
        (Value::Matrix(left), Value::Matrix(right)) => Ok(left == right),
        (Value::Field(left), Value::Field(right)) => Ok(left == right),
        (Value::Vector(field, entries), Value::Integer(_)) => {
            Ok(vector_number(field.order(), entries) == *super::integer_of(right)?)
        }
        (Value::Integer(_), Value::Vector(..)) => equal(right, left),
        _ => compare(left, right).map(|order| order == Ordering::Equal),
    }
}

/// The number a vector is, its first entry the most significant digit in base q.
fn vector_number(order: u64, entries: &[u32]) -> BigInt {
    entries.iter().fold(BigInt::from(0), |sum, &entry| {
        sum * BigInt::from(order) + BigInt::from(entry)
    })
}

/// The order of two values: numbers by size, elements and vectors by the numbers they are,
/// sets and lists member by member, shorter first.
///
/// # Errors
/// When the two have no order.
pub fn compare(left: &Value, right: &Value) -> Result<Ordering, Trouble> {
    match (left, right) {
        (Value::Integer(left), Value::Integer(right)) => Ok(left.cmp(right)),
        (Value::Integer(_) | Value::Rational(_), Value::Integer(_) | Value::Rational(_)) => {
            Ok(fraction(left).cmp(&fraction(right)))
        }
        (Value::Text(left), Value::Text(right)) => Ok(left.cmp(right)),
        (Value::Boolean(left), Value::Boolean(right)) => Ok(left.cmp(right)),
        (Value::Element(field, element), other) => {
            Ok(element.cmp(&super::element_of(field, other)?))
        }
        (other, Value::Element(field, element)) => {
            Ok(super::element_of(field, other)?.cmp(element))
        }
        (Value::Vector(_, left), Value::Vector(_, right)) => Ok(left.cmp(right)),
        (Value::Set(left), Value::Set(right)) | (Value::List(left), Value::List(right)) => {
            for (left, right) in left.iter().zip(right.iter()) {
                let order = compare(left, right)?;
                if order != Ordering::Equal {
                    return Ok(order);
                }
            }
            Ok(left.len().cmp(&right.len()))
        }
        _ => Err(cannot(left, right, "compared")),
    }
}

fn fraction(value: &Value) -> BigRational {
    match value {
        Value::Integer(number) => BigRational::from_integer(number.clone()),
        Value::Rational(number) => number.clone(),
        _ => unreachable!("only numbers are compared as fractions"),
    }
}

/// Whether a set, list or field has a member.
///
/// # Errors
/// When the right side has no members, or a comparison fails.
pub fn contains(member: &Value, whole: &Value) -> Result<bool, Trouble> {
    match whole {
        Value::Set(members) | Value::List(members) => {
            for candidate in members.iter() {
                if equal(member, candidate)? {
                    return Ok(true);
                }
            }
            Ok(false)
        }
        _ => Err(cannot(member, whole, "looked for")),
    }
}
