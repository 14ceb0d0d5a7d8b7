//! Polynomials in x, y and z as values: sparse, over the integers until a field is known.

use super::{Trouble, element_of};
use crate::algebra::{Element, Field};
use crate::finding::catalogue;
use num_bigint::BigInt;
use num_traits::{One, Signed, Zero};
use std::collections::BTreeMap;
use std::fmt;

/// The names of the indeterminates.
pub const VARIABLES: [&str; 3] = ["x", "y", "z"];

/// A coefficient: an integer that is not yet in a field, or an element of one.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum Coefficient {
    /// Not yet in a field.
    Integer(BigInt),
    /// In a field.
    Element(Field, Element),
}

/// A polynomial with exponents of x, y and z.
#[derive(Clone, PartialEq, Eq, Debug, Default)]
pub struct Polynomial {
    /// Non-zero coefficients by exponents.
    pub terms: BTreeMap<[u32; 3], Coefficient>,
}

impl Coefficient {
    /// Whether it is zero.
    pub fn is_zero(&self) -> bool {
        match self {
            Coefficient::Integer(value) => value.is_zero(),
            Coefficient::Element(_, value) => *value == 0,
        }
    }

    /// The element it names in `field`; a negative integer −c is the negative of the element c.
    ///
    /// # Errors
    /// When it is in another field, or no element's number.
    pub fn in_field(&self, field: &Field) -> Result<Element, Trouble> {
        match self {
            Coefficient::Integer(value) if value.is_negative() => {
                Ok(field.neg(element_of(field, &super::Value::Integer(-value))?))
            }
            Coefficient::Integer(value) => element_of(field, &super::Value::Integer(value.clone())),
            Coefficient::Element(own, value) => {
                element_of(field, &super::Value::Element(own.clone(), *value))
            }
        }
    }

    fn combine(
        &self,
        other: &Coefficient,
        integers: impl Fn(&BigInt, &BigInt) -> BigInt,
        elements: impl Fn(&Field, Element, Element) -> Element,
    ) -> Result<Coefficient, Trouble> {
        Ok(match (self, other) {
            (Coefficient::Integer(left), Coefficient::Integer(right)) => {
                Coefficient::Integer(integers(left, right))
            }
            (Coefficient::Element(field, left), right) => Coefficient::Element(
                field.clone(),
                elements(field, *left, right.in_field(field)?),
            ),
            (left, Coefficient::Element(field, right)) => Coefficient::Element(
                field.clone(),
                elements(field, left.in_field(field)?, *right),
            ),
        })
    }
}

impl Polynomial {
    /// The indeterminate of the given index.
    pub fn variable(index: usize) -> Polynomial {
        let mut exponents = [0; 3];
        exponents[index] = 1;
        Polynomial {
            terms: BTreeMap::from([(exponents, Coefficient::Integer(BigInt::one()))]),
        }
    }

    /// A constant.
    pub fn constant(coefficient: Coefficient) -> Polynomial {
        let mut polynomial = Polynomial::default();
        if !coefficient.is_zero() {
            polynomial.terms.insert([0; 3], coefficient);
        }
        polynomial
    }

    /// The sum.
    ///
    /// # Errors
    /// When coefficients lie in different fields.
    pub fn add(&self, other: &Polynomial) -> Result<Polynomial, Trouble> {
        let mut sum = self.clone();
        for (exponents, coefficient) in &other.terms {
            let total = match sum.terms.get(exponents) {
                None => coefficient.clone(),
                Some(known) => known.combine(coefficient, |a, b| a + b, Field::add)?,
            };
            if total.is_zero() {
                sum.terms.remove(exponents);
            } else {
                sum.terms.insert(*exponents, total);
            }
        }
        Ok(sum)
    }

    /// The negative.
    pub fn negate(&self) -> Polynomial {
        let terms = self.terms.iter().map(|(exponents, coefficient)| {
            let negative = match coefficient {
                Coefficient::Integer(value) => Coefficient::Integer(-value),
                Coefficient::Element(field, value) => {
                    Coefficient::Element(field.clone(), field.neg(*value))
                }
            };
            (*exponents, negative)
        });
        Polynomial {
            terms: terms.collect(),
        }
    }

