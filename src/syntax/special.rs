//! Mistakes that are made often, each with a message of its own.

use super::expected::View;
use super::grammar::Rule;
use super::look_alikes::{LOOK_ALIKES, MARKS};
use super::scan::string_end;
use super::words::{PHRASE_VERBS, is_reserved};
use crate::finding::{Finding, catalogue, near_names};
use crate::source::Span;

impl View<'_> {
    /// A message for the character or mark at byte `at`, if that alone says what is wrong.
    pub fn special(&self, at: usize) -> Option<Finding> {
        let next = self.rest(at).chars().next()?;
        if next == '"' {
            return self.quotes(at);
        }
        if !next.is_ascii() {
            return Some(self.not_ascii(at, next));
        }
        if next.is_ascii_control() {
            let message = format!(
                "the control character {:#04x} has no meaning here",
                u32::from(next)
            );
            return Some(
                self.syntax(at, 1, message)
                    .label("not text")
                    .help("delete it"),
            );
        }
        self.foreign_mark(at)
    }

    /// A message for what stands around byte `at`, given what the grammar expected there.
    pub fn special_after(&self, at: usize, positives: &[Rule]) -> Option<Finding> {
        self.reserved_name(at, positives)
            .or_else(|| self.decimal_comma(at))
            .or_else(|| self.brackets(at))
            .or_else(|| self.bars(at))
            .or_else(|| self.glued_number(at))
            .or_else(|| self.sum_in_row(at, positives))
            .or_else(|| self.misspelt_verb(at))
            .or_else(|| self.missing_then(at, positives))
            .or_else(|| self.missing_over(at, positives))
    }

    /// A syntax finding for `length` bytes at `at`.
    pub fn syntax(&self, at: usize, length: usize, message: impl Into<String>) -> Finding {
        Finding::new(
            catalogue::SYNTAX,
            Span::new(self.source, at, at + length),
            message,
        )
    }

    fn quotes(&self, at: usize) -> Option<Finding> {
        let end = string_end(self.text, at);
        let text = &self.text[at..end];
        if text.len() < 2 || !text.ends_with('"') || text.ends_with("\\\"") {
            return Some(
                self.syntax(
                    at,
                    text.trim_end().len(),
                    "this text in quotes is not closed",
                )
                .label("opened here")
                .help("write `\"` at its end, on the same line"),
            );
        }
        let mut letters = text.char_indices().skip(1);
        while let Some((offset, letter)) = letters.next() {
            if letter != '\\' {
                continue;
            }
            let (_, escaped) = letters.next()?;
            if !matches!(escaped, '"' | '\\' | 'n') {
                return Some(
                    self.syntax(
                        at + offset,
                        1 + escaped.len_utf8(),
                        format!("`\\{escaped}` means nothing in a text"),
                    )
                    .label("unknown escape")
                    .help(
                        "write `\\\\` for a backslash; `\\\"` and `\\n` are the other two escapes",
                    ),
                );
            }
        }
        None
    }

    fn not_ascii(&self, at: usize, next: char) -> Finding {
        let finding = self
            .syntax(
                at,
                next.len_utf8(),
                format!("the character `{next}` is no part of the language"),
            )
            .label("only in texts and comments");
        match LOOK_ALIKES.iter().find(|(look, _)| *look == next) {
            Some((_, plain)) if plain.starts_with("a ") || *plain == "nothing" => {
                finding.help(format!("write {plain} instead"))
            }
            Some((_, plain)) => finding.help(format!("write `{plain}` instead")),
            None => finding.help("names have the letters a to z, digits and `_`"),
        }
    }

    fn foreign_mark(&self, at: usize) -> Option<Finding> {
        for (mark, help) in MARKS {
            for back in 0..mark.len() {
                let start = at
                    .checked_sub(back)
                    .filter(|&start| start >= self.range.start);
                let Some(start) = start.filter(|&start| self.rest(start).starts_with(mark)) else {
                    continue;
                };
                return Some(
                    self.syntax(start, mark.len(), format!("`{mark}` is not written here"))
                        .label("unknown mark")
                        .help(*help),
                );
            }
        }
        None
    }

    fn reserved_name(&self, at: usize, positives: &[Rule]) -> Option<Finding> {
        let word = self.token(at);
        let names = |rule: &Rule| {
            matches!(
                rule,
                Rule::name | Rule::parameter | Rule::binder | Rule::coordinates | Rule::group
            )
        };
        let wanted = !positives.is_empty()
            && positives
                .iter()
                .all(|rule| names(rule) || *rule == Rule::close);
        if !wanted || !is_reserved(word) || self.before(at) == "then" {
            return None;
        }
        let span = self.token_span(at);
        Some(
            Finding::new(
                catalogue::RESERVED_WORD,
                span,
                format!("`{word}` is a word of the language and cannot be a name"),
            )
            .label("reserved")
            .help(format!(
                "choose another name, such as `{word}_1` or `my_{word}`"
            )),
        )
    }

    fn decimal_comma(&self, at: usize) -> Option<Finding> {
        let after = self.rest(at).strip_prefix(',')?;
        let digits = |text: &str| {
            text.len()
                - text
                    .trim_start_matches(|next: char| next.is_ascii_digit())
                    .len()
        };
        let fraction = digits(after);
        let before = &self.text[self.range.start..at];
        let whole = before.len()
            - before
                .trim_end_matches(|next: char| next.is_ascii_digit())
                .len();
        if fraction == 0 || whole == 0 {
            return None;
        }
        let start = at - whole;
        let (left, right) = (&self.text[start..at], &after[..fraction]);
        Some(
            self.syntax(
                start,
                whole + 1 + fraction,
                "a decimal is written with a point",
            )
            .label("a decimal comma?")
            .help(format!("write `{left}.{right}`")),
        )
    }

    fn glued_number(&self, at: usize) -> Option<Finding> {
        let token = self.token(at);
        let digits = token.len()
            - token
                .trim_start_matches(|next: char| next.is_ascii_digit())
                .len();
        let (number, letters) = token.split_at(digits);
        if number.is_empty() || letters.is_empty() {
            return None;
        }
        let finding = self.syntax(
            at,
            token.len(),
            format!("`{token}` is neither a number nor a name"),
        );
        Some(match letters.chars().next() {
            Some('x' | 'X') if number == "0" => finding
                .label("not a hexadecimal number")
                .help("a hexadecimal number is `0x` and the digits 0 to 9 and a to f: `0x1d`"),
            Some('b' | 'B') if number == "0" => finding
                .label("not a binary number")
                .help("a binary number is `0b` and the digits 0 and 1: `0b101`"),
            _ => finding.label("a number runs into letters").help(format!(
                "write `{number}*{letters}` for a product; a name begins with a letter"
            )),
        })
    }

    fn sum_in_row(&self, at: usize, positives: &[Rule]) -> Option<Finding> {
        let sign = self.token(at);
        let in_row = positives
            .iter()
            .any(|rule| matches!(rule, Rule::caret | Rule::row_entry | Rule::row_exponent));
        if !in_row || !matches!(sign, "+" | "*" | "/" | "^" | "," | "-") {
            return None;
        }
        let help = match sign {
            "," => "entries of a row are separated by blanks: `| 1 0 1 |`",
            "^" => "write the power without blanks: `a^5`",
            _ => "put brackets around it: `| 1 (a+1) 0 |`; entries are separated by blanks",
        };
        Some(
            self.syntax(at, 1, format!("an entry of a row ends before `{sign}`"))
                .label("inside a row")
                .help(help),
        )
    }

    /// `require corects 1`: a phrase whose first word is not quite one of the vocabulary.
    fn misspelt_verb(&self, at: usize) -> Option<Finding> {
        let word = self.before(at);
        let start = self.end_before(at).checked_sub(word.len())?;
        if !matches!(self.before(start), "require" | "prefer") || self.token(at).is_empty() {
            return None;
        }
        let near: Vec<String> = near_names(word, PHRASE_VERBS.iter().copied())
            .into_iter()
            .filter(|verb| *verb != word)
            .map(|verb| format!("`{verb}`"))
            .collect();
        if near.is_empty() {
            return None;
        }
        Some(
            self.syntax(
                start,
                word.len(),
                format!("no requirement begins with `{word}`"),
            )
            .label("unknown word")
            .help(format!("did you mean {}?", near.join(" or "))),
        )
    }

    fn missing_then(&self, at: usize, positives: &[Rule]) -> Option<Finding> {
        let word = self.token(at);
        let step = positives
            .iter()
            .any(|rule| matches!(rule, Rule::kw_then | Rule::then));
        let letter = word.starts_with(|next: char| next.is_ascii_alphabetic());
        let code = self.text[self.declaration..].starts_with("code");
        if !step || !code || !letter || is_reserved(word) || self.in_brackets(at) {
            return None;
        }
        let fits = positives
            .iter()
            .any(|rule| matches!(rule, Rule::EOI | Rule::kw_is | Rule::claim));
        if !fits {
            return None;
        }
        Some(
            self.syntax(
                at,
                word.len(),
                format!("expected `then` before the step `{word}`"),
            )
            .label("a step?")
            .help(format!("a step begins with `then`: `then {word}`")),
        )
    }

    fn missing_over(&self, at: usize, positives: &[Rule]) -> Option<Finding> {
        let word = self.token(at);
        let wanted = positives
            .iter()
            .any(|rule| matches!(rule, Rule::kw_over | Rule::over));
        let letter = word.starts_with(|next: char| next.is_ascii_alphabetic());
        if !wanted || !positives.contains(&Rule::equals) || !letter || is_reserved(word) {
            return None;
        }
        Some(
            self.syntax(
                at,
                word.len(),
                format!("expected `over` before the field `{word}`"),
            )
            .label("a field?")
            .help(format!("write `over {word} =`")),
        )
    }
}
