//! A light word, by random information sets: an upper bound on the distance, never a lower one.
//!
//! Few of a light word's entries fall on a random information set, so the word is a combination
//! of few rows of the generator that is systematic there. Over GF(2), combinations of up to two
//! rows from each half are met by equal entries on a window of other positions (J. Stern, 1989);
//! over other fields all combinations of up to two rows are examined (Lee and Brickell, 1988).

use rand::SeedableRng;
use rand::seq::SliceRandom;
use rand_chacha::ChaCha8Rng;
use rayon::prelude::*;

use super::arithmetic::{Systematic, TABLE_ORDER, product};
use super::combinations::{Found, combinations};
use super::{Budget, LightWord};
use crate::algebra::{Element, Matrix};

/// Rounds between two looks at what was found; they run side by side.
const ROUNDS_AT_ONCE: u64 = 8;
/// The most rounds, whatever the budget.
const MOST_ROUNDS: u64 = 1 << 16;
/// Work units of a round before any row is touched.
const SETUP: u64 = 5000;
/// The widest window, in bits.
const WIDEST_WINDOW: u32 = 20;

/// The lightest word of the row space of `generator` met until one weighs at most `target`, the
/// budget is gone, or 65,536 information sets were tried. The same seed gives the same word.
/// `None` when there is no word but zero, or no budget for one round.
pub fn light_word(
    generator: &Matrix,
    target: usize,
    seed: u64,
    budget: &Budget,
) -> Option<LightWord> {
    if generator.rows() == 0 || generator.columns() == 0 {
        return None;
    }
    let binary = generator
        .field()
        .is_binary()
        .then(|| BinaryRows::new(generator));
    let cost = match &binary {
        Some(rows) => rows.cost_of_round(),
        None => cost_of_round(generator),
    };
    let mut best: Option<LightWord> = None;
    for first in (0..MOST_ROUNDS).step_by(ROUNDS_AT_ONCE as usize) {
        let affordable = (0..ROUNDS_AT_ONCE)
            .take_while(|_| budget.spend(cost))
            .count() as u64;
        let found = (first..first + affordable)
            .into_par_iter()
            .filter_map(|round| {
                let mut random = ChaCha8Rng::seed_from_u64(seed);
                random.set_stream(round);
                let mut order: Vec<usize> = (0..generator.columns()).collect();
                order.shuffle(&mut random);
                let below = best.as_ref().map_or(usize::MAX, |best| best.weight);
                let word = match &binary {
                    Some(rows) => rows.round(&order, below),
                    None => any_field_round(generator, &order, below),
                }?;
                Some((word.weight, round, word))
            })
            .min_by_key(|&(weight, round, _)| (weight, round));
        if let Some((_, _, word)) = found {
            best = Some(word);
        }
        if affordable < ROUNDS_AT_ONCE || best.as_ref().is_some_and(|best| best.weight <= target) {
            break;
        }
    }
    best
}

fn cost_of_round(generator: &Matrix) -> u64 {
    let (k, n, q) = (
        generator.rows() as u64,
        generator.columns() as u64,
        generator.field().order(),
    );
    let elimination = product(&[k, k, n, 4]).saturating_add(SETUP + 20 * n);
    let scalars = if q <= TABLE_ORDER {
        (q - 1) * (3 + n / 10)
    } else {
        30 * n
    };
    elimination.saturating_add(product(&[k, k, scalars]))
}

fn any_field_round(generator: &Matrix, order: &[usize], below: usize) -> Option<LightWord> {
    let code = Systematic::in_order(generator, order);
    let engine = combinations(generator.field(), &code);
    let mut best: Option<Found> = None;
    for size in 1..=code.dimension().min(2) {
        for top in size - 1..code.dimension() {
            let below = best.as_ref().map_or(below, |best| best.weight);
            best = engine.lightest(size, &[top], below).or(best);
        }
    }
    LightWord::new(code.word(generator.field(), &best?.message))
}

/// A binary generator, packed.
struct BinaryRows {
    length: usize,
    /// 64-bit words of a row.
    width: usize,
    rows: Vec<Vec<u64>>,
}

/// Up to two rows, by number; `NO_ROW` where there are fewer.
type Pair = (u32, u32);
const NO_ROW: u32 = u32::MAX;

impl BinaryRows {
    fn new(generator: &Matrix) -> BinaryRows {
        let width = generator.columns().div_ceil(64);
        let rows = (0..generator.rows())
            .map(|row| {
                let mut packed = vec![0; width];
                for column in 0..generator.columns() {
                    packed[column / 64] |= u64::from(generator.get(row, column)) << (column % 64);
                }
                packed
            })
            .collect();
        BinaryRows {
            length: generator.columns(),
            width,
            rows,
        }
    }

    fn cost_of_round(&self) -> u64 {
        let (k, width) = (self.rows.len() as u64, self.width as u64);
        let pairs = (k / 2 + 1) * (k / 2 + 2) / 2 + 1;
        let meetings = most_meetings(pairs);
        SETUP
            + 20 * self.length as u64
            + product(&[k, k, width]) / 2
            + 20 * pairs
            + meetings.saturating_mul(2 + 2 * width)
    }

