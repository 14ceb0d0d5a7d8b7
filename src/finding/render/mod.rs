//! How findings are shown: to a person on a terminal, to a machine as JSON or SARIF.
//!
//! In: findings in any order and the sources they point into. Out: text or a JSON value, with the
//! findings ordered by file and place and each distinct one shown once. Whatever a spec contains
//! (control characters, spans at the very end, lines of any length), nothing here fails.

mod excerpt;
mod json;
mod plain;
mod sarif;
mod terminal;
mod wrap;

pub use json::{json, span_json};
pub use plain::plain;
pub use sarif::sarif;
pub use terminal::{summary, terminal};
pub use wrap::{width_of, wrap};

use super::{Finding, Severity};

/// How a text for a person is laid out.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct Style {
    /// Whether escape codes for colour may be used.
    pub color: bool,
    /// The width to fold lines at, in terminal columns.
    pub width: usize,
}

impl Default for Style {
    fn default() -> Style {
        Style {
            color: false,
            width: 90,
        }
    }
}

impl Style {
    /// `text` between the escape codes of an SGR parameter list (ECMA-48, §8.3.117), or as it is.
    pub fn paint(&self, parameters: &str, text: &str) -> String {
        if self.color && !text.is_empty() {
            format!("\u{1b}[{parameters}m{text}\u{1b}[0m")
        } else {
            text.to_string()
        }
    }
}

/// The findings in the order they are shown: by file (in the order of loading), place, gravity
/// (graver first), code and message; equal ones once.
pub fn ordered(findings: &[Finding]) -> Vec<&Finding> {
    let mut order: Vec<&Finding> = findings.iter().collect();
    order.sort_by(|left, right| {
        (left.span.source, left.span.start, left.span.end)
            .cmp(&(right.span.source, right.span.start, right.span.end))
            .then(right.severity.cmp(&left.severity))
            .then(left.code.name.cmp(right.code.name))
            .then(left.message.cmp(&right.message))
    });
    let mut shown: Vec<&Finding> = Vec::with_capacity(order.len());
    for finding in order {
        // Equal findings need not be neighbours: they may differ from one between them only in
        // what is not compared above.
        let twin = shown
            .iter()
            .rev()
            .take_while(|earlier| earlier.span == finding.span)
            .any(|earlier| *earlier == finding);
        if !twin {
            shown.push(finding);
        }
    }
    shown
}

/// The word for a severity.
pub fn severity_word(severity: Severity) -> &'static str {
    match severity {
        Severity::Error => "error",
        Severity::Warning => "warning",
        Severity::Advice => "advice",
    }
}
