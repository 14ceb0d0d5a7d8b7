//! n-th roots of unity in splitting fields too large for tables.
//!
//! The splitting field is taken as residues modulo an irreducible factor f of the n-th cyclotomic
//! polynomial over GF(q), with β = x. The factors are told apart by the power sums
//! Σ β^(s·q^i), elements of GF(q) (E. Berlekamp, Algebraic Coding Theory, 1968, ch. 6), here as
//! polynomials modulo x^n − 1, where raising to the power q only moves coefficients.

use super::Polynomial;
use super::roots::cyclotomic_coset;
use crate::algebra::numbers::factor_u64;
use crate::algebra::{Element, Field};

/// The least irreducible factor of the n-th cyclotomic polynomial over the field, comparing
/// coefficients from the highest power down; gcd(n, q) = 1.
pub(super) fn least_cyclotomic_factor(field: &Field, n: usize) -> Polynomial {
    cyclotomic_factors(field, n)
        .into_iter()
        .min_by(|left, right| {
            left.coefficients()
                .iter()
                .rev()
                .cmp(right.coefficients().iter().rev())
        })
        .expect("a polynomial has a factor")
}

/// The irreducible factors of the n-th cyclotomic polynomial, all of degree ord_n(q).
pub(super) fn cyclotomic_factors(field: &Field, n: usize) -> Vec<Polynomial> {
    let q = field.order();
    let degree = cyclotomic_coset(q, 1, n as u64).len();
    let mut factors = vec![cyclotomic(field, n)];
    for s in 1..n {
        if factors.iter().all(|factor| factor.degree() == Some(degree)) {
            return factors;
        }
        let sum = power_sum(field, n, s);
        factors = factors
            .into_iter()
            .flat_map(|factor| separate(factor, &sum))
            .collect();
    }
    factors
}

/// The parts of `factor` at whose roots the power sum takes one value each.
fn separate(factor: Polynomial, sum: &[Element]) -> Vec<Polynomial> {
    let field = factor.field().clone();
    let mut open = vec![factor];
    let mut done = Vec::new();
    while let Some(factor) = open.pop() {
        let value = Polynomial::new(&field, sum.to_vec()).rem(&factor);
        if value.degree().is_none_or(|degree| degree == 0) {
            done.push(factor);
            continue;
        }
        let parts = (0..)
            .map(|step| Splitter::new(&field, sum, step).split(&factor))
            .find(|parts| parts.len() > 1)
            .expect("two values in GF(q) are told apart by a trace or a quadratic character");
        open.extend(parts);
    }
    done
}

/// The n-th cyclotomic polynomial, reduced into the field.
fn cyclotomic(field: &Field, n: usize) -> Polynomial {
    let mut rest = Polynomial::cyclic_modulus(field, n);
    for (prime, _) in factor_u64(n as u64) {
        let smaller = Polynomial::cyclic_modulus(field, n / prime as usize);
        rest = rest.div_rem(&rest.gcd(&smaller)).0;
    }
    rest
}

/// Σ x^(s·q^i) over ord_n(q) steps of the coset of s: at every n-th root it takes a value in GF(q).
fn power_sum(field: &Field, n: usize, s: usize) -> Vec<Element> {
    let mut sum = vec![0; n];
    for exponent in cyclotomic_coset(field.order(), s as u64, n as u64) {
        sum[exponent as usize] = 1;
    }
    sum
}

/// A polynomial whose values at the n-th roots lie in GF(q), made to take few values.
enum Splitter {
    /// Even q: the absolute trace of c · sum, with values 0 and 1.
    Trace(Polynomial),
    /// Odd q: sum + shift, to be raised to (q − 1)/2, with values 0, 1 and −1.
    Power(Polynomial),
}

