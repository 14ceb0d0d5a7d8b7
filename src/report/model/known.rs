//! Numbers as far as they are known, with grounds and witnesses.

use std::collections::BTreeMap;
use std::fmt;

use num_bigint::BigUint;
use serde::{Serialize, Serializer};

use crate::algebra::Element;

/// What is known of a number: it lies between these, both included.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Default, Serialize)]
pub struct Interval {
    /// It is at least this.
    pub lower: Option<u64>,
    /// It is at most this.
    pub upper: Option<u64>,
}

impl Interval {
    /// A number known exactly.
    pub fn exact(value: u64) -> Interval {
        Interval {
            lower: Some(value),
            upper: Some(value),
        }
    }

    /// A number known to lie between these, both included.
    pub fn between(lower: u64, upper: u64) -> Interval {
        Interval {
            lower: Some(lower),
            upper: Some(upper),
        }
    }
}

impl fmt::Display for Interval {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        match (self.lower, self.upper) {
            (Some(lower), Some(upper)) if lower == upper => write!(formatter, "{lower}"),
            (Some(lower), Some(upper)) => write!(formatter, "{lower}..{upper}"),
            (Some(lower), None) => write!(formatter, "≥ {lower}"),
            (None, Some(upper)) => write!(formatter, "≤ {upper}"),
            (None, None) => formatter.write_str("?"),
        }
    }
}

/// What is known of the minimum distance.
#[derive(Clone, PartialEq, Debug, Default, Serialize)]
pub struct DistanceReport {
    /// It is at least this; `None` for the zero code, or when nothing is known.
    pub lower: Option<u64>,
    /// It is at most this; `None` for the zero code, or when nothing is known.
    pub upper: Option<u64>,
    /// Why.
    pub grounds: Vec<Ground>,
    /// A word of the code of weight `upper`.
    pub witness: Option<Witness>,
}

/// Which side a ground is on.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Side {
    /// It shows that the number is at least the value.
    Lower,
    /// It shows that the number is at most the value.
    Upper,
}

/// One reason for a bound on a number.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct Ground {
    /// Which side.
    pub bound: Side,
    /// The bound shown.
    pub value: u64,
    /// The theorem or computation, by its usual name.
    pub rule: String,
    /// The step it comes from, as an index from 0 into the steps.
    pub step: Option<usize>,
    /// The reason in a sentence, with the preconditions that were checked.
    pub says: String,
}

/// What shows a statement false, or a bound reached: a word, or a set of positions.
#[derive(Clone, PartialEq, Eq, Debug, Serialize)]
pub struct Witness {
    /// The positions, ascending, from 0.
    pub positions: Vec<usize>,
    /// The non-zero values there; empty when the positions alone are the witness.
    pub values: Vec<Element>,
}

impl Witness {
    /// In words, with the names of positions where there are any.
    pub fn describe(&self, names: Option<&[String]>) -> String {
        let binary = self.values.iter().all(|&value| value == 1);
        let place = |(at, &position): (usize, &usize)| {
            let name = names.and_then(|names| names.get(position));
            let name = name.cloned().unwrap_or_else(|| position.to_string());
            match self.values.get(at) {
                Some(value) if !binary => format!("{name} = {value}"),
                _ => name,
            }
        };
        let places: Vec<String> = self.positions.iter().enumerate().map(place).collect();
        let kind = match (places.len(), self.values.is_empty()) {
            (0, _) => return "the zero word".to_string(),
            (1, true) => "position".to_string(),
            (_, true) => "positions".to_string(),
            (weight, false) => format!("the word of weight {weight} at"),
        };
        format!("{kind} {}", abbreviated(&places, 16).join(", "))
    }
}

/// At most `most` items, the middle of longer lists replaced by a count.
pub(in crate::report) fn abbreviated(items: &[String], most: usize) -> Vec<String> {
    if items.len() <= most {
        return items.to_vec();
    }
    let half = most / 2;
    let mut short = items[..half].to_vec();
    short.push(format!("… ({} more)", items.len() - 2 * half));
    short.extend_from_slice(&items[items.len() - half..]);
    short
}

/// How many words there are of each weight that occurs; decimal strings in JSON.
#[derive(Clone, PartialEq, Eq, Debug, Default)]
pub struct Weights(pub BTreeMap<usize, BigUint>);

impl Serialize for Weights {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_map(
            self.0
                .iter()
                .map(|(weight, count)| (weight, count.to_string())),
        )
    }
}

/// Values by name, in a fixed order; an object in JSON.
#[derive(Clone, PartialEq, Debug)]
pub struct Named<T>(pub Vec<(String, T)>);

impl<T> Default for Named<T> {
    fn default() -> Named<T> {
        Named(Vec::new())
    }
}

impl<T> Named<T> {
    /// Adds a value under a name not yet taken.
    pub fn push(&mut self, name: impl Into<String>, value: T) {
        self.0.push((name.into(), value));
    }

    /// Names and values in order.
    pub fn iter(&self) -> impl Iterator<Item = (&str, &T)> {
        self.0.iter().map(|(name, value)| (name.as_str(), value))
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.0.is_empty()
    }
}

impl<T: Serialize> Serialize for Named<T> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_map(self.iter())
    }
}
