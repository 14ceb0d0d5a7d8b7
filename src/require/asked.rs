//! A requirement with its operands, and a judgement with what a finding about it needs.

use super::Court;
use crate::code::Code;
use crate::derive::{Judgement, support};
use crate::evaluate::{CompiledCode, Stop, position_names};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::value::Value;

/// A requirement with its operands, to be decided.
pub struct Asked<'a> {
    /// What it is judged by.
    pub court: &'a Court<'a>,
    /// The code.
    pub compiled: &'a CompiledCode,
    /// The operands in order, and where they stand.
    pub operands: Vec<(Value, Span)>,
    /// The condition.
    pub span: Span,
}

impl Asked<'_> {
    /// The code.
    pub fn code(&self) -> &Code {
        &self.compiled.code
    }

    /// An operand as a whole number from 0 on.
    ///
    /// # Errors
    /// When it is none.
    pub fn number(&self, at: usize) -> Result<usize, Stop> {
        use num_traits::ToPrimitive;
        let (value, span) = &self.operands[at];
        let number = match value {
            Value::Integer(number) => number.to_usize().filter(|&number| number < 1 << 40),
            _ => None,
        };
        number.ok_or_else(|| {
            Stop::Finding(Box::new(Finding::new(
                catalogue::WRONG_TYPE,
                *span,
                format!("a whole number from 0 on is needed here, not {value}"),
            )))
        })
    }

    /// An operand as a code.
    ///
    /// # Errors
    /// When it is none.
    pub fn code_operand(&self, at: usize) -> Result<&Code, Stop> {
        match &self.operands[at] {
            (Value::Code(code), _) => Ok(code),
            (other, span) => Err(Stop::Finding(Box::new(Finding::new(
                catalogue::WRONG_TYPE,
                *span,
                format!("a code is needed here, not {}", other.kind()),
            )))),
        }
    }

    /// Positions by name.
    pub fn named(&self, positions: &[usize]) -> String {
        position_names(self.compiled.position_names.as_deref(), positions).join(", ")
    }

    /// The positions of a word.
    pub fn word_named(&self, word: &[u32]) -> String {
        self.named(&support(word).0)
    }
}

/// A judgement with what a finding about it needs.
pub struct Ruling {
    /// The verdict.
    pub judgement: Judgement,
    /// What to write instead.
    pub help: Option<String>,
    /// The distance that would have been enough, when that is what is missing.
    pub needed: Option<usize>,
}

impl Ruling {
    /// A judgement alone.
    pub fn new(judgement: Judgement) -> Ruling {
        Ruling {
            judgement,
            help: None,
            needed: None,
        }
    }
}
