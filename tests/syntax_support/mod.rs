//! Reads a text and writes tree and findings down for comparison.
#![allow(dead_code)]

use cosetta::finding::Finding;
use cosetta::source::{Sources, Span};
use cosetta::syntax::tree::*;
use cosetta::syntax::{Parsed, parse};
use std::fmt::Write;

/// The tree of `text`.
pub fn read(text: &str) -> Parsed {
    let mut sources = Sources::default();
    let id = sources.add("a.coset", text);
    parse(id, text)
}

/// The findings of `text`, one after the other, as a person would read them.
pub fn findings(text: &str) -> String {
    let mut sources = Sources::default();
    let id = sources.add("a.coset", text);
    list(&sources, &parse(id, text).findings)
}

/// Findings with their places and the text there.
pub fn list(sources: &Sources, findings: &[Finding]) -> String {
    let mut out = String::new();
    for finding in findings {
        let place = place(sources, finding.span);
        let _ = writeln!(out, "{} {place}: {}", finding.code.name, finding.message);
        if !finding.label.is_empty() {
            let _ = writeln!(out, "  label: {}", finding.label);
        }
        for related in &finding.related {
            let _ = writeln!(
                out,
                "  there {}: {}",
                self::place(sources, related.span),
                related.message
            );
        }
        if let Some(help) = &finding.help {
            let _ = writeln!(out, "  help: {help}");
        }
    }
    out
}

fn place(sources: &Sources, span: Span) -> String {
    let (start, end) = sources.positions(span);
    let file = &sources.get(span.source).name;
    format!(
        "{file}:{}:{}-{}:{} «{}»",
        start.line,
        start.column,
        end.line,
        end.column,
        sources.text(span)
    )
}

/// The declarations of `text` with every expression fully bracketed.
pub fn shape(text: &str) -> String {
    let parsed = read(text);
    let mut out = String::new();
    for declaration in &parsed.file.declarations {
        if let Some(documentation) = &declaration.documentation {
            let _ = writeln!(out, "## {documentation}");
        }
        let covered = &text[declaration.span.start as usize..declaration.span.end as usize];
        let last = covered.lines().last().unwrap_or_default().trim_start();
        let _ = writeln!(out, "{}   …{last}", head(&declaration.kind));
        if let DeclarationKind::Code(code) = &declaration.kind {
            for clause in &code.clauses {
                let _ = writeln!(out, "  {}", self::clause(&clause.kind));
            }
        }
    }
    out
}

fn head(kind: &DeclarationKind) -> String {
    match kind {
        DeclarationKind::Use(it) => format!(
            "use {:?} {:?}",
            it.path.value,
            it.names.as_ref().map(|names| names
                .iter()
                .map(|name| name.text.as_str())
                .collect::<Vec<_>>())
        ),
        DeclarationKind::Field(it) => format!("field {} = {}", it.name.text, show(&it.value)),
        DeclarationKind::Let(it) => {
            format!(
                "let {}{} = {}",
                it.name.text,
                parameters(&it.parameters),
                show(&it.value)
            )
        }
        DeclarationKind::Matrix(it) => format!(
            "matrix {}{}{} = {}",
            it.name.text,
            parameters(&it.parameters),
            over(&it.over),
            show(&it.value)
        ),
        DeclarationKind::Code(it) => format!(
            "code {}{}{} = {}",
            it.name.text,
            parameters(&it.parameters),
            over(&it.over),
            show(&it.body)
        ),
        DeclarationKind::Channel(it) => format!("channel {} = {}", it.name.text, show(&it.model)),
        DeclarationKind::Deliver(it) => {
            let mut out = format!("deliver {} to {:?}", show(&it.code), it.folder.value);
            for artefact in &it.artefacts {
                let formats: Vec<_> = artefact
                    .formats
                    .iter()
                    .map(|name| name.text.as_str())
                    .collect();
                let form = artefact
                    .form
                    .as_ref()
                    .map_or("as is", |form| form.text.as_str());
                let _ = write!(
                    out,
                    " [{} ({form}) {}]",
                    artefact.what.text,
                    formats.join(" ")
                );
            }
            out
        }
    }
}