    /// The product.
    ///
    /// # Errors
    /// When coefficients lie in different fields, or it has too many terms.
    pub fn multiply(&self, other: &Polynomial) -> Result<Polynomial, Trouble> {
        if self.terms.len().saturating_mul(other.terms.len()) > super::SET_SIZE {
            return Err(Trouble::new(
                catalogue::LIMIT,
                "this product of polynomials has too many terms",
            ));
        }
        let mut product = Polynomial::default();
        for (left_exponents, left) in &self.terms {
            for (right_exponents, right) in &other.terms {
                let mut exponents = [0u32; 3];
                for at in 0..3 {
                    exponents[at] = left_exponents[at]
                        .checked_add(right_exponents[at])
                        .ok_or_else(|| {
                            Trouble::new(catalogue::LIMIT, "an exponent of x passes 2^32")
                        })?;
                }
                let coefficient = left.combine(right, |a, b| a * b, Field::mul)?;
                let term = Polynomial {
                    terms: BTreeMap::from([(exponents, coefficient)]),
                };
                product = product.add(&term)?;
            }
        }
        product
            .terms
            .retain(|_, coefficient| !coefficient.is_zero());
        Ok(product)
    }

    /// The power with an exponent below 2^31; a single term is raised at once.
    ///
    /// # Errors
    /// As for [`Polynomial::multiply`].
    pub fn power(&self, exponent: u32) -> Result<Polynomial, Trouble> {
        if let (1, Some((exponents, Coefficient::Integer(one)))) =
            (self.terms.len(), self.terms.first_key_value())
            && one.is_one()
        {
            let mut raised = [0u32; 3];
            for at in 0..3 {
                raised[at] = exponents[at].checked_mul(exponent).ok_or_else(|| {
                    Trouble::new(catalogue::LIMIT, "an exponent of x passes 2^32")
                })?;
            }
            return Ok(Polynomial {
                terms: BTreeMap::from([(raised, Coefficient::Integer(BigInt::one()))]),
            });
        }
        let mut result = Polynomial::constant(Coefficient::Integer(BigInt::one()));
        for bit in (0..32 - exponent.leading_zeros()).rev() {
            result = result.multiply(&result)?;
            if exponent >> bit & 1 == 1 {
                result = result.multiply(self)?;
            }
        }
        Ok(result)
    }

    /// The coefficients over `field`, lowest first, without trailing zeros, of a polynomial in x
    /// alone; at most `longest` of them.
    ///
    /// # Errors
    /// When y or z occurs, a coefficient is no element of the field, or the degree is too high.
    pub fn coefficients(&self, field: &Field, longest: usize) -> Result<Vec<Element>, Trouble> {
        let mut coefficients = Vec::new();
        for (exponents, coefficient) in &self.terms {
            if exponents[1] != 0 || exponents[2] != 0 {
                return Err(Trouble::new(
                    catalogue::WRONG_TYPE,
                    "a polynomial in x alone is needed here",
                ));
            }
            let value = coefficient.in_field(field)?;
            let at = exponents[0] as usize;
            if at >= longest {
                return Err(Trouble::new(
                    catalogue::LIMIT,
                    format!("the polynomial's degree {at} is above {}", longest - 1),
                ));
            }
            if value != 0 {
                if coefficients.len() <= at {
                    coefficients.resize(at + 1, 0);
                }
                coefficients[at] = value;
            }
        }
        Ok(coefficients)
    }
}

impl fmt::Display for Polynomial {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        if self.terms.is_empty() {
            return formatter.write_str("0");
        }
        for (at, (exponents, coefficient)) in self.terms.iter().rev().enumerate() {
            if at > 0 {
                formatter.write_str(" + ")?;
            }
            let number = match coefficient {
                Coefficient::Integer(value) => value.to_string(),
                Coefficient::Element(_, value) => value.to_string(),
            };
            let powers: Vec<String> = (0..3)
                .filter(|&index| exponents[index] > 0)
                .map(|index| match exponents[index] {
                    1 => VARIABLES[index].to_string(),
                    exponent => format!("{}^{exponent}", VARIABLES[index]),
                })
                .collect();
            match (number.as_str(), powers.is_empty()) {
                ("1", false) => write!(formatter, "{}", powers.join("*"))?,
                (_, true) => write!(formatter, "{number}")?,
                _ => write!(formatter, "{number}*{}", powers.join("*"))?,
            }
        }
        Ok(())
    }
}
