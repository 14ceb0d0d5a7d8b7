//! The values of the expression language and the arithmetic on them.
//!
//! In: values. Out: values, or [`Trouble`]: what is wrong and what to write instead, to which the
//! caller adds the place. Numbers are exact and of any size up to stated limits; nothing here
//! walks a tree.

mod arithmetic;
pub mod call;
mod compare;
mod convert;
mod entry;
mod points;
mod polynomial;

pub use arithmetic::{binary, negate, symbol};
pub use call::{Call, Given, bind_arguments};
pub use compare::{compare, contains, equal};
pub use convert::{element_of, integer_of, items_of};
pub use entry::{Entry, Parameter, needed, optional};
pub use points::{Monomials, Points};
pub use polynomial::{Coefficient, Polynomial, VARIABLES};

use crate::algebra::{Element, Field, Matrix};
use crate::code::Code;
use crate::finding::{self, Finding};
use crate::source::Span;
use num_bigint::BigInt;
use num_rational::BigRational;
use std::sync::Arc;

/// The most bits an integer may have.
pub const INTEGER_BITS: u64 = 1 << 20;
/// The most members a set or list may have.
pub const SET_SIZE: usize = 1 << 20;
/// The most entries a matrix may have.
pub const MATRIX_ENTRIES: usize = 1 << 31;
/// The most positions a code may have.
pub const CODE_LENGTH: usize = 1 << 24;

/// A value of the language.
#[derive(Clone, Debug)]
pub enum Value {
    /// An integer of any size.
    Integer(BigInt),
    /// An exact fraction that is no integer.
    Rational(BigRational),
    /// true or false.
    Boolean(bool),
    /// A string.
    Text(Arc<str>),
    /// An element of a field.
    Element(Field, Element),
    /// A polynomial in x, y, z.
    Polynomial(Arc<Polynomial>),
    /// A set: in ascending order, each member once.
    Set(Arc<Vec<Value>>),
    /// A list: in the order given.
    List(Arc<Vec<Value>>),
    /// A vector over a field.
    Vector(Field, Arc<Vec<Element>>),
    /// A matrix over a field.
    Matrix(Arc<Matrix>),
    /// A set of monomials.
    Monomials(Arc<Monomials>),
    /// A list of points over a field.
    Points(Arc<Points>),
    /// A field.
    Field(Field),
    /// A code.
    Code(Code),
    /// A channel.
    Channel(Channel),
    /// A finite geometry or another incidence structure: its 0/1 incidence, blocks by points.
    Incidence(Arc<Incidence>),
}

/// A channel model.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum Channel {
    /// Each symbol is changed with this probability, every wrong value equally likely; for bits
    /// the binary symmetric channel.
    Symmetric(BigRational),
    /// Each symbol is lost with this probability.
    Erasure(BigRational),
}

/// Which points lie on which blocks.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Incidence {
    /// How it is named in messages.
    pub name: String,
    /// How many points.
    pub points: usize,
    /// The points of each block, ascending.
    pub blocks: Vec<Vec<usize>>,
}

impl Value {
    /// An integer.
    pub fn integer(value: impl Into<BigInt>) -> Value {
        Value::Integer(value.into())
    }

    /// A fraction in lowest terms, an integer if it is one.
    pub fn rational(value: BigRational) -> Value {
        if value.is_integer() {
            Value::Integer(value.to_integer())
        } else {
            Value::Rational(value)
        }
    }

    /// A set of the members given, ordered and each once.
    ///
    /// # Errors
    /// When two members cannot be ordered.
    pub fn set(mut members: Vec<Value>) -> Result<Value, Trouble> {
        let mut trouble = None;
        members.sort_by(|left, right| match compare(left, right) {
            Ok(order) => order,
            Err(found) => {
                trouble.get_or_insert(found);
                std::cmp::Ordering::Equal
            }
        });
        if let Some(found) = trouble {
            return Err(found);
        }
        members.dedup_by(|left, right| equal(left, right).unwrap_or(false));
        Ok(Value::Set(Arc::new(members)))
    }

    /// The kind of value, with its article, as messages name it.
    pub fn kind(&self) -> &'static str {
        match self {
            Value::Integer(_) => "an integer",
            Value::Rational(_) => "a fraction",
            Value::Boolean(_) => "true or false",
            Value::Text(_) => "a string",
            Value::Element(..) => "a field element",
            Value::Polynomial(_) => "a polynomial",
            Value::Set(_) => "a set",
            Value::List(_) => "a list",
            Value::Vector(..) => "a vector",
            Value::Matrix(_) => "a matrix",
            Value::Monomials(_) => "a set of monomials",
            Value::Points(_) => "a set of points",
            Value::Field(_) => "a field",
            Value::Code(_) => "a code",
            Value::Channel(_) => "a channel",
            Value::Incidence(_) => "an incidence structure",
        }
    }
}

impl std::fmt::Display for Value {
    fn fmt(&self, formatter: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        let list = |formatter: &mut std::fmt::Formatter<'_>, open, members: &[Value], close| {
            write!(formatter, "{open}")?;
            for (at, member) in members.iter().enumerate() {
                let comma = if at == 0 { "" } else { ", " };
                write!(formatter, "{comma}{member}")?;
            }
            write!(formatter, "{close}")
        };
        match self {
            Value::Integer(value) => write!(formatter, "{value}"),
            Value::Rational(value) => write!(formatter, "{value}"),
            Value::Boolean(value) => write!(formatter, "{value}"),
            Value::Text(value) => write!(formatter, "\"{value}\""),
            Value::Element(_, value) => write!(formatter, "{value}"),
            Value::Polynomial(value) => write!(formatter, "{value}"),
            Value::Set(members) => list(formatter, '{', members, '}'),
            Value::List(members) => list(formatter, '[', members, ']'),
            Value::Vector(_, entries) => write!(formatter, "{entries:?}"),
            Value::Matrix(matrix) => write!(
                formatter,
                "a {} x {} matrix over {}",
                matrix.rows(),
                matrix.columns(),
                matrix.field()
            ),
            Value::Monomials(monomials) => write!(formatter, "{} monomials", monomials.len()),
            Value::Points(points) => write!(formatter, "{} points", points.len()),
            Value::Field(field) => write!(formatter, "{field}"),
            Value::Code(code) => write!(formatter, "{code:?}"),
            Value::Channel(Channel::Symmetric(rate)) => write!(formatter, "bsc({rate})"),
            Value::Channel(Channel::Erasure(rate)) => write!(formatter, "bec({rate})"),
            Value::Incidence(incidence) => write!(formatter, "{}", incidence.name),
        }
    }
}

/// What is wrong with an operation, before its place is known.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Trouble {
    /// Which kind of finding it becomes.
    pub code: finding::Code,
    /// What is wrong.
    pub message: String,
    /// What to write instead.
    pub help: Option<String>,
}

impl Trouble {
    /// Something wrong.
    pub fn new(code: finding::Code, message: impl Into<String>) -> Trouble {
        Trouble {
            code,
            message: message.into(),
            help: None,
        }
    }

    /// With what to write instead.
    pub fn help(mut self, help: impl Into<String>) -> Trouble {
        self.help = Some(help.into());
        self
    }

    /// As a finding at a place.
    pub fn at(self, span: Span) -> Box<Finding> {
        let mut finding = Finding::new(self.code, span, self.message);
        finding.help = self.help;
        Box::new(finding)
    }
}
