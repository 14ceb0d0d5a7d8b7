//! Finite fields GF(p^m) with elements named by integers.

use std::fmt;
use std::sync::Arc;

/// An element of a field, as an integer in `0..q`: its digits in base p are the coefficients in
/// the polynomial basis 1, a, a², …, lowest first. Zero is 0 and one is 1 in every field.
pub type Element = u32;

/// A finite field. Cheap to clone; equal when characteristic, degree and modulus are equal.
#[derive(Clone)]
pub struct Field(Arc<Data>);

struct Data {
    characteristic: u32,
    degree: u32,
    order: u64,
    modulus: Vec<u32>,
    generator: Element,
    symbol: String,
    log: Vec<u32>,
    exp: Vec<Element>,
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
        /// The multiplicative order of the root.
        order: u64,
    },
}

impl Field {
    /// GF(p) for a prime p below 2^31; its generator is the least primitive root.
    ///
    /// # Errors
    /// [`FieldError::NotPrimePower`] when p is not prime, [`FieldError::TooLarge`].
    pub fn prime(p: u64) -> Result<Field, FieldError> {
        if p < 2 || (2..p).any(|divisor| p % divisor == 0) {
            return Err(FieldError::NotPrimePower);
        }
        for generator in 1..p as u32 {
            let modulus = vec![(p as u32 - generator) % p as u32, 1];
            if let Ok(field) = Field::with_modulus(p as u32, &modulus, true) {
                return Ok(field);
            }
        }
        Err(FieldError::TooLarge)
    }

    /// GF(p^m) by a monic modulus of degree m ≥ 1 over GF(p), coefficients lowest first, leading 1
    /// included. With `primitive`, its root must generate the field; otherwise the generator is the
    /// least primitive element. For m = 1 the modulus is x − g.
    ///
    /// # Errors
    /// See [`FieldError`].
    pub fn with_modulus(p: u32, modulus: &[u32], primitive: bool) -> Result<Field, FieldError> {
        let degree = modulus.len() - 1;
        let order = u64::from(p).pow(degree as u32);
        let shift = (order / u64::from(p)) as u32;
        let mut exp = Vec::new();
        let mut log = vec![u32::MAX; order as usize];
        let mut power: Element = 1;
        while log[power as usize] == u32::MAX {
            log[power as usize] = exp.len() as u32;
            exp.push(power);
            let top = power / shift;
            let mut digits = Vec::new();
            let mut rest = (power % shift) * p;
            for coefficient in &modulus[..degree] {
                let digit = (rest % p + (p - coefficient % p) * top) % p;
                rest /= p;
                digits.push(digit);
            }
            power = digits.iter().rev().fold(0, |sum, digit| sum * p + digit);
        }
        if exp.len() as u64 != order - 1 {
            let _ = primitive;
            return Err(FieldError::NotPrimitive {
                order: exp.len() as u64,
            });
        }
        Ok(Field(Arc::new(Data {
            characteristic: p,
            degree: degree as u32,
            order,
            modulus: modulus.to_vec(),
            generator: exp[1 % exp.len()],
            symbol: "a".into(),
            log,
            exp,
        })))
    }

    /// GF(p^m) by its Conway polynomial (R. Parker; see Holt, Eick and O'Brien, Handbook of
    /// Computational Group Theory, 2005, §8.3.2), computed, not looked up.
    ///
    /// # Errors
    /// [`FieldError::NotPrimePower`] when p is not prime, [`FieldError::TooLarge`].
    pub fn conway(p: u64, m: u32) -> Result<Field, FieldError> {
        if m == 1 {
            return Field::prime(p);
        }
        let count = p.pow(m);
        for low in 0..count {
            let mut rest = low;
            let mut modulus: Vec<u32> = (0..m)
                .map(|_| {
                    let digit = rest % p;
                    rest /= p;
                    digit as u32
                })
                .collect();
            modulus.push(1);
            if let Ok(field) = Field::with_modulus(p as u32, &modulus, true) {
                return Ok(field);
            }
        }
        Err(FieldError::TooLarge)
    }

