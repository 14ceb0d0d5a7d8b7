//! Points of a space over a field, and monomials to evaluate there.

use crate::algebra::{Element, Field};

/// Points in m coordinates over a field, in order, each once.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Points {
    /// The field.
    pub field: Field,
    /// m.
    pub variables: usize,
    /// The coordinates of each point.
    pub coordinates: Vec<Vec<Element>>,
}

/// Monomials in m variables, each an exponent vector with entries below q, in order, each once.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Monomials {
    /// m.
    pub variables: usize,
    /// The exponents of each monomial.
    pub exponents: Vec<Vec<u32>>,
}

impl Points {
    /// How many.
    pub fn len(&self) -> usize {
        self.coordinates.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.coordinates.is_empty()
    }

    /// Whether they are all q^m points of the space.
    pub fn is_whole_space(&self) -> bool {
        u32::try_from(self.variables)
            .ok()
            .and_then(|variables| self.field.order().checked_pow(variables))
            .is_some_and(|count| count == self.len() as u64)
    }
}

impl Monomials {
    /// How many.
    pub fn len(&self) -> usize {
        self.exponents.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.exponents.is_empty()
    }

    /// Whether with each monomial every divisor of it is there too.
    pub fn is_divisor_closed(&self) -> bool {
        let known: std::collections::HashSet<&Vec<u32>> = self.exponents.iter().collect();
        self.exponents.iter().all(|exponents| {
            (0..exponents.len()).all(|at| {
                exponents[at] == 0 || {
                    let mut divisor = exponents.clone();
                    divisor[at] -= 1;
                    known.contains(&divisor)
                }
            })
        })
    }

    /// The value of a monomial at a point.
    pub fn evaluate(field: &Field, exponents: &[u32], point: &[Element]) -> Element {
        exponents
            .iter()
            .zip(point)
            .fold(1, |product, (&exponent, &coordinate)| {
                field.mul(product, field.pow(coordinate, u64::from(exponent)))
            })
    }
}
