//! Dependent columns of a check matrix: a word of weight w is w columns that depend on each other.
//!
//! Weights are settled in order. A set of columns is found either by meeting in the middle (sums
//! of ⌈w/2⌉ and of ⌊w/2⌋ scaled columns with equal keys) or, over large fields, by projecting
//! from w − 2 columns in turn and looking for proportional rest. Memory stays bounded: sums mark
//! bits of a table, and only those that meet a mark are looked at again.

use std::collections::HashMap;

use super::arithmetic::{Arithmetic, choose, power, product};
use super::keys::{BitKeys, Keys, LaneKeys};
use super::{Budget, LightWord};
use crate::algebra::{Element, Matrix};

/// Work units for marking or looking up a sum, and for an entry of a projected column.
const UNITS_A_SUM: u64 = 4;
const UNITS_AN_ENTRY: u64 = 5;
/// The table of marks has between 2^10 and 2^30 bits (128 MiB).
const FEWEST_BITS: u32 = 10;
const MOST_BITS: u32 = 30;
/// Sums above this are marked in several passes.
const SUMS_A_PASS: u64 = 1 << 28;
/// How many sums that met a mark are kept before they are looked at.
const MOST_SUSPECTS: usize = 1 << 21;
/// Scaled columns kept for meeting in the middle.
const MOST_SCALED: u64 = 1 << 24;

/// What is known of sets of columns.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Dependent {
    /// Every set of this many columns, or of fewer, is independent: proven.
    pub independent: usize,
    /// A lightest word, of weight `independent + 1`, when one was found.
    pub word: Option<LightWord>,
}

/// The columns of a check matrix, its dependent rows left out.
struct Columns<'a> {
    check: &'a Matrix,
    arithmetic: Arithmetic,
    rank: usize,
    columns: Vec<Vec<Element>>,
    /// Over GF(2), the all-one row is a check: no word has an odd weight.
    even: bool,
}

/// How looking for a set of one size ended.
enum Look {
    None,
    Found(LightWord),
    OutOfBudget,
}

/// Looks for dependent sets of 1, 2, …, `most` columns, as far as the budget allows. A size is
/// only begun when the budget covers all of it; a set that is found early costs less. When all
/// columns are independent together, `independent` is n.
pub fn dependent_columns(check: &Matrix, most: usize, budget: &Budget) -> Dependent {
    dependent_columns_from(check, 1, most, budget)
}

/// The same, every set of fewer than `least` columns being known to be independent.
pub(super) fn dependent_columns_from(
    check: &Matrix,
    least: usize,
    most: usize,
    budget: &Budget,
) -> Dependent {
    let columns = Columns::new(check);
    let n = columns.columns.len();
    if columns.rank == n {
        return Dependent {
            independent: n,
            word: None,
        };
    }
    for weight in least.max(1)..=most.min(columns.rank + 1) {
        match columns.look(weight, budget) {
            Look::None => {}
            Look::Found(word) => {
                return Dependent {
                    independent: weight - 1,
                    word: Some(word),
                };
            }
            Look::OutOfBudget => {
                return Dependent {
                    independent: weight - 1,
                    word: None,
                };
            }
        }
    }
    Dependent {
        independent: most.min(columns.rank),
        word: None,
    }
}

/// The most work units that settling weight `weight` can take, lighter ones being settled.
pub(super) fn cost_of_columns(q: u64, n: usize, redundancy: usize, weight: usize) -> u64 {
    let (middle, projected) = costs(q, n, redundancy, weight);
    middle.min(projected)
}

/// By meeting in the middle, and by projection.
fn costs(q: u64, n: usize, redundancy: usize, weight: usize) -> (u64, u64) {
    let entries = UNITS_AN_ENTRY.saturating_mul(redundancy as u64 + 8);
    let sets = choose(n, weight.saturating_sub(1));
    let projected = product(&[sets, entries]);
    if weight < 3 || product(&[n as u64, q - 1]) > MOST_SCALED {
        return (u64::MAX, projected);
    }
    let (small, large) = (weight / 2, weight.div_ceil(2));
    let marked = product(&[choose(n, small), power(q - 1, small)]);
    let met = product(&[choose(n, large), power(q - 1, large - 1)]);
    let mut sums = if small == large {
        marked
    } else {
        marked.saturating_add(met)
    };
    if small == large {
        // More sums than vectors: two are equal before the vectors are used up.
        sums = sums.min(power(q, redundancy).saturating_add(n as u64 * (q - 1)));
    }
    let passes = marked.div_ceil(SUMS_A_PASS);
    (product(&[sums, UNITS_A_SUM, 2, passes]), projected)
}

