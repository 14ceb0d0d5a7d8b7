//! Polynomials in one variable over a finite field.
//!
//! Dense, by schoolbook methods: degrees are those of cyclic codes, some thousands at most. See
//! [`roots`] for generator polynomials given by their roots.

pub mod roots;
mod splitting;
#[cfg(test)]
mod tests;

use std::fmt;

use super::{Element, Field};
use crate::algebra::numbers::factor_u64;

/// A polynomial in one variable; the zero polynomial has no coefficients.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Polynomial {
    field: Field,
    coefficients: Vec<Element>,
}

impl Polynomial {
    /// By its coefficients, lowest first; zeros at the end are dropped.
    pub fn new(field: &Field, mut coefficients: Vec<Element>) -> Polynomial {
        while coefficients.last() == Some(&0) {
            coefficients.pop();
        }
        Polynomial {
            field: field.clone(),
            coefficients,
        }
    }

    /// The zero polynomial.
    pub fn zero(field: &Field) -> Polynomial {
        Polynomial::new(field, Vec::new())
    }

    /// The constant 1.
    pub fn one(field: &Field) -> Polynomial {
        Polynomial::new(field, vec![1])
    }

    /// `coefficient · x^power`.
    pub fn monomial(field: &Field, coefficient: Element, power: usize) -> Polynomial {
        let mut coefficients = vec![0; power + 1];
        coefficients[power] = coefficient;
        Polynomial::new(field, coefficients)
    }

    /// `x^n − 1`; n ≥ 1.
    pub fn cyclic_modulus(field: &Field, n: usize) -> Polynomial {
        Polynomial::monomial(field, 1, n).sub(&Polynomial::one(field))
    }

    /// The monic polynomial with the given roots, repeated as given.
    pub fn from_roots(field: &Field, roots: &[Element]) -> Polynomial {
        let mut coefficients = vec![1];
        for &root in roots {
            let negative = field.neg(root);
            coefficients.push(1);
            for at in (0..coefficients.len() - 1).rev() {
                let lower = if at > 0 { coefficients[at - 1] } else { 0 };
                coefficients[at] = field.add(lower, field.mul(negative, coefficients[at]));
            }
        }
        Polynomial::new(field, coefficients)
    }

    /// The field of its coefficients.
    pub fn field(&self) -> &Field {
        &self.field
    }

    /// The coefficients, lowest first, without zeros at the end.
    pub fn coefficients(&self) -> &[Element] {
        &self.coefficients
    }

    /// The coefficient of `x^power`.
    pub fn coefficient(&self, power: usize) -> Element {
        self.coefficients.get(power).copied().unwrap_or(0)
    }

    /// The degree; `None` for zero.
    pub fn degree(&self) -> Option<usize> {
        self.coefficients.len().checked_sub(1)
    }

    /// Whether it is zero.
    pub fn is_zero(&self) -> bool {
        self.coefficients.is_empty()
    }

    /// The coefficient of the highest power; 0 for zero.
    pub fn leading(&self) -> Element {
        self.coefficients.last().copied().unwrap_or(0)
    }

    fn map(&self, entry: impl FnMut(&Element) -> Element) -> Polynomial {
        Polynomial::new(&self.field, self.coefficients.iter().map(entry).collect())
    }

    /// The sum.
    pub fn add(&self, other: &Polynomial) -> Polynomial {
        let length = self.coefficients.len().max(other.coefficients.len());
        let sums = (0..length)
            .map(|at| self.field.add(self.coefficient(at), other.coefficient(at)))
            .collect();
        Polynomial::new(&self.field, sums)
    }

    /// The polynomial that sums with this one to zero.
    pub fn neg(&self) -> Polynomial {
        self.map(|&coefficient| self.field.neg(coefficient))
    }

    /// The difference.
    pub fn sub(&self, other: &Polynomial) -> Polynomial {
        self.add(&other.neg())
    }

    /// Every coefficient times `factor`.
    pub fn scale(&self, factor: Element) -> Polynomial {
        self.map(|&coefficient| self.field.mul(factor, coefficient))
    }

