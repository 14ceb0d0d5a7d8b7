//! Finite fields GF(p^m) with elements named by integers.
//!
//! A field is a shared set of tables behind an [`Arc`]; clones and renamings of the generator cost
//! nothing. Prime fields (p < 2^31) calculate; extensions up to 2^20 elements look logarithms up;
//! extensions up to 2^24 multiply polynomials. See [`conway`] for the modulus taken when none is
//! stated, and [`embedding`] for the way from a subfield up and back.

mod arithmetic;
pub mod basis;
mod calculator;
pub mod conway;
pub mod embedding;
mod format;
mod residues;
mod tables;

use std::fmt;
use std::sync::{Arc, OnceLock};

use super::numbers::is_prime;
pub use basis::Basis;
use calculator::{Calculator, least_primitive};
pub use embedding::Embedding;
pub use format::format_polynomial;
use residues::{add_digits, least_factor};
pub use tables::ByteTables;
use tables::{Logarithms, Products, Steps, Sums, TABLE_LIMIT};

/// An element of a field, as an integer in `0..q`: its digits in base p are the coefficients in
/// the polynomial basis 1, a, a², …, lowest first. Zero is 0 and one is 1 in every field.
pub type Element = u32;

/// Prime fields are supported below this order.
pub const PRIME_LIMIT: u64 = 1 << 31;

/// Extension fields are supported up to this order.
pub const EXTENSION_LIMIT: u64 = 1 << 24;

/// A finite field. Cheap to clone; equal when characteristic, degree and modulus are equal.
#[derive(Clone)]
pub struct Field {
    data: Arc<Data>,
    symbol: Arc<str>,
}

struct Data {
    characteristic: u32,
    degree: u32,
    order: u64,
    modulus: Vec<u32>,
    generator: Element,
    sums: Sums,
    products: Products,
    bytes: OnceLock<ByteTables>,
    logarithms: OnceLock<Logarithms>,
    steps: OnceLock<Steps>,
}

/// Why a field cannot be made.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum FieldError {
    /// The order is no prime power.
    NotPrimePower,
    /// The order is above what is supported.
    TooLarge,
    /// The modulus is not monic of the field's degree.
    WrongDegree {
        /// The degree of the stated modulus.
        stated: usize,
    },
    /// The modulus is a product; `factor` divides it (coefficients, lowest first).
    Reducible {
        /// A monic proper factor, coefficients lowest first.
        factor: Vec<u32>,
    },
    /// The modulus is irreducible, but its root has a smaller order than q − 1.
    NotPrimitive {
        /// The multiplicative order of the root; 0 for the modulus x, whose root is zero.
        order: u64,
    },
}

impl Field {
    /// GF(p) for a prime p below 2^31; its generator is the least primitive root.
    ///
    /// # Errors
    /// [`FieldError::NotPrimePower`] when p is not prime, [`FieldError::TooLarge`].
    pub fn prime(p: u64) -> Result<Field, FieldError> {
        Field::conway(p, 1)
    }

    /// GF(p^m) by a monic modulus of degree m ≥ 1 over GF(p), coefficients lowest first, leading 1
    /// included; coefficients count modulo p. With `primitive`, its root must generate the field;
    /// otherwise the generator is the root when that is primitive, else the least primitive
    /// element as an integer. For m = 1 the modulus is x − g.
    ///
    /// # Errors
    /// See [`FieldError`]; [`FieldError::WrongDegree`] when the modulus is constant or not monic.
    pub fn with_modulus(p: u32, modulus: &[u32], primitive: bool) -> Result<Field, FieldError> {
        if !is_prime(u64::from(p)) {
            return Err(FieldError::NotPrimePower);
        }
        let mut modulus: Vec<u32> = modulus.iter().map(|coefficient| coefficient % p).collect();
        while modulus.last() == Some(&0) {
            modulus.pop();
        }
        let degree = modulus.len().saturating_sub(1);
        if degree == 0 || modulus[degree] != 1 {
            return Err(FieldError::WrongDegree { stated: degree });
        }
        let order = supported_order(u64::from(p), degree as u64)?;
        if let Some(factor) = (degree > 1).then(|| least_factor(p, &modulus)).flatten() {
            return Err(FieldError::Reducible { factor });
        }
        let calculator = Calculator::new(p, &modulus);
        let root_order = calculator.order(calculator.root(), order);
        let generator = if root_order == order - 1 {
            calculator.root()
        } else if primitive {
            return Err(FieldError::NotPrimitive { order: root_order });
        } else {
            least_primitive(&calculator, order)
        };
        Ok(Field::assemble(p, modulus, order, generator, calculator))
    }