impl<'a> Columns<'a> {
    fn new(check: &'a Matrix) -> Columns<'a> {
        let reduced = check.reduced().matrix;
        let even = check.field().is_binary() && {
            let ones = Matrix::from_fn(check.field(), 1, check.columns(), |_, _| 1);
            reduced.above(&ones).rank() == reduced.rows()
        };
        Columns {
            check,
            arithmetic: Arithmetic::new(check.field()),
            rank: reduced.rows(),
            columns: (0..reduced.columns())
                .map(|at| reduced.column(at))
                .collect(),
            even,
        }
    }

    fn look(&self, weight: usize, budget: &Budget) -> Look {
        if self.even && weight % 2 == 1 {
            return Look::None;
        }
        let (q, n) = (self.arithmetic.order, self.columns.len());
        let (middle, projected) = costs(q, n, self.rank, weight);
        if middle.min(projected) > budget.left() {
            return Look::OutOfBudget;
        }
        if projected <= middle {
            return self.by_projection(weight, budget);
        }
        let field = self.check.field();
        if field.characteristic() == 2 {
            Middle::new(self, BitKeys::new(field, self.rank)).look(weight, budget)
        } else {
            Middle::new(self, LaneKeys::new(field, self.rank)).look(weight, budget)
        }
    }

    /// The word on exactly these columns, if they depend on each other so.
    fn word_on(&self, support: &[usize]) -> Option<LightWord> {
        let relations = self.check.select_columns(support).null_space();
        if relations.rows() != 1 {
            return None;
        }
        let mut word = vec![0; self.columns.len()];
        for (at, &column) in support.iter().enumerate() {
            word[column] = relations.get(0, at);
        }
        LightWord::new(word).filter(|word| word.weight == support.len())
    }

    fn by_projection(&self, weight: usize, budget: &Budget) -> Look {
        if weight == 1 {
            if !budget.spend(self.columns.len() as u64) {
                return Look::OutOfBudget;
            }
            let zero = self
                .columns
                .iter()
                .position(|column| column.iter().all(|&entry| entry == 0));
            return zero
                .and_then(|at| self.word_on(&[at]))
                .map_or(Look::None, Look::Found);
        }
        let all: Vec<(usize, Vec<Element>)> = self.columns.iter().cloned().enumerate().collect();
        let mut support = Vec::new();
        match self.project(&all, weight - 2, &mut support, budget) {
            None => Look::OutOfBudget,
            Some(false) => Look::None,
            Some(true) => self.word_on(&support).map_or(Look::None, Look::Found),
        }
    }

    /// Whether two of the columns are proportional after projecting from `deep` more of them;
    /// `support` then holds all that depend on each other. `None` when the budget is gone.
    fn project(
        &self,
        columns: &[(usize, Vec<Element>)],
        deep: usize,
        support: &mut Vec<usize>,
        budget: &Budget,
    ) -> Option<bool> {
        let entries = columns
            .iter()
            .map(|(_, column)| column.len() as u64 + 8)
            .sum::<u64>();
        if !budget.spend(UNITS_AN_ENTRY.saturating_mul(entries)) {
            return None;
        }
        if deep == 0 {
            return Some(self.proportional(columns, support));
        }
        for (at, (name, column)) in columns.iter().enumerate() {
            support.push(*name);
            let pivot = column.iter().position(|&entry| entry != 0).unwrap_or(0);
            let inverse = self.arithmetic.field.inv(column[pivot]).unwrap_or(0);
            let rest: Vec<(usize, Vec<Element>)> = columns[at + 1..]
                .iter()
                .map(|(other, vector)| {
                    let mut vector = vector.clone();
                    let scale = self.arithmetic.mul(vector[pivot], inverse);
                    self.arithmetic.add_scaled(
                        &mut vector,
                        self.arithmetic.field.neg(scale),
                        column,
                    );
                    vector.swap_remove(pivot);
                    (*other, vector)
                })
                .collect();
            if self.project(&rest, deep - 1, support, budget)? {
                return Some(true);
            }
            support.pop();
        }
        Some(false)
    }

    /// Whether two columns are multiples of each other; adds them to `support`.
    fn proportional(&self, columns: &[(usize, Vec<Element>)], support: &mut Vec<usize>) -> bool {
        let mut seen: HashMap<Vec<Element>, usize> = HashMap::with_capacity(columns.len());
        for (name, column) in columns {
            let lead = column.iter().copied().find(|&entry| entry != 0);
            let scale = lead
                .and_then(|lead| self.arithmetic.field.inv(lead))
                .unwrap_or(1);
            if let Some(first) = seen.insert(self.arithmetic.scaled(scale, column), *name) {
                support.extend([first, *name]);
                return true;
            }
        }
        false
    }
}

/// Meeting in the middle.
struct Middle<'a, K: Keys> {
    columns: &'a Columns<'a>,
    keys: K,
    scalars: usize,
    /// The key of each multiple of each column: column c times s + 1 at c · (q − 1) + s.
    scaled: Vec<K::Key>,
}

