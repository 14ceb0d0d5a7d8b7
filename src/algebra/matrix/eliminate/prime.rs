//! Elimination over prime fields, a panel of columns at a time.
//!
//! A panel's pivots are found on a copy of its columns alone. The pivot rows are multiplied by the
//! inverse of what they have in the pivot columns; all other rows then take their multiples of all
//! of them in one sweep, summed without reduction modulo p for as long as the sums are exact.

use std::ops::Range;

use super::swap_rows;
use crate::algebra::Field;

/// Columns in a panel.
const PANEL: usize = 32;

/// Columns summed at a time, to stay in the nearest cache.
const SWEEP: usize = 256;

/// How entries of a prime field are kept, and how their multiples are summed.
pub(super) trait Residue: Copy + Default + PartialEq + Into<u64> {
    /// What multiples are summed in.
    type Sum: Copy + Default;
    /// From a number below p.
    fn from_u64(value: u64) -> Self;
    fn widen(self) -> Self::Sum;
    /// How many products of two residues a sum holds exactly beside one residue.
    fn capacity(p: u64) -> usize;
    /// `sums += factors · rows`, four rows at once.
    fn accumulate(sums: &mut [Self::Sum], factors: [Self; 4], rows: [&[Self::Sum]; 4]);
    /// `entries = sums mod p`.
    fn settle(sums: &[Self::Sum], modulus: &Modulus, entries: &mut [Self]);
}

/// Bytes for p < 256; sums in single precision, exact below 2^24.
impl Residue for u8 {
    type Sum = f32;

    fn from_u64(value: u64) -> u8 {
        value as u8
    }

    fn widen(self) -> f32 {
        f32::from(self)
    }

    fn capacity(p: u64) -> usize {
        // Quotients stay below 2^22, where rounding works: for p ≥ 3, sums below 3 · 2^22.
        ((3 << 22) - p) as usize / ((p - 1) * (p - 1)) as usize
    }

    fn accumulate(sums: &mut [f32], factors: [u8; 4], rows: [&[f32]; 4]) {
        let factors = factors.map(f32::from);
        let rows = rows.map(|row| &row[..sums.len()]);
        for (at, sum) in sums.iter_mut().enumerate() {
            let left = factors[0] * rows[0][at] + factors[1] * rows[1][at];
            let right = factors[2] * rows[2][at] + factors[3] * rows[3][at];
            *sum += left + right;
        }
    }

    fn settle(sums: &[f32], modulus: &Modulus, entries: &mut [u8]) {
        // Adding and taking away 1.5 · 2^23 rounds to a whole number; adding 2^23 leaves a whole
        // number in the low bits. Conversions by `as` are exact as well, but several times slower.
        const ROUND: f32 = 12_582_912.0;
        const WHOLE: f32 = 8_388_608.0;
        let (p, inverse) = (modulus.p as f32, 1.0 / modulus.p as f32);
        for (entry, &sum) in entries.iter_mut().zip(sums) {
            let quotient = (sum * inverse + ROUND) - ROUND;
            let rest = sum - quotient * p;
            let rest = if rest < 0.0 { rest + p } else { rest };
            *entry = (rest + WHOLE).to_bits() as u8;
        }
    }
}

/// Words for larger p < 2^31; sums in 64 bits.
impl Residue for u32 {
    type Sum = u64;

    fn from_u64(value: u64) -> u32 {
        value as u32
    }

    fn widen(self) -> u64 {
        self.into()
    }

    fn capacity(p: u64) -> usize {
        ((u64::MAX - p) / ((p - 1) * (p - 1))).min(1 << 20) as usize
    }

    fn accumulate(sums: &mut [u64], factors: [u32; 4], rows: [&[u64]; 4]) {
        let factors = factors.map(u64::from);
        let rows = rows.map(|row| &row[..sums.len()]);
        // All are below 2^31; saying so lets the compiler use half-width products.
        let product = |k: usize, at: usize| factors[k] * (rows[k][at] & 0xffff_ffff);
        for (at, sum) in sums.iter_mut().enumerate() {
            *sum += product(0, at) + product(1, at) + product(2, at) + product(3, at);
        }
    }

