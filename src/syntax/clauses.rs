//! Builds the clauses of a code: `is`, `require`, `prefer`, `bits`, `note`.

use super::grammar::Rule;
use super::reader::{Node, Reader};
use super::tree::*;
use super::words::PHRASE_WORDS;
use crate::finding::{Finding, Found, catalogue, near_names};
use crate::source::Span;

impl<'a> Reader<'a> {
    /// A clause; one that cannot be built leaves a finding and spoils nothing else.
    pub fn clause(&mut self, pair: Node<'a>) -> Option<Clause> {
        let span = self.span(&pair);
        let chain = self.chain;
        match self.clause_kind(pair) {
            Ok(kind) => Some(Clause { span, kind }),
            Err(finding) => {
                self.chain = chain;
                self.findings.push(*finding);
                None
            }
        }
    }

    fn clause_kind(&mut self, pair: Node<'a>) -> Found<ClauseKind> {
        Ok(match pair.as_rule() {
            Rule::claim => ClauseKind::Claim(self.claim(pair)?),
            Rule::require => ClauseKind::Requirement(self.requirement(pair, Strength::Require)?),
            Rule::prefer => ClauseKind::Requirement(self.requirement(pair, Strength::Prefer)?),
            Rule::bits => ClauseKind::Bits(self.bits(pair)?),
            _ => {
                let text = self.only(pair);
                ClauseKind::Note(self.string(&text))
            }
        })
    }

    fn claim(&mut self, pair: Node<'a>) -> Found<Claim> {
        let (mut bounds, mut place, mut weights) = (Vec::new(), None, None);
        for part in self.parts(pair) {
            if part.as_rule() == Rule::weights {
                weights = Some(self.weights(part)?);
                continue;
            }
            place = Some(self.span(&part));
            for bound in self.parts(part) {
                bounds.push(self.bound(bound)?);
            }
        }
        let count = bounds.len();
        let mut bounds = bounds.into_iter();
        match (bounds.next(), bounds.next(), bounds.next(), bounds.next()) {
            (Some(length), Some(dimension), distance, None) => Ok(Claim {
                length,
                dimension,
                distance,
                weights,
            }),
            _ => Err(Box::new(wrong_count(count, place.unwrap_or_default()))),
        }
    }

    fn bound(&mut self, pair: Node<'a>) -> Found<Bound> {
        let span = self.span(&pair);
        let part = self.only(pair);
        let kind = match part.as_rule() {
            Rule::blank => BoundKind::Open,
            Rule::compared => {
                let mut parts = self.parts(part);
                match (parts.next(), parts.next()) {
                    (Some(sign), Some(value)) => {
                        let operator = self.bound_operator(&sign)?;
                        BoundKind::Compared(operator, self.expression(value)?)
                    }
                    _ => unreachable!("the grammar gives a bound its sign and its value"),
                }
            }
            _ => BoundKind::Exactly(self.expression(part)?),
        };
        Ok(Bound { span, kind })
    }

    fn bound_operator(&self, sign: &Node<'a>) -> Found<BinaryOperator> {
        match sign.as_str() {
            ">=" => Ok(BinaryOperator::AtLeast),
            "<=" => Ok(BinaryOperator::AtMost),
            ">" => Ok(BinaryOperator::Greater),
            "<" => Ok(BinaryOperator::Less),
            other => Err(Box::new(
                Finding::new(
                    catalogue::SYNTAX,
                    self.span(sign),
                    format!("`{other}` makes no bound"),
                )
                .label("not a bound")
                .help("write the value alone, `_`, or a bound such as `>= 43`"),
            )),
        }
    }

    fn weights(&mut self, pair: Node<'a>) -> Found<Weights> {
        let table = self.only(pair);
        let span = self.span(&table);
        let mut entries = Vec::new();
        for weight in self.parts(table) {
            let mut parts = self.parts(weight);
            match (parts.next(), parts.next()) {
                (Some(weight), Some(count)) => {
                    entries.push((self.expression(weight)?, self.expression(count)?));
                }
                _ => unreachable!("the grammar gives a weight its count"),
            }
        }
        Ok(Weights { span, entries })
    }

    fn requirement(&mut self, pair: Node<'a>, strength: Strength) -> Found<Requirement> {
        let condition = self.only(pair);
        let span = self.span(&condition);
        let written = &self.text[span.start as usize..span.end as usize];
        let text = self.folded(written, span.start as usize);
        let inner = self.only(condition);
        let condition = match inner.as_rule() {
            Rule::expression => Condition::Expression(self.expression(inner)?),
            _ => Condition::Phrase(self.phrase(inner)?),
        };
        Ok(Requirement {
            strength,
            text,
            span,
            condition,
        })
    }