    /// The product.
    pub fn mul(&self, other: &Polynomial) -> Polynomial {
        if self.is_zero() || other.is_zero() {
            return Polynomial::zero(&self.field);
        }
        let mut product = vec![0; self.coefficients.len() + other.coefficients.len() - 1];
        for (at, &coefficient) in self.coefficients.iter().enumerate() {
            self.field
                .add_multiple(&mut product[at..], coefficient, &other.coefficients);
        }
        Polynomial::new(&self.field, product)
    }

    /// Quotient and remainder.
    ///
    /// # Panics
    /// When `divisor` is zero.
    pub fn div_rem(&self, divisor: &Polynomial) -> (Polynomial, Polynomial) {
        let field = &self.field;
        let size = divisor.degree().expect("division by the zero polynomial");
        let scale = field
            .inv(divisor.leading())
            .expect("a leading coefficient is not zero");
        let mut rest = self.coefficients.clone();
        let mut quotient = vec![0; rest.len().saturating_sub(size)];
        for low in (0..quotient.len()).rev() {
            let factor = field.mul(rest[low + size], scale);
            quotient[low] = factor;
            field.add_multiple(&mut rest[low..], field.neg(factor), &divisor.coefficients);
        }
        rest.truncate(size);
        (
            Polynomial::new(field, quotient),
            Polynomial::new(field, rest),
        )
    }

    /// The remainder; see [`Polynomial::div_rem`].
    pub fn rem(&self, divisor: &Polynomial) -> Polynomial {
        self.div_rem(divisor).1
    }

    /// This polynomial divided by its leading coefficient; zero stays zero.
    pub fn monic(&self) -> Polynomial {
        match self.field.inv(self.leading()) {
            Some(1) | None => self.clone(),
            Some(scale) => self.scale(scale),
        }
    }

    /// The monic greatest common divisor; zero when both are.
    pub fn gcd(&self, other: &Polynomial) -> Polynomial {
        let (mut left, mut right) = (self.clone(), other.clone());
        while !right.is_zero() {
            let rest = left.rem(&right);
            (left, right) = (right, rest);
        }
        left.monic()
    }

    /// The monic least common multiple; zero when either is.
    pub fn lcm(&self, other: &Polynomial) -> Polynomial {
        if self.is_zero() || other.is_zero() {
            return Polynomial::zero(&self.field);
        }
        self.div_rem(&self.gcd(other)).0.mul(other).monic()
    }

    /// The value at a point.
    pub fn evaluate(&self, point: Element) -> Element {
        self.coefficients
            .iter()
            .rev()
            .fold(0, |value, &coefficient| {
                self.field.add(self.field.mul(value, point), coefficient)
            })
    }

    /// The formal derivative.
    pub fn derivative(&self) -> Polynomial {
        let p = self.field.characteristic() as usize;
        let coefficients = self.coefficients.iter().enumerate().skip(1);
        let derived = coefficients
            .map(|(power, &coefficient)| self.field.mul((power % p) as u32, coefficient))
            .collect();
        Polynomial::new(&self.field, derived)
    }

    /// The power modulo `modulus`, which is not zero.
    pub fn pow_mod(&self, mut exponent: u64, modulus: &Polynomial) -> Polynomial {
        let mut square = self.rem(modulus);
        let mut power = Polynomial::one(&self.field).rem(modulus);
        while exponent > 0 {
            if exponent & 1 == 1 {
                power = power.mul(&square).rem(modulus);
            }
            exponent >>= 1;
            if exponent > 0 {
                square = square.mul(&square).rem(modulus);
            }
        }
        power
    }

    /// Whether it has degree at least 1 and no proper factor (M. Rabin, 1980).
    pub fn is_irreducible(&self) -> bool {
        let Some(degree) = self.degree().filter(|&degree| degree > 0) else {
            return false;
        };
        let q = self.field.order();
        let x = Polynomial::monomial(&self.field, 1, 1).rem(self);
        let checks: Vec<usize> = factor_u64(degree as u64)
            .iter()
            .map(|&(prime, _)| degree / prime as usize)
            .collect();
        let mut power = x.clone();
        for step in 1..=degree {
            power = power.pow_mod(q, self);
            if checks.contains(&step) && self.gcd(&power.sub(&x)).degree() != Some(0) {
                return false;
            }
        }
        power == x
    }
}

impl fmt::Display for Polynomial {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.write_str(&super::format_polynomial(&self.coefficients, "x"))
    }
}
