//! Arithmetic on numbers, field elements, polynomials, vectors and matrices.

use super::{Coefficient, INTEGER_BITS, Polynomial, Trouble, Value, element_of};
use crate::algebra::Field;
use crate::finding::catalogue;
use crate::syntax::tree::BinaryOperator;
use num_bigint::BigInt;
use num_integer::Integer;
use num_rational::BigRational;
use num_traits::{One, Signed, ToPrimitive, Zero};
use std::sync::Arc;

/// Applies an arithmetic operator (not a comparison, `in`, `and`, `or`).
///
/// # Errors
/// When the operands do not go together, or there is no result.
pub fn binary(operator: BinaryOperator, left: &Value, right: &Value) -> Result<Value, Trouble> {
    use Value::{Element, Integer, Matrix, Polynomial as Poly, Rational, Vector};
    if operator == BinaryOperator::Power {
        return power(left, right);
    }
    match (left, right) {
        (Integer(left), Integer(right)) => integers(operator, left, right),
        (Integer(_) | Rational(_), Integer(_) | Rational(_)) => {
            fractions(operator, &to_fraction(left), &to_fraction(right))
        }
        (Poly(_), Poly(_) | Integer(_) | Element(..)) | (Integer(_) | Element(..), Poly(_)) => {
            polynomials(operator, &to_polynomial(left)?, &to_polynomial(right)?)
        }
        (Element(field, _), Element(..) | Integer(_)) => elements(field, operator, left, right),
        (Integer(_), Element(field, _)) => elements(field, operator, left, right),
        (Vector(field, one), Vector(_, other)) if one.len() == other.len() => {
            vectors(field, operator, one, other)
        }
        (Element(..) | Integer(_), Vector(field, entries))
            if operator == BinaryOperator::Multiply =>
        {
            let factor = element_of(field, left)?;
            let scaled = entries.iter().map(|&entry| field.mul(factor, entry));
            Ok(Vector(field.clone(), Arc::new(scaled.collect())))
        }
        (Matrix(one), Matrix(other)) => matrices(operator, one, other),
        _ => Err(unfit(operator, left, right)),
    }
}

fn unfit(operator: BinaryOperator, left: &Value, right: &Value) -> Trouble {
    Trouble::new(
        catalogue::WRONG_TYPE,
        format!(
            "`{}` does not take {} and {}",
            symbol(operator),
            left.kind(),
            right.kind()
        ),
    )
}

/// An operator as written.
pub fn symbol(operator: BinaryOperator) -> &'static str {
    use BinaryOperator as Op;
    match operator {
        Op::Add => "+",
        Op::Subtract => "-",
        Op::Multiply => "*",
        Op::Divide => "/",
        Op::Quotient => "div",
        Op::Modulo => "mod",
        Op::Power => "^",
        Op::Equal => "=",
        Op::Unequal => "!=",
        Op::Less => "<",
        Op::AtMost => "<=",
        Op::Greater => ">",
        Op::AtLeast => ">=",
        Op::In => "in",
        Op::And => "and",
        Op::Or => "or",
    }
}

fn by_zero() -> Trouble {
    Trouble::new(catalogue::BAD_NUMBER, "this divides by zero")
}

fn sized(number: BigInt) -> Result<Value, Trouble> {
    if number.bits() > INTEGER_BITS {
        return Err(Trouble::new(
            catalogue::LIMIT,
            format!("this number has more than {INTEGER_BITS} binary digits"),
        ));
    }
    Ok(Value::Integer(number))
}

fn integers(operator: BinaryOperator, left: &BigInt, right: &BigInt) -> Result<Value, Trouble> {
    match operator {
        BinaryOperator::Add => sized(left + right),
        BinaryOperator::Subtract => sized(left - right),
        BinaryOperator::Multiply => sized(left * right),
        _ if right.is_zero() => Err(by_zero()),
        BinaryOperator::Divide => Ok(Value::rational(BigRational::new(
            left.clone(),
            right.clone(),
        ))),
        BinaryOperator::Quotient => Ok(Value::Integer(left.div_floor(right))),
        BinaryOperator::Modulo => Ok(Value::Integer(left.mod_floor(&right.abs()))),
        _ => Err(unfit(
            operator,
            &Value::Integer(left.clone()),
            &Value::Integer(right.clone()),
        )),
    }
}

fn to_fraction(value: &Value) -> BigRational {
    match value {
        Value::Integer(number) => BigRational::from_integer(number.clone()),
        Value::Rational(number) => number.clone(),
        _ => unreachable!("only numbers become fractions"),
    }
}

