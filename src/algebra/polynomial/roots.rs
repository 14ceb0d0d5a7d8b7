//! Generator polynomials of cyclic codes, given by exponents of their roots.
//!
//! The roots are powers of one primitive n-th root of unity β, and which β is meant decides which
//! code it is. [`RootConvention`] says how β was chosen, for reports to repeat. In a field with Q
//! elements and generator a, β = a^((Q−1)/n).

use std::collections::BTreeSet;
use std::fmt;

use super::Polynomial;
use super::splitting::PowerTable;
use crate::algebra::numbers::{gcd, order_modulo};
use crate::algebra::{Element, Embedding, Field};

/// Above this order of the splitting field, β is a root of a cyclotomic factor.
const CONWAY_LIMIT: u64 = 1 << 20;

/// Above [`CONWAY_LIMIT`], cyclotomic polynomials are factored while n² · log₂ q is at most this: a
/// few seconds' work.
const FACTORING_LIMIT: u64 = 1 << 27;

/// A generator polynomial and the roots it has.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct CyclicRoots {
    /// The monic polynomial of least degree over the field with the roots asked for; divides x^n − 1.
    pub generator: Polynomial,
    /// All exponents e in 0..n with β^e a root of the generator: the closure under e → q·e.
    pub exponents: BTreeSet<u64>,
    /// m, the degree of the splitting field over the field.
    pub extension_degree: u64,
    /// How β was chosen.
    pub convention: RootConvention,
}

/// How the primitive n-th root of unity β was chosen.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum RootConvention {
    /// A power of the generator of the code's own field, which holds the n-th roots.
    OwnField(Field),
    /// A power of the generator of the root field that was stated.
    Stated(Field),
    /// A power of the generator of the smallest Conway field that holds the n-th roots.
    Conway(Field),
    /// A root of this polynomial over the code's field, the least irreducible factor of the n-th
    /// cyclotomic polynomial: factors are compared coefficient by coefficient, highest power first.
    LeastFactor(Polynomial),
}

impl RootConvention {
    /// Whether a reader could not have known it from the spec alone.
    pub fn is_assumed(&self) -> bool {
        matches!(
            self,
            RootConvention::Conway(_) | RootConvention::LeastFactor(_)
        )
    }
}

impl fmt::Display for RootConvention {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        let field = match self {
            RootConvention::LeastFactor(factor) => {
                return write!(formatter, "the first root is a root of {factor}");
            }
            RootConvention::OwnField(field)
            | RootConvention::Stated(field)
            | RootConvention::Conway(field) => field,
        };
        let symbol = field.symbol();
        let modulus = super::super::format_polynomial(field.modulus(), symbol);
        if field.degree() == 1 {
            let generator = field.generator();
            write!(formatter, "roots are powers of {generator} in {field}")
        } else {
            write!(
                formatter,
                "roots are powers of {symbol} in {field}, modulus {modulus}"
            )
        }
    }
}

/// Why there is no generator polynomial.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum RootError {
    /// The length is zero.
    EmptyLength,
    /// Length and q share a factor, so x^n − 1 has repeated roots.
    SharedFactor {
        /// The greatest common divisor of length and characteristic power.
        factor: u64,
    },
    /// The root field does not contain the code's field.
    NotAnExtension,
    /// The root field has no primitive n-th root of unity.
    NoPrimitiveRoot {
        /// Its degree over the code's field would have to be a multiple of this.
        degree: u64,
    },
    /// The splitting field is too large to work in at this length.
    TooLarge {
        /// Its degree over the code's field.
        degree: u64,
    },
}

/// The q-cyclotomic coset {s, qs, q²s, …} modulo n, in that order, n ≥ 1; it ends where it would
/// repeat. With gcd(n, q) = 1 it is a cycle.
pub fn cyclotomic_coset(q: u64, s: u64, n: u64) -> Vec<u64> {
    let mut coset = vec![s % n];
    let mut seen = BTreeSet::from([s % n]);
    loop {
        let last = u128::from(coset[coset.len() - 1]);
        let next = (last * u128::from(q) % u128::from(n)) as u64;
        if !seen.insert(next) {
            return coset;
        }
        coset.push(next);
    }
}

