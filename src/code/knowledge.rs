//! Facts about a code and the theorems that carry them from one code to the next.

use super::{Code, weight};
use crate::algebra::Element;
use num_bigint::BigUint;
use std::collections::BTreeMap;

/// How many words have each weight, zero counts left out.
pub type Counts = BTreeMap<usize, BigUint>;

/// Which side of a quantity a fact bounds.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug)]
pub enum Side {
    /// The quantity is at least the value.
    Lower,
    /// The quantity is at most the value.
    Upper,
}

/// A bound on the minimum distance with its grounds.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Bound {
    /// Which side.
    pub side: Side,
    /// The value.
    pub value: usize,
    /// The rule's short stable name (`extension`, `bch-bound`, `enumeration`).
    pub rule: &'static str,
    /// The grounds in one line.
    pub says: String,
    /// For an upper bound, a codeword of that weight, if one is at hand.
    pub witness: Option<Vec<Element>>,
    /// How many steps ago it was established; steps since then only carried it on.
    pub steps_ago: usize,
}

impl Bound {
    /// The same bound for the next code, which keeps it for the reason given.
    pub fn carried(self, how: &str) -> Bound {
        Bound {
            says: format!("{}; {how}", self.says),
            witness: None,
            steps_ago: self.steps_ago + 1,
            ..self
        }
    }

    /// With a codeword that shows it.
    pub fn witness(self, witness: Option<Vec<Element>>) -> Bound {
        Bound { witness, ..self }
    }
}

/// A lower bound on the distance.
pub fn lower(value: usize, rule: &'static str, says: impl Into<String>) -> Bound {
    Bound {
        side: Side::Lower,
        value,
        rule,
        says: says.into(),
        witness: None,
        steps_ago: 0,
    }
}

/// An upper bound on the distance, with a word that shows it if there is one.
pub fn upper(
    value: usize,
    rule: &'static str,
    says: impl Into<String>,
    witness: Option<Vec<Element>>,
) -> Bound {
    Bound {
        side: Side::Upper,
        value,
        rule,
        says: says.into(),
        witness,
        steps_ago: 0,
    }
}

/// What is known of a code's minimum distance. For the zero code there is none: see
/// [`Distance::undefined`].
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Distance {
    /// Proven: d is at least this.
    pub lower: usize,
    /// Proven: d is at most this.
    pub upper: usize,
    /// The grounds of the best bounds, lower ones first.
    pub grounds: Vec<Bound>,
    /// A codeword of weight `upper`, if one is at hand.
    pub witness: Option<Vec<Element>>,
}

impl Distance {
    /// What is known before any argument: 1 ≤ d ≤ n − k + 1 (Singleton, 1964).
    pub fn unknown(code: &Code) -> Distance {
        if code.dimension() == 0 {
            return Distance::undefined();
        }
        let singleton = code.redundancy() + 1;
        Distance {
            lower: 1,
            upper: singleton,
            grounds: vec![
                lower(1, "linear", "a non-zero word has weight at least 1"),
                upper(
                    singleton,
                    "singleton",
                    format!("Singleton: d is at most n - k + 1 = {singleton}"),
                    None,
                ),
            ],
            witness: None,
        }
    }

    /// The zero code has no two words, so no distance.
    pub fn undefined() -> Distance {
        Distance {
            lower: 0,
            upper: 0,
            grounds: Vec::new(),
            witness: None,
        }
    }

    /// The bound that holds on one side.
    pub fn ground(&self, side: Side) -> Option<&Bound> {
        self.grounds.iter().find(|bound| bound.side == side)
    }

    /// The lower bound for a next code that keeps it, for the reason given; none when it says
    /// nothing.
    pub fn carried_lower(&self, how: &str) -> Option<Bound> {
        let bound = self.ground(Side::Lower).filter(|bound| bound.value > 1)?;
        Some(bound.clone().carried(how))
    }

    /// The exact value, when both sides meet.
    pub fn exact(&self) -> Option<usize> {
        (self.lower == self.upper && self.lower > 0).then_some(self.lower)
    }

    /// Takes a bound over where it is better than what is known, or gives a witness to it.
    pub fn learn(&mut self, bound: Bound) {
        if self.lower == 0 {
            return;
        }
        debug_assert!(
            bound
                .witness
                .as_ref()
                .is_none_or(|word| weight(word) == bound.value),
            "a witness has the weight it shows"
        );
        match bound.side {
            Side::Lower if bound.value > self.lower => {
                self.lower = bound.value;
                self.replace(bound);
            }
            Side::Upper
                if bound.value < self.upper
                    || (bound.value == self.upper
                        && self.witness.is_none()
                        && bound.witness.is_some()) =>
            {
                self.upper = bound.value;
                self.witness = bound.witness.clone();
                self.replace(bound);
            }
            _ => {}
        }
        assert!(
            self.lower <= self.upper,
            "the grounds contradict each other: {:?}",
            self.grounds
        );
    }

    fn replace(&mut self, bound: Bound) {
        self.grounds.retain(|known| known.side != bound.side);
        self.grounds.push(bound);
        self.grounds.sort_by_key(|known| known.side);
    }
}

/// A weight distribution and how it is known.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Weights {
    /// How many words have each weight.
    pub counts: Counts,
    /// The grounds in one line.
    pub says: String,
}

/// What can be asked of a code while a theorem is applied. The answers may take some work, never
/// much; they are proven.
pub trait Knowledge {
    /// What is known of its distance.
    fn distance(&self, code: &Code) -> Distance;
    /// Its weights, when they are known or quickly found.
    fn weights(&self, code: &Code) -> Option<Weights>;
    /// Whether it is known to be cyclic in its order of positions.
    fn cyclic(&self, code: &Code) -> bool;
}

/// The theorems that hold for a code because of the way it was made. Each must check its own
/// preconditions: a wrong bound here is a wrong verdict.
pub trait Rules: Send + Sync {
    /// Bounds on the distance.
    fn distance(&self, _code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        Vec::new()
    }
    /// The weight distribution.
    fn weights(&self, _code: &Code, _known: &dyn Knowledge) -> Option<Weights> {
        None
    }
    /// Why the code is cyclic, if that follows.
    fn cyclic(&self, _code: &Code, _known: &dyn Knowledge) -> Option<String> {
        None
    }
    /// The distance it was designed for, if it was.
    fn designed_distance(&self) -> Option<usize> {
        None
    }
}

/// No theorem is at hand: parameters come from computation alone.
pub struct NoRules;

impl Rules for NoRules {}

/// The code is its only parent under another name.
pub struct SameCode;

impl Rules for SameCode {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        known.distance(&code.origin().parents[0]).grounds
    }
    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        known.weights(&code.origin().parents[0])
    }
    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        known
            .cyclic(&code.origin().parents[0])
            .then(|| "it is the same code".to_string())
    }
}
