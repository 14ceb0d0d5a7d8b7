//! GF(p)[x] modulo a polynomial, on elements packed as integers in base p, without tables.
//!
//! The slow path under every extension field: it builds the tables of the small ones, carries the
//! large ones, and searches for Conway polynomials. The modulus need not be irreducible.

use super::Element;

/// The largest degree for p = 2, where p^m ≤ 2^24; odd p have less.
const MAX_DEGREE: usize = 24;

/// Residues modulo a monic polynomial of degree 1..=24 over GF(p), p^degree ≤ 2^24.
pub(super) struct Residues {
    p: u32,
    degree: usize,
    /// For p = 2, the modulus as bits.
    bits: u32,
    /// −modulus, without its leading 1.
    negated: [u64; MAX_DEGREE],
}

impl Residues {
    /// By a monic modulus, coefficients below p, lowest first.
    pub(super) fn new(p: u32, modulus: &[u32]) -> Residues {
        let degree = modulus.len() - 1;
        let mut negated = [0; MAX_DEGREE];
        for (to, &from) in negated.iter_mut().zip(&modulus[..degree]) {
            *to = u64::from((p - from) % p);
        }
        let bits = if p == 2 {
            modulus.iter().rev().fold(0, |bits, &bit| bits << 1 | bit)
        } else {
            0
        };
        Residues {
            p,
            degree,
            bits,
            negated,
        }
    }

    /// The residue of x.
    pub(super) fn root(&self) -> Element {
        if self.degree == 1 {
            self.negated[0] as u32
        } else {
            self.p
        }
    }

    pub(super) fn add(&self, left: Element, right: Element) -> Element {
        if self.p == 2 {
            left ^ right
        } else {
            add_digits(self.p, left, right)
        }
    }

    pub(super) fn mul(&self, left: Element, right: Element) -> Element {
        if self.p == 2 {
            self.mul_bits(left, right)
        } else {
            self.mul_digits(left, right)
        }
    }

    fn mul_bits(&self, left: Element, mut right: Element) -> Element {
        let top = 1 << self.degree;
        let (mut shifted, mut product) = (left, 0);
        while right > 0 {
            product ^= shifted & (right & 1).wrapping_neg();
            right >>= 1;
            shifted <<= 1;
            if shifted & top != 0 {
                shifted ^= self.bits;
            }
        }
        product
    }

    fn mul_digits(&self, left: Element, right: Element) -> Element {
        let (degree, p) = (self.degree, u64::from(self.p));
        let (left, right) = (self.digits(left), self.digits(right));
        let mut product = [0u64; 2 * MAX_DEGREE];
        for (i, &coefficient) in left[..degree].iter().enumerate() {
            if coefficient != 0 {
                for (sum, &other) in product[i..i + degree].iter_mut().zip(&right) {
                    *sum += coefficient * other;
                }
            }
        }
        for top in (degree..2 * degree - 1).rev() {
            let coefficient = product[top] % p;
            let low = top - degree;
            for (sum, &negated) in product[low..top].iter_mut().zip(&self.negated) {
                *sum += coefficient * negated;
            }
        }
        product[..degree]
            .iter()
            .rev()
            .fold(0, |packed, &digit| packed * self.p + (digit % p) as u32)
    }

    fn digits(&self, mut element: Element) -> [u64; MAX_DEGREE] {
        let mut digits = [0; MAX_DEGREE];
        for digit in &mut digits[..self.degree] {
            *digit = u64::from(element % self.p);
            element /= self.p;
        }
        digits
    }

    pub(super) fn pow(&self, base: Element, mut exponent: u64) -> Element {
        let (mut square, mut power) = (base, 1);
        loop {
            if exponent & 1 == 1 {
                power = self.mul(power, square);
            }
            exponent >>= 1;
            if exponent == 0 {
                return power;
            }
            square = self.mul(square, square);
        }
    }

    /// The value at `point` of a polynomial over GF(p), coefficients lowest first.
    pub(super) fn evaluate(&self, coefficients: &[u32], point: Element) -> Element {
        coefficients.iter().rev().fold(0, |value, &coefficient| {
            self.add(self.mul(value, point), coefficient)
        })
    }
}

/// The digitwise sum in base p.
pub(super) fn add_digits(p: u32, mut left: Element, mut right: Element) -> Element {
    let (mut place, mut sum) = (1u32, 0);
    while left > 0 || right > 0 {
        sum += (left % p + right % p) % p * place;
        left /= p;
        right /= p;
        place = place.wrapping_mul(p);
    }
    sum
}

/// The digitwise negative in base p.
pub(super) fn neg_digits(p: u32, mut element: Element) -> Element {
    let (mut place, mut negative) = (1u32, 0);
    while element > 0 {
        negative += (p - element % p) % p * place;
        element /= p;
        place = place.wrapping_mul(p);
    }
    negative
}

/// A monic proper factor of least degree, then least as a base-p integer, of a monic polynomial
/// over GF(p); `None` when it is irreducible. Trial division: for p^degree ≤ 2^24 there are at most
/// some 2^13 candidates.
pub(super) fn least_factor(p: u32, modulus: &[u32]) -> Option<Vec<u32>> {
    let degree = modulus.len() - 1;
    for size in 1..=degree / 2 {
        for low in 0..p.pow(size as u32) {
            let mut rest = low;
            let mut candidate: Vec<u32> = (0..size)
                .map(|_| {
                    let digit = rest % p;
                    rest /= p;
                    digit
                })
                .collect();
            candidate.push(1);
            if divides(p, &candidate, modulus) {
                return Some(candidate);
            }
        }
    }
    None
}

fn divides(p: u32, divisor: &[u32], dividend: &[u32]) -> bool {
    let size = divisor.len() - 1;
    let mut rest = dividend.to_vec();
    for low in (0..rest.len() - size).rev() {
        let factor = rest[low + size];
        if factor != 0 {
            for (entry, &coefficient) in rest[low..].iter_mut().zip(divisor) {
                *entry = (*entry + (p - factor) * coefficient) % p;
            }
        }
    }
    rest[..size].iter().all(|&entry| entry == 0)
}
