//! The minimum distance, by whichever engine is cheapest.
//!
//! Cheap looks come first: small sets of columns, short lists of words, a light word for the upper
//! bound. What is left between the bounds is closed by the engine with the least estimated work,
//! or narrowed as far as the budget reaches.

use super::arithmetic::product;
use super::columns::{cost_of_columns, dependent_columns_from};
use super::enumerate::cost_of_words;
use super::information_sets::{cost_of_sets, raise_lower_bound};
use super::macwilliams::cost_of_transform;
use super::wording::{count, list};
use super::{
    Budget, LightWord, Progress, light_word, macwilliams, minimum_by_words, weight_counts,
};
use crate::algebra::{Element, Matrix};

/// Work that is done without weighing it against other ways.
const CHEAP: u64 = 50_000_000;
/// The most work for a light word before the lower bound is raised, and for one to show at the end.
const LIGHT: u64 = 2_000_000_000;
/// Entries of a matrix that is derived from the other side.
const MOST_ENTRIES: u64 = 1 << 24;
/// The seed of the search for light words.
const SEED: u64 = 1;

/// Which bound a ground holds up.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum Side {
    /// No word is lighter.
    Lower,
    /// Some word is that light.
    Upper,
}

/// Why a bound holds.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Ground {
    /// The bound that it holds up.
    pub side: Side,
    /// The bound's value.
    pub value: usize,
    /// The engine, in one or two words.
    pub rule: &'static str,
    /// One line for a reader.
    pub says: String,
}

/// What is known of a minimum distance.
#[derive(Clone, PartialEq, Eq, Debug, Default)]
pub struct Settled {
    /// Proven: no non-zero word is lighter.
    pub lower: usize,
    /// Proven: the minimum distance is at most this.
    pub upper: usize,
    /// A word of weight `upper`, when one was found.
    pub word: Option<Vec<Element>>,
    /// The grounds of every bound that was improved here, in the order they were found.
    pub says: Vec<Ground>,
}

/// One way to settle what is open.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug)]
enum Way {
    Columns,
    Words,
    DualWords,
    Sets,
}

const WAYS: [Way; 4] = [Way::Columns, Way::Words, Way::DualWords, Way::Sets];

/// Narrows `lower ≤ d ≤ upper` for the code with the given generator or check matrix (at least
/// one; rows may depend on others), until both meet or the budget is gone. The bounds that come
/// in must be true; nothing is claimed that does not follow from them and from what was examined.
/// `divisor` divides every weight (1 when nothing is known). A code with no word but zero has no
/// distance: both bounds are then 0.
pub fn settle(
    generator: Option<&Matrix>,
    check: Option<&Matrix>,
    lower: usize,
    upper: usize,
    divisor: usize,
    budget: &Budget,
    progress: &dyn Progress,
) -> Settled {
    let Some(mut search) = Search::new(generator, check, divisor, budget, progress) else {
        return Settled {
            lower,
            upper,
            ..Settled::default()
        };
    };
    if search.k == 0 {
        let says = "the code has no word but zero".to_string();
        let ground = Ground {
            side: Side::Upper,
            value: 0,
            rule: "dimension",
            says,
        };
        return Settled {
            says: vec![ground],
            ..Settled::default()
        };
    }
    search.settled.lower = lower;
    search.settled.upper = upper;
    search.bound_by_size();
    search.look_cheaply();
    search.lighten();
    search.close();
    search.show_a_word();
    search.settled
}

struct Search<'a> {
    generator: Option<Matrix>,
    check: Option<Matrix>,
    q: u64,
    n: usize,
    k: usize,
    divisor: usize,
    budget: &'a Budget,
    progress: &'a dyn Progress,
    settled: Settled,
}

