//! Meeting in the middle: w dependent columns are ⌈w/2⌉ and ⌊w/2⌋ of them with equal sums.
//!
//! Every smaller set being independent, two different combinations with equal sums have no column
//! in common, so each such pair is a word. Sums mark bits of a table; those that meet a mark are
//! suspects, whose keys are then counted exactly; only keys that do come twice are traced back to
//! their columns.

use rayon::prelude::*;

use super::Budget;
use super::LightWord;
use super::arithmetic::{choose, power, product};
use super::columns::Look;
use super::keys::Keys;
use super::marks::Marks;
use super::sums::{Kind, Middle, Pass, passes};

/// Work units for making a sum, and for marking or looking up a sum as well.
const UNITS_A_SUM: u64 = 2;
const UNITS_A_MARK: u64 = 10;
/// How many suspects are kept before they are looked at.
const MOST_SUSPECTS: usize = 1 << 22;
/// Passes that are made side by side.
const PASSES_AT_ONCE: usize = 4;
/// Sums that are shared out among threads at a time.
const SUMS_AT_ONCE: u64 = 1 << 22;
/// Keys that are traced back to their columns at a time.
const TRACED_AT_ONCE: usize = 64;

/// The most work units for weight `weight` among n columns with `redundancy` rows.
pub(super) fn cost_of_middle(q: u64, n: usize, redundancy: usize, weight: usize) -> u64 {
    let (small, large) = (weight / 2, weight.div_ceil(2));
    let marked = product(&[choose(n, small), power(q - 1, small)]);
    // Over odd characteristics every pass makes all sums.
    let rounds = match q % 2 {
        0 => 2 * UNITS_A_SUM,
        _ => passes(marked, product(&[n as u64, q - 1])).saturating_mul(2 * UNITS_A_SUM),
    };
    if small == large {
        // More sums than vectors: two are equal before the vectors are used up.
        let sums = marked.min(power(q, redundancy).saturating_add(product(&[n as u64, q - 1])));
        return product(&[sums, UNITS_A_MARK + rounds]);
    }
    let met = product(&[choose(n, large), power(q - 1, large - 1)]);
    product(&[
        marked.saturating_add(met),
        UNITS_A_MARK + UNITS_A_SUM * rounds,
    ])
}

/// About the work units until a first word of this weight, were the columns random.
pub(super) fn likely_cost(q: u64, n: usize, redundancy: usize, weight: usize) -> u64 {
    let words = choose(n, weight) as f64 * ((q - 1) as f64).powi(weight as i32 - 1);
    let expected = words / (q as f64).powi(redundancy as i32);
    let share = if weight.is_multiple_of(2) {
        expected.sqrt()
    } else {
        expected
    };
    let small = product(&[choose(n, weight / 2), power(q - 1, weight / 2)]);
    let cost = (cost_of_middle(q, n, redundancy, weight) as f64 / share.max(1.0)) as u64;
    // With sets of two sizes, all of the smaller ones come first.
    if weight.is_multiple_of(2) {
        cost
    } else {
        cost.saturating_add(product(&[small, UNITS_A_MARK]))
    }
}

