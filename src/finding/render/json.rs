//! Findings as JSON: the machine-readable contract.

use serde_json::{Value, json};

use super::{ordered, severity_word};
use crate::finding::Finding;
use crate::source::{Sources, Span};

/// The findings as an array of objects with `code`, `severity`, `message`, `label`, `help` (text
/// or null), `file`, `span` and `related`.
pub fn json(findings: &[Finding], sources: &Sources) -> Value {
    ordered(findings)
        .into_iter()
        .map(|finding| one(finding, sources))
        .collect()
}

fn one(finding: &Finding, sources: &Sources) -> Value {
    let related: Vec<Value> = finding
        .related
        .iter()
        .map(|related| {
            json!({
                "message": related.message,
                "file": sources.get(related.span.source).name,
                "span": span_json(related.span, sources),
            })
        })
        .collect();
    json!({
        "code": finding.code.name,
        "severity": severity_word(finding.severity),
        "message": finding.message,
        "label": finding.label,
        "help": finding.help,
        "file": sources.get(finding.span.source).name,
        "span": span_json(finding.span, sources),
        "related": related,
    })
}

/// A span as `{start: {line, column}, end: {line, column}}`, counted from 1, the end exclusive.
pub fn span_json(span: Span, sources: &Sources) -> Value {
    let (start, end) = sources.positions(span);
    json!({
        "start": {"line": start.line, "column": start.column},
        "end": {"line": end.line, "column": end.column},
    })
}
