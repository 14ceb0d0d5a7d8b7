//! What follows from a code: distance, weights, bounds and properties, each with its grounds.
//!
//! In: codes whose origins carry theorems. Out: proven intervals, never guesses. A [`Session`]
//! applies the theorems first, asks the parents where they need it, then searches, cheapest way
//! first, until both sides meet or the budget is gone. Every answer is remembered.

pub mod channel;
pub mod form;
pub mod locality;
pub mod measures;
pub mod patterns;
pub mod properties;
pub mod search;
pub mod structure;
mod verdict;

pub use measures::{MEASURES, SessionMeasures};
pub use verdict::{Judgement, Verdict};

use crate::algebra::{Element, Matrix};
use crate::code::{
    Bound, Code, Counts, Distance, Knowledge, Made, OriginKind, Side, Space, Weights, lower, upper,
    weight,
};
use num_bigint::BigUint;
use search::{Budget, Progress};
use std::cell::RefCell;
use std::collections::HashMap;

/// The work that is spent on a code while it is only a parent, or a step on the way.
const SMALL_WORK: u64 = 1 << 27;

/// The most entries of a matrix that is built for a search. A long code of high rate has a
/// generator matrix, one of low rate a check matrix, that is all but dense and of no use.
const ENTRIES: usize = 1 << 28;

/// The most entries of a check matrix that a search works on.
const CHECK_ENTRIES: usize = 1 << 28;

/// Derives what is asked for and remembers it, for one run.
pub struct Session<'a> {
    seconds: f64,
    progress: &'a dyn Progress,
    memo: RefCell<HashMap<usize, Memo>>,
}

/// What is remembered of a code.
struct Memo {
    /// Keeps the code, so that its key stays its own.
    _code: Code,
    distance: Option<(Effort, Distance)>,
    weights: Option<Option<Weights>>,
    dual: Option<Code>,
    covering: Option<Option<usize>>,
}

/// How hard to look.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug)]
pub enum Effort {
    /// Theorems alone, with what little their parents cost.
    Theorems,
    /// And what costs next to nothing.
    Small,
    /// Up to the budget.
    Full,
}

