//! From the weights of a code to those of its dual.
//!
//! Counts go in and come out as exact integers. The transform works on polynomials, by two shifts
//! of the variable, so that it takes about n² additions and no Krawtchouk values.

use super::Counts;
use num_bigint::{BigInt, BigUint};
use num_traits::{One, Signed, Zero};

/// Counts by index as counts by weight, zeros left out.
pub fn counted(counts: Vec<BigUint>) -> Counts {
    counts
        .into_iter()
        .enumerate()
        .filter(|(_, count)| !count.is_zero())
        .collect()
}

/// Counts by weight as counts by index, 0 to n.
pub fn listed(counts: &Counts, length: usize) -> Vec<BigUint> {
    let mut list = vec![BigUint::default(); length + 1];
    for (&weight, count) in counts {
        list[weight] = count.clone();
    }
    list
}

/// The weights of the dual of an [n, k] code over GF(q), from the code's own
/// (F. J. MacWilliams, 1963; the identity is W(u, v) with u = 1 + (q − 1)z, v = 1 − z).
///
/// `None` when the counts cannot be those of a linear [n, k] code over GF(q): a wrong length or
/// total, a count of the dual that is negative or broken.
pub fn macwilliams(counts: &[BigUint], q: u64, n: usize, k: usize) -> Option<Vec<BigUint>> {
    let words = BigUint::from(q).pow(u32::try_from(k).ok()?);
    if counts.len() != n + 1 || q < 2 || k > n || counts.iter().sum::<BigUint>() != words {
        return None;
    }
    let q = BigInt::from(q);
    let less = &q - 1;
    // Σ Aᵢ u^(n−i) v^i with (q−1)v = q − u: as a polynomial in u, scaled by (q−1)^n.
    let mut form: Vec<BigInt> = counts.iter().cloned().map(BigInt::from).collect();
    scale_by_powers(form.iter_mut().rev(), &less);
    shift(&mut form, false);
    scale_by_powers(form.iter_mut(), &q);
    form.reverse();
    shift(&mut form, true);
    scale_by_powers(form.iter_mut(), &less);
    let divisor = less.pow(u32::try_from(n).ok()?) * BigInt::from(words);
    form.into_iter()
        .map(|count| {
            let whole = !count.is_negative() && (&count % &divisor).is_zero();
            whole.then(|| (count / &divisor).magnitude().clone())
        })
        .collect()
}

/// Multiplies entry i by `base`^i.
fn scale_by_powers<'a>(entries: impl Iterator<Item = &'a mut BigInt>, base: &BigInt) {
    if base.is_one() {
        return;
    }
    let mut power = BigInt::one();
    for entry in entries {
        *entry *= &power;
        power *= base;
    }
}

/// Replaces the variable x of a polynomial (coefficients lowest first) by x + 1, or by x − 1.
fn shift(polynomial: &mut [BigInt], up: bool) {
    let length = polynomial.len();
    for start in 0..length {
        for at in (start..length.saturating_sub(1)).rev() {
            let (low, high) = polynomial.split_at_mut(at + 1);
            if up {
                low[at] += &high[0];
            } else {
                low[at] -= &high[0];
            }
        }
    }
}
