//! The phrases of the requirement vocabulary.

use super::{
    Asked, Ruling, errors, limits, miscorrection, patterns, relations, storage, structure,
};
use crate::evaluate::Stop;
use crate::syntax::tree::PhrasePart;

/// A phrase: its words with `_` for operands, what it means, how it is decided.
pub struct Phrase {
    /// `corrects _ while detecting _`
    pub pattern: &'static str,
    /// What it means, exactly.
    pub says: &'static str,
    /// Decides it.
    pub decide: fn(&Asked) -> Result<Ruling, Stop>,
}

/// All phrases.
pub fn phrases() -> impl Iterator<Item = &'static Phrase> {
    [
        errors::PHRASES,
        patterns::PHRASES,
        miscorrection::PHRASES,
        storage::PHRASES,
        structure::PHRASES,
        limits::PHRASES,
        relations::PHRASES,
    ]
    .into_iter()
    .flatten()
}

/// The pattern of a phrase as written.
pub(super) fn pattern_of(parts: &[PhrasePart]) -> String {
    let words: Vec<&str> = parts
        .iter()
        .map(|part| match part {
            PhrasePart::Word(name) => name.text.as_str(),
            PhrasePart::Operand(_) => "_",
        })
        .collect();
    words.join(" ")
}
