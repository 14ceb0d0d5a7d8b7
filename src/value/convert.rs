//! From values to what a construction needs: elements, integers, members.

use super::{SET_SIZE, Trouble, Value};
use crate::algebra::{Element, Field};
use crate::finding::catalogue;
use num_bigint::BigInt;
use num_traits::ToPrimitive;

/// The element of `field` that a value names: an element of the same field, or an integer in
/// 0 … q−1 whose digits in base p are the coefficients in the polynomial basis.
///
/// # Errors
/// When it names none.
pub fn element_of(field: &Field, value: &Value) -> Result<Element, Trouble> {
    match value {
        Value::Element(own, element) if own == field => Ok(*element),
        Value::Element(own, element) => {
            // Elements of the prime field are the same in every extension.
            if own.characteristic() == field.characteristic() && *element < own.characteristic() {
                return Ok(*element);
            }
            Err(Trouble::new(
                catalogue::FIELD_MISMATCH,
                format!("an element of {own} stands where one of {field} is needed"),
            ))
        }
        Value::Integer(number) => number
            .to_u64()
            .filter(|&number| number < field.order())
            .map(|number| number as Element)
            .ok_or_else(|| not_an_element(field, number)),
        other => Err(Trouble::new(
            catalogue::WRONG_TYPE,
            format!("an element of {field} is needed here, not {}", other.kind()),
        )),
    }
}

fn not_an_element(field: &Field, number: &BigInt) -> Trouble {
    let last = field.order() - 1;
    let help = if field.degree() == 1 {
        let wrapped = num_integer::Integer::mod_floor(number, &BigInt::from(field.order()));
        format!("write {wrapped} for its remainder modulo {}", field.order())
    } else {
        format!(
            "an integer names an element by its digits in base {}: 0 to {last}; powers of the generator are written {}^i",
            field.characteristic(),
            field.symbol()
        )
    };
    Trouble::new(
        catalogue::NOT_AN_ELEMENT,
        format!("{number} names no element of {field}, which has 0 to {last}"),
    )
    .help(help)
}

/// The integer a value is.
///
/// # Errors
/// When it is none.
pub fn integer_of(value: &Value) -> Result<&BigInt, Trouble> {
    match value {
        Value::Integer(number) => Ok(number),
        other => Err(Trouble::new(
            catalogue::WRONG_TYPE,
            format!("an integer is needed here, not {}", other.kind()),
        )),
    }
}

/// The members of a set or list, or the entries of a vector.
///
/// # Errors
/// When it is none of them.
pub fn items_of(value: &Value) -> Result<Vec<Value>, Trouble> {
    match value {
        Value::Set(members) | Value::List(members) => Ok(members.to_vec()),
        Value::Vector(field, entries) => Ok(entries
            .iter()
            .map(|&entry| Value::Element(field.clone(), entry))
            .collect()),
        other => Err(Trouble::new(
            catalogue::WRONG_TYPE,
            format!("a set or a list is needed here, not {}", other.kind()),
        )),
    }
}

/// The integers first..=last as values.
///
/// # Errors
/// When there are too many.
pub(super) fn range(first: &BigInt, last: &BigInt) -> Result<Vec<Value>, Trouble> {
    let count = last - first + 1;
    if count > BigInt::from(SET_SIZE) {
        return Err(Trouble::new(
            catalogue::LIMIT,
            format!("this range has {count} members, more than the {SET_SIZE} a set may have"),
        ));
    }
    let mut members = Vec::new();
    let mut next = first.clone();
    while next <= *last {
        members.push(Value::Integer(next.clone()));
        next += 1;
    }
    Ok(members)
}

impl Value {
    /// The set of the integers first..=last, empty when last < first.
    ///
    /// # Errors
    /// When an end is no integer, or there are too many members.
    pub fn range(first: &Value, last: &Value) -> Result<Value, Trouble> {
        let members = range(integer_of(first)?, integer_of(last)?)?;
        Ok(Value::Set(std::sync::Arc::new(members)))
    }
}
