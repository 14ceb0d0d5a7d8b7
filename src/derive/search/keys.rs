//! Columns of a check matrix as integers whose sums are cheap.
//!
//! A key is a linear image of a column over the prime field: the column itself where it fits, a
//! fixed pseudo-random projection of it otherwise. Unequal keys prove unequal sums; equal keys of
//! a projection have to be looked at.

use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;

use crate::algebra::{Element, Field};

/// The seed of the projections; any other gives the same answers.
const SEED: u64 = 0x5EA_7A11;

/// Integers that stand for vectors, and how to add them.
pub(super) trait Keys: Sync {
    /// The integer.
    type Key: Copy + Ord + Send + Sync;

    /// The key of a vector.
    fn key(&self, vector: &[Element]) -> Self::Key;

    /// The key of the sum.
    fn add(&self, left: Self::Key, right: Self::Key) -> Self::Key;

    /// A number below 2^bits; all numbers are hit about equally often.
    fn slot(&self, key: Self::Key, bits: u32) -> u64;

    /// The lowest bits of a key, if those of a sum are the exclusive or of those of its parts.
    fn low(&self, key: Self::Key) -> Option<usize>;

    /// The number of bits when keys are the vectors themselves, as plain numbers.
    fn exact_bits(&self) -> Option<u32>;
}

/// Characteristic 2: sums by exclusive or.
pub(super) struct BitKeys {
    degree: u32,
    /// For each bit of the vector, what it adds to the key; empty when the bits themselves do.
    projection: Vec<u64>,
    bits: u32,
}

impl BitKeys {
    /// For vectors of length `height` over a field of characteristic 2.
    pub(super) fn new(field: &Field, height: usize) -> BitKeys {
        let degree = field.degree();
        let bits = height * degree as usize;
        let mut random = ChaCha8Rng::seed_from_u64(SEED);
        let projection = if bits <= 64 {
            Vec::new()
        } else {
            (0..bits).map(|_| random.random()).collect()
        };
        BitKeys {
            degree,
            projection,
            bits: bits as u32,
        }
    }
}

impl Keys for BitKeys {
    type Key = u64;

    fn key(&self, vector: &[Element]) -> u64 {
        let mut key = 0;
        for (at, &entry) in vector.iter().enumerate() {
            if self.projection.is_empty() {
                key |= u64::from(entry) << (at as u32 * self.degree);
                continue;
            }
            for bit in (0..self.degree).filter(|bit| entry >> bit & 1 == 1) {
                key ^= self.projection[at * self.degree as usize + bit as usize];
            }
        }
        key
    }

    #[inline]
    fn add(&self, left: u64, right: u64) -> u64 {
        left ^ right
    }

    #[inline]
    fn slot(&self, key: u64, bits: u32) -> u64 {
        if self.bits <= bits {
            return key;
        }
        key.wrapping_mul(0x9E37_79B9_7F4A_7C15) >> (64 - bits)
    }

    #[inline]
    fn low(&self, key: u64) -> Option<usize> {
        Some(key as usize)
    }

    fn exact_bits(&self) -> Option<u32> {
        self.projection.is_empty().then_some(self.bits)
    }
}

/// Odd characteristic p: lanes of one number, each added modulo p on its own.
pub(super) struct LaneKeys {
    prime: u128,
    degree: u32,
    lanes: usize,
    width: u32,
    /// The top bit of each lane.
    tops: u128,
    /// 2^(width − 1) − p in each lane: carries a lane's top bit when it is p or more.
    lift: u128,
    /// For each lane a scalar for each digit of the vector; empty when digits have lanes of their own.
    projection: Vec<Vec<u64>>,
}

