//! How many error patterns of each weight a bounded-distance corrector turns into a wrong word.

use crate::code::Counts;
use num_bigint::BigUint;
use num_traits::{One, Zero};

/// The most terms of the sum.
const TERMS: usize = 1 << 24;

/// n choose k.
pub(super) fn choose(n: usize, k: usize) -> BigUint {
    if k > n {
        return BigUint::zero();
    }
    (0..k.min(n - k)).fold(BigUint::one(), |product, at| product * (n - at) / (at + 1))
}

/// For each weight, how many vectors of that weight lie within `radius` of a word other than zero,
/// the balls being disjoint: 2 · radius < d. Ascending, zeros left out; `None` when there are too
/// many terms (MacWilliams and Sloane, 1977, ch. 1 §5, and ch. 5 for the counting of vectors around
/// a word of given weight).
pub fn wrongly_corrected(
    weights: &Counts,
    n: usize,
    q: u64,
    radius: usize,
) -> Option<Vec<(usize, BigUint)>> {
    let words: Vec<(usize, &BigUint)> = weights
        .iter()
        .filter(|&(&weight, _)| weight > 0)
        .map(|(&weight, count)| (weight, count))
        .collect();
    let shapes = (radius + 1).saturating_pow(3);
    if words.len().saturating_mul(shapes) > TERMS {
        return None;
    }
    let (wrong, other) = (BigUint::from(q - 1), BigUint::from(q - 2));
    let mut found = vec![BigUint::zero(); n + 1];
    for (weight, count) in words {
        // `cleared` of the word's places made zero, `changed` given another value, and `added`
        // outside it.
        for cleared in 0..=radius.min(weight) {
            let zeroed = count * choose(weight, cleared);
            for added in 0..=(radius - cleared).min(n - weight) {
                let base = &zeroed * choose(n - weight, added) * wrong.pow(added as u32);
                let most = (radius - cleared - added).min(weight - cleared);
                for changed in 0..=most {
                    if q == 2 && changed > 0 {
                        break;
                    }
                    found[weight - cleared + added] +=
                        &base * choose(weight - cleared, changed) * other.pow(changed as u32);
                }
            }
        }
    }
    Some(
        found
            .into_iter()
            .enumerate()
            .filter(|(_, count)| !count.is_zero())
            .collect(),
    )
}
