//! Multiplication before there is a field: what checks a modulus and finds a generator.

use super::Element;
use super::residues::Residues;
use crate::algebra::numbers::{factor_u64, pow_mod, reduce_order};

/// Multiplication before there is a field: modulo p for degree 1, modulo the polynomial above.
pub(super) enum Calculator {
    Modular { p: u64, root: Element },
    Residues(Residues),
}

impl Calculator {
    pub(super) fn new(p: u32, modulus: &[u32]) -> Calculator {
        match modulus {
            [constant, _] => Calculator::Modular {
                p: u64::from(p),
                root: (p - constant) % p,
            },
            _ => Calculator::Residues(Residues::new(p, modulus)),
        }
    }

    pub(super) fn root(&self) -> Element {
        match self {
            Calculator::Modular { root, .. } => *root,
            Calculator::Residues(residues) => residues.root(),
        }
    }

    pub(super) fn pow(&self, base: Element, exponent: u64) -> Element {
        match self {
            Calculator::Modular { p, .. } => pow_mod(u64::from(base), exponent, *p) as u32,
            Calculator::Residues(residues) => residues.pow(base, exponent),
        }
    }

    /// The order of an element in a field of q elements; 0 for zero.
    pub(super) fn order(&self, element: Element, q: u64) -> u64 {
        if element == 0 {
            return 0;
        }
        reduce_order(q - 1, |exponent| self.pow(element, exponent) == 1)
    }
}

/// The least primitive element as an integer.
pub(super) fn least_primitive(calculator: &Calculator, order: u64) -> Element {
    let primes = factor_u64(order - 1);
    (1..order as u32)
        .find(|&element| {
            primes
                .iter()
                .all(|(prime, _)| calculator.pow(element, (order - 1) / prime) != 1)
        })
        .expect("the multiplicative group of a finite field is cyclic")
}
