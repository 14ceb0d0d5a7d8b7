//! The light scan that cuts a file into declarations before any of them is read.
//!
//! In: the text. Out: [`Piece`]s, one a declaration or an attempt at one, and where the comments
//! lie. A keyword that begins a line begins a declaration whatever is open before it, so a
//! forgotten bracket spoils one declaration and not the rest of the file.

use super::words::{DECLARATIONS, is_reserved};
use crate::finding::near_names;
use std::ops::Range;

/// How deep brackets and the forms that hold others may nest.
pub const MAX_NESTING: usize = 64;

/// What a piece of the file begins with.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum Opening {
    /// One of the declaration keywords.
    Keyword,
    /// A word that stands where a keyword should, and the keywords it nearly is.
    Misspelt(Vec<&'static str>),
    /// Something else: text before the first declaration.
    Nothing,
}

/// A stretch of the file that should be one declaration.
#[derive(Clone, Debug)]
pub struct Piece {
    /// Its bytes, to the beginning of the next piece.
    pub range: Range<usize>,
    /// What it begins with.
    pub opening: Opening,
    /// The `##` lines right before it.
    pub documentation: Option<String>,
    /// Where nesting passes [`MAX_NESTING`], if it does.
    pub too_deep: Option<usize>,
    /// Where lines begin with a clause keyword.
    pub clauses: Vec<usize>,
}

/// The whole file, cut.
#[derive(Debug, Default)]
pub struct Scan {
    /// In the order of the file.
    pub pieces: Vec<Piece>,
    /// The comments, marks included, line ends not.
    pub comments: Vec<Range<usize>>,
}

/// Cuts `text`; linear in its length.
pub fn scan(text: &str) -> Scan {
    let mut scanner = Scanner {
        text,
        at: 0,
        open: vec![0],
        documentation: Vec::new(),
        line_fresh: true,
        blank_lines: 0,
        out: Scan::default(),
    };
    scanner.run();
    scanner.out
}

struct Scanner<'a> {
    text: &'a str,
    at: usize,
    /// For each open bracket, and the piece itself, how many nesting forms began in it.
    open: Vec<usize>,
    documentation: Vec<&'a str>,
    line_fresh: bool,
    blank_lines: usize,
    out: Scan,
}

impl<'a> Scanner<'a> {
    fn run(&mut self) {
        while let Some(next) = self.text[self.at..].chars().next() {
            match next {
                '\n' => {
                    self.blank_lines += usize::from(self.line_fresh);
                    self.line_fresh = true;
                    self.at += 1;
                }
                ' ' | '\t' | '\r' | '\u{FEFF}' => self.at += next.len_utf8(),
                '#' => self.comment(),
                _ => {
                    let first = std::mem::replace(&mut self.line_fresh, false);
                    self.token(next, first);
                    self.documentation.clear();
                    self.blank_lines = 0;
                }
            }
        }
        let end = self.text.len();
        if let Some(last) = self.out.pieces.last_mut() {
            last.range.end = end;
        }
    }

    fn comment(&mut self) {
        let rest = &self.text[self.at..];
        let length = rest.find('\n').unwrap_or(rest.len());
        self.out.comments.push(self.at..self.at + length);
        if self.line_fresh && self.blank_lines > 0 {
            self.documentation.clear();
        }
        if let (true, Some(line)) = (self.line_fresh, rest[..length].strip_prefix("##")) {
            let line = line.strip_suffix('\r').unwrap_or(line);
            self.documentation
                .push(line.strip_prefix(' ').unwrap_or(line));
        }
        self.line_fresh = false;
        self.blank_lines = 0;
        self.at += length;
    }

    fn token(&mut self, next: char, first: bool) {
        let start = self.at;
        if next.is_ascii_alphabetic() || next == '_' {
            let word = word_at(self.text, start);
            self.at += word.len();
            self.word(word, start, first);
            return;
        }
        if self.out.pieces.is_empty() {
            self.begin(start, Opening::Nothing);
        }
        match next {
            '"' => self.at = string_end(self.text, start),
            '0'..='9' => self.at += word_at(self.text, start).len(),
            '(' | '[' | '{' => {
                self.open.push(0);
                self.nest(start, 0);
                self.at += 1;
            }
            ')' | ']' | '}' => {
                if self.open.len() > 1 {
                    self.open.pop();
                }
                self.at += 1;
            }
            other => self.at += other.len_utf8(),
        }
    }

