//! The plain data of a report: what is known of each code, and on what grounds.
//!
//! The names of the fields are the machine-readable contract. They may grow in number, and are
//! never renamed.

mod known;

pub(super) use known::abbreviated;
pub use known::{DistanceReport, Ground, Interval, Named, Side, Weights, Witness};

pub use crate::derive::Verdict;
pub use crate::require::Kind;
use serde::Serialize;
use serde_json::{Map, Value};

use crate::algebra::Field;
use crate::algebra::formats::modulus_text;

/// A whole report.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct Report {
    /// Always `cosetta-report`.
    pub format: &'static str,
    /// The version of the contract.
    pub version: u32,
    /// One entry a code, in the order of declaration.
    pub codes: Vec<CodeReport>,
    /// The findings, as [`crate::finding::render::json`] gives them.
    pub findings: Value,
}

impl Report {
    /// A report of these codes and findings.
    pub fn new(codes: Vec<CodeReport>, findings: Value) -> Report {
        Report {
            format: "cosetta-report",
            version: 1,
            codes,
            findings,
        }
    }
}

/// All that is known of one code.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct CodeReport {
    /// As declared.
    pub name: String,
    /// The arguments of a family's member, by name, in the order of the parameters.
    pub arguments: Map<String, Value>,
    /// The documentation that stands before the declaration.
    pub documentation: Option<String>,
    /// The field.
    pub field: FieldReport,
    /// The length.
    pub n: usize,
    /// The dimension.
    pub k: usize,
    /// n − k.
    pub redundancy: usize,
    /// k/n in lowest terms, `8/9`.
    pub rate: String,
    /// The minimum distance with its grounds.
    pub d: DistanceReport,
    /// How many words there are of each weight, when derived.
    pub weights: Option<Weights>,
    /// The same for the dual.
    pub dual_weights: Option<Weights>,
    /// The covering radius, when anything is known of it.
    pub covering_radius: Option<Interval>,
    /// The largest d that each bound allows for this n, k and q.
    pub bounds: Named<u64>,
    /// The d that some code of this n, k and q reaches, by Gilbert and Varshamov.
    pub gilbert_varshamov: Option<u64>,
    /// What kind of code it is.
    pub properties: Named<PropertyReport>,
    /// Numbers beyond n, k and d: girth, row weights, burst limits.
    pub measures: Named<Measure>,
    /// The derivation, one entry a step, the construction first.
    pub steps: Vec<StepReport>,
    /// What was claimed, of kind `claim`.
    pub claims: Vec<RequirementReport>,
    /// What was required or preferred.
    pub requirements: Vec<RequirementReport>,
    /// Figures on a channel.
    pub figures: Vec<Figure>,
    /// The conventions in force, stated or assumed, one sentence each.
    pub assumptions: Vec<String>,
    /// The spec's own notes.
    pub notes: Vec<String>,
    /// The names of the positions, n of them, when given.
    pub positions: Option<Vec<String>>,
}

impl CodeReport {
    /// An [n, k] code of which nothing more is known.
    pub fn new(name: impl Into<String>, field: &Field, n: usize, k: usize) -> CodeReport {
        CodeReport {
            name: name.into(),
            arguments: Map::new(),
            documentation: None,
            field: FieldReport::new(field),
            n,
            k,
            redundancy: n.saturating_sub(k),
            rate: rate(n, k),
            d: DistanceReport::default(),
            weights: None,
            dual_weights: None,
            covering_radius: None,
            bounds: Named::default(),
            gilbert_varshamov: None,
            properties: Named::default(),
            measures: Named::default(),
            steps: Vec::new(),
            claims: Vec::new(),
            requirements: Vec::new(),
            figures: Vec::new(),
            assumptions: Vec::new(),
            notes: Vec::new(),
            positions: None,
        }
    }

    /// The name with its arguments: `guarded(r: 7)`.
    pub fn title(&self) -> String {
        title(&self.name, &self.arguments)
    }

