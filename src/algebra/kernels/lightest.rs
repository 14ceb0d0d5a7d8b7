//! The lightest sum of one vector with each vector of a table.
//!
//! Binary vectors are packed into `W` 64-bit words; other symbols are one integer each.

use num_traits::{Bounded, WrappingAdd, WrappingSub};

/// A machine integer with a sign.
pub trait Signed: Copy + Ord + Bounded + WrappingAdd + WrappingSub {}

impl Signed for i16 {}
impl Signed for i32 {}

/// Takes the wide compilation of a body where the processor has it, the plain one elsewhere.
macro_rules! compiled_twice {
    ($wide:ident, $body:ident, [$($generic:tt)*], [$($names:ident),*], ($($name:ident: $kind:ty),*) -> $result:ty) => {
        #[cfg(target_arch = "x86_64")]
        #[target_feature(enable = "avx2,popcnt")]
        unsafe fn $wide<$($generic)*>($($name: $kind),*) -> $result {
            $body::<$($names),*>($($name),*)
        }
    };
}

/// Whether the wide compilation may be called.
#[cfg(target_arch = "x86_64")]
#[inline]
fn wide() -> bool {
    std::arch::is_x86_feature_detected!("avx2") && std::arch::is_x86_feature_detected!("popcnt")
}

#[inline(always)]
fn packed_body<const W: usize>(base: &[u64; W], table: &[[u64; W]]) -> u32 {
    let mut lightest = u64::MAX;
    for entry in table {
        let mut weight = 0;
        for at in 0..W {
            weight += u64::from((base[at] ^ entry[at]).count_ones());
        }
        lightest = lightest.min(weight);
    }
    lightest.min(u64::from(u32::MAX)) as u32
}

compiled_twice!(packed_wide, packed_body, [const W: usize], [W],
    (base: &[u64; W], table: &[[u64; W]]) -> u32);

/// The least weight of `base + entry` over a table of packed binary vectors; `u32::MAX` for an
/// empty table.
pub fn lightest_packed<const W: usize>(base: &[u64; W], table: &[[u64; W]]) -> u32 {
    #[cfg(target_arch = "x86_64")]
    if wide() {
        // Sound: the features that the function is compiled for were found on this processor.
        return unsafe { packed_wide(base, table) };
    }
    packed_body(base, table)
}

#[inline(always)]
fn differences_body(base: &[u8], entry: &[u8]) -> u32 {
    let mut total = 0;
    for (left, right) in base.chunks(128).zip(entry.chunks(128)) {
        let mut count = 0u8;
        for (a, b) in left.iter().zip(right) {
            count += u8::from(a != b);
        }
        total += u32::from(count);
    }
    total
}

#[inline(always)]
fn distances_body(base: &[u8], table: &[u8], distances: &mut [u32]) {
    for (entry, distance) in table.chunks_exact(base.len()).zip(distances) {
        *distance = differences_body(base, entry);
    }
}

compiled_twice!(distances_wide, distances_body, [], [],
    (base: &[u8], table: &[u8], distances: &mut [u32]) -> ());

/// The Hamming distance of `base` from each vector of a table of byte symbols, the vectors one
/// after the other, as many as `distances` is long. `base` must not be empty.
pub fn byte_distances(base: &[u8], table: &[u8], distances: &mut [u32]) {
    assert!(!base.is_empty(), "vectors with at least one symbol");
    #[cfg(target_arch = "x86_64")]
    if wide() {
        // Sound: the features that the function is compiled for were found on this processor.
        return unsafe { distances_wide(base, table, distances) };
    }
    distances_body(base, table, distances);
}

#[inline(always)]
fn least_body(base: &[u8], table: &[u8]) -> (u32, usize) {
    let mut least = (u32::MAX, 0);
    for (at, entry) in table.chunks_exact(base.len()).enumerate() {
        let distance = differences_body(base, entry);
        if distance < least.0 {
            least = (distance, at);
        }
    }
    least
}

compiled_twice!(least_wide, least_body, [], [], (base: &[u8], table: &[u8]) -> (u32, usize));

