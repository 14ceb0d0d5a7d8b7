//! What MacWilliams' transform costs, and the weights that need no search at all.
//!
//! Counts come out as exact integers by weight. The transform itself belongs to the room of codes.

use num_bigint::{BigInt, BigUint};
use num_traits::{One, Signed, Zero};

use super::Counts;
use super::arithmetic::product;

pub use crate::code::macwilliams;

/// The work units of [`macwilliams`].
pub fn cost_of_transform(q: u64, n: usize) -> u64 {
    let n = n as u64;
    let limbs = n.saturating_mul(u64::from(q.ilog2()) + 1) / 64;
    product(&[n, n, 20 + limbs])
}

/// The weights of every [n, k, n − k + 1] code over GF(q): they depend on n, k and q alone
/// (MacWilliams and Sloane, The Theory of Error-Correcting Codes, 1977, ch. 11 §3 theorem 6).
/// Whether such a code exists is the caller's question; for none the numbers may make no sense,
/// and `None` is given when one would be negative, or when k > n or q < 2.
pub fn mds_weights(n: usize, k: usize, q: u64) -> Option<Counts> {
    if k > n || q < 2 {
        return None;
    }
    let mut counts = vec![BigUint::zero(); n + 1];
    counts[0] = BigUint::one();
    if k == 0 {
        return Some(counts);
    }
    let d = n - k + 1;
    let less = BigInt::from(q - 1);
    // A_w = C(n, w)(q−1) S_w with S_w = Σ_j (−1)^j C(w−1, j) q^(w−d−j), so that S_d = 1 and
    // S_(w+1) = (q−1) S_w ± C(w−1, d−2), the sign that of (−1)^(w+1−d).
    let mut sum = BigInt::one();
    let mut ways = binomial(n, d);
    // C(w−1, d−2), for w = d at first.
    let mut extra = BigInt::from(d - 1);
    for (w, entry) in counts.iter_mut().enumerate().skip(d) {
        let count = &ways * &less * &sum;
        if count.is_negative() {
            return None;
        }
        *entry = count.magnitude().clone();
        if w == n {
            break;
        }
        ways = ways * BigInt::from(n - w) / BigInt::from(w + 1);
        sum *= &less;
        if (w + 1 - d).is_multiple_of(2) {
            sum += &extra;
        } else {
            sum -= &extra;
        }
        if d >= 2 {
            // C(w, d−2) = C(w−1, d−2) · w / (w − d + 2).
            extra = extra * BigInt::from(w) / BigInt::from(w + 2 - d);
        }
    }
    Some(counts)
}

/// n over w.
pub(super) fn binomial(n: usize, w: usize) -> BigInt {
    if w > n {
        return BigInt::zero();
    }
    let w = w.min(n - w);
    (0..w).fold(BigInt::one(), |product, at| {
        product * BigInt::from(n - at) / BigInt::from(at + 1)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn counts(n: usize, pairs: &[(usize, u64)]) -> Counts {
        let mut counts = vec![BigUint::zero(); n + 1];
        for &(weight, count) in pairs {
            counts[weight] = count.into();
        }
        counts
    }

    #[test]
    fn golay_is_its_own_dual_in_weights() {
        // MacWilliams and Sloane, 1977, ch. 2 §6.
        let golay = counts(24, &[(0, 1), (8, 759), (12, 2576), (16, 759), (24, 1)]);
        assert_eq!(macwilliams(&golay, 2, 24, 12), Some(golay.clone()));
        let wrong = counts(24, &[(0, 1), (8, 760), (12, 2575), (16, 759), (24, 1)]);
        assert_eq!(macwilliams(&wrong, 2, 24, 12), None);
        assert_eq!(macwilliams(&golay, 2, 24, 13), None);
    }

    #[test]
    fn mds_weights_agree_with_their_duals() {
        for (n, k, q) in [
            (7, 3, 8u64),
            (6, 3, 4),
            (15, 9, 16),
            (5, 1, 3),
            (5, 5, 3),
            (5, 4, 7),
            (255, 223, 256),
        ] {
            let own = mds_weights(n, k, q).unwrap();
            assert_eq!(
                macwilliams(&own, q, n, k),
                mds_weights(n, n - k, q),
                "[{n}, {k}] over GF({q})"
            );
        }
        // MacWilliams and Sloane, 1977, ch. 11 §3: the [7, 3, 5] code over GF(8) has 147 lightest words.
        assert_eq!(mds_weights(7, 3, 8).unwrap()[5], 147u32.into());
        assert_eq!(mds_weights(3, 4, 2), None);
    }

    #[test]
    fn the_trivial_codes() {
        for n in [0, 1, 5] {
            let zero = counts(n, &[(0, 1)]);
            let all = macwilliams(&zero, 3, n, 0).unwrap();
            assert_eq!(
                all.iter().sum::<BigUint>(),
                BigUint::from(3u32).pow(n as u32)
            );
            assert_eq!(macwilliams(&all, 3, n, n), Some(zero));
        }
    }
}