impl Splitter {
    /// The splitter number `step` of a power sum; the first m or q of them tell all values apart.
    fn new(field: &Field, sum: &[Element], step: u32) -> Splitter {
        if field.characteristic() > 2 {
            let mut shifted = sum.to_vec();
            shifted[0] = field.add(shifted[0], step);
            return Splitter::Power(Polynomial::new(field, shifted));
        }
        let n = sum.len();
        let mut power: Vec<Element> = sum
            .iter()
            .map(|&entry| field.mul(1 << step, entry))
            .collect();
        let mut trace = vec![0; n];
        for _ in 0..field.degree() {
            let mut square = vec![0; n];
            for (at, &entry) in power.iter().enumerate() {
                trace[at] ^= entry;
                square[2 * at % n] = field.mul(entry, entry);
            }
            power = square;
        }
        Splitter::Trace(Polynomial::new(field, trace))
    }

    /// The factors of `factor` that this tells apart, or `factor` alone.
    fn split(&self, factor: &Polynomial) -> Vec<Polynomial> {
        let field = factor.field().clone();
        let value = match self {
            Splitter::Trace(trace) => trace.clone(),
            Splitter::Power(base) => base.pow_mod((field.order() - 1) / 2, factor),
        };
        let zeros = factor.gcd(&value);
        let rest = factor.div_rem(&zeros).0;
        let ones = rest.gcd(&value.sub(&Polynomial::one(&field)));
        let others = rest.div_rem(&ones).0;
        [zeros, ones, others]
            .into_iter()
            .filter(|part| part.degree() != Some(0))
            .collect()
    }
}

/// The powers of x modulo an irreducible factor f of the n-th cyclotomic polynomial.
pub(super) struct PowerTable {
    field: Field,
    degree: usize,
    /// The coefficient of x^0 in x^i mod f, i in 0..n: a linear functional of the power.
    constants: Vec<Element>,
}

impl PowerTable {
    pub(super) fn new(factor: &Polynomial, n: usize) -> PowerTable {
        let field = factor.field();
        let degree = factor.degree().expect("a factor is not zero");
        let mut power = vec![0; degree];
        power[0] = 1;
        let mut constants = Vec::with_capacity(n);
        for _ in 0..n {
            constants.push(power[0]);
            let top = power[degree - 1];
            power.rotate_right(1);
            power[0] = 0;
            for (entry, &coefficient) in power.iter_mut().zip(factor.coefficients()) {
                *entry = field.sub(*entry, field.mul(top, coefficient));
            }
        }
        PowerTable {
            field: field.clone(),
            degree,
            constants,
        }
    }

    /// The minimal polynomial of β^s over the field: that of the sequence its powers make under a
    /// functional, which is not zero at 1 (J. Massey, Shift-register synthesis, 1969).
    pub(super) fn minimal_polynomial(&self, s: u64) -> Polynomial {
        let n = self.constants.len() as u64;
        let sequence: Vec<Element> = (0..2 * self.degree as u64)
            .map(|i| self.constants[(u128::from(s) * u128::from(i) % u128::from(n)) as usize])
            .collect();
        let field = &self.field;
        let mut connection = vec![1];
        let mut previous = vec![1];
        let (mut length, mut shift, mut last) = (0, 1, 1);
        for at in 0..sequence.len() {
            let discrepancy = (0..=length.min(connection.len() - 1)).fold(0, |sum, back| {
                field.add(sum, field.mul(connection[back], sequence[at - back]))
            });
            if discrepancy == 0 {
                shift += 1;
                continue;
            }
            let scale = field.mul(discrepancy, field.inv(last).expect("it was not zero"));
            let mut next = connection.clone();
            next.resize(next.len().max(previous.len() + shift), 0);
            field.add_multiple(&mut next[shift..], field.neg(scale), &previous);
            if 2 * length <= at {
                length = at + 1 - length;
                previous = std::mem::replace(&mut connection, next);
                last = discrepancy;
                shift = 1;
            } else {
                connection = next;
                shift += 1;
            }
        }
        connection.resize(length + 1, 0);
        connection.reverse();
        Polynomial::new(field, connection)
    }
}