/// The least Hamming distance of `base` from the vectors of a table of byte symbols, and the
/// place of the first that has it; `(u32::MAX, 0)` for an empty table. `base` must not be empty.
pub fn least_distance(base: &[u8], table: &[u8]) -> (u32, usize) {
    assert!(!base.is_empty(), "vectors with at least one symbol");
    #[cfg(target_arch = "x86_64")]
    if wide() {
        // Sound: the features that the function is compiled for were found on this processor.
        return unsafe { least_wide(base, table) };
    }
    least_body(base, table)
}

#[inline(always)]
fn transform_body<T: Signed>(table: &mut [T]) {
    let mut half = 1;
    while half < table.len() {
        for block in table.chunks_exact_mut(2 * half) {
            let (low, high) = block.split_at_mut(half);
            for (a, b) in low.iter_mut().zip(high) {
                let (sum, difference) = (a.wrapping_add(b), a.wrapping_sub(b));
                *a = sum;
                *b = difference;
            }
        }
        half *= 2;
    }
}

compiled_twice!(transform_wide, transform_body, [T: Signed], [T], (table: &mut [T]) -> ());

/// The Walsh–Hadamard transform in place; the length must be a power of two, and the sum of the
/// absolute values one that `T` holds, so that nothing overflows.
pub fn walsh_hadamard<T: Signed>(table: &mut [T]) {
    assert!(table.len().is_power_of_two(), "a power of two");
    #[cfg(target_arch = "x86_64")]
    if wide() {
        // Sound: the features that the function is compiled for were found on this processor.
        return unsafe { transform_wide(table) };
    }
    transform_body(table);
}

#[inline(always)]
fn largest_body<T: Signed>(table: &[T]) -> T {
    table.iter().copied().fold(T::min_value(), T::max)
}

compiled_twice!(largest_wide, largest_body, [T: Signed], [T], (table: &[T]) -> T);

/// The largest value of a table; the least that `T` holds when it is empty.
pub fn largest<T: Signed>(table: &[T]) -> T {
    #[cfg(target_arch = "x86_64")]
    if wide() {
        // Sound: the features that the function is compiled for were found on this processor.
        return unsafe { largest_wide(table) };
    }
    largest_body(table)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn noise(state: &mut u64) -> u64 {
        *state = state
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        *state ^ (*state >> 29)
    }

    #[test]
    fn wide_and_plain_compilations_agree() {
        let mut state = 1;
        for length in [0, 1, 3, 4, 7, 64, 129] {
            let base = [noise(&mut state), noise(&mut state)];
            let table: Vec<[u64; 2]> = (0..length)
                .map(|_| [noise(&mut state), noise(&mut state)])
                .collect();
            assert_eq!(lightest_packed(&base, &table), packed_body(&base, &table));
            let symbols: Vec<u8> = (0..length.max(1))
                .map(|_| noise(&mut state) as u8 % 3)
                .collect();
            let entries: Vec<u8> = (0..5 * symbols.len())
                .map(|_| noise(&mut state) as u8 % 3)
                .collect();
            let mut found = [0; 5];
            byte_distances(&symbols, &entries, &mut found);
            for (at, &distance) in found.iter().enumerate() {
                let entry = &entries[at * symbols.len()..(at + 1) * symbols.len()];
                let plain = symbols.iter().zip(entry).filter(|(a, b)| a != b).count();
                assert_eq!(distance as usize, plain);
            }
        }
    }

    #[test]
    fn the_transform_is_the_sum_with_signs() {
        let mut state = 9;
        let values: Vec<i16> = (0..64).map(|_| (noise(&mut state) % 9) as i16).collect();
        let mut table = values.clone();
        walsh_hadamard(&mut table);
        for (row, &entry) in table.iter().enumerate() {
            let plain: i16 = values
                .iter()
                .enumerate()
                .map(|(at, &value)| {
                    if (at & row).count_ones() % 2 == 0 {
                        value
                    } else {
                        -value
                    }
                })
                .sum();
            assert_eq!(entry, plain);
        }
        assert_eq!(largest(&table), table.iter().copied().max().unwrap());
    }
}