fn fractions(
    operator: BinaryOperator,
    left: &BigRational,
    right: &BigRational,
) -> Result<Value, Trouble> {
    let result = match operator {
        BinaryOperator::Add => left + right,
        BinaryOperator::Subtract => left - right,
        BinaryOperator::Multiply => left * right,
        BinaryOperator::Divide if right.is_zero() => return Err(by_zero()),
        BinaryOperator::Divide => left / right,
        _ => {
            return Err(unfit(
                operator,
                &Value::Rational(left.clone()),
                &Value::Rational(right.clone()),
            ));
        }
    };
    if result.numer().bits().max(result.denom().bits()) > INTEGER_BITS {
        return Err(Trouble::new(
            catalogue::LIMIT,
            format!("this fraction has more than {INTEGER_BITS} binary digits"),
        ));
    }
    Ok(Value::rational(result))
}

fn to_polynomial(value: &Value) -> Result<Polynomial, Trouble> {
    Ok(match value {
        Value::Polynomial(polynomial) => (**polynomial).clone(),
        Value::Integer(number) => Polynomial::constant(Coefficient::Integer(number.clone())),
        Value::Element(field, element) => {
            Polynomial::constant(Coefficient::Element(field.clone(), *element))
        }
        other => {
            return Err(Trouble::new(
                catalogue::WRONG_TYPE,
                format!("a polynomial is needed here, not {}", other.kind()),
            ));
        }
    })
}

fn polynomials(
    operator: BinaryOperator,
    left: &Polynomial,
    right: &Polynomial,
) -> Result<Value, Trouble> {
    let result = match operator {
        BinaryOperator::Add => left.add(right)?,
        BinaryOperator::Subtract => left.add(&right.negate())?,
        BinaryOperator::Multiply => left.multiply(right)?,
        _ => {
            return Err(Trouble::new(
                catalogue::WRONG_TYPE,
                format!("`{}` is not defined for polynomials", symbol(operator)),
            ));
        }
    };
    Ok(Value::Polynomial(Arc::new(result)))
}

fn elements(
    field: &Field,
    operator: BinaryOperator,
    left: &Value,
    right: &Value,
) -> Result<Value, Trouble> {
    let (one, other) = (element_of(field, left)?, element_of(field, right)?);
    let result = match operator {
        BinaryOperator::Add => field.add(one, other),
        BinaryOperator::Subtract => field.sub(one, other),
        BinaryOperator::Multiply => field.mul(one, other),
        BinaryOperator::Divide => {
            let inverse = field.inv(other).ok_or_else(by_zero)?;
            field.mul(one, inverse)
        }
        _ => return Err(unfit(operator, left, right)),
    };
    Ok(Value::Element(field.clone(), result))
}

fn vectors(
    field: &Field,
    operator: BinaryOperator,
    left: &[u32],
    right: &[u32],
) -> Result<Value, Trouble> {
    let pairs = left.iter().zip(right);
    let entries: Vec<u32> = match operator {
        BinaryOperator::Add => pairs.map(|(&a, &b)| field.add(a, b)).collect(),
        BinaryOperator::Subtract => pairs.map(|(&a, &b)| field.sub(a, b)).collect(),
        _ => {
            return Err(Trouble::new(
                catalogue::WRONG_TYPE,
                format!("`{}` is not defined for vectors", symbol(operator)),
            ));
        }
    };
    Ok(Value::Vector(field.clone(), Arc::new(entries)))
}

fn matrices(
    operator: BinaryOperator,
    left: &crate::algebra::Matrix,
    right: &crate::algebra::Matrix,
) -> Result<Value, Trouble> {
    let field = left.field();
    if field != right.field() {
        return Err(Trouble::new(
            catalogue::FIELD_MISMATCH,
            format!("the matrices are over {field} and {}", right.field()),
        ));
    }
    let shapes = || {
        Trouble::new(
            catalogue::SHAPE,
            format!(
                "the matrices' shapes do not fit: {} x {} and {} x {}",
                left.rows(),
                left.columns(),
                right.rows(),
                right.columns()
            ),
        )
    };
    let result = match operator {
        BinaryOperator::Multiply if left.columns() == right.rows() => left.multiply(right),
        BinaryOperator::Multiply => return Err(shapes()),
        BinaryOperator::Add | BinaryOperator::Subtract
            if left.rows() != right.rows() || left.columns() != right.columns() =>
        {
            return Err(shapes());
        }
        BinaryOperator::Add => entrywise(left, right, |a, b| field.add(a, b)),
        BinaryOperator::Subtract => entrywise(left, right, |a, b| field.sub(a, b)),
        _ => {
            return Err(Trouble::new(
                catalogue::WRONG_TYPE,
                format!("`{}` is not defined for matrices", symbol(operator)),
            ));
        }
    };
    Ok(Value::Matrix(Arc::new(result)))
}

