//! A lower bound on the distance from several information sets.
//!
//! A word that is no combination of at most w rows of a systematic generator has at least w + 1
//! non-zero entries on its information set. Over several sets with few positions in common these
//! add up (Brouwer and Zimmermann; see Betten et al., Error-Correcting Linear Codes, 2006, §1.8).
//! Combinations are examined in order of size until the bound meets the lightest word found.

use rayon::prelude::*;

use super::arithmetic::{Systematic, TABLE_ORDER, choose, power, product};
use super::combinations::{Combinations, Found, combinations};
use super::{Budget, LightWord, Progress};
use crate::algebra::Matrix;

/// More sets than this are not made; longer codes of so small a dimension have few words.
const MOST_SETS: usize = 256;
/// How many combinations' first rows are handed out at a time.
const TASKS_A_TICK: usize = 512;

/// What examining combinations of rows gave.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Raised {
    /// Proven: no non-zero word is lighter. At least what was known before.
    pub lower: usize,
    /// The lightest word met, when it is lighter than what was known before.
    pub upper: Option<LightWord>,
    /// For each information set that was used, the most rows of which all combinations were
    /// examined.
    pub rows: Vec<usize>,
}

/// A systematic generator, and how many of its information positions are in no earlier set.
struct Set {
    code: Systematic,
    fresh: usize,
}

/// Raises the lower bound on the distance of the row space of `generator` by examining
/// combinations of rows. `divisor` divides every weight (1 when nothing is known). Stops when the
/// lower bound meets `known_upper` or the lightest word found, or when the next size of
/// combinations is beyond the budget.
pub fn raise_lower_bound(
    generator: &Matrix,
    known_lower: usize,
    known_upper: usize,
    divisor: usize,
    budget: &Budget,
    progress: &dyn Progress,
) -> Raised {
    let mut raised = Raised {
        lower: known_lower,
        upper: None,
        rows: Vec::new(),
    };
    let elimination = product(&[
        generator.rows() as u64,
        generator.rows() as u64,
        generator.columns() as u64,
    ]);
    let cost = elimination / if generator.field().is_binary() { 64 } else { 1 };
    if known_lower >= known_upper || generator.rows() == 0 || !budget.spend(cost) {
        return raised;
    }
    let sets = information_sets(generator, budget);
    let Some(first) = sets.first() else {
        return raised;
    };
    let shape = Shape::new(generator, first.code.dimension(), &sets);
    let Some(plan) = shape.plan(known_lower, known_upper, divisor) else {
        return raised;
    };
    let mut search = Search {
        engines: sets[..plan.sets]
            .iter()
            .map(|set| combinations(generator.field(), &set.code))
            .collect(),
        sets: &sets[..plan.sets],
        shape,
        upper: known_upper,
        divisor: divisor.max(1),
        generator,
    };
    raised.rows = vec![0; plan.sets];
    search.run(&mut raised, budget, progress);
    raised
}

/// The work units to close the gap between two bounds by information sets; `u64::MAX` when it is
/// out of the question. An estimate: it takes the code for one whose sets share no positions.
pub(super) fn cost_of_sets(
    q: u64,
    n: usize,
    k: usize,
    lower: usize,
    upper: usize,
    divisor: usize,
) -> u64 {
    if k == 0 || k >= n {
        return u64::MAX;
    }
    let whole = (n / k).min(MOST_SETS);
    let mut fresh = vec![k; whole];
    if !n.is_multiple_of(k) && whole < MOST_SETS {
        fresh.push(n % k);
    }
    let shape = Shape { q, n, k, fresh };
    shape
        .plan(lower, upper, divisor)
        .map_or(u64::MAX, |plan| plan.cost)
}

/// Information sets, each taking as many positions as it can that no earlier one has.
fn information_sets(generator: &Matrix, budget: &Budget) -> Vec<Set> {
    let n = generator.columns();
    let mut used = vec![false; n];
    let mut sets: Vec<Set> = Vec::new();
    while sets.len() < MOST_SETS {
        let mut order: Vec<usize> = (0..n).filter(|&at| !used[at]).collect();
        order.extend((0..n).filter(|&at| used[at]));
        let code = Systematic::in_order(generator, &order);
        let fresh = code.pivots.iter().filter(|&&pivot| !used[pivot]).count();
        if fresh == 0 {
            break;
        }
        for &pivot in &code.pivots {
            used[pivot] = true;
        }
        let cost = product(&[fresh as u64, fresh as u64, n as u64]);
        sets.push(Set { code, fresh });
        if !budget.spend(cost / 16) {
            break;
        }
    }
    sets
}

/// The numbers that the bound and the cost depend on.
struct Shape {
    q: u64,
    n: usize,
    k: usize,
    /// For each set, its positions in no earlier set; not increasing.
    fresh: Vec<usize>,
}