    fn settle(sums: &[u64], modulus: &Modulus, entries: &mut [u32]) {
        for (entry, &sum) in entries.iter_mut().zip(sums) {
            *entry = modulus.reduce(sum) as u32;
        }
    }
}

/// Reduction modulo p by a multiplication (P. Barrett, 1986).
pub(super) struct Modulus {
    p: u64,
    reciprocal: u64,
}

impl Modulus {
    fn new(p: u64) -> Modulus {
        Modulus {
            p,
            reciprocal: u64::MAX / p,
        }
    }

    fn reduce(&self, value: u64) -> u64 {
        let quotient = ((u128::from(value) * u128::from(self.reciprocal)) >> 64) as u64;
        let mut rest = value - quotient * self.p;
        while rest >= self.p {
            rest -= self.p;
        }
        rest
    }
}

/// Reduces a flat matrix over GF(p) in place; returns the pivots.
pub(super) fn reduce<T: Residue>(
    field: &Field,
    entries: &mut [T],
    columns: usize,
    eligible: usize,
) -> Vec<usize> {
    let rows = entries.len().checked_div(columns).unwrap_or(0);
    let modulus = Modulus::new(field.order());
    let mut pivots = Vec::new();
    for left in (0..eligible).step_by(PANEL) {
        if pivots.len() == rows {
            break;
        }
        let right = eligible.min(left + PANEL);
        let rank = pivots.len();
        let found = find_pivots(field, &modulus, entries, columns, rank, left..right);
        if found.is_empty() {
            continue;
        }
        let panel = Panel {
            modulus: &modulus,
            columns,
            rank,
            found: &found,
        };
        panel.reduce_pivot_rows(field, entries);
        panel.clear_other_rows(entries);
        pivots.extend(found);
    }
    pivots
}

/// The pivot columns in a range of columns among the rows from `rank` on; the rows that have them
/// are brought to `rank` and the ones after it, in that order.
fn find_pivots<T: Residue>(
    field: &Field,
    modulus: &Modulus,
    entries: &mut [T],
    columns: usize,
    rank: usize,
    range: Range<usize>,
) -> Vec<usize> {
    let rows = entries.len() / columns;
    let width = range.len();
    let mut strip: Vec<u64> = Vec::with_capacity((rows - rank) * width);
    for row in rank..rows {
        let part = &entries[row * columns + range.start..row * columns + range.end];
        strip.extend(part.iter().map(|&entry| entry.into()));
    }
    let mut found = Vec::new();
    for column in 0..width {
        let at = found.len();
        let Some(row) = (at..rows - rank).find(|&row| strip[row * width + column] != 0) else {
            continue;
        };
        swap_rows(&mut strip, width, at, row);
        swap_rows(entries, columns, rank + at, rank + row);
        let (upper, lower) = strip.split_at_mut((at + 1) * width);
        let pivot = &upper[at * width + column..];
        let scale = negated_inverse(field, pivot[0]);
        for other in lower.chunks_exact_mut(width) {
            if other[column] != 0 {
                let factor = modulus.reduce(other[column] * scale);
                for (entry, &add) in other[column..].iter_mut().zip(pivot) {
                    *entry = modulus.reduce(*entry + factor * add);
                }
            }
        }
        found.push(range.start + column);
        if rank + found.len() == rows {
            break;
        }
    }
    found
}

fn negated_inverse(field: &Field, value: u64) -> u64 {
    field
        .neg(field.inv(value as u32).expect("a pivot is not zero"))
        .into()
}

/// The pivots of a panel: columns `found`, in the rows from `rank` on.
struct Panel<'a> {
    modulus: &'a Modulus,
    columns: usize,
    rank: usize,
    found: &'a [usize],
}