    fn word(&mut self, word: &'a str, start: usize, first: bool) {
        if let Some(opening) = self.opening(word, start, first) {
            self.begin(start, opening);
        } else if self.out.pieces.is_empty() {
            let near = nearly_keywords(word);
            self.begin(
                start,
                if near.is_empty() {
                    Opening::Nothing
                } else {
                    Opening::Misspelt(near)
                },
            );
        }
        let piece = self.out.pieces.len() - 1;
        // Not as an argument's name (`bits: 3`), nor as an operand (`bits(data)`).
        let clause = first && matches!(word, "is" | "require" | "prefer" | "bits" | "note");
        let after = self.after();
        let inner = after.starts_with(':') || word == "bits" && after.starts_with('(');
        if clause && !inner {
            self.out.pieces[piece].clauses.push(start);
            self.open = vec![0];
        }
        let form = matches!(
            word,
            "pick" | "columns" | "monomials" | "points" | "circulants"
        );
        if form
            && self
                .after()
                .starts_with(|next: char| next.is_ascii_alphanumeric() || next == '(')
        {
            self.nest(start, 1);
        }
    }

    /// Whether a declaration begins with this word.
    fn opening(&self, word: &str, start: usize, first: bool) -> Option<Opening> {
        let after = self.after();
        let second = word_at(after, 0);
        let named = !second.is_empty() && !is_reserved(second);
        let string = after.starts_with('"');
        if DECLARATIONS.contains(&word) {
            let argument = after.starts_with(':') && !after.starts_with(":=");
            let begins = if first {
                !argument && second != "as"
            } else {
                self.open.len() == 1 && if word == "use" { string } else { named }
            };
            return begins.then_some(Opening::Keyword);
        }
        let at_margin = start == 0 || self.text[..start].ends_with(['\n', '\u{FEFF}']);
        if !at_margin || is_reserved(word) {
            return None;
        }
        let rest = skip_blanks(&after[second.len()..]);
        let shaped = string
            || named && (rest.starts_with(['=', '(']) || matches!(word_at(rest, 0), "over" | "to"));
        let near = nearly_keywords(word);
        (shaped && !near.is_empty()).then_some(Opening::Misspelt(near))
    }

    fn begin(&mut self, start: usize, opening: Opening) {
        if let Some(last) = self.out.pieces.last_mut() {
            last.range.end = start;
        }
        let lines = std::mem::take(&mut self.documentation);
        let attached = !lines.is_empty() && self.blank_lines == 0;
        self.out.pieces.push(Piece {
            range: start..start,
            opening,
            documentation: attached.then(|| lines.join("\n")),
            too_deep: None,
            clauses: Vec::new(),
        });
        self.open = vec![0];
    }

    fn nest(&mut self, at: usize, forms: usize) {
        let Some(piece) = self
            .out
            .pieces
            .last_mut()
            .filter(|piece| piece.too_deep.is_none())
        else {
            return;
        };
        if let Some(last) = self.open.last_mut() {
            *last += forms;
        }
        let depth = self.open.len() - 1 + self.open.iter().sum::<usize>();
        if depth > MAX_NESTING {
            piece.too_deep = Some(at);
        }
    }

    /// The text from the next token on.
    fn after(&self) -> &'a str {
        skip_blanks(&self.text[self.at..])
    }
}

/// The declaration keywords that `word` may have been meant for.
fn nearly_keywords(word: &str) -> Vec<&'static str> {
    near_names(&word.to_lowercase(), DECLARATIONS.iter().copied())
}

/// The letters, digits and `_` at byte `at`.
pub fn word_at(text: &str, at: usize) -> &str {
    let rest = text.get(at..).unwrap_or("");
    let length = rest
        .find(|next: char| !next.is_ascii_alphanumeric() && next != '_')
        .unwrap_or(rest.len());
    &rest[..length]
}

/// One past the string that begins at byte `start`; an unterminated one ends with its line.
pub fn string_end(text: &str, start: usize) -> usize {
    let mut escaped = false;
    for (offset, next) in text[start..].char_indices().skip(1) {
        match next {
            '\n' => return start + offset,
            '"' if !escaped => return start + offset + 1,
            _ => escaped = next == '\\' && !escaped,
        }
    }
    text.len()
}

/// `text` without the white space and comments it begins with.
pub fn skip_blanks(text: &str) -> &str {
    let mut rest = text.trim_start();
    while rest.starts_with('#') {
        rest = rest.find('\n').map_or("", |end| rest[end..].trim_start());
    }
    rest
}
