//! Finite fields GF(p^m) with elements named by integers.
//!
//! A field is a shared set of tables behind an [`Arc`]; clones and renamings of the generator cost
//! nothing. Prime fields (p < 2^31) calculate; extensions up to 2^20 elements look logarithms up;
//! extensions up to 2^24 multiply polynomials. See [`conway`] for the modulus taken when none is
//! stated, and [`embedding`] for the way from a subfield up and back.

pub mod basis;
pub mod conway;
pub mod embedding;
mod format;
mod residues;
mod tables;

use std::fmt;
use std::sync::{Arc, OnceLock};

use super::numbers::{factor_u64, is_prime, pow_mod, reduce_order};
pub use basis::Basis;
pub use embedding::Embedding;
pub use format::format_polynomial;
use residues::{Residues, add_digits, least_factor, neg_digits};
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

    /// The sum.
    #[inline]
    pub fn add(&self, left: Element, right: Element) -> Element {
        match &self.data.sums {
            Sums::Xor => left ^ right,
            Sums::Modular => {
                let sum = left + right;
                sum.min(sum.wrapping_sub(self.data.characteristic))
            }
            Sums::Table(table) => {
                u32::from(table[left as usize * self.data.order as usize + right as usize])
            }
            Sums::Successors(successors) => match &self.data.products {
                Products::Logarithms(logarithms) => logarithms.add(successors, left, right),
                _ => add_digits(self.data.characteristic, left, right),
            },
            Sums::Digits => add_digits(self.data.characteristic, left, right),
        }
    }

    /// The element that sums with this one to zero.
    #[inline]
    pub fn neg(&self, element: Element) -> Element {
        match (&self.data.sums, &self.data.products) {
            (Sums::Xor, _) => element,
            (_, _) if element == 0 => 0,
            (Sums::Modular, _) => self.data.characteristic - element,
            (_, Products::Logarithms(logarithms)) => {
                let half = (self.data.order as u32 - 1) / 2;
                logarithms.exp((logarithms.log(element) + half) as usize)
            }
            _ => neg_digits(self.data.characteristic, element),
        }
    }

    /// The difference.
    #[inline]
    pub fn sub(&self, left: Element, right: Element) -> Element {
        self.add(left, self.neg(right))
    }

    /// The product.
    #[inline]
    pub fn mul(&self, left: Element, right: Element) -> Element {
        match &self.data.products {
            Products::Modular => {
                (u64::from(left) * u64::from(right) % u64::from(self.data.characteristic)) as u32
            }
            Products::Logarithms(logarithms) => logarithms.mul(left, right),
            Products::Residues(residues) => residues.mul(left, right),
        }
    }

    /// The inverse; `None` for zero.
    pub fn inv(&self, element: Element) -> Option<Element> {
        if element == 0 {
            return None;
        }
        Some(match &self.data.products {
            Products::Logarithms(logarithms) => {
                let full = self.data.order as u32 - 1;
                logarithms.exp((full - logarithms.log(element)) as usize)
            }
            _ => self.pow(element, self.data.order - 2),
        })
    }

    /// The power; 0^0 = 1.
    pub fn pow(&self, element: Element, exponent: u64) -> Element {
        if exponent == 0 {
            return 1;
        }
        if element == 0 {
            return 0;
        }
        let exponent = exponent % (self.data.order - 1);
        match &self.data.products {
            Products::Modular => {
                let p = u64::from(self.data.characteristic);
                pow_mod(u64::from(element), exponent, p) as u32
            }
            Products::Logarithms(logarithms) => {
                // Both factors are below 2^20.
                let log = u64::from(logarithms.log(element)) * exponent;
                logarithms.exp((log % (self.data.order - 1)) as usize)
            }
            Products::Residues(residues) => residues.pow(element, exponent),
        }
    }

    /// The element `generator^exponent`.
    pub fn power_of_generator(&self, exponent: u64) -> Element {
        self.pow(self.data.generator, exponent)
    }

    /// The exponent e in 0..q−1 with `generator^e = element`; `None` for zero. Up to 2^20 elements
    /// by table, above in about √q steps.
    pub fn log(&self, element: Element) -> Option<u64> {
        if element == 0 {
            return None;
        }
        if let Products::Logarithms(logarithms) = &self.data.products {
            return Some(u64::from(logarithms.log(element)));
        }
        let generator = self.data.generator;
        if self.data.order <= TABLE_LIMIT {
            let logarithms = self.data.logarithms.get_or_init(|| {
                Logarithms::new(self.data.order, |element| self.mul(generator, element))
            });
            return Some(u64::from(logarithms.log(element)));
        }
        let mul = |left, right| self.mul(left, right);
        let steps = self.data.steps.get_or_init(|| {
            Steps::new(self.data.order, generator, mul, |base, exponent| {
                self.pow(base, exponent)
            })
        });
        Some(steps.log(element, mul))
    }

    /// `row += factor · other`, over the shorter of the two.
    pub fn add_multiple(&self, row: &mut [Element], factor: Element, other: &[Element]) {
        match (factor, &self.data.sums, &self.data.products) {
            (0, _, _) => {}
            (_, Sums::Xor, Products::Logarithms(logarithms)) => {
                let log = logarithms.log(factor);
                for (entry, &summand) in row.iter_mut().zip(other) {
                    if summand != 0 {
                        *entry ^= logarithms.exp((log + logarithms.log(summand)) as usize);
                    }
                }
            }
            _ => {
                for (entry, &summand) in row.iter_mut().zip(other) {
                    if summand != 0 {
                        *entry = self.add(*entry, self.mul(factor, summand));
                    }
                }
            }
        }
    }

    /// The least e ≥ 1 with `element^e = 1`; `None` for zero.
    pub fn multiplicative_order(&self, element: Element) -> Option<u64> {
        (element != 0).then(|| {
            reduce_order(self.data.order - 1, |exponent| {
                self.pow(element, exponent) == 1
            })
        })
    }

    /// All products and sums, for fields of at most 256 elements.
    pub fn byte_tables(&self) -> Option<&ByteTables> {
        (self.data.order <= 256).then(|| {
            self.data.bytes.get_or_init(|| {
                ByteTables::new(
                    self.data.order,
                    |left, right| self.mul(left, right),
                    |left, right| self.add(left, right),
                )
            })
        })
    }
}