impl<'a> Session<'a> {
    /// A session that may spend about so many seconds of one core on each code.
    pub fn new(seconds: f64, progress: &'a dyn Progress) -> Session<'a> {
        Session {
            seconds,
            progress,
            memo: RefCell::new(HashMap::new()),
        }
    }

    fn remembered<T>(&self, code: &Code, read: impl FnOnce(&Memo) -> Option<T>) -> Option<T> {
        self.memo.borrow().get(&code.key()).and_then(read)
    }

    fn remember(&self, code: &Code, write: impl FnOnce(&mut Memo)) {
        let mut memo = self.memo.borrow_mut();
        write(memo.entry(code.key()).or_insert_with(|| Memo {
            _code: code.clone(),
            distance: None,
            weights: None,
            dual: None,
            covering: None,
        }));
    }

    fn budget(&self, effort: Effort) -> Budget {
        let full = Budget::seconds(self.seconds);
        match effort {
            Effort::Full => full,
            Effort::Theorems | Effort::Small => full.limited_to(SMALL_WORK),
        }
    }

    /// What is known of the minimum distance after looking as hard as said.
    pub fn distance_by(&self, code: &Code, effort: Effort) -> Distance {
        let code = code.unnamed();
        let known = self.remembered(code, |memo| memo.distance.clone());
        if let Some((spent, distance)) = known
            && (spent >= effort || distance.exact().is_some())
        {
            return distance;
        }
        let distance = self.derive_distance(code, effort);
        self.remember(code, |memo| {
            memo.distance = Some((effort, distance.clone()))
        });
        distance
    }

    /// What is known of the minimum distance once the question is answered, looking harder step
    /// by step and no harder than needed.
    pub fn distance_until(&self, code: &Code, answered: impl Fn(&Distance) -> bool) -> Distance {
        let mut distance = self.distance_by(code, Effort::Theorems);
        for effort in [Effort::Small, Effort::Full] {
            if answered(&distance) {
                break;
            }
            distance = self.distance_by(code, effort);
        }
        distance
    }

    fn derive_distance(&self, code: &Code, effort: Effort) -> Distance {
        let mut distance = Distance::unknown(code);
        if distance.lower == 0 {
            return distance;
        }
        for bound in code.origin().rules.distance(code, self) {
            learn(code, &mut distance, bound);
        }
        if distance.exact().is_none() {
            self.learn_from_weights(code, &mut distance);
        }
        if distance.exact().is_none() && small_generator(code).is_none() {
            learn_from_size(code, &mut distance);
        }
        if distance.exact().is_none() && effort > Effort::Theorems {
            self.search(code, &mut distance, effort);
        }
        distance
    }

    fn learn_from_weights(&self, code: &Code, distance: &mut Distance) {
        let known = self.remembered(code, |memo| memo.weights.clone()).flatten();
        let derived = known.or_else(|| code.origin().rules.weights(code, self));
        let Some(weights) = derived else { return };
        let Some((&least, _)) = weights.counts.iter().find(|&(&weight, _)| weight > 0) else {
            return;
        };
        distance.learn(lower(
            least,
            "weights",
            format!("the least weight that occurs is {least}: {}", weights.says),
        ));
        distance.learn(upper(
            least,
            "weights",
            format!("words of weight {least} occur: {}", weights.says),
            None,
        ));
    }

    fn search(&self, code: &Code, distance: &mut Distance, effort: Effort) {
        // Check matrices beyond this are kept sparse, and the search would make them dense.
        let dense = code.redundancy().saturating_mul(code.length()) <= CHECK_ENTRIES;
        let (generator, check) = (small_generator(code), small_check(code).filter(|_| dense));
        if generator.is_none() && check.is_none() {
            return;
        }
        let budget = self.budget(effort);
        let divisor = properties::divisor(code);
        let settled = search::settle(
            generator,
            check,
            distance.lower,
            distance.upper,
            divisor,
            &budget,
            self.progress,
        );
        for ground in settled.says {
            let bound = match ground.side {
                search::Side::Lower => lower(ground.value, ground.rule, ground.says),
                search::Side::Upper => {
                    let word = settled
                        .word
                        .clone()
                        .filter(|word| weight(word) == ground.value);
                    upper(ground.value, ground.rule, ground.says, word)
                }
            };
            learn(code, distance, bound);
        }
    }

    /// The weight distribution, by theorem, by all words, or by all words of the dual and
    /// MacWilliams, whichever is cheaper and within the budget.
    pub fn weights_by(&self, code: &Code, effort: Effort) -> Option<Weights> {
        let code = code.unnamed();
        if let Some(Some(weights)) = self.remembered(code, |memo| memo.weights.clone()) {
            return Some(weights);
        }
        if effort < Effort::Full && self.remembered(code, |memo| memo.weights.clone()).is_some() {
            return None;
        }
        let weights = self.derive_weights(code, effort);
        self.remember(code, |memo| memo.weights = Some(weights.clone()));
        weights
    }

    fn derive_weights(&self, code: &Code, effort: Effort) -> Option<Weights> {
        if code.dimension() == 0 {
            return Some(Weights {
                counts: Counts::from([(0, BigUint::from(1u8))]),
                says: "the zero word alone".to_string(),
            });
        }
        if let Some(weights) = code.origin().rules.weights(code, self) {
            return Some(weights);
        }
        let (n, k, q) = (code.length(), code.dimension(), code.field().order());
        if n <= 4096
            && self.distance_by(code, Effort::Small).exact() == Some(n - k + 1)
            && let Some(counts) = search::mds_weights(n, k, q)
        {
            return Some(Weights {
                counts: counted(counts),
                says: "the weights of an MDS code follow from n, k and q (MacWilliams and Sloane, 1977, ch. 11 §3 theorem 6)".to_string(),
            });
        }
        let budget = self.budget(effort);
        let own = search::cost_of_words(q, k, n);
        let dual = search::cost_of_words(q, n - k, n);
        if own.min(dual) > budget.left() {
            return None;
        }
        if own <= dual {
            let counts = search::weight_counts(small_generator(code)?, &budget, self.progress)?;
            return Some(Weights {
                counts: counted(counts),
                says: format!("all {q}^{k} words counted"),
            });
        }
        if n > 1 << 14 {
            return None;
        }
        let counts = search::weight_counts(small_check(code)?, &budget, self.progress)?;
        Some(Weights {
            counts: counted(search::macwilliams(&counts, q, n, n - k)?),
            says: format!(
                "all {q}^{} words of the dual counted, then MacWilliams",
                n - k
            ),
        })
    }

    /// The dual code.
    pub fn dual(&self, code: &Code) -> Code {
        if let Some(dual) = self.remembered(code, |memo| memo.dual.clone()) {
            return dual;
        }
        let made = Made::new(code.field().clone(), code.length(), code.dual_space())
            .dimension(code.redundancy())
            .from([code.clone()]);
        let dual = Code::new(made, "dual", code.origin().span, OriginKind::Step);
        self.remember(code, |memo| memo.dual = Some(dual.clone()));
        dual
    }

    /// The weight distribution of the dual.
    pub fn dual_weights(&self, code: &Code, effort: Effort) -> Option<Weights> {
        if let (Some(weights), true) = (self.weights_by(code, effort), code.length() <= 4096) {
            let (n, k, q) = (code.length(), code.dimension(), code.field().order());
            return Some(Weights {
                counts: counted(search::macwilliams(&listed(&weights.counts, n), q, n, k)?),
                says: "from the code's own weights by MacWilliams".to_string(),
            });
        }
        None
    }

    /// The covering radius, when the cosets are few enough to go through.
    pub fn covering_radius(&self, code: &Code) -> Option<usize> {
        if let Some(known) = self.remembered(code, |memo| memo.covering) {
            return known;
        }
        let cosets = (code.field().order() as f64).powf(code.redundancy() as f64);
        let radius = if code.redundancy() == 0 {
            Some(0)
        } else if code.field().order() <= 256
            && cosets <= (1u64 << 24) as f64
            && cosets * code.length() as f64 <= (1u64 << 32) as f64
        {
            small_check(code)
                .and_then(|check| search::covering_radius(check, &self.budget(Effort::Full)))
        } else {
            None
        };
        self.remember(code, |memo| memo.covering = Some(radius));
        radius
    }
}

impl Knowledge for Session<'_> {
    fn distance(&self, code: &Code) -> Distance {
        self.distance_by(code, Effort::Small)
    }

