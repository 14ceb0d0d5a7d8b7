//! What a finding is, and the catalogue of their codes.
//!
//! A finding is raised beside the rule it belongs to; this room only says what one consists of
//! ([`Finding`]), which codes there are ([`catalogue`]) and how one is shown ([`render`]).

pub mod catalogue;
pub mod render;

pub use catalogue::Code;

use crate::source::Span;

/// How grave a finding is.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Severity {
    /// Worth knowing; nothing is wrong.
    Advice,
    /// A preference that fails, or something that is probably not meant.
    Warning,
    /// The spec cannot be compiled, or does not hold.
    Error,
}

/// What a finding means for the run as a whole.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug)]
pub enum Class {
    /// Changes nothing: advice and warnings.
    Remark,
    /// A claim or requirement could not be decided within the budget.
    Undecided,
    /// A claim or requirement fails.
    Refuted,
    /// The spec cannot be compiled.
    Malformed,
}

/// A second place that a finding speaks of.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Related {
    /// What is to be seen there.
    pub message: String,
    /// Where.
    pub span: Span,
}

/// One thing to tell the author of a spec: what is wrong, where, why, and what to write instead.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Finding {
    /// Which kind of finding it is.
    pub code: Code,
    /// How grave it is; the code's own unless lowered.
    pub severity: Severity,
    /// One sentence, lower case, no full stop: what is wrong.
    pub message: String,
    /// Where.
    pub span: Span,
    /// A few words beside the place.
    pub label: String,
    /// What to write instead, or why it matters.
    pub help: Option<String>,
    /// Other places that belong to it.
    pub related: Vec<Related>,
}

impl Finding {
    /// A finding at `span`, with the severity of its code.
    pub fn new(code: Code, span: Span, message: impl Into<String>) -> Finding {
        Finding {
            code,
            severity: code.severity,
            message: message.into(),
            span,
            label: String::new(),
            help: None,
            related: Vec::new(),
        }
    }

    /// With a few words beside the place.
    pub fn label(mut self, label: impl Into<String>) -> Finding {
        self.label = label.into();
        self
    }

    /// With what to write instead.
    pub fn help(mut self, help: impl Into<String>) -> Finding {
        self.help = Some(help.into());
        self
    }

    /// With another place that belongs to it.
    pub fn related(mut self, span: Span, message: impl Into<String>) -> Finding {
        self.related.push(Related {
            message: message.into(),
            span,
        });
        self
    }

    /// With another severity than its code's own.
    pub fn severity(mut self, severity: Severity) -> Finding {
        self.severity = severity;
        self
    }
}

/// A value, or the findings that say why there is none.
pub type Found<T> = Result<T, Box<Finding>>;

/// The near names among `known`, nearest first, at most three: for "did you mean".
pub fn near_names<'a>(wanted: &str, known: impl IntoIterator<Item = &'a str>) -> Vec<&'a str> {
    let mut scored: Vec<(usize, &str)> = known
        .into_iter()
        .map(|name| (strsim::damerau_levenshtein(wanted, name), name))
        .filter(|&(distance, name)| {
            distance <= 1 + wanted.chars().count().max(name.chars().count()) / 4
                || (wanted.len() >= 4 && name.starts_with(wanted))
        })
        .collect();
    scored.sort();
    scored.dedup_by(|left, right| left.1 == right.1);
    scored.into_iter().take(3).map(|(_, name)| name).collect()
}
