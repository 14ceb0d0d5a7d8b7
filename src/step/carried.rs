//! Rules that several steps share: equivalent codes, and steps that are others in a row.

use crate::algebra::Element;
use crate::code::{Bound, Code, Knowledge, Made, OriginKind, Rules, Weights};
use crate::value::Call;

/// What becomes of a word.
type Change = Box<dyn Fn(&[Element]) -> Vec<Element> + Send + Sync>;

/// The distance stays: a word of the code before becomes one of the same weight, and no lighter
/// ones arise.
pub(super) struct Carried {
    says: &'static str,
    change: Change,
    weights: bool,
    cyclic: bool,
}

impl Carried {
    /// The words are those of the code before, changed one by one without change of weight.
    pub fn new(
        says: &'static str,
        change: impl Fn(&[Element]) -> Vec<Element> + Send + Sync + 'static,
    ) -> Carried {
        Carried {
            says,
            change: Box::new(change),
            weights: true,
            cyclic: false,
        }
    }

    /// With further words beside the changed ones, so that the weights do not follow.
    pub fn with_further_words(self) -> Carried {
        Carried {
            weights: false,
            ..self
        }
    }

    /// A cyclic code stays cyclic.
    pub fn cyclic(self) -> Carried {
        Carried {
            cyclic: true,
            ..self
        }
    }
}

impl Rules for Carried {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        let carry = |bound: Bound| {
            let word = bound.witness.as_deref().map(&self.change);
            bound.carried(self.says).witness(word)
        };
        before.grounds.into_iter().map(carry).collect()
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        if !self.weights {
            return None;
        }
        let before = known.weights(&code.origin().parents[0])?;
        Some(Weights {
            says: format!("{}: {}", self.says, before.says),
            ..before
        })
    }

    fn cyclic(&self, code: &Code, known: &dyn Knowledge) -> Option<String> {
        (self.cyclic && known.cyclic(&code.origin().parents[0]))
            .then(|| format!("the code before is cyclic, and {}", self.says))
    }
}

/// The code after one of several steps that are written as one.
pub(super) fn between(mut made: Made, before: &Code, call: &Call) -> Code {
    made.parents.insert(0, before.clone());
    Code::new(made, call.name, call.span, OriginKind::Step)
}

/// The last of two steps that are written as one: what is known of `after`, the code after both.
pub(super) fn last_of_two(after: Code) -> Made {
    Made::new(after.field().clone(), after.length(), after.space().clone())
        .dimension(after.dimension())
        .masked(after.offset().map(<[Element]>::to_vec))
        .from([after])
        .rules(LastOfTwo)
}

struct LastOfTwo;

impl Rules for LastOfTwo {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let grounds = known.distance(&code.origin().parents[1]).grounds;
        grounds
            .into_iter()
            .map(|bound| Bound {
                steps_ago: bound.steps_ago.saturating_sub(1),
                ..bound
            })
            .collect()
    }

    fn weights(&self, code: &Code, known: &dyn Knowledge) -> Option<Weights> {
        known.weights(&code.origin().parents[1])
    }
}
