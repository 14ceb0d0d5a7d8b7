//! All sums of a few scaled columns, one after the other, in one or several passes.

use std::sync::Arc;

use super::arithmetic::{choose, power, product};
use super::columns::Columns;
use super::keys::Keys;
use crate::algebra::Element;

/// Sums for which a pass is meant, and the most for which it has marks enough.
/// Few in tests, so that those have several passes.
const SUMS_A_PASS: u64 = if cfg!(test) { 1 << 5 } else { 1 << 23 };
const MOST_SUMS_A_PASS: u64 = if cfg!(test) { 1 << 7 } else { 1 << 25 };

/// The scaled columns of a check matrix as keys.
pub(super) struct Middle<'a, K: Keys> {
    pub(super) columns: &'a Columns<'a>,
    pub(super) keys: K,
    pub(super) scalars: usize,
    /// The key of each multiple of each column: column c times s + 1 at c · (q − 1) + s.
    pub(super) scaled: Vec<K::Key>,
}

/// Combinations of so many columns, the last one's scalar fixed to 1 if `normed`.
#[derive(Clone, Copy)]
pub(super) struct Kind {
    pub(super) size: usize,
    pub(super) normed: bool,
}

/// One of several passes over all combinations: those whose keys have its number as lowest bits.
/// Given all but one column of a combination, that tells which ones can be the last.
pub(super) struct Pass<Key> {
    number: usize,
    /// By lowest bits, the multiples and their keys; a single list when there is one pass.
    lists: Arc<Vec<Vec<(usize, Key)>>>,
}

/// How many passes so many sums of columns take, each of n having so many multiples: a power of
/// two, large enough for the table of marks, and not so large that few columns are left to each.
pub(super) fn passes(sums: u64, multiples: u64) -> u64 {
    let wanted = sums.div_ceil(SUMS_A_PASS).min(multiples / 8);
    wanted
        .max(sums.div_ceil(MOST_SUMS_A_PASS))
        .clamp(1, 1 << 40)
        .next_power_of_two()
}