    /// The lightest word of one information set that is lighter than `below`.
    fn round(&self, order: &[usize], below: usize) -> Option<LightWord> {
        let (rows, others) = self.eliminate(order);
        let half = rows.len() / 2;
        let pairs = |from: usize, to: usize| -> Vec<Pair> {
            let mut pairs = vec![(NO_ROW, NO_ROW)];
            for one in from..to {
                pairs.push((one as u32, NO_ROW));
                pairs.extend((from..one).map(|other| (one as u32, other as u32)));
            }
            pairs
        };
        let (left, right) = (pairs(0, half), pairs(half, rows.len()));
        let bits = window(left.len().max(right.len()) as u64).min(others.len() as u32);
        let windows: Vec<u32> = rows
            .iter()
            .map(|row| (0..bits as usize).fold(0, |sum, at| sum | bit(row, others[at]) << at))
            .collect();
        let buckets = Buckets::new(&left, &windows, bits);
        let mut best: Option<(usize, [u32; 4])> = None;
        let mut meetings = most_meetings(right.len() as u64);
        for &(a, b) in &right {
            if meetings == 0 {
                break;
            }
            for &(c, d) in buckets.equal(pair_window((a, b), &windows)) {
                if meetings == 0 {
                    break;
                }
                meetings -= 1;
                let least = best.map_or(below, |(weight, _)| weight);
                let chosen = [a, b, c, d];
                let weight = self.weight(&rows, chosen, least);
                if weight > 0 && weight < least {
                    best = Some((weight, chosen));
                }
            }
        }
        let (_, chosen) = best?;
        let sum = self.sum(&rows, chosen);
        LightWord::new(
            (0..self.length)
                .map(|at| bit(&sum, at) as Element)
                .collect(),
        )
    }

    /// The weight of the sum, or anything at least `least` as soon as it is that heavy.
    fn weight(&self, rows: &[Vec<u64>], chosen: [u32; 4], least: usize) -> usize {
        const ZERO: [u64; 1] = [0];
        let slices = chosen.map(|row| {
            if row == NO_ROW {
                &ZERO[..]
            } else {
                &rows[row as usize][..]
            }
        });
        let mut weight = 0;
        for at in 0..self.width {
            let word = slices
                .iter()
                .fold(0, |sum, slice| sum ^ slice.get(at).copied().unwrap_or(0));
            weight += word.count_ones() as usize;
            if weight >= least {
                break;
            }
        }
        weight
    }

    fn sum(&self, rows: &[Vec<u64>], chosen: [u32; 4]) -> Vec<u64> {
        let mut sum = vec![0; self.width];
        for &row in chosen.iter().filter(|&&row| row != NO_ROW) {
            for (entry, add) in sum.iter_mut().zip(&rows[row as usize]) {
                *entry ^= add;
            }
        }
        sum
    }

    /// The reduced rows for pivots taken in `order`, and the positions that are no pivots.
    fn eliminate(&self, order: &[usize]) -> (Vec<Vec<u64>>, Vec<usize>) {
        let mut rows = self.rows.clone();
        let (mut rank, mut others) = (0, Vec::new());
        for &column in order {
            let Some(found) = (rank..rows.len()).find(|&row| bit(&rows[row], column) == 1) else {
                others.push(column);
                continue;
            };
            rows.swap(rank, found);
            let pivot = std::mem::take(&mut rows[rank]);
            for row in rows
                .iter_mut()
                .filter(|row| !row.is_empty() && bit(row, column) == 1)
            {
                for (entry, add) in row.iter_mut().zip(&pivot) {
                    *entry ^= add;
                }
            }
            rows[rank] = pivot;
            rank += 1;
        }
        rows.truncate(rank);
        (rows, others)
    }
}

fn bit(row: &[u64], at: usize) -> u32 {
    (row[at / 64] >> (at % 64)) as u32 & 1
}

/// As wide a window as there are pairs, so that about as many meet.
fn window(pairs: u64) -> u32 {
    (64 - pairs.leading_zeros()).min(WIDEST_WINDOW)
}

/// How many meetings of pairs are looked at in a round: somewhat more than rows at random would
/// give. Rows of a structured code can agree on the window nearly all.
fn most_meetings(pairs: u64) -> u64 {
    2 * (product(&[pairs, pairs]) >> window(pairs)) + 64
}

fn pair_window((one, other): Pair, windows: &[u32]) -> u32 {
    let get = |row: u32| windows.get(row as usize).copied().unwrap_or(0);
    get(one) ^ get(other)
}

/// Pairs sorted by their window.
struct Buckets {
    starts: Vec<u32>,
    pairs: Vec<Pair>,
}

impl Buckets {
    fn new(pairs: &[Pair], windows: &[u32], bits: u32) -> Buckets {
        let mut starts = vec![0u32; (1 << bits) + 1];
        for &pair in pairs {
            starts[pair_window(pair, windows) as usize + 1] += 1;
        }
        for at in 1..starts.len() {
            starts[at] += starts[at - 1];
        }
        let mut next = starts.clone();
        let mut sorted = vec![(NO_ROW, NO_ROW); pairs.len()];
        for &pair in pairs {
            let place = &mut next[pair_window(pair, windows) as usize];
            sorted[*place as usize] = pair;
            *place += 1;
        }
        Buckets {
            starts,
            pairs: sorted,
        }
    }

    fn equal(&self, window: u32) -> &[Pair] {
        let window = window as usize;
        &self.pairs[self.starts[window] as usize..self.starts[window + 1] as usize]
    }
}
