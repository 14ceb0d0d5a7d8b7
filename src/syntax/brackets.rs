//! Brackets and bars that do not pair up, each with a message of its own.

use super::expected::View;
use super::scan::string_end;
use crate::finding::Finding;
use crate::source::Span;

impl View<'_> {
    /// A bracket that is never closed, closed by another kind, or never opened.
    pub fn brackets(&self, at: usize) -> Option<Finding> {
        let mut open: Vec<(usize, char)> = Vec::new();
        for (place, mark) in self.marks(at) {
            match mark {
                '(' | '[' | '{' => open.push((place, mark)),
                ')' | ']' | '}' => drop(open.pop()),
                _ => {}
            }
        }
        let token = self.token(at);
        let closes = |open: char| match open {
            '(' => ")",
            '[' => "]",
            _ => "}",
        };
        let (last, closer) = match (open.last(), token) {
            (None, ")" | "]" | "}") => {
                return Some(
                    self.syntax(at, 1, format!("this `{token}` closes nothing"))
                        .label("no bracket is open here")
                        .help("delete it, or open a bracket before it"),
                );
            }
            (Some(&(place, mark)), _) => ((place, mark), closes(mark)),
            (None, _) => return None,
        };
        let (place, mark) = last;
        let crossed = matches!(token, ")" | "]" | "}") && token != closer;
        let clause = matches!(
            token,
            "is" | "require" | "prefer" | "bits" | "note" | "then"
        );
        if crossed {
            return Some(
                self.syntax(at, 1, format!("`{mark}` is closed by `{token}`"))
                    .label(format!("expected `{closer}`"))
                    .related(Span::new(self.source, place, place + 1), "opened here")
                    .help(format!(
                        "write `{closer}` first, or open with another bracket"
                    )),
            );
        }
        let opened_on_this_line = !self.text[place..at].contains('\n');
        let order = matches!(token, "where" | "modulus") && self.before(place) == "GF";
        if token.is_empty() || order || clause && !opened_on_this_line {
            return Some(
                self.syntax(place, 1, format!("this `{mark}` is never closed"))
                    .label("opened here")
                    .help(format!("write `{closer}` where it should end")),
            );
        }
        None
    }

    /// Rows whose bars do not pair up: the first line with an odd number of them.
    pub fn bars(&self, at: usize) -> Option<Finding> {
        let places: Vec<usize> = self
            .marks(self.range.end)
            .filter(|&(_, mark)| mark == '|')
            .map(|(place, _)| place)
            .collect();
        let odd = |count: usize| count % 2 == 1;
        if !odd(places.len()) || !places.iter().any(|&place| place <= at) {
            return None;
        }
        let line_of = |place: usize| self.text[..place].rfind('\n').map_or(0, |end| end + 1);
        let on_line = |line: usize| {
            places
                .iter()
                .filter(|&&place| line_of(place) == line)
                .count()
        };
        let line = places
            .iter()
            .map(|&place| line_of(place))
            .find(|&line| odd(on_line(line)))?;
        let first = *places.iter().find(|&&place| line_of(place) == line)?;
        let line_end = self.text[first..]
            .find('\n')
            .map_or(self.text.len(), |end| first + end);
        let end = self.end_before(line_end.min(self.range.end)).max(first + 1);
        Some(
            self.syntax(first, end - first, "this row lacks one of its two bars")
                .label("an odd number of `|` on this line")
                .help("a row begins and ends with `|`: `| 1 0 1 |`"),
        )
    }

    /// The brackets and bars before byte `end`, outside texts and comments.
    fn marks(&self, end: usize) -> impl Iterator<Item = (usize, char)> {
        let mut marks = Vec::new();
        let mut at = self.range.start;
        while at < end.min(self.range.end) {
            let Some(next) = self.text[at..].chars().next() else {
                break;
            };
            match next {
                '"' => at = string_end(self.text, at),
                '#' => at += self.text[at..].find('\n').unwrap_or(self.text.len() - at),
                _ => {
                    if matches!(next, '(' | ')' | '[' | ']' | '{' | '}' | '|') {
                        marks.push((at, next));
                    }
                    at += next.len_utf8();
                }
            }
        }
        marks.into_iter()
    }

    /// Whether byte `at` stands inside brackets.
    pub fn in_brackets(&self, at: usize) -> bool {
        self.marks(at).fold(0i64, |depth, (_, mark)| match mark {
            '(' | '[' | '{' => depth + 1,
            ')' | ']' | '}' => depth - 1,
            _ => depth,
        }) > 0
    }
}
