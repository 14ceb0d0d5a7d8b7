//! Every word of a code, one by one or by transform: its weights and its lightest word.
//!
//! Over GF(2) one transform of the column counts gives all weights ([`super::transform`]). Over
//! other fields one word of each line through zero is enough; only the positions outside an
//! information set are summed, against a table of all combinations of the last rows.

use num_bigint::BigUint;
use rayon::prelude::*;

use super::arithmetic::{Arithmetic, Systematic, TABLE_ORDER, power, product};
use super::transform::{ColumnCounts, Tally};
use super::{Budget, Counts, LightWord, Progress, Quiet, macwilliams};
use crate::algebra::kernels::lightest::byte_distances;
use crate::algebra::{Element, Matrix};

/// Bytes of a table of combinations, so that it fits the first-level cache.
const TABLE_BYTES: u64 = 1 << 15;
/// Symbols are padded to whole wide registers.
const PADDING: usize = 32;
/// Words are numbered within 63 bits.
const MOST_WORDS: u64 = 1 << 62;

/// The work units that [`weight_counts`] and [`minimum_by_words`] take for an [n, k] code over
/// GF(q); `u64::MAX` when it is out of the question.
pub fn cost_of_words(q: u64, k: usize, n: usize) -> u64 {
    let words = power(q, k);
    if k == 0 || k >= n {
        return 1;
    }
    if words > MOST_WORDS {
        return u64::MAX;
    }
    if q == 2 {
        let tables = words.div_ceil(1 << 14);
        return words.saturating_add(product(&[tables, 2 * n as u64]));
    }
    let redundancy = (n - k) as u64;
    if q <= TABLE_ORDER {
        product(&[words / (q - 1), 3 + redundancy.div_ceil(PADDING as u64) * 3])
    } else {
        product(&[power(q, k.saturating_sub(2)) + 1, 20 * redundancy + 100])
    }
}

/// The weights of the row space of `generator` (k × n, any field; rows that depend on others are
/// left out). `None` when the budget is too small, nothing spent.
pub fn weight_counts(
    generator: &Matrix,
    budget: &Budget,
    progress: &dyn Progress,
) -> Option<Counts> {
    let code = Systematic::new(generator);
    let (n, k, q) = (code.length, code.dimension(), generator.field().order());
    if k == 0 || k == n {
        let mut nothing = vec![BigUint::ZERO; n + 1];
        nothing[0] = 1u32.into();
        return if k == 0 {
            Some(nothing)
        } else {
            macwilliams(&nothing, q, n, 0)
        };
    }
    let cost = cost_of_words(q, k, n);
    if cost == u64::MAX || !budget.spend(cost) {
        return None;
    }
    if q == 2 {
        let columns = ColumnCounts::new(&reduced(generator, &code))?;
        let tally = columns.tally(true, progress);
        return Some(tally.counts.into_iter().map(BigUint::from).collect());
    }
    let tally = Lines::new(generator, code).tally(progress);
    let mut counts: Counts = tally
        .counts
        .into_iter()
        .map(|count| BigUint::from(count) * (q - 1))
        .collect();
    counts[0] = 1u32.into();
    Some(counts)
}

/// A lightest word of the row space of `generator`, by going through all of them; among several
/// always the same one. `None` when the budget is too small or there is no word but zero.
pub fn minimum_by_words(generator: &Matrix, budget: &Budget) -> Option<LightWord> {
    let code = Systematic::new(generator);
    let (n, k, field) = (code.length, code.dimension(), generator.field());
    if k == 0 || k == n {
        return (k > 0).then(|| LightWord::new(code.word(field, &[(0, 1)])))?;
    }
    let cost = cost_of_words(field.order(), k, n);
    if cost == u64::MAX || !budget.spend(cost) {
        return None;
    }
    if field.is_binary() {
        let columns = ColumnCounts::new(&reduced(generator, &code))?;
        let (_, message) = columns.tally(false, &Quiet).lightest?;
        let rows: Vec<(usize, Element)> = (0..k)
            .filter(|row| message >> row & 1 == 1)
            .map(|row| (row, 1))
            .collect();
        return LightWord::new(code.word(field, &rows));
    }
    let lines = Lines::new(generator, code);
    let (_, number) = lines.tally(&Quiet).lightest?;
    LightWord::new(lines.code.word(field, &lines.message(number)))
}

