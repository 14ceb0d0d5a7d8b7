//! Engines that derive the distance and the weights of a linear code from its matrices, exactly.
//!
//! In go a generator or check matrix over a [`Field`](crate::algebra::Field) and a [`Budget`] of
//! work; out come proven bounds, exact counts and words that show them. One file an engine;
//! [`settle`] picks among them. Nothing here knows of text, spans or findings, and the answers
//! depend on the matrices and the budget only, never on the clock or the number of threads.

mod arithmetic;
pub mod bounds;
mod budget;
mod columns;
mod combinations;
mod covering;
mod distance;
mod enumerate;
mod information_sets;
mod keys;
mod light_words;
mod linear_program;
mod macwilliams;
mod marks;
mod middle;
mod sums;
mod transform;
mod wording;

use num_bigint::BigUint;

use crate::algebra::Element;

pub use budget::{Budget, Progress, Quiet, UNITS_A_SECOND};
pub use columns::{Dependent, dependent_columns};
pub use covering::covering_radius;
pub use distance::{Ground, Settled, Side, settle};
pub use enumerate::{cost_of_words, minimum_by_words, weight_counts};
pub use information_sets::{Raised, raise_lower_bound};
pub use light_words::light_word;
pub use linear_program::linear_programming;
pub use macwilliams::{cost_of_transform, macwilliams, mds_weights};

/// How many words there are of each weight: entry w counts those of weight w, 0 ≤ w ≤ n.
pub type Counts = Vec<BigUint>;

/// A non-zero word of a code and its weight.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct LightWord {
    /// How many of its entries are not zero.
    pub weight: usize,
    /// The word, of length n.
    pub word: Vec<Element>,
}

impl LightWord {
    /// Measures the word; `None` for the zero word.
    fn new(word: Vec<Element>) -> Option<LightWord> {
        let weight = word.iter().filter(|&&entry| entry != 0).count();
        (weight > 0).then_some(LightWord { weight, word })
    }
}
