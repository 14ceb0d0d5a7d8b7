//! Sums of a few rows of a systematic generator, and the lightest among them.
//!
//! Only the positions outside the information set are summed; the number of rows is the weight
//! on the others. The rows of a combination come in descending order, the first ones fixed by the
//! caller so that the work can be shared out, the last ones met in a table of ready sums.

use super::arithmetic::{Arithmetic, Systematic, TABLE_ORDER, choose};
use crate::algebra::kernels::lightest::{least_distance, lightest_packed};
use crate::algebra::{Element, Field};

/// Bytes of the largest table of ready sums: near caches hold it.
const TABLE_BYTES: u64 = 1 << 16;

/// A combination of rows and the weight of the word it gives.
#[derive(Clone, PartialEq, Eq, Debug)]
pub(super) struct Found {
    pub(super) weight: usize,
    /// The rows and their scalars.
    pub(super) message: Vec<(usize, Element)>,
}

/// The combinations of rows of one systematic generator, one of each line through zero.
pub(super) trait Combinations: Sync {
    /// The first of the lightest words that are lighter than `below`, among combinations of
    /// `size` ≥ 1 rows whose last rows are `tops` (descending, at least one, at most `size`).
    fn lightest(&self, size: usize, tops: &[usize], below: usize) -> Option<Found>;
}

/// The kernel for a code's field and redundancy.
pub(super) fn combinations(field: &Field, code: &Systematic) -> Box<dyn Combinations> {
    if field.is_binary() {
        return match code.free.len().div_ceil(64) {
            0..=1 => Box::new(Packed::<1>::new(code)),
            2 => Box::new(Packed::<2>::new(code)),
            3 => Box::new(Packed::<3>::new(code)),
            4 => Box::new(Packed::<4>::new(code)),
            5..=6 => Box::new(Packed::<6>::new(code)),
            7..=8 => Box::new(Packed::<8>::new(code)),
            9..=12 => Box::new(Packed::<12>::new(code)),
            13..=16 => Box::new(Packed::<16>::new(code)),
            17..=32 => Box::new(Packed::<32>::new(code)),
            33..=64 => Box::new(Packed::<64>::new(code)),
            _ => Box::new(Scalars::new(field, code)),
        };
    }
    if field.order() <= TABLE_ORDER && !code.free.is_empty() {
        return Box::new(Bytes::new(field, code));
    }
    Box::new(Scalars::new(field, code))
}

/// Packs 0/1 entries into 64-bit words, lowest bit first.
pub(super) fn pack<const W: usize>(entries: &[Element]) -> [u64; W] {
    let mut packed = [0; W];
    for (at, &entry) in entries.iter().enumerate() {
        packed[at / 64] |= u64::from(entry) << (at % 64);
    }
    packed
}

fn plus<const W: usize>(left: &[u64; W], right: &[u64; W]) -> [u64; W] {
    std::array::from_fn(|at| left[at] ^ right[at])
}

/// Binary rows.
struct Packed<const W: usize> {
    rows: Vec<[u64; W]>,
    /// For t = 1, 2, …: the sums of t rows, those with a smaller last row first.
    sums: Vec<Vec<[u64; W]>>,
}

impl<const W: usize> Packed<W> {
    fn new(code: &Systematic) -> Packed<W> {
        let rows: Vec<[u64; W]> = code.rows.iter().map(|row| pack(row)).collect();
        let mut sums = vec![rows.clone()];
        while choose(rows.len(), sums.len() + 1).saturating_mul(8 * W as u64) <= TABLE_BYTES
            && sums.len() < rows.len()
        {
            let size = sums.len();
            let smaller = &sums[size - 1];
            let next = (size..rows.len())
                .flat_map(|top| {
                    let below = choose(top, size) as usize;
                    smaller[..below].iter().map(move |sum| (top, sum))
                })
                .map(|(top, sum)| plus(sum, &rows[top]))
                .collect();
            sums.push(next);
        }
        Packed { rows, sums }
    }

