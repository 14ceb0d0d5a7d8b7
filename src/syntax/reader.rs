//! What all builders share: the text, exact spans, names.

use super::grammar::{Rule, is_mark};
use super::literals;
use super::tree::{Name, Text};
use crate::finding::Finding;
use crate::source::{SourceId, Span};
use std::ops::Range;

/// A pair of the grammar.
pub type Node<'a> = pest::iterators::Pair<'a, Rule>;

/// Builds the tree of one piece of a file.
pub struct Reader<'a> {
    /// The file.
    pub source: SourceId,
    /// The whole file's text.
    pub text: &'a str,
    /// Where the piece begins in it.
    pub offset: usize,
    /// The comments of the file, in order.
    pub comments: &'a [Range<usize>],
    /// How many operators hang on one another at the place being read.
    pub chain: usize,
    /// Findings that do not spoil the declaration.
    pub findings: Vec<Finding>,
}

impl<'a> Reader<'a> {
    /// The span of a pair in the file, without the blanks and comments the grammar took with it.
    pub fn span(&self, pair: &Node<'a>) -> Span {
        let span = pair.as_span();
        let start = self.offset + span.start();
        let end = self.trimmed(start, self.offset + span.end());
        Span::new(self.source, start, end)
    }

    fn trimmed(&self, start: usize, end: usize) -> usize {
        let mut end = end;
        loop {
            end = start
                + self.text[start..end]
                    .trim_end_matches([' ', '\t', '\r', '\n', '\u{FEFF}'])
                    .len();
            let before = self.comments.partition_point(|comment| comment.start < end);
            match before.checked_sub(1).map(|last| &self.comments[last]) {
                Some(comment) if comment.end >= end && comment.start >= start => {
                    end = comment.start
                }
                _ => return end,
            }
        }
    }

    /// A name.
    pub fn name(&self, pair: &Node<'a>) -> Name {
        Name {
            text: pair.as_str().to_string(),
            span: self.span(pair),
        }
    }

    /// A quoted string.
    pub fn string(&self, pair: &Node<'a>) -> Text {
        Text {
            value: literals::unescape(pair.as_str()),
            span: self.span(pair),
        }
    }

    /// The single meaningful part of a pair.
    pub fn only(&self, pair: Node<'a>) -> Node<'a> {
        match pair.into_inner().find(|part| !is_mark(part.as_rule())) {
            Some(part) => part,
            None => unreachable!("the grammar gives this rule a part"),
        }
    }

    /// The name that is the single part of a pair.
    pub fn inner_name(&self, pair: Node<'a>) -> Name {
        self.name(&self.only(pair))
    }
}