impl<'a, K: Keys> Middle<'a, K> {
    pub(super) fn new(columns: &'a Columns<'a>, keys: K) -> Middle<'a, K> {
        let scalars = columns.arithmetic.order as usize - 1;
        let scaled = columns
            .columns
            .iter()
            .flat_map(|column| (1..=scalars).map(move |scalar| (column, scalar as Element)))
            .map(|(column, scalar)| keys.key(&columns.arithmetic.scaled(scalar, column)))
            .collect();
        Middle {
            columns,
            keys,
            scalars,
            scaled,
        }
    }

    /// So many passes, a power of two.
    pub(super) fn passes(&self, rounds: usize) -> Vec<Pass<K::Key>> {
        let mut lists = vec![Vec::new(); rounds];
        for (flat, &key) in self.scaled.iter().enumerate() {
            lists[self.keys.low(key).unwrap_or(0) & (rounds - 1)].push((flat, key));
        }
        let lists = Arc::new(lists);
        (0..rounds)
            .map(|number| Pass {
                number,
                lists: lists.clone(),
            })
            .collect()
    }

    /// How many combinations there are.
    pub(super) fn sums(&self, kind: Kind) -> u64 {
        let free = kind.size - usize::from(kind.normed);
        product(&[
            choose(self.columns.columns.len(), kind.size),
            power(self.scalars as u64, free),
        ])
    }

    /// How many have `top` as their last column.
    pub(super) fn sums_with(&self, top: usize, kind: Kind) -> u64 {
        let free = kind.size - usize::from(kind.normed);
        product(&[choose(top, kind.size - 1), power(self.scalars as u64, free)])
    }

    /// Whether a key is one of the pass.
    #[inline]
    fn is_of(&self, pass: &Pass<K::Key>, key: K::Key) -> bool {
        let mask = pass.lists.len() - 1;
        let number = match self.keys.low(key) {
            Some(low) => low,
            None => self.keys.slot(key, 62) as usize >> 3,
        };
        (number ^ pass.number) & mask == 0
    }

    /// Every combination of the pass with `top` as its last column. The visitor gets the key, the multiples
    /// but one, and that one, and says whether to go on.
    pub(super) fn each_sum(
        &self,
        pass: &Pass<K::Key>,
        top: usize,
        kind: Kind,
        visit: &mut impl FnMut(K::Key, &[usize], usize) -> bool,
    ) {
        let first = top * self.scalars;
        let mut stack = Vec::with_capacity(kind.size);
        for flat in first..first + if kind.normed { 1 } else { self.scalars } {
            let go_on = if kind.size == 1 {
                let key = self.scaled[flat];
                !self.is_of(pass, key) || visit(key, &stack, flat)
            } else {
                stack.push(flat);
                let go_on = self.each_below(
                    pass,
                    top,
                    kind.size - 1,
                    self.scaled[flat],
                    &mut stack,
                    visit,
                );
                stack.pop();
                go_on
            };
            if !go_on {
                return;
            }
        }
    }

    fn each_below(
        &self,
        pass: &Pass<K::Key>,
        limit: usize,
        size: usize,
        sum: K::Key,
        stack: &mut Vec<usize>,
        visit: &mut impl FnMut(K::Key, &[usize], usize) -> bool,
    ) -> bool {
        let end = limit * self.scalars;
        if size == 1 {
            let lists = pass.lists.as_slice();
            let wanted = self
                .keys
                .low(sum)
                .map_or(0, |low| (low ^ pass.number) & (lists.len() - 1));
            if lists.len() == 1 {
                let mut all = self.scaled[..end].iter().enumerate();
                return all.all(|(flat, &key)| visit(self.keys.add(sum, key), stack, flat));
            }
            let mut some = lists[wanted].iter().take_while(|&&(flat, _)| flat < end);
            return some.all(|&(flat, key)| {
                let key = self.keys.add(sum, key);
                !self.is_of(pass, key) || visit(key, stack, flat)
            });
        }
        for column in size - 1..limit {
            for flat in column * self.scalars..(column + 1) * self.scalars {
                stack.push(flat);
                let key = self.keys.add(sum, self.scaled[flat]);
                let go_on = self.each_below(pass, column, size - 1, key, stack, visit);
                stack.pop();
                if !go_on {
                    return false;
                }
            }
        }
        true
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::algebra::{Field, Matrix};
    use crate::derive::search::keys::{BitKeys, LaneKeys};

    fn every_sum_has_one_pass<K: Keys>(columns: &Columns, keys: K) {
        let middle = Middle::new(columns, keys);
        for size in 1..=3 {
            for normed in [false, true] {
                let kind = Kind { size, normed };
                let all = |rounds: usize| -> Vec<(K::Key, Vec<usize>)> {
                    let mut seen = Vec::new();
                    for pass in middle.passes(rounds) {
                        for top in size - 1..middle.columns.columns.len() {
                            middle.each_sum(&pass, top, kind, &mut |key, stack, flat| {
                                seen.push((key, [stack, &[flat]].concat()));
                                true
                            });
                        }
                    }
                    seen.sort_unstable();
                    seen
                };
                let plain = all(1);
                assert_eq!(plain.len() as u64, middle.sums(kind));
                assert!(all(4) == plain && all(16) == plain, "{size} columns");
            }
        }
    }

    #[test]
    fn passes_share_the_sums_out() {
        for (p, rows, n) in [(2, 9, 14), (2, 70, 75), (3, 5, 8), (3, 60, 62), (5, 3, 6)] {
            let field = Field::prime(p).unwrap();
            let check = Matrix::from_fn(&field, rows, n, |row, column| {
                ((row * row + 3 * row * column + column * column * column) as u64 % p) as Element
            });
            let columns = Columns::new(&check);
            if p == 2 {
                every_sum_has_one_pass(&columns, BitKeys::new(&field, columns.rank));
            } else {
                every_sum_has_one_pass(&columns, LaneKeys::new(&field, columns.rank));
            }
        }
    }
}