    /// A field whose modulus is known to be irreducible and whose generator is known to be one.
    fn assemble(
        p: u32,
        modulus: Vec<u32>,
        order: u64,
        generator: Element,
        calculator: Calculator,
    ) -> Field {
        let (products, sums) = match calculator {
            Calculator::Modular { .. } if p == 2 => (Products::Modular, Sums::Xor),
            Calculator::Modular { .. } => (Products::Modular, Sums::Modular),
            Calculator::Residues(residues) if order > TABLE_LIMIT => {
                let sums = if p == 2 { Sums::Xor } else { Sums::Digits };
                (Products::Residues(residues), sums)
            }
            Calculator::Residues(residues) => {
                let logarithms = Logarithms::new(order, |element| residues.mul(generator, element));
                let sums = if p == 2 {
                    Sums::Xor
                } else if order <= 256 {
                    Sums::Table(all_sums(p, order as usize))
                } else {
                    Sums::Successors(logarithms.successors(p))
                };
                (Products::Logarithms(logarithms), sums)
            }
        };
        Field {
            data: Arc::new(Data {
                characteristic: p,
                degree: modulus.len() as u32 - 1,
                order,
                modulus,
                generator,
                sums,
                products,
                bytes: OnceLock::new(),
                logarithms: OnceLock::new(),
                steps: OnceLock::new(),
            }),
            symbol: "a".into(),
        }
    }

    /// The same field whose generator is written `symbol` (`a` unless said).
    pub fn with_symbol(&self, symbol: &str) -> Field {
        Field {
            data: self.data.clone(),
            symbol: symbol.into(),
        }
    }

    /// How the generator is written.
    pub fn symbol(&self) -> &str {
        &self.symbol
    }

    /// q, the number of elements.
    pub fn order(&self) -> u64 {
        self.data.order
    }

    /// p.
    pub fn characteristic(&self) -> u32 {
        self.data.characteristic
    }

    /// m, the degree over GF(p).
    pub fn degree(&self) -> u32 {
        self.data.degree
    }

    /// The modulus over GF(p), coefficients lowest first, leading 1 included (length m + 1).
    pub fn modulus(&self) -> &[u32] {
        &self.data.modulus
    }

    /// A primitive element: the root of the modulus when that is primitive.
    pub fn generator(&self) -> Element {
        self.data.generator
    }

    /// Whether this is GF(2).
    pub fn is_binary(&self) -> bool {
        self.data.order == 2
    }
}

/// p^m where it is supported.
fn supported_order(p: u64, m: u64) -> Result<u64, FieldError> {
    let limit = if m == 1 {
        PRIME_LIMIT - 1
    } else {
        EXTENSION_LIMIT
    };
    u32::try_from(m)
        .ok()
        .and_then(|m| p.checked_pow(m))
        .filter(|&order| order <= limit)
        .ok_or(FieldError::TooLarge)
}

fn all_sums(p: u32, order: usize) -> Vec<u8> {
    (0..order * order)
        .map(|at| add_digits(p, (at / order) as u32, (at % order) as u32) as u8)
        .collect()
}

impl PartialEq for Field {
    fn eq(&self, other: &Field) -> bool {
        let (left, right) = (&self.data, &other.data);
        Arc::ptr_eq(left, right)
            || (left.characteristic == right.characteristic
                && (left.degree == 1 && right.degree == 1 || left.modulus == right.modulus))
    }
}

impl Eq for Field {}

impl fmt::Debug for Field {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(formatter, "GF({})", self.data.order)
    }
}

impl fmt::Display for Field {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(formatter, "GF({})", self.data.order)
    }
}

#[cfg(test)]
mod tests;