impl<'a> Search<'a> {
    fn new(
        generator: Option<&Matrix>,
        check: Option<&Matrix>,
        divisor: usize,
        budget: &'a Budget,
        progress: &'a dyn Progress,
    ) -> Option<Search<'a>> {
        let given = generator.or(check)?;
        let n = given.columns();
        let k = generator.map_or_else(|| n - given.rank(), Matrix::rank);
        let other = |matrix: Option<&Matrix>, rows: usize, source: Option<&Matrix>| {
            let small = product(&[rows as u64, n as u64]) <= MOST_ENTRIES;
            matrix
                .cloned()
                .or_else(|| source.filter(|_| small).map(Matrix::null_space))
        };
        Some(Search {
            generator: other(generator, k, check),
            check: other(check, n - k, generator),
            q: given.field().order(),
            n,
            k,
            divisor: divisor.max(1),
            budget,
            progress,
            settled: Settled::default(),
        })
    }

    fn is_open(&self) -> bool {
        self.settled.lower < self.settled.upper
    }

    fn raise(&mut self, lower: usize, rule: &'static str, says: impl FnOnce() -> String) {
        let value = lower.next_multiple_of(self.divisor);
        if value > self.settled.lower {
            let mut says = says();
            if value > lower {
                says += &format!("; every weight is a multiple of {}", self.divisor);
            }
            self.settled.lower = value;
            self.settled.says.push(Ground {
                side: Side::Lower,
                value,
                rule,
                says,
            });
        }
    }

    fn lower(
        &mut self,
        found: LightWord,
        rule: &'static str,
        says: impl FnOnce(&LightWord) -> String,
    ) {
        let value = found.weight;
        let lighter = value < self.settled.upper;
        if lighter || value == self.settled.upper && self.settled.word.is_none() {
            self.settled.upper = value;
            let says = says(&found);
            self.settled.says.push(Ground {
                side: Side::Upper,
                value,
                rule,
                says,
            });
            self.settled.word = Some(found.word);
        }
    }

    /// What follows from n, k and the divisor alone.
    fn bound_by_size(&mut self) {
        let least = self.settled.lower.max(1);
        self.raise(least, "divisor", || {
            format!("no word but zero has a weight below {least}")
        });
        let singleton = self.n - self.k + 1;
        if singleton < self.settled.upper {
            self.settled.upper = singleton;
            let says = format!("Singleton bound: n − k + 1 = {singleton}");
            self.settled.says.push(Ground {
                side: Side::Upper,
                value: singleton,
                rule: "singleton",
                says,
            });
        }
    }

    /// Small sets of columns, and lists of words that are short.
    fn look_cheaply(&mut self) {
        if self.is_open() {
            let limit = CHEAP.min(self.budget.left() / 4);
            self.by_columns(&self.budget.limited_to(limit));
        }
        for way in [Way::Words, Way::DualWords] {
            if self.is_open() && self.cost(way) <= CHEAP {
                self.go(way);
            }
        }
    }

    /// Looks for a word as light as the lower bound.
    fn lighten(&mut self) {
        if self.is_open() {
            let limit = LIGHT.min(self.budget.left() / 5);
            self.by_light_word(&self.budget.limited_to(limit));
        }
    }

    /// Closes the gap the cheapest way; when none is affordable, narrows it by two of them.
    fn close(&mut self) {
        let mut left = WAYS.to_vec();
        while self.is_open() {
            let costs = left.iter().map(|&way| (self.cost(way), way));
            let Some((cost, way)) = costs.min() else {
                return;
            };
            if cost > self.budget.left() {
                self.by_sets(&self.budget.limited_to(self.budget.left() / 2));
                self.by_columns(self.budget);
                return;
            }
            self.go(way);
            left.retain(|&other| other != way);
        }
    }

    /// A settled distance without a word gets one, if that is easy.
    fn show_a_word(&mut self) {
        if !self.is_open() && self.settled.word.is_none() {
            let limit = LIGHT.min(self.budget.left());
            self.by_light_word(&self.budget.limited_to(limit));
        }
    }

    /// The work units to close the gap.
    fn cost(&self, way: Way) -> u64 {
        let (q, n, k) = (self.q, self.n, self.k);
        let (lower, upper) = (self.settled.lower, self.settled.upper);
        match way {
            Way::Words if self.generator.is_some() => cost_of_words(q, k, n),
            Way::DualWords if self.check.is_some() => {
                cost_of_words(q, n - k, n).saturating_add(cost_of_transform(q, n))
            }
            Way::Columns if self.check.is_some() => (lower..upper)
                .map(|weight| cost_of_columns(q, n, n - k, weight))
                .fold(0, u64::saturating_add),
            Way::Sets if self.generator.is_some() => {
                cost_of_sets(q, n, k, lower, upper, self.divisor)
            }
            _ => u64::MAX,
        }
    }

    fn go(&mut self, way: Way) {
        match way {
            Way::Columns => self.by_columns(self.budget),
            Way::Words => self.by_words(),
            Way::DualWords => self.by_dual_words(),
            Way::Sets => self.by_sets(self.budget),
        }
    }

    fn by_columns(&mut self, budget: &Budget) {
        let Some(check) = &self.check else { return };
        let (least, most) = (self.settled.lower, self.settled.upper - 1);
        let found = dependent_columns_from(check, least, most, budget);
        let binary = self.q == 2;
        self.raise(found.independent + 1, "columns", || {
            no_columns(found.independent, binary)
        });
        if let Some(word) = found.word {
            self.lower(word, "columns", |word| these_columns(word, binary));
        }
    }

    fn by_words(&mut self) {
        let Some(generator) = &self.generator else {
            return;
        };
        let Some(word) = minimum_by_words(generator, self.budget) else {
            return;
        };
        let says = format!("all {}^{} words enumerated", self.q, self.k);
        let lightest = word.weight;
        self.lower(word, "all words", |_| format!("{says}, the lightest kept"));
        self.raise(lightest, "all words", || says);
    }

    fn by_dual_words(&mut self) {
        let Some(check) = &self.check else { return };
        let cost = cost_of_transform(self.q, self.n);
        let Some(dual) = weight_counts(check, self.budget, self.progress) else {
            return;
        };
        if !self.budget.spend(cost) {
            return;
        }
        let Some(counts) = macwilliams(&dual, self.q, self.n, self.n - self.k) else {
            return;
        };
        let zero = num_bigint::BigUint::ZERO;
        let Some(weight) = (1..counts.len()).find(|&weight| counts[weight] != zero) else {
            return;
        };
        let says = format!(
            "all {}^{} words of the dual enumerated, their weights transformed",
            self.q,
            self.n - self.k
        );
        self.raise(weight, "dual words", || says.clone());
        if weight < self.settled.upper {
            self.settled.upper = weight;
            self.settled.word = None;
            self.settled.says.push(Ground {
                side: Side::Upper,
                value: weight,
                rule: "dual words",
                says,
            });
        }
    }

    fn by_sets(&mut self, budget: &Budget) {
        let Some(generator) = &self.generator else {
            return;
        };
        let (lower, upper) = (self.settled.lower, self.settled.upper);
        let raised =
            raise_lower_bound(generator, lower, upper, self.divisor, budget, self.progress);
        if let Some(word) = raised.upper {
            self.lower(word, "information sets", |word| {
                format!("a word of weight {} met on the way", word.weight)
            });
        }
        self.raise(raised.lower, "information sets", || {
            let rows = match raised.rows.as_slice() {
                [first, others @ ..] if others.iter().all(|other| other == first) => {
                    count(*first, "row", "rows")
                }
                several => format!("{} rows", list(several)),
            };
            let sets = count(raised.rows.len(), "information set", "information sets");
            format!(
                "no word of weight below {}: combinations of up to {rows} examined over {sets}",
                raised.lower
            )
        });
    }

    fn by_light_word(&mut self, budget: &Budget) {
        let Some(generator) = &self.generator else {
            return;
        };
        let target = self.settled.lower;
        if let Some(word) = light_word(generator, target, SEED, budget) {
            self.lower(word, "light word", |word| {
                format!("a word of weight {} found", word.weight)
            });
        }
    }
}

fn no_columns(independent: usize, binary: bool) -> String {
    match independent {
        1 => "no column of the check matrix is zero".to_string(),
        2 if binary => "no two columns of the check matrix are equal".to_string(),
        2 => "no two columns of the check matrix are proportional".to_string(),
        many => format!(
            "no {} of the check matrix are dependent",
            count(many, "column", "columns")
        ),
    }
}

fn these_columns(word: &LightWord, binary: bool) -> String {
    let positions: Vec<usize> = (0..word.word.len())
        .filter(|&at| word.word[at] != 0)
        .collect();
    let columns = list(&positions);
    match positions.len() {
        1 => format!("column {columns} of the check matrix is zero"),
        _ if binary => format!("columns {columns} of the check matrix sum to zero"),
        _ => format!("columns {columns} of the check matrix are dependent"),
    }
}
