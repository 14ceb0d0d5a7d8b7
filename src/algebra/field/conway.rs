//! Conway polynomials: the modulus taken when a spec states none.
//!
//! The Conway polynomial of degree m over GF(p) is the first of the monic primitive polynomials
//! compatible with those of all proper divisors of m, in the order that compares x^m − c₁x^(m−1) +
//! c₂x^(m−2) − … by (c₁, c₂, …) (R. Parker; see Holt, Eick and O'Brien, Handbook of Computational
//! Group Theory, 2005, §8.3.2). Compatible: its root raised to (p^m − 1)/(p^d − 1) is a root of the
//! one of degree d. They are computed by this definition and remembered for the process.

use std::collections::BTreeMap;
use std::sync::{Mutex, PoisonError};

use super::residues::Residues;
use super::{Calculator, Field, FieldError, is_prime, least_primitive, supported_order};
use crate::algebra::numbers::factor_u64;

static KNOWN: Mutex<BTreeMap<(u64, u32), Field>> = Mutex::new(BTreeMap::new());

impl Field {
    /// GF(p^m) by its Conway polynomial (see [`crate::algebra::field::conway`]), whose root is the
    /// generator. Computed once in a process, in milliseconds up to 2^16 elements.
    ///
    /// # Errors
    /// [`FieldError::NotPrimePower`] when p is not prime or m is 0, [`FieldError::TooLarge`].
    pub fn conway(p: u64, m: u32) -> Result<Field, FieldError> {
        if m == 0 {
            return Err(FieldError::NotPrimePower);
        }
        if let Some(field) = known().get(&(p, m)) {
            return Ok(field.clone());
        }
        if !is_prime(p) {
            return Err(FieldError::NotPrimePower);
        }
        let order = supported_order(p, u64::from(m))?;
        let p32 = p as u32;
        let modulus = if m == 1 {
            let any = Calculator::new(p32, &[0, 1]);
            vec![p32 - least_primitive(&any, order), 1]
        } else {
            conway_polynomial(p, m, order)?
        };
        let calculator = Calculator::new(p32, &modulus);
        let field = Field::assemble(p32, modulus, order, calculator.root(), calculator);
        known().insert((p, m), field.clone());
        Ok(field)
    }
}

fn known() -> std::sync::MutexGuard<'static, BTreeMap<(u64, u32), Field>> {
    // The map is only ever added to, so a panic elsewhere leaves it sound.
    KNOWN.lock().unwrap_or_else(PoisonError::into_inner)
}

fn conway_polynomial(p: u64, m: u32, order: u64) -> Result<Vec<u32>, FieldError> {
    let primes: Vec<u64> = factor_u64(order - 1)
        .iter()
        .map(|&(prime, _)| prime)
        .collect();
    // Compatibility with the maximal proper divisors brings that with all others; degree 1 is
    // built into the constant term: the product of all conjugates of the root is its norm.
    let mut subfields = Vec::new();
    for (prime, _) in factor_u64(u64::from(m)).into_iter() {
        let degree = m / prime as u32;
        if degree > 1 {
            let sub = Field::conway(p, degree)?;
            subfields.push(((order - 1) / (sub.order() - 1), sub.modulus().to_vec()));
        }
    }
    let norm = Field::prime(p)?.generator();
    let p = p as u32;
    // The counter's base-p digits, most significant first, are c₁ … c_(m−1).
    for counter in 0..(order / u64::from(p)) {
        let modulus = candidate(p, m as usize, counter, norm);
        let residues = Residues::new(p, &modulus);
        let compatible = subfields.iter().all(|(exponent, sub)| {
            residues.evaluate(sub, residues.pow(residues.root(), *exponent)) == 0
        });
        if compatible && root_has_full_order(&residues, order, &primes) {
            return Ok(modulus);
        }
    }
    unreachable!("a Conway polynomial exists for every p and m (W. Nickel, 1988)")
}

/// x^m − c₁x^(m−1) + c₂x^(m−2) − … ± norm.
fn candidate(p: u32, m: usize, mut counter: u64, norm: u32) -> Vec<u32> {
    let mut modulus = vec![0; m + 1];
    modulus[m] = 1;
    modulus[0] = norm;
    for entry in &mut modulus[1..m] {
        *entry = (counter % u64::from(p)) as u32;
        counter /= u64::from(p);
    }
    for (power, entry) in modulus.iter_mut().enumerate() {
        if (m - power) % 2 == 1 {
            *entry = (p - *entry) % p;
        }
    }
    modulus
}

/// Whether the order of x is q − 1. That makes the modulus irreducible too: with a repeated factor
/// p would divide the order, and coprime factors of degrees dᵢ bound it by ∏(p^dᵢ − 1).
fn root_has_full_order(residues: &Residues, order: u64, primes: &[u64]) -> bool {
    let root = residues.root();
    residues.pow(root, order - 1) == 1
        && primes
            .iter()
            .all(|prime| residues.pow(root, (order - 1) / prime) != 1)
}