impl LaneKeys {
    /// For vectors of length `height` over a field of odd characteristic.
    pub(super) fn new(field: &Field, height: usize) -> LaneKeys {
        let prime = u128::from(field.characteristic());
        let width = 128 - (prime - 1).leading_zeros() + 1;
        let lanes = (128 / width) as usize;
        let digits = height * field.degree() as usize;
        let mut random = ChaCha8Rng::seed_from_u64(SEED);
        let projection = if digits <= lanes {
            Vec::new()
        } else {
            let mut lane = || {
                (0..digits)
                    .map(|_| random.random_range(0..prime as u64))
                    .collect()
            };
            (0..lanes).map(|_| lane()).collect()
        };
        let spread =
            |value: u128| (0..lanes as u32).fold(0, |sum, lane| sum | value << (lane * width));
        LaneKeys {
            prime,
            degree: field.degree(),
            lanes,
            width,
            tops: spread(1 << (width - 1)),
            lift: spread((1 << (width - 1)) - prime),
            projection,
        }
    }
}

impl Keys for LaneKeys {
    type Key = u128;

    fn key(&self, vector: &[Element]) -> u128 {
        let prime = self.prime as u64;
        let mut digits = Vec::with_capacity(vector.len() * self.degree as usize);
        for &entry in vector {
            let mut rest = u64::from(entry);
            for _ in 0..self.degree {
                digits.push(rest % prime);
                rest /= prime;
            }
        }
        (0..self.lanes as u32).fold(0, |key, lane| {
            let value = match self.projection.get(lane as usize) {
                Some(scalars) => {
                    let sum = |sum: u64, (&a, &b): (&u64, &u64)| (sum + a * b % prime) % prime;
                    digits.iter().zip(scalars).fold(0, sum)
                }
                None => digits.get(lane as usize).copied().unwrap_or(0),
            };
            key | u128::from(value) << (lane * self.width)
        })
    }

    #[inline]
    fn add(&self, left: u128, right: u128) -> u128 {
        // Lanes stay below 2p ≤ 2^width; those with p or more carry into their top bit when lifted.
        let sum = left + right;
        let carried = ((sum + self.lift) & self.tops) >> (self.width - 1);
        sum - carried * self.prime
    }

    #[inline]
    fn slot(&self, key: u128, bits: u32) -> u64 {
        let folded = (key as u64)
            .wrapping_mul(0x9E37_79B9_7F4A_7C15)
            .wrapping_add(((key >> 64) as u64).wrapping_mul(0xC2B2_AE3D_27D4_EB4F));
        (folded ^ folded >> 29).wrapping_mul(0xBF58_476D_1CE4_E5B9) >> (64 - bits)
    }

    #[inline]
    fn low(&self, _key: u128) -> Option<usize> {
        None
    }

    fn exact_bits(&self) -> Option<u32> {
        None
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn adds_like_the_field<K: Keys>(keys: &K, field: &Field, height: usize)
    where
        K::Key: std::fmt::Debug,
    {
        let mut random = ChaCha8Rng::seed_from_u64(3);
        for _ in 0..50 {
            let mut vector = || -> Vec<Element> {
                (0..height)
                    .map(|_| random.random_range(0..field.order()) as Element)
                    .collect()
            };
            let (left, right) = (vector(), vector());
            let sum: Vec<Element> = left
                .iter()
                .zip(&right)
                .map(|(&a, &b)| field.add(a, b))
                .collect();
            assert_eq!(keys.key(&sum), keys.add(keys.key(&left), keys.key(&right)));
        }
    }

    #[test]
    fn keys_are_linear() {
        for (p, m) in [
            (2, 1),
            (2, 3),
            (3, 1),
            (3, 2),
            (5, 1),
            (7, 1),
            (17, 1),
            (251, 1),
            (5, 2),
        ] {
            let field = Field::conway(p, m).unwrap();
            for height in [1, 4, 33, 100] {
                if p == 2 {
                    adds_like_the_field(&BitKeys::new(&field, height), &field, height);
                } else {
                    adds_like_the_field(&LaneKeys::new(&field, height), &field, height);
                }
            }
        }
    }
}