    fn weights(&self, code: &Code) -> Option<Weights> {
        self.weights_by(code, Effort::Small)
    }

    fn cyclic(&self, code: &Code) -> bool {
        properties::is_cyclic(self, code).verdict == Verdict::Holds
    }
}

/// A long code of high rate has no words to look at: what n, k and q allow says more.
fn learn_from_size(code: &Code, distance: &mut Distance) {
    if code.redundancy() > 1 << 12 {
        return;
    }
    let (n, k, q) = (code.length(), code.dimension(), code.field().order());
    let most = search::bounds::hamming(q, n, k);
    distance.learn(upper(
        most,
        "hamming",
        format!("d is at most {most}, or the balls around the words would overlap (Hamming, 1950)"),
        None,
    ));
}

/// Takes a bound over; a witness is believed only when it is a word of the code of that weight.
fn learn(code: &Code, distance: &mut Distance, bound: Bound) {
    if let Some(word) = &bound.witness {
        let genuine =
            bound.side == Side::Upper && weight(word) == bound.value && code.contains(word);
        assert!(
            genuine,
            "the witness of {:?} is no word of the code",
            bound.rule
        );
    }
    distance.learn(bound);
}

/// A generator matrix of full rank, when it is at hand or not too large to build.
pub(crate) fn small_generator(code: &Code) -> Option<&Matrix> {
    let at_hand = matches!(code.space(), Space::Span(matrix) if matrix.rows() == code.dimension());
    let small = code.dimension().saturating_mul(code.length()) <= ENTRIES;
    (at_hand || small).then(|| code.generator_matrix())
}

/// A check matrix of full rank, when it is at hand or not too large to build.
pub(crate) fn small_check(code: &Code) -> Option<&Matrix> {
    let at_hand =
        matches!(code.space(), Space::Check(matrix) if matrix.rows() == code.redundancy());
    let small = code.redundancy().saturating_mul(code.length()) <= ENTRIES;
    (at_hand || small).then(|| code.check_matrix())
}

/// Counts by index as counts by weight, zeros left out.
fn counted(counts: Vec<BigUint>) -> Counts {
    counts
        .into_iter()
        .enumerate()
        .filter(|(_, count)| *count != BigUint::default())
        .collect()
}

/// Counts by weight as counts by index, 0 to n.
fn listed(counts: &Counts, length: usize) -> Vec<BigUint> {
    let mut list = vec![BigUint::default(); length + 1];
    for (&weight, count) in counts {
        list[weight] = count.clone();
    }
    list
}

/// The positions where a word is not zero, and its values there.
pub fn support(word: &[Element]) -> (Vec<usize>, Vec<Element>) {
    word.iter()
        .enumerate()
        .filter(|&(_, &entry)| entry != 0)
        .map(|(at, &entry)| (at, entry))
        .unzip()
}
