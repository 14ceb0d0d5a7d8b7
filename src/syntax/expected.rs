//! Turns what pest missed into a finding in plain words.
//!
//! Each rule of the grammar has words and a rank here; a message names the four likeliest. Mistakes
//! that are made often have a message of their own in [`super::special`].

use super::grammar::Rule;
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
    let mut wanted: Vec<(u8, &str, &str)> = positives
        .iter()
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

/// From this rank on, words are named only where there are no others.
const MINOR: u8 = 20;

/// Rank (likeliest first), words and help for a rule; `None` for what is not worth naming.
fn words(rule: Rule, before: &str) -> Option<(u8, &'static str, &'static str)> {
    use Rule::*;
    if matches!(rule, name | step) && before == "then" {
        return Some((
            1,
            "a step name such as `extend`",
            "write `then extend` or `then shorten(first: 3)`",
        ));
    }
    if matches!(rule, field_operand | field_literal | named | gf) && before == "over" {
        return Some((1, "a field", "write a field's name or `GF(2^8)`"));
    }
    Some(match rule {
        equals => (1, "`=`", "write `=` before the value"),
        name | label => (
            2,
            "a name",
            "a name begins with a letter and has letters, digits and `_`",
        ),
        string => (1, "a text in quotes", "write it between quotes: `\"…\"`"),
        expression | conditional | logic | range | sum | primary | prefix | named | row_named
        | condition | field_operand | phrase_operand | number | integer | decimal | hexadecimal
        | binary | bracketed | boolean | set | list | field_literal | plain_field | gf
        | phrase_part => (
            3,
            "a value",
            "a value is a number, a name, a call such as `hamming(3)`, a set `{ }` or a list `[ ]`",
        ),
        bound | compared => (2, "a value, a bound such as `>= 4`, or `_`", ""),
        blank => (4, "`_`", ""),
        bounds | open_list => (MINOR, "`[`", ""),
        parameters => (MINOR, "parameters in `( )`", ""),
        parameter => (
            2,
            "a parameter such as `r in 4..9`",
            "write `NAME in DOMAIN`, with `= VALUE` for a default",
        ),
        domain => (3, "`in` and a set", "write `r in 4..9` or `s in {0, 4, 8}`"),
        default => (4, "a default after `=`", ""),
        arguments => (MINOR, "arguments in `( )`", ""),
        argument => (3, "an argument", "write `f(3)` or `f(length: 7)`"),
        comma => (5, "`,`", "two items of a list are separated by `,`"),
        colon => (5, "`:`", ""),
        open => (MINOR, "`(`", ""),
        close => (6, "`)`", ""),
        close_list => (6, "`]`", ""),
        open_set => (6, "`{`", ""),
        close_set => (6, "`}`", ""),
        bar => (4, "`|`", "a row begins and ends with `|`: `| 1 0 1 |`"),
        row | rows | shifts => (
            3,
            "a row `| … |`",
            "a row begins and ends with `|`: `| 1 0 1 |`",
        ),
        row_entry | row_exponent => (
            5,
            "an entry",
            "entries are numbers, names or powers, separated by blanks; sums stand in `( )`",
        ),
        zero_block => (6, "`-`", ""),
        minus | index | member | dot => return None,
        caret => (4, "`^`", ""),
        times => (6, "`*`", ""),
        operator | range_operator | sum_operator | logic_operator => (7, "an operator", ""),
        comparison => (7, "an operator", ""),
        phrase_bound => return None,
        then | kw_then => (
            8,
            "`then` and a step",
            "a step begins with `then`: `then extend`",
        ),
        over | kw_over => (9, "`over` and a field", ""),
        kw_if => return None,
        kw_else => (1, "`else`", "write `A if CONDITION else B`"),
        claim | require | prefer | bits | note | kw_is | kw_require | kw_prefer | kw_bits
        | kw_note => (10, "a clause such as `is` or `require`", ""),
        clause => (
            3,
            "a clause",
            "clauses are `is`, `require`, `prefer`, `bits` and `note`",
        ),
        kw_to => (1, "`to` and a folder", "write `deliver NAME to \"folder\"`"),
        kw_as | form => (
            2,
            "`as` and formats",
            "write `check_matrix as mtx` or `check_matrix in systematic form as mtx`",
        ),
        word_form => (
            1,
            "`form`",
            "write `check_matrix in systematic form as mtx`",
        ),
        artefact => (
            3,
            "an artefact",
            "write what is delivered such as `check_matrix as mtx, npy`",
        ),
        kw_in => (2, "`in`", ""),
        kw_for => (8, "`for`", ""),
        comprehension => (8, "`for`", ""),
        binder => (1, "a variable such as `x in S`", "write `NAME in SET`"),
        r#where | kw_where => (9, "`where`", ""),
        kw_from => (
            2,
            "`from` and the candidates",
            "write `pick r in 4..9 minimizing n from CODE`",
        ),
        aim => (
            2,
            "`minimizing` or `maximizing`",
            "write `pick r in 4..9 minimizing n from CODE`",
        ),
        relation => (4, "`where` and the generator's equation", ""),
        modulus | word_modulus => (9, "`modulus`", ""),
        weights | word_with => (9, "`with weights`", ""),
        word_weights => (1, "`weights`", "write `with weights {0: 1, 8: 759}`"),
        weight_table => (1, "`{`", "write `with weights {0: 1, 8: 759}`"),
        weight => (
            1,
            "a weight and its count such as `8: 759`",
            "write `with weights {0: 1, 8: 759}`",
        ),
        group => (
            2,
            "a group of bits such as `data[63..0]`",
            "write `bits data[63..0], check[7..0]`",
        ),
        group_range => (6, "an index range such as `[63..0]`", ""),
        use_names => (
            4,
            "names in `( )`",
            "write `use \"file.coset\" (a, b)` to take only some names",
        ),
        word_of => (
            1,
            "`of`",
            "write `columns v of height 8` or `circulants of size 27`",
        ),
        word_height => (1, "`height`", "write `columns v of height 8`"),
        word_size => (1, "`size`", "write `circulants of size 27`"),
        word_variables => (1, "`variables`", "write `in 4 variables`"),
        variables => (2, "`in m variables`", ""),
        coordinates => (
            3,
            "coordinates such as `(x, y)`",
            "write `points (x, y) where …` or `points in 4 variables`",
        ),
        monomial | power => (
            3,
            "a monomial such as `x^i`",
            "write `monomials x^i * y^j where …` or `monomials in 4 variables where degree <= 2`",
        ),
        sorted | word_sorted => (9, "`sorted by`", ""),
        word_by => (1, "`by`", "write `sorted by weight(v), v`"),
        take | word_take => (9, "`take`", ""),
        sort_key => (3, "a value to sort by", ""),
        direction => (9, "`descending`", ""),
        use_declaration | kw_use | field_declaration | kw_field | let_declaration | kw_let
        | matrix_declaration | kw_matrix | code_declaration | kw_code | channel_declaration
        | kw_channel | deliver_declaration | kw_deliver | EOI => (11, "the next declaration", ""),
        _ => return None,
    })
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
