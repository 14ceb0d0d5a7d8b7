//! Turns what pest missed into a finding in plain words.
//!
//! Each rule of the grammar has words and a rank; a message names the four likeliest. Mistakes
//! that are made often have a message of their own in [`super::special`].

use super::grammar::Rule;
use super::rule_words::{MINOR, words};
use super::scan::{string_end, word_at};
use super::words::{DECLARATIONS, is_reserved};
use crate::finding::{Finding, catalogue};
use crate::source::{SourceId, Span};
use pest::error::{Error, ErrorVariant, InputLocation};
use std::ops::Range;

/// The text that was being read.
pub struct View<'a> {
    /// The file.
    pub source: SourceId,
    /// The whole file's text.
    pub text: &'a str,
    /// Where the declaration begins.
    pub declaration: usize,
    /// What was being read: the declaration or some clauses of it.
    pub range: Range<usize>,
    /// The comments of the file, in order.
    pub comments: &'a [Range<usize>],
}

/// The finding for what pest reports of `view.range`.
pub fn explain(error: &Error<Rule>, view: &View<'_>) -> Finding {
    let offset = match error.location {
        InputLocation::Pos(at) | InputLocation::Span((at, _)) => at,
    };
    let at = view.range.start + offset;
    let ErrorVariant::ParsingError { positives, .. } = &error.variant else {
        return tangled(view);
    };
    view.special(at)
        .or_else(|| view.special_after(at, positives))
        .unwrap_or_else(|| generic(at, positives, view))
}

fn tangled(view: &View<'_>) -> Finding {
    let span = view.token_span(view.range.start);
    Finding::new(catalogue::LIMIT, span, "this declaration is too large or too tangled to be read")
        .label("begins here")
        .help("name its parts with `let` or `matrix`, or keep a large matrix in a file of its own: `file(\"h.mtx\")`")
}

fn generic(at: usize, positives: &[Rule], view: &View<'_>) -> Finding {
    let before = view.before(at);
    let in_parameters = positives.contains(&Rule::close);
    let mut wanted: Vec<(u8, &str, &str)> = positives
        .iter()
        .filter(|&&rule| !(in_parameters && rule == Rule::equals))
        .filter_map(|&rule| words(rule, before))
        .collect();
    wanted.sort_by_key(|&(rank, ..)| rank);
    if wanted.first().is_some_and(|&(rank, ..)| rank < MINOR) {
        wanted.retain(|&(rank, ..)| rank < MINOR);
    }
    let mut names: Vec<&str> = Vec::new();
    for (_, name, _) in &wanted {
        if !names.contains(name) && names.len() < 4 {
            names.push(name);
        }
    }
    let help = wanted.first().map_or("", |&(_, _, help)| help);
    let wanted = if names.is_empty() {
        "the next declaration".to_string()
    } else {
        joined(&names)
    };
    let span = view.token_span(at);
    let finding = Finding::new(
        catalogue::SYNTAX,
        span,
        format!("expected {wanted}{}", view.place(at)),
    )
    .label(view.found(at));
    if help.is_empty() {
        finding
    } else {
        finding.help(help)
    }
}

fn joined(names: &[&str]) -> String {
    match names {
        [] => String::new(),
        [only] => only.to_string(),
        [first @ .., last] => format!("{} or {last}", first.join(", ")),
    }
}

impl<'a> View<'a> {
    /// The text from byte `at` to the end of what was being read.
    pub fn rest(&self, at: usize) -> &'a str {
        self.text.get(at..self.range.end).unwrap_or("")
    }

    /// Where the last token before byte `at` ends.
    pub fn end_before(&self, at: usize) -> usize {
        let mut end = at;
        loop {
            end = self.text[..end].trim_end().len();
            let before = self.comments.partition_point(|comment| comment.start < end);
            match before.checked_sub(1).map(|last| &self.comments[last]) {
                Some(comment) if comment.end >= end => end = comment.start,
                _ => return end.max(self.declaration),
            }
        }
    }

    /// The last token before byte `at`, or nothing where the declaration begins.
    pub fn before(&self, at: usize) -> &'a str {
        let text = &self.text[self.declaration..self.end_before(at)];
        let start = text
            .trim_end_matches(|next: char| next.is_ascii_alphanumeric() || next == '_')
            .len();
        if start < text.len() {
            return &text[start..];
        }
        let signs = text.trim_end_matches(['.', '=', '<', '>', '!']).len();
        if signs < text.len() {
            return &text[signs..];
        }
        text.char_indices()
            .next_back()
            .map_or("", |(last, _)| &text[last..])
    }

    /// The token at byte `at`, empty at the end.
    pub fn token(&self, at: usize) -> &'a str {
        let rest = self.rest(at);
        let word = word_at(rest, 0);
        if !word.is_empty() {
            return word;
        }
        match rest.chars().next() {
            Some('"') => &rest[..string_end(rest, 0).min(rest.len())],
            Some(next) => &rest[..next.len_utf8()],
            None => "",
        }
    }

    /// Where to point for byte `at`: at its token, or right behind the last one at the end.
    pub fn token_span(&self, at: usize) -> Span {
        let token = self.token(at);
        if token.is_empty() {
            let end = self.end_before(at);
            return Span::new(self.source, end, end);
        }
        Span::new(self.source, at, at + token.len())
    }

    fn found(&self, at: usize) -> String {
        match self.token(at) {
            "" if self.range.end == self.text.len() => "the file ends here".to_string(),
            "" => "the text ends here".to_string(),
            token if token.chars().count() > 24 => "not this".to_string(),
            token if is_reserved(token) => format!("found the word `{token}`"),
            token => format!("found `{token}`"),
        }
    }

    /// `after …`, in words a reader finds again.
    fn place(&self, at: usize) -> String {
        let before = self.before(at);
        let head = &self.text[self.declaration..self.end_before(at)];
        let keyword = word_at(head, 0);
        let named = DECLARATIONS.contains(&keyword)
            && head.split_whitespace().count() == 2
            && head.split_whitespace().next_back() == Some(before)
            && !matches!(keyword, "use" | "deliver");
        match before {
            "" => String::new(),
            _ if named => format!(
                " after the {}'s name",
                if keyword == "let" { "value" } else { keyword }
            ),
            "\"" => " after the text in quotes".to_string(),
            before => format!(" after `{before}`"),
        }
    }
}
