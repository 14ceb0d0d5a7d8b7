//! Reads the pieces of a file, and as much as can be had of a broken one.

use super::expected::{self, View};
use super::grammar::{Grammar, Rule};
use super::reader::{Node, Reader};
use super::scan::{MAX_NESTING, Opening, Piece, skip_blanks, word_at};
use super::tree::*;
use crate::finding::{Finding, Found, catalogue};
use crate::source::{SourceId, Span};
use pest::Parser;
use std::ops::Range;

/// What one piece of a file gives.
#[derive(Default)]
pub struct Outcome {
    /// The declaration, if enough of it could be read.
    pub declaration: Option<Declaration>,
    /// The name it would have declared, if it could not be.
    pub broken: Option<Name>,
    /// What is wrong with it.
    pub findings: Vec<Finding>,
}

/// A file that is being read piece by piece.
pub struct Pieces<'a> {
    /// The file.
    pub source: SourceId,
    /// Its text.
    pub text: &'a str,
    /// Where its comments lie.
    pub comments: &'a [Range<usize>],
}

impl<'a> Pieces<'a> {
    /// Reads one piece.
    pub fn read(&self, piece: &Piece) -> Outcome {
        let mut outcome = match (&piece.opening, piece.too_deep) {
            (Opening::Keyword, None) => self.declaration(piece),
            (Opening::Keyword, Some(at)) => self.spoilt(self.too_deep(at)),
            (Opening::Misspelt(near), _) => self.spoilt(self.misspelt(piece, near)),
            (Opening::Nothing, _) => self.spoilt(self.no_declaration(piece)),
        };
        if outcome.declaration.is_none() && piece.opening != Opening::Nothing {
            outcome.broken = self.declared_name(piece);
        }
        outcome
    }

    fn spoilt(&self, finding: Finding) -> Outcome {
        Outcome {
            findings: vec![finding],
            ..Outcome::default()
        }
    }

    fn declaration(&self, piece: &Piece) -> Outcome {
        let whole = self.attempt(piece, piece.range.clone());
        let recoverable =
            self.text[piece.range.clone()].starts_with("code") && !piece.clauses.is_empty();
        if whole.declaration.is_some() || !recoverable {
            return whole;
        }
        let cuts: Vec<usize> = piece
            .clauses
            .iter()
            .copied()
            .chain([piece.range.end])
            .collect();
        let mut outcome = self.attempt(piece, piece.range.start..cuts[0]);
        for cut in cuts.windows(2) {
            let clauses = self.clauses(cut[0]..cut[1], piece, &mut outcome.findings);
            let Some(declaration) = &mut outcome.declaration else {
                continue;
            };
            if let (DeclarationKind::Code(code), Some(last)) =
                (&mut declaration.kind, clauses.last())
            {
                declaration.span = declaration.span.to(last.span);
                code.clauses.extend(clauses);
            }
        }
        if outcome.findings.is_empty() {
            whole
        } else {
            outcome
        }
    }

    /// Reads `range`, which begins with the piece, as a declaration.
    fn attempt(&self, piece: &Piece, range: Range<usize>) -> Outcome {
        let mut reader = self.reader(range.start);
        let text = &self.text[range.clone()];
        let read = match Grammar::parse(Rule::one_declaration, text) {
            Ok(mut pairs) => pairs.next().and_then(|whole| whole.into_inner().next()),
            Err(error) => return self.spoilt(expected::explain(&error, &self.view(piece, range))),
        };
        let Some(pair) = read else {
            return Outcome::default();
        };
        let span = reader.span(&pair);
        let built = reader.declaration(pair);
        let mut findings = reader.findings;
        let declaration = match built {
            Ok(kind) => Some(Declaration {
                documentation: piece.documentation.clone(),
                span,
                kind,
            }),
            Err(finding) => {
                findings.push(*finding);
                None
            }
        };
        Outcome {
            declaration,
            broken: None,
            findings,
        }
    }

    fn clauses(
        &self,
        range: Range<usize>,
        piece: &Piece,
        findings: &mut Vec<Finding>,
    ) -> Vec<Clause> {
        let mut reader = self.reader(range.start);
        match Grammar::parse(Rule::clauses_only, &self.text[range.clone()]) {
            Ok(pairs) => {
                let clauses = pairs
                    .flat_map(|whole| whole.into_inner())
                    .filter(|part| part.as_rule() != Rule::EOI)
                    .filter_map(|part| reader.clause(part))
                    .collect();
                findings.append(&mut reader.findings);
                clauses
            }
            Err(error) => {
                findings.push(expected::explain(&error, &self.view(piece, range)));
                Vec::new()
            }
        }
    }