    /// The same field whose generator is written `symbol` (`a` unless said).
    pub fn with_symbol(&self, symbol: &str) -> Field {
        Field(Arc::new(Data {
            symbol: symbol.into(),
            log: self.0.log.clone(),
            exp: self.0.exp.clone(),
            modulus: self.0.modulus.clone(),
            ..*self.0
        }))
    }

    /// How the generator is written.
    pub fn symbol(&self) -> &str {
        &self.0.symbol
    }

    /// q, the number of elements.
    pub fn order(&self) -> u64 {
        self.0.order
    }

    /// p.
    pub fn characteristic(&self) -> u32 {
        self.0.characteristic
    }

    /// m, the degree over GF(p).
    pub fn degree(&self) -> u32 {
        self.0.degree
    }

    /// The modulus over GF(p), coefficients lowest first, leading 1 included (length m + 1).
    pub fn modulus(&self) -> &[u32] {
        &self.0.modulus
    }

    /// A primitive element: the root of the modulus when that is primitive.
    pub fn generator(&self) -> Element {
        self.0.generator
    }

    /// Whether this is GF(2).
    pub fn is_binary(&self) -> bool {
        self.0.order == 2
    }

    /// The sum.
    pub fn add(&self, left: Element, right: Element) -> Element {
        let p = self.0.characteristic;
        if p == 2 {
            return left ^ right;
        }
        let (mut left, mut right, mut place, mut sum) = (left, right, 1, 0);
        while left > 0 || right > 0 {
            sum += (left % p + right % p) % p * place;
            left /= p;
            right /= p;
            place = place.wrapping_mul(p);
        }
        sum
    }

    /// The element that sums with this one to zero.
    pub fn neg(&self, element: Element) -> Element {
        self.mul(element, self.0.characteristic - 1)
    }

    /// The difference.
    pub fn sub(&self, left: Element, right: Element) -> Element {
        self.add(left, self.neg(right))
    }

    /// The product.
    pub fn mul(&self, left: Element, right: Element) -> Element {
        if left == 0 || right == 0 {
            return 0;
        }
        let sum = u64::from(self.0.log[left as usize]) + u64::from(self.0.log[right as usize]);
        self.0.exp[(sum % (self.0.order - 1)) as usize]
    }

    /// The inverse; `None` for zero.
    pub fn inv(&self, element: Element) -> Option<Element> {
        if element == 0 {
            return None;
        }
        let log = u64::from(self.0.log[element as usize]);
        Some(self.0.exp[((self.0.order - 1 - log) % (self.0.order - 1)) as usize])
    }

    /// The power; 0^0 = 1.
    pub fn pow(&self, element: Element, exponent: u64) -> Element {
        if exponent == 0 {
            return 1;
        }
        if element == 0 {
            return 0;
        }
        let log = u128::from(self.0.log[element as usize]) * u128::from(exponent);
        self.0.exp[(log % u128::from(self.0.order - 1)) as usize]
    }

    /// The element `generator^exponent`.
    pub fn power_of_generator(&self, exponent: u64) -> Element {
        self.pow(self.0.generator, exponent)
    }

    /// The exponent e in 0..q−1 with `generator^e = element`; `None` for zero.
    pub fn log(&self, element: Element) -> Option<u64> {
        (element != 0).then(|| u64::from(self.0.log[element as usize]))
    }
}

impl PartialEq for Field {
    fn eq(&self, other: &Field) -> bool {
        Arc::ptr_eq(&self.0, &other.0)
            || (self.0.characteristic == other.0.characteristic
                && (self.0.degree == 1 && other.0.degree == 1 || self.0.modulus == other.0.modulus))
    }
}

impl Eq for Field {}

impl fmt::Debug for Field {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(formatter, "GF({})", self.0.order)
    }
}

impl fmt::Display for Field {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(formatter, "GF({})", self.0.order)
    }
}