/// The generator polynomial over `field` of the cyclic code of this length whose roots include
/// β^e for the given exponents (taken modulo the length). β is taken from `root_field` when stated;
/// else from `field` itself when length divides q − 1; else from the Conway field of q^m ≤ 2^20
/// elements; else it is a root of the least factor of the cyclotomic polynomial.
///
/// # Errors
/// See [`RootError`].
pub fn generator_from_roots(
    field: &Field,
    length: u64,
    exponents: &BTreeSet<u64>,
    root_field: Option<&Field>,
) -> Result<CyclicRoots, RootError> {
    if length == 0 {
        return Err(RootError::EmptyLength);
    }
    let q = field.order();
    let degree = order_modulo(q, length).ok_or(RootError::SharedFactor {
        factor: gcd(q, length),
    })?;
    let convention = choose(field, length, degree, root_field)?;
    let cosets = cosets_of(q, length, exponents);
    let exponents: BTreeSet<u64> = cosets.iter().flatten().copied().collect();
    // With more roots than not, the roots left out are less work: their polynomial divides x^n − 1.
    let complement = exponents.len() as u64 > length / 2;
    let needed = if complement {
        let others = (0..length)
            .filter(|exponent| !exponents.contains(exponent))
            .collect();
        cosets_of(q, length, &others)
    } else {
        cosets
    };
    let mut generator = match &convention {
        RootConvention::LeastFactor(factor) => {
            let powers = PowerTable::new(factor, length as usize);
            let minimal = needed
                .iter()
                .map(|coset| powers.minimal_polynomial(coset[0]));
            product(field, minimal)
        }
        RootConvention::OwnField(large)
        | RootConvention::Stated(large)
        | RootConvention::Conway(large) => {
            let embedding = large.embedding_of(field).ok_or(RootError::NotAnExtension)?;
            generator_in(&embedding, length, &needed)
        }
    };
    if complement {
        let modulus = Polynomial::cyclic_modulus(field, length as usize);
        generator = modulus.div_rem(&generator).0;
    }
    Ok(CyclicRoots {
        generator,
        exponents,
        extension_degree: degree,
        convention,
    })
}

fn choose(
    field: &Field,
    length: u64,
    degree: u64,
    root_field: Option<&Field>,
) -> Result<RootConvention, RootError> {
    if let Some(stated) = root_field {
        let contains = stated.characteristic() == field.characteristic()
            && stated.degree() % field.degree() == 0;
        return if !contains {
            Err(RootError::NotAnExtension)
        } else if (stated.order() - 1) % length != 0 {
            Err(RootError::NoPrimitiveRoot { degree })
        } else {
            Ok(RootConvention::Stated(stated.clone()))
        };
    }
    if degree == 1 {
        return Ok(RootConvention::OwnField(field.clone()));
    }
    let order = u32::try_from(degree)
        .ok()
        .and_then(|degree| field.order().checked_pow(degree));
    if order.is_some_and(|order| order <= CONWAY_LIMIT) {
        let total = field.degree() * degree as u32;
        let large = Field::conway(u64::from(field.characteristic()), total)
            .expect("fields up to the limit are supported");
        return Ok(RootConvention::Conway(large));
    }
    let work = u128::from(length).pow(2) * u128::from(field.order().ilog2());
    if work > u128::from(FACTORING_LIMIT) {
        return Err(RootError::TooLarge { degree });
    }
    let factor = super::splitting::least_cyclotomic_factor(field, length as usize);
    Ok(RootConvention::LeastFactor(factor))
}

fn cosets_of(q: u64, length: u64, exponents: &BTreeSet<u64>) -> Vec<Vec<u64>> {
    let mut seen = BTreeSet::new();
    let mut cosets = Vec::new();
    for &exponent in exponents {
        if !seen.contains(&(exponent % length)) {
            let coset = cyclotomic_coset(q, exponent, length);
            seen.extend(coset.iter().copied());
            cosets.push(coset);
        }
    }
    cosets
}

fn generator_in(embedding: &Embedding, length: u64, cosets: &[Vec<u64>]) -> Polynomial {
    let large = embedding.field();
    let step = (large.order() - 1) / length;
    let minimal = cosets.iter().map(|coset| {
        let roots: Vec<Element> = coset
            .iter()
            .map(|exponent| large.power_of_generator(step * exponent))
            .collect();
        let coefficients = Polynomial::from_roots(large, &roots)
            .coefficients()
            .iter()
            .map(|&coefficient| {
                embedding
                    .down(coefficient)
                    .expect("conjugate roots give coefficients in the subfield")
            })
            .collect();
        Polynomial::new(embedding.sub(), coefficients)
    });
    product(embedding.sub(), minimal)
}

/// The product, pairing factors so that both sides of each product are of like degree.
fn product(field: &Field, factors: impl Iterator<Item = Polynomial>) -> Polynomial {
    let mut factors: Vec<Polynomial> = factors.collect();
    while factors.len() > 1 {
        factors = factors
            .chunks(2)
            .map(|pair| match pair {
                [left, right] => left.mul(right),
                _ => pair[0].clone(),
            })
            .collect();
    }
    factors.pop().unwrap_or_else(|| Polynomial::one(field))
}
