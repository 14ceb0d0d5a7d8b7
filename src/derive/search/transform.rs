//! All words of a binary code at once: the Walsh–Hadamard transform of its column counts.
//!
//! With f(c) the number of generator columns equal to c, the transform of f at a message m is
//! n − 2·wt(m·G) (MacWilliams and Sloane, 1977, ch. 14 §2). The upper bits of the message are
//! fixed in turn, so that a table of the lower bits stays in the first-level cache.

use rayon::prelude::*;

use super::Progress;
use crate::algebra::Matrix;
use crate::algebra::kernels::lightest::{Signed, largest, walsh_hadamard};

/// The number of message bits that one table runs over.
const TABLE_BITS: usize = 14;
/// How many tables a thread takes at a time, and how many such pieces make a tick of progress.
const TABLES_A_PIECE: u64 = 16;
const PIECES_A_TICK: u64 = 256;

/// The columns of a binary generator with at most 63 rows, equal ones together.
pub(super) struct ColumnCounts {
    dimension: usize,
    length: usize,
    columns: Vec<(u64, i32)>,
}

/// What the words of a range of messages gave.
pub(super) struct Tally {
    /// By weight; empty when only the lightest word was asked for.
    pub(super) counts: Vec<u64>,
    /// The least weight among non-zero messages, and the first message that has it.
    pub(super) lightest: Option<(u64, u64)>,
}

/// Runs in the smallest integers that hold −n..=n.
trait Narrow: Signed + Into<i64> + TryFrom<i64> + Default + Send + Sync {}
impl Narrow for i16 {}
impl Narrow for i32 {}

impl ColumnCounts {
    /// `None` when there are too many rows for a message to be a number.
    pub(super) fn new(generator: &Matrix) -> Option<ColumnCounts> {
        if generator.rows() > 62 || i32::try_from(generator.columns()).is_err() {
            return None;
        }
        let mut columns: Vec<u64> = (0..generator.columns())
            .map(|column| {
                (0..generator.rows()).fold(0, |sum, row| {
                    sum | u64::from(generator.get(row, column)) << row
                })
            })
            .collect();
        columns.sort_unstable();
        let grouped = columns
            .chunk_by(|left, right| left == right)
            .map(|equal| (equal[0], equal.len() as i32))
            .collect();
        Some(ColumnCounts {
            dimension: generator.rows(),
            length: generator.columns(),
            columns: grouped,
        })
    }

    /// Goes through all 2^k messages.
    pub(super) fn tally(&self, with_counts: bool, progress: &dyn Progress) -> Tally {
        if self.length <= i16::MAX as usize {
            self.tally_in::<i16>(with_counts, progress)
        } else {
            self.tally_in::<i32>(with_counts, progress)
        }
    }

    fn tally_in<T: Narrow>(&self, with_counts: bool, progress: &dyn Progress) -> Tally {
        let bits = self.dimension.min(TABLE_BITS);
        let tables = 1u64 << (self.dimension - bits);
        let pieces = tables.div_ceil(TABLES_A_PIECE);
        let mut all = self.nothing(with_counts);
        for first in (0..pieces).step_by(PIECES_A_TICK as usize) {
            let last = (first + PIECES_A_TICK).min(pieces);
            let found = (first..last)
                .into_par_iter()
                .map(|piece| {
                    let start = piece * TABLES_A_PIECE;
                    self.piece::<T>(
                        start..(start + TABLES_A_PIECE).min(tables),
                        bits,
                        with_counts,
                    )
                })
                .reduce(|| self.nothing(with_counts), Tally::join);
            all = all.join(found);
            progress.tick("all words", last, pieces);
        }
        all
    }

    fn nothing(&self, with_counts: bool) -> Tally {
        Tally {
            counts: if with_counts {
                vec![0; self.length + 1]
            } else {
                Vec::new()
            },
            lightest: None,
        }
    }

    fn piece<T: Narrow>(
        &self,
        tops: std::ops::Range<u64>,
        bits: usize,
        with_counts: bool,
    ) -> Tally {
        let mut tally = self.nothing(with_counts);
        let mut table = vec![T::default(); 1 << bits];
        for top in tops {
            self.fill(&mut table, top, bits);
            walsh_hadamard(&mut table);
            if with_counts {
                self.count(&table, &mut tally.counts);
            }
            if top == 0 {
                table[0] = T::min_value();
            }
            self.note_lightest(&table, top << bits, &mut tally.lightest);
        }
        tally
    }

    /// The column counts seen by messages whose upper bits are `top`.
    fn fill<T: Narrow>(&self, table: &mut [T], top: u64, bits: usize) {
        let mask = table.len() as u64 - 1;
        table.fill(T::default());
        for &(column, count) in &self.columns {
            let odd = ((column >> bits) & top).count_ones() % 2 == 1;
            let signed = i64::from(if odd { -count } else { count });
            let entry = &mut table[(column & mask) as usize];
            let narrow = T::try_from(signed).ok().expect("a count is at most n");
            *entry = entry.wrapping_add(&narrow);
        }
    }

    fn count<T: Narrow>(&self, table: &[T], counts: &mut [u64]) {
        let mut odd_and_even = [vec![0u32; self.length + 1], vec![0u32; self.length + 1]];
        for (at, &entry) in table.iter().enumerate() {
            let balance: i64 = entry.into();
            let weight = (self.length as i64 - balance) as usize / 2;
            odd_and_even[at & 1][weight] += 1;
        }
        for part in odd_and_even {
            for (count, more) in counts.iter_mut().zip(part) {
                *count += u64::from(more);
            }
        }
    }

    fn note_lightest<T: Narrow>(&self, table: &[T], first: u64, lightest: &mut Option<(u64, u64)>) {
        let most = largest(table);
        if most == T::min_value() {
            return;
        }
        let balance: i64 = most.into();
        let weight = (self.length as i64 - balance) as u64 / 2;
        if lightest.is_none_or(|(least, _)| weight < least) {
            let at = table
                .iter()
                .position(|&entry| entry == most)
                .expect("it is in the table");
            *lightest = Some((weight, first + at as u64));
        }
    }
}

impl Tally {
    /// Remembers the lightest word, and of several the one with the least number.
    pub(super) fn note(&mut self, weight: u64, number: u64) {
        if self.lightest.is_none_or(|least| (weight, number) < least) {
            self.lightest = Some((weight, number));
        }
    }

    /// Both together; the order does not matter.
    pub(super) fn join(mut self, other: Tally) -> Tally {
        for (count, more) in self.counts.iter_mut().zip(other.counts) {
            *count += more;
        }
        self.lightest = match (self.lightest, other.lightest) {
            (Some(one), Some(two)) => Some(one.min(two)),
            (one, two) => one.or(two),
        };
        self
    }
}