fn over(field: &Option<Expression>) -> String {
    field
        .as_ref()
        .map_or(String::new(), |field| format!(" over {}", show(field)))
}

fn parameters(parameters: &[Parameter]) -> String {
    if parameters.is_empty() {
        return String::new();
    }
    let each = |parameter: &Parameter| {
        let mut out = parameter.name.text.clone();
        if let Some(domain) = &parameter.domain {
            out += &format!(" in {}", show(domain));
        }
        if let Some(default) = &parameter.default {
            out += &format!(" = {}", show(default));
        }
        out
    };
    format!(
        "({})",
        parameters.iter().map(each).collect::<Vec<_>>().join(", ")
    )
}

fn clause(kind: &ClauseKind) -> String {
    match kind {
        ClauseKind::Claim(claim) => {
            let mut out = format!("is {} {}", bound(&claim.length), bound(&claim.dimension));
            if let Some(distance) = &claim.distance {
                out += &format!(" {}", bound(distance));
            }
            if let Some(weights) = &claim.weights {
                for (weight, count) in &weights.entries {
                    out += &format!(" {}:{}", show(weight), show(count));
                }
            }
            out
        }
        ClauseKind::Requirement(requirement) => {
            let condition = match &requirement.condition {
                Condition::Expression(value) => show(value),
                Condition::Phrase(parts) => parts
                    .iter()
                    .map(|part| match part {
                        PhrasePart::Word(word) => word.text.clone(),
                        PhrasePart::Operand(value) => format!("<{}>", show(value)),
                    })
                    .collect::<Vec<_>>()
                    .join(" "),
            };
            format!(
                "{:?} {condition}   from {:?}",
                requirement.strength, requirement.text
            )
        }
        ClauseKind::Bits(groups) => {
            let each = |group: &BitGroup| match &group.range {
                Some((first, last)) => {
                    format!("{}[{}..{}]", group.name.text, show(first), show(last))
                }
                None => group.name.text.clone(),
            };
            format!(
                "bits {}",
                groups.iter().map(each).collect::<Vec<_>>().join(", ")
            )
        }
        ClauseKind::Note(text) => format!("note {:?}", text.value),
    }
}

fn bound(bound: &Bound) -> String {
    match &bound.kind {
        BoundKind::Open => "_".to_string(),
        BoundKind::Exactly(value) => show(value),
        BoundKind::Compared(operator, value) => format!("{operator:?} {}", show(value)),
    }
}

fn arguments(arguments: &[Argument]) -> String {
    let each = |argument: &Argument| match &argument.name {
        Some(name) => format!("{}: {}", name.text, show(&argument.value)),
        None => show(&argument.value),
    };
    arguments.iter().map(each).collect::<Vec<_>>().join(", ")
}

fn condition(condition: &Option<Expression>) -> String {
    condition.as_ref().map_or(String::new(), |condition| {
        format!(" where {}", show(condition))
    })
}

fn all(values: &[Expression]) -> String {
    values.iter().map(show).collect::<Vec<_>>().join(", ")
}

fn rows(rows: &[Vec<Expression>]) -> String {
    rows.iter().map(|row| format!("|{}|", all(row))).collect()
}