/// A table of marks: bit by bit, one of several passes over all sums at a time.
struct Marks {
    bits: u32,
    passes: u64,
    pass: u64,
    words: Vec<u64>,
    /// A mark that is met is an equal sum, not just a like one.
    exact: bool,
}

impl<'a, K: Keys> Middle<'a, K> {
    fn new(columns: &'a Columns<'a>, keys: K) -> Middle<'a, K> {
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

    fn look(&self, weight: usize, budget: &Budget) -> Look {
        let (small, large) = (weight / 2, weight.div_ceil(2));
        let sums = product(&[
            choose(self.columns.columns.len(), small),
            power(self.scalars as u64, small),
        ]);
        let mut marks = Marks::new(&self.keys, sums);
        for pass in 0..marks.passes {
            marks.start(pass);
            let look = if small == large {
                self.equal_sums(small, &mut marks, budget)
            } else {
                self.meeting_sums(small, large, &mut marks, budget)
            };
            if !matches!(look, Look::None) {
                return look;
            }
        }
        Look::None
    }

    /// Two sets of `size` columns with equal sums.
    fn equal_sums(&self, size: usize, marks: &mut Marks, budget: &Budget) -> Look {
        let mut suspects = Vec::new();
        let (mut seen, mut looked) = (0u64, 0u64);
        let n = self.columns.columns.len();
        for top in size - 1..n {
            let sums = product(&[choose(top, size - 1), power(self.scalars as u64, size)]);
            if !budget.spend(sums.saturating_mul(UNITS_A_SUM)) {
                return Look::OutOfBudget;
            }
            self.sums_with(top, size, false, &mut |key, _, _| {
                if marks.mark(&self.keys, key) {
                    suspects.push(key);
                }
                !(marks.exact && !suspects.is_empty())
            });
            seen += sums;
            let due =
                seen >= 2 * looked || suspects.len() > MOST_SUSPECTS || marks.exact || top + 1 == n;
            if due && !suspects.is_empty() {
                if !budget.spend(seen.saturating_mul(UNITS_A_SUM)) {
                    return Look::OutOfBudget;
                }
                if let Some(word) = self.resolve_equal(size, top, &suspects) {
                    return Look::Found(word);
                }
                suspects.clear();
                looked = seen;
            }
        }
        Look::None
    }

    /// The word from two sets of `size` columns up to `last` whose sum is one of the suspects.
    fn resolve_equal(&self, size: usize, last: usize, suspects: &[K::Key]) -> Option<LightWord> {
        let mut sets: HashMap<K::Key, Vec<Vec<usize>>> =
            suspects.iter().map(|&key| (key, Vec::new())).collect();
        let filter = Filter::new(&self.keys, suspects);
        let mut found = None;
        for top in size - 1..=last {
            self.sums_with(top, size, false, &mut |key, stack, flat| {
                if !filter.may_hold(&self.keys, key) {
                    return true;
                }
                let Some(equal) = sets.get_mut(&key) else {
                    return true;
                };
                let set = self.columns_of(stack, flat);
                found = equal.iter().find_map(|other| self.word_of(other, &set));
                equal.push(set);
                found.is_none()
            });
            if found.is_some() {
                break;
            }
        }
        found
    }