/// The rows of the systematic form in full.
fn reduced(generator: &Matrix, code: &Systematic) -> Matrix {
    let field = generator.field();
    let rows: Vec<Vec<Element>> = (0..code.dimension())
        .map(|row| code.word(field, &[(row, 1)]))
        .collect();
    Matrix::from_rows(field, code.length, &rows)
}

/// One word of each line through zero of a code over GF(q), q > 2: the first non-zero entry of
/// its message is 1. A word's number is `lead + k · rest`, with `lead` the row of that entry and
/// `rest` the entries after it as digits, the last row lowest.
struct Lines {
    code: Systematic,
    arithmetic: Arithmetic,
    /// How many of the last rows the table combines; none for large fields.
    tail: usize,
    /// Symbols of a table entry, padding included.
    stride: usize,
    /// All negated combinations of the last rows, numbered like messages.
    table: Vec<u8>,
    /// The number of rows in each combination.
    rows_in: Vec<u32>,
}

impl Lines {
    fn new(generator: &Matrix, code: Systematic) -> Lines {
        let arithmetic = Arithmetic::new(generator.field());
        let q = arithmetic.order;
        let stride = code.free.len().next_multiple_of(PADDING);
        let mut lines = Lines {
            code,
            arithmetic,
            tail: 0,
            stride,
            table: Vec::new(),
            rows_in: Vec::new(),
        };
        if q <= TABLE_ORDER {
            let fits = |tail: usize| product(&[power(q, tail), stride as u64]) <= TABLE_BYTES;
            lines.tail = (1..lines.code.dimension())
                .take_while(|&tail| tail == 1 || fits(tail))
                .count();
            lines.fill_table();
        }
        lines
    }

    fn fill_table(&mut self) {
        let entries = power(self.arithmetic.order, self.tail);
        for number in 0..entries {
            let digits = self.digits(number, self.tail);
            let mut sum = vec![0; self.code.free.len()];
            for (back, &digit) in digits.iter().enumerate() {
                let row = &self.code.rows[self.code.dimension() - 1 - back];
                self.arithmetic
                    .add_scaled(&mut sum, self.arithmetic.field.neg(digit), row);
            }
            self.table.extend(self.bytes(&sum));
            self.rows_in
                .push(digits.iter().filter(|&&digit| digit != 0).count() as u32);
        }
    }

    fn bytes(&self, symbols: &[Element]) -> Vec<u8> {
        let mut bytes: Vec<u8> = symbols.iter().map(|&symbol| symbol as u8).collect();
        bytes.resize(self.stride, 0);
        bytes
    }

    /// The digits of a number in base q, lowest first.
    fn digits(&self, mut number: u64, count: usize) -> Vec<Element> {
        let q = self.arithmetic.order;
        (0..count)
            .map(|_| {
                let digit = number % q;
                number /= q;
                digit as Element
            })
            .collect()
    }

    /// The message of a word's number, as rows and their scalars.
    fn message(&self, number: u64) -> Vec<(usize, Element)> {
        let k = self.code.dimension();
        let lead = (number % k as u64) as usize;
        let digits = self.digits(number / k as u64, k - 1 - lead);
        let rest = digits
            .iter()
            .enumerate()
            .map(|(back, &digit)| (k - 1 - back, digit));
        std::iter::once((lead, 1))
            .chain(rest)
            .filter(|&(_, digit)| digit != 0)
            .collect()
    }

    fn tally(&self, progress: &dyn Progress) -> Tally {
        const BASES_A_PIECE: u64 = 64;
        const PIECES_A_TICK: u64 = 256;
        let k = self.code.dimension();
        let mut all = self.nothing();
        for lead in (0..k).rev() {
            let tail = self.tail_after(lead);
            let bases = power(self.arithmetic.order, k - 1 - lead - tail);
            let pieces = bases.div_ceil(BASES_A_PIECE);
            for first in (0..pieces).step_by(PIECES_A_TICK as usize) {
                let last = (first + PIECES_A_TICK).min(pieces);
                let found = (first..last)
                    .into_par_iter()
                    .map(|piece| {
                        let start = piece * BASES_A_PIECE;
                        self.piece(lead, start..(start + BASES_A_PIECE).min(bases))
                    })
                    .reduce(|| self.nothing(), Tally::join);
                all = all.join(found);
                if lead == 0 {
                    progress.tick("all words", last, pieces);
                }
            }
        }
        all
    }