    /// `written` on one line: comments left out, runs of white space folded.
    fn folded(&self, written: &str, start: usize) -> String {
        let mut text = String::new();
        let mut from = start;
        let end = start + written.len();
        let first = self
            .comments
            .partition_point(|comment| comment.end <= start);
        for comment in self.comments[first..]
            .iter()
            .take_while(|comment| comment.start < end)
        {
            text.push_str(&self.text[from..comment.start]);
            from = comment.end;
        }
        text.push_str(&self.text[from.min(end)..end]);
        text.split_whitespace().collect::<Vec<_>>().join(" ")
    }

    fn phrase(&mut self, pair: Node<'a>) -> Found<Vec<PhrasePart>> {
        let mut parts = Vec::new();
        for part in self.parts(pair) {
            parts.push(match part.as_rule() {
                Rule::phrase_operand => PhrasePart::Operand(self.expression(part)?),
                Rule::phrase_bits => PhrasePart::Operand(self.bits_operand(part)?),
                _ => {
                    let mut word = self.name(&part);
                    word.text = word.text.replace('-', "_");
                    PhrasePart::Word(word)
                }
            });
            if let [.., PhrasePart::Operand(first), PhrasePart::Operand(second)] = &parts[..] {
                return Err(Box::new(two_operands(first, second)));
            }
        }
        Ok(parts)
    }

    /// `bits(data, check)` as an operand: a call of the reserved word.
    fn bits_operand(&mut self, pair: Node<'a>) -> Found<Expression> {
        let span = self.span(&pair);
        let mut parts = pair.into_inner();
        match (parts.next(), parts.next()) {
            (Some(word), Some(list)) => {
                let function = self.name(&word);
                let arguments = self.arguments(list)?;
                Ok(Expression {
                    span,
                    kind: ExpressionKind::Call {
                        function,
                        arguments,
                    },
                })
            }
            _ => unreachable!("the grammar gives `bits` its arguments here"),
        }
    }

    fn bits(&mut self, pair: Node<'a>) -> Found<Vec<BitGroup>> {
        let mut groups = Vec::new();
        for group in self
            .parts(pair)
            .filter(|part| part.as_rule() == Rule::group)
        {
            let span = self.span(&group);
            let (mut name, mut range) = (None, None);
            for part in self.parts(group) {
                if part.as_rule() == Rule::name {
                    name = Some(self.name(&part));
                    continue;
                }
                let value = self.inner_expression(part)?;
                range = Some(match value.kind {
                    ExpressionKind::Range(first, last) => (*first, *last),
                    _ => (value.clone(), value),
                });
            }
            match name {
                Some(name) => groups.push(BitGroup { name, range, span }),
                None => unreachable!("the grammar gives a group its name"),
            }
        }
        Ok(groups)
    }
}

fn wrong_count(count: usize, place: Span) -> Finding {
    let entries = if count == 1 { "entry" } else { "entries" };
    let help = if count < 2 {
        "write length, dimension and distance, `is [n, k, d]`; `_` leaves one open, and `[n, k]` leaves out the distance"
    } else {
        "write length, dimension and distance, `is [n, k, d]`; other figures are stated with `require`"
    };
    Finding::new(
        catalogue::SYNTAX,
        place,
        format!("a claim has two or three entries, not {count}"),
    )
    .label(format!("{count} {entries}"))
    .help(help)
}

/// Two operands of a phrase with no word between them: one is a misspelt word, as a rule.
fn two_operands(first: &Expression, second: &Expression) -> Finding {
    let word = |value: &Expression| match &value.kind {
        ExpressionKind::Name(name) => Some((name.clone(), value.span)),
        _ => None,
    };
    let near = |(name, span): (String, Span)| {
        let near = near_names(&name, PHRASE_WORDS.iter().copied());
        near.first()
            .map(|near| (name, span, format!("did you mean `{near}`?")))
    };
    let guess = [second, first].into_iter().filter_map(word).find_map(near);
    match guess {
        Some((name, span, help)) => Finding::new(
            catalogue::UNKNOWN_REQUIREMENT,
            span,
            format!("`{name}` is no word of a requirement"),
        )
        .label("unknown word")
        .help(help),
        None => Finding::new(
            catalogue::UNKNOWN_REQUIREMENT,
            second.span,
            "two values stand side by side",
        )
        .label("a word is missing before this")
        .help("requirements read like `corrects 1 while detecting 2` or `recovers 4 losses`"),
    }
}
