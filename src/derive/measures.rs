//! The quantities of a code that expressions can name.

use super::channel::{self, FIGURES};
use super::{Effort, Session, Verdict, form, locality, patterns, properties, structure};
use crate::code::Code;
use crate::evaluate::{Measured, Measures};
use crate::finding::catalogue;
use crate::value::{Channel, Trouble, Value};
use num_bigint::BigInt;
use num_rational::BigRational;
use num_traits::ToPrimitive;
use std::cell::{Cell, RefCell};

/// The quantities, with what they mean.
pub const MEASURES: &[(&str, &str)] = &[
    ("n", "the length"),
    ("k", "the dimension"),
    ("d", "the minimum distance"),
    ("q", "the order of the field"),
    ("rate", "k/n, exact"),
    ("redundancy", "n - k"),
    ("dual", "the dual code; dual.d is its distance"),
    ("weights", "weights(w): the number of words of weight w"),
    (
        "row_weight",
        "the greatest weight of a row of the check matrix as built",
    ),
    (
        "column_weight",
        "the greatest weight of a column of the check matrix as built",
    ),
    (
        "girth",
        "the length of the shortest cycle of the check matrix as built",
    ),
    (
        "covering_radius",
        "the greatest distance of any word of the space from the code",
    ),
    (
        "burst_detection",
        "the largest N such that every error within N positions in a row is detected",
    ),
    (
        "burst_correction",
        "the largest N such that every error within N positions in a row is corrected",
    ),
    (
        "cyclic_burst_detection",
        "burst_detection, the first position following the last",
    ),
    (
        "cyclic_burst_correction",
        "burst_correction, the first position following the last",
    ),
    (
        "locality",
        "how many other symbols give a lost one, for the worst position",
    ),
    (
        "availability",
        "in how many ways without a common position a symbol follows from others, for the worst position",
    ),
    (
        "update_cost",
        "the most checks that change when one data symbol does",
    ),
    (
        "regular",
        "all rows of the check matrix as built have one weight, all columns another",
    ),
    (
        "triangular",
        "the checks at one end follow one after the other from the rows of the check matrix as built",
    ),
    (
        "undetected",
        "undetected(channel): the probability that errors turn a word into another",
    ),
    (
        "failure",
        "failure(channel): the probability that more than (d - 1)/2 symbols change",
    ),
    (
        "miscorrection",
        "miscorrection(channel): the probability that correcting up to (d - 1)/2 errors gives a wrong word",
    ),
    (
        "loss",
        "loss(channel): the probability that what an erasure channel loses cannot be recovered",
    ),
];

/// All names that [`SessionMeasures`] answers to: quantities and properties.
pub fn names() -> Vec<&'static str> {
    MEASURES
        .iter()
        .map(|&(name, _)| name)
        .chain(properties::PROPERTIES.iter().map(|property| property.name))
        .collect()
}

/// Answers expressions out of a session.
pub struct SessionMeasures<'a> {
    /// The session.
    pub session: &'a Session<'a>,
    /// The last judgement of a property that an expression asked for: its grounds and witness.
    pub last: RefCell<Option<super::Judgement>>,
    /// How hard to look for a distance: what is settled by little is not searched for.
    pub effort: Cell<Effort>,
}

impl<'a> SessionMeasures<'a> {
    /// Over a session.
    pub fn new(session: &'a Session<'a>) -> SessionMeasures<'a> {
        SessionMeasures {
            session,
            last: RefCell::new(None),
            effort: Cell::new(Effort::Full),
        }
    }
}

fn integer(value: impl Into<BigInt>) -> Measured {
    Measured::Exactly(Value::integer(value))
}

fn unknown(what: &str) -> Trouble {
    Trouble::new(
        catalogue::CLAIM_UNDECIDED,
        format!("{what} could not be derived within the budget"),
    )
    .help("give a larger --budget")
}

impl Measures for SessionMeasures<'_> {
    fn measure(
        &self,
        code: &Code,
        name: &str,
        arguments: &[Value],
    ) -> Option<Result<Measured, Trouble>> {
        let measured = match (name, arguments) {
            ("weights", [Value::Integer(weight)]) => self.weight_count(code, weight),
            ("weights", _) => Err(Trouble::new(
                catalogue::BAD_ARGUMENT,
                "`weights` takes one integer, as in `weights(4)`",
            )),
            (_, [Value::Channel(channel)]) => self.figure(code, name, channel)?,
            (_, arguments) if FIGURES.contains(&name) => Err(Trouble::new(
                catalogue::BAD_ARGUMENT,
                format!(
                    "`{name}` takes one channel, not {}",
                    match arguments {
                        [] => "nothing",
                        [other] => other.kind(),
                        _ => "several values",
                    }
                ),
            )
            .help(format!(
                "declare one, `channel sea = bsc(0.004)`, and write `{name}(sea)`"
            ))),
            (_, []) => self.plain(code, name)?,
            _ => return None,
        };
        Some(measured)
    }
}