    /// `rest` more rows below `limit` on top of `sum`; lowers `best` and keeps its rows.
    fn descend(
        &self,
        sum: [u64; W],
        rest: usize,
        limit: usize,
        stack: &mut Vec<usize>,
        best: &mut Best,
    ) {
        if rest == 0 {
            let weight = stack.len()
                + sum
                    .iter()
                    .map(|word| word.count_ones() as usize)
                    .sum::<usize>();
            if weight < best.below {
                best.keep(weight, stack.iter().map(|&row| (row, 1)).collect());
            }
            return;
        }
        if rest <= self.sums.len() {
            let table = &self.sums[rest - 1][..choose(limit, rest) as usize];
            let least = lightest_packed(&sum, table) as usize;
            let rows = stack.len() + rest;
            if least < best.below.saturating_sub(rows) {
                let weight = |entry: &[u64; W]| {
                    plus(&sum, entry)
                        .iter()
                        .map(|word| word.count_ones())
                        .sum::<u32>()
                };
                let at = table
                    .iter()
                    .position(|entry| weight(entry) as usize == least);
                let inner = unrank(at.expect("the least is in the table"), rest);
                best.keep(
                    least + rows,
                    stack
                        .iter()
                        .copied()
                        .chain(inner)
                        .map(|row| (row, 1))
                        .collect(),
                );
            }
            return;
        }
        for row in (rest - 1..limit).rev() {
            stack.push(row);
            self.descend(plus(&sum, &self.rows[row]), rest - 1, row, stack, best);
            stack.pop();
        }
    }
}

impl<const W: usize> Combinations for Packed<W> {
    fn lightest(&self, size: usize, tops: &[usize], below: usize) -> Option<Found> {
        let mut best = Best {
            below,
            message: None,
        };
        let sum = tops
            .iter()
            .fold([0; W], |sum, &top| plus(&sum, &self.rows[top]));
        let limit = *tops.last()?;
        self.descend(sum, size - tops.len(), limit, &mut tops.to_vec(), &mut best);
        best.found()
    }
}

/// The rows of the combination at a place among those of its size ordered by last row.
fn unrank(mut place: usize, size: usize) -> Vec<usize> {
    let mut rows = Vec::with_capacity(size);
    for size in (1..=size).rev() {
        let mut row = size - 1;
        while choose(row + 1, size) as usize <= place {
            row += 1;
        }
        place -= choose(row, size) as usize;
        rows.push(row);
    }
    rows
}

/// The lightest so far.
struct Best {
    below: usize,
    message: Option<Vec<(usize, Element)>>,
}

impl Best {
    fn keep(&mut self, weight: usize, message: Vec<(usize, Element)>) {
        self.below = weight;
        self.message = Some(message);
    }

    fn found(self) -> Option<Found> {
        let weight = self.below;
        self.message.map(|message| Found { weight, message })
    }
}

/// Rows over a field with at most 256 elements, one byte a symbol.
struct Bytes {
    arithmetic: Arithmetic,
    rows: Vec<Vec<Element>>,
    stride: usize,
    /// Every multiple of every row, negated: row r times −(s + 1) at r · (q − 1) + s.
    multiples: Vec<u8>,
}

impl Bytes {
    fn new(field: &Field, code: &Systematic) -> Bytes {
        let arithmetic = Arithmetic::new(field);
        let stride = code.free.len().next_multiple_of(32);
        let mut multiples = Vec::new();
        for row in &code.rows {
            for scalar in 1..field.order() as Element {
                let negated = arithmetic.scaled(field.neg(scalar), row);
                multiples.extend(padded(&negated, stride));
            }
        }
        Bytes {
            arithmetic,
            rows: code.rows.clone(),
            stride,
            multiples,
        }
    }

    fn descend(
        &self,
        sum: &[Element],
        rest: usize,
        limit: usize,
        stack: &mut Vec<(usize, Element)>,
        best: &mut Best,
    ) {
        let scalars = self.arithmetic.order as usize - 1;
        if rest == 0 {
            let weight = stack.len() + sum.iter().filter(|&&entry| entry != 0).count();
            if weight < best.below {
                best.keep(weight, stack.clone());
            }
            return;
        }
        if rest == 1 {
            let table = &self.multiples[..limit * scalars * self.stride];
            let (least, at) = least_distance(&padded(sum, self.stride), table);
            let weight = (least as usize).saturating_add(stack.len() + 1);
            if weight < best.below {
                let last = (at / scalars, (at % scalars + 1) as Element);
                best.keep(weight, stack.iter().copied().chain([last]).collect());
            }
            return;
        }
        for row in (rest - 1..limit).rev() {
            self.with_row(sum, rest, row, stack, best);
        }
    }

    /// The same with `row` as the next one, times every scalar.
    fn with_row(
        &self,
        sum: &[Element],
        rest: usize,
        row: usize,
        stack: &mut Vec<(usize, Element)>,
        best: &mut Best,
    ) {
        for scalar in 1..self.arithmetic.order as Element {
            let mut more = sum.to_vec();
            self.arithmetic
                .add_scaled(&mut more, scalar, &self.rows[row]);
            stack.push((row, scalar));
            self.descend(&more, rest - 1, row, stack, best);
            stack.pop();
        }
    }
}