struct Plan {
    sets: usize,
    cost: u64,
}

impl Shape {
    fn new(generator: &Matrix, k: usize, sets: &[Set]) -> Shape {
        Shape {
            q: generator.field().order(),
            n: generator.columns(),
            k,
            fresh: sets.iter().map(|set| set.fresh).collect(),
        }
    }

    /// What is proven once set i has had all combinations of up to `rows[i]` rows.
    fn bound(&self, rows: &[usize], divisor: usize) -> usize {
        if rows.iter().any(|&rows| rows >= self.k) {
            // Every word was seen.
            return usize::MAX;
        }
        let sum: usize = rows
            .iter()
            .zip(&self.fresh)
            .map(|(&rows, &fresh)| (rows + 1).saturating_sub(self.k - fresh))
            .sum();
        sum.next_multiple_of(divisor.max(1))
    }

    /// The work units of all combinations of `rows` rows of one set.
    fn cost(&self, rows: usize) -> u64 {
        let redundancy = (self.n - self.k) as u64;
        if rows == 0 {
            return 0;
        }
        if self.q == 2 {
            let words = redundancy.div_ceil(64);
            return choose(self.k, rows).saturating_mul(words + 1).div_ceil(2);
        }
        if self.q <= TABLE_ORDER {
            let a_word = 3 + redundancy.div_ceil(32) * 3;
            return product(&[choose(self.k, rows), power(self.q - 1, rows - 1), a_word]);
        }
        let a_word = 100 + 30 * redundancy;
        product(&[
            choose(self.k, rows),
            power(self.q - 1, rows.saturating_sub(2)),
            a_word,
        ])
    }

    /// The cheapest number of sets with which the bound comes to reach `upper`.
    fn plan(&self, lower: usize, upper: usize, divisor: usize) -> Option<Plan> {
        (1..=self.fresh.len())
            .map(|sets| {
                let (mut rows, mut cost) = (0, 0u64);
                while lower.max(self.bound(&vec![rows; sets], divisor)) < upper {
                    rows += 1;
                    cost = cost.saturating_add(self.cost(rows).saturating_mul(sets as u64));
                }
                Plan { sets, cost }
            })
            .min_by_key(|plan| plan.cost)
    }
}

struct Search<'a> {
    engines: Vec<Box<dyn Combinations>>,
    sets: &'a [Set],
    shape: Shape,
    upper: usize,
    divisor: usize,
    generator: &'a Matrix,
}

impl Search<'_> {
    fn run(&mut self, raised: &mut Raised, budget: &Budget, progress: &dyn Progress) {
        for rows in 1..=self.shape.k {
            for set in 0..self.sets.len() {
                if !budget.spend(self.shape.cost(rows)) {
                    return;
                }
                if !self.examine(rows, set, raised, progress) {
                    return;
                }
                raised.rows[set] = rows;
                let bound = self.shape.bound(&raised.rows, self.divisor).min(self.upper);
                raised.lower = raised.lower.max(bound);
                if raised.lower >= self.upper {
                    return;
                }
            }
        }
    }

    /// All combinations of so many rows of one set; `false` when a word as light as the lower
    /// bound ends the search.
    fn examine(
        &mut self,
        rows: usize,
        set: usize,
        raised: &mut Raised,
        progress: &dyn Progress,
    ) -> bool {
        let what = format!("combinations of {rows} rows of set {}", set + 1);
        let engine = &self.engines[set];
        let tasks = tasks(self.shape.k, rows);
        for (at, some) in tasks.chunks(TASKS_A_TICK).enumerate() {
            let found: Option<(usize, usize, Found)> = some
                .par_iter()
                .enumerate()
                .filter_map(|(order, tops)| {
                    let found = engine.lightest(rows, tops, self.upper)?;
                    Some((found.weight, order, found))
                })
                .min_by_key(|&(weight, order, _)| (weight, order));
            if let Some((_, _, found)) = found {
                let word = self.sets[set]
                    .code
                    .word(self.generator.field(), &found.message);
                self.upper = found.weight;
                raised.upper = LightWord::new(word);
                if self.upper <= raised.lower {
                    return false;
                }
            }
            let through = (at * TASKS_A_TICK + some.len()) as u64;
            progress.tick(&what, through, tasks.len() as u64);
        }
        true
    }
}

/// The combinations of `size` of k rows, by their last row, or their last two where that would
/// leave too much for one thread.
fn tasks(k: usize, size: usize) -> Vec<Vec<usize>> {
    let tops = size - 1..k;
    if size < 4 {
        return tops.map(|top| vec![top]).collect();
    }
    tops.flat_map(|top| (size - 2..top).map(move |next| vec![top, next]))
        .collect()
}