impl Panel<'_> {
    /// Multiplies the pivot rows by the inverse of their part in the pivot columns.
    fn reduce_pivot_rows<T: Residue>(&self, field: &Field, entries: &mut [T]) {
        let rows = self.rank..self.rank + self.found.len();
        let inverse = self.inverse(field, entries);
        self.sweep(entries, rows, &inverse, false);
    }

    /// The inverse of the pivot rows' part in the pivot columns, by textbook elimination beside the
    /// identity.
    fn inverse<T: Residue>(&self, field: &Field, entries: &[T]) -> Vec<T> {
        let (count, modulus) = (self.found.len(), self.modulus);
        let mut rows: Vec<Vec<u64>> = (0..count)
            .map(|at| {
                let row = &entries[(self.rank + at) * self.columns..];
                let left = self.found.iter().map(|&column| row[column].into());
                let right = (0..count).map(|column| u64::from(column == at));
                left.chain(right).collect()
            })
            .collect();
        for at in 0..count {
            let found = (at..count)
                .find(|&row| rows[row][at] != 0)
                .expect("the pivot rows are independent in the pivot columns");
            rows.swap(at, found);
            let scale = modulus.p - negated_inverse(field, rows[at][at]);
            let mut pivot = std::mem::take(&mut rows[at]);
            for entry in &mut pivot {
                *entry = modulus.reduce(*entry * scale);
            }
            for row in rows.iter_mut().filter(|row| !row.is_empty()) {
                let factor = modulus.p - row[at];
                for (entry, &add) in row.iter_mut().zip(&pivot) {
                    *entry = modulus.reduce(*entry + factor * add);
                }
            }
            rows[at] = pivot;
        }
        let right = rows.iter().flat_map(|row| &row[count..]);
        right.map(|&value| T::from_u64(value)).collect()
    }

    /// Clears the pivot columns in all rows but the pivot rows.
    fn clear_other_rows<T: Residue>(&self, entries: &mut [T]) {
        let count = self.found.len();
        let factors: Vec<T> = entries
            .chunks_exact(self.columns)
            .flat_map(|row| {
                self.found.iter().map(|&column| {
                    let value: u64 = row[column].into();
                    T::from_u64((self.modulus.p - value) % self.modulus.p)
                })
            })
            .collect();
        let (before, after) = (self.rank, self.rank + count);
        let rows = entries.len() / self.columns;
        self.sweep(entries, 0..before, &factors[..before * count], true);
        self.sweep(entries, after..rows, &factors[after * count..], true);
    }

    /// Gives each of the rows its `factors` times the pivot rows, as they were before, added to
    /// what it is or in its place.
    fn sweep<T: Residue>(&self, entries: &mut [T], rows: Range<usize>, factors: &[T], add: bool) {
        let (count, columns) = (self.found.len(), self.columns);
        // The factors of a row in fours, and fours in runs that a sum can hold.
        let fours = count.div_ceil(4);
        let run = (T::capacity(self.modulus.p) / 4).min(fours);
        for left in (self.found[0]..columns).step_by(SWEEP) {
            let right = columns.min(left + SWEEP);
            let mut pivot_rows = vec![vec![T::Sum::default(); right - left]; 4 * fours];
            for (row, wide) in (self.rank..self.rank + count).zip(&mut pivot_rows) {
                let part = &entries[row * columns + left..row * columns + right];
                for (wide, &entry) in wide.iter_mut().zip(part) {
                    *wide = entry.widen();
                }
            }
            let mut sums = vec![T::Sum::default(); right - left];
            for (row, factors) in rows.clone().zip(factors.chunks_exact(count)) {
                let part = &mut entries[row * columns + left..row * columns + right];
                if !add {
                    part.fill(T::default());
                }
                let factor = |at: usize| factors.get(at).copied().unwrap_or_default();
                for start in (0..fours).step_by(run) {
                    for (sum, &entry) in sums.iter_mut().zip(part.iter()) {
                        *sum = entry.widen();
                    }
                    for four in start..fours.min(start + run) {
                        let at = 4 * four;
                        let group = [factor(at), factor(at + 1), factor(at + 2), factor(at + 3)];
                        if group.iter().any(|&factor| factor != T::default()) {
                            let rows = std::array::from_fn(|k| &pivot_rows[at + k][..]);
                            T::accumulate(&mut sums, group, rows);
                        }
                    }
                    T::settle(&sums, self.modulus, part);
                }
            }
        }
    }
}