fn padded(symbols: &[Element], stride: usize) -> Vec<u8> {
    let mut bytes: Vec<u8> = symbols.iter().map(|&symbol| symbol as u8).collect();
    bytes.resize(stride, 0);
    bytes
}

impl Combinations for Bytes {
    fn lightest(&self, size: usize, tops: &[usize], below: usize) -> Option<Found> {
        let mut best = Best {
            below,
            message: None,
        };
        let (&top, others) = tops.split_first()?;
        let mut stack = vec![(top, 1)];
        match others.first() {
            // At most two rows are fixed.
            Some(&next) => self.with_row(&self.rows[top], size - 1, next, &mut stack, &mut best),
            None => self.descend(&self.rows[top], size - 1, top, &mut stack, &mut best),
        }
        best.found()
    }
}

/// Rows over a large field: the best scalar of the last row is the one that most positions ask
/// for to vanish, so the scalars need not be tried.
struct Scalars {
    field: Field,
    rows: Vec<Vec<Element>>,
}

impl Scalars {
    fn new(field: &Field, code: &Systematic) -> Scalars {
        Scalars {
            field: field.clone(),
            rows: code.rows.clone(),
        }
    }

    fn descend(
        &self,
        sum: &[Element],
        rest: usize,
        limit: usize,
        stack: &mut Vec<(usize, Element)>,
        best: &mut Best,
    ) {
        let non_zero = sum.iter().filter(|&&entry| entry != 0).count();
        if rest == 0 {
            if stack.len() + non_zero < best.below {
                best.keep(stack.len() + non_zero, stack.clone());
            }
            return;
        }
        for row in (rest - 1..limit).rev() {
            self.with_row(sum, rest, row, stack, best);
        }
    }

    fn with_row(
        &self,
        sum: &[Element],
        rest: usize,
        row: usize,
        stack: &mut Vec<(usize, Element)>,
        best: &mut Best,
    ) {
        if rest == 1 {
            let (weight, scalar) = self.best_scalar(sum, &self.rows[row]);
            let weight = weight + stack.len() + 1;
            if weight < best.below {
                best.keep(
                    weight,
                    stack.iter().copied().chain([(row, scalar)]).collect(),
                );
            }
            return;
        }
        for scalar in 1..self.field.order() as Element {
            let more: Vec<Element> = sum
                .iter()
                .zip(&self.rows[row])
                .map(|(&entry, &add)| self.field.add(entry, self.field.mul(scalar, add)))
                .collect();
            stack.push((row, scalar));
            self.descend(&more, rest - 1, row, stack, best);
            stack.pop();
        }
    }

    /// The least weight of `sum + scalar · row` over non-zero scalars, and the first that has it.
    fn best_scalar(&self, sum: &[Element], row: &[Element]) -> (usize, Element) {
        let mut fixed = 0;
        let mut cancelling = Vec::with_capacity(row.len());
        for (&entry, &add) in sum.iter().zip(row) {
            match self.field.inv(add) {
                None => fixed += usize::from(entry != 0),
                Some(_) if entry == 0 => fixed += 1,
                Some(inverse) => cancelling.push(self.field.neg(self.field.mul(entry, inverse))),
            }
        }
        cancelling.sort_unstable();
        let all = fixed + cancelling.len();
        cancelling
            .chunk_by(|left, right| left == right)
            .map(|equal| (all - equal.len(), equal[0]))
            .min()
            .unwrap_or((all, 1))
    }
}

impl Combinations for Scalars {
    fn lightest(&self, size: usize, tops: &[usize], below: usize) -> Option<Found> {
        let mut best = Best {
            below,
            message: None,
        };
        let (&top, others) = tops.split_first()?;
        let mut stack = vec![(top, 1)];
        match others.first() {
            Some(&next) => self.with_row(&self.rows[top], size - 1, next, &mut stack, &mut best),
            None => self.descend(&self.rows[top], size - 1, top, &mut stack, &mut best),
        }
        best.found()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn places_name_combinations_in_order() {
        for size in 1..4 {
            let mut all: Vec<Vec<usize>> = (0..choose(7, size) as usize)
                .map(|place| unrank(place, size))
                .collect();
            assert!(all.is_sorted());
            assert!(
                all.iter()
                    .all(|rows| rows.windows(2).all(|pair| pair[0] > pair[1]))
            );
            all.dedup();
            assert_eq!(all.len(), choose(7, size) as usize);
            assert!(all.iter().all(|rows| rows[0] < 7));
        }
    }
}