    /// A set of `small` and one of `large` columns with equal sums.
    fn meeting_sums(&self, small: usize, large: usize, marks: &mut Marks, budget: &Budget) -> Look {
        let n = self.columns.columns.len();
        let marked = product(&[choose(n, small), power(self.scalars as u64, small)]);
        if !budget.spend(marked.saturating_mul(UNITS_A_SUM)) {
            return Look::OutOfBudget;
        }
        for top in small - 1..n {
            self.sums_with(top, small, false, &mut |key, _, _| {
                marks.mark(&self.keys, key);
                true
            });
        }
        let mut suspects: Vec<(K::Key, Vec<usize>)> = Vec::new();
        let (mut seen, mut looked) = (0u64, 0u64);
        for top in large - 1..n {
            let sums = product(&[
                choose(top, large - 1),
                power(self.scalars as u64, large - 1),
            ]);
            if !budget.spend(sums.saturating_mul(UNITS_A_SUM)) {
                return Look::OutOfBudget;
            }
            self.sums_with(top, large, true, &mut |key, stack, flat| {
                if marks.is_marked(&self.keys, key) {
                    suspects.push((key, self.columns_of(stack, flat)));
                }
                !(marks.exact && !suspects.is_empty())
            });
            seen += sums;
            let due =
                seen >= 2 * looked.max(marked) || suspects.len() > MOST_SUSPECTS / 8 || marks.exact;
            if (due || top + 1 == n) && !suspects.is_empty() {
                if !budget.spend(marked.saturating_mul(UNITS_A_SUM)) {
                    return Look::OutOfBudget;
                }
                if let Some(word) = self.resolve_meeting(small, &suspects) {
                    return Look::Found(word);
                }
                suspects.clear();
                looked = seen;
            }
        }
        Look::None
    }

    /// The word from one of the suspected sets and a set of `small` columns with the same sum.
    fn resolve_meeting(
        &self,
        small: usize,
        suspects: &[(K::Key, Vec<usize>)],
    ) -> Option<LightWord> {
        let mut by_key: HashMap<K::Key, Vec<usize>> = HashMap::with_capacity(suspects.len());
        for (at, (key, _)) in suspects.iter().enumerate() {
            by_key.entry(*key).or_default().push(at);
        }
        let keys: Vec<K::Key> = suspects.iter().map(|(key, _)| *key).collect();
        let filter = Filter::new(&self.keys, &keys);
        let mut found = None;
        for top in small - 1..self.columns.columns.len() {
            self.sums_with(top, small, false, &mut |key, stack, flat| {
                if filter.may_hold(&self.keys, key)
                    && let Some(sets) = by_key.get(&key)
                {
                    let set = self.columns_of(stack, flat);
                    found = sets
                        .iter()
                        .find_map(|&at| self.word_of(&suspects[at].1, &set));
                }
                found.is_none()
            });
            if found.is_some() {
                break;
            }
        }
        found
    }

    /// The word on two disjoint sets.
    fn word_of(&self, one: &[usize], other: &[usize]) -> Option<LightWord> {
        let mut support = [one, other].concat();
        support.sort_unstable();
        support.dedup();
        (support.len() == one.len() + other.len())
            .then(|| self.columns.word_on(&support))
            .flatten()
    }

    fn columns_of(&self, stack: &[usize], flat: usize) -> Vec<usize> {
        stack
            .iter()
            .chain([&flat])
            .map(|at| at / self.scalars)
            .collect()
    }