    fn reader(&self, offset: usize) -> Reader<'a> {
        Reader {
            source: self.source,
            text: self.text,
            offset,
            comments: self.comments,
            chain: 0,
            findings: Vec::new(),
        }
    }

    fn view(&self, piece: &Piece, range: Range<usize>) -> View<'a> {
        View {
            source: self.source,
            text: self.text,
            declaration: piece.range.start,
            range,
            comments: self.comments,
        }
    }

    fn declared_name(&self, piece: &Piece) -> Option<Name> {
        let start = piece.range.start + word_at(self.text, piece.range.start).len();
        let rest = skip_blanks(&self.text[start..]);
        let at = self.text.len() - rest.len();
        let text = word_at(rest, 0);
        let named = text.starts_with(|first: char| !first.is_ascii_digit()) && at < piece.range.end;
        named.then(|| Name {
            text: text.to_string(),
            span: Span::new(self.source, at, at + text.len()),
        })
    }

    fn too_deep(&self, at: usize) -> Finding {
        let message = format!("this nests more than {MAX_NESTING} levels deep");
        Finding::new(
            catalogue::BAD_TEXT,
            Span::new(self.source, at, at + 1),
            message,
        )
        .label("too deep")
        .help("name an inner part with `let`, `matrix` or `code` and use the name here")
    }

    fn misspelt(&self, piece: &Piece, near: &[&str]) -> Finding {
        let start = piece.range.start;
        let word = word_at(self.text, start);
        let span = Span::new(self.source, start, start + word.len());
        let near: Vec<String> = near.iter().map(|word| format!("`{word}`")).collect();
        Finding::new(
            catalogue::SYNTAX,
            span,
            format!("no declaration begins with `{word}`"),
        )
        .label("not a keyword")
        .help(format!("did you mean {}?", near.join(" or ")))
    }

    fn no_declaration(&self, piece: &Piece) -> Finding {
        let view = self.view(piece, piece.range.clone());
        view.special(piece.range.start).unwrap_or_else(|| {
            Finding::new(catalogue::SYNTAX, view.token_span(piece.range.start), "expected a declaration")
                .label("no declaration begins like this")
                .help("a file is a list of `use`, `field`, `let`, `matrix`, `code`, `channel` and `deliver`")
        })
    }
}

impl<'a> Reader<'a> {
    /// What a declaration declares.
    fn declaration(&mut self, pair: Node<'a>) -> Found<DeclarationKind> {
        let rule = pair.as_rule();
        let mut head = Head::default();
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::name => head.name = Some(self.name(&part)),
                Rule::string => head.string = Some(self.string(&part)),
                Rule::use_names => {
                    head.names = Some(self.parts(part).map(|name| self.name(&name)).collect());
                }
                Rule::parameters => head.parameters = self.parameters(part)?,
                Rule::over => head.over = Some(self.inner_expression(part)?),
                Rule::expression | Rule::named => head.value = Some(self.expression(part)?),
                Rule::artefact => head.artefacts.push(self.artefact(part)),
                _ => head.clauses.extend(self.clause(part)),
            }
        }
        match head.finish(rule) {
            Some(kind) => Ok(kind),
            None => unreachable!("the grammar gives a declaration all its parts"),
        }
    }

    fn parameters(&mut self, pair: Node<'a>) -> Found<Vec<Parameter>> {
        let mut parameters = Vec::new();
        for parameter in self.parts(pair) {
            let (mut name, mut domain, mut default) = (None, None, None);
            for part in self.parts(parameter) {
                match part.as_rule() {
                    Rule::domain => domain = Some(self.domain(part)?),
                    Rule::default => default = Some(self.inner_expression(part)?),
                    _ => name = Some(self.name(&part)),
                }
            }
            match name {
                Some(name) => parameters.push(Parameter {
                    name,
                    domain,
                    default,
                }),
                None => unreachable!("the grammar gives a parameter its name"),
            }
        }
        Ok(parameters)
    }

    fn artefact(&mut self, pair: Node<'a>) -> Artefact {
        let (mut names, mut form) = (Vec::new(), None);
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::form => form = Some(self.inner_name(part)),
                _ => names.push(self.name(&part)),
            }
        }
        let what = names.remove(0);
        Artefact {
            what,
            form,
            formats: names,
        }
    }
}

/// The parts that declarations have.
#[derive(Default)]
struct Head {
    name: Option<Name>,
    string: Option<Text>,
    names: Option<Vec<Name>>,
    parameters: Vec<Parameter>,
    over: Option<Expression>,
    value: Option<Expression>,
    artefacts: Vec<Artefact>,
    clauses: Vec<Clause>,
}

impl Head {
    fn finish(self, rule: Rule) -> Option<DeclarationKind> {
        let Head {
            name,
            string,
            names,
            parameters,
            over,
            value,
            artefacts,
            clauses,
        } = self;
        Some(match rule {
            Rule::use_declaration => DeclarationKind::Use(Use {
                path: string?,
                names,
            }),
            Rule::field_declaration => DeclarationKind::Field(FieldDeclaration {
                name: name?,
                value: value?,
            }),
            Rule::let_declaration => DeclarationKind::Let(Let {
                name: name?,
                parameters,
                value: value?,
            }),
            Rule::matrix_declaration => DeclarationKind::Matrix(MatrixDeclaration {
                name: name?,
                parameters,
                over,
                value: value?,
            }),
            Rule::code_declaration => DeclarationKind::Code(CodeDeclaration {
                name: name?,
                parameters,
                over,
                body: value?,
                clauses,
            }),
            Rule::channel_declaration => DeclarationKind::Channel(ChannelDeclaration {
                name: name?,
                model: value?,
            }),
            Rule::deliver_declaration => DeclarationKind::Deliver(Deliver {
                code: value?,
                folder: string?,
                artefacts,
            }),
            _ => return None,
        })
    }
}
