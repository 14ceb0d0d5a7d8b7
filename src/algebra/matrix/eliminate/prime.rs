//! Elimination over prime fields, a panel of columns at a time.
//!
//! A panel's pivots are found on a copy of its columns alone. The pivot rows are reduced among
//! themselves; all other rows then take their multiples of all of them in one sweep, summed
//! without reduction modulo p for as long as the sums are exact.

use super::swap_rows;
use crate::algebra::Field;

/// Columns in a panel.
const PANEL: usize = 48;

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
    /// `sums += factor · row`.
    fn accumulate(sums: &mut [Self::Sum], factor: Self, row: &[Self::Sum]);
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
        ((1 << 24) - p) as usize / ((p - 1) * (p - 1)) as usize
    }

    fn accumulate(sums: &mut [f32], factor: u8, row: &[f32]) {
        let factor = f32::from(factor);
        for (sum, &entry) in sums.iter_mut().zip(row) {
            *sum += factor * entry;
        }
    }

    fn settle(sums: &[f32], modulus: &Modulus, entries: &mut [u8]) {
        let (p, inverse) = (modulus.p as f32, 1.0 / modulus.p as f32);
        for (entry, &sum) in entries.iter_mut().zip(sums) {
            // The quotient is at most one off, and every number here a whole one below 2^24.
            let quotient = (sum * inverse) as i32 as f32;
            let rest = sum - quotient * p;
            let rest = if rest < 0.0 { rest + p } else { rest };
            let rest = if rest >= p { rest - p } else { rest };
            *entry = rest as i32 as u8;
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

    fn accumulate(sums: &mut [u64], factor: u32, row: &[u64]) {
        for (sum, &entry) in sums.iter_mut().zip(row) {
            // Both are below 2^31; saying so lets the compiler use half-width products.
            *sum += u64::from(factor) * (entry & 0xffff_ffff);
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
        let quotient = (u128::from(value) * u128::from(self.reciprocal) >> 64) as u64;
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
        reduce_pivot_rows(field, &modulus, entries, columns, rank, &found);
        sweep(&modulus, entries, columns, rank, &found);
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
    range: std::ops::Range<usize>,
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

/// Textbook elimination among the pivot rows.
fn reduce_pivot_rows<T: Residue>(
    field: &Field,
    modulus: &Modulus,
    entries: &mut [T],
    columns: usize,
    rank: usize,
    found: &[usize],
) {
    let rows = &mut entries[rank * columns..(rank + found.len()) * columns];
    for (at, &column) in found.iter().enumerate() {
        let start = found[0];
        let lead: u64 = rows[at * columns + column].into();
        let scale = u64::from(field.inv(lead as u32).expect("a pivot is not zero"));
        for entry in &mut rows[at * columns + start..(at + 1) * columns] {
            *entry = T::from_u64(modulus.reduce(scale * (*entry).into()));
        }
        let pivot = rows[at * columns + start..(at + 1) * columns].to_vec();
        for (other, row) in rows.chunks_exact_mut(columns).enumerate() {
            let lead: u64 = row[column].into();
            if other != at && lead != 0 {
                let factor = modulus.p - lead;
                for (entry, &add) in row[start..].iter_mut().zip(&pivot) {
                    *entry = T::from_u64(modulus.reduce((*entry).into() + factor * add.into()));
                }
            }
        }
    }
}

/// Clears the found columns in all rows but the pivot rows.
fn sweep<T: Residue>(
    modulus: &Modulus,
    entries: &mut [T],
    columns: usize,
    rank: usize,
    found: &[usize],
) {
    let count = found.len();
    let capacity = T::capacity(modulus.p);
    let factors: Vec<T> = entries
        .chunks_exact(columns)
        .flat_map(|row| {
            found.iter().map(|&column| {
                let value: u64 = row[column].into();
                T::from_u64((modulus.p - value) % modulus.p)
            })
        })
        .collect();
    for left in (found[0]..columns).step_by(SWEEP) {
        let right = columns.min(left + SWEEP);
        let pivot_rows: Vec<Vec<T::Sum>> = (rank..rank + count)
            .map(|row| {
                let part = &entries[row * columns + left..row * columns + right];
                part.iter().map(|&entry| entry.widen()).collect()
            })
            .collect();
        let mut sums = vec![T::Sum::default(); right - left];
        for (row, factors) in factors.chunks_exact(count).enumerate() {
            if row >= rank && row < rank + count {
                continue;
            }
            let part = &mut entries[row * columns + left..row * columns + right];
            for (some_factors, some_rows) in
                factors.chunks(capacity).zip(pivot_rows.chunks(capacity))
            {
                for (sum, &entry) in sums.iter_mut().zip(part.iter()) {
                    *sum = entry.widen();
                }
                for (&factor, pivot_row) in some_factors.iter().zip(some_rows) {
                    if factor != T::default() {
                        T::accumulate(&mut sums, factor, pivot_row);
                    }
                }
                T::settle(&sums, modulus, part);
            }
        }
    }
}