impl SessionMeasures<'_> {
    fn plain(&self, code: &Code, name: &str) -> Option<Result<Measured, Trouble>> {
        Some(Ok(match name {
            "n" => integer(code.length()),
            "k" => integer(code.dimension()),
            "q" => integer(code.field().order()),
            "redundancy" => integer(code.redundancy()),
            "rate" => Measured::Exactly(Value::rational(BigRational::new(
                code.dimension().into(),
                code.length().into(),
            ))),
            "d" => return Some(self.distance(code)),
            "dual" => Measured::Exactly(Value::Code(self.session.dual(code))),
            "row_weight" => integer(maximum(&structure::row_weights(structure::check_matrix(
                code,
            )))),
            "column_weight" => integer(maximum(&structure::column_weights(
                structure::check_matrix(code),
            ))),
            "girth" => return Some(girth(code)),
            "covering_radius" => {
                return Some(
                    self.session
                        .covering_radius(code)
                        .map(integer)
                        .ok_or_else(|| unknown("the covering radius")),
                );
            }
            "burst_detection" => span(patterns::burst_detection(self.session, code, false)),
            "burst_correction" => span(patterns::burst_correction(self.session, code, false)),
            "cyclic_burst_detection" => span(patterns::burst_detection(self.session, code, true)),
            "cyclic_burst_correction" => span(patterns::burst_correction(self.session, code, true)),
            "locality" => return Some(repair(locality::locality(self.session, code))),
            "availability" => return Some(repair(locality::availability(self.session, code))),
            "update_cost" => {
                let cost = locality::update_cost(code);
                return Some(cost.map(integer).ok_or_else(|| unknown("the update cost")));
            }
            "regular" => self.judged(form::regular(code)),
            "triangular" => self.judged(form::triangular(code)),
            _ => return self.property(code, name),
        }))
    }

    fn judged(&self, judgement: super::Judgement) -> Measured {
        let holds = judgement.verdict == Verdict::Holds;
        *self.last.borrow_mut() = Some(judgement);
        Measured::Exactly(Value::Boolean(holds))
    }

    fn figure(&self, code: &Code, name: &str, on: &Channel) -> Option<Result<Measured, Trouble>> {
        let figure = match channel::figure(self.session, code, name, on, self.effort.get())? {
            Ok(figure) => figure,
            Err(trouble) => return Some(Err(trouble)),
        };
        let says = format!("{name} {}; {}", figure.value, figure.says);
        *self.last.borrow_mut() = Some(super::Judgement::holds(says));
        let (lower, upper) = (figure.value.lower, figure.value.upper);
        Some(Ok(if lower == upper {
            Measured::Exactly(Value::rational(lower))
        } else {
            Measured::Within(lower, upper)
        }))
    }

    fn distance(&self, code: &Code) -> Result<Measured, Trouble> {
        if code.dimension() == 0 {
            return Err(Trouble::new(
                catalogue::BAD_NUMBER,
                "the code holds only the zero word, so it has no distance",
            ));
        }
        let distance = self.session.distance_by(code, self.effort.get());
        Ok(match distance.exact() {
            Some(exact) => integer(exact),
            None => Measured::Between(distance.lower, distance.upper),
        })
    }

    fn weight_count(&self, code: &Code, weight: &BigInt) -> Result<Measured, Trouble> {
        let weights = self
            .session
            .weights_by(code, Effort::Full)
            .ok_or_else(|| unknown("the weight distribution"))?;
        let count = weight
            .to_usize()
            .and_then(|weight| weights.counts.get(&weight));
        Ok(integer(
            count.cloned().map(BigInt::from).unwrap_or_default(),
        ))
    }

    fn property(&self, code: &Code, name: &str) -> Option<Result<Measured, Trouble>> {
        let judgement = (properties::property(name)?.decide)(self.session, code);
        let measured = match judgement.verdict {
            Verdict::Holds => Ok(Measured::Exactly(Value::Boolean(true))),
            Verdict::Fails => Ok(Measured::Exactly(Value::Boolean(false))),
            Verdict::Undecided => Err(unknown(&format!(
                "whether the code is {name} ({})",
                judgement.says
            ))),
        };
        *self.last.borrow_mut() = Some(judgement);
        Some(measured)
    }
}

fn span((lower, upper): (usize, usize)) -> Measured {
    if lower == upper {
        integer(lower)
    } else {
        Measured::Between(lower, upper)
    }
}

fn repair(known: Result<locality::Known, usize>) -> Result<Measured, Trouble> {
    match known {
        Ok(known) => Ok(span((known.lower, known.upper))),
        Err(position) => Err(Trouble::new(
            catalogue::BAD_NUMBER,
            format!("position {position} follows from no other: no check touches it"),
        )
        .help("a lost symbol there is lost for good; check it, or puncture it away")),
    }
}

fn maximum(weights: &[usize]) -> usize {
    weights.iter().copied().max().unwrap_or(0)
}

fn girth(code: &Code) -> Result<Measured, Trouble> {
    match structure::girth(structure::check_matrix(code)) {
        Ok(Some(length)) => Ok(integer(length)),
        Ok(None) => Err(Trouble::new(
            catalogue::BAD_NUMBER,
            "the check matrix has no cycle, so it has no girth",
        )),
        Err(structure::TooLarge) => Err(unknown("the girth of so large a matrix")),
    }
}
