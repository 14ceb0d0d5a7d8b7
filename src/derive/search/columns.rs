//! Dependent columns of a check matrix: a word of weight w is w columns that depend on each other.
//!
//! Weights are settled in order. A set of columns is found either by meeting in the middle (sums
//! of ⌈w/2⌉ and of ⌊w/2⌋ scaled columns with equal keys) or, over large fields, by projecting
//! from w − 2 columns in turn and looking for proportional rest. Memory stays bounded: sums mark
//! bits of a table, and only those that meet a mark are looked at again.

use std::collections::HashMap;

use super::arithmetic::{Arithmetic, choose, product};
use super::keys::{BitKeys, LaneKeys};
use super::middle::{cost_of_middle, likely_cost};
use super::sums::Middle;
use super::{Budget, LightWord};
use crate::algebra::{Element, Matrix};

/// Work units for an entry of a projected column.
const UNITS_AN_ENTRY: u64 = 5;
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
pub(super) struct Columns<'a> {
    check: &'a Matrix,
    pub(super) arithmetic: Arithmetic,
    pub(super) rank: usize,
    pub(super) columns: Vec<Vec<Element>>,
    /// Over GF(2), the all-one row is a check: no word has an odd weight.
    even: bool,
}

/// How looking for a set of one size ended.
pub(super) enum Look {
    None,
    Found(LightWord),
    OutOfBudget,
}

/// Looks for dependent sets of 1, 2, …, `most` columns, as far as the budget allows. A size is
/// begun when the budget covers all of it, or when a dependent set is likely to turn up early. When all
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
    (cost_of_middle(q, n, redundancy, weight), projected)
}

impl<'a> Columns<'a> {
    pub(super) fn new(check: &'a Matrix) -> Columns<'a> {
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
        if middle.min(projected) <= budget.left() {
            return if projected <= middle {
                self.by_projection(weight, budget)
            } else {
                self.by_middle(weight, budget)
            };
        }
        if middle == u64::MAX {
            return Look::OutOfBudget;
        }
        // Not for certain, but a word may turn up early: as it would among random columns.
        let likely = likely_cost(q, n, self.rank, weight);
        if likely > budget.left() / 8 {
            return Look::OutOfBudget;
        }
        self.by_middle(weight, &budget.limited_to(likely.saturating_mul(32)))
    }

    fn by_middle(&self, weight: usize, budget: &Budget) -> Look {
        let field = self.check.field();
        if field.characteristic() == 2 {
            Middle::new(self, BitKeys::new(field, self.rank)).look(weight, budget)
        } else {
            Middle::new(self, LaneKeys::new(field, self.rank)).look(weight, budget)
        }
    }

    /// The word on exactly these columns, if they depend on each other so.
    pub(super) fn word_on(&self, support: &[usize]) -> Option<LightWord> {
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::algebra::Field;
    use rand::{Rng, SeedableRng};
    use rand_chacha::ChaCha8Rng;

    fn weight(look: &Look) -> Option<usize> {
        match look {
            Look::None => None,
            Look::Found(word) => Some(word.weight),
            Look::OutOfBudget => panic!("the budget has no limit"),
        }
    }

    #[test]
    fn both_ways_to_find_dependent_columns_agree() {
        let mut random = ChaCha8Rng::seed_from_u64(11);
        let mut met = [0; 12];
        for (p, rows) in [(2, 12), (2, 70), (3, 7), (3, 90), (5, 5), (7, 4)] {
            let field = Field::prime(p).unwrap();
            for _ in 0..if rows < 20 { 25 } else { 3 } {
                let check = Matrix::from_fn(&field, rows, rows + 6, |_, _| {
                    random.random_range(0..p) as Element
                });
                let columns = Columns::new(&check);
                for size in 1..=if rows < 20 { 6 } else { 4 } {
                    let one = weight(&columns.by_projection(size, &Budget::unlimited()));
                    if size > 2 {
                        let two = weight(&columns.by_middle(size, &Budget::unlimited()));
                        assert_eq!(one, two, "{size} of {check:?}");
                    }
                    if let Some(weight) = one {
                        met[weight] += 1;
                        break;
                    }
                }
            }
        }
        assert!(met[3..=5].iter().all(|&met| met > 0), "{met:?}");
    }
}