/// Multiplication before there is a field: modulo p for degree 1, modulo the polynomial above.
enum Calculator {
    Modular { p: u64, root: Element },
    Residues(Residues),
}

impl Calculator {
    fn new(p: u32, modulus: &[u32]) -> Calculator {
        match modulus {
            [constant, _] => Calculator::Modular {
                p: u64::from(p),
                root: (p - constant) % p,
            },
            _ => Calculator::Residues(Residues::new(p, modulus)),
        }
    }

    fn root(&self) -> Element {
        match self {
            Calculator::Modular { root, .. } => *root,
            Calculator::Residues(residues) => residues.root(),
        }
    }

    fn pow(&self, base: Element, exponent: u64) -> Element {
        match self {
            Calculator::Modular { p, .. } => pow_mod(u64::from(base), exponent, *p) as u32,
            Calculator::Residues(residues) => residues.pow(base, exponent),
        }
    }

    /// The order of an element in a field of q elements; 0 for zero.
    fn order(&self, element: Element, q: u64) -> u64 {
        if element == 0 {
            return 0;
        }
        reduce_order(q - 1, |exponent| self.pow(element, exponent) == 1)
    }
}

/// The least primitive element as an integer.
fn least_primitive(calculator: &Calculator, order: u64) -> Element {
    let primes = factor_u64(order - 1);
    (1..order as u32)
        .find(|&element| {
            primes
                .iter()
                .all(|(prime, _)| calculator.pow(element, (order - 1) / prime) != 1)
        })
        .expect("the multiplicative group of a finite field is cyclic")
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