fn entrywise(
    left: &crate::algebra::Matrix,
    right: &crate::algebra::Matrix,
    combine: impl Fn(u32, u32) -> u32,
) -> crate::algebra::Matrix {
    crate::algebra::Matrix::from_fn(left.field(), left.rows(), left.columns(), |row, column| {
        combine(left.get(row, column), right.get(row, column))
    })
}

fn power(base: &Value, exponent: &Value) -> Result<Value, Trouble> {
    let Value::Integer(exponent) = exponent else {
        return Err(Trouble::new(
            catalogue::WRONG_TYPE,
            format!("an exponent is an integer, not {}", exponent.kind()),
        ));
    };
    match base {
        Value::Integer(number) => integer_power(number, exponent),
        Value::Rational(number) => fraction_power(number, exponent),
        Value::Element(field, element) => {
            let group = BigInt::from(field.order() - 1);
            if *element == 0 && exponent.is_negative() {
                return Err(by_zero());
            }
            let reduced = if *element == 0 {
                u64::from(!exponent.is_zero())
            } else {
                exponent.mod_floor(&group).to_u64().unwrap_or(0)
            };
            Ok(Value::Element(field.clone(), field.pow(*element, reduced)))
        }
        Value::Polynomial(polynomial) => {
            let small = exponent
                .to_u32()
                .filter(|&small| small < 1 << 31)
                .ok_or_else(|| {
                    Trouble::new(
                        catalogue::BAD_NUMBER,
                        format!("a polynomial cannot be raised to the power {exponent}"),
                    )
                })?;
            Ok(Value::Polynomial(Arc::new(polynomial.power(small)?)))
        }
        other => Err(Trouble::new(
            catalogue::WRONG_TYPE,
            format!("{} cannot be raised to a power", other.kind()),
        )),
    }
}

fn too_large_power() -> Trouble {
    Trouble::new(
        catalogue::LIMIT,
        format!("this power has more than {INTEGER_BITS} binary digits"),
    )
}

fn integer_power(base: &BigInt, exponent: &BigInt) -> Result<Value, Trouble> {
    if exponent.is_negative() {
        return fraction_power(&BigRational::from_integer(base.clone()), exponent);
    }
    if base.is_zero() || base.is_one() || exponent.is_zero() {
        let result = if exponent.is_zero() {
            BigInt::one()
        } else {
            base.clone()
        };
        return Ok(Value::Integer(result));
    }
    if base.abs().is_one() {
        let even = exponent.is_even();
        return Ok(Value::Integer(if even {
            BigInt::one()
        } else {
            base.clone()
        }));
    }
    let exponent = exponent.to_u32().ok_or_else(too_large_power)?;
    if (base.bits() - 1).saturating_mul(u64::from(exponent)) > INTEGER_BITS {
        return Err(too_large_power());
    }
    sized(base.pow(exponent))
}

fn fraction_power(base: &BigRational, exponent: &BigInt) -> Result<Value, Trouble> {
    if base.is_zero() {
        return Err(by_zero());
    }
    let size = exponent.abs().to_u32().ok_or_else(too_large_power)?;
    let bits = base.numer().bits().max(base.denom().bits());
    if bits.saturating_mul(u64::from(size)) > INTEGER_BITS {
        return Err(too_large_power());
    }
    let power = num_traits::pow(base.clone(), size as usize);
    Ok(Value::rational(if exponent.is_negative() {
        power.recip()
    } else {
        power
    }))
}

/// The negative of a value.
///
/// # Errors
/// When it has none.
pub fn negate(value: &Value) -> Result<Value, Trouble> {
    Ok(match value {
        Value::Integer(number) => Value::Integer(-number),
        Value::Rational(number) => Value::Rational(-number),
        Value::Element(field, element) => Value::Element(field.clone(), field.neg(*element)),
        Value::Polynomial(polynomial) => Value::Polynomial(Arc::new(polynomial.negate())),
        Value::Vector(field, entries) => Value::Vector(
            field.clone(),
            Arc::new(entries.iter().map(|&entry| field.neg(entry)).collect()),
        ),
        other => {
            return Err(Trouble::new(
                catalogue::WRONG_TYPE,
                format!("{} has no negative", other.kind()),
            ));
        }
    })
}