    /// The interval that d is known to lie in.
    pub fn distance(&self) -> Interval {
        Interval {
            lower: self.d.lower,
            upper: self.d.upper,
        }
    }

    /// `[n, k, d]`, with what is known of d; a dash where d has no meaning.
    pub fn parameters(&self) -> String {
        parameters(self.n, self.k, self.distance())
    }
}

/// A code's name with arguments.
pub(super) fn title(name: &str, arguments: &Map<String, Value>) -> String {
    if arguments.is_empty() {
        return name.to_string();
    }
    let arguments: Vec<String> = arguments
        .iter()
        .map(|(name, value)| format!("{name}: {}", plain_value(value)))
        .collect();
    format!("{name}({})", arguments.join(", "))
}

/// A value as a spec would write it: strings without quotes, for they hold expressions.
pub(super) fn plain_value(value: &Value) -> String {
    match value {
        Value::String(text) => text.clone(),
        other => other.to_string(),
    }
}

/// `[n, k, d]` with what is known of d.
pub(super) fn parameters(n: usize, k: usize, d: Interval) -> String {
    let d = match d {
        // The zero code has no two different words, and so no distance.
        Interval {
            lower: None,
            upper: None,
        } if k == 0 => "–".to_string(),
        interval => interval.to_string(),
    };
    format!("[{n}, {k}, {d}]")
}

/// k/n in lowest terms; `0` when n is zero.
pub fn rate(n: usize, k: usize) -> String {
    let divisor = num_integer::gcd(n, k).max(1);
    match (n / divisor, k / divisor) {
        (0, _) | (_, 0) => "0".to_string(),
        (1, k) => k.to_string(),
        (n, k) => format!("{k}/{n}"),
    }
}

/// The field of a code.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct FieldReport {
    /// q.
    pub order: u64,
    /// p.
    pub characteristic: u32,
    /// m, with q = p^m.
    pub degree: u32,
    /// The modulus as a polynomial in x; `None` for a prime field.
    pub modulus: Option<String>,
}

impl FieldReport {
    /// What there is to say of a field.
    pub fn new(field: &Field) -> FieldReport {
        FieldReport {
            order: field.order(),
            characteristic: field.characteristic(),
            degree: field.degree(),
            modulus: modulus_text(field),
        }
    }
}

/// Whether a code has a property.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct PropertyReport {
    /// Whether it has.
    pub verdict: Verdict,
    /// Why.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub says: Option<String>,
}

/// A number, or a small structure of numbers, that describes a code or its matrix.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct Measure {
    /// The value.
    pub value: Value,
    /// What it is of, or why.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub says: Option<String>,
}

/// One step of the derivation and the parameters after it.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct StepReport {
    /// As written, without `then`.
    pub text: String,
    /// The length after it.
    pub n: usize,
    /// The dimension after it.
    pub k: usize,
    /// What is known of the distance after it.
    pub d: Interval,
    /// A remark.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub says: Option<String>,
}

/// A claim, requirement or preference and how it was settled.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct RequirementReport {
    /// As written, without the word that introduces it.
    pub text: String,
    /// Which of the three it is.
    pub kind: Kind,
    /// How it was settled.
    pub verdict: Verdict,
    /// Why.
    pub says: String,
    /// What shows it false.
    pub witness: Option<Witness>,
}

/// A probability on a channel.
#[derive(Clone, PartialEq, Debug, Serialize)]
pub struct Figure {
    /// Which figure: `failure`, `undetected`.
    pub name: String,
    /// The channel, as written.
    pub channel: String,
    /// The value in decimal notation.
    pub value: String,
    /// Whether it is exact, or the side it bounds.
    pub nature: Nature,
    /// How it was computed.
    pub says: String,
}

/// How a figure relates to the true value.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Nature {
    /// It is the true value, to the digits shown.
    Exact,
    /// The true value is at most this.
    Upper,
    /// The true value is at least this.
    Lower,
}