impl<K: Keys> Middle<'_, K> {
    /// Looks for a word of this weight, 3 at least, there being no lighter one.
    pub(super) fn look(&self, weight: usize, budget: &Budget) -> Look {
        let small = Kind {
            size: weight / 2,
            normed: false,
        };
        let large = Kind {
            size: weight.div_ceil(2),
            normed: true,
        };
        let values = power(self.columns.arithmetic.order, self.columns.rank);
        let marked = self.sums(small).min(values);
        let rounds = passes(marked, self.scaled.len() as u64);
        let passes = self.passes(rounds as usize);
        if let [pass] = passes.as_slice() {
            return self.pass(weight, pass, marked, budget);
        }
        let all = if weight.is_multiple_of(2) {
            marked
        } else {
            marked.saturating_add(self.sums(large))
        };
        let share = if self.keys.low(self.scaled[0]).is_some() {
            all / rounds
        } else {
            all
        };
        let cost = (all / rounds)
            .saturating_mul(UNITS_A_MARK)
            .saturating_add(share.saturating_mul(2 * UNITS_A_SUM));
        for some in passes.chunks(PASSES_AT_ONCE) {
            if !budget.spend(cost.saturating_mul(some.len() as u64)) {
                return Look::OutOfBudget;
            }
            let looks: Vec<Look> = some
                .par_iter()
                .map(|pass| self.pass(weight, pass, marked / rounds, &Budget::unlimited()))
                .collect();
            if let Some(found) = looks
                .into_iter()
                .find(|look| matches!(look, Look::Found(_)))
            {
                return found;
            }
        }
        Look::None
    }

    /// Looks at one pass, with about so many sums to mark.
    fn pass(&self, weight: usize, pass: &Pass<K::Key>, marked: u64, budget: &Budget) -> Look {
        if weight.is_multiple_of(2) {
            self.equal_sums(weight / 2, pass, marked, budget)
        } else {
            self.meeting_sums(weight / 2, pass, marked, budget)
        }
    }

    /// Two combinations of `size` columns with equal sums.
    fn equal_sums(&self, size: usize, pass: &Pass<K::Key>, marked: u64, budget: &Budget) -> Look {
        let kind = Kind {
            size,
            normed: false,
        };
        let mut marks = Marks::new(&self.keys, marked, 4);
        let mut suspects = Vec::new();
        let (mut seen, mut looked) = (0u64, 0u64);
        let n = self.columns.columns.len();
        for top in size - 1..n {
            let sums = self.sums_with(top, kind);
            if !budget.spend(sums.saturating_mul(UNITS_A_MARK)) {
                return Look::OutOfBudget;
            }
            self.each_sum(pass, top, kind, &mut |key, _, _| {
                if marks.mark(&self.keys, key) {
                    suspects.push(key);
                }
                !marks.exact || suspects.is_empty()
            });
            seen = seen.saturating_add(sums);
            let due = seen >= 2 * looked || suspects.len() > MOST_SUSPECTS || top + 1 == n;
            if (due || marks.exact) && !suspects.is_empty() {
                if !budget.spend(seen.saturating_mul(UNITS_A_SUM)) {
                    return Look::OutOfBudget;
                }
                if let Some(word) = self.resolve_equal(pass, kind, top + 1, &mut suspects) {
                    return Look::Found(word);
                }
                suspects.clear();
                looked = seen;
            }
        }
        Look::None
    }

    /// The word from two combinations within the first `limit` columns whose sum is a suspect.
    fn resolve_equal(
        &self,
        pass: &Pass<K::Key>,
        kind: Kind,
        limit: usize,
        suspects: &mut Vec<K::Key>,
    ) -> Option<LightWord> {
        suspects.sort_unstable();
        suspects.dedup();
        let filter = Marks::of(&self.keys, suspects);
        let mut times = vec![0u8; suspects.len()];
        for top in kind.size - 1..limit {
            self.each_sum(pass, top, kind, &mut |key, _, _| {
                if filter.has(&self.keys, key)
                    && let Ok(at) = suspects.binary_search(&key)
                {
                    times[at] = times[at].saturating_add(1);
                }
                true
            });
        }
        let twice: Vec<K::Key> = suspects
            .iter()
            .zip(&times)
            .filter(|&(_, &times)| times > 1)
            .map(|(&key, _)| key)
            .collect();
        twice.chunks(TRACED_AT_ONCE).find_map(|some| {
            let sets = self.trace(pass, kind, limit, some);
            (0..sets.len()).find_map(|one| {
                let (key, set) = &sets[one];
                sets[one + 1..]
                    .iter()
                    .filter(|(other, _)| other == key)
                    .find_map(|(_, other)| self.word_of(set, other))
            })
        })
    }

    /// A combination of `size` columns and one of `size` + 1 with equal sums.
    fn meeting_sums(&self, size: usize, pass: &Pass<K::Key>, marked: u64, budget: &Budget) -> Look {
        let (small, large) = (
            Kind {
                size,
                normed: false,
            },
            Kind {
                size: size + 1,
                normed: true,
            },
        );
        let n = self.columns.columns.len();
        if !budget.spend(marked.saturating_mul(UNITS_A_MARK)) {
            return Look::OutOfBudget;
        }
        let mut marks = Marks::new(&self.keys, marked, 7);
        for top in size - 1..n {
            self.each_sum(pass, top, small, &mut |key, _, _| {
                marks.mark(&self.keys, key);
                true
            });
        }
        let mut suspects = Vec::new();
        let (mut seen, mut looked, mut top) = (0u64, 0u64, size);
        while top < n {
            let first = top;
            let mut sums = 0u64;
            while top < n && sums < SUMS_AT_ONCE {
                sums = sums.saturating_add(self.sums_with(top, large));
                top += 1;
            }
            if !budget.spend(sums.saturating_mul(UNITS_A_MARK)) {
                return Look::OutOfBudget;
            }
            suspects.extend(self.marked_sums(pass, first..top, large, &marks));
            seen = seen.saturating_add(sums);
            let due = seen >= 2 * looked || suspects.len() > MOST_SUSPECTS || top == n;
            if (due || marks.exact) && !suspects.is_empty() {
                if !budget.spend(marked.saturating_mul(UNITS_A_SUM)) {
                    return Look::OutOfBudget;
                }
                if let Some(word) = self.resolve_meeting(pass, small, large, top, &mut suspects) {
                    return Look::Found(word);
                }
                suspects.clear();
                looked = seen.max(marked);
            }
        }
        Look::None
    }

    /// The sums that meet a mark; only the first of each last column when marks are exact.
    fn marked_sums(
        &self,
        pass: &Pass<K::Key>,
        tops: std::ops::Range<usize>,
        kind: Kind,
        marks: &Marks,
    ) -> Vec<K::Key> {
        let parts: Vec<Vec<K::Key>> = tops
            .into_par_iter()
            .map(|top| {
                let mut met = Vec::new();
                self.each_sum(pass, top, kind, &mut |key, _, _| {
                    if marks.has(&self.keys, key) {
                        met.push(key);
                    }
                    !marks.exact || met.is_empty()
                });
                met
            })
            .collect();
        parts.concat()
    }

    /// The word from one of the suspects that is a sum of both kinds.
    fn resolve_meeting(
        &self,
        pass: &Pass<K::Key>,
        small: Kind,
        large: Kind,
        limit: usize,
        suspects: &mut Vec<K::Key>,
    ) -> Option<LightWord> {
        suspects.sort_unstable();
        suspects.dedup();
        let n = self.columns.columns.len();
        let filter = Marks::of(&self.keys, suspects);
        let mut met = vec![false; suspects.len()];
        for top in small.size - 1..n {
            self.each_sum(pass, top, small, &mut |key, _, _| {
                if filter.has(&self.keys, key)
                    && let Ok(at) = suspects.binary_search(&key)
                {
                    met[at] = true;
                }
                true
            });
        }
        let both: Vec<K::Key> = suspects
            .iter()
            .zip(&met)
            .filter(|&(_, &met)| met)
            .map(|(&key, _)| key)
            .collect();
        both.chunks(TRACED_AT_ONCE).find_map(|some| {
            let (few, many) = (
                self.trace(pass, small, n, some),
                self.trace(pass, large, limit, some),
            );
            many.iter().find_map(|(key, set)| {
                few.iter()
                    .filter(|(other, _)| other == key)
                    .find_map(|(_, other)| self.word_of(set, other))
            })
        })
    }

    /// All combinations of the pass within the first `limit` columns with one of these keys (ascending), as
    /// columns.
    fn trace(
        &self,
        pass: &Pass<K::Key>,
        kind: Kind,
        limit: usize,
        keys: &[K::Key],
    ) -> Vec<(K::Key, Vec<usize>)> {
        let filter = Marks::of(&self.keys, keys);
        let mut sets = Vec::new();
        for top in kind.size - 1..limit {
            self.each_sum(pass, top, kind, &mut |key, stack, flat| {
                if filter.has(&self.keys, key) && keys.binary_search(&key).is_ok() {
                    let set = stack
                        .iter()
                        .chain([&flat])
                        .map(|at| at / self.scalars)
                        .collect();
                    sets.push((key, set));
                }
                true
            });
        }
        sets
    }

    /// The word on two disjoint sets of columns.
    fn word_of(&self, one: &[usize], other: &[usize]) -> Option<LightWord> {
        let mut support = [one, other].concat();
        support.sort_unstable();
        support.dedup();
        let disjoint = support.len() == one.len() + other.len();
        disjoint.then(|| self.columns.word_on(&support)).flatten()
    }
}