/// An expression with every operation in brackets.
pub fn show(expression: &Expression) -> String {
    use ExpressionKind as Kind;
    match &expression.kind {
        Kind::Integer(value) => value.to_string(),
        Kind::Decimal(value) => format!("{value}"),
        Kind::Boolean(value) => value.to_string(),
        Kind::Text(value) => format!("{value:?}"),
        Kind::Name(name) => name.clone(),
        Kind::Call {
            function,
            arguments: list,
        } => format!("{}({})", function.text, arguments(list)),
        Kind::Index(value, index) => format!("{}[{}]", show(value), show(index)),
        Kind::Member(value, name) => format!("{}.{}", show(value), name.text),
        Kind::Unary(operator, value) => format!("({operator:?} {})", show(value)),
        Kind::Binary(operator, left, right) => {
            format!("({} {operator:?} {})", show(left), show(right))
        }
        Kind::Range(first, last) => format!("({}..{})", show(first), show(last)),
        Kind::Set(items) => format!("{{{}}}", all(items)),
        Kind::List(items) => format!("[{}]", all(items)),
        Kind::Comprehension(it) => {
            let binders: Vec<_> = it
                .binders
                .iter()
                .map(|(name, set)| format!("{} in {}", name.text, show(set)))
                .collect();
            let inner = format!(
                "{} for {}{}",
                show(&it.element),
                binders.join(", "),
                condition(&it.condition)
            );
            if it.list {
                format!("[{inner}]")
            } else {
                format!("{{{inner}}}")
            }
        }
        Kind::Conditional {
            condition,
            then,
            otherwise,
        } => {
            format!(
                "({} if {} else {})",
                show(then),
                show(condition),
                show(otherwise)
            )
        }
        Kind::Field(it) => match &it.modulus {
            None => format!("GF({})", show(&it.order)),
            Some(Modulus::Polynomial(value)) => {
                format!("GF({} modulus {})", show(&it.order), show(value))
            }
            Some(Modulus::Relation {
                symbol,
                left,
                right,
            }) => {
                format!(
                    "GF({} with {}: {} = {})",
                    show(&it.order),
                    symbol.text,
                    show(left),
                    show(right)
                )
            }
        },
        Kind::Rows(it) => rows(it),
        Kind::Blocks(it) => format!("blocks {}", rows(it)),
        Kind::Circulants { size, rows } => {
            let entry = |entry: &Option<Expression>| entry.as_ref().map_or("-".to_string(), show);
            let row = |row: &Vec<Option<Expression>>| {
                format!("|{}|", row.iter().map(entry).collect::<Vec<_>>().join(", "))
            };
            format!(
                "circulants {} {}",
                show(size),
                rows.iter().map(row).collect::<String>()
            )
        }
        Kind::Columns(it) => {
            let keys: Vec<_> = it
                .sort
                .iter()
                .map(|key| {
                    format!(
                        "{}{}",
                        show(&key.value),
                        if key.descending { " down" } else { "" }
                    )
                })
                .collect();
            let take = it
                .take
                .as_ref()
                .map_or(String::new(), |take| format!(" take {}", show(take)));
            format!(
                "columns {} height {}{} by [{}]{take}",
                it.variable.text,
                show(&it.height),
                condition(&it.condition),
                keys.join(", ")
            )
        }
        Kind::Monomials(it) => {
            let shape = match &it.shape {
                MonomialShape::Variables(count) => format!("in {}", show(count)),
                MonomialShape::Pattern(powers) => powers
                    .iter()
                    .map(|(variable, exponent)| format!("{}^{}", variable.text, exponent.text))
                    .collect::<Vec<_>>()
                    .join("*"),
            };
            format!("monomials {shape}{}", condition(&it.condition))
        }
        Kind::Points(it) => {
            let shape = match &it.shape {
                PointShape::Variables(count) => format!("in {}", show(count)),
                PointShape::Named(names) => {
                    format!(
                        "({})",
                        names
                            .iter()
                            .map(|name| name.text.as_str())
                            .collect::<Vec<_>>()
                            .join(", ")
                    )
                }
            };
            format!("points {shape}{}", condition(&it.condition))
        }
        Kind::Over(value, field) => format!("({} over {})", show(value), show(field)),
        Kind::Then(value, step) => {
            format!(
                "({} then {}({}))",
                show(value),
                step.name.text,
                arguments(&step.arguments)
            )
        }
        Kind::Pick(it) => format!(
            "(pick {} {} {} from {}{})",
            parameters(&it.parameters),
            if it.maximize { "max" } else { "min" },
            show(&it.measure),
            show(&it.from),
            condition(&it.condition)
        ),
    }
}
