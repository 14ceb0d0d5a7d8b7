//! From text to a typed tree with spans.
//!
//! In: one file's text. Out: the declarations that could be read ([`tree::File`]) and the findings
//! of those that could not. A scan cuts the text at declaration keywords, pest reads each piece by
//! `grammar/cosetta.pest`, builders make the tree, and [`expected`] puts what pest missed in plain
//! words. One broken declaration, or one broken clause of a code, never hides the others.

mod brackets;
mod clauses;
mod expected;
mod expressions;
mod forms;
mod grammar;
mod literals;
mod look_alikes;
mod operators;
mod parse;
mod reader;
mod rule_words;
mod scan;
mod special;
pub mod tree;
pub mod words;

use crate::finding::Finding;
use crate::source::SourceId;
use std::num::NonZeroUsize;
use std::sync::Once;

/// How many rule applications one piece may take: enough for a matrix of a million entries, and
/// about a second at most.
const CALL_LIMIT: NonZeroUsize = NonZeroUsize::new(80_000_000).unwrap();

/// What a file's text gives.
#[derive(Clone, Debug, Default)]
pub struct Parsed {
    /// The declarations that could be read.
    pub file: tree::File,
    /// Names that declarations which could not be read would have declared: they exist, so their
    /// use elsewhere deserves no finding.
    pub broken: Vec<tree::Name>,
    /// Whether a `use` could not be read, so that names of unknown files are missing.
    pub broken_use: bool,
    /// What is wrong, in the order of the file.
    pub findings: Vec<Finding>,
}

/// Reads a file. Never fails: what cannot be read becomes a finding, and the rest is kept.
pub fn parse(source: SourceId, text: &str) -> Parsed {
    static LIMIT: Once = Once::new();
    LIMIT.call_once(|| pest::set_call_limit(Some(CALL_LIMIT)));
    let scan = scan::scan(text);
    let pieces = parse::Pieces {
        source,
        text,
        comments: &scan.comments,
    };
    let mut parsed = Parsed::default();
    for piece in &scan.pieces {
        let outcome = pieces.read(piece);
        let lost = outcome.declaration.is_none();
        parsed.broken_use |= lost && scan::word_at(text, piece.range.start) == "use";
        parsed.file.declarations.extend(outcome.declaration);
        parsed.broken.extend(outcome.broken);
        parsed.findings.extend(outcome.findings);
    }
    parsed.findings.sort_by_key(|finding| finding.span.start);
    parsed
}