    fn nothing(&self) -> Tally {
        Tally {
            counts: vec![0; self.code.length + 1],
            lightest: None,
        }
    }

    /// How many rows after `lead` are combined at once: by table, or the last one by scalars.
    fn tail_after(&self, lead: usize) -> usize {
        let after = self.code.dimension() - 1 - lead;
        if self.table.is_empty() {
            after.min(1)
        } else {
            after.min(self.tail)
        }
    }

    /// The words whose lead is `lead` and whose digits above the tail are one of `bases`.
    fn piece(&self, lead: usize, bases: std::ops::Range<u64>) -> Tally {
        let k = self.code.dimension();
        let tail = self.tail_after(lead);
        let size = power(self.arithmetic.order, tail);
        let mut tally = self.nothing();
        for base in bases {
            let digits = self.digits(base, k - 1 - lead - tail);
            let mut sum = self.code.rows[lead].clone();
            for (back, &digit) in digits.iter().enumerate() {
                self.arithmetic
                    .add_scaled(&mut sum, digit, &self.code.rows[k - 1 - tail - back]);
            }
            let rows = 1 + digits.iter().filter(|&&digit| digit != 0).count() as u32;
            let first = base * size;
            let number = |at: u64| lead as u64 + k as u64 * (first + at);
            if self.table.is_empty() {
                self.by_scalars(&sum, rows, tail == 1, &mut tally, number);
            } else {
                self.by_table(&sum, rows, size as usize, &mut tally, number);
            }
        }
        tally
    }

    fn by_table(
        &self,
        sum: &[Element],
        rows: u32,
        size: usize,
        tally: &mut Tally,
        number: impl Fn(u64) -> u64,
    ) {
        let mut distances = vec![0; size];
        byte_distances(&self.bytes(sum), &self.table, &mut distances);
        for (at, (&distance, &more)) in distances.iter().zip(&self.rows_in).enumerate() {
            let weight = (rows + more + distance) as usize;
            tally.counts[weight] += 1;
            tally.note(weight as u64, number(at as u64));
        }
    }

    /// All sums of one vector with the multiples of the last row, without making them: the entry
    /// at a position vanishes for one scalar, so weights come from counting equal scalars.
    fn by_scalars(
        &self,
        sum: &[Element],
        rows: u32,
        with_last: bool,
        tally: &mut Tally,
        number: impl Fn(u64) -> u64,
    ) {
        let field = &self.arithmetic.field;
        let non_zero = |entries: &[Element]| entries.iter().filter(|&&entry| entry != 0).count();
        if !with_last {
            let weight = rows as usize + non_zero(sum);
            tally.counts[weight] += 1;
            tally.note(weight as u64, number(0));
            return;
        }
        let last = &self.code.rows[self.code.dimension() - 1];
        let (mut fixed, mut cancelling) = (rows as usize, Vec::new());
        for (&entry, &add) in sum.iter().zip(last) {
            match field.inv(add) {
                Some(inverse) => cancelling.push(field.neg(field.mul(entry, inverse))),
                None => fixed += usize::from(entry != 0),
            }
        }
        cancelling.sort_unstable();
        let full = fixed + cancelling.len();
        let mut without = self.arithmetic.order;
        let mut see = |scalar: Element, gone: usize| {
            let weight = full - gone + usize::from(scalar != 0);
            without -= 1;
            tally.counts[weight] += 1;
            tally.note(weight as u64, number(u64::from(scalar)));
        };
        if cancelling.first() != Some(&0) {
            see(0, 0);
        }
        for equal in cancelling.chunk_by(|left, right| left == right) {
            see(equal[0], equal.len());
        }
        if without > 0 {
            tally.counts[full + 1] += without;
        }
    }
}