    /// Every sum of multiples of `size` columns with `top` the last of them, that one times 1
    /// only if `normed`. The visitor gets the key and the multiples, and says whether to go on.
    fn sums_with(
        &self,
        top: usize,
        size: usize,
        normed: bool,
        visit: &mut impl FnMut(K::Key, &[usize], usize) -> bool,
    ) {
        let multiples =
            top * self.scalars..top * self.scalars + if normed { 1 } else { self.scalars };
        let mut stack = Vec::with_capacity(size);
        for flat in multiples {
            let go_on = if size == 1 {
                visit(self.scaled[flat], &stack, flat)
            } else {
                stack.push(flat);
                let go_on = self.sums_below(top, size - 1, self.scaled[flat], &mut stack, visit);
                stack.pop();
                go_on
            };
            if !go_on {
                return;
            }
        }
    }

    fn sums_below(
        &self,
        limit: usize,
        size: usize,
        sum: K::Key,
        stack: &mut Vec<usize>,
        visit: &mut impl FnMut(K::Key, &[usize], usize) -> bool,
    ) -> bool {
        if size == 1 {
            let multiples = &self.scaled[..limit * self.scalars];
            return multiples
                .iter()
                .enumerate()
                .all(|(flat, &key)| visit(self.keys.add(sum, key), stack, flat));
        }
        for column in size - 1..limit {
            for flat in column * self.scalars..(column + 1) * self.scalars {
                stack.push(flat);
                let key = self.keys.add(sum, self.scaled[flat]);
                let go_on = self.sums_below(column, size - 1, key, stack, visit);
                stack.pop();
                if !go_on {
                    return false;
                }
            }
        }
        true
    }
}

impl Marks {
    fn new<K: Keys>(keys: &K, sums: u64) -> Marks {
        let passes = sums.div_ceil(SUMS_A_PASS).max(1);
        let wanted = 64 - (sums / passes).leading_zeros() + 4;
        let mut bits = wanted.clamp(FEWEST_BITS, MOST_BITS);
        let mut exact = false;
        if let Some(key_bits) = keys.exact_bits()
            && key_bits <= bits.max(24)
        {
            bits = key_bits.max(6);
            exact = passes == 1;
        }
        Marks {
            bits,
            passes,
            pass: 0,
            words: vec![0; 1 << (bits - 6)],
            exact,
        }
    }

    fn start(&mut self, pass: u64) {
        self.pass = pass;
        self.words.fill(0);
    }

    /// The key's place in this pass.
    #[inline]
    fn place<K: Keys>(&self, keys: &K, key: K::Key) -> Option<(usize, u64)> {
        if self.passes > 1 && (keys.slot(key, 60) & 0xFFFF_FFFF) % self.passes != self.pass {
            return None;
        }
        let slot = keys.slot(key, self.bits);
        Some(((slot >> 6) as usize, 1 << (slot & 63)))
    }

    /// Marks a sum; whether a like one was marked before.
    #[inline]
    fn mark<K: Keys>(&mut self, keys: &K, key: K::Key) -> bool {
        let Some((word, bit)) = self.place(keys, key) else {
            return false;
        };
        let met = self.words[word] & bit != 0;
        self.words[word] |= bit;
        met
    }

    #[inline]
    fn is_marked<K: Keys>(&self, keys: &K, key: K::Key) -> bool {
        self.place(keys, key)
            .is_some_and(|(word, bit)| self.words[word] & bit != 0)
    }
}

/// A small table that rules most keys out quickly.
struct Filter {
    bits: u32,
    words: Vec<u64>,
}

impl Filter {
    fn new<K: Keys>(keys: &K, held: &[K::Key]) -> Filter {
        let bits = (64 - (held.len() as u64).leading_zeros() + 4).clamp(FEWEST_BITS, 26);
        // Keys that are plain numbers of few bits need no more room than they have values.
        let bits = bits.max(keys.exact_bits().filter(|&exact| exact <= 26).unwrap_or(0));
        let mut filter = Filter {
            bits,
            words: vec![0; 1 << (bits - 6)],
        };
        for &key in held {
            let slot = keys.slot(key, bits);
            filter.words[(slot >> 6) as usize] |= 1 << (slot & 63);
        }
        filter
    }

    #[inline]
    fn may_hold<K: Keys>(&self, keys: &K, key: K::Key) -> bool {
        let slot = keys.slot(key, self.bits);
        self.words[(slot >> 6) as usize] >> (slot & 63) & 1 == 1
    }
}
