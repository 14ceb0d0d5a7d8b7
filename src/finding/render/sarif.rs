//! Findings as SARIF 2.1.0 (OASIS Standard, 27 March 2020), for code review on a server.

use serde_json::{Value, json};

use super::ordered;
use crate::finding::{Finding, Severity, catalogue};
use crate::source::{Sources, Span};

/// A complete SARIF log of one run, its rules the whole catalogue.
pub fn sarif(findings: &[Finding], sources: &Sources) -> Value {
    let rules: Vec<Value> = catalogue::ALL
        .iter()
        .map(|code| {
            json!({
                "id": code.name,
                "shortDescription": {"text": first_sentence(code.says)},
                "fullDescription": {"text": code.says},
                "defaultConfiguration": {"level": level(code.severity)},
            })
        })
        .collect();
    let results: Vec<Value> = ordered(findings)
        .into_iter()
        .map(|finding| result(finding, sources))
        .collect();
    json!({
        "$schema": "https://json.schemastore.org/sarif-2.1.0.json",
        "version": "2.1.0",
        "runs": [{
            "tool": {"driver": {
                "name": "cosetta",
                "version": env!("CARGO_PKG_VERSION"),
                "rules": rules,
            }},
            // Our columns count characters (§3.14.17).
            "columnKind": "unicodeCodePoints",
            "results": results,
        }],
    })
}

fn result(finding: &Finding, sources: &Sources) -> Value {
    let text = match &finding.help {
        Some(help) => format!("{}\n\nhelp: {help}", finding.message),
        None => finding.message.clone(),
    };
    let mut result = json!({
        "ruleId": finding.code.name,
        "level": level(finding.severity),
        "message": {"text": text},
        "locations": [{"physicalLocation": place(finding.span, sources)}],
    });
    let rule = catalogue::ALL.iter().position(|code| *code == finding.code);
    if let Some(index) = rule {
        result["ruleIndex"] = json!(index);
    }
    if !finding.related.is_empty() {
        let related: Vec<Value> = finding
            .related
            .iter()
            .enumerate()
            .map(|(id, related)| {
                json!({
                    "id": id,
                    "physicalLocation": place(related.span, sources),
                    "message": {"text": related.message},
                })
            })
            .collect();
        result["relatedLocations"] = json!(related);
    }
    result
}

fn place(span: Span, sources: &Sources) -> Value {
    let (start, end) = sources.positions(span);
    json!({
        "artifactLocation": {"uri": uri(&sources.get(span.source).name)},
        "region": {
            "startLine": start.line, "startColumn": start.column,
            "endLine": end.line, "endColumn": end.column,
        },
    })
}

fn level(severity: Severity) -> &'static str {
    match severity {
        Severity::Error => "error",
        Severity::Warning => "warning",
        Severity::Advice => "note",
    }
}

fn first_sentence(text: &str) -> &str {
    text.find(". ").map_or(text, |end| &text[..=end])
}

/// A file's name as a relative reference (RFC 3986, §2 and §4.2).
fn uri(name: &str) -> String {
    let mut uri = String::new();
    // A colon in the first segment would read as a scheme (§4.2).
    if name
        .split('/')
        .next()
        .is_some_and(|first| first.contains(':'))
    {
        uri.push_str("./");
    }
    for byte in name.replace('\\', "/").bytes() {
        match byte {
            b'/' | b'-' | b'.' | b'_' | b'~' | b':' | b'@' | b'+' | b'=' | b',' => {
                uri.push(byte as char);
            }
            _ if byte.is_ascii_alphanumeric() => uri.push(byte as char),
            _ => uri.push_str(&format!("%{byte:02X}")),
        }
    }
    uri
}
